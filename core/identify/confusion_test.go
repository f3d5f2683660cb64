package identify

import (
	_ "embed"
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The table in the package documentation is made with -cases 100000 -v.
var cases = flag.Int("cases", 500, "random cases for each kind and rounding of the confusion table")

// counts is a cell of the confusion table.
type counts struct {
	n       int // cases
	inside  int // of which a relation in the set holds
	right   int // inside, decided, and so it was made
	wrong   int // decided, and not so
	alarms  int // as claimed, but called contradicted or unexplained
	generic struct{ inside, right int }
}

func (c *counts) add(d counts) {
	c.n += d.n
	c.inside += d.inside
	c.right += d.right
	c.wrong += d.wrong
	c.alarms += d.alarms
	c.generic.inside += d.generic.inside
	c.generic.right += d.generic.right
}

// judge compares one pair of statements and enters it.
func (c *counts) judge(t *testing.T, s sample, sh shape, a, b Statement) {
	r := Same(a, b)
	c.n++
	right := r.Decided && r.Best.Readings[0].exact(s.a, s.b) < madeSo(r, a, b)
	if r.Decided && !right {
		c.wrong++
		t.Logf("wrong: %s: %+v, %+v: %v %v; planted %v, outside %v", sh.name, a, b, r.Verdict, r.Best, s.planted, s.outside)
	}
	if s.outside {
		return
	}
	c.inside++
	if sh.generic {
		c.generic.inside++
	}
	if right {
		c.right++
		if sh.generic {
			c.generic.right++
		}
	}
	if s.planted == 0 && (r.Verdict == Contradicted || r.Verdict == Unexplained) {
		c.alarms++
		t.Errorf("alarm: %s: %+v, %+v: %v %s", sh.name, a, b, r.Verdict, r.Reason)
	}
}

// madeSo is the residual before rounding up to which a hypothesis counts as
// the truth. Where the claims are confirmed it is what rounding can do to two statements
// and their comparison, since more has not been said; where they are
// contradicted it is the rounding of the arithmetic.
func madeSo(r Result, a, b Statement) float64 {
	if r.Verdict == Contradicted {
		return 1e-9
	}
	return 2 * (a.Tolerance + b.Tolerance)
}

// run draws n samples, half of them generic.
func (k kind) run(t *testing.T, seed uint64, d digits, n int) (all counts, byShape map[string]counts) {
	g := rand.New(rand.NewPCG(seed, 1))
	byShape = map[string]counts{}
	for i := range n {
		sh := shapes[0]
		if i%2 == 1 {
			sh = shapes[1+i/2%(len(shapes)-1)]
		}
		s := k.sample(g, sh)
		var c counts
		c.judge(t, s, sh, d.roundTo(s.a, s.unit), d.roundTo(s.b, s.unit))
		all.add(c)
		c.add(byShape[sh.name])
		byShape[sh.name] = c
	}
	return all, byShape
}

//go:embed doc.go
var documentation string

// TestConfusion measures the table of the package documentation and holds the
// documentation to it: every percentage within what so many cases can tell,
// at most one wrong decision in ten thousand, and no false alarm at all.
func TestConfusion(t *testing.T) {
	var total counts
	shaped := map[string]counts{}
	var lines []string
	for _, k := range kinds {
		line := fmt.Sprintf("%-36s", k.title)
		var row counts
		for i, d := range roundings {
			c, byShape := k.run(t, uint64(100+i), d, *cases)
			line += fmt.Sprintf(" %6.2f", percent(c.generic.right, c.generic.inside))
			row.add(c)
			if d.name == sixDecimals {
				for name, s := range byShape {
					s.add(shaped[name])
					shaped[name] = s
				}
			}
			documented(t, k.title, i, c.generic.right, c.generic.inside)
			assert.LessOrEqual(t, float64(c.wrong), most(c.n), "%s, %s", k.title, d.name)
		}
		lines = append(lines, fmt.Sprintf("%s %8d", line, row.wrong))
		total.add(row)
	}
	for _, sh := range shapes {
		c := shaped[sh.name]
		lines = append(lines, fmt.Sprintf("%-36s %6.2f %8d", sh.name, percent(c.right, c.inside), c.wrong))
		documented(t, sh.name, 0, c.right, c.inside)
	}
	t.Logf("%d cases, %d decided wrongly, %d false alarms\n%s", total.n, total.wrong, total.alarms, strings.Join(lines, "\n"))
	assert.Zero(t, total.alarms)
}

func percent(part, of int) float64 { return 100 * float64(part) / float64(of) }

// most is the largest number of wrong decisions among n that a rate of one in
// ten thousand leads to, but for one run in some hundreds.
func most(n int) float64 {
	mean := 1e-4 * float64(n)
	return mean + 3*math.Sqrt(mean) + 1
}

// documented compares a measured share with a column of the documentation.
func documented(t *testing.T, title string, column, part, of int) {
	t.Helper()
	for _, line := range strings.Split(documentation, "\n") {
		cells, ok := strings.CutPrefix(line, "//\t"+fmt.Sprintf("%-36s", title)+" ")
		if !ok {
			continue
		}
		fields := strings.Fields(cells)
		require.Greater(t, len(fields), column, line)
		want, err := strconv.ParseFloat(fields[column], 64)
		require.NoError(t, err, line)
		p := want / 100
		deviation := math.Sqrt(math.Max(p*(1-p), 1e-3) / float64(of))
		assert.InDelta(t, want, percent(part, of), 100*5*deviation, "%s, column %d", title, column+1)
		return
	}
	t.Errorf("the package documentation has no row %q", title)
}
