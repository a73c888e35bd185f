package reduce

// A new variable that holds the velocity, u = A x + B x′ of the mode x that propagates. No
// field can be solved for to leave u, yet u carries the mode: with p = q₁x′ it is a canonical
// coordinate, since x and p are fixed by u and x.
//
// L = ½q₁x′² + ½q₀x² is L = p x′ − p²/(2q₁) + ½q₀x² with p an auxiliary field. Put x = −(B/q₁)P
// and p = (q₁/B)u + A P: an invertible change without derivatives, so that Det 𝒟 only gains a
// unit. P then stands without derivatives on the diagonal, by the antisymmetry of p x′ − x p′,
// and is solved like any auxiliary field. What is left is the action of u alone. The step does
// not apply where B vanishes (u is then a rescaled x) or where P drops out of its own
// equation.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
	"remnant/rules"
)

// exchange keeps the defined variable u of the model in place of the one field that the
// elimination free left; false if that is not possible.
func exchange(m *parse.Model, free *elimination) bool {
	if m.Keep.Definition == nil || len(free.now.Names) != 1 || free.now.Matrix().At(0, 0).Order() != 2 {
		return false
	}
	x, d := free.now.Names[0], free.now.Matrix().At(0, 0)
	q, err := d.NormalForm()
	if err != nil {
		return false
	}
	_, u := oper.DivRight(definedAs(m, free, x), d) // modulo the equation of x
	a, b := u.Coef(0).Lowest(), u.Coef(1).Lowest()
	if b.IsZero() {
		return false
	}
	fo := firstOrder(m.K, q)
	e := oper.NewMatrix(2, 2) // (x, p) = e (u, P)
	e.Set(0, 1, oper.New(b.Div(q[1]).Neg()))
	e.Set(1, 0, oper.New(q[1].Div(b)))
	e.Set(1, 1, oper.New(a))
	s := System{K: m.K, Names: []string{m.Keep.Name, "P"}, D: fo.Congruence(e).Map(lowest)}
	if s.D.At(1, 1).Order() != 0 {
		return false
	}
	solved := s.solveAuxiliary(1)
	back := solved.Solutions[0].Sum[0].Coef.Scale(b.Div(q[1]).Neg()).Map(field.Elem.Lowest)
	free.apply(Step{
		Kind:      Exchanged,
		Solutions: []Solution{{Name: x, Sum: []Addend{{back, m.Keep.Name}}}},
		Nonzero:   append(b.Vanishable(), solved.Nonzero...),
		after:     solved.after,
	})
	free.keep, free.weights = m.Keep.Name, []int{1}
	return true
}

// definedAs is the operator that gives the kept variable from the field x that remains.
func definedAs(m *parse.Model, free *elimination, x string) oper.Oper {
	var u oper.Oper
	for _, t := range m.Keep.Definition {
		op := oper.Mono(t.Coef.Mul(rules.Fourier(m.Wavenumber, t.U.Space, 0)), t.U.Time)
		for _, a := range Express(m.K, free.steps, m.Fields[t.U.Field].Name) {
			if a.Name == x {
				u = u.Add(op.Mul(a.Coef))
			}
		}
	}
	return u
}

// firstOrder is the form of p x′ − p²/(2q₁) + ½q₀x².
func firstOrder(k *field.Field, q []field.Elem) oper.Matrix {
	fo := oper.NewMatrix(2, 2)
	fo.Set(0, 0, oper.New(q[0]))
	fo.Set(1, 1, oper.New(q[1].Inv().Neg()))
	fo.Set(1, 0, oper.Mono(k.Int(1), 1))
	fo.Set(0, 1, oper.Mono(k.Int(-1), 1))
	return fo
}
