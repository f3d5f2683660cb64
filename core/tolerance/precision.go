package tolerance

import (
	"math"

	"dextral/core/convention"
)

// Rounding units of the two binary formats: half the distance from 1 to the
// next larger number.
const (
	unit32 = 1.0 / (1 << 24)
	unit64 = 1.0 / (1 << 53)
)

// steps is the number of roundings that an honest number may have behind it
// when it is written. To normalise a quaternion q/|q| takes four squares and
// three sums (at most 4 units for |q|^2, half of that for |q|), a square root
// and a division, one unit each: the norm is off by 4 units. Its matrix is of second
// degree in it, and off by twice that.
const steps = 8

// Precision is what is known about the rounding of a group of numbers.
//
// The zero value is a group stored as float32.
type Precision struct {
	Half     float64 // half a unit of the last digit of the coarsest entry; 0 for binary values
	Double   bool    // declared to be computed in float64; else float32 is assumed
	Declared float64 // declared uncertainty of the orientation in rad; 0 for none
}

// Quantised is the precision of whole numbers q that stand for q/scale, such
// as 16-bit components with scale 32767.
func Quantised(scale float64) Precision {
	return Precision{Half: 0.5 / math.Abs(scale)}
}

// entry bounds the error of one number in a group whose numbers are at most
// magnitude in size: what printing rounded off and what arithmetic did before.
func (p Precision) entry(magnitude float64) float64 {
	unit := unit32
	if p.Double {
		unit = unit64
	}
	return p.Half + steps*unit*magnitude
}

// angle is the declared uncertainty if there is one, else the derived bound,
// which is no more than a half turn.
func (p Precision) angle(derived float64) float64 {
	if p.Declared > 0 {
		return p.Declared
	}
	if derived < math.Pi { // false for NaN as well
		return derived
	}
	return math.Pi
}

// arcsin is asin, and a quarter turn for everything too large for it.
func arcsin(x float64) float64 {
	if x < 1 {
		return math.Asin(x)
	}
	return math.Pi / 2
}

// Norm bounds how far the norm of n printed numbers is from the norm, called
// magnitude, of the numbers before rounding: sqrt(n) h, by the triangle
// inequality. Equality is reached when all errors point along the vector.
func (p Precision) Norm(n int, magnitude float64) float64 {
	return math.Sqrt(float64(n)) * p.entry(magnitude)
}

// Quaternion bounds the orientation error, in radians, of a printed unit
// quaternion: its direction in four dimensions is off by at most
// asin(sqrt(4) h), and the rotation by twice that.
func (p Precision) Quaternion() float64 {
	return p.angle(2 * arcsin(2*p.entry(1)))
}

// Matrix bounds the angle, in radians, between a rotation and the nearest
// rotation to its nine printed entries.
//
// With M = R + E, |E|_F <= 3h, the polar factors differ by at most
// |E|_F / (1 - |E|_F/2) (R.-C. Li, "New perturbation bounds for the unitary polar
// factor", SIAM J. Matrix Anal. Appl. 16 (1995) 327: 2/(s+s') with the least singular values
// s = 1 and s' >= 1-|E|_F; from memory), and two rotations an angle t apart
// differ by 2 sqrt(2) sin(t/2) in that norm.
func (p Precision) Matrix() float64 {
	e := 3 * p.entry(1)
	if e >= 1 { // M may be singular
		return p.angle(math.Pi)
	}
	return p.angle(2 * arcsin(e/(1-e/2)/(2*math.Sqrt2)))
}

// Defect bounds |M^T M - I|_F for the printed entries of a rotation: 6h + 9h^2,
// reached by the identity with all nine errors alike.
func (p Precision) Defect() float64 {
	e := 3 * p.entry(1)
	return 2*e + e*e
}

// Det bounds |det M - 1| for the printed entries of a rotation. The columns of
// the error are at most sqrt(3) h long, so every term of the expansion of
// det(R+E) is bounded as in (1 + sqrt(3) h)^3 - 1 (Hadamard's inequality).
func (p Precision) Det() float64 {
	c := math.Sqrt(3) * p.entry(1)
	return c * (3 + c*(3+c))
}

// Angles bounds the orientation error, in radians, of three printed angles of
// any sequence. The angular velocity of unit rates is at most
// sqrt(3 + 2|g|) with g the cosine between the outer axes, hence sqrt(5) h along
// the straight path from printed to true angles; reached at a singular point.
func (p Precision) Angles(unit convention.Unit) float64 {
	turn := math.Pi / unit.InRadians()
	return p.angle(math.Sqrt(5) * p.entry(turn) * unit.InRadians())
}

// RotationVector bounds the orientation error, in radians, of three printed
// components of axis times angle: sqrt(3) h, since the exponential map
// lengthens no step (its Jacobian has norm 1).
func (p Precision) RotationVector(unit convention.Unit) float64 {
	turn := math.Pi / unit.InRadians()
	return p.angle(math.Sqrt(3) * p.entry(turn) * unit.InRadians())
}

// Axis bounds the error, in radians, of the direction of three printed
// components of a unit vector: asin(sqrt(3) h).
func (p Precision) Axis() float64 {
	return p.angle(arcsin(math.Sqrt(3) * p.entry(1)))
}

// AxisAngle bounds the orientation error, in radians, of a printed unit axis
// and angle. An error of the axis turns the rotation by up to twice as much, at a half
// turn, about lines perpendicular to the axis, along which that of the angle turns it.
func (p Precision) AxisAngle(unit convention.Unit) float64 {
	turn := math.Pi / unit.InRadians()
	return p.angle(math.Hypot(2*arcsin(math.Sqrt(3)*p.entry(1)), p.entry(turn)*unit.InRadians()))
}

// Angle bounds the error, in radians, of one printed angle.
func (p Precision) Angle(unit convention.Unit) float64 {
	turn := math.Pi / unit.InRadians()
	return p.angle(p.entry(turn) * unit.InRadians())
}
