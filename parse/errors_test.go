package parse

import (
	"errors"
	"path/filepath"
	"testing"

	"remnant/parse/diag"
	"remnant/parse/parsetest"
)

// TestRefusals reads texts that note their faults at their places.
func TestRefusals(t *testing.T) {
	files, err := filepath.Glob("testdata/errors/*.act")
	if err != nil || len(files) == 0 {
		t.Fatal("no inputs", err)
	}
	for _, name := range files {
		t.Run(filepath.Base(name), func(t *testing.T) {
			chunks, err := parsetest.Read(name)
			if err != nil {
				t.Fatal(err)
			}
			for _, c := range chunks {
				parsetest.Check(t, c, faultsOf(t, c.Source))
			}
		})
	}
}

// faultsOf elaborates a source and returns what is wrong with it, but for parts that a
// text cut short for a test lacks.
func faultsOf(t testing.TB, src *diag.Source) diag.List {
	t.Helper()
	_, err := Load(src, nil)
	var list diag.List
	if err != nil && !errors.As(err, &list) {
		t.Fatalf("an error that is no list of faults: %v", err)
	}
	var kept diag.List
	for _, d := range list {
		if d.Kind != diag.Missing || d.Span.Start < len(src.Text) {
			kept = append(kept, d)
		}
	}
	return kept
}
