package policy

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"github.com/BurntSushi/toml"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/rules"
)

// reader collects the errors of one file while its tables are read.
type reader struct {
	lines *lines
	known []string // rule names
	errs  Errors
}

func (r *reader) fail(at rules.Place, format string, args ...any) {
	r.errs = append(r.errs, &Error{at, fmt.Sprintf(format, args...)})
}

// syntax is the TOML library's error at our kind of place. Its byte offset is
// used, because its columns count bytes.
func (r *reader) syntax(err error) *Error {
	var parse toml.ParseError
	if !errors.As(err, &parse) {
		return &Error{rules.Place{Path: r.lines.path}, "is not TOML: " + err.Error()}
	}
	start := max(0, min(parse.Position.Start, len(r.lines.text)))
	end := max(start+1, min(start+parse.Position.Len, len(r.lines.text)))
	return &Error{r.lines.at(span{start, end}), "is not TOML: " + parse.Message}
}

// read reads the whole sheet.
func (p *Policy) read(t *table) {
	if g, ok := t.word("gate", gateNames...); ok {
		p.Gate, _ = ParseGate(g)
	}
	p.exclude = t.globs("exclude")
	p.files = t.waiverFiles()
	if d := t.one("defaults"); d != nil {
		p.defaults = d.conventions()
		d.close()
	}
	for _, c := range t.many("claim") {
		p.claims = append(p.claims, c.claim())
	}
	p.frames = map[string]Frame{}
	for _, f := range t.many("frame") {
		f.frame(p.frames)
	}
	for _, g := range t.many("rig") {
		p.rigs = append(p.rigs, g.rig(p.rigs))
	}
	p.accept(t)
	t.close()
}

// globs reads a path glob or an array of them.
func (t *table) globs(key string) []glob {
	var all []glob
	for _, s := range t.texts(key) {
		g, err := parseGlob(s.text)
		if err != nil {
			t.r.fail(s.at, "%s%s: %q %v", key, t.within(), s.text, err)
			continue
		}
		all = append(all, g)
	}
	return all
}

// word reads one of a few words.
func (t *table) word(key string, allowed ...string) (string, bool) {
	s, ok := t.text(key)
	if !ok || slices.Contains(allowed, s) {
		return s, ok
	}
	hint := ""
	if near := nearest(s, allowed); near != "" {
		hint = fmt.Sprintf("; did you mean %q?", near)
	}
	t.r.fail(t.valueAt(key), "%s%s cannot be %q%s (allowed: %s)", key, t.within(), s, hint, strings.Join(allowed, ", "))
	return "", false
}

// choices are the conventions that are one word of a few, by key.
var choices = []struct {
	key   string
	words []string
	terms []convention.Term
}{
	{"scalar", []string{"first", "last"}, []convention.Term{convention.ScalarFirst, convention.ScalarLast}},
	{"product", []string{"hamilton", "shuster"}, []convention.Term{convention.Hamilton, convention.Shuster}},
	{"storage", []string{"row", "column"}, []convention.Term{convention.RowMajor, convention.ColumnMajor}},
	{"unit", []string{"deg", "rad"}, []convention.Term{convention.Degree, convention.Radian}},
}

// forms are the words for what a group of numbers is.
var forms = []struct {
	word string
	form convention.Form
}{
	{"quaternion", convention.Quaternion}, {"rotation", convention.Rotation}, {"transform", convention.Transform},
	{"angles", convention.Angles}, {"rotation-vector", convention.RotationVector}, {"axis-angle", convention.AxisAngle},
	{"axis", convention.Axis}, {"triad", convention.Triad}, {"axis-map", convention.AxisMap}, {"matrix", convention.Matrix},
}

// conventions reads what [defaults] and [[claim]] have in common.
func (t *table) conventions() rules.Claims {
	var said rules.Claims
	for _, c := range choices {
		if word, ok := t.word(c.key, c.words...); ok {
			said = append(said, t.declares(c.key, c.terms[slices.Index(c.words, word)]))
		}
	}
	if s, ok := t.text("sequence"); ok {
		label, err := angle.ParseLabel(s, [3]angle.Role{})
		if err != nil {
			t.r.fail(t.valueAt("sequence"), "sequence%s: %v", t.within(), err)
		} else {
			said = append(said, t.declares("sequence", label))
		}
	}
	return said
}

// declares makes a claim of a key of this table.
func (t *table) declares(key string, says convention.Term) rules.Claim {
	return rules.Claim{Says: says, Source: rules.Declaration, Text: t.source(key), Place: t.pairAt(key)}
}

// claim reads a [[claim]].
func (t *table) claim() claim {
	c := claim{files: t.globs("files")}
	for _, s := range t.texts("keys") {
		k, err := parseKeyPattern(s.text)
		if err != nil {
			t.r.fail(s.at, "keys%s: %q %v", t.within(), s.text, err)
		}
		c.keys = append(c.keys, k)
	}
	c.said = t.conventions()
	if s, ok := t.text("direction"); ok {
		if captured.MatchString(s) {
			t.template(&c, s)
		} else if d, ok := convention.ParseDirection(s); ok {
			c.said = append(c.said, t.declares("direction", d))
		} else {
			t.r.fail(t.valueAt("direction"), `direction%s must be an equation of coordinates such as "v_body = R v_cam", not %q`, t.within(), s)
		}
	}
	t.form(&c)
	if low, high, ok := t.interval("range_deg"); ok {
		c.said = append(c.said, t.declares("range_deg", convention.Range{Low: low * math.Pi / 180, High: high * math.Pi / 180}))
	}
	if u, ok := t.number("uncertainty_deg"); ok {
		if !(u > 0 && u <= 180) {
			t.r.fail(t.valueAt("uncertainty_deg"), "uncertainty_deg%s must be above 0 and at most 180 degrees", t.within())
		}
		c.uncertainty = u * math.Pi / 180
	}
	if u, ok := t.number("uncertainty_length"); ok {
		if !(u > 0) || math.IsInf(u, 1) {
			t.r.fail(t.valueAt("uncertainty_length"), "uncertainty_length%s must be above 0, in the unit of the file", t.within())
		}
		c.offset = u
	}
	c.double, c.saysDouble = t.truth("double")
	if declared := []string{"files", "keys"}; !slices.ContainsFunc(t.keys, func(k string) bool {
		_, there := t.vals[k]
		return there && !slices.Contains(declared, k)
	}) {
		t.r.fail(t.at(), "[[claim]] says nothing about its values; add one of %s", strings.Join(t.keys[len(declared):], ", "))
	}
	t.close("files")
	return c
}

// template reads a direction with names that every key pattern of the claim
// captures.
func (t *table) template(c *claim, s string) {
	for _, m := range captured.FindAllStringSubmatch(s, -1) {
		if len(c.keys) == 0 || slices.ContainsFunc(c.keys, func(k keyPattern) bool { return !slices.Contains(k.names, m[1]) }) {
			t.r.fail(t.valueAt("direction"), `direction%s uses {%s}, which keys must capture, such as keys = "T_{to}_{from}"`, t.within(), m[1])
			return
		}
	}
	if _, ok := convention.ParseDirection(captured.ReplaceAllString(s, "x$1")); !ok {
		t.r.fail(t.valueAt("direction"), `direction%s must be an equation of coordinates such as "v_{to} = R v_{from}", not %q`, t.within(), s)
		return
	}
	d := t.declares("direction", nil)
	d.Text = s
	c.direction = &d
}

// Frame is a frame whose axes are declared.
type Frame struct {
	Triad frame.Triad
	Place rules.Place
}

// frame reads a [[frame]].
func (t *table) frame(all map[string]Frame) {
	name, named := t.text("name")
	axes, stated := t.text("axes")
	t.close("name", "axes")
	if !named || !stated {
		return
	}
	if _, twice := all[name]; twice {
		t.r.fail(t.valueAt("name"), "a frame named %q stands above already", name)
		return
	}
	triad, err := frame.ParseTriad(axes)
	if err == nil && triad.Hand != convention.HandUnstated && triad.Hand != triad.Handedness() {
		err = fmt.Errorf("%q are %s axes", axes, triad.Handedness())
	}
	if err != nil {
		t.r.fail(t.valueAt("axes"), `axes%s: %v; write a code such as "FLU", or words such as "forward left up"`, t.within(), err)
		return
	}
	all[name] = Frame{triad, t.at()}
}

// form reads what the numbers are: form, or rotation = false.
func (t *table) form(c *claim) {
	var words []string
	for _, f := range forms {
		words = append(words, f.word)
	}
	word, isForm := t.word("form", words...)
	if isForm {
		c.form = forms[slices.Index(words, word)].form
		c.said = append(c.said, t.declares("form", c.form))
	}
	is, isRotation := t.truth("rotation")
	switch {
	case isRotation && is:
		t.r.fail(t.valueAt("rotation"), `rotation%s can only be false; to claim a rotation write form = "rotation"`, t.within())
	case isRotation && isForm:
		t.r.fail(t.keyAt("rotation"), "rotation%s stands beside form; keep one of them", t.within())
	case isRotation:
		c.form = convention.Matrix
		c.said = append(c.said, t.declares("rotation", c.form))
	}
}

// rig reads a [[rig]].
func (t *table) rig(others []rig) rig {
	var g rig
	g.name, _ = t.text("name")
	if g.name != "" && slices.ContainsFunc(others, func(o rig) bool { return o.name == g.name }) {
		t.r.fail(t.valueAt("name"), "a rig named %q stands above already; put all its files there", g.name)
	}
	g.files = t.globs("files")
	t.close("name", "files")
	return g
}
