package main

// What the page of a reduction says of an action with a form factor.

import (
	"remnant/expr/field"
	"remnant/expr/show"
)

// pageSeriesOrder is the order of the series of W on the page.
const pageSeriesOrder = 4

// nonLocal is the section on what a form factor leaves.
func (f *findings) nonLocal() *section {
	ff, k := f.FormFactor, f.Model.K
	name := maths(show.Symbol(f.Variable, 0))
	form := ff.Form.Name
	s := &section{heading: join("", words("Remains: "), name, words(", the field of the form factor "), maths(show.Symbol(form, 0)))}
	w, isFunction := ff.W(k)
	if isFunction {
		s.blocks = append(s.blocks, block{display: show.Equation(show.Symbol("W(s)", 0), show.Elem(w))})
	} else {
		s.blocks = append(s.blocks, block{sentence: words("W = 1 + w " + form + "(□) L is an operator with coefficients that depend on time.")})
	}
	rows := []row{}
	if of, r, ok := ff.Form.Of(); ok {
		at := show.Elem(r)
		rows = append(rows, row{label: words("where"), value: join("", words(of.Name+"(x) = "+of.Name+"(r) + "+of.Name+"'(r)(x − r) + (x − r)²"+form+"(x) with r = "), maths(at))})
	}
	rows = append(rows, []row{
		{label: words("action"), value: join("", words("−½∫√−g "), name, words(" [ (w "+form+"(□))⁻¹ + L ] "), name), note: words("poles are the zeros of W = 1 + w " + form + "(□) L")},
		{label: words("w"), value: maths(show.Elem(ff.Weight))},
		{label: words("without it"), value: words(degrees(ff.LocalDOF)), note: words("confirmed independently")},
	}...)
	if ff.Powers != nil {
		var terms []show.Node
		for n := len(ff.Powers) - 1; n >= 0; n-- {
			terms = append(terms, powerOf("box", ff.Powers[n], n))
		}
		rows = append(rows, row{label: words("L"), value: maths(show.Sum(terms...))},
			row{label: words("series"), value: f.seriesOfW()})
	} else {
		rows = append(rows, row{label: words("L"), value: operatorPhrase(f, ff.L.Order(), ff.L.Coef)})
	}
	s.blocks = append(s.blocks, block{rows: rows})
	return s
}

// seriesOfW is the beginning of W in powers of s.
func (f *findings) seriesOfW() phrase {
	var terms []show.Node
	for n, c := range f.FormFactor.Series(f.Model.K, pageSeriesOrder) {
		if !c.IsZero() {
			terms = append(terms, powerOf("s", c, n))
		}
	}
	rest := show.Power(show.Symbol("s", 0), pageSeriesOrder+1)
	return phrase{{maths: formula{{node: show.Sum(terms...)}, {sign: plus}, {order: rest}}}}
}

// powerOf is c·xⁿ.
func powerOf(x string, c field.Elem, n int) show.Node {
	if n == 0 {
		return show.Elem(c)
	}
	return show.Product(show.Elem(c), show.Power(show.Symbol(x, 0), n))
}

// operatorPhrase writes an operator as it acts on the field of the form factor.
func operatorPhrase(f *findings, order int, coef func(int) field.Elem) phrase {
	var terms []show.LinearTerm
	for i := order; i >= 0; i-- {
		terms = append(terms, show.LinearTerm{Coef: coef(i), Name: f.Variable, Order: i})
	}
	return maths(show.Linear(terms))
}
