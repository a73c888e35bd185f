package reduce

// The choice of the next pivot: a field of order 0 on the diagonal, or a multiplier with a
// partner to which it is joined without derivatives. The kept field is no pivot. Of several,
// the one whose determinant has the fewest terms; of these a pair before a single field, since
// it removes two under one condition, and a partner without dynamics of its own before one that
// has them, whose derivatives would move into the other fields; then the lowest degree; then
// the first as declared. The choice is deterministic.

import "remnant/expr/field"

// pivot is a field p, or a multiplier p with its partner q (q = −1: none).
type pivot struct {
	p, q   int
	terms  int
	order  int // of the partner's diagonal entry
	degree int
}

func (a pivot) before(b pivot) bool {
	switch {
	case a.terms != b.terms:
		return a.terms < b.terms
	case (a.q < 0) != (b.q < 0):
		return a.q >= 0
	case a.order != b.order:
		return a.order < b.order
	case a.degree != b.degree:
		return a.degree < b.degree
	case a.p != b.p:
		return a.p < b.p
	}
	return a.q < b.q
}

// choosePivot finds the best pivot that does not involve the field keep (−1: any may go).
func (s System) choosePivot(keep int) (pivot, bool) {
	all := s.pivots(keep)
	if len(all) == 0 {
		return pivot{}, false
	}
	best := all[0]
	for _, p := range all[1:] {
		if p.before(best) {
			best = p
		}
	}
	return best, true
}

// pivots lists every pivot that does not involve the field keep.
func (s System) pivots(keep int) []pivot {
	var all []pivot
	for p := range s.Names {
		if p == keep {
			continue
		}
		switch d := s.D.At(p, p); d.Order() {
		case 0:
			all = append(all, pivot{p, -1, d.Coef(0).Num().Len(), 0, d.Coef(0).Num().TotalDegree()})
		case -1:
			for q := range s.Names {
				if q != keep && q != p && s.D.At(p, q).Order() == 0 {
					all = append(all, s.pairPivot(p, q, s.D.At(p, q).Coef(0)))
				}
			}
		}
	}
	return all
}

// pairPivot rates the determinant −c² of the block; its terms are those of a square.
func (s System) pairPivot(p, q int, c field.Elem) pivot {
	n := c.Num().Len()
	return pivot{p, q, n * (n + 1) / 2, max(s.D.At(q, q).Order(), 0), 2 * c.Num().TotalDegree()}
}
