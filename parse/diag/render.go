package diag

import (
	"bufio"
	"fmt"
	"io"
	"strings"
	"unicode"
)

// Render draws the list for a terminal of fixed pitch:
//
//	heron.act:9:21: 'zeta,q' cannot be differentiated by 'q'
//	   9 |   + a*( zeta,i*zeta,q )
//	     |                     ^ index q stands once; every index must stand twice in a product
//
// The caret stands under the first character of the span also after tabs, wide
// characters and combining marks. Related places follow as further excerpts.
func Render(w io.Writer, list List) error {
	out := bufio.NewWriter(w)
	for _, d := range list {
		if d.Source == nil {
			fmt.Fprintln(out, d.Summary)
			continue
		}
		fmt.Fprintln(out, d.Error())
		excerpt(out, d.Source, d.Span.Start, d.Hint)
		for _, r := range d.Related {
			excerpt(out, d.Source, r.Span.Start, r.Label)
		}
	}
	return out.Flush()
}

// excerptWidth bounds how much of a very long line is shown, in characters.
const excerptWidth = 160

// excerpt writes the line that holds the byte at offset, and below it a caret with a note.
func excerpt(w io.Writer, s *Source, offset int, note string) {
	offset = min(max(offset, 0), len(s.Text))
	line := s.Line(offset)
	text := s.LineText(line)
	at := min(offset-s.LineStart(line), len(text))
	before, after := window(text[:at], text[at:])
	fmt.Fprintf(w, "%4d | %s%s\n", line, printable(before), printable(after))
	if note != "" {
		note = " " + note
	}
	fmt.Fprintf(w, "%4s | %s^%s\n", "", blanks(before), note)
}

// window shortens the two parts of a line to what is worth showing.
func window(before, after string) (string, string) {
	if runes := []rune(before); len(runes) > excerptWidth {
		before = "…" + string(runes[len(runes)-excerptWidth/2:])
	}
	if runes := []rune(after); len(runes) > excerptWidth {
		after = string(runes[:excerptWidth/2]) + "…"
	}
	return before, after
}

// printable replaces characters that would disturb a terminal.
func printable(text string) string {
	return strings.Map(func(r rune) rune {
		if r != '\t' && (unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r)) {
			return '\ufffd'
		}
		return r
	}, text)
}

// blanks returns white space as wide as the text when both start at the same column.
func blanks(text string) string {
	var b strings.Builder
	for _, r := range printable(text) {
		if r == '\t' {
			b.WriteByte('\t')
			continue
		}
		b.WriteString("  "[:cells(r)])
	}
	return b.String()
}

// cells returns how many columns of a terminal a character takes: 0 for marks that
// combine with the one before, 2 for the wide scripts of East Asia and emoji.
func cells(r rune) int {
	switch {
	case unicode.In(r, unicode.Mn, unicode.Me) || r == '\u200b' || r == '\u200c' || r == '\u200d' || r == '\ufeff':
		return 0
	case unicode.Is(wide, r):
		return 2
	}
	return 1
}

// wide holds the blocks whose characters take two columns (Unicode Standard Annex 11,
// classes W and F, by block).
var wide = &unicode.RangeTable{
	R16: []unicode.Range16{
		{Lo: 0x1100, Hi: 0x115f, Stride: 1},
		{Lo: 0x2e80, Hi: 0x303e, Stride: 1},
		{Lo: 0x3041, Hi: 0x33ff, Stride: 1},
		{Lo: 0x3400, Hi: 0x4dbf, Stride: 1},
		{Lo: 0x4e00, Hi: 0x9fff, Stride: 1},
		{Lo: 0xa000, Hi: 0xa4cf, Stride: 1},
		{Lo: 0xac00, Hi: 0xd7a3, Stride: 1},
		{Lo: 0xf900, Hi: 0xfaff, Stride: 1},
		{Lo: 0xfe30, Hi: 0xfe6f, Stride: 1},
		{Lo: 0xff00, Hi: 0xff60, Stride: 1},
		{Lo: 0xffe0, Hi: 0xffe6, Stride: 1},
	},
	R32: []unicode.Range32{
		{Lo: 0x1f300, Hi: 0x1f64f, Stride: 1},
		{Lo: 0x1f900, Hi: 0x1f9ff, Stride: 1},
		{Lo: 0x20000, Hi: 0x3fffd, Stride: 1},
	},
}
