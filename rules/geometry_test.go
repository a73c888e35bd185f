package rules

// The geometry against identities and closed forms that every metric obeys.

import (
	"testing"

	"remnant/expr/field"
	"remnant/parse"
)

// testFrame is the frame of all scalar perturbations on a general background.
func testFrame(t testing.TB, names ...string) (*frame, *field.Field) {
	t.Helper()
	k := field.New(nil)
	a, h := k.Function("a", field.Positive), k.Function("H", field.Unknown)
	if err := k.RelateGen(k.JetGen(a, 1), k.Gen(a).Mul(k.Gen(h)), 0); err != nil {
		t.Fatal(err)
	}
	r := newRing(k, k.Int(1), k.Gen(a))
	return geometry(r, names, k.Gen(a)), k
}

func sectors() map[string][]string {
	return map[string][]string{
		"scalar": parse.Perturbations(parse.Open, parse.ScalarSector, nil),
		"vector": parse.Perturbations(parse.Open, parse.VectorSector, nil),
		"tensor": parse.Perturbations(parse.Open, parse.TensorSector, nil),
	}
}

// The contracted Bianchi identity ∇^a G_ab = 0 (Wald 1984, eq. (3.2.32)), to second order.
func TestContractedBianchi(t *testing.T) {
	for name, fields := range sectors() {
		f, _ := testFrame(t, fields...)
		div := f.trace(f.grad(f.einstein()), 1, 2)
		if len(div.comp) != 0 {
			t.Errorf("%s: the divergence of G does not vanish: %d components", name, len(div.comp))
		}
	}
}

// R_a[bcd] = 0, the symmetry under exchange of pairs, and Weyl without trace.
func TestRiemannSymmetries(t *testing.T) {
	for name, fields := range sectors() {
		f, _ := testFrame(t, fields...)
		r := f.riemann()
		for _, i := range [][4]int{{0, 1, 2, 3}, {0, 1, 3, 2}, {0, 2, 1, 3}, {1, 0, 3, 1}, {3, 0, 1, 3}} {
			a, b, c, d := i[0], i[1], i[2], i[3]
			if s := r.at(a, b, c, d).add(r.at(a, c, d, b)).add(r.at(a, d, b, c)); !s.isZero() {
				t.Errorf("%s: the cyclic sum of R_%d%d%d%d does not vanish", name, a, b, c, d)
			}
			if s := f.riemannComponent(a, b, c, d).sub(f.riemannComponent(c, d, a, b)); !s.isZero() {
				t.Errorf("%s: R_%d%d%d%d changes when its pairs are exchanged", name, a, b, c, d)
			}
		}
		if w := f.trace(f.weyl(), 0, 2); len(w.comp) != 0 {
			t.Errorf("%s: Weyl has a trace", name)
		}
		if w := f.weyl(); !w.at(0, 1, 0, 1).bg.IsZero() {
			t.Errorf("%s: Weyl does not vanish on the background", name)
		}
	}
}

// On the background R = 12H² + 6H′, Ric_00 = −3(H² + H′), and for N = N(τ) uniform the Gauss–
// Bonnet density is the total derivative 24 d(H³)/dτ·a³/a³ …: R_GB = 24H²(H² + H′).
func TestBackgroundCurvature(t *testing.T) {
	f, k := testFrame(t)
	g, _ := k.Lookup("H")
	h, h1 := k.Gen(g), k.Jet(g, 1)
	if got, want := f.scalarCurvature().bg, h.Mul(h).Scale(12, 1).Add(h1.Scale(6, 1)); !got.Equal(want) {
		t.Errorf("R = %v, want %v", got, want)
	}
	if got, want := f.ricci().at(0, 0).bg, h.Mul(h).Add(h1).Scale(-3, 1); !got.Equal(want) {
		t.Errorf("Ric_00 = %v, want %v", got, want)
	}
	square := func(x tensor) field.Elem {
		var sum field.Elem
		x.each(func(index []int, q quantity) {
			s := q.bg.Mul(q.bg)
			for _, i := range index {
				s = s.Scale(int64(eta(i)), 1)
			}
			sum = sum.Add(s)
		})
		return sum
	}
	r := f.scalarCurvature().bg
	gb := square(f.riemann()).Sub(square(f.ricci()).Scale(4, 1)).Add(r.Mul(r))
	if want := h.Mul(h).Mul(h.Mul(h).Add(h1)).Scale(24, 1); !gb.Equal(want) {
		t.Errorf("Gauss–Bonnet = %v, want %v", gb, want)
	}
}
