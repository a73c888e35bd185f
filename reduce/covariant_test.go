package reduce

// Covariant actions against formulas from published papers, exact, modulo the background
// equations.

import (
	"os"
	"path/filepath"
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

// The quantities of Kobayashi, Yamaguchi, Yokoyama 2011, arXiv:1105.5723: ℰ and 𝒫 of the
// background equations (section 3), ℱ_T and 𝒢_T of tensors, Σ and Θ of scalars (section 4).
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
	kyyFT    = `2*(G4 - X*(phi''*G5,X + G5,phi))`
	kyyGT    = `2*(G4 - 2*X*G4,X - X*(H*phi'*G5,X - G5,phi))`
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
	formula = th.in(strings.Join(strings.Fields(formula), " "))
	return eval(t, m, onClock(m, kineticToken.ReplaceAllString(formula, "${1}(phi'^2/2)")))
}

// kineticToken is X where it is no derivative.
var kineticToken = regexp.MustCompile(`(^|[^,A-Za-z])X\b`)

// cosmicToken is what the formulas say with cosmic time; cosmic says it on another clock.
var (
	cosmicToken = regexp.MustCompile(`\b(phi''|phi'|H'|H\b)`)
	cosmic      = map[parse.Clock]map[string]string{
		parse.Conformal: {"phi''": "((phi'/a)'/a)", "phi'": "(phi'/a)", "H'": "((H/a)'/a)", "H": "(H/a)"},
		parse.Efolds:    {"phi''": "(H*(H*phi')')", "phi'": "(H*phi')", "H'": "(H*H')"},
	}
)

// onClock writes a formula in cosmic time on the model's clock.
func onClock(m *parse.Model, formula string) string {
	return cosmicToken.ReplaceAllStringFunc(formula, func(token string) string {
		if other, ok := cosmic[m.Clock][token]; ok {
			return other
		}
		return token
	})
}

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

// modelText is a shipped model.
func modelText(t testing.TB, name string) string {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// onClocks runs a test for every theory on every clock.
func onClocks(t *testing.T, test func(t *testing.T, th theory, m *parse.Model)) {
	for _, tc := range secondOrderTheories {
		for _, clock := range []string{"cosmic", "conformal", "efolds"} {
			t.Run(tc.model+"/"+clock, func(t *testing.T) {
				test(t, tc.theory, model(t, tc.model, strings.Replace(modelText(t, tc.model), "clock cosmic", "clock "+clock, 1)))
			})
		}
	}
}

// The background equations off shell: that of A is −N̄a³ Σℰᵢ, and that of ζ is 3N̄a³ Σ𝒫ᵢ.
func TestSecondOrderBackground(t *testing.T) {
	onClocks(t, func(t *testing.T, th theory, m *parse.Model) {
		density := m.Lapse.Mul(m.A.Pow(3))
		energy := th.at(t, m, kyyEnergy).Mul(density).Neg()
		pressure := th.at(t, m, kyyPressure).Mul(density).Scale(3, 1)
		x, err := rules.Expand(m)
		if err != nil {
			t.Fatal(err)
		}
		same(t, "equation of A", &x.Equations[0].Value, energy)
		same(t, "equation of ζ", &x.Equations[1].Value, pressure)
	})
}

// Scalars, on the clocks; checkScalars has the formulas.
func TestSecondOrderScalars(t *testing.T) {
	onClocks(t, func(t *testing.T, th theory, m *parse.Model) {
		r := mustReduce(t, m)
		checkScalars(t, m, r, th.at(t, m, kyyGT), th.at(t, m, kyyFT), th.at(t, m, kyySigma), th.at(t, m, kyyTheta))
	})
}

// S = ⅛∫dt a³[G_T γ'_ij² − F_T(∂γ_ij)²/a²] for tensors, with two polarisations; vectors do not
// propagate. The same paper, section 4. For the canonical field it is a³M²/8.
func TestSecondOrderTensorsAndVectors(t *testing.T) {
	onClocks(t, func(t *testing.T, th theory, m *parse.Model) {
		r := mustReduce(t, m.Variant(m.Gauge, parse.TensorSector))
		checkTensors(t, m, r, th.at(t, m, kyyGT), th.at(t, m, kyyFT))
		noVectors(t, m)
	})
}

// z² = a²(ρ + p)/(c_s²H²) with c_s² = P,X/(P,X + 2X P,XX), Garriga, Mukhanov 1999,
// hep-th/9904176, for S = ½∫z²[ζ'² − c_s²(∂ζ)²] in conformal time.
func TestGeneralKineticFunction(t *testing.T) {
	m := load(t, "kestrel.act")
	s := mustReduce(t, m).Single
	same(t, "sound speed squared", s.SoundSpeed2, eval(t, m, "P,X/(P,X + phi'^2*P,X,X)"))
	same(t, "z²", s.ZSquared, eval(t, m, "a^2*phi'^2*(P,X + phi'^2*P,X,X)/H^2"))
}

// substituted is e𝒟e, the operator of v where u = e·v.
func substituted(d oper.Oper, e field.Elem) oper.Oper { return oper.New(e).Mul(d).Mul(oper.New(e)) }

// In the flat gauge ζ = −Hδφ/φ', and in every gauge ζ − Hδφ/φ' is the ζ of the unitary one
// (Maldacena 2003, astro-ph/0210603, section 2): one operator in all three gauges.
func TestGaugesAgree(t *testing.T) {
	models := map[string]*parse.Model{
		"knot of X": model(t, "knot.act", strings.Replace(modelText(t, "knot.act"),
			"G3(phi, X), G4(phi, X), G5(phi, X)", "G3(X), G4(X), G5(X)", 1)),
	}
	for _, name := range []string{"lapwing", "kestrel", "redshank", "ruff", "godwit", "turnstone"} {
		models[name] = load(t, name+".act")
	}
	for name, m := range models {
		t.Run(name, func(t *testing.T) {
			unitary := mustReduce(t, m)
			want := unitary.Remaining.Matrix().At(0, 0)

			flat := m.Variant(parse.Flat, parse.ScalarSector)
			flat.Keep = &parse.Keep{Name: "dphi", Field: fieldIndex(t, flat, "dphi")}
			r := mustReduce(t, flat)
			if r.Variable != "dphi" {
				t.Fatalf("flat gauge: %q remains, want δφ", r.Variable)
			}
			if got := substituted(r.Remaining.Matrix().At(0, 0), eval(t, m, "-phi'/H")); !got.Equal(want) {
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
			if got := r.Remaining.Matrix().At(0, 0); !got.Equal(want) {
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

// On flat space the squares of curvature give a scalar of m₀² = M²/(12α) and a massive spin two of
// m₂² = −M²/(4β) beside the massless graviton (the same paper, section 3, written for αR² +
// βWeyl², which is (α − 2β/3)R² + 2βRic² up to the Gauss–Bonnet density).
func TestSquaresOfCurvatureOnFlatSpace(t *testing.T) {
	const stint = `model "Stint: the squares of curvature on flat space"
constants M > 0, alpha, beta
background a
given a' = 0
gauge newtonian
lagrangian covariant = M^2*R/2 + alpha*R^2 + beta*Weyl.abcd*Weyl.abcd
`
	// ω² − k²/a² of the modes in each sector
	masses := map[parse.Sector][]string{
		parse.ScalarSector: {"M^2/(12*alpha)", "-M^2/(4*beta)"},
		parse.VectorSector: {"-M^2/(4*beta)"},
		parse.TensorSector: {"0", "-M^2/(4*beta)"},
	}
	m := model(t, "stint.act", stint)
	for sector, list := range masses {
		want := oper.New(m.K.Int(1))
		for _, mass := range list { // coefficients are constant: the factors commute
			factor := oper.New(eval(t, m, "k^2/a^2 + ("+mass+")")).Add(oper.Mono(m.K.Int(1), 2))
			want = want.Mul(factor)
		}
		r := mustReduce(t, m.Variant(m.Gauge, sector))
		if got := oper.New(r.Single.EquationOfMotion...); !got.Equal(want) {
			t.Errorf("%v sector: the equation of motion is %v, want %v", sector, got, want)
		}
	}
}

// Unitary variables of a Gauss–Bonnet coupling, M²R/2 + X − V + f(φ)·R²_GB: 𝒢_T, ℱ_T, Σ and Θ of
// Kobayashi, Yamaguchi, Yokoyama 2011, arXiv:1105.5723, section 2 (its functions) and 4.
const (
	gaussBonnetGT    = "M^2 + 8*H*(f)'"
	gaussBonnetFT    = "M^2 + 8*(f)''"
	gaussBonnetSigma = "phi'^2/2 - 3*M^2*H^2 - 48*H^3*(f)'"
	gaussBonnetTheta = "M^2*H + 12*H^2*(f)'"
)

// The functions K, G₃, G₄, G₅ that are the Gauss–Bonnet coupling, the same paper, section 2.
const gaussBonnetFunctions = `model "Dotterel: the Gauss–Bonnet coupling in other words"
constants M > 0
functions V(phi), f(phi)
background a, phi
gauge unitary
lagrangian covariant =
    M^2*R/2 + X - V + 8*f,phi,phi,phi,phi*X^2*(3 - log(X)) - 4*f,phi,phi,phi*X*(7 - 3*log(X))*box[phi]
  + 4*f,phi,phi*X*(2 - log(X))*R + 4*f,phi,phi*(1 - log(X))*(box[phi]^2 - phi;ab*phi;ab)
  - 4*f,phi*log(X)*G.ab*phi;ab
  + 4*f,phi/(6*X)*(box[phi]^3 - 3*box[phi]*phi;ab*phi;ab + 2*phi;ab*phi;bc*phi;ca)
keep zeta
`

func TestGaussBonnet(t *testing.T) {
	for name, m := range map[string]*parse.Model{
		"curvature": load(t, "ruff.act"), "functions": model(t, "dotterel.act", gaussBonnetFunctions),
	} {
		t.Run(name, func(t *testing.T) {
			r := mustReduce(t, m)
			gt, ft := eval(t, m, gaussBonnetGT), eval(t, m, gaussBonnetFT)
			sigma, theta := eval(t, m, gaussBonnetSigma), eval(t, m, gaussBonnetTheta)
			checkScalars(t, m, r, gt, ft, sigma, theta)
			checkTensors(t, m, mustReduce(t, m.Variant(m.Gauge, parse.TensorSector)), gt, ft)
			noVectors(t, m)
		})
	}
}

// f(R)/2: 3FH² = (FR − f)/2 − 3HF', −2FH' = F” − HF', scalars with Q_s = 3F'²/(2F(H + F'/2F)²) in
// S = ∫a³Q_s[½ζ'² − ½(∂ζ)²/a²], with F = f,R; De Felice, Tsujikawa 2010, arXiv:1002.4928, for
// κ = 1. Tensors are those of general relativity with F in the place of M².
func TestCurvatureFunction(t *testing.T) {
	m := load(t, "sanderling.act")
	const energy = "3*f,R*H^2 - (f,R*(12*H^2 + 6*H') - f)/2 + 3*H*(f,R)'"
	const rate = "2*f,R*H' + (f,R)'' - H*(f,R)'"
	wantA, wantRate := eval(t, m, "a^3*("+energy+")"), eval(t, m, "3*a^3*("+energy+" + "+rate+")")
	x, err := rules.Expand(m)
	if err != nil {
		t.Fatal(err)
	}
	same(t, "equation of A", &x.Equations[0].Value, wantA)
	same(t, "equation of ζ", &x.Equations[1].Value, wantRate)

	r := mustReduce(t, m)
	if r.DegreesOfFreedom != 1 || r.Variable != "zeta" {
		t.Fatalf("%d degrees of freedom in %q, want 1 in ζ", r.DegreesOfFreedom, r.Variable)
	}
	q := eval(t, m, "3*(f,R)'^2/(2*f,R*(H + (f,R)'/(2*f,R))^2)")
	same(t, "kinetic", r.Single.Kinetic, q.Mul(m.A.Pow(3)))
	same(t, "gradient", r.Single.Gradient, q.Mul(m.A))
	same(t, "mass", r.Single.Mass, field.Elem{})
	checkTensors(t, m, mustReduce(t, m.Variant(m.Gauge, parse.TensorSector)), eval(t, m, "f,R"), eval(t, m, "f,R"))
	noVectors(t, m)
	for _, g := range []parse.Gauge{parse.Flat, parse.Newtonian} {
		r := mustReduce(t, m.Variant(g, parse.ScalarSector))
		if r.DegreesOfFreedom != 1 {
			t.Errorf("%v gauge: %d degrees of freedom, want 1", g, r.DegreesOfFreedom)
			continue
		}
		same(t, "sound speed squared", r.Single.SoundSpeed2, m.K.Int(1))
	}
}

// f(R, φ)/2 + ω(φ)X: the background equations of Hwang, Noh 1996, Phys. Rev. D 54, 1460, as in De
// Felice, Tsujikawa 2010, arXiv:1002.4928, section 6; two scalars, both with the speed of light.
func TestCurvatureFunctionOfField(t *testing.T) {
	m := load(t, "phalarope.act")
	const energy = "3*f,R*H^2 - (f,R*(12*H^2 + 6*H') - f)/2 + 3*H*(f,R)' - omega*phi'^2/2"
	const rate = "2*f,R*H' + (f,R)'' - H*(f,R)' + omega*phi'^2"
	want := []field.Elem{
		eval(t, m, "a^3*("+energy+")"), eval(t, m, "3*a^3*("+energy+" + "+rate+")"),
		eval(t, m, "-a^3*omega*(phi'' + 3*H*phi' + (omega,phi*phi'^2 - f,phi)/(2*omega))"),
	}
	x, err := rules.Expand(m)
	if err != nil {
		t.Fatal(err)
	}
	for i, eq := range x.Equations {
		same(t, "equation of "+eq.From, &eq.Value, want[i])
	}
	for _, g := range []parse.Gauge{parse.Newtonian, parse.Flat, parse.Unitary} {
		r := mustReduce(t, m.Variant(g, parse.ScalarSector))
		if r.DegreesOfFreedom != 2 {
			t.Fatalf("%v gauge: %d degrees of freedom, want 2", g, r.DegreesOfFreedom)
		}
	}
	checkTensors(t, m, mustReduce(t, m.Variant(m.Gauge, parse.TensorSector)), eval(t, m, "f,R"), eval(t, m, "f,R"))
	noVectors(t, m)
}

// fieldSpace is the quadratic form of the scalars of S = ∫√−g[M²R/2 − ½G_IJ∂φᴵ∂φᴶ − V] in the flat
// gauge, for G = diag(1, f(φ)):
//
//	½a³[G_IJ D_tδφᴵD_tδφᴶ − G_IJ∂δφᴵ∂δφᴶ/a² − M_IJδφᴵδφᴶ],
//	M_IJ = V;IJ − R_IKLJ φ'ᴷφ'ᴸ − D_t(a³φ'_Iφ'_J/H)/(a³M²)
//
// (Sasaki, Stewart 1996, astro-ph/9507001). In two dimensions −R_IKLJ φ'ᴷφ'ᴸ = κ(G_IJφ'² − φ'_Iφ'_J),
// κ the Gaussian curvature.
func fieldSpace(t *testing.T, m *parse.Model) oper.Matrix {
	k := m.K
	value := func(text string) field.Elem { return eval(t, m, text) }
	a3 := m.A.Pow(3)
	metric := [2]field.Elem{k.Int(1), value("f")}
	// rate[L][I] = Γᴸ_KI φ'ᴷ
	rate := [2][2]field.Elem{{{}, value("-f,phi*chi'/2")}, {value("f,phi*chi'/(2*f)"), value("f,phi*phi'/(2*f)")}}
	hessian := [2][2]field.Elem{
		{value("V,phi,phi"), value("V,phi,chi - f,phi*V,chi/(2*f)")},
		{value("V,phi,chi - f,phi*V,chi/(2*f)"), value("V,chi,chi + f,phi*V,phi/2")},
	}
	curvature, square := value("(f,phi)^2/(4*f^2) - f,phi,phi/(2*f)"), value("phi'^2 + f*chi'^2")
	velocity := [2]field.Elem{value("phi'"), value("f*chi'")}
	drag := func(i, j int) field.Elem { return a3.Mul(velocity[i]).Mul(velocity[j]).Div(value("H")) }
	d := oper.NewMatrix(2, 2)
	for i := range 2 {
		for j := range 2 {
			var sum oper.Oper
			for l := range 2 { // (D_tδφ)ᴸ
				left, right := oper.New(rate[l][i]), oper.New(rate[l][j])
				if l == i {
					left = left.Add(oper.Mono(k.Int(1), 1))
				}
				if l == j {
					right = right.Add(oper.Mono(k.Int(1), 1))
				}
				sum = sum.Add(left.Adjoint().Mul(right.Scale(a3.Mul(metric[l]))))
			}
			mass := hessian[i][j].Sub(curvature.Mul(velocity[i]).Mul(velocity[j]))
			along := drag(i, j).D()
			for l := range 2 {
				along = along.Sub(rate[l][i].Mul(drag(l, j))).Sub(rate[l][j].Mul(drag(i, l)))
			}
			mass = mass.Sub(along.Div(a3).Div(value("M^2")))
			if i == j {
				mass = mass.Add(curvature.Mul(metric[i]).Mul(square)).Add(metric[i].Mul(value("k^2/a^2")))
			}
			d.Set(i, j, sum.Sub(oper.New(mass.Mul(a3))))
		}
	}
	return d
}

// What remains of two fields, whichever of A, δφ and δχ that is: the momentum constraint of the
// flat gauge, 2M²HA = φ'δφ + fχ'δχ (the same paper), takes one to the other.
func TestTwoScalars(t *testing.T) {
	m := load(t, "tern.act")
	r := mustReduce(t, m)
	if r.DegreesOfFreedom != 2 || len(r.Remaining.Names) != 2 {
		t.Fatalf("%d degrees of freedom in %v, want 2", r.DegreesOfFreedom, r.Remaining.Names)
	}
	at := r.Remaining.index
	change := oper.NewMatrix(2, 2)
	solved := [2]struct {
		name         string
		fromA, other string
	}{{"dphi", "2*M^2*H/phi'", "-f*chi'/phi'"}, {"dchi", "2*M^2*H/(f*chi')", "-phi'/(f*chi')"}}
	for i, s := range solved {
		if j := at(s.name); j >= 0 {
			change.Set(i, j, oper.New(m.K.Int(1)))
			continue
		}
		change.Set(i, at("A"), oper.New(eval(t, m, s.fromA)))
		change.Set(i, at(solved[1-i].name), oper.New(eval(t, m, s.other)))
	}
	want, err := fieldSpace(t, m).Congruence(change).NormalForm()
	if err != nil {
		t.Fatal(err)
	}
	got, err := r.Remaining.Form()
	if err != nil {
		t.Fatal(err)
	}
	if !got.Matrix(2).Equal(want.Matrix(2)) {
		t.Errorf("got %v, want %v", got, want)
	}
	for i, c := range []int64{1, -2, 1} {
		same(t, "coefficient of the sound speeds", &r.Several.SoundSpeeds[i], m.K.Int(c))
	}
	noVectors(t, m)
}

// A scalar beside a perfect fluid P(Y), of which c_s² = P_Y/(P_Y + 2YP_YY) (Garriga, Mukhanov
// 1999, hep-th/9904176): two scalars, (c² − 1)(c² − c_s²) = 0, the graviton, no vectors.
func TestScalarAndFluid(t *testing.T) {
	m := load(t, "puffin.act")
	for _, g := range []parse.Gauge{parse.Flat, parse.Unitary, parse.Newtonian} {
		r := mustReduce(t, m.Variant(g, parse.ScalarSector))
		if r.DegreesOfFreedom != 2 {
			t.Fatalf("%v gauge: %d degrees of freedom, want 2", g, r.DegreesOfFreedom)
		}
		if g == parse.Newtonian {
			continue // its variables mix A with time derivatives
		}
		if len(r.Several.SoundSpeeds) != 3 {
			t.Fatalf("%v gauge: equation of the sound speeds %v, want degree 2", g, r.Several.SoundSpeeds)
		}
		fluid := eval(t, m, "P,X/(P,X + chi'^2*P,X,X)")
		for i, want := range []field.Elem{fluid, fluid.Add(m.K.Int(1)).Neg(), m.K.Int(1)} {
			same(t, "coefficient of the sound speeds", &r.Several.SoundSpeeds[i], want)
		}
	}
	checkTensors(t, m, mustReduce(t, m.Variant(m.Gauge, parse.TensorSector)), eval(t, m, "M^2"), eval(t, m, "M^2"))
	noVectors(t, m)
}

func noVectors(t *testing.T, m *parse.Model) {
	t.Helper()
	v := mustReduce(t, m.Variant(m.Gauge, parse.VectorSector))
	if v.DegreesOfFreedom != 0 || len(v.Remaining.Names) != 0 {
		t.Errorf("vectors: %d degrees of freedom in %v, want none", v.DegreesOfFreedom, v.Remaining.Names)
	}
}

// checkTensors compares with S = ⅛∫dt a³[G_T γ'_ij² − F_T(∂γ_ij)²/a²].
func checkTensors(t *testing.T, m *parse.Model, r *Result, gt, ft field.Elem) {
	t.Helper()
	if r.DegreesOfFreedom != 2 {
		t.Fatalf("tensors: %d degrees of freedom, want two polarisations", r.DegreesOfFreedom)
	}
	same(t, "kinetic of tensors", r.Single.Kinetic, gt.Mul(m.A.Pow(3)).Div(m.Lapse).Scale(1, 4))
	same(t, "gradient of tensors", r.Single.Gradient, ft.Mul(m.A).Mul(m.Lapse).Scale(1, 4))
	same(t, "mass of tensors", r.Single.Mass, field.Elem{})
}

// checkScalars compares with S = ∫dt a³[G_S ζ'² − F_S(∂ζ)²/a²], G_S = ΣG_T²/Θ² + 3G_T and
// F_S = (1/a) d(aG_T²/Θ)/dt − F_T.
func checkScalars(t *testing.T, m *parse.Model, r *Result, gt, ft, sigma, theta field.Elem) {
	t.Helper()
	if r.DegreesOfFreedom != 1 || r.Variable != "zeta" {
		t.Fatalf("%d degrees of freedom in %q, want 1 in ζ", r.DegreesOfFreedom, r.Variable)
	}
	gs := sigma.Mul(gt.Pow(2)).Div(theta.Pow(2)).Add(gt.Scale(3, 1))
	fs := m.A.Mul(gt.Pow(2)).Div(theta).D().Div(m.Lapse).Div(m.A).Sub(ft)
	same(t, "kinetic", r.Single.Kinetic, gs.Mul(m.A.Pow(3)).Div(m.Lapse).Scale(2, 1))
	same(t, "gradient", r.Single.Gradient, fs.Mul(m.A).Mul(m.Lapse).Scale(2, 1))
	same(t, "mass", r.Single.Mass, field.Elem{})
	same(t, "sound speed squared", r.Single.SoundSpeed2, fs.Div(gs))
}
