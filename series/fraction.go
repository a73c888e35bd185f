package series

// Meromorphic functions with finitely many poles: an entire function over a polynomial. A
// form factor such as exp(−s)/(1 + s) is one; whether it may be used depends on where its
// poles are.

import (
	"errors"
	"math/big"

	"remnant/expr/budget"
)

// Fraction is num/den. No zero of den is one of num; den is monic. It is immutable; make one
// with NewFraction.
type Fraction struct {
	num Entire
	den UniPoly
}

// NewFraction is f/p, with every common zero taken out. The error is ErrZeroDivisor, a
// *budget.Stop, or a *PoleError with Proven = false where it could not be decided whether a
// zero of p is one of f.
func NewFraction(f Entire, p UniPoly, b *budget.Budget) (q Fraction, err error) {
	defer catch(&err)
	if p.IsZero() {
		return Fraction{}, ErrZeroDivisor
	}
	n, poles := f.node(), IntUniPoly(1)
	lead := new(big.Rat).Inv(p.c[len(p.c)-1])
	rest := p.Scale(lead)
	for {
		root, next, ok := rationalRoot(rest, b)
		if !ok {
			break
		}
		rest = next
		quotient, err := divideLinear(n, root, b)
		var pole *PoleError
		switch {
		case err == nil:
			n = quotient
		case errors.As(err, &pole) && pole.Proven:
			poles = poles.Mul(NewUniPoly(new(big.Rat).Neg(root), rat1()))
		default:
			return Fraction{}, err
		}
	}
	for rest.Degree() > 0 { // no rational zeros
		s := structureOf(n)
		common := rest.gcd(s.poly, b)
		if common.Degree() < 1 {
			break
		}
		s.poly, _ = s.poly.quo(common)
		rest, _ = rest.quo(common)
		n = s.node()
	}
	if err := provePoles(n, rest, b); err != nil {
		return Fraction{}, err
	}
	return Fraction{Entire{n}.Times(lead), poles.Mul(rest)}, nil
}

func rat1() *big.Rat { return big.NewRat(1, 1) }

// gcd is the monic greatest common divisor; p ≠ 0.
func (p UniPoly) gcd(q UniPoly, b *budget.Budget) UniPoly {
	chain := sturmChain(p.integral(), q.integral(), b)
	g := chain[len(chain)-1].rational()
	return g.Scale(new(big.Rat).Inv(g.c[len(g.c)-1]))
}

// rational is p over ℚ.
func (p intPoly) rational() UniPoly {
	c := make([]*big.Rat, len(p))
	for i, x := range p {
		c[i] = new(big.Rat).SetInt(x)
	}
	return trim(c)
}

// provePoles proves that n vanishes at no zero of p.
func provePoles(n node, p UniPoly, b *budget.Budget) error {
	for _, part := range p.squareFree() {
		at, err := polynomialZeros(part.part, b)
		if err != nil {
			return err
		}
		for _, z := range at {
			d, err := (Entire{n}).Enclose(z.Re, z.Im, z.Radius, 256, b)
			if err != nil {
				return err
			}
			if !d.ExcludesZero() {
				return &PoleError{n.text("s"), z.Re, z.Im, false, false}
			}
		}
	}
	return nil
}

// Num is the numerator: its zeros are those of q.
func (q Fraction) Num() Entire { return q.num }

// Den is the denominator: its zeros are the poles of q, with their orders.
func (q Fraction) Den() UniPoly { return q.den }

// Entire is q as an entire function; the error is a *PoleError at one of the poles.
func (q Fraction) Entire(b *budget.Budget) (Entire, error) {
	if q.den.Degree() < 1 {
		return q.num, nil
	}
	if root, _, ok := rationalRoot(q.den, b); ok {
		return Entire{}, &PoleError{q.num.String(), root, new(big.Rat), true, true}
	}
	poles, err := q.Poles(b)
	if err != nil {
		return Entire{}, err
	}
	return Entire{}, &PoleError{q.num.String(), poles[0].Re, poles[0].Im, poles[0].Exact, true}
}

// Poles encloses the poles, with their orders as multiplicities.
func (q Fraction) Poles(b *budget.Budget) ([]Zero, error) {
	if q.den.Degree() < 1 {
		return nil, nil
	}
	z, err := ZerosInDisc(Polynomial(q.den), new(big.Rat), rootBound(q.den.integral()), ZeroOptions{Budget: b})
	if err == nil && !z.Listed {
		err = &NotProvenError{z.Reason}
	}
	return z.List, err
}

// AnalyticAt reports whether q has no pole at the rational point a.
func (q Fraction) AnalyticAt(a *big.Rat) bool { return q.den.Eval(a).Sign() != 0 }

// Add is q + r.
func (q Fraction) Add(r Fraction, b *budget.Budget) (Fraction, error) {
	if q.den.Equal(r.den) {
		return NewFraction(Sum(q.num, r.num), q.den, b)
	}
	num := Sum(Product(Polynomial(r.den), q.num), Product(Polynomial(q.den), r.num))
	return NewFraction(num, q.den.Mul(r.den), b)
}

// Mul is q·r.
func (q Fraction) Mul(r Fraction, b *budget.Budget) (Fraction, error) {
	return NewFraction(Product(q.num, r.num), q.den.Mul(r.den), b)
}

// Taylor is the first n coefficients at a, and false where q has a pole at a or the numerator
// no exact coefficients.
func (q Fraction) Taylor(a *big.Rat, n int) ([]ExpSum, bool) {
	t, ok := q.num.Taylor(a, n)
	if !ok || !q.AnalyticAt(a) {
		return nil, false
	}
	d := q.den.shift(a)
	inv := new(big.Rat).Inv(d.c[0])
	out := make([]ExpSum, n)
	for j := range out {
		out[j] = t[j]
		for i := 1; i <= min(j, d.Degree()); i++ {
			out[j] = out[j].Add(out[j-i].Scale(new(big.Rat).Neg(d.c[i])))
		}
		out[j] = out[j].Scale(inv)
	}
	return out, true
}

// String writes q in the notation that the parser reads.
func (q Fraction) String() string {
	if q.den.Degree() < 1 {
		return q.num.String()
	}
	return "(" + q.num.String() + ")/(" + q.den.String() + ")"
}
