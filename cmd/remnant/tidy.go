package main

// tidy writes files in the standard layout of the notation.

import (
	"bytes"
	"fmt"

	"github.com/spf13/cobra"

	"remnant/parse"
)

func tidyCommand(std streams) *cobra.Command {
	var write, check bool
	cmd := &cobra.Command{
		Use:   "tidy FILE…",
		Short: "Write a file in its standard layout",
		Long: "tidy prints a file in the standard layout; comments stay where they are.\n" +
			"With --write the file itself is replaced; with --check nothing is written, and\nthe exit status is 1 if a file differs from its standard layout.",
		Args: func(cmd *cobra.Command, args []string) error {
			if len(args) == 0 {
				return usage(cmd, "tidy needs a file")
			}
			return nil
		},
		RunE: func(cmd *cobra.Command, args []string) error {
			if write && check {
				return usage(cmd, "--write and --check exclude each other")
			}
			return tidy(std, args, write, check)
		},
	}
	cmd.Flags().BoolVarP(&write, "write", "w", false, "replace the file")
	cmd.Flags().BoolVar(&check, "check", false, "only say whether the file is in its standard layout")
	return cmd
}

func tidy(std streams, paths []string, write, check bool) error {
	var unlike []string
	for _, path := range paths {
		src, err := readSource(std, path)
		if err != nil {
			return err
		}
		file, faults := parse.Parse(src)
		if err := faults.Err(); err != nil {
			return err
		}
		text := parse.Format(file)
		same := text == src.Text
		switch {
		case check:
			if !same {
				unlike = append(unlike, path)
			}
		case write && path != "-":
			if same {
				continue
			}
			if err := writeFile(path, []byte(text)); err != nil {
				return err
			}
		default:
			if err := emit(std, []byte(text)); err != nil {
				return err
			}
		}
	}
	if len(unlike) == 0 {
		return nil
	}
	var b bytes.Buffer
	for _, path := range unlike {
		fmt.Fprintf(&b, "%s\n", path)
	}
	if err := emit(std, b.Bytes()); err != nil {
		return err
	}
	if len(unlike) == 1 {
		return &differs{unlike[0] + " is not in its standard layout"}
	}
	return &differs{fmt.Sprintf("%d files are not in their standard layout", len(unlike))}
}
