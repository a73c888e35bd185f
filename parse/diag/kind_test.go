package diag_test

import (
	"errors"
	"go/ast"
	"go/parser"
	"go/token"
	"strconv"
	"strings"
	"testing"

	"remnant/parse"
	"remnant/parse/diag"
)

// madeByTests are the kinds whose smallest example is no readable text.
var madeByTests = map[diag.Kind]func() (string, func(*diag.Source) error){
	diag.TooLarge: func() (string, func(*diag.Source) error) { return strings.Repeat("#", 8<<20+1), load },
	diag.Binary:   func() (string, func(*diag.Source) error) { return "model \"\x00\"", load },
	diag.NotUTF8:  func() (string, func(*diag.Source) error) { return "model \"\xff\"", load },
	diag.TooDeep:  func() (string, func(*diag.Source) error) { return "let x = " + strings.Repeat("(", 1001), load },
	diag.OrderTooHigh: func() (string, func(*diag.Source) error) {
		return "fields u\nkeep v = u" + strings.Repeat("'", 33), load
	},
	diag.PointForm: func() (string, func(*diag.Source) error) {
		return "H", func(s *diag.Source) error { _, faults := parse.Points(s); return faults.Err() }
	},
}

func load(s *diag.Source) error {
	_, err := parse.Load(s, nil)
	return err
}

// TestKinds runs the example in the comment of every kind and expects to be refused for it.
func TestKinds(t *testing.T) {
	file, err := parser.ParseFile(token.NewFileSet(), "kind.go", nil, parser.ParseComments)
	if err != nil {
		t.Fatal(err)
	}
	count := 0
	ast.Inspect(file, func(n ast.Node) bool {
		spec, ok := n.(*ast.ValueSpec)
		if !ok {
			return true
		}
		text, err := strconv.Unquote(spec.Values[0].(*ast.BasicLit).Value)
		if err != nil {
			t.Fatal(err)
		}
		count++
		t.Run(spec.Names[0].Name, func(t *testing.T) { runExample(t, diag.Kind(text), spec.Doc.Text()) })
		return true
	})
	if count < 40 {
		t.Errorf("only %d kinds were found", count)
	}
}

func runExample(t *testing.T, kind diag.Kind, comment string) {
	_, example, ok := strings.Cut(comment, "Example:\n")
	run := load
	if made := madeByTests[kind]; made != nil {
		example, run = made()
	} else if !ok {
		t.Fatal("its comment holds no example")
	}
	var text strings.Builder
	for line := range strings.Lines(example) {
		text.WriteString(strings.TrimPrefix(line, "\t"))
	}
	err := run(diag.NewSource("example.act", text.String()))
	var list diag.List
	if !errors.As(err, &list) {
		t.Fatalf("the example was not refused: %v", err)
	}
	for _, d := range list {
		if d.Kind == kind {
			checkWords(t, d)
			return
		}
	}
	t.Errorf("the example is refused for other reasons: %v", list)
}

// checkWords holds the style of messages: lower case, no full stop.
func checkWords(t *testing.T, d diag.Diagnostic) {
	for _, text := range []string{d.Summary, d.Hint} {
		if strings.HasSuffix(text, ".") || strings.Contains(text, "\n") {
			t.Errorf("a message ends with a full stop or has two lines: %q", text)
		}
	}
	if d.Summary == "" {
		t.Error("the message is empty")
	}
}
