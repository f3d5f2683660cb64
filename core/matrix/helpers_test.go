package matrix_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// ulp is the distance of one from the next greater number.
const ulp = 0x1p-52

// trials is the number of random cases of a property.
const trials = 2000

// source is the source of random cases: the same on every run.
func source() *rand.Rand { return rand.New(rand.NewPCG(20240917, 1843)) }

func randomVec(rng *rand.Rand) rotor.Vec {
	return rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
}

// randomRotor is uniform over the unit rotors.
func randomRotor(rng *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
	return r
}

func randomMat(rng *rand.Rand) (m matrix.Mat3) { return noisy(rng, m, 1) }

// noisy adds normal noise to each element.
func noisy(rng *rand.Rand, m matrix.Mat3, size float64) matrix.Mat3 {
	for i := range m {
		for j := range m[i] {
			m[i][j] += size * rng.NormFloat64()
		}
	}
	return m
}

// gap is the greatest difference between elements; NaN if any is NaN.
func gap(a, b matrix.Mat3) float64 {
	worst := 0.0
	for i := range a {
		for j := range a[i] {
			worst = max(worst, math.Abs(a[i][j]-b[i][j]))
		}
	}
	return worst
}

func gapV(a, b rotor.Vec) float64 {
	return max(math.Abs(a.X-b.X), math.Abs(a.Y-b.Y), math.Abs(a.Z-b.Z))
}

// sameRotation is the gap between rotors up to sign.
func sameRotation(a, b rotor.Rotor) float64 {
	return min(a.Sub(b).Norm(), a.Add(b).Norm())
}

// within fails the test unless the error is at most the bound; NaN fails.
func within(t *testing.T, bound, err float64, format string, args ...any) {
	t.Helper()
	if !(err <= bound) {
		t.Errorf("%s: error %.3g, allowed %.3g", fmt.Sprintf(format, args...), err, bound)
	}
}
