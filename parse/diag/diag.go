// Package diag holds what is said about a faulty input.
//
// A Diagnostic is data: what kind of fault, where, in what words, and what would be
// accepted instead. Render draws it. Summaries are lower case, have no full stop, can
// be understood alone, and mark the smallest piece of text that shows the fault; the
// hint stands behind the caret and states what would be accepted.
package diag

import (
	"fmt"
	"slices"
	"sort"
	"strings"
)

// Source is a text with a name, usually a file.
type Source struct {
	Name string
	Text string

	lines []int // offset of the first byte of each line
}

// NewSource returns the text with its lines indexed.
func NewSource(name, text string) *Source {
	s := &Source{Name: name, Text: text, lines: []int{0}}
	for i := 0; i < len(text); i++ {
		if text[i] == '\n' {
			s.lines = append(s.lines, i+1)
		}
	}
	return s
}

// Line returns the number of the line that holds the byte at offset, from 1.
func (s *Source) Line(offset int) int {
	return sort.SearchInts(s.lines, offset+1)
}

// Lines returns how many lines the source has; an empty one has one.
func (s *Source) Lines() int { return len(s.lines) }

// LineStart returns the offset of the first byte of a line, counted from 1.
func (s *Source) LineStart(line int) int { return s.lines[line-1] }

// LineText returns a line, counted from 1, without its end.
func (s *Source) LineText(line int) string {
	end := len(s.Text)
	if line < len(s.lines) {
		end = s.lines[line] - 1
	}
	return strings.TrimSuffix(s.Text[s.lines[line-1]:end], "\r")
}

// Slice returns the text of a span.
func (s *Source) Slice(at Span) string { return s.Text[at.Start:at.End] }

// Position returns line and column of a byte, both from 1. A column is a visible
// character: combining marks belong to the character before them.
func (s *Source) Position(offset int) (line, column int) {
	offset = min(max(offset, 0), len(s.Text))
	line = s.Line(offset)
	column = 1
	for _, r := range s.Text[s.lines[line-1]:offset] {
		if cells(r) > 0 {
			column++
		}
	}
	return line, column
}

// Span is a piece of a source, in byte offsets; End is exclusive.
type Span struct {
	Start, End int
}

// Join returns the smallest span that holds both.
func (s Span) Join(t Span) Span {
	return Span{min(s.Start, t.Start), max(s.End, t.End)}
}

// Related is another place that has to do with the fault.
type Related struct {
	Span  Span
	Label string // stands behind the caret
}

// Diagnostic is one refusal.
type Diagnostic struct {
	Kind    Kind
	Source  *Source
	Span    Span
	Summary string // what is wrong: "'zeta,q' cannot be differentiated by 'q'"
	Hint    string // what would be accepted; stands behind the caret, may be empty
	Related []Related
}

// Error returns place and summary in one line.
func (d Diagnostic) Error() string {
	if d.Source == nil {
		return d.Summary
	}
	line, column := d.Source.Position(d.Span.Start)
	return fmt.Sprintf("%s:%d:%d: %s", d.Source.Name, line, column, d.Summary)
}

// List is what is wrong with one input. It is an error when it is not empty.
type List []Diagnostic

// Error returns the first refusal and how many follow.
func (l List) Error() string {
	switch len(l) {
	case 0:
		return "no faults"
	case 1:
		return l[0].Error()
	}
	return fmt.Sprintf("%s (and %d more)", l[0].Error(), len(l)-1)
}

// Err returns the list as an error, or nil if it is empty.
func (l List) Err() error {
	if len(l) == 0 {
		return nil
	}
	return l
}

// Sort puts the list in the order of the text; refusals at one place keep their order.
func (l List) Sort() {
	slices.SortStableFunc(l, func(a, b Diagnostic) int { return a.Span.Start - b.Span.Start })
}
