// Command dextral audits what a repository says about orientation against what
// its numbers do. See README.md, or run dextral help.
package main

import (
	"context"
	"os"
	"os/signal"
)

func main() { os.Exit(run()) }

// run is main with an exit status, so that script tests can call it in their
// own process.
func run() int {
	if vetting(os.Args[1:]) {
		vet()
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	context.AfterFunc(ctx, stop) // a second interrupt ends the program at once
	return execute(ctx, os.Args[1:], os.Stdin, os.Stdout, os.Stderr)
}
