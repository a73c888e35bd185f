package main

// reduce is the main job: a model in, what remains out.

import (
	"errors"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/parse/diag"
	"remnant/reduce"
)

// reduceOptions are the flags of reduce.
type reduceOptions struct {
	job
	steps  bool
	full   bool
	series int
	at     string
}

// noSeries says that --series was not given.
const noSeries = -1

// maxSeries bounds --series, as the notation bounds 'small … to order'.
const maxSeries = 100

func reduceCommand(std streams) *cobra.Command {
	o := &reduceOptions{}
	cmd := &cobra.Command{
		Use:   "reduce FILE",
		Short: "Solve the constraints of an action and print what remains",
		Long: "reduce reads a model, solves its constraints and prints the operator that remains:\n" +
			"its action, degrees of freedom, sound speed, equation of motion and stability.\n" +
			"FILE may be -, for standard input.",
		Example: "  remnant reduce testdata/plover.act\n" +
			"  remnant reduce testdata/plover.act --steps --ascii\n" +
			"  remnant reduce testdata/plover.act --at \"a = 1; H = 1/10; eps = 1/100; k = 2\"\n" +
			"  remnant reduce testdata/gannet.act --series 4 --format latex -o gannet.tex\n" +
			"  remnant reduce testdata/kestrel.act --sector all --check gauge",
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
	flags := cmd.Flags()
	flags.BoolVar(&o.steps, "steps", false, "show the action after each step")
	flags.BoolVar(&o.full, "full", false, "write out long expressions that follow from others")
	flags.IntVar(&o.series, "series", noSeries, "expand what remains up to this `order`")
	flags.StringVar(&o.at, "at", "", "give exact values at a `point`: \"H = 1/10; k = 2\", or @FILE")
	o.job.flags(cmd)
	return cmd
}

func (o *reduceOptions) check(cmd *cobra.Command) error {
	if err := o.job.check(cmd); err != nil {
		return err
	}
	switch {
	case o.series != noSeries && o.series < 0, o.series > maxSeries:
		return usage(cmd, "--series is an order from 0 to 100")
	case cmd.Flags().Changed("at") && o.at == "":
		return usage(cmd, "--at needs a point, such as \"H = 1/10; k = 2\"")
	}
	return nil
}

// compute reduces and writes the result.
func (o *reduceOptions) compute(std streams, m *parse.Model, b *budget.Budget) (data []byte, failed, err error) {
	list, err := o.find(std, m)
	if err != nil {
		return nil, nil, err
	}
	failed = outcome(checksOf(list))
	b.Stage("writing the result")
	if o.format == "json" {
		data, err = o.document(list)
		return data, failed, err
	}
	pages := make([]*page, len(list))
	for i, f := range list {
		pages[i] = pageOf(f)
	}
	p := pages[0]
	if o.all() {
		p = sectorsPage(list, pages)
	}
	return o.layout.page(std, p, m.Clock == parse.Conformal), failed, nil
}

// document is the JSON form.
func (o *reduceOptions) document(list []*findings) ([]byte, error) {
	var out []*reduce.Document
	for _, f := range list {
		d := f.Document(f.expansions, f.values)
		d.GaugeCheck = f.check.Document()
		out = append(out, d)
	}
	if o.all() {
		return reduce.EncodeSectors(out)
	}
	return out[0].Encode()
}

// checksOf lists the checks of reductions.
func checksOf(list []*findings) []*reduce.GaugeCheck {
	var out []*reduce.GaugeCheck
	for _, f := range list {
		out = append(out, f.check)
	}
	return out
}

// find reduces the model, in the sectors asked for, and computes what was asked for beside.
func (o *reduceOptions) find(std streams, m *parse.Model) ([]*findings, error) {
	models, err := o.variant.of(m)
	if err != nil {
		return nil, err
	}
	var variants reduce.Variants
	var results []*reduce.Result
	for _, m := range models {
		r, err := variants.Reduce(m)
		if err != nil {
			return nil, err
		}
		results = append(results, r)
	}
	checks, err := o.verification.of(&variants, models)
	if err != nil {
		return nil, err
	}
	var point *diag.Source
	if o.at != "" {
		if point, err = pointSource(std, o.at); err != nil {
			return nil, err
		}
	}
	var list []*findings
	for i, r := range results {
		f := &findings{Result: r, steps: o.steps, full: o.full, check: checks[i]}
		if f.expansions, err = o.expansions(r); err != nil {
			return nil, err
		}
		if f.lowered, err = lowered(r); err != nil {
			return nil, err
		}
		if point != nil {
			if f.values, err = r.At(point); err != nil {
				return nil, err
			}
		}
		list = append(list, f)
	}
	return list, nil
}

// expansions are that in the model's small parameters, to its own order unless --series
// gives one, and with --series those in the wave number.
func (o *reduceOptions) expansions(r *reduce.Result) ([]*reduce.Expansion, error) {
	order := r.Model.SmallOrder
	if o.series != noSeries {
		order = o.series
	}
	x, err := r.ExpandSmall(order)
	if err != nil {
		return nil, err
	}
	var out []*reduce.Expansion
	if x != nil {
		out = append(out, x)
	}
	if o.series == noSeries {
		return out, nil
	}
	for _, large := range []bool{true, false} {
		x, err := r.ExpandScales(o.series, large)
		if err != nil {
			return nil, err
		}
		if x != nil {
			out = append(out, x)
		}
	}
	return out, nil
}

// lowered is the effective action of second order where higher derivatives are small; nil where
// they are not a perturbation of one.
func lowered(r *reduce.Result) (*reduce.Lowered, error) {
	low, err := r.Lower()
	var stop *budget.Stop
	if errors.As(err, &stop) {
		return nil, err
	}
	if err != nil {
		return nil, nil
	}
	return low, nil
}
