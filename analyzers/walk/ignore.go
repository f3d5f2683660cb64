package walk

import (
	"bufio"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"github.com/go-git/go-git/v5/plumbing/format/gitignore"
)

// ignores is what the ignore files from the root of the repository down to one
// directory say. It is never changed, only extended.
type ignores struct {
	patterns []gitignore.Pattern
}

// enter adds the ignore files of a directory that lies below all those
// already entered.
func (ig ignores) enter(dir string) ignores {
	added := readPatterns(filepath.Join(dir, ".git", "info", "exclude"), dir)
	added = append(added, readPatterns(filepath.Join(dir, ".gitignore"), dir)...)
	if len(added) == 0 {
		return ig
	}
	return ignores{append(slices.Clip(ig.patterns), added...)}
}

// match reports whether version control ignores the path. Parents need no
// check: an ignored directory is never entered.
func (ig ignores) match(name string, dir bool) bool {
	if len(ig.patterns) == 0 {
		return false
	}
	return gitignore.NewMatcher(ig.patterns).Match(elements(name), dir)
}

func readPatterns(file, dir string) []gitignore.Pattern {
	f, err := os.Open(file)
	if err != nil {
		return nil // no ignore file, or none that we may read: nothing is ignored
	}
	defer f.Close()
	domain := elements(dir)
	var patterns []gitignore.Pattern
	lines := bufio.NewScanner(f)
	for lines.Scan() {
		line := lines.Text()
		if strings.TrimSpace(line) != "" && !strings.HasPrefix(line, "#") {
			patterns = append(patterns, gitignore.ParsePattern(line, domain))
		}
	}
	return patterns
}

func elements(name string) []string {
	name = strings.TrimPrefix(name, filepath.VolumeName(name))
	return strings.FieldsFunc(filepath.ToSlash(name), func(r rune) bool { return r == '/' })
}

// enclosingDirs lists dir and its parents, outermost first, up to the root of
// the repository that holds dir, or of the file system if none does.
func enclosingDirs(dir string) []string {
	var dirs []string
	for d := dir; ; d = filepath.Dir(d) {
		dirs = append(dirs, d)
		if _, err := os.Stat(filepath.Join(d, ".git")); err == nil || filepath.Dir(d) == d {
			break
		}
	}
	slices.Reverse(dirs)
	return dirs
}
