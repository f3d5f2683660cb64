package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"
)

// Exit statuses.
const (
	exitClean    = 0 // nothing at or above the gate
	exitFindings = 1 // findings at or above the gate
	exitFailed   = 2 // something that was asked for could not be done
)

// status is an error that only carries an exit status: everything worth saying
// has been said.
type status int

func (s status) Error() string { return fmt.Sprintf("exit status %d", int(s)) }

// streams are where a command reads and writes.
type streams struct {
	in       io.Reader
	out, err io.Writer
}

// execute runs one command line and returns its exit status.
func execute(ctx context.Context, args []string, in io.Reader, out, errw io.Writer) int {
	root := rootCommand(streams{in, out, errw})
	root.SetArgs(args)
	root.SetIn(in)
	root.SetOut(out)
	root.SetErr(errw)
	err := root.ExecuteContext(ctx)
	var s status
	switch {
	case err == nil:
		return exitClean
	case errors.As(err, &s):
		return int(s)
	default:
		fmt.Fprintf(errw, "dextral: %v\n", err)
		return exitFailed
	}
}

func rootCommand(s streams) *cobra.Command {
	root := &cobra.Command{
		Use:   "dextral",
		Short: "Finds what code, calibrations and logs say about orientation that their numbers contradict",
		Long: `dextral reads the orientations in a tree: quaternions, rotation matrices, angle
triples, axes and frames in configuration files, logs and Go code. It recomputes
what names, comments and declarations claim about them, and reports each
contradiction with the numbers that prove it.`,
		Example: `  dextral audit                      audit the current directory
  dextral audit calib/ logs/imu.csv  audit these only
  dextral readings calib/            list every orientation and how it is read
  dextral rules sign-jump            explain a rule`,
		Version:       version(),
		SilenceErrors: true,
		SilenceUsage:  true,
		Args:          knownCommand,
		RunE:          func(c *cobra.Command, _ []string) error { return c.Help() },
	}
	root.SuggestionsMinimumDistance = 2
	root.AddCommand(auditCommand(s), readingsCommand(s), framesCommand(s), identifyCommand(s), sheetCommand(s), reviewCommand(s), rulesCommand(s), waiveCommand(s), schemaCommand(s))
	return root
}

// knownCommand says which command was perhaps meant.
func knownCommand(c *cobra.Command, args []string) error {
	if len(args) == 0 {
		return nil
	}
	if near := c.SuggestionsFor(args[0]); len(near) > 0 {
		return fmt.Errorf("there is no command %q; did you mean %s?", args[0], strings.Join(near, " or "))
	}
	return fmt.Errorf("there is no command %q; dextral help lists them", args[0])
}
