package rules

import (
	"regexp"
	"strings"

	"dextral/core/frame"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// mapNames gives for each map, as package identify words it, the triads that it leads
// between, one way or the other. Several pairs of triads have one map, which numbers
// cannot tell apart.
var mapNames = func() map[string]string {
	names := map[string]string{}
	for _, t := range triads {
		a, errA := frame.ParseTriad(t[0])
		b, errB := frame.ParseTriad(t[1])
		to, ok := frame.AxisMap(a, b)
		if errA != nil || errB != nil || !ok {
			continue
		}
		words, turned := pairWords(t[0], t[1]), pairWords(t[1], t[0])
		for _, m := range []matrix.Mat3{to, to.Transpose()} {
			key := axisWord(m.Column(0)) + "," + axisWord(m.Column(1)) + "," + axisWord(m.Column(2))
			switch {
			case names[key] == "":
				names[key] = words
			case !strings.Contains(names[key], words) && !strings.Contains(names[key], turned):
				names[key] += ", or " + words
			}
		}
	}
	return names
}()

func pairWords(a, b string) string {
	return strings.ReplaceAll(a+" and "+b, "RDF", opticalAxes)
}

// opticalAxes is how messages call the axes of a camera image.
const opticalAxes = "RDF (optical)"

// axisWord is a unit vector along an axis: x, -y.
func axisWord(v rotor.Vec) string {
	for i, c := range [3]float64{v.X, v.Y, v.Z} {
		switch {
		case c > 0.5:
			return string("xyz"[i])
		case c < -0.5:
			return "-" + string("xyz"[i])
		}
	}
	return "?"
}

var axisMapWords = regexp.MustCompile(`x,y,z -> (-?[xyz],-?[xyz],-?[xyz])`)

// withMapNames adds to the maps of axes in a text between which triads they lead, where
// that is customary.
func withMapNames(text string) string {
	return axisMapWords.ReplaceAllStringFunc(text, func(m string) string {
		if name := mapNames[strings.TrimPrefix(m, "x,y,z -> ")]; name != "" {
			return m + " (as between " + name + ")"
		}
		return m
	})
}

// optical reports whether a text names a map to or from the axes of a camera image.
func optical(text string) bool { return strings.Contains(text, opticalAxes) }

// opticalFrame finds a frame that is named optical, as camera_optical_frame, and the
// frame beside it that the name is made from: camera_link, camera_frame, camera.
func opticalFrame(frames []string) (named, beside string) {
	for _, f := range frames {
		stem, _, ok := strings.Cut(strings.ToLower(f), "optical")
		stem = strings.TrimRight(stem, "_-./ ")
		if !ok || stem == "" {
			continue
		}
		for _, g := range frames {
			rest, ok := strings.CutPrefix(strings.ToLower(g), stem)
			if g != f && ok && (rest == "" || strings.ContainsAny(rest[:1], "_-./ ")) {
				return f, g
			}
		}
	}
	return "", ""
}
