package policy

import (
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

// block is a fenced block of the documentation.
type block struct{ info, text string }

func blocks(t *testing.T, markdown string) []block {
	t.Helper()
	var all []block
	open := false
	for line := range strings.Lines(markdown) {
		switch info, fence := strings.CutPrefix(line, "```"); {
		case fence && !open:
			open = true
			all = append(all, block{info: strings.TrimSpace(info)})
		case fence:
			open = false
		case open:
			all[len(all)-1].text += line
		}
	}
	require.False(t, open, "a fence is not closed")
	return all
}

func ruleNames() []string {
	var names []string
	for _, r := range rules.Catalogue() {
		names = append(names, r.Name)
	}
	return names
}

// Every example of the documentation is read: those marked wrong must give
// the errors printed below them, all others none.
func TestDocumentedExamples(t *testing.T) {
	all := blocks(t, Doc)
	good, wrong := 0, 0
	for i, b := range all {
		switch b.info {
		case "toml":
			good++
			_, err := Parse("dextral.toml", []byte(b.text), ruleNames())
			assert.NoError(t, err, b.text)
		case "toml wrong":
			wrong++
			require.Less(t, i+1, len(all))
			require.Equal(t, "text", all[i+1].info, "the errors stand below a wrong example")
			_, err := Parse("dextral.toml", []byte(b.text), ruleNames())
			require.Error(t, err, b.text)
			assert.Equal(t, all[i+1].text, err.Error()+"\n")
		case "yaml":
			beside := 0
			for line := range strings.Lines(b.text) {
				if comment := strings.TrimLeft(line, " #"); Addresses(comment) {
					beside++
					_, err := ParseBeside(comment, rules.Place{Path: "a.yaml", Line: 1, Column: 1}, ruleNames())
					assert.NoError(t, err)
				}
			}
			assert.NotZero(t, beside, b.text)
		case "sh": // a command, run by the scripts of cmd/dextral
		case "text":
			require.Equal(t, "toml wrong", all[max(i-1, 0)].info, "errors without an example")
		default:
			t.Errorf("block %d: unexpected info %q", i, b.info)
		}
	}
	assert.GreaterOrEqual(t, good, 7)
	assert.GreaterOrEqual(t, wrong, 3)
}

// Every key that the reader asks for is documented, between backquotes or in
// an example.
func TestEveryKeyIsDocumented(t *testing.T) {
	const everything = `
[defaults]
[[claim]]
[[frame]]
[[rig]]
[[waiver]]
zzz = 1
`
	_, err := Parse("dextral.toml", []byte(everything), ruleNames())
	require.Error(t, err)
	r := &reader{lines: newLines("dextral.toml", ""), known: ruleNames()}
	asked := map[string][]string{}
	for name, read := range map[string]func(*table){
		"":         func(t *table) { (&Policy{}).read(t) },
		"defaults": func(t *table) { t.conventions() },
		"claim":    func(t *table) { t.claim() },
		"frame":    func(t *table) { t.frame(nil) },
		"rig":      func(t *table) { t.rig(nil) },
		"waiver":   func(t *table) { t.waiver() },
	} {
		tab := &table{r: r, name: name, node: &node{}}
		read(tab)
		asked[name] = tab.keys
	}
	require.Len(t, asked["waiver"], 5)
	require.Len(t, asked["claim"], 14)
	examples := ""
	for _, b := range blocks(t, Doc) {
		if b.info == "toml" {
			examples += b.text
		}
	}
	for name, keys := range asked {
		for _, key := range slices.Compact(slices.Sorted(slices.Values(keys))) {
			assert.True(t, strings.Contains(Doc, "`"+key+"`") || strings.Contains(Doc, "["+key+"]") || strings.Contains(Doc, "## "+key) ||
				strings.Contains(examples, "\n"+key+" = "), "[%s] %s is not documented", name, key)
			assert.True(t, strings.Contains(examples, "\n"+key+" = ") || strings.Contains(examples, "["+key+"]") || strings.HasPrefix(examples, key+" = "),
				"[%s] %s has no example", name, key)
		}
	}
}
