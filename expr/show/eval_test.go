package show_test

// A reader of the part of the notation that Notation writes, independent of the parser: it
// evaluates while it reads, to an element of a field.

import (
	"fmt"
	"math/big"
	"strings"
	"unicode"

	"remnant/expr/field"
)

// world is a field declared by a few statements.
type world struct{ f *field.Field }

// newWorld reads statements: constants, background, functions, given; k and H are declared
// already.
func newWorld(statements string) (*world, error) {
	w := &world{field.New(nil)}
	w.f.Wavenumber("k")
	for n, line := range strings.Split(strings.TrimSpace(statements), "\n") {
		kind, rest, _ := strings.Cut(line, " ")
		if kind == "given" {
			if err := w.given(rest, n); err != nil {
				return nil, err
			}
			continue
		}
		for _, decl := range splitOutside(rest) {
			name, sign := strings.TrimSpace(decl), field.Unknown
			if n, ok := strings.CutSuffix(name, " > 0"); ok {
				name, sign = n, field.Positive
			}
			switch kind {
			case "constants":
				w.f.Constant(name, sign)
			case "background":
				w.f.Function(name, sign)
			case "functions":
				if err := w.function(name); err != nil {
					return nil, err
				}
			default:
				return nil, fmt.Errorf("no statement %q", kind)
			}
		}
	}
	return w, nil
}

func (w *world) given(relation string, n int) error {
	lhs, rhs, _ := strings.Cut(relation, "=")
	name, order := strings.TrimSpace(lhs), 0
	for strings.HasSuffix(name, "'") {
		name, order = strings.TrimSuffix(name, "'"), order+1
	}
	value, err := w.read(rhs)
	if err != nil {
		return err
	}
	g, ok := w.f.Lookup(name)
	if !ok {
		return fmt.Errorf("no name %q", name)
	}
	return w.f.RelateGen(w.f.JetGen(g, order), value, n)
}

// splitOutside splits at the commas that stand outside brackets.
func splitOutside(s string) []string {
	var out []string
	depth, from := 0, 0
	for i, r := range s {
		switch {
		case r == '(':
			depth++
		case r == ')':
			depth--
		case r == ',' && depth == 0:
			out = append(out, s[from:i])
			from = i + 1
		}
	}
	return append(out, s[from:])
}

func (w *world) function(decl string) error {
	name, args, _ := strings.Cut(strings.TrimSuffix(decl, ")"), "(")
	var names []string
	var values []field.Elem
	for _, a := range strings.Split(args, ",") {
		a = strings.TrimSpace(a)
		names = append(names, a)
		expr := a
		if a == "X" {
			expr = "phi'^2/2"
		}
		v, err := w.read(expr)
		if err != nil {
			return err
		}
		values = append(values, v)
	}
	w.f.FreeFunction(name, names, values, field.Unknown)
	return nil
}

// read evaluates an expression.
func (w *world) read(text string) (e field.Elem, err error) {
	r := &reader{w: w, rest: []rune(text)}
	defer func() {
		if v := recover(); v != nil {
			err = fmt.Errorf("%v in %q before %q", v, text, string(r.rest))
		}
	}()
	e = r.sum()
	if r.peek() != 0 {
		panic("something left over")
	}
	return e, nil
}

type reader struct {
	w    *world
	rest []rune
}

func (r *reader) peek() rune {
	for len(r.rest) > 0 && unicode.IsSpace(r.rest[0]) {
		r.rest = r.rest[1:]
	}
	if len(r.rest) == 0 {
		return 0
	}
	return r.rest[0]
}

func (r *reader) take(c rune) bool {
	if r.peek() != c {
		return false
	}
	r.rest = r.rest[1:]
	return true
}

func (r *reader) need(c rune) {
	if !r.take(c) {
		panic(fmt.Sprintf("%c is missing", c))
	}
}

func (r *reader) sum() field.Elem {
	e := r.product()
	for {
		switch {
		case r.take('+'):
			e = e.Add(r.product())
		case r.take('-'):
			e = e.Sub(r.product())
		default:
			return e
		}
	}
}

func (r *reader) product() field.Elem {
	e := r.signed()
	for {
		switch {
		case r.take('*'):
			e = e.Mul(r.signed())
		case r.take('/'):
			e = e.Div(r.signed())
		default:
			return e
		}
	}
}

func (r *reader) signed() field.Elem {
	if r.take('-') {
		return r.signed().Neg()
	}
	e := r.atom()
	if r.take('^') {
		neg := r.take('-')
		n := r.integer()
		if neg {
			n.Neg(n)
		}
		return e.Pow(int(n.Int64()))
	}
	return e
}

func (r *reader) integer() *big.Int {
	r.peek()
	i := 0
	for i < len(r.rest) && unicode.IsDigit(r.rest[i]) {
		i++
	}
	n, ok := new(big.Int).SetString(string(r.rest[:i]), 10)
	if !ok {
		panic("a number is missing")
	}
	r.rest = r.rest[i:]
	return n
}

func (r *reader) name() string {
	r.peek()
	i := 0
	for i < len(r.rest) && (unicode.IsLetter(r.rest[i]) || i > 0 && (unicode.IsDigit(r.rest[i]) || r.rest[i] == '_')) {
		i++
	}
	if i == 0 {
		panic("a name is missing")
	}
	s := string(r.rest[:i])
	r.rest = r.rest[i:]
	return s
}

func (r *reader) atom() field.Elem {
	f := r.w.f
	if r.take('(') {
		e := r.sum()
		r.need(')')
		return e
	}
	if unicode.IsDigit(r.peek()) {
		return f.Rat(new(big.Rat).SetInt(r.integer()))
	}
	name := r.name()
	if r.take('(') {
		arg := r.sum()
		r.need(')')
		e, err := f.Elementary(name, arg)
		if err != nil {
			panic(err)
		}
		return e
	}
	if fn, ok := f.LookupFunction(name); ok {
		index := make([]int, len(fn.Args))
		for r.take(',') {
			arg, found := r.name(), false
			for i, n := range fn.ArgNames {
				if n == arg {
					index[i]++
					found = true
				}
			}
			if !found {
				panic("no argument " + arg)
			}
		}
		return f.FuncJet(fn, index)
	}
	g, ok := f.Lookup(name)
	if !ok {
		panic("no name " + name)
	}
	order := 0
	for r.take('\'') {
		order++
	}
	if order > 0 {
		return f.Jet(g, order)
	}
	return f.Gen(g)
}
