package reduce

import (
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
