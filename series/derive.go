package series

// The derivation. On a part of weight n it acts by Σ (∂/∂g) D g over the generators, and
// ∂/∂g takes the weight of g away; so D raises or lowers weights by at least
//
//	σ = min over the generators g of v(D g) − w(g).
//
// For ε' = εηH it is 0, and nothing is lost; for ε' = H it is −1, and a series known below
// order n has a derivative known below n − 1 only. The minimum goes over the generators that
// the unknown rest may hold.

import "remnant/expr/field"

// D is the time derivative of s modulo the relations, truncated at order. It fails with
// *Endless if s and order are exact but the derivative does not end.
func (s Series) D(order int) (Series, error) {
	g := s.g
	known := s.order
	support := s.support
	for _, c := range s.coefs {
		support = union(support, g.baseGens(c))
	}
	after := support
	for _, x := range support {
		dx := g.f.Raw(x).D()
		if dx.IsZero() {
			continue
		}
		after = union(after, g.baseGens(dx))
		if s.order == Exact {
			continue
		}
		v, err := g.elemValuation(dx)
		if err != nil {
			return Series{}, err
		}
		known = min(known, shift(s.order, v-g.gradeOf(x).weight))
	}
	sum := g.Zero(known)
	for _, c := range s.coefs {
		d, err := g.expand(c.D(), min(known, order))
		if err != nil {
			return Series{}, err
		}
		sum = sum.Add(d)
	}
	sum.support = after
	return sum.Truncate(order), nil
}

// elemValuation is the weight of the first term of e ≠ 0.
func (g *Grading) elemValuation(e field.Elem) (int, error) {
	total, err := g.valuation(e.Num())
	if err != nil {
		return 0, err
	}
	den := e.Den()
	v, err := g.valuation(den)
	return total - v, err
}
