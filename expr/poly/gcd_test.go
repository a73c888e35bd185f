package poly

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// gcdShapes keeps the products of the gcd tests small.
var gcdShapes = map[string]shape{
	"tiny":   {3, 4, 2, smallInts},
	"edge":   {3, 4, 2, edge.coef},
	"many":   {9, 6, 2, smallInts},
	"wide":   {24, 4, 12, smallInts},
	"sparse": {3, 4, 40, smallInts},
	"one":    {1, 8, 8, edge.coef},
}

func gcdProperty(t *testing.T, property func(t *rapid.T, s shape)) {
	for name, s := range gcdShapes {
		t.Run(name, func(t *testing.T) { rapid.Check(t, func(t *rapid.T) { property(t, s) }) })
	}
}

// TestGcdOfMultiples: gcd(fh, gh) = h·gcd(f, g), and it divides both.
func TestGcdOfMultiples(t *testing.T) {
	gcdProperty(t, func(t *rapid.T, s shape) {
		f, g, h := s.poly().Draw(t, "f"), s.poly().Draw(t, "g"), s.nonzero().Draw(t, "h")
		fh, gh := f.Mul(h), g.Mul(h)
		d := must(t, Gcd(fh, gh))
		wantEqual(t, d, Gcd(f, g).Mul(h).positive())
		wantEqual(t, Gcd(gh, fh), d)
		if d.IsZero() {
			return
		}
		u, ok := fh.DivExact(d)
		v, ok2 := gh.DivExact(d)
		if !ok || !ok2 {
			t.Fatalf("gcd %v of %v and %v does not divide both", d, fh, gh)
		}
		if c := Gcd(u, v); !c.IsOne() && !d.IsZero() {
			t.Fatalf("cofactors have the common factor %v", c)
		}
	})
}

// TestGcdMethods: the modular method and remainder sequences agree.
func TestGcdMethods(t *testing.T) {
	for name, s := range map[string]shape{"two": {2, 4, 2, smallInts}, "one": {1, 6, 6, edge.coef}} {
		t.Run(name, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				h := s.nonzero().Draw(t, "h")
				p := s.nonzero().Draw(t, "f").Mul(h).primitive()
				q := s.nonzero().Draw(t, "g").Mul(h).primitive()
				p, _ = p.DivMono(p.MonoContent())
				q, _ = q.DivMono(q.MonoContent())
				if p.IsConst() || q.IsConst() {
					return
				}
				g, ok := Ops{}.gcdModular(p, q)
				if !ok {
					t.Fatalf("no modular gcd of %v, %v", p, q)
				}
				wantEqual(t, g, Ops{}.gcdPRS(p, q))
			})
		})
	}
}

// TestGcdLeadingCoefficients: cases where the leading coefficients share more than the
// gcd's, and where the gcd is free of the main variable.
func TestGcdLeadingCoefficients(t *testing.T) {
	x, y, z, w := FromVar(0), FromVar(1), FromVar(2), FromVar(3)
	n := FromInt
	a := x.Mul(y).Add(z).Add(n(1))
	for _, c := range []struct {
		why  string
		p, q Poly
		want Poly
	}{
		{"common leading coefficient", y.Mul(x).Add(n(1)), y.Mul(x).Add(n(2)), n(1)},
		{"leading coefficient times gcd", y.Add(z).Mul(x).Add(n(1)).Mul(a), y.Add(z).Mul(x).Add(n(2)).Mul(a), a},
		{"gcd free of the main variable", x.Add(n(1)).Mul(y.Add(z)), x.Sub(n(1)).Mul(y.Add(z)), y.Add(z)},
		{"content and primitive part", x.Add(y).Mul(z.Add(w)).Mul(x.Add(n(1))), x.Add(y).Mul(z.Add(w)).Mul(x.Sub(n(1))), x.Add(y).Mul(z.Add(w))},
		{"content with cancelling leading terms", x.Mul(y).Add(n(1)).Mul(y.Mul(z).Add(n(1))).Mul(x.Mul(z).Add(n(5))),
			x.Mul(y).Add(n(1)).Mul(y.Mul(z).Add(n(1))).Mul(x.Mul(z).Add(n(7))), x.Mul(y).Add(n(1)).Mul(y.Mul(z).Add(n(1)))},
		{"one divides the other", a, a.Mul(a), a},
		{"disjoint variables", x.Add(n(1)), y.Add(n(1)), n(1)},
		{"integer leading coefficients", n(6).Mul(x).Add(n(3)).Mul(a), n(10).Mul(x).Add(n(5)).Mul(a), n(2).Mul(x).Add(n(1)).Mul(a)},
		{"inactive variable in the leading coefficients", n(6).Mul(w).Mul(x).Add(y).Mul(n(2).Mul(x).Add(z)), n(9).Mul(w).Mul(x).Sub(y).Mul(n(2).Mul(x).Add(z)), n(2).Mul(x).Add(z)},
		{"contents", n(12).Mul(x), n(18).Mul(x).Mul(y), n(6).Mul(x)},
		{"zero", Poly{}, n(-4).Mul(x), n(4).Mul(x)},
	} {
		if got := must(t, Gcd(c.p, c.q)); !got.Equal(c.want) {
			t.Errorf("%s: gcd(%v, %v) = %v, want %v", c.why, c.p, c.q, got, c.want)
		}
	}
}

// TestGcdLargeCoefficients: a gcd whose coefficients need several primes.
func TestGcdLargeCoefficients(t *testing.T) {
	c := func(k int64) Poly { return FromBig(new(big.Int).Exp(big.NewInt(7), big.NewInt(k), nil)) }
	x, y, z := FromVar(0), FromVar(1), FromVar(2)
	h := c(200).Mul(x).Mul(y).Add(c(150).Mul(z)).Add(c(90).Mul(x)).Sub(FromInt(1))
	f := x.Mul(x).Mul(c(100)).Add(y).Add(FromInt(3))
	g := x.Mul(z).Sub(y.Mul(c(120))).Add(FromInt(5))
	wantEqual(t, Gcd(f.Mul(h), g.Mul(h)), h)
}

// TestGcdHighDegree: degrees far above what dense images can hold still give the gcd.
func TestGcdHighDegree(t *testing.T) {
	pw := func(n uint32) Poly { return FromMono([]Power{{0, n}}) }
	y := FromVar(1)
	h := pw(100000).Add(y)
	wantEqual(t, Gcd(h.Mul(y.Add(FromInt(1))), h.Mul(y.Sub(FromInt(1)))), h)
}

// TestModularSucceeds: the method of last resort is not what makes gcds right.
func TestModularSucceeds(t *testing.T) {
	gcdProperty(t, func(t *rapid.T, s shape) {
		h := s.nonzero().Draw(t, "h")
		p, q := s.nonzero().Draw(t, "f").Mul(h).primitive(), s.nonzero().Draw(t, "g").Mul(h).primitive()
		p, _ = p.DivMono(p.MonoContent())
		q, _ = q.DivMono(q.MonoContent())
		if p.IsConst() || q.IsConst() {
			return
		}
		if _, ok := (Ops{}).gcdModular(p, q); !ok {
			t.Fatalf("modular method gives up on %v, %v", p, q)
		}
	})
}
