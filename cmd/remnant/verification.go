package main

// --check gauge: the Noether identities, verified and printed.

import (
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"remnant/expr/oper"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
	"remnant/rules"
)

// verification holds the flag that asks for a check.
type verification struct{ name string }

func (v *verification) flags(cmd *cobra.Command) {
	cmd.Flags().StringVar(&v.name, "check", "", "verify an `identity`: gauge")
}

func (v *verification) check(cmd *cobra.Command) error {
	if cmd.Flags().Changed("check") && v.name != "gauge" {
		return usage(cmd, fmt.Sprintf("--check is gauge, not '%s'", v.name))
	}
	return nil
}

// of checks each model; without the flag there is nil for each.
func (v *verification) of(variants *reduce.Variants, models []*parse.Model) ([]*reduce.GaugeCheck, error) {
	out := make([]*reduce.GaugeCheck, len(models))
	if v.name == "" {
		return out, nil
	}
	for i, m := range models {
		if m.Covariant == nil && m.ADM == nil {
			return nil, &refusal{"a quadratic Lagrangian has no gauge identities of its own: --check gauge does not apply to it",
				"it verifies the expansion of a covariant or adm Lagrangian"}
		}
		var err error
		if out[i], err = variants.CheckGauge(m); err != nil {
			return nil, err
		}
	}
	return out, nil
}

// outcome is the error of checks of which one failed, else nil.
func outcome(checks []*reduce.GaugeCheck) error {
	var failed []string
	for _, c := range checks {
		if c == nil {
			continue
		}
		for _, id := range c.Identities {
			if !id.Holds() {
				failed = append(failed, directionText(id))
			}
		}
	}
	if failed == nil {
		return nil
	}
	return &differs{"the action changes under a change of coordinates: " + strings.Join(failed, ", ")}
}

// directionText says what moves: time by T, space by ∂L or by V.
func directionText(id rules.GaugeIdentity) string {
	return map[string]string{"T": "time by T", "L": "space by ∂L", "V": "space by V"}[id.Parameter]
}

// checkSection prints a check; nil for none.
func checkSection(c *reduce.GaugeCheck) *section {
	switch {
	case c == nil:
		return nil
	case len(c.Identities) == 0:
		return &section{heading: words("Noether check"), blocks: []block{{
			sentence: words("Tensors do not change under linearised changes of coordinates: there is nothing to check.")}}}
	case c.Holds():
		return &section{heading: words("Noether check: before the gauge is fixed the action does not change when these move"),
			blocks: []block{{rows: identityRows(c)}}}
	}
	return &section{heading: words("Noether check: it fails, the action is not invariant"), blocks: []block{{rows: identityRows(c)}}}
}

func identityRows(c *reduce.GaugeCheck) []row {
	var rows []row
	for _, id := range c.Identities {
		var moves, left []phrase
		for i, name := range id.Fields {
			if !id.Change[i].IsZero() {
				moves = append(moves, join(" by ", maths(show.Symbol(name, 0)), operated(id.Change[i], id.Parameter)))
			}
			if !id.Left[i].IsZero() {
				left = append(left, join("", words("in the equation of "), maths(show.Symbol(name, 0)), words(" "), operated(id.Left[i], id.Parameter), words(" is left")))
			}
		}
		note := words("holds")
		if left != nil {
			note = list(left)
		}
		rows = append(rows, row{label: words(directionText(id)), value: list(moves), note: note})
	}
	return rows
}

func operated(a oper.Oper, name string) phrase { return maths(reduce.OperatorNode(a, name)) }
