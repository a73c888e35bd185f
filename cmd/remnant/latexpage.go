package main

// A page as a LaTeX document that needs amsmath only. Its body can be taken into a paper as
// it stands.

import (
	"strings"
	"unicode"

	"remnant/expr/show"
)

// latexPage writes the document.
func latexPage(p *page, conformal bool) []byte {
	w := &latexWriter{math: show.Writer{Conformal: conformal}}
	w.put("\\documentclass{article}\n\\usepackage[utf8]{inputenc}\n\\usepackage{amsmath,amssymb}\n\\allowdisplaybreaks\n\\begin{document}\n\n")
	w.put("\\section*{" + latexText(p.title) + "}\n\n")
	w.list(p.head)
	for _, s := range p.sections {
		w.put("\n\\subsection*{" + w.phrase(s.heading) + "}\n\n")
		for _, b := range s.blocks {
			w.block(b)
		}
	}
	w.put("\n\\end{document}\n")
	return []byte(w.b.String())
}

type latexWriter struct {
	math show.Writer
	b    strings.Builder
}

func (w *latexWriter) put(s string) { w.b.WriteString(s) }

// list writes rows of words: label: value.
func (w *latexWriter) list(rows []row) {
	for _, r := range rows {
		w.put("\\noindent " + w.phrase(r.label) + ": " + w.phrase(r.value) + "\\\\\n")
	}
}

func (w *latexWriter) block(b block) {
	switch {
	case b.display != nil:
		w.put("\\[\n" + w.math.LaTeX(b.display) + "\n\\]\n")
	case b.sentence != nil:
		w.put("\\noindent " + w.phrase(b.sentence) + "\n")
	case len(b.rows) > 0:
		w.align(b.rows)
	}
}

// align sets rows in three columns.
func (w *latexWriter) align(rows []row) {
	w.put("\\begin{align*}\n")
	for i, r := range rows {
		if i > 0 {
			w.put(" \\\\\n")
		}
		w.put(w.inMath(r.label) + "\\quad &" + w.inMath(r.value))
		if r.note != nil {
			w.put(" && " + w.inMath(r.note))
		}
	}
	w.put("\n\\end{align*}\n")
}

// phrase is a phrase in running text.
func (w *latexWriter) phrase(p phrase) string {
	var b strings.Builder
	for _, x := range p {
		if x.maths != nil {
			b.WriteString("$" + w.formula(x.maths) + "$")
		} else {
			b.WriteString(latexText(x.words))
		}
	}
	return b.String()
}

// inMath is a phrase in math mode.
func (w *latexWriter) inMath(p phrase) string {
	if len(p) == 1 && p[0].maths != nil {
		return w.formula(p[0].maths)
	}
	return "\\text{" + w.phrase(p) + "}"
}

func (w *latexWriter) formula(f formula) string {
	var b strings.Builder
	for _, x := range f {
		switch {
		case x.order != nil:
			b.WriteString(`\mathcal{O}\left(` + w.math.LaTeX(x.order) + `\right)`)
		case x.node != nil:
			b.WriteString(w.math.LaTeX(x.node))
		default:
			b.WriteString(signLaTeX[x.sign])
		}
	}
	return strings.TrimLeft(b.String(), " ")
}

// latexMarks escapes what TeX gives a meaning, and names letters that a font may lack.
var latexMarks = func() *strings.Replacer {
	pairs := []string{
		`\`, `\textbackslash{}`, "{", `\{`, "}", `\}`, "$", `\$`, "&", `\&`, "#", `\#`, "_", `\_`, "%", `\%`,
		"~", `\textasciitilde{}`, "^", `\textasciicircum{}`, "–", "--", "—", "---", "−", "$-$", "²", "$^2$", "³", "$^3$", "½", `$\frac{1}{2}$`, "¼", `$\frac{1}{4}$`,
		"∫", `$\int$`, "√−g", `$\sqrt{-g}$`, "⁻¹", "$^{-1}$", "ℋ", `$\mathcal{H}$`, "∂", `$\partial$`, "≠", `$\neq$`, "…", `\dots{}`,
	}
	for _, l := range show.Letters() {
		pairs = append(pairs, l.Unicode, "$"+l.LaTeX+"$")
	}
	return strings.NewReplacer(pairs...)
}()

// latexText escapes words for TeX. Signs that only some fonts hold are left to the reader's
// preamble; control characters go.
func latexText(s string) string {
	return latexMarks.Replace(strings.Map(func(r rune) rune {
		if unicode.IsControl(r) {
			return -1
		}
		return r
	}, s))
}
