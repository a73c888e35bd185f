package show

// Names: one ASCII name, and how it is written in Unicode and in LaTeX. A name is a letter
// or the name of a letter (zeta), perhaps with δ before it (dphi is δφ) and an index behind
// it (u_1, eps2, alphaB).

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Letter is a letter that has a name: its ASCII name, its character and its LaTeX source.
type Letter struct{ ASCII, Unicode, LaTeX string }

// letters is the table of letters, small ones first, each group in the order of the
// alphabet.
var letters = []Letter{
	{"alpha", "α", `\alpha`}, {"beta", "β", `\beta`}, {"gamma", "γ", `\gamma`},
	{"delta", "δ", `\delta`}, {"eps", "ε", `\epsilon`}, {"zeta", "ζ", `\zeta`},
	{"eta", "η", `\eta`}, {"theta", "θ", `\theta`}, {"iota", "ι", `\iota`},
	{"kappa", "κ", `\kappa`}, {"lambda", "λ", `\lambda`}, {"mu", "μ", `\mu`},
	{"nu", "ν", `\nu`}, {"xi", "ξ", `\xi`}, {"omicron", "ο", `o`}, {"pi", "π", `\pi`},
	{"rho", "ρ", `\rho`}, {"sigma", "σ", `\sigma`}, {"tau", "τ", `\tau`},
	{"upsilon", "υ", `\upsilon`}, {"phi", "φ", `\phi`}, {"chi", "χ", `\chi`},
	{"psi", "ψ", `\psi`}, {"omega", "ω", `\omega`},
	{"Alpha", "Α", `\mathrm{A}`}, {"Beta", "Β", `\mathrm{B}`}, {"Gamma", "Γ", `\Gamma`},
	{"Delta", "Δ", `\Delta`}, {"Epsilon", "Ε", `\mathrm{E}`}, {"Zeta", "Ζ", `\mathrm{Z}`},
	{"Eta", "Η", `\mathrm{H}`}, {"Theta", "Θ", `\Theta`}, {"Iota", "Ι", `\mathrm{I}`},
	{"Kappa", "Κ", `\mathrm{K}`}, {"Lambda", "Λ", `\Lambda`}, {"Mu", "Μ", `\mathrm{M}`},
	{"Nu", "Ν", `\mathrm{N}`}, {"Xi", "Ξ", `\Xi`}, {"Omicron", "Ο", `\mathrm{O}`},
	{"Pi", "Π", `\Pi`}, {"Rho", "Ρ", `\mathrm{P}`}, {"Sigma", "Σ", `\Sigma`},
	{"Tau", "Τ", `\mathrm{T}`}, {"Upsilon", "Υ", `\Upsilon`}, {"Phi", "Φ", `\Phi`},
	{"Chi", "Χ", `\mathrm{X}`}, {"Psi", "Ψ", `\Psi`}, {"Omega", "Ω", `\Omega`},
	{"box", "□", `\Box`},
}

var letterByName = func() map[string]Letter {
	m := make(map[string]Letter, len(letters))
	for _, l := range letters {
		m[l.ASCII] = l
	}
	return m
}()

// Letters is the table of letters that have names, in a fixed order.
func Letters() []Letter { return append([]Letter(nil), letters...) }

// nameParts is a name taken apart: δ before it, the letter or word, the index behind it.
type nameParts struct {
	delta bool
	stem  string
	index string
}

func splitName(name string) nameParts {
	p := nameParts{stem: name}
	if _, whole := letterByName[name]; whole {
		return p
	}
	if i := strings.IndexByte(name, '_'); i > 0 && i < len(name)-1 {
		p.stem, p.index = name[:i], name[i+1:]
	} else if i := len(strings.TrimRight(name, "0123456789")); i < len(name) {
		p.stem, p.index = name[:i], name[i:]
	} else if r, n := utf8.DecodeLastRuneInString(name); unicode.IsUpper(r) {
		if _, known := letterByName[name[:len(name)-n]]; known {
			p.stem, p.index = name[:len(name)-n], name[len(name)-n:]
		}
	}
	for _, prefix := range []string{"d", "delta"} {
		rest, ok := strings.CutPrefix(p.stem, prefix)
		if _, known := letterByName[rest]; ok && known && rest != "box" {
			p.delta, p.stem = true, rest
		}
	}
	return p
}

// UnicodeName is the name as a cosmologist writes it: ζ, δφ, ε₁.
func UnicodeName(name string) string {
	s, _ := unicodeName(name)
	return s
}

// unicodeName also says whether the name is a single letter, so that it may stand beside
// another with nothing between them.
func unicodeName(name string) (text string, single bool) {
	p := splitName(name)
	stem := p.stem
	if l, ok := letterByName[stem]; ok {
		stem = l.Unicode
	}
	single = utf8.RuneCountInString(stem) == 1
	if p.delta {
		stem = "δ" + stem
	}
	switch sub, ok := subscript(p.index); {
	case p.index == "":
		return stem, single
	case ok:
		return stem + sub, single
	}
	return stem + "_" + p.index, false
}

func subscript(digits string) (string, bool) {
	var b strings.Builder
	for _, r := range digits {
		if r < '0' || r > '9' {
			return "", false
		}
		b.WriteRune('₀' + r - '0')
	}
	return b.String(), true
}

// superscripts holds the raised form of what an exponent is made of.
var superscripts = map[rune]rune{
	'0': '⁰', '1': '¹', '2': '²', '3': '³', '4': '⁴', '5': '⁵', '6': '⁶', '7': '⁷',
	'8': '⁸', '9': '⁹', '-': '⁻', '(': '⁽', ')': '⁾',
}

func superscript(s string) string {
	return strings.Map(func(r rune) rune { return superscripts[r] }, s)
}

// latexName is the name in LaTeX without its index, and the index.
func latexName(name string) (stem, index string) {
	p := splitName(name)
	stem = latexLetter(p.stem)
	if p.delta {
		stem = `\delta` + joinLaTeX(stem)
	}
	switch {
	case p.index == "":
	case strings.Trim(p.index, "0123456789") == "":
		index = p.index
	default:
		index = latexLetter(p.index)
	}
	return stem, index
}

// latexLetter is a letter, or a word set as one symbol.
func latexLetter(word string) string {
	if l, ok := letterByName[word]; ok {
		return l.LaTeX
	}
	if utf8.RuneCountInString(word) == 1 {
		return word
	}
	return `\mathit{` + strings.ReplaceAll(word, "_", `\_`) + `}`
}

// joinLaTeX keeps a control word before s apart from it.
func joinLaTeX(s string) string {
	if r, _ := utf8.DecodeRuneInString(s); unicode.IsLetter(r) {
		return " " + s
	}
	return s
}

// GoName is an exported Go identifier for a name with time derivatives and derivatives by
// arguments: Phi, DPhi, D2Phi, VPhi, PPhiX. Two generators may share one; GoIdentifiers keeps
// them apart.
func GoName(name string, primes int, by []string) string {
	var b strings.Builder
	switch {
	case primes == 1:
		b.WriteString("D")
	case primes > 1:
		b.WriteString("D" + itoa(primes))
	}
	writeExported(&b, name)
	for _, arg := range by {
		writeExported(&b, arg)
	}
	return b.String()
}

// writeExported appends the name in mixed caps: u_1 is U1, eps is Eps, X(chi) is XChi.
func writeExported(b *strings.Builder, name string) {
	for _, part := range strings.FieldsFunc(name, func(r rune) bool { return !unicode.IsLetter(r) && !unicode.IsDigit(r) }) {
		if l, ok := asciiLetter(part); ok {
			part = l
		}
		r, n := utf8.DecodeRuneInString(part)
		up := unicode.ToUpper(r)
		if !unicode.IsUpper(up) && b.Len() == 0 {
			b.WriteString("X")
		}
		b.WriteRune(up)
		b.WriteString(part[n:])
	}
}

// asciiLetter is the name of a letter that is written as its character.
func asciiLetter(s string) (string, bool) {
	for _, l := range letters {
		if l.Unicode == s {
			return l.ASCII, true
		}
	}
	return "", false
}
