package reduce

// The JSON form of an expansion: format 1, with the promises of the form of a reduction.

import (
	"bytes"
	"encoding/json"

	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/rules"
)

// ExpansionDocument is the JSON form of an expansion.
type ExpansionDocument struct {
	Format int     `json:"format"` // 1
	Model  *string `json:"model"`  // the title
	Clock  string  `json:"clock"`  // cosmic, conformal or efolds
	Gauge  *string `json:"gauge"`  // unitary, flat, newtonian or open; null for a quadratic model
	Sector *string `json:"sector"` // scalar, vector or tensor; null for a quadratic model

	// Background lists the Euler–Lagrange equations of the background, in the order in which
	// they were solved; empty for a quadratic model. Relations are what they and the model's
	// givens come to, as they are applied.
	Background []BackgroundJSON `json:"background"`
	Relations  []EquationJSON   `json:"relations"`

	// Lagrangian is quadratic in Fields and can be read back as a quadratic Lagrangian with
	// these fields and relations: S = ∫dτ d³x L. For tensors gamma² is gamma_ij gamma_ij, for
	// vectors S² is S_i S_i.
	Lagrangian string   `json:"lagrangian"`
	Fields     []string `json:"fields"`

	// FormFactors lists the terms −½√−ḡ Y (wF(□̄))⁻¹ Y that stand beside the Lagrangian, with Y
	// one of the fields; empty where the action has no form factor.
	FormFactors []NonLocalJSON `json:"formFactors"`

	Assumptions []string `json:"assumptions"` // "H != 0" or "x > 0"

	GaugeCheck *GaugeCheckJSON `json:"gaugeCheck"` // null if it was not asked for
}

// BackgroundJSON is an equation as derived, "… = 0": the left side is the Euler–Lagrange
// expression of the density √−g L by From, with A that of the lapse and zeta that of the
// logarithm of the scale factor.
type BackgroundJSON struct {
	Equation  string  `json:"equation"`
	From      string  `json:"from"`
	SolvedFor *string `json:"solvedFor"` // null: it follows from the equations before it
}

// NonLocalJSON is the term of one form factor F: Y is Field and w is Weight.
type NonLocalJSON struct {
	FormFactor string `json:"formFactor"`
	Field      string `json:"field"`
	Weight     string `json:"weight"`
}

// GaugeCheckJSON holds the Noether identities; for tensors there are none.
type GaugeCheckJSON struct {
	Holds      bool           `json:"holds"`
	Identities []IdentityJSON `json:"identities"`
}

// IdentityJSON is the identity of one direction: T of τ → τ + T, L of xⁱ → xⁱ + ∂ᵢL, V of
// xⁱ → xⁱ + Vⁱ. Left is what is left of the equation of each field, an operator on the
// parameter; empty if the identity holds.
type IdentityJSON struct {
	Direction string     `json:"direction"`
	Holds     bool       `json:"holds"`
	Left      []LeftJSON `json:"left"`
}

// LeftJSON is what is left in the equation of a field.
type LeftJSON struct {
	Field string `json:"field"`
	Left  string `json:"left"`
}

// Document gives the JSON form; check (nil: none) is put in.
func (x *Expanded) Document(check *GaugeCheck) *ExpansionDocument {
	m := x.Model
	d := &ExpansionDocument{
		Format: JSONFormat, Model: orNull(m.Title), Clock: m.Clock.String(),
		Background: []BackgroundJSON{}, Relations: relationsJSON(m.K), Fields: append([]string{}, x.Form.Names...),
		Lagrangian: show.Notation(x.LagrangianNode()), Assumptions: []string{},
		FormFactors: []NonLocalJSON{}, GaugeCheck: check.Document(),
	}
	d.Gauge, d.Sector = gaugeWords(m)
	for _, eq := range x.Background {
		item := BackgroundJSON{Equation: text(eq.Value.Lowest()) + " = 0", From: eq.From}
		if eq.Solved {
			item.SolvedFor = orNull(show.Notation(show.Generator(m.K, eq.Leader)))
		}
		d.Background = append(d.Background, item)
	}
	for _, n := range x.NonLocal {
		d.FormFactors = append(d.FormFactors, NonLocalJSON{n.Form.Name, x.Form.Names[n.Field], text(n.Weight)})
	}
	for _, a := range x.Assumptions {
		d.Assumptions = append(d.Assumptions, assumptionText(a))
	}
	return d
}

// gaugeWords are gauge and sector of a model that has them.
func gaugeWords(m *parse.Model) (gauge, sector *string) {
	if m.Covariant == nil && m.ADM == nil {
		return nil, nil
	}
	return orNull(m.Gauge.String()), orNull(m.Sector.String())
}

func relationsJSON(k *field.Field) []EquationJSON {
	out := []EquationJSON{}
	for _, rule := range k.Rules() {
		out = append(out, EquationJSON{show.Notation(show.Equation(show.Generator(k, rule.Leader), show.Elem(rule.Value)))})
	}
	return out
}

// Document gives the JSON form; it is nil for none.
func (g *GaugeCheck) Document() *GaugeCheckJSON {
	if g == nil {
		return nil
	}
	d := &GaugeCheckJSON{Holds: g.Holds(), Identities: []IdentityJSON{}}
	for _, id := range g.Identities {
		d.Identities = append(d.Identities, identityJSON(id))
	}
	return d
}

func identityJSON(g rules.GaugeIdentity) IdentityJSON {
	out := IdentityJSON{Direction: g.Parameter, Holds: g.Holds(), Left: []LeftJSON{}}
	for i, a := range g.Left {
		if !a.IsZero() {
			out.Left = append(out.Left, LeftJSON{g.Fields[i], show.Notation(OperatorNode(a, g.Parameter))})
		}
	}
	return out
}

// OperatorNode lays out an operator acting on a name.
func OperatorNode(a oper.Oper, name string) show.Node { return SumNode([]Addend{{a, name}}) }

// SectorsDocument is the JSON form of several variants of a model.
type SectorsDocument[T any] struct {
	Format  int `json:"format"` // 1
	Sectors []T `json:"sectors"`
}

// EncodeSectors writes the documents of several variants: expansions or reductions.
func EncodeSectors[T any](list []T) ([]byte, error) {
	return encodeIndented(SectorsDocument[T]{JSONFormat, list})
}

// Encode writes the document with an indent of two spaces.
func (d *ExpansionDocument) Encode() ([]byte, error) { return encodeIndented(d) }

func encodeIndented(v any) ([]byte, error) {
	var b bytes.Buffer
	enc := json.NewEncoder(&b)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", "  ")
	err := enc.Encode(v)
	return b.Bytes(), err
}
