package parse

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// How names and marks may be typed: the Greek letters and their ASCII names are one
// name, and so are a few symbols and theirs. Inside the program only the ASCII form
// (the canonical name) is used; the text keeps what the user typed.

// greek holds the ASCII name of every Greek letter.
var greek = map[rune]string{
	'α': "alpha", 'β': "beta", 'γ': "gamma", 'δ': "delta", 'ε': "eps", 'ϵ': "eps",
	'ζ': "zeta", 'η': "eta", 'θ': "theta", 'ϑ': "theta", 'ι': "iota", 'κ': "kappa",
	'ϰ': "kappa", 'λ': "lambda", 'μ': "mu", 'µ': "mu", 'ν': "nu", 'ξ': "xi",
	'ο': "omicron", 'π': "pi", 'ϖ': "pi", 'ρ': "rho", 'ϱ': "rho", 'σ': "sigma",
	'ς': "sigma", 'τ': "tau", 'υ': "upsilon", 'φ': "phi", 'ϕ': "phi", 'χ': "chi",
	'ψ': "psi", 'ω': "omega",
	'Α': "Alpha", 'Β': "Beta", 'Γ': "Gamma", 'Δ': "Delta", 'Ε': "Epsilon", 'Ζ': "Zeta",
	'Η': "Eta", 'Θ': "Theta", 'Ι': "Iota", 'Κ': "Kappa", 'Λ': "Lambda", 'Μ': "Mu",
	'Ν': "Nu", 'Ξ': "Xi", 'Ο': "Omicron", 'Π': "Pi", 'Ρ': "Rho", 'Σ': "Sigma",
	'Τ': "Tau", 'Υ': "Upsilon", 'Φ': "Phi", 'Χ': "Chi", 'Ψ': "Psi", 'Ω': "Omega",
	'ℋ': "H",
}

// boxSymbol is the d'Alembertian as a symbol; its name is box.
const boxSymbol = '□'

// marks holds other spellings of the marks of the notation.
var marks = map[rune]string{
	'−': "-", '·': "*", '×': "*", '⋅': "*", '′': "'", '″': "''", '‴': "'''", '’': "'",
}

// vulgar holds the fractions that are one character.
var vulgar = map[rune][2]int64{
	'½': {1, 2}, '⅓': {1, 3}, '⅔': {2, 3}, '¼': {1, 4}, '¾': {3, 4}, '⅕': {1, 5},
	'⅙': {1, 6}, '⅛': {1, 8}, '⅜': {3, 8}, '⅝': {5, 8}, '⅞': {7, 8},
}

// Canonical returns the ASCII form of a name as typed: ζ and zeta are one name, as are
// ε, eps and epsilon.
func Canonical(text string) string {
	if text == string(boxSymbol) {
		return "box"
	}
	var b strings.Builder
	for _, r := range text {
		if name, ok := greek[r]; ok {
			b.WriteString(name)
		} else {
			b.WriteRune(r)
		}
	}
	name := b.String()
	if rest, ok := strings.CutPrefix(name, "epsilon"); ok {
		if r, _ := utf8.DecodeRuneInString(rest); rest == "" || !unicode.IsLetter(r) {
			return "eps" + rest
		}
	}
	return name
}

// canonicalMark returns the ASCII form of a mark.
func canonicalMark(text string) string {
	r, _ := utf8.DecodeRuneInString(text)
	if m, ok := marks[r]; ok {
		return m
	}
	return text
}

func isNameStart(r rune) bool { return unicode.IsLetter(r) }

func isNamePart(r rune) bool {
	return unicode.IsLetter(r) || r == '_' || '0' <= r && r <= '9'
}

// isIndexLetter reports whether a letter may be an index over space.
func isIndexLetter(r rune) bool { return 'i' <= r && r <= 'n' || 'p' <= r && r <= 's' }

// nearest returns the candidate that is fewest edits away from name, if it is near
// enough to be a slip of the pen: at most a third of the letters, at least one. Of
// equals the first wins.
func nearest(name string, candidates []string) (string, bool) {
	limit := max(1, len([]rune(name))/3)
	best, found := "", false
	for _, c := range candidates {
		if c == name {
			continue
		}
		if d := editDistance(name, c, limit); d <= limit && d < len([]rune(c)) {
			best, found, limit = c, true, d-1
		}
		if limit < 1 {
			break
		}
	}
	return best, found
}

// editDistance counts insertions, deletions, replacements and swaps of neighbours that
// lead from a to b (Damerau's distance, restricted: no text is edited twice). Beyond
// limit any larger number may be returned.
func editDistance(a, b string, limit int) int {
	s, t := []rune(a), []rune(b)
	if len(s)-len(t) > limit || len(t)-len(s) > limit {
		return limit + 1
	}
	before := make([]int, len(t)+1)
	last := make([]int, len(t)+1)
	row := make([]int, len(t)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(s); i++ {
		row[0] = i
		for j := 1; j <= len(t); j++ {
			cost := 1
			if s[i-1] == t[j-1] {
				cost = 0
			}
			row[j] = min(last[j]+1, row[j-1]+1, last[j-1]+cost)
			if i > 1 && j > 1 && s[i-1] == t[j-2] && s[i-2] == t[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		before, last, row = last, row, before
	}
	return last[len(t)]
}
