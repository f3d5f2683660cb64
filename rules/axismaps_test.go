package rules

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// The maps follow from the axes in words, by hand: in NED x is north, which is y of
// ENU; the axes of an image point right, down and forward (REP 103).
func TestMapNames(t *testing.T) {
	for images, want := range map[string]string{
		"y,x,-z":   " (as between ENU and NED)",
		"-y,-z,x":  " (as between RDF (optical) and FLU)",
		"z,-x,-y":  " (as between RDF (optical) and FLU)",
		"y,z,x":    " (as between RDF (optical) and FRD)",
		"x,-y,-z":  " (as between FLU and FRD, or NWU and NED)",
		"-x,-y,z":  "",
		"-y,-x,-z": "",
	} {
		assert.Equal(t, "with x,y,z -> "+images+want+", reversed", withMapNames("with x,y,z -> "+images+", reversed"))
	}
}

func TestOpticalFrame(t *testing.T) {
	for _, c := range []struct {
		frames        []string
		named, beside string
	}{
		{[]string{"base", "camera_optical_frame", "camera_link"}, "camera_optical_frame", "camera_link"},
		{[]string{"camera", "camera.optical"}, "camera.optical", "camera"},
		{[]string{"camera_optical_frame", "cameras"}, "", ""},
		{[]string{"optical", "base"}, "", ""},
		{[]string{"base", "camera_link"}, "", ""},
	} {
		named, beside := opticalFrame(c.frames)
		assert.Equal(t, [2]string{c.named, c.beside}, [2]string{named, beside}, c.frames)
	}
}
