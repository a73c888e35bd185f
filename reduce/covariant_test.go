package reduce

// Covariant actions against formulas from published papers, exact, modulo the background
// equations.

import (
	"regexp"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
	"remnant/rules"
)

// theory says what the functions of L = K − G₃□φ + G₄R + … are in a model: by name and
// derivatives, such as "G4,X", an expression of the model; a name alone stands for itself
// with all its derivatives, and what is not listed is zero.
type theory map[string]string

var functionToken = regexp.MustCompile(`\b(K|G3|G4|G5)((?:,(?:phi|X))*)`)

// in writes a formula for the theory, with X = φ'²/2 on the cosmic clock.
func (th theory) in(formula string) string {
	return functionToken.ReplaceAllStringFunc(formula, func(token string) string {
		if value, ok := th[token]; ok {
			return "(" + value + ")"
		}
		name, derivatives, _ := strings.Cut(token, ",")
		if value := th[name]; value != "" && identifier.MatchString(value) {
			return "(" + value + "," + derivatives + ")"
		}
		return "0"
	})
}

var identifier = regexp.MustCompile(`^[A-Za-z][A-Za-z0-9]*$`)

// The quantities of Kobayashi, Yamaguchi, Yokoyama 2011, arXiv:1105.5723, with their
// numbers: background equations (3.3)–(3.5) and (3.7)–(3.9) with (3.2) and (3.6), tensors (4.4), (4.5),
// scalars (4.31)–(4.34).
const (
	kyyEnergy = `2*X*K,X - K
		+ 6*X*phi'*H*G3,X - 2*X*G3,phi
		- 6*H^2*G4 + 24*H^2*X*(G4,X + X*G4,X,X) - 12*H*X*phi'*G4,phi,X - 6*H*phi'*G4,phi
		+ 2*H^3*X*phi'*(5*G5,X + 2*X*G5,X,X) - 6*H^2*X*(3*G5,phi + 2*X*G5,phi,X)`
	kyyPressure = `K - 2*X*(G3,phi + phi''*G3,X)
		+ 2*(3*H^2 + 2*H')*G4 - 12*H^2*X*G4,X - 4*H*phi'*phi''*G4,X - 8*H'*X*G4,X - 8*H*X*phi'*phi''*G4,X,X
		+ 2*(phi'' + 2*H*phi')*G4,phi + 4*X*G4,phi,phi + 4*X*(phi'' - 2*H*phi')*G4,phi,X
		- 2*X*(2*H^3*phi' + 2*H*H'*phi' + 3*H^2*phi'')*G5,X - 4*H^2*X^2*phi''*G5,X,X
		+ 4*H*X*(phi'*phi'' - H*X)*G5,phi,X + 2*(2*(H'*X + H*phi'*phi'') + 3*H^2*X)*G5,phi + 4*H*X*phi'*G5,phi,phi`
	kyyFT = `2*(G4 - X*(phi''*G5,X + G5,phi))`
	kyyGT = `2*(G4 - 2*X*G4,X - X*(H*phi'*G5,X - G5,phi))`
	kyySigma = `X*K,X + 2*X^2*K,X,X + 12*H*phi'*X*G3,X + 6*H*phi'*X^2*G3,X,X - 2*X*G3,phi - 2*X^2*G3,phi,X
		- 6*H^2*G4 + 6*(H^2*(7*X*G4,X + 16*X^2*G4,X,X + 4*X^3*G4,X,X,X)
		- H*phi'*(G4,phi + 5*X*G4,phi,X + 2*X^2*G4,phi,X,X))
		+ 30*H^3*phi'*X*G5,X + 26*H^3*phi'*X^2*G5,X,X + 4*H^3*phi'*X^3*G5,X,X,X
		- 6*H^2*X*(6*G5,phi + 9*X*G5,phi,X + 2*X^2*G5,phi,X,X)`
	kyyTheta = `- phi'*X*G3,X + 2*H*G4 - 8*H*X*G4,X - 8*H*X^2*G4,X,X + phi'*G4,phi + 2*X*phi'*G4,phi,X
		- H^2*phi'*(5*X*G5,X + 2*X^2*G5,X,X) + 2*H*X*(3*G5,phi + 2*X*G5,phi,X)`
)

// at evaluates a formula of the theory in the model's field.
func (th theory) at(t testing.TB, m *parse.Model, formula string) field.Elem {
	t.Helper()
	formula = strings.ReplaceAll(strings.Join(strings.Fields(formula), " "), " X", " (phi'^2/2)")
	return eval(t, m, kineticToken.ReplaceAllString(th.in(formula), "${1}(phi'^2/2)"))
}

// kineticToken is X where it is no derivative.
var kineticToken = regexp.MustCompile(`(^|[^,A-Za-z])X\b`)

var secondOrderTheories = []struct {
	model string
	theory
}{
	{"lapwing.act", theory{"K": "phi'^2/2 - V", "K,X": "1", "K,phi": "-V,phi", "G4": "M^2/2"}},
	{"kestrel.act", theory{"K": "P", "G4": "M^2/2"}},
	{"redshank.act", theory{"K": "P", "G3": "G3", "G4": "M^2/2"}},
	{"godwit.act", theory{"G4": "G4"}},
	{"turnstone.act", theory{"K": "P", "G4": "M^2/2", "G5": "G5"}},
	{"knot.act", theory{"K": "G2", "G3": "G3", "G4": "G4", "G5": "G5"}},
}

// The background equations off shell: N̄⁻¹ the lapse's is −a³ Σℰᵢ, and a third of that of ζ is
// a³ Σ𝒫ᵢ.
func TestSecondOrderBackground(t *testing.T) {
	for _, tc := range secondOrderTheories {
		t.Run(tc.model, func(t *testing.T) {
			m := load(t, tc.model)
			energy := tc.at(t, m, "-a^3*("+kyyEnergy+")")
			pressure := tc.at(t, m, "3*a^3*("+kyyPressure+")")
			x, err := rules.Expand(m)
			if err != nil {
				t.Fatal(err)
			}
			same(t, "equation of A", &x.Equations[0].Value, energy)
			same(t, "equation of ζ", &x.Equations[1].Value, pressure)
		})
	}
}

// S = ∫a³[G_S ζ'² − F_S(∂ζ)²/a²] with G_S = ΣG_T²/Θ² + 3G_T and F_S = (1/a)(aG_T²/Θ)' − F_T.
func TestSecondOrderScalars(t *testing.T) {
	for _, tc := range secondOrderTheories {
		t.Run(tc.model, func(t *testing.T) {
			m := load(t, tc.model)
			r := mustReduce(t, m)
			if r.DegreesOfFreedom != 1 || r.Variable != "zeta" {
				t.Fatalf("%d degrees of freedom in %q, want 1 in ζ", r.DegreesOfFreedom, r.Variable)
			}
			gt, ft := tc.at(t, m, kyyGT), tc.at(t, m, kyyFT)
			sigma, theta := tc.at(t, m, kyySigma), tc.at(t, m, kyyTheta)
			gs := sigma.Mul(gt.Pow(2)).Div(theta.Pow(2)).Add(gt.Scale(3, 1))
			fs := m.A.Mul(gt.Pow(2)).Div(theta).D().Div(m.A).Sub(ft)
			same(t, "kinetic", r.Single.Kinetic, gs.Mul(m.A.Pow(3)).Scale(2, 1))
			same(t, "gradient", r.Single.Gradient, fs.Mul(m.A).Scale(2, 1))
			same(t, "mass", r.Single.Mass, field.Elem{})
			same(t, "sound speed squared", r.Single.SoundSpeed2, fs.Div(gs))
		})
	}
}

// S = ⅛∫a³[G_T γ'_ij² − F_T(∂γ_ij)²/a²] for tensors, with two polarisations; vectors do not
// propagate. The same paper, section 4.1. For the canonical field it is a³M²/8.
func TestSecondOrderTensorsAndVectors(t *testing.T) {
	for _, tc := range secondOrderTheories {
		t.Run(tc.model, func(t *testing.T) {
			m := load(t, tc.model)
			r := mustReduce(t, m.Variant(m.Gauge, parse.TensorSector))
			if r.DegreesOfFreedom != 2 {
				t.Fatalf("%d degrees of freedom, want two polarisations", r.DegreesOfFreedom)
			}
			same(t, "kinetic", r.Single.Kinetic, tc.at(t, m, "a^3/4*"+kyyGT))
			same(t, "gradient", r.Single.Gradient, tc.at(t, m, "a/4*"+kyyFT))
			same(t, "mass", r.Single.Mass, field.Elem{})
			v := mustReduce(t, m.Variant(m.Gauge, parse.VectorSector))
			if v.DegreesOfFreedom != 0 || len(v.Remaining.Names) != 0 {
				t.Errorf("vectors: %d degrees of freedom in %v, want none", v.DegreesOfFreedom, v.Remaining.Names)
			}
		})
	}
}

// z² = a²(ρ + p)/(c_s²H²) with c_s² = P,X/(P,X + 2X P,XX), Garriga, Mukhanov 1999,
// hep-th/9904176, for S = ½∫z²[ζ'² − c_s²(∂ζ)²] in conformal time.
func TestGeneralKineticFunction(t *testing.T) {
	m := load(t, "kestrel.act")
	s := mustReduce(t, m).Single
	same(t, "sound speed squared", s.SoundSpeed2, eval(t, m, "P,X/(P,X + phi'^2*P,X,X)"))
	same(t, "z²", s.ZSquared, eval(t, m, "a^2*phi'^2*(P,X + phi'^2*P,X,X)/H^2"))
}

// operator is 𝒟 = Σ (−D)ⁿqₙDⁿ of the one field that remains.
func (s *Single) operator() oper.Oper {
	var sum oper.Oper
	for n, q := range s.Q {
		term := oper.Mono(q, n)
		for range n {
			term = term.D().Neg()
		}
		sum = sum.Add(term)
	}
	return sum
}

// substituted is e𝒟e, the operator of v where u = e·v.
func substituted(d oper.Oper, e field.Elem) oper.Oper { return oper.New(e).Mul(d).Mul(oper.New(e)) }

// In the flat gauge ζ = −Hδφ/φ', and in every gauge ζ − Hδφ/φ' is the ζ of the unitary one
// (Maldacena 2003, astro-ph/0210603, section 2; Weinberg 2008, Cosmology, section 5.4): one
// operator in all three gauges.
func TestGaugesAgree(t *testing.T) {
	for _, name := range []string{"lapwing.act", "kestrel.act", "redshank.act", "ruff.act"} {
		t.Run(name, func(t *testing.T) {
			m := load(t, name)
			unitary := mustReduce(t, m)
			want := unitary.Single.operator()

			flat := m.Variant(parse.Flat, parse.ScalarSector)
			flat.Keep = &parse.Keep{Name: "dphi", Field: fieldIndex(t, flat, "dphi")}
			r := mustReduce(t, flat)
			if r.Variable != "dphi" {
				t.Fatalf("flat gauge: %q remains, want δφ", r.Variable)
			}
			if got := substituted(r.Single.operator(), eval(t, m, "-phi'/H")); !got.Equal(want) {
				t.Errorf("flat gauge: %v, want %v", got, want)
			}

			newtonian := m.Variant(parse.Newtonian, parse.ScalarSector)
			newtonian.Keep = &parse.Keep{Name: "u", Field: -1, Definition: []parse.LinearTerm{
				{Coef: m.K.Int(1), U: parse.Factor{Field: fieldIndex(t, newtonian, "zeta")}},
				{Coef: eval(t, m, "-H/phi'"), U: parse.Factor{Field: fieldIndex(t, newtonian, "dphi")}},
			}}
			r = mustReduce(t, newtonian)
			if r.Variable != "u" {
				t.Fatalf("newtonian gauge: %q remains, want ζ − Hδφ/φ'", r.Variable)
			}
			if got := r.Single.operator(); !got.Equal(want) {
				t.Errorf("newtonian gauge: %v, want %v", got, want)
			}
		})
	}
}

func fieldIndex(t testing.TB, m *parse.Model, name string) int {
	t.Helper()
	for i, f := range m.Fields {
		if f.Name == name {
			return i
		}
	}
	t.Fatalf("no field %s", name)
	return -1
}

// M²R/2 − Λ + αR² + βWeyl² has eight degrees of freedom: the graviton's two, the scalar of
// R² and the five of a massive spin two; by sectors 2 scalar, 2 vector and 4 tensor ones
// (Stelle 1977, Phys. Rev. D 16, 953).
func TestSquaresOfCurvature(t *testing.T) {
	m := load(t, "stilt.act")
	total := 0
	for sector, want := range map[parse.Sector]int{parse.ScalarSector: 2, parse.VectorSector: 2, parse.TensorSector: 4} {
		r := mustReduce(t, m.Variant(m.Gauge, sector))
		if r.DegreesOfFreedom != want {
			t.Errorf("%v sector: %d degrees of freedom, want %d", sector, r.DegreesOfFreedom, want)
		}
		total += r.DegreesOfFreedom
	}
	if total != 8 {
		t.Errorf("%d degrees of freedom in all, want 8", total)
	}
}
