package show

// The user's notation: what is written can be read again, with the same value.

import "strings"

// Notation is n in the notation that users type. Spatial derivatives are written with
// summed indices; an integral is written as its Lagrangian.
func Notation(n Node) string {
	w := newLine(&notationDialect{})
	w.write(n, 0)
	return w.flat()
}

type notationDialect struct {
	asciiDialect
	calls int
}

func (*notationDialect) brackets() (string, string) { return "(", ")" }
func (*notationDialect) gap() string                { return "*" }
func (*notationDialect) integral(string) string     { return "" }
func (d *notationDialect) enterCall(depth int)      { d.calls = depth }

// name brackets V,phi in the argument of a function, where a comma would separate.
func (d *notationDialect) name(s symbol) string {
	text := d.asciiDialect.name(s)
	if d.calls > 0 && len(s.by) > 0 {
		return "(" + text + ")"
	}
	return text
}

// indices are letters over space; k is left out, for readers' sake.
const indices = "ijlmnpqrs"

// derived is x with the indices from, from+1, … of n derivatives. Pairs are summed if
// closed, and the first of an odd number stays open.
func derived(x string, pairs, from int) string {
	var b strings.Builder
	b.WriteString(x + ",")
	for i := range pairs {
		c := indices[(from+i)%len(indices)]
		b.WriteByte(c)
		b.WriteByte(c)
	}
	return b.String()
}

func (d *notationDialect) spatial(n int, x symbol) string {
	return derived(d.name(x), n/2, 0)
}

func (d *notationDialect) contracted(n int, x, y symbol) string {
	left, right := derived(d.name(x), n/2, n%2), derived(d.name(y), n/2, n%2+n/2)
	if n%2 != 0 {
		left, right = left+"i", right+"i"
	}
	return left + "*" + right
}
