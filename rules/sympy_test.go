package rules

// The expansion against an independent route: a script expands each action from the metric's
// components in coordinates, at exact rational data, and gives the equations of the
// perturbations at a point. They must be equal as rationals, before any background equation
// is used.

import (
	"encoding/json"
	"fmt"
	"maps"
	"math/big"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"testing"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/outside"
	"remnant/parse"
	"remnant/parse/diag"
)

// rational is a big.Rat that JSON writes as a string.
type rational struct{ *big.Rat }

func (r rational) MarshalJSON() ([]byte, error) { return json.Marshal(r.RatString()) }

// taylor holds the Taylor coefficients of a function of time at τ = 0.
type taylor []rational

// taylorOrder is what four time derivatives need: two in the curvature, two more by partial
// integration.
const taylorOrder = 5

// jet is the n-th derivative at 0.
func (s taylor) jet(n int) *big.Rat {
	if n >= len(s) {
		return new(big.Rat)
	}
	f := new(big.Int).MulRange(1, int64(n))
	return new(big.Rat).Mul(s[n].Rat, new(big.Rat).SetInt(f))
}

// over is s/d.
func (s taylor) over(d taylor) taylor {
	out := make(taylor, min(len(s), len(d)))
	for n := range out {
		c := new(big.Rat).Set(s[n].Rat)
		for i := range n {
			c.Sub(c, new(big.Rat).Mul(out[i].Rat, d[n-i].Rat))
		}
		out[n] = rational{c.Quo(c, d[0].Rat)}
	}
	return out
}

func (s taylor) derivative() taylor {
	out := make(taylor, len(s)-1)
	for n := range out {
		out[n] = rational{new(big.Rat).Mul(s[n+1].Rat, big.NewRat(int64(n+1), 1))}
	}
	return out
}

// monomial is a term of a free function, a power for each argument.
type monomial struct {
	Coef   rational `json:"coef"`
	Powers []int    `json:"powers"`
}

// variationModel is a model's share of a case.
type variationModel struct {
	Name      string                `json:"name"`
	Constants map[string]rational   `json:"constants"`
	Functions map[string][]monomial `json:"functions"`

	file *parse.Model
}

// variation is one case: a perturbed background with the models that are expanded on it.
type variation struct {
	Kappa   rational          `json:"kappa"` // perturbations grow as exp(κz), those that they meet as exp(−κz)
	A       taylor            `json:"a"`
	Lapse   taylor            `json:"lapse"`
	Scalars map[string]taylor `json:"scalars"`
	Fields  map[string]taylor `json:"fields"`
	Models  []*variationModel `json:"models"`

	clock parse.Clock
	rate  taylor // what H stands for on the clock
}

// numbers draws small rationals.
type numbers struct{ *rand.Rand }

func (r numbers) number() rational {
	n := 1 + r.Int64N(5)
	if r.IntN(2) == 0 {
		n = -n
	}
	return rational{big.NewRat(n, 1+r.Int64N(3))}
}

func (r numbers) positive() rational {
	n := r.number()
	return rational{n.Abs(n.Rat)}
}

func (r numbers) series() taylor {
	out := make(taylor, taylorOrder)
	for i := range out {
		out[i] = r.number()
	}
	return out
}

// polynomial is a dense random polynomial of total degree 4.
func (r numbers) polynomial(args int) []monomial {
	var out []monomial
	var fill func(powers []int, left int)
	fill = func(powers []int, left int) {
		if len(powers) == args {
			out = append(out, monomial{r.number(), slices.Clone(powers)})
			return
		}
		for n := range left + 1 {
			fill(append(powers, n), left-n)
		}
	}
	fill(nil, 4)
	return out
}

// background draws a background on the clock, with N̄ and a'/a as the clock has them.
func (r numbers) background(clock parse.Clock) *variation {
	v := &variation{Kappa: r.positive(), A: r.series(), Lapse: r.series(), clock: clock}
	v.A[0], v.Lapse[0] = r.positive(), r.positive()
	one := taylor{rational{big.NewRat(1, 1)}}
	for len(one) < taylorOrder {
		one = append(one, rational{new(big.Rat)})
	}
	switch clock {
	case parse.Cosmic:
		v.Lapse, v.rate = one, v.A.derivative().over(v.A)
	case parse.Conformal:
		v.Lapse, v.rate = v.A, v.A.derivative().over(v.A)
	case parse.Efolds: // a' = a and N̄ = 1/H
		for i := range taylorOrder - 1 {
			v.A[i+1] = rational{new(big.Rat).Quo(v.A[i].Rat, big.NewRat(int64(i+1), 1))}
		}
		v.rate = one.over(v.Lapse)
	}
	v.Scalars = map[string]taylor{"phi": r.series(), "chi": r.series()}
	return v
}

var (
	gaugeLine = regexp.MustCompile(`(?m)^gauge .*\n`)
	clockLine = regexp.MustCompile(`(?m)^clock .*\n`)
	keepLine  = regexp.MustCompile(`(?m)^keep .*\n`)
)

// add loads a shipped model in a gauge, the open one keeping every perturbation of the sector,
// and draws its functions and constants.
func (v *variation) add(t *testing.T, r numbers, name string, gauge parse.Gauge, sector parse.Sector) {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "testdata", name+".act"))
	if err != nil {
		t.Fatal(err)
	}
	v.addText(t, r, name, string(data), gauge, sector)
}

func (v *variation) addText(t *testing.T, r numbers, name, text string, gauge parse.Gauge, sector parse.Sector) {
	t.Helper()
	text = keepLine.ReplaceAllString(text, "")
	text = clockLine.ReplaceAllString(text, fmt.Sprintf("clock %v\n", v.clock))
	text = gaugeLine.ReplaceAllString(text, fmt.Sprintf("gauge %v\nsector %v\n", gauge, sector))
	m, err := parse.Load(diag.NewSource(name+".act", text), nil)
	if err != nil {
		t.Fatal(err)
	}
	vm := &variationModel{Name: name, Constants: map[string]rational{}, Functions: map[string][]monomial{}, file: m}
	for _, c := range m.Constants {
		vm.Constants[c.Name] = r.number()
	}
	for _, f := range m.Functions {
		vm.Functions[f.Name] = r.polynomial(len(f.Fn.Args))
	}
	v.Models = append(v.Models, vm)
}

// value is an element of the model's field at τ = 0.
func (v *variation) value(m *variationModel, e field.Elem) *big.Rat {
	if e.IsZero() {
		return new(big.Rat)
	}
	at := func(g field.Gen) *big.Rat { return v.generator(m, g) }
	return new(big.Rat).Quo(e.Num().EvalRat(at), e.Den().EvalRat(at))
}

func (v *variation) generator(m *variationModel, g field.Gen) *big.Rat {
	switch in := m.file.K.Info(g); in.Kind {
	case field.Constant:
		return m.Constants[in.Name].Rat
	case field.Function:
		switch in.Name {
		case "a":
			return v.A.jet(in.Order)
		case "H":
			return v.rate.jet(in.Order)
		}
		return v.Scalars[in.Name].jet(in.Order)
	case field.FreeFunction:
		return v.partial(m, in)
	default:
		panic(fmt.Sprintf("%s has no value", in.Name))
	}
}

// partial is a partial derivative of a free function at the background.
func (v *variation) partial(m *variationModel, in field.Info) *big.Rat {
	sum := new(big.Rat)
	for _, t := range m.Functions[in.Name] {
		c := new(big.Rat).Set(t.Coef.Rat)
		for i, n := range t.Powers {
			x := v.value(m, in.Fn.Args[i])
			for j := range n {
				if j < in.Index[i] {
					c.Mul(c, big.NewRat(int64(n-j), 1))
				} else {
					c.Mul(c, x)
				}
			}
			if n < in.Index[i] {
				c.SetInt64(0)
			}
		}
		sum.Add(sum, c)
	}
	return sum
}

// equations gives the equation of each perturbation at τ = 0 from the expanded action.
func (v *variation) equations(t *testing.T, m *variationModel) map[string]*big.Rat {
	t.Helper()
	x := m.expansion()
	var names []string
	for _, f := range m.file.Fields {
		names = append(names, f.Name)
	}
	l := x.offShell(t, names)
	out := map[string]*big.Rat{}
	for name := range v.Fields {
		out[name] = new(big.Rat)
	}
	grow := func(f parse.Factor, down bool) *big.Rat {
		c := big.NewRat(1, 1)
		for range f.Space {
			c.Mul(c, v.Kappa.Rat)
			if down {
				c.Neg(c)
			}
		}
		return c
	}
	vary := func(c field.Elem, u, w parse.Factor) { // (−D)ᵗ c Dˢ acting on the given series
		op := oper.Mono(c, w.Time)
		for range u.Time {
			op = op.D().Neg()
		}
		sum := new(big.Rat)
		for n := range op.Order() + 1 {
			sum.Add(sum, new(big.Rat).Mul(v.value(m, op.Coef(n)), v.Fields[names[w.Field]].jet(n)))
		}
		sum.Mul(sum, grow(u, true)).Mul(sum, grow(w, false))
		out[names[u.Field]].Add(out[names[u.Field]], sum)
	}
	for _, term := range x.ring.terms(l, x.m.A, x.density) {
		vary(term.Coef, term.U, term.V)
		vary(term.Coef, term.V, term.U)
	}
	return out
}

// offShell is the density to second order, no background equation used.
func (x *expansion) offShell(t *testing.T, names []string) quantity {
	t.Helper()
	e := x.evaluator(x.ring, names)
	if !x.curvatureGauge() {
		return e.volume.mul(e.scalar(x.action()))
	}
	l, err := x.uniformCurvature(e, len(names))
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// expansion is the state in which Expand begins.
func (m *variationModel) expansion() *expansion {
	x := &expansion{m: m.file, ring: newRing(m.file.K, m.file.Lapse, m.file.A)}
	x.density = m.file.Lapse.Mul(m.file.A.Pow(3))
	x.scalars = m.file.Scalars()
	return x
}

// answer is what the script says of one model.
type answer struct {
	First  map[string]string `json:"first"`
	Second map[string]string `json:"second"`
}

func ask(t *testing.T, cases []*variation) []map[string]answer {
	t.Helper()
	in, err := json.Marshal(cases)
	if err != nil {
		t.Fatal(err)
	}
	var out []map[string]answer
	if err := json.Unmarshal(outside.SymPy(t, filepath.Join("testdata", "second_variation.py"), in), &out); err != nil {
		t.Fatal(err)
	}
	if len(out) != len(cases) {
		t.Fatalf("%d answers to %d cases", len(out), len(cases))
	}
	return out
}

// variedModels are the shipped covariant models that the script knows.
var variedModels = []string{"lapwing", "kestrel", "redshank", "godwit", "turnstone", "knot", "ruff",
	"sanderling", "phalarope", "stilt", "tern", "puffin"}

// The equations of all perturbations of each sector, off shell, on every clock.
func TestSecondVariation(t *testing.T) {
	const seed = 20260711
	r := numbers{rand.New(rand.NewPCG(seed, 1))}
	var cases []*variation
	for _, sector := range []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector} {
		for _, clock := range []parse.Clock{parse.Cosmic, parse.Conformal, parse.Efolds} {
			v := r.background(clock)
			v.Fields = map[string]taylor{}
			for _, name := range parse.Perturbations(parse.Open, sector, []string{"phi", "chi"}) {
				v.Fields[name] = r.series()
			}
			for _, name := range variedModels {
				if clock == parse.Cosmic || slices.Contains([]string{"redshank", "stilt", "puffin"}, name) {
					v.add(t, r, name, parse.Open, sector)
				}
			}
			cases = append(cases, v)
		}
	}
	compareEquations(t, seed, cases)
}

// The unitary gauge of actions whose only scalar is R, in which R is uniform.
func TestSecondVariationAtUniformCurvature(t *testing.T) {
	const seed = 20260714
	r := numbers{rand.New(rand.NewPCG(seed, 1))}
	var cases []*variation
	for _, clock := range []parse.Clock{parse.Cosmic, parse.Conformal} {
		v := r.background(clock)
		v.Fields = map[string]taylor{}
		for _, name := range parse.Perturbations(parse.Unitary, parse.ScalarSector, nil) {
			v.Fields[name] = r.series()
		}
		for _, name := range []string{"sanderling", "stilt"} {
			v.add(t, r, name, parse.Unitary, parse.ScalarSector)
			v.Models[len(v.Models)-1].Name += "_unitary"
		}
		cases = append(cases, v)
	}
	compareEquations(t, seed, cases)
}

func compareEquations(t *testing.T, seed int, cases []*variation) {
	t.Helper()
	for i, answers := range ask(t, cases) {
		v := cases[i]
		for _, m := range v.Models {
			got := v.equations(t, m)
			nonzero := false
			for _, name := range slices.Sorted(maps.Keys(v.Fields)) {
				want := answers[m.Name].Second[name]
				nonzero = nonzero || want != "0" && want != ""
				if got[name] == nil || got[name].RatString() != want {
					t.Errorf("seed %d: %s, %v sector, %v clock: the equation of %s is %v from the expansion and %s from coordinates",
						seed, m.Name, m.file.Sector, v.clock, name, got[name], want)
				}
			}
			if !nonzero || len(answers[m.Name].Second) != len(v.Fields) {
				t.Errorf("%s, %v sector: the script gives no equations: %v", m.Name, m.file.Sector, answers[m.Name])
			}
		}
	}
}

// everything has the nodes of the covariant form that the shipped models lack: gradients and
// boxes of the curvature, third derivatives in both orders, curvature contracted with
// curvature and derivatives, a denominator.
const everything = `clock cosmic
constants c
functions F(R, phi, X), U(phi)
background a, phi
gauge open
lagrangian covariant =
    F*Ric.ab*phi;a*phi;b
  + Riem.abcd*Ric.ac*phi;bd
  + c*X*Weyl.abcd*Weyl.abcd
  + R*box[R]
  + U*R;a*phi;a
  + G.ab*Ric.ab
  + phi;a*phi;ab*phi;b/phi^2
  + X*phi;abb*phi;a
  - c*phi*phi;bba*phi;a
`

// lengthen adds n Taylor coefficients on the cosmic clock, for more derivatives.
func (v *variation) lengthen(r numbers, n int) {
	more := func(s taylor) taylor { return append(s, r.series()[:n]...) }
	v.A = more(v.A)
	for range n {
		v.Lapse = append(v.Lapse, rational{new(big.Rat)})
	}
	for _, m := range []map[string]taylor{v.Scalars, v.Fields} {
		for _, name := range slices.Sorted(maps.Keys(m)) {
			m[name] = more(m[name])
		}
	}
	v.rate = v.A.derivative().over(v.A)
}

func TestSecondVariationOfEverything(t *testing.T) {
	const seed = 20260715
	r := numbers{rand.New(rand.NewPCG(seed, 1))}
	var cases []*variation
	for _, sector := range []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector} {
		v := r.background(parse.Cosmic)
		v.Fields = map[string]taylor{}
		for _, name := range parse.Perturbations(parse.Open, sector, []string{"phi"}) {
			v.Fields[name] = r.series()
		}
		v.lengthen(r, 4)
		v.addText(t, r, "everything", everything, parse.Open, sector)
		cases = append(cases, v)
	}
	compareEquations(t, seed, cases)
}

// The background equations from the first variation.
func TestFirstVariation(t *testing.T) {
	const seed = 20260712
	r := numbers{rand.New(rand.NewPCG(seed, 1))}
	var cases []*variation
	for _, clock := range []parse.Clock{parse.Cosmic, parse.Conformal, parse.Efolds} {
		v := r.background(clock)
		v.Kappa = rational{new(big.Rat)}
		v.Fields = map[string]taylor{}
		for _, name := range parse.Perturbations(parse.Open, parse.ScalarSector, []string{"phi", "chi"}) {
			v.Fields[name] = r.series()
		}
		for _, name := range variedModels {
			v.add(t, r, name, parse.Open, parse.ScalarSector)
		}
		cases = append(cases, v)
	}
	for i, answers := range ask(t, cases) {
		v := cases[i]
		for _, m := range v.Models {
			eqs, err := m.expansion().firstOrder()
			if err != nil {
				t.Fatal(err)
			}
			for _, eq := range eqs {
				if got, want := v.value(m, eq.Value).RatString(), answers[m.Name].First[eq.From]; got != want {
					t.Errorf("seed %d: %s, %v clock: the background equation of %s is %s from the expansion and %s from coordinates",
						seed, m.Name, v.clock, eq.From, got, want)
				}
			}
		}
	}
}
