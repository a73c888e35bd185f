package series

import (
	"testing"

	"remnant/expr/field"
)

// The longitudinal mode of a massive vector on flat space has 𝒦 = m²/(k² + m²), q₀ = −m².
func TestWavenumberOfMassiveVector(t *testing.T) {
	w := newWorld(t)
	q := []field.Elem{w.M.Pow(2).Neg(), w.M.Pow(2).Div(w.K1.Pow(2).Add(w.M.Pow(2)))}
	large, err := InWavenumber(w.f, q, w.k, 4, true)
	must(t, err)
	wantTerms(t, large, 1, map[int]field.Elem{0: w.f.Int(1), 2: w.M.Pow(-2).Neg(), 4: w.M.Pow(-4)}, 6)
	small, err := InWavenumber(w.f, q, w.k, 4, false)
	must(t, err)
	wantTerms(t, small, 1, map[int]field.Elem{-2: w.M.Pow(2), -4: w.M.Pow(4).Neg()}, -6)
	for _, e := range []Expansion{large, small} {
		c := e.Coefs[0]
		if !c.Exact || len(c.Terms) != 1 || !e.Value(c.Terms[0]).Equal(q[0]) {
			t.Errorf("−m² in %s: %v", e.In, c)
		}
	}
	if large.In != "k" || small.In != "1/k" {
		t.Errorf("expanded in %q and %q", large.In, small.In)
	}
}

func wantTerms(t *testing.T, e Expansion, i int, want map[int]field.Elem, order int) {
	t.Helper()
	c := e.Coefs[i]
	if c.Exact || c.Order != order || len(c.Terms) != len(want) {
		t.Errorf("in %s: %v", e.In, c)
	}
	for _, term := range c.Terms {
		if !term.Coef.Equal(want[term.Power]) {
			t.Errorf("in %s: power %d has coefficient %v, want %v", e.In, term.Power, term.Coef, want[term.Power])
		}
	}
}

// The parity of the first power left out: k/(k² + m²) is odd, (k + m)⁻¹ neither, and the
// frequency √(k² + m²), even to look at, has odd powers at small scales.
func TestFirstPowerLeftOut(t *testing.T) {
	w := newWorld(t)
	omega, err := w.f.Sqrt(w.K1.Pow(2).Add(w.M.Pow(2)))
	must(t, err)
	q := []field.Elem{w.K1.Div(w.K1.Pow(2).Add(w.M.Pow(2))), w.K1.Add(w.M).Inv(), omega}
	small, err := InWavenumber(w.f, q, w.k, 3, false)
	must(t, err)
	for i, want := range []int{-5, -4, -4} {
		if got := small.Coefs[i].Order; got != want {
			t.Errorf("%v at small scales is known to k^%d, want %d", q[i], got, want)
		}
	}
	wantTerms(t, small, 2, map[int]field.Elem{1: w.f.Int(1), -1: w.M.Pow(2).Scale(1, 2), -3: w.M.Pow(4).Scale(-1, 8)}, -4)
	large, err := InWavenumber(w.f, q, w.k, 2, true)
	must(t, err)
	for i, want := range []int{3, 3, 3} {
		if got := large.Coefs[i].Order; got != want {
			t.Errorf("%v at large scales is known to k^%d, want %d", q[i], got, want)
		}
	}
}

// z²= 2a³ε/… of a single field to second order: z”/z on the conformal clock is
// a²H²(2 − ε + 3η/2 + …) (Stewart, Lyth 1993, gr-qc/9302019, with η = ε'/(Hε)).
func TestSlowRollOfSingleField(t *testing.T) {
	w := newWorld(t)
	z2 := w.A.Pow(2).Mul(w.Eps).Scale(2, 1)
	conf := func(e field.Elem) field.Elem { return e.D().Mul(w.A) } // d/dη = a d/dt
	q := conf(conf(z2)).Div(z2).Scale(1, 2).Sub(conf(z2).Div(z2).Pow(2).Scale(1, 4))
	rest := q.Div(w.A.Mul(w.H).Pow(2))
	got, err := InSmall(w.f, []field.Elem{rest}, []field.Gen{w.eps, w.eta}, 1)
	must(t, err)
	var sum field.Elem
	for _, term := range got.Coefs[0].Terms {
		sum = sum.Add(got.Value(term))
	}
	etaRate := w.f.Jet(w.eta, 1).Div(w.H).Scale(1, 2) // η'/2H, of first order as η is
	want := w.f.Int(2).Sub(w.Eps).Add(w.Eta.Scale(3, 2)).Add(etaRate)
	if !sum.Equal(want) || got.In != "eps, eta" || got.Order != 1 {
		t.Errorf("z''/(a²H²z) = %v in %s, want %v", sum, got.In, want)
	}
	if c := got.Coefs[0]; c.Exact || c.Order != 2 {
		t.Errorf("known to order %d, exact %v", c.Order, c.Exact)
	}
}

func TestExpansionRefusesWhatIsNotSmall(t *testing.T) {
	w := newWorld(t)
	if _, err := InSmall(w.f, []field.Elem{w.H}, []field.Gen{w.f.JetGen(w.h, 1)}, 2); err == nil {
		t.Error("H', which a relation fixes, passes for small")
	}
	root, err := w.f.Sqrt(w.K1)
	must(t, err)
	if _, err := InWavenumber(w.f, []field.Elem{root}, w.k, 2, true); err == nil {
		t.Error("√k passes for a Laurent series")
	}
}

func BenchmarkExpand(b *testing.B) {
	w := newWorld(b)
	one := w.f.Int(1)
	e := w.X.Add(w.Eps.Mul(w.Eta)).Div(one.Sub(w.Eps).Pow(2).Mul(one.Add(w.Eta).Sub(w.Eps))).Mul(w.X.Add(w.Eta).Inv())
	g := w.small(b)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := g.Expand(e, 7); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkMul(b *testing.B) {
	w := newWorld(b)
	g := w.small(b)
	one := w.f.Int(1)
	s, err := g.Expand(one.Sub(w.Eps.Mul(w.X)).Sub(w.Eta).Inv(), 8)
	must(b, err)
	b.ReportAllocs()
	for b.Loop() {
		s.Mul(s)
	}
}

func BenchmarkInv(b *testing.B) {
	w := newWorld(b)
	g := w.small(b)
	s, err := g.Expand(w.X.Add(w.Eps).Add(w.Eta.Mul(w.H)), Exact)
	must(b, err)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := s.Inv(8); err != nil {
			b.Fatal(err)
		}
	}
}
