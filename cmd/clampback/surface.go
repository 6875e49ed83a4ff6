package main

import (
	"errors"
	"fmt"
	"io"
	"os"

	"golang.org/x/term"

	"clampback/planner/register"
)

// The rules of what a person sees:
//
//   - Results go to standard output, everything else to standard error.
//   - An error is "error: what is wrong", then "mend: how to put it right" where
//     there is a mend. A bad register prints every problem with file, line and
//     column, the line itself, and the mend.
//   - Colour only on a terminal, and never when NO_COLOR is set; it repeats what
//     the words say.
//   - A progress bar only on a terminal, and only after a second.
//   - A file is written whole or not at all.

// printError prints an error as the rules say.
func printError(w io.Writer, err error) {
	var problems *register.ProblemsError
	if errors.As(err, &problems) {
		fmt.Fprint(w, problems.Report())
		return
	}
	fmt.Fprintf(w, "error: %v\n", err)
	var m *mendError
	if errors.As(err, &m) {
		fmt.Fprintf(w, "mend: %s\n", m.mend)
	}
}

// mendError is an error of usage or of a file with its mend.
type mendError struct {
	err  error
	mend string
}

func (e *mendError) Error() string { return e.err.Error() }
func (e *mendError) Unwrap() error { return e.err }

// mendable returns an error that prints a mend under it.
func mendable(mend, format string, args ...any) error {
	return &mendError{fmt.Errorf(format, args...), mend}
}

// isTerminal reports whether w is a terminal.
func isTerminal(w io.Writer) bool {
	f, ok := w.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
}

// useColour reports whether results on w may be coloured.
func useColour(w io.Writer) bool {
	return isTerminal(w) && os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb"
}
