package tree

import "strings"

// Gather makes one list of the entries of a map that share a key, for formats in
// which elements repeat. An item goes by its name entry, if it has one that no
// other item has.
func Gather(n *Node) {
	first := map[string]int{}
	kept := n.Entries[:0]
	for _, e := range n.Entries {
		at, again := first[e.Key]
		if !again {
			first[e.Key] = len(kept)
			kept = append(kept, e)
			continue
		}
		list := kept[at].Value
		if list.Tag != listTag {
			list = &Node{Kind: List, Tag: listTag, Span: list.Span, Items: []*Node{list}, ItemKeys: []ItemKey{keyOf(kept[at])}}
			kept[at].Value = list
		}
		list.Items = append(list.Items, e.Value)
		list.ItemKeys = append(list.ItemKeys, keyOf(e))
		list.Span = list.Span.Cover(e.Value.Span)
	}
	n.Entries = kept
	for _, e := range kept {
		if e.Value.Tag == listTag {
			e.Value.Tag = ""
			unique(e.Value.ItemKeys)
		}
	}
}

// listTag marks a list under construction; no element can be called so.
const listTag = "<list>"

func keyOf(e Entry) ItemKey {
	k := ItemKey{At: e.KeyAt}
	if name := e.Value.Get("name"); name != nil && name.Kind == Scalar {
		k.Name = name.Text
	}
	return k
}

// unique drops names that do not tell the items of a list apart.
func unique(keys []ItemKey) {
	count := map[string]int{}
	for _, k := range keys {
		count[k.Name]++
	}
	for i := range keys {
		if count[keys[i].Name] > 1 || strings.ContainsAny(keys[i].Name, "[]") {
			keys[i].Name = ""
		}
	}
}
