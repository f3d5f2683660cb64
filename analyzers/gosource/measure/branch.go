package measure

import (
	"strings"

	"dextral/core/operation"
)

// Separates names the condition under which exactly the marked samples were
// evaluated: "trace <= 0". It returns "" if no branch separates them.
func (f *Function) Separates(samples []operation.Sample, marked []bool) string {
	for i, b := range f.Branches() {
		for _, condition := range [2]bool{true, false} {
			if !splits(samples, marked, i, condition) {
				continue
			}
			if b.Branch.Text == "" {
				continue // of a function of another package
			}
			if condition {
				return b.Branch.Text
			}
			return negation(b.Branch.Text)
		}
	}
	return ""
}

func splits(samples []operation.Sample, marked []bool, branch int, condition bool) bool {
	some := false
	for i := range samples {
		if Took(&samples[i], branch, condition) != marked[i] {
			return false
		}
		some = some || marked[i]
	}
	return some
}

// negation turns a condition round; a single comparison becomes the opposite one.
func negation(text string) string {
	if !strings.ContainsAny(text, "&|(") {
		for _, op := range [][2]string{{"<=", ">"}, {">=", "<"}, {"==", "!="}, {"!=", "=="}, {"<", ">="}, {">", "<="}} {
			if strings.Count(text, op[0]) == 1 {
				return strings.Replace(text, op[0], op[1], 1)
			}
		}
	}
	return "not (" + text + ")"
}
