package reduce

import (
	"errors"
	"os"
	"path/filepath"
	"testing"

	"remnant/parse"
	"remnant/parse/diag"
)

// shipped calls do with the name and text of every shipped model that is accepted.
func shipped(b *testing.B, do func(name, text string, m *parse.Model)) {
	b.Helper()
	files, err := filepath.Glob("../testdata/*.act")
	if err != nil || len(files) == 0 {
		b.Fatal("no shipped models", err)
	}
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			b.Fatal(err)
		}
		m, err := parse.Load(diag.NewSource(file, string(text)), nil)
		var refused diag.List
		if errors.As(err, &refused) {
			continue // of a form that is not reduced
		}
		do(filepath.Base(file), string(text), m)
	}
}

// BenchmarkReduce reads and reduces every shipped model, in its own sector.
func BenchmarkReduce(b *testing.B) {
	shipped(b, func(name, text string, _ *parse.Model) {
		b.Run(name, func(b *testing.B) {
			for b.Loop() {
				m := model(b, name, text)
				if _, err := Reduce(m); err != nil {
					b.Fatal(err)
				}
			}
		})
	})
}

// BenchmarkCovariant times every shipped covariant or adm model from its text on: the
// expansion alone, the reduction in all sectors, and the Noether check.
func BenchmarkCovariant(b *testing.B) {
	jobs := []struct {
		name string
		do   func(*parse.Model) error
	}{
		{"expand", func(m *parse.Model) error { _, err := new(Variants).Expand(m); return err }},
		{"sectors", func(m *parse.Model) error { _, err := Sectors(m); return err }},
		{"check", func(m *parse.Model) error { _, err := new(Variants).CheckGauge(m); return err }},
	}
	shipped(b, func(name, text string, m *parse.Model) {
		if m.Covariant == nil && m.ADM == nil {
			return
		}
		for _, job := range jobs {
			b.Run(name+"/"+job.name, func(b *testing.B) {
				for b.Loop() {
					if err := job.do(model(b, name, text)); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	})
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
