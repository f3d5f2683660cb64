package config

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

const kernel = `KPL/FK
TKFRAME_5_Q = ( 1 0 0 0 ) is a comment here
\begindata
FRAME_TERN_NOSE = -7001
FRAME_-7001_NAME = 'TERN_NOSE'
TKFRAME_-7001_SPEC = 'MATRIX'
TKFRAME_-7001_RELATIVE = 'TERN_BODY'
TKFRAME_-7001_MATRIX = ( 0, 1.0D0, 0,
                         -1, 0, 0
                         0, 0, 1 )
TKFRAME_TERN_TAIL_RELATIVE = 'TERN_BODY'
TKFRAME_TERN_TAIL_ANGLES = ( 0, 90.0 ) 
TKFRAME_TERN_TAIL_ANGLES += 180
TKFRAME_TERN_TAIL_AXES = ( 3, 2, 3 )
TKFRAME_TERN_TAIL_UNITS = 'DEGREES'
TKFRAME_9_SPEC = 'QUATERNION'
TKFRAME_9_Q = ( 0 1 0 0 )
TKFRAME_9_Q = ( 1 0 0 0 )
TKFRAME_9_MATRIX = ( 1 0 0 0 1 0 0 0 1 )
TKFRAME_8_ANGLES = ( 1 2 3 )
TKFRAME_8_AXES = ( 3 3 1 )
TKFRAME_8_UNITS = 'DEGREES'
TKFRAME_7_ANGLES = ( 1 2 3 )
TKFRAME_7_AXES = ( 3 2 1 )
TKFRAME_7_UNITS = 'ARCSECONDS'
TKFRAME_6_ANGLES = ( 0.1 0.2 0.3 )
TKFRAME_6_AXES = ( 3 2 1 )
TKFRAME_6_UNITS = 'RADIANS'
\begintext
`

// NAIF, Frames Required Reading, TK Frames.
func TestKernel(t *testing.T) {
	assert.Equal(t, []string{
		"TKFRAME_-7001_MATRIX: rotation matrix; format rotation matrix; format v_TERN_BODY = R v_TERN_NOSE; format column by column",
		"TKFRAME_TERN_TAIL_ANGLES: angles; format angles; format v_TERN_TAIL = R v_TERN_BODY; format z-y-z (fixed axes); format degree",
		"TKFRAME_9_Q: quaternion; format quaternion; format scalar first (w x y z)",
		"TKFRAME_9_MATRIX: rotation matrix; format rotation matrix; format column by column; undecided",
		"TKFRAME_8_ANGLES: angles; format angles; sibling degree; undecided",
		"TKFRAME_7_ANGLES: angles; format angles; format z-y-x (fixed axes); undecided",
		"TKFRAME_6_ANGLES: angles; format angles; format z-y-x (fixed axes); format radian",
	}, summaries(t, "rig.tf", kernel))
	values := readText(t, "rig.tf", kernel).Values
	assert.Equal(t, []float64{0, 1, 0, -1, 0, 0, 0, 0, 1}, values[0].Floats())
	assert.Equal(t, []float64{1, 0, 0, 0}, values[2].Floats(), "the last assignment holds")
	assert.Equal(t, "rig.tf:8:29", values[0].Numbers[1].Place.String())
	assert.Equal(t, "", Recognise("main.tf", []byte("resource \"a\" \"b\" {}\n")), "another format of that ending")
}

// The text's own example: a topocentric frame with x to the north, y to the west, z up, of
// which M = [-longitude]_3 [-colatitude]_2 [180]_3 takes coordinates to those of the Earth.
// At longitude 0 and latitude 30, north is (-1/2, 0, sqrt(3)/2), west is -y, up is
// (sqrt(3)/2, 0, 1/2); these are the columns of M.
func TestKernelTopocentric(t *testing.T) {
	text := `KPL/FK
\begindata
TKFRAME_1_RELATIVE = 'EARTH'
TKFRAME_1_SPEC = 'ANGLES'
TKFRAME_1_ANGLES = ( 0, -60.0, 180 )
TKFRAME_1_AXES = ( 3, 2, 3 )
TKFRAME_1_UNITS = 'DEGREES'
TKFRAME_2_RELATIVE = 'EARTH'
TKFRAME_2_SPEC = 'MATRIX'
TKFRAME_2_MATRIX = ( -0.5 0 0.8660254037844386 0 -1 0 0.8660254037844386 0 0.5 )
TKFRAME_3_RELATIVE = 'EARTH'
TKFRAME_3_SPEC = 'QUATERNION'
TKFRAME_3_Q = ( 0, 0.5, 0, 0.8660254037844387 )
FRAME_1_NAME = 'SITE'
FRAME_2_NAME = 'SITE'
FRAME_3_NAME = 'SITE'
`
	values := readText(t, "rig.tf", text).Values
	require.Len(t, values, 3)
	chain := rules.NewChain(values)
	require.NotNil(t, chain)
	assert.Empty(t, rules.CheckValues(values))
	assert.Empty(t, rules.CheckChain(chain), "all three are one rotation")
	wrong := readText(t, "rig.tf", `KPL/FK
\begindata
TKFRAME_1_RELATIVE = 'EARTH'
TKFRAME_1_ANGLES = ( 0, 60.0, 180 )
TKFRAME_1_AXES = ( 3, 2, 3 )
TKFRAME_1_UNITS = 'DEGREES'
TKFRAME_2_RELATIVE = 'EARTH'
TKFRAME_2_MATRIX = ( -0.5 0 0.8660254037844386 0 -1 0 0.8660254037844386 0 0.5 )
FRAME_1_NAME = 'SITE'
FRAME_2_NAME = 'SITE'
`).Values
	assert.NotEmpty(t, rules.CheckChain(rules.NewChain(wrong)), "with the sign of an angle changed they are two")
}
