package main

import (
	"fmt"

	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func schemaCommand(s streams) *cobra.Command {
	schemas := map[string][]byte{"audit": report.AuditSchema, "review": report.ReviewSchema}
	return &cobra.Command{
		Use:   "schema audit|review",
		Short: "Print the JSON Schema of what --format json writes",
		Long: `Schema prints the JSON Schema (2020-12) that describes the output of audit or
review with --format json. Its version counts up when a member changes its meaning
or goes; members that you do not know are to be ignored.`,
		Example: `  dextral schema audit > dextral-audit.schema.json`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) != 1 || schemas[args[0]] == nil {
				return fmt.Errorf("name one of the schemas: audit, review")
			}
			return nil
		},
		ValidArgs: []string{"audit", "review"},
		RunE: func(_ *cobra.Command, args []string) error {
			_, err := s.out.Write(schemas[args[0]])
			return err
		},
	}
}
