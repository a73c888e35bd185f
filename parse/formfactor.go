package parse

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/show"
	"remnant/parse/diag"
)

// Form factors: analytic functions F of □. Acting on a scalar they stand in the tree of a
// covariant Lagrangian; their values F(r) and Taylor coefficients F.n(r) = F⁽ⁿ⁾(r)/n! at
// constant r are constants of the model.

// FormFactorDecl is a form factor. At most one of Definition and Rule is set; with neither it
// is free.
type FormFactorDecl struct {
	Name       string
	Span       diag.Span
	Definition Expr // F(box) as an expression in box; nil if it has none
	Rule       *Rule

	values     []formValue
	remainders []*FormFactorDecl
	of         *FormFactorDecl // of a remainder: what it is taken from
	about      field.Elem      // of a remainder: the point
}

// formValue is the constant that stands for F.n(r).
type formValue struct {
	n   int
	at  field.Elem
	gen field.Gen
}

// Value is F.n(r), a constant; r must be constant. F.0(r) is F(r).
func (d *FormFactorDecl) Value(k *field.Field, n int, r field.Elem) field.Elem {
	for _, v := range d.values {
		if v.n == n && v.at.Equal(r) {
			return k.Gen(v.gen)
		}
	}
	name := d.Name
	if n > 0 {
		name += fmt.Sprintf(".%d", n)
	}
	if n == 0 || !r.IsZero() {
		at := "0"
		if !r.IsZero() {
			at = show.Notation(show.Elem(r))
		}
		name += "(" + at + ")"
	}
	g := k.Constant(name, field.Unknown)
	d.values = append(d.values, formValue{n, r, g})
	return k.Gen(g)
}

// ValueOf tells for which n and r the constant g is F.n(r); false if it is none.
func (d *FormFactorDecl) ValueOf(g field.Gen) (n int, r field.Elem, ok bool) {
	for _, v := range d.values {
		if v.gen == g {
			return v.n, v.at, true
		}
	}
	return 0, field.Elem{}, false
}

// Remainder is the form factor Z of F(x) = F(r) + F'(r)(x − r) + (x − r)²Z(x), as entire as F.
func (d *FormFactorDecl) Remainder(r field.Elem) *FormFactorDecl {
	for _, z := range d.remainders {
		if z.about.Equal(r) {
			return z
		}
	}
	z := &FormFactorDecl{Name: "Z", Span: d.Span, of: d, about: r}
	d.remainders = append(d.remainders, z)
	return z
}

// Of gives, for a remainder, the form factor that it is taken from and the point r.
func (d *FormFactorDecl) Of() (f *FormFactorDecl, r field.Elem, ok bool) {
	return d.of, d.about, d.of != nil
}

// declareFormFactor enters a form factor.
func (e *elaborator) declareFormFactor(s *Statement) {
	f := s.FormFactor
	sym := e.declare(&f.Word, symbolFormFactor, s.At.End)
	if f.Rule != nil {
		if fault := oneOf(&f.Rule.Of, []string{f.Word.Text}); fault != nil {
			e.report(fault)
		}
	}
	if sym == nil {
		return
	}
	sym.form = &FormFactorDecl{Name: sym.name, Span: sym.at, Rule: f.Rule}
	if f.Definition != nil {
		sym.form.Definition = f.Definition.X
	}
	e.model.FormFactors = append(e.model.FormFactors, sym.form)
	if _, taken := e.symbols["s"]; !taken { // the eigenvalue of box, in W(s)
		e.enter(&symbol{name: "s", kind: symbolConstant, gen: e.k.Constant("s", field.Unknown)})
	}
}

// formSymbol is the form factor that x names, or nil.
func (e *elaborator) formSymbol(x Expr) *FormFactorDecl {
	if n, ok := x.(*Name); ok {
		if s := e.symbols[n.Name]; s != nil && s.kind == symbolFormFactor && s.form != nil {
			return e.lookup(n).form
		}
	}
	return nil
}

// formValue reads F(r), F.n and F.n(r); false if x is none of them.
func (e *elaborator) formValue(x Expr) (field.Elem, bool) {
	at := field.Elem{}
	inner := x
	call, called := x.(*Call)
	if called {
		inner = call.Fun
	}
	n := 0
	index, indexed := inner.(*Index)
	if indexed {
		inner = index.X
	}
	decl := e.formSymbol(inner)
	if decl == nil || !called && !indexed {
		return field.Elem{}, false
	}
	if indexed {
		num, ok := index.Label.(*Number)
		if !ok || !num.Value.IsInt() || !num.Value.Num().IsInt64() {
			panic(newFault(diag.BadExponent, index.Label.Span(), fmt.Sprintf("'%s' is no Taylor coefficient", brief(index)), "a numeral stands behind the dot: F.2(r) is F''(r)/2!"))
		}
		n = int(num.Value.Num().Int64())
		e.limitOrder(n, index.At)
	}
	if called {
		if len(call.Args) != 1 {
			panic(newFault(diag.WrongArguments, call.At, fmt.Sprintf("'%s' takes one argument", brief(call.Fun)), "F(r) is the value of F at the constant r"))
		}
		at = e.background(call.Args[0], "the argument of a form factor")
		if !at.D().IsZero() {
			panic(newFault(diag.NotANumber, call.Args[0].Span(), fmt.Sprintf("'%s' varies in time and cannot be the argument of a form factor", brief(call.Args[0])),
				"a constant stands here; F(box)[u] lets F act on u"))
		}
	}
	return decl.Value(e.k, n, at), true
}

// tensorForm reads the operator of F(box)[X] and of products with polynomials in box; false
// if no form factor stands in it.
func (e *elaborator) tensorForm(n *Apply, x Tensor) (Tensor, bool) {
	factors := []Operand{{X: n.Operator}}
	if p, ok := n.Operator.(*Product); ok {
		factors = p.Factors
	}
	var form *FormFactorDecl
	powers := []field.Elem{e.k.Int(1)}
	for _, f := range factors {
		if c, ok := f.X.(*Call); ok && !f.Over {
			if d := e.formSymbol(c.Fun); d != nil && len(c.Args) == 1 && argumentName(c.Args[0]) == "box" {
				if form != nil {
					panic(newFault(diag.NotYetSupported, c.At, "two form factors that act on one another are not yet supported", "define their product as one form factor"))
				}
				form = d
			}
		}
	}
	if form == nil {
		return nil, false
	}
	for _, f := range factors {
		if c, ok := f.X.(*Call); ok && e.formSymbol(c.Fun) == form {
			continue
		}
		p := e.boxPowers(f.X)
		if f.Over {
			if len(p) != 1 {
				panic(newFault(diag.NotYetSupported, f.X.Span(), "a power of box in a denominator is not yet supported", "an auxiliary field makes it local: 1/box acting on u is the solution v of box[v] = u, up to solutions of box[v] = 0, which are a choice of boundary condition"))
			}
			p = []field.Elem{e.inverse(p[0], f.X, "")}
		}
		powers = mulPowers(powers, p)
		e.limitOrder(len(powers), n.At)
	}
	if len(powers) > 1 || !powers[0].IsOne() {
		x = &TensorBox{node{n.At}, powers, x}
	}
	return &TensorForm{node{n.At}, form, x}, true
}
