package policy

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/rules"
)

// What is written is read again, for any path, key and words.
func TestEntriesAreReadAgain(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		name := rapid.StringMatching(`[a-z#*?\[\]{} é.]{0,6}x`)
		rel := name.Draw(rt, "dir") + "/" + name.Draw(rt, "file")
		key := rapid.StringMatching(`([a-z*{}?\[\] 0-9é"]{0,5}\.){0,3}[a-z*{}?\[\]\n]{0,5}`).Draw(rt, "key")
		if strings.Contains(rel, "..") || strings.HasPrefix(rel, "./") || strings.Contains(rel, "/./") {
			rt.Skip()
		}
		w := &rules.Waiver{Rule: "sign-jump", Place: PlaceOf(rel, key), Until: "2031-12-31",
			Because: "x" + rapid.String().Draw(rt, "because"), Owner: "x" + rapid.String().Draw(rt, "owner")}
		p, err := Parse("dextral.toml", []byte(Append("# sheet\n", Entry(w))), ruleNames())
		require.NoError(rt, err)
		w.At = p.Waivers[0].At
		w.Because, w.Owner = strings.ToValidUTF8(w.Because, "\ufffd"), strings.ToValidUTF8(w.Owner, "\ufffd")
		assert.Equal(rt, w, p.Waivers[0])
		f := finding("sign-jump", rel, key)
		p.Waive([]*rules.Finding{f}, Scope{Today: day("2031-01-01"), Covered: everything})
		assert.NotNil(rt, f.Waiver, "%q for %q # %q", w.Place, rel, key)
	})
}

func TestAppendKeepsTheSheet(t *testing.T) {
	const table = "[[waiver]]\nrule = 'a'\n"
	for before, want := range map[string]string{
		"":                           table,
		"\ufeff":                     "\ufeff" + table,
		"gate = 'note'":              "gate = 'note'\n\n" + table,
		"gate = 'note'\n":            "gate = 'note'\n\n" + table,
		"gate = 'note' # why\n\n":    "gate = 'note' # why\n\n" + table,
		"gate = 'note'\r\n# end":     "gate = 'note'\r\n# end\r\n\r\n[[waiver]]\r\nrule = 'a'\r\n",
		"# a\n\n[defaults]\n# b\n\n": "# a\n\n[defaults]\n# b\n\n" + table,
	} {
		assert.Equal(t, want, Append(before, table), "%q", before)
	}
}

func TestNameFileKeepsTheSheet(t *testing.T) {
	for before, want := range map[string]string{
		"":                                                        "waiver_files = \"b.toml\"\n",
		"gate = 'note'":                                           "gate = 'note'\nwaiver_files = \"b.toml\"\n",
		"# why\ngate = 'note' # c\n[defaults]\n":                  "# why\ngate = 'note' # c\nwaiver_files = \"b.toml\"\n[defaults]\n",
		"exclude = [\n 'a', # x\n]\r\n":                           "exclude = [\n 'a', # x\n]\r\nwaiver_files = \"b.toml\"\n",
		"# Tern\n\n[defaults]\nunit = 'deg'\n":                    "# Tern\n\nwaiver_files = \"b.toml\"\n\n[defaults]\nunit = 'deg'\n",
		"# of defaults\n[defaults]\n":                             "waiver_files = \"b.toml\"\n\n# of defaults\n[defaults]\n",
		"[[claim]]\r\nfiles = 'x'\r\nunit='deg'":                  "waiver_files = \"b.toml\"\r\n\r\n[[claim]]\r\nfiles = 'x'\r\nunit='deg'",
		"waiver_files = 'a.toml' # old\n":                         "waiver_files = ['a.toml', \"b.toml\"] # old\n",
		"waiver_files = [ 'a.toml', 'c.toml', ]":                  "waiver_files = [ 'a.toml', 'c.toml', \"b.toml\", ]",
		"\ufeff[[rig]]\nname='a'\nfiles='a'\n":                    "\ufeffwaiver_files = \"b.toml\"\n\n[[rig]]\nname='a'\nfiles='a'\n",
		"defaults.unit = 'deg'\n[[claim]]\nfiles='a'\nunit='deg'": "defaults.unit = 'deg'\nwaiver_files = \"b.toml\"\n[[claim]]\nfiles='a'\nunit='deg'",
	} {
		got := NameFile(before, "b.toml")
		assert.Equal(t, want, got, "%q", before)
		p, err := Parse("dextral.toml", []byte(got), ruleNames())
		require.NoError(t, err, got)
		assert.Contains(t, p.WaiverFiles(), "b.toml")
	}
}
