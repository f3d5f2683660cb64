package columns

import (
	"regexp"
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// Rates are three columns of one angular rate.
type Rates struct {
	Columns [3]int      // x, y, z
	Unit    rules.Claim // of angle; Says is nil if nobody states it
}

var (
	speaksOfRate = regexp.MustCompile(`(?i)(angular_?vel|ang_?vel|angular_?rate|gyro|omega|(^|[^a-z])rates?([^a-z]|$))`)
	notRate      = regexp.MustCompile(`(?i)bias|cov|std|sigma|var|noise|temp|accel|quat`)
	axisAtEnd    = regexp.MustCompile(`(?i)([._ \[]?)([xyz])(\]?)\s*([\[(].*[\])])?$`)
	withUnit     = regexp.MustCompile(`(?i)([._ \[]?)([xyz])(\]?)[._ ]((rad|deg)[._ /p]*s|dps)$`)
	bare         = regexp.MustCompile(`(?i)^w[._]?([xyz])$`)
)

// FindRates finds three columns x, y, z whose common name speaks of an angular
// rate and not of a bias or a covariance, or that are called wx, wy, wz. It reports
// false for none, and for several groups, of which nothing says which belongs to
// the orientation.
func FindRates(columns []Column) (Rates, bool) {
	groups := map[string]*[3]int{}
	for i, c := range columns {
		stem, axis, ok := rateComponent(c.Text)
		if !ok {
			continue
		}
		if groups[stem] == nil {
			groups[stem] = &[3]int{-1, -1, -1}
		}
		groups[stem][axis] = i
	}
	var only Rates
	n := 0
	for _, g := range groups {
		if g[0] >= 0 && g[1] >= 0 && g[2] >= 0 {
			only.Columns = *g
			n++
		}
	}
	if n != 1 {
		return Rates{}, false
	}
	of := columns[only.Columns[0]]
	if u := rateUnit(of.Text + " " + of.Unit); u != convention.UnitUnstated {
		only.Unit = said(u, rules.Label, of)
	}
	return only, true
}

// rateComponent takes the name of a rate apart.
func rateComponent(name string) (stem string, axis int, ok bool) {
	name = strings.TrimSpace(name)
	if text, _ := cutUnit(name); bare.MatchString(text) {
		m := bare.FindStringSubmatch(text)
		return "w", axisOf(m[1]), true
	}
	if !speaksOfRate.MatchString(name) || notRate.MatchString(name) {
		return "", 0, false
	}
	for _, form := range []*regexp.Regexp{axisAtEnd, withUnit} {
		if m := form.FindStringSubmatchIndex(name); m != nil {
			return name[:m[0]], axisOf(name[m[4]:m[5]]), true
		}
	}
	return "", 0, false
}

func axisOf(letter string) int { return strings.Index("xyz", strings.ToLower(letter)) }

var (
	degreesPerSecond = regexp.MustCompile(`(?i)deg(rees?)?[\s_]*(/|per|_p?)?[\s_]*s|dps|°`)
	radiansPerSecond = regexp.MustCompile(`(?i)rad(ians?)?[\s_]*(/|per|_p?)?[\s_]*s`)
)

// rateUnit is the unit of angle that the name of a rate states.
func rateUnit(name string) convention.Unit {
	switch {
	case degreesPerSecond.MatchString(name):
		return convention.Degree
	case radiansPerSecond.MatchString(name):
		return convention.Radian
	}
	return convention.UnitUnstated
}
