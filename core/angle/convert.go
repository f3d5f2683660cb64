package angle

import (
	"math"

	"dextral/core/rotor"
)

// Rounding is the orientation error, in radians, that is allowed to a rotor
// in float64. A component of the product of two unit rotors is a sum of four
// products whose sizes add up to at most one, so it is off by at most four
// rounding units of 2^-53; four such components are off by eight as a vector,
// and a rotation by twice that. Nearer than this to a singular point Angles does not tell the
// outer angles apart.
const Rounding = 0x1p-49

// Band says what three angles determine near a singular point.
type Band uint8

// The bands.
const (
	Regular        Band = iota
	OnlySum             // only first + third is determined
	OnlyDifference      // only first - third is determined
)

// String says what is determined.
func (b Band) String() string {
	switch b {
	case OnlySum:
		return "only first+third is determined"
	case OnlyDifference:
		return "only first-third is determined"
	}
	return "regular"
}

// Triple is three angles, in radians, in the order of a sequence's axes.
type Triple struct {
	A, B, C float64
	Band    Band
}

// Numbers are the three angles as an array.
func (t Triple) Numbers() [3]float64 { return [3]float64{t.A, t.B, t.C} }

// Rotor is the rotation by angles a, b and c, in radians, in the order of the axes.
//
// Moving axes ABC: the active matrix is R_A(a) R_B(b) R_C(c). Fixed axes ABC:
// R_C(c) R_B(b) R_A(a). NaN for a sequence that is not Valid.
func (s Sequence) Rotor(a, b, c float64) rotor.Rotor {
	l := &layouts[s.key()&127]
	if !l.valid {
		nan := math.NaN()
		return rotor.Rotor{S: nan, E23: nan, E31: nan, E12: nan}
	}
	if l.turned {
		a, c = c, a
	}
	var n [4]float64 // quaternion numbers along the axes
	sb, cb := math.Sincos(b / 2)
	if l.proper {
		ss, cs := math.Sincos((a + c) / 2)
		sd, cd := math.Sincos((a - c) / 2)
		n[l.i&3], n[l.j&3], n[l.m&3] = cb*ss, sb*cd, l.e*sb*sd
		return rotor.FromQuaternion(cb*cs, n[X], n[Y], n[Z])
	}
	sa, ca := math.Sincos(a / 2)
	sc, cc := math.Sincos(c / 2)
	sc *= l.e
	n[l.i&3] = sa*cb*cc + ca*sb*sc
	n[l.j&3] = ca*sb*cc - sa*cb*sc
	n[l.m&3] = l.e * (ca*cb*sc + sa*sb*cc)
	return rotor.FromQuaternion(ca*cb*cc-sa*sb*sc, n[X], n[Y], n[Z])
}

// Angles are the angles of a rotor at the precision of float64.
// See AnglesWithin.
func (s Sequence) Angles(r rotor.Rotor) Triple { return s.within(r, Rounding) }

// AnglesWithin are the angles of a rotor that is known to within so many
// radians. The outer angles lie in (-pi, pi], the middle one in [-pi/2, pi/2]
// for three different axes and in [0, pi] for a repeated axis.
//
// A middle angle off its singular value by d means that the nearest singular
// rotation is exactly d away: the turn carries the third axis to an angle d
// from where every singular rotation has it, and undoing d is enough. If d is within
// the precision, the outer angles cannot be told apart: Band says what is
// determined, the middle angle takes its singular value, the third is 0, and the
// rotor of the three is within the precision of r.
//
// A precision below zero, or NaN, counts as zero. R and -R have the same angles; the norm of r does not matter. NaN for
// a zero rotor, for NaN, and for a sequence that is not Valid.
func (s Sequence) AnglesWithin(r rotor.Rotor, precision float64) Triple {
	if !(precision > 0) {
		precision = 0
	}
	return s.within(r, math.Sin(math.Min(precision, math.Pi/2)))
}

// within takes the sine of the precision.
//
// Half sum and half difference of the outer angles are the directions of two
// plane vectors p and m:
//
//	proper       p = (s, i)             m = (j, e k)
//	Tait-Bryan   p = (s + j, i + e k)   m = (s - j, i - e k)
//
// Their lengths are to one another as cosine and sine of half the middle
// angle (Tait-Bryan: of half of what it lacks to 90 degrees), so that one of
// them vanishes at a singular point. Products of p and m, as complex numbers,
// have the outer angles themselves as directions. Whatever error a short p or
// m has enters both outer angles alike, and they reproduce r to rounding
// however near the singular point is.
//
// That all sequences come down to the proper ones is from E. Bernardes and
// S. Viollet, PLoS ONE 17 (2022) e0276302 (from memory); to take products
// instead of differences of angles makes R and -R exactly alike.
func (s Sequence) within(r rotor.Rotor, sine float64) Triple {
	l := &layouts[s.key()&127]
	n := [4]float64{-r.E23, -r.E31, -r.E12}
	h := halves{r.S, n[l.i&3], n[l.j&3], l.e * n[l.m&3]}
	if !l.proper {
		h = h.mixed()
	}
	pp, mm := h.px*h.px+h.py*h.py, h.mx*h.mx+h.my*h.my
	if norm := pp + mm; !(norm > 0 && norm <= math.MaxFloat64) || !l.valid {
		return Triple{math.NaN(), math.NaN(), math.NaN(), Regular}
	}
	cross := 2 * math.Sqrt(pp*mm)
	t := Triple{}
	if cross <= sine*(pp+mm) {
		t = h.singular(pp > mm, l.turned)
		cross = 0 // the middle angle of the nearest singular rotation
	} else {
		t.A = direction(h.py*h.mx+h.px*h.my, h.px*h.mx-h.py*h.my)
		t.C = direction(h.py*h.mx-h.px*h.my, h.px*h.mx+h.py*h.my)
	}
	if l.proper {
		t.B = direction(cross, pp-mm)
	} else {
		t.B = math.Atan((pp - mm) / cross)
		if l.e < 0 {
			t.C, t.Band = wrapped(0-t.C), t.Band.other() // 0-0 has no sign
		}
	}
	if l.turned {
		t.A, t.C = t.C, t.A
	}
	return t
}

// halves are the vectors p and m.
type halves struct{ px, py, mx, my float64 }

func (h halves) mixed() halves {
	return halves{h.px + h.mx, h.py + h.my, h.px - h.mx, h.py - h.my}
}

// singular gives the angles when only one of p and m has a direction: the sum
// of the outer angles is twice that of p, their difference twice that of m.
func (h halves) singular(sum, zeroFirst bool) Triple {
	t := Triple{Band: OnlySum}
	x, y, sign := h.px, h.py, 1.0
	if !sum {
		t.Band = OnlyDifference
		x, y, sign = h.mx, h.my, -1
	}
	if t.A = direction(2*x*y, x*x-y*y); zeroFirst {
		t.A, t.C = 0, wrapped(sign*t.A)
	}
	return t
}

// direction is the angle of (x, y), not both zero and finite, in (-pi, pi].
func direction(y, x float64) float64 {
	if x == 0 { // also -0, which would turn the quotient about
		return math.Copysign(math.Pi/2, y)
	}
	a := math.Atan(y / x)
	if x < 0 {
		if y >= 0 {
			return a + math.Pi
		}
		return wrapped(a - math.Pi)
	}
	return a
}

// wrapped is a, with pi for -pi.
func wrapped(a float64) float64 {
	if a == -math.Pi {
		return math.Pi
	}
	return a
}

// other exchanges sum and difference.
func (b Band) other() Band {
	if b == Regular {
		return b
	}
	return OnlySum + OnlyDifference - b
}
