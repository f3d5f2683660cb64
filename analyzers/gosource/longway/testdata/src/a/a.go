package a

import "math"

type Quat struct{ X, Y, Z, W float64 }

// Rotate makes a Quat a rotation.
func (q Quat) Rotate(v [3]float64) [3]float64 {
	x, y, z := q.W*v[0]+q.Y*v[2]-q.Z*v[1], q.W*v[1]+q.Z*v[0]-q.X*v[2], q.W*v[2]+q.X*v[1]-q.Y*v[0]
	return [3]float64{v[0] + 2*(q.Y*z-q.Z*y), v[1] + 2*(q.Z*x-q.X*z), v[2] + 2*(q.X*y-q.Y*x)}
}

func (q Quat) dot(r Quat) float64 { return q.X*r.X + q.Y*r.Y + q.Z*r.Z + q.W*r.W }

func mix(a, b Quat, f, g float64) Quat {
	return Quat{f*a.X + g*b.X, f*a.Y + g*b.Y, f*a.Z + g*b.Z, f*a.W + g*b.W}
}

// Slerp interpolates.
func Slerp(a, b Quat, t float64) Quat { // want `long-way-round: Slerp computes the spherical interpolation of quaternions as they come: half way between two orientations 10 deg apart it has turned by 175 deg if their signs differ, instead of 5 deg`
	d := math.Min(1, math.Max(-1, a.dot(b)))
	angle := math.Acos(d)
	if angle < 1e-6 {
		return a
	}
	return mix(a, b, math.Sin((1-t)*angle)/math.Sin(angle), math.Sin(t*angle)/math.Sin(angle))
}

// Short interpolates between the nearer of b and -b.
func Short(a, b Quat, t float64) Quat {
	d := a.dot(b)
	if d < 0 {
		b, d = Quat{-b.X, -b.Y, -b.Z, -b.W}, -d
	}
	angle := math.Acos(math.Min(1, d))
	if angle < 1e-6 {
		return a
	}
	return mix(a, b, math.Sin((1-t)*angle)/math.Sin(angle), math.Sin(t*angle)/math.Sin(angle))
}

// Either does as it is told.
func Either(a, b Quat, t float64, short bool) Quat {
	if short && a.dot(b) < 0 {
		b = Quat{-b.X, -b.Y, -b.Z, -b.W}
	}
	return norm(mix(a, b, 1-t, t))
}

func norm(q Quat) Quat {
	n := math.Sqrt(q.dot(q))
	return Quat{q.X / n, q.Y / n, q.Z / n, q.W / n}
}

// Nlerp may take the longer way: callers align the signs first.
func Nlerp(a, b Quat, t float64) Quat { return norm(mix(a, b, 1-t, t)) }

// Blend interpolates linearly and normalises.
func Blend(a, b Quat, t float64) Quat { // want `long-way-round: Blend computes the normalised linear interpolation`
	return norm(mix(a, b, 1-t, t))
}

// Inverted compares the wrong way round.
func Inverted(a, b Quat, t float64) Quat { // want `long-way-round: Inverted computes the normalised linear interpolation by the longer way always`
	if a.dot(b) >= 0 {
		b = Quat{-b.X, -b.Y, -b.Z, -b.W}
	}
	return norm(mix(a, b, 1-t, t))
}

// NlerpLong takes the other way round.
func NlerpLong(a, b Quat, t float64) Quat {
	if a.dot(b) >= 0 {
		b = Quat{-b.X, -b.Y, -b.Z, -b.W}
	}
	return norm(mix(a, b, 1-t, t))
}

// Angle between two orientations.
func Angle(a, b Quat) float64 { // want `long-way-round: Angle computes the angle between quaternions as they come`
	return 2 * math.Acos(math.Min(1, math.Max(-1, a.dot(b))))
}

// Distance between two orientations.
func Distance(a, b Quat) float64 {
	return 2 * math.Acos(math.Min(1, math.Abs(a.dot(b))))
}

// A colour is no rotation.
type RGBA struct{ R, G, B, A float64 }

func (c RGBA) Blend(d RGBA, t float64) RGBA {
	r := RGBA{c.R + t*(d.R-c.R), c.G + t*(d.G-c.G), c.B + t*(d.B-c.B), c.A + t*(d.A-c.A)}
	n := math.Sqrt(r.R*r.R + r.G*r.G + r.B*r.B + r.A*r.A)
	return RGBA{r.R / n, r.G / n, r.B / n, r.A / n}
}
