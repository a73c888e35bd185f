package main

// A page as plain text: two columns of indent, labels, values and notes aligned, wrapped to
// a width. What stands in mathematics is broken by package show, words at blanks.

import (
	"fmt"
	"strings"
	"unicode"

	"remnant/expr/show"
)

// textStyle says how text is written.
type textStyle struct {
	width     int
	ascii     bool
	conformal bool // H is ℋ
	bold      bool // headings are marked up for a terminal
}

const (
	indentWidth = 2
	labelGap    = 2
	noteGap     = 5
	minWidth    = 40
)

// textPage writes the page.
func textPage(p *page, st textStyle) []byte {
	st.width = max(st.width, minWidth)
	w := &textWriter{textStyle: st}
	w.heading(p.title)
	w.rows(p.head)
	for _, s := range p.sections {
		w.b.WriteByte('\n')
		w.heading(w.phrase(s.heading))
		w.blocks(s.blocks)
	}
	return []byte(strings.ReplaceAll(w.b.String(), hard, " "))
}

type textWriter struct {
	textStyle
	b strings.Builder
}

// heading is bold on a terminal.
func (w *textWriter) heading(text string) {
	for _, line := range wrapWords(w.words(text), w.width) {
		if w.bold {
			line = "\x1b[1m" + line + "\x1b[0m"
		}
		w.b.WriteString(line + "\n")
	}
}

func (w *textWriter) blocks(blocks []block) {
	for i, b := range blocks {
		if i > 0 && !(blocks[i-1].sentence != nil && b.rows != nil) {
			w.b.WriteByte('\n')
		}
		switch {
		case b.display != nil:
			w.line(0, w.node(b.display, w.width-indentWidth), indentWidth)
		case b.sentence != nil:
			for _, l := range wrapWords(w.phrase(b.sentence), w.width-indentWidth) {
				w.line(0, l, indentWidth)
			}
		default:
			w.rows(b.rows)
		}
	}
}

// line writes text of one or more lines, indented; the first stands at column at already.
func (w *textWriter) line(at int, text string, indent int) {
	w.b.WriteString(strings.Repeat(" ", max(indent-at, 0)))
	w.b.WriteString(strings.ReplaceAll(text, "\n", "\n"+strings.Repeat(" ", indent)))
	w.b.WriteByte('\n')
}

// rows aligns labels, values and notes.
func (w *textWriter) rows(rows []row) {
	labels := make([]string, len(rows))
	wide := 0
	for i, r := range rows {
		labels[i] = w.phrase(r.label)
		if r.number > 0 {
			labels[i] = fmt.Sprintf("%d  %s", r.number, labels[i])
		}
		wide = max(wide, columns(labels[i]))
	}
	at := indentWidth + wide + labelGap
	noteAt := w.noteColumn(rows, at)
	for i, r := range rows {
		w.row(r, labels[i], at, noteAt)
	}
}

// noteColumn is where notes stand: behind the longest value that leaves room for its note.
func (w *textWriter) noteColumn(rows []row, at int) int {
	wide := 0
	for _, r := range rows {
		n := columns(w.phrase(r.value))
		if r.note != nil && at+n+noteGap+columns(w.phrase(r.note)) <= w.width {
			wide = max(wide, n)
		}
	}
	return at + wide + noteGap
}

func (w *textWriter) row(r row, label string, at, noteAt int) {
	room := max(w.width-at, minWidth/2)
	start := strings.Repeat(" ", indentWidth) + label
	w.b.WriteString(start)
	value, note := w.value(r.value, room), w.phrase(r.note)
	end := at + columns(value)
	if note != "" && !strings.Contains(value, "\n") && end+noteGap <= noteAt && noteAt+columns(note) <= w.width {
		value += strings.Repeat(" ", noteAt-end) + note
		note = ""
	}
	w.line(columns(start), value, at)
	if note != "" {
		w.line(0, w.value(r.note, room-indentWidth), at+indentWidth)
	}
}

// value is a phrase in lines of at most room columns.
func (w *textWriter) value(p phrase, room int) string {
	if len(p) == 1 && p[0].maths != nil {
		return w.formula(p[0].maths, room)
	}
	if flat := w.phrase(p); columns(flat) <= room {
		return flat
	}
	for _, x := range p {
		if x.maths != nil && columns(w.formula(x.maths, 0)) > room {
			return w.broken(p, room)
		}
	}
	return strings.Join(wrapWords(w.phrase(p), room), "\n")
}

// broken puts each piece of mathematics on lines of its own, with the words behind it.
func (w *textWriter) broken(p phrase, room int) string {
	var lines []string
	for _, x := range p {
		if x.maths != nil {
			lines = append(lines, w.formula(x.maths, room))
		} else if text := strings.TrimRight(w.words(x.words), " "); len(lines) > 0 {
			lines[len(lines)-1] += text
		} else {
			lines = append(lines, text)
		}
	}
	return strings.Join(lines, "\n")
}

// hard stands for a blank of mathematics, at which words are not wrapped; the page ends with
// plain ones.
const hard = "\u00a0"

// phrase is a phrase on one line, the blanks of its mathematics hard.
func (w *textWriter) phrase(p phrase) string {
	var b strings.Builder
	for _, x := range p {
		if x.maths != nil {
			b.WriteString(strings.ReplaceAll(w.formula(x.maths, 0), " ", hard))
		} else {
			b.WriteString(w.words(x.words))
		}
	}
	return b.String()
}

// formula is broken to the width (0: not); what follows a sign hangs behind it.
func (w *textWriter) formula(f formula, width int) string {
	var b strings.Builder
	at := 0
	for i, x := range f {
		var text string
		switch {
		case x.order != nil:
			text = "O(" + w.node(x.order, 0) + ")"
		case x.node != nil:
			room := 0
			if width > 0 {
				room = max(width-at, minWidth/2)
			}
			text = w.node(x.node, room)
		default:
			text = signText[x.sign]
			if w.ascii {
				text = signASCII[x.sign]
			}
			if i == 0 {
				text = strings.TrimLeft(text, " ")
			}
		}
		b.WriteString(strings.ReplaceAll(text, "\n", "\n"+strings.Repeat(" ", at)))
		if n := strings.LastIndexByte(text, '\n'); n >= 0 {
			at += columns(text[n+1:])
		} else {
			at += columns(text)
		}
	}
	return b.String()
}

func (w *textWriter) node(n show.Node, width int) string {
	wr := show.Writer{Width: width, Conformal: w.conformal}
	if w.ascii {
		return asciiOnly(wr.ASCII(n))
	}
	return wr.Text(n)
}

func (w *textWriter) words(s string) string {
	if w.ascii {
		return asciiOnly(s)
	}
	return s
}

// wrapWords breaks text at blanks that are not hard.
func wrapWords(text string, width int) []string {
	var lines []string
	line := ""
	for _, word := range strings.Split(text, " ") {
		switch {
		case line == "" && len(lines) == 0 && word != "":
			line = word
		case columns(line)+1+columns(word) <= width:
			line += " " + word
		default:
			lines = append(lines, strings.TrimRight(line, " "))
			line = word
		}
	}
	return append(lines, strings.TrimRight(line, " "))
}

// columns counts the columns of a text; marks that stand on a letter take none.
func columns(s string) int {
	n := 0
	for _, r := range s {
		if !unicode.Is(unicode.Mn, r) {
			n++
		}
	}
	return n
}

// asciiMarks are the signs of titles and words that have an ASCII likeness.
var asciiMarks = func() *strings.Replacer {
	pairs := []string{
		"–", "-", "—", "-", "−", "-", "‐", "-", "‑", "-", "’", "'", "‘", "'", "“", `"`, "”", `"`, "…", "...",
		"∫", "int ", "√−g", "sqrt(-g)", "√", "sqrt", "⁻¹", "^(-1)", "²", "^2", "³", "^3", "½", "1/2 ", "¼", "1/4 ", "≠", "!=", "·", "*", "×", "x", "∂", "d", "ℋ", "H", hard, " ",
	}
	for _, l := range show.Letters() {
		pairs = append(pairs, l.Unicode, l.ASCII)
	}
	return strings.NewReplacer(pairs...)
}()

// asciiOnly writes a text in ASCII; letters without a likeness become question marks.
func asciiOnly(s string) string {
	return strings.Map(func(r rune) rune {
		if r > unicode.MaxASCII {
			return '?'
		}
		return r
	}, asciiMarks.Replace(s))
}
