package reduce

// Quantities for the page and for programs that follow from a result.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/rules"
)

// Frame2 is (a/N̄)², which takes a ratio of coefficients to the conformal clock.
func (r *Result) Frame2() field.Elem { return r.Model.A.Div(r.Model.Lapse).Pow(2) }

// Frequency2 is −(a²/N̄²)q₀/q₁, which is c_s²k² + a²ℳ/(N̄²𝒦) where 𝒢 and ℳ exist: with the primes
// d/dη the canonical variable v obeys v″ + (Frequency2 − z″/z) v = 0. It is false unless one
// field of second order remains.
func (r *Result) Frequency2() (field.Elem, bool) {
	if r.Single == nil || len(r.Single.Q) != 2 {
		return field.Elem{}, false
	}
	q := r.Single.Q
	return q[0].Neg().Div(q[1]).Mul(r.Frame2()).Lowest(), true
}

// DefinitionSum is the expression by which the model defines the new variable that it keeps;
// nil if it keeps a field, or does not choose.
func (r *Result) DefinitionSum() []Addend {
	m := r.Model
	if m.Keep == nil || m.Keep.Definition == nil {
		return nil
	}
	var out []Addend
	for _, t := range m.Keep.Definition {
		c := t.Coef.Mul(rules.Fourier(m.Wavenumber, t.U.Space, 0))
		out = append(out, Addend{oper.Mono(c, t.U.Time), m.Fields[t.U.Field].Name})
	}
	return out
}
