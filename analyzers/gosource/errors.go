package gosource

import (
	"errors"
	"io/fs"
	"maps"
	"os/exec"
	"slices"
	"strings"
)

// noGo reports whether the go command could not be started at all.
func noGo(err error) bool {
	return errors.Is(err, exec.ErrNotFound) || strings.Contains(err.Error(), "executable file not found")
}

// oneLine keeps what the go command says to one line: the first that is not
// its own echo of the command.
func oneLine(err error) error {
	for line := range strings.Lines(err.Error()) {
		line = strings.TrimSpace(strings.TrimPrefix(strings.TrimSpace(line), "err: exit status 1: stderr:"))
		if line != "" && !strings.HasPrefix(line, "go: downloading ") {
			return errors.New(line)
		}
	}
	return err
}

// reason is an error without the path that its place already names.
func reason(err error) error {
	var path *fs.PathError
	if errors.As(err, &path) {
		return path.Err
	}
	return err
}

func sortedKeys[V any](m map[string]V) []string { return slices.Sorted(maps.Keys(m)) }
