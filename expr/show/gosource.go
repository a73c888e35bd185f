package show

// Go source: float64 expressions that follow the layout. For code that shares
// subexpressions see the generator of packages; this is for single small formulas.

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"remnant/expr/field"
)

// GoSource is n as a float64 expression of Go, gofmt's spacing aside. ident names the
// symbols: a name with its time derivatives and its derivatives by arguments (GoName, or
// Identifiers.Symbol where names could meet).
// Powers are repeated products, functions those of package math. Equations, integrals and
// spatial derivatives have no value and panic.
func GoSource(n Node, ident func(name string, primes int, by []string) string) string {
	w := newLine(&goDialect{ident: ident})
	w.write(n, 0)
	return w.flat()
}

type goDialect struct {
	asciiDialect
	ident func(name string, primes int, by []string) string
}

func (*goDialect) gap() string                { return "*" }
func (*goDialect) brackets() (string, string) { return "(", ")" }

func (d *goDialect) name(s symbol) string { return d.ident(s.name, s.primes, s.by) }

// expanded multiplies the base by itself, in brackets, so that it may stand anywhere.
func (*goDialect) expanded(base string, exp int) string {
	product := "(" + strings.Repeat(base+"*", max(exp, -exp)-1) + base + ")"
	switch {
	case exp == 0:
		return "1"
	case exp < 0:
		return "(1 / " + product + ")"
	}
	return product
}

func (*goDialect) functionName(fn string) string {
	return "math." + strings.ToUpper(fn[:1]) + fn[1:]
}

// fraction keeps a quotient of integers from being divided as integers.
func (*goDialect) fraction(num, den string) string { return "(" + num + ".0 / " + den + ")" }

func (*goDialect) spatial(n int, x symbol) string {
	panic(fmt.Sprintf("show: ∂%d of %s has no value", n, x.name))
}

func (d *goDialect) contracted(n int, x, y symbol) string { return d.spatial(n, x) }

func (*goDialect) integral(string) string { panic("show: an integral has no value") }
func (*goDialect) equals() string         { panic("show: an equation has no value") }

// Identifiers names generators in Go, each by a name of its own.
type Identifiers struct {
	names map[field.Gen]string
	keys  map[string]string
}

// GoIdentifiers gives the generators exported names: GoName where no two meet. Of names that
// differ in their case only, the small one gets Small before it; of other names that meet,
// the later ones are numbered.
func GoIdentifiers(f *field.Field, gens []field.Gen) *Identifiers {
	ids := &Identifiers{map[field.Gen]string{}, map[string]string{}}
	capital := map[string]bool{}
	for _, g := range gens {
		if in := f.Info(g); startsUpper(in.Name) {
			capital[GoName(in.Name, in.Order, derivativeNames(in))] = true
		}
	}
	taken := map[string]bool{}
	for _, g := range gens {
		in := f.Info(g)
		by := derivativeNames(in)
		name := GoName(in.Name, in.Order, by)
		if capital[name] && !startsUpper(in.Name) {
			name = GoName("Small_"+in.Name, in.Order, by)
		}
		for base, n := name, 2; taken[name]; n++ {
			name = base + "No" + itoa(n)
		}
		taken[name] = true
		ids.names[g] = name
		ids.keys[symbolKey(in.Name, in.Order, by)] = name
	}
	return ids
}

func startsUpper(name string) bool {
	r, _ := utf8.DecodeRuneInString(name)
	return unicode.IsUpper(r)
}

func symbolKey(name string, primes int, by []string) string {
	return name + strings.Repeat("'", primes) + "," + strings.Join(by, ",")
}

// Of is the name of generator g, or "" if it was not among those given.
func (ids *Identifiers) Of(g field.Gen) string { return ids.names[g] }

// Symbol is the name of a symbol, for GoSource.
func (ids *Identifiers) Symbol(name string, primes int, by []string) string {
	return ids.keys[symbolKey(name, primes, by)]
}
