package main

// What a page says of gauge and sector: what is set to zero, and how the geometry is
// perturbed.

import (
	"slices"
	"strings"

	"remnant/expr/show"
	"remnant/parse"
)

// expandable reports whether a model is of a form that is expanded.
func expandable(m *parse.Model) bool { return m.Covariant != nil || m.ADM != nil }

// variantRows are gauge and sector, of a model that has them; the sector only where it is not
// that of scalars.
func variantRows(m *parse.Model) []row {
	if !expandable(m) {
		return nil
	}
	var rows []row
	if g := gaugePhrase(m); g != nil {
		rows = append(rows, row{label: words("gauge"), value: g})
	}
	switch m.Sector {
	case parse.VectorSector:
		rows = append(rows, row{label: words("sector"), value: words("vector; squares are summed over the index")})
	case parse.TensorSector:
		rows = append(rows, row{label: words("sector"), value: words("tensor; squares are summed over the indices")})
	}
	return rows
}

// gaugePhrase is the gauge with the perturbations that it sets to zero; nil for tensors.
func gaugePhrase(m *parse.Model) phrase {
	zero := func(names ...string) phrase {
		var f formula
		for _, n := range names {
			f = append(f, part{node: show.Symbol(n, 0)}, part{sign: equals})
		}
		return phrase{{maths: append(f, part{node: show.Int(0)})}}
	}
	name := m.Gauge.String()
	switch {
	case m.Sector == parse.TensorSector:
		return nil
	case m.Gauge == parse.Open:
		return words(name + ", nothing is set to zero")
	case m.Sector == parse.VectorSector:
		return zero("W")
	case m.Gauge == parse.Flat:
		return join(", ", words(name), zero("zeta", "E"))
	case m.Gauge == parse.Newtonian:
		return join(", ", words(name), zero("B", "E"))
	case m.ADM != nil:
		return join(", ", words(name), zero("E"))
	}
	if s := m.Scalars(); len(s) > 0 {
		return join(", ", words(name), zero("d"+m.K.Info(s[0]).Name, "E"))
	}
	return join("", words(name+", δR = "), zero("E"))
}

// perturbedRow says how lapse, shift, slices and scalars are perturbed.
func perturbedRow(m *parse.Model) row {
	has := func(name string) bool {
		return slices.ContainsFunc(m.Fields, func(f parse.FieldDecl) bool { return f.Name == name })
	}
	var parts []string
	if has("A") {
		parts = append(parts, "lapse "+[...]string{parse.Cosmic: "1 + A", parse.Conformal: "a(1 + A)", parse.Efolds: "(1 + A)/H"}[m.Clock])
	}
	switch {
	case has("B"):
		parts = append(parts, "shift ∂B")
	case has("S"):
		parts = append(parts, "shift S")
	}
	var slice []string
	for _, x := range []struct{ name, text string }{{"zeta", "2ζ"}, {"E", "2∂∂E"}, {"gamma", "γ"}} {
		if has(x.name) {
			slice = append(slice, x.text)
		}
	}
	switch {
	case slice != nil:
		parts = append(parts, "metric of the slices a² exp("+strings.Join(slice, " + ")+")")
	case has("W"):
		parts = append(parts, "metric of the slices a²(1 + 2∂W + …), ∂W symmetrised")
	default:
		parts = append(parts, "metric of the slices a²")
	}
	for _, s := range m.Scalars() {
		if name := m.K.Info(s).Name; has("d" + name) {
			parts = append(parts, show.UnicodeName(name)+" + "+show.UnicodeName("d"+name))
		}
	}
	return row{label: words("perturbed"), value: words(strings.Join(parts, ", "))}
}
