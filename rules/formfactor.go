package rules

// Form factors in a covariant Lagrangian: terms c·O₁F(□)O₂ with scalars O₁, O₂.
//
// Where O₁ and O₂ are constant on the background (Minkowski, de Sitter), □ of a constant
// vanishes on every metric and □ is self-adjoint under √−g, so that up to total derivatives
//
//	O₁F(□)O₂ = F(0)(Ō₁O₂ + Ō₂O₁ − Ō₁Ō₂) + (O₁ − Ō₁)F(□)(O₂ − Ō₂).
//
// The first part is local. In the second both factors vanish on the background, and to second
// order it is ρ₁F(□̄)ρ₂ with ρ = O⁽¹⁾ and the background □̄: no variation of F is needed. A
// mixed term is two of rank one, ρ₁Fρ₂ = ¼[(ρ₁+ρ₂)F(ρ₁+ρ₂) − (ρ₁−ρ₂)F(ρ₁−ρ₂)], and a term of
// rank one is integrated in with a field Y of its own, ½w ρFρ → Yρ − ½Y(wF)⁻¹Y, whose only
// non-local entry is its own.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

// NonLocal is a term −½√−ḡ Y (wF(□̄))⁻¹ Y of the quadratic action, where Y is the field with
// the number Field; its other terms, Yρ, stand among the model's.
type NonLocal struct {
	Form   *parse.FormFactorDecl
	Field  int
	Weight field.Elem // w
}

// formTerm is a term c·O₁F(□)O₂.
type formTerm struct {
	coef        field.Elem
	left, right parse.Tensor // left nil: 1
	form        *parse.FormFactorDecl
	at          diag.Span
}

// splitForms separates the terms with form factors from the local rest of a Lagrangian. It
// panics with a refusal where a form factor stands otherwise.
func (x *expansion) splitForms(t parse.Tensor) (local parse.Tensor, terms []formTerm) {
	if !holdsForm(t) {
		return t, nil
	}
	one := x.m.K.Int(1)
	switch n := t.(type) {
	case *parse.TensorForm:
		if holdsForm(n.X) {
			break
		}
		return nil, []formTerm{{one, nil, n.X, n.Form, n.Span()}}
	case *parse.TensorSum:
		sum := &parse.TensorSum{}
		for _, s := range n.Terms {
			l, ts := x.splitForms(s)
			if l != nil {
				sum.Terms = append(sum.Terms, l)
			}
			terms = append(terms, ts...)
		}
		if len(sum.Terms) == 0 {
			return nil, terms
		}
		return sum, terms
	case *parse.TensorProduct:
		return x.splitProduct(n)
	}
	panic(x.refuse(diag.NotYetSupported, t.Span(), "a form factor inside a power, a function or another operator is not yet supported", "terms of the form c*O*F(box)[O] are read").(diag.List))
}

func (x *expansion) splitProduct(n *parse.TensorProduct) (parse.Tensor, []formTerm) {
	var inner parse.Tensor
	coef := x.m.K.Int(1)
	rest := &parse.TensorProduct{}
	for _, f := range n.Factors {
		v, constant := f.(*parse.TensorValue)
		switch {
		case constant:
			coef = coef.Mul(v.Value)
		case !holdsForm(f):
			rest.Factors = append(rest.Factors, f)
		case inner != nil:
			panic(x.refuse(diag.NotYetSupported, n.Span(), "a product of two form factors is not yet supported", "terms of the form c*O*F(box)[O] are read").(diag.List))
		default:
			inner = f
		}
	}
	local, terms := x.splitForms(inner)
	for i := range terms {
		t := &terms[i]
		t.coef = t.coef.Mul(coef)
		switch {
		case len(rest.Factors) == 0:
		case t.left == nil:
			t.left = rest
		default:
			t.left = &parse.TensorProduct{Factors: append([]parse.Tensor{t.left}, rest.Factors...)}
		}
	}
	if local == nil {
		return nil, terms
	}
	all := append([]parse.Tensor{&parse.TensorValue{Value: coef}, local}, rest.Factors...)
	return &parse.TensorProduct{Factors: all}, terms
}

func holdsForm(t parse.Tensor) bool {
	switch n := t.(type) {
	case *parse.TensorForm:
		return true
	case *parse.TensorSum:
		for _, s := range n.Terms {
			if holdsForm(s) {
				return true
			}
		}
	case *parse.TensorProduct:
		for _, f := range n.Factors {
			if holdsForm(f) {
				return true
			}
		}
	case *parse.TensorPower:
		return holdsForm(n.X)
	case *parse.TensorGrad:
		return holdsForm(n.X)
	case *parse.TensorBox:
		return holdsForm(n.X)
	case *parse.TensorElementary:
		return holdsForm(n.X)
	}
	return false
}

// lagrangian is the local part of the density over N̄a³, and the terms of rank one.
func (x *expansion) lagrangian(e *evaluator) (quantity, []rankOne) {
	local, terms := x.splitForms(x.action())
	var l quantity
	if local != nil {
		l = e.scalar(local)
	}
	var ranks []rankOne
	for _, t := range terms {
		part, ones := x.formTerm(e, t)
		l, ranks = l.add(part), append(ranks, ones...)
	}
	return e.volume.mul(l), ranks
}

// rankOne is ½w ρF(□̄)ρ.
type rankOne struct {
	form   *parse.FormFactorDecl
	weight field.Elem
	rho    []linear
}

func (x *expansion) formTerm(e *evaluator, t formTerm) (quantity, []rankOne) {
	if t.left != nil && parse.SameScalar(t.left, t.right) {
		for _, eig := range x.m.Eigenfunctions {
			if parse.SameScalar(eig.Scalar, t.right) {
				return x.splitAtEigenvalue(e, t, eig)
			}
		}
	}
	right := e.scalar(t.right)
	left := e.int(1)
	if t.left != nil {
		left = e.scalar(t.left)
	}
	b1, b2 := x.constantOn(left.bg, t), x.constantOn(right.bg, t)
	f0 := t.form.Value(x.m.K, 0, field.Elem{})
	local := right.scale(b1).add(left.scale(b2)).sub(background(b1.Mul(b2))).scale(t.coef.Mul(f0))
	p, q := left.lin, right.lin
	switch {
	case len(p) == 0 || len(q) == 0:
		return local, nil
	case sameLinear(p, q):
		return local, []rankOne{{t.form, t.coef.Scale(2, 1), p}}
	}
	sum := quantity{lin: p}.add(quantity{lin: q}).lin
	difference := quantity{lin: p}.sub(quantity{lin: q}).lin
	return local, []rankOne{{t.form, t.coef.Scale(1, 2), sum}, {t.form, t.coef.Scale(-1, 2), difference}}
}

// splitAtEigenvalue writes OF(□)O, for □O = r₁O + r₂ on the background, with
// F(x) = F(r₁) + F′(r₁)(x − r₁) + (x − r₁)²Z(x) and Y = (□ − r₁)O − r₂, which vanishes there. As □ is
// self-adjoint and Z(□) acts on a constant as Z(0),
//
//	O F(□)O = F(r₁)O² + F′(r₁)O(□ − r₁)O + Y Z(□)Y + 2r₂Z(0)Y + r₂²Z(0),
//
// with ∫√−g Y = −∫√−g (r₁O + r₂). All but YZ(□)Y is local, and that is ρZ(□̄)ρ with ρ = Y⁽¹⁾.
func (x *expansion) splitAtEigenvalue(e *evaluator, t formTerm, eig parse.Eigenfunction) (quantity, []rankOne) {
	k := x.m.K
	o := e.scalar(t.right)
	shifted := e.box(o).sub(o.scale(eig.R1)) // (□ − r₁)O
	y := shifted.sub(background(eig.R2))
	f0, f1 := t.form.Value(k, 0, eig.R1), t.form.Value(k, 1, eig.R1)
	local := o.mul(o).scale(f0).add(o.mul(shifted).scale(f1))
	if !eig.R2.IsZero() {
		z0 := t.form.Value(k, 2, field.Elem{}) // F″(0)/2 where r₁ = 0
		if !eig.R1.IsZero() {
			at0 := t.form.Value(k, 0, field.Elem{})
			z0 = at0.Sub(f0).Add(eig.R1.Mul(f1)).Div(eig.R1.Mul(eig.R1))
		}
		vanishing := o.scale(eig.R1).add(background(eig.R2)).scale(eig.R2.Mul(z0).Scale(-2, 1))
		local = local.add(vanishing).add(background(eig.R2.Mul(eig.R2).Mul(z0)))
	}
	z := t.form.Remainder(eig.R1)
	return local.scale(t.coef), []rankOne{{z, t.coef.Scale(2, 1), y.lin}}
}

// constantOn refuses a scalar that varies on the background.
func (x *expansion) constantOn(b field.Elem, t formTerm) field.Elem {
	n, err := b.Normal()
	if err != nil || !x.ring.rate(n).IsZero() {
		panic(x.refuse(NoEigenfunction, t.at, fmt.Sprintf("F(□) acts on a scalar that is %s on the background and no eigenfunction of □", show(b)),
			"a background on which it is constant is needed, given a' = 0 or given H' = 0, or a truncation of F to powers of box").(diag.List))
	}
	return n
}

func sameLinear(p, q []linear) bool {
	return len(quantity{lin: p}.sub(quantity{lin: q}).lin) == 0
}

// integrateIn adds a field Y for each term of rank one: its terms Yρ, and what stays
// non-local.
func (x *expansion) integrateIn(l quantity, ranks []rankOne) (quantity, []NonLocal) {
	var out []NonLocal
	for i, r := range ranks {
		name := "Y"
		if len(ranks) > 1 {
			name = fmt.Sprintf("Y_%d", i+1)
		}
		n := len(x.m.Fields)
		x.m.Fields = append(x.m.Fields[:n:n], parse.FieldDecl{Name: name})
		l = l.add(quantity{quad: outer(x.ring.field(n).lin, r.rho)})
		out = append(out, NonLocal{Form: r.form, Field: n, Weight: r.weight})
	}
	return l, out
}
