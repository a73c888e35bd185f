package main

// How a page is written: its form, its file, and for text letters and width.

import (
	"github.com/spf13/cobra"
)

// layout holds the flags of commands that print a page.
type layout struct {
	format string
	output string
	ascii  bool
	width  int
}

func (l *layout) flags(cmd *cobra.Command) {
	flags := cmd.Flags()
	flags.StringVar(&l.format, "format", "text", "text, latex, json or markdown")
	flags.StringVarP(&l.output, "output", "o", "", "write to this `file`")
	flags.BoolVar(&l.ascii, "ascii", false, "write text in ASCII")
	flags.IntVar(&l.width, "width", 0, "wrap text to this many columns (default that of the terminal, or 100)")
}

func (l *layout) check(cmd *cobra.Command) error {
	if err := oneOf(cmd, "format", l.format, "text", "latex", "json", "markdown"); err != nil {
		return err
	}
	if l.width < 0 || l.width > 0 && l.width < minWidth {
		return usage(cmd, "--width is at least 40 columns")
	}
	return nil
}

// page writes a page in any form but JSON.
func (l *layout) page(std streams, p *page, conformal bool) []byte {
	switch l.format {
	case "latex":
		return latexPage(p, conformal)
	case "markdown":
		return markdownPage(p, conformal)
	}
	return textPage(p, l.style(std, conformal))
}

// style is that of the terminal, unless the text goes to a file.
func (l *layout) style(std streams, conformal bool) textStyle {
	st := textStyle{width: l.width, ascii: l.ascii, conformal: conformal}
	toFile := l.output != "" && l.output != "-"
	if st.width == 0 {
		st.width = pageWidth
		if !toFile {
			st.width = terminalWidth(std.out)
		}
	}
	st.bold = !toFile && inColour(std.out)
	return st
}
