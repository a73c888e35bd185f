package series

import (
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

// world is a field with a slow-roll hierarchy on the cosmic clock: a' = aH, H' = −εH²,
// ε' = εηH, and a background function x, a constant m and the wave number.
type world struct {
	f                        *field.Field
	a, h, eps, eta, x, m, k  field.Gen
	A, H, Eps, Eta, X, M, K1 field.Elem
}

func newWorld(t testing.TB) *world {
	f := field.New(nil)
	w := &world{f: f}
	w.a = f.Function("a", field.Positive)
	w.h = f.Function("H", field.Unknown)
	w.eps = f.Function("eps", field.Unknown)
	w.eta = f.Function("eta", field.Unknown)
	w.x = f.Function("x", field.Positive)
	w.m = f.Constant("m", field.Positive)
	w.k = f.Wavenumber("k")
	must(t, f.RelateGen(f.JetGen(w.a, 1), f.Gen(w.a).Mul(f.Gen(w.h)), 1))
	must(t, f.RelateGen(f.JetGen(w.h, 1), f.Gen(w.eps).Mul(f.Gen(w.h).Pow(2)).Neg(), 2))
	must(t, f.RelateGen(f.JetGen(w.eps, 1), f.Gen(w.eps).Mul(f.Gen(w.eta)).Mul(f.Gen(w.h)), 3))
	w.A, w.H, w.Eps, w.Eta = f.Gen(w.a), f.Gen(w.h), f.Gen(w.eps), f.Gen(w.eta)
	w.X, w.M, w.K1 = f.Gen(w.x), f.Gen(w.m), f.Gen(w.k)
	return w
}

func (w *world) small(t testing.TB) *Grading {
	g, err := Small(w.f, []field.Gen{w.eps, w.eta})
	must(t, err)
	return g
}

func must(t testing.TB, err error) {
	t.Helper()
	if err != nil {
		t.Fatal(err)
	}
}

type fataler interface {
	Helper()
	Fatalf(string, ...any)
}

func expand(t fataler, g *Grading, e field.Elem, order int) Series {
	t.Helper()
	s, err := g.Expand(e, order)
	if err != nil {
		t.Fatalf("expanding %v: %v", e, err)
	}
	return s
}

// holds checks the invariant of a series, and that every part has its weight.
func holds(t fataler, s Series) Series {
	t.Helper()
	if n := len(s.coefs); n > 0 {
		if s.coefs[0].IsZero() || s.coefs[n-1].IsZero() {
			t.Fatalf("%v begins or ends with a zero", s)
		}
		if s.order != Exact && s.val+n > s.order {
			t.Fatalf("%v has terms above its order", s)
		}
	}
	for _, term := range s.Terms() {
		if w, ok := s.g.elemGrade(term.Coef); !ok || w != term.Power {
			t.Fatalf("part %v stands at %d", term.Coef, term.Power)
		}
	}
	return s
}

// drawElem is a random rational function of ε, η, x, H, small in degree; its denominator is
// often homogeneous, often not, and sometimes starts above weight 0.
func (w *world) drawElem(t *rapid.T, name string) field.Elem {
	num := w.drawPoly(t, name+" numerator")
	switch rapid.IntRange(0, 4).Draw(t, name+" kind") {
	case 0:
		return num
	case 1:
		return num.Div(w.X.Add(w.Eps))
	case 2:
		return num.Div(w.Eps.Add(w.Eta))
	case 3:
		return num.Mul(w.f.Int(3).Sub(w.Eps).Pow(-2))
	}
	den := w.drawPoly(t, name+" denominator")
	if den.IsZero() {
		return num
	}
	return num.Div(den)
}

func (w *world) drawPoly(t *rapid.T, name string) field.Elem {
	var sum field.Elem
	gens := []field.Elem{w.Eps, w.Eta, w.X, w.H}
	for range rapid.IntRange(0, 3).Draw(t, name+" terms") {
		term := w.f.Int(rapid.Int64Range(-3, 3).Draw(t, "coefficient"))
		for _, g := range gens {
			term = term.Mul(g.Pow(rapid.IntRange(0, 2).Draw(t, "exponent")))
		}
		sum = sum.Add(term)
	}
	return sum
}

func drawOrder(t *rapid.T, name string) int { return rapid.IntRange(-1, 4).Draw(t, name) }

func TestRingAxioms(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(testing.TB(nilTB{}))
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		a := holds(t, expand(t, g, w.drawElem(t, "a"), drawOrder(t, "order a")))
		b := holds(t, expand(t, g, w.drawElem(t, "b"), drawOrder(t, "order b")))
		c := holds(t, expand(t, g, w.drawElem(t, "c"), drawOrder(t, "order c")))
		same := func(law string, x, y Series) {
			t.Helper()
			holds(t, x)
			if !x.Equal(y) {
				t.Fatalf("%s: %v and %v", law, x, y)
			}
		}
		same("a + b = b + a", a.Add(b), b.Add(a))
		same("(a + b) + c = a + (b + c)", a.Add(b).Add(c), a.Add(b.Add(c)))
		same("ab = ba", a.Mul(b), b.Mul(a))
		same("(ab)c = a(bc)", a.Mul(b).Mul(c), a.Mul(b.Mul(c)))
		same("a(b + c) = ab + ac", a.Mul(b.Add(c)), a.Mul(b).Add(a.Mul(c)))
		same("a + (−a) = 0", a.Add(a.Neg()), g.Zero(Exact))
		same("1·a = a", g.Int(1).Mul(a), a)
		if got := a.Add(b).Order(); got != min(a.Order(), b.Order()) {
			t.Fatalf("a sum of orders %d and %d has order %d", a.Order(), b.Order(), got)
		}
	})
}

// nilTB stands for the testing.TB of a world whose relations are known to be sound.
type nilTB struct{ testing.TB }

func (nilTB) Helper()           {}
func (nilTB) Fatal(args ...any) { panic(args) }

// Expanding is a ring homomorphism, and what a product claims to know is right: it agrees
// with the expansion of the product to higher order.
func TestExpansionRespectsArithmetic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		x, y := w.drawElem(t, "x"), w.drawElem(t, "y")
		a, b := expand(t, g, x, drawOrder(t, "order x")), expand(t, g, y, drawOrder(t, "order y"))
		claims := func(what string, got Series, e field.Elem) {
			t.Helper()
			order := 9
			if got.Order() != Exact {
				order = got.Order() + 2
			}
			if want := expand(t, g, e, order); !holds(t, got).Equal(want) {
				t.Fatalf("%s of %v and %v is %v, expanded directly %v", what, x, y, got, want)
			}
		}
		claims("sum", a.Add(b), x.Add(y))
		claims("product", a.Mul(b), x.Mul(y))
		if q, err := a.Div(b, 4); err == nil {
			claims("quotient", q, x.Div(y))
		} else if !b.IsZero() {
			t.Fatalf("%v / %v: %v", a, b, err)
		}
		if p, err := a.Pow(3, Exact); err != nil {
			t.Fatalf("power: %v", err)
		} else {
			claims("cube", p, x.Pow(3))
		}
	})
}

func TestInverseTimesItselfIsOne(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		a := expand(t, g, w.drawElem(t, "a"), 3)
		if a.IsZero() {
			if _, err := a.Inv(3); err == nil {
				t.Fatalf("%v was inverted", a)
			}
			return
		}
		inv, err := a.Inv(3)
		if err != nil {
			t.Fatalf("inverse: %v", err)
		}
		one := holds(t, a.Mul(inv))
		if !one.Equal(g.Int(1)) {
			t.Fatalf("%v · %v = %v", a, inv, one)
		}
		if a.Order() != Exact && one.Order() > a.Order()-a.Valuation() {
			t.Fatalf("a·a⁻¹ claims order %d from %v", one.Order(), a)
		}
	})
}

// D is a derivation, and agrees with D on elements wherever it claims to.
func TestDerivation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		if rapid.Bool().Draw(t, "x' = x/eps") {
			must(nilTB{}, w.f.RelateGen(w.f.JetGen(w.x, 1), w.X.Div(w.Eps), 4))
		}
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		x, y := w.drawElem(t, "x"), w.drawElem(t, "y")
		a, b := expand(t, g, x, drawOrder(t, "order x")), expand(t, g, y, drawOrder(t, "order y"))
		d := func(s Series) Series {
			ds, err := s.D(6)
			if err != nil {
				t.Fatalf("D of %v: %v", s, err)
			}
			return holds(t, ds)
		}
		if da, want := d(a), expand(t, g, x.D(), 7); !da.Equal(want) {
			t.Fatalf("D of %v is %v, directly %v", a, da, want)
		}
		if l, r := d(a.Mul(b)), d(a).Mul(b).Add(a.Mul(d(b))); !l.Equal(r) {
			t.Fatalf("D(ab) = %v, (Da)b + a(Db) = %v", l, r)
		}
		if l, r := d(a.Add(b)), d(a).Add(d(b)); !l.Equal(r) {
			t.Fatalf("D(a+b) = %v, Da + Db = %v", l, r)
		}
	})
}

// What D does to the order: nothing in a slow-roll hierarchy, one step down where a small
// parameter has a derivative of order 0, two where a coefficient runs as 1/ε².
func TestOrderUnderDerivation(t *testing.T) {
	w := newWorld(t)
	speed := w.f.Function("y", field.Unknown)
	must(t, w.f.RelateGen(w.f.JetGen(speed, 1), w.X, 5))
	must(t, w.f.RelateGen(w.f.JetGen(w.x, 1), w.H.Div(w.Eps.Pow(2)), 6))
	g, err := Small(w.f, []field.Gen{w.eps, w.eta, speed})
	must(t, err)
	y := w.f.Gen(speed)
	for _, c := range []struct {
		e    field.Elem
		want int
	}{
		{w.f.Int(1).Sub(w.Eps).Inv(), 5},
		{w.H.Div(w.f.Int(1).Sub(w.Eta)), 5},
		{w.f.Int(1).Sub(y).Inv(), 4},
		{w.X.Div(w.f.Int(1).Sub(w.Eps)), 3},
	} {
		s := expand(t, g, c.e, 5)
		d, err := s.D(Exact)
		must(t, err)
		if d.Order() != c.want {
			t.Errorf("D of %v has order %d, want %d", s, d.Order(), c.want)
		}
	}
}

func TestTruncationAndCoefficients(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	one := w.f.Int(1)
	s := expand(t, g, w.Eps.Add(w.Eta).Mul(w.X).Div(one.Sub(w.Eps)), 3)
	if s.Order() != 3 || s.Valuation() != 1 {
		t.Fatalf("%v has order %d and valuation %d", s, s.Order(), s.Valuation())
	}
	ms, ok := s.Monomials(2)
	if !ok || len(ms) != 2 {
		t.Fatalf("monomials of weight 2: %v %v", ms, ok)
	}
	for _, m := range ms {
		if !m.Coef.Equal(w.X) {
			t.Errorf("monomial %v has coefficient %v", m.Powers, m.Coef)
		}
	}
	if _, ok := s.Monomials(3); ok {
		t.Error("the unknown part of weight 3 was split")
	}
	if _, known := s.Coef(3); known {
		t.Error("the part of weight 3 passes for known")
	}
	if c, known := s.Coef(0); !known || !c.IsZero() {
		t.Error("the part of weight 0 is not 0")
	}
	q := expand(t, g, w.Eps.Pow(2).Div(w.Eps.Add(w.Eta)), 5)
	if q.Order() != Exact {
		t.Errorf("%v is homogeneous, and not exact", q)
	}
	if _, ok := q.Monomials(1); ok {
		t.Error("ε²/(ε + η) passes for a polynomial")
	}
	if u := q.Truncate(1); !u.IsZero() || u.Order() != 1 || u.Valuation() != 1 {
		t.Errorf("truncated to %v", u)
	}
	if !s.Truncate(2).Add(q).Elem().Equal(w.Eps.Add(w.Eta).Mul(w.X).Add(q.Elem())) {
		t.Errorf("sum of unlike truncations: %v", s.Truncate(2).Add(q))
	}
}

func TestRefusals(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	phi := w.f.Function("phi", field.Unknown)
	free := w.f.FreeFunction("V", []string{"eps"}, []field.Elem{w.Eps.Mul(w.f.Gen(phi))}, field.Unknown)
	elem := func(name string, e field.Elem) field.Elem {
		v, err := w.f.Elementary(name, e)
		must(t, err)
		return v
	}
	for _, c := range []struct {
		e    field.Elem
		says string
	}{
		{elem("sqrt", w.Eps), "no square"},
		{elem("sqrt", w.Eps.Mul(w.X).Add(w.Eta)), "no square"},
		{elem("exp", w.Eps.Pow(2).Add(w.Eps).Inv()), "starts at order -1"},
		{elem("log", w.Eps), "starts at order 1"},
		{elem("log", w.Eps.Add(w.Eta.Pow(2))), "starts at order 1"},
		{w.f.FuncJet(free, []int{0}), "depends on the parameters"},
	} {
		if s, err := g.Expand(c.e.Mul(w.f.Int(1).Sub(w.Eps).Inv()), 3); err == nil || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%v expands to %v with error %v; want %q", c.e, s, err, c.says)
		}
	}
	if _, err := g.Expand(w.f.Int(1).Sub(w.Eps).Inv(), Exact); err == nil {
		t.Error("an endless series passes for exact")
	}
	if _, err := g.Zero(2).Inv(5); err == nil {
		t.Error("O(2) was inverted")
	}
	must(t, w.f.RelateGen(phi, w.Eps, 7))
	root := elem("sqrt", w.X).Gens()[0]
	for _, bad := range []field.Gen{phi, w.f.JetGen(w.eta, 1), root} {
		if _, err := Small(w.f, []field.Gen{bad}); err == nil {
			t.Errorf("%v passes for a small parameter", w.f.Raw(bad))
		}
	}
}

func TestSubstitute(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	one := w.f.Int(1)
	// ε → ε + ηε + …, η → 2η − ε exactly
	by := expand(t, g, w.Eps.Mul(one.Add(w.Eta)), Exact)
	ty := expand(t, g, w.Eta.Scale(2, 1).Sub(w.Eps), Exact)
	rs := []Replacement{{w.eps, by}, {w.eta, ty}}
	e := w.X.Mul(w.Eta).Div(w.Eps.Add(w.Eta)).Add(one.Sub(w.Eps).Inv())
	got, err := expand(t, g, e, 4).Substitute(rs, Exact)
	must(t, err)
	direct, err := e.Substitute(func(x field.Gen) (field.Elem, bool) {
		switch x {
		case w.eps:
			return by.Elem(), true
		case w.eta:
			return ty.Elem(), true
		}
		return field.Elem{}, false
	})
	must(t, err)
	if want := expand(t, g, direct, 6); got.Order() != 4 || !holds(t, got).Equal(want) {
		t.Errorf("substituted %v, want %v", got, want)
	}
	// η → −ε + ε² would make ε + η start one order later than it says
	dependent := []Replacement{{w.eps, expand(t, g, w.Eps, Exact)}, {w.eta, expand(t, g, w.Eps.Pow(2).Sub(w.Eps), Exact)}}
	if _, err := expand(t, g, e, 4).Substitute(dependent, 4); err == nil {
		t.Error("dependent first terms are accepted")
	}
	if _, err := got.Substitute([]Replacement{{w.eps, by.Mul(by)}}, 4); err == nil {
		t.Error("a replacement of another order is accepted")
	}
}

func TestCompose(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	geometric := func(int) (field.Elem, bool) { return w.f.Int(1), true }
	d := w.Eps.Mul(w.X).Add(w.Eta.Pow(2))
	got, err := Compose(geometric, expand(t, g, d, Exact), 5)
	must(t, err)
	if want := expand(t, g, w.f.Int(1).Sub(d).Inv(), 7); got.Order() != 5 || !holds(t, got).Equal(want) {
		t.Errorf("composed %v, want %v", got, want)
	}
	square := func(n int) (field.Elem, bool) { return w.f.Int(int64(n)), n <= 2 }
	got, err = Compose(square, expand(t, g, d, Exact), Exact)
	must(t, err)
	if want := d.Add(d.Mul(d).Scale(2, 1)); got.Order() != Exact || !got.Elem().Equal(want) {
		t.Errorf("composed %v, want %v", got, want)
	}
	if _, err := Compose(geometric, g.Int(1), 4); err == nil {
		t.Error("a series around 1 was composed")
	}
}

func TestScale(t *testing.T) {
	w := newWorld(t)
	s := expand(t, w.small(t), w.f.Int(1).Sub(w.Eps).Inv(), 3)
	if got := s.Scale(big.NewRat(1, 2)); !got.Add(got).Equal(s) || got.Order() != 3 {
		t.Errorf("half of %v is %v", s, got)
	}
	if z := s.Scale(new(big.Rat)); !z.IsZero() || z.Order() != Exact {
		t.Errorf("0 times a series is %v", z)
	}
}
