package main

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
)

// batch writes files so that either all of them appear or none: each goes into
// a folder beside its place first, and Commit renames them. Until then the old
// files stand untouched.
type batch struct {
	ctx     context.Context
	dir     string // where the files shall be
	staging string // where they are until Commit
	created bool   // dir was made for this batch
	names   []string
}

// newBatch prepares to write into dir, which is made when it is missing.
func newBatch(ctx context.Context, dir string) (*batch, error) {
	b := &batch{ctx: ctx, dir: dir}
	if _, err := os.Stat(dir); errors.Is(err, os.ErrNotExist) {
		b.created = true
	}
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return nil, mendable("name a folder that you may write to", "%w", err)
	}
	staging, err := os.MkdirTemp(dir, ".clampback-")
	if err != nil {
		return nil, mendable("name a folder that you may write to", "%w", err)
	}
	b.staging = staging
	return b, nil
}

// Write stages one file.
func (b *batch) Write(name string, write func(io.Writer) error) error {
	f, err := os.OpenFile(filepath.Join(b.staging, name), os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o644)
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
		return fmt.Errorf("writing %s: %w", filepath.Join(b.dir, name), err)
	}
	b.names = append(b.names, name)
	return nil
}

// Commit puts every staged file in its place.
func (b *batch) Commit() error {
	if err := b.ctx.Err(); err != nil {
		return err
	}
	for _, name := range b.names {
		if err := os.Rename(filepath.Join(b.staging, name), filepath.Join(b.dir, name)); err != nil {
			return fmt.Errorf("putting %s in place: %w", name, err)
		}
	}
	b.created = false // now it holds something
	return nil
}

// Close removes what is left of the staging; after Commit that is nothing.
func (b *batch) Close() {
	// What cannot be removed is a hidden folder without effect on any result.
	_ = os.RemoveAll(b.staging)
	if b.created {
		_ = os.Remove(b.dir)
	}
}

// writeFile writes one file whole or not at all, and never over an input.
func writeFile(ctx context.Context, path string, inputs []string, write func(io.Writer) error) error {
	for _, input := range inputs {
		if sameFile(path, input) {
			return mendable("name another output file", "%s is an input and cannot be the output too", path)
		}
	}
	if info, err := os.Stat(path); err == nil && info.IsDir() {
		return mendable("name a file in it", "%s is a folder", path)
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

func sameFile(a, b string) bool {
	x, errX := os.Stat(a)
	y, errY := os.Stat(b)
	return errX == nil && errY == nil && os.SameFile(x, y)
}
