package register

import (
	"bytes"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"
)

// MaxSize is the largest register that is read, bytes: room for 50,000 joints.
const MaxSize = 64 << 20

// The largest parts of a register: one joint, or all that is not a joint, in
// bytes; and the most joints. They bound time and memory whatever the file holds.
const (
	maxPart   = 1 << 20
	maxJoints = 100_000
)

// maxDepth is how deep brackets, dashes and indentation may nest; a joint needs
// five.
const (
	maxDepth  = 32
	maxIndent = 200
)

// Source is a register file in memory.
type Source struct {
	Name string // as errors print it: a path, or "standard input"
	Data []byte

	// Open reads a file that the register names, for example a table of bolt forces;
	// a relative name counts from the register's folder. It is called by several
	// goroutines at once. Nil where there is no folder, as for standard input: a
	// register that names a file is then refused.
	Open func(name string) ([]byte, error)
}

// ReadSource reads a register and refuses one larger than MaxSize.
func ReadSource(r io.Reader, name string) (Source, error) {
	data, err := io.ReadAll(io.LimitReader(r, MaxSize+1))
	if err != nil {
		return Source{}, fmt.Errorf("reading %s: %w", name, err)
	}
	if len(data) > MaxSize {
		return Source{}, &ProblemsError{[]Problem{{
			File: name, Message: fmt.Sprintf("the file is larger than %d MB",
				MaxSize>>20), Mend: "split the register into several files",
		}}}
	}
	return Source{Name: name, Data: data}, nil
}

// position is a place in a source, from 1; the zero position is the whole file.
type position struct{ line, column int }

// source is a register, or a library that one names, cut into lines.
type source struct {
	name  string
	kind  kindOfFile
	lines []string
	open  func(name string) ([]byte, error) // Source.Open
}

// kindOfFile says what a file is, as messages name it.
type kindOfFile struct {
	one, many string
	common    string // how values are written that several entries share
}

var (
	aRegister = kindOfFile{"register", "registers", "write the values out, or put them under defaults"}
	aLibrary  = kindOfFile{"library", "libraries", "write the values out"}
)

func (s *source) line(n int) string {
	if n < 1 || n > len(s.lines) {
		return ""
	}
	return s.lines[n-1]
}

// guard makes lines of the bytes, or says why they are not parsed: bytes that are
// no text, and nesting that no register needs but that makes parsers slow.
func guard(in Source, kind kindOfFile) (*source, []Problem) {
	s := &source{name: in.Name, kind: kind, open: in.Open}
	p := &problems{source: s}
	data := in.Data
	if bytes.HasPrefix(data, []byte("\xef\xbb\xbf")) {
		s.lines = []string{""}
		p.at(position{1, 1}, "the file begins with a byte order mark", "save it as UTF-8 without byte order mark")
		return s, p.all
	}
	s.lines = strings.Split(strings.ReplaceAll(string(data), "\r\n", "\n"), "\n")
	for i, line := range s.lines {
		if !guardLine(p, i+1, line) {
			return s, p.all
		}
	}
	return s, p.all
}

// guardLine reports whether reading may go on after a line.
func guardLine(p *problems, number int, line string) bool {
	column := 0
	for i, r := range line {
		column++
		switch {
		case r == utf8.RuneError && !strings.HasPrefix(line[i:], "\uFFFD"):
			p.at(position{number, column}, "the text is not valid UTF-8", "save the file as UTF-8")
			return false
		case r < ' ' && r != '\t' || r == 0x7f || r == 0x85 || r == 0x2028 || r == 0x2029:
			p.at(position{number, column}, fmt.Sprintf("the control character %U is not text", r), "remove it")
			return false
		}
	}
	indent := len(line) - len(strings.TrimLeft(line, " "))
	if strings.HasPrefix(line[indent:], "\t") {
		p.at(position{number, indent + 1}, "a tab indents the line", "indent with blanks")
		return false
	}
	if indent > maxIndent || strings.HasPrefix(line[indent:],
		strings.Repeat("- ", maxDepth)) || strings.HasPrefix(line[indent:], strings.Repeat("? ", maxDepth)) {
		p.at(position{number, indent + 1}, "the line nests too deeply", p.source.kind.levels())
		return false
	}
	return true
}

// levels is the mend of what nests too deeply.
func (k kindOfFile) levels() string { return "a " + k.one + " needs no more than five levels" }

// nesting returns where brackets nest too deeply in a run of lines, if they do.
// Brackets in quotes and comments do not count.
func nesting(lines []string) (position, bool) {
	var b brackets
	for n, line := range lines {
		for i := 0; i < len(line) && !b.comment(line, i); i++ {
			i += b.step(line, i)
			if b.depth > maxDepth {
				return position{n + 1, i + 1}, true
			}
		}
	}
	return position{}, false
}

// brackets counts open brackets outside quotes.
type brackets struct {
	depth int
	quote byte // the quote that is open; 0: none
}

// comment reports whether a comment begins at a byte.
func (b *brackets) comment(line string, i int) bool {
	return b.quote == 0 && line[i] == '#' && (i == 0 || line[i-1] == ' ')
}

// step takes one byte in and returns how many more it covers: the byte after a
// backslash.
func (b *brackets) step(line string, i int) int {
	switch c := line[i]; {
	case b.quote == '"' && c == '\\':
		return 1
	case b.quote != 0:
		if c == b.quote {
			b.quote = 0
		}
	case (c == '"' || c == '\'') && (i == 0 || strings.IndexByte(" [{,:", line[i-1]) >= 0):
		b.quote = c
	case c == '[' || c == '{':
		b.depth++
	case (c == ']' || c == '}') && b.depth > 0:
		b.depth--
	}
	return 0
}
