package frame

import (
	"math"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// The WGS-84 ellipsoid: equatorial radius in metres and flattening.
const (
	SemiMajor  = 6378137.0
	Flattening = 1 / 298.257223563
)

const (
	semiMinor = SemiMajor * (1 - Flattening)
	ecc2      = Flattening * (2 - Flattening) // first eccentricity squared
)

// Geodetic is a place by geodetic latitude (north positive) and longitude
// (east positive), in radians, and height above the WGS-84 ellipsoid in metres.
type Geodetic struct{ Lat, Lon, Height float64 }

// ECEF is the place in earth-centred earth-fixed coordinates, in metres: x through the
// equator at Greenwich, y through 90 degrees east, z through the north pole.
func (g Geodetic) ECEF() rotor.Vec {
	sinLat, cosLat := math.Sincos(g.Lat)
	sinLon, cosLon := math.Sincos(g.Lon)
	n := SemiMajor / math.Sqrt(1-ecc2*sinLat*sinLat) // radius of curvature in the prime vertical
	return rotor.Vec{
		X: (n + g.Height) * cosLat * cosLon,
		Y: (n + g.Height) * cosLat * sinLon,
		Z: (n*(1-ecc2) + g.Height) * sinLat,
	}
}

// ENU has east, north and up at a latitude and longitude as columns in ECEF:
// v_ECEF = M v_ENU.
func ENU(lat, lon float64) matrix.Mat3 {
	sinLat, cosLat := math.Sincos(lat)
	sinLon, cosLon := math.Sincos(lon)
	return matrix.Mat3{
		{-sinLon, -sinLat * cosLon, cosLat * cosLon},
		{cosLon, -sinLat * sinLon, cosLat * sinLon},
		{0, cosLat, sinLat},
	}
}

// NED has north, east and down as columns: v_ECEF = M v_NED.
func NED(lat, lon float64) matrix.Mat3 {
	m := ENU(lat, lon)
	for i, row := range m {
		m[i] = [3]float64{row[1], row[0], -row[2]}
	}
	return m
}

// Local is the place p in metres east, north and up of g.
func (g Geodetic) Local(p Geodetic) rotor.Vec {
	return ENU(g.Lat, g.Lon).Transpose().Apply(p.ECEF().Sub(g.ECEF()))
}

// FromECEF is the place at v. On the axis of the earth the longitude is 0.
// It is false for the centre, and for numbers that are not finite.
//
// Newton's method for the tangent of the reduced latitude (B. R. Bowring, Survey Review 23
// (1976) 323, iterated), which at and above the surface is exact to rounding after two rounds.
func FromECEF(v rotor.Vec) (Geodetic, bool) {
	if !v.Finite() || v == (rotor.Vec{}) {
		return Geodetic{}, false
	}
	p := math.Hypot(v.X, v.Y)
	sin, cos := unit(v.Z*SemiMajor, p*semiMinor)
	var lat float64
	for range 5 {
		y := v.Z + ecc2/(1-ecc2)*semiMinor*sin*sin*sin
		x := p - ecc2*SemiMajor*cos*cos*cos
		lat = math.Atan2(y, x)
		sin, cos = unit(y*(1-Flattening), x)
	}
	sinLat, cosLat := math.Sincos(lat)
	// p cos + z sin - a sqrt(1 - e^2 sin^2): no division, hence good at the pole
	height := p*cosLat + v.Z*sinLat - SemiMajor*math.Sqrt(1-ecc2*sinLat*sinLat)
	return Geodetic{lat, math.Atan2(v.Y, v.X), height}, true
}

// unit is the direction (y, x) at length one.
func unit(y, x float64) (sin, cos float64) {
	h := math.Hypot(y, x)
	return y / h, x / h
}
