package main

// What the commands that compute from a model have in common: limits, layout, the variant of
// the model and what is verified; and the way from the file to the result.

import (
	"context"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
)

// job is one model worked on.
type job struct {
	limits
	layout
	variant
	verification
}

func (j *job) flags(cmd *cobra.Command) {
	j.variant.flags(cmd)
	j.verification.flags(cmd)
	j.layout.flags(cmd)
	j.limits.flags(cmd)
}

func (j *job) check(cmd *cobra.Command) error {
	for _, check := range []func(*cobra.Command) error{j.layout.check, j.variant.check, j.verification.check, j.limits.check} {
		if err := check(cmd); err != nil {
			return err
		}
	}
	return nil
}

// worker makes the result of a model; failed is the outcome of a check that did.
type worker func(m *parse.Model, b *budget.Budget) (data []byte, failed, err error)

// run works on the file at path and delivers the result: all work is done before anything
// is written.
func (j *job) run(ctx context.Context, std streams, path string, work worker) error {
	b, done := j.budget(ctx)
	defer done()
	stop := watch(std.err, b)
	data, failed, err := loaded(std, path, b, work)
	stop()
	if err != nil {
		return err
	}
	if err := deliver(std, j.output, data); err != nil {
		return err
	}
	return failed
}

func loaded(std streams, path string, b *budget.Budget, work worker) (data []byte, failed, err error) {
	defer budget.Catch(&err)
	src, err := readSource(std, path)
	if err != nil {
		return nil, nil, err
	}
	m, err := parse.Load(src, b)
	if err != nil {
		return nil, nil, err
	}
	return work(m, b)
}
