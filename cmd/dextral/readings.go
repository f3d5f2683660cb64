package main

import (
	"time"

	"dextral/analyzers/audit"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func readingsCommand(s streams) *cobra.Command {
	return &cobra.Command{
		Use:   "readings [path ...]",
		Short: "List every orientation found, how it is read and why",
		Long: `Readings lists every orientation value in the given files and directories with the
way it is read and the claims that decide it, or why it is undecided. It shows
what the silence of an audit covers.`,
		Example: "  dextral readings calib/mount.yaml",
		RunE: func(c *cobra.Command, paths []string) error {
			r, err := audit.Run(c.Context(), audit.Options{Paths: paths, Today: time.Now()})
			if err != nil {
				return err
			}
			values := r.Values
			for _, channel := range r.Series {
				values = append(values, &channel.Value)
			}
			if err := report.Readings(s.out, values, layout(s.out)); err != nil {
				return err
			}
			if len(r.Report.Failed) > 0 {
				_ = report.Summary(s.err, &r.Report, layout(s.err)) // the status says that it failed
				return status(exitFailed)
			}
			return nil
		},
	}
}
