package xmldoc

import (
	"strings"

	"dextral/analyzers/config/tree"
)

// properties are the constants that a xacro file defines for its expressions ${...},
// in the order of the file, so that one may use those before it. One that is defined
// twice, or by what is not known here, is unknown. It is nil for other files.
func properties(root *tree.Node) map[string]float64 {
	if len(root.Entries) == 0 || root.Entries[0].Value.Get("xmlns:xacro") == nil {
		return nil
	}
	names, known := map[string]float64{}, map[string]bool{}
	for _, e := range root.Entries[0].Value.Entries {
		if e.Key != "xacro:property" {
			continue
		}
		items := []*tree.Node{e.Value}
		if e.Value.Kind == tree.List {
			items = e.Value.Items
		}
		for _, item := range items {
			name, value := item.Get("name"), item.Get("value")
			if name == nil || value == nil {
				continue
			}
			text := strings.TrimSuffix(strings.TrimPrefix(strings.TrimSpace(value.Text), "${"), "}")
			x, ok := tree.Expression(text, names)
			if delete(names, name.Text); ok && !known[name.Text] {
				names[name.Text] = x
			}
			known[name.Text] = true
		}
	}
	return names
}
