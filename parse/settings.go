package parse

import (
	"fmt"
	"math/big"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// What a file says beside names, relations and Lagrangian: the variable to keep, the small
// parameters, values, and definitions of functions. All names and relations are known here.

// rest reads what needs the names and relations to be complete.
func (e *elaborator) rest(s *Statement) {
	switch {
	case s.Gauge != nil && e.quadratic():
		panic(newFault(diag.WrongForm, s.At, "a quadratic Lagrangian has no gauge to choose", "gauge belongs to the covariant and adm forms"))
	case s.Sector != nil && s.Sector.Text != "scalar" && e.quadratic():
		panic(newFault(diag.NotYetSupported, s.Sector.Span(), fmt.Sprintf("the %s sector is not yet supported", s.Sector.Text), "sector scalar can be reduced"))
	case s.Fields != nil && !e.quadratic():
		panic(newFault(diag.WrongForm, s.At, fmt.Sprintf("the %s form has its own perturbations", e.form), "the gauge chooses among A, B, zeta, E and dphi"))
	case s.Keep != nil:
		e.keep(s)
	case s.Small != nil:
		e.small(s.Small)
	case s.Numbers != nil:
		for _, n := range s.Numbers {
			e.try(func() { e.number(n) })
		}
	case s.Functions != nil:
		for _, f := range s.Functions {
			e.try(func() { e.definition(f) })
		}
	}
}

func (e *elaborator) keep(s *Statement) {
	w := &s.Keep.Word
	if s.Keep.Definition != nil {
		if e.declare(w, symbolField, len(e.src.Text)+1) != nil {
			e.model.Keep = &Keep{Name: w.Name(), Span: w.Span(), Field: -1, Definition: e.linear(s.Keep.Definition.X)}
		}
		return
	}
	sym := e.lookup(&Name{node{w.Span()}, w.Text, w.Name()})
	if sym.kind != symbolField {
		panic(newFault(diag.NotAField, w.Span(), fmt.Sprintf("'%s' is %s and cannot be kept", w.Text, kindNames[sym.kind]), "a perturbation declared in 'fields' is kept, or a new one: keep u = expression"))
	}
	e.model.Keep = &Keep{Name: sym.name, Span: w.Span(), Field: sym.index}
}

// linear evaluates the definition of a new variable.
func (e *elaborator) linear(x Expr) []LinearTerm {
	var list []LinearTerm
	for _, t := range e.value(x).terms {
		if t.degree != 1 {
			panic(newFault(diag.WrongOrder, t.at, fmt.Sprintf("'%s' is of order %d in the perturbations", e.quote(t.at), t.degree), "a new variable is of order 1"))
		}
		list = append(list, LinearTerm{t.coef, t.u, t.at})
	}
	if len(list) == 0 {
		panic(newFault(diag.WrongOrder, x.Span(), "the new variable is zero", "a new variable is of order 1 in the perturbations"))
	}
	return list
}

// maxSeriesOrder bounds the order that a file may ask series to be carried to.
const maxSeriesOrder = 100

func (e *elaborator) small(c *SmallClause) {
	named := map[*symbol]bool{}
	for _, w := range c.Names {
		sym := e.lookup(&Name{node{w.Span()}, w.Text, w.Name()})
		if sym.kind != symbolConstant && sym.kind != symbolBackground {
			panic(newFault(diag.NotASymbol, w.Span(), fmt.Sprintf("'%s' is %s and cannot be small", w.Text, kindNames[sym.kind]), "a constant or a function of time is small"))
		}
		if named[sym] {
			panic(newFault(diag.DeclaredTwice, w.Span(), fmt.Sprintf("'%s' is named twice", w.Text), "a parameter is named once"))
		}
		named[sym] = true
		e.model.Small = append(e.model.Small, sym.gen)
	}
	n, ok := new(big.Int).SetString(c.Order.Text, 10)
	if !ok || n.Cmp(big.NewInt(maxSeriesOrder)) > 0 {
		panic(newFault(diag.ExponentTooLarge, c.Order.Span(), fmt.Sprintf("the order '%s' is too high", shorten(c.Order.Text)), "orders up to 100 are read"))
	}
	e.model.SmallOrder = int(n.Int64())
}

// number reads the value of a constant, or an initial value.
func (e *elaborator) number(eq *Equation) {
	left, initial := eq.Left.X, false
	if c, ok := left.(*Call); ok {
		zero, isNumber := c.Args[0].(*Number)
		if len(c.Args) != 1 || !isNumber || zero.Value.Sign() != 0 {
			panic(newFault(diag.WrongArguments, c.Args[0].Span(), "initial values are given at 0", "the form is: phi(0) = 27/5"))
		}
		left, initial = c.Fun, true
	}
	g, ok := e.symbolGen(left)
	if !ok {
		panic(newFault(diag.NotASymbol, left.Span(), fmt.Sprintf("'%s' has no value of its own", brief(left)), "the forms are: M = 1 for a constant, phi(0) = 27/5 for an initial value"))
	}
	if isConstant := e.k.Info(g).Kind == field.Constant; isConstant == initial {
		hint := fmt.Sprintf("an initial value is written %s(0)", brief(left))
		if isConstant {
			hint = "a constant has its value at all times: " + brief(left) + " = …"
		}
		panic(newFault(diag.NotASymbol, eq.Left.X.Span(), fmt.Sprintf("'%s' cannot be given like this", brief(eq.Left.X)), hint))
	}
	if old, ok := e.valued[g]; ok {
		f := newFault(diag.DeclaredTwice, eq.Left.X.Span(), fmt.Sprintf("'%s' has two values", brief(eq.Left.X)), "one value is allowed")
		f.Related = []diag.Related{{Span: old, Label: "the first one"}}
		panic(f)
	}
	e.valued[g] = eq.Span()
	e.model.Numbers = append(e.model.Numbers, NumberDecl{g, initial, e.numeric(eq.Right.X), eq.Span()})
}

// numeric evaluates an expression that must be a number.
func (e *elaborator) numeric(x Expr) field.Elem {
	v := e.background(x, "a value")
	for _, g := range v.Gens() {
		if !e.isNumber(g) {
			panic(newFault(diag.NotANumber, x.Span(), fmt.Sprintf("'%s' is no number", brief(x)), "a value is made of numbers, pi and roots"))
		}
	}
	return v
}

// isNumber reports whether a generator stands for a real number: π, a root or a function
// of such.
func (e *elaborator) isNumber(g field.Gen) bool {
	info := e.k.Info(g)
	switch info.Kind {
	case field.Constant:
		return info.Name == "pi"
	case field.Root, field.Elementary:
		for _, h := range info.Arg.Gens() {
			if !e.isNumber(h) {
				return false
			}
		}
		return true
	}
	return false
}

// definition evaluates the definition of a function on the background.
func (e *elaborator) definition(f *Function) {
	sym := e.symbols[f.Word.Name()]
	if f.Definition == nil || sym == nil || sym.kind != symbolFunction || sym.at != f.Word.Span() || sym.broken {
		return
	}
	e.anywhere, e.bound = true, map[string]field.Elem{} // as for its arguments
	defer func() { e.anywhere, e.bound = false, nil }()
	fn := sym.fn.Fn
	standIns := e.standIns(fn)
	for i, arg := range fn.Args {
		if g, ok := standIns[i]; ok {
			e.bound[fn.ArgNames[i]] = e.k.Gen(g)
		} else if v, err := arg.Normal(); err == nil {
			e.bound[fn.ArgNames[i]] = v
		}
	}
	formal := e.background(f.Definition.X, "the definition of a function")
	for i := range e.model.Functions {
		if d := &e.model.Functions[i]; d.Name == sym.name {
			d.Definition, d.Formal, d.StandIns = f.Definition.X, formal, standIns
			var err error
			if d.Value, err = d.OnBackground(formal); err != nil {
				panic(domainFault(err, f.Definition.X.Span()))
			}
		}
	}
}
