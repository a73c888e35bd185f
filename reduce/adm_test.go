package reduce

// Actions in the adm form against published formulas and against the other two forms.

import (
	"fmt"
	"hash/fnv"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/poly"
	"remnant/parse"
	"remnant/parse/diag"
)

// pointOf gives each generator of a model a value that its name and its derivatives fix, so
// that models can be compared.
func pointOf(m *parse.Model) func(field.Gen) uint64 {
	return func(g field.Gen) uint64 {
		in := m.K.Info(g)
		h := fnv.New64a()
		fmt.Fprintln(h, in.Name, in.Order, in.Index)
		return h.Sum64() >> 4
	}
}

// sameOperators compares the normal forms of what remains of two models, each at its point.
func sameOperators(t *testing.T, a, b *Result, atA, atB func(field.Gen) uint64) {
	t.Helper()
	if len(a.Single.Q) != len(b.Single.Q) {
		t.Fatalf("normal forms of %d and %d coefficients", len(a.Single.Q), len(b.Single.Q))
	}
	for n := range a.Single.Q {
		v, okA := a.Single.Q[n].EvalMod(poly.Mersenne61, atA)
		w, okB := b.Single.Q[n].EvalMod(poly.Mersenne61, atB)
		if !okA || !okB || v != w {
			t.Errorf("q_%d = %v and %v", n, a.Single.Q[n], b.Single.Q[n])
		}
	}
}

// The effective theory of inflation in the notation of Langlois, Mancarella, Noui, Vernizzi
// 2017, arXiv:1703.03797, section 2, and of Gleyzes, Langlois, Vernizzi 2014, arXiv:1411.3712,
// from memory and with α_B derived again from the momentum constraint: with
// 𝓜² = M²f + 2m₄², 2𝓜²Hα_B = M²f′ − m₃³, 𝓜²H²α_K = 2c + 4m₂⁴, 𝓜²(1 + α_T) = M²f and
// 𝓜²(1 + α_H) = M²f + 2n₄²,
//
//	S = ∫ a³ (𝓜²/2) (α_K + 6α_B²)/(1 + α_B)² ζ′² + a [𝓜²(1 + α_T) − (a𝓜²(1 + α_H)/(H(1 + α_B)))′/a] (∂ζ)².
func TestEffectiveTheory(t *testing.T) {
	r := mustReduce(t, load(t, "shearwater.act"))
	m := r.Model
	if r.DegreesOfFreedom != 1 || r.Variable != "zeta" {
		t.Fatalf("%d degrees of freedom in %q, want 1 in ζ", r.DegreesOfFreedom, r.Variable)
	}
	const mass, braiding, kinetic = "(M^2*f + 2*m4^2)", "(M^2*f' - m3^3)", "(2*c + 4*m2^4)"
	constraint := "(2*" + mass + "*H + " + braiding + ")"
	same(t, "kinetic", r.Single.Kinetic, eval(t, m, "a^3*(4*"+mass+"*"+mass+"*"+kinetic+" + 6*"+mass+"*"+braiding+"^2)/"+constraint+"^2"))
	same(t, "gradient", r.Single.Gradient, eval(t, m, "-2*a*(M^2*f - (2*a*"+mass+"*(M^2*f + 2*n4^2)/"+constraint+")'/a)"))
	same(t, "mass", r.Single.Mass, eval(t, m, "0"))
}

// The tensors of the same theory: α_T = −2m₄²/𝓜², arXiv:1411.3712; vectors do not propagate.
func TestEffectiveTheoryInOtherSectors(t *testing.T) {
	text := strings.Replace(load(t, "shearwater.act").Source.Text, "keep zeta", "sector tensor", 1)
	r := mustReduce(t, model(t, "shearwater.act", text))
	if r.DegreesOfFreedom != 2 {
		t.Errorf("%d degrees of freedom of the tensors, want 2", r.DegreesOfFreedom)
	}
	same(t, "kinetic", r.Single.Kinetic, eval(t, r.Model, "a^3*(M^2*f + 2*m4^2)/4"))
	same(t, "gradient", r.Single.Gradient, eval(t, r.Model, "a*M^2*f/4"))
	r = mustReduce(t, model(t, "shearwater.act", strings.Replace(text, "tensor", "vector", 1)))
	if r.DegreesOfFreedom != 0 {
		t.Errorf("%d degrees of freedom of the vectors, want none", r.DegreesOfFreedom)
	}
}

// With m₂ alone c_s⁻² = 1 − 2m₂⁴/(M²H′) (Cheung et al. 2008, arXiv:0709.0293, eq. (29)).
func TestSpeedOfSoundInEffectiveTheory(t *testing.T) {
	r := mustReduce(t, model(t, "test.act", `constants M > 0
background a, Lambda, c, m2
lagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2) - Lambda + c/N^2 + m2^4/2*(1 - 1/N^2)^2
`))
	inverse := r.Single.SoundSpeed2.Inv()
	same(t, "1/c_s²", &inverse, eval(t, r.Model, "1 - 2*m2^4/(M^2*H')"))
	same(t, "gradient", r.Single.Gradient, eval(t, r.Model, "-2*M^2*a*H'/H^2"))
}

// L = A₂(t, N) + A₃(t, N)K + A₄(t, N)(K² − K_ijK^ij) + B₄(t, N)R3 (Gleyzes, Langlois, Piazza,
// Vernizzi 2015, arXiv:1404.6495): the formulas above with 𝓜² = −2A₄, 𝓜²(1 + α_T) = 2B₄,
// 𝓜²(1 + α_H) = 2(B₄ + B₄,N), 2𝓜²Hα_B = L,KN + 2H L,SN = A₃,N + 4H A₄,N and
// 𝓜²H²α_K = 2L,N + L,NN. What A₄ depends on, L,N, holds the curvature at K = 3H.
func TestBeyondHorndeski(t *testing.T) {
	for _, clock := range []string{"cosmic", "conformal", "efolds"} {
		r := mustReduce(t, model(t, "test.act", "clock "+clock+`
background a
functions A2(t, N), A3(t, N), A4(t, N), B4(t, N)
lagrangian adm = A2 + A3*K + A4*(K^2 - K.ij*K.ij) + B4*R3
keep zeta
`))
		rate := map[string]string{"cosmic": "H", "conformal": "(H/a)", "efolds": "H"}[clock]
		lapse := map[string]string{"cosmic": "1", "conformal": "a", "efolds": "(1/H)"}[clock]
		braiding := "(A3,N + 4*" + rate + "*A4,N)"
		kinetic := "(2*(A2,N + 3*" + rate + "*A3,N + 6*" + rate + "^2*A4,N) + A2,N,N + 3*" + rate + "*A3,N,N + 6*" + rate + "^2*A4,N,N)"
		constraint := "(" + braiding + " - 4*A4*" + rate + ")"
		same(t, clock+": kinetic", r.Single.Kinetic, eval(t, r.Model, "a^3/"+lapse+"*(16*A4^2*"+kinetic+" - 12*A4*"+braiding+"^2)/"+constraint+"^2"))
		same(t, clock+": gradient", r.Single.Gradient, eval(t, r.Model, "-2*a*"+lapse+"*(2*B4 + (8*a*A4*(B4 + B4,N)/"+constraint+")'/(a*"+lapse+"))"))
	}
}

// The general L(N, K, S, R3) of Gleyzes, Langlois, Piazza, Vernizzi 2013, arXiv:1304.4840,
// where spatial derivatives of fourth order remain: with 𝓐 = L,KK, 𝓑 = L,KN + 2H L,SN,
// 𝓒 = L,KR and x = ζ′ − HδN, for which δK = 3x − ∂²ψ/a² and δK_ijδK_ij = 3x² − 2x∂²ψ/a² + (∂²ψ)²/a⁴,
//
//	L₂ = a³[½(2L,N + L,NN)δN² + 𝓑δKδN + ½𝓐δK² + L,S δK_ijδK_ij + (L,R + L,NR)δNδR + 𝓒δKδR]
//	     + 2aL,R(∂ζ)², δR = −4∂²ζ/a²,
//
// written in the quadratic form with a function of time for each coefficient.
func TestGeneralLagrangian(t *testing.T) {
	tests := []struct {
		name, declared, action string
		coefficients           map[string]string
	}{
		{"all depends on time", "functions F(t, N, K), C(t, N), E(t, N, K)\n", "F + C*K.ij*K.ij + E*R3", map[string]string{
			"LN":  "2*(F,N + 3*H^2*C,N) + F,N,N + 3*H^2*C,N,N",
			"LKN": "F,N,K + 2*H*C,N", "LKK": "F,K,K", "LS": "C", "LR": "E", "LRN": "E,N", "LKR": "E,K",
		}},
		{"nothing depends on time by itself", "constants M > 0\nfunctions F(N, K)\n", "F + M^2/2*(K.ij*K.ij + R3)", map[string]string{
			"LN":  "2*F,N + F,N,N",
			"LKN": "F,N,K", "LKK": "F,K,K", "LS": "M^2/2", "LR": "M^2/2", "LRN": "0", "LKR": "0",
		}},
	}
	byHand := mustReduce(t, model(t, "test.act", `background a, LN, LKN, LKK, LS, LR, LRN, LKR
fields alpha, psi, zeta
let x = zeta' - H*alpha
let dK = 3*x - psi,ii/a^2
lagrangian quadratic =
    a^3*(LN*alpha^2/2 + LKN*dK*alpha + LKK/2*dK^2 + LS*(3*x^2 - 2*x*psi,ii/a^2 + psi,ij*psi,ij/a^4))
  - 4*a*((LR + LRN)*alpha + LKR*dK)*zeta,ii + 2*a*LR*zeta,i*zeta,i
keep zeta
`))
	for _, tc := range tests {
		t.Run(tc.name, func(t *testing.T) {
			full := mustReduce(t, model(t, "test.act", "background a\n"+tc.declared+"lagrangian adm = "+tc.action+"\nkeep zeta\n"))
			if full.DegreesOfFreedom != 1 {
				t.Errorf("%d degrees of freedom, want 1", full.DegreesOfFreedom)
			}
			m := full.Model
			sameOperators(t, full, byHand, pointOf(m), func(g field.Gen) uint64 {
				in := byHand.Model.K.Info(g)
				text, ok := tc.coefficients[in.Name]
				if !ok {
					text = in.Name // a, H and k
				}
				v, ok := eval(t, m, text).Dn(in.Order).EvalMod(poly.Mersenne61, pointOf(m))
				if !ok {
					t.Fatal("the point is singular")
				}
				return v
			})
		})
	}
}

// F(t, N, K) = f(t)N²K³, once as a free function and once written out: the jets of F along the
// background are those of the product at N = 1, K = 3H.
func TestFunctionOfLapseAndCurvature(t *testing.T) {
	const rest = "lagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2) - V + c/N^2 + "
	const header = "constants M > 0\nbackground a, V, c"
	free := mustReduce(t, model(t, "test.act", header+"\nfunctions F(t, N, K)\n"+rest+"F\nkeep zeta\n"))
	product := mustReduce(t, model(t, "test.act", header+", f\n"+rest+"f*N^2*K^3\nkeep zeta\n"))
	m := product.Model
	f, k := eval(t, m, "f"), eval(t, m, "3*H")
	sameOperators(t, product, free, pointOf(m), func(g field.Gen) uint64 {
		in := free.Model.K.Info(g)
		if in.Kind != field.FreeFunction {
			return pointOf(free.Model)(g)
		}
		e := f.Dn(in.Index[0])
		for n := range in.Index[1] {
			e = e.Scale(int64(2-n), 1)
		}
		for n := range in.Index[2] {
			e = e.Scale(int64(3-n), 1)
		}
		v, ok := e.Mul(k.Pow(3-min(in.Index[2], 3))).EvalMod(poly.Mersenne61, pointOf(m))
		if !ok {
			t.Fatal("the point is singular")
		}
		return v
	})
}

// The same with a definition, F(t, N, K) = tN²K³ + √N, on a point: numbers use the definition, its
// derivatives by N and K taken before N = 1 and K = 3H are put in.
func TestDefinedFunctionOfLapseAndCurvature(t *testing.T) {
	for _, clock := range []string{"cosmic", "conformal", "efolds"} {
		header := "clock " + clock + "\nconstants M > 0\nbackground a, V, c\n"
		const action = "lagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2) - V + c/N^2 + "
		defined := mustReduce(t, model(t, "test.act", header+"functions F(t, N, K) = t*N^2*K^3 + sqrt(N)\n"+action+"F\nkeep zeta\n"))
		written := mustReduce(t, model(t, "test.act", header+action+"t*N^2*K^3 + sqrt(N)\nkeep zeta\n"))
		at := diag.NewSource("point", "a = 2; H = 1/5; H' = 3/7; H'' = 1/11; H''' = 1/2; t = 3; M = 2; k = 5")
		got, err := defined.At(at)
		if err != nil {
			t.Fatal(err)
		}
		want, err := written.At(at)
		if err != nil {
			t.Fatal(err)
		}
		for n := range want.Single.Q {
			if g, w := got.Single.Q[n].String(), want.Single.Q[n].String(); g != w {
				t.Errorf("%s: q_%d = %s at the point, want %s", clock, n, g, w)
			}
		}
	}
}

// General relativity with a canonical field: in the unitary gauge X = φ′²/(2N̄²N²), and
// R = R3 + K_ijK^ij − K² up to a total derivative, in every sector and on every clock.
func TestCanonicalInBothForms(t *testing.T) {
	for _, clock := range []string{"cosmic", "conformal", "efolds"} {
		for _, sector := range []string{"scalar", "tensor"} {
			header := "clock " + clock + "\nconstants M > 0\nbackground a, phi\nfunctions V(phi)\nsector " + sector + "\n"
			lapse := map[string]string{"cosmic": "1", "conformal": "a^2", "efolds": "H^(-2)"}[clock]
			adm := mustReduce(t, model(t, "test.act", header+"lagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2) + phi'^2/(2*"+lapse+"*N^2) - V\n"))
			covariant := mustReduce(t, model(t, "test.act", header+"gauge unitary\nlagrangian covariant = M^2*R/2 + X - V\n"))
			sameOperators(t, adm, covariant, pointOf(adm.Model), pointOf(covariant.Model))
		}
	}
}

// The degenerate theory as in TestPublishedSecondOrderActions, but from its Lagrangian in N, K
// and R3, where 𝓜 is constant and the total α_K is that of the operator and 2c/(M²H²), and its
// neighbour without the degeneracy (Langlois, Mancarella, Noui, Vernizzi 2017,
// arXiv:1703.03797, sections 2 and 4).
func TestVelocityOfTheLapse(t *testing.T) {
	r := mustReduce(t, load(t, "petrel.act"))
	m := r.Model
	if r.DegreesOfFreedom != 1 {
		t.Fatalf("%d degrees of freedom, want 1", r.DegreesOfFreedom)
	}
	same(t, "kinetic", r.Single.Kinetic, eval(t, m,
		"a^3*M^2*(alphaK + 2*c/(M^2*H^2) + 6*alphaB^2 - 6*(a^3*H*alphaB*beta1)'/(a^3*H^2))/(1 + alphaB - beta1'/H)^2"))
	same(t, "gradient", r.Single.Gradient, eval(t, m,
		"-a*M^2*(2*(1 + alphaT) - 2*(a*(1 + alphaH + beta1*(1 + alphaT))/(H*(1 + alphaB) - beta1'))'/a)"))
	same(t, "mass", r.Single.Mass, eval(t, m, "0"))
	if r := mustReduce(t, load(t, "fulmar.act")); r.DegreesOfFreedom != 2 {
		t.Errorf("%d degrees of freedom without the degeneracy, want 2", r.DegreesOfFreedom)
	}
}

// General relativity without matter is invariant under a change of time, whatever the form.
func TestGaugeDirectionOfADM(t *testing.T) {
	d := refusal(t, "constants M > 0\nbackground a\nlagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2)\n")
	if d.Kind != GaugeDirection || !strings.Contains(d.Hint, "an operator in N, K or R3 is needed") {
		t.Errorf("%v: %s; %s", d.Kind, d.Summary, d.Hint)
	}
}
