package rules

// The Noether check. An action that is a scalar does not change under a change of
// coordinates, so before any gauge is fixed 𝒟·G = 0 modulo the background equations, for the
// linearised change G of every perturbation (the second Noether identity). It tests the whole
// expansion: geometry, background equations and quadratic form.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
)

// GaugeIdentity is the check for one direction of the coordinates.
type GaugeIdentity struct {
	Parameter string      // T of τ → τ + T, L of xⁱ → xⁱ + ∂ᵢL, or the transverse V of xⁱ → xⁱ + Vⁱ
	Fields    []string    // the perturbations, in the order of the rows
	Change    []oper.Oper // how each moves, an operator on the parameter
	Left      []oper.Oper // what is left of each row of 𝒟·G; all zero if the identity holds
}

// Holds reports whether the identity holds.
func (g GaugeIdentity) Holds() bool {
	for _, a := range g.Left {
		if !a.IsZero() {
			return false
		}
	}
	return true
}

// CheckGauge expands a covariant or adm model without fixing the gauge, in its sector, and checks
// the identity of each direction. Tensors do not change under linearised changes of
// coordinates; for them there is nothing to check, and the list is empty.
func CheckGauge(m *parse.Model) ([]GaugeIdentity, error) { return new(Expander).CheckGauge(m) }

// CheckGauge is the check beside other expansions of the model.
func (s *Expander) CheckGauge(m *parse.Model) ([]GaugeIdentity, error) {
	open := m.Variant(parse.Open, m.Sector)
	var names []string
	for _, f := range open.Fields {
		names = append(names, f.Name)
	}
	x, err := s.Expand(open)
	if err != nil {
		return nil, err
	}
	for _, f := range x.Model.Fields[len(names):] {
		names = append(names, f.Name) // of form factors: they do not change
	}
	d := Form(x.Model, x.Model.Quadratic, len(names))
	var out []GaugeIdentity
	for _, g := range generators(m) {
		id := GaugeIdentity{Parameter: g.parameter, Fields: names}
		for i := range names {
			var sum oper.Oper
			for j, n := range names {
				sum = sum.Add(d.At(i, j).Mul(g.change[n]))
			}
			id.Change = append(id.Change, g.change[names[i]])
			id.Left = append(id.Left, sum.Map(field.Elem.Lowest))
		}
		out = append(out, id)
	}
	return out, nil
}

// generator is the change of each perturbation, acting on a parameter.
type generator struct {
	parameter string
	change    map[string]oper.Oper
}

// generators are, with g → g + £_ξ g and the conventions of the perturbations,
//
//	ξ = (T, ∂ᵢL): δA = T′ + (N̄′/N̄)T, δB = a²L′ − N̄²T, δζ = (a′/a)T, δE = L, δφ = φ′T;
//	ξ = (0, Vᵢ):  δS = a²V′, δW = V.
//
// An action of the adm form has the second and the third alone: its slices are fixed.
func generators(m *parse.Model) []generator {
	one := m.K.Int(1)
	a2, n := m.A.Mul(m.A), m.Lapse
	switch m.Sector {
	case parse.VectorSector:
		return []generator{{"V", map[string]oper.Oper{"S": oper.Mono(a2, 1), "W": oper.New(one)}}}
	case parse.TensorSector:
		return nil
	}
	time := map[string]oper.Oper{
		"A":    oper.New(n.D().Div(n), one),
		"B":    oper.New(n.Mul(n).Neg()),
		"zeta": oper.New(m.A.D().Div(m.A)),
	}
	for _, s := range m.Scalars() {
		time["d"+m.K.Info(s).Name] = oper.New(m.K.Jet(s, 1))
	}
	space := map[string]oper.Oper{"B": oper.Mono(a2, 1), "E": oper.New(one)}
	if m.ADM != nil {
		return []generator{{"L", space}}
	}
	return []generator{{"T", time}, {"L", space}}
}
