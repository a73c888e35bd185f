package main

// What a page says of gauge and sector: what is set to zero, and how the geometry is
// perturbed.

import (
	"slices"

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
	var parts []phrase
	one := show.Sum(show.Int(1), show.Symbol("A", 0))
	lapse := map[parse.Clock]show.Node{
		parse.Cosmic: one, parse.Conformal: show.Product(show.Symbol("a", 0), one), parse.Efolds: show.Quotient(one, show.Symbol("H", 0)),
	}
	if has("A") {
		parts = append(parts, join("", words("lapse "), maths(lapse[m.Clock])))
	}
	switch {
	case has("B"):
		parts = append(parts, join("", words("shift ∂"), maths(show.Symbol("B", 0))))
	case has("S"):
		parts = append(parts, join("", words("shift "), maths(show.Symbol("S", 0))))
	}
	parts = append(parts, join("", words("metric of the slices "), slicesPhrase(has)))
	for _, s := range m.Scalars() {
		if name := m.K.Info(s).Name; has("d" + name) {
			parts = append(parts, maths(show.Sum(show.Symbol(name, 0), show.Symbol("d"+name, 0))))
		}
	}
	return row{label: words("perturbed"), value: list(parts)}
}

// slicesPhrase is the metric of the slices, a² times the exponential of a matrix; numbers in
// it stand for multiples of the identity.
func slicesPhrase(has func(string) bool) phrase {
	scale := show.Power(show.Symbol("a", 0), 2)
	if has("W") {
		return join("", maths(scale), words("(1 + 2∂"), maths(show.Symbol("W", 0)), words(" + …), symmetrised"))
	}
	two := func(x show.Node) show.Node { return show.Product(show.Int(2), x) }
	var exponent phrase
	switch {
	case has("gamma"):
		exponent = maths(show.Symbol("gamma", 0))
	case has("zeta"):
		exponent = maths(two(show.Symbol("zeta", 0)))
	default:
		return maths(scale)
	}
	if has("E") {
		exponent = join("", exponent, words(" + 2∂∂"), maths(show.Symbol("E", 0)))
	}
	return join("", maths(scale), words(" exp("), exponent, words(")"))
}
