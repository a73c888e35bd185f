package reduce

import (
	"errors"
	"os"
	"path/filepath"
	"testing"

	"remnant/parse"
	"remnant/parse/diag"
)

// BenchmarkReduce reads and reduces every shipped model of the quadratic form.
func BenchmarkReduce(b *testing.B) {
	files, err := filepath.Glob("../testdata/*.act")
	if err != nil || len(files) == 0 {
		b.Fatal("no shipped models", err)
	}
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			b.Fatal(err)
		}
		var refused diag.List
		if _, err := parse.Load(diag.NewSource(file, string(text)), nil); errors.As(err, &refused) {
			continue // of a form that is not reduced
		}
		b.Run(filepath.Base(file), func(b *testing.B) {
			for b.Loop() {
				m, err := parse.Load(diag.NewSource(file, string(text)), nil)
				if err != nil {
					b.Fatal(err)
				}
				if _, err := Reduce(m); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkCount times the independent count on the largest shipped form.
func BenchmarkCount(b *testing.B) {
	s := Quadratic(load(b, "whimbrel.act"))
	for b.Loop() {
		if _, err := s.CountSolutions(); err != nil {
			b.Fatal(err)
		}
	}
}
