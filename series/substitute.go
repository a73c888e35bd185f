package series

// Change of the parameters: every weighted generator is replaced by a series in the same
// grading, as when one hierarchy of slow-roll parameters is written in another.
//
// What is known of the result follows from the first terms alone. If the first term of each
// replacement has the weight of what it replaces, and these first terms are algebraically
// independent, then the map of first terms is injective, a homogeneous part of weight n goes
// to a series that starts at n exactly, and the order of truncation stays. Without
// independence a denominator ε + η could start later than its weight, and nothing could be
// said of the rest. In characteristic 0 independence is a Jacobian determinant ≠ 0.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/poly"
)

// Replacement is a weighted generator with the series that takes its place.
type Replacement struct {
	Gen field.Gen
	By  Series
}

// Substitute replaces weighted generators in s by series, all at once, truncated at order.
// The parts of s must be rational in the weighted generators: no roots or functions of them,
// and none of their jets. The relations are not asked whether the replacement is true on the
// background.
func (s Series) Substitute(rs []Replacement, order int) (Series, error) {
	by := map[field.Gen]Series{}
	for _, r := range rs {
		s.with(r.By)
		if w, ok := s.g.weighted(r.Gen); !ok || r.By.IsZero() || r.By.val != w {
			return Series{}, fmt.Errorf("%v is replaced by %v, which does not start at the same order", s.g.f.Raw(r.Gen), r.By)
		}
		if _, twice := by[r.Gen]; twice {
			return Series{}, fmt.Errorf("%v is replaced twice", s.g.f.Raw(r.Gen))
		}
		by[r.Gen] = r.By
	}
	if !s.g.independent(rs) {
		return Series{}, fmt.Errorf("the first terms of the replacements depend on each other")
	}
	support := s.support
	for _, r := range rs {
		support = union(support, r.By.support)
	}
	sum := s.g.Zero(s.order)
	for _, c := range s.coefs {
		t, err := s.g.replace(c, by, min(s.order, order))
		if err != nil {
			return Series{}, err
		}
		sum = sum.Add(t)
	}
	sum.support = support
	return sum.Truncate(order), nil
}

// replace substitutes in one part.
func (g *Grading) replace(c field.Elem, by map[field.Gen]Series, order int) (Series, error) {
	num, err := g.replacePoly(c.Num(), by)
	if err != nil {
		return Series{}, err
	}
	d, err := g.replacePoly(c.Den(), by)
	if err != nil {
		return Series{}, err
	}
	return num.Div(d, order)
}

func (g *Grading) replacePoly(p poly.Poly, by map[field.Gen]Series) (Series, error) {
	sum := g.Zero(Exact)
	for mono, c := range p.Terms() {
		var rest []poly.Power
		t := g.Int(1)
		for _, m := range mono {
			r, ok := by[m.Var]
			if !ok {
				if _, own := g.weights[m.Var]; !own && g.involved(m.Var) {
					return Series{}, fmt.Errorf("%v depends on the replaced parameters", g.f.Raw(m.Var))
				}
				rest = append(rest, m)
				continue
			}
			power, err := r.Pow(int(m.Exp), Exact)
			if err != nil {
				return Series{}, err
			}
			t = t.Mul(power)
		}
		sum = sum.Add(t.Mul(g.sorted(poly.FromTerms([]poly.Term{{Coef: c, Mono: rest}}))))
	}
	return sum, nil
}

// independent reports whether the first terms of the replacements, with the other weighted
// generators as they are, are algebraically independent.
func (g *Grading) independent(rs []Replacement) bool {
	jacobian := make([][]field.Elem, len(rs))
	for i, r := range rs {
		jacobian[i] = make([]field.Elem, len(rs))
		for j, x := range rs {
			jacobian[i][j] = g.partial(r.By.coefs[0], x.Gen)
		}
	}
	return !oper.Det(g.f, jacobian).IsZero()
}

// partial is ∂e/∂x up to the square of the denominator of e.
func (g *Grading) partial(e field.Elem, x field.Gen) field.Elem {
	num, den := e.Num(), e.Den()
	return g.elem(num.Deriv(x)).Mul(g.elem(den)).Sub(g.elem(num).Mul(g.elem(den.Deriv(x))))
}
