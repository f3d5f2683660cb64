package report

import (
	"bytes"
	"context"
	"html"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/rotor"
	"dextral/rules"
)

// samplePage is the sample with everything that a page shows beside it.
func samplePage(t *testing.T) *Page {
	t.Helper()
	turned, ok := rotor.FromAxisAngle(rotor.Vec{Z: 1}, 23.4137*deg)
	require.True(t, ok)
	r := sample()
	p := &Page{Report: r, Version: "1.2.3", Lines: map[rules.Place][]SourceLine{}}
	for _, f := range r.Findings {
		if f.Rule == rules.MovingFixedSwapped {
			f.Turn = &rules.Turn{Stated: rotor.One, Computed: turned, By: "cameras.left.rpy", Against: "cameras.left.q"}
			p.Lines[f.Place] = []SourceLine{{13, "  left:"}, {14, "    rpy: [10, 20, 30]  # deg"}}
		}
	}
	edge := func(to, from string) FrameEdge {
		return FrameEdge{To: to, From: from, Key: "T_" + to + "_" + from, Place: at("calib/rig.yaml", 3, 1, 9)}
	}
	p.Graphs = []FrameGraph{{Title: "calib/rig.yaml", Parts: [][]string{{"body", "cam", "imu"}}, Edges: []FrameEdge{edge("body", "cam"), edge("body", "imu"), edge("cam", "imu")},
		Loops: []FrameLoop{{Frames: []string{"body", "cam", "imu"}, Degrees: 2.5, Verdict: "does not close"}}}}
	p.Sheets = []Sheet{{Packages: []SheetPackage{{Path: "tern/mount", Types: []SheetEntry{{Name: "Quat", At: "mount/mount.go:9", Lines: []SheetLine{{What: "stored", Says: "w x y z"}, {What: "product", Says: "not Hamilton's", Wrong: true}}}}}}}}
	return p
}

func htmlOf(t *testing.T, p *Page) string {
	t.Helper()
	var b bytes.Buffer
	require.NoError(t, HTML(&b, p))
	return b.String()
}

var inner = regexp.MustCompile(`(?s)(<(svg|style|script)\b[^>]*>).*?(</(?:svg|style|script)>)`)
var digests = regexp.MustCompile(`sha256-[^;]*?=`)

// The golden file holds the page without drawings, style and script.
func TestHTML(t *testing.T) {
	out := htmlOf(t, samplePage(t))
	golden(t, "html", []byte(digests.ReplaceAllString(inner.ReplaceAllString(out, "$1$3"), "sha256-...")))
	assert.Contains(t, out, `<mark>[10, 20, 30]  # deg</mark>`)
	assert.Equal(t, 1, strings.Count(out, `class="sector"`))
	assert.Equal(t, 3, strings.Count(out, `class="edge"`))
}

// The policy lets exactly the style and the script through that the page carries, and
// nothing in the page asks for anything else.
func TestHTMLStandsAlone(t *testing.T) {
	out := htmlOf(t, samplePage(t))
	for _, tag := range []string{"style", "script"} {
		bodies := regexp.MustCompile(`(?s)<`+tag+`>(.*?)</`+tag+`>`).FindAllStringSubmatch(out, -1)
		require.Len(t, bodies, 1)
		assert.Contains(t, html.UnescapeString(out), tag+"-src "+digest(bodies[0][1]))
	}
	assert.NotRegexp(t, `(?i)\ssrc=|href="[^#]|url\([^#]|@import|https?:|\son[a-z]+=|\sstyle=`, inner.ReplaceAllString(out, "$1$3"))
	assert.NotRegexp(t, `(?i)url\(|@import|https?:|fetch|XMLHttp|innerHTML|eval`, pageCSS+pageJS)
}

// No text of an audited file becomes markup, wherever it stands.
func TestHTMLEscapes(t *testing.T) {
	nasty := `"'><script>alert(1)</script><img src=x onerror=alert(1)></pre></svg>{{.}}` + "\x00\x1b\u202e\xff"
	place := rules.Place{Path: nasty, Line: 1, Column: 2, EndLine: 1, EndColumn: 20, Row: 2, Time: nasty}
	r := &Report{
		Findings: []*rules.Finding{{Rule: rules.NotFinite, Place: place, Key: nasty, Message: nasty, Claim: nasty, Remedy: nasty, Command: nasty,
			Evidence: []rules.Evidence{{What: nasty, Stated: rules.Words(nasty), Computed: rules.Quantity{Value: 1, Unit: nasty, Known: true}}},
			Related:  []rules.Related{{Place: place, Message: nasty}}, Edit: &rules.Edit{Why: nasty, Was: []string{nasty}, Now: []string{nasty}},
			Turn:   &rules.Turn{Stated: rotor.One, Computed: rotor.One, By: nasty, Against: nasty},
			Waiver: &rules.Waiver{Because: nasty, Owner: nasty, Until: nasty, At: place}, Lapsed: &rules.Waiver{Because: nasty, Owner: nasty, Until: nasty, At: place}}},
		Undecided: []Undecided{{place, nasty, nasty}}, Unreadable: []Skipped{{nasty, nasty}}, Failed: []Failure{{place, nasty}}, Limited: []Failure{{place, nasty}},
	}
	p := &Page{Report: r, Version: nasty, Lines: map[rules.Place][]SourceLine{place: {{1, nasty}}}, NoSheet: []string{nasty},
		Graphs: []FrameGraph{{Title: nasty, Sense: nasty, Parts: [][]string{{nasty, "b"}}, Axes: []Axes{{Name: nasty, Axes: nasty}},
			Edges: []FrameEdge{{To: nasty, From: "b", Key: nasty, Place: place}}, Loops: []FrameLoop{{Frames: []string{nasty}, Verdict: nasty}}}},
		Sheets: []Sheet{{Packages: []SheetPackage{{Path: nasty, Left: []SheetEntry{{nasty, nasty, []SheetLine{{nasty, nasty, true}}}}}}}}}
	out := htmlOf(t, p)
	assert.Equal(t, 1, strings.Count(out, "<script"))
	assert.NotContains(t, out, "<img")
	assert.Greater(t, strings.Count(out, "&lt;script&gt;alert(1)"), 30)
	assert.NotRegexp(t, `[\x00\x1b\x{202e}]`, out)
	assert.NotContains(t, out, "ZgotmplZ")
}

func TestHTMLOfNothing(t *testing.T) {
	out := htmlOf(t, &Page{Report: &Report{}})
	assert.Contains(t, out, "<title>Orientation audit: nothing</title>")
	assert.NotContains(t, out, `id="filter"`)
}

// What is marked is what the place says, in code points, and long lines are cut around it.
func TestSourceViews(t *testing.T) {
	p := rules.Place{Line: 2, Column: 3, EndLine: 3, EndColumn: 2}
	assert.Equal(t, []sourceView{{1, "", "", "one"}, {2, "é:", "[1", ""}, {3, "", "2", "]"}, {4, "", "", "x"}},
		sourceViews(p, []SourceLine{{1, "one"}, {2, "é:[1"}, {3, "2]"}, {4, "x"}}))
	long := strings.Repeat("a", 1000) + "MARK" + strings.Repeat("b", 1000)
	v := sourceViews(rules.Place{Line: 1, Column: 1001, EndLine: 1, EndColumn: 1005}, []SourceLine{{1, long}})[0]
	assert.Equal(t, "MARK", v.Mark)
	assert.Equal(t, "…"+strings.Repeat("a", shownAhead), v.Before)
	assert.Len(t, []rune(v.Before+v.Mark+v.After), maxShown+2)
	assert.Equal(t, sourceView{Number: 1, Before: "ab"}, sourceViews(rules.Place{Line: 1, Column: 90, EndLine: 1, EndColumn: 95}, []SourceLine{{1, "ab"}})[0], "a file that changed")
}

// The angle drawn is the angle between the rotations, from none to half a turn.
func TestDrawTurn(t *testing.T) {
	for _, angle := range []float64{0, 1e-9, 0.01, 30 * deg, 90 * deg, math.Pi - 1e-9, math.Pi} {
		b, _ := rotor.FromAxisAngle(rotor.Vec{X: 1, Y: -2, Z: 0.5}, angle)
		a, _ := rotor.FromAxisAngle(rotor.Vec{X: 3, Y: 1, Z: 1}, 1)
		d := drawTurn(&rules.Turn{Stated: a, Computed: b.Mul(a)})
		assert.Equal(t, coordinate(axisLength*math.Cos(angle)), d.DialX)
		assert.Equal(t, coordinate(-axisLength*math.Sin(angle)), d.DialY)
		assert.NotContains(t, d.Sector+d.DialX+d.DialY+d.About, "NaN")
		assert.Equal(t, angle > 0, d.Line != nil, "%g", angle)
		assert.Len(t, d.Axes, 6)
	}
}

// Every edge of a graph joins neighbouring columns, or stays within one.
func TestDrawGraph(t *testing.T) {
	g := samplePage(t).Graphs[0]
	d := drawGraph(g)
	at := map[string]nodeDrawing{}
	for _, n := range d.Nodes {
		at[n.Full] = n
		assert.True(t, n.X >= nodeWide/2 && n.X <= d.Width-nodeWide/2 && n.Y >= nodeHigh/2 && n.Y <= d.Height-nodeHigh/2, "%+v", n)
	}
	require.Len(t, at, 3)
	for _, e := range g.Edges {
		assert.LessOrEqual(t, math.Abs(float64(at[e.From].X-at[e.To].X)), float64(columnWide))
	}
	for i := range maxDrawn + 1 {
		g.Parts[0] = append(g.Parts[0], strings.Repeat("f", i+1))
	}
	assert.True(t, drawGraph(g).TooMany)
}

// TestHTMLInBrowser uses the page in a real browser, by testdata/drive.js.
func TestHTMLInBrowser(t *testing.T) {
	browser := ""
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome", "chrome", "chromium-headless-shell"} {
		if found, err := exec.LookPath(name); err == nil {
			browser = found
			break
		}
	}
	if browser == "" {
		t.Skip("chromium is not here: the page is not opened in a browser")
	}
	driver, err := os.ReadFile(filepath.Join("testdata", "drive.js"))
	require.NoError(t, err)
	out := htmlOf(t, samplePage(t))
	allowed := html.EscapeString("script-src " + digest(string(driver)) + " ")
	out = strings.Replace(out, "script-src ", allowed, 1)
	out = strings.Replace(out, "<title>", "<script>"+string(driver)+"</script><title>", 1)
	dir := t.TempDir()
	file := filepath.Join(dir, "audit.html")
	require.NoError(t, os.WriteFile(file, []byte(out), 0o644))
	ctx, cancel := context.WithTimeout(context.Background(), time.Minute)
	defer cancel()
	dom, err := exec.CommandContext(ctx, browser, "--headless", "--no-sandbox", "--disable-gpu", "--disable-background-networking", "--no-first-run",
		"--user-data-dir="+filepath.Join(dir, "profile"), "--virtual-time-budget=5000", "--dump-dom", "file://"+filepath.ToSlash(file)).Output()
	require.NoError(t, err)
	outcome := regexp.MustCompile(`(?s)<pre id="outcome">(.*?)</pre>`).FindSubmatch(dom)
	require.NotNil(t, outcome, "the driver did not finish")
	assert.Equal(t, "nothing wrong", html.UnescapeString(string(outcome[1])))
}
