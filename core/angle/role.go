package angle

import "fmt"

// Role is what one of the three numbers is called where numbers have names.
type Role uint8

// The roles. Roll, pitch and yaw are turns about x, y and z; first, second and
// third count the turns.
const (
	RoleNone Role = iota
	RoleRoll
	RolePitch
	RoleYaw
	RoleX
	RoleY
	RoleZ
	RoleFirst
	RoleSecond
	RoleThird
)

var roleNames = [...]string{"", "roll", "pitch", "yaw", "x", "y", "z", "first", "second", "third"}

// String is the name.
func (r Role) String() string {
	if int(r) >= len(roleNames) {
		return "?"
	}
	return roleNames[r]
}

// Axis is the axis that the role names, if it names one.
func (r Role) Axis() (Axis, bool) {
	if r < RoleRoll || r > RoleZ {
		return 0, false
	}
	return Axis((r - RoleRoll) % 3), true
}

// places says where each number belongs.
type places struct {
	kind  placing
	index [3]int // the number for axis x, y, z, or for turn 1, 2, 3
}

type placing uint8

const (
	unnamed placing = iota
	byAxis
	byTurn
)

// placesOf reads the roles of three numbers: all unnamed, or three different
// axes, or three different turns.
func placesOf(roles [3]Role) (places, error) {
	p := places{}
	var seen [3]bool
	for number, role := range roles {
		kind, at := unnamed, 0
		if axis, ok := role.Axis(); ok {
			kind, at = byAxis, int(axis)
		} else if role >= RoleFirst && role <= RoleThird {
			kind, at = byTurn, int(role-RoleFirst)
		} else if role != RoleNone {
			return p, fmt.Errorf("%w: unknown role %d", ErrRoles, role)
		}
		if number > 0 && kind != p.kind || kind != unnamed && seen[at] {
			return p, fmt.Errorf("%w: %s, %s, %s; name three different axes or three turns", ErrRoles,
				called(roles[0]), called(roles[1]), called(roles[2]))
		}
		p.kind, seen[at], p.index[at] = kind, true, number
	}
	return p, nil
}

func called(r Role) string {
	if r == RoleNone {
		return "(no name)"
	}
	return r.String()
}
