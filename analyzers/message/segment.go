package message

import (
	"fmt"
	"slices"
	"strings"
	"time"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// segment is one segment of an ephemeris: what its metadata say of its lines.
type segment struct {
	meta   map[string]string
	index  int
	extra  int            // numbers of a line behind the attitude, of a comprehensive message
	second bool           // of the second issue
	epochs map[int]string // of the first lines, by number
}

// kind is what a line of an ATTITUDE_TYPE holds behind its epoch (table 4-4; the RATE
// types are of the first issue).
type kind struct {
	form    convention.Form
	columns string // names for package series; u1 and so on mean nothing to it
}

var kinds = map[string]kind{
	"QUATERNION":             {convention.Quaternion, "qx qy qz qw"},
	"QUATERNION/DERIVATIVE":  {convention.Quaternion, "qx qy qz qw u1 u2 u3 u4"},
	"QUATERNION/ANGVEL":      {convention.Quaternion, "qx qy qz qw u1 u2 u3"},
	"QUATERNION/RATE":        {convention.Quaternion, "qx qy qz qw u1 u2 u3"},
	"EULER_ANGLE":            {convention.Angles, "roll pitch yaw"},
	"EULER_ANGLE/DERIVATIVE": {convention.Angles, "roll pitch yaw u1 u2 u3"},
	"EULER_ANGLE/ANGVEL":     {convention.Angles, "roll pitch yaw u1 u2 u3"},
	"EULER_ANGLE/RATE":       {convention.Angles, "roll pitch yaw u1 u2 u3"},
	"EULER_ANGLES":           {convention.Angles, "roll pitch yaw"},                        // of a comprehensive message
	"DCM":                    {convention.Rotation, "r11 r21 r31 r12 r22 r32 r13 r23 r33"}, // the same; column by column (annex B4)
	"SPIN":                   {convention.NoForm, "u1 u2 u3 u4"},
	"SPIN/NUTATION":          {convention.NoForm, "u1 u2 u3 u4 u5 u6 u7"},
	"SPIN/NUTATION_MOM":      {convention.NoForm, "u1 u2 u3 u4 u5 u6 u7"},
}

// kind is that of the segment; false if the type is not in the standard.
func (s *segment) kind() (kind, bool) {
	k, ok := kinds[strings.ReplaceAll(s.meta["ATTITUDE_TYPE"], " ", "_")]
	if s.meta["QUATERNION_TYPE"] == "FIRST" && !s.second {
		k.columns = strings.Replace(k.columns, "qx qy qz qw", "qw qx qy qz", 1)
	}
	for i := range s.extra {
		k.columns += fmt.Sprintf(" u%d", i+1)
	}
	return k, ok
}

// frames are the two frames in the order in which the segment leads from one to the
// other.
func (s *segment) frames() (from, to string) {
	from, to = s.meta["REF_FRAME_A"], s.meta["REF_FRAME_B"]
	if !s.second && s.meta["ATTITUDE_DIR"] == "B2A" {
		from, to = to, from
	}
	return from, to
}

// describe replaces what package series makes of the column names by what the
// standard says.
func (s *segment) describe(v *rules.Value, at rules.Place) {
	k, _ := s.kind()
	title := "CCSDS 504.0-B, " + s.meta["ATTITUDE_TYPE"]
	v.Form, v.Why, v.KeyAt = k.form, "", at
	v.Key = fmt.Sprintf("segment[%d].%s", s.index, s.meta["ATTITUDE_TYPE"])
	says := []convention.Term{k.form}
	switch k.form {
	case convention.Quaternion:
		v.Claims = rules.Claims{{Says: convention.ScalarFirst, Source: rules.Format, Text: "components Q1, Q2, Q3, QC", Place: at}} // Numbers come as w, x, y, z
	case convention.Rotation:
		v.Claims = nil
	default:
		v.Claims = nil
		v.Roles = [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}
		says = append(says, convention.Degree)
		label, err := angle.ParseLabel("intrinsic "+s.meta["EULER_ROT_SEQ"], v.Roles)
		if err != nil {
			v.Why = fmt.Sprintf("EULER_ROT_SEQ %q names no sequence", s.meta["EULER_ROT_SEQ"])
		} else {
			says = append(says, label)
		}
	}
	from, to := s.frames()
	switch {
	case !s.second || from == "" || to == "":
	case k.form == convention.Rotation: // M_BA: X_B = M_BA X_A
		says = append(says, convention.Direction{To: to, From: from})
	default:
		says = append(says, convention.Direction{To: from, From: to})
	}
	for _, t := range says {
		v.Claims = append(v.Claims, rules.Claim{Says: t, Source: rules.Format, Text: title, Place: at})
	}
}

// firstLines is how many lines of a segment are remembered: package series takes the
// first complete one of them as an example.
const firstLines = 64

// note remembers the epoch of a line.
func (s *segment) note(number int, epoch string) {
	if s.epochs == nil {
		s.epochs = map[int]string{}
	}
	if len(s.epochs) < firstLines {
		s.epochs[number] = epoch
	}
}

// twin is the first state of a segment as a value of its own: segments that hold
// between the same frames at the same epoch state one orientation.
func (s *segment) twin(v *rules.Value) *rules.Value {
	t := *v
	t.Claims, t.Numbers = slices.Clone(v.Claims), slices.Clone(v.Numbers)
	from, to := s.frames()
	if len(t.Numbers) == 0 {
		return &t
	}
	t.Place = t.Numbers[0].Place.To(t.Numbers[len(t.Numbers)-1].Place)
	if at := s.epochs[t.Place.Line]; t.Why == "" && from != "" && to != "" && at != "" {
		t.Of, t.Moment = s.meta["OBJECT_ID"]+" "+from+"_to_"+to+" at "+at, at
	}
	return &t
}

// epoch reads a date of the standard (6.8.9); leap seconds have none here.
func epoch(text string) (time.Time, bool) {
	text = strings.TrimSuffix(text, "Z")
	for _, layout := range []string{"2006-01-02T15:04:05", "2006-002T15:04:05"} {
		if t, err := time.Parse(layout, text); err == nil {
			return t, true
		}
	}
	return time.Time{}, false
}

// outside says of an epoch that it lies outside of the span of the segment.
func (s *segment) outside(text string) string {
	t, ok := epoch(text)
	if !ok {
		return ""
	}
	if start, ok := epoch(s.meta["START_TIME"]); ok && t.Before(start) {
		return "before START_TIME " + s.meta["START_TIME"]
	}
	if stop, ok := epoch(s.meta["STOP_TIME"]); ok && t.After(stop) {
		return "after STOP_TIME " + s.meta["STOP_TIME"]
	}
	return ""
}
