// Package parsetest reads test inputs that carry their expected faults with them.
//
// A file holds chunks separated by lines of three dashes; each is a text of its own and
// keeps its line numbers. A fault is expected where a comment says so, by column and a
// part of the message, summary or hint:
//
//	let x = (a + b   # ERROR 9 "is not closed"
//
// Several faults of a line follow each other in one note.
package parsetest

import (
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"remnant/parse/diag"
)

// Want is an expected fault.
type Want struct {
	Line, Column int
	Text         string // a part of the summary or the hint
}

// Chunk is one text with the faults that it should give.
type Chunk struct {
	Source *diag.Source
	Wants  []Want
}

var (
	note = regexp.MustCompile(`#\s*ERROR((?:\s+\d+\s+"[^"]*")+)\s*$`)
	item = regexp.MustCompile(`(\d+)\s+"([^"]*)"`)
)

// Read reads the chunks of a file. A comment that looks like a note and is none is an error.
func Read(name string) ([]Chunk, error) {
	text, err := os.ReadFile(name)
	if err != nil {
		return nil, err
	}
	return Split(filepath.Base(name), string(text))
}

// Split cuts a text into its chunks.
func Split(name, text string) ([]Chunk, error) {
	var chunks []Chunk
	var wants []Want
	var body strings.Builder
	number := 0
	flush := func() {
		chunks = append(chunks, Chunk{diag.NewSource(name, body.String()), wants})
		body.Reset()
		body.WriteString(strings.Repeat("\n", number))
		wants = nil
	}
	for line := range strings.Lines(text) {
		number++
		if strings.TrimRight(line, "\r\n") == "---" {
			flush()
			continue
		}
		body.WriteString(line)
		if !strings.Contains(line, "ERROR") {
			continue
		}
		m := note.FindStringSubmatch(strings.TrimRight(line, "\r\n"))
		if m == nil {
			return nil, fmt.Errorf("%s:%d: malformed note: %s", name, number, line)
		}
		for _, x := range item.FindAllStringSubmatch(m[1], -1) {
			column, _ := strconv.Atoi(x[1])
			wants = append(wants, Want{number, column, x[2]})
		}
	}
	flush()
	return chunks, nil
}

// Check compares the faults of a chunk with those expected, in the order of the text.
func Check(t testing.TB, c Chunk, got diag.List) {
	t.Helper()
	for i := range max(len(got), len(c.Wants)) {
		switch {
		case i >= len(got):
			w := c.Wants[i]
			t.Errorf("%s:%d:%d: no fault is found, expected %q", c.Source.Name, w.Line, w.Column, w.Text)
		case i >= len(c.Wants):
			t.Errorf("not expected: %v; hint: %s", got[i], got[i].Hint)
		default:
			compare(t, c.Wants[i], got[i])
		}
	}
}

func compare(t testing.TB, w Want, d diag.Diagnostic) {
	t.Helper()
	line, column := d.Source.Position(d.Span.Start)
	if line != w.Line || column != w.Column || !strings.Contains(d.Summary+" | "+d.Hint, w.Text) {
		t.Errorf("%v; hint: %s\nexpected at %d:%d: %q", d, d.Hint, w.Line, w.Column, w.Text)
	}
}
