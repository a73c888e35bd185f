package reduce

// A multiplier that meets two or more fields through their velocities,
// λ(c₁φ₁′ + c₂φ₂′ + …). The leading matrix may be regular, and yet λ can be solved: the shift
// φ₁ → φ₁ − (c₂/c₁)φ₂, which has no derivatives, leaves φ₂ without its velocity in the constraint,
// and λ and φ₂ are then solved together. It is a congruence with a unimodular matrix, so that
// Det 𝒟 stays. In a higher-order theory without degeneracy this leaves one field of higher
// order, whose extra mode is then named. Each use takes a velocity out of the row of λ or makes a
// pivot, so it ends.

import "remnant/expr/field"

// velocityConstraint finds such a multiplier. The vector v is 1 at the field q that loses its
// velocity, which is not the kept one, and −c_q/c at the field that is shifted.
func (s System) velocityConstraint(keep int) (v []field.Elem, q int, ok bool) {
	for l := range s.Names {
		if l == keep || !s.D.At(l, l).IsZero() {
			continue
		}
		var moving []int
		highest := 0
		for j := range s.Names {
			highest = max(highest, s.D.At(l, j).Order())
			if s.D.At(l, j).Order() == 1 {
				moving = append(moving, j)
			}
		}
		if highest != 1 || len(moving) < 2 {
			continue
		}
		base := moving[len(moving)-1]
		for _, j := range moving {
			if j == keep {
				base = j
			}
		}
		for _, q := range moving {
			if q != base {
				v = make([]field.Elem, len(s.Names))
				v[q] = s.K.Int(1)
				v[base] = s.D.At(l, q).Lead().Div(s.D.At(l, base).Lead()).Neg().Lowest()
				return v, q, true
			}
		}
	}
	return nil, 0, false
}
