package series

import (
	"testing"

	"pgregory.net/rapid"

	"remnant/expr/field"
)

// Substituting in a truncated series agrees with expanding what was substituted, wherever
// the result claims to know.
func TestSubstitutionRespectsExpansion(t *testing.T) {
	changed := 0
	rapid.Check(t, func(t *rapid.T) {
		w := newWorld(nilTB{})
		g, _ := Small(w.f, []field.Gen{w.eps, w.eta})
		e := w.drawElem(t, "e")
		linear := func(name string) field.Elem {
			return w.Eps.Scale(rapid.Int64Range(-2, 2).Draw(t, name), 1).Add(w.Eta.Scale(rapid.Int64Range(-2, 2).Draw(t, name), 1))
		}
		second := func(name string) field.Elem {
			return w.drawSmall(t, name).Mul(w.Eps.Sub(w.Eta)).Div(w.X.Add(w.Eta))
		}
		byEps, byEta := linear("eps").Add(second("eps")), linear("eta").Add(second("eta"))
		order := drawOrder(t, "order")
		rs := []Replacement{{w.eps, expand(t, g, byEps, 9)}, {w.eta, expand(t, g, byEta, 9)}}
		got, err := expand(t, g, e, order).Substitute(rs, 5)
		if err != nil {
			return // first terms that depend on each other
		}
		changed++
		direct, err := e.Substitute(func(x field.Gen) (field.Elem, bool) {
			switch x {
			case w.eps:
				return byEps, true
			case w.eta:
				return byEta, true
			}
			return field.Elem{}, false
		})
		if err != nil {
			t.Fatalf("%v has a series after substitution and no value: %v", e, err)
		}
		if want := expand(t, g, direct, 7); !holds(t, got).Equal(want) {
			t.Fatalf("%v with %v and %v becomes %v, directly %v", e, byEps, byEta, got, want)
		}
	})
	if changed == 0 {
		t.Error("nothing was ever substituted")
	}
}

func TestRefusedSubstitutions(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	eps, eta := expand(t, g, w.Eps, Exact), expand(t, g, w.Eta, Exact)
	s := expand(t, g, w.Eps.Div(w.X.Add(w.Eta)), 3)
	rate := expand(t, g, w.f.Jet(w.eta, 1).Mul(w.Eps).Div(w.X.Sub(w.Eta)), 4)
	for _, c := range []struct {
		why string
		s   Series
		rs  []Replacement
	}{
		{"first terms depend on each other", s, []Replacement{{w.eps, eta}, {w.eta, eta.Neg()}}},
		{"one parameter takes the place of another that stays", s, []Replacement{{w.eps, eta}}},
		{"no term of the replacement is known", s, []Replacement{{w.eps, g.Zero(2)}}},
		{"a parameter is replaced twice", s, []Replacement{{w.eps, eps}, {w.eps, eta}}},
		{"a quantity of weight 0 is replaced", s, []Replacement{{w.x, g.Int(2)}}},
		{"a jet of a replaced parameter stands in the series", rate, []Replacement{{w.eta, eta.Neg()}}},
	} {
		if got, err := c.s.Substitute(c.rs, 3); err == nil {
			t.Errorf("%s: %v became %v", c.why, c.s, got)
		}
	}
	got, err := s.Substitute([]Replacement{{w.eps, eta}, {w.eta, eps}}, 3)
	must(t, err)
	if want := expand(t, g, w.Eta.Div(w.X.Add(w.Eps)), 5); !got.Equal(want) || got.Order() != 3 {
		t.Errorf("ε and η exchanged in %v: %v", s, got)
	}
}
