package reduce

import (
	"strings"
	"testing"

	"remnant/parse"
)

const flat = `model "Siskin: a form factor on flat space"
constants M > 0
formfactor F(box)
background a
given a' = 0
gauge newtonian
lagrangian covariant = M^2*R/2 + R*F(box)[R]/2
`

const deSitter = `model "Siskin: a form factor on de Sitter space"
constants M > 0, L
formfactor F(box)
background a
given H' = 0
gauge newtonian
lagrangian covariant = M^2*R/2 + R*F(box)[R]/2 - L
`

func sameW(t *testing.T, m *parse.Model, r *Result, want string) {
	t.Helper()
	if r.FormFactor == nil {
		t.Fatal("there is no form factor")
	}
	w, ok := r.FormFactor.W(m.K)
	if !ok {
		t.Fatalf("L = %v is no polynomial in □", r.FormFactor.L)
	}
	same(t, "W", &w, eval(t, m, want))
}

// On Minkowski space W = 1 − 6sF(s)/M² (Biswas, Gerwick, Koivisto, Mazumdar 2011,
// arXiv:1110.5249, in our convention), on de Sitter space
// W = 1 − 2(3s + R̄)F(s)/(M² + 2F(0)R̄) with R̄ = 12H².
func TestFormFactorOnMaximallySymmetricSpaces(t *testing.T) {
	m := model(t, "siskin.act", flat)
	sameW(t, m, mustReduce(t, m), "1 - 6*s*F(s)/M^2")
	m = model(t, "siskin.act", deSitter)
	sameW(t, m, mustReduce(t, m), "1 - 2*(3*s + 12*H^2)*F(s)/(M^2 + 24*F(0)*H^2)")
}

// Expanded by brute force, F = f₀ is the scalaron of R + R²: s = M²/(6f₀), healthy for f₀ > 0
// (De Felice, Tsujikawa 2010, arXiv:1002.4928, with f = M²R/2 + f₀R²/2), which is the zero of
// W with F = f₀; each further power of □ adds a zero and a degree of freedom.
func TestPolynomialFormFactors(t *testing.T) {
	const head = "constants M > 0, f0 > 0, f1, f2\nbackground a\ngiven a' = 0\ngauge newtonian\nlagrangian covariant = M^2*R/2 + R*("
	for i, p := range []string{"f0", "f0 + f1*box", "f0 + f1*box + f2*box^2"} {
		m := model(t, "case.act", head+p+")[R]/2\n")
		r := mustReduce(t, m)
		if r.DegreesOfFreedom != i+1 {
			t.Errorf("F = %s: %d degrees of freedom, want %d", p, r.DegreesOfFreedom, i+1)
		}
		if i > 0 {
			continue
		}
		eom := r.Single.EquationOfMotion
		same(t, "mass", &eom[0], eval(t, m, "k^2/a^2 + M^2/(6*f0)"))
		if len(r.Stability) == 0 || r.Stability[0].Concern != Ghost || r.Stability[0].Verdict != Always {
			t.Errorf("stability %+v, want no ghost", r.Stability)
		}
	}
}

// The row of a form factor on curvature does not depend on the gauge: W is the same in the
// gauges that Minkowski and de Sitter space allow.
func TestFormFactorInOtherGauges(t *testing.T) {
	m := model(t, "siskin.act", strings.Replace(deSitter, "newtonian", "flat", 1))
	sameW(t, m, mustReduce(t, m), "1 - 2*(3*s + 12*H^2)*F(s)/(M^2 + 24*F(0)*H^2)")
}

// Conformal time: the same function.
func TestFormFactorOnConformalClock(t *testing.T) {
	m := model(t, "siskin.act", "clock conformal\n"+strings.Replace(deSitter, "given H' = 0", "given H' = H^2", 1))
	sameW(t, m, mustReduce(t, m), "1 - 2*(3*s + 12*H^2/a^2)*F(s)/(M^2 + 24*F(0)*H^2/a^2)")
}

const starobinsky = `model "Siskin: a form factor on the background of R² inflation"
constants M > 0, r1 > 0
formfactor F(box)
background a
given box[R] = r1*R
given F.1(r1) = 0
given F(r1) = M^2/(6*r1)
gauge newtonian
lagrangian covariant = M^2*R/2 + R*F(box)[R]/2
`

// On a background with □R = r₁R and the conditions F′(r₁) = 0, M² = 6r₁F(r₁) (Biswas, Mazumdar,
// Siegel 2006, hep-th/0508194), the local theory is R + R², whose scalaron decouples; what is
// left for the form factor is a local operator L with coefficients that depend on time. With
// a quadratic F the second operator Z⁻¹ + L, Z = f₂, is local too and of fourth order: with the
// scalaron that makes the three degrees of freedom that the brute-force expansion has.
func TestFormFactorOnInflation(t *testing.T) {
	m := model(t, "siskin.act", starobinsky)
	r := mustReduce(t, m)
	f := r.FormFactor
	if f == nil || f.LocalDOF != 1 || f.L.Order() != 4 {
		t.Fatalf("form factor %v", f)
	}
	if _, ok := f.W(m.K); ok {
		t.Error("L depends on time and W is no function of s")
	}
	lead := f.L.Lead()
	same(t, "leading coefficient", &lead, eval(t, m, "6*r1/M^2"))
	brute := mustReduce(t, model(t, "siskin.act", `constants M > 0, r1 > 0, f2 > 0
background a
given box[R] = r1*R
let f1 = -2*f2*r1
let f0 = M^2/(6*r1) + f2*r1^2
gauge newtonian
lagrangian covariant = M^2*R/2 + R*(f0 + f1*box + f2*box^2)[R]/2
`))
	if want := f.LocalDOF + f.L.Order()/2; brute.DegreesOfFreedom != want {
		t.Errorf("brute force finds %d degrees of freedom, the split %d", brute.DegreesOfFreedom, want)
	}
}
