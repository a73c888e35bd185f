package reduce

import (
	"remnant/expr/oper"
	"strings"
	"testing"
)

const turnstone = `model "Turnstone"
background a, H, eps
given a' = a*H
given H' = -eps*H^2
fields alpha, psi, zeta
lagrangian quadratic =
    a^3*( -3*zeta'^2 + 6*H*alpha*zeta' - (3 - eps)*H^2*alpha^2 )
  + a*( zeta,i*zeta,i + 2*alpha,i*zeta,i )
  + 2*a*psi,ii*( zeta' - H*alpha )
`

// keep v = zζ with z = a√(2ε) gives the canonical action: on the conformal clock
// ½[v'² − (∂v)² + (z”/z)v²] (Mukhanov 1985; Sasaki 1986), here 𝒦 = a on the cosmic one.
func TestKeepCanonicalVariable(t *testing.T) {
	m := model(t, "turnstone.act", strings.Replace(turnstone, "eps\n", "eps > 0\n", 1)+"keep v = a*sqrt(2*eps)*zeta\n")
	r := mustReduce(t, m)
	if r.Variable != "v" || r.DegreesOfFreedom != 1 {
		t.Fatalf("variable %q with %d degrees of freedom", r.Variable, r.DegreesOfFreedom)
	}
	same(t, "kinetic", r.Single.Kinetic, eval(t, m, "a"))
	same(t, "gradient", r.Single.Gradient, eval(t, m, "1/a"))
	zpp := mustReduce(t, model(t, "turnstone.act", turnstone+"keep zeta\n")).Single.ZppOverZ
	minusMass := r.Single.Mass.Neg().Mul(eval(t, m, "a"))
	if minusMass.String() != zpp.String() {
		t.Errorf("−aℳ = %v, want z''/z = %v", minusMass, zpp)
	}
}

// A new variable that mixes the lapse in, u = ζ + cα, is kept through its definition; the
// number of degrees of freedom stays, and without the mixing so does the operator.
func TestKeepMixture(t *testing.T) {
	r := mustReduce(t, model(t, "turnstone.act", turnstone+"keep u = zeta + 0*alpha\n"))
	want := mustReduce(t, model(t, "turnstone.act", turnstone+"keep zeta\n"))
	if r.Variable != "u" || r.Single.Kinetic.String() != want.Single.Kinetic.String() {
		t.Errorf("variable %q with 𝒦 = %v, want u with %v", r.Variable, r.Single.Kinetic, want.Single.Kinetic)
	}
}

// Without keep, the program chooses and says what.
func TestChoosesVariable(t *testing.T) {
	r := mustReduce(t, model(t, "turnstone.act", turnstone))
	if r.Variable != "zeta" || r.Requested != "" {
		t.Errorf("variable %q, requested %q", r.Variable, r.Requested)
	}
}

// A variable that holds the velocity. For the oscillator L = ½x'² − ½w²x² it is its momentum,
// with H = ½p² + ½w²x² read as L = ½p'²/w² − ½p² (canonical exchange, common practice); a
// mixture x + cx' obeys the same equation of motion as x, since the coefficients are constant.
func TestKeepVelocity(t *testing.T) {
	const osc = "constants w > 0, c > 0\nfields x\nlagrangian quadratic = x'^2/2 - w^2*x^2/2\n"
	m := model(t, "oystercatcher.act", osc+"keep p = x'\n")
	r := mustReduce(t, m)
	if r.Variable != "p" || r.DegreesOfFreedom != 1 {
		t.Fatalf("variable %q, %d degrees of freedom", r.Variable, r.DegreesOfFreedom)
	}
	same(t, "kinetic", r.Single.Kinetic, eval(t, m, "1/w^2"))
	same(t, "mass", r.Single.Mass, eval(t, m, "1"))

	m = model(t, "oystercatcher.act", osc+"keep u = x + c*x'\n")
	r = mustReduce(t, m)
	eom := r.Single.EquationOfMotion
	same(t, "friction", &eom[1], eval(t, m, "0"))
	same(t, "frequency", &eom[0], eval(t, m, "w^2"))
	same(t, "kinetic", r.Single.Kinetic, eval(t, m, "1/(1 + c^2*w^2)"))
}

// In the time-dependent case the equation of motion of u = ζ + α = ζ + ζ'/H follows from that
// of ζ: it must vanish on u when the equation of ζ is used, which is tested by division.
func TestKeepVelocityOfPerturbation(t *testing.T) {
	m := model(t, "turnstone.act", turnstone+"keep u = zeta + alpha\n")
	r := mustReduce(t, m)
	if r.Variable != "u" || r.Single == nil {
		t.Fatalf("variable %q", r.Variable)
	}
	u := oper.New(eval(t, m, "1"), eval(t, m, "1/H"))
	zeta := oper.New(eval(t, m, "k^2/a^2"), eval(t, m, "3*H + eps'/eps"), eval(t, m, "1"))
	if _, rest := oper.DivRight(oper.New(r.Single.EquationOfMotion...).Mul(u), zeta); !rest.IsZero() {
		t.Errorf("the equation of u does not follow from that of ζ: %v is left", rest)
	}
	if !r.Remaining.D.IsSelfAdjoint() {
		t.Error("the operator of u is not self-adjoint")
	}
}
