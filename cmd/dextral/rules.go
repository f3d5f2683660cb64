package main

import (
	"fmt"

	"dextral/rules"

	"github.com/spf13/cobra"
)

func rulesCommand(s streams) *cobra.Command {
	return &cobra.Command{
		Use:   "rules [name]",
		Short: "List the rules, or explain one",
		Args:  cobra.MaximumNArgs(1),
		ValidArgsFunction: func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
			return ruleCompletions(), cobra.ShellCompDirectiveNoFileComp
		},
		RunE: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				for _, r := range rules.Catalogue() {
					fmt.Fprintf(s.out, "%-24s %s\n", r.Name, r.Summary)
				}
				return nil
			}
			r, ok := rules.Lookup(args[0])
			if !ok {
				return fmt.Errorf("there is no rule %q; dextral rules lists them all", args[0])
			}
			fmt.Fprint(s.out, r.Page())
			return nil
		},
	}
}
