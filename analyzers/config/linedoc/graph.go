package linedoc

import (
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// ids are the tags of pose-graph lines, with how many numbers name the vertices.
var ids = map[string]int{
	"VERTEX_SE3:QUAT": 1, "EDGE_SE3:QUAT": 2, "VERTEX3": 1, "EDGE3": 2, "VERTEX_SE2": 1, "EDGE_SE2": 2, "VERTEX2": 1, "EDGE2": 2,
}

// Graph reads the lines of a pose graph: a tag, the numbers of the vertices, and
// the pose. Each tag is a list; an item goes by its vertices and holds the numbers
// of the pose as one text.
func Graph(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	lists := map[string]*tree.Node{}
	seen := map[string]bool{}
	r.each(func(s source.Span) {
		s = r.comment(s, "#")
		words := r.words(s, " \t")
		if len(words) == 0 {
			return
		}
		tag := r.file.Slice(words[0])
		count := ids[tag]
		if count == 0 || len(words) < count+2 {
			return
		}
		name := strings.Join(strings.Fields(r.file.Slice(source.Span{From: words[1].From, To: words[count].To})), " ")
		if seen[tag+" "+name] {
			name = "" // the same two vertices again: by index
		}
		seen[tag+" "+name] = true
		list := lists[tag]
		if list == nil {
			list = &tree.Node{Kind: tree.List, Span: s}
			lists[tag] = list
			r.entry(r.root, words[0], list)
		}
		list.Items = append(list.Items, r.scalar(source.Span{From: words[count+1].From, To: s.To}))
		list.ItemKeys = append(list.ItemKeys, tree.ItemKey{Name: name, At: words[0]})
		list.Span.To = s.To
	})
	return r.doc, nil
}

// IsGraph reports whether a text begins as a pose graph does.
func IsGraph(head []byte) bool {
	tag, _, _ := strings.Cut(strings.TrimLeft(strings.TrimPrefix(string(head[:min(len(head), 64)]), source.ByteOrderMark), " \t\r\n"), " ")
	return ids[tag] > 0
}
