package reduce

// Actions with a form factor. The local fields Φ are joined to the field Y of the form factor,
//
//	S = ½Φ†𝒟Φ + Y𝓡Φ − ½∫√−ḡ Y (wF(□̄))⁻¹ Y,
//
// and eliminated by the steps for local fields, each of which adds a local operator to the
// entry of Y and never touches F. What is left is −½∫√−ḡ Y [(wF)⁻¹ + L] Y, so that the poles are
// the zeros of W = 1 + wF(□̄)L, normalised to 1 where the form factor is switched off. Where L is
// a polynomial in □̄ with constant coefficients, found by repeated right division, W is a
// function W(s) of the eigenvalue s of □̄.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/rules"
)

// FormFactor is what a form factor leaves.
type FormFactor struct {
	Form     *parse.FormFactorDecl
	Weight   field.Elem   // w
	L        oper.Oper    // what the local fields add, acting on Y
	Powers   []field.Elem // lₙ with L = Σ lₙ □̄ⁿ, constants; nil where L is no such polynomial
	LocalDOF int          // degrees of freedom of the action without the form factor's second part
}

// maxBoxPowers bounds the division of L by powers of □̄.
const maxBoxPowers = 64

// W is 1 + wF(s) Σ lₙsⁿ, with the constants s and F(s) of the model's field for the eigenvalue
// and the value of F there; false where L is no polynomial in □̄.
func (f *FormFactor) W(k *field.Field) (field.Elem, bool) {
	if f.Powers == nil {
		return field.Elem{}, false
	}
	s := constantNamed(k, "s")
	return k.Int(1).Add(f.Weight.Mul(f.Form.Value(k, 0, s)).Mul(f.polynomial(s))).Lowest(), true
}

// Series is w₀ … w_order with W = Σ wₙ sⁿ, in the Taylor coefficients F.n.
func (f *FormFactor) Series(k *field.Field, order int) []field.Elem {
	out := make([]field.Elem, order+1)
	out[0] = k.Int(1)
	for i, l := range f.Powers {
		for n := 0; i+n <= order; n++ {
			c := f.Form.Value(k, n, field.Elem{})
			out[i+n] = out[i+n].Add(f.Weight.Mul(l).Mul(c))
		}
	}
	return out
}

func (f *FormFactor) polynomial(s field.Elem) field.Elem {
	var sum field.Elem
	for i := len(f.Powers) - 1; i >= 0; i-- {
		sum = sum.Mul(s).Add(f.Powers[i])
	}
	return sum
}

func constantNamed(k *field.Field, name string) field.Elem {
	if g, ok := k.Lookup(name); ok {
		return k.Gen(g)
	}
	return k.Gen(k.Constant(name, field.Unknown))
}

// reduceNonLocal finishes the reduction of a model with form factors.
func (r *Result) reduceNonLocal(x *rules.Expansion) error {
	m := r.Model
	if len(x.NonLocal) != 1 {
		return refuseForm(m, "more than one form factor, or one between two unlike scalars, is not yet supported", "one term c*O*F(box)[O] is reduced")
	}
	n := x.NonLocal[0]
	local := r.Initial.without(n.Field)
	var err error
	if r.Count, err = local.CountSolutions(); err != nil {
		return err
	}
	e := &elimination{now: r.Initial, fields: r.Initial.Names, taken: map[string]bool{}}
	for _, name := range r.Initial.Names {
		e.taken[name] = true
	}
	if err := e.around(1); err != nil {
		return gaugeDiagnostic(m, err)
	}
	if err := e.decouple(m); err != nil {
		return err
	}
	r.Steps, r.Remaining = e.steps, e.now
	r.Variable = m.Fields[n.Field].Name
	r.FormFactor = &FormFactor{Form: n.Form, Weight: n.Weight, LocalDOF: r.Count.Solutions / 2 * m.Sector.Polarisations()}
	last := len(e.now.Names) - 1
	r.FormFactor.L = e.now.D.At(last, last).Scale(m.Lapse.Mul(m.A.Pow(3)).Inv().Neg()).Map(field.Elem.Lowest)
	r.FormFactor.Powers = boxPowers(m, r.FormFactor.L)
	r.DegreesOfFreedom = r.FormFactor.LocalDOF
	r.Assumptions = r.allAssumptions()
	return nil
}

// around eliminates all fields but the last few, by pivots and redefinitions among the others
// alone.
func (e *elimination) around(kept int) error {
	for {
		n := len(e.now.Names) - kept
		if n == 0 {
			return nil
		}
		first := others(len(e.now.Names))[:n]
		local := System{K: e.now.K, Names: e.now.Names[:n], D: e.now.D.Submatrix(first, first)}
		if i, ok := e.gaugeRow(); ok && i < n {
			return e.gaugeError(i)
		}
		if p, ok := local.choosePivot(-1); ok {
			e.apply(e.now.solve(p))
			continue
		}
		v, q, weights, found := local.hiddenVector(-1)
		if !found {
			e.weights = weights
			return nil
		}
		e.apply(e.now.redefine(v, q, weights, e.rename))
	}
}

// decouple shifts the one local field that propagates so that it no longer meets Y: where its
// entry A divides the coupling B from the left, B = AQ, the shift φ → φ − QY leaves
// D_YY − Q†AQ for Y.
func (e *elimination) decouple(m *parse.Model) error {
	switch len(e.now.Names) {
	case 1:
		return nil
	case 2:
		a, b := e.now.D.At(0, 0), e.now.D.At(0, 1)
		q, rest := oper.DivLeft(b, a)
		if !rest.Map(field.Elem.Lowest).IsZero() {
			break
		}
		shift := oper.Identity(m.K, 2)
		shift.Set(0, 1, q.Neg())
		after := System{K: m.K, Names: e.now.Names, D: e.now.D.Congruence(shift).Map(lowest)}
		e.apply(Step{Kind: Redefined, after: after})
		return nil
	}
	return refuseForm(m, "the local fields that propagate do not decouple from the form factor", "on Minkowski, de Sitter and where the scalar is an eigenfunction of box they do")
}

// boxPowers writes L as a polynomial in □̄ with constant coefficients; nil if it is none.
func boxPowers(m *parse.Model, l oper.Oper) []field.Elem {
	box := boxOperator(m)
	k := wavenumberGen(m)
	out := []field.Elem{}
	for n := 0; !l.IsZero(); n++ {
		q, r := oper.DivRight(l, box)
		r = r.Map(field.Elem.Lowest)
		c := r.Coef(0)
		if n == maxBoxPowers || r.Order() > 0 || c.Has(k) || !c.D().IsZero() {
			return nil
		}
		out, l = append(out, c), q
	}
	return out
}

// boxOperator is □̄ = −(N̄a³)⁻¹D(a³/N̄)D − k²/a² on a mode with wave number k.
func boxOperator(m *parse.Model) oper.Oper {
	a3 := m.A.Pow(3)
	flux := oper.Mono(a3.Div(m.Lapse), 1)
	time := flux.D().Scale(m.Lapse.Mul(a3).Inv().Neg())
	return time.Sub(oper.New(m.Wavenumber.Div(m.A).Pow(2)))
}

func refuseForm(m *parse.Model, summary, hint string) error {
	return diag.List{{Kind: diag.NotYetSupported, Source: m.Source, Span: m.LagrangianSpan, Summary: summary, Hint: hint}}
}

// String writes W for tests and debugging.
func (f *FormFactor) String() string {
	return fmt.Sprintf("%s with w = %v, L = %v", f.Form.Name, f.Weight, f.L)
}
