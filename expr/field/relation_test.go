package field

import (
	"errors"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/poly"
)

func relate(t *testing.T, errs ...error) {
	t.Helper()
	for i, err := range errs {
		if err != nil {
			t.Fatalf("relation %d: %v", i, err)
		}
	}
}

// D respects relations: reducing before or after it is the same. So do Taylor series along
// the background, by which a reduced element is told from a wrong one.
func TestReductionRespectsDerivation(t *testing.T) {
	check(t, func(t *rapid.T) {
		w := newWorld()
		w.elems = append(w.elems, w.f.Jet(w.a, 1), w.f.Jet(w.a, 2), w.f.Jet(w.h, 2), w.f.Jet(w.phi, 2), w.f.Jet(w.phi, 3))
		e := w.drawElem(t, "e")
		de := e.D()
		w.relate(t)
		n, err := e.Normal()
		if err != nil {
			return // a denominator vanishes on the background
		}
		dn, err := de.Normal()
		if err != nil {
			t.Fatalf("%v has a value and its derivative %v has none", e, de)
		}
		same(t, "D of the reduced and reduced D", n.D(), dn)
		again, err := n.Normal()
		if err != nil {
			t.Fatalf("%v", err)
		}
		same(t, "reduced twice", again, n)
		b := w.f.RandomBackground(poly.Mersenne61, rapid.Uint64().Draw(t, "seed"))
		x, errX := b.Taylor(e, 2)
		y, errY := b.Taylor(n, 2)
		if errX == nil && errY == nil && !slices.Equal(x, y) {
			t.Fatalf("%v and reduced %v have Taylor series %v and %v", e, n, x, y)
		}
	})
}

// The scalar field of design section 3: with the Friedmann equation for V and the
// Klein–Gordon equation for V,φ the equation for H' follows.
func TestThirdEquationFollows(t *testing.T) {
	for _, order := range [][]int{{0, 1}, {1, 0}} {
		w := newWorld()
		f := w.f
		h, m := f.Gen(w.h), f.Gen(w.m)
		phi1, phi2 := f.Jet(w.phi, 1), f.Jet(w.phi, 2)
		add := []func() error{
			func() error {
				return f.RelateGen(f.FuncJetGen(w.V, []int{0}), m.Pow(2).Mul(h.Pow(2)).Scale(3, 1).Sub(phi1.Pow(2).Scale(1, 2)), 1)
			},
			func() error {
				return f.RelateGen(f.FuncJetGen(w.V, []int{1}), h.Mul(phi1).Scale(-3, 1).Sub(phi2), 2)
			},
		}
		for _, i := range order {
			relate(t, add[i]())
		}
		want := phi1.Pow(2).Div(m.Pow(2)).Scale(-1, 2)
		same(t, "H' = −φ'²/2M²", f.Jet(w.h, 1), want)
		same(t, "V,φ = −3Hφ' − φ''", f.FuncJet(w.V, []int{1}), h.Mul(phi1).Scale(-3, 1).Sub(phi2))
		same(t, "V,φφ φ' = D V,φ", f.FuncJet(w.V, []int{2}).Mul(phi1), f.FuncJet(w.V, []int{1}).D())
		same(t, "H'' = −φ'φ''/M²", f.Jet(w.h, 2), phi1.Mul(phi2).Div(m.Pow(2)).Neg())
		found := false
		for _, r := range f.Rules() {
			if r.Leader == f.JetGen(w.h, 1) {
				found = true
				if !slices.Equal(r.Sources, []int{1, 2}) {
					t.Errorf("H' follows from %v, want both relations", r.Sources)
				}
			}
		}
		if !found {
			t.Errorf("no rule for H' among %v", f.Rules())
		}
		recorded := false
		for _, a := range f.Assumptions() {
			recorded = recorded || a.Factor.Equal(phi1)
		}
		if !recorded {
			t.Errorf("φ' ≠ 0 is not among the assumptions %v", f.Assumptions())
		}
	}
}

func TestLeaderOfADerivativeIsGivenUp(t *testing.T) {
	w := newWorld()
	f := w.f
	h := f.Gen(w.h)
	// H'' first, then H': the first is implied, or it is a new relation
	relate(t, f.RelateGen(f.JetGen(w.h, 2), h.Pow(3).Scale(2, 1), 1), f.RelateGen(f.JetGen(w.h, 1), h.Pow(2).Neg(), 2))
	same(t, "H'' = 2H³", f.Jet(w.h, 2), h.Pow(3).Scale(2, 1))
	if n := len(f.Rules()); n != 1 {
		t.Errorf("%d rules stand, want 1", n)
	}
}

func TestRelationInsideOtherRelations(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m, phi1 := f.Gen(w.h), f.Gen(w.m), f.Jet(w.phi, 1)
	relate(t,
		f.RelateGen(f.JetGen(w.a, 1), f.Gen(w.a).Mul(h), 1),
		f.RelateGen(w.h, m.Mul(phi1), 2)) // H stands in the value of a'
	same(t, "a' = m a φ'", f.Jet(w.a, 1), f.Gen(w.a).Mul(m).Mul(phi1))
	for _, r := range f.Rules() {
		canonical(t, r.Value)
	}
}

func TestContradictionsAreNamed(t *testing.T) {
	for _, c := range []struct {
		why     string
		add     func(w *world) []error
		sources []int
		assumed bool
	}{
		{"two values of one function", func(w *world) []error {
			return []error{w.f.RelateGen(w.h, w.f.Int(1), 1), w.f.RelateGen(w.h, w.f.Int(2), 2)}
		}, []int{1, 2}, false},
		{"a value and a rate", func(w *world) []error {
			return []error{w.f.RelateGen(w.h, w.f.Gen(w.m), 4), w.f.RelateGen(w.f.JetGen(w.h, 1), w.f.Int(1), 7)}
		}, []int{4, 7}, false},
		{"a positive quantity that would vanish", func(w *world) []error {
			return []error{w.f.RelateGen(w.h, w.f.Gen(w.a), 1), w.f.RelateGen(w.h, w.f.Gen(w.a).Scale(2, 1), 2)}
		}, []int{1, 2}, false},
		{"a quantity assumed non-zero that would vanish", func(w *world) []error {
			w.f.AssumeNonzero(w.f.Jet(w.phi, 1), "a solution divides by it")
			x := w.f.Jet(w.phi, 1)
			return []error{w.f.RelateGen(w.h, x, 1), w.f.RelateGen(w.h, x.Neg(), 3)}
		}, []int{1, 3}, true},
		{"a third relation contradicts what follows from two", func(w *world) []error {
			a, h := w.f.Gen(w.a), w.f.Gen(w.h)
			return []error{
				w.f.RelateGen(w.f.JetGen(w.a, 1), a.Mul(h), 1),
				w.f.RelateGen(w.f.JetGen(w.h, 1), w.f.Int(0), 2),
				w.f.RelateGen(w.f.JetGen(w.a, 2), a.Mul(h.Pow(2)).Add(a), 3),
			}
		}, []int{1, 2, 3}, false},
	} {
		w := newWorld()
		errs := c.add(w)
		for i, err := range errs[:len(errs)-1] {
			if err != nil {
				t.Fatalf("%s: relation %d: %v", c.why, i, err)
			}
		}
		var bad *Contradiction
		if err := errs[len(errs)-1]; !errors.As(err, &bad) {
			t.Errorf("%s: got %v", c.why, err)
			continue
		}
		if !slices.Equal(bad.Sources, c.sources) || bad.Assumed != c.assumed || bad.Follows.IsZero() {
			t.Errorf("%s: sources %v, follows %v = 0, assumed %v", c.why, bad.Sources, bad.Follows, bad.Assumed)
		}
	}
}

// Relations that lead in circles settle on other leaders, or say that they do not.
func TestCyclesEnd(t *testing.T) {
	w := newWorld()
	f := w.f
	x, y := f.Function("x", Unknown), f.Function("y", Unknown)
	relate(t, f.RelateGen(x, f.Jet(y, 1), 1), f.RelateGen(y, f.Jet(x, 1), 2))
	same(t, "x = y'", f.Gen(x), f.Jet(y, 1))
	same(t, "y'' = y", f.Jet(y, 2), f.Gen(y))
	same(t, "x'' = x", f.Jet(x, 2), f.Gen(x))

	u, v := f.Function("u", Unknown), f.Function("v", Unknown)
	relate(t, f.RelateGen(f.JetGen(u, 1), f.Jet(v, 1), 3), f.RelateGen(f.JetGen(v, 1), f.Jet(u, 1), 4))
	same(t, "u' = v'", f.Jet(u, 1), f.Jet(v, 1))
}

func TestNoLeader(t *testing.T) {
	w := newWorld()
	h, phi := w.f.Gen(w.h), w.f.Gen(w.phi)
	var no *Unsolvable
	if err := w.f.Relate(h.Pow(2).Sub(phi.Pow(3)), 9); !errors.As(err, &no) || !slices.Equal(no.Sources, []int{9}) || no.Cyclic {
		t.Errorf("H² = φ³: %v", err)
	}
}

func TestRelateChoosesItsLeader(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m := f.Gen(w.h), f.Gen(w.m)
	// 3M²H² = φ'²/2 + V: H and φ' are squared, V is linear
	relate(t, f.Relate(m.Pow(2).Mul(h.Pow(2)).Scale(3, 1).Sub(w.X).Sub(f.FuncJet(w.V, []int{0})), 1))
	same(t, "V", f.FuncJet(w.V, []int{0}), m.Pow(2).Mul(h.Pow(2)).Scale(3, 1).Sub(w.X))
	same(t, "V,φ φ' = 6M²HH' − φ'φ''", f.FuncJet(w.V, []int{1}).Mul(f.Jet(w.phi, 1)),
		m.Pow(2).Mul(h).Mul(f.Jet(w.h, 1)).Scale(6, 1).Sub(w.X.D()))
}

// A Hubble-flow hierarchy closes: H⁽ⁿ⁾ is H^{n+1} times a polynomial in ε, η and η's jets.
func TestHubbleFlow(t *testing.T) {
	w := newWorld()
	f := w.f
	eps, eta := f.Function("eps", Positive), f.Function("eta", Unknown)
	h, e, n := f.Gen(w.h), f.Gen(eps), f.Gen(eta)
	relate(t, f.RelateGen(f.JetGen(w.h, 1), e.Mul(h.Pow(2)).Neg(), 1), f.RelateGen(f.JetGen(eps, 1), e.Mul(n).Mul(h), 2))
	same(t, "H' = −εH²", f.Jet(w.h, 1), e.Mul(h.Pow(2)).Neg())
	same(t, "H'' = εH³(2ε − η)", f.Jet(w.h, 2), e.Mul(h.Pow(3)).Mul(e.Scale(2, 1).Sub(n)))
	same(t, "ε'' = εH²(η² − εη) + εHη'", f.Jet(eps, 2), e.Mul(h.Pow(2)).Mul(n.Pow(2).Sub(e.Mul(n))).Add(e.Mul(h).Mul(f.Jet(eta, 1))))
}

// A relation for a function of two arguments gives its derivative by the first; the others
// stay free.
func TestRelationForFunctionOfTwoArguments(t *testing.T) {
	w := newWorld()
	f := w.f
	h, m, phi1, phi2 := f.Gen(w.h), f.Gen(w.m), f.Jet(w.phi, 1), f.Jet(w.phi, 2)
	value := m.Pow(2).Mul(h.Pow(2)).Scale(3, 1)
	relate(t, f.RelateGen(f.FuncJetGen(w.P, []int{0, 0}), value, 1))
	pX := f.FuncJet(w.P, []int{0, 1})
	same(t, "P,φ φ' + P,X φ'φ'' = D P", f.FuncJet(w.P, []int{1, 0}).Mul(phi1).Add(pX.Mul(phi1).Mul(phi2)), value.D())
	same(t, "P,X is free", pX, f.Raw(f.FuncJetGen(w.P, []int{0, 1})))
	b := f.RandomBackground(poly.Mersenne61, 3)
	x, err := b.Taylor(f.Raw(f.FuncJetGen(w.P, []int{1, 0})), 3)
	if err != nil {
		t.Fatal(err)
	}
	y, err := b.Taylor(f.FuncJet(w.P, []int{1, 0}), 3)
	if err != nil || !slices.Equal(x, y) {
		t.Errorf("P,φ has the Taylor series %v, its value %v: %v", x, y, err)
	}
}

// What a relation says is read off in lowest terms: (m + H)(φ − q) over one factor
// (m + H)(m + φ) gives φ = q, and nothing of H.
func TestRelationInLowestTerms(t *testing.T) {
	w := newWorld()
	f := w.f
	m, h, phi, q := f.Gen(w.m), f.Gen(w.h), f.Gen(w.phi), f.Gen(w.q)
	e := m.Add(h).Mul(phi.Sub(q)).Mul(m.Add(h).Mul(m.Add(phi)).Inv())
	relate(t, f.Relate(e, 1))
	same(t, "φ", f.Gen(w.phi), q)
	same(t, "H", f.Gen(w.h), h)
}
