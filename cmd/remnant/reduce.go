package main

// reduce is the main job: a model in, what remains out.

import (
	"context"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/reduce"
)

// reduceOptions are the flags of reduce.
type reduceOptions struct {
	limits
	format string
	steps  bool
	full   bool
	series int
	at     string
	output string
	ascii  bool
	width  int
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
			"  remnant reduce testdata/gannet.act --series 4 --format latex -o gannet.tex",
		Args: oneFile,
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := o.check(cmd); err != nil {
				return err
			}
			return o.run(cmd.Context(), std, args[0])
		},
	}
	flags := cmd.Flags()
	flags.StringVar(&o.format, "format", "text", "text, latex, json or markdown")
	flags.BoolVar(&o.steps, "steps", false, "show the action after each step")
	flags.BoolVar(&o.full, "full", false, "write out long expressions that follow from others")
	flags.IntVar(&o.series, "series", noSeries, "expand what remains up to this `order`")
	flags.StringVar(&o.at, "at", "", "give exact values at a `point`: \"H = 1/10; k = 2\", or @FILE")
	flags.StringVarP(&o.output, "output", "o", "", "write to this `file`")
	flags.BoolVar(&o.ascii, "ascii", false, "write text in ASCII")
	flags.IntVar(&o.width, "width", 0, "wrap text to this many columns (default that of the terminal, or 100)")
	o.limits.flags(cmd)
	return cmd
}

func (o *reduceOptions) check(cmd *cobra.Command) error {
	if err := oneOf(cmd, "format", o.format, "text", "latex", "json", "markdown"); err != nil {
		return err
	}
	switch {
	case o.series != noSeries && o.series < 0, o.series > maxSeries:
		return usage(cmd, "--series is an order from 0 to 100")
	case o.width < 0 || o.width > 0 && o.width < minWidth:
		return usage(cmd, "--width is at least 40 columns")
	case cmd.Flags().Changed("at") && o.at == "":
		return usage(cmd, "--at needs a point, such as \"H = 1/10; k = 2\"")
	}
	return o.limits.check(cmd)
}

func (o *reduceOptions) run(ctx context.Context, std streams, path string) error {
	b, done := o.budget(ctx)
	defer done()
	stop := watch(std.err, b)
	data, err := o.compute(std, path, b)
	stop()
	if err != nil {
		return err
	}
	return deliver(std, o.output, data)
}

// compute does all the work, so that nothing is written before it is done.
func (o *reduceOptions) compute(std streams, path string, b *budget.Budget) (data []byte, err error) {
	defer budget.Catch(&err)
	f, err := o.find(std, path, b)
	if err != nil {
		return nil, err
	}
	b.Stage("writing the result")
	conformal := f.Model.Clock == parse.Conformal
	switch o.format {
	case "json":
		return f.Document(f.expansions, f.values).Encode()
	case "latex":
		return latexPage(pageOf(f), conformal), nil
	case "markdown":
		return markdownPage(pageOf(f), conformal), nil
	}
	return textPage(pageOf(f), o.style(std, conformal)), nil
}

// style is that of the terminal, unless the text goes to a file.
func (o *reduceOptions) style(std streams, conformal bool) textStyle {
	st := textStyle{width: o.width, ascii: o.ascii, conformal: conformal}
	toFile := o.output != "" && o.output != "-"
	if st.width == 0 {
		st.width = pageWidth
		if !toFile {
			st.width = terminalWidth(std.out)
		}
	}
	st.bold = !toFile && inColour(std.out)
	return st
}

// find reduces the model and computes what was asked for beside it.
func (o *reduceOptions) find(std streams, path string, b *budget.Budget) (*findings, error) {
	src, err := readSource(std, path)
	if err != nil {
		return nil, err
	}
	m, err := parse.Load(src, b)
	if err != nil {
		return nil, err
	}
	r, err := reduce.Reduce(m)
	if err != nil {
		return nil, err
	}
	f := &findings{Result: r, steps: o.steps, full: o.full}
	if f.expansions, err = o.expansions(r); err != nil {
		return nil, err
	}
	if o.at != "" {
		point, err := pointSource(std, o.at)
		if err != nil {
			return nil, err
		}
		if f.values, err = r.At(point); err != nil {
			return nil, err
		}
	}
	return f, nil
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
