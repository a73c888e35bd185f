package parse

import (
	"strings"

	"remnant/parse/diag"
)

// Quotations in messages: one line, and short.

// maxQuote is the number of characters that a message quotes.
const maxQuote = 40

func shorten(text string) string {
	if r := []rune(text); len(r) > maxQuote {
		return string(r[:maxQuote-1]) + "…"
	}
	return text
}

// brief is the beginning of an expression, in its standard layout.
func brief(x Expr) string { return shorten(String(x)) }

// quote is the beginning of a piece of the text.
func (e *elaborator) quote(at diag.Span) string {
	text := e.src.Slice(at)
	first, _, more := strings.Cut(text, "\n")
	first, _, comment := strings.Cut(first, "#")
	first = strings.TrimSpace(first)
	if more || comment {
		first += " …"
	}
	return shorten(first)
}
