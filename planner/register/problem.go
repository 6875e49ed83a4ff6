package register

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"
)

// Problem is one thing wrong with a register.
type Problem struct {
	File    string
	Line    int    // from 1; 0: the file as a whole
	Column  int    // from 1, in characters
	Text    string // the offending line
	Message string // what is wrong
	Mend    string // how to put it right
}

// String prints the problem with its line, a mark under the column, and the
// mend.
func (p Problem) String() string {
	var b strings.Builder
	if p.Line == 0 {
		fmt.Fprintf(&b, "error: %s: %s\n", p.File, p.Message)
	} else {
		fmt.Fprintf(&b, "error: %s:%d:%d: %s\n", p.File, p.Line, p.Column, p.Message)
		text, column := excerpt(p.Text, p.Column)
		fmt.Fprintf(&b, "    %s\n    %s^\n", text, strings.Repeat(" ", column-1))
	}
	fmt.Fprintf(&b, "mend: %s\n", p.Mend)
	return b.String()
}

// excerptWidth is how much of a long line is shown, in characters.
const excerptWidth = 120

// excerpt cuts a long line around the column and returns the column in the cut.
func excerpt(text string, column int) (string, int) {
	runes := []rune(strings.Map(printable, text))
	column = min(max(column, 1), len(runes)+1)
	if len(runes) <= excerptWidth {
		return string(runes), column
	}
	from := min(max(0, column-1-excerptWidth/2), len(runes)-excerptWidth)
	return string(runes[from : from+excerptWidth]), column - from
}

// printable keeps tabs and the like from shifting the mark, and control
// characters from reaching a terminal.
func printable(r rune) rune {
	if r < ' ' || r == 0x7f || (r >= 0x80 && r < 0xa0) || r == utf8.RuneError {
		return ' '
	}
	return r
}

// shownProblems is how many problems are printed in full.
const shownProblems = 50

// ProblemsError is every problem found in one reading, in the order of files
// and lines.
type ProblemsError struct{ Problems []Problem }

// Error summarises the problems in one line.
func (e *ProblemsError) Error() string {
	first := e.Problems[0]
	return fmt.Sprintf("%s:%d:%d: %s (%d problems in all)", first.File, first.Line, first.Column, first.Message,
		len(e.Problems))
}

// Report prints the problems for a person: the first 50 in full, then how many
// more there are.
func (e *ProblemsError) Report() string {
	var b strings.Builder
	for _, p := range e.Problems[:min(len(e.Problems), shownProblems)] {
		b.WriteString(p.String())
	}
	if more := len(e.Problems) - shownProblems; more > 0 {
		fmt.Fprintf(&b, "and %d more problems\n", more)
	}
	return b.String()
}

// problems gathers problems of one file.
type problems struct {
	source *source
	all    []Problem
}

// at adds a problem at a place.
func (p *problems) at(pos position, message, mend string) {
	p.all = append(p.all, Problem{
		File: p.source.name, Line: pos.line, Column: pos.column, Text: p.source.line(pos.line), Message: message, Mend: mend,
	})
}

// sorted returns the problems of a register in order, then those of the files
// that it names, each once: a mistake in defaults would otherwise show for every
// joint.
func sorted(name string, all []Problem) []Problem {
	file := func(p Problem) string {
		if p.File == name {
			return ""
		}
		return p.File
	}
	slices.SortStableFunc(all, func(a, b Problem) int {
		return cmp.Or(cmp.Compare(file(a), file(b)), cmp.Compare(a.Line, b.Line), cmp.Compare(a.Column, b.Column), cmp.Compare(a.Message, b.Message))
	})
	return slices.CompactFunc(all, func(a, b Problem) bool {
		return a.File == b.File && a.Line == b.Line && a.Column == b.Column && a.Message == b.Message
	})
}
