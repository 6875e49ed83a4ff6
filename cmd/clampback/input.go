package main

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"iter"
	"os"
	"path/filepath"
	"time"

	"github.com/schollz/progressbar/v3"
	"github.com/spf13/cobra"

	"clampback/planner"
	"clampback/planner/register"
)

// readJoints reads every register named on the command line.
func readJoints(c *cobra.Command, files []string) ([]planner.Joint, error) {
	sources := make([]register.Source, 0, len(files))
	stdin := false
	for _, name := range files {
		if name == "-" {
			if stdin {
				return nil, mendable("name \"-\" once", "standard input is named twice")
			}
			stdin = true
		}
		source, err := openSource(c.Context(), c.InOrStdin(), name)
		if err != nil {
			return nil, err
		}
		sources = append(sources, source)
	}
	return register.Read(sources...)
}

func openSource(ctx context.Context, stdin io.Reader, name string) (register.Source, error) {
	if name == "-" {
		return readInput(ctx, stdin)
	}
	f, err := os.Open(name)
	if err != nil {
		return register.Source{}, mendable("check the file's name and whether you may read it", "%w", err)
	}
	defer f.Close()
	if info, err := f.Stat(); err == nil && info.IsDir() {
		return register.Source{}, mendable("name the register files in it", "%s is a folder", name)
	}
	source, err := register.ReadSource(f, name)
	source.Open = beside(filepath.Dir(name))
	return source, err
}

// readInput reads standard input, and gives up waiting for it when the program is
// interrupted: a read from a terminal cannot be cut short.
func readInput(ctx context.Context, stdin io.Reader) (register.Source, error) {
	type result struct {
		source register.Source
		err    error
	}
	done := make(chan result, 1)
	go func() {
		source, err := register.ReadSource(stdin, "standard input")
		done <- result{source, err}
	}()
	select {
	case r := <-done:
		return r.source, r.err
	case <-ctx.Done():
		return register.Source{}, ctx.Err()
	}
}

// maxBeside is the largest file that a register may name, bytes.
const maxBeside = 200 << 20

// beside returns how files that a register names are read. Relative names count
// from the register's folder. Absolute ones, and those that lead out of the folder,
// are as good: a plant may keep its finite-element results elsewhere, and whoever
// runs clampback may read them.
func beside(folder string) func(name string) ([]byte, error) {
	return func(name string) ([]byte, error) {
		if !filepath.IsAbs(name) {
			name = filepath.Join(folder, name)
		}
		info, err := os.Stat(name) // before opening: a pipe would wait for its writer
		switch {
		case err != nil:
			return nil, fileError(name, err)
		case !info.Mode().IsRegular():
			return nil, fmt.Errorf("%s is no file", name)
		case info.Size() > maxBeside:
			return nil, tooLarge(name)
		}
		f, err := os.Open(name)
		if err != nil {
			return nil, fileError(name, err)
		}
		defer f.Close()
		data := bytes.NewBuffer(make([]byte, 0, info.Size()+bytes.MinRead))
		if _, err := data.ReadFrom(io.LimitReader(f, maxBeside+1)); err != nil {
			return nil, fileError(name, err)
		}
		if data.Len() > maxBeside { // it grew
			return nil, tooLarge(name)
		}
		return data.Bytes(), nil
	}
}

func tooLarge(name string) error { return fmt.Errorf("%s is larger than %d MB", name, maxBeside>>20) }

// fileError says which file and why, without the system call.
func fileError(name string, err error) error {
	var e *fs.PathError
	if errors.As(err, &e) {
		err = e.Err
	}
	return fmt.Errorf("%s: %w", name, err)
}

// planEach plans the joints one by one as they are asked for, with a progress bar
// when that takes its time.
func planEach(c *cobra.Command, joints []planner.Joint) iter.Seq2[planner.Plan, error] {
	return func(yield func(planner.Plan, error) bool) {
		bar := newProgress(c.ErrOrStderr(), len(joints), "planning")
		if isTerminal(c.OutOrStdout()) && c.Name() == "plan" {
			bar.out = nil // the results themselves move on the screen
		}
		defer bar.done()
		for _, joint := range joints {
			plan, err := planner.Work(joint)
			if err == nil {
				err = c.Context().Err()
			}
			if !yield(plan, err) || err != nil {
				return
			}
			bar.step()
		}
	}
}

// planFiles reads and plans the registers of a command line.
func planFiles(c *cobra.Command, files []string) ([]planner.Plan, error) {
	joints, err := readJoints(c, files)
	if err != nil {
		return nil, err
	}
	plans := make([]planner.Plan, 0, len(joints))
	for plan, err := range planEach(c, joints) {
		if err != nil {
			return nil, err
		}
		plans = append(plans, plan)
	}
	return plans, nil
}

// verdict returns errInfeasible when some joint is infeasible.
func verdict(plans []planner.Plan) error {
	for _, p := range plans {
		if !p.Feasible {
			return errInfeasible
		}
	}
	return nil
}

// progress is a bar on a terminal that appears after a second; elsewhere it is
// nothing.
type progress struct {
	start time.Time
	total int
	made  int
	label string
	out   io.Writer
	bar   *progressbar.ProgressBar
}

func newProgress(w io.Writer, total int, label string) *progress {
	p := &progress{start: time.Now(), total: total, label: label}
	if isTerminal(w) {
		p.out = w
	}
	return p
}

func (p *progress) step() {
	p.made++
	if p.out == nil || time.Since(p.start) < time.Second {
		return
	}
	if p.bar == nil {
		p.bar = progressbar.NewOptions(p.total,
			progressbar.OptionSetWriter(p.out),
			progressbar.OptionSetDescription(p.label),
			progressbar.OptionThrottle(100*time.Millisecond),
			progressbar.OptionClearOnFinish())
	}
	// A bar that cannot be drawn must not end the work.
	_ = p.bar.Set(p.made)
}

func (p *progress) done() {
	if p.bar != nil {
		_ = p.bar.Finish()
	}
}

// stoppable is a writer that fails once the context ends, so that Ctrl-C stops
// a long document too.
type stoppable struct {
	ctx context.Context
	w   io.Writer
}

func (s stoppable) Write(b []byte) (int, error) {
	if err := s.ctx.Err(); err != nil {
		return 0, err
	}
	return s.w.Write(b)
}
