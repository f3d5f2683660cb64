package sourcedoc

import (
	"slices"
	"strconv"
	"strings"

	"dextral/analyzers/config/tree"
)

// scanner goes through the tokens of one file.
type scanner struct {
	text   []byte
	lang   language
	tokens []token
	i      int
	start  int // of the statement
	doc    *tree.Document
	scopes []scope
	types  map[string]string // of names declared without a value
	keys   map[*tree.Node]map[string]int
	nodes  int // added so far
	spent  int // see spend
}

// tooDeep reports whether more scopes are open than programs have. The rest of the
// file is left out then.
func (s *scanner) tooDeep() bool { return len(s.scopes) > tree.MaxDepth/2 }

// scope is a scope that is open.
type scope struct {
	node      *tree.Node
	condition int     // of a branch of a conditional: its number; 0 for others
	indent    int     // Python: of its header
	before    []scope // of a conditional: what was open in front of it
}

func (s *scanner) scan() {
	switch s.lang {
	case python:
		s.scanPython()
	case matlab:
		s.scanMatlab()
	default:
		s.scanC()
	}
}

// innermost is the node that entries go to.
func (s *scanner) innermost() *tree.Node { return s.scopes[len(s.scopes)-1].node }

// child makes a scope in the innermost one.
func (s *scanner) child(key string) *tree.Node {
	in := s.innermost()
	n := &tree.Node{Kind: tree.Map, Tag: Scope, Span: s.peek(0).at}
	in.Entries = append(in.Entries, tree.Entry{Key: s.unique(in, key), Value: n})
	return n
}

// add keeps a value under a name, with the type as its tag if nothing better is
// known.
func (s *scanner) add(key token, n *tree.Node, typed string) {
	if s.nodes += size(n); s.nodes > tree.MaxNodes {
		return
	}
	if n.Tag == "" {
		n.Tag = typed
	}
	in := s.innermost()
	in.Entries = append(in.Entries, tree.Entry{Key: s.unique(in, key.text), KeyAt: key.at, Value: n})
}

// unique tells entries of one name apart by a number: a name that is assigned to
// twice stands for two things.
func (s *scanner) unique(in *tree.Node, key string) string {
	if s.keys[in] == nil {
		s.keys[in] = map[string]int{}
	}
	s.keys[in][key]++
	if n := s.keys[in][key]; n > 1 {
		return key + "#" + strconv.Itoa(n)
	}
	return key
}

func size(n *tree.Node) int {
	count := 1
	for _, item := range n.Items {
		count += size(item)
	}
	for _, e := range n.Entries {
		count += size(e.Value)
	}
	return count
}

// drop takes back the latest value of a name, since something is done to it.
func (s *scanner) drop(key string) {
	for _, sc := range slices.Backward(s.scopes) {
		for i, e := range slices.Backward(sc.node.Entries) {
			if e.Key == key || strings.HasSuffix(e.Key, "."+key) {
				if e.Value.Tag != Scope {
					sc.node.Entries = slices.Delete(sc.node.Entries, i, i+1)
				}
				return
			}
		}
	}
}

// dropNormalized takes back a value that is normalised here: q.normalize(),
// normalize(q), norm(q).
func (s *scanner) dropNormalized() {
	t := s.peek(0)
	if t.kind != name || !strings.Contains(strings.ToLower(t.text), "norm") {
		return
	}
	if (s.peek(-1).is(".") || s.peek(-1).is("->")) && s.peek(-2).kind == name {
		s.drop(s.peek(-2).text)
	}
	if s.peek(1).is("(") && s.peek(2).kind == name {
		s.drop(s.peek(2).text)
	}
}

// constant reports whether a single number under a name is more than a counter:
// it has a point, or the name has a unit of angles.
func constant(key string, n *tree.Node) bool {
	lower := strings.ToLower(key)
	return strings.Contains(n.Text, ".") || strings.Contains(lower, "deg") || strings.Contains(lower, "rad")
}

// single reports whether a node is one number.
func single(n *tree.Node) bool { return n.Kind == tree.Scalar && !n.Raw.Empty() }

// group reports whether a node holds more than one value.
func group(n *tree.Node) bool { return n.Kind != tree.Scalar }
