package literal

import (
	"go/ast"
	"go/token"
	"strings"

	"dextral/analyzers/claims"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// span is a stretch of the package's text; empty where there is none.
type span struct{ from, to token.Pos }

// remark is a comment that speaks about a value.
type remark struct {
	comment *claims.Comment
	at      span
	onType  bool // it stands on the declaration of the value's type
}

// text is what is quoted of a comment.
func (r remark) text() string {
	const most = 100
	runes := []rune(r.comment.Text)
	if len(runes) <= most {
		return r.comment.Text
	}
	return string(runes[:most]) + "..."
}

// remarks reads the comments of a site.
func (w *walker) remarks(s site) []remark {
	var list []remark
	for _, g := range s.comments {
		list = w.remark(list, g, false)
	}
	for _, g := range s.onType {
		list = w.remark(list, g, true)
	}
	return list
}

// remark reads a comment, once for each file. Lines of code that somebody
// switched off say nothing.
func (w *walker) remark(list []remark, g *ast.CommentGroup, onType bool) []remark {
	c, known := w.comments[g]
	if !known {
		text := strings.Join(strings.Fields(g.Text()), " ")
		if text != "" && !claims.IsCode(text) {
			c = claims.ReadComment(text)
		}
		w.comments[g] = c
	}
	if c == nil {
		return list
	}
	return append(list, remark{c, span{g.Pos(), g.End()}, onType})
}

// terms adds what names and comments say about how a value is to be read.
func (w *walker) terms(s speech, v *rules.Value) {
	for _, l := range s.labels {
		if n := l.name; n.Scalar != 0 && v.Form == convention.Quaternion && !s.ordered {
			w.claim(v, n.Scalar, rules.Label, l.text, l.at)
		}
		w.fromName(l, v)
	}
	named := len(v.Claims) > 0 && v.Claims[0].Text == "named components"
	for _, r := range s.remarks {
		if c := r.comment; c.Scalar != 0 && v.Form == convention.Quaternion && !s.ordered && !(named && r.onType) {
			w.claim(v, c.Scalar, rules.Comment, r.text(), r.at)
		}
		w.fromComment(r, v)
	}
	w.sequence(s, v)
}

// claim adds one claim to a value.
func (w *walker) claim(v *rules.Value, says convention.Term, source rules.Source, text string, at span) {
	place := v.Place
	if at.from.IsValid() {
		place = w.place(at.from, at.to)
	}
	v.Claims = append(v.Claims, rules.Claim{Says: says, Source: source, Text: text, Place: place})
}

// measures reports whether a value has numbers with a unit of angles.
func measures(f convention.Form) bool {
	return f == convention.Angles || f == convention.RotationVector || f == convention.AxisAngle
}

func isMatrix(f convention.Form) bool { return f == convention.Rotation || f == convention.Transform }

func (w *walker) fromName(l label, v *rules.Value) {
	n := l.name
	if n.Product != 0 && v.Form == convention.Quaternion {
		w.claim(v, n.Product, rules.Label, l.text, l.at)
	}
	if n.Unit != 0 && measures(v.Form) {
		w.claim(v, n.Unit, rules.Label, l.text, l.at)
	}
	if n.Storage != 0 && isMatrix(v.Form) {
		w.claim(v, n.Storage, rules.Label, l.text, l.at)
	}
	if n.Hand != 0 && v.Form == convention.Triad {
		w.claim(v, n.Hand, rules.Label, l.text, l.at)
	}
	if n.Direction.Stated() && l.kind == ofValue {
		w.claim(v, n.Direction, rules.Name, l.text, l.at)
	}
	if v.Form == convention.Angles && v.Roles == [3]angle.Role{} {
		v.Roles = n.Roles
	}
}

// fromComment adds what a comment says. Two frames in running text ("camera to
// body") are as weak as in a name; an equation is not.
func (w *walker) fromComment(r remark, v *rules.Value) {
	c := r.comment
	if c.Product != 0 && v.Form == convention.Quaternion {
		w.claim(v, c.Product, rules.Comment, r.text(), r.at)
	}
	if c.Unit != 0 && measures(v.Form) {
		w.claim(v, c.Unit, rules.Comment, r.text(), r.at)
	}
	if c.Storage != 0 && isMatrix(v.Form) {
		w.claim(v, c.Storage, rules.Comment, r.text(), r.at)
	}
	if c.Hand != 0 && v.Form == convention.Triad {
		w.claim(v, c.Hand, rules.Comment, r.text(), r.at)
	}
	if c.Direction.Stated() && !r.onType {
		source := rules.Name
		if c.Equation {
			source = rules.Comment
		}
		w.claim(v, c.Direction, source, r.text(), r.at)
	}
	if v.Form == convention.Angles && v.Roles == [3]angle.Role{} {
		v.Roles = c.Roles
	}
}

// sequence adds what is said about the order of turns: by a comment, by a name,
// or by the custom of roll, pitch and yaw.
func (w *walker) sequence(s speech, v *rules.Value) {
	if v.Form != convention.Angles {
		return
	}
	said := false
	for _, r := range s.remarks {
		if label, ok := claims.SequenceIn(r.comment.Text, v.Roles); ok {
			w.claim(v, label, rules.Comment, r.text(), r.at)
			said = true
		}
	}
	for _, l := range s.labels {
		if l.name.Sequence == "" {
			continue
		}
		if label, err := angle.ParseLabel(l.name.Sequence, v.Roles); err == nil {
			w.claim(v, label, rules.Label, l.text, l.at)
			said = true
		}
	}
	if said {
		return
	}
	if label, err := angle.Customary(v.Roles); err == nil {
		w.claim(v, label, rules.Label, label.Text, span{})
	}
}
