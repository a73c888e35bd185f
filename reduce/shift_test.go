package reduce

import "testing"

// A function of X alone: the constraint fixes P, the other equations H′ and φ″; the result is
// that of Garriga, Mukhanov 1999, hep-th/9904176.
func TestShiftSymmetricScalar(t *testing.T) {
	m := model(t, "case.act", "constants M > 0\nfunctions P(X)\nbackground a, phi\nlagrangian covariant = M^2*R/2 + P\nkeep zeta\n")
	r := mustReduce(t, m)
	same(t, "kinetic", r.Single.Kinetic, eval(t, m, "a^3*phi'^2*(P,X + phi'^2*P,X,X)/H^2"))
	same(t, "gradient", r.Single.Gradient, eval(t, m, "a*phi'^2*P,X/H^2"))
	same(t, "sound speed squared", r.Single.SoundSpeed2, eval(t, m, "P,X/(P,X + phi'^2*P,X,X)"))
	p := eval(t, m, "P")
	same(t, "P", &p, eval(t, m, "phi'^2*P,X - 3*M^2*H^2"))
	px := eval(t, m, "P,X")
	if px.IsZero() || !px.Equal(m.K.Raw(px.Num().Vars()[0])) {
		t.Errorf("P,X = %v, want it free", px)
	}
}
