package message

import (
	"fmt"
	"slices"
	"strings"

	"dextral/rules"
)

// checker holds the lines of one message against the standard.
type checker struct {
	lines   *lines
	second  bool // the message says that it is of the second issue
	block   string
	opened  line
	last    int  // index in the block's order of the last keyword
	started bool // a keyword of the block, or a data line, has been seen
	found   []*rules.Finding
}

// orders are the keywords of the blocks of an APM in their order (table 3-3), those
// that dextral has to do with.
var orders = map[string][]string{
	"QUAT":   {"REF_FRAME_A", "REF_FRAME_B", "Q1", "Q2", "Q3", "QC", "Q1_DOT", "Q2_DOT", "Q3_DOT", "QC_DOT"},
	"EULER":  {"REF_FRAME_A", "REF_FRAME_B", "EULER_ROT_SEQ", "ANGLE_1", "ANGLE_2", "ANGLE_3", "ANGLE_1_DOT", "ANGLE_2_DOT", "ANGLE_3_DOT"},
	"ANGVEL": {"REF_FRAME_A", "REF_FRAME_B", "ANGVEL_FRAME", "ANGVEL_X", "ANGVEL_Y", "ANGVEL_Z"},
	"SPIN": {"REF_FRAME_A", "REF_FRAME_B", "SPIN_ALPHA", "SPIN_DELTA", "SPIN_ANGLE", "SPIN_ANGLE_VEL", "NUTATION", "NUTATION_PER",
		"NUTATION_PHASE", "MOMENTUM_ALPHA", "MOMENTUM_DELTA", "NUTATION_VEL"},
	"INERTIA": {"INERTIA_REF_FRAME", "IXX", "IYY", "IZZ", "IXY", "IXZ", "IYZ"},
	"MAN":     {"MAN_EPOCH_START", "MAN_DURATION", "MAN_REF_FRAME", "MAN_TOR_X", "MAN_TOR_Y", "MAN_TOR_Z", "MAN_DELTA_MASS"},
}

// units are the texts that may stand in brackets (table 3-3); keywords without a unit
// are not listed.
var units = map[string]string{
	"Q1_DOT": "1/s", "Q2_DOT": "1/s", "Q3_DOT": "1/s", "QC_DOT": "1/s", "ANGLE_1": "deg", "ANGLE_2": "deg", "ANGLE_3": "deg",
	"ANGLE_1_DOT": "deg/s", "ANGLE_2_DOT": "deg/s", "ANGLE_3_DOT": "deg/s", "ANGVEL_X": "deg/s", "ANGVEL_Y": "deg/s", "ANGVEL_Z": "deg/s",
	"SPIN_ALPHA": "deg", "SPIN_DELTA": "deg", "SPIN_ANGLE": "deg", "SPIN_ANGLE_VEL": "deg/s",
}

// removed are keywords of the first issue, with what the second has instead (annex J).
var removed = map[string]string{
	"Q_DIR": "the direction is always from A to B", "EULER_DIR": "the direction is always from A to B", "SPIN_DIR": "the direction is always from A to B",
	"ATTITUDE_DIR": "the direction is always from A to B", "QUATERNION_TYPE": "the scalar QC always stands last",
	"Q_FRAME_A": "the keyword is REF_FRAME_A", "Q_FRAME_B": "the keyword is REF_FRAME_B", "EULER_FRAME_A": "the keyword is REF_FRAME_A",
	"EULER_FRAME_B": "the keyword is REF_FRAME_B", "SPIN_FRAME_A": "the keyword is REF_FRAME_A", "SPIN_FRAME_B": "the keyword is REF_FRAME_B",
	"X_ANGLE": "the keywords are ANGLE_1, ANGLE_2, ANGLE_3 in the order of the turns", "Y_ANGLE": "the keywords are ANGLE_1, ANGLE_2, ANGLE_3 in the order of the turns",
	"Z_ANGLE": "the keywords are ANGLE_1, ANGLE_2, ANGLE_3 in the order of the turns", "RATE_FRAME": "rates are ANGVEL blocks with ANGVEL_FRAME",
}

func (c *checker) report(level rules.Level, n line, key, message string, args ...any) {
	c.found = append(c.found, &rules.Finding{Rule: rules.MessageMalformed, Level: level, Place: c.lines.place(n), Key: key,
		Message: fmt.Sprintf(message, args...), Claim: "CCSDS 504.0-B-2, by format specification"})
}

// version reads the first keyword of a message.
func (c *checker) version(n line) { c.second = strings.HasPrefix(n.value, "2") }

// keyword holds a keyword of a second-issue message against the standard.
func (c *checker) keyword(n line) {
	if !c.second {
		return
	}
	if instead, ok := removed[n.key]; ok {
		c.report(rules.Error, n, n.key, "%s is a keyword of the first issue, which a message of version 2 may not use; in the second, %s", n.key, instead)
	}
	if want, ok := units[n.key]; ok && n.unit != "" && n.unit != want {
		c.report(rules.Error, n, n.key, "%s is in %s by the standard, and its unit text says %s", n.key, want, n.unit)
	}
	if n.key == "EULER_ROT_SEQ" && strings.Trim(n.value, "123") == "" {
		c.report(rules.Error, n, n.key, "EULER_ROT_SEQ is %s, the spelling of the first issue; the second writes letters, such as ZYX", n.value)
	}
	if n.key == "MAN_DELTA_MASS" && n.value != "" && !strings.HasPrefix(n.value, "-") && strings.Trim(n.value, "0.") != "" {
		c.report(rules.Warning, n, n.key, "MAN_DELTA_MASS is %s; a manoeuvre cannot add mass: the value is negative or zero", n.value)
	}
	order := orders[c.block]
	if at := slices.Index(order, n.key); at >= 0 {
		if at < c.last {
			c.report(rules.Error, n, n.key, "%s stands behind %s; the order of the keywords is fixed, and a reader that goes by it takes one for the other", n.key, order[c.last])
		}
		c.last = at // so that a block that is written in another order is reported once
	}
	c.started = true
}

// boundary follows the blocks of an APM.
func (c *checker) boundary(n line, word string) {
	name, start := strings.CutSuffix(word, "_START")
	if _, known := orders[name]; start && known {
		c.unclosed()
		c.block, c.opened, c.last, c.started = name, n, 0, false
		return
	}
	if name, stop := strings.CutSuffix(word, "_STOP"); stop && name == c.block {
		c.block = ""
	}
}

// unclosed reports a block that ends without its STOP.
func (c *checker) unclosed() {
	if c.block != "" && c.second {
		c.report(rules.Error, c.opened, c.block+"_START", "%s_START has no %s_STOP", c.block, c.block)
	}
	c.block = ""
}

// comment holds the place of a comment against the standard: at the beginning of a
// block only (6.10).
func (c *checker) comment(n line) {
	if c.second && c.block != "" && c.started {
		c.report(rules.Warning, n, c.block, "a comment stands among the keywords of %s_START; the standard allows it at the beginning of the block only", c.block)
	}
}
