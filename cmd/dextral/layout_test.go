package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

// layers lists the layers from the lowest up. A package imports its own layer
// and those below.
var layers = []string{"core", "rules", "analyzers", "cmd"}

func layer(pkg string) int {
	for i, l := range layers {
		if pkg == "dextral/"+l || strings.HasPrefix(pkg, "dextral/"+l+"/") {
			return i
		}
	}
	return -1
}

// TestImportsPointDown holds the one direction of imports, and that core knows
// nothing but the standard library.
func TestImportsPointDown(t *testing.T) {
	list := exec.Command("go", "list", "-f", `{{.ImportPath}} {{join .Imports " "}}`, "dextral/...")
	list.Dir = filepath.Join("..", "..")
	out, err := list.Output()
	require.NoError(t, err)
	seen := map[int]bool{}
	for line := range strings.Lines(string(out)) {
		words := strings.Fields(line)
		from := layer(words[0])
		require.GreaterOrEqual(t, from, 0, "%s is in no layer", words[0])
		seen[from] = true
		for _, to := range words[1:] {
			switch l := layer(to); {
			case l > from:
				t.Errorf("%s imports %s, which is above it", words[0], to)
			case l < 0 && from == 0 && strings.Contains(strings.Split(to, "/")[0], "."):
				t.Errorf("%s imports %s: core knows the standard library only", words[0], to)
			}
		}
	}
	require.Len(t, seen, len(layers), "a layer has no package: the listing is incomplete")
}

// TestTopLevel holds the names that may stand at the top of the repository.
func TestTopLevel(t *testing.T) {
	allowed := map[string]bool{"cmd": true, "analyzers": true, "rules": true, "fixtures": true, "core": true,
		"go.mod": true, "go.sum": true, "README.md": true, "DEVELOPERS.md": true}
	ls := exec.Command("git", "ls-files", "--cached", "--others", "--exclude-standard")
	ls.Dir = filepath.Join("..", "..")
	out, err := ls.Output()
	if err != nil {
		t.Skip("not a git checkout")
	}
	for line := range strings.Lines(string(out)) {
		top, _, _ := strings.Cut(strings.TrimSpace(line), "/")
		if !allowed[top] && !strings.HasPrefix(top, ".") {
			t.Errorf("%s does not belong at the top level", top)
		}
	}
	for name := range allowed {
		_, err := os.Stat(filepath.Join("..", "..", name))
		require.NoError(t, err)
	}
}
