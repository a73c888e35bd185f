package rules

// Derivatives and series in the truncated ring over one background.

import (
	"slices"

	"remnant/expr/field"
)

// ring is the truncated ring over the background of a model.
type ring struct {
	k       *field.Field
	lapse   field.Elem // N̄
	hubble  field.Elem // the physical rate, a⁻¹ N̄⁻¹ da/dτ
	uniform bool       // perturbations do not depend on z
}

func newRing(k *field.Field, lapse, a field.Elem) *ring {
	r := &ring{k: k, lapse: lapse}
	r.hubble = r.rate(a).Div(a)
	return r
}

// rate is N̄⁻¹ d/dτ of a background value: the derivative by cosmic time on every clock.
func (r *ring) rate(c field.Elem) field.Elem {
	d := c.D()
	if d.IsZero() || r.lapse.IsOne() {
		return d
	}
	return d.Div(r.lapse)
}

func (r *ring) int(n int64) quantity { return background(r.k.Int(n)) }

// field is the perturbation field with the given number.
func (r *ring) field(i int) quantity {
	return quantity{lin: []linear{{newJet(i, 0, 0), r.k.Int(1)}}}
}

// dt is the derivative by cosmic time. A spatial derivative of a jet carries a⁻¹, of which the
// derivative is −H a⁻¹.
func (r *ring) dt(q quantity) quantity {
	out := quantity{bg: r.rate(q.bg)}
	lin := make([]linear, 0, 2*len(q.lin))
	for _, t := range q.lin {
		lin = append(lin, linear{t.j, r.comoving(t.c, t.j.space())}, linear{later(t.j), t.c})
	}
	out.lin = collectLinear(lin)
	quad := make([]quadratic, 0, 3*len(q.quad))
	for _, t := range q.quad {
		quad = append(quad,
			quadratic{t.i, t.j, r.comoving(t.c, t.i.space()+t.j.space())},
			ordered(later(t.i), t.j, t.c), ordered(t.i, later(t.j), t.c))
	}
	out.quad = collect(quad)
	return out
}

// comoving is a^n d/dt (c a⁻ⁿ).
func (r *ring) comoving(c field.Elem, n int) field.Elem {
	d := r.rate(c)
	if n == 0 || r.hubble.IsZero() {
		return d
	}
	return d.Sub(c.Mul(r.hubble).Scale(int64(n), 1))
}

func later(j jet) jet   { return newJet(j.field(), j.time()+1, j.space()) }
func farther(j jet) jet { return newJet(j.field(), j.time(), j.space()+1) }

func ordered(i, j jet, c field.Elem) quadratic { return quadratic{min(i, j), max(i, j), c} }

func collectLinear(ts []linear) []linear {
	slices.SortStableFunc(ts, compareLinear)
	out := ts[:0]
	for i := 0; i < len(ts); {
		t := ts[i]
		for i++; i < len(ts) && ts[i].j == t.j; i++ {
			t.c = t.c.Add(ts[i].c)
		}
		if !t.c.IsZero() {
			out = append(out, t)
		}
	}
	return out
}

// dz is a⁻¹∂_z.
func (r *ring) dz(q quantity) quantity {
	var out quantity
	if r.uniform {
		return out
	}
	for _, t := range q.lin {
		out.lin = append(out.lin, linear{farther(t.j), t.c})
	}
	slices.SortFunc(out.lin, compareLinear)
	quad := make([]quadratic, 0, 2*len(q.quad))
	for _, t := range q.quad {
		quad = append(quad, ordered(farther(t.i), t.j, t.c), ordered(t.i, farther(t.j), t.c))
	}
	out.quad = collect(quad)
	return out
}

// exp is the exponential of a quantity without background value.
func (r *ring) exp(q quantity) quantity {
	half := r.k.Int(1).Scale(1, 2)
	return r.int(1).add(q).add(q.mul(q).scale(half))
}

// inv is 1/q for a background value that is not zero.
func (r *ring) inv(q quantity) quantity {
	b := q.bg.Inv()
	d := q.perturbation().scale(b.Neg()) // 1/(b̄(1 − d)) = b̄⁻¹(1 + d + d²)
	return r.int(1).add(d).add(d.mul(d)).scale(b)
}

// pow is qⁿ for n of either sign.
func (r *ring) pow(q quantity, n int) quantity {
	if n < 0 {
		return r.pow(r.inv(q), -n)
	}
	out := r.int(1)
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			out = out.mul(q)
		}
		if n > 1 {
			q = q.mul(q)
		}
	}
	return out
}

// compose is f(q) to second order, from f, f′ and f″ at the background value.
func (r *ring) compose(q quantity, f, f1, f2 field.Elem) quantity {
	d := q.perturbation()
	return background(f).add(d.scale(f1)).add(d.mul(d).scale(f2.Scale(1, 2)))
}
