package main

// The command tree and what its commands have in common.

import (
	"context"
	"fmt"
	"runtime/debug"
	"strings"
	"time"

	"github.com/spf13/cobra"

	"remnant/expr/budget"
)

func newRoot(std streams) *cobra.Command {
	root := &cobra.Command{
		Use:           "remnant",
		Short:         "Reduce a quadratic action to the operator that remains",
		Long:          "remnant takes an action for cosmological perturbations, solves its constraints\nand returns the one operator that remains.",
		SilenceErrors: true,
		SilenceUsage:  true,
		Version:       version(),
		RunE: func(cmd *cobra.Command, args []string) error {
			if len(args) > 0 {
				return unknownCommand(cmd, args[0])
			}
			return cmd.Help()
		},
		Args: cobra.ArbitraryArgs,
	}
	root.CompletionOptions.DisableDefaultCmd = true
	root.SetIn(std.in)
	root.SetOut(std.out)
	root.SetErr(std.err)
	root.SetVersionTemplate("remnant {{.Version}}\n")
	root.SetFlagErrorFunc(func(cmd *cobra.Command, err error) error { return usage(cmd, err.Error()) })
	root.AddCommand(reduceCommand(std), expandCommand(std), polesCommand(std), tidyCommand(std), notationCommand(std), codeCommand(std), versionCommand(std))
	for _, c := range root.Commands() {
		c.DisableFlagsInUseLine = true
	}
	return root
}

// usage refuses a command line and points to the command's help.
func usage(cmd *cobra.Command, summary string) error {
	return &refusal{summary, fmt.Sprintf("'%s --help' lists what it takes", cmd.CommandPath())}
}

func unknownCommand(root *cobra.Command, name string) error {
	hint := "'remnant --help' lists the commands"
	root.SuggestionsMinimumDistance = 2
	if near := root.SuggestionsFor(name); len(near) > 0 {
		hint = "the nearest command is '" + near[0] + "'; " + hint
	}
	return &refusal{fmt.Sprintf("there is no command '%s'", name), hint}
}

// oneFile accepts exactly one argument.
func oneFile(cmd *cobra.Command, args []string) error {
	switch len(args) {
	case 0:
		return usage(cmd, cmd.Name()+" needs a file")
	case 1:
		return nil
	}
	return usage(cmd, fmt.Sprintf("%s takes one file, not %d", cmd.Name(), len(args)))
}

func noArguments(cmd *cobra.Command, args []string) error {
	if len(args) > 0 {
		return usage(cmd, fmt.Sprintf("%s takes no arguments, but there is '%s'", cmd.Name(), args[0]))
	}
	return nil
}

// oneOf checks the value of a flag that chooses from words.
func oneOf(cmd *cobra.Command, flag, value string, words ...string) error {
	for _, w := range words {
		if w == value {
			return nil
		}
	}
	last := len(words) - 1
	return usage(cmd, fmt.Sprintf("--%s is %s or %s, not '%s'", flag, strings.Join(words[:last], ", "), words[last], value))
}

// limits bound the work of a command.
type limits struct {
	terms int
	time  time.Duration
}

func (l *limits) flags(cmd *cobra.Command) {
	cmd.Flags().IntVar(&l.terms, "limit-terms", 200_000, "stop when an expression has more terms than this (0: no limit)")
	cmd.Flags().DurationVar(&l.time, "limit-time", 10*time.Minute, "stop after this time (0: no limit)")
}

func (l *limits) check(cmd *cobra.Command) error {
	if l.terms < 0 || l.time < 0 {
		return usage(cmd, "a limit cannot be negative")
	}
	return nil
}

// budget starts the clock of the limits.
func (l *limits) budget(ctx context.Context) (*budget.Budget, func()) {
	if l.time == 0 {
		return budget.New(ctx, l.terms), func() {}
	}
	cause := fmt.Errorf("the time limit of %v is over", l.time)
	ctx, cancel := context.WithTimeoutCause(ctx, l.time, cause)
	return budget.New(ctx, l.terms), cancel
}

func versionCommand(std streams) *cobra.Command {
	return &cobra.Command{
		Use:   "version",
		Short: "Print the version",
		Args:  noArguments,
		RunE: func(*cobra.Command, []string) error {
			return emit(std, []byte("remnant "+version()+"\n"))
		},
	}
}

// version is what the build recorded: a release, or the revision that was built.
func version() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return "unknown"
	}
	v := info.Main.Version
	if v == "" {
		v = "(devel)"
	}
	return v + " " + info.GoVersion
}
