// Package columns finds orientation channels among the names of a log's columns.
//
// A recorder gives every component of an orientation a column of its own, so a
// channel is a group of columns whose names are equal but for the component:
// q_RS_w, q_RS_x, q_RS_y, q_RS_z are the group q_RS, and gt_roll, gt_pitch,
// gt_yaw another. What differs names the component, what is equal names the
// channel, and words in the equal part say what kind of thing it is.
//
// Names are claims of different strength. A word such as quaternion or a unit
// in brackets states something (rules.Label); a customary short name such as q,
// R or q0..q3 is custom (rules.Name). Custom is also what robot joints (q0..q5)
// and noise matrices (R00..R22) go by, so channels that rest on custom alone are
// marked Doubtful, to be believed only if the numbers look the part. Words such
// as rate, covariance and bias say that a column is about an orientation
// without being one; such columns are left out.
//
// A group in which something is missing or contradictory is not dropped but
// returned as undecided, with the reason.
package columns

import (
	"cmp"
	"slices"

	"dextral/core/convention"
	"dextral/rules"
)

// Column is a column of a log as its header has it.
type Column struct {
	Text  string      // as written, without quotes and outer blanks
	Unit  string      // from a separate row of units; "" if there is none
	Place rules.Place // where Text stands
}

// Channel is a group of columns that state one orientation.
//
// Value has form, key, places, roles and claims, and no numbers yet. Its Why
// is not empty where the group is undecided.
type Channel struct {
	Value    rules.Value
	Columns  []int  // indices of the columns in the order of Value.Numbers
	Stem     string // what is left of the name without the words for component and kind: channels with equal stems state the same orientation
	Doubtful bool   // named by custom that other things go by as well

	numbered bool
}

// Time is the column of time stamps.
type Time struct {
	Column int
	Fine   int    // column of the fraction, if stamps stand in two columns; else -1
	Per    int64  // Fine counts in 1/Per of Unit
	Unit   string // s, ms, us, ns; "" if the name does not say
}

// Found is what the names say.
type Found struct {
	Channels  []Channel // in the order of their first columns
	Undecided []Channel
	Time      *Time // nil if no name says time
}

// Find reads the names of all columns of a log.
func Find(columns []Column) Found {
	names := make([]name, len(columns))
	for i, c := range columns {
		names[i] = parseName(c)
	}
	var all []Channel
	for _, g := range newGroups(names) {
		all = append(all, g.channels(columns)...)
	}
	f := Found{Time: findTime(names)}
	for _, c := range withoutOverlap(all) {
		if c.Value.Why != "" {
			f.Undecided = append(f.Undecided, c)
		} else {
			f.Channels = append(f.Channels, c)
		}
	}
	return f
}

// withoutOverlap keeps of channels that share columns the one that rests on
// the stronger words: named components before numbered ones (the w of four
// quaternions q_w_0..q_w_3 are no quaternion), decided before undecided. What
// it keeps is in the order of first columns.
func withoutOverlap(all []Channel) []Channel {
	slices.SortStableFunc(all, func(a, b Channel) int { return cmp.Compare(a.rank(), b.rank()) })
	taken := map[int]bool{}
	all = slices.DeleteFunc(all, func(c Channel) bool {
		if slices.ContainsFunc(c.Columns, func(i int) bool { return taken[i] }) {
			return true
		}
		for _, i := range c.Columns {
			taken[i] = true
		}
		return false
	})
	slices.SortStableFunc(all, func(a, b Channel) int { return cmp.Compare(slices.Min(a.Columns), slices.Min(b.Columns)) })
	return all
}

// rank is low where the words are strong.
func (c *Channel) rank() int {
	rank := 0
	if c.Value.Why != "" {
		rank += 4
	}
	if c.Doubtful {
		rank += 2
	}
	if c.numbered {
		rank++
	}
	return rank
}

// said makes a claim of a name.
func said(says convention.Term, by rules.Source, c Column) rules.Claim {
	return rules.Claim{Says: says, Source: by, Text: c.Text, Place: c.Place}
}
