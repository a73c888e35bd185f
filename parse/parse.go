// Package parse reads the notation: it cuts a text into tokens and logical lines, makes
// the syntax tree, writes a tree back in its standard layout, and elaborates it into a
// typed model. Every fault becomes a diagnostic with its place; one statement gives at
// most one, and all statements are tried.
package parse

import (
	"errors"
	"strings"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"

	"remnant/parse/diag"
)

// statementParser parses one logical line.
var statementParser = participle.MustBuild[Statement](participle.Lexer(grammarLexer{}), participle.UseLookahead(1))

// statementForms holds the statements in the order of the manual, each with the form
// that is shown when one is malformed.
var statementForms = []struct{ keyword, form string }{
	{"model", `model "title"`},
	{"clock", "clock cosmic, clock conformal or clock efolds"},
	{"constants", "constants M > 0, lambda"},
	{"background", "background a, phi, eps > 0"},
	{"functions", "functions V(phi), P(phi, X) or functions V(phi) = m^2*phi^2/2"},
	{"formfactor", "formfactor F(box), formfactor F(box) = exp(-box) or formfactor F(box): F.n = 1/n!"},
	{"let", "let x = expression"},
	{"given", "given H' = -eps*H^2"},
	{"fields", "fields alpha, psi, zeta"},
	{"gauge", "gauge unitary, flat, newtonian or open"},
	{"sector", "sector scalar, vector or tensor"},
	{"lagrangian", "lagrangian quadratic = …, lagrangian covariant = … or lagrangian adm = …"},
	{"keep", "keep zeta or keep u = expression"},
	{"small", "small eps, eta to order 2"},
	{"numbers", "numbers M = 1, phi(0) = 27/5"},
}

func keywords() []string {
	list := make([]string, len(statementForms))
	for i, s := range statementForms {
		list[i] = s.keyword
	}
	return list
}

func formOf(keyword string) string {
	for _, s := range statementForms {
		if s.keyword == keyword {
			return s.form
		}
	}
	return ""
}

// Parse reads a file. The tree holds every statement that could be read; the list holds
// what is wrong, in the order of the text, at most one fault for a statement.
func Parse(src *diag.Source) (*File, diag.List) {
	s := &scanner{src: src}
	s.scan()
	lines, faults := s.lines, s.faults
	file := &File{Source: src, Comments: s.comments}
	if len(lines) == 0 && len(faults) == 0 {
		faults = append(faults, diag.Diagnostic{Kind: diag.Empty, Source: src, Span: diag.Span{Start: len(src.Text), End: len(src.Text)},
			Summary: "the file holds no statement", Hint: `a model begins with a line such as: model "Plover"`})
	}
	for i := range lines {
		l := &lines[i]
		if l.broken || len(l.tokens) == 0 {
			file.unread = append(file.unread, l.first())
			continue
		}
		statement, err := parseLine(l)
		switch {
		case err != nil && len(faults) >= maxFaults:
			file.unread = append(file.unread, l.first())
			continue
		case err != nil:
			err.Source = src
			faults = append(faults, err.Diagnostic)
			file.unread = append(file.unread, l.first())
			continue
		}
		file.Statements = append(file.Statements, statement)
	}
	return file, firstOfEach(faults, lines)
}

// firstOfEach sorts the faults and keeps the first of each logical line.
func firstOfEach(faults diag.List, lines []line) diag.List {
	faults.Sort()
	var kept diag.List
	next, last := 0, -1 // how many lines begin before this fault, and before the last
	for _, f := range faults {
		for next < len(lines) && lines[next].start <= f.Span.Start {
			next++
		}
		if next != last && len(kept) < maxFaults {
			kept = append(kept, f)
		}
		last = next
	}
	return kept
}

// parseLine reads one logical line.
func parseLine(l *line) (*Statement, *fault) {
	first := &l.tokens[0]
	if first.Type != tokenName || formOf(first.Value) == "" {
		return nil, unknownStatement(first)
	}
	lex, err := lexer.Upgrade(l.lexer())
	if err != nil {
		return nil, newFault(diag.UnexpectedToken, tokenSpan(first), err.Error(), "")
	}
	statement, err := statementParser.ParseFromLexer(lex)
	if err != nil {
		return nil, translate(err, first)
	}
	statement.Keyword = Word{Pos: first.Pos, Text: first.Value}
	statement.At = l.span()
	if f := checkWords(statement); f != nil {
		return nil, f
	}
	return statement, nil
}

func unknownStatement(first *lexer.Token) *fault {
	hint := "a statement begins with one of: " + strings.Join(keywords(), ", ")
	if near, ok := nearest(first.Value, keywords()); ok {
		hint = "the nearest statement is '" + near + "': " + formOf(near)
	}
	return newFault(diag.UnknownStatement, tokenSpan(first), "'"+first.Value+"' begins no statement", hint)
}

// translate puts an error of the statement grammar into our words.
func translate(err error, first *lexer.Token) *fault {
	var own *fault
	if errors.As(err, &own) {
		return own
	}
	hint := "the form is: " + formOf(first.Value)
	var unexpected *participle.UnexpectedTokenError
	if !errors.As(err, &unexpected) {
		return newFault(diag.StatementForm, tokenSpan(first), "the statement cannot be read", hint)
	}
	t := &unexpected.Unexpected
	if t.EOF() {
		at := diag.Span{Start: t.Pos.Offset, End: t.Pos.Offset}
		return newFault(diag.EndsEarly, at, "the "+first.Value+" statement ends too early", hint)
	}
	return newFault(diag.StatementForm, tokenSpan(t), "'"+t.Value+"' cannot stand here in a "+first.Value+" statement", hint)
}

// The words that a statement chooses from.
var (
	clockWords  = []string{"cosmic", "conformal", "efolds"}
	gaugeWords  = []string{"unitary", "flat", "newtonian", "open"}
	sectorWords = []string{"scalar", "vector", "tensor"}
	formWords   = []string{"quadratic", "covariant", "adm"}
)

// checkWords refuses words that are none of those to choose from.
func checkWords(s *Statement) *fault {
	switch {
	case s.Clock != nil:
		return oneOf(s.Clock, clockWords)
	case s.Gauge != nil:
		return oneOf(s.Gauge, gaugeWords)
	case s.Sector != nil:
		return oneOf(s.Sector, sectorWords)
	case s.Lagrangian != nil:
		return oneOf(&s.Lagrangian.Form, formWords)
	case s.Small != nil:
		if o := s.Small.Order; strings.Trim(o.Text, "0123456789") != "" {
			return newFault(diag.StatementForm, o.Span(), "'"+o.Text+"' is no order of a series", "a whole number is expected")
		}
	case s.FormFactor != nil:
		return oneOf(&s.FormFactor.Argument, []string{"box"})
	}
	return nil
}

func oneOf(w *Word, words []string) *fault {
	for _, choice := range words {
		if w.Name() == Canonical(choice) {
			return nil
		}
	}
	expected := words[len(words)-1]
	if len(words) > 1 {
		expected = strings.Join(words[:len(words)-1], ", ") + " or " + expected
	}
	return newFault(diag.UnknownWord, w.Span(), "'"+w.Text+"' is not known here", expected+" is expected")
}
