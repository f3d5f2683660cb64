package literal_test

import (
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/literal"
	"dextral/core/convention"
	"dextral/rules"
)

// Expectations stand beside the literals, as in analysistest: each backquoted
// pattern after "// want" matches one line of what describe prints for a value
// or a skipped literal on that line, and nothing else may be found. Unlike
// there, the analyzer must not see the expectations, because it reads comments:
// they are blanked out before the package is loaded.
var (
	want     = regexp.MustCompile("// want (.*)$")
	patterns = regexp.MustCompile("`([^`]*)`")
)

// found is what was found, or is wanted, by file and line.
type lines map[string][]string

// run analyses one package of testdata/src and compares.
func run(t *testing.T, name string) {
	dir, err := filepath.Abs(filepath.Join("testdata", "src"))
	require.NoError(t, err)
	overlay, wanted := map[string][]byte{}, lines{}
	files, err := filepath.Glob(filepath.Join(dir, name, "*.go"))
	require.NoError(t, err)
	require.NotEmpty(t, files)
	for _, file := range files {
		overlay[file] = blank(t, file, wanted)
	}
	pkgs, err := packages.Load(&packages.Config{Mode: packages.LoadSyntax, Dir: dir, Overlay: overlay, Tests: true}, "./"+name)
	require.NoError(t, err)
	got := lines{}
	for _, pkg := range pkgs {
		if strings.HasSuffix(pkg.ID, ".test") || strings.HasSuffix(pkg.ID, "]") && len(pkgs) < 2 {
			continue
		}
		if len(pkgs) > 1 && !strings.HasSuffix(pkg.ID, "]") {
			continue // the variant for tests has the same files and more
		}
		require.Empty(t, pkg.Errors)
		graph, err := checker.Analyze([]*analysis.Analyzer{literal.Analyzer}, []*packages.Package{pkg}, nil)
		require.NoError(t, err)
		got.add(graph.Roots[0].Result.(*literal.Result))
	}
	compare(t, dir, wanted, got)
}

// blank collects the expectations of a file and replaces them by spaces.
func blank(t *testing.T, file string, wanted lines) []byte {
	text, err := os.ReadFile(file)
	require.NoError(t, err)
	list := strings.Split(string(text), "\n")
	for i, line := range list {
		m := want.FindStringSubmatchIndex(line)
		if m == nil {
			continue
		}
		at := fmt.Sprintf("%s:%d", file, i+1)
		for _, p := range patterns.FindAllStringSubmatch(line[m[2]:m[3]], -1) {
			wanted[at] = append(wanted[at], p[1])
		}
		require.NotEmpty(t, wanted[at], "%s: a want without pattern", at)
		list[i] = line[:m[0]] + strings.Repeat(" ", len(line)-m[0])
	}
	return []byte(strings.Join(list, "\n"))
}

func (l lines) add(r *literal.Result) {
	letters := map[string]byte{}
	for _, v := range r.Values {
		at := fmt.Sprintf("%s:%d", v.Place.Path, v.Place.Line)
		l[at] = append(l[at], describe(v, letters))
	}
	for _, s := range r.Skipped {
		at := fmt.Sprintf("%s:%d", s.Place.Path, s.Place.Line)
		l[at] = append(l[at], "skip: "+s.Why.String())
	}
}

// compare reports what was found and not wanted, and the reverse.
func compare(t *testing.T, dir string, wanted, got lines) {
	for at, texts := range got {
		for _, text := range texts {
			if !take(wanted, at, text) {
				t.Errorf("%s: unexpected: %s", strings.TrimPrefix(at, dir+"/"), text)
			}
		}
	}
	for at, left := range wanted {
		for _, p := range left {
			t.Errorf("%s: nothing matches %s", strings.TrimPrefix(at, dir+"/"), p)
		}
	}
}

// take removes the first pattern of a line that matches.
func take(wanted lines, at, text string) bool {
	for i, p := range wanted[at] {
		if regexp.MustCompile(p).MatchString(text) {
			wanted[at] = append(wanted[at][:i:i], wanted[at][i+1:]...)
			return true
		}
	}
	return false
}

// describe prints a value: form, key, numbers, claims in subject order, what the
// angles are called, why it is undecided, and a letter for the orientation it states.
func describe(v *rules.Value, letters map[string]byte) string {
	var b strings.Builder
	form := v.Form.String()
	if form == "" {
		form = "three numbers"
	}
	fmt.Fprintf(&b, "%s %s", form, v.Key)
	for _, n := range v.Numbers {
		b.WriteString(" " + n.Text)
	}
	var said []string
	for _, subject := range convention.Subjects() {
		if c, ok := v.Claims.On(subject); ok {
			said = append(said, fmt.Sprintf("%s=%s by %s", subject, c.Says, c.Source))
		}
	}
	b.WriteString(": " + strings.Join(said, ", "))
	if v.Roles[0] != 0 {
		fmt.Fprintf(&b, "; %s %s %s", v.Roles[0], v.Roles[1], v.Roles[2])
	}
	if v.Why != "" {
		b.WriteString("; undecided: " + v.Why)
	}
	if v.Of != "" {
		if letters[v.Of] == 0 {
			letters[v.Of] = byte('A' + len(letters))
		}
		fmt.Fprintf(&b, " of %c", letters[v.Of])
	}
	return b.String()
}
