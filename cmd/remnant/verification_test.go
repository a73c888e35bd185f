package main

import (
	"errors"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/reduce"
	"remnant/rules"
)

// No action that the notation can write breaks its identities, so a broken one is made here:
// the page says what is left, and the outcome is that of a check that failed.
func TestFailedCheck(t *testing.T) {
	k := field.New(nil)
	h := k.Gen(k.Function("H", field.Unknown))
	broken := &reduce.GaugeCheck{Identities: []rules.GaugeIdentity{
		{Parameter: "T", Fields: []string{"A", "zeta"},
			Change: []oper.Oper{oper.Mono(k.Int(1), 1), oper.New(h)},
			Left:   []oper.Oper{{}, oper.New(h.Scale(2, 1))}},
		{Parameter: "L", Fields: []string{"A", "zeta"}, Change: make([]oper.Oper, 2), Left: make([]oper.Oper, 2)},
	}}
	err := outcome([]*reduce.GaugeCheck{nil, broken})
	var d *differs
	if !errors.As(err, &d) || d.summary != "the action changes under a change of coordinates: time by T" {
		t.Errorf("outcome %v", err)
	}
	var b strings.Builder
	if got := report(&b, err); got != statusDiffers {
		t.Errorf("exit status %d, want %d", got, statusDiffers)
	}
	p := &page{sections: []section{*checkSection(broken)}}
	text := string(textPage(p, textStyle{width: 100}))
	for _, want := range []string{"it fails", "A by T', ζ by HT     in the equation of ζ 2HT is left"} {
		if !strings.Contains(text, want) {
			t.Errorf("%q is not in\n%s", want, text)
		}
	}
	if doc := broken.Document(); doc.Holds || doc.Identities[0].Left[0] != (reduce.LeftJSON{Field: "zeta", Left: "2*H*T"}) || !doc.Identities[1].Holds {
		t.Errorf("%+v", doc)
	}
	if err := outcome([]*reduce.GaugeCheck{nil, {}}); err != nil {
		t.Errorf("nothing failed: %v", err)
	}
}

// Names of factors keep clear of the model's own.
func TestNameStem(t *testing.T) {
	for text, want := range map[string]string{
		"background c\nfields u\nlagrangian quadratic = c*u'^2":                      "g",
		"background c1, g_2\nfields u\nlagrangian quadratic = c1*g_2*u'^2":           "b",
		"background cat\nfields u\nlagrangian quadratic = cat*u'^2":                  "c",
		"constants c, g, b, C\nfields u\nlagrangian quadratic = c*g*b*C*u'^2":        "coefficient_",
		"functions g(t)\nconstants c\nfields u\nlagrangian quadratic = g*(c+t)*u'^2": "b",
	} {
		if got := nameStem(loadText(t, text)); got != want {
			t.Errorf("%s: stem %s, want %s", text, got, want)
		}
	}
}

func loadText(t *testing.T, text string) *parse.Model {
	t.Helper()
	m, err := parse.Load(diag.NewSource("case.act", text), nil)
	if err != nil {
		t.Fatal(err)
	}
	return m
}
