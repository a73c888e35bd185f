package poly

import (
	"context"
	"errors"
	"math"
	"math/big"
	"slices"
	"testing"
	"unsafe"

	"pgregory.net/rapid"

	"remnant/expr/budget"
	"remnant/expr/ringtest"
)

func TestAxioms(t *testing.T) {
	for name, s := range map[string]shape{"tiny": tiny, "edge": edge, "wide": wide} {
		t.Run(name, func(t *testing.T) {
			ringtest.Axioms(t, ringtest.Ring[Poly]{
				Zero: Poly{}, One: FromInt(1),
				Add: Poly.Add, Sub: Poly.Sub, Mul: Poly.Mul, Neg: Poly.Neg, Equal: Poly.Equal,
				Quo:         Poly.DivExact,
				Derive:      func(p Poly) Poly { return p.Deriv(4) },
				Gen:         s.poly(),
				Commutative: true,
				Check:       canonical,
				Show:        Poly.String,
			})
		})
	}
}

// TestWordBoundary: coefficients change between words and big integers exactly at ±2⁶³.
func TestWordBoundary(t *testing.T) {
	x := FromVar(0)
	max, min := FromInt(math.MaxInt64).Mul(x), FromInt(math.MinInt64).Mul(x)
	two63 := FromBig(new(big.Int).Lsh(big.NewInt(1), 63)).Mul(x)
	for _, c := range []struct {
		why       string
		got, want Poly
	}{
		{"sum leaves the word", max.Add(x), two63},
		{"and comes back", max.Add(x).Sub(x), max},
		{"−2⁶³ by a sum", max.Neg().Sub(x), min},
		{"negation of −2⁶³", min.Neg(), two63},
		{"product", FromInt(1 << 32).Mul(FromInt(1 << 31)).Mul(x), two63},
		{"product to −2⁶³", FromInt(-1 << 32).Mul(FromInt(1 << 31)).Mul(x), min},
		{"sum of products", x.MulInt(big.NewInt(1 << 62)).Mul(x.Add(FromInt(1))).Mul(FromInt(2)), two63.Mul(x).Add(two63)},
		{"cancelled to nothing", min.Add(two63), Poly{}},
		{"derivative", FromBig(big.NewInt(1 << 62)).Mul(x).Mul(x).Deriv(0), two63},
	} {
		if err := canonical(c.got); err != nil || !c.got.Equal(c.want) {
			t.Errorf("%s: got %v (%v), want %v", c.why, c.got, err, c.want)
		}
	}
	if q, ok := min.DivExact(FromInt(-1)); !ok || !q.Equal(two63) {
		t.Errorf("−2⁶³/−1 = %v, %v", q, ok)
	}
}

func TestTermsRoundTrip(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p := must(t, s.poly().Draw(t, "p"))
		var terms []Term
		for m, c := range p.Terms() {
			terms = append(terms, Term{c, slices.Clone(m)})
		}
		if len(terms) != p.Len() {
			t.Fatalf("%d terms, Len %d", len(terms), p.Len())
		}
		slices.Reverse(terms)
		wantEqual(t, FromTerms(terms), p)
		var parts []Poly
		for _, x := range terms {
			parts = append(parts, FromMono(x.Mono).MulInt(x.Coef))
		}
		wantEqual(t, Sum(parts), p)
	})
}

func TestCompareIsTotal(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p, q, r := s.poly().Draw(t, "p"), s.poly().Draw(t, "q"), s.poly().Draw(t, "r")
		if p.Compare(q) != -q.Compare(p) || (p.Compare(q) == 0) != p.Equal(q) {
			t.Fatalf("Compare is not antisymmetric: %v, %v", p, q)
		}
		if p.Compare(q) <= 0 && q.Compare(r) <= 0 && p.Compare(r) > 0 {
			t.Fatalf("Compare is not transitive: %v, %v, %v", p, q, r)
		}
	})
}

// TestDegrees compares the degree functions with the terms.
func TestDegrees(t *testing.T) {
	shapes(t, func(t *rapid.T, s shape) {
		p := s.nonzero().Draw(t, "p")
		for v := range Var(80) {
			lo, hi, total := math.MaxInt, 0, 0
			for m := range p.Terms() {
				e, sum := 0, 0
				for _, x := range m {
					sum += int(x.Exp)
					if x.Var == v {
						e = int(x.Exp)
					}
				}
				lo, hi, total = min(lo, e), max(hi, e), max(total, sum)
			}
			if p.Degree(v) != hi || p.MinDegree(v) != lo || p.TotalDegree() != total || p.Has(v) != (hi > 0) {
				t.Fatalf("degrees of %v in %d", p, v)
			}
		}
	})
}

func TestZero(t *testing.T) {
	var z Poly
	if !z.IsZero() || z.Len() != 0 || z.Sign() != 0 || z.Degree(1) != -1 || z.TotalDegree() != -1 || !z.IsConst() {
		t.Error("the zero value is not the polynomial 0")
	}
	if z.String() != "0" || z.LeadCoef().Sign() != 0 || len(z.Vars()) != 0 || z.Content().Sign() != 0 {
		t.Error("properties of 0")
	}
	if c, ok := z.Const(); !ok || c.Sign() != 0 {
		t.Error("0 is a constant")
	}
	if _, p := z.PrimitivePart(); !p.IsZero() {
		t.Error("primitive part of 0")
	}
	for _, p := range []Poly{z.Neg(), z.Add(z), z.Mul(FromVar(1)), z.Deriv(1), z.Subst(1, z), FromInt(0), z.Pow(3), Gcd(z, z), Sum(nil)} {
		if !p.IsZero() {
			t.Errorf("%v is not 0", p)
		}
	}
	if !z.Pow(0).IsOne() {
		t.Error("0⁰ is not 1")
	}
}

func TestString(t *testing.T) {
	x, y := FromVar(0), FromVar(1)
	for _, c := range []struct {
		p    Poly
		want string
	}{
		{x.Sub(y), "x0 - x1"},
		{x.Mul(y).Pow(2).MulInt(big.NewInt(-3)).Add(FromInt(1)), "-3*x0^2*x1^2 + 1"},
		{y.Neg().Sub(FromInt(7)), "-x1 - 7"},
		{FromInt(-1), "-1"},
	} {
		if got := c.p.String(); got != c.want {
			t.Errorf("%s, want %s", got, c.want)
		}
	}
	if got := x.Add(y).Format(func(v Var) string { return []string{"H", "ε"}[v] }); got != "H + ε" {
		t.Error(got)
	}
}

// TestShapeQueries: constants and single terms.
func TestShapeQueries(t *testing.T) {
	x := FromVar(1)
	for _, c := range []struct {
		p              Poly
		con, mono, one bool
	}{
		{Poly{}, true, false, false},
		{FromInt(1), true, true, true},
		{FromInt(-1), true, true, false},
		{x, false, true, false},
		{x.Add(FromInt(1)), false, false, false},
		{FromBig(new(big.Int).Lsh(big.NewInt(1), 90)), true, true, false},
	} {
		v, ok := c.p.Const()
		if c.p.IsConst() != c.con || ok != c.con || c.p.IsMono() != c.mono || c.p.IsOne() != c.one {
			t.Errorf("%v: constant %v, one term %v, one %v", c.p, c.p.IsConst(), c.p.IsMono(), c.p.IsOne())
		}
		if ok && !FromBig(v).Equal(c.p) {
			t.Errorf("%v has the value %v", c.p, v)
		}
	}
}

// TestMisorderedMonomials: constructors put monomials in order.
func TestMisorderedMonomials(t *testing.T) {
	p := FromMono([]Power{{5, 1}, {2, 3}, {9, 0}, {5, 2}})
	wantEqual(t, p, FromMono([]Power{{2, 3}, {5, 3}}))
	q := FromTerms([]Term{{big.NewInt(2), []Power{{5, 1}, {2, 3}, {5, 2}}}, {big.NewInt(-1), []Power{{2, 3}, {5, 3}}}})
	wantEqual(t, q, p)
}

// TestExponentLimit: an exponent that leaves 32 bits stops the computation with an
// error that budget.Catch understands.
func TestExponentLimit(t *testing.T) {
	const big = math.MaxUint32
	x, y := FromVar(1), FromVar(2)
	huge := FromMono([]Power{{1, big}})
	wantEqual(t, must(t, huge.Mul(y)), FromMono([]Power{{1, big}, {2, 1}}))
	for name, f := range map[string]func(){
		"product of terms":   func() { huge.Mul(x) },
		"product":            func() { huge.Add(y).Mul(x.Add(FromInt(1))) },
		"power":              func() { huge.Pow(2) },
		"renaming":           func() { huge.Mul(y).Rename(func(Var) Var { return 1 }) },
		"repeated variables": func() { FromMono([]Power{{1, big}, {1, 1}}) },
	} {
		var stop *budget.Stop
		if err := caught(f); !errors.As(err, &stop) || !errors.Is(err, errExponent) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// caught is the budget error of f.
func caught(f func()) (err error) {
	defer budget.Catch(&err)
	f()
	return nil
}

// TestBudget: costly operations stop when the budget is spent.
func TestBudget(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	over := Ops{budget.New(ctx, 0)}
	few := Ops{budget.New(context.Background(), 1000)}
	f := linear([]int64{1, 2, 3, 5}, []uint32{1, 1, 1, 1}).Pow(8)
	g := f.Add(FromInt(1))
	fg := f.Mul(g)
	for name, op := range map[string]func(){
		"mul":    func() { few.Mul(f, g) },
		"pow":    func() { few.Pow(f, 2) },
		"subst":  func() { few.Subst(f, 2, g) },
		"div":    func() { over.DivExact(fg, g) },
		"gcd":    func() { over.Gcd(fg, g.Mul(g)) },
		"square": func() { over.SquareFree(fg) },
		"refine": func() { over.Refine([]Poly{fg}, g) },
	} {
		var stop *budget.Stop
		if err := caught(op); !errors.As(err, &stop) {
			t.Errorf("%s: not stopped: %v", name, err)
		}
	}
}

// TestSize: a Poly is one word, so that slices and structs of them are small.
func TestSize(t *testing.T) {
	if s := unsafe.Sizeof(Poly{}); s != unsafe.Sizeof(uintptr(0)) {
		t.Errorf("a Poly has %d bytes", s)
	}
}

// TestAllocations: what small operands, the commonest, may allocate: the result's three
// parts, and a little for what must be repacked.
func TestAllocations(t *testing.T) {
	s := stream(1)
	f, g := benchRandom(&s, 3, 8), benchRandom(&s, 3, 8)
	fg, x := f.Mul(g), FromVar(1)
	for name, c := range map[string]struct {
		most float64
		op   func()
	}{
		"sum":           {3, func() { f.Add(g) }},
		"negative":      {2, func() { f.Neg() }},
		"product":       {6, func() { f.Mul(g) }},
		"one by a term": {6, func() { f.Mul(x) }},
		"equality":      {0, func() { f.Equal(g) }},
		"quotient":      {16, func() { fg.DivExact(g) }},
	} {
		if n := testing.AllocsPerRun(100, c.op); n > c.most {
			t.Errorf("%s: %v allocations, at most %v expected", name, n, c.most)
		}
	}
}
