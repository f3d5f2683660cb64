package rules

import (
	"fmt"
	"math"

	"dextral/core/convention"
)

// unset notes an orientation whose numbers are all zero, the customary way to
// leave one open.
func unset(v *Value) *Finding {
	return &Finding{
		Rule: OrientationUnset, Level: Note, Place: v.Place, Key: v.Key,
		Message:  fmt.Sprintf("%s is all zero: no orientation, taken as unset; a program that normalises it gets NaN", v.name()),
		Evidence: []Evidence{{What: "norm", Stated: Plain(1), Computed: Plain(0), Residual: Plain(-1)}},
	}
}

// rotorUnit judges the norm of a quaternion that claims to be a rotation.
func rotorUnit(v *Value) *Finding {
	claim, claimed := v.FormClaim()
	if !claimed || len(v.Numbers) != 4 {
		return nil
	}
	n := norm(v.Floats())
	if n == 0 {
		return unset(v)
	}
	if v.quantum() > 0 {
		return nil // whole numbers that stand for parts of one
	}
	allowed := v.precision().Norm(4, 1)
	if math.Abs(n-1) <= allowed {
		return nil
	}
	if f := quantisedNorm(v, claim); f != nil {
		return f
	}
	f := finding(RotorNotUnit, v, claim, "%s claims a unit quaternion, but its norm is %s", v.name(), digits(n))
	f.Evidence = []Evidence{
		{What: "norm", Stated: Plain(1), Computed: Plain(n), Residual: Plain(n - 1)},
		{What: "deviation that the digits written allow", Computed: Plain(allowed)},
	}
	if scalar := v.Claims.Scalar(); scalar != convention.ScalarUnstated {
		w := v.Numbers[0].Value
		if scalar == convention.ScalarLast {
			w = v.Numbers[3].Value
		}
		excess := matrixFormulaExcess(w, n)
		f.Message += fmt.Sprintf("; put as it stands into the usual matrix formula it turns by %s too %s", degrees(math.Abs(excess)), muchOrLittle(excess))
		f.Evidence = append(f.Evidence, Evidence{What: "turn by M = 1 + 2 w [u] + 2 [u][u]",
			Stated: Degrees(turnOf(w, n)), Computed: Degrees(turnOf(w, n) + excess), Residual: Degrees(excess)})
	} else {
		f.Message += fmt.Sprintf("; v' = q v q~ scales lengths by %s, and as rotation it can be off by up to %s", digits(n*n), degrees(worstMatrixFormulaExcess(n)))
	}
	f.Remedy = "take the numbers again from their source, or divide all four by the norm if they were only rounded"
	f.Edit = v.normalisedVector(4, n)
	return f
}

func muchOrLittle(excess float64) string {
	if excess < 0 {
		return "little"
	}
	return "much"
}

// turnOf is the rotation angle of a quaternion of norm n and scalar w, in
// (-pi, pi].
func turnOf(w, n float64) float64 {
	return math.Remainder(2*math.Atan2(math.Sqrt(math.Max(0, n*n-w*w)), w), 2*math.Pi)
}

// matrixFormulaExcess is the error in the rotation angle when a quaternion of
// norm n and scalar w is put unnormalised into M = 1 + 2 w [u] + 2 [u][u],
// the formula that presumes unit norm. In the plane of rotation M is
// (1 - 2 u.u, 2 w |u|) as cosine and sine, times a length.
func matrixFormulaExcess(w, n float64) float64 {
	u2 := math.Max(0, n*n-w*w)
	return math.Remainder(math.Atan2(2*w*math.Sqrt(u2), 1-2*u2)-turnOf(w, n), 2*math.Pi)
}

// worstMatrixFormulaExcess is the largest excess over all rotation angles,
// found on a grid of one degree: no more digits of it are printed.
func worstMatrixFormulaExcess(n float64) float64 {
	worst := 0.0
	for half := range 181 {
		w := n * math.Cos(float64(half)*math.Pi/180)
		worst = math.Max(worst, math.Abs(matrixFormulaExcess(w, n)))
	}
	return worst
}

// axisUnit judges the length of a vector that claims to be a unit axis.
func axisUnit(v *Value, axis []float64) *Finding {
	claim, claimed := v.FormClaim()
	if !claimed || len(axis) != 3 {
		return nil
	}
	n := norm(axis)
	if n == 0 {
		return zeroAxis(v, claim)
	}
	allowed := v.precision().Norm(3, 1)
	if math.Abs(n-1) <= allowed {
		return nil
	}
	turn := 2 * math.Atan(n) // cos(45 deg) + n sin(45 deg): the half angle has tangent n
	f := finding(AxisNotUnit, v, claim, "%s claims a unit axis, but its length is %s; a quaternion built on it for a turn of 90 deg turns by %s",
		v.name(), digits(n), degrees(turn))
	f.Evidence = []Evidence{
		{What: "length", Stated: Plain(1), Computed: Plain(n), Residual: Plain(n - 1)},
		{What: "turn by (cos 45 deg, sin 45 deg times axis)", Stated: Degrees(math.Pi / 2), Computed: Degrees(turn), Residual: Degrees(turn - math.Pi/2)},
		{What: "deviation that the digits written allow", Computed: Plain(allowed)},
	}
	f.Remedy = "divide the three numbers by the length"
	f.Edit = v.normalisedVector(3, n)
	return f
}

// zeroAxis reports an axis and angle that turns about nothing; a zero axis without
// a turn, and one alone, is how an axis is left open.
func zeroAxis(v *Value, claim Claim) *Finding {
	if v.Form != convention.AxisAngle || v.Numbers[3].Value == 0 {
		return unset(v)
	}
	turn := v.Numbers[3].Value * v.Claims.Unit().InRadians()
	f := finding(AxisNotUnit, v, claim, "%s claims a turn by %s about an axis, but the axis is zero: a quaternion built on it is (cos a/2, 0, 0, 0), of norm %s",
		v.name(), v.Numbers[3].Text, digits(math.Abs(math.Cos(turn/2))))
	f.Evidence = []Evidence{{What: "length", Stated: Plain(1), Computed: Plain(0), Residual: Plain(-1)}}
	f.Remedy = "write the axis, or an angle of zero"
	return f
}

func norm(x []float64) float64 {
	n := 0.0
	for _, a := range x {
		n = math.Hypot(n, a)
	}
	return n
}
