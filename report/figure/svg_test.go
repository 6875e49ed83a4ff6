package figure_test

import (
	"encoding/xml"
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"clampback/report/figure"
	"clampback/templates"
)

// english says the words of the cards.
func english(t testing.TB) figure.Words {
	rows, err := templates.Rows(templates.Folder(nil), "cards/en.csv", 2)
	require.NoError(t, err)
	texts := map[string]string{}
	for _, r := range rows {
		texts[r[0]] = r[1]
	}
	return func(key string, pairs ...string) string {
		text, ok := texts[key]
		if !ok {
			t.Errorf("no words for %s", key)
		}
		for i := 0; i < len(pairs); i += 2 {
			if !strings.Contains(text, "{"+pairs[i]+"}") {
				t.Errorf("%s lacks {%s}", key, pairs[i])
			}
			text = strings.ReplaceAll(text, "{"+pairs[i]+"}", pairs[i+1])
		}
		if strings.Contains(text, "{") {
			t.Errorf("%s is not filled: %s", key, text)
		}
		return text
	}
}

// drawing is an SVG read back, mm.
type drawing struct {
	lines  []stroke
	fills  []fill
	dots   []figure.Point
	labels []label
}

type stroke struct {
	from, to figure.Point
	width    float64
	dash     string
}

type fill struct {
	points []figure.Point
	shade  string
}

// label is a line of text with the box of its letters: digits high, with room below
// for what hangs.
type label struct {
	text                     string
	left, top, right, bottom float64
	base, size               float64
}

// readBack reads a drawing as any reader of XML does.
func readBack(t require.TestingT, svg string) drawing {
	var d drawing
	decoder := xml.NewDecoder(strings.NewReader(svg))
	for {
		token, err := decoder.Token()
		if err != nil {
			require.ErrorContains(t, err, "EOF")
			return d
		}
		element, ok := token.(xml.StartElement)
		if !ok {
			continue
		}
		get := map[string]string{}
		for _, a := range element.Attr {
			get[a.Name.Local] = a.Value
		}
		number := func(key string) float64 {
			v, err := strconv.ParseFloat(get[key], 64)
			require.NoError(t, err, "%s of %v", key, element)
			return v
		}
		switch element.Name.Local {
		case "line":
			d.lines = append(d.lines, stroke{figure.Point{X: number("x1"), Y: number("y1")},
				figure.Point{X: number("x2"), Y: number("y2")}, number("stroke-width"), get["stroke-dasharray"]})
		case "circle":
			d.dots = append(d.dots, figure.Point{X: number("cx"), Y: number("cy")})
		case "polygon":
			f := fill{shade: get["fill"]}
			for _, pair := range strings.Fields(get["points"]) {
				x, y, _ := strings.Cut(pair, ",")
				px, err := strconv.ParseFloat(x, 64)
				require.NoError(t, err)
				py, err := strconv.ParseFloat(y, 64)
				require.NoError(t, err)
				f.points = append(f.points, figure.Point{X: px, Y: py})
			}
			d.fills = append(d.fills, f)
		case "text":
			var text string
			require.NoError(t, decoder.DecodeElement(&text, &element))
			d.labels = append(d.labels, boxOf(text, number("x"), number("y"), number("font-size"), get))
		}
	}
}

func boxOf(text string, x, y, size float64, get map[string]string) label {
	width := figure.NewSVG(1, 1).Width(text, figure.Type{Size: size, Bold: get["font-weight"] == "bold"})
	switch get["text-anchor"] {
	case "middle":
		x -= width / 2
	case "end":
		x -= width
	}
	return label{text, x, y - figure.DigitHeight*size, x + width, y + 0.2*size, y, size}
}

// assertTidy fails where a label leaves the frame, runs into another or is struck
// through, and where a line, a dot or a filled area leaves the frame.
func assertTidy(t require.TestingT, d drawing, width, height float64) {
	const edge = 0.01 // mm: the rounding of the SVG, of type sizes over a label
	inside := func(p figure.Point) bool {
		return p.X >= -edge && p.Y >= -edge && p.X <= width+edge && p.Y <= height+edge
	}
	for i, a := range d.labels {
		require.True(t, inside(figure.Point{X: a.left, Y: a.top}) && inside(figure.Point{X: a.right, Y: a.bottom}), "cut: %+v", a)
		for _, b := range d.labels[:i] {
			const touch = 0.01
			require.False(t, a.left+touch < b.right && b.left+touch < a.right && a.top+touch < b.bottom && b.top+touch < a.bottom,
				"%+v runs into %+v", a, b)
		}
		for _, l := range d.lines {
			require.False(t, crosses(l, a), "%+v is struck through by %+v", a, l)
		}
	}
	for _, l := range d.lines {
		require.True(t, inside(l.from) && inside(l.to), "outside: %+v", l)
	}
	for _, p := range d.dots {
		require.True(t, inside(p), "outside: %+v", p)
	}
	for _, f := range d.fills {
		for _, p := range f.points {
			require.True(t, inside(p), "outside: %+v", f)
		}
	}
}

// crosses reports whether a line passes through the box of a label: it is clipped at
// the box (Liang and Barsky), and something is left.
func crosses(l stroke, a label) bool {
	const inset = 0.02
	from, to := 0.0, 1.0
	dx, dy := l.to.X-l.from.X, l.to.Y-l.from.Y
	for _, side := range [][2]float64{{-dx, l.from.X - a.left - inset}, {dx, a.right - inset - l.from.X},
		{-dy, l.from.Y - a.top - inset}, {dy, a.bottom - inset - l.from.Y}} {
		switch p, q := side[0], side[1]; {
		case p == 0 && q < 0:
			return false
		case p < 0:
			from = math.Max(from, q/p)
		case p > 0:
			to = math.Min(to, q/p)
		}
	}
	return from < to
}
