package figure

import (
	"cmp"
	"math"
	"slices"
	"strconv"

	"clampback/planner/pattern"
)

// BoltPattern draws the bolts where they sit, each with its place in the
// tightening order, to scale in the box. The first bolt is filled black. It
// returns the height of the smallest digit, mm, so that the page can give the
// drawing more room when it is too small to follow.
func BoltPattern(c Canvas, p pattern.Pattern, box Box) float64 {
	l := layPattern(p, box)
	if p.Kind == pattern.Circle {
		c.Circle(l.place(pattern.Point{}).X, l.place(pattern.Point{}).Y, p.Diameter/2*l.scale, 1,
			Stroke{Width: 0.2, Grey: 0.6, Dash: []float64{2, 1}})
	}
	for position, number := range p.Order() {
		at := l.place(p.Points[number-1])
		fill, ink := 1.0, 0.0
		if position == 0 {
			fill, ink = 0, 1
		}
		c.Circle(at.X, at.Y, l.radius, fill, Stroke{Width: 0.3})
		text := strconv.Itoa(position + 1)
		c.Text(at.X, at.Y+l.size*DigitHeight/2, text, Type{Size: l.size, Bold: true, Anchor: Middle, Grey: ink})
	}
	return l.size * DigitHeight
}

// DigitOf returns the height of the digits that BoltPattern would print in a
// box, mm.
func DigitOf(p pattern.Pattern, box Box) float64 { return layPattern(p, box).size * DigitHeight }

// PatternHeight returns how much of a box's height BoltPattern needs at most, mm.
func PatternHeight(p pattern.Pattern, box Box) float64 {
	l := layPattern(p, box)
	low, high := corners(p.Points)
	return min(box.Height, (high.Y-low.Y)*l.scale+2*(l.radius+markEdge))
}

// patternLayout is a pattern fitted into a box.
type patternLayout struct {
	scale  float64 // page mm per joint mm
	centre pattern.Point
	middle Point
	radius float64 // of a bolt's mark, mm
	size   float64 // of the numbers, mm
}

func (l patternLayout) place(p pattern.Point) Point {
	return Point{l.middle.X + (p.X-l.centre.X)*l.scale, l.middle.Y - (p.Y-l.centre.Y)*l.scale}
}

// largestMark is the radius of a bolt's mark where there is room, over the width
// of the box; markEdge is kept free around it for its stroke, mm.
const (
	largestMark = 0.07
	markEdge    = 0.5
)

func layPattern(p pattern.Pattern, box Box) patternLayout {
	low, high := corners(p.Points)
	l := patternLayout{
		centre: pattern.Point{X: (low.X + high.X) / 2, Y: (low.Y + high.Y) / 2},
		middle: Point{box.X + box.Width/2, box.Y + box.Height/2},
		radius: largestMark * box.Width,
	}
	// Marks that must shrink leave more room for the pattern: fit once more.
	near := closest(p.Points)
	for range 2 {
		room := 2 * (l.radius + markEdge)
		l.scale = math.Min(fitting(high.X-low.X, box.Width-room), fitting(high.Y-low.Y, box.Height-room))
		l.radius = math.Min(l.radius, 0.46*near*l.scale)
	}
	digits := len(strconv.Itoa(len(p.Points)))
	// The widest number must fit into the mark: digits are 0.7 em wide in bold.
	l.size = 2 * l.radius * 0.9 / math.Hypot(0.7*float64(digits), DigitHeight)
	return l
}

// fitting returns the scale at which an extent fills some room. An extent of
// nothing, in a row or a single bolt, fits at any scale.
func fitting(extent, room float64) float64 {
	const nothing = 1e-6 // mm
	if extent < nothing {
		return 1 / nothing
	}
	return room / extent
}

// corners returns the smallest and the largest coordinates of the bolts, mm.
func corners(points []pattern.Point) (low, high pattern.Point) {
	low, high = pattern.Point{X: math.Inf(1), Y: math.Inf(1)}, pattern.Point{X: math.Inf(-1), Y: math.Inf(-1)}
	for _, q := range points {
		low.X, low.Y = math.Min(low.X, q.X), math.Min(low.Y, q.Y)
		high.X, high.Y = math.Max(high.X, q.X), math.Max(high.Y, q.Y)
	}
	return low, high
}

// closest returns the least distance between two bolts, mm; a large one for a
// single bolt. It compares neighbours in x only, which is enough and fast.
func closest(points []pattern.Point) float64 {
	least := 1e9
	sorted := sortedByX(points)
	for i, a := range sorted {
		for _, b := range sorted[i+1:] {
			if b.X-a.X >= least {
				break
			}
			least = math.Min(least, math.Hypot(a.X-b.X, a.Y-b.Y))
		}
	}
	return least
}

func sortedByX(points []pattern.Point) []pattern.Point {
	sorted := slices.Clone(points)
	slices.SortFunc(sorted, func(a, b pattern.Point) int { return cmp.Compare(a.X, b.X) })
	return sorted
}
