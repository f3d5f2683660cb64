// Package yamldoc reads YAML into a tree.
//
// It uses go.yaml.in/yaml/v3 up to its nodes and no further, so that nothing is
// resolved: a number keeps its digits, a key may stand twice, a reference stays
// a reference until it is followed here. That package gives the line and column
// at which a node begins; where it ends, where its text begins behind an anchor
// or a tag, and where the comments are, is read from the text again.
//
// # References
//
// A reference (*name) and a merge (<<) are followed, under a bound on the nodes
// that they add. What they lead to keeps the place where it stands.
//
// # OpenCV
//
// OpenCV writes %YAML:1.0 as its first line, which is no YAML. It is read as a
// comment.
package yamldoc

import (
	"bytes"
	"errors"
	"fmt"
	"io"

	"go.yaml.in/yaml/v3"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Read reads all documents of a YAML file. Errors are of type *source.Error.
func Read(f *source.File) (*tree.Document, error) {
	text, base := f.Body()
	if err := tree.CheckCount(f, text, ",", ":", "\n", "[", "{", "- "); err != nil {
		return nil, err
	}
	if head := []byte("%YAML:"); bytes.HasPrefix(text, head) {
		text = append([]byte("#"), text[1:]...)
	}
	r := reader{
		doc:   &tree.Document{File: f, UniqueKeys: true},
		lines: yamlLines(f.Text, base),
		open:  map[*yaml.Node]bool{},
	}
	decoder := yaml.NewDecoder(bytes.NewReader(text))
	for {
		var document yaml.Node
		err := decoder.Decode(&document)
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return nil, parseError(f, err)
		}
		for _, root := range document.Content {
			n, err := r.node(root, 1)
			if err != nil {
				return nil, err
			}
			r.doc.Roots = append(r.doc.Roots, n)
		}
	}
	r.doc.Comments = tree.HashComments(f, base, r.texts, " \t\r\n,[]{}\"'") // else part of a tag or an anchor
	return r.doc, nil
}

// reader turns the nodes of one file.
type reader struct {
	doc     *tree.Document
	lines   []int // offset of each line as YAML counts lines
	aliased int   // nodes added by references so far
	inAlias int   // how many references are being followed
	open    map[*yaml.Node]bool
	texts   []source.Span // scalars in file order, in which a # is no comment
}

func (r *reader) node(y *yaml.Node, depth int) (*tree.Node, error) {
	at := r.offset(y)
	if err := r.checkNode(at, depth); err != nil {
		return nil, err
	}
	switch y.Kind {
	case yaml.AliasNode:
		return r.alias(y, at, depth)
	case yaml.MappingNode:
		return r.mapping(y, at, depth)
	case yaml.SequenceNode:
		return r.sequence(y, at, depth)
	}
	return r.scalar(y, at), nil
}

// checkNode holds the walk within its bounds.
func (r *reader) checkNode(at, depth int) error {
	if depth > tree.MaxDepth {
		return r.doc.File.ErrorAt(source.Span{From: at, To: at}, fmt.Sprintf("nested deeper than %d levels", tree.MaxDepth),
			"flatten the file, or exclude it from the audit")
	}
	if r.inAlias > 0 {
		r.aliased++
	}
	if r.aliased > tree.MaxAliased {
		return r.doc.File.ErrorAt(source.Span{From: at, To: at}, fmt.Sprintf("the references (*name) of this file expand to more than %d items", tree.MaxAliased),
			"write the values out, or exclude the file from the audit")
	}
	return nil
}

// alias follows a reference. What it adds stands where the anchor is.
func (r *reader) alias(y *yaml.Node, at, depth int) (*tree.Node, error) {
	if r.open[y.Alias] {
		return nil, r.doc.File.ErrorAt(source.Span{From: at, To: at + 1 + len(y.Value)}, fmt.Sprintf("*%s stands inside the value that it refers to", y.Value),
			"remove the reference")
	}
	r.inAlias++
	defer func() { r.inAlias-- }()
	return r.node(y.Alias, depth+1)
}

func (r *reader) sequence(y *yaml.Node, at, depth int) (*tree.Node, error) {
	r.open[y] = true
	defer delete(r.open, y)
	at = r.skipProperties(at)
	n := &tree.Node{Kind: tree.List, Tag: typeTag(y), Span: source.Span{From: at, To: at}}
	for _, c := range y.Content {
		item, err := r.node(c, depth+1)
		if err != nil {
			return nil, err
		}
		n.Items = append(n.Items, item)
		n.Span.To = max(n.Span.To, r.end(c, item))
	}
	r.close(n)
	return n, nil
}

func (r *reader) mapping(y *yaml.Node, at, depth int) (*tree.Node, error) {
	r.open[y] = true
	defer delete(r.open, y)
	at = r.skipProperties(at)
	n := &tree.Node{Kind: tree.Map, Tag: typeTag(y), Span: source.Span{From: at, To: at}}
	var merged []*tree.Node
	for i := 0; i+1 < len(y.Content); i += 2 {
		key, err := r.node(y.Content[i], depth+1)
		if err != nil {
			return nil, err
		}
		value, err := r.node(y.Content[i+1], depth+1)
		if err != nil {
			return nil, err
		}
		n.Span.To = max(n.Span.To, r.end(y.Content[i+1], value))
		if y.Content[i].Tag == "!!merge" {
			merged = append(merged, value)
		} else {
			n.Entries = append(n.Entries, tree.Entry{Key: key.Text, KeyAt: key.Raw, Value: value})
		}
	}
	r.merge(n, merged)
	r.close(n)
	return n, nil
}

// merge adds the entries of maps, or of lists of maps, whose keys are not there
// yet; earlier maps come first. The maps were counted against the bound when
// their references were followed.
func (r *reader) merge(n *tree.Node, merged []*tree.Node) {
	if len(merged) == 0 {
		return
	}
	present := map[string]bool{}
	for _, e := range n.Entries {
		present[e.Key] = true
	}
	for _, m := range merged {
		maps := []*tree.Node{m}
		if m.Kind == tree.List {
			maps = m.Items
		}
		for _, from := range maps {
			for _, e := range from.Entries {
				if !present[e.Key] {
					present[e.Key] = true
					n.Entries = append(n.Entries, e)
				}
			}
		}
	}
}

// end is where a child ends for its parent: a reference ends behind its name,
// not behind what it refers to.
func (r *reader) end(y *yaml.Node, n *tree.Node) int {
	if y.Kind == yaml.AliasNode {
		return min(r.offset(y)+1+len(y.Value), len(r.doc.File.Text))
	}
	return n.Span.To
}

// close extends a list or map in brackets over its closing bracket.
func (r *reader) close(n *tree.Node) {
	text := r.doc.File.Text
	if n.Span.From >= len(text) {
		return
	}
	want := map[byte]byte{'[': ']', '{': '}'}[text[n.Span.From]]
	if want == 0 {
		return
	}
	at := max(n.Span.To, n.Span.From+1)
	for at = skipBlank(text, at); at < len(text) && text[at] == ','; {
		at = skipBlank(text, at+1)
	}
	if at < len(text) && text[at] == want {
		n.Span.To = at + 1
	}
}

// typeTag is the tag that somebody wrote, "" for those that follow from shape.
func typeTag(y *yaml.Node) string {
	if y.Style&yaml.TaggedStyle != 0 {
		return y.Tag
	}
	return ""
}
