package field

import (
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/poly"
)

func axioms(t *rapid.T, w *world) {
	a, b, c := w.drawElem(t, "a"), w.drawElem(t, "b"), w.drawElem(t, "c")
	before := a.String() + b.String()
	one := w.f.Int(1)
	same(t, "a + b = b + a", a.Add(b), b.Add(a))
	same(t, "(a + b) + c = a + (b + c)", a.Add(b).Add(c), a.Add(b.Add(c)))
	same(t, "ab = ba", a.Mul(b), b.Mul(a))
	same(t, "(ab)c = a(bc)", a.Mul(b).Mul(c), a.Mul(b.Mul(c)))
	same(t, "a(b + c) = ab + ac", a.Mul(b.Add(c)), a.Mul(b).Add(a.Mul(c)))
	same(t, "a − a = 0", a.Sub(a), Elem{})
	same(t, "1·a = a", one.Mul(a), a)
	if !a.IsZero() {
		same(t, "a/a = 1", a.Mul(a.Inv()), one)
		same(t, "(1/a)⁻¹ = a", a.Inv().Inv(), a)
		same(t, "(b/a)·a = b", b.Div(a).Mul(a), b)
		same(t, "a⁻² a³ = a", a.Pow(-2).Mul(a.Pow(3)), a)
	}
	if a.Equal(b) != a.Sub(b).IsZero() {
		t.Fatalf("%v and %v: Equal and the difference disagree", a, b)
	}
	same(t, "sum of a list", Sum([]Elem{a, b, c, a.Neg(), b}), b.Scale(2, 1).Add(c))
	coprime(t, w.f)
	if w.f.splits == 0 && before != a.String()+b.String() {
		t.Fatalf("operands changed: %s", before)
	}
}

func TestFieldAxioms(t *testing.T) {
	check(t, func(t *rapid.T) { axioms(t, newWorld()) })
}

func TestFieldAxiomsWithRootsAndFunctions(t *testing.T) {
	check(t, func(t *rapid.T) { axioms(t, newWorld().adjoin()) })
}

// random values of the generators modulo a prime, from a seed.
func point(seed uint64) func(Gen) uint64 {
	return func(g Gen) uint64 {
		x := (seed + uint64(g) + 1) * 0x9e3779b97f4a7c15
		x ^= x >> 29
		x *= 0xbf58476d1ce4e5b9
		return (x ^ x>>32) % uint64(poly.Mersenne61)
	}
}

// Values modulo 2⁶¹ − 1 are a ring homomorphism, and tell unequal elements apart.
func TestValuesModuloPrime(t *testing.T) {
	const m = poly.Mersenne61
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b := w.drawElem(t, "a"), w.drawElem(t, "b")
		at := point(uint64(rapid.Uint32().Draw(t, "seed")))
		value := func(e Elem) uint64 {
			v, ok := e.EvalMod(m, at)
			if !ok {
				t.Skip("a denominator vanishes at the point")
			}
			return v
		}
		va, vb := value(a), value(b)
		if got := value(a.Add(b)); got != m.Add(va, vb) {
			t.Fatalf("sum of %v and %v has value %d", a, b, got)
		}
		if got := value(a.Mul(b)); got != m.Mul(va, vb) {
			t.Fatalf("product of %v and %v has value %d", a, b, got)
		}
		if !b.IsZero() {
			if got := value(a.Div(b)); got != m.Mul(va, m.Inv(vb)) {
				t.Fatalf("quotient of %v and %v has value %d", a, b, got)
			}
		}
		if a.Equal(b) != (va == vb) {
			t.Fatalf("%v and %v: equal is %v, values are %d and %d", a, b, a.Equal(b), va, vb)
		}
	})
}

// A factor below is split by what is above while the fraction is inverted, or its sign is
// found: u = m² − H² is known as one factor when (m + H)/u comes.
func TestFactorsSplitOnTheWay(t *testing.T) {
	for _, c := range []struct {
		law string
		of  func(Elem) Elem
	}{
		{"inverse", Elem.Inv},
		{"square of the root", func(e Elem) Elem { return mustSqrt(t, e).Pow(2) }},
		{"derivative", Elem.D},
		{"lowest terms", Elem.Lowest},
		{"lowest terms after the sign was asked for", func(e Elem) Elem {
			if s := e.Neg().Sign(); s != Unknown {
				t.Errorf("%v has sign %d", e.Neg(), s)
			}
			return e.Lowest()
		}},
	} {
		w := newWorld()
		m, h := w.f.Gen(w.m), w.f.Gen(w.h)
		e := m.Add(h).Mul(m.Pow(2).Sub(h.Pow(2)).Inv()) // m + H is no factor yet
		if e.Num().IsOne() {
			t.Fatal("the fraction was cancelled too early to test anything")
		}
		got := c.of(e)
		same(t, c.law, got, c.of(m.Sub(h).Inv())) // this inverse splits the factor
		coprime(t, w.f)
	}
}

// Numerator, denominator and generators of a fraction belong together, also after a factor of
// the basis was split since it was made.
func TestPartsAgreeAfterSplit(t *testing.T) {
	w := newWorld()
	m, h, q := w.f.Gen(w.m), w.f.Gen(w.h), w.f.Gen(w.q)
	one := w.f.Int(1)
	e := m.Add(q).Mul(m.Add(q).Mul(h.Add(one)).Inv()) // one factor below
	if gens := e.Gens(); len(gens) != 3 {
		t.Fatalf("%v was cancelled too early to test anything", e)
	}
	h.Add(one).Inv() // splits it
	same(t, "Num/Den", w.fraction(t, e), h.Add(one).Inv())
	if gens := e.Gens(); len(gens) != 1 || gens[0] != w.h || e.Has(w.q) {
		t.Errorf("%v holds the generators %v", e, gens)
	}
}

func (w *world) fraction(t *testing.T, e Elem) Elem {
	t.Helper()
	num, err := w.f.Poly(e.Num())
	if err != nil {
		t.Fatal(err)
	}
	den, err := w.f.Poly(e.Den())
	if err != nil {
		t.Fatal(err)
	}
	return num.Div(den)
}

func mustSqrt(t *testing.T, e Elem) Elem {
	t.Helper()
	s, err := e.f.Sqrt(e)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func TestLowest(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		a, b, c := w.drawPoly(t, "a"), w.drawPoly(t, "b"), w.drawPoly(t, "c")
		if b.IsZero() || c.IsZero() {
			return
		}
		den := b.Mul(c).Inv() // one factor of the basis, if b and c were not seen before
		got := a.Mul(c).Mul(den).Lowest()
		same(t, "ac/(bc) = a/b", got, a.Div(b))
		if d := poly.Gcd(got.Num(), got.Den()); !d.IsConst() {
			t.Fatalf("%v has the common divisor %v", got, d)
		}
		coprime(t, w.f)
	})
}

// Factors multiply back, are pairwise coprime and stand in the promised order.
func TestFactors(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		e := w.drawElem(t, "e")
		if e.IsZero() {
			return
		}
		r, fs := e.Factors()
		back := w.f.Rat(r)
		for i, p := range fs {
			q, err := w.f.Poly(p.P)
			if err != nil || p.Exp == 0 {
				t.Fatalf("factor %v to the power %d: %v", p.P, p.Exp, err)
			}
			back = back.Mul(q.Pow(p.Exp))
			if i > 0 && p.P.IsMono() && !fs[i-1].P.IsMono() {
				t.Fatalf("factors of %v are out of order", e)
			}
		}
		same(t, "product of the factors", back, e)
		coprime(t, w.f)
	})
}

func TestSignsAndWhatMayVanish(t *testing.T) {
	w := newWorld()
	f := w.f
	m, q, k, a, h := f.Gen(w.m), f.Gen(w.q), f.Gen(w.k), f.Gen(w.a), f.Gen(w.h)
	n := f.Function("n", Negative)
	root, err := f.Sqrt(h.Mul(h).Add(m))
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		e     Elem
		sign  Sign
		zeros int
	}{
		{m, Positive, 0}, {q, Unknown, 1}, {m.Neg(), Negative, 0}, {f.Gen(n), Negative, 0},
		{h.Mul(h), Positive, 1}, {h.Mul(h).Add(m), Positive, 0}, {h.Mul(h).Add(q.Mul(q)), Unknown, 1},
		{k.Mul(k).Mul(a).Div(m.Add(a)), Positive, 0}, {f.Gen(n).Mul(a).Div(m), Negative, 0},
		{f.Gen(n).Pow(2), Positive, 0}, {m.Sub(a), Unknown, 1}, {h.Mul(q).Div(m.Sub(a)), Unknown, 2},
		{root, Positive, 0}, {f.Int(-3), Negative, 0}, {Elem{}, Unknown, 0},
	} {
		if got := c.e.Sign(); got != c.sign {
			t.Errorf("%v has sign %d, want %d", c.e, got, c.sign)
		}
		if got := c.e.Vanishable(); len(got) != c.zeros {
			t.Errorf("%v may vanish by %v, want %d factors", c.e, got, c.zeros)
		}
	}
}

// A sign holds for every value that respects the declarations, where it is not zero.
func TestSignIsTrue(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = []Elem{w.f.Gen(w.m), w.f.Gen(w.k), w.f.Gen(w.a), w.f.Gen(w.h)}
		e := w.drawPoly(t, "e")
		if e.IsZero() {
			return
		}
		at := map[Gen]int64{
			w.m: rapid.Int64Range(1, 9).Draw(t, "m"), w.k: rapid.Int64Range(1, 9).Draw(t, "k"),
			w.a: rapid.Int64Range(1, 9).Draw(t, "a"), w.h: rapid.Int64Range(-9, 9).Draw(t, "H"),
		}
		v, err := e.Substitute(func(g Gen) (Elem, bool) { return w.f.Int(at[g]), true })
		if err != nil {
			t.Fatalf("%v", err)
		}
		if s := e.Sign(); s != Unknown && !v.IsZero() && v.Sign() != s {
			t.Fatalf("%v has sign %d and value %v", e, s, v)
		}
		if v.IsZero() && len(e.Vanishable()) == 0 {
			t.Fatalf("%v vanishes and is said not to", e)
		}
	})
}

func TestAssumptionsAreRecordedOnce(t *testing.T) {
	w := newWorld()
	h, q := w.f.Gen(w.h), w.f.Gen(w.q)
	w.f.AssumeNonzero(h.Mul(q).Mul(w.f.Gen(w.a)), "first")
	w.f.AssumeNonzero(h.Pow(2), "second")
	got := w.f.Assumptions()
	if len(got) != 2 || got[0].Why != "first" || got[1].Why != "first" {
		t.Errorf("assumptions: %v", got)
	}
}

func TestSubstitute(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m := f.Gen(w.h), f.Gen(w.m)
	root, err := f.Sqrt(h.Add(m.Pow(2)))
	if err != nil {
		t.Fatal(err)
	}
	got, err := root.Div(h.Add(f.Int(1))).Substitute(func(g Gen) (Elem, bool) { return m.Pow(2).Scale(3, 1), g == w.h })
	if err != nil {
		t.Fatal(err)
	}
	same(t, "√(H + m²)/(H + 1) at H = 3m²", got, m.Scale(2, 1).Div(m.Pow(2).Scale(3, 1).Add(f.Int(1))))
	_, err = h.Add(f.Int(1)).Inv().Substitute(func(g Gen) (Elem, bool) { return f.Int(-1), g == w.h })
	if _, ok := err.(*ErrZeroDivisor); !ok {
		t.Errorf("1/(H+1) at H = −1: %v", err)
	}
	swapped, err := h.Sub(m).Substitute(func(g Gen) (Elem, bool) {
		if g == w.h {
			return m, true
		}
		return h, g == w.m
	})
	if err != nil {
		t.Fatal(err)
	}
	same(t, "H − m with H and m exchanged", swapped, m.Sub(h))
}
