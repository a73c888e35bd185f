package poly

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// quotients is p/q by every method that applies, nil where it fails.
func quotients(p, q Poly) map[string]*Poly {
	out := map[string]*Poly{}
	put := func(name string, r Poly, ok bool) {
		out[name] = nil
		if ok {
			out[name] = &r
		}
	}
	r, ok := p.DivExact(q)
	put("chosen", r, ok)
	if p.IsZero() || q.Len() < 2 || p.Len() < 2 {
		return out
	}
	l, pe, qe, bound := quotientLayout(p.d, q.d)
	if l == nil {
		return out
	}
	a, c := operand{pe, p.d.co, p.d.bg}, operand{qe, q.d.co, q.d.bg}
	try := func(name string, f func(b *builder) quotient) {
		b := newBuilder(l, 0)
		if res := f(&b); res != tooBig {
			put(name, b.canonical(), res == divides)
		}
	}
	if a.bg == nil && c.bg == nil {
		try("heap on words", func(b *builder) quotient { return Ops{}.divHeapWords(b, a, c, bound) })
		if l.words == 1 {
			try("heap", func(b *builder) quotient { return Ops{}.divHeap(b, a, c, bound[0]) })
			for _, k := range cuts(l, l.degrees(pe), pe, qe) {
				try("array "+string(rune('a'+k.first)), func(b *builder) quotient {
					return Ops{}.divArray(b, a, c, bound[0], k)
				})
			}
		}
	}
	a.big()
	c.big()
	r, ok = Ops{}.divBig(l, a, c, bound)
	put("big", r, ok)
	return out
}

func TestQuotients(t *testing.T) {
	check := func(t *rapid.T, s shape) {
		p, q := s.poly().Draw(t, "p"), s.nonzero().Draw(t, "q")
		for name, r := range quotients(p.Mul(q), q) {
			if r == nil {
				t.Fatalf("%s: %v does not divide its product with %v", name, q, p)
			}
			wantEqual(t, *r, p)
		}
	}
	shapes(t, check)
	t.Run("medium", func(t *testing.T) {
		rapid.Check(t, func(t *rapid.T) { check(t, shape{4, 40, 6, smallInts}) })
	})
}

// TestInexact: a quotient is given only where it multiplies back, and all methods agree
// on that; a disturbed product is refused.
func TestInexact(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, q, r := s.poly().Draw(t, "p"), s.nonzero().Draw(t, "q"), s.nonzero().Draw(t, "r")
		for _, n := range []Poly{p, p.Mul(q).Add(r)} {
			all := quotients(n, q)
			for name, u := range all {
				if (u == nil) != (all["chosen"] == nil) {
					t.Fatalf("%s and the chosen method differ on whether %v divides %v", name, q, n)
				}
				if u != nil {
					wantEqual(t, must(t, *u).Mul(q), n)
				}
			}
		}
		if q.IsConst() {
			return
		}
		if _, ok := p.Mul(q).Add(FromInt(1)).DivExact(q); ok {
			t.Fatalf("%v divides 1 more than a multiple", q)
		}
	})
}

// TestQuotientLeavesWord: the coefficients of dividend and divisor are words, some of
// those of the quotient are not: (x+1)⁷²·(x−1)³⁰ against (x−1)³⁰.
func TestQuotientLeavesWord(t *testing.T) {
	x := FromVar(0)
	want := x.Add(FromInt(1)).Pow(72)
	d := x.Sub(FromInt(1)).Pow(30)
	p := want.Mul(d)
	if p.d.bg != nil || want.d.bg == nil {
		t.Fatal("the example does not show what it should")
	}
	for name, r := range quotients(p, d) {
		if r == nil || !must(t, *r).Equal(want) {
			t.Errorf("%s: wrong quotient", name)
		}
	}
}

func TestDivisionByZeroPanics(t *testing.T) {
	for name, f := range map[string]func(){
		"polynomial": func() { FromVar(1).DivExact(Poly{}) },
		"integer":    func() { FromVar(1).DivExactInt(new(big.Int)) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			f()
		}()
	}
}
