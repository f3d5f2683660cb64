package main

import (
	"fmt"
	"io"
	"strings"

	"dextral/analyzers/gosource"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func sheetCommand(s streams) *cobra.Command {
	var format string
	writers := map[string]func(io.Writer, *report.Sheet, report.Options) error{"text": report.SheetText, "markdown": report.SheetMarkdown}
	names := []string{"text", "markdown"}
	c := &cobra.Command{
		Use:   "sheet [package ...]",
		Short: "Print what the orientation types and functions of Go packages mean, as measured",
		Long: `Sheet evaluates the numeric functions of Go packages on sample inputs and prints
what every orientation type and function means: storage, algebra, direction,
sequences, units. It takes nothing from names or comments, says where something
cannot be decided, and marks contradictions. Your program is not run.

Packages are named as for the go command; the default is ./...`,
		Example: `  dextral sheet
  dextral sheet --format markdown ./attitude > conventions.md
  dextral sheet gonum.org/v1/gonum/num/quat`,
		RunE: func(c *cobra.Command, patterns []string) error {
			write, ok := writers[format]
			if !ok {
				return fmt.Errorf("--format %s: the formats are %s", format, strings.Join(names, ", "))
			}
			if len(patterns) == 0 {
				patterns = []string{"./..."}
			}
			sheet, err := gosource.Sheet(c.Context(), ".", patterns)
			if err != nil {
				return err
			}
			return write(s.out, sheet, layout(s.out))
		},
	}
	c.Flags().StringVar(&format, "format", "text", "output format: "+strings.Join(names, ", "))
	_ = c.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(names, cobra.ShellCompDirectiveNoFileComp))
	return c
}
