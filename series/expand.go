package series

// From an element of the field to its series. Numerator and denominator are polynomials;
// where all their generators are homogeneous they are sorted by weight, and the denominator's
// factors are inverted one by one. Roots and functions of arguments that are not homogeneous
// are expanded first, to the precision that the result needs: valuations are found before,
// so that nothing is expanded twice.

import (
	"fmt"
	"slices"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// maxSearch bounds the search for the first term of a numerator that holds expanded roots or
// functions, in weights above the lowest that could occur.
const maxSearch = 64

// Expand is the series of e, with everything of weight order and above left out. Where e
// ends below order the result is exact. It fails where e has no Laurent series in λ: the
// root of an odd power of a small parameter, exp(1/ε), a free function of small parameters.
func (g *Grading) Expand(e field.Elem, order int) (Series, error) {
	e, err := e.Normal()
	if err != nil {
		return Series{}, err
	}
	s, err := g.expand(e, order)
	if err != nil {
		return Series{}, err
	}
	s.support = g.baseGens(e)
	return s, nil
}

// ExpandAll expands each element of a list, such as the coefficients of a normal form.
func (g *Grading) ExpandAll(es []field.Elem, order int) ([]Series, error) {
	out := make([]Series, len(es))
	for i, e := range es {
		s, err := g.Expand(e, order)
		if err != nil {
			return nil, err
		}
		out[i] = s
	}
	return out, nil
}

func (g *Grading) expand(e field.Elem, order int) (Series, error) {
	if e.IsZero() {
		return g.Zero(Exact), nil
	}
	if w, ok := g.elemGrade(e); ok {
		return g.make(w, []field.Elem{e}, Exact, nil).Truncate(order), nil
	}
	if w, ok := g.polyGrade(e.Den()); ok {
		num, err := g.expandPoly(e.Num(), shift(order, w))
		if err != nil {
			return Series{}, err
		}
		inv := g.elem(e.Den()).Inv()
		return num.Mul(g.make(-w, []field.Elem{inv}, Exact, nil)).Truncate(order), nil
	}
	return g.expandFraction(e.Num(), g.denominator(e), order)
}

// denominator lists the factors of the denominator of e, exponents negative.
func (g *Grading) denominator(e field.Elem) []field.FactorPower {
	content, fs := g.elem(e.Den()).Inv().Factors()
	if content.Num().IsInt64() && content.Num().Int64() == 1 && content.IsInt() {
		return fs
	}
	return append(fs, field.FactorPower{P: poly.FromBig(content.Denom()), Exp: -1})
}

// expandFraction expands a numerator over factors. With v the valuation of the whole, each
// part is needed to order−v weights from its own first term on.
func (g *Grading) expandFraction(num poly.Poly, den []field.FactorPower, order int) (Series, error) {
	parts := append([]field.FactorPower{{P: num, Exp: 1}}, den...)
	vals := make([]int, len(parts))
	total := 0
	for i, p := range parts {
		v, err := g.valuation(p.P)
		if err != nil {
			return Series{}, err
		}
		vals[i] = v
		total += v * p.Exp
	}
	if order == Exact {
		return Series{}, &Endless{}
	}
	weights := order - total
	if weights <= 0 {
		return g.Zero(order), nil
	}
	out := g.Int(1)
	for i, p := range parts {
		s, err := g.expandPoly(p.P, vals[i]+weights)
		if err != nil {
			return Series{}, err
		}
		s, err = s.Pow(p.Exp, vals[i]*p.Exp+weights)
		if err != nil {
			return Series{}, err
		}
		out = out.Mul(s)
	}
	return out.Truncate(order), nil
}

// valuation is the weight of the first term of p ≠ 0.
func (g *Grading) valuation(p poly.Poly) (int, error) {
	low, homogeneous, err := g.lowest(p)
	if err != nil || homogeneous {
		return low, err
	}
	for n := 1; n <= maxSearch; n *= 2 {
		s, err := g.expandPoly(p, low+n)
		if err != nil {
			return 0, err
		}
		if !s.IsZero() {
			return s.val, nil
		}
		if s.order == Exact {
			break
		}
	}
	return 0, fmt.Errorf("no term of %v is found up to order %d", g.elem(p), low+maxSearch)
}

// lowest is a lower bound of the weights in p, and whether all its generators are
// homogeneous; then the bound is reached.
func (g *Grading) lowest(p poly.Poly) (low int, homogeneous bool, err error) {
	homogeneous = true
	starts := map[field.Gen]int{}
	for _, x := range p.Vars() {
		if gr := g.gradeOf(x); gr.homogeneous {
			starts[x] = gr.weight
			continue
		}
		homogeneous = false
		if starts[x], err = g.start(x); err != nil {
			return 0, false, err
		}
	}
	first := true
	for mono := range p.Terms() {
		w := 0
		for _, m := range mono {
			w += starts[m.Var] * int(m.Exp)
		}
		if first || w < low {
			low, first = w, false
		}
	}
	return low, homogeneous, nil
}

// start is a lower bound of the weights in the root or function x that is to be expanded.
func (g *Grading) start(x field.Gen) (int, error) {
	in := g.f.Info(x)
	switch {
	case in.Kind == field.Root && in.Name != "cos":
		v, err := g.valuation(in.Arg.Num())
		return v >> 1, err // a half is refused when it is expanded
	case in.Kind == field.Root, in.Kind == field.Elementary:
		return 0, nil
	}
	return 0, fmt.Errorf("the free function %s depends on the parameters of the series", in.Name)
}

// expandPoly is the series of p to the given order: its terms are grouped by their powers of
// the generators that have to be expanded.
func (g *Grading) expandPoly(p poly.Poly, order int) (Series, error) {
	low, homogeneous, err := g.lowest(p)
	if err != nil {
		return Series{}, err
	}
	if homogeneous {
		return g.sorted(p).Truncate(order), nil
	}
	if order == Exact {
		return Series{}, &Endless{}
	}
	list := groupTerms(p, func(x field.Gen) bool { return !g.gradeOf(x).homogeneous })
	expanded := map[field.Gen]Series{}
	sum := g.Zero(Exact)
	for _, sp := range list {
		s := g.sorted(poly.FromTerms(sp.rest))
		for _, m := range sp.own {
			t, ok := expanded[m.Var]
			if !ok {
				if t, err = g.expandGen(m.Var, order-low); err != nil {
					return Series{}, err
				}
				expanded[m.Var] = t
			}
			if t, err = t.Pow(int(m.Exp), Exact); err != nil {
				return Series{}, err
			}
			s = s.Mul(t)
		}
		sum = sum.Add(s)
	}
	return sum.Truncate(order), nil
}

// group is a product of powers with the polynomial that multiplies it.
type group struct {
	own  []poly.Power
	rest []poly.Term
}

// groupTerms collects the terms of p by their powers of the generators that own tells, in
// the order of their first terms.
func groupTerms(p poly.Poly, own func(field.Gen) bool) []*group {
	found := map[string]*group{}
	var list []*group
	for mono, c := range p.Terms() {
		var mine, rest []poly.Power
		for _, m := range mono {
			if own(m.Var) {
				mine = append(mine, m)
			} else {
				rest = append(rest, m)
			}
		}
		key := fmt.Sprint(mine)
		if found[key] == nil {
			found[key] = &group{own: mine}
			list = append(list, found[key])
		}
		found[key].rest = append(found[key].rest, poly.Term{Coef: c, Mono: rest})
	}
	return list
}

// sorted is the exact series of a polynomial in homogeneous generators.
func (g *Grading) sorted(p poly.Poly) Series {
	byWeight := map[int][]poly.Term{}
	var weights []int
	for mono, c := range p.Terms() {
		w, _ := g.monoGrade(mono)
		if byWeight[w] == nil {
			weights = append(weights, w)
		}
		byWeight[w] = append(byWeight[w], poly.Term{Coef: c, Mono: slices.Clone(mono)})
	}
	if len(weights) == 0 {
		return g.Zero(Exact)
	}
	val := slices.Min(weights)
	coefs := make([]field.Elem, slices.Max(weights)-val+1)
	for w, terms := range byWeight {
		coefs[w-val] = g.elem(poly.FromTerms(terms))
	}
	return g.make(val, coefs, Exact, nil)
}

// expandGen is the series of a root or function, to n weights from its first possible one.
func (g *Grading) expandGen(x field.Gen, n int) (Series, error) {
	in := g.f.Info(x)
	start, err := g.start(x)
	if err != nil {
		return Series{}, err
	}
	name, arg := in.Name, in.Arg
	order := start + n
	argOrder := order
	switch {
	case name == "cos":
		arg = in.Angle
	case name == "sqrt":
		argOrder = 2*start + n + 1 // the radicand starts at 2·start, or is refused
	}
	if arg, err = arg.Normal(); err != nil {
		return Series{}, err
	}
	s, err := g.expand(arg, argOrder)
	if err != nil {
		return Series{}, err
	}
	return s.Elementary(name, order)
}

// baseGens lists the generators in e, those inside roots and functions too, but not the
// roots and functions themselves.
func (g *Grading) baseGens(e field.Elem) []field.Gen {
	var out []field.Gen
	for _, x := range e.Gens() {
		switch in := g.f.Info(x); in.Kind {
		case field.Root, field.Elementary:
			arg := in.Arg
			if in.Name == "cos" {
				arg = in.Angle
			}
			out = append(out, g.baseGens(arg)...)
		default:
			out = append(out, x)
		}
	}
	slices.Sort(out)
	return slices.Compact(out)
}
