package reduce

// The reduction against formulas from published papers. Each case writes the paper's result
// in the notation; the comparison is exact, in the model's own field.

import (
	"os"
	"path/filepath"
	"testing"

	"remnant/expr/field"
	"remnant/parse"
	"remnant/parse/diag"
)

func load(t testing.TB, name string) *parse.Model {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	return model(t, name, string(text))
}

func model(t testing.TB, name, text string) *parse.Model {
	t.Helper()
	m, err := parse.Load(diag.NewSource(name, text), nil)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func mustReduce(t testing.TB, m *parse.Model) *Result {
	t.Helper()
	r, err := Reduce(m)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func eval(t testing.TB, m *parse.Model, text string) field.Elem {
	t.Helper()
	v, err := m.Evaluate(diag.NewSource("expected", text))
	if err != nil {
		t.Fatalf("%s: %v", text, err)
	}
	return v
}

func same(t testing.TB, what string, got *field.Elem, want field.Elem) {
	t.Helper()
	if got == nil {
		t.Errorf("%s: there is none, want %v", what, want)
	} else if !got.Equal(want) {
		t.Errorf("%s: got %v, want %v", what, *got, want)
	}
}

func TestPublishedSecondOrderActions(t *testing.T) {
	tests := []struct {
		name, model, why                 string
		variable                         string
		kinetic, gradient, mass, soundSq string
		nonzero                          []string
	}{
		{
			name: "two auxiliary fields", model: "plover.act",
			why:      "S = ∫a³ε[ζ'² − (∂ζ)²/a²], Maldacena 2003, astro-ph/0210603, eq. (2.12) with ε = φ̇²/2H², M = 1",
			variable: "zeta", kinetic: "2*a^3*eps", gradient: "2*a*eps", mass: "0", soundSq: "1",
			nonzero: []string{"H"},
		}, {
			name: "canonical scalar", model: "sandpiper.act",
			why:      "S = ½∫[a³(φ̇²/ρ̇²)ζ̇² − a(φ̇²/ρ̇²)(∂ζ)²] with ρ̇ = H, Maldacena 2003, astro-ph/0210603, eq. (2.12)",
			variable: "zeta", kinetic: "a^3*phi'^2/H^2", gradient: "a*phi'^2/H^2", mass: "0", soundSq: "1",
			nonzero: []string{"H"},
		}, {
			name: "general kinetic function", model: "heron.act",
			why:      "z² = a²(ρ+p)/(c_s²H²) with c_s² = P,X/(P,X + 2X P,XX) and Σ = X P,X + 2X² P,XX, Garriga, Mukhanov 1999, hep-th/9904176",
			variable: "zeta", kinetic: "2*a^3*(phi'^2*P,X/2 + phi'^4*P,X,X/2)/H^2", gradient: "a*phi'^2*P,X/H^2",
			mass: "0", soundSq: "P,X/(P,X + phi'^2*P,X,X)",
			nonzero: []string{"H"},
		}, {
			name: "general second-order scalar–tensor theory", model: "dunlin.act",
			why:      "G_S = ΣG_T²/Θ² + 3G_T, F_S = (1/a)(aG_T²/Θ)' − F_T in S = ∫a³[G_S ζ'² − F_S(∂ζ)²/a²], Kobayashi, Yamaguchi, Yokoyama 2011, arXiv:1105.5723",
			variable: "zeta", kinetic: "2*a^3*(Sigma*GT^2/Theta^2 + 3*GT)", gradient: "2*a*((a*GT^2/Theta)'/a - FT)",
			mass: "0", soundSq: "((a*GT^2/Theta)'/a - FT)/(Sigma*GT^2/Theta^2 + 3*GT)",
			nonzero: []string{"Theta"},
		}, {
			name: "degenerate higher-order theory", model: "curlew.act",
			why:      "S = ∫a³(M²/2)[A ζ̃'² + B(∂ζ̃)²/a²], A and B of Langlois, Mancarella, Noui, Vernizzi 2017, arXiv:1703.03797, section 4, from memory",
			variable: "zeta_1",
			kinetic:  "a^3*M^2*(alphaK + 6*alphaB^2 - 6*(a^3*H*M^2*alphaB*beta1)'/(a^3*H^2*M^2))/(1 + alphaB - beta1'/H)^2",
			gradient: "-a*M^2*(2*(1 + alphaT) - 2*(a*M^2*(1 + alphaH + beta1*(1 + alphaT))/(H*(1 + alphaB) - beta1'))'/(a*M^2))",
			mass:     "0",
			nonzero:  []string{"M", "H*(1 + alphaB) - beta1'"},
		},
	}
	for _, tc := range tests {
		t.Run(tc.name, func(t *testing.T) {
			m := load(t, tc.model)
			r := mustReduce(t, m)
			if r.DegreesOfFreedom != 1 || r.Variable != tc.variable {
				t.Fatalf("%d degrees of freedom in %q, want 1 in %q", r.DegreesOfFreedom, r.Variable, tc.variable)
			}
			same(t, "kinetic", r.Single.Kinetic, eval(t, m, tc.kinetic))
			same(t, "gradient", r.Single.Gradient, eval(t, m, tc.gradient))
			same(t, "mass", r.Single.Mass, eval(t, m, tc.mass))
			if tc.soundSq != "" {
				same(t, "sound speed squared", r.Single.SoundSpeed2, eval(t, m, tc.soundSq))
			}
			if len(r.Assumptions) != len(tc.nonzero) {
				t.Errorf("assumptions %v, want %v", r.Assumptions, tc.nonzero)
			}
			for i, a := range r.Assumptions {
				if want := eval(t, m, tc.nonzero[i]); !a.Factor.Equal(want) {
					t.Errorf("assumption %v, want %v", a.Factor, want)
				}
			}
		})
	}
}

// The solutions of Plover's constraints: α = ζ'/H from the ψ equation, which is the momentum
// constraint (Maldacena 2003, astro-ph/0210603, eq. (2.11)), and ∂²ψ = a²εζ' − ∂²ζ/H.
func TestPloverConstraints(t *testing.T) {
	m := load(t, "plover.act")
	r := mustReduce(t, m)
	if len(r.Steps) != 1 || r.Steps[0].Kind != Multiplier {
		t.Fatalf("steps %+v, want one multiplier", r.Steps)
	}
	alpha, psi := r.Steps[0].Solutions[0], r.Steps[0].Solutions[1]
	if alpha.Name != "alpha" || alpha.Equation != "psi" || psi.Name != "psi" || psi.Equation != "alpha" {
		t.Fatalf("solutions %v and %v, want alpha from psi and psi from alpha", alpha, psi)
	}
	check := func(s Solution, want ...string) {
		t.Helper()
		if len(s.Sum) != 1 || s.Sum[0].Name != "zeta" || s.Sum[0].Coef.Order() != len(want)-1 {
			t.Fatalf("%s = %v", s.Name, s.Sum)
		}
		for i, w := range want {
			c := s.Sum[0].Coef.Coef(i)
			same(t, s.Name, &c, eval(t, m, w))
		}
	}
	check(alpha, "0", "1/H")
	check(psi, "-1/H", "-a^2*eps/k^2") // −k²ψ = a²εζ' + k²ζ/H
}
