package literal

import (
	"go/ast"
	"go/token"
	"go/types"
	"regexp"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/claims"
	"dextral/analyzers/source"
	"dextral/rules"
)

// walker goes through the files of one package.
type walker struct {
	pass     *analysis.Pass
	result   *Result
	sources  map[*token.File]*source.File
	altered  map[types.Object]bool
	declared map[types.Object][]*ast.CommentGroup

	// of the file at hand
	base     *token.File
	inTest   bool
	keys     map[string]int            // how often each key was given away
	lines    map[int]*ast.CommentGroup // comments by the line on which they end
	names    map[string]*claims.Name   // by text
	comments map[*ast.CommentGroup]*claims.Comment
	values   []*rules.Value
	stems    map[*rules.Value]twin
}

// A site is a place in the program that names a value: a variable, a field, an
// element, a function's result.
type site struct {
	key      string              // place in the structure: DefaultRig.Cameras.front.Mount
	group    string              // the struct literal or scope whose members may describe each other; alone for none
	labels   []label             // names that speak about the value, the nearest first
	comments []*ast.CommentGroup // doc comment, comment on the line, comments on the declaration of its field
	onType   []*ast.CommentGroup // comments on the declaration of its type
	object   types.Object        // the variable, if it is one
	loose    bool                // nothing names it: an argument or an operand
	normal   bool                // it is made unit at once
	denied   bool                // it stands under a name that says that nothing below is an orientation
}

// label is a name, and where it stands.
type label struct {
	text string
	at   span // empty for names that stand elsewhere, such as those of types
	kind labelKind
	name *claims.Name // what it says; set by walker.speech
}

// labelKind says what a label names.
type labelKind uint8

const (
	ofValue   labelKind = iota // the variable, field, key or function
	ofOuter                    // what the value is wrapped in, or the list it is an element of
	ofType                     // the value's type
	ofPackage                  // the package that declares the type
)

// enter walks one file.
func (w *walker) enter(f *ast.File) {
	w.base = w.pass.Fset.File(f.FileStart)
	w.inTest = strings.HasSuffix(w.base.Name(), "_test.go")
	w.keys = map[string]int{}
	w.lines = map[int]*ast.CommentGroup{}
	w.names = map[string]*claims.Name{}
	w.comments = map[*ast.CommentGroup]*claims.Comment{}
	w.values, w.stems = nil, map[*rules.Value]twin{}
	for _, group := range f.Comments {
		w.lines[w.line(group.End())] = group
	}
	for _, decl := range f.Decls {
		switch d := decl.(type) {
		case *ast.GenDecl:
			w.declaration(d, "")
		case *ast.FuncDecl:
			if d.Body != nil {
				w.function(d.Name, d.Type, d.Body, functionKey(d), d.Doc)
			}
		}
	}
	w.pair()
	w.result.Values = append(w.result.Values, w.values...)
}

func (w *walker) line(pos token.Pos) int { return w.base.PositionFor(pos, false).Line }

// functionKey is Name or Receiver.Name.
func functionKey(d *ast.FuncDecl) string {
	if d.Recv == nil || len(d.Recv.List) == 0 {
		return d.Name.Name
	}
	return types.ExprString(unstar(d.Recv.List[0].Type)) + "." + d.Name.Name
}

func unstar(e ast.Expr) ast.Expr {
	if star, ok := e.(*ast.StarExpr); ok {
		return star.X
	}
	return e
}

// declaration walks var and const declarations; prefix is the key of the
// function around it.
func (w *walker) declaration(d *ast.GenDecl, prefix string) {
	if d.Tok != token.VAR && d.Tok != token.CONST {
		return
	}
	var scalars []member
	for _, spec := range d.Specs {
		v, ok := spec.(*ast.ValueSpec)
		if !ok || len(v.Values) != len(v.Names) {
			if ok {
				w.operands(prefix, v.Values...)
			}
			continue
		}
		for i, name := range v.Names {
			s := w.variable(name, prefix)
			s.comments = present(v.Doc, v.Comment)
			if len(d.Specs) == 1 {
				s.comments = append(s.comments, present(d.Doc)...)
			}
			scalars = append(scalars, member{name.Name, name, v.Values[i], s.comments})
			w.value(s, v.Values[i])
		}
	}
	w.scattered(site{key: prefix, group: prefix}, scalars)
}

// variable is the site of a named variable. Variables of one function, and
// those of the package in one file, may describe each other.
func (w *walker) variable(name *ast.Ident, prefix string) site {
	return site{
		key: join(prefix, name.Name), group: prefix, object: w.pass.TypesInfo.ObjectOf(name),
		labels: []label{nameLabel(name)},
	}
}

func nameLabel(name *ast.Ident) label {
	return label{text: name.Name, at: span{name.Pos(), name.End()}}
}

func present(groups ...*ast.CommentGroup) []*ast.CommentGroup {
	var list []*ast.CommentGroup
	for _, g := range groups {
		if g != nil {
			list = append(list, g)
		}
	}
	return list
}

func join(prefix, name string) string {
	if prefix == "" {
		return name
	}
	return prefix + "." + name
}

// function walks a function's body. Results carry its name.
func (w *walker) function(name *ast.Ident, signature *ast.FuncType, body *ast.BlockStmt, key string, doc *ast.CommentGroup) {
	ast.Inspect(body, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.GenDecl:
			w.declaration(n, key)
		case *ast.AssignStmt:
			w.assignment(n, key)
		case *ast.ReturnStmt:
			w.results(n, name, signature, key, doc)
		case *ast.FuncLit:
			w.function(nil, n.Type, n.Body, key, nil)
		case ast.Expr:
			w.value(site{key: key, loose: true}, n)
		default:
			return true
		}
		return false
	})
}

// assignment walks x = y and x := y; the operands of x += y name nothing.
func (w *walker) assignment(n *ast.AssignStmt, key string) {
	if len(n.Lhs) != len(n.Rhs) || n.Tok != token.ASSIGN && n.Tok != token.DEFINE {
		w.operands(key, n.Rhs...)
		return
	}
	for i, left := range n.Lhs {
		var s site
		switch x := ast.Unparen(left).(type) {
		case *ast.Ident:
			s = w.variable(x, key)
			if n.Tok == token.ASSIGN {
				s.group = alone // one of the values it has in turn
			}
		case *ast.SelectorExpr:
			s = site{key: join(key, types.ExprString(x)), group: alone,
				labels: []label{nameLabel(x.Sel)}}
		case *ast.IndexExpr:
			s = site{key: join(key, types.ExprString(x)), group: alone, labels: []label{
				{text: w.keyText(x.Index), at: span{x.Index.Pos(), x.Index.End()}},
				{text: types.ExprString(x.X), at: span{x.X.Pos(), x.X.End()}, kind: ofOuter}}}
		default:
			s = site{key: key, loose: true}
		}
		s.comments = w.beside(n)
		w.value(s, n.Rhs[i])
	}
}

// beside is the comment on the statement's last line and the one that ends just above it.
func (w *walker) beside(n ast.Node) []*ast.CommentGroup {
	var above *ast.CommentGroup
	if group := w.lines[w.line(n.Pos())-1]; group != nil && w.startsLine(group.Pos()) {
		above = group
	}
	return present(w.lines[w.line(n.End())], above)
}

// results walks a return statement: a function's name speaks about what it
// returns, its doc comment does as well.
func (w *walker) results(n *ast.ReturnStmt, name *ast.Ident, signature *ast.FuncType, key string, doc *ast.CommentGroup) {
	for i, e := range n.Results {
		s := site{key: key, loose: true}
		if name != nil && i == 0 && w.single(n, signature) && w.orients(name.Name) {
			s = site{key: key, group: alone, comments: append(w.beside(n), present(doc)...), labels: []label{nameLabel(name)}}
		}
		w.value(s, e)
	}
}

// single reports a function of one result, and perhaps an error or a boolean:
// what its name says is then said of that result.
func (w *walker) single(n *ast.ReturnStmt, signature *ast.FuncType) bool {
	if len(n.Results) != signature.Results.NumFields() || len(n.Results) > 2 {
		return false
	}
	if len(n.Results) == 1 {
		return true
	}
	last := signature.Results.List[len(signature.Results.List)-1].Type
	id, ok := last.(*ast.Ident)
	return ok && (id.Name == "error" || id.Name == "bool")
}

// orients reports a function's name that says what it returns.
func (w *walker) orients(name string) bool {
	n := w.nameOf(name)
	return n.Orients() || saysMount(n) || n.Form(claims.Nine).Form != 0 || n.Form(claims.Three).Form != 0
}

// operands walks expressions that nothing names.
func (w *walker) operands(key string, list ...ast.Expr) {
	for _, e := range list {
		w.value(site{key: key, loose: true}, e)
	}
}

// value walks an expression that a site names.
func (w *walker) value(s site, e ast.Expr) {
	switch x := e.(type) {
	case *ast.ParenExpr:
		w.value(s, x.X)
	case *ast.UnaryExpr:
		if x.Op != token.AND {
			s = site{key: s.key, loose: true}
		}
		w.value(s, x.X)
	case *ast.CompositeLit:
		w.literal(s, x)
	case *ast.CallExpr:
		w.call(s, x)
	case *ast.FuncLit:
		w.function(nil, x.Type, x.Body, s.key, nil)
	default:
		ast.Inspect(e, func(n ast.Node) bool {
			if inner, ok := n.(ast.Expr); ok && inner != e {
				w.value(site{key: s.key, loose: true}, inner)
				return false
			}
			return true
		})
	}
}

// call walks a call. A conversion is its operand, under one more name; what is
// normalised at once is not judged; arguments and receivers are operands.
func (w *walker) call(s site, x *ast.CallExpr) {
	if tv, ok := w.pass.TypesInfo.Types[x.Fun]; ok && tv.IsType() && len(x.Args) == 1 {
		s.labels = append(s.labels, typeLabels(tv.Type)...)
		w.value(s, x.Args[0])
		return
	}
	if w.constructed(s, x) {
		return
	}
	inner := site{key: s.key, loose: true}
	if normalises(x.Fun) {
		inner.normal, inner.labels = true, s.labels
	}
	for _, arg := range x.Args {
		w.value(inner, arg)
	}
	if selector, ok := x.Fun.(*ast.SelectorExpr); ok {
		w.value(inner, selector.X)
	} else {
		w.value(inner, x.Fun)
	}
}

var constructor = regexp.MustCompile(`^(\w+\.)?New(Dense|Mat|Matrix)([34]|[34]x[34])?(Data|From\w+)?$`)

// constructed reads a matrix that a constructor makes of a list of numbers:
// mat.NewDense(3, 3, []float64{...}), r3.NewMat([]float64{...}). It is false
// for any other call.
func (w *walker) constructed(s site, x *ast.CallExpr) bool {
	if s.loose || len(x.Args) == 0 || !constructor.MatchString(types.ExprString(x.Fun)) {
		return false
	}
	lit, ok := x.Args[len(x.Args)-1].(*ast.CompositeLit)
	if !ok || !isNumbers(w.typeOf(lit)) {
		return false
	}
	for _, size := range x.Args[:len(x.Args)-1] {
		if n, ok := w.fold(size); !ok || n != 3 && n != 4 {
			return false
		}
	}
	return w.matrix(s, lit)
}
