package report

import (
	"strings"

	"dextral/rules"
)

// cause is what findings share that one mistake has made: the rule and its level,
// the file, the last name of the keys, the remedy and the readings that the
// evidence begins with. A program that writes the scalar at the wrong end writes
// it so for every camera.
func cause(f *rules.Finding) string {
	parts := []string{f.Rule, f.Level.String(), f.Place.Path, lastName(f.Key), f.Remedy}
	for _, e := range f.Evidence[:min(len(f.Evidence), 2)] {
		parts = append(parts, e.What)
	}
	return strings.Join(parts, "\x00")
}

// lastName is the last element of a key that is no index.
func lastName(key string) string {
	if strings.HasPrefix(key, "waiver.") { // all that are left over are left over alike
		return ""
	}
	key = strings.TrimRight(key, "]0123456789")
	key = strings.TrimSuffix(key, "[")
	return key[strings.LastIndexByte(key, '.')+1:]
}

// group is a finding with the others that have its cause.
type group struct {
	first *rules.Finding
	alike []*rules.Finding
}

// folds is the least number of findings with one cause of which only the first is
// shown with its evidence: of two, both are soon read.
const folds = 3

// groups puts findings with one cause behind the first of them. Waived ones stay by
// themselves.
func groups(findings []*rules.Finding) []group {
	count := map[string]int{}
	for _, f := range findings {
		if f.Waiver == nil {
			count[cause(f)]++
		}
	}
	at := map[string]int{}
	var all []group
	for _, f := range findings {
		c := cause(f)
		if f.Waiver != nil || count[c] < folds {
			all = append(all, group{first: f})
			continue
		}
		if i, ok := at[c]; ok {
			all[i].alike = append(all[i].alike, f)
			continue
		}
		at[c] = len(all)
		all = append(all, group{first: f})
	}
	return all
}
