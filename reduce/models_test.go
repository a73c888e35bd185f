package reduce

// Models whose degrees of freedom are known.

import (
	"testing"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// The longitudinal mode of a massive vector on flat space has the kinetic coefficient
// m²/(k² + m²) and the speed of light (common practice).
func TestMassiveVector(t *testing.T) {
	m := load(t, "gannet.act")
	r := mustReduce(t, m)
	if r.DegreesOfFreedom != 1 || len(r.Single.Q) != 2 {
		t.Fatalf("%d degrees of freedom, q = %v", r.DegreesOfFreedom, r.Single.Q)
	}
	same(t, "q₁", &r.Single.Q[1], eval(t, m, "m^2/(k^2 + m^2)"))
	same(t, "q₀", &r.Single.Q[0], eval(t, m, "-m^2"))
	same(t, "sound speed squared", r.Single.SoundSpeed2, eval(t, m, "1"))
	if r.Single.Kinetic != nil || r.Single.Gradient != nil || r.Single.Mass != nil {
		t.Error("𝒦, 𝒢 and ℳ do not exist where the kinetic coefficient depends on k")
	}
}

// A canonical field with F = 1 + (k/p)⁴ in front of its gradient has no finite sound speed.
func TestUnboundedSoundSpeed(t *testing.T) {
	r := mustReduce(t, model(t, "godwit.act", "model \"Godwit\"\nconstants p > 0\nbackground a\nfields u\nlagrangian quadratic = a^3*u'^2/2 - u,ij*u,ij/(2*a*p^2)\n"))
	if r.Single.SoundSpeed2 != nil || r.Single.GrowthInK != 2 {
		t.Errorf("c_s² %v with growth k^%d, want none with k²", r.Single.SoundSpeed2, r.Single.GrowthInK)
	}
	if r.Single.Gradient != nil {
		t.Errorf("gradient %v, want none", r.Single.Gradient)
	}
}

// Two modes, one of them a ghost (Pais, Uhlenbeck 1950, doi:10.1103/PhysRev.79.145).
func TestFourthOrderOscillator(t *testing.T) {
	r := mustReduce(t, load(t, "snipe.act"))
	if r.DegreesOfFreedom != 2 || len(r.Single.Q) != 3 {
		t.Fatalf("%d degrees of freedom, q = %v; want 2 of one field", r.DegreesOfFreedom, r.Single.Q)
	}
	if len(r.Stability) != 1 || r.Stability[0].Concern != Ostrogradsky || r.Stability[0].Number != 4 {
		t.Errorf("stability %+v, want a ghost of a fourth-order equation", r.Stability)
	}
}

func TestDegreesOfFreedom(t *testing.T) {
	tests := []struct {
		model, why string
		dof, left  int
	}{
		{"avocet.act", "two canonical fields on a turning trajectory: velocity couplings remove nothing", 2, 2},
		{"wagtail.act", "½(x' + ty')² − ½(x + ty)² looks like one and has none", 0, 0},
		{"curlew.act", "the degeneracy leaves one: Langlois, Mancarella, Noui, Vernizzi 2017, arXiv:1703.03797", 1, 1},
		{"whimbrel.act", "without the degeneracy there are two: the same paper", 2, -1},
		{"snipe.act", "fourth order in one field", 2, 1},
		{"dunlin.act", "second order: one scalar, Kobayashi, Yamaguchi, Yokoyama 2011, arXiv:1105.5723", 1, 1},
	}
	for _, tc := range tests {
		t.Run(tc.model, func(t *testing.T) {
			r := mustReduce(t, load(t, tc.model))
			if r.DegreesOfFreedom != tc.dof {
				t.Errorf("%d degrees of freedom, want %d: %s", r.DegreesOfFreedom, tc.dof, tc.why)
			}
			if tc.left >= 0 && len(r.Remaining.Names) != tc.left {
				t.Errorf("%v remain, want %d fields", r.Remaining.Names, tc.left)
			}
		})
	}
}

// Two canonical fields: both sound speeds are one, (c² − 1)² = 0.
func TestTwoFieldSoundSpeeds(t *testing.T) {
	m := load(t, "avocet.act")
	c := mustReduce(t, m).Several.SoundSpeeds
	if len(c) != 3 {
		t.Fatalf("equation of the sound speeds %v, want degree 2", c)
	}
	for i, want := range []string{"1", "-2", "1"} {
		same(t, "coefficient", &c[i], eval(t, m, want))
	}
}

// The same action on the three clocks: z² and z”/z, which are defined with the conformal
// time on each, agree at a random point that is translated from clock to clock.
func TestClocksAgree(t *testing.T) {
	p := poly.Mersenne61
	const a, h, e0, e1, e2 = 1234567, 7654321, 31337, 271828182, 314159265
	points := []struct {
		model string
		at    map[string][]uint64 // jets of each function
	}{
		{"plover.act", map[string][]uint64{"a": {a}, "H": {h}, "eps": {e0, e1, e2}}},
		// d/dη = a d/dt; H is ℋ = aH
		{"plover-conformal.act", map[string][]uint64{"a": {a}, "H": {p.Mul(a, h)}, "eps": {e0, p.Mul(a, e1),
			p.Mul(p.Mul(a, a), p.Add(e2, p.Mul(h, e1)))}}},
		// d/dN = H⁻¹ d/dt, and H' = −εH² on the cosmic clock
		{"plover-efolds.act", map[string][]uint64{"a": {a}, "H": {h}, "eps": {e0, p.Mul(e1, p.Inv(h)),
			p.Add(p.Mul(e2, p.Inv(p.Mul(h, h))), p.Mul(p.Mul(e1, e0), p.Inv(h)))}}},
	}
	var z2, zpp []uint64
	for _, pt := range points {
		m := load(t, pt.model)
		s := mustReduce(t, m).Single
		at := func(g field.Gen) uint64 {
			info := m.K.Info(g)
			return pt.at[info.Name][info.Order]
		}
		for _, v := range []struct {
			list *[]uint64
			e    *field.Elem
		}{{&z2, s.ZSquared}, {&zpp, s.ZppOverZ}} {
			x, ok := v.e.EvalMod(p, at)
			if !ok {
				t.Fatal("the point is singular")
			}
			*v.list = append(*v.list, x)
		}
		same(t, "sound speed squared", s.SoundSpeed2, eval(t, m, "1"))
	}
	for i := range points {
		if z2[i] != z2[0] || zpp[i] != zpp[0] {
			t.Errorf("%s: z² = %d, z''/z = %d; on the cosmic clock %d, %d", points[i].model, z2[i], zpp[i], z2[0], zpp[0])
		}
	}
}

// z”/z of Plover in de Sitter-like slow roll is 2a²H² at leading order, and exactly
// a²H²(2 − ε + 3η/2 − …); here the closed form by hand for constant ε: z ∝ a, so that
// z”/z = a”/a = a²H²(2 − ε).
func TestCanonicalPump(t *testing.T) {
	m := model(t, "tern.act", `model "Tern: a power law"
constants eps > 0
background a, H
given a' = a*H
given H' = -eps*H^2
fields zeta
lagrangian quadratic = a^3*eps*zeta'^2 - a*eps*zeta,i*zeta,i
`)
	s := mustReduce(t, m).Single
	same(t, "z''/z", s.ZppOverZ, eval(t, m, "a^2*H^2*(2 - eps)"))
	same(t, "z²", s.ZSquared, eval(t, m, "2*a^2*eps"))
	same(t, "friction", &s.EquationOfMotion[1], eval(t, m, "3*H"))
	same(t, "frequency", &s.EquationOfMotion[0], eval(t, m, "k^2/a^2"))
}
