package revision

import (
	"bufio"
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
)

// repository is a git repository, read through the git command: it knows every
// format of objects, partial clones, attributes and line endings that the user's
// repository may have, compares 20,000 files by their stat data in milliseconds,
// and writes nothing when it is told so.
type repository struct {
	dir string // top of the working tree, as the operating system opens it
}

func open(ctx context.Context, dir string) (*repository, error) {
	if _, err := exec.LookPath("git"); err != nil {
		return nil, errors.New("the git command was not found; a review reads revisions through it")
	}
	r := &repository{dir: dir}
	top, err := r.git(ctx, nil, "rev-parse", "--show-toplevel")
	if err != nil {
		return nil, fmt.Errorf("no git repository with a working tree here: %w", err)
	}
	r.dir = filepath.FromSlash(strings.TrimRight(string(top), "\r\n"))
	return r, nil
}

// git runs a command that reads. Whatever the user has configured to make output
// pleasant or to run other programs is switched off.
func (r *repository) git(ctx context.Context, in []byte, args ...string) ([]byte, error) {
	c := exec.CommandContext(ctx, "git", append([]string{"--no-pager", "-c", "core.quotePath=false", "-c", "core.fsmonitor=false"}, args...)...)
	c.Dir = r.dir
	c.Env = environment()
	c.Stdin = bytes.NewReader(in)
	var out, errs bytes.Buffer
	c.Stdout, c.Stderr = &out, &errs
	if err := c.Run(); err != nil {
		if ctx.Err() != nil {
			return nil, ctx.Err()
		}
		return nil, fmt.Errorf("git %s: %s", args[0], firstLine(errs.String(), err))
	}
	return out.Bytes(), nil
}

func firstLine(s string, err error) string {
	if line, _, _ := strings.Cut(strings.TrimSpace(s), "\n"); line != "" {
		return strings.TrimPrefix(line, "fatal: ")
	}
	return err.Error()
}

// commit resolves a revision. In a shallow clone a missing one has an obvious
// cause, and a remedy.
func (r *repository) commit(ctx context.Context, rev string) (string, error) {
	id, err := r.git(ctx, nil, "rev-parse", "--verify", "--quiet", "--end-of-options", rev+"^{commit}")
	if err == nil {
		return strings.TrimSpace(string(id)), nil
	}
	if ctx.Err() != nil {
		return "", ctx.Err()
	}
	if shallow, err := r.git(ctx, nil, "rev-parse", "--is-shallow-repository"); err == nil && strings.TrimSpace(string(shallow)) == "true" {
		return "", fmt.Errorf("%s is not in this shallow clone; fetch it first, such as by: git fetch --depth=1 origin %s (or git fetch --unshallow)", rev, rev)
	}
	return "", fmt.Errorf("%s names no commit of this repository", rev)
}

// fork is where two revisions parted.
func (r *repository) fork(ctx context.Context, a, b string) (string, error) {
	id, err := r.git(ctx, nil, "merge-base", a, b)
	if err != nil {
		return "", fmt.Errorf("no common ancestor of %s and %s is here; in a shallow clone, fetch more of the history: %w", a, b, err)
	}
	return strings.TrimSpace(string(id)), nil
}

// Modes of a tree's entries.
const (
	noFile    = "000000"
	symlink   = "120000"
	submodule = "160000"
)

// difference is one file that differs between two versions.
type difference struct {
	oldMode, newMode string
	oldID, newID     string // blobs; newID is all zeros for a file of the working tree
	oldPath, newPath string // slashes, from the top; equal unless it was renamed
}

func (d difference) added() bool   { return d.oldMode == noFile }
func (d difference) deleted() bool { return d.newMode == noFile }

// differences lists what differs between a commit and another, or the working
// tree if head is "". New files of the working tree that version control does not
// ignore count too.
func (r *repository) differences(ctx context.Context, base, head string) ([]difference, error) {
	args := []string{"diff", "--raw", "-z", "--no-abbrev", "-M", "--no-ext-diff", "--no-textconv", "--no-color", "--no-relative", "--ignore-submodules=dirty", base}
	if head != "" {
		args = append(args, head)
	}
	out, err := r.git(ctx, nil, append(args, "--")...)
	if err != nil {
		return nil, err
	}
	list, err := parseRaw(out)
	if err != nil || head != "" {
		return list, err
	}
	others, err := r.git(ctx, nil, "ls-files", "--others", "--exclude-standard", "-z")
	for _, p := range fields(others) {
		if !strings.HasSuffix(p, "/") { // a repository within
			list = append(list, difference{oldMode: noFile, newMode: "100644", oldPath: p, newPath: p})
		}
	}
	return list, err
}

// fields splits a list whose entries end in zero bytes.
func fields(out []byte) []string {
	text := strings.TrimSuffix(string(out), "\x00")
	if text == "" {
		return nil
	}
	return strings.Split(text, "\x00")
}

// parseRaw reads git's raw format (git-diff(1), "RAW OUTPUT FORMAT") with -z:
//
//	:oldmode newmode oldid newid status NUL path NUL, and of renames a second path
func parseRaw(out []byte) ([]difference, error) {
	parts := fields(out)
	var list []difference
	for i := 0; i < len(parts); {
		head := strings.Fields(strings.TrimPrefix(parts[i], ":"))
		if len(head) != 5 || i+1 >= len(parts) {
			return nil, fmt.Errorf("git diff printed what is not understood: %q", parts[i])
		}
		d := difference{oldMode: head[0], newMode: head[1], oldID: head[2], newID: head[3], oldPath: parts[i+1], newPath: parts[i+1]}
		i += 2
		if head[4][0] == 'R' || head[4][0] == 'C' {
			if i >= len(parts) {
				return nil, fmt.Errorf("git diff printed a rename without its new path: %q", d.oldPath)
			}
			d.newPath = parts[i]
			i++
		}
		list = append(list, d)
	}
	return list, nil
}

// entry is one file of a commit's tree.
type entry struct{ mode, id, path string }

// tree lists the files of a commit.
func (r *repository) tree(ctx context.Context, commit string) ([]entry, error) {
	out, err := r.git(ctx, nil, "ls-tree", "-r", "-z", "--full-tree", commit)
	if err != nil {
		return nil, err
	}
	var list []entry
	for _, line := range fields(out) {
		head, path, ok := strings.Cut(line, "\t")
		f := strings.Fields(head)
		if !ok || len(f) != 3 {
			return nil, fmt.Errorf("git ls-tree printed what is not understood: %q", line)
		}
		list = append(list, entry{f[0], f[2], path})
	}
	return list, nil
}

// sizes asks for the sizes of blobs; -1 for one that is not here, as in a partial
// clone.
func (r *repository) sizes(ctx context.Context, ids []string) ([]int64, error) {
	if len(ids) == 0 {
		return nil, nil
	}
	out, err := r.git(ctx, []byte(strings.Join(ids, "\n")+"\n"), "cat-file", "--batch-check=%(objectsize)")
	if err != nil {
		return nil, err
	}
	var list []int64
	for line := range strings.Lines(string(out)) {
		size := int64(-1)
		_, _ = fmt.Sscan(line, &size) // "... missing" stays -1
		list = append(list, size)
	}
	if len(list) != len(ids) {
		return nil, errors.New("git cat-file did not answer for every file")
	}
	return list, nil
}

// blob is a file of a commit and where it is written.
type blob struct{ id, name string }

// write stores blobs as files, all through one git process: a stream of
// "id type size", a line feed, the bytes, and a line feed (git-cat-file(1), "BATCH
// OUTPUT").
func (r *repository) write(ctx context.Context, blobs []blob) error {
	if len(blobs) == 0 {
		return nil
	}
	ctx, cancel := context.WithCancel(ctx)
	defer cancel() // ends git where the loop below gives up
	c := exec.CommandContext(ctx, "git", "cat-file", "--batch")
	c.Dir, c.Env = r.dir, environment()
	var ids strings.Builder
	for _, b := range blobs {
		ids.WriteString(b.id + "\n")
	}
	c.Stdin = strings.NewReader(ids.String())
	out, err := c.StdoutPipe()
	if err != nil {
		return err
	}
	if err := c.Start(); err != nil {
		return err
	}
	in := bufio.NewReader(out)
	for _, b := range blobs {
		if err := copyBlob(in, b); err != nil {
			return fmt.Errorf("git cat-file: %s: %w", b.name, err)
		}
	}
	return c.Wait()
}

func copyBlob(in *bufio.Reader, b blob) error {
	head, err := in.ReadString('\n')
	if err != nil {
		return err
	}
	var id, kind string
	var size int64
	if n, _ := fmt.Sscan(head, &id, &kind, &size); n != 3 {
		return errors.New(strings.TrimSpace(head))
	}
	if err := os.MkdirAll(filepath.Dir(b.name), 0o700); err != nil {
		return err
	}
	f, err := os.Create(b.name)
	if err != nil {
		return err
	}
	_, err = io.CopyN(f, in, size)
	if closed := f.Close(); err == nil {
		err = closed
	}
	if err == nil {
		_, err = in.Discard(1)
	}
	return err
}

// environment keeps git from asking, from locking, and from other languages.
func environment() []string {
	return append(os.Environ(), "GIT_OPTIONAL_LOCKS=0", "GIT_TERMINAL_PROMPT=0", "LC_ALL=C")
}
