package main

// notation prints the grammar, with an example for each production.

import (
	"bytes"
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"remnant/parse"
)

func notationCommand(std streams) *cobra.Command {
	return &cobra.Command{
		Use:   "notation",
		Short: "Print the grammar of the notation, with an example for each production",
		Args:  noArguments,
		RunE: func(*cobra.Command, []string) error {
			return emit(std, notationPage())
		},
	}
}

// notationPage is the grammar, then the examples, as comments of the grammar, so that the
// whole is EBNF.
func notationPage() []byte {
	var b bytes.Buffer
	b.WriteString(strings.TrimRight(parse.Grammar(), "\n"))
	b.WriteString("\n\n// An example for each production:\n//\n")
	for _, e := range parse.Examples() {
		lines := strings.Split(strings.TrimRight(e.Text, "\n"), "\n")
		fmt.Fprintf(&b, "//   %-12s  %s\n", e.Production, lines[0])
		for _, l := range lines[1:] {
			fmt.Fprintf(&b, "//   %-12s  %s\n", "", l)
		}
	}
	return b.Bytes()
}
