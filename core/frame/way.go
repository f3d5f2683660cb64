package frame

import "strings"

// Way is a direction that people name: of a vehicle, of the local level on
// earth, of an orbit, or of a screen.
type Way uint8

// The ways. Each is followed by its opposite.
const (
	NoWay Way = iota
	Forward
	Back
	Left
	Right
	Up
	Down
	North
	South
	East
	West
	AlongTrack
	AgainstTrack
	OrbitNormal
	AntiNormal
	ScreenRight
	ScreenLeft
	ScreenTop
	ScreenBottom
	OutOfScreen
	IntoScreen
)

var wayNames = [...]string{"", "forward", "back", "left", "right", "up", "down", "north", "south", "east", "west",
	"along track", "against track", "orbit normal", "anti-normal",
	"screen right", "screen left", "screen top", "screen bottom", "out of screen", "into screen"}

// String is the way in words.
func (w Way) String() string {
	if int(w) >= len(wayNames) {
		return "?"
	}
	return wayNames[w]
}

// Opposite is the way back.
func (w Way) Opposite() Way {
	if w == NoWay || int(w) >= len(wayNames) {
		return NoWay
	}
	return (w - 1) ^ 1 + 1
}

// Setting is the surroundings in which ways are perpendicular to one another.
// Up and down belong to three of them; in an orbit they are away from the centre and
// towards it.
type Setting uint8

// The settings, with the right-handed triad that each is measured in.
const (
	NoSetting Setting = iota
	Body              // forward, left, up
	Level             // east, north, up
	Orbit             // up (radial), along track, orbit normal: a circular orbit
	Screen            // screen right, screen top, out of screen
)

// references are the right-handed triads of the settings.
var references = [...][3]Way{
	Body: {Forward, Left, Up}, Level: {East, North, Up},
	Orbit: {Up, AlongTrack, OrbitNormal}, Screen: {ScreenRight, ScreenTop, OutOfScreen},
}

// in is the axis of the setting's reference triad along which w points, with its sign.
func (w Way) in(s Setting) (axis int, sign float64, ok bool) {
	for k, reference := range references[s] {
		switch w {
		case reference:
			return k, 1, true
		case reference.Opposite():
			return k, -1, true
		}
	}
	return 0, 0, false
}

// wayWords are the words for ways, in lower case without spaces or hyphens.
var wayWords = map[string]Way{
	"forward": Forward, "forwards": Forward, "front": Forward, "fwd": Forward, "ahead": Forward, "nose": Forward, "fore": Forward,
	"back": Back, "backward": Back, "backwards": Back, "rear": Back, "aft": Back, "tail": Back,
	"left": Left, "port": Left, "right": Right, "starboard": Right,
	"up": Up, "top": Up, "upward": Up, "upwards": Up, "zenith": Up, "radial": Up, "radialout": Up,
	"down": Down, "downward": Down, "downwards": Down, "nadir": Down, "bottom": Down,
	"north": North, "south": South, "east": East, "west": West,
	"alongtrack": AlongTrack, "velocity": AlongTrack, "againsttrack": AgainstTrack,
	"orbitnormal": OrbitNormal, "normal": OrbitNormal, "antinormal": AntiNormal,
	"screenright": ScreenRight, "screenleft": ScreenLeft, "screentop": ScreenTop, "screenbottom": ScreenBottom,
	"outofscreen": OutOfScreen, "intoscreen": IntoScreen,
}

// ParseWay reads one way in words, such as "forward", "starboard" or "orbit normal".
func ParseWay(text string) (Way, bool) {
	w, ok := wayWords[strings.NewReplacer(" ", "", "-", "", "_", "").Replace(strings.ToLower(text))]
	return w, ok
}

// letters are the ways as triad codes abbreviate them, at the place of the way.
const letters = ".FBLRUDNSEW"

// letter is the way of a code letter in upper case; NoWay if it has none.
func letter(c byte) Way { return Way(max(0, strings.IndexByte(letters, c))) }
