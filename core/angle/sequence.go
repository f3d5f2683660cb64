package angle

// Axis is a coordinate axis.
type Axis uint8

// The axes.
const (
	X Axis = iota
	Y
	Z
)

// String is x, y or z, and ? for anything else.
func (a Axis) String() string {
	if a > Z {
		return "?"
	}
	return "xyz"[a : a+1]
}

// Sequence is an order of three turns about coordinate axes: of the turning
// body (moving axes) or of the space it turns in (fixed axes).
// Axes stand in the order in which the turns are made, and so do the numbers
// of every method.
type Sequence struct {
	Axes  [3]Axis
	Fixed bool
}

// patterns are the twelve orders: six with three different axes (Tait-Bryan)
// and six that end on the axis they began with (proper Euler).
var patterns = [12][3]Axis{
	{X, Y, Z}, {X, Z, Y}, {Y, Z, X}, {Y, X, Z}, {Z, X, Y}, {Z, Y, X},
	{X, Y, X}, {X, Z, X}, {Y, Z, Y}, {Y, X, Y}, {Z, X, Z}, {Z, Y, Z},
}

// Sequences lists the 24: moving axes first, Tait-Bryan before proper Euler.
func Sequences() []Sequence {
	all := make([]Sequence, 0, 2*len(patterns))
	for _, fixed := range []bool{false, true} {
		for _, axes := range patterns {
			all = append(all, Sequence{axes, fixed})
		}
	}
	return all
}

// Valid reports whether the axes exist and no two turns in a row share one.
// The zero Sequence is not valid.
func (s Sequence) Valid() bool {
	a := s.Axes
	return a[0] <= Z && a[1] <= Z && a[2] <= Z && a[0] != a[1] && a[1] != a[2]
}

// Proper reports whether the first axis returns as the third (proper Euler
// angles, such as z-x-z).
func (s Sequence) Proper() bool { return s.Axes[0] == s.Axes[2] }

// Twin is the other description of the same turns: s with the numbers (a, b, c)
// is s.Twin() with (c, b, a). The twin of moving z-y-x is fixed x-y-z.
func (s Sequence) Twin() Sequence {
	return Sequence{[3]Axis{s.Axes[2], s.Axes[1], s.Axes[0]}, !s.Fixed}
}

// String prints, for moving and for fixed axes,
//
//	z-y'-x''   x-y-z
func (s Sequence) String() string {
	a, b, c := s.Axes[0].String(), s.Axes[1].String(), s.Axes[2].String()
	if s.Fixed {
		return a + "-" + b + "-" + c
	}
	return a + "-" + b + "'-" + c + "''"
}

// Words is String with the kind of axes spelled out, because z-y-x alone is
// written for both.
func (s Sequence) Words() string {
	if s.Fixed {
		return s.String() + " (fixed axes)"
	}
	return s.String() + " (moving axes)"
}

// A layout is a sequence brought to moving axes: turns about i, j, k.
type layout struct {
	i, j, k uint8 // axes
	m       uint8 // the axis that is neither i nor j; k, unless the first axis returns
	turned  bool  // fixed axes: the numbers stand in the opposite order
	proper  bool
	valid   bool
	e       float64 // +1 if i, j, m is an even permutation of x, y, z, else -1
}

// layouts are found by key, which is less work than to reason about axes anew in every conversion.
var layouts = func() (table [128]layout) {
	for _, s := range Sequences() {
		l := layout{i: uint8(s.Axes[0]), j: uint8(s.Axes[1]), k: uint8(s.Axes[2]), turned: s.Fixed, proper: s.Proper(), valid: true, e: -1}
		if s.Fixed {
			l.i, l.k = l.k, l.i
		}
		l.m = 3 - l.i - l.j
		if (l.i+1)%3 == l.j {
			l.e = 1
		}
		table[s.key()] = l
	}
	return table
}()

// key is below 128 and different for different sequences; 3 stands for an axis
// that does not exist.
func (s Sequence) key() uint8 {
	key := uint8(min(s.Axes[0], 3) | min(s.Axes[1], 3)<<2 | min(s.Axes[2], 3)<<4)
	if s.Fixed {
		key |= 64
	}
	return key
}
