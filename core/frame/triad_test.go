package frame_test

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/internal/table"
	"dextral/core/matrix"
)

const (
	reference = "../../fixtures/reference/"
	deg       = math.Pi / 180
)

func parsed(t *testing.T, text string) frame.Triad {
	t.Helper()
	triad, err := frame.ParseTriad(text)
	require.NoError(t, err)
	return triad
}

func matrixIn(row table.Row, prefix string) matrix.Mat3 {
	n := row.Numbers(prefix, "00", "01", "02", "10", "11", "12", "20", "21", "22")
	return matrix.Mat3{{n[0], n[1], n[2]}, {n[3], n[4], n[5]}, {n[6], n[7], n[8]}}
}

// TestNamedAxes: all 37 conventions of the table, by their words: matrix to the
// table's target frame, determinant and hand.
func TestNamedAxes(t *testing.T) {
	targets := map[string]frame.Triad{
		"ENU": parsed(t, "ENU"), "FLU": parsed(t, "FLU"), "RSW": parsed(t, "RSW"),
		"DEV": parsed(t, "screen right, screen top, out of screen"),
	}
	hands := map[string]convention.Hand{"right": convention.RightHanded, "left": convention.LeftHanded}
	left, rows := 0, table.Read(t, reference+"frame_axes.csv")
	for _, row := range rows {
		name := row.Text("name")
		m := matrixIn(row, "m")
		if row.Text("group") == "earth" { // ENU from ECEF at 45 N, 90 E: no words
			assert.Less(t, frame.ENU(45*deg, 90*deg).Transpose().Sub(m).Norm(), 1e-15, name)
			continue
		}
		triad := parsed(t, "x "+row.Text("x")+", y "+row.Text("y")+", z "+row.Text("z"))
		got, ok := frame.AxisMap(targets[row.Text("target")], triad)
		assert.True(t, ok, name)
		assert.Equal(t, m, got, name)
		assert.Equal(t, row.Number("det"), got.Det(), name)
		assert.Equal(t, hands[row.Text("handedness")], triad.Handedness(), name)
		if triad.Handedness() == convention.LeftHanded {
			left++
		}
		if code, _, _ := strings.Cut(name, " "); len(code) == 3 && code != "SAE" && code != "DIS" && code != "ISO" && code != "BVH" && code != "W3C" {
			assert.True(t, parsed(t, code).Same(triad), name)
		}
	}
	assert.Len(t, rows, 37)
	assert.Equal(t, 7, left, "as the table's README says")
}

func TestParseTriad(t *testing.T) {
	for code, texts := range map[string][]string{
		"FLU": {"FLU", "flu", " FLU ", "forward-left-up", "forward, left, up", "forward/left/up", "Forward Left Up", "x forward, y left, z up", "X: forward, Y: left, Z: up", "x=forward y=left z=up", "x-forward y-left z-up",
			"z up, x forward, y left", "x axis points forward, y axis left and z axis up", "x forward, z up, right-handed", "x forward, y left, right handed", "fwd port up", "FLU frame", "FLU (right-handed)", "+x forward, +y left, +z up",
			"-x back, -y right, -z down", "x -> forward, y -> left, z -> up", "x\u2192forward, y\u2192left, z\u2192up", "nose, port, top", "FLU (x forward, y left, z up)", "X Forward, Y Left, Z Up", "-X back, -Y right, Z up"},
		"NED": {"NED", "ned", "north-east-down", "x north, y east, z down", "north, east, nadir", "x north, y east, right-handed"},
		"ENU": {"ENU", "east north up", "east, north, zenith"},
		"RDF": {"RDF", "optical", "Optical", "right, down, forward", "x right, y down, z forward", "x starboard, y down, z ahead"},
		"RUB": {"RUB", "x right, y up, -z forward", "x right, y up, z backwards", "x right, y up, right-handed"},
		"RUF": {"RUF", "x right, y up, left-handed", "x right, y up, z forward, left-handed", "y up, z forward, left hand"},
		"SEU": {"SEZ", "sez", "SEU"},
		"FUR": {"FUR", "forward up right"},
		"END": {"END", "east, north, down"},
	} {
		want, ok := frame.ParseTriad(code)
		assert.NoError(t, ok)
		for _, text := range texts {
			got := parsed(t, text)
			assert.True(t, got.Same(want), "%s: %s", text, got)
			assert.Equal(t, code, got.Code(), text)
			assert.Equal(t, convention.OfHand, got.Subject())
		}
	}
	assert.True(t, parsed(t, "RSW").Same(parsed(t, "radial, along track, orbit normal")))
	assert.True(t, parsed(t, "rtn").Same(parsed(t, "QSW")))
	assert.Equal(t, "", parsed(t, "RSW").Code())
	assert.Equal(t, "x up, y along track, z orbit normal", parsed(t, "RIC").String())
	assert.Equal(t, "NED (x north, y east, z down)", parsed(t, "NED").String())
}

// TestStatedHand: what is stated is kept, and may be false.
func TestStatedHand(t *testing.T) {
	good := parsed(t, "x forward, y left, z up, right-handed")
	assert.Equal(t, convention.RightHanded, good.Hand)
	assert.Equal(t, good.Hand, good.Handedness())
	bad := parsed(t, "x forward, y right, z up, right-handed")
	assert.Equal(t, convention.RightHanded, bad.Hand)
	assert.Equal(t, convention.LeftHanded, bad.Handedness())
	assert.Equal(t, convention.HandUnstated, parsed(t, "NEU").Hand)
	assert.Equal(t, convention.LeftHanded, parsed(t, "NEU").Handedness())
}

func TestBadTriads(t *testing.T) {
	for text, want := range map[string]error{
		"": frame.ErrNoTriad, "banana": frame.ErrNoTriad, "x": frame.ErrNoTriad, "z up": frame.ErrNoTriad, "y-up, right-handed": frame.ErrNoTriad, "x forward, y left": frame.ErrNoTriad,
		"end": frame.ErrNoTriad, "use": frame.ErrNoTriad, "abc": frame.ErrNoTriad, "right-handed": frame.ErrNoTriad, "xyz": frame.ErrNoTriad,
		"forward, back, up": frame.ErrTriad, "x forward, x left, z up": frame.ErrTriad, "north, east, forward": frame.ErrTriad, "forward, left, up, down": frame.ErrTriad,
		"x up, y down, right-handed": frame.ErrTriad, "x north, y left, right-handed": frame.ErrTriad, "LVLH": frame.ErrTriad, "FLU NED": frame.ErrNoTriad, "FLU (x forward, y right, z up)": frame.ErrTriad, "FLU forward": frame.ErrTriad,
	} {
		triad, err := frame.ParseTriad(text)
		assert.ErrorIs(t, err, want, text)
		assert.Equal(t, frame.Triad{}, triad, text)
	}
	_, err := frame.ParseTriad("LVLH")
	assert.ErrorContains(t, err, "x along track, y anti-normal, z down")
	assert.ErrorContains(t, err, "x up, y along track, z orbit normal")
}

func FuzzParseTriad(f *testing.F) {
	for _, text := range []string{"FLU", "x forward, y left, z up", "-z forward y up right-handed", "optical", "\xff-x"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		if triad, err := frame.ParseTriad(text); err == nil {
			assert.True(t, triad.Valid())
			again := parsed(t, triad.String())
			assert.True(t, again.Same(triad), "%q: %s", text, triad)
		}
	})
}

func TestWays(t *testing.T) {
	for w := frame.Forward; w <= frame.IntoScreen; w++ {
		assert.Equal(t, w, w.Opposite().Opposite())
		assert.NotEqual(t, w, w.Opposite())
		read, ok := frame.ParseWay(w.String())
		assert.True(t, ok, w.String())
		assert.Equal(t, w, read)
	}
	assert.Equal(t, frame.South, frame.North.Opposite())
	assert.Equal(t, frame.NoWay, frame.NoWay.Opposite())
	assert.Equal(t, frame.NoWay, frame.Way(200).Opposite())
	assert.Equal(t, "?", frame.Way(200).String())
	_, ok := frame.ParseWay("")
	assert.False(t, ok)
}

// TestTriadsOfASetting: 48 triads each, half of them left-handed; maps compose.
func TestTriadsOfASetting(t *testing.T) {
	for _, ways := range [][]frame.Way{
		{frame.Forward, frame.Back, frame.Left, frame.Right, frame.Up, frame.Down},
		{frame.East, frame.West, frame.North, frame.South, frame.Up, frame.Down},
	} {
		var valid []frame.Triad
		hands := map[convention.Hand]int{}
		for _, x := range ways {
			for _, y := range ways {
				for _, z := range ways {
					if triad := (frame.Triad{X: x, Y: y, Z: z}); triad.Valid() {
						valid = append(valid, triad)
						hands[triad.Handedness()]++
						assert.True(t, parsed(t, triad.Code()).Same(triad), triad.Code())
					}
				}
			}
		}
		assert.Equal(t, map[convention.Hand]int{convention.RightHanded: 24, convention.LeftHanded: 24}, hands)
		for _, a := range valid[:6] {
			for _, b := range valid {
				ab, _ := frame.AxisMap(a, b)
				ba, _ := frame.AxisMap(b, a)
				assert.Equal(t, matrix.Identity, ab.Mul(ba))
				assert.Equal(t, a.Handedness() == b.Handedness(), ab.Det() == 1)
			}
		}
	}
	_, ok := frame.AxisMap(parsed(t, "FLU"), parsed(t, "ENU"))
	assert.False(t, ok, "a vehicle is not the local level")
	_, ok = frame.AxisMap(frame.Triad{}, frame.Triad{})
	assert.False(t, ok)
	assert.Equal(t, convention.HandUnstated, frame.Triad{}.Handedness())
	assert.Equal(t, frame.NoSetting, frame.Triad{X: frame.Up, Y: frame.Way(99), Z: frame.Left}.Setting())
}
