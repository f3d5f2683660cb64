package frame_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/frame"
	"dextral/core/internal/table"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

func place(row table.Row, suffix string) frame.Geodetic {
	return frame.Geodetic{
		Lat: row.Number("lat"+suffix+"_deg") * deg, Lon: row.Number("lon"+suffix+"_deg") * deg, Height: row.Number("h" + suffix + "_m"),
	}
}

func vector(row table.Row, x, y, z string) rotor.Vec {
	return rotor.Vec{X: row.Number(x), Y: row.Number(y), Z: row.Number(z)}
}

// metres is what two programs may differ by: a few roundings of 2^-53 of the
// radius of the earth, 7e-10 m each, for distances of that size.
func metres(v rotor.Vec) float64 { return 8 * 0x1p-53 * math.Max(v.Norm(), frame.SemiMajor) }

// TestGeographicLib: 48 places and their axes against GeographicLib 2.1.2.
func TestGeographicLib(t *testing.T) {
	for _, row := range table.Read(t, reference+"frame_enu_ecef.csv") {
		g, v := place(row, ""), vector(row, "x_m", "y_m", "z_m")
		assert.LessOrEqual(t, g.ECEF().Sub(v).Norm(), metres(v), "%+v", g)
		assert.LessOrEqual(t, frame.ENU(g.Lat, g.Lon).Sub(matrixIn(row, "m")).Norm(), 4*ulp, "%+v", g)
		assert.LessOrEqual(t, frame.NED(g.Lat, g.Lon).Sub(matrixIn(row, "n")).Norm(), 4*ulp, "%+v", g)
		back, ok := frame.FromECEF(v)
		assert.True(t, ok)
		assert.LessOrEqual(t, back.ECEF().Sub(v).Norm(), 2*metres(v), "%+v", g)
		assert.InDelta(t, g.Lat, back.Lat, 8*ulp, "%+v", g)
		assert.InDelta(t, g.Height, back.Height, 2*metres(v), "%+v", g)
	}
}

// TestLocal: east, north and up of one place from another, GeographicLib's LocalCartesian.
func TestLocal(t *testing.T) {
	for _, row := range table.Read(t, reference+"frame_local.csv") {
		origin, p := place(row, "0"), place(row, "")
		want := vector(row, "east_m", "north_m", "up_m")
		assert.LessOrEqual(t, origin.Local(p).Sub(want).Norm(), 2*metres(want), "%+v", origin)
	}
}

// TestERFAGeodetic: ten places against ERFA, both ways.
func TestERFAGeodetic(t *testing.T) {
	for _, row := range table.Read(t, reference+"frame_erfa_geodetic.csv") {
		g, v := place(row, ""), vector(row, "x_m", "y_m", "z_m")
		assert.LessOrEqual(t, g.ECEF().Sub(v).Norm(), metres(v), "%+v", g)
		back, ok := frame.FromECEF(v)
		assert.True(t, ok)
		assert.InDelta(t, row.Number("back_lat_deg")*deg, back.Lat, 8*ulp)
		assert.InDelta(t, row.Number("back_h_m"), back.Height, 2*metres(v))
		if math.Abs(g.Lat) < 89*deg {
			assert.InDelta(t, row.Number("back_lon_deg")*deg, back.Lon, 8*ulp)
		}
	}
}

// TestFromECEF: there and back from deep below the ground to beyond the moon.
func TestFromECEF(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		g := frame.Geodetic{
			Lat:    rapid.OneOf(rapid.Float64Range(-math.Pi/2, math.Pi/2), rapid.SampledFrom([]float64{0, math.Pi / 2, -math.Pi / 2, 1e-9, math.Pi/2 - 1e-9})).Draw(rt, "lat"),
			Lon:    rapid.Float64Range(-math.Pi, math.Pi).Draw(rt, "lon"),
			Height: rapid.OneOf(rapid.Float64Range(-5e6, 1e7), rapid.Float64Range(-1e4, 1e5), rapid.Float64Range(1e7, 1e10)).Draw(rt, "height"),
		}
		v := g.ECEF()
		back, ok := frame.FromECEF(v)
		assert.True(rt, ok)
		assert.LessOrEqual(rt, back.ECEF().Sub(v).Norm(), 4*metres(v), "%+v %+v", g, back)
		assert.InDelta(rt, g.Height, back.Height, 4*metres(v), "%+v %+v", g, back)
		assert.InDelta(rt, g.Lat, back.Lat, 1e-14, "%+v %+v", g, back)
	})
	for _, bad := range []rotor.Vec{{}, {X: math.NaN()}, {Z: math.Inf(1)}} {
		_, ok := frame.FromECEF(bad)
		assert.False(t, ok)
	}
	pole, ok := frame.FromECEF(rotor.Vec{Z: 6356752.314245179 + 100})
	assert.True(t, ok)
	assert.InDelta(t, math.Pi/2, pole.Lat, ulp)
	assert.Equal(t, 0.0, pole.Lon)
	assert.InDelta(t, 100, pole.Height, 2e-9)
}

// TestAxesFollowThePlace: east and north are the directions in which the place
// moves as longitude and latitude grow, up as the height does.
func TestAxesFollowThePlace(t *testing.T) {
	const h = 1e-4
	rapid.Check(t, func(rt *rapid.T) {
		g := frame.Geodetic{Lat: rapid.Float64Range(-1.5, 1.5).Draw(rt, "lat"), Lon: rapid.Float64Range(-3, 3).Draw(rt, "lon"), Height: 200}
		m := frame.ENU(g.Lat, g.Lon)
		for k, step := range []frame.Geodetic{{Lon: h}, {Lat: h}, {Height: 10}} {
			after := frame.Geodetic{Lat: g.Lat + step.Lat, Lon: g.Lon + step.Lon, Height: g.Height + step.Height}
			before := frame.Geodetic{Lat: g.Lat - step.Lat, Lon: g.Lon - step.Lon, Height: g.Height - step.Height}
			assert.Less(rt, after.ECEF().Sub(before.ECEF()).Angle(m.Column(k)), 1e-7)
		}
		assert.InDelta(rt, 1, m.Det(), 8*ulp)
		assert.InDelta(rt, 1, frame.NED(g.Lat, g.Lon).Det(), 8*ulp)
	})
}

// TestDIS: attitudes in IEEE 1278.1 from heading, pitch and roll, 32 rows; angles
// are moving z-y-x from ECEF to the entity.
func TestDIS(t *testing.T) {
	zyx := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}
	for _, row := range table.Read(t, reference+"frame_dis.csv") {
		local := zyx.Rotor(row.Number("heading_deg")*deg, row.Number("pitch_deg")*deg, row.Number("roll_deg")*deg)
		m := frame.NED(row.Number("lat_deg")*deg, row.Number("lon_deg")*deg).Mul(matrix.FromRotor(local))
		assert.Less(t, m.Sub(matrixIn(row, "m")).Norm(), 16*ulp)
		stated := zyx.Rotor(row.Number("psi_deg")*deg, row.Number("theta_deg")*deg, row.Number("phi_deg")*deg)
		assert.Less(t, rotor.Angle(m.Rotor(), stated), 32*ulp)
		got := zyx.Angles(m.Rotor())
		if zyx.Amplification(got.B) < 1e3 {
			assert.InDelta(t, 0, angle.Wrap(got.A-row.Number("psi_deg")*deg), 1e-12)
			assert.InDelta(t, row.Number("theta_deg")*deg, got.B, 32*ulp)
			assert.InDelta(t, 0, angle.Wrap(got.C-row.Number("phi_deg")*deg), 1e-12)
		}
	}
}

// TestKoks: D. Koks, DSTO-TN-0640 (2008), equations 4.27 and 4.29, printed with
// three digits; the site was deduced to 0.1 degrees from the axes printed there.
func TestKoks(t *testing.T) {
	zyx := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}
	m := frame.NED(-34.9*deg, 138.5*deg).Mul(matrix.FromRotor(zyx.Rotor(135*deg, 20*deg, 30*deg)))
	printed := matrix.Mat3{{-.366, .928, .065}, {-.564, -.165, -.809}, {-.741, -.333, .584}}
	assert.Less(t, m.Sub(printed).Norm(), 3*0.0006)
	a := zyx.Angles(m.Rotor())
	assert.InDelta(t, -123, a.A/deg, 0.06)
	assert.InDelta(t, 47.8, a.B/deg, 0.06)
	assert.InDelta(t, -29.7, a.C/deg, 0.06)
}
