package main

// expand prints what an action is at second order before anything is eliminated: the
// background equations and the quadratic Lagrangian.

import (
	"context"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/reduce"
)

// expandOptions are the flags of expand.
type expandOptions struct {
	limits
	layout
	variant
	verification
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
			return o.run(cmd.Context(), std, args[0])
		},
	}
	o.variant.flags(cmd)
	o.verification.flags(cmd)
	cmd.Flags().BoolVar(&o.full, "full", false, "write long coefficients in their places, without names")
	o.layout.flags(cmd)
	o.limits.flags(cmd)
	return cmd
}

func (o *expandOptions) check(cmd *cobra.Command) error {
	for _, check := range []func(*cobra.Command) error{o.layout.check, o.variant.check, o.verification.check} {
		if err := check(cmd); err != nil {
			return err
		}
	}
	return o.limits.check(cmd)
}

func (o *expandOptions) run(ctx context.Context, std streams, path string) error {
	b, done := o.budget(ctx)
	defer done()
	stop := watch(std.err, b)
	data, failed, err := o.compute(std, path, b)
	stop()
	if err != nil {
		return err
	}
	if err := deliver(std, o.output, data); err != nil {
		return err
	}
	return failed
}

// compute does all the work, so that nothing is written before it is done; failed is the
// outcome of a check that did.
func (o *expandOptions) compute(std streams, path string, b *budget.Budget) (data []byte, failed, err error) {
	defer budget.Catch(&err)
	src, err := readSource(std, path)
	if err != nil {
		return nil, nil, err
	}
	m, err := parse.Load(src, b)
	if err != nil {
		return nil, nil, err
	}
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
