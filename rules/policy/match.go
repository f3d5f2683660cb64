package policy

import (
	"errors"
	"fmt"
	"path"
	"path/filepath"
	"regexp"
	"slices"
	"strings"

	"github.com/bmatcuk/doublestar/v4"
)

// glob is a pattern of paths relative to the directory of the policy.
type glob string

// parseGlob checks a pattern as somebody wrote it. "./" in front and "/" at the
// end are customary and dropped.
func parseGlob(written string) (glob, error) {
	p := strings.TrimSuffix(strings.TrimPrefix(written, "./"), "/")
	switch {
	case strings.Trim(p, "/ ") == "":
		return "", errors.New("is empty; write a path or a glob such as config/**/*.yaml")
	case strings.HasPrefix(p, "/"), filepath.IsAbs(p):
		return "", errors.New("is absolute; globs are relative to the directory of this file")
	case strings.Contains(p, `\`):
		return "", errors.New(`contains \; write / between directories on every system`)
	case strings.HasPrefix(p, "!"):
		return "", errors.New("begins with !; a glob says what it means, there are no exceptions to it")
	case p == ".." || strings.HasPrefix(p, "../") || strings.Contains(p, "/../"):
		return "", errors.New("leaves the directory of this file, where nothing is governed by it")
	case !doublestar.ValidatePattern(p):
		return "", errors.New("is not a glob; * stands for a part of a name, ** for any directories, [a-z] and {a,b} for alternatives")
	}
	return glob(path.Clean(p)), nil
}

// matches reports whether the glob matches a path.
func (g glob) matches(rel string) bool { return doublestar.MatchUnvalidated(string(g), rel) }

// covers reports whether the glob matches a path or a directory above it.
func (g glob) covers(rel string) bool {
	for i, c := range rel {
		if c == '/' && g.matches(rel[:i]) {
			return true
		}
	}
	return g.matches(rel)
}

// base is the directory, or the single file, that holds all that the glob can
// match; "." if it may match anywhere.
func (g glob) base() string {
	if !strings.ContainsAny(string(g), "*?[{") {
		return string(g)
	}
	dir, _ := doublestar.SplitPattern(string(g))
	return dir
}

// wholeTree reports whether the glob takes in directories that nobody named: it
// holds ** or begins with a wildcard element that stands for a directory.
func (g glob) wholeTree() bool {
	first, rest, _ := strings.Cut(string(g), "/")
	return slices.Contains(strings.Split(string(g), "/"), "**") || rest != "" && first == "*"
}

// keyPattern matches the dotted path of a value in the structure of its file.
type keyPattern struct {
	exp   *regexp.Regexp
	names []string // that it captures
}

// captured is a name in braces: a part of an element, as short as may be, that other
// keys of the table use by that name.
var captured = regexp.MustCompile(`\{([a-z][a-z0-9]*)\}`)

// parseKeyPattern compiles a pattern: * stands for any part of one element, an
// element ** for any number of elements, none included, and {name} for a part of one
// element that is given a name. Indices of lists are elements too, written .3 or [3].
func parseKeyPattern(written string) (keyPattern, error) {
	var k keyPattern
	for _, m := range captured.FindAllStringSubmatch(written, -1) {
		if slices.Contains(k.names, m[1]) {
			return keyPattern{}, fmt.Errorf("names {%s} twice", m[1])
		}
		k.names = append(k.names, m[1])
	}
	if i := strings.IndexAny(captured.ReplaceAllString(written, ""), "{}?"); i >= 0 {
		return keyPattern{}, errors.New("contains ? or a brace; a key pattern knows *, ** and {name}, alternatives are listed one by one")
	}
	elements := keyElements(written)
	var exp strings.Builder
	exp.WriteString(`\A`)
	for _, e := range elements {
		switch {
		case strings.TrimSpace(e) == "":
			return keyPattern{}, errors.New("has an empty element; write elements with one dot between them, such as cameras.*.q")
		case e == "**":
			exp.WriteString(`(?:[^.]*\.)*`)
		case strings.Contains(e, "**"):
			return keyPattern{}, errors.New("has ** beside other characters; ** is an element of its own")
		default:
			e = strings.ReplaceAll(regexp.QuoteMeta(e), `\*`, `[^.]*`)
			exp.WriteString(escapedName.ReplaceAllString(e, `(?P<$1>[^.]+?)`) + `\.`)
		}
	}
	exp.WriteString(`\z`)
	compiled, err := regexp.Compile(exp.String())
	if err != nil {
		return keyPattern{}, fmt.Errorf("cannot be compiled: %w", err)
	}
	k.exp = compiled
	return k, nil
}

// escapedName is a captured name after its pattern was quoted for a regular expression.
var escapedName = regexp.MustCompile(`\\\{([a-z][a-z0-9]*)\\\}`)

// matches reports whether the pattern matches a key.
func (k keyPattern) matches(key string) bool {
	_, ok := k.match(key)
	return ok
}

// match reports whether the pattern matches a key, and what its names stand for.
func (k keyPattern) match(key string) (names map[string]string, ok bool) {
	found := k.exp.FindStringSubmatch(strings.Join(keyElements(key), ".") + ".")
	if found == nil {
		return nil, false
	}
	names = map[string]string{}
	for i, name := range k.exp.SubexpNames() {
		if name != "" {
			names[name] = found[i]
		}
	}
	return names, true
}

// fill puts what was captured in the place of names in braces.
func fill(text string, names map[string]string) string {
	return captured.ReplaceAllStringFunc(text, func(m string) string { return names[m[1:len(m)-1]] })
}

// keyElements splits a key into its elements: a[3].b is a, 3, b.
func keyElements(key string) []string { return strings.Split(brackets.Replace(key), ".") }

var brackets = strings.NewReplacer("[", ".", "]", "")

// root turns paths as the command sees them, relative to where it was started,
// into paths relative to the directory of the policy.
type root struct{ start, dir string } // both absolute

func newRoot(file string) (root, error) {
	start, err := filepath.Abs(".")
	if err != nil {
		return root{}, err
	}
	dir := filepath.Dir(filepath.FromSlash(file))
	if !filepath.IsAbs(dir) {
		dir = filepath.Join(start, dir)
	}
	return root{start, dir}, nil
}

// rel reports false for paths outside the directory.
func (r root) rel(slashed string) (string, bool) {
	p := filepath.FromSlash(slashed)
	if !filepath.IsAbs(p) {
		p = filepath.Join(r.start, p)
	}
	rel, err := filepath.Rel(r.dir, p)
	if err != nil || rel == ".." || strings.HasPrefix(rel, ".."+string(filepath.Separator)) {
		return "", false
	}
	return filepath.ToSlash(rel), true
}
