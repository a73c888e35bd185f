package rules

// The slices of constant time against identities and closed forms, and the leaders of the
// background equations of adm models.

import (
	"errors"
	"testing"

	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

// square is T_a… T^a….
func (f *frame) square(x tensor) quantity {
	var sum quantity
	x.each(func(index []int, q quantity) {
		s := q.mul(q)
		for _, i := range index {
			if eta(i) < 0 {
				s = s.neg()
			}
		}
		sum = sum.add(s)
	})
	return sum
}

// The contracted Gauss–Codazzi relation R = R3 + K_ijK^ij − K² + 2∇_a(n^aK − acc^a) (Wald 1984,
// eq. (E.2.27); signs for K_ij = ∇_in_j), to second order in every sector.
func TestGaussCodazzi(t *testing.T) {
	for name, fields := range sectors() {
		f, _ := testFrame(t, fields...)
		k := f.extrinsic()
		trace := f.trace(k, 0, 1).scalar()
		v := newTensor(1)
		v.set(trace.neg(), 0) // n_a = (−1, 0, 0, 0)
		f.acceleration().each(func(index []int, q quantity) { v.set(q.neg(), index...) })
		divergence := f.trace(f.grad(v), 0, 1).scalar()
		sum := f.trace(f.sliceRicci(), 0, 1).scalar().add(f.square(k)).sub(trace.mul(trace)).add(divergence).add(divergence)
		if rest := f.scalarCurvature().sub(sum); !rest.isZero() {
			t.Errorf("%s: the relation is violated by %+v", name, rest)
		}
	}
}

// The momentum constraint's identity D^jK_ij − D_iK = Ric_i0 (Wald 1984, eq. (10.2.28)), with
// D_kK_ij from the connection of the slices alone.
func TestCodazzi(t *testing.T) {
	for name, fields := range sectors() {
		f, _ := testFrame(t, fields...)
		k := f.extrinsic()
		trace := f.trace(k, 0, 1).scalar()
		for i := 1; i < 4; i++ {
			sum := f.e(i, trace).neg()
			for j := 1; j < 4; j++ {
				sum = sum.add(f.e(j, k.at(i, j)))
				for l := 1; l < 4; l++ { // −Γ^l_ji K_lj − Γ^l_jj K_il
					sum = sum.sub(f.connection.at(l, j, i).mul(k.at(l, j))).sub(f.connection.at(l, j, j).mul(k.at(i, l)))
				}
			}
			if rest := sum.sub(f.ricci().at(i, 0)); !rest.isZero() {
				t.Errorf("%s: component %d is violated by %+v", name, i, rest)
			}
		}
	}
}

func equalQuantities(t *testing.T, what string, got, want quantity) {
	t.Helper()
	if rest := got.sub(want); !rest.isZero() {
		t.Errorf("%s differs from its closed form by %+v", what, rest)
	}
}

// Closed forms for h_ij = a²e^{2ζ}δ_ij, N = 1 + A and N_i = ∂_iB of z alone, from K_ij = (h′_ij −
// D_iN_j − D_jN_i)/2N (Maldacena 2003, astro-ph/0210603, section 2):
// K = N⁻¹[3(H + ζ′ − N^z∂_zζ) − ∂_zN^z], R3 = −a⁻²e^{−2ζ}(4∂²ζ + 2(∂ζ)²).
func TestSlicesOfScalars(t *testing.T) {
	f, k := testFrame(t, "A", "B", "zeta")
	g, _ := k.Lookup("H")
	a, b, zeta := f.field(0), f.field(1), f.field(2)
	lapse := f.int(1).add(a)
	shift := f.exp(zeta.scale(k.Int(-2))).mul(f.dz(b)) // aN^z
	rate := background(k.Gen(g)).add(f.dt(zeta)).sub(shift.mul(f.dz(zeta))).scale(k.Int(3))
	equalQuantities(t, "K", f.trace(f.extrinsic(), 0, 1).scalar(), f.inv(lapse).mul(rate.sub(f.dz(shift))))
	second := f.dz(f.dz(zeta)).scale(k.Int(-4)).sub(f.dz(zeta).mul(f.dz(zeta)).scale(k.Int(2)))
	equalQuantities(t, "R3", f.trace(f.sliceRicci(), 0, 1).scalar(), f.exp(zeta.scale(k.Int(-2))).mul(second))
	equalQuantities(t, "acc", f.acceleration().at(3), f.e(3, a).mul(f.inv(lapse)))
	e := &evaluator{frame: f, cache: map[string]labelled{}}
	equalQuantities(t, "N", e.slice(&parse.TensorSlice{Name: "N"}).scalar(), lapse)
	equalQuantities(t, "Vn", e.slice(&parse.TensorSlice{Name: "Vn"}).scalar(), f.inv(lapse).mul(f.dt(a).sub(shift.mul(f.dz(a)))))
	equalQuantities(t, "K.ii", e.slice(&parse.TensorSlice{Name: "K", Letters: "ii"}).scalar(), e.slice(&parse.TensorSlice{Name: "K"}).scalar())
}

// For h_ij = a² diag(e^γ, e^{−γ}, 1) of z alone R3 = −(∂γ)²/2a² = −∂_kγ_ij∂_kγ_ij/4a², and
// K_ijK^ij = 3H² + γ′²/2.
func TestSlicesOfTensors(t *testing.T) {
	f, k := testFrame(t, "gamma")
	g, _ := k.Lookup("H")
	d, dot := f.dz(f.field(0)), f.dt(f.field(0))
	half := k.Int(1).Scale(1, 2)
	equalQuantities(t, "R3", f.trace(f.sliceRicci(), 0, 1).scalar(), d.mul(d).scale(half.Neg()))
	want := background(k.Gen(g).Pow(2).Scale(3, 1)).add(dot.mul(dot).scale(half))
	equalQuantities(t, "K.ij*K.ij", f.square(f.extrinsic()), want)
}

// firstOrderOf derives the background equations of a text without using them.
func firstOrderOf(t *testing.T, text string) (*parse.Model, []Equation) {
	t.Helper()
	m := load(t, text)
	x := &expansion{m: m, ring: newRing(m.K, m.Lapse, m.A), density: m.Lapse.Mul(m.A.Pow(3))}
	eqs, err := x.firstOrder()
	if err != nil {
		t.Fatal(err)
	}
	return m, eqs
}

func evaluate(t *testing.T, m *parse.Model, text string) field.Elem {
	t.Helper()
	v, err := m.Evaluate(diag.NewSource("expected", text))
	if err != nil {
		t.Fatalf("%s: %v", text, err)
	}
	return v
}

// The background equations L + L,N − 3H𝓕 = 0 and L − 𝓕′ − 3H𝓕 = 0 with 𝓕 = L,K + 2H L,S
// (Gleyzes, Langlois, Piazza, Vernizzi 2013, arXiv:1304.4840), as derived and before they are
// used, for L = F(t, N, K) + C(t, N) S with S = K_ijK^ij; N and S are not varied in 𝓕.
func TestBackgroundOfGeneralLagrangian(t *testing.T) {
	for _, clock := range []string{"cosmic", "conformal", "efolds"} {
		m, eqs := firstOrderOf(t, "clock "+clock+"\nbackground a\nfunctions F(t, N, K), C(t, N)\nlagrangian adm = F + C*K.ij*K.ij\n")
		rate := map[string]string{"cosmic": "H", "conformal": "H/a", "efolds": "H"}[clock]
		perTime := map[string]string{"cosmic": "1", "conformal": "a", "efolds": "1/H"}[clock]
		sub := "(" + rate + ")"
		density := "a^3*" + perTime
		flow := "(F,K + 2*" + sub + "*C)"
		l := "(F + 3*" + sub + "^2*C)"
		want := []string{
			density + "*(" + l + " + F,N + 3*" + sub + "^2*C,N - 3*" + sub + "*" + flow + ")",
			"3*" + density + "*(" + l + " - " + flow + "'/(" + perTime + ") - 3*" + sub + "*" + flow + ")",
		}
		for i, eq := range eqs {
			if left := eq.Value.Sub(evaluate(t, m, want[i])); !left.IsZero() {
				t.Errorf("%s: the equation of %s is %v, want %s", clock, eq.From, eq.Value, want[i])
			}
		}
	}
}

// The quadratic form of an adm action is invariant under changes of the coordinates on the
// slices: the Noether identities of ∂ᵢL and Vᵢ hold, for every quantity of the notation at once.
func TestNoetherOfADM(t *testing.T) {
	const text = `background a, b
functions F(t, N, K, R3, Vn)
lagrangian adm = F + b*K.ij*K.jl*K.li + N*R3.ij*K.ij + R3.ij*R3.ij + acc.i*acc.i*K + K.ij*acc.i*acc.j - Vn*sqrt(K)
`
	for _, header := range []string{"clock cosmic\n", "clock conformal\n", "clock efolds\n", "sector vector\n"} {
		ids, err := CheckGauge(load(t, header+text))
		if err != nil {
			t.Fatal(err)
		}
		if len(ids) != 1 || !ids[0].Holds() {
			t.Errorf("%s: identities %+v, want one that holds", header, ids)
		}
	}
}

// What the background equations are solved for, in order.
func TestLeadersOfADM(t *testing.T) {
	tests := []struct {
		name, text, why string
		leaders         []string
	}{
		{"effective theory", "background a, Lambda, c\nlagrangian adm = R3 + K.ij*K.ij - K^2 - Lambda + c/N^2\n",
			"Λ and c are functions of time that enter undifferentiated", []string{"Lambda", "c"}},
		{"time-dependent coupling", "background a, f, Lambda, c\nlagrangian adm = f*(R3 + K.ij*K.ij - K^2) - Lambda + c/N^2\n",
			"f enters the equation of ζ with its derivative and does not lead", []string{"Lambda", "c"}},
		{"last resort", "background a, b\nfunctions F(t, K, Vn, b)\nlagrangian adm = F,Vn*Vn + b/N\n",
			"b' stands in the equation of A, and nothing but b in that of ζ", []string{"H'", "b"}},
		{"functions of t", "background a\nfunctions L(t), c(t)\nlagrangian adm = R3 + K.ij*K.ij - K^2 - L + c/N^2\n",
			"functions L(t) are as functions of time", []string{"L", "c"}},
		{"general Lagrangian", "background a\nfunctions F(t, N, K)\nlagrangian adm = R3 + K.ij*K.ij - K^2 + F\n",
			"for any H(t) the equations fix F and its derivative by N", []string{"F", "F,N"}},
		{"one function", "constants b\nbackground a, V\nlagrangian adm = R3 + K.ij*K.ij - K^2 - V + b/N^4\n",
			"V alone depends on time by itself; the history follows", []string{"V", "H'"}},
		{"no time", "background a\nfunctions F(N, K)\nlagrangian adm = R3 + K.ij*K.ij - K^2 + F\n",
			"F of N and K alone: F,N, as F and F,K belong together along the background, and then the history", []string{"F,N", "H'"}},
		{"ghost condensate", "background a\nfunctions F(N)\nlagrangian adm = R3 + K.ij*K.ij - K^2 + F\n",
			"F and F,N are constants: de Sitter with F,N = 0 (Arkani-Hamed, Cheng, Luty, Mukohyama 2004, hep-th/0312099)", []string{"F", "F,N"}},
	}
	for _, tc := range tests {
		t.Run(tc.name, func(t *testing.T) {
			x, err := Expand(load(t, tc.text))
			if err != nil {
				t.Fatal(err)
			}
			for i, eq := range x.Equations {
				if got := x.Model.K.Raw(eq.Leader).String(); !eq.Solved || got != tc.leaders[i] {
					t.Errorf("the equation of %s is solved for %s (%v), want %s: %s", eq.From, got, eq.Solved, tc.leaders[i], tc.why)
				}
			}
		})
	}
}

// Refusals of adm Lagrangians that the notation accepts.
func TestRefusalsOfADM(t *testing.T) {
	tests := []struct {
		text string
		kind diag.Kind
	}{
		{"background a\nlagrangian adm = K^2 - K.ij*K.ij - R3 + 1/Vn\n", VanishingBackground},
		{"background a\nlagrangian adm = K^2 - K.ij*K.ij + sqrt(R3)\n", VanishingBackground},
		{"background a\ngiven H' = 0\nlagrangian adm = R3 + K.ij*K.ij - K^2 + 1\ngiven a' = 0\n", NoSolution},
	}
	for _, tc := range tests {
		_, err := Expand(load(t, tc.text))
		var list diag.List
		if !errors.As(err, &list) || list[0].Kind != tc.kind {
			t.Errorf("%q: %v, want a refusal of the kind %q", tc.text, err, tc.kind)
		}
	}
}
