package gosource_test

import (
	"context"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/txtar"

	"dextral/analyzers/gosource"
)

// extract writes a txtar archive into a directory of its own and returns it
// with the section named want.
func extract(t *testing.T, archive *txtar.Archive) (dir, want string) {
	t.Helper()
	dir = t.TempDir()
	for _, f := range archive.Files {
		if f.Name == "want" {
			want = string(f.Data)
			continue
		}
		name := filepath.Join(dir, filepath.FromSlash(f.Name))
		require.NoError(t, os.MkdirAll(filepath.Dir(name), 0o755))
		require.NoError(t, os.WriteFile(name, f.Data, 0o644))
	}
	return dir, want
}

// goFiles lists the Go files of a tree as the audit would.
func goFiles(t *testing.T, dir string) []gosource.File {
	t.Helper()
	var files []gosource.File
	require.NoError(t, filepath.WalkDir(dir, func(name string, d fs.DirEntry, err error) error {
		if err == nil && !d.IsDir() && strings.HasSuffix(name, ".go") {
			rel, _ := filepath.Rel(dir, name)
			files = append(files, gosource.File{Path: filepath.ToSlash(rel), Name: name})
		}
		return err
	}))
	return files
}

var goVersion = regexp.MustCompile(`running go [0-9.a-z-]+`)

// describe prints a result as the want sections have it.
func describe(r *gosource.Result) string {
	var b strings.Builder
	for _, v := range r.Values {
		fmt.Fprintf(&b, "value %s %s %s", v.Place, v.Key, v.Form)
		for _, n := range v.Numbers {
			b.WriteString(" " + n.Text)
		}
		b.WriteByte('\n')
	}
	for _, f := range r.Failures {
		kind := "failed"
		if f.Partial {
			kind = "partial"
		}
		fmt.Fprintf(&b, "%s %s %s\n", kind, f.Place, goVersion.ReplaceAllString(f.Err.Error(), "running go VERSION"))
	}
	for _, n := range r.Notes {
		fmt.Fprintf(&b, "note %s\n", n)
	}
	fmt.Fprintf(&b, "counts %d packages %d files %d tests %d vendored %d silent\n", r.Packages, r.Files, r.Tests, r.Vendored, r.Silent)
	return b.String()
}

// TestLoad runs the cases of testdata. GOFLAGS would let the go command change
// go.mod, and the check after each case shows that it does not.
func TestLoad(t *testing.T) {
	cases, err := filepath.Glob("testdata/*.txtar")
	require.NoError(t, err)
	require.NotEmpty(t, cases)
	for _, name := range cases {
		t.Run(strings.TrimSuffix(filepath.Base(name), ".txtar"), func(t *testing.T) {
			t.Setenv("GOFLAGS", "-mod=mod")
			archive, err := txtar.ParseFile(name)
			require.NoError(t, err)
			dir, want := extract(t, archive)
			before := snapshot(t, dir)
			result, err := gosource.Load(context.Background(), goFiles(t, dir))
			require.NoError(t, err)
			assert.Equal(t, want, describe(result))
			assert.Equal(t, before, snapshot(t, dir), "the tree has changed")
		})
	}
}

// snapshot is the content of every file of a tree.
func snapshot(t *testing.T, dir string) map[string]string {
	t.Helper()
	files := map[string]string{}
	require.NoError(t, filepath.WalkDir(dir, func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		text, err := os.ReadFile(name)
		files[name] = string(text)
		return err
	}))
	return files
}
