package poly

import (
	"slices"
	"sync"
	"testing"

	"pgregory.net/rapid"
)

// FuzzExact lets the fuzzer choose what rapid draws: products are divided again, and
// common factors found.
func FuzzExact(f *testing.F) {
	f.Fuzz(rapid.MakeFuzz(func(t *rapid.T) {
		s := rapid.SampledFrom([]shape{tiny, edge, {9, 6, 3, smallInts}}).Draw(t, "shape")
		p, q, h := s.nonzero().Draw(t, "p"), s.nonzero().Draw(t, "q"), s.nonzero().Draw(t, "h")
		ph, qh := p.Mul(h), q.Mul(h)
		r, ok := ph.DivExact(h)
		if !ok {
			t.Fatalf("%v does not divide %v", h, ph)
		}
		wantEqual(t, r, p)
		wantEqual(t, Gcd(ph, qh), Gcd(p, q).Mul(h).positive())
	}))
}

// TestShared: polynomials may be used by many goroutines at once; run under the race
// detector.
func TestShared(t *testing.T) {
	s := stream(3)
	f, g, h := benchRandom(&s, 4, 20), benchRandom(&s, 4, 20), benchRandom(&s, 4, 10)
	a, b := f.Mul(h), g.Mul(h)
	want := []Poly{a.Mul(b), Gcd(a, b), a.Add(b)}
	var wait sync.WaitGroup
	got := make([][]Poly, 8)
	for i := range got {
		wait.Go(func() { got[i] = []Poly{a.Mul(b), Gcd(a, b), a.Add(b)} })
	}
	wait.Wait()
	for _, r := range got {
		if !slices.EqualFunc(r, want, Poly.Equal) {
			t.Fatal("a result differs when computed concurrently")
		}
	}
}
