package parse

import (
	"errors"
	"fmt"
	"math/big"

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
	faults diag.List
	model  *Model
	k      *field.Field

	symbols  map[string]*symbol
	names    []string                // of symbols, in the order of declaration
	related  bool                    // the background relations are complete
	anywhere bool                    // names may be used at any place: the text is not the model's
	leaders  map[field.Gen]diag.Span // what the givens define
	hasGap   bool                    // a declaration is missing, so unknown names prove nothing
}

// Load parses and elaborates a source. The error is a diag.List, sorted by place, or the
// *budget.Stop that ended the work.
func Load(src *diag.Source, b *budget.Budget) (*Model, error) {
	file, faults := Parse(src)
	e := newElaborator(file, b)
	e.faults, e.hasGap = faults, len(faults) > 0
	return e.run()
}

// Elaborate makes the model of a file that was parsed without a fault. The error is as
// that of Load.
func Elaborate(file *File, b *budget.Budget) (*Model, error) {
	return newElaborator(file, b).run()
}

func newElaborator(file *File, b *budget.Budget) *elaborator {
	k := field.New(b)
	e := &elaborator{src: file.Source, file: file, k: k, symbols: map[string]*symbol{}, leaders: map[field.Gen]diag.Span{}}
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
		e.try(func() { visit(s) })
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

// report records a fault, unless it follows from another.
func (e *elaborator) report(f *fault) {
	if f.Kind == "" || e.hasGap && (f.Kind == diag.UnknownName || f.Kind == diag.Missing || f.Kind == diag.FieldUnused) {
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

// builtins enters the names that need no declaration.
func (e *elaborator) builtins() {
	k := e.k.Wavenumber("k")
	e.model.Wavenumber = e.k.Gen(k)
	e.enter(&symbol{name: "k", kind: symbolBuiltin, gen: k})
	for _, name := range []string{"pi", "t", "box"} {
		e.enter(&symbol{name: name, kind: symbolBuiltin})
	}
	hasA, hasH := e.declaresBackground("a"), e.declaresBackground("H")
	if !hasH && (hasA || e.model.Clock == Efolds) {
		sign := field.Unknown
		if e.model.Clock == Efolds {
			sign = field.Positive // the lapse 1/H is
		}
		e.enter(&symbol{name: "H", kind: symbolBackground, gen: e.k.Function("H", sign)})
	}
}

func (e *elaborator) declaresBackground(name string) bool {
	for _, s := range e.file.Statements {
		for _, b := range s.Background {
			if b.Word.Name() == name {
				return true
			}
		}
	}
	return false
}

// declarations enters the names that a statement declares.
func (e *elaborator) declarations(s *Statement) {
	switch {
	case s.Constants != nil:
		for _, c := range s.Constants {
			if sym := e.declare(&c.Word, symbolConstant, s.At.End); sym != nil {
				sym.gen = e.k.Constant(sym.name, signOf(c.Sign))
				e.model.Constants = append(e.model.Constants, Declared{sym.name, sym.at, sym.gen})
			}
		}
	case s.Background != nil:
		for _, b := range s.Background {
			e.declareBackground(b, s.At.End)
		}
	case s.Fields != nil:
		for _, w := range s.Fields {
			if sym := e.declare(w, symbolField, s.At.End); sym != nil {
				sym.index = len(e.model.Fields)
				e.model.Fields = append(e.model.Fields, FieldDecl{sym.name, sym.at})
			}
		}
	case s.FormFactor != nil:
		e.declare(&s.FormFactor.Word, symbolFormFactor, s.At.End)
		if r := s.FormFactor.Rule; r != nil {
			if f := oneOf(&r.Of, []string{s.FormFactor.Word.Text}); f != nil {
				e.report(f)
			}
		}
	case s.Let != nil:
		if sym := e.declare(&s.Let.Word, symbolLet, s.At.End); sym != nil {
			sym.let = s.Let
		}
	case s.Functions != nil:
		for _, f := range s.Functions {
			if sym := e.declare(&f.Word, symbolFunction, s.At.End); sym != nil {
				sym.args, sym.broken = f.Arguments, true // until its arguments are known
			}
		}
	}
}

func (e *elaborator) declareBackground(b *Symbol, end int) {
	sym := e.declare(&b.Word, symbolBackground, end)
	if sym == nil {
		return
	}
	sign := signOf(b.Sign)
	taken := sym.name == "a" || sym.name == "H" && e.model.Clock == Efolds // positive, as N̄ is
	if taken {
		if sign == field.Negative {
			e.report(newFault(diag.UnknownWord, b.Word.Span(), fmt.Sprintf("'%s' is positive", b.Word.Text), "a, k and the lapse are taken to be positive"))
		}
		sign = field.Positive
	}
	sym.gen = e.k.Function(sym.name, sign)
	e.model.Background = append(e.model.Background, Declared{sym.name, sym.at, sym.gen})
}

func signOf(mark string) field.Sign {
	switch mark {
	case ">":
		return field.Positive
	case "<":
		return field.Negative
	}
	return field.Unknown
}

// functions gives the declared functions their arguments. These may be declared below:
// the statement names them rather than uses them.
func (e *elaborator) functions(s *Statement) {
	e.lapse()
	e.anywhere = true
	defer func() { e.anywhere = false }()
	for _, f := range s.Functions {
		sym := e.symbols[f.Word.Name()]
		if sym == nil || sym.kind != symbolFunction || sym.at != f.Word.Span() {
			continue
		}
		e.try(func() {
			names, args := e.arguments(f)
			fn := e.k.FreeFunction(sym.name, names, args, field.Unknown)
			e.model.Functions = append(e.model.Functions, FunctionDecl{Name: sym.name, Span: sym.at, Fn: fn})
			sym.fn = &FunctionDecl{Fn: fn}
			sym.broken = false
		})
	}
}

// lapse sets the scale factor and N̄.
func (e *elaborator) lapse() {
	m := e.model
	if a, ok := e.symbols["a"]; ok && a.kind == symbolBackground {
		m.A = e.k.Gen(a.gen)
	}
	switch m.Clock {
	case Conformal:
		m.Lapse = m.A
	case Efolds:
		if h := e.symbols["H"]; !e.k.Gen(h.gen).IsZero() {
			m.Lapse = e.k.Gen(h.gen).Inv()
		}
	}
}

// arguments resolves what a function depends on.
func (e *elaborator) arguments(f *Function) ([]string, []field.Elem) {
	var names []string
	var args []field.Elem
	for _, a := range f.Arguments {
		name := a.Word.Name()
		if a.Of != nil {
			name += "(" + a.Of.Name() + ")"
		}
		for _, old := range names {
			if old == name {
				panic(newFault(diag.DeclaredTwice, a.Word.Span(), fmt.Sprintf("the argument '%s' is named twice", name), "an argument is named once"))
			}
		}
		names = append(names, name)
		args = append(args, e.argument(a, f))
	}
	return names, args
}

func (e *elaborator) argument(a *Argument, f *Function) field.Elem {
	name := &Name{node{a.Word.Span()}, a.Word.Text, a.Word.Name()}
	sym, declared := e.symbols[name.Name]
	switch {
	case name.Name == "X" && (a.Of != nil || !declared):
		return e.kinetic(a, f)
	case a.Of != nil:
		panic(newFault(diag.WrongArguments, a.Word.Span(), fmt.Sprintf("'%s' cannot be an argument of a function", a.Word.Text), "X(phi) is the only argument of this form"))
	case name.Name == "R" && !declared:
		return e.ricci(name.At)
	case name.Name == "t":
		return e.k.Gen(e.time())
	}
	sym = e.lookup(name)
	if sym.kind != symbolBackground && sym.kind != symbolConstant {
		panic(newFault(diag.WrongArguments, name.At, fmt.Sprintf("'%s' is %s and cannot be an argument of a function", name.Text, kindNames[sym.kind]),
			"functions depend on functions of time, X, R or t"))
	}
	return e.k.Gen(sym.gen)
}

// kinetic is X = φ'²/(2N̄²) for the scalar that an argument names, or the only one there is.
func (e *elaborator) kinetic(a *Argument, f *Function) field.Elem {
	var of *Name
	switch {
	case a.Of != nil:
		of = &Name{node{a.Of.Span()}, a.Of.Text, a.Of.Name()}
	default:
		of = e.onlyScalar(a, f)
	}
	sym := e.lookup(of)
	if sym.kind != symbolBackground {
		panic(newFault(diag.WrongArguments, of.At, fmt.Sprintf("'%s' is %s and has no kinetic term X", of.Text, kindNames[sym.kind]), "X belongs to a scalar declared in 'background'"))
	}
	return e.kineticOf(sym.gen)
}

func (e *elaborator) kineticOf(phi field.Gen) field.Elem {
	return e.k.Jet(phi, 1).Div(e.model.Lapse).Pow(2).Scale(1, 2)
}

// onlyScalar finds the scalar of a bare X: the other argument, if it is one, or phi.
func (e *elaborator) onlyScalar(x *Argument, f *Function) *Name {
	var found []*Argument
	for _, a := range f.Arguments {
		if s, ok := e.symbols[a.Word.Name()]; ok && a.Of == nil && s.kind == symbolBackground && a.Word.Name() != "a" && a.Word.Name() != "H" {
			found = append(found, a)
		}
	}
	if len(found) == 1 {
		return &Name{node{found[0].Word.Span()}, found[0].Word.Text, found[0].Word.Name()}
	}
	if s, ok := e.symbols["phi"]; ok && s.kind == symbolBackground && len(found) == 0 {
		return &Name{node{x.Word.Span()}, "phi", "phi"}
	}
	panic(newFault(diag.WrongArguments, x.Word.Span(), "it is not clear which scalar X belongs to", "with several scalars write X(phi)"))
}

// ricci is the background value of R: 6 N̄⁻² (a”/a + a'²/a² − a'N̄'/(aN̄)).
func (e *elaborator) ricci(at diag.Span) field.Elem {
	a, n := e.model.A, e.model.Lapse
	if a.IsOne() {
		panic(newFault(diag.WrongArguments, at, "R needs the scale factor", "declare a in 'background'"))
	}
	h := a.D().Div(a)
	sum := a.Dn(2).Div(a).Add(h.Pow(2)).Sub(h.Mul(n.D()).Div(n))
	return sum.Scale(6, 1).Div(n.Pow(2))
}

// time is the generator t, cosmic time: t' = N̄.
func (e *elaborator) time() field.Gen {
	if g, ok := e.k.Lookup("t"); ok {
		return g
	}
	t := e.k.Function("t", field.Unknown)
	e.symbols["t"].gen = t
	e.clockRelation("t'", e.k.JetGen(t, 1), e.model.Lapse)
	return t
}

// constantPi is the number π.
func (e *elaborator) constantPi() field.Elem {
	if g, ok := e.k.Lookup("pi"); ok {
		return e.k.Gen(g)
	}
	return e.k.Gen(e.k.Constant("pi", field.Positive))
}

// let checks an abbreviation and enters its value.
func (e *elaborator) let(s *Statement) {
	if s.Let == nil {
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
	if s.Lagrangian == nil || e.model.LagrangianSpan != (diag.Span{}) {
		return
	}
	e.model.LagrangianSpan = s.At
	if form := s.Lagrangian.Form; form.Text != "quadratic" {
		panic(newFault(diag.NotYetSupported, form.Span(), fmt.Sprintf("a Lagrangian of the %s form is not yet supported", form.Text),
			"a quadratic Lagrangian can be reduced: lagrangian quadratic = …"))
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
	return newFault(diag.WrongOrder, at, fmt.Sprintf("'%s' is of order %d in the perturbations", e.src.Slice(at), degree),
		"every term of a quadratic Lagrangian is of order 2")
}

// unused refuses fields that stand nowhere in the Lagrangian.
func (e *elaborator) unused(lagrangian Expr) {
	used := map[string]bool{}
	e.collectNames(lagrangian, used)
	for _, f := range e.model.Fields {
		if !used[f.Name] {
			e.report(newFault(diag.FieldUnused, f.Span, fmt.Sprintf("'%s' is declared and never used", e.src.Slice(f.Span)),
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

// rest reads what needs the names and relations to be complete.
func (e *elaborator) rest(s *Statement) {
	switch {
	case s.Gauge != nil && e.quadratic():
		panic(newFault(diag.WrongForm, s.At, "a quadratic Lagrangian has no gauge to choose", "gauge belongs to the covariant and adm forms"))
	case s.Sector != nil && s.Sector.Text != "scalar":
		panic(newFault(diag.NotYetSupported, s.Sector.Span(), fmt.Sprintf("the %s sector is not yet supported", s.Sector.Text), "sector scalar can be reduced"))
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

func (e *elaborator) quadratic() bool {
	for _, s := range e.file.Statements {
		if s.Lagrangian != nil {
			return s.Lagrangian.Form.Text == "quadratic"
		}
	}
	return true
}

func (e *elaborator) keep(s *Statement) {
	w := &s.Keep.Word
	sym := e.symbols[w.Name()]
	if s.Keep.Definition == nil {
		if !e.quadratic() {
			return
		}
		name := &Name{node{w.Span()}, w.Text, w.Name()}
		if sym = e.lookup(name); sym.kind != symbolField {
			panic(newFault(diag.NotAField, w.Span(), fmt.Sprintf("'%s' is %s and cannot be kept", w.Text, kindNames[sym.kind]), "a perturbation declared in 'fields' is kept, or a new one: keep u = expression"))
		}
		e.model.Keep = &Keep{Name: sym.name, Span: sym.at, Field: sym.index}
		e.model.Keep.Span = w.Span()
		return
	}
	if e.declare(w, symbolField, len(e.src.Text)+1) == nil {
		return
	}
	f := e.value(s.Keep.Definition.X)
	keep := &Keep{Name: w.Name(), Span: w.Span(), Field: -1}
	for _, t := range f.terms {
		if t.degree != 1 {
			panic(newFault(diag.WrongOrder, t.at, fmt.Sprintf("'%s' is of order %d in the perturbations", e.src.Slice(t.at), t.degree), "a new variable is of order 1"))
		}
		keep.Definition = append(keep.Definition, LinearTerm{t.coef, t.u, t.at})
	}
	if len(f.terms) == 0 {
		panic(newFault(diag.WrongOrder, s.Keep.Definition.X.Span(), "the new variable is zero", "a new variable is of order 1 in the perturbations"))
	}
	e.model.Keep = keep
}

// maxSeriesOrder bounds the order that a file may ask series to be carried to.
const maxSeriesOrder = 100

func (e *elaborator) small(c *SmallClause) {
	for _, w := range c.Names {
		sym := e.lookup(&Name{node{w.Span()}, w.Text, w.Name()})
		if sym.kind != symbolConstant && sym.kind != symbolBackground {
			panic(newFault(diag.NotASymbol, w.Span(), fmt.Sprintf("'%s' is %s and cannot be small", w.Text, kindNames[sym.kind]), "a constant or a function of time is small"))
		}
		for _, g := range e.model.Small {
			if g == sym.gen {
				panic(newFault(diag.DeclaredTwice, w.Span(), fmt.Sprintf("'%s' is named twice", w.Text), "a parameter is named once"))
			}
		}
		e.model.Small = append(e.model.Small, sym.gen)
	}
	order := c.Order
	n, ok := new(big.Int).SetString(order.Text, 10)
	if !ok || n.Cmp(big.NewInt(maxSeriesOrder)) > 0 {
		at := diag.Span{Start: order.Pos.Offset, End: order.Pos.Offset + len(order.Text)}
		panic(newFault(diag.BadExponent, at, fmt.Sprintf("'%s' is no order of a series", order.Text), "a whole number up to 100 is expected"))
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
		panic(newFault(diag.NotASymbol, left.Span(), fmt.Sprintf("'%s' has no value of its own", String(left)), "the forms are: M = 1 for a constant, phi(0) = 27/5 for an initial value"))
	}
	if isConstant := e.k.Info(g).Kind == field.Constant; isConstant == initial {
		hint := fmt.Sprintf("an initial value is written %s(0)", String(left))
		if isConstant {
			hint = "a constant has its value at all times: " + String(left) + " = …"
		}
		panic(newFault(diag.NotASymbol, eq.Left.X.Span(), fmt.Sprintf("'%s' cannot be given like this", String(eq.Left.X)), hint))
	}
	for _, old := range e.model.Numbers {
		if old.Gen == g {
			f := newFault(diag.DeclaredTwice, eq.Left.X.Span(), fmt.Sprintf("'%s' has two values", String(eq.Left.X)), "one value is allowed")
			f.Related = []diag.Related{{Span: old.Span, Label: "the first one"}}
			panic(f)
		}
	}
	e.model.Numbers = append(e.model.Numbers, NumberDecl{g, initial, e.numeric(eq.Right.X), eq.Span()})
}

// numeric evaluates an expression that must be a number.
func (e *elaborator) numeric(x Expr) field.Elem {
	v := e.background(x, "a value")
	for _, g := range v.Gens() {
		if !e.isNumber(g) {
			panic(newFault(diag.NotANumber, x.Span(), fmt.Sprintf("'%s' is no number", String(x)), "a value is made of numbers, pi and roots"))
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
	e.anywhere = true // as its arguments, which the definition is made of
	defer func() { e.anywhere = false }()
	value := e.background(f.Definition.X, "the definition of a function")
	for i := range e.model.Functions {
		if d := &e.model.Functions[i]; d.Name == sym.name {
			d.Definition, d.Value = f.Definition.X, value
		}
	}
}

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
				panic(newFault(diag.NotASymbol, p.Name.Span(), fmt.Sprintf("'%s' cannot be given a value", String(p.Name)), "values are given to constants, k and functions of time with their derivatives"))
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

// domainFault puts an error of the algebra about a function's argument at its place.
func domainFault(err error, at diag.Span) *fault {
	var zero *field.ErrZeroDivisor
	if errors.As(err, &zero) {
		return newFault(diag.DivideByZero, at, "this divides by zero", "a denominator vanishes by the background relations")
	}
	return newFault(diag.BadArgument, at, err.Error(), "this cannot be computed exactly")
}
