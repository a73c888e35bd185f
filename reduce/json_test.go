package reduce

import (
	"bytes"
	"encoding/json"
	"slices"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

// documentKeys are the keys of format 1, in their order. A change of this list is a new
// format.
var documentKeys = []string{
	"format", "model", "clock", "gauge", "sector", "background", "assumptions", "eliminated", "variable", "variables",
	"requested", "relation", "degreesOfFreedom", "operator", "kinetic", "gradient", "mass",
	"soundSpeedSquared", "soundSpeedEquation", "equationOfMotion", "canonical", "series", "formFactor",
	"stability", "gaugeCheck", "at",
}

// keysOf lists the keys of a JSON object in their order.
func keysOf(t *testing.T, data []byte) []string {
	t.Helper()
	dec := json.NewDecoder(bytes.NewReader(data))
	var keys []string
	depth, isKey := 0, false
	for {
		tok, err := dec.Token()
		if err != nil {
			return keys
		}
		switch v := tok.(type) {
		case json.Delim:
			if v == '{' || v == '[' {
				depth++
			} else {
				depth--
			}
			isKey = depth == 1
			continue
		case string:
			if depth == 1 && isKey {
				keys = append(keys, v)
				isKey = false
				continue
			}
		}
		isKey = depth == 1
	}
}

// TestEveryKeyIsThere holds for one field, several and none.
func TestEveryKeyIsThere(t *testing.T) {
	for _, name := range []string{"plover", "avocet", "wagtail", "curlew", "snipe", "kestrel", "tern"} {
		r := mustReduce(t, load(t, name+".act"))
		data, err := r.Document(nil, nil).Encode()
		if err != nil {
			t.Fatal(err)
		}
		if got := keysOf(t, data); !slices.Equal(got, documentKeys) {
			t.Errorf("%s: keys %v", name, got)
		}
	}
}

// value reads a string of the document back into the model's field.
func value(t *testing.T, m *parse.Model, text string) field.Elem {
	t.Helper()
	v, err := m.Evaluate(diag.NewSource("json", text))
	if err != nil {
		t.Fatalf("%q cannot be read back: %v", text, err)
	}
	return v
}

// TestStringsReadBack parses what the document says of each model again: the same elements
// must come out.
func TestStringsReadBack(t *testing.T) {
	for _, name := range []string{"plover", "plover-conformal", "plover-efolds", "heron", "dunlin", "curlew", "gannet", "sandpiper", "snipe"} {
		r := mustReduce(t, load(t, name+".act"))
		d := r.Document(nil, nil)
		check := func(what, text string, want field.Elem) {
			if got := value(t, r.Model, text); !got.Equal(want) {
				t.Errorf("%s: %s reads back as %v, want %v", name, what, got, want)
			}
		}
		for n, q := range r.Single.Q {
			check("operator", d.Operator.Single[n], q)
		}
		for n, c := range r.Single.EquationOfMotion {
			check("equation of motion", coefficientOf(*d.EquationOfMotion, r.Variable, n), c)
		}
		if d.Kinetic != nil {
			check("kinetic", *d.Kinetic, *r.Single.Kinetic)
			check("gradient", *d.Gradient, *r.Single.Gradient)
			check("mass", *d.Mass, *r.Single.Mass)
		}
		if d.SoundSpeedSquared != nil {
			check("sound speed", *d.SoundSpeedSquared, *r.Single.SoundSpeed2)
		}
		if d.Canonical != nil {
			check("z²", d.Canonical.ZSquared, *r.Single.ZSquared)
			check("z''/z", d.Canonical.ZppOverZ, *r.Single.ZppOverZ)
		}
	}
}

// coefficientOf makes of an equation linear in u the coefficient of u⁽ⁿ⁾: that derivative is
// put to 1 and the others to 0.
func coefficientOf(equation, u string, n int) string {
	text, ok := strings.CutSuffix(equation, " = 0")
	if !ok {
		return "1/0"
	}
	for i := 6; i >= 0; i-- {
		value := "0"
		if i == n {
			value = "1"
		}
		text = strings.ReplaceAll(text, u+strings.Repeat("'", i), value)
	}
	return text
}

// A large equation is left underived; its coefficients are the same.
func TestUnderivedEquation(t *testing.T) {
	m := load(t, "heron.act")
	r := mustReduce(t, m)
	short := *r.Single
	short.EquationOfMotion, short.ZppOverZ = nil, nil
	q := r.quantities(&short, nil)
	if got, want := *q.EquationOfMotion, "- (("+text(short.Q[1])+")*zeta')' + (("+text(short.Q[0])+")*zeta) = 0"; got != want {
		t.Errorf("%s, want %s", got, want)
	}
	if got := value(t, m, q.Canonical.ZppOverZ); !got.Equal(*r.Single.ZppOverZ) {
		t.Errorf("z''/z = %v, want %v", got, r.Single.ZppOverZ)
	}
}

func TestDocumentOfRedefinedVariable(t *testing.T) {
	d := mustReduce(t, load(t, "curlew.act")).Document(nil, nil)
	if d.Variable == nil || *d.Variable != "zeta_1" || d.Requested == nil || *d.Requested != "zeta" {
		t.Fatalf("variable %v, requested %v", d.Variable, d.Requested)
	}
	if want := "beta1*zeta_1'/(H + alphaB*H - beta1') + zeta_1"; d.Relation == nil || *d.Relation != want {
		t.Errorf("relation %v, want %s", d.Relation, want)
	}
}

func TestStabilityInJSON(t *testing.T) {
	tests := []struct {
		text string
		want []StabilityJSON
	}{
		{"fields u\nlagrangian quadratic = u'^2/2 - u,i*u,i/2", []StabilityJSON{{Concern: "ghost", Verdict: "stable"}, {Concern: "gradient", Verdict: "stable"}}},
		{"fields u\nlagrangian quadratic = -u'^2/2", []StabilityJSON{{Concern: "ghost", Verdict: "unstable"}}},
		{"constants c\nfields u\nlagrangian quadratic = c*u'^2/2", []StabilityJSON{
			{Concern: "ghost", Verdict: "conditional", Condition: orNull("c > 0")},
			{Concern: "strongCoupling", Verdict: "conditional", Condition: orNull("c != 0")}}},
	}
	for _, tt := range tests {
		got := mustReduce(t, model(t, "test.act", tt.text)).Document(nil, nil).Stability
		a, _ := json.Marshal(got)
		b, _ := json.Marshal(tt.want)
		if !bytes.Equal(a, b) {
			t.Errorf("%s: stability %s, want %s", tt.text, a, b)
		}
	}
}
