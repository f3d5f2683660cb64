package main

import (
	"strings"

	"dextral/analyzers/gosource"

	"golang.org/x/tools/go/analysis/unitchecker"
)

// vetting reports whether the go command asks: go vet -vettool=dextral runs the
// command with -V=full for its version, -flags for its flags, and then once for each
// package with a file of instructions.
func vetting(args []string) bool {
	if len(args) == 0 {
		return false
	}
	last := args[len(args)-1]
	return args[0] == "-V=full" || args[0] == "-flags" || strings.HasSuffix(last, ".cfg") && allFlags(args[:len(args)-1])
}

func allFlags(args []string) bool {
	for _, a := range args {
		if !strings.HasPrefix(a, "-") {
			return false
		}
	}
	return true
}

// vet answers the go command. It does not return.
func vet() { unitchecker.Main(gosource.Passes...) }
