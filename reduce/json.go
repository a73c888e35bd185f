package reduce

// The JSON form of a result: format 1. Programs may rely on it: every key is always there,
// null where it does not apply, and in this order; expressions are strings in the notation,
// so that they can be read back. A change that could break a reader raises the number.

import (
	"bytes"
	"encoding/json"
	"fmt"
	"strings"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/show"
)

// JSONFormat is the version of the JSON form.
const JSONFormat = 1

// Document is the JSON form of a reduction.
type Document struct {
	Format      int             `json:"format"`      // 1
	Model       *string         `json:"model"`       // the title
	Clock       string          `json:"clock"`       // cosmic, conformal or efolds
	Gauge       *string         `json:"gauge"`       // unitary, flat, newtonian or open; null for a quadratic model
	Sector      *string         `json:"sector"`      // scalar, vector or tensor; null for a quadratic model
	Background  []EquationJSON  `json:"background"`  // the relations, as they are applied
	Assumptions []string        `json:"assumptions"` // "H != 0" or "x > 0"
	Eliminated  []EliminateJSON `json:"eliminated"`  // in the order of the elimination

	// Variable is the one field that remains; null if none or several do. Variables lists
	// what remains in the order of all matrices. Requested is what the model asked to keep; it
	// differs from Variable where a redefined field remains, and Relation then gives the
	// requested field in terms of it. Null if the model asked for none.
	Variable  *string  `json:"variable"`
	Variables []string `json:"variables"`
	Requested *string  `json:"requested"`
	Relation  *string  `json:"relation"`

	DegreesOfFreedom int `json:"degreesOfFreedom"`

	Quantities

	Series     []SeriesJSON    `json:"series"`     // null if none was asked for
	FormFactor *FormFactorJSON `json:"formFactor"` // null where there is none
	Stability  []StabilityJSON `json:"stability"`
	GaugeCheck *GaugeCheckJSON `json:"gaugeCheck"` // null if it was not asked for
	At         *AtJSON         `json:"at"`         // null if no point was given
}

// Quantities are what the action that remains is made of. At a point they are exact values.
type Quantities struct {
	// Operator is [q0, q1, …] with L = ½Σ qₙ (u⁽ⁿ⁾)² for one field; an object of the two lists
	// of matrices for several; null if nothing remains.
	Operator Operator `json:"operator"`

	// For one field of second order, whose kinetic coefficient is free of k and whose q0 is
	// −(gradient·k² + mass).
	Kinetic  *string `json:"kinetic"`
	Gradient *string `json:"gradient"`
	Mass     *string `json:"mass"`

	SoundSpeedSquared  *string  `json:"soundSpeedSquared"`  // the limit k → ∞; null if infinite
	SoundSpeedEquation []string `json:"soundSpeedEquation"` // several fields: [c0, c1, …] of Σ cᵢ (c_s²)ⁱ = 0
	EquationOfMotion   *string  `json:"equationOfMotion"`   // one field: "u'' + … = 0"; with the products underived where they are large

	Canonical *CanonicalJSON `json:"canonical"` // one field of second order
}

// FormFactorJSON is what a form factor leaves: the zeros of W are the poles of the propagator.
type FormFactorJSON struct {
	W        *string  `json:"W"`        // in s, the eigenvalue of box; null where it is no function of s
	Series   []string `json:"series"`   // [w0, w1, …] of W = Σ wₙ sⁿ, in the Taylor coefficients F.n
	Operator []string `json:"operator"` // [c0, c1, …] of L = Σ cᵢ Dⁱ, with W = 1 + wF(box)L
	Weight   string   `json:"weight"`   // w
	LocalDOF int      `json:"localDegreesOfFreedom"`
}

// EquationJSON is a background relation, what is replaced on the left.
type EquationJSON struct {
	Equation string `json:"equation"`
}

// EliminateJSON is a field that is gone, in terms of those that stood when it went. A field
// that was redefined is listed too; it has no equation.
type EliminateJSON struct {
	Field    string   `json:"field"`
	Solution string   `json:"solution"`
	Equation *string  `json:"equation"` // the field whose equation of motion gave it
	Needs    []string `json:"needs"`    // the assumptions of the step
}

// Operator is the normal form; it writes itself as a list, an object or null.
type Operator struct {
	Single  []string
	Several *MatrixJSON
}

// MatrixJSON is the normal form of several fields: L = ½Σ qₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁾ + ½Σ pₙᵃᵇ u_a⁽ⁿ⁾u_b⁽ⁿ⁺¹⁾.
type MatrixJSON struct {
	Symmetric     [][][]string `json:"symmetric"`     // qₙ, by n, row, column
	Antisymmetric [][][]string `json:"antisymmetric"` // pₙ, by n, row, column
}

// MarshalJSON implements json.Marshaler.
func (o Operator) MarshalJSON() ([]byte, error) {
	if o.Several != nil {
		return encode(o.Several)
	}
	return encode(o.Single)
}

// CanonicalJSON belongs to v = zu, with the primes of z”/z d/dη.
type CanonicalJSON struct {
	ZSquared string `json:"zSquared"`
	ZppOverZ string `json:"zppOverZ"`
}

// SeriesJSON is an expansion of the operator, which has the shape of the operator itself.
type SeriesJSON struct {
	In       string   `json:"in"`    // "eps, eta", "k" on large scales, "1/k" on small ones
	Order    int      `json:"order"` // the highest order kept
	Operator Operator `json:"operator"`

	// Remainder gives, for each coefficient, the lowest order left out (a power of k, or a
	// degree in the small parameters); null where nothing is left out. It has the shape of the
	// operator.
	Remainder Remainder `json:"remainder"`
}

// Remainder writes itself as a list or an object, as Operator does.
type Remainder struct {
	Single  []*int
	Several *struct {
		Symmetric     [][][]*int `json:"symmetric"`
		Antisymmetric [][][]*int `json:"antisymmetric"`
	}
}

// MarshalJSON implements json.Marshaler.
func (r Remainder) MarshalJSON() ([]byte, error) {
	if r.Several != nil {
		return encode(r.Several)
	}
	return encode(r.Single)
}

// StabilityJSON is one statement on stability.
type StabilityJSON struct {
	// Concern is "ghost", "gradient", "mass", "strongCoupling", "ostrogradsky" or "growth".
	Concern string `json:"concern"`
	// Verdict is "stable" or "unstable" where that follows from the declared signs, else
	// "conditional"; for growth it is "unbounded".
	Verdict string `json:"verdict"`
	// Condition is that for the good case, if conditional: "eps > 0", or "eps != 0" for strong
	// coupling.
	Condition *string `json:"condition"`
	// Number is the order of the equation of motion for ostrogradsky, and the power of k with
	// which the sound speed squared grows for growth.
	Number *int `json:"number"`
}

// AtJSON holds the quantities at a point.
type AtJSON struct {
	Point []AssignmentJSON `json:"point"`
	Quantities
}

// AssignmentJSON is one value of a point.
type AssignmentJSON struct {
	Name  string `json:"name"`
	Value string `json:"value"`
}

// Document gives the JSON form; expansions and values (nil: none) are put in.
func (r *Result) Document(expansions []*Expansion, at *Values) *Document {
	d := &Document{
		Format: JSONFormat, Clock: r.Model.Clock.String(),
		Background: relationsJSON(r.Model.K), Assumptions: []string{}, Eliminated: []EliminateJSON{},
		Variable: orNull(r.Variable), Requested: orNull(r.Requested), Model: orNull(r.Model.Title),
		Variables: append([]string{}, r.Remaining.Names...), DegreesOfFreedom: r.DegreesOfFreedom,
		Quantities: r.quantities(r.Single, r.Several), Stability: []StabilityJSON{},
	}
	d.Gauge, d.Sector = gaugeWords(r.Model)
	for _, a := range r.Assumptions {
		d.Assumptions = append(d.Assumptions, assumptionText(a))
	}
	for _, s := range r.Steps {
		d.Eliminated = append(d.Eliminated, s.json()...)
	}
	if sum := r.RequestedSum(); sum != nil {
		text := show.Notation(SumNode(sum))
		d.Relation = &text
	}
	for _, s := range r.Stability {
		d.Stability = append(d.Stability, s.json()...)
	}
	for _, x := range expansions {
		d.Series = append(d.Series, r.seriesJSON(x))
	}
	d.FormFactor = r.formFactorJSON()
	if at != nil {
		d.At = &AtJSON{Point: []AssignmentJSON{}, Quantities: r.quantities(at.Single, at.Several)}
		for _, a := range at.Point {
			d.At.Point = append(d.At.Point, AssignmentJSON{show.Notation(show.Generator(r.Model.K, a.Gen)), text(a.Value)})
		}
	}
	return d
}

// Encode writes the document with an indent of two spaces.
func (d *Document) Encode() ([]byte, error) { return encodeIndented(d) }

func encode(v any) ([]byte, error) {
	var b bytes.Buffer
	enc := json.NewEncoder(&b)
	enc.SetEscapeHTML(false)
	err := enc.Encode(v)
	return b.Bytes(), err
}

// RequestedSum is the field that the model asked to keep in terms of the one that remains;
// nil if it is that one, or none was asked for or remains alone.
func (r *Result) RequestedSum() []Addend {
	if r.Requested == "" || r.Variable == "" || r.Requested == r.Variable {
		return nil
	}
	return Express(r.Model.K, r.Steps, r.Requested)
}

// SumNode lays out a sum of operators on fields.
func SumNode(sum []Addend) show.Node {
	var terms []show.LinearTerm
	for _, a := range sum {
		for i := a.Coef.Order(); i >= 0; i-- {
			if c := a.Coef.Coef(i); !c.IsZero() {
				terms = append(terms, show.LinearTerm{Coef: c.Lowest(), Name: a.Name, Order: i})
			}
		}
	}
	return show.Linear(terms)
}

func orNull(s string) *string {
	if s == "" {
		return nil
	}
	return &s
}

func text(e field.Elem) string { return show.Notation(show.Elem(e)) }

func optionalText(e *field.Elem) *string {
	if e == nil {
		return nil
	}
	s := text(*e)
	return &s
}

func texts(es []field.Elem) []string {
	if es == nil {
		return nil
	}
	out := make([]string, len(es))
	for i, e := range es {
		out[i] = text(e)
	}
	return out
}

func assumptionText(a field.Assumption) string {
	if a.Positive {
		return text(a.Factor) + " > 0"
	}
	return text(a.Factor) + " != 0"
}

func (s Step) json() []EliminateJSON {
	var out []EliminateJSON
	needs := []string{}
	for _, f := range s.Nonzero {
		needs = append(needs, text(f)+" != 0")
	}
	for _, sol := range s.Solutions {
		out = append(out, EliminateJSON{sol.Name, show.Notation(SumNode(sol.Sum)), orNull(sol.Equation), needs})
	}
	return out
}

func (r *Result) quantities(one *Single, more *Several) Quantities {
	var q Quantities
	if one != nil {
		q.Operator.Single = texts(one.Q)
		q.Kinetic, q.Gradient, q.Mass = optionalText(one.Kinetic), optionalText(one.Gradient), optionalText(one.Mass)
		q.SoundSpeedSquared = optionalText(one.SoundSpeed2)
		q.EquationOfMotion = r.motionText(one)
		if one.ZSquared != nil {
			q.Canonical = &CanonicalJSON{text(*one.ZSquared), r.pumpText(one)}
		}
	}
	if more != nil {
		q.Operator.Several = &MatrixJSON{matricesText(more.Form.Symmetric), matricesText(more.Form.Antisymmetric)}
		q.SoundSpeedEquation = texts(more.SoundSpeeds)
	}
	return q
}

// motionText is Σ cᵢ u⁽ⁱ⁾ = 0 or, where that is not written out, Σ (−1)ⁿ (qₙ u⁽ⁿ⁾)⁽ⁿ⁾ = 0.
func (r *Result) motionText(one *Single) *string {
	u := func(n int) string { return show.Notation(show.Symbol(r.Variable, n)) }
	var out string
	if c := one.EquationOfMotion; c != nil {
		var terms []show.Node
		for i := len(c) - 1; i >= 0; i-- {
			if !c[i].IsZero() {
				terms = append(terms, show.Product(show.Elem(c[i]), show.Symbol(r.Variable, i)))
			}
		}
		out = show.Notation(show.Sum(terms...))
	} else {
		for n := len(one.Q) - 1; n >= 0; n-- {
			sign := " + "
			if n%2 != 0 {
				sign = " - "
			}
			if out != "" || n%2 != 0 {
				out += sign
			}
			out += "((" + text(one.Q[n]) + ")*" + u(n) + ")" + strings.Repeat("'", n)
		}
		out = strings.TrimSpace(out)
	}
	out += " = 0"
	return &out
}

// pumpText is z″/z, underived where it is not written out.
func (r *Result) pumpText(one *Single) string {
	if one.ZppOverZ != nil {
		return text(*one.ZppOverZ)
	}
	z, eta := "("+text(*one.ZSquared)+")", "("+text(r.Model.A.Div(r.Model.Lapse))+")"
	return fmt.Sprintf("%s*(%s*%s')'/(2*%s) - (%s*%s')^2/(4*%s^2)", eta, eta, z, z, eta, z, z)
}

// formSeriesOrder is the order of the series of W in documents and on pages.
const formSeriesOrder = 4

func (r *Result) formFactorJSON() *FormFactorJSON {
	f, k := r.FormFactor, r.Model.K
	if f == nil {
		return nil
	}
	out := &FormFactorJSON{Weight: text(f.Weight), LocalDOF: f.LocalDOF, Operator: []string{}, Series: []string{}}
	for i := 0; i <= f.L.Order(); i++ {
		out.Operator = append(out.Operator, text(f.L.Coef(i)))
	}
	if w, ok := f.W(k); ok {
		out.W = optionalText(&w)
		out.Series = texts(f.Series(k, formSeriesOrder))
	}
	return out
}

func matricesText(ms [][][]field.Elem) [][][]string {
	out := make([][][]string, len(ms))
	for n, m := range ms {
		for _, row := range m {
			out[n] = append(out[n], texts(row))
		}
	}
	return out
}

// concernWords are the names of the concerns in JSON.
var concernWords = map[Concern]string{
	Ghost: "ghost", GradientSign: "gradient", MassSign: "mass", StrongCoupling: "strongCoupling",
	Ostrogradsky: "ostrogradsky", Growth: "growth",
}

// json is one object, or one for each minor that has to be positive.
func (s Statement) json() []StabilityJSON {
	out := StabilityJSON{Concern: concernWords[s.Concern]}
	if s.Number != 0 {
		out.Number = &s.Number
	}
	condition := func(e field.Elem, op string) *string {
		c := text(e) + op
		return &c
	}
	switch {
	case s.Concern == Growth:
		out.Verdict = "unbounded"
	case s.Concern == StrongCoupling:
		out.Verdict, out.Condition = "conditional", condition(s.Condition, " != 0")
	case s.Verdict == Always:
		out.Verdict = "stable"
	case s.Verdict == Never:
		out.Verdict = "unstable"
	case len(s.Minors) > 0:
		var all []StabilityJSON
		for _, m := range s.Minors {
			out.Verdict, out.Condition = "conditional", condition(m, " > 0")
			all = append(all, out)
		}
		return all
	default:
		out.Verdict, out.Condition = "conditional", condition(s.Condition, " > 0")
	}
	return []StabilityJSON{out}
}

// seriesJSON puts the coefficients of an expansion into the shape of the operator.
func (r *Result) seriesJSON(x *Expansion) SeriesJSON {
	out := SeriesJSON{In: x.In, Order: x.Order}
	if r.Single != nil {
		out.Operator.Single = make([]string, len(x.Places))
		out.Remainder.Single = make([]*int, len(x.Places))
		for i, p := range x.Places {
			out.Operator.Single[p.N] = text(x.Sum(i))
			out.Remainder.Single[p.N] = x.leftOut(i)
		}
		return out
	}
	values := matrixTable(r.Several.Form, "0")
	left := matrixTable[*int](r.Several.Form, nil)
	for i, p := range x.Places {
		v, rest := text(x.Sum(i)), x.leftOut(i)
		if p.Antisymmetric {
			values.anti[p.N][p.A][p.B], values.anti[p.N][p.B][p.A] = v, text(x.Sum(i).Neg())
			left.anti[p.N][p.A][p.B], left.anti[p.N][p.B][p.A] = rest, rest
			continue
		}
		values.sym[p.N][p.A][p.B], values.sym[p.N][p.B][p.A] = v, v
		left.sym[p.N][p.A][p.B], left.sym[p.N][p.B][p.A] = rest, rest
	}
	out.Operator.Several = &MatrixJSON{values.sym, values.anti}
	out.Remainder.Several = &struct {
		Symmetric     [][][]*int `json:"symmetric"`
		Antisymmetric [][][]*int `json:"antisymmetric"`
	}{left.sym, left.anti}
	return out
}

// Sum is the known part of the i-th coefficient.
func (x *Expansion) Sum(i int) field.Elem {
	var sum field.Elem
	for _, t := range x.Coefs[i].Terms {
		sum = sum.Add(x.Value(t))
	}
	return sum
}

func (x *Expansion) leftOut(i int) *int {
	if x.Coefs[i].Exact {
		return nil
	}
	n := x.Coefs[i].Order
	return &n
}

// table holds something for each entry of a matrix normal form.
type table[T any] struct{ sym, anti [][][]T }

func matrixTable[T any](form oper.MatrixNormalForm, fill T) table[T] {
	like := func(ms [][][]field.Elem) [][][]T {
		out := make([][][]T, len(ms))
		for n, m := range ms {
			for _, row := range m {
				line := make([]T, len(row))
				for i := range line {
					line[i] = fill
				}
				out[n] = append(out[n], line)
			}
		}
		return out
	}
	return table[T]{like(form.Symmetric), like(form.Antisymmetric)}
}
