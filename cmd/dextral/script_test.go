package main

import (
	"flag"
	"os"
	"path/filepath"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

var update = flag.Bool("update", false, "rewrite what the scripts expect")

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"dextral": main})
}

// TestScripts runs the command as users do. Each script is prose, commands and
// the files they work on.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 filepath.Join("testdata", "script"),
		UpdateScripts:       *update,
		RequireUniqueNames:  true,
		RequireExplicitExec: true,
		Setup: func(env *testscript.Env) error {
			root, err := filepath.Abs(filepath.Join("..", ".."))
			env.Setenv("FIXTURES", filepath.Join(root, "fixtures"))
			env.Setenv("HOME", env.WorkDir)
			for _, name := range []string{"GOROOT", "GOPATH", "GOCACHE", "GOMODCACHE"} {
				if v := os.Getenv(name); v != "" {
					env.Setenv(name, v)
				}
			}
			return err
		},
	})
}
