package parse

import (
	"remnant/expr/field"
	"remnant/parse/diag"
)

// A form is a polynomial of degree at most two in the jets of the perturbations, with
// coefficients in K. Space derivatives are counted, not named: which index is summed with
// which is checked beforehand (indices.go), and in a summed product of at most two jets
// the counts alone fix the Fourier transform. Terms keep the order in which the text
// makes them; none has the coefficient zero.

// monomial is a product of at most two jets, the smaller first.
type monomial struct {
	degree int
	u, v   Factor
}

type formTerm struct {
	coef field.Elem
	monomial
	at diag.Span // what to point at if the term is refused
}

type form struct{ terms []formTerm }

// background returns the form that is e.
func background(e field.Elem, at diag.Span) form {
	if e.IsZero() {
		return form{}
	}
	return form{[]formTerm{{coef: e, at: at}}}
}

// perturbation returns the form that is a field.
func perturbation(k *field.Field, index int, at diag.Span) form {
	return form{[]formTerm{{k.Int(1), monomial{degree: 1, u: Factor{Field: index}}, at}}}
}

// elem returns the value of a form that holds no perturbation.
func (f form) elem() (field.Elem, bool) {
	switch {
	case len(f.terms) == 0:
		return field.Elem{}, true
	case len(f.terms) == 1 && f.terms[0].degree == 0:
		return f.terms[0].coef, true
	}
	return field.Elem{}, false
}

// degree is the lowest and the highest degree of the terms.
func (f form) degrees() (low, high int) {
	for i, t := range f.terms {
		if i == 0 {
			low = t.degree
		}
		low, high = min(low, t.degree), max(high, t.degree)
	}
	return low, high
}

// collector adds terms up.
type collector struct {
	terms []formTerm
	place map[monomial]int
}

func (c *collector) add(t formTerm) {
	if t.coef.IsZero() {
		return
	}
	if t.degree == 2 && less(t.v, t.u) {
		t.u, t.v = t.v, t.u
	}
	if c.place == nil {
		c.place = map[monomial]int{}
	}
	if i, ok := c.place[t.monomial]; ok {
		c.terms[i].coef = c.terms[i].coef.Add(t.coef)
		return
	}
	c.place[t.monomial] = len(c.terms)
	c.terms = append(c.terms, t)
}

func (c *collector) addForm(f form) {
	for _, t := range f.terms {
		c.add(t)
	}
}

func (c *collector) form() form {
	kept := c.terms[:0]
	for _, t := range c.terms {
		if !t.coef.IsZero() {
			kept = append(kept, t)
		}
	}
	return form{kept}
}

func less(a, b Factor) bool {
	switch {
	case a.Field != b.Field:
		return a.Field < b.Field
	case a.Time != b.Time:
		return a.Time < b.Time
	}
	return a.Space < b.Space
}

// scale returns e·f.
func (f form) scale(e field.Elem) form {
	var c collector
	for _, t := range f.terms {
		t.coef = t.coef.Mul(e)
		c.add(t)
	}
	return c.form()
}

// tooHigh is what is refused in a product: two terms of more than second order together.
type tooHigh struct {
	degree int
	at     diag.Span
}

// mul returns f·g, or the first product of terms that is of more than second order.
// whole is the place of the product in the text.
func (f form) mul(g form, whole diag.Span) (form, *tooHigh) {
	single := len(f.terms) <= 1 && len(g.terms) <= 1
	var c collector
	for _, s := range f.terms {
		for _, t := range g.terms {
			at := whole
			switch {
			case single:
			case s.degree == 0:
				at = t.at
			case t.degree == 0:
				at = s.at
			}
			if s.degree+t.degree > 2 {
				return form{}, &tooHigh{s.degree + t.degree, at}
			}
			c.add(formTerm{s.coef.Mul(t.coef), join(s.monomial, t.monomial), at})
		}
	}
	return c.form(), nil
}

// join is the product of two monomials of degree at most two together.
func join(m, n monomial) monomial {
	switch {
	case m.degree == 0:
		return n
	case n.degree == 0:
		return m
	}
	return monomial{2, m.u, n.u}
}

// dt returns the time derivative, by Leibniz' rule.
func (f form) dt() form {
	var c collector
	for _, t := range f.terms {
		d := t
		d.coef = t.coef.D()
		c.add(d)
		c.jets(t, Factor{Time: 1})
	}
	return c.form()
}

// dx returns the derivative by one coordinate of space.
func (f form) dx() form {
	var c collector
	for _, t := range f.terms {
		c.jets(t, Factor{Space: 1})
	}
	return c.form()
}

// jets adds t with one jet after the other raised by the orders of d.
func (c *collector) jets(t formTerm, d Factor) {
	if t.degree > 0 {
		s := t
		s.u = raise(t.u, d)
		c.add(s)
	}
	if t.degree > 1 {
		s := t
		s.v = raise(t.v, d)
		c.add(s)
	}
}

func raise(f, d Factor) Factor {
	return Factor{f.Field, f.Time + d.Time, f.Space + d.Space}
}

// box returns □f on the background: −(N̄a³)⁻¹ D(a³/N̄ D f) + ∂²f/a².
func (f form) box(a, lapse field.Elem) form {
	cube := a.Pow(3)
	inner := f.dt().scale(cube.Div(lapse))
	var c collector
	c.addForm(inner.dt().scale(lapse.Mul(cube).Inv().Neg()))
	c.addForm(f.dx().dx().scale(a.Pow(-2)))
	return c.form()
}
