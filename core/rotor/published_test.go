package rotor_test

import (
	"math"
	"testing"

	"dextral/core/rotor"
)

func degrees(a float64) float64 { return a * math.Pi / 180 }

func about(x, y, z, angle float64) rotor.Rotor {
	r, _ := rotor.FromAxisAngle(rotor.Vec{X: x, Y: y, Z: z}, degrees(angle))
	return r
}

// TestPublished holds single rotors against worked examples in print. A printed
// number is wrong by half a unit of its last digit.
func TestPublished(t *testing.T) {
	// SDFormat, test of poses: 45 deg about x (read).
	within(t, 1e-15, gapR(about(1, 0, 0, 45), rotor.FromQuaternion(.9238795325112867, .3826834323650898, 0, 0)), "SDFormat")

	// J. J. Craig, "Introduction to Robotics", rotation of (0, 2, 0) by 30 deg
	// about z (from memory).
	within(t, .0005, gapV(about(0, 0, 1, 30).Rotate(rotor.Vec{Y: 2}), rotor.Vec{X: -1, Y: 1.732}), "Craig")

	// J. B. Kuipers, "Quaternions and Rotation Sequences": 120 deg about the
	// diagonal takes x to y, y to z and z to x (from memory).
	third := rotor.FromQuaternion(.5, .5, .5, .5)
	within(t, 2*ulp, gapR(about(1, 1, 1, 120), third), "Kuipers")
	within(t, 2*ulp, gapV(third.Rotate(rotor.Vec{X: 1}), rotor.Vec{Y: 1}), "Kuipers, x")
	within(t, 2*ulp, gapV(third.Rotate(rotor.Vec{Y: 1}), rotor.Vec{Z: 1}), "Kuipers, y")

	// CCSDS 504.0-B-2, annex F2.2 (read): B is A turned by 90 deg about z, Q =
	// (0, 0, .7071, .7071), and the x axis of A has coordinates (0, -1, 0) in B.
	// The map of coordinates is the reverse of the turn of axes.
	quarter := rotor.FromQuaternion(.7071, 0, 0, .7071)
	within(t, 2e-4, gapR(quarter, about(0, 0, 1, 90)), "CCSDS F2.2")
	within(t, 2e-4, gapV(quarter.Reverse().Rotate(rotor.Vec{X: 1}), rotor.Vec{Y: -1}), "CCSDS F2.2, coordinates")
}

// TestPublishedComposition: CCSDS 504.0-B-2, annex F5.4 (read). Turns about
// moving axes compose from left to right: A to F, then F to B.
func TestPublishedComposition(t *testing.T) {
	toF := rotor.FromQuaternion(.9848, 0, .1736, 0)
	toB := rotor.FromQuaternion(.3812, -.0805, -.0334, .9204)
	both := rotor.FromQuaternion(.3812, .0805, .0334, .9204)
	// Each component is a sum of four products of numbers below one, wrong by
	// at most 5e-5 each, that add up to less than 1.2 and 1.5.
	within(t, 5e-5*(1.2+1.5+1), gapR(toF.Mul(toB), both), "A to B")
	within(t, 1e-4, gapR(toF, about(0, 1, 0, 20)), "A to F is 20 deg about y")
	spin := both.Rotate(rotor.Vec{Z: 1})
	within(t, 3e-4, gapV(spin, rotor.Vec{X: .1736, Z: .9848}), "spin axis in A")
}
