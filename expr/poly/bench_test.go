package poly

import (
	"testing"
)

// The cases of the benchmark: the same polynomials, checksums and names as in the
// reference programs for FLINT and SymPy, which state the generator.

// benchChecksums are those that FLINT 2.9.0 prints (fmpz_mpoly_mul, fmpz_mpoly_divides,
// fmpz_mpoly_gcd on these inputs): the value of the result at x_i = i+2 modulo 2⁶¹ − 1.
var benchChecksums = map[string]struct {
	terms    int
	checksum uint64
}{
	"mul-dense":  {58905, 1313345140251787783},
	"mul-sparse": {2096600, 2095879361709027933},
	"div-sparse": {3003, 1902443043962856360},
	"mul-random": {3398, 1826498284668608735},
	"gcd-random": {60, 2305842975037549229},
	"small-mul":  {43, 2083799490524955103},
	"small-gcd":  {8, 251203672},
}

// benchRandom is a polynomial in n variables with the given number of terms of total
// degree at most 6.
func benchRandom(s *stream, n, terms int) Poly {
	seen := map[string]bool{}
	var ts []Term
	for len(ts) < terms {
		e := make([]byte, n)
		for range 6 {
			if v := s.next() % uint64(n+1); v < uint64(n) {
				e[v]++
			}
		}
		r := s.next()
		c := 1 + int64(r%(1<<20-1))
		if r>>63 == 1 {
			c = -c
		}
		if seen[string(e)] {
			continue
		}
		seen[string(e)] = true
		ts = append(ts, Term{FromInt(c).LeadCoef(), monoOf(e)})
	}
	return FromTerms(ts)
}

func monoOf(e []byte) []Power {
	var m []Power
	for i, x := range e {
		if x > 0 {
			m = append(m, Power{Var(i), uint32(x)})
		}
	}
	return m
}

// linear is 1 + Σ c[i]·x_iᵉ⁽ⁱ⁾.
func linear(c []int64, e []uint32) Poly {
	p := FromInt(1)
	for i := range c {
		p = p.Add(FromMono([]Power{{Var(i), e[i]}}).Mul(FromInt(c[i])))
	}
	return p
}

// benchCase is the operation of a case.
func benchCase(name string) func() Poly {
	quo := func(p, q Poly) func() Poly {
		return func() Poly {
			r, _ := p.DivExact(q)
			return r
		}
	}
	switch name {
	case "mul-dense":
		f := linear([]int64{1, 1, 1, 1}, []uint32{1, 1, 1, 1}).Pow(16)
		g := f.Add(FromInt(1))
		return func() Poly { return f.Mul(g) }
	case "mul-sparse", "div-sparse":
		f := linear([]int64{1, 1, 2, 3, 5}, []uint32{1, 1, 2, 3, 5}).Pow(10)
		g := linear([]int64{5, 3, 2, 1, 1}, []uint32{5, 3, 2, 1, 1}).Pow(10)
		if name == "mul-sparse" {
			return func() Poly { return f.Mul(g) }
		}
		return quo(f.Mul(g), g)
	}
	n, terms := 8, 60
	if name[:5] == "small" {
		n, terms = 3, 8
	}
	s := stream(1)
	f, g, h := benchRandom(&s, n, terms), benchRandom(&s, n, terms), benchRandom(&s, n, terms)
	if name == "mul-random" || name == "small-mul" {
		return func() Poly { return f.Mul(h) }
	}
	a, b := f.Mul(h), g.Mul(h)
	return func() Poly { return Gcd(a, b) }
}

var benchNames = []string{"mul-dense", "mul-sparse", "div-sparse", "mul-random", "gcd-random", "small-mul", "small-gcd"}

// TestBenchChecksums: the benchmark works on the same polynomials as the reference
// programs, and gets the same results.
func TestBenchChecksums(t *testing.T) {
	for _, name := range benchNames {
		r := benchCase(name)()
		got := r.EvalMod(Mersenne61, func(v Var) uint64 { return uint64(v) + 2 })
		if want := benchChecksums[name]; r.Len() != want.terms || got != want.checksum {
			t.Errorf("%s: %d terms, checksum %d; want %d, %d", name, r.Len(), got, want.terms, want.checksum)
		}
	}
}

func BenchmarkKernels(b *testing.B) {
	for _, name := range benchNames {
		b.Run(name, func(b *testing.B) {
			op := benchCase(name)
			var r Poly
			b.ReportAllocs()
			for b.Loop() {
				r = op()
			}
			b.ReportMetric(float64(r.Len())*float64(b.N)/b.Elapsed().Seconds(), "terms/s")
		})
	}
}
