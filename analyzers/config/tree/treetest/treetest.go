// Package treetest helps to test readers that make trees.
package treetest

import (
	"fmt"
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Outline prints a tree as brackets. Keys and scalars are cut out of the file at
// the places that the tree gives; a scalar that stands nowhere verbatim is <>.
func Outline(d *tree.Document, n *tree.Node) string {
	var parts []string
	left, right := "<"+d.File.Slice(n.Raw), ">"
	switch n.Kind {
	case tree.List:
		left, right = "[", "]"
		for _, i := range n.Items {
			parts = append(parts, Outline(d, i))
		}
	case tree.Map:
		left, right = "{", "}"
		for _, e := range n.Entries {
			parts = append(parts, d.File.Slice(e.KeyAt)+":"+Outline(d, e.Value))
		}
	}
	if n.Tag != "" {
		left = n.Tag + " " + left
	}
	return left + strings.Join(parts, " ") + right
}

// Check holds the laws of a tree: every place lies in the file, a scalar's words
// stand where Raw says and inside Span, and comments are in order.
func Check(d *tree.Document) error {
	whole := source.Span{To: len(d.File.Text)}
	inside := func(spans ...source.Span) bool {
		for _, s := range spans {
			if s.From > s.To || !whole.Holds(s) {
				return false
			}
		}
		return true
	}
	var check func(n *tree.Node) error
	check = func(n *tree.Node) error {
		if !inside(n.Span, n.Raw) {
			return fmt.Errorf("span %v or %v is outside the file", n.Span, n.Raw)
		}
		if !n.Raw.Empty() && (!n.Span.Holds(n.Raw) || !slices.Equal(strings.Fields(n.Text), strings.Fields(d.File.Slice(n.Raw)))) {
			return fmt.Errorf("text %q does not stand at %v: %q", n.Text, n.Raw, d.File.Slice(n.Raw))
		}
		for _, i := range n.Items {
			if err := check(i); err != nil {
				return err
			}
		}
		for _, e := range n.Entries {
			if !inside(e.KeyAt) {
				return fmt.Errorf("key %q is outside the file: %v", e.Key, e.KeyAt)
			}
			if err := check(e.Value); err != nil {
				return err
			}
		}
		return nil
	}
	for _, root := range d.Roots {
		if err := check(root); err != nil {
			return err
		}
	}
	last := 0
	for _, c := range d.Comments {
		if !inside(c.Span) || c.Span.From < last {
			return fmt.Errorf("comment %q stands at %v", c.Text, c.Span)
		}
		last = c.Span.From
	}
	return nil
}
