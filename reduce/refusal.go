package reduce

// Refusals of a model that the notation accepts. The comment of each kind holds the smallest
// example; a test runs the examples.

import (
	"errors"
	"fmt"
	"strings"

	"remnant/expr/oper"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/parse/diag"
)

const (
	// KeptField: the field to keep is fixed by the others, and another one propagates.
	//
	// Example:
	//	fields u, v
	//	lagrangian quadratic = u'^2/2 - v^2/2 + u*v
	//	keep v
	KeptField diag.Kind = "kept field does not propagate"

	// Undefined: a question that needs numbers or a definition which the model lacks. A test of
	// the zeros makes the example.
	Undefined diag.Kind = "number or definition missing"

	// GaugeDirection: the action does not change in some direction, for every k.
	//
	// Example:
	//	fields u, v
	//	lagrangian quadratic = (u' - v)^2/2
	GaugeDirection diag.Kind = "gauge direction"
)

// keptRemains looks whether the kept field carries the mode. It does not if it could be
// solved for, had it not been kept. A new variable that holds the velocity may still take the
// mode's place; anything else is refused, naming what propagates.
func keptRemains(r *Result, e *elimination) (*elimination, error) {
	m := r.Model
	keep := e.now.index(e.keep)
	if m.Keep == nil || keep < 0 || len(e.now.Names) < 2 {
		return e, nil
	}
	if p, ok := e.now.choosePivot(-1); !ok || p.p != keep && p.q != keep {
		return e, nil
	}
	free, err := eliminate(r.Initial, m.Wavenumber, r.Count, r.Initial.Names, "")
	if err != nil {
		return nil, err
	}
	if exchange(m, free) {
		return free, nil
	}
	names := quoteAll(free.now.Names)
	return nil, diag.List{{
		Kind: KeptField, Source: m.Source, Span: m.Keep.Span,
		Summary: fmt.Sprintf("'%s' does not propagate: it is fixed by the other fields", m.Keep.Name),
		Hint:    "what propagates is " + names + "; write 'keep " + free.now.Names[0] + "'",
	}}
}

func quoteAll(names []string) string {
	q := make([]string, len(names))
	for i, n := range names {
		q[i] = "'" + n + "'"
	}
	return strings.Join(q, " and ")
}

// gaugeDiagnostic says in which direction the action does not change.
func gaugeDiagnostic(m *parse.Model, err error) error {
	var g *GaugeError
	if !errors.As(err, &g) {
		return err
	}
	var parts []string
	for _, a := range g.Direction {
		parts = append(parts, "δ"+show.UnicodeName(a.Name)+" = "+operatorOn(a.Coef, "ξ"))
	}
	at, hint := m.LagrangianSpan, "fix the gauge: leave out one field that this direction moves, where that fixes it completely"
	if m.Gauge == parse.Open && (m.Covariant != nil || m.ADM != nil) {
		at, hint = m.GaugeSpan, "an open gauge is for 'remnant expand'; unitary, flat and newtonian can be reduced"
	}
	if m.ADM != nil && m.Gauge != parse.Open {
		hint = "an operator in N, K or R3 is needed that depends on this combination of the perturbations"
	}
	return diag.List{{
		Kind: GaugeDirection, Source: m.Source, Span: at,
		Summary: "the action has a gauge direction, " + strings.Join(parts, ", ") + ": its matrix is singular for every k",
		Hint:    hint,
	}}
}

func operatorOn(a oper.Oper, name string) string {
	var terms []show.LinearTerm
	for i := a.Order(); i >= 0; i-- {
		if c := a.Coef(i); !c.IsZero() {
			terms = append(terms, show.LinearTerm{Coef: c, Name: name, Order: i})
		}
	}
	return show.Text(show.Linear(terms), 0)
}
