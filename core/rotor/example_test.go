package rotor_test

import (
	"fmt"
	"math"

	"dextral/core/rotor"
)

// A quarter turn about z carries x to y, and in quaternion numbers is
// (cos 45, 0, 0, sin 45).
func ExampleFromAxisAngle() {
	r, _ := rotor.FromAxisAngle(rotor.Vec{Z: 1}, math.Pi/2)
	v := r.Rotate(rotor.Vec{X: 1})
	w, x, y, z := r.Quaternion()
	fmt.Printf("x goes to (%.0f, %.0f, %.0f)\n", v.X, v.Y, v.Z)
	fmt.Printf("w %.4f, i %.4f, j %.4f, k %.4f\n", w, math.Abs(x), math.Abs(y), z)
	// Output:
	// x goes to (0, 1, 0)
	// w 0.7071, i 0.0000, j 0.0000, k 0.7071
}

// Two quarter turns about different axes make a third of a turn: half angles
// of 45 degrees at right angles are two sides of a spherical triangle whose
// third side is 60 degrees.
func ExampleCompose() {
	x, _ := rotor.FromAxisAngle(rotor.Vec{X: 1}, math.Pi/2)
	z, _ := rotor.FromAxisAngle(rotor.Vec{Z: 1}, math.Pi/2)
	t, _ := rotor.Compose(x, z)
	degrees := func(a float64) float64 { return a * 180 / math.Pi }
	fmt.Printf("sides %.0f and %.0f at %.0f degrees: %.0f\n", degrees(t.A), degrees(t.B), degrees(t.AtV), degrees(t.C))
	// Output:
	// sides 45 and 45 at 90 degrees: 60
}

// A turn that goes all the way round ends at -R.
func ExampleRotor_Log() {
	r := rotor.FromRotationVector(rotor.Vec{Y: 2 * math.Pi * 0.75})
	fmt.Printf("as a turn %.0f degrees\n", 2*r.Log().Norm()*180/math.Pi)
	fmt.Printf("as a rotation %.0f degrees\n", r.TurnAngle()*180/math.Pi)
	// Output:
	// as a turn 270 degrees
	// as a rotation 90 degrees
}
