package policy

import (
	"errors"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/rules"
)

// FuzzBeside: no comment makes the reader of comments panic; its errors stand at
// the comment.
func FuzzBeside(f *testing.F) {
	for _, text := range []string{accepted, "dextral:waive", "dextral:wave", "dextral:waive }", "dextral:waive rule = {a = 1}", "dextral: waive until = 1", `dextral:waive "rule" = 'x', rule.a = 2`, "dextral:waive a = [\n1]", "dextral:waive = \"\"\"x"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		if !Addresses(text) {
			return
		}
		b, err := ParseBeside(text, comment, ruleNames())
		if err == nil {
			assert.Equal(t, comment, b.At)
			again, err := ParseBeside(Comment(b.Waiver), comment, ruleNames())
			assert.NoError(t, err)
			assert.Equal(t, b, again)
			return
		}
		var errs Errors
		if assert.True(t, errors.As(err, &errs)) {
			assert.Equal(t, comment, errs[0].Place)
		}
	})
}

// FuzzWrite: what is added to a sheet that can be read gives one that can be
// read, with all that was in it; where tables cannot be added to its end, Parse
// says so.
func FuzzWrite(f *testing.F) {
	for _, text := range []string{"", "gate = 'note'", twoWaivers, "# a\n\n[defaults]\nunit = 'deg'", "waiver_files = [\n'a.toml', # x\n]\n", "defaults = {unit = 'deg'}",
		"waiver = [{rule='sign-jump', place='a', until=2031-01-01, because='x', owner='y'}]", "'waiver_files' = \"a\"\r\n", "[ defaults ]\nunit='deg'", "defaults . unit = 'deg'\n", "\xff\xfe", "# c\r\n\r\n[[ claim ]]\nfiles='a'\nunit='rad'"} {
		f.Add(text)
	}
	w := &rules.Waiver{Rule: "sign-jump", Place: "logs/a.csv", Until: "2031-01-01", Because: "x", Owner: "y"}
	f.Fuzz(func(t *testing.T, text string) {
		before, err := Parse("dextral.toml", []byte(text), ruleNames())
		if err != nil {
			return
		}
		named, err := Parse("dextral.toml", []byte(NameFile(text, "new.toml")), ruleNames())
		if assert.NoError(t, err, "%q", NameFile(text, "new.toml")) {
			assert.Equal(t, append(before.WaiverFiles(), "new.toml"), named.WaiverFiles())
			assert.Len(t, named.claims, len(before.claims))
			assert.Equal(t, before.Gate, named.Gate)
		}
		if after, err := Parse("dextral.toml", []byte(Append(text, Entry(w))), ruleNames()); err == nil {
			assert.Len(t, after.Waivers, len(before.Waivers)+1)
		} else {
			assert.Contains(t, text, "waiver")
		}
	})
}
