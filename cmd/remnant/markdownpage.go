package main

// A page as Markdown with LaTeX mathematics between dollar signs.

import (
	"fmt"
	"strings"
	"unicode"

	"remnant/expr/show"
)

// markdownPage writes the page.
func markdownPage(p *page, conformal bool) []byte {
	w := &markdownWriter{latexWriter{math: show.Writer{Conformal: conformal}}}
	w.put("# " + markdownText(p.title) + "\n\n")
	w.items(p.head)
	for _, s := range p.sections {
		w.put("\n## " + w.words(s.heading) + "\n\n")
		for i, b := range s.blocks {
			if i > 0 {
				w.put("\n")
			}
			w.markdownBlock(b)
		}
	}
	return []byte(w.b.String())
}

type markdownWriter struct{ latexWriter }

func (w *markdownWriter) markdownBlock(b block) {
	switch {
	case b.display != nil:
		w.put("$$\n" + w.math.LaTeX(b.display) + "\n$$\n")
	case b.sentence != nil:
		w.put(w.words(b.sentence) + "\n")
	case len(b.rows) > 0 && b.rows[0].number > 0:
		w.items(b.rows)
	default:
		w.table(b.rows)
	}
}

// items writes rows as a list.
func (w *markdownWriter) items(rows []row) {
	for _, r := range rows {
		mark, between := "-", ": "
		if r.number > 0 {
			mark, between = fmt.Sprintf("%d.", r.number), " "
		}
		if r.number > 0 && len(r.label) == 1 && len(r.value) == 1 {
			whole := append(append(formula{}, r.label[0].maths...), r.value[0].maths...)
			w.put(mark + " $" + w.formula(whole) + "$")
		} else {
			w.put(mark + " " + w.words(r.label) + between + w.words(r.value))
		}
		if r.note != nil {
			w.put(" (" + w.words(r.note) + ")")
		}
		w.put("\n")
	}
}

// table writes rows as a table of label, value and note.
func (w *markdownWriter) table(rows []row) {
	if len(rows) == 0 {
		return
	}
	w.put("| quantity | value | |\n| --- | --- | --- |\n")
	for _, r := range rows {
		w.put("| " + w.words(r.label) + " | " + w.words(r.value) + " | " + w.words(r.note) + " |\n")
	}
}

// words is a phrase in running text.
func (w *markdownWriter) words(p phrase) string {
	var b strings.Builder
	for _, x := range p {
		if x.maths != nil {
			b.WriteString("$" + w.formula(x.maths) + "$")
		} else {
			b.WriteString(markdownText(x.words))
		}
	}
	return b.String()
}

var markdownMarks = strings.NewReplacer(`\`, `\\`, "*", `\*`, "_", `\_`, "`", "\\`", "$", `\$`, "|", `\|`, "<", `\<`, "[", `\[`, "#", `\#`)

// markdownText escapes what Markdown gives a meaning.
func markdownText(s string) string {
	return markdownMarks.Replace(strings.Map(func(r rune) rune {
		if unicode.IsControl(r) {
			return -1
		}
		return r
	}, s))
}
