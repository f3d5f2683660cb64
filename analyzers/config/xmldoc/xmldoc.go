// Package xmldoc reads XML into a tree.
//
// An element is a map of its attributes, in order, then of its child elements;
// its own text, if it has any but white space, comes last under the key "". An
// element without attributes and children is a scalar. Elements that repeat in
// one parent become one list; an item goes by its name attribute where it has
// one, so that the path of a value survives the insertion of another element.
//
// The reader is that of the standard library, which gives the offset of every
// token; attributes are found again inside their tag. It fetches nothing and
// expands no entities but the five of XML itself.
package xmldoc

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Read reads an XML file. Errors are of type *source.Error.
func Read(f *source.File) (*tree.Document, error) {
	text, base := f.Body()
	if err := tree.CheckCount(f, text, "<", "="); err != nil {
		return nil, err
	}
	r := reader{file: f, base: base, doc: &tree.Document{File: f}, decoder: xml.NewDecoder(bytes.NewReader(text))}
	r.decoder.CharsetReader = func(_ string, in io.Reader) (io.Reader, error) { return in, nil } // the text is UTF-8, whatever it says
	root := &element{node: &tree.Node{Kind: tree.Map, Span: source.Span{From: base, To: len(f.Text)}}}
	r.open = []*element{root}
	for {
		start := r.offset()
		token, err := r.decoder.RawToken()
		if errors.Is(err, io.EOF) {
			break
		}
		if err == nil {
			err = r.token(token, source.Span{From: start, To: r.offset()})
		}
		if err != nil {
			return nil, r.parseError(err)
		}
	}
	if len(r.open) > 1 {
		e := r.open[len(r.open)-1]
		return nil, f.ErrorAt(e.keyAt, "this is not XML: the element "+e.name+" is not closed", "the file ends too early: complete it, or exclude it from the audit")
	}
	r.close(root)
	r.doc.Roots = []*tree.Node{root.node}
	r.doc.Names = properties(root.node)
	return r.doc, nil
}

// reader turns the tokens of one file.
type reader struct {
	file    *source.File
	base    int // offset of the decoder's first byte in the file
	doc     *tree.Document
	decoder *xml.Decoder
	open    []*element // from the document to the innermost element
}

// element is an element that is being read.
type element struct {
	name  string
	keyAt source.Span
	node  *tree.Node
	text  strings.Builder
	raw   source.Span // from the first character of text that is no white space
}

func (r *reader) offset() int { return r.base + int(r.decoder.InputOffset()) }

func (r *reader) token(token xml.Token, span source.Span) error {
	top := r.open[len(r.open)-1]
	switch t := token.(type) {
	case xml.StartElement:
		return r.start(t, span)
	case xml.EndElement:
		if len(r.open) == 1 || name(t.Name) != top.name {
			return r.file.ErrorAt(span, fmt.Sprintf("this is not XML: </%s> closes an element that is not open", name(t.Name)), "close the elements in order")
		}
		top.node.Span.To = span.To
		r.open = r.open[:len(r.open)-1]
		r.close(top)
	case xml.CharData:
		top.add(r.file, string(t), span)
	case xml.Comment:
		r.comment(span)
	}
	return nil
}

// name is a name as written, with its prefix.
func name(n xml.Name) string {
	if n.Space != "" {
		return n.Space + ":" + n.Local
	}
	return n.Local
}

func (r *reader) start(t xml.StartElement, span source.Span) error {
	if len(r.open) > tree.MaxDepth {
		return r.file.ErrorAt(span, fmt.Sprintf("nested deeper than %d levels", tree.MaxDepth), "flatten the file, or exclude it from the audit")
	}
	e := &element{name: name(t.Name), node: &tree.Node{Kind: tree.Map, Span: span}}
	e.keyAt = source.Span{From: span.From + 1, To: span.From + 1 + len(e.name)}
	at := e.keyAt.To
	for _, a := range t.Attr {
		entry, end := r.attribute(a, source.Span{From: at, To: span.To})
		e.node.Entries = append(e.node.Entries, entry)
		at = end
	}
	r.open = append(r.open, e)
	return nil
}

// attribute finds the next attribute in the rest of a tag.
func (r *reader) attribute(a xml.Attr, rest source.Span) (tree.Entry, int) {
	text := r.file.Text[:rest.To]
	skip := func(at int) int {
		for at < len(text) && strings.IndexByte(" \t\r\n=", text[at]) >= 0 {
			at++
		}
		return at
	}
	key := name(a.Name)
	from := skip(rest.From)
	keyAt := source.Span{From: from, To: min(from+len(key), len(text))}
	open := skip(keyAt.To)
	end := open + 1
	for end < len(text) && text[end] != text[open] {
		end++
	}
	value := &tree.Node{Text: a.Value, Span: source.Span{From: min(open, len(text)), To: min(end+1, len(text))}}
	value.SetRaw(r.file, source.Span{From: min(open+1, len(text)), To: min(end, len(text))})
	return tree.Entry{Key: key, KeyAt: keyAt, Value: value}, min(end+1, len(text))
}

// add adds text to an element.
func (e *element) add(f *source.File, text string, span source.Span) {
	e.text.WriteString(text)
	raw := f.Text[span.From:span.To]
	trimmed := bytes.TrimLeft(raw, " \t\r\n")
	if len(trimmed) == 0 {
		return
	}
	if e.raw.Empty() {
		e.raw.From = span.To - len(trimmed)
	}
	e.raw.To = span.From + len(bytes.TrimRight(raw, " \t\r\n"))
}

// close finishes an element and hands it to its parent.
func (r *reader) close(e *element) {
	text := strings.TrimSpace(e.text.String())
	switch {
	case len(e.node.Entries) == 0:
		e.node.Kind, e.node.Text = tree.Scalar, text
		e.node.SetRaw(r.file, e.raw)
	case text != "":
		n := &tree.Node{Text: text, Span: e.raw}
		n.SetRaw(r.file, e.raw)
		e.node.Entries = append(e.node.Entries, tree.Entry{Value: n})
	}
	tree.Gather(e.node)
	if e.name != "" {
		parent := r.open[len(r.open)-1].node
		parent.Entries = append(parent.Entries, tree.Entry{Key: e.name, KeyAt: e.keyAt, Value: e.node})
	}
}

// comment notes a comment, line by line.
func (r *reader) comment(span source.Span) {
	for line := span.From; line < span.To; {
		next := span.To
		if i := bytes.IndexByte(r.file.Text[line:span.To], '\n'); i >= 0 {
			next = line + i + 1
		}
		text := bytes.TrimRight(r.file.Text[line:next], "\r\n")
		inner := strings.TrimSuffix(strings.TrimPrefix(string(text), "<!--"), "-->")
		r.doc.Comments = append(r.doc.Comments, tree.Comment{Span: source.Span{From: line, To: line + len(text)}, Text: strings.TrimSpace(inner)})
		line = next
	}
}

// parseError gives an error of the library its place.
func (r *reader) parseError(err error) error {
	var own *source.Error
	if errors.As(err, &own) {
		return err
	}
	at, problem := min(r.offset(), len(r.file.Text)), err.Error()
	var syntax *xml.SyntaxError
	if errors.As(err, &syntax) {
		problem = syntax.Msg
	}
	remedy := "mend the file, or exclude it from the audit"
	if at >= len(r.file.Text) {
		remedy = "the file ends too early: complete it, or exclude it from the audit"
	}
	e := r.file.ErrorAt(source.Span{From: at, To: min(at+1, len(r.file.Text))}, "this is not XML: "+problem, remedy)
	e.Err = err
	return e
}
