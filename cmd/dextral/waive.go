package main

import (
	"errors"
	"fmt"
	"io"
	"time"

	"dextral/analyzers/waive"
	"dextral/rules"

	"github.com/spf13/cobra"
)

func waiveCommand(s streams) *cobra.Command {
	r := waive.Request{}
	c := &cobra.Command{
		Use:   "waive RULE PLACE --until DATE --because TEXT --owner NAME",
		Short: "Accept the findings of a rule at a place until a day",
		Long: `Waive audits the place and adds a [[waiver]] to dextral.toml, which it makes in the
current directory if there is none. The rest of the sheet keeps its bytes. Where
the rule finds nothing, nothing is written.

A place is a path or a glob, with #key for one value of the file, or a line of a
report: path:line. Waived findings stay in every report until they are mended.`,
		Example: `  dextral waive sign-jump logs/flight.csv --until 2031-03-31 --because "old recorder" --owner "M. Okafor"
  dextral waive rotor-not-unit calib/imu.yaml#imu.q_body_imu --until 2031-03-31 --because "certificate ordered" --owner "M. Okafor"
  dextral waive rotor-not-unit calib/imu.yaml:7:15 --until 2031-03-31 --because "certificate ordered" --owner "M. Okafor"`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) != 2 {
				return errors.New("name a rule and a place, such as: dextral waive sign-jump logs/flight.csv")
			}
			return nil
		},
		ValidArgsFunction: func(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
			if len(args) == 0 {
				return ruleCompletions(), cobra.ShellCompDirectiveNoFileComp
			}
			return nil, cobra.ShellCompDirectiveDefault
		},
		RunE: func(c *cobra.Command, args []string) error {
			r.Rule, r.Place, r.Today = args[0], args[1], time.Now()
			done, err := waive.One(c.Context(), r)
			if err != nil {
				return err
			}
			sheet := done.Waiver.At.Path
			if done.Created {
				fmt.Fprintf(s.out, "made %s\n", sheet)
			}
			fmt.Fprintf(s.out, "%s: %s is accepted at %s until %s\n", done.Waiver.At, r.Rule, done.Waiver.Place, r.Until)
			for _, f := range done.Accepted {
				fmt.Fprintf(s.out, "  accepts %s: %s\n", f.Place, f.Message)
			}
			return nil
		},
	}
	c.Flags().StringVar(&r.Until, "until", "", "last day, YYYY-MM-DD")
	c.Flags().StringVar(&r.Because, "because", "", "why it is acceptable")
	c.Flags().StringVar(&r.Owner, "owner", "", "who answers for it")
	for _, name := range []string{"until", "because", "owner"} {
		_ = c.RegisterFlagCompletionFunc(name, cobra.NoFileCompletions)
	}
	return c
}

// ruleCompletions are the names of the rules with what they mean.
func ruleCompletions() []string {
	var names []string
	for _, r := range rules.Catalogue() {
		names = append(names, r.Name+"\t"+r.Summary)
	}
	return names
}

// printBacklog says what became of a file of waivers.
func printBacklog(w io.Writer, b waive.Backlog, done *waive.Written) {
	switch {
	case len(done.Waivers) == 0 && done.Dropped == 0:
		fmt.Fprintln(w, "nothing is found that is not waived already; nothing was written")
	default:
		fmt.Fprintf(w, "%s: %s (%d new, %d dropped because nothing is found there any longer)\n", b.File, several(len(done.Waivers), "waiver"), done.Added, done.Dropped)
	}
	names, counts := done.ByRule()
	for _, name := range names {
		fmt.Fprintf(w, "  %4d %s\n", counts[name], name)
	}
	switch {
	case done.Created:
		fmt.Fprintf(w, "%s: made, to name that file\n", done.Sheet)
	case done.Named:
		fmt.Fprintf(w, "%s: names that file now\n", done.Sheet)
	}
	if done.Lapsed > 0 {
		fmt.Fprintf(w, "left: %s whose waiver has expired; mend it, or give the waiver a later day by hand\n", several(done.Lapsed, "finding"))
	}
	if done.Failed > 0 {
		fmt.Fprintf(w, "left: %s that could not be audited; dextral audit says why\n", several(done.Failed, "input"))
	}
	if done.Elsewhere > 0 {
		fmt.Fprintf(w, "left: %s below another dextral.toml; run the command there\n", several(done.Elsewhere, "finding"))
	}
}

// several is "1 waiver" or "3 waivers".
func several(n int, one string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %ss", n, one)
}
