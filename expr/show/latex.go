package show

// LaTeX source, for math mode.

import (
	"strings"
)

// LaTeX is n as LaTeX source.
func LaTeX(n Node) string { return Writer{}.LaTeX(n) }

// LaTeX is n as LaTeX source. Lines are left to TeX.
func (wr Writer) LaTeX(n Node) string {
	w := latexWriter{conformal: wr.Conformal}
	w.write(n, 0)
	return w.b.String()
}

type latexWriter struct {
	b         strings.Builder
	conformal bool
}

func (w *latexWriter) put(s string) {
	if b := w.b.String(); len(b) > 0 && endsInCommand(b) {
		s = joinLaTeX(s)
	}
	w.b.WriteString(s)
}

// endsInCommand reports whether s ends in a control word, which a letter would lengthen.
func endsInCommand(s string) bool {
	word := strings.TrimRight(s, "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ")
	return len(word) < len(s) && strings.HasSuffix(word, `\`)
}

func (w *latexWriter) precedence(n Node) int {
	switch n := n.(type) {
	case sum, negation, equation, integral:
		return precSum
	case product:
		return precProduct
	case power:
		return precPower
	case contracted, spatial, quotient:
		return precFactor
	case symbol:
		if n.primes > 3 {
			return precPower
		}
	}
	return precAtom
}

func (w *latexWriter) write(n Node, min int) {
	if w.precedence(n) < min {
		w.enclosed(`\left(`, n, `\right)`)
		return
	}
	switch n := n.(type) {
	case number:
		w.put(n.n.String())
	case symbol:
		w.symbol(n)
	case sum:
		w.sum(n)
	case negation:
		w.put("-")
		w.write(n.x, precProduct)
	case product:
		w.product(n)
	case quotient:
		w.put(`\frac{`)
		w.write(n.num, 0)
		w.put("}{")
		w.write(n.den, 0)
		w.put("}")
	case power:
		w.write(n.base, precAtom)
		w.put("^{" + itoa(n.exp) + "}")
	case call:
		w.call(n)
	case bracket:
		w.enclosed(`\left[`, n.x, `\right]`)
	case spatial:
		w.spatial(n.n, n.x)
	case contracted:
		w.contracted(n)
	case equation:
		for i, side := range n.sides {
			if i > 0 {
				w.put(" = ")
			}
			w.write(side, 0)
		}
	case integral:
		w.put(`\int \mathrm{d}`)
		w.symbol(symbol{name: n.clock})
		w.put(`\,\mathrm{d}^{3}x\,`)
		w.write(n.body, precProduct)
	}
}

func (w *latexWriter) enclosed(open string, n Node, shut string) {
	w.put(open)
	w.write(n, 0)
	w.put(shut)
}

func (w *latexWriter) symbol(s symbol) {
	stem, index := latexName(s.name)
	if w.conformal && s.name == "H" {
		stem = `\mathcal{H}`
	}
	w.put(stem)
	if len(s.by) > 0 {
		index += ","
		for _, arg := range s.by {
			t, i := latexName(s.argument(arg))
			if i != "" {
				t += "_{" + i + "}"
			}
			if endsInCommand(index) {
				t = joinLaTeX(t)
			}
			index += t
		}
	}
	if index != "" {
		w.put("_{" + index + "}")
	}
	if s.primes > 3 {
		w.put("^{(" + itoa(s.primes) + ")}")
	} else {
		w.put(strings.Repeat("'", s.primes))
	}
}

func (w *latexWriter) sum(s sum) {
	for i, t := range s.terms {
		neg, isNeg := t.(negation)
		switch {
		case i == 0:
			w.write(t, precSum)
			continue
		case isNeg:
			w.put(" - ")
			t = neg.x
		default:
			w.put(" + ")
		}
		w.write(t, precProduct)
	}
}

func (w *latexWriter) product(p product) {
	for i, x := range p.factors {
		switch {
		case i == 0:
		case isNumeric(x) && isNumeric(p.factors[i-1]):
			w.put(` \cdot `)
		case i == p.gap:
			w.put(`\,`)
		default:
			w.put(" ")
		}
		w.write(x, precFactor)
	}
}

func (w *latexWriter) call(c call) {
	if c.fn == "sqrt" {
		w.put(`\sqrt{`)
		w.write(c.arg, 0)
		w.put("}")
		return
	}
	w.put(`\` + c.fn)
	w.enclosed(`\left(`, c.arg, `\right)`)
}

// spatial is ∂ⁿx.
func (w *latexWriter) spatial(n int, x symbol) {
	w.put(`\partial`)
	if n > 1 {
		w.put("^{" + itoa(n) + "}")
	}
	w.symbol(x)
}

func (w *latexWriter) contracted(c contracted) {
	if c.x.same(c.y) {
		w.put("(")
		w.spatial(c.n, c.x)
		w.put(")^{2}")
		return
	}
	w.spatial(c.n, c.x)
	w.put(` \cdot `)
	w.spatial(c.n, c.y)
}
