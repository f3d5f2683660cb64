package columns

import "strings"

// timeWords name stamps, by rank: the most telling first.
var timeWords = []map[string]bool{
	set("time timestamp timestamps stamp stamps ts t"),
	set("sec secs seconds elapsed clock epoch utc datetime"),
	set("tow itow gpstime systime ert scet"), // the last two are of spacecraft: earth received time, spacecraft event time
}

// notStamps are words beside which the others mean something else.
var notStamps = set("valid since delta diff dt offset delay duration step zone load exec cpu uptime remaining constant period of week" +
	" matrix pose tf")

// findTime chooses the column of time stamps: the most telling name, of equals
// the leftmost. Stamps in two columns, seconds and a fraction in whole
// nanoseconds or the like, are joined.
func findTime(names []name) *Time {
	best, rank := -1, len(timeWords)
	for i, n := range names {
		if r := timeRank(n); r < rank {
			best, rank = i, r
		}
	}
	if best < 0 {
		return nil
	}
	t := &Time{Column: best, Fine: -1, Unit: timeUnit(names[best])}
	if fine, per := fraction(names, best); fine >= 0 {
		t.Fine, t.Per, t.Unit = fine, per, "s"
	}
	return t
}

func timeRank(n name) int {
	if n.has(notStamps) || len(n.words) == 0 {
		return len(timeWords)
	}
	if u := timeUnit(n); n.unit != "" && u == "" && n.unit != "1" {
		return len(timeWords) // it has a unit, and not one of time
	}
	for r, words := range timeWords {
		for i, w := range n.words {
			// A lone t is time only as the whole name: t_x is a translation.
			if words[w.text] && (w.text != "t" || n.aloneButUnit()) && (i == len(n.words)-1 || r == 0) {
				return r
			}
		}
	}
	return len(timeWords)
}

// aloneButUnit reports whether a name is one word, or one and a unit: t, t_s.
func (n name) aloneButUnit() bool {
	return len(n.words) == 1 || len(n.words) == 2 && n.unit == "" && timeUnit(n) != ""
}

// timeUnit is the unit of time that a name gives, in brackets or as a word.
func timeUnit(n name) string {
	switch n.unit {
	case "s", "ms", "us", "ns":
		return n.unit
	case "":
	default:
		return ""
	}
	if len(n.words) == 0 {
		return ""
	}
	switch u := normalUnit(n.words[len(n.words)-1].text); u {
	case "s", "ms", "us", "ns":
		return u
	}
	return ""
}

// fraction finds the column that continues one of whole seconds: its name is
// the same but for nsec, usec or the like in the place of sec.
func fraction(names []name, seconds int) (column int, per int64) {
	n := names[seconds]
	if len(n.words) == 0 {
		return -1, 0
	}
	last := n.words[len(n.words)-1]
	if normalUnit(last.text) != "s" {
		return -1, 0
	}
	stem := strings.ToLower(n.text[:last.from])
	for i, other := range names {
		if len(other.words) == 0 || i == seconds {
			continue
		}
		text, unit := other.text, other.unit
		if w := other.words[len(other.words)-1]; unit == "" {
			text, unit = other.text[:w.from], normalUnit(w.text)
		}
		per := map[string]int64{"ms": 1e3, "us": 1e6, "ns": 1e9}[unit]
		if per > 0 && strings.TrimRight(strings.ToLower(text), "_-./: ") == strings.TrimRight(stem, "_-./: ") {
			return i, per
		}
	}
	return -1, 0
}
