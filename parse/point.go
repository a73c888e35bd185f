package parse

import (
	"errors"
	"fmt"

	"github.com/alecthomas/participle/v2/lexer"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse/diag"
)

// Points: values for the symbols of a model, as the command line or a file gives them.

// Point is one assignment of a point: name = value.
type Point struct {
	Name, Value Expr
	At          diag.Span
}

// Points reads the assignments of a point, split at semicolons or one on a line; here a
// semicolon is no derivative, and blanks at the beginning of a line mean nothing.
func Points(src *diag.Source) ([]Point, diag.List) {
	s := &scanner{src: src, flat: true}
	s.scan()
	var list []Point
	for i := range s.lines {
		l := &s.lines[i]
		if l.broken || len(l.tokens) == 0 {
			continue
		}
		points, err := pointLine(l)
		if err != nil {
			err.Source = src
			s.faults = append(s.faults, err.Diagnostic)
		}
		list = append(list, points...)
	}
	return list, firstOfEach(s.faults, s.lines)
}

// pointLine reads the assignments of one line.
func pointLine(l *line) ([]Point, *fault) {
	lex, err := lexer.Upgrade(l.lexer())
	if err != nil {
		return nil, newFault(diag.UnexpectedToken, l.span(), err.Error(), "")
	}
	var list []Point
	for !lex.Peek().EOF() {
		point, err := pointItem(lex)
		if err != nil {
			return list, err
		}
		list = append(list, point)
		t := lex.Peek()
		if t.EOF() {
			break
		}
		if t.Value != ";" {
			return list, newFault(diag.PointForm, tokenSpan(t), "'"+t.Value+"' cannot stand here", "a semicolon or the end of the line is expected")
		}
		lex.Next()
	}
	return list, nil
}

// pointItem reads name = value.
func pointItem(lex *lexer.PeekingLexer) (Point, *fault) {
	name, f := pointSide(lex)
	if f != nil {
		return Point{}, f
	}
	if t := lex.Peek(); t.Value != "=" {
		return Point{}, newFault(diag.PointForm, tokenSpan(t), "a value is missing", "the form is: H = 1/10; phi' = 1/3")
	}
	lex.Next()
	value, f := pointSide(lex)
	if f != nil {
		return Point{}, f
	}
	return Point{name, value, name.Span().Join(value.Span())}, nil
}

func pointSide(lex *lexer.PeekingLexer) (Expr, *fault) {
	x, err := parseExpr(lex, true, false)
	var f *fault
	errors.As(err, &f)
	return x, f
}

// Assignment is a value that a point gives to a generator.
type Assignment struct {
	Gen   field.Gen
	Name  string     // as the point spells it
	Value field.Elem // a number
	Span  diag.Span
}

// Point reads a point of the model: values of constants, k and jets. The error is a
// diag.List about the point's own text, or a *budget.Stop.
func (m *Model) Point(src *diag.Source) (list []Assignment, err error) {
	defer budget.Catch(&err)
	points, faults := Points(src)
	e := *m.scope
	e.src, e.faults, e.anywhere = src, faults, true
	for _, p := range points {
		e.try(func() {
			g, ok := e.symbolGen(p.Name)
			if !ok {
				panic(newFault(diag.NotASymbol, p.Name.Span(), fmt.Sprintf("'%s' cannot be given a value", brief(p.Name)), "values are given to constants, k and functions of time with their derivatives"))
			}
			list = append(list, Assignment{g, String(p.Name), e.numeric(p.Value), p.At})
		})
	}
	e.faults.Sort()
	if err := e.faults.Err(); err != nil {
		return nil, err
	}
	return list, nil
}
