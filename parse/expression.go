package parse

// Single expressions in a model that stands already: what a claim, a check or a program
// that uses the library asks about it.

import (
	"errors"

	"github.com/alecthomas/participle/v2/lexer"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse/diag"
)

// Evaluate gives the value of a background expression, on one line of the notation, in the
// model's field. The error is a diag.List about the text, or a *budget.Stop.
func (m *Model) Evaluate(src *diag.Source) (v field.Elem, err error) {
	defer budget.Catch(&err)
	e := *m.scope
	e.src, e.faults, e.anywhere = src, nil, true
	e.try(func() {
		x := expressionLine(src, &e)
		v = e.background(x, "an expression of the background")
	})
	return v, e.faults.Err()
}

// expressionLine reads the one expression of src.
func expressionLine(src *diag.Source, e *elaborator) Expr {
	s := &scanner{src: src, flat: true}
	s.scan()
	e.faults = append(e.faults, s.faults...)
	whole := diag.Span{Start: 0, End: len(src.Text)}
	if len(s.faults) > 0 || len(s.lines) != 1 {
		panic(newFault(diag.UnexpectedToken, whole, "this is not one expression", "one expression is expected"))
	}
	lex, err := lexer.Upgrade(s.lines[0].lexer())
	if err != nil {
		panic(newFault(diag.UnexpectedToken, whole, err.Error(), ""))
	}
	x, err := parseExpr(lex, true, false)
	var f *fault
	if errors.As(err, &f) {
		panic(f)
	}
	if t := lex.Peek(); !t.EOF() {
		panic(newFault(diag.UnexpectedToken, tokenSpan(t), "'"+t.Value+"' cannot stand here", "the end of the expression is expected"))
	}
	return x
}
