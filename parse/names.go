package parse

import (
	"fmt"
	"slices"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// The names of a model. A name is declared once, before it is used; some are reserved;
// for an unknown one the nearest known name is shown.

type symbolKind uint8

const (
	symbolConstant symbolKind = iota
	symbolBackground
	symbolFunction
	symbolFormFactor
	symbolLet
	symbolField
	symbolBuiltin
)

var kindNames = map[symbolKind]string{
	symbolConstant: "a constant", symbolBackground: "a function of time", symbolFunction: "a free function",
	symbolFormFactor: "a form factor", symbolLet: "an abbreviation", symbolField: "a perturbation",
	symbolBuiltin: "a name of the notation",
}

// symbol is what a name stands for.
type symbol struct {
	name   string
	kind   symbolKind
	at     diag.Span // of the declaration; empty for builtin names
	end    int       // the name may be used from here on
	gen    field.Gen // constant, background, and builtin names that are generators
	fn     *FunctionDecl
	args   []*Argument // of a function
	index  int         // field
	let    *Definition // let
	value  *form       // let: what it stands for, once the relations are complete
	form   *FormFactorDecl
	broken bool // its declaration was refused; uses are passed over in silence
}

// elementaryNames are the functions of the notation.
var elementaryNames = []string{"sqrt", "exp", "log", "sin", "cos", "tanh"}

// reservedNames may not be declared; H may, as a function of time.
var reservedNames = append([]string{"k", "box", "pi", "t", "H"}, elementaryNames...)

// formNames are reserved in a form of the Lagrangian beside those above.
var formNames = map[string][]string{
	"covariant": {"R", "Ric", "Riem", "Weyl", "G", "GB", "X"},
	"adm":       {"N", "K", "R3", "Vn", "acc"},
}

func (e *elaborator) reserved(name string) bool {
	return slices.Contains(reservedNames, name) || slices.Contains(formNames[e.form], name)
}

// declare enters a name. It returns nil, with the fault recorded, if that is not allowed.
func (e *elaborator) declare(w *Word, kind symbolKind, end int) *symbol {
	name := w.Name()
	if e.reserved(name) && !(name == "H" && kind == symbolBackground) {
		e.report(newFault(diag.Reserved, w.Span(), fmt.Sprintf("'%s' is reserved and cannot be declared", w.Text), e.reservedHint(name)))
		return nil
	}
	if old, ok := e.symbols[name]; ok && old.at != (diag.Span{}) {
		f := newFault(diag.DeclaredTwice, w.Span(), fmt.Sprintf("'%s' is declared twice", w.Text), "one declaration of a name is allowed")
		f.Related = []diag.Related{{Span: old.at, Label: "declared here as " + kindNames[old.kind]}}
		e.report(f)
		return nil
	}
	s := &symbol{name: name, kind: kind, at: w.Span(), end: end}
	e.enter(s)
	return s
}

func (e *elaborator) reservedHint(name string) string {
	switch name {
	case "k":
		return "k is the comoving wave number"
	case "box":
		return "box is the d'Alembertian"
	case "pi":
		return "pi is the number"
	case "t":
		return "t is cosmic time"
	case "H":
		return "H is the expansion rate; declare it in 'background' if it is a function of its own"
	}
	if slices.Contains(elementaryNames, name) {
		return name + " is an elementary function"
	}
	return fmt.Sprintf("%s is a quantity of the %s form", name, e.form)
}

func (e *elaborator) enter(s *symbol) {
	if _, ok := e.symbols[s.name]; !ok {
		e.names = append(e.names, s.name)
	}
	e.symbols[s.name] = s
}

// lookup resolves a name that stands in an expression.
func (e *elaborator) lookup(n *Name) *symbol {
	s, ok := e.symbols[n.Name]
	switch {
	case !ok:
		panic(e.unknown(n))
	case s.broken:
		panic(&fault{}) // the declaration has its own message
	case s.end > n.At.Start && !e.anywhere:
		f := newFault(diag.UsedBefore, n.At, fmt.Sprintf("'%s' is used before it is declared", n.Text), "a name is declared above the place where it is used")
		f.Related = []diag.Related{{Span: s.at, Label: "declared here"}}
		panic(f)
	}
	return s
}

// unknown says that a name is not declared, and what may have been meant.
func (e *elaborator) unknown(n *Name) *fault {
	if len(e.faults) >= maxFaults {
		return &fault{} // it would not be shown, and the search takes time
	}
	hint := "names are declared in constants, background, functions, fields or let"
	if n.Name == "H" {
		hint = "H is known where the scale factor a is declared in 'background'"
	} else if _, ok := sliceRank[n.Name]; ok && e.isADM() {
		return newFault(diag.NoMeaning, n.At, fmt.Sprintf("'%s' is a perturbation together with its background, and stands in the Lagrangian only", n.Text),
			"on the background N is 1 and K is three times the physical rate")
	} else if near, ok := nearest(n.Name, e.names); ok {
		hint = fmt.Sprintf("the nearest name is '%s'", near)
		if s := e.symbols[near]; s.at != (diag.Span{}) {
			hint += fmt.Sprintf(", declared on line %d", e.file.Source.Line(s.at.Start))
		}
	}
	return newFault(diag.UnknownName, n.At, fmt.Sprintf("'%s' is not declared", n.Text), hint)
}
