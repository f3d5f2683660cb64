package rules

import (
	"math"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/matrix"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The rotation of most cases: 30 degrees about z, then 20 about y', then 10 about
// x”. The angles of the turns below were recomputed with plain quaternion algebra
// in another language: 143.09588, 71.63420, 43.64958, 29.87368, 60.77609, 35.17337.
func tern() rotor.Rotor {
	s := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}
	return s.Rotor(30*math.Pi/180, 20*math.Pi/180, 10*math.Pi/180)
}

func wxyz(r rotor.Rotor, decimals int) string {
	w, x, y, z := r.Quaternion()
	return printed(decimals, w, x, y, z)
}

func xyzw(r rotor.Rotor, decimals int) string {
	w, x, y, z := r.Quaternion()
	return printed(decimals, x, y, z, w)
}

func nine(m matrix.Mat3, decimals int) string {
	return printed(decimals, m[0][0], m[0][1], m[0][2], m[1][0], m[1][1], m[1][2], m[2][0], m[2][1], m[2][2])
}

func TestExplain(t *testing.T) {
	r := tern()
	m := matrix.FromRotor(r)
	first, last := convention.ScalarFirst, convention.ScalarLast
	quaternion := func(text string, says ...convention.Term) *Value { return value(convention.Quaternion, text, says...) }
	rotation := func(text string) *Value { return value(convention.Rotation, text) }
	angles := func(text string, says ...convention.Term) *Value { return value(convention.Angles, text, says...) }
	ned, err := frame.ParseTriad("NED")
	require.NoError(t, err)
	enu, err := frame.ParseTriad("ENU")
	require.NoError(t, err)
	remap, ok := frame.AxisMap(enu, ned)
	require.True(t, ok)
	trim, _ := rotor.FromAxisAngle(rotor.Vec{Z: 1}, 0.12*math.Pi/180)
	flipped := m
	for i := range 3 {
		flipped[i][1] = -flipped[i][1]
	}
	zyx, xyz := label(t, "z-y'-x''"), label(t, "x-y'-z''")
	w, x, y, z := r.Quaternion()

	for name, c := range map[string]struct {
		before, after *Value
		effect        Effect
		text          string
	}{
		"nothing":             {quaternion(wxyz(r, 9), first), quaternion(wxyz(r, 9), first), Unturned, ""},
		"other sign":          {quaternion(wxyz(r, 9), first), quaternion(wxyz(r.Neg(), 9), first), Unturned, "all four signs are reversed; the same rotation"},
		"order, both":         {quaternion(wxyz(r, 9), first), quaternion(xyzw(r, 9), last), Unturned, "the first of the four numbers moved to the end; the scalar place was scalar first (w x y z) and is scalar last (x y z w); the same rotation"},
		"order, numbers only": {quaternion(wxyz(r, 9), first), quaternion(xyzw(r, 9), first), Turned, "the first of the four numbers moved to the end; a turn of 143.1 deg"},
		"order, claim only":   {quaternion(wxyz(r, 9), first), quaternion(wxyz(r, 9), last), Turned, "the scalar place was scalar first (w x y z) and is scalar last (x y z w); a turn of 143.1 deg"},
		"order, nothing said": {quaternion(wxyz(r, 9)), quaternion(xyzw(r, 9)), Open, "the first of the four numbers moved to the end; nothing states how the numbers are read: the same rotation if their reader changed with them, else a turn of 143.1 deg"},
		"conjugate":           {quaternion(wxyz(r, 9), first), quaternion(wxyz(r.Reverse(), 9), first), Turned, "the signs of all numbers but number 1 are reversed: the conjugate, so that the direction is reversed; a turn of 71.6 deg"},
		"renormalised":        {quaternion(printed(9, 1.01*w, 1.01*x, 1.01*y, 1.01*z), first), quaternion(wxyz(r, 9), first), Unturned, "the norm was 1.01 and is 1; the same rotation"},
		"one sign":            {quaternion(wxyz(r, 9), first), quaternion(printed(9, w, x, -y, z), first), Turned, "the sign of number 3 is reversed; a turn of 43.6 deg"},
		"trim":                {quaternion(wxyz(r, 9), first), quaternion(wxyz(trim.Mul(r), 9), first), Turned, "turned by 0.12 deg about z (after the old rotation)"},
		"trim of the body":    {quaternion(wxyz(r, 9), first), quaternion(wxyz(r.Mul(trim), 9), first), Turned, "turned by 0.12 deg about z (before the old rotation)"},
		"fewer digits":        {quaternion(wxyz(r, 9), first), quaternion(wxyz(r, 4), first), Unturned, "other digits of the same numbers; the same rotation, to 0.00406 deg"},
		"transposed":          {rotation(nine(m, 9)), rotation(nine(m.Transpose(), 9)), Turned, "transposed; a turn of 71.6 deg"},
		"mirror":              {rotation(nine(m, 9)), rotation(nine(flipped, 9)), Mirrored, "the signs of the second column are reversed; it mirrors now: the determinant was 1 and is -1"},
		"mirror mended":       {rotation(nine(flipped, 9)), rotation(nine(m, 9)), Mirrored, "the signs of the second column are reversed; it no longer mirrors: the determinant was -1 and is 1"},
		"form":                {quaternion(wxyz(r, 9), first), rotation(nine(m, 9)), Unturned, "quaternion became rotation matrix; the same rotation"},
		"remap":               {rotation(nine(m, 9)), rotation(nine(remap.Mul(m), 9)), Turned, "axes exchanged in what comes out: x = y, y = x, z = -z, as from NED to ENU, a turn of 180 deg"},
		"remap of both":       {rotation(nine(m, 9)), rotation(nine(remap.Mul(m).Mul(remap.Transpose()), 9)), Turned, "axes exchanged on both sides: x = y, y = x, z = -z, as from NED to ENU, a turn of 60.8 deg"},
		"degrees, both":       {angles("30.00 20.00 10.00", zyx, convention.Degree), angles("0.523599 0.349066 0.174533", zyx, convention.Radian), Unturned, "the numbers went from degrees to radians; the unit was degree and is radian; the same rotation"},
		"degrees, numbers":    {angles("30.00 20.00 10.00", zyx, convention.Degree), angles("0.523599 0.349066 0.174533", zyx, convention.Degree), Turned, "the numbers went from degrees to radians; a turn of 35.2 deg"},
		"relabelled":          {angles("30.00 20.00 10.00", zyx, convention.Degree), angles("30.00 20.00 10.00", xyz, convention.Degree), Turned, "the sequence was z-y'-x'' (moving axes) and is x-y'-z'' (moving axes); a turn of 29.9 deg"},
		"relabelled, both":    {angles("30.00 20.00 10.00", zyx, convention.Degree), angles("10.00 20.00 30.00", label(t, "x-y-z about fixed axes"), convention.Degree), Unturned, "the three numbers changed places: number 3 stands first, then number 2, then number 1; the sequence was z-y'-x'' (moving axes) and is x-y-z (fixed axes); the same rotation"},
		"no rotation":         {value(convention.Matrix, "1 2 3 4 5 6 7 8 9"), value(convention.Matrix, "1 2 3 4 5 6 7 8 10"), Restated, "1 of 9 numbers are others"},
		"translation":         {value(convention.Transform, "1 0 0 0.10 0 1 0 0.20 0 0 1 0.30"), value(convention.Transform, "1 0 0 0.10 0 1 0 0.25 0 0 1 0.30"), Restated, "the same rotation; the translation moves by 0.05"},
		"axis":                {value(convention.Axis, "0 0 1"), value(convention.Axis, "0.0 0.5 0.8660254"), Turned, "the axis turns by 30 deg"},
	} {
		t.Run(name, func(t *testing.T) {
			got := Explain(c.before, c.after)
			assert.Equal(t, c.text, got.Text)
			assert.Equal(t, c.effect.String(), got.Effect.String())
		})
	}
}
