package audit

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"slices"
	"testing"
	"time"

	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// fingerprints audits a copy of the demo after every file went through a change.
func fingerprints(t *testing.T, demo string, change func(ext string, text []byte) []byte) (found []*rules.Finding, prints []string) {
	t.Helper()
	dir := t.TempDir()
	require.NoError(t, os.CopyFS(dir, os.DirFS(demo)))
	require.NoError(t, filepath.WalkDir(dir, func(name string, d os.DirEntry, err error) error {
		if err != nil || d.IsDir() || filepath.Ext(name) == ".mod" || filepath.Ext(name) == ".md" {
			return err
		}
		text, err := os.ReadFile(name)
		require.NoError(t, err)
		return os.WriteFile(name, change(filepath.Ext(name), text), 0o644)
	}))
	in(t, dir, func() {
		result, err := Run(context.Background(), Options{Today: time.Now()})
		require.NoError(t, err)
		require.Empty(t, result.Report.Failed)
		found = result.Report.Findings
	})
	for _, f := range found {
		prints = append(prints, f.Fingerprint())
	}
	slices.Sort(prints)
	return found, prints
}

// Fingerprints hold what is claimed where in the structure: moving lines, other
// line ends and one more digit in every residual change none, though places and
// messages change.
func TestFingerprintsStay(t *testing.T) {
	demo, err := filepath.Abs(filepath.Join("..", "..", "fixtures", "demo"))
	require.NoError(t, err)
	plain, want := fingerprints(t, demo, func(_ string, text []byte) []byte { return text })
	require.Greater(t, len(want), 15)
	assert.Len(t, slices.Compact(slices.Clone(want)), len(want), "no two findings of the demo share one")

	moved, got := fingerprints(t, demo, func(_ string, text []byte) []byte { return append([]byte("\n\n\n"), text...) })
	assert.Equal(t, want, got, "three lines down")
	for i := range moved {
		assert.Equal(t, plain[i].Place.Line+3, moved[i].Place.Line)
	}

	_, got = fingerprints(t, demo, func(_ string, text []byte) []byte { return bytes.ReplaceAll(text, []byte("\n"), []byte("\r\n")) })
	assert.Equal(t, want, got, "other line ends")

	_, got = fingerprints(t, demo, func(ext string, text []byte) []byte {
		if ext == ".yaml" || ext == ".toml" {
			return append(text, "\n# a comment at the end\n"...)
		}
		return text
	})
	assert.Equal(t, want, got, "more text below")

	other, got := fingerprints(t, demo, func(_ string, text []byte) []byte {
		return bytes.ReplaceAll(text, []byte("W: 0.810920"), []byte("W: 0.820920"))
	})
	assert.Equal(t, want, got, "other numbers, the same contradictions")
	changed := 0
	for i := range other {
		if other[i].Message != plain[i].Message {
			changed++
		}
	}
	assert.Equal(t, 1, changed, "messages differ by their numbers")
}

// What a finding is about changes its fingerprint.
func TestFingerprintsTell(t *testing.T) {
	f := rules.Finding{Rule: "rotor-not-unit", Place: rules.Place{Path: "a.yaml", Line: 3, Column: 4}, Key: "cam.q", Claim: "quaternion", Message: "off by 3 deg"}
	seen := map[string]bool{f.Fingerprint(): true}
	for _, change := range []func(*rules.Finding){
		func(f *rules.Finding) { f.Rule = "axis-not-unit" }, func(f *rules.Finding) { f.Place.Path = "b.yaml" },
		func(f *rules.Finding) { f.Key = "cam.r" }, func(f *rules.Finding) { f.Claim = "rotation" },
		func(f *rules.Finding) { f.Key, f.Claim = "cam.qq", "uaternion" },
	} {
		g := f
		change(&g)
		assert.False(t, seen[g.Fingerprint()])
		seen[g.Fingerprint()] = true
	}
	g := f
	g.Place.Line, g.Place.Column, g.Message, g.Level = 9, 9, "off by 3.1 deg", rules.Error
	g.Evidence = []rules.Evidence{{What: "norm", Computed: rules.Plain(2)}}
	assert.Equal(t, f.Fingerprint(), g.Fingerprint())
}
