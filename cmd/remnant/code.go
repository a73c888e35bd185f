package main

// code writes the Go package of a reduction.

import (
	"context"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
	"remnant/parse"
	"remnant/reduce"
	"remnant/reduce/gocode"
)

func codeCommand(std streams) *cobra.Command {
	var lim limits
	var dir string
	cmd := &cobra.Command{
		Use:   "code FILE -o DIR",
		Short: "Write what remains as a Go package",
		Long: "code reduces a model and writes a Go package of its coefficients, its mode equation\n" +
			"and a test with exact expectations. The package has no dependencies.",
		Example: "  remnant code testdata/plover.act -o plover",
		Args:    oneFile,
		RunE: func(cmd *cobra.Command, args []string) error {
			if dir == "" {
				return usage(cmd, "code needs a folder to write to: -o DIR")
			}
			if err := lim.check(cmd); err != nil {
				return err
			}
			return writeCode(cmd.Context(), std, lim, args[0], dir)
		},
	}
	cmd.Flags().StringVarP(&dir, "output", "o", "", "the `folder` to write")
	lim.flags(cmd)
	return cmd
}

func writeCode(ctx context.Context, std streams, lim limits, path, dir string) error {
	b, done := lim.budget(ctx)
	defer done()
	stop := watch(std.err, b)
	files, err := generate(std, path, b)
	stop()
	if err != nil {
		return err
	}
	return writeFolder(dir, files)
}

func generate(std streams, path string, b *budget.Budget) (files []outputFile, err error) {
	defer budget.Catch(&err)
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
	b.Stage("writing the Go package")
	p, err := gocode.Generate(r)
	if err != nil {
		return nil, err
	}
	for _, f := range p.Files {
		files = append(files, outputFile{f.Name, f.Data})
	}
	return files, nil
}
