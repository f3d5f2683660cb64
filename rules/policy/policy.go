package policy

import (
	"errors"
	"fmt"
	"io"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strings"

	"github.com/BurntSushi/toml"

	"dextral/rules"
)

// Names are the names under which a policy is found at the root of a tree.
var Names = []string{"dextral.toml", ".dextral.toml"}

// maxSize bounds the text of a policy. A sheet with a thousand waivers has
// about 200 kB.
const maxSize = 4 << 20

// Policy is what a repository's conventions sheet says. It is not changed after
// it was read and may be used concurrently.
type Policy struct {
	Path    string // as it was given; "" for the default
	Gate    Gate
	Waivers []*rules.Waiver // in the order of the file

	root     root
	exclude  []glob
	defaults rules.Claims
	claims   []claim
	frames   map[string]Frame // by name
	rigs     []rig
	accepted []waiver  // beside Waivers
	files    []located // files of more waivers, as the sheet names them
}

// Gate is the mildest level at which a finding fails an audit.
type Gate uint8

// The gates; the zero value is the default.
const (
	GateError Gate = iota
	GateWarning
	GateNote
	GateNever
)

var gateNames = []string{"error", "warning", "note", "never"}

// String names the gate as dextral.toml does.
func (g Gate) String() string { return gateNames[g] }

// MarshalText writes the name, so that machine formats carry it.
func (g Gate) MarshalText() ([]byte, error) { return []byte(g.String()), nil }

// ParseGate reads a gate's name.
func ParseGate(s string) (Gate, bool) {
	i := slices.Index(gateNames, s)
	return Gate(max(i, 0)), i >= 0
}

// GateNames lists the names that ParseGate knows.
func GateNames() []string { return slices.Clone(gateNames) }

// Fails reports whether a finding of this level fails the audit.
func (g Gate) Fails(l rules.Level) bool {
	switch g {
	case GateError:
		return l >= rules.Error
	case GateWarning:
		return l >= rules.Warning
	case GateNote:
		return true
	}
	return false
}

// rig is a group of files that speak of the same frames.
type rig struct {
	name  string
	files []glob
}

// Default is the policy of a tree without dextral.toml: nothing is declared,
// excluded or waived, and errors fail.
func Default() *Policy { return &Policy{} }

// Find looks for a policy file in a directory. It returns "" if there is none,
// and an error if there are two.
func Find(dir string) (string, error) {
	found := ""
	for _, name := range Names {
		p := path.Join(filepath.ToSlash(dir), name)
		info, err := os.Stat(p)
		if errors.Is(err, os.ErrNotExist) {
			continue
		}
		if err != nil {
			return "", err
		}
		switch {
		case info.IsDir():
			return "", fmt.Errorf("%s: is a directory; the conventions sheet of a tree has this name", p)
		case found != "":
			return "", fmt.Errorf("%s: there is %s too; keep one of them", p, found)
		}
		found = p
	}
	return found, nil
}

// Load reads a policy file. The known rule names are those that waivers may
// name. Errors about the text are of type Errors.
func Load(file string, known []string) (*Policy, error) {
	text, err := readBounded(file)
	if err != nil {
		return nil, err
	}
	p, err := Parse(file, text, known)
	if err == nil {
		err = p.ReadWaivers(known, readBounded)
	}
	if err != nil {
		return nil, err
	}
	return p, nil
}

// readBounded reads a file unless it is larger than any sheet.
func readBounded(file string) ([]byte, error) {
	f, err := os.Open(filepath.FromSlash(file))
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, maxSize+1))
}

// Parse reads the text of a policy file of the given name. Its globs are
// relative to the directory of that name. Files of waivers that it names are not
// read: see ReadWaivers.
func Parse(name string, text []byte, known []string) (*Policy, error) {
	name = path.Clean(filepath.ToSlash(name))
	if len(text) > maxSize {
		return nil, Errors{{rules.Place{Path: name}, fmt.Sprintf("is larger than %d bytes; it is not read", maxSize)}}
	}
	where, err := newRoot(name)
	if err != nil {
		return nil, fmt.Errorf("%s: the directory in which the command was started is not known: %w", name, err)
	}
	p := &Policy{Path: name, root: where}
	if errs := parseText(name, text, known, p.read); errs != nil {
		return nil, errs
	}
	return p, nil
}

// parseText decodes a text and hands its top table to read. It returns nil or all
// that is wrong.
func parseText(name string, text []byte, known []string, read func(*table)) error {
	source := strings.TrimPrefix(string(text), "\ufeff")                                // a byte order mark takes no column
	if strings.HasPrefix(source, "\xff\xfe") || strings.HasPrefix(source, "\xfe\xff") { // which the library takes for white space
		return Errors{{rules.Place{Path: name, Line: 1, Column: 1}, "is not TOML: it is UTF-16; save it as UTF-8"}}
	}
	r := &reader{lines: newLines(name, source), known: known}
	var vals map[string]any
	if _, err := toml.Decode(source, &vals); err != nil {
		return Errors{r.syntax(err)}
	}
	read(&table{r: r, vals: vals, node: locate(source)})
	if len(r.errs) > 0 {
		r.errs.sort()
		return r.errs
	}
	return nil
}

// rel is the path relative to the policy's directory; false if it is not below
// it, or if there is no policy file.
func (p *Policy) rel(file string) (string, bool) {
	if p.Path == "" {
		return "", false
	}
	return p.root.rel(file)
}

// Excluded reports whether a file or directory is not to be audited: an
// excluded directory excludes all that is below it.
func (p *Policy) Excluded(file string) bool {
	rel, ok := p.rel(file)
	return ok && rel != "." && slices.ContainsFunc(p.exclude, func(g glob) bool { return g.covers(rel) })
}

// Frames are the frames whose axes are declared, by name. They hold in every file.
func (p *Policy) Frames() map[string]Frame { return p.frames }

// RigOf is the name of the rig to which a file belongs, or "". If several rigs
// claim it, it belongs to the first one.
func (p *Policy) RigOf(file string) string {
	rel, ok := p.rel(file)
	if !ok {
		return ""
	}
	for _, r := range p.rigs {
		if anyMatches(r.files, rel) {
			return r.name
		}
	}
	return ""
}

func anyMatches(globs []glob, rel string) bool {
	return slices.ContainsFunc(globs, func(g glob) bool { return g.matches(rel) })
}
