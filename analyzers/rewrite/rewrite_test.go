package rewrite_test

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/rewrite"
)

// file writes a file and returns its name.
func file(t *testing.T, dir, name, text string, mode os.FileMode) string {
	t.Helper()
	full := filepath.Join(dir, name)
	require.NoError(t, os.WriteFile(full, []byte(text), 0o644))
	require.NoError(t, os.Chmod(full, mode))
	return full
}

func assertHolds(t *testing.T, name, text string) {
	t.Helper()
	got, err := os.ReadFile(name)
	require.NoError(t, err)
	assert.Equal(t, text, string(got))
}

// assertClean holds that nothing is left beside the files named.
func assertClean(t *testing.T, dir string, names ...string) {
	t.Helper()
	entries, err := os.ReadDir(dir)
	require.NoError(t, err)
	var got []string
	for _, e := range entries {
		got = append(got, e.Name())
	}
	assert.Equal(t, names, got)
}

var old = rewrite.SumOf([]byte("old"))

func TestReplaceKeepsTheMode(t *testing.T) {
	dir := t.TempDir()
	for _, mode := range []os.FileMode{0o644, 0o600, 0o755, 0o664, 0o200 | 0o444} {
		name := file(t, dir, "a", "old", mode)
		require.NoError(t, rewrite.Replace(name, old, []byte("new")))
		assertHolds(t, name, "new")
		info, err := os.Stat(name)
		require.NoError(t, err)
		assert.Equal(t, mode, info.Mode())
		assertClean(t, dir, "a")
	}
}

func TestReplaceRefuses(t *testing.T) {
	dir := t.TempDir()
	changed := file(t, dir, "changed", "other", 0o644)
	assert.ErrorIs(t, rewrite.Replace(changed, old, []byte("new")), rewrite.ErrChanged)
	assertHolds(t, changed, "other")

	protected := file(t, dir, "protected", "old", 0o444)
	assert.EqualError(t, rewrite.Replace(protected, old, []byte("new")), "is write-protected; it is left as it is")
	assertHolds(t, protected, "old")

	assert.ErrorIs(t, rewrite.Replace(filepath.Join(dir, "none"), old, nil), os.ErrNotExist)
	assert.EqualError(t, rewrite.Replace(dir, old, nil), "is no regular file; it is left as it is")
	assertClean(t, dir, "changed", "protected")
}

func TestLinksStay(t *testing.T) {
	dir := t.TempDir()
	require.NoError(t, os.Mkdir(filepath.Join(dir, "far"), 0o755))
	target := file(t, filepath.Join(dir, "far"), "a", "old", 0o640)
	link := filepath.Join(dir, "link")
	require.NoError(t, os.Symlink(filepath.Join("far", "a"), link))
	require.NoError(t, rewrite.Replace(link, old, []byte("new")))
	assertHolds(t, target, "new")
	to, err := os.Readlink(link)
	require.NoError(t, err)
	assert.Equal(t, filepath.Join("far", "a"), to)
	assertClean(t, dir, "far", "link")
	assertClean(t, filepath.Join(dir, "far"), "a")
}

func TestCreate(t *testing.T) {
	dir := t.TempDir()
	name := filepath.Join(dir, "a")
	require.NoError(t, rewrite.Create(name, []byte("new")))
	assertHolds(t, name, "new")
	assert.EqualError(t, rewrite.Create(name, []byte("newer")), "is there already; it is left as it is")
	assertHolds(t, name, "new")
	assert.Error(t, rewrite.Create(filepath.Join(dir, "none", "a"), nil))
	require.NoError(t, os.Symlink("nowhere", filepath.Join(dir, "link")))
	assert.Error(t, rewrite.Create(filepath.Join(dir, "link"), nil), "a dangling link is something too")
	assertClean(t, dir, "a", "link")
}
