package identify

import (
	"math"
	"math/rand/v2"
	"testing"

	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestCubesAreAGroup(t *testing.T) {
	for c, r := range cubes {
		assert.InDelta(t, 1, r.Norm(), 1e-15)
		assert.Equal(t, Cube(c), nearestCube(r.Neg()))
		assert.InDelta(t, 1, cubeDot(r), 1e-15)
		assert.InDelta(t, 1, math.Abs(r.Mul(cubes[inverses[c]]).S), 1e-15)
		for d := range c {
			assert.Less(t, math.Abs(r.Dot(cubes[d])), 0.75, "%d and %d are two", c, d)
			product := r.Mul(cubes[d])
			assert.InDelta(t, 1, math.Abs(product.Dot(cubes[nearestCube(product)])), 1e-15)
		}
	}
}

// The distance to the nearest cube, found by sums, is that found by trying all.
func TestNearestCube(t *testing.T) {
	g := rand.New(rand.NewPCG(1, 2))
	for range 20000 {
		r := haar(g)
		best := 0.0
		for _, c := range cubes {
			best = max(best, math.Abs(c.Dot(r)))
		}
		require.InDelta(t, best, cubeDot(r), 1e-14)
	}
}

// everything collects all hypotheses about two statements up to a cost, by
// leaving open all there is.
func everything(t *testing.T, a, b Statement, cost int) []candidate {
	a.Tolerance, b.Tolerance = 1, 1
	var s search
	require.Empty(t, s.read(a, b))
	s.inverse = 1
	for c := range cost + 1 {
		s.level(c)
	}
	require.Empty(t, s.nearest)
	return s.found
}

// Hypotheses have one alias exactly if they have one residual for all numbers.
// Sets of random numbers stand for all: each hypothesis gets the residuals it has on three
// of them.
func TestAliases(t *testing.T) {
	for _, k := range kinds {
		if k.bare {
			continue
		}
		g := rand.New(rand.NewPCG(3, 4))
		claimA, claimB := k.claim(g, k.a), k.claim(g, k.b)
		pair := func() (Statement, Statement) {
			return Statement{Form: k.a, Claim: claimA, Numbers: write(k.a, haar(g), claimA)},
				Statement{Form: k.b, Claim: claimB, Numbers: write(k.b, haar(g), claimB)}
		}
		cost := 3
		if k.a != convention.Angles {
			cost = 4
		}
		a, b := pair()
		type residuals [3]int64
		ofKey, ofResiduals := map[alias]residuals{}, map[residuals]alias{}
		c, d := pair()
		e, f := pair()
		count := 0
		for _, h := range everything(t, a, b, cost) {
			var r residuals
			for i, p := range [3][2]Statement{{a, b}, {c, d}, {e, f}} {
				r[i] = int64(math.Round(1e7 * h.exact(p[0], p[1])))
			}
			count++
			if before, ok := ofKey[h.key]; ok {
				require.True(t, alike(before, r), "%s: %s has the alias of something else", k.title, h.Hypothesis)
				continue
			}
			ofKey[h.key] = r
			if other, ok := ofResiduals[r]; ok {
				require.Equal(t, other, h.key, "%s: %s has two aliases", k.title, h.Hypothesis)
			}
			ofResiduals[r] = h.key
		}
		t.Logf("%-30s %6d hypotheses in %5d classes", k.title, count, len(ofKey))
		assert.Less(t, len(ofKey), count)
	}
}

func alike(a, b [3]int64) bool {
	for i := range a {
		if d := a[i] - b[i]; d < -1 || d > 1 {
			return false
		}
	}
	return true
}

// Maps of axes are solved. What is found are all of those that fit, by trying
// every pair of the 24.
func TestMapsOfAxesAreSolved(t *testing.T) {
	g := rand.New(rand.NewPCG(5, 6))
	for i := range 400 {
		r := haar(g)
		if i%4 == 0 {
			r = shapes[i/4%len(shapes)].draw(g)
		}
		target := cubes[g.IntN(24)].Mul(r).Mul(cubes[g.IntN(24)])
		a, b := quaternion(r), quaternion(target)
		a.Claim.Named, b.Claim.Named = true, true
		a.Tolerance, b.Tolerance = 1e-9, 1e-9
		var s search
		require.Empty(t, s.read(a, b))
		s.inverse = 1
		for c := range maxWide + 1 {
			s.level(c)
		}
		found := map[alias]bool{}
		for _, c := range s.found {
			if c.power == 0 && !c.changes.has(ScalarOrder) && !c.inverse {
				found[c.key] = true
			}
		}
		want := map[alias]bool{}
		x, y := &s.a.at(0)[0], &s.b.at(0)[0]
		for l := range Cube(24) {
			for m := range Cube(24) {
				if rotor.Angle(x.rotor, cubes[l].Mul(y.rotor).Mul(cubes[m])) < 1e-9 {
					want[s.aliasOf(x.code, y.code, relation{left: l, right: m})] = true
				}
			}
		}
		require.NotEmpty(t, want)
		for key := range want {
			require.True(t, found[key], "a map that fits was not found")
		}
	}
}

// The turns of a triple are those of package angle, for all 24 sequences.
func TestTurnsAreThoseOfSequences(t *testing.T) {
	g := rand.New(rand.NewPCG(7, 8))
	for way := range turnNames {
		n := [3]float64{g.NormFloat64(), g.NormFloat64(), g.NormFloat64()}
		h := halfTurns(n[:], 1)
		moving, fixed := turnNames[way][0], turnNames[way][1]
		got := moving.rotor(&h, &moving.Negated)
		for _, name := range [2]Turns{moving, fixed} {
			want := name.Sequence.Rotor(n[name.Order[0]], n[name.Order[1]], n[name.Order[2]])
			assert.Less(t, rotor.Angle(got, want), 1e-14, name.String())
		}
		back := moving.reverse()
		assert.Less(t, rotor.Angle(got.Reverse(), back.rotor(&h, &back.Negated)), 1e-14)
		for c := range Cube(24) {
			moved := moving.relabel(c)
			want := cubes[c].Mul(got).Mul(cubes[c].Reverse())
			assert.Less(t, rotor.Angle(want, moved.rotor(&h, &moved.Negated)), 1e-14)
		}
	}
}
