package figure

import (
	_ "embed"
	"strings"
	"unicode"
	"unicode/utf8"
)

// The faces, cut by fonts/cut; the licence lies beside them.
var (
	//go:embed fonts/DejaVuSans.ttf
	RegularFont []byte
	//go:embed fonts/DejaVuSans-Bold.ttf
	BoldFont []byte
)

// ranges are the characters that both faces hold; a test compares.
var ranges = &unicode.RangeTable{
	R16: []unicode.Range16{
		{0x20, 0x7e, 1}, {0xa0, 0x17f, 1}, {0x218, 0x21b, 1}, {0x384, 0x38a, 1}, {0x38c, 0x38c, 1}, {0x38e, 0x3a1, 1},
		{0x3a3, 0x3ce, 1}, {0x400, 0x45f, 1}, {0x490, 0x491, 1}, {0x2010, 0x2015, 1}, {0x2018, 0x201e, 1}, {0x2022,
			0x2022, 1},
		{0x2026, 0x2026, 1}, {0x20ac, 0x20ac, 1}, {0x2190, 0x2193, 1}, {0x2212, 0x2212, 1}, {0x2264, 0x2265, 1},
		{0x25a1, 0x25a1, 1}, {0x25b2, 0x25b2, 1}, {0x25cf, 0x25cf, 1}, {0x2713, 0x2713, 1},
	},
	LatinOffset: 1,
}

// missing stands for a character that the faces lack: a visible box, never a gap.
const missing = '□'

// Printable returns text that the faces can print: blanks for control
// characters, a box for what they lack.
func Printable(s string) string { return strings.Map(printableRune, s) }

func printableRune(r rune) rune {
	switch {
	case r == utf8.RuneError:
		return missing
	case r < ' ' || (r >= 0x7f && r < 0xa0):
		return ' '
	case !unicode.Is(ranges, r):
		return missing
	}
	return r
}

// DigitHeight is the height of a digit over the size of the type, of both faces.
const DigitHeight = 0.729

// Wrap breaks a text into lines that a measure finds no wider than width; the
// first line begins after an indent, and is empty when the first word finds no
// room behind it. A word that is wider alone is broken between letters. No
// character is lost.
func Wrap(text string, indent, width float64, measure func(string) float64) []string {
	var lines []string
	line, length := "", indent
	blank := measure(" ")
	for _, word := range strings.FieldsFunc(text, breakable) {
		wide := measure(word)
		if line != "" && length+blank+wide <= width {
			line += " " + word
			length += blank + wide
			continue
		}
		if line != "" || (length > 0 && length+wide > width) {
			lines = append(lines, line)
			length = 0
		}
		line = word
		length += wide
		if length > width {
			pieces := breakWord(word, width, measure)
			lines = append(lines, pieces[:len(pieces)-1]...)
			line = pieces[len(pieces)-1]
			length = measure(line)
		}
	}
	if line != "" || len(lines) == 0 {
		lines = append(lines, line)
	}
	return lines
}

// NoBreak is a blank at which no line ends.
const NoBreak = '\u00a0'

func breakable(r rune) bool { return unicode.IsSpace(r) && r != NoBreak }

// breakWord cuts a word into pieces no wider than width, of at least a letter.
func breakWord(word string, width float64, measure func(string) float64) []string {
	var pieces []string
	piece := ""
	for _, r := range word {
		if piece != "" && measure(piece+string(r)) > width {
			pieces = append(pieces, piece)
			piece = ""
		}
		piece += string(r)
	}
	return append(pieces, piece)
}
