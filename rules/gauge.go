package rules

// Gauges and sectors: which perturbations there are, and the frame that they make.
//
// N = N̄(1 + A), N_i = ∂_iB, h_ij = a²[exp(2ζδ + 2∂∂E + γ)]_ij, φ = φ̄ + δφ; vectors N_i = S_i and
// h_ij ∋ ∂_iW_j + ∂_jW_i, transverse; tensors γ_ij transverse and traceless. The complete gauges
// are unitary, δφ = E = 0, which needs φ′ ≠ 0; flat, ζ = E = 0, which needs H ≠ 0; and newtonian,
// B = E = 0; for vectors W = 0. They fix the gauge completely for k ≠ 0 and may therefore be
// imposed in the action; an incomplete gauge may not (Motohashi, Suyama, Takahashi 2016,
// arXiv:1608.00071).

import (
	"remnant/expr/field"
)

// geometry builds the frame of the sector from the perturbations that names lists.
func geometry(r *ring, names []string, a field.Elem) *frame {
	pert := func(name string) quantity {
		for i, n := range names {
			if n == name {
				return r.field(i)
			}
		}
		return quantity{}
	}
	s := shape{lapse: r.int(1).add(pert("A"))}
	perLapse := r.k.Int(1).Div(r.lapse)
	zeta := pert("zeta")
	s.logB1, s.logB2, s.logB3 = zeta, zeta, zeta
	if e := pert("E"); !e.isZero() {
		s.logB3 = s.logB3.add(r.dz(r.dz(e)).scale(a.Mul(a)))
	}
	if b := pert("B"); !b.isZero() { // N^z = h^zz ∂_zB
		s.drift = r.exp(s.logB3.scale(r.k.Int(-2))).mul(r.dz(b)).scale(perLapse)
	}
	if v := pert("S"); !v.isZero() {
		s.slide = v.scale(perLapse.Div(a))
	}
	if w := pert("W"); !w.isZero() {
		s.shear = r.dz(w).scale(a)
	}
	if g := pert("gamma"); !g.isZero() {
		half := g.scale(r.k.Int(1).Scale(1, 2))
		s.logB1, s.logB2 = half, half.neg()
	}
	return newFrame(r, s)
}
