package oper

import "remnant/expr/field"

// Add is a + b.
func (a Oper) Add(b Oper) Oper {
	if len(a.c) < len(b.c) {
		a, b = b, a
	}
	out := append([]field.Elem(nil), a.c...)
	for i, c := range b.c {
		out[i] = out[i].Add(c)
	}
	return New(out...)
}

// Neg is −a.
func (a Oper) Neg() Oper { return a.Map(field.Elem.Neg) }

// Sub is a − b.
func (a Oper) Sub(b Oper) Oper { return a.Add(b.Neg()) }

// Scale is c·a, the coefficient on the left.
func (a Oper) Scale(c field.Elem) Oper {
	if c.IsZero() {
		return Oper{}
	}
	return a.Map(c.Mul)
}

// D is the product D·a.
func (a Oper) D() Oper {
	if a.IsZero() {
		return a
	}
	out := make([]field.Elem, len(a.c)+1)
	for i, c := range a.c {
		out[i] = out[i].Add(c.D())
		out[i+1] = c
	}
	return New(out...)
}

// Mul is the product a·b, by Leibniz: Σ aᵢ Dⁱ b.
func (a Oper) Mul(b Oper) Oper {
	if a.IsZero() || b.IsZero() {
		return Oper{}
	}
	sum := b.Scale(a.c[0])
	for _, c := range a.c[1:] {
		b = b.D()
		if !c.IsZero() {
			sum = sum.Add(b.Scale(c))
		}
	}
	return sum
}

// Adjoint is a† = Σ (−D)ⁱ cᵢ, by Horner's rule: ∫ u·a v = ∫ (a†u)·v.
func (a Oper) Adjoint() Oper {
	var out Oper
	for i := len(a.c) - 1; i >= 0; i-- {
		out = out.D().Neg().Add(New(a.c[i]))
	}
	return out
}
