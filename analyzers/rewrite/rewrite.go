// Package rewrite changes files of the user so that nothing is ever half done.
//
// A file is replaced only if it still holds what was read; it keeps its mode;
// behind a symbolic link the target is replaced and the link stays; one that is
// write-protected is left alone. The new text is written beside the old one under
// another name, brought to the disk, and renamed over it: whoever reads sees the
// old text or the new one. Where anything fails, the file is as it was.
package rewrite

import (
	"crypto/sha256"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
)

// Sum identifies a text.
type Sum [sha256.Size]byte

// SumOf identifies a text.
func SumOf(text []byte) Sum { return sha256.Sum256(text) }

// ErrChanged says that a file holds another text than the one that was read.
var ErrChanged = errors.New("has changed since it was read; nothing was written; run the command again")

// Replace writes a text over a file that was read as one with the given sum. Its
// errors name no path.
func Replace(name string, was Sum, now []byte) error {
	target, err := filepath.EvalSymlinks(name)
	if err != nil {
		return bare(err)
	}
	info, err := os.Stat(target)
	switch {
	case err != nil:
		return bare(err)
	case !info.Mode().IsRegular():
		return errors.New("is no regular file; it is left as it is")
	case info.Mode().Perm()&0o222 == 0:
		return errors.New("is write-protected; it is left as it is")
	}
	if err := holds(target, was); err != nil {
		return err
	}
	temp, err := write(filepath.Dir(target), now, info.Mode())
	if err != nil {
		return err
	}
	defer os.Remove(temp) // does nothing once it is renamed
	if err := holds(target, was); err != nil {
		return err
	}
	return finish(temp, target)
}

// Create writes a file that is not there yet.
func Create(name string, text []byte) error {
	if _, err := os.Lstat(name); err == nil {
		return errors.New("is there already; it is left as it is")
	} else if !errors.Is(err, fs.ErrNotExist) {
		return bare(err)
	}
	temp, err := write(filepath.Dir(name), text, 0o644)
	if err != nil {
		return err
	}
	defer os.Remove(temp)
	// A link fails where a file appeared in the meantime; a rename would not.
	if err := os.Link(temp, name); err == nil {
		return nil
	} else if errors.Is(err, fs.ErrExist) {
		return errors.New("is there already; it is left as it is")
	}
	return finish(temp, name) // a file system without links
}

func holds(name string, was Sum) error {
	text, err := os.ReadFile(name)
	if err != nil {
		return bare(err)
	}
	if SumOf(text) != was {
		return ErrChanged
	}
	return nil
}

// write makes a file of the given mode beside where it is going to be.
func write(dir string, text []byte, mode fs.FileMode) (string, error) {
	f, err := os.CreateTemp(dir, ".dextral-*")
	if err != nil {
		return "", fmt.Errorf("cannot be written: %w", bare(err))
	}
	_, err = f.Write(text)
	err = errors.Join(err, f.Chmod(mode), f.Sync(), f.Close())
	if err != nil {
		os.Remove(f.Name())
		return "", fmt.Errorf("cannot be written: %w", bare(err))
	}
	return f.Name(), nil
}

func finish(temp, name string) error {
	if err := os.Rename(temp, name); err != nil {
		return fmt.Errorf("cannot be written: %w", err)
	}
	if d, err := os.Open(filepath.Dir(name)); err == nil { // the name on the disk too, where directories can be synced
		_ = d.Sync()
		d.Close()
	}
	return nil
}

// bare drops the path that callers name themselves.
func bare(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}
