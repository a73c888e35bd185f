package show

// Writing a tree on a line: what the Unicode, ASCII and notation writers share. A dialect
// says how marks, names and operators look; precedence decides where brackets stand.

import (
	"strings"
)

// Precedences: a node is bracketed where it binds more weakly than its place demands.
const (
	precSum = iota + 1
	precProduct
	precFactor
	precPower
	precAtom
)

// edges says whether a factor may touch its neighbours with nothing between.
type edges struct{ left, right bool }

// dialect is the part of a line writer that differs between forms.
type dialect interface {
	minus() string
	times() string                        // between factors that may not touch
	touch() string                        // between factors that may
	gap() string                          // between a coefficient and what it multiplies
	name(s symbol) string                 // with derivatives
	nameEdges(s symbol) (edges, int)      // and the precedence of the written name
	exponent(n int) string                // raised, behind a base
	functionName(fn string) string        // of a call
	fraction(num, den string) string      // a fraction of numbers that is one character, or ""
	spatial(n int, x symbol) string       // ∂ⁿx
	contracted(n int, x, y symbol) string // ∂ⁿx·∂ⁿy
	equals() string
	integral(clock string) string // the sign before the body, or ""
	brackets() (open, shut string)
	bareRadicand(arg Node) bool // of a root that needs no brackets
	enterCall(depth int)        // depth of calls around what follows
}

// line collects pieces of text; between two pieces the line may be broken.
type line struct {
	d      dialect
	pieces []piece
	depth  int // of brackets
	calls  int
}

// piece is text that is never broken. A break before it replaces its leading space, and is
// the better the smaller depth is.
type piece struct {
	text  string
	depth int
}

func newLine(d dialect) *line { return &line{d: d, pieces: []piece{{}}} }

func (w *line) put(s string) {
	w.pieces[len(w.pieces)-1].text += s
}

// breakable starts a piece.
func (w *line) breakable() { w.pieces = append(w.pieces, piece{depth: w.depth}) }

// flat is the text on one line.
func (w *line) flat() string {
	var b strings.Builder
	for _, p := range w.pieces {
		b.WriteString(p.text)
	}
	return b.String()
}

func (w *line) precedence(n Node) int {
	switch n := n.(type) {
	case sum, negation, equation, integral:
		return precSum
	case product:
		return precProduct
	case quotient:
		if w.numericFraction(n) != "" {
			return precAtom
		}
		return precProduct
	case power:
		return precPower
	case contracted, spatial:
		return precFactor
	case symbol:
		_, prec := w.d.nameEdges(n)
		return prec
	}
	return precAtom
}

func (s symbol) same(t symbol) bool {
	if s.name != t.name || s.primes != t.primes || len(s.by) != len(t.by) {
		return false
	}
	for i := range s.by {
		if s.by[i] != t.by[i] {
			return false
		}
	}
	return true
}

// numericFraction is a quotient of numbers that has a character of its own, or "".
func (w *line) numericFraction(q quotient) string {
	n, ok := q.num.(number)
	d, ok2 := q.den.(number)
	if !ok || !ok2 {
		return ""
	}
	return w.d.fraction(n.n.String(), d.n.String())
}

// write writes n, bracketed if it binds more weakly than min.
func (w *line) write(n Node, min int) {
	if w.precedence(n) < min {
		w.put("(")
		w.depth++
		w.write(n, 0)
		w.depth--
		w.put(")")
		return
	}
	switch n := n.(type) {
	case number:
		w.put(n.n.String())
	case symbol:
		w.put(w.d.name(n))
	case sum:
		w.sum(n)
	case negation:
		w.put(w.d.minus())
		w.write(n.x, precProduct)
	case product:
		w.product(n)
	case quotient:
		w.quotient(n)
	case power:
		w.power(n)
	case call:
		w.call(n)
	case bracket:
		open, shut := w.d.brackets()
		w.put(open)
		w.depth++
		w.write(n.x, 0)
		w.depth--
		w.put(shut)
	case spatial:
		w.put(w.d.spatial(n.n, n.x))
	case contracted:
		w.put(w.d.contracted(n.n, n.x, n.y))
	case equation:
		w.equation(n)
	case integral:
		w.put(w.d.integral(n.clock))
		w.write(n.body, precProduct)
	}
}

func (w *line) sum(s sum) {
	for i, t := range s.terms {
		neg, isNeg := t.(negation)
		switch {
		case i == 0:
			w.write(t, precSum)
			continue
		case isNeg:
			w.breakable()
			w.put(" " + w.d.minus() + " ")
			t = neg.x
		default:
			w.breakable()
			w.put(" + ")
		}
		w.write(t, precProduct)
	}
}

func (w *line) product(p product) {
	var last edges
	for i, x := range p.factors {
		e := w.edges(x)
		switch {
		case i == 0:
		case i == p.gap && (w.d.touch() == "" || isBracket(x)):
			w.put(w.d.gap())
		case isNumeric(x) && isNumeric(p.factors[i-1]):
			w.put("·")
		case last.right && e.left:
			w.put(w.d.touch())
		default:
			w.put(w.d.times())
		}
		w.write(x, w.factorPrecedence(i, x))
		last = e
	}
}

// factorPrecedence leaves a fraction of numbers bare where it is the first factor.
func (w *line) factorPrecedence(i int, x Node) int {
	if q, ok := x.(quotient); ok && i == 0 && isNumeric(q.num) && isNumeric(q.den) {
		return precProduct
	}
	return precFactor
}

func isBracket(n Node) bool {
	_, ok := n.(bracket)
	return ok
}

func isNumeric(n Node) bool {
	if p, ok := n.(power); ok {
		n = p.base
	}
	_, ok := n.(number)
	return ok
}

func (w *line) quotient(q quotient) {
	if s := w.numericFraction(q); s != "" {
		w.put(s)
		return
	}
	min := precProduct
	if _, nested := q.num.(quotient); nested {
		min = precFactor
	}
	w.write(q.num, min)
	w.put("/")
	w.depth++ // what stands below the line is better kept together
	w.write(q.den, precFactor)
	w.depth--
}

// expander is a dialect without exponents.
type expander interface {
	expanded(base string, exp int) string
}

func (w *line) power(p power) {
	if x, ok := w.d.(expander); ok {
		base := newLine(w.d)
		base.write(p.base, precAtom)
		w.put(x.expanded(base.flat(), p.exp))
		return
	}
	w.write(p.base, precAtom)
	w.put(w.d.exponent(p.exp))
}

func (w *line) call(c call) {
	w.put(w.d.functionName(c.fn))
	if c.fn == "sqrt" && w.d.bareRadicand(c.arg) {
		w.write(c.arg, precAtom)
		return
	}
	w.put("(")
	w.depth++
	w.calls++
	w.d.enterCall(w.calls)
	w.write(c.arg, 0)
	w.calls--
	w.d.enterCall(w.calls)
	w.depth--
	w.put(")")
}

func (w *line) equation(e equation) {
	for i, side := range e.sides {
		if i > 0 {
			w.put(w.d.equals())
		}
		w.write(side, 0)
	}
}

// edges says how a factor of a product meets its neighbours.
func (w *line) edges(n Node) edges {
	if w.precedence(n) < precFactor {
		return edges{true, true}
	}
	switch n := n.(type) {
	case number:
		return edges{false, true}
	case symbol:
		e, _ := w.d.nameEdges(n)
		return e
	case power:
		if w.precedence(n.base) < precAtom {
			return edges{true, true}
		}
		return edges{w.edges(n.base).left, true}
	case call:
		return edges{n.fn == "sqrt", false}
	case spatial:
		return edges{true, false}
	case contracted, bracket:
		return edges{true, true}
	case quotient: // one character
		return edges{false, true}
	}
	return edges{false, false}
}
