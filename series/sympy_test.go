package series

import (
	"bytes"
	"encoding/json"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/outside"
)

func TestAgainstSymPy(t *testing.T) {
	w := newWorld(t)
	g := w.small(t)
	n := w.f.Int
	fn := func(name string, e field.Elem) field.Elem {
		v, err := w.f.Elementary(name, e)
		must(t, err)
		return v
	}
	eps, eta, x, h, m := w.Eps, w.Eta, w.X, w.H, w.M
	cases := []field.Elem{
		n(1).Sub(eps).Inv(),
		x.Add(eps).Div(n(3).Sub(eta).Pow(2)),
		eps.Add(eta).Inv(),
		eps.Mul(x).Add(eta.Pow(2)).Div(eps.Add(eta.Mul(eps))),
		n(2).Sub(eps).Add(eta).Div(eps.Pow(2).Mul(x.Add(eta))),
		h.Pow(2).Mul(n(1).Sub(eps.Scale(1, 3))).Div(x.Add(eps.Mul(h)).Sub(eta)),
		m.Pow(2).Mul(eps).Div(eps.Pow(2).Add(eps.Pow(3)).Add(eta.Pow(2))),
		n(1).Add(eps).Pow(4).Sub(n(1).Sub(eta).Pow(3)),
		n(1).Add(eps).Pow(-2).Sub(n(1).Sub(eps.Scale(2, 1))).Inv(),
		x.Div(eps.Mul(eta)).Add(eps).Pow(2).Inv(),
		eps.Sub(eta).Pow(3).Div(n(5).Sub(eps.Mul(eta)).Mul(x.Pow(2).Add(h.Mul(eps)))),
		n(3).Sub(eps).Inv().Add(n(1).Sub(eta).Inv()).Inv(),
		n(1).Sub(eps).Sub(eta).Inv().Mul(h).Sub(h.Div(n(1).Sub(eps).Mul(n(1).Sub(eta)))),
		fn("sqrt", n(1).Sub(eps)).Inv(),
		fn("sqrt", x.Pow(2).Add(eta).Mul(n(4).Add(eps))).Div(n(1).Add(eps)),
		fn("exp", eps.Sub(eta.Pow(2))).Mul(n(1).Sub(eps).Inv()),
		fn("exp", x.Add(eps)).Add(eta).Inv(),
		fn("log", n(1).Add(eta.Mul(x))).Div(eta.Mul(n(1).Sub(eps))),
		fn("sin", eps.Mul(x)).Div(eps).Mul(n(1).Add(eta).Inv()),
		fn("tanh", eps.Add(eta)).Div(n(1).Sub(eps)),
	}
	const order = 3
	var in bytes.Buffer
	enc := json.NewEncoder(&in)
	for _, e := range cases {
		s := holds(t, expand(t, g, e, order))
		known := [][]any{}
		for _, term := range s.Terms() {
			known = append(known, []any{term.Power, term.Coef.String()})
		}
		if s.Order() != Exact && s.Order() != order {
			t.Errorf("%v was asked to order %d and is known to %d", e, order, s.Order())
		}
		must(t, enc.Encode(map[string]any{"expr": e.String(), "order": order, "known": known}))
	}
	out := strings.Split(strings.TrimSpace(string(outside.SymPy(t, "testdata/series.py", in.Bytes()))), "\n")
	if len(out) != len(cases) {
		t.Fatalf("%d answers to %d cases", len(out), len(cases))
	}
	for i, answer := range out {
		if answer != "same" {
			t.Errorf("%v: %s", cases[i], answer)
		}
	}
}
