package reduce

import (
	"testing"

	"remnant/expr/field"
)

// Heron declares ρ = φ'²P,X/2 + φ'⁴P,XX/2, which is the kinetic coefficient up to 2a³/H²; the
// name comes back into it and into the solution for ψ, and means the same.
func TestAbbreviations(t *testing.T) {
	m := load(t, "heron.act")
	r := mustReduce(t, m)
	short := r.Abbreviated()
	if len(short.Abbreviations) != 1 || short.Abbreviations[0].Name != "rho2" {
		t.Fatalf("abbreviations %v, want rho2", short.Abbreviations)
	}
	g, ok := m.K.Lookup("rho2")
	if !ok {
		t.Fatal("the name has no generator")
	}
	if want := eval(t, m, "2*a^3/H^2").Mul(m.K.Gen(g)); !short.Single.Kinetic.Equal(want) {
		t.Errorf("kinetic = %v, want %v", short.Single.Kinetic, want)
	}
	back, err := short.Single.Kinetic.Substitute(nameBack(g, short.Abbreviations[0]))
	if err != nil || !back.Equal(*r.Single.Kinetic) {
		t.Errorf("the name read as its value gives %v (%v), want %v", back, err, r.Single.Kinetic)
	}
	if r.Single.Kinetic.Has(g) {
		t.Error("the result itself was changed")
	}
}

func nameBack(g field.Gen, a Abbreviation) func(field.Gen) (field.Elem, bool) {
	return func(h field.Gen) (field.Elem, bool) { return a.Value, h == g }
}
