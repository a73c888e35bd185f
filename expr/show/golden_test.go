package show_test

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/rogpeppe/go-internal/txtar"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/show"
)

var update = flag.Bool("update", false, "write the golden files anew")

// TestGolden lays out the input of every archive in testdata and compares what each writer
// makes of it. An archive holds names (declarations) and input; its first line of comment
// says what it is there for. Input is one of
//
//	elem EXPR
//	linear                   then lines NAME ORDER: EXPR
//	action CLOCK NAME        then q₀, q₁, … one a line
//	matrix CLOCK NAME NAME   then lines symmetric|antisymmetric N A B: EXPR
func TestGolden(t *testing.T) {
	entries, err := os.ReadDir("testdata")
	if err != nil {
		t.Fatal(err)
	}
	if len(entries) == 0 {
		t.Fatal("no golden files")
	}
	for _, entry := range entries {
		path := filepath.Join("testdata", entry.Name())
		if filepath.Ext(path) != ".txtar" {
			t.Errorf("%s is read by no test", path)
			continue
		}
		t.Run(strings.TrimSuffix(entry.Name(), ".txtar"), func(t *testing.T) { golden(t, path) })
	}
}

func golden(t *testing.T, path string) {
	ar, err := txtar.ParseFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if len(ar.Comment) == 0 {
		t.Errorf("%s does not say what it is there for", path)
	}
	section := map[string]string{}
	for _, f := range ar.Files {
		if _, twice := section[f.Name]; twice {
			t.Fatalf("section %s stands twice", f.Name)
		}
		section[f.Name] = string(f.Data)
	}
	w, err := newWorld(section["names"])
	if err != nil {
		t.Fatal(err)
	}
	n, value, err := w.input(section["input"])
	if err != nil {
		t.Fatal(err)
	}
	checkNotation(t, w, n, value)
	got := outputs(n, value)
	if *update {
		ar.Files = ar.Files[:2]
		for _, o := range got {
			ar.Files = append(ar.Files, txtar.File{Name: o.name, Data: []byte(o.text)})
		}
		if err := os.WriteFile(path, txtar.Format(ar), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	if len(ar.Files) != len(got)+2 {
		t.Errorf("%d sections, want %d", len(ar.Files), len(got)+2)
	}
	for _, o := range got {
		if diff := cmp.Diff(section[o.name], o.text); diff != "" {
			t.Errorf("%s (-want +got):\n%s", o.name, diff)
		}
	}
}

// checkNotation reads a value back.
func checkNotation(t *testing.T, w *world, n show.Node, value *field.Elem) {
	t.Helper()
	if value == nil {
		return
	}
	back, err := w.read(show.Notation(n))
	if err != nil {
		t.Fatal(err)
	}
	if !back.Equal(*value) {
		t.Errorf("%s reads back as %v, want %v", show.Notation(n), back, *value)
	}
}

type output struct{ name, text string }

func outputs(n show.Node, value *field.Elem) []output {
	out := []output{
		{"text", show.Text(n, 0) + "\n"},
		{"narrow", show.Text(n, 40) + "\n"},
		{"ascii", show.ASCII(n, 0) + "\n"},
		{"latex", show.LaTeX(n) + "\n"},
		{"notation", show.Notation(n) + "\n"},
	}
	if value != nil {
		out = append(out, output{"go", show.GoSource(n, identifiers(value.Field())) + "\n"})
	}
	return out
}

// input lays out what the section says; value is nil where it is no element.
func (w *world) input(text string) (n show.Node, value *field.Elem, err error) {
	head, body, _ := strings.Cut(strings.TrimSpace(text), "\n")
	kind, rest, _ := strings.Cut(head, " ")
	var lines []string
	if body != "" {
		lines = strings.Split(body, "\n")
	}
	names := strings.Fields(rest)
	switch kind {
	case "elem":
		e, err := w.read(rest)
		return show.Elem(e), &e, err
	case "linear":
		var terms []show.LinearTerm
		terms, err = w.linear(lines)
		n = show.Linear(terms)
	case "action":
		var q []field.Elem
		for _, l := range lines {
			e, err := w.read(l)
			if err != nil {
				return nil, nil, err
			}
			q = append(q, e)
		}
		n = show.Action(names[0], names[1], q)
	case "matrix":
		var m oper.MatrixNormalForm
		m, err = w.matrix(len(names)-1, lines)
		n = show.ActionMatrix(names[0], names[1:], m)
	default:
		err = fmt.Errorf("no input %q", kind)
	}
	return n, nil, err
}

func (w *world) linear(lines []string) ([]show.LinearTerm, error) {
	var terms []show.LinearTerm
	for _, l := range lines {
		head, expr, _ := strings.Cut(l, ":")
		var term show.LinearTerm
		if _, err := fmt.Sscanf(head, "%s %d", &term.Name, &term.Order); err != nil {
			return nil, err
		}
		var err error
		if term.Coef, err = w.read(expr); err != nil {
			return nil, err
		}
		terms = append(terms, term)
	}
	return terms, nil
}

func (w *world) matrix(size int, lines []string) (oper.MatrixNormalForm, error) {
	var m oper.MatrixNormalForm
	grow := func(q *[][][]field.Elem, n int) {
		for len(*q) <= n {
			rows := make([][]field.Elem, size)
			for i := range rows {
				rows[i] = make([]field.Elem, size)
			}
			*q = append(*q, rows)
		}
	}
	for _, l := range lines {
		head, expr, _ := strings.Cut(l, ":")
		var kind string
		var n, a, b int
		if _, err := fmt.Sscanf(head, "%s %d %d %d", &kind, &n, &a, &b); err != nil {
			return m, err
		}
		e, err := w.read(expr)
		if err != nil {
			return m, err
		}
		into, mirror := &m.Symmetric, e
		if kind == "antisymmetric" {
			into, mirror = &m.Antisymmetric, e.Neg()
		}
		grow(into, n)
		(*into)[n][b][a] = mirror
		(*into)[n][a][b] = e
	}
	return m, nil
}

func identifiers(f *field.Field) func(string, int, []string) string {
	gens := make([]field.Gen, f.NumGens())
	for i := range gens {
		gens[i] = field.Gen(i)
	}
	return show.GoIdentifiers(f, gens).Symbol
}
