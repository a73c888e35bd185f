package rules

// From the expanded Lagrangian density to the background equations and to the terms of the
// quadratic form.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
)

// euler is the Euler–Lagrange expression of the perturbation u in the linear part of the
// density, at k = 0: Σ (D_tⁱ)† applied to the coefficient. Terms with spatial derivatives are
// total derivatives. density is N̄a³.
func (r *ring) euler(l quantity, u int, density field.Elem) field.Elem {
	var sum field.Elem
	for _, t := range l.lin {
		if t.j.field() == u && t.j.space() == 0 {
			op := r.clockDerivative(t.j.time()).Scale(density.Mul(t.c))
			sum = sum.Add(op.Adjoint().Coef(0))
		}
	}
	return sum
}

// clockDerivative is (N̄⁻¹D)ⁿ as an operator in D.
func (r *ring) clockDerivative(n int) oper.Oper {
	out := oper.New(r.k.Int(1))
	inv := r.k.Int(1).Div(r.lapse)
	for range n {
		out = out.D().Scale(inv)
	}
	return out
}

// terms turns the quadratic part of the density into terms of the quadratic form on the
// model's clock; a is the scale factor, density N̄a³.
func (r *ring) terms(l quantity, a, density field.Elem) []parse.Term {
	var out []parse.Term
	for _, t := range l.quad {
		c := density.Mul(t.c).Mul(a.Pow(-t.i.space() - t.j.space()))
		left, right := r.clockDerivative(t.i.time()), r.clockDerivative(t.j.time())
		for n := 0; n <= left.Order(); n++ {
			for m := 0; m <= right.Order(); m++ {
				cc := c.Mul(left.Coef(n)).Mul(right.Coef(m))
				if cc.IsZero() {
					continue
				}
				out = append(out, parse.Term{
					Coef: cc,
					U:    parse.Factor{Field: t.i.field(), Time: n, Space: t.i.space()},
					V:    parse.Factor{Field: t.j.field(), Time: m, Space: t.j.space()},
				})
			}
		}
	}
	return out
}
