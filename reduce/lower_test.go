package reduce

import (
	"testing"

	"remnant/expr/field"
)

// The fourth-order oscillator λω⁴ + ω² − w² = 0 with small λ: the low-frequency root is
// ω² = (√(1 + 4λw²) − 1)/(2λ) = w² − λw⁴ + 2λ²w⁶ − 5λ³w⁸ + … (Catalan numbers), and the effective
// action has it as −q₀/q₁, to the order kept.
func TestLowerOscillator(t *testing.T) {
	m := model(t, "snipe.act", "constants w > 0, lambda\nfields x\nsmall lambda to order 3\nlagrangian quadratic = (lambda*x''^2 + x'^2 - w^2*x^2)/2\n")
	r := mustReduce(t, m)
	low, err := r.Lower()
	if err != nil {
		t.Fatal(err)
	}
	q := low.Field.Q
	if len(q) != 2 {
		t.Fatalf("q = %v, want second order", q)
	}
	got := q[0].Neg().Sub(q[1].Mul(eval(t, m, "w^2 - lambda*w^4 + 2*lambda^2*w^6 - 5*lambda^3*w^8")))
	if v := lowestDegree(t, m.K, got, m.Small); v < 4 {
		t.Errorf("−q₀ − ω²q₁ = %v begins at degree %d, want 4", got, v)
	}
}

// lowestDegree is the degree in the small constant at which a polynomial begins.
func lowestDegree(t *testing.T, k *field.Field, e field.Elem, small []field.Gen) int {
	t.Helper()
	if e.IsZero() {
		return 1 << 20
	}
	c, ok := e.CoeffsIn(small[0])
	if !ok {
		t.Fatalf("%v is no polynomial", e)
	}
	for n, x := range c {
		if !x.IsZero() {
			return n
		}
	}
	return 1 << 20
}

// A field on an expanding background with a term ½λa³(□u)²: on the leading equation □u = 0 it
// vanishes, so at first order nothing is corrected; the effective action is the one without it.
func TestLowerVanishesOnShell(t *testing.T) {
	m := model(t, "case.act", "constants lambda\nbackground a\nfields u\nsmall lambda to order 1\nlagrangian quadratic = a^3*u'^2/2 - a*u,i*u,i/2 + lambda*a^3*box[u]^2/2\n")
	low, err := mustReduce(t, m).Lower()
	if err != nil {
		t.Fatal(err)
	}
	same(t, "kinetic", low.Field.Kinetic, eval(t, m, "a^3"))
	same(t, "gradient", low.Field.Gradient, eval(t, m, "a"))
	same(t, "mass", low.Field.Mass, eval(t, m, "0"))
}

// With a mass, (□u)² is m⁴u² on shell: ½λa³(□u)² corrects 𝒦 and 𝒢 alike, so that c_s² stays 1, and
// the mass squared becomes m² − λm⁴ at first order: the pole s = m² of s − m² + λs² moves so.
func TestLowerMass(t *testing.T) {
	m := model(t, "case.act", "constants lambda, m > 0\nbackground a\nfields u\nsmall lambda to order 1\nlagrangian quadratic = a^3*u*(box - m^2)[u]/2 + lambda*a^3*u*box^2[u]/2\n")
	low, err := mustReduce(t, m).Lower()
	if err != nil {
		t.Fatal(err)
	}
	same(t, "sound speed squared", low.Field.SoundSpeed2, eval(t, m, "1"))
	ratio := low.Field.Mass.Sub(low.Field.Kinetic.Mul(eval(t, m, "m^2 - lambda*m^4")))
	if v := lowestDegree(t, m.K, ratio, m.Small); v < 2 {
		t.Errorf("ℳ − (m² − λm⁴)𝒦 = %v begins at degree %d, want 2", ratio, v)
	}
}
