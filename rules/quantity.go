package rules

// The truncated ring: a background value, terms linear and terms quadratic in the jets of
// the perturbation fields, coefficients in K, everything of third order dropped. Terms are
// sorted by jet, none has a zero coefficient, and the two jets of a quadratic term are in
// order.

import (
	"cmp"
	"slices"

	"remnant/expr/field"
)

// jet is a derivative of a perturbation: (a⁻¹∂_z)^space (N̄⁻¹∂_τ)^time of a field. Each spatial
// derivative carries a⁻¹, each time derivative N̄⁻¹, so that neither a nor N̄ stands in the
// coefficients of the geometry.
type jet uint32

func newJet(fieldIndex, time, space int) jet {
	return jet(fieldIndex<<16 | time<<8 | space)
}

func (j jet) field() int { return int(j >> 16) }
func (j jet) time() int  { return int(j >> 8 & 0xff) }
func (j jet) space() int { return int(j & 0xff) }

type linear struct {
	j jet
	c field.Elem
}

type quadratic struct {
	i, j jet // i ≤ j
	c    field.Elem
}

// quantity is an element of the truncated ring. The zero value is 0.
type quantity struct {
	bg   field.Elem
	lin  []linear
	quad []quadratic
}

func (q quantity) isZero() bool {
	return q.bg.IsZero() && len(q.lin) == 0 && len(q.quad) == 0
}

// isConstant reports whether q is a background value.
func (q quantity) isBackground() bool { return len(q.lin) == 0 && len(q.quad) == 0 }

func background(c field.Elem) quantity { return quantity{bg: c} }

// mapCoefs applies fn to every coefficient.
func (q quantity) mapCoefs(fn func(field.Elem) field.Elem) quantity {
	out := quantity{bg: fn(q.bg)}
	for _, t := range q.lin {
		if c := fn(t.c); !c.IsZero() {
			out.lin = append(out.lin, linear{t.j, c})
		}
	}
	for _, t := range q.quad {
		if c := fn(t.c); !c.IsZero() {
			out.quad = append(out.quad, quadratic{t.i, t.j, c})
		}
	}
	return out
}

func (q quantity) neg() quantity { return q.mapCoefs(field.Elem.Neg) }

func (q quantity) scale(c field.Elem) quantity {
	if c.IsZero() {
		return quantity{}
	}
	if c.IsOne() {
		return q
	}
	return q.mapCoefs(c.Mul)
}

func (q quantity) add(r quantity) quantity {
	return quantity{
		bg: q.bg.Add(r.bg),
		lin: merge(q.lin, r.lin, compareLinear,
			func(a, b linear) (linear, bool) { c := a.c.Add(b.c); return linear{a.j, c}, !c.IsZero() }),
		quad: merge(q.quad, r.quad, compareQuadratic,
			func(a, b quadratic) (quadratic, bool) { c := a.c.Add(b.c); return quadratic{a.i, a.j, c}, !c.IsZero() }),
	}
}

func (q quantity) sub(r quantity) quantity { return q.add(r.neg()) }

func compareLinear(a, b linear) int { return cmp.Compare(a.j, b.j) }

func compareQuadratic(a, b quadratic) int {
	return cmp.Or(cmp.Compare(a.i, b.i), cmp.Compare(a.j, b.j))
}

// merge joins two sorted lists; join adds two terms of one monomial, and is false for zero.
func merge[T any](a, b []T, order func(a, b T) int, join func(a, b T) (T, bool)) []T {
	if len(a) == 0 {
		return b
	}
	if len(b) == 0 {
		return a
	}
	out := make([]T, 0, len(a)+len(b))
	i, j := 0, 0
	for i < len(a) && j < len(b) {
		switch d := order(a[i], b[j]); {
		case d < 0:
			out = append(out, a[i])
			i++
		case d > 0:
			out = append(out, b[j])
			j++
		default:
			if t, ok := join(a[i], b[j]); ok {
				out = append(out, t)
			}
			i, j = i+1, j+1
		}
	}
	return append(append(out, a[i:]...), b[j:]...)
}

// mul is the product without its terms of third and fourth order.
func (q quantity) mul(r quantity) quantity {
	if q.isBackground() {
		return r.scale(q.bg)
	}
	if r.isBackground() {
		return q.scale(r.bg)
	}
	out := quantity{quad: outer(q.lin, r.lin)}
	return out.add(q.scale(r.bg)).add(r.perturbation().scale(q.bg))
}

// outer is the product of two linear parts.
func outer(a, b []linear) []quadratic {
	if len(a) == 0 || len(b) == 0 {
		return nil
	}
	out := make([]quadratic, 0, len(a)*len(b))
	for _, s := range a {
		for _, t := range b {
			out = append(out, quadratic{min(s.j, t.j), max(s.j, t.j), s.c.Mul(t.c)})
		}
	}
	return collect(out)
}

// collect sorts quadratic terms and adds those of one monomial.
func collect(ts []quadratic) []quadratic {
	slices.SortStableFunc(ts, compareQuadratic)
	out := ts[:0]
	for i := 0; i < len(ts); {
		t := ts[i]
		for i++; i < len(ts) && compareQuadratic(ts[i], t) == 0; i++ {
			t.c = t.c.Add(ts[i].c)
		}
		if !t.c.IsZero() {
			out = append(out, t)
		}
	}
	return out
}

// perturbation is q without its background value.
func (q quantity) perturbation() quantity { return quantity{lin: q.lin, quad: q.quad} }
