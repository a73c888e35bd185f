package series

import (
	"testing"

	"remnant/expr/field"
)

// What is small: a constant, a function with all its jets, a free function with all its
// derivatives. None of them loses order under D.
func TestSmallQuantitiesOfEveryKind(t *testing.T) {
	w := newWorld(t)
	f := w.f
	lambda := f.Constant("lambda", field.Unknown)
	phi := f.Function("phi", field.Unknown)
	v := f.FreeFunction("V", []string{"phi"}, []field.Elem{f.Gen(phi)}, field.Unknown)
	g, err := Small(f, []field.Gen{lambda, w.eta, f.FuncJetGen(v, []int{0})})
	must(t, err)
	for _, c := range []struct {
		e    field.Elem
		want int
	}{
		{f.Gen(lambda), 1}, {w.Eta, 1}, {f.Jet(w.eta, 2), 1}, {f.FuncJet(v, []int{0}), 1}, {f.FuncJet(v, []int{2}), 1},
		{f.Gen(phi), 0}, {f.Jet(phi, 1), 0}, {w.Eps, 0}, {f.Jet(w.eps, 1), 1}, // ε' = εηH
		{f.Gen(lambda).Pow(2).Div(f.FuncJet(v, []int{1}).Mul(w.X)), 1},
	} {
		s := holds(t, expand(t, g, c.e, 9))
		if s.Valuation() != c.want || s.Order() != Exact || !s.Elem().Equal(c.e) {
			t.Errorf("%v starts at %d, want %d", c.e, s.Valuation(), c.want)
		}
		rest := expand(t, g, c.e.Mul(f.Int(1).Sub(w.Eta).Inv()), 3+c.want)
		d, err := rest.D(Exact)
		must(t, err)
		if d.Order() != 3+c.want || !holds(t, d).Equal(expand(t, g, c.e.Mul(f.Int(1).Sub(w.Eta).Inv()).D(), 6+c.want)) {
			t.Errorf("D of %v is %v", rest, d)
		}
	}
}

// One monomial for each product of weighted generators, jets of theirs among them.
func TestMonomials(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	etaRate := w.f.Jet(w.eta, 1)
	e := w.Eps.Pow(2).Mul(w.X).Add(w.Eps.Mul(etaRate).Mul(w.H)).Sub(w.Eps.Pow(2)).Div(w.X.Add(w.H))
	s := expand(t, g, e.Mul(w.f.Int(1).Sub(w.Eta).Inv()), 3)
	ms, ok := s.Monomials(2)
	if !ok || len(ms) != 2 {
		t.Fatalf("monomials of %v: %v", s, ms)
	}
	var sum field.Elem
	for _, m := range ms {
		term := m.Coef
		for _, p := range m.Powers {
			term = term.Mul(w.f.Gen(p.Var).Pow(int(p.Exp)))
		}
		if term.Equal(m.Coef) || g.involves(m.Coef) {
			t.Errorf("monomial %v with coefficient %v", m.Powers, m.Coef)
		}
		sum = sum.Add(term)
	}
	if !sum.Equal(e) {
		t.Errorf("the monomials add up to %v, want %v", sum, e)
	}
}

// involves reports whether a weighted generator stands in e.
func (g *Grading) involves(e field.Elem) bool {
	for _, x := range e.Gens() {
		if g.involved(x) {
			return true
		}
	}
	return false
}

func TestOperandsOfUnlikeGradings(t *testing.T) {
	w := newWorld(t)
	a, b := expand(t, w.small(t), w.Eps, 3), expand(t, w.small(t), w.Eta, 3)
	defer func() {
		if recover() == nil {
			t.Error("series of unlike gradings were added")
		}
	}()
	a.Add(b)
}

// Division by a first term that could vanish is recorded, by one of known sign is not.
func TestAssumptionsOfExpansion(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	expand(t, g, w.M.Div(w.M.Add(w.Eps)), 3)
	if as := w.f.Assumptions(); len(as) != 0 {
		t.Errorf("1/(m + ε) with m > 0 assumes %v", as)
	}
	expand(t, g, w.H.Add(w.Eps).Inv(), 3)
	as := w.f.Assumptions()
	if len(as) != 1 || !as[0].Factor.Equal(w.H) {
		t.Errorf("1/(H + ε) assumes %v, want H ≠ 0", as)
	}
}
