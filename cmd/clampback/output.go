package main

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// batch writes files so that either all of them appear or none: each goes into
// a folder beside its place first, and Commit puts them there. Until then the old
// files stand untouched, and a Commit that fails half way restores them.
type batch struct {
	ctx     context.Context
	dir     string   // where the files shall be
	made    []string // folders made for this batch, the outermost first
	staging string   // where the files are until Commit
	names   []string // files to put in place
	stale   []string // files to take away: they must not outlive what replaced them
}

// newBatch prepares to write into dir, which is made when it is missing.
func newBatch(ctx context.Context, dir string) (*batch, error) {
	b := &batch{ctx: ctx, dir: dir}
	for d := dir; ; d = filepath.Dir(d) {
		if _, err := os.Stat(d); !errors.Is(err, fs.ErrNotExist) || d == filepath.Dir(d) {
			break
		}
		b.made = append([]string{d}, b.made...)
	}
	err := os.MkdirAll(dir, 0o755)
	if err == nil {
		b.staging, err = os.MkdirTemp(dir, ".clampback-")
	}
	if err != nil {
		b.Close()
		return nil, mendable("name a folder that you may write to", "%w", err)
	}
	return b, nil
}

// Write stages one file.
func (b *batch) Write(name string, write func(io.Writer) error) error {
	f, err := os.OpenFile(b.staged(name), os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o644)
	if err != nil {
		return err
	}
	buffer := bufio.NewWriterSize(stoppable{b.ctx, f}, 1<<16)
	err = write(buffer)
	if err == nil {
		err = buffer.Flush()
	}
	if err == nil {
		err = f.Sync()
	}
	if closed := f.Close(); err == nil {
		err = closed
	}
	if err != nil {
		return fmt.Errorf("writing %s: %w", b.placed(name), err)
	}
	b.names = append(b.names, name)
	return nil
}

// Remove takes a file away on Commit, if it is there. It returns whether it is.
func (b *batch) Remove(name string) bool {
	if _, err := os.Lstat(b.placed(name)); err != nil {
		return false
	}
	b.stale = append(b.stale, name)
	return true
}

func (b *batch) placed(name string) string { return filepath.Join(b.dir, name) }
func (b *batch) staged(name string) string { return filepath.Join(b.staging, name) }
func (b *batch) kept(name string) string   { return filepath.Join(b.staging, name+".old") }

// Commit puts every staged file in its place and takes the stale ones away. What
// is in the way is found before anything moves.
func (b *batch) Commit() error {
	if err := b.ctx.Err(); err != nil {
		return err
	}
	for _, name := range append(b.names[:len(b.names):len(b.names)], b.stale...) {
		if err := plainFile(b.placed(name)); err != nil {
			return err
		}
	}
	for i, name := range append(b.stale[:len(b.stale):len(b.stale)], b.names...) {
		if err := b.replace(name, i < len(b.stale)); err != nil {
			b.restore()
			return fmt.Errorf("putting %s in place: %w", b.placed(name), err)
		}
	}
	b.made = nil // now they hold something
	return nil
}

// replace moves the old file aside, and the new one in unless the file is stale.
func (b *batch) replace(name string, stale bool) error {
	info, err := os.Lstat(b.placed(name))
	switch {
	case err == nil && stale:
		return os.Rename(b.placed(name), b.kept(name))
	case err == nil:
		// A second name for the old file keeps it for restore, and leaves it in
		// place until the very moment the new one takes it. Not every file system
		// has second names; then the old file is simply replaced.
		_ = os.Link(b.placed(name), b.kept(name))
		if err := os.Chmod(b.staged(name), info.Mode().Perm()); err != nil {
			return err
		}
	case !errors.Is(err, fs.ErrNotExist):
		return err
	}
	return os.Rename(b.staged(name), b.placed(name))
}

// restore puts the old files back after a Commit that failed half way, and takes
// away new ones that had no old.
func (b *batch) restore() {
	for _, name := range append(b.stale[:len(b.stale):len(b.stale)], b.names...) {
		if _, err := os.Lstat(b.kept(name)); err == nil {
			// What cannot be restored stays as the failed Commit left it; its error
			// is the one to report.
			_ = os.Rename(b.kept(name), b.placed(name))
			continue
		}
		if _, err := os.Lstat(b.staged(name)); errors.Is(err, fs.ErrNotExist) {
			_ = os.Remove(b.placed(name))
		}
	}
}

// Close removes what is left of the staging, and the folders made for nothing.
func (b *batch) Close() {
	// What cannot be removed is a hidden folder without effect on any result.
	if b.staging != "" {
		_ = os.RemoveAll(b.staging)
	}
	for i := len(b.made) - 1; i >= 0; i-- {
		_ = os.Remove(b.made[i])
	}
}

// plainFile returns an error when something other than a file stands at a path.
func plainFile(path string) error {
	info, err := os.Lstat(path)
	if errors.Is(err, fs.ErrNotExist) {
		return nil
	}
	if err != nil {
		return mendable("name another place", "%w", err)
	}
	if !info.Mode().IsRegular() {
		return mendable("name another place, or move it away", "%s is no plain file and is not replaced", path)
	}
	return nil
}

// writeFile writes one file whole or not at all, and never over an input.
func writeFile(ctx context.Context, path string, inputs []string, write func(io.Writer) error) error {
	path, err := outputPath(path, inputs)
	if err != nil {
		return err
	}
	b, err := newBatch(ctx, filepath.Dir(path))
	if err != nil {
		return err
	}
	defer b.Close()
	if err := b.Write(filepath.Base(path), write); err != nil {
		return err
	}
	return b.Commit()
}

// removeFile takes an output away that must not outlive what it showed. It
// returns whether it was there.
func removeFile(ctx context.Context, path string, inputs []string) (bool, error) {
	path, err := outputPath(path, inputs)
	if err != nil {
		return false, err
	}
	if _, err := os.Lstat(path); errors.Is(err, fs.ErrNotExist) {
		return false, nil
	}
	b, err := newBatch(ctx, filepath.Dir(path))
	if err != nil {
		return false, err
	}
	defer b.Close()
	there := b.Remove(filepath.Base(path))
	return there, b.Commit()
}

// outputPath follows links and refuses a path that is an input, a folder, a device.
func outputPath(path string, inputs []string) (string, error) {
	if target, err := filepath.EvalSymlinks(path); err == nil {
		path = target
	}
	for _, input := range inputs {
		if sameFile(path, input) {
			return "", mendable("name another output file", "%s is an input and cannot be the output too", path)
		}
	}
	if info, err := os.Stat(path); err == nil && info.IsDir() {
		return "", mendable("name a file in it", "%s is a folder", path)
	}
	return path, plainFile(path)
}

func sameFile(path, input string) bool {
	x, err := os.Stat(path)
	if err != nil {
		return false
	}
	y, err := os.Stat(input)
	if input == "-" {
		y, err = os.Stdin.Stat()
	}
	return err == nil && os.SameFile(x, y)
}
