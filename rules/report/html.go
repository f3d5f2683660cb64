package report

import (
	"cmp"
	"crypto/sha256"
	_ "embed"
	"encoding/base64"
	"fmt"
	"html/template"
	"io"
	"slices"

	"dextral/rules"
)

// Page is what the HTML report shows: the report, and what stands beside it.
type Page struct {
	Report  *Report
	Version string
	Lines   map[rules.Place][]SourceLine // around the findings, where they could be read
	Graphs  []FrameGraph
	Sheets  []Sheet
	NoSheet []string // why there is no sheet of a directory
}

// SourceLine is a line of an audited file.
type SourceLine struct {
	Number int
	Text   string
}

// HTML writes the report as one file for people who would rather look than read. It
// needs nothing else, and its policy lets it load nothing and run no script but its
// own, known by their digests: should text of an audited file ever pass for markup, it
// still could do nothing. Without scripts all of it can be read.
func HTML(w io.Writer, p *Page) error { return page.Execute(w, newView(p)) }

//go:embed page/page.html
var pageHTML string

//go:embed page/page.css
var pageCSS string

//go:embed page/page.js
var pageJS string

var page = template.Must(template.New("page").Funcs(template.FuncMap{
	"clean": clean, "levelText": levelText, "waiverText": waiverText, "rowText": rowText,
	"stated": statedCell, "computed": computedCell, "residual": residualCell,
	"plural": plural[int],
}).Parse(pageHTML))

// view is the page as the template wants it.
type view struct {
	*Page
	Style         template.CSS
	Script        template.JS
	Policy        string
	Found, Gate   string
	Audited, Left string
	Tally         Tally
	Files         []fileView
	Rules         []ruleView
	Frames        []graphDrawing
	Caution       string
}

type fileView struct {
	Path     string
	Findings []*findingView
}

type ruleView struct {
	rules.Rule
	Findings []*findingView
}

type findingView struct {
	*rules.Finding
	ID      string
	Source  []sourceView
	Drawing *turnDrawing
}

func newView(p *Page) *view {
	r := p.Report
	v := &view{
		Page: p, Style: template.CSS(pageCSS), Script: template.JS(pageJS),
		Policy: fmt.Sprintf("default-src 'none'; base-uri 'none'; form-action 'none'; style-src %s; script-src %s", digest(pageCSS), digest(pageJS)),
		Found:  levelCounts(r.Tally()), Gate: gateText(r), Audited: auditedText(r.Audited), Left: leftOutText(r.LeftOut),
		Tally: r.Tally(), Caution: caution,
	}
	byRule := map[string][]*findingView{}
	files := map[string]int{}
	for i, f := range r.Findings {
		one := &findingView{Finding: f, ID: fmt.Sprintf("f%d", i+1), Source: sourceViews(f.Place, p.Lines[f.Place])}
		if f.Turn != nil {
			one.Drawing = drawTurn(f.Turn)
		}
		at, ok := files[f.Place.Path]
		if !ok {
			at = len(v.Files)
			files[f.Place.Path] = at
			v.Files = append(v.Files, fileView{Path: f.Place.Path})
		}
		v.Files[at].Findings = append(v.Files[at].Findings, one)
		byRule[f.Rule] = append(byRule[f.Rule], one)
	}
	for _, rule := range rules.Catalogue() {
		if list := byRule[rule.Name]; len(list) > 0 {
			v.Rules = append(v.Rules, ruleView{rule, list})
		}
	}
	slices.SortStableFunc(v.Rules, func(a, b ruleView) int { return cmp.Compare(len(b.Findings), len(a.Findings)) })
	for _, g := range p.Graphs {
		v.Frames = append(v.Frames, drawGraph(g))
	}
	return v
}

// digest names a script or style in a content security policy.
func digest(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
}

func statedCell(e rules.Evidence) string { return quantityText(e.Stated, statedText) }

func computedCell(e rules.Evidence) string {
	return quantityText(e.Computed, func(q rules.Quantity) string { return computedText(q, e.Stated) })
}

func residualCell(e rules.Evidence) string { return quantityText(e.Residual, residualText) }

func quantityText(q rules.Quantity, number func(rules.Quantity) string) string {
	switch {
	case !q.Known:
		return ""
	case q.Text != "":
		return clean(q.Text)
	case q.Unit == "":
		return number(q)
	}
	return number(q) + " " + clean(q.Unit)
}
