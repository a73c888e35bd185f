package parse

import (
	"fmt"

	"remnant/expr/field"
	"remnant/parse/diag"
)

// Declarations: the generators that constants, functions of time and free functions are,
// and those that a model has without declaring them.

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
		e.declareFormFactor(s)
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
	named := map[string]bool{}
	for _, a := range f.Arguments {
		name := a.Word.Name()
		if a.Of != nil {
			name += "(" + a.Of.Name() + ")"
		}
		if named[name] {
			panic(newFault(diag.DeclaredTwice, a.Word.Span(), fmt.Sprintf("the argument '%s' is named twice", name), "an argument is named once"))
		}
		named[name] = true
		names = append(names, name)
		args = append(args, e.argument(a, f))
	}
	return names, args
}

func (e *elaborator) argument(a *Argument, f *Function) field.Elem {
	if v, ok := e.admArgument(a); ok {
		return v
	}
	name := &Name{node{a.Word.Span()}, a.Word.Text, a.Word.Name()}
	_, declared := e.symbols[name.Name]
	switch {
	case name.Name == "X" && (a.Of != nil || !declared):
		return e.kinetic(a, f)
	case a.Of != nil:
		panic(newFault(diag.WrongArguments, a.Word.Span(), fmt.Sprintf("'%s' cannot be an argument of a function", a.Word.Text), "X(phi) is the only argument of this form"))
	case name.Name == "R" && !declared:
		return e.ricci(name.At)
	case name.Name == "GB" && !declared:
		return e.gaussBonnetBackground(name.At)
	case name.Name == "t":
		return e.k.Gen(e.time())
	}
	sym := e.lookup(name)
	if sym.kind != symbolBackground && sym.kind != symbolConstant {
		panic(newFault(diag.WrongArguments, name.At, fmt.Sprintf("'%s' is %s and cannot be an argument of a function", name.Text, kindNames[sym.kind]),
			"functions depend on functions of time, X, R, GB or t"))
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

// gaussBonnetBackground is the background value of the Gauss–Bonnet scalar: 24h²(h² + N̄⁻¹h′) with
// the physical rate h = a'/(N̄a).
func (e *elaborator) gaussBonnetBackground(at diag.Span) field.Elem {
	a, n := e.model.A, e.model.Lapse
	if a.IsOne() {
		panic(newFault(diag.WrongArguments, at, "GB needs the scale factor", "declare a in 'background'"))
	}
	h := a.D().Div(a.Mul(n))
	return h.Pow(2).Mul(h.Pow(2).Add(h.D().Div(n))).Scale(24, 1)
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
