package reduce

import "testing"

// GB is the Gauss–Bonnet scalar: alone it is a total derivative in four dimensions, times f(φ)
// it is what Ruff writes out, and f(GB) brings one scalar with it.
func TestGaussBonnetScalar(t *testing.T) {
	const head = "constants M > 0\nfunctions V(phi), f(phi)\nbackground a, phi\ngauge unitary\nlagrangian covariant = M^2*R/2 + X - V + "
	short := mustReduce(t, model(t, "case.act", head+"f*GB\nkeep zeta\n"))
	long := mustReduce(t, model(t, "case.act", head+"f*(Riem.abcd*Riem.abcd - 4*Ric.ab*Ric.ab + R^2)\nkeep zeta\n"))
	if short.Single.Kinetic.String() != long.Single.Kinetic.String() || short.Single.Gradient.String() != long.Single.Gradient.String() {
		t.Errorf("𝒦 = %v, written out %v", short.Single.Kinetic, long.Single.Kinetic)
	}
	topological := mustReduce(t, model(t, "case.act", head+"3*GB\nkeep zeta\n"))
	m := load(t, "lapwing.act")
	if got, want := topological.Single.Kinetic.String(), mustReduce(t, m).Single.Kinetic.String(); got != want {
		t.Errorf("with 3 GB 𝒦 = %s, without %s", got, want)
	}
	r := mustReduce(t, model(t, "case.act", "constants M > 0\nbackground a\nfunctions f(GB)\ngauge newtonian\nlagrangian covariant = M^2*R/2 + f\n"))
	if r.DegreesOfFreedom != 1 {
		t.Errorf("f(GB): %d degrees of freedom, want one scalar", r.DegreesOfFreedom)
	}
}
