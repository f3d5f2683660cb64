package report

import (
	"fmt"
	"io"
	"maps"
	"math"
	"path"
	"slices"
	"strconv"
	"strings"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/rules"
)

// FrameGraph is one chain of frames, ready to be drawn.
type FrameGraph struct {
	Title string // the file, or the files of a rig
	Sense string // what keys such as T_a_b mean here; "" if there are none
	Parts [][]string
	Axes  []Axes // of those frames of the graph whose axes are known
	Edges []FrameEdge
	Loops []FrameLoop
}

// FrameEdge is one orientation between two frames.
type FrameEdge struct {
	To, From string
	Key      string
	Place    rules.Place
	Assumed  bool // the direction rests on a key whose meaning is open
}

// FrameLoop is one loop with what it leaves open.
type FrameLoop struct {
	Frames  []string
	Degrees float64
	Open    float64 // degrees that the digits leave open
	Gap     float64 // in the unit of the translations
	OpenGap float64 // that the digits leave open
	Verdict string
}

// FrameGraphs draws up chains, with the axes of frames that are known.
func FrameGraphs(chains []*rules.Chain, axes []Axes) []FrameGraph {
	var graphs []FrameGraph
	for _, c := range chains {
		g := FrameGraph{Title: ChainTitle(c), Parts: c.Graph.Parts()}
		for _, a := range axes {
			if a.about(g.Parts, chainFiles(c)) {
				g.Axes = append(g.Axes, a)
			}
		}
		if c.Sense != rules.NoSubscripts {
			g.Sense = c.Sense.String()
		}
		for _, e := range c.Graph.Edges() {
			l := c.Links[e.ID]
			g.Edges = append(g.Edges, FrameEdge{To: e.To, From: e.From, Key: l.Value.Key, Place: l.Value.Place, Assumed: l.Subscript && c.Sense == rules.SenseOpen})
		}
		for _, l := range c.Loops() {
			g.Loops = append(g.Loops, FrameLoop{Frames: l.Frames, Degrees: l.Result.Angle * 180 / math.Pi, Open: l.Result.Open * 180 / math.Pi,
				Gap: l.Result.Gap, OpenGap: l.Result.OpenGap, Verdict: verdict(l)})
		}
		graphs = append(graphs, g)
	}
	return graphs
}

// about reports whether axes are those of a frame of a graph: declared for a directory
// that holds its files, or stated in one of them.
func (a Axes) about(parts [][]string, files []string) bool {
	if !slices.ContainsFunc(parts, func(part []string) bool { return slices.Contains(part, a.Name) }) {
		return false
	}
	return slices.ContainsFunc(files, func(file string) bool {
		dir := path.Dir(a.Place.Path)
		return file == a.Place.Path || a.Declared && (dir == "." && !strings.HasPrefix(file, "..") || strings.HasPrefix(file, dir+"/"))
	})
}

// chainFiles are the files of a chain, in order.
func chainFiles(c *rules.Chain) []string {
	var paths []string
	for _, l := range c.Links {
		if p := l.Value.Place.Path; len(paths) == 0 || paths[len(paths)-1] != p {
			paths = append(paths, p)
		}
	}
	return paths
}

// ChainTitle names a chain by its file, or the files of a rig.
func ChainTitle(c *rules.Chain) string {
	paths := chainFiles(c)
	if c.Rig {
		return "rig of " + strings.Join(paths, ", ")
	}
	return paths[0]
}

func verdict(l rules.Loop) string {
	switch {
	case l.OpenEitherWay():
		return "does not close, whatever keys such as T_a_b mean"
	case !l.Decidable:
		return "cannot be decided: it hangs on the meaning of keys such as T_a_b"
	case l.Result.Verdict == identify.Agree:
		return "closes"
	case l.Result.Verdict == identify.Undecided:
		return "cannot be decided: " + l.Result.Reason
	}
	return "does not close"
}

// Axes is a frame whose axes are declared or stated.
type Axes struct {
	Name  string
	Axes  string // in words, or the key that states them
	Hand  convention.Hand
	Place rules.Place

	Declared bool // in dextral.toml, for all files below it
}

// FrameAxes prints the axes of frames for people.
func FrameAxes(w io.Writer, list []Axes) error {
	p := newPrinter(w, Options{})
	for _, a := range list {
		p.line(fmt.Sprintf("axes      %s: %s, %s  %s", clean(a.Name), clean(a.Axes), a.Hand, clean(a.Place.String())))
	}
	if len(list) > 0 {
		p.line("")
	}
	return p.Flush()
}

// FramesText prints frame graphs for people.
func FramesText(w io.Writer, graphs []FrameGraph) error {
	p := newPrinter(w, Options{})
	for _, g := range graphs {
		p.line(g.Title)
		if g.Sense != "" {
			p.line("  sense   " + g.Sense)
		}
		for _, part := range g.Parts {
			p.line("  frames  " + strings.Join(part, ", "))
		}
		for _, e := range g.Edges {
			note := ""
			if e.Assumed {
				note = "  (direction assumed)"
			}
			p.line(fmt.Sprintf("  edge    v_%s = R v_%s  %s %s%s", e.To, e.From, e.Place, e.Key, note))
		}
		for _, l := range g.Loops {
			p.line("  loop    " + l.text())
		}
		p.line("")
	}
	p.line(fmt.Sprintf("%s of frames", plural(len(graphs), "graph")))
	return p.Flush()
}

// text says what the loop leaves open.
func (l FrameLoop) text() string {
	text := fmt.Sprintf("%s: %s; rotation off by %s", strings.Join(append(slices.Clone(l.Frames), l.Frames[0]), " -> "), l.Verdict, loopNumber(l.Degrees))
	if l.Gap > l.OpenGap {
		text += ", translation by " + strconv.FormatFloat(l.Gap, 'g', 3, 64)
	}
	return text
}

func loopNumber(deg float64) string {
	return residualText(rules.Quantity{Value: deg, Unit: "deg", Known: true}) + " deg"
}

// FramesDOT prints frame graphs in the DOT language, one digraph each, an arrow
// from the frame whose coordinates go in to the one whose come out. Nodes carry the
// axes that are known, and the label of the graph its loops.
func FramesDOT(w io.Writer, graphs []FrameGraph) error {
	p := newPrinter(w, Options{})
	for _, g := range graphs {
		p.line("digraph " + strconv.Quote(g.Title) + " {")
		labels, loops := map[string]string{}, []string{g.Title}
		for _, a := range g.Axes {
			labels[a.Name] += fmt.Sprintf("\n%s, %s", a.Axes, a.Hand)
		}
		for _, l := range g.Loops {
			loops = append(loops, "loop "+l.text())
		}
		p.line(fmt.Sprintf("  label=%s;", strconv.Quote(strings.Join(loops, "\n"))))
		for _, name := range slices.Sorted(maps.Keys(labels)) {
			p.line(fmt.Sprintf("  %s [label=%s];", strconv.Quote(name), strconv.Quote(name+labels[name])))
		}
		for _, e := range g.Edges {
			style := ""
			if e.Assumed {
				style = ", style=dashed"
			}
			p.line(fmt.Sprintf("  %s -> %s [label=%s%s];", strconv.Quote(e.From), strconv.Quote(e.To), strconv.Quote(e.Key+"\n"+e.Place.String()), style))
		}
		p.line("}")
	}
	return p.Flush()
}
