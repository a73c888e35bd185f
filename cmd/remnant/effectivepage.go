package main

// What the page of a reduction says where higher derivatives are small.

import (
	"fmt"

	"remnant/expr/field"
	"remnant/expr/show"
)

// effective is the section on the action of second order.
func (f *findings) effective() *section {
	if f.lowered == nil {
		return nil
	}
	low := f.lowered.Field
	s := &section{heading: words(fmt.Sprintf("Effective at second order, cut after degree %d in the small parameters", f.lowered.Order))}
	s.blocks = append(s.blocks, block{display: show.Action(clockName(f.Model.Clock), f.Variable, low.Q)})
	var rows []row
	for _, q := range []struct {
		label string
		e     *field.Elem
	}{{"kinetic", low.Kinetic}, {"gradient", low.Gradient}, {"mass", low.Mass}, {"sound speed²", low.SoundSpeed2}} {
		if q.e != nil {
			rows = append(rows, row{label: words(q.label), value: maths(show.Elem(*q.e))})
		}
	}
	if rows != nil {
		s.blocks = append(s.blocks, block{rows: rows})
	}
	s.blocks = append(s.blocks, block{sentence: words("The modes that are left out lie where the small terms are of order one.")})
	return s
}
