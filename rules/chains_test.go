package rules

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// transform writes a rigid transform under a key.
func transform(key string, g matrix.Rigid) *Value {
	t := [3]float64{g.T.X, g.T.Y, g.T.Z}
	var words []string
	for i, row := range g.R {
		words = append(words, printed(7, row[:]...), printed(4, t[i]))
	}
	v := value(convention.Transform, strings.Join(words, " "))
	v.Key, v.Of = key, ""
	v.Place.Line = len(key) + int(key[len(key)-1])
	return v
}

// subscripted is transform with the frames of its key, T_a_b.
func subscripted(key string, g matrix.Rigid) *Value {
	v := transform(key, g)
	parts := strings.Split(key[strings.LastIndexByte(key, '.')+1:], "_")
	v.Subscript = [2]string{parts[1], parts[2]}
	return v
}

// stated is transform with a declared direction.
func stated(key, to, from string, g matrix.Rigid) *Value {
	v := transform(key, g)
	v.Claims = append(v.Claims, Claim{Says: convention.Direction{To: to, From: from}, Source: Declaration})
	return v
}

func randomRigid(rnd *rand.Rand) matrix.Rigid {
	return matrix.Rigid{R: matrix.FromRotor(randomRotor(rnd)), T: rotor.Vec{X: rnd.NormFloat64(), Y: rnd.NormFloat64(), Z: rnd.NormFloat64()}}
}

// trimmed turns a transform by a small angle that no convention explains.
func trimmed(g matrix.Rigid, rad float64) matrix.Rigid {
	g.R = g.R.Mul(matrix.FromRotor(rotor.FromRotationVector(rotor.Vec{X: 0.6 * rad, Z: 0.8 * rad})))
	return g
}

// TestChains holds what is reported on values that join frames. a, b, c name
// v_a = ab v_b and so on.
func TestChains(t *testing.T) {
	rnd := rand.New(rand.NewPCG(21, 4))
	for range 200 {
		ab, bc := randomRigid(rnd), randomRigid(rnd)
		ac := ab.Mul(bc)
		for _, c := range []struct {
			name   string
			values []*Value
			want   string
			sense  Sense
		}{
			{"a loop that closes", []*Value{subscripted("T_a_b", ab), subscripted("T_b_c", bc), subscripted("T_a_c", ac)}, "", ToFrom},
			{"the same in the other sense", []*Value{subscripted("T_b_a", ab), subscripted("T_c_b", bc), subscripted("T_c_a", ac)}, "", FromTo},
			{"an inverse pair", []*Value{subscripted("T_a_b", ab), subscripted("T_b_a", ab.Inverse())}, "", SenseOpen},
			{"a pair that is no inverse", []*Value{subscripted("T_a_b", ab), subscripted("T_b_a", ab)}, "warning inverse-pair-broken", SenseOpen},
			{"transposed without its translation", []*Value{subscripted("T_a_b", ab), subscripted("T_b_a", matrix.Rigid{R: ab.R.Transpose(), T: ab.T})}, "warning inverse-pair-broken", SenseOpen},
			{"stated twice alike", []*Value{stated("mount.T", "a", "b", ab), stated("check.T", "a", "b", ab)}, "", NoSubscripts},
			{"stated twice, once reversed", []*Value{stated("mount.T", "a", "b", ab), stated("check.T", "a", "b", ab.Inverse())}, "error stated-twice", NoSubscripts},
			{"stated twice, half a degree apart", []*Value{stated("mount.T", "a", "b", ab), stated("check.T", "a", "b", trimmed(ab, 0.009))}, "note stated-twice", NoSubscripts},
			{"one edge of three reversed", []*Value{stated("x.T", "a", "b", ab), stated("y.T", "b", "c", bc.Inverse()), stated("z.T", "a", "c", ac)}, "error loop-open", NoSubscripts},
			{"a loop no change closes", []*Value{stated("x.T", "a", "b", ab), stated("y.T", "b", "c", trimmed(bc, 0.006)), stated("z.T", "a", "c", ac)}, "note loop-open", NoSubscripts},
			{"one key reversed, whatever they mean", []*Value{subscripted("T_a_b", ab), subscripted("T_b_c", bc), subscripted("T_a_c", ac.Inverse())}, "warning loop-open", SenseOpen},
			{"keys that no change reconciles", []*Value{subscripted("T_a_b", ab), subscripted("T_b_c", trimmed(bc, 0.006)), subscripted("T_a_c", ac)}, "note loop-open", SenseOpen},
			{"two cameras", []*Value{subscripted("cam0.T_cam_imu", ab), subscripted("cam1.T_cam_imu", bc)}, "", SenseOpen},
			{"two unrelated edges", []*Value{subscripted("T_a_b", ab), subscripted("T_c_d", bc)}, "", SenseOpen},
		} {
			chain := NewChain(c.values)
			require.NotNil(t, chain, c.name)
			require.Equal(t, c.want, rules(CheckChain(chain)), c.name)
			require.Equal(t, c.sense, chain.Sense, c.name)
		}
	}
}

// TestLoopNamesTheEdge: the finding stands at the edge whose change closes the
// loop, whichever it is, and names the others as related.
func TestLoopNamesTheEdge(t *testing.T) {
	rnd := rand.New(rand.NewPCG(9, 9))
	for wrong := range 4 {
		var values []*Value
		whole := matrix.Rigid{R: matrix.Identity}
		for i := range 4 {
			g := randomRigid(rnd)
			if i == 3 {
				g = whole.Inverse()
			}
			whole = whole.Mul(g)
			if i == wrong {
				g = g.Inverse()
			}
			values = append(values, stated(fmt.Sprintf("edge%d.T", i), fmt.Sprint("f", i), fmt.Sprint("f", (i+1)%4), g))
		}
		found := CheckChain(NewChain(values))
		require.Len(t, found, 1)
		assert.Equal(t, fmt.Sprintf("edge%d.T", wrong), found[0].Key)
		assert.Equal(t, Error, found[0].Level)
		assert.Len(t, found[0].Related, 3)
	}
}

// TestDeclaredUncertainty: a loop that misses by more than its edges are
// declared to be uncertain is an error even if no change of convention
// explains it, and within the declaration it closes.
func TestDeclaredUncertainty(t *testing.T) {
	rnd := rand.New(rand.NewPCG(2, 6))
	ab, bc := randomRigid(rnd), randomRigid(rnd)
	values := []*Value{stated("x.T", "a", "b", ab), stated("y.T", "b", "c", trimmed(bc, 0.006)), stated("z.T", "a", "c", ab.Mul(bc))}
	for uncertainty, want := range map[float64]string{0.001: "error loop-open", 0.004: ""} {
		for _, v := range values {
			v.Uncertainty = uncertainty
			v.Claims = v.Claims[:2]
		}
		found := CheckChain(NewChain(values))
		if want == "" {
			for _, f := range found { // translations have no declared uncertainty
				assert.Equal(t, Note, f.Level)
			}
			continue
		}
		assert.Equal(t, want, rules(found))
	}
}

// TestDeclaredOffset: translations that miss by more than they are declared to be
// uncertain are an error, and within the declaration the loop closes. The
// digits of the rotations add less than a ten-thousandth.
func TestDeclaredOffset(t *testing.T) {
	rnd := rand.New(rand.NewPCG(2, 7))
	ab, bc := randomRigid(rnd), randomRigid(rnd)
	ac := ab.Mul(bc)
	ac.T.Y += 0.01
	values := []*Value{stated("x.T", "a", "b", ab), stated("y.T", "b", "c", bc), stated("z.T", "a", "c", ac)}
	assert.Equal(t, "note loop-open", rules(CheckChain(NewChain(values))))
	for offset, want := range map[float64]string{0.001: "error loop-open", 0.003: "error loop-open", 0.004: ""} {
		for _, v := range values {
			v.Offset = offset
		}
		assert.Equal(t, want, rules(CheckChain(NewChain(values))), offset)
	}
}

// TestParents: a tree is silent, a frame with two parents and a cycle are not.
func TestParents(t *testing.T) {
	edge := func(parent, child string) *Value {
		v := transform(parent+"."+child, matrix.Rigid{R: matrix.Identity, T: rotor.Vec{X: 1}})
		v.Claims = append(v.Claims, Claim{Says: convention.Direction{To: parent, From: child}, Source: Sibling, Text: "parent: " + parent + ", child: " + child})
		return v
	}
	assert.Empty(t, CheckParents(NewChain([]*Value{edge("base", "imu"), edge("base", "camera"), edge("camera", "lens")})))
	assert.Equal(t, "warning child-of-two", rules(CheckParents(NewChain([]*Value{edge("base", "imu"), edge("mast", "imu"), edge("base", "mast")}))))
	assert.Equal(t, "warning parent-cycle", rules(CheckParents(NewChain([]*Value{edge("base", "imu"), edge("imu", "base"), edge("base", "mast")}))))
	unnamed := edge("base", "imu")
	unnamed.Claims[len(unnamed.Claims)-1].Text = "to_frame: base, from_frame: imu"
	assert.Empty(t, CheckParents(NewChain([]*Value{unnamed, edge("mast", "imu")})), "only keys that speak of parents make a tree")
}

// TestRigTree: of a rig is reported what its files show together only.
func TestRigTree(t *testing.T) {
	edge := func(path, parent, child string) *Value {
		v := transform(parent+"."+child, matrix.Rigid{R: matrix.Identity, T: rotor.Vec{X: 1}})
		v.Place.Path = path
		v.Claims = append(v.Claims, Claim{Says: convention.Direction{To: parent, From: child}, Source: Sibling, Text: "parent: " + parent + ", child: " + child})
		return v
	}
	for _, c := range []struct {
		name   string
		values []*Value
		want   string
	}{
		{"a tree over two files", []*Value{edge("a.yaml", "base", "imu"), edge("b.yaml", "imu", "lens")}, ""},
		{"one edge stated in both", []*Value{edge("a.yaml", "base", "imu"), edge("b.yaml", "base", "imu")}, ""},
		{"two parents over two files", []*Value{edge("a.yaml", "base", "imu"), edge("b.yaml", "mast", "imu")}, "warning child-of-two"},
		{"two parents in one file", []*Value{edge("a.yaml", "base", "imu"), edge("a.yaml", "mast", "imu"), edge("b.yaml", "hull", "base")}, ""},
		{"a cycle over two files", []*Value{edge("a.yaml", "base", "imu"), edge("b.yaml", "imu", "base")}, "warning parent-cycle"},
	} {
		assert.Equal(t, c.want, rules(CheckParents(NewRig(c.values))), c.name)
	}
}

// TestRigHands: two files of a rig that state axes of one frame with different
// handedness contradict each other; one file by itself is reported elsewhere.
func TestRigHands(t *testing.T) {
	triad := func(path, numbers string) *Value {
		v := value(convention.Triad, numbers)
		v.Key, v.Place.Path = "body_axes", path
		return v
	}
	const right, left = "1 0 0 0 1 0 0 0 1", "1 0 0 0 1 0 0 0 -1"
	assert.Equal(t, "error frame-of-two-hands", rules(CheckRigHands([]*Value{triad("a.yaml", right), triad("b.yaml", left)})))
	assert.Empty(t, CheckRigHands([]*Value{triad("a.yaml", right), triad("b.yaml", right)}))
	assert.Empty(t, CheckRigHands([]*Value{triad("a.yaml", right), triad("a.yaml", left)}))
	assert.Empty(t, CheckValues([]*Value{triad("a.yaml", right), triad("b.yaml", left)}), "without a rig they are two frames")
}
