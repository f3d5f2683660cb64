package main

import (
	"errors"
	"fmt"
	"io"
	"strings"
	"time"

	"dextral/analyzers/revision"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func reviewCommand(s streams) *cobra.Command {
	var format, gate string
	var fork bool
	c := &cobra.Command{
		Use:   "review BASE [HEAD]",
		Short: "Say what a change of the repository does to its orientations",
		Long: `Review compares two revisions of the git repository around the current directory,
HEAD being the working tree unless it is named. It says what became of every
orientation, which frames move with it and by how much, and which findings are
new or fixed. Only what differs is read; nothing is checked out.

Exit status: 0 no new finding at or above the gate, 1 new findings, 2 something
that was to be compared could not be.`,
		Example: `  dextral review main
  dextral review --fork origin/main        what this branch changed since it parted
  dextral review v1.4 v1.5
  dextral review --format markdown main > comment.md`,
		Args: func(_ *cobra.Command, args []string) error {
			switch {
			case len(args) == 0:
				return errors.New("name the revision to compare with, such as: dextral review main")
			case len(args) > 2:
				return fmt.Errorf("a review compares two revisions, not %d", len(args))
			}
			return nil
		},
		RunE: func(c *cobra.Command, args []string) error {
			write, ok := reviewFormats[format]
			if !ok {
				return fmt.Errorf("--format %s: the formats of a review are %s", format, strings.Join(reviewFormatNames, ", "))
			}
			o := revision.Options{Base: args[0], Fork: fork, Today: time.Now()}
			if len(args) == 2 {
				o.Head = args[1]
			}
			if gate != "" {
				if o.Gate, o.GateSet = policy.ParseGate(gate); !o.GateSet {
					return fmt.Errorf("--gate %s: the gates are %s", gate, strings.Join(policy.GateNames(), ", "))
				}
			}
			r, err := revision.Review(c.Context(), o)
			if err != nil {
				return err
			}
			if err := write(s.out, r); err != nil {
				return fmt.Errorf("the review could not be written: %w", err)
			}
			switch {
			case len(r.Audit.Failed) > 0:
				return status(exitFailed)
			case r.Failing() > 0:
				return status(exitFindings)
			}
			return nil
		},
	}
	c.Flags().StringVar(&format, "format", "text", "output format: "+strings.Join(reviewFormatNames, ", "))
	c.Flags().StringVar(&gate, "gate", "", "mildest level of a new finding that fails the review: "+strings.Join(policy.GateNames(), ", ")+" (default: of dextral.toml, or error)")
	c.Flags().BoolVar(&fork, "fork", false, "compare with the commit where BASE and HEAD parted")
	_ = c.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(reviewFormatNames, cobra.ShellCompDirectiveNoFileComp))
	_ = c.RegisterFlagCompletionFunc("gate", cobra.FixedCompletions(policy.GateNames(), cobra.ShellCompDirectiveNoFileComp))
	return c
}

// reviewFormatNames lists the formats of review.
var reviewFormatNames = []string{"text", "markdown", "sarif", "json"}

var reviewFormats = map[string]func(io.Writer, *report.Review) error{
	"text":     func(w io.Writer, r *report.Review) error { return report.ReviewText(w, r, layout(w)) },
	"markdown": report.ReviewMarkdown,
	"json":     report.ReviewJSON,
	"sarif": func(w io.Writer, r *report.Review) error {
		return report.ReviewSARIF(w, r, version(), report.RuleInfos(rules.Catalogue()))
	},
}
