package parse

import (
	"context"
	"errors"
	"strings"
	"testing"
	"time"

	"remnant/expr/budget"
	"remnant/parse/diag"
)

// seedCorpus adds the shipped models and the refused texts to what a fuzz test starts from.
func seedCorpus(f *testing.F) {
	for _, name := range shippedFiles(f) {
		f.Add(readSource(f, name).Text)
	}
	for _, x := range Examples() {
		f.Add(x.Text)
	}
	for _, text := range []string{
		"", "\ufeff", "#", "let x = ½ζ''\r\n  + □[u]", "let x = a^-b^-c!'", "let x = -box*F(box)[u]'^2[v],i",
		"let x = 1e999\nlet y = 0.5.5\nlet z = F.2.n", "model \"\"\n\n# c\n  # d\nkeep u # e",
		"background a\nfields u\nlagrangian quadratic = box^2[u]*u/H + sqrt(a)*exp(H)*u'^2",
	} {
		f.Add(text)
	}
}

// FuzzLex: the tokens and comments of a text are pieces of it, in order, and with the
// blanks between them they are all of it, unless something was refused.
func FuzzLex(f *testing.F) {
	seedCorpus(f)
	f.Fuzz(func(t *testing.T, text string) {
		s := &scanner{src: diag.NewSource("fuzz.act", text)}
		s.scan()
		covered := make([]bool, len(text))
		cover := func(at diag.Span, value string) {
			if s.src.Slice(at) != value {
				t.Fatalf("%q is said to stand at %v of %q", value, at, text)
			}
			for i := at.Start; i < at.End; i++ {
				if covered[i] {
					t.Fatalf("byte %d of %q is read twice", i, text)
				}
				covered[i] = true
			}
		}
		for _, l := range s.lines {
			for i := range l.tokens {
				cover(tokenSpan(&l.tokens[i]), l.tokens[i].Value)
			}
		}
		for _, c := range s.comments {
			cover(c.At, c.Text)
		}
		checkFaults(t, s.faults)
		if len(s.faults) > 0 {
			return
		}
		for i, yes := range covered {
			if !yes && !strings.ContainsRune(" \t\r\n\v\f", rune(text[i])) && !strings.HasPrefix(text, "\ufeff") {
				t.Fatalf("byte %d of %q is passed over", i, text)
			}
		}
	})
}

// checkFaults expects every fault to lie in its text and to be drawn.
func checkFaults(t *testing.T, list diag.List) {
	t.Helper()
	for _, d := range list {
		if d.Span.Start < 0 || d.Span.End < d.Span.Start || d.Span.End > len(d.Source.Text) {
			t.Fatalf("the fault %q lies outside of its text: %v", d.Summary, d.Span)
		}
		if d.Kind == "" || d.Summary == "" {
			t.Fatalf("a fault without words: %+v", d)
		}
	}
	var b strings.Builder
	if err := diag.Render(&b, list); err != nil {
		t.Fatal(err)
	}
}

// FuzzParse: what parses is laid out, parses to the same tree, and is laid out the same
// again.
func FuzzParse(f *testing.F) {
	seedCorpus(f)
	f.Fuzz(func(t *testing.T, text string) {
		file, list := Parse(diag.NewSource("fuzz.act", text))
		checkFaults(t, list)
		if len(list) == 0 {
			checkLayout(t, file)
		}
	})
}

// FuzzElaborate: every text gives a model or faults, and stays within its budget.
func FuzzElaborate(f *testing.F) {
	seedCorpus(f)
	f.Fuzz(func(t *testing.T, text string) {
		ctx, cancel := context.WithTimeout(t.Context(), 2*time.Second)
		defer cancel()
		_, err := Load(diag.NewSource("fuzz.act", text), budget.New(ctx, 20000))
		var list diag.List
		var stop *budget.Stop
		switch {
		case errors.As(err, &list):
			checkFaults(t, list)
		case err != nil && !errors.As(err, &stop):
			t.Fatalf("an error of no known kind: %v", err)
		}
	})
}
