package group

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// maxLine is the longest line of a table, bytes.
const maxLine = 4096

// cell is one field of a line: what stands in it, without blanks around it and
// quotes, and the byte it begins at.
type cell struct {
	text   string
	offset int
}

// next takes the next line, without its end, and reports whether there is one.
func (r *reader) next() bool {
	if len(r.rest) == 0 {
		return false
	}
	line, rest, found := cutLine(r.rest)
	if !found {
		rest = nil
	}
	r.rest = rest
	r.number++
	if len(line) > maxLine {
		r.line = strings.ToValidUTF8(string(line[:80]), "")
		r.at(0, fmt.Sprintf("the line has %d bytes", len(line)), fmt.Sprintf("a row needs no more than %d", maxLine))
		r.line = ""
		return true
	}
	r.line = string(line)
	return true
}

// judge reports whether the line is text.
func (r *reader) judge() bool {
	for i, c := range r.line {
		switch {
		case c == utf8.RuneError && !strings.HasPrefix(r.line[i:], "\uFFFD"):
			r.line = r.line[:i] + strings.ToValidUTF8(r.line[i:], "?")
			r.at(i, "the text is not valid UTF-8", "save the file as CSV in UTF-8")
			return false
		case c < ' ' && c != '\t', c >= 0x7f && c < 0xa0, c == 0x2028, c == 0x2029:
			r.at(i, fmt.Sprintf("the control character %U is not text", c), "remove it")
			return false
		}
	}
	return true
}

// blank reports whether the line says nothing: it is empty or a comment.
func (r *reader) blank() bool {
	text := strings.TrimLeft(r.line, " \t")
	return text == "" || text[0] == '#'
}

// split cuts the line at its commas. A field in quotes may hold commas, and quotes
// doubled; it ends on its line. It reports whether the line could be cut.
func (r *reader) split() ([]cell, bool) {
	cells := r.cells[:0]
	defer func() { r.cells = cells }()
	for from := 0; ; {
		for from < len(r.line) && (r.line[from] == ' ' || r.line[from] == '\t') {
			from++
		}
		if from < len(r.line) && r.line[from] == '"' {
			text, end, ok := r.quoted(from)
			if !ok {
				return nil, false
			}
			cells = append(cells, cell{text, from})
			if end == len(r.line) {
				return cells, true
			}
			from = end + 1
			continue
		}
		text, _, more := strings.Cut(r.line[from:], ",")
		if i := strings.IndexByte(text, '"'); i >= 0 {
			r.at(from+i, "a quote stands inside a field", "put the whole field into quotes, and double those inside it")
			return nil, false
		}
		cells = append(cells, cell{strings.TrimRight(text, " \t"), from})
		if !more {
			return cells, true
		}
		from += len(text) + 1
	}
}

// quoted reads a field in quotes and returns the byte of the comma after it, or
// the end of the line.
func (r *reader) quoted(from int) (text string, end int, ok bool) {
	var b strings.Builder
	for i := from + 1; i < len(r.line); i++ {
		if r.line[i] != '"' {
			b.WriteByte(r.line[i])
			continue
		}
		if i+1 < len(r.line) && r.line[i+1] == '"' {
			b.WriteByte('"')
			i++
			continue
		}
		for i++; i < len(r.line) && (r.line[i] == ' ' || r.line[i] == '\t'); i++ {
		}
		if i < len(r.line) && r.line[i] != ',' {
			r.at(i, "text follows a field in quotes", "put a comma after the field, or double the quotes inside it")
			return "", 0, false
		}
		return strings.TrimSpace(b.String()), i, true
	}
	r.at(from, "the quote is not closed on its line", "close it")
	return "", 0, false
}
