package rules

// Curvature of the frame. Components are computed once, by the symmetries of the Riemann
// tensor, and contracted as asked.

// riemann is R_dcab with all indices lowered.
func (f *frame) riemann() tensor {
	if f.hasCurved {
		return f.curvature
	}
	f.curvature, f.hasCurved = newTensor(4), true
	for p := range pairs {
		for q := range p + 1 {
			d, c := pairs[p][0], pairs[p][1]
			a, b := pairs[q][0], pairs[q][1]
			r := f.riemannComponent(d, c, a, b)
			f.curvature.setPair(r, d, c, a, b)
			if p != q {
				f.curvature.setPair(r, a, b, d, c)
			}
		}
	}
	return f.curvature
}

// pairs are the index pairs in which the Riemann tensor is antisymmetric.
var pairs = [6][2]int{{0, 1}, {0, 2}, {0, 3}, {1, 2}, {1, 3}, {2, 3}}

func (t tensor) setPair(r quantity, d, c, a, b int) {
	t.set(r, d, c, a, b)
	t.set(r.neg(), c, d, a, b)
	t.set(r.neg(), d, c, b, a)
	t.set(r, c, d, b, a)
}

func (f *frame) riemannComponent(d, c, a, b int) quantity { return f.curvatureFrom(0, d, c, a, b) }

// curvatureFrom is a component of the curvature of the frame vectors from the given one on: 0
// for that of space-time, 1 for that of the slices.
func (f *frame) curvatureFrom(first, d, c, a, b int) quantity {
	g := f.connection
	r := f.e(a, g.at(d, b, c)).sub(f.e(b, g.at(d, a, c)))
	for s := first; s < 4; s++ {
		part := product(g.at(d, a, s), g.at(s, b, c)).sub(product(g.at(d, b, s), g.at(s, a, c)))
		// c_ab^s = Γ^s_ab − Γ^s_ba, the connection being without torsion
		part = part.sub(product(g.at(s, a, b).sub(g.at(s, b, a)), g.at(d, s, c)))
		if eta(s) < 0 {
			part = part.neg()
		}
		r = r.add(part)
	}
	return r
}

func product(a, b quantity) quantity {
	if a.isZero() || b.isZero() {
		return quantity{}
	}
	return a.mul(b)
}

// ricci is Ric_cb = R^a_cab.
func (f *frame) ricci() tensor { return f.trace(f.riemann(), 0, 2) }

// scalarCurvature is R.
func (f *frame) scalarCurvature() quantity { return f.trace(f.ricci(), 0, 1).scalar() }

// einstein is G_ab = Ric_ab − ½ g_ab R.
func (f *frame) einstein() tensor {
	out, r := newTensor(2), f.scalarCurvature().scale(f.k.Int(1).Scale(1, 2))
	ric := f.ricci()
	for a := range 4 {
		for b := range 4 {
			q := ric.at(a, b)
			if a == b {
				if eta(a) < 0 {
					q = q.add(r)
				} else {
					q = q.sub(r)
				}
			}
			out.set(q, a, b)
		}
	}
	return out
}

// weyl is C_abcd = R_abcd − ½(g_ac Ric_bd − g_ad Ric_bc − g_bc Ric_ad + g_bd Ric_ac)
// + ⅙R (g_ac g_bd − g_ad g_bc), in four dimensions.
func (f *frame) weyl() tensor {
	out, ric := newTensor(4), f.ricci()
	sixth := f.scalarCurvature().scale(f.k.Int(1).Scale(1, 6))
	half := f.k.Int(1).Scale(1, 2)
	signed := func(a, b int, q quantity) quantity { // g_ab q
		switch {
		case a != b:
			return quantity{}
		case eta(a) < 0:
			return q.neg()
		}
		return q
	}
	for _, p := range pairs {
		for _, q := range pairs {
			a, b, c, d := p[0], p[1], q[0], q[1]
			s := signed(a, c, ric.at(b, d)).sub(signed(a, d, ric.at(b, c))).
				sub(signed(b, c, ric.at(a, d))).add(signed(b, d, ric.at(a, c)))
			r := signed(a, c, signed(b, d, sixth)).sub(signed(a, d, signed(b, c, sixth)))
			out.setPair(f.riemann().at(a, b, c, d).sub(s.scale(half)).add(r), a, b, c, d)
		}
	}
	return out
}
