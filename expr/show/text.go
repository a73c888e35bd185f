package show

// Text: Unicode mathematics and its ASCII likeness, wrapped to a width.

import (
	"strings"
	"unicode"
)

// Writer says how text and LaTeX are written. The zero value is for the cosmic clock,
// without line breaks.
type Writer struct {
	Width     int  // of a line in characters; 0: never broken
	Conformal bool // H is ℋ
}

// Text is n as Unicode text, broken at width (0: not).
func Text(n Node, width int) string { return Writer{Width: width}.Text(n) }

// ASCII is n as ASCII text, broken at width (0: not).
func ASCII(n Node, width int) string { return Writer{Width: width}.ASCII(n) }

// Text is n as Unicode text: 2a³ε ζ'². Lines are broken before + and −, outside brackets
// where that is possible, and what follows is indented; a single term may be longer than
// the width.
func (wr Writer) Text(n Node) string {
	w := newLine(&unicodeDialect{conformal: wr.Conformal})
	w.write(n, 0)
	return w.wrapped(wr.Width)
}

// ASCII is n as ASCII text: 2*a^3*eps*zeta'^2.
func (wr Writer) ASCII(n Node) string {
	w := newLine(&asciiDialect{})
	w.write(n, 0)
	return w.wrapped(wr.Width)
}

// indent is put before every line but the first.
const indent = "    "

// wrapped breaks the line where that is shallowest and keeps within the width.
func (w *line) wrapped(width int) string {
	if width <= 0 {
		return w.flat()
	}
	var b strings.Builder
	rest := w.pieces
	room, next := width, max(width-len(indent), 1)
	for first := true; len(rest) > 0; first = false {
		text := rest[0].text
		if !first {
			b.WriteString("\n" + indent)
			text = strings.TrimPrefix(text, " ")
			room = next
		}
		n := fitting(rest, text, room, next)
		b.WriteString(text)
		for _, p := range rest[1:n] {
			b.WriteString(p.text)
		}
		rest = rest[n:]
	}
	return b.String()
}

// fitting is how many pieces go on the line: all, or those before the best break. first is
// the text of the first piece, which always goes; next is the room on the line that follows.
// The best break is the last of the shallowest; but where that leaves the line nearly empty,
// and what follows must be broken further inside in any case, a deeper one.
func fitting(ps []piece, first string, room, next int) int {
	used := textWidth(first)
	var at []int // width of the line that ends before piece i
	for _, p := range ps[1:] {
		at = append(at, used)
		if used += textWidth(p.text); used > room {
			break
		}
	}
	if used <= room {
		return len(ps)
	}
	best, depth := 1, -1
	for {
		i, d := shallowest(ps, len(at), depth)
		if i == 0 {
			return best
		}
		best, depth = i, d
		if at[i-1] >= room/4 || unbroken(ps, i, d) <= next {
			return best
		}
	}
}

// shallowest finds the last of the shallowest breaks before pieces 1 to n that are deeper
// than depth; 0 if there is none.
func shallowest(ps []piece, n, depth int) (i, d int) {
	for j := 1; j <= n; j++ {
		if ps[j].depth > depth && (i == 0 || ps[j].depth <= d) {
			i, d = j, ps[j].depth
		}
	}
	return i, d
}

// unbroken is the width from piece i to the next break of depth d or less.
func unbroken(ps []piece, i, d int) int {
	n := textWidth(ps[i].text)
	for j := i + 1; j < len(ps) && ps[j].depth > d; j++ {
		n += textWidth(ps[j].text)
	}
	return n
}

// textWidth counts the columns of s; marks that stand on a letter take none.
func textWidth(s string) int {
	n := 0
	for _, r := range s {
		if !unicode.Is(unicode.Mn, r) {
			n++
		}
	}
	return n
}

type unicodeDialect struct{ conformal bool }

func (*unicodeDialect) minus() string              { return "−" }
func (*unicodeDialect) times() string              { return " " }
func (*unicodeDialect) touch() string              { return "" }
func (*unicodeDialect) gap() string                { return " " }
func (*unicodeDialect) equals() string             { return " = " }
func (*unicodeDialect) brackets() (string, string) { return "[ ", " ]" }
func (*unicodeDialect) enterCall(int)              {}

func (d *unicodeDialect) name(s symbol) string {
	text := UnicodeName(s.name)
	if d.conformal && s.name == "H" {
		text = "ℋ"
	}
	if s.primes > 3 {
		text += superscript("(" + itoa(s.primes) + ")")
	} else {
		text += strings.Repeat("'", s.primes)
	}
	if len(s.by) == 0 {
		return text
	}
	text += ","
	for i, arg := range s.by {
		name, single := unicodeName(s.argument(arg))
		if i > 0 && !single {
			text += ","
		}
		text += name
	}
	return text
}

func (*unicodeDialect) nameEdges(s symbol) (edges, int) {
	_, single := unicodeName(s.name)
	e, prec := edges{single, single}, precAtom
	switch {
	case len(s.by) > 0:
		e.right, prec = false, precPower
	case s.primes > 3:
		e.right, prec = true, precPower
	case s.primes > 0:
		e.right = true
	}
	return e, prec
}

func (*unicodeDialect) exponent(n int) string { return superscript(itoa(n)) }

func (*unicodeDialect) functionName(fn string) string {
	if fn == "sqrt" {
		return "√"
	}
	return fn
}

// bareRadicand is true for numbers and single letters: √2, √ε.
func (*unicodeDialect) bareRadicand(arg Node) bool {
	switch arg := arg.(type) {
	case number:
		return true
	case symbol:
		_, single := unicodeName(arg.name)
		return single && arg.primes == 0 && len(arg.by) == 0
	}
	return false
}

// vulgar holds the fractions that are one character.
var vulgar = map[string]string{
	"1/2": "½", "1/3": "⅓", "2/3": "⅔", "1/4": "¼", "3/4": "¾", "1/5": "⅕", "1/6": "⅙",
	"1/8": "⅛", "3/8": "⅜", "5/8": "⅝", "7/8": "⅞",
}

func (*unicodeDialect) fraction(num, den string) string { return vulgar[num+"/"+den] }

func (d *unicodeDialect) spatial(n int, x symbol) string {
	return d.del(n) + d.name(x)
}

// del is ∂ⁿ.
func (d *unicodeDialect) del(n int) string {
	if n == 1 {
		return "∂"
	}
	return "∂" + superscript(itoa(n))
}

func (d *unicodeDialect) contracted(n int, x, y symbol) string {
	if x.same(y) {
		return "(" + d.spatial(n, x) + ")²"
	}
	return d.spatial(n, x) + "·" + d.spatial(n, y)
}

func (*unicodeDialect) integral(clock string) string {
	return "∫d" + UnicodeName(clock) + " d³x "
}

type asciiDialect struct{}

func (*asciiDialect) minus() string              { return "-" }
func (*asciiDialect) times() string              { return "*" }
func (*asciiDialect) touch() string              { return "*" }
func (*asciiDialect) gap() string                { return " " }
func (*asciiDialect) bareRadicand(Node) bool     { return false }
func (*asciiDialect) equals() string             { return " = " }
func (*asciiDialect) brackets() (string, string) { return "[ ", " ]" }
func (*asciiDialect) enterCall(int)              {}

func (*asciiDialect) name(s symbol) string {
	text := s.name + strings.Repeat("'", s.primes)
	for _, arg := range s.by {
		if s.oneX {
			arg = s.argument(arg) // the notation, too, knows X(phi) as X where there is but one
		}
		text += "," + arg
	}
	return text
}

func (*asciiDialect) nameEdges(symbol) (edges, int) { return edges{}, precAtom }

func (*asciiDialect) exponent(n int) string {
	if n < 0 {
		return "^(" + itoa(n) + ")"
	}
	return "^" + itoa(n)
}

func (*asciiDialect) functionName(fn string) string   { return fn }
func (*asciiDialect) fraction(num, den string) string { return "" }

func (d *asciiDialect) spatial(n int, x symbol) string {
	op := ""
	if n%2 != 0 {
		op = "grad "
	}
	switch {
	case n/2 == 1:
		op += "lap "
	case n/2 > 1:
		op += "lap^" + itoa(n/2) + " "
	}
	return strings.TrimSuffix(op, " ") + "(" + d.name(x) + ")"
}

func (d *asciiDialect) contracted(n int, x, y symbol) string {
	if x.same(y) {
		return d.spatial(n, x) + "^2"
	}
	return d.spatial(n, x) + "." + d.spatial(n, y)
}

func (*asciiDialect) integral(clock string) string { return "int d" + clock + " d^3x " }
