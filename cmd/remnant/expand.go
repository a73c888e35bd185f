package main

// expand prints what an action is at second order before anything is eliminated: the
// background equations and the quadratic Lagrangian.

import (
	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/reduce"
)

// expandOptions are the flags of expand.
type expandOptions struct {
	job
	full bool
}

func expandCommand(std streams) *cobra.Command {
	o := &expandOptions{}
	cmd := &cobra.Command{
		Use:   "expand FILE",
		Short: "Print the background equations and the quadratic Lagrangian of an action",
		Long: "expand reads a covariant or adm model and prints its background equations and its\n" +
			"Lagrangian at second order in the perturbations, before anything is eliminated.\n" +
			"--check gauge verifies the Noether identities: before the gauge is fixed, the quadratic\n" +
			"action does not change under a change of coordinates. FILE may be -, for standard input.",
		Example: "  remnant expand testdata/kestrel.act\n" +
			"  remnant expand testdata/kestrel.act --gauge open --check gauge\n" +
			"  remnant expand testdata/kestrel.act --sector all --format json",
		Args: oneFile,
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := o.check(cmd); err != nil {
				return err
			}
			return o.run(cmd.Context(), std, args[0], func(m *parse.Model, b *budget.Budget) ([]byte, error, error) {
				return o.compute(std, m, b)
			})
		},
	}
	cmd.Flags().BoolVar(&o.full, "full", false, "write long coefficients in their places, without names")
	o.job.flags(cmd)
	return cmd
}

// compute expands and writes the result.
func (o *expandOptions) compute(std streams, m *parse.Model, b *budget.Budget) (data []byte, failed, err error) {
	list, checks, err := o.find(m)
	if err != nil {
		return nil, nil, err
	}
	b.Stage("writing the result")
	if o.format == "json" {
		data, err = o.document(list, checks)
		return data, outcome(checks), err
	}
	p := expansionPage(list, checks, o.full)
	return o.layout.page(std, p, m.Clock == parse.Conformal), outcome(checks), nil
}

// find expands the model, in the sectors asked for, and checks what was asked for.
func (o *expandOptions) find(m *parse.Model) ([]*reduce.Expanded, []*reduce.GaugeCheck, error) {
	models, err := o.variant.of(m)
	if err != nil {
		return nil, nil, err
	}
	var variants reduce.Variants
	var list []*reduce.Expanded
	for _, m := range models {
		x, err := variants.Expand(m)
		if err != nil {
			return nil, nil, err
		}
		list = append(list, x)
	}
	checks, err := o.verification.of(&variants, models)
	return list, checks, err
}

// document is the JSON form.
func (o *expandOptions) document(list []*reduce.Expanded, checks []*reduce.GaugeCheck) ([]byte, error) {
	var out []*reduce.ExpansionDocument
	for i, x := range list {
		out = append(out, x.Document(checks[i]))
	}
	if o.all() {
		return reduce.EncodeSectors(out)
	}
	return out[0].Encode()
}
