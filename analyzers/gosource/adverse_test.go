package gosource_test

import (
	"context"
	"os"
	"path/filepath"
	"runtime"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/txtar"

	"dextral/analyzers/gosource"
)

// tree extracts an archive that is written into a test.
func tree(t *testing.T, archive string) []gosource.File {
	t.Helper()
	dir, _ := extract(t, txtar.Parse([]byte(archive)))
	return goFiles(t, dir)
}

const rig = `
-- go.mod --
module tern.example/rig

go 1.26
-- rotor/rotor.go --
package rotor

import "fmt"

type Quat struct{ W, X, Y, Z float64 }

func (q Quat) String() string { return fmt.Sprint(q.W) }
-- mount/mount.go --
package mount

import (
	"math"

	"tern.example/rig/rotor"
)

var MountQuat = rotor.Quat{math.Sqrt2 / 2, math.Sqrt(0.5), 0, 0}

var Reach = math.Hypot(3, 4)
`

// TestWithoutGo takes the go command away: the module's own types and the
// constants of package math stay known, and the loss is said once.
func TestWithoutGo(t *testing.T) {
	files := tree(t, rig)
	t.Setenv("PATH", t.TempDir())
	result, err := gosource.Load(context.Background(), files)
	require.NoError(t, err)
	assert.Equal(t, `value mount/mount.go:9:27 MountQuat quaternion 0.7071067811865476 0.7071067811865476 0 0
note the go command was not found: types of imported packages are unknown, and values of such types may be missed
counts 1 packages 1 files 0 tests 0 vendored 1 silent
`, describe(result))
}

// TestCancelled stops at once with the context's error.
func TestCancelled(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := gosource.Load(ctx, tree(t, rig))
	assert.ErrorIs(t, err, context.Canceled)
}

// TestMissingFile names a file that is gone since the tree was listed, and
// audits the rest of its folder.
func TestMissingFile(t *testing.T) {
	files := tree(t, rig)
	dir := filepath.Dir(files[0].Name)
	files = append(files, gosource.File{Path: "mount/gone.go", Name: filepath.Join(dir, "gone.go")})
	result, err := gosource.Load(context.Background(), files)
	require.NoError(t, err)
	require.Len(t, result.Failures, 1)
	assert.Equal(t, "mount/gone.go", result.Failures[0].Place.String())
	assert.ErrorIs(t, result.Failures[0].Err, os.ErrNotExist)
	assert.False(t, result.Failures[0].Partial)
	assert.Len(t, result.Values, 1)
}

// TestNothing accepts an empty tree.
func TestNothing(t *testing.T) {
	result, err := gosource.Load(context.Background(), nil)
	require.NoError(t, err)
	assert.Equal(t, "counts 0 packages 0 files 0 tests 0 vendored 0 silent\n", describe(result))
}

// TestPlacesAbove prints paths above the start directory as they were given.
func TestPlacesAbove(t *testing.T) {
	files := tree(t, rig)
	for i := range files {
		files[i].Path = "../../" + files[i].Path
	}
	require.NoError(t, os.WriteFile(filepath.Join(filepath.Dir(filepath.Dir(files[0].Name)), "go.mod"), []byte("nonsense\n"), 0o644))
	result, err := gosource.Load(context.Background(), files)
	require.NoError(t, err)
	require.Len(t, result.Failures, 1)
	assert.Equal(t, "../../go.mod", result.Failures[0].Place.Path)
}

// TestParallelism gives the same result whatever runs at once. All cases of
// testdata together make one tree.
func TestParallelism(t *testing.T) {
	cases, err := filepath.Glob("testdata/*.txtar")
	require.NoError(t, err)
	var files []gosource.File
	for _, name := range cases {
		archive, err := txtar.ParseFile(name)
		require.NoError(t, err)
		dir, _ := extract(t, archive)
		for _, f := range goFiles(t, dir) {
			f.Path = filepath.Base(name) + "/" + f.Path
			files = append(files, f)
		}
	}
	load := func() string {
		result, err := gosource.Load(context.Background(), files)
		require.NoError(t, err)
		return describe(result)
	}
	want := load()
	for _, procs := range []int{1, 8} {
		before := runtime.GOMAXPROCS(procs)
		got := load()
		runtime.GOMAXPROCS(before)
		assert.Equal(t, want, got)
	}
}
