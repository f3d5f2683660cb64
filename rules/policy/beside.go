package policy

import (
	"errors"
	"fmt"
	"regexp"
	"strings"

	"dextral/rules"
)

// Beside is a waiver that stands as a comment beside what it accepts. Its
// grammar is that of a [[waiver]] without place, written on one line:
//
//	# dextral:waive rule = "rotor-not-unit", until = 2031-03-31, because = "...", owner = "..."
//
// What follows dextral:waive is the inside of a TOML inline table.
type Beside struct {
	*rules.Waiver
	First, Last int // the lines that it speaks of
}

var (
	addressed = regexp.MustCompile(`^dextral:(\w+)`)
	spaced    = regexp.MustCompile(`^dextral:\s+waive\s+\w+\s*=`)
)

// Addresses reports whether a comment, without its marks, speaks to dextral.
// Such a comment claims nothing about the numbers beside it.
func Addresses(comment string) bool {
	return strings.HasPrefix(comment, "dextral:") && (addressed.MatchString(comment) || spaced.MatchString(comment))
}

// ParseBeside reads a comment that speaks to dextral. Its errors are of type
// Errors, at the place of the comment.
func ParseBeside(comment string, at rules.Place, known []string) (*Beside, error) {
	word := "waive"
	if m := addressed.FindStringSubmatch(comment); m != nil {
		word = m[1]
	}
	if word != "waive" {
		hint := ""
		if nearest(word, []string{"waive"}) != "" {
			hint = `; did you mean "dextral:waive"?`
		}
		return nil, Errors{{at, fmt.Sprintf("dextral:%s is not understood%s (the only such comment is dextral:waive)", word, hint)}}
	}
	_, inside, _ := strings.Cut(comment, "waive")
	b := &Beside{Waiver: &rules.Waiver{At: at}}
	err := parseText(at.Path, []byte("waive = {"+strings.Join(strings.Fields(inside), " ")+"}"), known, func(t *table) {
		vals, _ := t.vals["waive"].(map[string]any)
		w := &table{r: t.r, name: "dextral:waive", vals: vals, node: t.node.child("waive")}
		w.accepts(b.Waiver)
		w.close("rule", "until", "because", "owner")
	})
	var errs Errors
	if errors.As(err, &errs) {
		for _, e := range errs {
			e.Place = at // the text that was parsed stands nowhere
			e.Message = strings.Replace(e.Message, "is not TOML: ", `is not understood; write dextral:waive rule = "...", until = YYYY-MM-DD, because = "...", owner = "...": `, 1)
		}
		return nil, errs
	}
	return b, nil
}

// matches reports whether a finding stands on the lines that the comment speaks
// of.
func (b *Beside) matches(f *rules.Finding, lines func(*rules.Finding) (first, last int)) bool {
	if f.Rule != b.Rule || f.Place.Path != b.At.Path || f.Place.Line == 0 {
		return false
	}
	first, last := f.Place.Line, max(f.Place.Line, f.Place.EndLine)
	if lines != nil {
		first, last = lines(f)
	}
	return first <= b.Last && b.First <= last
}
