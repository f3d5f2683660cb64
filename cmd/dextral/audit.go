package main

import (
	"context"
	"fmt"
	"io"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/analyzers/waive"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func auditCommand(s streams) *cobra.Command {
	var format, gate string
	var backlog waive.Backlog
	var diff, apply bool
	c := &cobra.Command{
		Use:   "audit [path ...]",
		Short: "Audit files and directories (default: the current directory)",
		Long: `Audit reads every orientation in the given files and directories, recomputes what
is claimed about it, and prints each contradiction with the numbers that prove it.

What version control ignores is skipped. A dextral.toml in the tree, or above it,
declares conventions, excludes paths and waives findings.

Exit status: 0 nothing at or above the gate, 1 findings, 2 something that was to
be audited could not be.`,
		Example: `  dextral audit
  dextral audit --gate warning calib/ logs/
  dextral audit --format sarif > dextral.sarif
  dextral audit --format markdown > audit.md
  dextral audit --format html > audit.html
  dextral audit --diff
  dextral audit --waive-all-new backlog.toml --owner "M. Okafor"`,
		RunE: func(c *cobra.Command, paths []string) error {
			if err := oneOutput(c); err != nil {
				return err
			}
			write, ok := formats[format]
			if !ok {
				return fmt.Errorf("--format %s: the formats are %s", format, strings.Join(formatNames, ", "))
			}
			o := audit.Options{Paths: paths, Today: time.Now()}
			if gate != "" {
				if o.Gate, o.GateSet = policy.ParseGate(gate); !o.GateSet {
					return fmt.Errorf("--gate %s: the gates are %s", gate, strings.Join(policy.GateNames(), ", "))
				}
			}
			backlog.Paths, backlog.Today = paths, o.Today
			if done, err := acceptAll(c, backlog); err != nil || done != nil {
				if done != nil && err == nil {
					printBacklog(s.out, backlog, done)
				}
				return err
			}
			news := newProgress(s.err)
			if news != nil {
				o.Progress = news.tell
			}
			r, err := audit.Run(c.Context(), o)
			news.done()
			if err != nil {
				return err
			}
			switch {
			case apply:
				return applyEdits(c.Context(), s, r, o)
			case diff:
				return showEdits(s, r)
			}
			if err := write(c.Context(), s.out, r, paths); err != nil {
				return fmt.Errorf("the report could not be written: %w", err)
			}
			if format != "text" {
				_ = report.Summary(s.err, &r.Report, layout(s.err)) // beside the point of a machine format
			}
			return outcome(&r.Report)
		},
	}
	c.Flags().StringVar(&format, "format", "text", "output format: "+strings.Join(formatNames, ", "))
	c.Flags().StringVar(&gate, "gate", "", "mildest level that fails the audit: "+strings.Join(policy.GateNames(), ", ")+" (default: of dextral.toml, or error)")
	c.Flags().BoolVar(&diff, "diff", false, "print the edits that findings offer as a unified diff instead of the report")
	c.Flags().BoolVar(&apply, "apply", false, "write the edits that findings offer, audit again and say what changed")
	c.Flags().StringVar(&backlog.File, "waive-all-new", "", "print no report; write a waiver for every finding that has none into this file")
	c.Flags().StringVar(&backlog.Owner, "owner", "", "who answers for these waivers")
	c.Flags().StringVar(&backlog.Until, "until", "", "their last day, YYYY-MM-DD (default: half a year from today)")
	c.Flags().StringVar(&backlog.Because, "because", "", "their reason (default: that nobody has looked yet)")
	_ = c.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(formatNames, cobra.ShellCompDirectiveNoFileComp))
	_ = c.RegisterFlagCompletionFunc("gate", cobra.FixedCompletions(policy.GateNames(), cobra.ShellCompDirectiveNoFileComp))
	return c
}

// oneOutput refuses flags that ask for two outputs.
func oneOutput(c *cobra.Command) error {
	var set []string
	for _, name := range []string{"format", "diff", "apply", "waive-all-new"} {
		if c.Flags().Changed(name) {
			set = append(set, "--"+name)
		}
	}
	if len(set) > 1 {
		return fmt.Errorf("%s ask for different outputs; choose one", strings.Join(set, " and "))
	}
	return nil
}

// acceptAll writes a file of waivers, if one is asked for.
func acceptAll(c *cobra.Command, b waive.Backlog) (*waive.Written, error) {
	if b.File != "" {
		return waive.All(c.Context(), b)
	}
	for _, name := range []string{"owner", "until", "because"} {
		if c.Flags().Changed(name) {
			return nil, fmt.Errorf("--%s goes with --waive-all-new", name)
		}
	}
	return nil, nil
}

// formatNames lists the formats of audit.
var formatNames = []string{"text", "html", "json", "junit", "markdown", "sarif"}

// formatWriter writes the audit of some paths.
type formatWriter func(context.Context, io.Writer, *audit.Result, []string) error

var formats = map[string]formatWriter{
	"text": plain(func(w io.Writer, r *report.Report) error { return report.Text(w, r, layout(w)) }),
	"html": writeHTML,
	"json": plain(func(w io.Writer, r *report.Report) error { return report.JSON(w, r, version()) }),
	"junit": plain(func(w io.Writer, r *report.Report) error {
		return report.JUnit(w, r, report.RuleInfos(rules.Catalogue()))
	}),
	"sarif": plain(func(w io.Writer, r *report.Report) error {
		return report.SARIF(w, r, version(), report.RuleInfos(rules.Catalogue()))
	}),
	"markdown": plain(report.Markdown),
}

// plain is a format that needs the report alone.
func plain(write func(io.Writer, *report.Report) error) formatWriter {
	return func(_ context.Context, w io.Writer, r *audit.Result, _ []string) error { return write(w, &r.Report) }
}

// outcome is the exit status of an audit. What could not be audited outweighs
// findings: a green or red answer about a part would pass for one about all.
func outcome(r *report.Report) error {
	switch {
	case len(r.Failed) > 0:
		return status(exitFailed)
	case r.Failing() > 0:
		return status(exitFindings)
	}
	return nil
}
