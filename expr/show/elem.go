package show

// From an element of the differential field to its layout: a quotient of factored products,
// in the order in which a cosmologist writes them.

import (
	"cmp"
	"math/big"
	"slices"
	"strings"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// Elem lays out e as a quotient of products: a rational number in front, then single
// generators and bracketed sums. The order of the generators is constants, a, the other
// background functions as declared with H last, k, jets by order, free functions by order,
// roots and elementary functions. Cost: one factorisation over the field's known factors,
// and sorting.
func Elem(e field.Elem) Node {
	if e.IsZero() {
		return Int(0)
	}
	return fractionOf(e).node()
}

// Generator lays out one generator of f.
func Generator(f *field.Field, g field.Gen) Node {
	in := f.Info(g)
	switch in.Kind {
	case field.FreeFunction:
		return symbol{name: in.Name, by: derivativeNames(in), oneX: hasOneX(in.Fn.ArgNames)}
	case field.Root, field.Elementary:
		if in.Name == "cos" {
			return call{"cos", Elem(in.Angle)}
		}
		return call{in.Name, Elem(in.Arg)}
	}
	return symbol{name: in.Name, primes: in.Order}
}

// hasOneX reports whether just one argument is of the form X(phi).
func hasOneX(args []string) bool {
	n := 0
	for _, arg := range args {
		if strings.HasPrefix(arg, "X(") {
			n++
		}
	}
	return n == 1
}

// argument is a name by which a function is differentiated, as readers know it: X(chi) is
// X where there is no other X, and else X_chi.
func (s symbol) argument(name string) string {
	scalar, ok := strings.CutPrefix(name, "X(")
	switch {
	case !ok:
		return name
	case s.oneX:
		return "X"
	}
	return "X_" + strings.TrimSuffix(scalar, ")")
}

func derivativeNames(in field.Info) []string {
	var by []string
	for i, n := range in.Index {
		for range n {
			by = append(by, in.Fn.ArgNames[i])
		}
	}
	return by
}

// fraction is a laid-out quotient that more factors may still join.
type fraction struct {
	neg      bool
	num, den []Node
}

func (q fraction) node() Node {
	if s, ok := q.loneSum(); ok && q.neg {
		return leadPositive(negateSum(s))
	}
	n := Quotient(Product(q.num...), Product(q.den...))
	if q.neg {
		n = Neg(n)
	}
	return n
}

// loneSum is the sum that is all of the fraction but its sign.
func (q fraction) loneSum() (sum, bool) {
	if len(q.num) != 1 || !isNumber(Product(q.den...), 1) {
		return sum{}, false
	}
	s, ok := q.num[0].(sum)
	return s, ok
}

// times is the fraction with x as the last factor of the numerator, after a space if spaced.
func (q fraction) times(x Node, spaced bool) Node {
	gap := 0
	if spaced {
		gap = len(q.num)
	}
	num := append(slices.Clone(q.num), x)
	n := Quotient(multiply(num, gap), Product(q.den...))
	if q.neg {
		n = Neg(n)
	}
	return n
}

// placed is a factor with the place it is written at.
type placed struct {
	rank rank
	sum  bool
	exp  int
	node Node
}

// fractionOf lays out e ≠ 0.
func fractionOf(e field.Elem) fraction {
	f := e.Field()
	r, factors := e.Factors()
	neg := r.Sign() < 0
	var num, den []placed
	for _, fp := range factors {
		x, flipped := factorNode(f, fp.P)
		neg = neg != (flipped && fp.Exp%2 != 0)
		p := placed{rank: highest(f, fp.P), sum: !fp.P.IsMono(), exp: fp.Exp, node: x}
		if inv, ok := inverseExp(p); ok {
			p = inv
		}
		if p.exp > 0 {
			num = append(num, p)
		} else {
			p.exp = -p.exp
			den = append(den, p)
		}
	}
	return fraction{
		neg: neg,
		num: arrange(new(big.Int).Abs(r.Num()), num),
		den: arrange(r.Denom(), den),
	}
}

// inverseExp writes 1/exp(x) as exp(−x).
func inverseExp(p placed) (placed, bool) {
	c, ok := p.node.(call)
	if !ok || c.fn != "exp" || p.exp > 0 {
		return p, false
	}
	p.node, p.exp = call{"exp", Neg(c.arg)}, -p.exp
	return p, true
}

// arrange puts the number first and the factors at their places.
func arrange(n *big.Int, ps []placed) []Node {
	slices.SortStableFunc(ps, func(a, b placed) int {
		if c := a.rank.compare(b.rank); c != 0 {
			return c
		}
		switch {
		case a.sum == b.sum:
			return 0
		case b.sum:
			return -1
		}
		return 1
	})
	var out []Node
	if len(ps) == 0 || !n.IsInt64() || n.Int64() != 1 {
		out = append(out, bigInt(n))
	}
	for _, p := range ps {
		out = append(out, Power(p.node, p.exp))
	}
	return out
}

// factorNode lays out a factor with the sign that makes its first term positive; flipped says
// that the node is −p.
func factorNode(f *field.Field, p poly.Poly) (n Node, flipped bool) {
	if p.IsMono() { // factors that are monomials are single generators
		return Generator(f, p.Vars()[0]), false
	}
	s := sumOf(f, p)
	if _, neg := s.terms[0].(negation); neg {
		return negateSum(s), true
	}
	return s, false
}

func negateSum(s sum) sum {
	out := make([]Node, len(s.terms))
	for i, t := range s.terms {
		out[i] = Neg(t)
	}
	return sum{out}
}

// leadPositive moves the first term that is added to the front.
func leadPositive(s sum) sum {
	for i, t := range s.terms {
		if _, neg := t.(negation); neg {
			continue
		}
		out := append([]Node{t}, s.terms[:i]...)
		return sum{append(out, s.terms[i+1:]...)}
	}
	return s
}

// sumOf lays out a polynomial of several terms: higher powers of k first, then what has no
// part in the generators of highest place.
func sumOf(f *field.Field, p poly.Poly) sum {
	vars := p.Vars()
	ranks := make([]rank, len(vars))
	at := map[poly.Var]int{}
	slices.SortFunc(vars, func(a, b poly.Var) int { return rankOf(f, a).compare(rankOf(f, b)) })
	for i, v := range vars {
		ranks[i], at[v] = rankOf(f, v), i
	}
	type term struct {
		exps []uint32
		coef *big.Int
	}
	var terms []term
	for mono, c := range p.Terms() {
		t := term{make([]uint32, len(vars)), new(big.Int).Set(c)}
		for _, m := range mono {
			t.exps[at[m.Var]] = m.Exp
		}
		terms = append(terms, t)
	}
	slices.SortFunc(terms, func(a, b term) int {
		for i := range vars {
			if ranks[i].class == classWave && a.exps[i] != b.exps[i] {
				return cmp.Compare(b.exps[i], a.exps[i])
			}
		}
		for i := len(vars) - 1; i >= 0; i-- {
			if a.exps[i] != b.exps[i] {
				return cmp.Compare(a.exps[i], b.exps[i])
			}
		}
		return 0
	})
	nodes := make([]Node, len(terms))
	gens := make([]Node, len(vars))
	for i, v := range vars {
		gens[i] = Generator(f, v)
	}
	for i, t := range terms {
		factors := []Node{bigInt(t.coef)}
		for j, n := range t.exps {
			if n > 0 {
				factors = append(factors, Power(gens[j], int(n)))
			}
		}
		nodes[i] = Product(factors...)
	}
	return sum{nodes}
}

// The classes of generators, in the order in which they are written.
const (
	classNumber = iota // roots of numbers
	classConstant
	classScale // a
	classFunction
	classHubble // H
	classWave   // k
	classJet
	classFree
	classElementary
)

// rank is the place of a generator in a product.
type rank struct {
	class, order int
	gen          field.Gen
}

func (r rank) compare(s rank) int {
	return cmp.Or(cmp.Compare(r.class, s.class), cmp.Compare(r.order, s.order), cmp.Compare(r.gen, s.gen))
}

func rankOf(f *field.Field, g field.Gen) rank {
	in := f.Info(g)
	r := rank{gen: g}
	switch in.Kind {
	case field.Constant:
		r.class = classConstant
	case field.Wavenumber:
		r.class = classWave
	case field.Function:
		switch {
		case in.Order > 0:
			r.class, r.order, r.gen = classJet, in.Order, f.Base(g)
		case in.Name == "a":
			r.class = classScale
		case in.Name == "H":
			r.class = classHubble
		default:
			r.class = classFunction
		}
	case field.FreeFunction:
		r.class = classFree
		for _, n := range in.Index {
			r.order += n
		}
	case field.Root:
		r.class = classElementary
		if _, isNumber := in.Arg.Rat(); isNumber {
			r.class = classNumber
		}
	default:
		r.class = classElementary
	}
	return r
}

// highest is the place of a factor: that of its last generator.
func highest(f *field.Field, p poly.Poly) rank {
	var top rank
	for i, v := range p.Vars() {
		if r := rankOf(f, v); i == 0 || top.compare(r) < 0 {
			top = r
		}
	}
	return top
}
