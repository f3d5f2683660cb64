package sourcedoc

import (
	"regexp"
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
)

// callee reads a name with its qualifiers and without its template arguments:
// Eigen::Quaternion<double> is Eigen::Quaternion.
func (s *scanner) callee() (string, bool) {
	if s.peek(0).kind != name {
		return "", false
	}
	text := s.peek(0).text
	s.i++
	for (s.peek(0).is("::") || s.peek(0).is(".")) && s.peek(1).kind == name {
		text += s.peek(0).text + s.peek(1).text
		s.i += 2
	}
	s.template()
	for s.peek(0).is("::") && s.peek(1).kind == name {
		text += "::" + s.peek(1).text
		s.i += 2
	}
	return text, true
}

// template passes over <double> and <float, 3, 3>.
func (s *scanner) template() {
	const longest = 12
	if s.lang != cFamily || !s.peek(0).is("<") {
		return
	}
	for i := 1; i < longest; i++ {
		t := s.peek(i)
		switch {
		case t.is(">"):
			s.i += i + 1
			return
		case t.kind == name, t.kind == number, t.is("::"), t.is(","):
		default:
			return
		}
	}
}

// literal words that are values.
var literals = map[string]bool{"True": true, "False": true, "true": true, "false": true, "None": true}

// call reads a call or a construction. Its node is what its arguments say, with
// the callee as tag; words behind the callee say what arguments say beside the
// numbers:
//
//	np.array([1, 0, 0, 0], dtype=float)           list, tag "np.array"
//	R.from_euler('zyx', [1, 2, 3], degrees=True)  list, tag "R.from_euler zyx degrees=True"
//	Quaternion(w=1, x=0, y=0, z=0)                map, tag "Quaternion"
func (s *scanner) call(depth int) *tree.Node {
	at := s.peek(0).at
	callee, _ := s.callee()
	if literals[callee] && s.ended() {
		return &tree.Node{Span: at, Text: callee}
	}
	open := s.peek(0)
	if !open.is("(") && !(open.is("{") && s.lang == cFamily) || !makes(callee) {
		return nil
	}
	a, ok := s.bracketed(depth)
	if !ok || a.opaque {
		return nil
	}
	tag := callee
	if len(a.items) > 1 && a.items[0].Kind == tree.Scalar && a.items[0].Raw.Empty() { // a string
		tag += " " + strings.ReplaceAll(a.items[0].Text, " ", "")
		a.items = a.items[1:]
	}
	if len(a.items) > 0 {
		for _, e := range a.entries {
			tag += " " + e.Key + "=" + e.Value.Text
		}
		a.entries = nil
	}
	n := a.node()
	if n != nil && n.Kind == tree.List && len(n.Items) == 1 {
		if n = n.Items[0]; n.Kind == tree.Scalar || n.Tag != "" && !plain(n.Tag) {
			return nil // one argument that is a number, or made by somebody who may mean something by it
		}
	}
	if n == nil {
		return nil
	}
	n.Tag, n.Span = tag, at.Cover(a.span)
	return s.attached(n)
}

// makers are functions that keep the numbers they are given; of deg2rad and radians
// the numbers are the degrees.
var makers = words("array asarray matrix mat list tuple tensor quaternion quat vec3 vec4 dvec3 dvec4 mat3 mat4 dmat3 dmat4 float3 float4 double3 double4 " +
	"make_float3 make_float4 make_double3 make_double4 deg2rad radians single double from_quat from_matrix from_dcm from_rotvec from_euler")

// changes is in the names of functions that make something else of their numbers.
var changes = regexp.MustCompile(`From|To[A-Z]|Inv|Conj|Norm|Transp|Exp|Log|Mult|Compose`)

// makes reports whether a callee keeps its numbers as they are: a type, by its
// capital letter or its ending, or a function known for it.
func makes(callee string) bool {
	last := callee[strings.LastIndexAny(callee, ".:")+1:]
	if makers[last] || strings.HasSuffix(last, "_t") || strings.HasPrefix(last, "bt") || strings.HasPrefix(last, "ai") {
		return true
	}
	return last != "" && last[0] >= 'A' && last[0] <= 'Z' && !changes.MatchString(last)
}

// plain reports whether a callee only stores its numbers.
func plain(callee string) bool {
	switch callee[strings.LastIndexAny(callee, ".:")+1:] {
	case "array", "asarray", "list", "tuple":
		return true
	}
	return false
}

// attached takes what may be attached to a value without changing its numbers,
// and gives up on everything else that is attached.
func (s *scanner) attached(n *tree.Node) *tree.Node {
	for n != nil && s.peek(0).is(".") && s.peek(1).kind == name {
		switch s.peek(1).text {
		case "finished", "astype", "reshape":
		default:
			return nil
		}
		s.i += 2
		if !s.peek(0).is("(") {
			return nil
		}
		s.i++
		from := s.i
		s.skipItem(")")
		for s.peek(0).is(",") {
			s.i++
			s.skipItem(")")
		}
		if slices.ContainsFunc(s.tokens[from:s.i], func(t token) bool { return t.text == "order" }) {
			return nil
		}
		s.i++
	}
	return n
}
