package series

// Entire functions of one variable s with rational data, as values. They are built from
// polynomials over ℚ, the exponential and power series given by a rule, by sums, products,
// composition and division where the singularity is removable; so every one is real on the
// real line, has no poles, and can be evaluated rigorously (model.go), differentiated and
// expanded exactly.

import (
	"errors"
	"fmt"
	"math/big"

	"remnant/expr/budget"
)

// Entire is an entire function. It is immutable; the zero value is the function 0.
type Entire struct{ n node }

// node is one way to build a function.
type node interface {
	// model encloses the function on the disc |s − c| ≤ ρ; c has no radius and ρ > 0.
	model(ev *evaluator, c Disc, rho mag) model
	// taylor is the first n coefficients at a, and false where they have no exact value.
	taylor(a *big.Rat, n int) ([]ExpSum, bool)
	deriv() node
	// text writes the function of the given argument.
	text(arg string) string
}

func (f Entire) node() node {
	if f.n == nil {
		return polyNode{}
	}
	return f.n
}

// Polynomial is p as a function.
func Polynomial(p UniPoly) Entire { return Entire{polyNode{p}} }

// Exp is e^g.
func Exp(g Entire) Entire { return Entire{expNode{}}.Of(g) }

// Sum is Σ f.
func Sum(list ...Entire) Entire {
	nodes := make([]node, len(list))
	for i, f := range list {
		nodes[i] = f.node()
	}
	return Entire{makeSum(nodes)}
}

// Product is Π f.
func Product(list ...Entire) Entire {
	nodes := make([]node, len(list))
	for i, f := range list {
		nodes[i] = f.node()
	}
	return Entire{makeProduct(nodes)}
}

// Times is k·f.
func (f Entire) Times(k *big.Rat) Entire { return Product(Polynomial(NewUniPoly(k)), f) }

// Pow is fᵏ, k ≥ 0.
func (f Entire) Pow(k int) Entire { return Entire{makePower(f.node(), k)} }

// Of is f(g(s)).
func (f Entire) Of(g Entire) Entire { return Entire{makeCompose(f.node(), g.node())} }

// ScaleArgument is f(q·s); with q = 1/M² it turns a function of s/M² into one of s.
func (f Entire) ScaleArgument(q *big.Rat) Entire {
	return f.Of(Polynomial(NewUniPoly(new(big.Rat), q)))
}

// Deriv is df/ds.
func (f Entire) Deriv() Entire { return Entire{f.node().deriv()} }

// String writes f as a function of s in the notation that the parser reads.
func (f Entire) String() string { return f.node().text("s") }

// Taylor is the first n coefficients f⁽ʲ⁾(a)/j!, and false where they have no exact value
// here: of a power series given by a rule away from 0, and of an exponential whose exponent
// is not rational at a.
func (f Entire) Taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	if n <= 0 {
		return nil, true
	}
	return f.node().taylor(a, n)
}

// Enclose is a disc that holds the values of f on |s − (x+iy)| ≤ radius, found with the given
// number of bits. The error is a *GrowthError or a *budget.Stop.
func (f Entire) Enclose(x, y, radius *big.Rat, bits int, b *budget.Budget) (d Disc, err error) {
	defer catch(&err)
	ev := &evaluator{Arith: NewArith(bits), budget: b}
	c := ev.Rat(x, y)
	rho := c.rad.add(magOfRat(radius)).add(mag{0.5, -4 * bits})
	m := ev.at(f.node(), c.exactMid(), rho)
	return m.a[0].enlarge(m.normFrom(1)).enlarge(m.eps), nil
}

// catch turns the panics of package budget and of a breached growth bound into errors.
func catch(err *error) {
	switch v := recover().(type) {
	case nil:
	case *budget.Stop:
		*err = v
	case *GrowthError:
		*err = v
	case big.ErrNaN:
		*err = errors.New("the values of the function are too large")
	default:
		panic(v)
	}
}

// PoleError says that a quotient is not entire.
type PoleError struct {
	Function string   // the numerator
	Re, Im   *big.Rat // where; the place itself if Exact, else within 2⁻³⁰ of it
	Exact    bool
	Proven   bool // the numerator is proved not to vanish there; else it could not be decided
}

func (e *PoleError) Error() string {
	at, about := e.Re.RatString(), ""
	if !e.Exact {
		at, about = e.Re.FloatString(6), "about "
		if e.Im.Sign() != 0 {
			at = fmt.Sprintf("%s%+.6fi", at, ratFloat(e.Im))
		}
	}
	if e.Proven {
		return fmt.Sprintf("a pole at s = %s%s: %s does not vanish there", about, at, e.Function)
	}
	return fmt.Sprintf("a possible pole at s = %s%s: %s could not be shown to vanish there", about, at, e.Function)
}

// ErrZeroDivisor is the error of a quotient by the polynomial 0.
var ErrZeroDivisor = errors.New("division by the zero polynomial")

// Quotient is f/p where every zero of p is a zero of f of at least its multiplicity, proved
// exactly. Otherwise the error is a *PoleError that says where.
func Quotient(f Entire, p UniPoly, b *budget.Budget) (q Entire, err error) {
	defer catch(&err)
	if p.IsZero() {
		return Entire{}, ErrZeroDivisor
	}
	n := f.node()
	for {
		root, rest, ok := rationalRoot(p, b)
		if !ok {
			break
		}
		if n, err = divideLinear(n, root, b); err != nil {
			return Entire{}, err
		}
		p = rest
	}
	if p.Degree() > 0 {
		if n, err = dividePolynomial(n, p, b); err != nil {
			return Entire{}, err
		}
		p = IntUniPoly(1)
	}
	inv := new(big.Rat).Inv(p.c[0])
	return Entire{n}.Times(inv), nil
}

// rationalRoot finds a rational zero of p and divides by it.
//
// A rational zero has a denominator that divides the leading coefficient l, and an interval
// shorter than 1/l² holds at most one such number, the one of smallest denominator.
func rationalRoot(p UniPoly, b *budget.Budget) (root *big.Rat, rest UniPoly, ok bool) {
	if p.Degree() < 1 {
		return nil, UniPoly{}, false
	}
	q := p.integral()
	l := new(big.Rat).SetInt(q[len(q)-1])
	width := new(big.Rat).Inv(l.Mul(l, l))
	for _, r := range realRoots(p, width.Quo(width, big.NewRat(2, 1)), b) {
		x := simplest(r.Lo, r.Hi)
		if p.Eval(x).Sign() == 0 {
			rest, _ := p.shift(x).divideByS()
			return x, rest.shift(new(big.Rat).Neg(x)), true
		}
	}
	return nil, UniPoly{}, false
}

// simplest is the rational number in [lo, hi] of smallest denominator and, among these, of
// smallest absolute value; by continued fractions.
func simplest(lo, hi *big.Rat) *big.Rat {
	switch {
	case lo.Sign() <= 0 && hi.Sign() >= 0:
		return new(big.Rat)
	case hi.Sign() < 0:
		x := simplest(new(big.Rat).Neg(hi), new(big.Rat).Neg(lo))
		return x.Neg(x)
	}
	floor := new(big.Int).Quo(lo.Num(), lo.Denom())
	whole := new(big.Rat).SetInt(floor)
	if whole.Cmp(lo) == 0 {
		return whole
	}
	if next := new(big.Rat).Add(whole, big.NewRat(1, 1)); next.Cmp(hi) <= 0 {
		return next
	}
	l, h := new(big.Rat).Sub(lo, whole), new(big.Rat).Sub(hi, whole)
	x := simplest(h.Inv(h), l.Inv(l))
	return whole.Add(whole, x.Inv(x))
}

// divideLinear is n/(s − a).
func divideLinear(n node, a *big.Rat, b *budget.Budget) (node, error) {
	toZero := polyNode{NewUniPoly(a, big.NewRat(1, 1))}
	back := polyNode{NewUniPoly(new(big.Rat).Neg(a), big.NewRat(1, 1))}
	value, exact := n.taylor(a, 1)
	if exact && value[0].IsZero() {
		return makeCompose(makeDivide(makeCompose(n, toZero)), back), nil
	}
	proven := exact
	if !exact {
		d, err := (Entire{n}).Enclose(a, new(big.Rat), new(big.Rat), 256, b)
		if err != nil {
			return nil, err
		}
		proven = d.ExcludesZero()
	}
	return nil, &PoleError{n.text("s"), new(big.Rat).Set(a), new(big.Rat), true, proven}
}

// dividePolynomial is n/p for p without rational zeros, which is decided where p divides the
// polynomial factor of n.
func dividePolynomial(n node, p UniPoly, b *budget.Budget) (node, error) {
	s := structureOf(n)
	if q, ok := s.poly.quo(p); ok {
		s.poly = q
		return s.node(), nil
	}
	at, err := polynomialZeros(p, b)
	if err != nil {
		return nil, err
	}
	for _, z := range at {
		d, err := (Entire{n}).Enclose(z.Re, z.Im, z.Radius, 256, b)
		if err != nil {
			return nil, err
		}
		if d.ExcludesZero() {
			return nil, &PoleError{n.text("s"), z.Re, z.Im, false, true}
		}
	}
	return nil, &PoleError{n.text("s"), at[0].Re, at[0].Im, false, false}
}

// quo is p/q if q divides p.
func (p UniPoly) quo(q UniPoly) (UniPoly, bool) {
	r := append([]*big.Rat(nil), p.c...)
	if len(r) < len(q.c) {
		return UniPoly{}, len(r) == 0
	}
	out := make([]*big.Rat, len(r)-len(q.c)+1)
	for at := len(out) - 1; at >= 0; at-- {
		out[at] = new(big.Rat).Quo(r[at+len(q.c)-1], q.c[len(q.c)-1])
		for i, c := range q.c {
			r[at+i] = new(big.Rat).Sub(r[at+i], new(big.Rat).Mul(out[at], c))
		}
	}
	return trim(out), trim(r).IsZero()
}

func ratFloat(x *big.Rat) float64 { f, _ := x.Float64(); return f }
