package claims

import (
	"regexp"
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
)

// Comment is what a comment says of the numbers beside it. What it mentions
// twice in different ways it does not say.
type Comment struct {
	Text string // as written

	Form      convention.Form
	Not       bool // it says that this is no rotation
	Scalar    convention.ScalarPlace
	Unit      convention.Unit
	Storage   convention.Storage
	Product   convention.Product
	Hand      convention.Hand
	Range     convention.Range
	Direction convention.Direction
	Equation  bool          // Direction comes from an equation, not from "a to b"
	Roles     [3]angle.Role // roll pitch yaw
	Angular   bool          // it speaks of angles
	words     []string      // lower case
}

// IsCode reports whether a comment is a line of configuration that somebody
// switched off. Such a line says nothing of the one beside it.
func IsCode(comment string) bool { return switchedOff.MatchString(comment) }

var (
	switchedOff  = regexp.MustCompile(`^[-\s]*["']?[\w.-]+["']?\s*[:=]\s*(!!\S+\s*)?([\[{"'&*+-]|[0-9.]+\s*(#|$)|true|false)|^[-+\s0-9.,eE\[\]]+$`)
	commentWords = regexp.MustCompile(`[\p{L}\p{N}]+`)
	denial       = regexp.MustCompile(`(?i)\bnot (?:an? |necessarily )*(?:pure |proper |true )?(?:rotation|orthonormal|orthogonal|orientation|quaternion|attitude)|\bno (?:proper )?rotation matrix`)
	bracketUnit  = regexp.MustCompile(`(?i)[\[(]\s*(deg|degs|degrees?|rad|rads|radians?)\s*[\])]`)
	plainUnit    = regexp.MustCompile(`(?i)(?:\b|\d)(deg|degs|degrees?|rad|rads|radians?)\b(\s*/|\s+per\b|\^)?|°(\s*/|C)?`)
	equation     = regexp.MustCompile(`\b([vpx])_(\w+)\s*=\s*[A-Za-z]\w*(?:\s*\*\s*|\s+)([vpx])_(\w+)`)
	fromTo       = regexp.MustCompile(`(?i)\bfrom (?:the )?(\w+) (?:frame |axes |coordinates )?(?:in)?to (?:the )?(\w+)|(\w+)\s*(?:->|=>|→)\s*(\w+)|\b(\w+) to (\w+)\b`)
	arrowBack    = regexp.MustCompile(`(\w{2,})\s*(?:<-|←)\s*(\w{2,})`)
)

// ReadComment reads a comment.
func ReadComment(text string) *Comment {
	c := &Comment{Text: text, Not: denial.MatchString(text)}
	c.words = commentWords.FindAllString(strings.ToLower(text), -1)
	c.Scalar = one(c.words, scalarPhrases)
	c.Storage = one(c.words, storagePhrases)
	c.Product = one(c.words, productPhrases)
	c.Hand = one(c.words, handPhrases)
	c.Form = one(c.words, formPhrases)
	c.Unit = UnitIn(text)
	c.Roles, _ = rolesIn(c.words)
	c.Range = rangeIn(text, c.words)
	c.Angular = c.Roles[0] != angle.RoleNone || c.Form == convention.Angles || one(c.words, phrases[bool]{"angle": true, "angles": true})
	c.readDirection()
	return c
}

var formPhrases = phrases[convention.Form]{
	"quaternion": convention.Quaternion, "quat": convention.Quaternion,
	"rotation matrix": convention.Rotation, "dcm": convention.Rotation, "direction cosine": convention.Rotation, "direction cosines": convention.Rotation,
	"euler": convention.Angles, "euler angles": convention.Angles, "rpy": convention.Angles, "ypr": convention.Angles, "roll pitch yaw": convention.Angles, "yaw pitch roll": convention.Angles,
	"rotation vector": convention.RotationVector, "rotvec": convention.RotationVector, "rvec": convention.RotationVector, "rodrigues": convention.RotationVector,
	"axis angle": convention.AxisAngle, "axis angles": convention.AxisAngle, "angle axis": convention.AxisAngle,
}

// UnitIn reads the unit of angles in a text: one in brackets before others, and
// none where two are left. Rates and temperatures are not angles.
func UnitIn(text string) convention.Unit {
	var found convention.Unit
	var units []string
	if m := bracketUnit.FindAllStringSubmatch(text, -1); m != nil {
		for _, u := range m {
			units = append(units, u[1])
		}
	} else {
		for _, u := range plainUnit.FindAllStringSubmatch(text, -1) {
			if u[2] == "" && u[3] == "" {
				units = append(units, u[1])
			}
		}
	}
	for _, u := range units {
		unit := convention.Degree
		if strings.HasPrefix(strings.ToLower(u), "r") {
			unit = convention.Radian
		}
		if found != convention.UnitUnstated && found != unit {
			return convention.UnitUnstated
		}
		found = unit
	}
	return found
}

// readDirection reads an equation, or words such as "camera to body" if both are
// names of frames that are in use.
func (c *Comment) readDirection() {
	if all := equation.FindAllStringSubmatch(c.Text, -1); len(all) == 1 && all[0][1] == all[0][3] {
		c.Direction, c.Equation = convention.Direction{To: all[0][2], From: all[0][4]}, true
		return
	}
	if all := arrowBack.FindAllStringSubmatch(c.Text, -1); len(all) == 1 {
		c.Direction, c.Equation = convention.Direction{To: all[0][1], From: all[0][2]}, true
		return
	}
	var found convention.Direction
	for _, m := range fromTo.FindAllStringSubmatch(c.Text, -1) {
		for i := 1; i+1 < len(m); i += 2 {
			if !frameNames[strings.ToLower(m[i])] || !frameNames[strings.ToLower(m[i+1])] {
				continue
			}
			if found.Stated() {
				return
			}
			found = convention.Direction{To: m[i+1], From: m[i]}
		}
	}
	c.Direction = found
}

// frameNames are customary names of frames (common practice, no source). Only
// between these is "a to b" in running text taken for a direction.
var frameNames = func() map[string]bool {
	set := map[string]bool{}
	for _, w := range strings.Fields("cam camera body imu lidar laser velodyne radar world map odom base base_link sensor vehicle " +
		"inertial ecef eci ned enu frd flu gps gnss ins marker mocap tool flange hand eye robot head local global earth nav " +
		"reference platform gimbal antenna tracker startracker spacecraft aircraft optical cam0 cam1 camera0 camera1 left right") {
		set[w] = true
	}
	return set
}()
