package rules

// The orthonormal frame of the planar geometry
//
//	ds² = −N²dτ² + b₁²(dx + Nˣdτ + w(dz + Nᶻdτ))² + b₂²dy² + b₃²(dz + Nᶻdτ)²
//
// with functions of τ and z: e₀ = N⁻¹(∂_τ − Nˣ∂_x − Nᶻ∂_z), e₁ = b₁⁻¹∂_x, e₂ = b₂⁻¹∂_y,
// e₃ = b₃⁻¹(∂_z − w∂_x). Scalars, one vector polarisation (Nˣ, w) and one tensor polarisation
// (b₁ against b₂) fit in it. From [e_a, e_b] = c_ab^c e_c follow the connection by Koszul's
// formula, Γ_cab = g(e_c, ∇_a e_b) = ½(c_abc − c_acb − c_bca), and the curvature,
// R^d_cab = e_a Γ^d_bc − e_b Γ^d_ac + Γ^d_af Γ^f_bc − Γ^d_bf Γ^f_ac − c_ab^f Γ^d_fc, with
// Ric_cb = R^a_cab, positive on de Sitter (Wald 1984, section 3.4b).

// eta is the sign of the frame's metric.
func eta(a int) int {
	if a == 0 {
		return -1
	}
	return 1
}

// frame is the geometry of one gauge and sector.
type frame struct {
	*ring
	invLapse quantity // N̄/N
	drift    quantity // N̄⁻¹ a Nᶻ
	invB3    quantity // a/b₃
	volume   quantity // √−g / (N̄a³)

	connection tensor // Γ_cab as [c][a][b], last index lowered
	curvature  tensor // R_dcab, filled when first asked for
	hasCurved  bool
}

// shape gives the frame's functions; logarithms are of bᵢ/a, without background values.
type shape struct {
	logB1, logB2, logB3 quantity
	lapse               quantity // N/N̄
	drift               quantity // N̄⁻¹ a Nᶻ
	slide               quantity // N̄⁻¹ a Nˣ
	shear               quantity // w
}

func newFrame(r *ring, s shape) *frame {
	f := &frame{ring: r}
	f.invLapse = r.inv(s.lapse)
	f.drift = s.drift
	f.invB3 = r.exp(s.logB3.neg())
	f.volume = s.lapse.mul(r.exp(s.logB1.add(s.logB2).add(s.logB3)))
	f.connect(s)
	return f
}

// e is the derivative along frame vector a.
func (f *frame) e(a int, q quantity) quantity {
	switch a {
	case 0:
		d := f.dt(q)
		if !f.drift.isZero() {
			d = d.sub(f.drift.mul(f.dz(q)))
		}
		return f.invLapse.mul(d)
	case 3:
		return f.invB3.mul(f.dz(q))
	}
	return quantity{}
}

// connect finds the structure coefficients and from them the connection.
func (f *frame) connect(s shape) {
	h := background(f.hubble)
	var c [4][4][4]quantity // c[a][b][d] = c_ab^d
	set := func(a, b, d int, q quantity) {
		c[a][b][d] = q
		c[b][a][d] = q.neg()
	}
	set(0, 1, 1, f.expansion(h, s.logB1).neg())
	set(0, 2, 2, f.expansion(h, s.logB2).neg())
	inflow := f.invLapse.mul(f.dz(s.drift)) // N⁻¹ ∂_z Nᶻ
	set(0, 3, 3, inflow.sub(f.expansion(h, s.logB3)))
	// e₃ log N: from N/N̄ itself, so that the lapse may be 1 + A
	set(0, 3, 0, f.invLapse.mul(f.e(3, s.lapse)))
	ratio := f.exp(s.logB1.sub(s.logB3))
	slide := f.invLapse.mul(f.dz(s.slide).add(s.shear.mul(f.dz(s.drift))))
	set(0, 3, 1, ratio.mul(slide.sub(f.e(0, s.shear))))
	set(3, 1, 1, f.e(3, s.logB1).neg())
	set(3, 2, 2, f.e(3, s.logB2).neg())

	f.connection = newTensor(3)
	half := f.k.Int(1).Scale(1, 2)
	low := func(a, b, d int) quantity {
		if eta(d) < 0 {
			return c[a][b][d].neg()
		}
		return c[a][b][d]
	}
	for d := range 4 {
		for a := range 4 {
			for b := range 4 {
				g := low(a, b, d).sub(low(a, d, b)).sub(low(b, d, a))
				f.connection.set(g.scale(half), d, a, b)
			}
		}
	}
}

// expansion is e₀ log b for b = a·exp(logB): the rate at which that direction expands.
func (f *frame) expansion(h, logB quantity) quantity {
	return f.invLapse.mul(h).add(f.e(0, logB))
}
