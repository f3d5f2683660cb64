package audit

import (
	"bytes"
	"context"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"dextral/rules/report"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// in runs f in a directory, whose name the command would print paths against.
func in(t testing.TB, dir string, f func()) {
	t.Helper()
	t.Chdir(dir)
	f()
}

func text(t testing.TB, o Options) string {
	t.Helper()
	o.Today = time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)
	r, err := Run(context.Background(), o)
	require.NoError(t, err)
	var out bytes.Buffer
	require.NoError(t, report.Text(&out, &r.Report, report.Options{}))
	require.NoError(t, report.SARIF(&out, &r.Report, "test", nil))
	return out.String()
}

// TestSameBytes: the report does not depend on how many files are read at a
// time, nor on the order or overlap of the paths asked for.
func TestSameBytes(t *testing.T) {
	demo, err := filepath.Abs(filepath.Join("..", "..", "fixtures", "demo"))
	require.NoError(t, err)
	in(t, demo, func() {
		want := text(t, Options{Workers: 1})
		assert.Contains(t, want, "sign-jump")
		for workers := 2; workers <= 16; workers *= 2 {
			require.Equal(t, want, text(t, Options{Workers: workers}))
		}
		require.Equal(t, text(t, Options{Paths: []string{"calib", "logs"}}), text(t, Options{Paths: []string{"logs", "calib/camera.yaml", "calib"}}))
	})
}

// TestCancelled: an interrupted audit says so instead of passing for a whole one.
func TestCancelled(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := Run(ctx, Options{Paths: []string{"."}})
	assert.ErrorIs(t, err, context.Canceled)
}

// TestInterrupted: what was read before an interrupt is audited, and the rest named.
func TestInterrupted(t *testing.T) {
	var log strings.Builder
	log.WriteString("t_s,qw,qx,qy,qz\n0,1,0,0,0\n0.1,-1,0,0,0\n")
	for i := range 400000 {
		fmt.Fprintf(&log, "%d.000000,1.000000,0,0,0\n", i+1)
	}
	dir := t.TempDir()
	require.NoError(t, os.WriteFile(filepath.Join(dir, "a.csv"), []byte(log.String()), 0o644))
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	r, err := Run(ctx, Options{Paths: []string{dir}, Progress: func(_ string, done, of int64) {
		if done > of/2 {
			cancel()
		}
	}})
	require.NoError(t, err)
	require.Len(t, r.Report.Failed, 1)
	assert.Contains(t, r.Report.Failed[0].Message, "interrupted")
	require.Len(t, r.Report.Limited, 1)
	assert.Regexp(t, "interrupted after [0-9]+ rows", r.Report.Limited[0].Message)
	assert.NotEmpty(t, r.Report.Findings, "the jump in the second row was read")
}

// TestIgnored: what version control ignores is left out and counted, unless it
// is asked for by name.
func TestIgnored(t *testing.T) {
	dir := t.TempDir()
	write := func(name, text string) {
		require.NoError(t, os.MkdirAll(filepath.Dir(filepath.Join(dir, name)), 0o755))
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	bad := "quaternion_wxyz: [0.503, 0.501, 0.499, 0.612]\n"
	write(".gitignore", "build/\n*.tmp.yaml\n!keep.tmp.yaml\n")
	write("sub/.gitignore", "/local.yaml\n")
	for _, name := range []string{"build/a.yaml", "b.tmp.yaml", "keep.tmp.yaml", "sub/local.yaml", "sub/deep/local.yaml", ".git/config.yaml"} {
		write(name, bad)
	}
	in(t, dir, func() {
		r, err := Run(context.Background(), Options{})
		require.NoError(t, err)
		var paths []string
		for _, f := range r.Report.Findings {
			paths = append(paths, f.Place.Path)
		}
		assert.Equal(t, []string{"keep.tmp.yaml", "sub/deep/local.yaml"}, paths)
		assert.Equal(t, 3, r.Report.LeftOut.Ignored)

		r, err = Run(context.Background(), Options{Paths: []string{"build/a.yaml"}})
		require.NoError(t, err)
		assert.Len(t, r.Report.Findings, 1)
	})
}

// TestNestedSheets: each file is judged by the nearest dextral.toml.
func TestNestedSheets(t *testing.T) {
	dir := t.TempDir()
	write := func(name, text string) {
		require.NoError(t, os.MkdirAll(filepath.Dir(filepath.Join(dir, name)), 0o755))
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	waive := "[[waiver]]\nrule = \"rotor-not-unit\"\nplace = \"{a,vendored/a}.yaml\"\nuntil = 2999-01-01\nbecause = \"bench\"\nowner = \"Oskar\"\n"
	bad := "quaternion_wxyz: [0.503, 0.501, 0.499, 0.612]\n"
	write("dextral.toml", waive)
	write("a.yaml", bad)
	write("vendored/dextral.toml", "gate = \"error\"\n")
	write("vendored/a.yaml", bad)
	in(t, dir, func() {
		r, err := Run(context.Background(), Options{Today: time.Now()})
		require.NoError(t, err)
		require.Len(t, r.Report.Findings, 2)
		assert.NotNil(t, r.Report.Findings[0].Waiver, "a.yaml is waived")
		assert.Nil(t, r.Report.Findings[1].Waiver, "vendored/a.yaml is not")
	})
}

// Formats that hold orientations and have no reader are named; what only shares an
// ending with one is not.
func TestUnread(t *testing.T) {
	for name, c := range map[string]struct{ head, want string }{
		"tern.bvh":    {"HIERARCHY\n", "motion capture (BVH)"},
		"SC_Tern.txt": {"<<<<<<<<<<<<<<<<<  42: Spacecraft Description File   >>>>>>>>>>>>>>>>>\n", "text file of the simulator 42"},
		"notes.txt":   {"see page 42: the mount\n", ""},
		"main.tf":     {"resource \"tern\" \"nose\" {\n}\n", ""},
		"tern.yaml":   {"q: 1\n", ""},
	} {
		assert.Equal(t, c.want, unreadConfig(name, []byte(c.head)), name)
	}
}
