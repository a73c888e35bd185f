package main

// poles answers whether the propagator of an action with a form factor has one pole.

import (
	"fmt"
	"math/big"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/expr/show"
	"remnant/parse"
	"remnant/reduce"
	"remnant/series"
)

// polesOptions are the flags of poles.
type polesOptions struct {
	limits
	layout
	radius   string
	truncate int
}

func polesCommand(std streams) *cobra.Command {
	o := &polesOptions{}
	cmd := &cobra.Command{
		Use:   "poles FILE",
		Short: "Count and judge the poles of an action with a form factor",
		Long: "poles reduces an action with a form factor to W(s) and counts the zeros of W in the disc\n" +
			"|s| < radius, with proof: by structure, by a Cauchy index, or by the argument principle in\n" +
			"interval arithmetic. Each zero is enclosed and judged. The form factor needs a definition or a\n" +
			"rule, and the constants need numbers. FILE may be -, for standard input.",
		Example: "  remnant poles testdata/siskin-flat.act --radius 10\n" +
			"  remnant poles testdata/siskin-flat.act --radius 10 --truncate 8 --format json",
		Args: oneFile,
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := o.layout.check(cmd); err != nil {
				return err
			}
			if err := o.limits.check(cmd); err != nil {
				return err
			}
			radius, ok := new(big.Rat).SetString(o.radius)
			if !ok || radius.Sign() <= 0 {
				return usage(cmd, fmt.Sprintf("--radius is a positive number, not '%s'", o.radius))
			}
			if o.truncate < 0 || o.truncate > maxSeries {
				return usage(cmd, "--truncate is an order from 1 to 100")
			}
			j := &job{limits: o.limits, layout: o.layout}
			return j.run(cmd.Context(), std, args[0], func(m *parse.Model, b *budget.Budget) ([]byte, error, error) {
				return o.compute(std, m, radius)
			})
		},
	}
	cmd.Flags().StringVar(&o.radius, "radius", "10", "the disc |s| < `radius`, s the eigenvalue of box")
	cmd.Flags().IntVar(&o.truncate, "truncate", 0, "mark the zeros that W cut after this `order` has and W has not")
	o.layout.flags(cmd)
	o.limits.flags(cmd)
	return cmd
}

func (o *polesOptions) compute(std streams, m *parse.Model, radius *big.Rat) (data []byte, failed, err error) {
	r, err := reduce.Reduce(m)
	if err != nil {
		return nil, nil, err
	}
	p, err := r.Poles(radius, o.truncate)
	if edge, ok := err.(*series.EdgeZeroError); ok {
		return nil, nil, &refusal{edge.Error(), "another --radius moves the edge"}
	}
	if err != nil {
		return nil, nil, err
	}
	if !p.Zeros.Proven {
		failed = &unproven{p.Zeros.Reason}
	}
	if o.format == "json" {
		data, err = p.Document(r).Encode()
		return data, failed, err
	}
	return o.layout.page(std, polesPage(r, p), m.Clock == parse.Conformal), failed, nil
}

// unproven is the outcome of a count without a proof.
type unproven struct{ reason string }

func (u *unproven) Error() string { return "not proven: " + u.reason }

// polesPage is a table of the zeros with the verdict above it.
func polesPage(r *reduce.Result, p *reduce.Poles) *page {
	out := &page{title: titleOf(r.Model), head: []row{
		{label: words("W(s)"), value: wOf(r)},
		{label: words("disc"), value: words("|s| < " + p.Radius.RatString() + ", s the eigenvalue of □")},
	}}
	s := section{heading: words(polesVerdict(p))}
	s.blocks = append(s.blocks, zeroRows(p))
	out.sections = append(out.sections, s)
	if p.TruncationOrder > 0 {
		t := section{heading: words(fmt.Sprintf("Truncated after s^%d: %d zeros that only the truncation makes", p.TruncationOrder, len(p.TruncationArtefacts)))}
		var rows []row
		for _, z := range p.TruncationArtefacts {
			rows = append(rows, row{label: words("s"), value: words(placeOf(z)), note: words("artefact")})
		}
		if rows != nil {
			t.blocks = append(t.blocks, block{rows: rows})
		}
		out.sections = append(out.sections, t)
	}
	return out
}

// wOf is W as a formula in F(s).
func wOf(r *reduce.Result) phrase {
	w, _ := r.FormFactor.W(r.Model.K)
	return maths(show.Elem(w))
}

// polesVerdict says in a line how many poles there are.
func polesVerdict(p *reduce.Poles) string {
	switch n := p.Zeros.Count; {
	case !p.Zeros.Proven:
		return "Not proven: " + p.Zeros.Reason
	case n == 0:
		return "No pole of the form factor in the disc (proven)"
	case n == 1:
		return "One pole in the disc (proven)"
	default:
		return fmt.Sprintf("%d poles in the disc (proven)", n)
	}
}

func zeroRows(p *reduce.Poles) block {
	if len(p.List) == 0 && !p.Zeros.Proven {
		return block{sentence: words("Whether W has zeros there is not known.")}
	}
	if len(p.List) == 0 {
		return block{sentence: words("W has no zero there.")}
	}
	var rows []row
	for _, z := range p.List {
		note := ""
		for i, v := range z.Verdicts {
			if i > 0 {
				note += ", "
			}
			note += string(v)
		}
		rows = append(rows, row{label: maths(show.Symbol("s", 0)), value: words(placeOf(z.Zero)), note: words(note)})
	}
	if !p.Zeros.Listed {
		rows = append(rows, row{label: words("others"), value: words("are not enclosed one by one: " + p.Zeros.Reason)})
	}
	return block{rows: rows}
}

// placeOf writes where a zero is.
func placeOf(z series.Zero) string {
	s := reduce.Decimal(z.Re, 12)
	if z.Im.Sign() != 0 {
		im := reduce.Decimal(new(big.Rat).Abs(z.Im), 12)
		if z.Im.Sign() < 0 {
			s += " − " + im + "i"
		} else {
			s += " + " + im + "i"
		}
	}
	if z.Radius.Sign() > 0 {
		s += " ± " + reduce.Decimal(z.Radius, 2)
	}
	if z.Multiplicity > 1 {
		s += fmt.Sprintf("  (%d zeros)", z.Multiplicity)
	}
	return s
}
