package figure

import (
	"cmp"
	"math"
	"slices"
	"strings"
)

// Measures of a subscript over the type size.
const (
	subscriptSize = 0.75
	subscriptDrop = 0.22
)

// run is a piece of a label: on the line or below it.
type run struct {
	text string
	sub  bool
}

// runs cuts a label into pieces: what follows an underscore, to the end of its
// letters and digits, is a subscript, as in F_Kerf or R_p0.2.
func runs(label string) []run {
	var all []run
	for {
		before, after, found := strings.Cut(label, "_")
		if before != "" {
			all = append(all, run{text: before})
		}
		if !found {
			return all
		}
		end := subscriptEnd(after)
		if end == 0 {
			all = append(all, run{text: "_"})
		} else {
			all = append(all, run{after[:end], true})
		}
		label = after[end:]
	}
}

// subscriptEnd returns the length of the subscript that a text begins with: letters
// and digits, with a dot between digits.
func subscriptEnd(s string) int {
	for i := range len(s) {
		c := s[i]
		digit := func(j int) bool { return j >= 0 && j < len(s) && s[j] >= '0' && s[j] <= '9' }
		if (c >= 'A' && c <= 'Z') || (c >= 'a' && c <= 'z') || digit(i) || (c == '.' && digit(i-1) && digit(i+1)) {
			continue
		}
		return i
	}
	return len(s)
}

func (r run) face(t Type) Type {
	t.Anchor = Start
	if r.sub {
		t.Size *= subscriptSize
	}
	return t
}

// richWidth returns how wide a label with subscripts is, mm.
func richWidth(c Canvas, label string, t Type) float64 {
	width := 0.0
	for _, r := range runs(label) {
		width += c.Width(r.text, r.face(t))
	}
	return width
}

// fitted shrinks type so that a label keeps within a width.
func fitted(c Canvas, label string, width float64, t Type) Type {
	if w := richWidth(c, label, t); w > width {
		t.Size *= width / w
	}
	return t
}

// richText prints a label with subscripts.
func richText(c Canvas, x, y float64, label string, t Type) {
	switch t.Anchor {
	case Middle:
		x -= richWidth(c, label, t) / 2
	case End:
		x -= richWidth(c, label, t)
	}
	for _, r := range runs(label) {
		drop := 0.0
		if r.sub {
			drop = subscriptDrop * t.Size
		}
		c.Text(x, y+drop, r.text, r.face(t))
		x += c.Width(r.text, r.face(t))
	}
}

// note is a label at the side of a drawing with the point that it names.
type note struct {
	at   Point // mm on the page
	dot  bool  // the point is marked
	text string
}

// Measures of the notes over the type size.
const (
	noteLine  = 1.35 // from line to line
	leastLine = 1.25 // below it, the type shrinks
	leaderEnd = 0.35 // gap between leader and label
	leaderRun = 1.4  // where the leader leaves the height of its point
)

// notes prints labels one below the other in a column, as near to the height of
// their points as they go without touching, each with a thin leader. Type shrinks
// where the column is too narrow or too low for it.
func notes(c Canvas, all []note, column Box, size float64) {
	slices.SortStableFunc(all, func(a, b note) int { return cmp.Compare(a.at.Y, b.at.Y) })
	elbow := column.X - leaderRun*size
	const hangs = 0.1 // below half a line, of a subscript
	line := math.Min(noteLine*size, (column.Height-hangs*size)/math.Max(1, float64(len(all))))
	size = math.Min(size, line/leastLine)
	grey := Stroke{Width: 0.12, Grey: 0.5}
	for i, y := range spread(all, line, column.Y+line/2, column.Y+column.Height-line/2-hangs*size) {
		n := all[i]
		c.Line(n.at.X, n.at.Y, elbow, n.at.Y, grey)
		c.Line(elbow, n.at.Y, column.X-leaderEnd*size, y, grey)
		if n.dot {
			c.Circle(n.at.X, n.at.Y, 0.16*size, 0, Stroke{})
		}
		richText(c, column.X, y+0.36*size, n.text, fitted(c, n.text, column.Width, Type{Size: size}))
	}
}

// spread returns heights for sorted notes, at least a line apart and between top and
// bottom.
func spread(all []note, line, top, bottom float64) []float64 {
	y := make([]float64, len(all))
	for i, n := range all {
		y[i] = math.Max(top, n.at.Y)
		if i > 0 {
			y[i] = math.Max(y[i], y[i-1]+line)
		}
	}
	// What ran out below is pushed up again.
	for i := len(y) - 1; i >= 0; i-- {
		y[i] = math.Min(y[i], bottom)
		bottom = y[i] - line
	}
	return y
}
