package main

import (
	"fmt"
	"io"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/rules/report"

	"github.com/spf13/cobra"
)

func framesCommand(s streams) *cobra.Command {
	var format string
	writers := map[string]func(io.Writer, []report.FrameGraph) error{"text": report.FramesText, "dot": report.FramesDOT}
	names := []string{"text", "dot"}
	c := &cobra.Command{
		Use:   "frames [path ...]",
		Short: "Show the frames of a tree, what joins them, and whether the loops close",
		Long: `Frames prints, file by file and rig by rig, the frames that orientations are stated
between, each edge with its place and equation, and every loop with its closure
error. Frames that only a key such as T_cam_imu names are joined within the mapping
that holds the key. Frames whose axes are declared in dextral.toml, or stated by a
triad in a file, come first, with their handedness; in DOT they stand in the nodes.`,
		Example: `  dextral frames calib/
  dextral frames --format dot calib/ | dot -Tsvg > frames.svg`,
		RunE: func(c *cobra.Command, paths []string) error {
			write, ok := writers[format]
			if !ok {
				return fmt.Errorf("--format %s: the formats are %s", format, strings.Join(names, ", "))
			}
			r, err := audit.Run(c.Context(), audit.Options{Paths: paths, Today: time.Now()})
			if err != nil {
				return err
			}
			if format == "text" {
				if err := report.FrameAxes(s.out, r.Frames); err != nil {
					return err
				}
			}
			if err := write(s.out, report.FrameGraphs(r.Chains, r.Frames)); err != nil {
				return err
			}
			if len(r.Report.Failed) > 0 {
				_ = report.Summary(s.err, &r.Report, layout(s.err)) // the status says that it failed
				return status(exitFailed)
			}
			return nil
		},
	}
	c.Flags().StringVar(&format, "format", "text", "output format: "+strings.Join(names, ", "))
	_ = c.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(names, cobra.ShellCompDirectiveNoFileComp))
	return c
}
