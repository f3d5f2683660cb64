package config

import (
	"dextral/analyzers/claims"
	"dextral/analyzers/config/linedoc"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// isSheet reports whether a text is a table of things by name of which three columns
// at least are components of an orientation, such as the mounting angles of sensors. It
// must be all of the text.
func isSheet(name string, text []byte) bool {
	const largest = 32 << 10
	if len(text) > largest {
		return false
	}
	f := source.New(name, text)
	if f.CheckText() != nil {
		return false
	}
	d, err := linedoc.Sheet(f)
	if err != nil || len(d.Roots[0].Entries) == 0 {
		return false
	}
	components := 0
	for _, e := range d.Roots[0].Entries[0].Value.Entries {
		if e.Value.Kind == tree.List {
			return true // a matrix
		}
		if _, ok := claims.ReadIn("", e.Key).Component(); ok {
			components++
		}
	}
	return components >= 3
}
