package identify

import (
	"math"
	"strings"

	"dextral/core/rotor"
)

// Cube is one of the 24 rotations that carry the coordinate axes onto
// coordinate axes; 0 turns nothing. All maps of axes that keep handedness are
// among them.
type Cube uint8

const half = 0.5

var root = math.Sqrt(0.5)

// cubes lists their rotors: the identity, the half turns about the axes, the
// quarter turns about them, the third turns about the diagonals and the half
// turns about the diagonals of the faces.
var cubes = [24]rotor.Rotor{
	{S: 1}, {E23: 1}, {E31: 1}, {E12: 1},
	{S: root, E23: -root}, {S: root, E23: root}, {S: root, E31: -root},
	{S: root, E31: root}, {S: root, E12: -root}, {S: root, E12: root},
	{S: half, E23: half, E31: half, E12: half}, {S: half, E23: half, E31: half, E12: -half},
	{S: half, E23: half, E31: -half, E12: half}, {S: half, E23: half, E31: -half, E12: -half},
	{S: half, E23: -half, E31: half, E12: half}, {S: half, E23: -half, E31: half, E12: -half},
	{S: half, E23: -half, E31: -half, E12: half}, {S: half, E23: -half, E31: -half, E12: -half},
	{E23: root, E31: root}, {E23: root, E31: -root}, {E23: root, E12: root},
	{E23: root, E12: -root}, {E31: root, E12: root}, {E31: root, E12: -root},
}

// signedAxis is where a basis vector goes: the axis and whether it is negated.
type signedAxis struct {
	axis    uint8
	negated bool
}

// axisMaps gives, for each cube, the images of the three basis vectors.
var axisMaps = func() (maps [24][3]signedAxis) {
	basis := [3]rotor.Vec{{X: 1}, {Y: 1}, {Z: 1}}
	for c, r := range cubes {
		for i, e := range basis {
			v := r.Rotate(e)
			for j, x := range [3]float64{v.X, v.Y, v.Z} {
				if math.Abs(x) > half {
					maps[c][i] = signedAxis{uint8(j), x < 0}
				}
			}
		}
	}
	return maps
}()

// inverses gives the reverse of each cube.
var inverses = func() (inv [24]Cube) {
	for c, r := range cubes {
		inv[c] = nearestCube(r.Reverse())
	}
	return inv
}()

// nearestCube is the cube nearest to r.
func nearestCube(r rotor.Rotor) Cube {
	best, at := -1.0, 0
	for c, q := range cubes {
		if dot := math.Abs(q.Dot(r)); dot > best {
			best, at = dot, c
		}
	}
	return Cube(at)
}

// cubeDot is the cosine of half the angle from a unit rotor to the nearest
// cube. The 24 cubes and their negatives have components (1,0,0,0), two of
// sqrt 1/2 or four of 1/2, with all signs and places, so the largest scalar
// product is one of three sums.
func cubeDot(r rotor.Rotor) float64 {
	a, b, c, d := math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12)
	ab, cd := max(a, b), max(c, d)
	first := max(ab, cd)
	second := max(min(ab, cd), min(a, b), min(c, d))
	return max(first, (first+second)*root, (a+b+c+d)*half)
}

// String shows the map as the images of x, y and z: "x,y,z -> y,-x,z".
func (c Cube) String() string {
	var images [3]string
	for i, to := range axisMaps[c] {
		images[i] = string("xyz"[to.axis])
		if to.negated {
			images[i] = "-" + images[i]
		}
	}
	return "x,y,z -> " + strings.Join(images[:], ",")
}
