package rules

import (
	"fmt"
	"math"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"
)

// The rules of this file rest on one fact: for every rotation R and every
// orthogonal M with determinant -1, R^T M has determinant -1 and so an
// eigenvalue -1. Whatever rotation is put in the place of a mirror, some
// direction comes out exactly reversed.
const mirrorEffect = "whatever rotation takes its place, some direction is off by 180 deg"

// properRotation judges a matrix, or the 3x3 part of a rigid transform, that
// claims to be a rotation: its determinant first, then its orthonormality.
func properRotation(v *Value) *Finding {
	m, ok := v.rotationPart()
	claim, claimed := v.FormClaim()
	if !ok || !claimed {
		return nil
	}
	if m == (matrix.Mat3{}) {
		return unset(v)
	}
	if hand, ok := v.Claims.On(convention.OfHand); ok && hand.Source == Declaration && hand.Says == convention.LeftHanded {
		if m.Det() < 0 {
			return nil // between frames of different hand, as declared
		}
		return notMirrored(v, hand, m)
	}
	if m.Det() < 0 {
		return mirrored(v, claim, m)
	}
	return orthonormal(v, claim, m)
}

// notMirrored judges a map between a right-handed and a left-handed frame, which has
// to mirror.
func notMirrored(v *Value, hand Claim, m matrix.Mat3) *Finding {
	f := finding(MirroringAxisMap, v, hand, "%s maps between two frames of which one is declared left-handed, but its determinant is %.4g: it does not mirror; some direction is off by 180 deg", v.name(), m.Det())
	f.Evidence = []Evidence{{What: "determinant", Stated: Plain(-1), Computed: Plain(m.Det()), Residual: Plain(m.Det() + 1)}}
	f.Remedy = "correct the declared axes, or reverse one axis of the map"
	return f
}

func mirrored(v *Value, claim Claim, m matrix.Mat3) *Finding {
	f := finding(MirroredRotation, v, claim, "%s claims a %s, but its determinant is %.4g: it mirrors; %s",
		v.name(), v.Form, m.Det(), mirrorEffect)
	f.Evidence = []Evidence{
		{What: "determinant", Stated: Plain(1), Computed: Plain(m.Det()), Residual: Plain(m.Det() - 1)},
		{What: "defect |M^T M - 1|", Stated: Plain(0), Computed: Plain(matrix.Defect(m))},
	}
	f.Remedy = "two rows or columns exchanged, or an odd number of signs changed, make a mirror; compare with the axes drawn in the installation"
	if n, ok := mirrorNormal(m); ok {
		f.Evidence = append(f.Evidence, Evidence{What: "direction it reverses", Computed: Words(vector(n))})
	}
	return f
}

// mirrorNormal returns the direction that an orthogonal matrix of determinant
// -1 reverses: the axis of the rotation -m.
func mirrorNormal(m matrix.Mat3) (rotor.Vec, bool) {
	near, _, ok := matrix.NearestOrthogonal(m)
	if !ok {
		return rotor.Vec{}, false
	}
	turned := near.Scale(-1).Rotor()
	return turned.Bivector().Axis().Scale(-1).Unit()
}

func orthonormal(v *Value, claim Claim, m matrix.Mat3) *Finding {
	precision := v.precision()
	defect := matrix.Defect(m)
	if defect <= precision.Defect() {
		return nil
	}
	if firstOrder(m, precision.Defect()) {
		return firstOrderAngles(v, m)
	}
	near, distance, ok := matrix.Nearest(m)
	f := finding(MatrixNotOrthonormal, v, claim, "%s claims a %s, but its columns are not orthonormal", v.name(), v.Form)
	f.Evidence = []Evidence{
		{What: "defect |M^T M - 1|", Stated: Plain(0), Computed: Plain(defect)},
		{What: "defect that the digits written allow", Computed: Plain(precision.Defect())},
		{What: "determinant", Stated: Plain(1), Computed: Plain(m.Det()), Residual: Plain(m.Det() - 1)},
	}
	for j, axis := range [...]string{"x", "y", "z"} {
		n := m.Column(j).Norm()
		f.Evidence = append(f.Evidence, Evidence{What: "length of column " + axis, Stated: Plain(1), Computed: Plain(n), Residual: Plain(n - 1)})
	}
	if !ok {
		f.Message += "; its rank is so low that no nearest rotation is determined, and the error has no bound below 180 deg"
		return f
	}
	f.Evidence = append(f.Evidence, Evidence{What: "distance to the nearest rotation", Stated: Plain(0), Computed: Plain(distance)})
	if s, _, ok := matrix.Scale(m); ok && scaled(precision, m, s) {
		f.Message += fmt.Sprintf("; it is a rotation times %s: lengths change, directions by 0 deg", digits(s))
		f.Remedy = "divide all nine numbers by " + digits(s) + ", and keep the scale under a name of its own"
		return f
	}
	f.Message += fmt.Sprintf("; against the nearest rotation an axis is off by %s", degrees(worstColumn(m, near)))
	f.Remedy = "if it was typed or rounded, take it again from its source; if it was computed, normalise it there"
	f.Edit = v.normalisedMatrix(near, distance)
	return f
}

// scaled reports whether m/s is a rotation as far as the digits show.
func scaled(p tolerance.Precision, m matrix.Mat3, s float64) bool {
	p.Half /= s
	return matrix.Defect(m.Scale(1/s)) <= p.Defect()
}

// worstColumn is the largest angle between a column of m and the same column of
// a rotation, in radians.
func worstColumn(m, near matrix.Mat3) float64 {
	worst := 0.0
	for j := range 3 {
		worst = math.Max(worst, angleBetween(m.Column(j), near.Column(j)))
	}
	return worst
}

func angleBetween(a, b rotor.Vec) float64 { return math.Atan2(a.Cross(b).Norm(), a.Dot(b)) }

// firstOrder reports whether m is 1 plus a skew matrix of small angles, which
// is how first-order attitude corrections are written on purpose.
func firstOrder(m matrix.Mat3, allowed float64) bool {
	const small = 0.2 // rad; beyond it the second order, 1 - cos, exceeds 2 % and nobody drops it on purpose (common practice, no source)
	symmetric := 0.0
	for i := range 3 {
		for j := range 3 {
			s := m[i][j] + m[j][i]
			if i == j {
				s -= 2
			}
			symmetric = math.Max(symmetric, math.Abs(s))
		}
	}
	skew := rotor.Vec{X: m[2][1], Y: m[0][2], Z: m[1][0]}
	return symmetric <= allowed && skew.Norm() < small
}

func firstOrderAngles(v *Value, m matrix.Mat3) *Finding {
	theta := rotor.Vec{X: m[2][1], Y: m[0][2], Z: m[1][0]}
	turn := rotor.FromRotationVector(theta)
	near, _, _ := matrix.Nearest(m)
	miss := rotor.Angle(turn, near.Rotor())
	return &Finding{
		Rule: FirstOrderAngles, Level: Note, Place: v.Place, Key: v.Key,
		Message: fmt.Sprintf("%s is the identity plus first-order small angles, a rotation by %s only up to %s",
			v.name(), degrees(theta.Norm()), degrees(math.Max(miss, theta.Norm()*theta.Norm()/2))),
		Evidence: []Evidence{
			{What: "angles about x, y, z", Computed: Words(fmt.Sprintf("%s, %s, %s", degrees(theta.X), degrees(theta.Y), degrees(theta.Z)))},
			{What: "defect |M^T M - 1|", Stated: Plain(0), Computed: Plain(matrix.Defect(m))},
		},
	}
}

// triadHand judges three axes that claim a handedness. Only a stated claim of
// right hand, or of a rotation, can be contradicted.
func triadHand(v *Value) *Finding {
	m, ok := v.rotationPart()
	claim, stated := v.Claims.On(convention.OfHand)
	if !ok || !stated || m.Det() == 0 {
		return nil
	}
	hand := convention.RightHanded
	if m.Det() < 0 {
		hand = convention.LeftHanded
	}
	if claim.Says == hand {
		return nil
	}
	x, y, z := m.Column(0), m.Column(1), m.Column(2)
	f := finding(LeftHandedTriad, v, claim, "%s claims %s axes, but x cross y is opposite to z: the triad is %s, and z is off by 180 deg from where the claim puts it",
		v.name(), claim.Says, hand)
	if hand == convention.RightHanded {
		f.Message = fmt.Sprintf("%s claims left-handed axes, but x cross y is along z: the triad is right-handed, and z is off by 180 deg from where the claim puts it", v.name())
	}
	f.Evidence = []Evidence{
		{What: "x . (y cross z)", Stated: Plain(-m.Det()), Computed: Plain(m.Det()), Residual: Plain(2 * m.Det())},
		{What: "x cross y", Computed: Words(vector(x.Cross(y)))},
		{What: "z as given", Stated: Words(vector(z))},
	}
	f.Remedy = "reverse one axis or exchange two, or declare the frame " + hand.String()
	return f
}

// axisMapHand judges a map between the axes of two frames.
func axisMapHand(v *Value) *Finding {
	m, ok := v.rotationPart()
	if !ok {
		return nil
	}
	if hand, stated := v.Claims.On(convention.OfHand); m.Det() > 0 && stated && hand.Source == Declaration && hand.Says == convention.LeftHanded {
		return notMirrored(v, hand, m)
	}
	if m.Det() >= 0 {
		return nil
	}
	claim, _ := v.FormClaim()
	f := finding(MirroringAxisMap, v, claim, "%s maps right-handed axes to left-handed ones (determinant -1); %s", v.name(), mirrorEffect)
	if hand, stated := v.Claims.On(convention.OfHand); stated {
		if hand.Says == convention.LeftHanded {
			return nil // one of the two frames is declared left-handed, and the map must mirror
		}
		f = finding(MirroringAxisMap, v, hand, "%s", f.Message)
	}
	f.Evidence = []Evidence{{What: "determinant", Stated: Plain(1), Computed: Plain(m.Det()), Residual: Plain(m.Det() - 1)}}
	if n, ok := mirrorNormal(m); ok {
		f.Evidence = append(f.Evidence, Evidence{What: "direction it reverses", Computed: Words(vector(n))})
	}
	f.Remedy = "an exchange of two axes needs one sign change to stay a rotation; check the sign of the remaining axis"
	return f
}
