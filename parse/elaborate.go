package parse

import (
	"errors"
	"fmt"
	"slices"

	"remnant/expr/budget"
	"remnant/expr/field"
	"remnant/parse/diag"
)

// Elaboration turns a tree into a model, in passes that each go through the file in its
// order: the clock, the names, the background relations, the abbreviations, the
// Lagrangian, and the rest. A statement that is refused is passed over, and so is what
// fails only for its sake.

type elaborator struct {
	src    *diag.Source
	file   *File
	form   string // of the Lagrangian
	faults diag.List
	model  *Model
	k      *field.Field

	symbols  map[string]*symbol
	names    []string                // of symbols, in the order of declaration
	related  bool                    // the background relations are complete
	anywhere bool                    // names may be used at any place: the text is not the model's
	repeated map[*Statement]bool     // statements that may stand once and stand again
	leaders  map[field.Gen]diag.Span // what the givens define
	valued   map[field.Gen]diag.Span // what numbers gives a value
	bound    map[string]field.Elem   // in the definition of a function: its arguments
	gap      bool                    // a declaration could not be read, so unknown names prove nothing
}

// Load parses and elaborates a source. The error is a diag.List, sorted by place, or the
// *budget.Stop that ended the work.
func Load(src *diag.Source, b *budget.Budget) (*Model, error) {
	file, faults := Parse(src)
	e := newElaborator(file, b)
	e.faults = faults
	return e.run()
}

// Elaborate makes the model of a file that was parsed without a fault. The error is as
// that of Load.
func Elaborate(file *File, b *budget.Budget) (*Model, error) {
	return newElaborator(file, b).run()
}

func newElaborator(file *File, b *budget.Budget) *elaborator {
	k := field.New(b)
	e := &elaborator{src: file.Source, file: file, form: formOfLagrangian(file), k: k, symbols: map[string]*symbol{},
		repeated: map[*Statement]bool{}, leaders: map[field.Gen]diag.Span{},
		valued: map[field.Gen]diag.Span{}}
	for _, word := range file.unread {
		e.gap = e.gap || !slices.Contains(undeclaring, word)
	}
	e.model = &Model{Source: file.Source, K: k, A: k.Int(1), Lapse: k.Int(1), scope: e}
	return e
}

func (e *elaborator) run() (m *Model, err error) {
	defer budget.Catch(&err)
	e.k.Budget().Stage("reading the model")
	if len(e.file.Statements) > 0 {
		e.passes()
	}
	e.faults.Sort()
	if err := e.faults.Err(); err != nil {
		return nil, err
	}
	return e.model, nil
}

func (e *elaborator) passes() {
	e.once()
	e.builtins()
	e.each(e.declarations)
	e.each(e.functions)
	e.gauge()
	e.clockRelations()
	e.each(e.given)
	e.related = true
	e.each(e.let)
	e.each(e.lagrangian)
	e.each(e.rest)
	e.complete()
}

// each calls visit for every statement; what it refuses becomes one fault.
func (e *elaborator) each(visit func(*Statement)) {
	for _, s := range e.file.Statements {
		if !e.repeated[s] {
			e.try(func() { visit(s) })
		}
	}
}

// try runs a part that may panic with a *fault, and reports whether it did not.
func (e *elaborator) try(part func()) (ok bool) {
	defer func() {
		switch v := recover().(type) {
		case nil:
			ok = true
		case *fault:
			e.report(v)
		default:
			panic(v)
		}
	}()
	part()
	return true
}

// undeclaring are the statements that declare no name.
var undeclaring = []string{"model", "clock", "given", "gauge", "sector", "lagrangian", "keep", "small", "numbers"}

// report records a fault, unless it follows from another.
func (e *elaborator) report(f *fault) {
	if f.Kind == "" || e.gap && (f.Kind == diag.UnknownName || f.Kind == diag.FieldUnused) || len(e.file.unread) > 0 && f.Kind == diag.Missing {
		return
	}
	if len(e.faults) >= maxFaults {
		return
	}
	f.Source = e.src
	for _, old := range e.faults {
		if old.Kind == f.Kind && old.Span == f.Span && old.Source == f.Source {
			return // an abbreviation is evaluated more than once
		}
	}
	e.faults = append(e.faults, f.Diagnostic)
}

// once refuses statements that may stand once and stand twice, and reads the header.
func (e *elaborator) once() {
	first := map[string]diag.Span{}
	for _, s := range e.file.Statements {
		switch {
		case s.Model != nil, s.Clock != nil, s.Gauge != nil, s.Sector != nil, s.Lagrangian != nil, s.Keep != nil, s.Small != nil:
		default:
			continue
		}
		word := s.Keyword.Text
		if old, ok := first[word]; ok {
			f := newFault(diag.StatementTwice, s.Keyword.Span(), fmt.Sprintf("a second %s statement", word), "one is allowed in a file")
			f.Related = []diag.Related{{Span: old, Label: "the first one"}}
			e.report(f)
			e.repeated[s] = true
			continue
		}
		first[word] = s.Keyword.Span()
		switch {
		case s.Model != nil:
			e.model.Title = s.Model.Text()
		case s.Clock != nil:
			e.model.Clock = clockOf(s.Clock.Name())
		}
	}
}

func clockOf(word string) Clock {
	for i, w := range clockWords {
		if w == word {
			return Clock(i)
		}
	}
	return Cosmic
}

// let checks an abbreviation and enters its value.
func (e *elaborator) let(s *Statement) {
	if s.Let == nil || !e.quadratic() {
		return
	}
	sym := e.symbols[s.Let.Word.Name()]
	if sym == nil || sym.let != s.Let {
		return
	}
	value, ok := form{}, false
	if !e.try(func() { value = e.letValue(sym) }) {
		sym.broken = true
		return
	}
	l := Let{Name: sym.name, Span: sym.at}
	if l.Value, ok = value.elem(); ok {
		l.Background = true
	}
	e.model.Lets = append(e.model.Lets, l)
}

// lagrangian reads the action.
func (e *elaborator) lagrangian(s *Statement) {
	if s.Lagrangian == nil {
		return
	}
	e.model.LagrangianSpan = s.At
	switch s.Lagrangian.Form.Text {
	case "covariant":
		e.model.Covariant = e.covariant(s.Lagrangian.Value.X)
		return
	case "adm":
		e.model.ADM = e.covariant(s.Lagrangian.Value.X)
		return
	}
	f := e.value(s.Lagrangian.Value.X)
	for _, t := range f.terms {
		if t.degree != 2 {
			panic(e.wrongOrder(t.degree, t.at))
		}
		e.model.Quadratic = append(e.model.Quadratic, Term{t.coef, t.u, t.v, t.at})
	}
	e.unused(s.Lagrangian.Value.X)
}

func (e *elaborator) wrongOrder(degree int, at diag.Span) *fault {
	return newFault(diag.WrongOrder, at, fmt.Sprintf("'%s' is of order %d in the perturbations", e.quote(at), degree),
		"every term of a quadratic Lagrangian is of order 2")
}

// unused refuses fields that stand nowhere in the Lagrangian.
func (e *elaborator) unused(lagrangian Expr) {
	used := map[string]bool{}
	e.collectNames(lagrangian, used)
	for _, f := range e.model.Fields {
		if !used[f.Name] {
			e.report(newFault(diag.FieldUnused, f.Span, fmt.Sprintf("'%s' is declared and never used", e.quote(f.Span)),
				"every field stands in the Lagrangian"))
		}
	}
}

// collectNames marks the names in x, also those behind abbreviations.
func (e *elaborator) collectNames(x Expr, used map[string]bool) {
	Walk(x, func(y Expr) bool {
		n, ok := y.(*Name)
		if !ok || used[n.Name] {
			return true
		}
		used[n.Name] = true
		if s := e.symbols[n.Name]; s != nil && s.let != nil {
			e.collectNames(s.let.Value.X, used)
		}
		return true
	})
}

// formOfLagrangian is the word for the form of the file's Lagrangian.
func formOfLagrangian(file *File) string {
	for _, s := range file.Statements {
		if s.Lagrangian != nil {
			return s.Lagrangian.Form.Text
		}
	}
	return "quadratic"
}

func (e *elaborator) quadratic() bool { return e.form == "quadratic" }

// complete refuses a model that lacks a part.
func (e *elaborator) complete() {
	m := e.model
	end := diag.Span{Start: len(e.src.Text), End: len(e.src.Text)}
	if m.LagrangianSpan == (diag.Span{}) {
		e.report(newFault(diag.Missing, end, "the model has no Lagrangian", "a line is missing: lagrangian quadratic = …"))
		return
	}
	if len(m.Fields) == 0 && e.quadratic() {
		e.report(newFault(diag.Missing, m.LagrangianSpan, "the model has no fields", "a line is missing above: fields zeta"))
	}
}

// domainFault puts an error of the algebra about a function's argument at its place.
func domainFault(err error, at diag.Span) *fault {
	var zero *field.ErrZeroDivisor
	if errors.As(err, &zero) {
		return newFault(diag.DivideByZero, at, "this divides by zero", "a denominator vanishes by the background relations")
	}
	return newFault(diag.BadArgument, at, err.Error(), "this cannot be computed exactly")
}
