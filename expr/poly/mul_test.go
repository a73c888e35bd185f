package poly

import (
	"math"
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// naive is the product by the distributive law.
func naive(p, q Poly) Poly {
	var terms []Term
	for m, c := range p.Terms() {
		for n, d := range q.Terms() {
			terms = append(terms, Term{new(big.Int).Mul(c, d), normalMono(append(append([]Power{}, m...), n...))})
		}
	}
	return FromTerms(terms)
}

// products is p·q by every method that applies to the operands.
func products(p, q Poly) map[string]Poly {
	out := map[string]Poly{"chosen": p.Mul(q), "swapped": q.Mul(p)}
	if p.IsZero() || q.IsZero() {
		return out
	}
	l, pe, qe := productLayout(p.d, q.d)
	a, c := operand{pe, p.d.co, p.d.bg}, operand{qe, q.d.co, q.d.bg}
	put := func(name string, f func(b *builder)) {
		b := newBuilder(l, 0)
		f(&b)
		out[name] = b.canonical()
	}
	if a.bg == nil && c.bg == nil {
		put("heap on words", func(b *builder) { Ops{}.mulHeapWords(b, a, c) })
		if l.words == 1 {
			put("heap", func(b *builder) { Ops{}.mulHeap(b, a, c) })
			deg := l.degrees(pe)
			for i, d := range l.degrees(qe) {
				deg[i] += d
			}
			for _, k := range cuts(l, deg, pe, qe) {
				for _, full := range []float64{0, 1e18} {
					arrayFull = full
					put("array", func(b *builder) { Ops{}.mulArray(b, a, c, k) })
					arrayFull = defaultFull
					out["array "+string(rune('a'+k.first))+map[float64]string{0: " full", 1e18: " sparse"}[full]] = out["array"]
				}
			}
		}
	}
	a.big()
	c.big()
	put("big", func(b *builder) { Ops{}.mulHeapBig(b, a, c) })
	return out
}

var defaultFull = arrayFull

func TestProducts(t *testing.T) {
	medium := shape{4, 40, 6, smallInts}
	check := func(t *rapid.T, s shape) {
		p, q := s.poly().Draw(t, "p"), s.poly().Draw(t, "q")
		want := naive(p, q)
		for name, got := range products(p, q) {
			if !must(t, got).Equal(want) {
				t.Fatalf("%s: (%v)·(%v) = %v, want %v", name, p, q, got, want)
			}
		}
	}
	shapes(t, check)
	t.Run("medium", func(t *testing.T) { rapid.Check(t, func(t *rapid.T) { check(t, medium) }) })
}

// TestAccumulators: sums of products of full words, which need three words.
func TestAccumulators(t *testing.T) {
	ends := rapid.SampledFrom([]int64{math.MaxInt64, -math.MaxInt64, math.MaxInt64 - 1, 1 << 62, -1, 1})
	s := shape{2, 30, 4, rapid.Map(ends, big.NewInt)}
	rapid.Check(t, func(t *rapid.T) {
		p, q := s.poly().Draw(t, "p"), s.poly().Draw(t, "q")
		want := naive(p, q)
		for name, got := range products(p, q) {
			if !must(t, got).Equal(want) {
				t.Fatalf("%s: (%v)·(%v) = %v, want %v", name, p, q, got, want)
			}
		}
	})
}

func TestPow(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, n := s.poly().Draw(t, "p"), rapid.IntRange(0, 4).Draw(t, "n")
		want := FromInt(1)
		for range n {
			want = naive(want, p)
		}
		wantEqual(t, p.Pow(n), want)
	})
}

func TestMulIntMono(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, c, m := s.poly().Draw(t, "p"), s.coef.Draw(t, "c"), s.mono().Draw(t, "m")
		wantEqual(t, p.MulInt(c), naive(p, FromBig(c)))
		wantEqual(t, p.MulMono(m), naive(p, FromMono(m)))
		q, ok := p.MulMono(m).DivMono(m)
		if !ok {
			t.Fatalf("%v does not divide its multiple", m)
		}
		wantEqual(t, q, p)
		if c.Sign() != 0 {
			q, ok = p.MulInt(c).DivExactInt(c)
			if !ok {
				t.Fatalf("%v does not divide its multiple", c)
			}
			wantEqual(t, q, p)
		}
	})
}

// TestBinomial: (x+y)ⁿ has the binomial coefficients, also where they leave a word.
func TestBinomial(t *testing.T) {
	const n = 80
	p := must(t, FromVar(0).Add(FromVar(1)).Pow(n))
	if p.Len() != n+1 {
		t.Fatalf("%d terms", p.Len())
	}
	for m, c := range p.Terms() {
		k := int64(0)
		if m[0].Var == 0 {
			k = int64(m[0].Exp)
		}
		if want := new(big.Int).Binomial(n, k); c.Cmp(want) != 0 {
			t.Errorf("coefficient %d: %v, want %v", k, c, want)
		}
	}
}
