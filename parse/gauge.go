package parse

import (
	"fmt"
	"slices"

	"remnant/parse/diag"
)

// Gauges and sectors of the covariant and adm forms, and the perturbations that each has.

// Gauge is a choice of perturbations that are set to zero.
type Gauge uint8

const (
	Unitary   Gauge = iota // δφ = E = 0
	Flat                   // ζ = E = 0
	Newtonian              // B = E = 0
	Open                   // every perturbation is kept
)

// String is the word of the notation.
func (g Gauge) String() string { return gaugeWords[g] }

// Sector is a representation of the rotations.
type Sector uint8

const (
	ScalarSector Sector = iota
	VectorSector
	TensorSector
)

// Polarisations is how many fields each perturbation of the sector stands for: a transverse
// vector has two, and so has a transverse and traceless tensor.
func (s Sector) Polarisations() int {
	if s == ScalarSector {
		return 1
	}
	return 2
}

// String is the word of the notation.
func (s Sector) String() string { return sectorWords[s] }

// Perturbations lists the fields of a gauge and sector by their names in the notation, in the
// order in which the quadratic form has them: the metric's, then those of the scalars, of
// which the unitary gauge removes the first.
func Perturbations(g Gauge, s Sector, scalars []string) []string {
	switch s {
	case VectorSector:
		if g == Open {
			return []string{"S", "W"}
		}
		return []string{"S"}
	case TensorSector:
		return []string{"gamma"}
	}
	out := map[Gauge][]string{
		Unitary: {"A", "B", "zeta"}, Flat: {"A", "B"}, Newtonian: {"A", "zeta"}, Open: {"A", "B", "zeta", "E"},
	}[g]
	for i, name := range scalars {
		if g != Unitary || i > 0 {
			out = append(out, "d"+name)
		}
	}
	return out
}

// gauge reads gauge and sector of a covariant or adm model and enters its perturbations, which no
// statement declares. Without a statement it is the unitary gauge where there is a scalar
// field or the form is adm, and else the newtonian one.
func (e *elaborator) gauge() {
	m := e.model
	if e.quadratic() {
		return
	}
	chosen := false
	for _, s := range e.file.Statements {
		switch {
		case e.repeated[s]:
		case s.Gauge != nil:
			g := Gauge(slices.Index(gaugeWords, s.Gauge.Text))
			if e.try(func() { e.admGauge(g, s.Gauge.Span()) }) {
				m.Gauge, m.GaugeSpan, chosen = g, s.Gauge.Span(), true
			}
		case s.Sector != nil:
			m.Sector = Sector(slices.Index(sectorWords, s.Sector.Text))
		case s.Lagrangian != nil && !chosen:
			m.GaugeSpan = s.At
		}
	}
	var scalars []string
	if !e.isADM() {
		for _, g := range m.Scalars() {
			scalars = append(scalars, e.k.Info(g).Name)
		}
	}
	if !chosen && len(scalars) == 0 && !e.isADM() {
		m.Gauge = Newtonian
	}
	for i, name := range Perturbations(m.Gauge, m.Sector, scalars) {
		m.Fields = append(m.Fields, FieldDecl{name, diag.Span{}})
		if old, ok := e.symbols[name]; ok && old.kind != symbolField { // fields have their own refusal
			e.report(newFault(diag.Reserved, old.at, fmt.Sprintf("'%s' is a perturbation of the %s form and cannot be declared", name, e.form), "another name is needed"))
			continue
		}
		e.enter(&symbol{name: name, kind: symbolField, index: i})
	}
}

// Variant is the model in another gauge and sector, over the same field K: what it keeps
// stays where the variant has that perturbation.
func (m *Model) Variant(g Gauge, s Sector) *Model {
	out := *m
	out.Gauge, out.Sector, out.Fields, out.Keep = g, s, nil, nil
	var scalars []string
	for _, x := range m.Scalars() {
		scalars = append(scalars, m.K.Info(x).Name)
	}
	for i, name := range Perturbations(g, s, scalars) {
		out.Fields = append(out.Fields, FieldDecl{Name: name})
		if m.Keep != nil && m.Keep.Name == name && m.Keep.Definition == nil {
			out.Keep = &Keep{Name: name, Span: m.Keep.Span, Field: i}
		}
	}
	if g == m.Gauge && s == m.Sector {
		out.Keep = m.Keep
	}
	return &out
}
