package group

import (
	"cmp"
	"fmt"
	"slices"
	"unicode/utf8"
)

// Problem is one thing that is wrong with a table of bolt forces.
type Problem struct {
	Line    int    // from 1
	Column  int    // from 1, in characters: where the field begins
	Text    string // the line
	Message string // what is wrong
	Mend    string // how to put it right
}

// ProblemsError is every problem found in a table, by line: the first 100 of them.
type ProblemsError struct {
	File     string
	Problems []Problem
}

// Error summarises the problems in one line.
func (e *ProblemsError) Error() string {
	first, count := e.Problems[0], fmt.Sprintf("%d problems in all", len(e.Problems))
	if len(e.Problems) == mostProblems {
		count = fmt.Sprintf("%d problems or more", mostProblems)
	}
	return fmt.Sprintf("%s:%d:%d: %s (%s)", e.File, first.Line, first.Column, first.Message, count)
}

// mostProblems ends the reading: a table that is wrong throughout needs no more.
const mostProblems = 100

// at notes a problem at a byte of the line that is read.
func (r *reader) at(offset int, message, mend string) {
	if r.full() {
		return
	}
	offset = min(offset, len(r.line))
	r.problems = append(r.problems, Problem{r.number, utf8.RuneCountInString(r.line[:offset]) + 1, r.line, message, mend})
}

// full reports whether enough is wrong.
func (r *reader) full() bool { return len(r.problems) >= mostProblems }

// sorted returns the problems by line: what a case as a whole lacks is found last.
func (r *reader) sorted() []Problem {
	slices.SortStableFunc(r.problems, func(a, b Problem) int {
		return cmp.Or(cmp.Compare(a.Line, b.Line), cmp.Compare(a.Column, b.Column))
	})
	return r.problems
}
