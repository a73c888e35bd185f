package parse

import (
	"errors"
	"fmt"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// Background relations: those that the clock brings along, then the givens of the file.
// The field knows each by its number in Model.Relations, and names the numbers when
// relations contradict each other.

// clockRelations adds a' = aH, or a' = a in e-folds.
func (e *elaborator) clockRelations() {
	e.lapse()
	a, ok := e.symbols["a"]
	if !ok || a.kind != symbolBackground {
		if e.model.Clock == Efolds {
			e.report(newFault(diag.Missing, e.clockSpan(), "the e-fold clock needs the scale factor", "declare a in 'background'"))
		}
		return
	}
	h, ok := e.symbols["H"]
	switch {
	case e.model.Clock == Efolds:
		e.clockRelation("a'", e.k.JetGen(a.gen, 1), e.k.Gen(a.gen))
	case ok && h.at == (diag.Span{}):
		e.clockRelation("a'", e.k.JetGen(a.gen, 1), e.k.Gen(a.gen).Mul(e.k.Gen(h.gen)))
	}
}

func (e *elaborator) clockSpan() diag.Span {
	for _, s := range e.file.Statements {
		if s.Clock != nil {
			return s.At
		}
	}
	return diag.Span{}
}

// clockRelation adds a relation that no statement gives.
func (e *elaborator) clockRelation(left string, g field.Gen, right field.Elem) {
	r := RelationDecl{Text: left + " = " + right.String(), Auto: true}
	e.model.Relations = append(e.model.Relations, r)
	err := e.k.RelateGen(g, right, len(e.model.Relations)-1)
	if err != nil {
		panic(e.relationFault(err, diag.Span{}))
	}
}

// given adds the relation of a statement.
func (e *elaborator) given(s *Statement) {
	if s.Given == nil {
		return
	}
	left, right := s.Given.Left.X, s.Given.Right.X
	if apply, ok := left.(*Apply); ok {
		e.eigenfunction(s, apply)
		e.refresh()
		return
	}
	if hasApply(left) {
		panic(newFault(diag.NotYetSupported, left.Span(), "a relation for an operator's value is not yet supported", "relations for functions of time and their derivatives are read"))
	}
	g, plain := e.symbolGen(left)
	if v, ok := e.formValue(left); ok { // a condition on a form factor
		g, plain = v.Num().Vars()[0], true
	}
	if plain {
		e.leaderOnce(g, left)
	}
	value := e.background(right, "a background relation")
	if !plain {
		value = e.background(left, "a background relation").Sub(value)
	}
	e.model.Relations = append(e.model.Relations, RelationDecl{Text: String(left) + " = " + String(right), Span: s.At})
	number := len(e.model.Relations) - 1
	var err error
	if plain {
		err = e.k.RelateGen(g, value, number)
	} else {
		err = e.k.Relate(value, number)
	}
	if err != nil {
		panic(e.relationFault(err, s.At))
	}
	e.refresh()
}

func hasApply(x Expr) bool {
	found := false
	Walk(x, func(y Expr) bool {
		_, ok := y.(*Apply)
		found = found || ok
		return !found
	})
	return found
}

// leaderOnce refuses a second relation for one name.
func (e *elaborator) leaderOnce(g field.Gen, left Expr) {
	old, ok := e.leaders[g]
	if !ok {
		e.leaders[g] = left.Span()
		return
	}
	f := newFault(diag.GivenTwice, left.Span(), fmt.Sprintf("'%s' is given twice", brief(left)), "one relation for a quantity is allowed")
	f.Related = []diag.Related{{Span: old, Label: "the first one"}}
	panic(f)
}

// refresh brings what was computed before up to date with the relations.
func (e *elaborator) refresh() {
	for _, v := range []*field.Elem{&e.model.A, &e.model.Lapse} {
		n, err := v.Normal()
		if err != nil {
			panic(newFault(diag.DivideByZero, e.lastGiven(), "the clock's lapse is not defined with this relation", "in e-folds H cannot vanish"))
		}
		*v = n
	}
	if e.model.A.IsZero() {
		panic(newFault(diag.Contradiction, e.lastGiven(), "the scale factor vanishes by this relation", "a is positive"))
	}
}

func (e *elaborator) lastGiven() diag.Span {
	return e.model.Relations[len(e.model.Relations)-1].Span
}

// relationFault names the relations that led to an error of the field.
func (e *elaborator) relationFault(err error, at diag.Span) *fault {
	var contradiction *field.Contradiction
	var unsolvable *field.Unsolvable
	switch {
	case errors.As(err, &contradiction):
		follows := shorten(contradiction.Follows.String()) + " = 0"
		why := "which cannot be"
		if contradiction.Assumed {
			why = "which was assumed not to vanish"
		}
		f := newFault(diag.Contradiction, at, fmt.Sprintf("the relations contradict each other: '%s' would follow, %s", follows, why),
			"this relation cannot hold together with those below")
		f.Related = e.otherRelations(contradiction.Sources, at)
		if len(f.Related) == 0 {
			f.Hint = "this relation cannot hold: " + follows + " follows from it" + e.autoText(contradiction.Sources)
		}
		return f
	case errors.As(err, &unsolvable):
		f := newFault(diag.Unsolvable, at, "the relation cannot be solved for a function of time", "it must be linear in a function or in one of its derivatives; write that one on the left: H' = …")
		if unsolvable.Cyclic {
			f.Summary = "the relations replace each other without end"
			f.Hint = "each must replace a quantity by simpler ones"
		}
		f.Related = e.otherRelations(unsolvable.Sources, at)
		return f
	}
	return domainFault(err, at)
}

// otherRelations lists the places of relations other than the one at hand.
func (e *elaborator) otherRelations(sources []int, at diag.Span) []diag.Related {
	var list []diag.Related
	for _, n := range sources {
		if r := e.model.Relations[n]; !r.Auto && r.Span != at {
			list = append(list, diag.Related{Span: r.Span, Label: "together with this relation"})
		}
	}
	return list
}

func (e *elaborator) autoText(sources []int) string {
	for _, n := range sources {
		if r := e.model.Relations[n]; r.Auto {
			return " with " + r.Text
		}
	}
	return ""
}

// symbolGen returns the generator that an expression spells, relations not applied: a
// name, a time derivative of a function of time, or a partial derivative of a function.
func (e *elaborator) symbolGen(x Expr) (field.Gen, bool) {
	switch n := x.(type) {
	case *Paren:
		return e.symbolGen(n.X)
	case *Name:
		s := e.lookup(n)
		switch {
		case n.Name == "t":
			return e.time(), true
		case s.kind == symbolConstant, s.kind == symbolBackground, n.Name == "k":
			return s.gen, true
		case s.kind == symbolFunction:
			return e.k.FuncJetGen(s.fn.Fn, make([]int, len(s.args))), true
		}
	case *Prime:
		g, ok := e.symbolGen(n.X)
		if ok && e.k.Info(g).Kind == field.Function {
			e.limitOrder(e.k.Info(g).Order+n.Count, n.At)
			return e.k.JetGen(g, e.k.Info(g).Order+n.Count), true
		}
	case *Deriv:
		if !e.byArgument(n) {
			return 0, false
		}
		fn, index := e.partial(n)
		return e.k.FuncJetGen(fn.fn.Fn, index), true
	case *Call:
		if fn := e.callee(n); fn != nil {
			e.checkArguments(n, fn)
			return e.symbolGen(n.Fun)
		}
	}
	return 0, false
}
