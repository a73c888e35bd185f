package reduce

import (
	"errors"
	"math/big"
	"testing"

	"remnant/expr/field"
	"remnant/parse/diag"
)

func rational(t *testing.T, what string, e *field.Elem, num, den int64) {
	t.Helper()
	if e == nil {
		t.Errorf("%s: no value", what)
		return
	}
	if r, ok := e.Rat(); !ok || r.Cmp(big.NewRat(num, den)) != 0 {
		t.Errorf("%s = %v, want %d/%d", what, *e, num, den)
	}
}

// TestValuesAtPoint compares with values worked out by hand: 𝒦 = 2a³ε, 𝒢 = 2aε, z² = 2a²ε, and
// with ε constant z″/z = a²H²(2 − ε).
func TestValuesAtPoint(t *testing.T) {
	r := mustReduce(t, load(t, "plover.act"))
	v, err := r.At(diag.NewSource("point", "a = 3; H = 1/2; eps = 1/5; eps' = 0; eps'' = 0; k = 7"))
	if err != nil {
		t.Fatal(err)
	}
	rational(t, "kinetic", v.Single.Kinetic, 54, 5)
	rational(t, "gradient", v.Single.Gradient, 6, 5)
	rational(t, "mass", v.Single.Mass, 0, 1)
	rational(t, "sound speed²", v.Single.SoundSpeed2, 1, 1)
	rational(t, "q₀", &v.Single.Q[0], -6*49, 5)
	rational(t, "z²", v.Single.ZSquared, 18, 5)
	rational(t, "z''/z", v.Single.ZppOverZ, 9*9, 4*5)
	rational(t, "friction", &v.Single.EquationOfMotion[1], 3, 2)
	rational(t, "k²/a²", &v.Single.EquationOfMotion[0], 49, 9)
}

// TestDefinedFunctionAtPoint differentiates definitions: in the conformal clock X is
// φ′²/(2a²), so that P,φ at fixed X and P,X are not the derivatives by φ and φ′.
func TestDefinedFunctionAtPoint(t *testing.T) {
	m := model(t, "test.act", `clock conformal
constants c
background a, phi, b
functions P(phi, X) = phi^3*X^2 + c*b*X, V(phi) = sin(phi)*exp(2*phi) + log(phi), Q(a, X) = a^2*X
fields u
lagrangian quadratic = P,X,phi*u'^2/2 + P,X,X*u^2 + V,phi*u^2 + P,phi*u^2 + Q,a*u^2
numbers c = 5`)
	r := mustReduce(t, m)
	v, err := r.At(diag.NewSource("point", "a = 2; phi = 3; phi' = 4; b = 7; phi'' = 0; a' = 0; H = 0; H' = 0; phi''' = 0; k = 1"))
	if err != nil {
		t.Fatal(err)
	}
	// X = 16/8 = 2: P,Xφ = 3φ²·2X = 108, P,XX = 2φ³ = 54, P,φ = 3φ²X² = 108,
	// Q,a = 2aX = 8 although a²X is φ′²/2, V,φ = (cos 3 + 2 sin 3) exp 6 + 1/3
	rational(t, "kinetic", v.Single.Kinetic, 108, 1)
	mass := v.Single.Mass.Add(m.K.Int(2 * (54 + 108 + 8)))
	want, err := m.Evaluate(diag.NewSource("want", "-2*((cos(3) + 2*sin(3))*exp(6) + 1/3)"))
	if err != nil {
		t.Fatal(err)
	}
	if !mass.Equal(want) {
		t.Errorf("mass + 2(P,XX + P,φ + Q,a) = %v, want %v", mass, want)
	}
}

func TestPointsRefused(t *testing.T) {
	r := mustReduce(t, load(t, "plover.act"))
	tests := []struct {
		point string
		kind  diag.Kind
	}{
		{"a = 1; a = 1", PointTwice},
		{"k = 0", PointSign},
		{"a = -1/2", PointSign},
		{"H = 1; eps = 1/2; H' = 1/2", PointDisagrees},
		{"H = 1; eps = 1/2; H'' = 1", PointMissing}, // it is (2ε² − ε'/H)H³
		{"a = 1", PointMissing},
		{"a = 1; H = 0; eps = 1; eps' = 0; eps'' = 0; k = 1", PointSingular},
		{"a = 1; H = 1; eps = 0; eps' = 0; eps'' = 0; k = 1", PointSingular},
	}
	for _, tt := range tests {
		_, err := r.At(diag.NewSource("point", tt.point))
		var faults diag.List
		if !errors.As(err, &faults) || len(faults) != 1 || faults[0].Kind != tt.kind {
			t.Errorf("%s: %v, want %q", tt.point, err, tt.kind)
		}
	}
}

// TestKnownNameNotNeeded passes over what the result does not hold, and accepts what agrees.
func TestKnownNameNotNeeded(t *testing.T) {
	r := mustReduce(t, load(t, "plover.act"))
	point := "a = 1; H = 1; eps = 1/2; eps' = 0; eps'' = 0; k = 1; eps''' = 9; H' = -1/2; a'' = 1/2"
	if _, err := r.At(diag.NewSource("point", point)); err != nil {
		t.Error(err)
	}
}

// TestValuesOfWhatIsNotWrittenOut takes the equation of motion and z″/z from a result, as a
// large one lacks them: the values must be the same.
func TestValuesOfWhatIsNotWrittenOut(t *testing.T) {
	points := map[string]string{
		"plover.act":           "a = 3; H = 1/2; eps = 1/5; eps' = 2; eps'' = 7; k = 7",
		"plover-efolds.act":    "a = 3; H = 1/2; eps = 1/5; eps' = 2; eps'' = 7; k = 7",
		"gannet.act":           "m = 2; k = 3",
		"sandpiper.act":        "M = 2; a = 3; H = 1/2; phi' = 1/5; phi'' = 2; phi''' = 7; k = 7",
		"plover-conformal.act": "a = 3; H = 1/2; eps = 1/5; eps' = 2; eps'' = 7; k = 7",
	}
	for name, point := range points {
		r := mustReduce(t, load(t, name))
		want, err := r.At(diag.NewSource("point", point))
		if err != nil {
			t.Fatal(err)
		}
		lacking, one := *r, *r.Single
		one.EquationOfMotion, one.ZppOverZ = nil, nil
		lacking.Single = &one
		got, err := lacking.At(diag.NewSource("point", point))
		if err != nil {
			t.Fatal(err)
		}
		same(t, name+": z''/z", got.Single.ZppOverZ, *want.Single.ZppOverZ)
		for i, c := range want.Single.EquationOfMotion {
			same(t, name+": equation of motion", &got.Single.EquationOfMotion[i], c)
		}
	}
}
