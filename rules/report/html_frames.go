package report

import (
	"fmt"
	"math"
	"slices"
	"unicode/utf8"
)

// graphDrawing is a frame graph in columns: a frame stands as many columns from the
// first of its part as it takes edges to get there, so that every edge joins
// neighbouring columns or stays within one.
type graphDrawing struct {
	FrameGraph
	Width, Height int
	Nodes         []nodeDrawing
	Lines         []lineDrawing
	Closures      []string
	TooMany       bool // frames to be drawn; the tables show them
}

type nodeDrawing struct {
	Name, Full string
	X, Y       int // of its middle
}

type lineDrawing struct {
	Path    string
	Title   string
	Assumed bool
}

// Sizes of the drawing, in its units.
const (
	columnWide = 210
	rowHigh    = 56
	nodeWide   = 130
	nodeHigh   = 30
	maxDrawn   = 150 // frames
)

func drawGraph(g FrameGraph) graphDrawing {
	d := graphDrawing{FrameGraph: g}
	for _, l := range g.Loops {
		d.Closures = append(d.Closures, l.text())
	}
	frames := 0
	for _, part := range g.Parts {
		frames += len(part)
	}
	if d.TooMany = frames > maxDrawn; d.TooMany {
		return d
	}
	at := map[string]nodeDrawing{}
	for _, part := range g.Parts {
		rows, wide := 0, 0
		for i, column := range columns(part, g.Edges) {
			for j, name := range column {
				n := nodeDrawing{Name: short(name), Full: name, X: i*columnWide + columnWide/2, Y: d.Height + j*rowHigh + rowHigh/2}
				at[name] = n
				d.Nodes = append(d.Nodes, n)
			}
			rows, wide = max(rows, len(column)), max(wide, i+1)
		}
		d.Height += rows * rowHigh
		d.Width = max(d.Width, wide*columnWide)
	}
	seen := map[[2]string]int{}
	for _, e := range g.Edges {
		pair := [2]string{min(e.From, e.To), max(e.From, e.To)}
		d.Lines = append(d.Lines, lineDrawing{
			Path: arrow(at[e.From], at[e.To], seen[pair]), Assumed: e.Assumed,
			Title: fmt.Sprintf("v_%s = R v_%s: %s, %s", clean(e.To), clean(e.From), clean(e.Key), clean(e.Place.String())),
		})
		seen[pair]++
	}
	return d
}

// columns sorts the frames of a part by their distance from the first one.
func columns(part []string, edges []FrameEdge) [][]string {
	beside := map[string][]string{}
	for _, e := range edges {
		beside[e.From] = append(beside[e.From], e.To)
		beside[e.To] = append(beside[e.To], e.From)
	}
	var list [][]string
	placed := map[string]bool{part[0]: true}
	for next := part[:1]; len(next) > 0; {
		list = append(list, next)
		var after []string
		for _, name := range next {
			for _, n := range beside[name] {
				if !placed[n] {
					placed[n] = true
					after = append(after, n)
				}
			}
		}
		next = after
	}
	for _, name := range part { // an edge that could not be used leaves a frame by itself
		if !placed[name] {
			list[0] = append(slices.Clip(list[0]), name)
		}
	}
	return list
}

// arrow joins the borders of two frames; of several edges between them, each takes
// a way of its own.
func arrow(from, to nodeDrawing, nth int) string {
	bend := float64((nth+1)/2*26) * float64(1-2*(nth%2))
	if from.X == to.X { // within a column: around what stands between
		side := from.X + nodeWide/2
		return fmt.Sprintf("M%d %d Q%d %d %d %d", side, from.Y, side+50+18*nth, (from.Y+to.Y)/2, side+3, to.Y)
	}
	sign := 1
	if to.X < from.X {
		sign = -1
	}
	x1, x2 := from.X+sign*nodeWide/2, to.X-sign*(nodeWide/2+3)
	return fmt.Sprintf("M%d %d Q%d %d %d %d", x1, from.Y, (x1+x2)/2, (from.Y+to.Y)/2+int(math.Round(bend)), x2, to.Y)
}

// short is a name that fits into its box: its end, which tells frames of one tree apart.
func short(name string) string {
	name = clean(name)
	const most = 16
	if utf8.RuneCountInString(name) <= most {
		return name
	}
	runes := []rune(name)
	return "…" + string(runes[len(runes)-most+1:])
}
