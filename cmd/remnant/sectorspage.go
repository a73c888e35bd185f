package main

// A reduction in all sectors as one page: what is common at its head, then the sections of
// each sector, then the count.

import (
	"remnant/expr/field"
	"remnant/parse"
)

// sectorWord names the perturbations of a sector.
var sectorWord = map[parse.Sector]string{
	parse.ScalarSector: "Scalars", parse.VectorSector: "Vectors", parse.TensorSector: "Tensors",
}

// abbreviationLabel is the label under which the head of a page has the model's abbreviations.
const abbreviationLabel = "let"

// sectorsPage joins the pages of a reduction in all sectors.
func sectorsPage(list []*findings, pages []*page) *page {
	first := list[0]
	var assumed []field.Assumption
	total, beside := 0, ""
	for _, f := range list {
		if f.FormFactor != nil {
			beside = " beside the poles of the form factor"
		}
		assumed = joinAssumptions(assumed, f.Assumptions)
		total += f.DegreesOfFreedom
	}
	p := &page{title: pages[0].title, head: sectorsHead(first.Model, assumed)}
	for _, q := range pages {
		for _, r := range q.head {
			if len(r.label) == 1 && r.label[0].words == abbreviationLabel {
				p.head = append(p.head, r)
			}
		}
	}
	for i, f := range list {
		p.sections = append(p.sections, headed(sectorWord[f.Model.Sector], pages[i].sections)...)
	}
	p.sections = append(p.sections, section{heading: words("All sectors: " + degrees(total) + beside)})
	return p
}

// headed puts the name of a sector before the headings of its sections.
func headed(name string, sections []section) []section {
	var out []section
	for _, s := range sections {
		s.heading = join("", words(name+" — "), s.heading)
		out = append(out, s)
	}
	return out
}

// sectorsHead is the head of a page of all sectors.
func sectorsHead(m *parse.Model, assumed []field.Assumption) []row {
	rows := []row{clockRow(m.Clock)}
	gauge := gaugePhrase(m)
	if m.Gauge != parse.Open {
		gauge = join("; vectors: ", gauge, gaugePhrase(m.Variant(m.Gauge, parse.VectorSector)))
	}
	rows = append(rows,
		row{label: words("gauge"), value: gauge},
		row{label: words("sectors"), value: words("scalar, vector, tensor; squares are summed over indices")})
	return append(rows, conditionRows(m.K, assumed)...)
}

// joinAssumptions adds those of more that are new.
func joinAssumptions(all, more []field.Assumption) []field.Assumption {
	for _, a := range more {
		known := false
		for _, b := range all {
			known = known || a.Positive == b.Positive && a.Factor.Equal(b.Factor)
		}
		if !known {
			all = append(all, a)
		}
	}
	return all
}
