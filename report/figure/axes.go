package figure

import (
	"fmt"
	"math"
)

// The strokes of the diagrams.
var (
	thin   = Stroke{Width: 0.2}
	medium = Stroke{Width: 0.35}
	bold   = Stroke{Width: 0.5}
	heavy  = Stroke{Width: 0.7}
	dotted = Stroke{Width: 0.2, Dash: []float64{0.6, 0.6}}
	dashed = Stroke{Width: 0.5, Dash: []float64{3, 1}}
	level  = Stroke{Width: 0.5, Dash: []float64{1, 1}}
)

// axes places numbers on the page: a plot area with the numbers at its ends.
type axes struct {
	c     Canvas
	plot  Box
	room  float64 // left of the plot for the numbers, mm
	size  float64 // of the type, mm
	left  float64
	right float64
	low   float64
	high  float64
}

// at places a pair of numbers on the page.
func (a axes) at(x, y float64) Point {
	return Point{a.plot.X + a.plot.Width*(x-a.left)/(a.right-a.left), a.plot.Y + a.plot.Height*(a.high-y)/(a.high-a.low)}
}

func (a axes) line(x1, y1, x2, y2 float64, s Stroke) {
	p, q := a.at(x1, y1), a.at(x2, y2)
	a.c.Line(p.X, p.Y, q.X, q.Y, s)
}

// frame draws the axes with round numbers, a number of the page's axis over that of
// the drawing being scaleX and scaleY, and their titles.
func (a axes) frame(scaleX, scaleY float64, titleX, titleY string) {
	bottom, right := a.plot.Y+a.plot.Height, a.plot.X+a.plot.Width
	a.c.Line(a.plot.X, bottom, right, bottom, medium)
	a.c.Line(a.plot.X, bottom, a.plot.X, a.plot.Y, medium)
	tick := 0.37 * a.size
	for _, y := range roundSteps(a.low*scaleY, a.high*scaleY, a.plot.Height/(3*a.size)) {
		p := a.at(a.left, y/scaleY)
		a.c.Line(p.X-tick, p.Y, p.X, p.Y, thin)
		a.c.Text(p.X-1.5*tick, p.Y+a.size*0.36, minus(y), fitted(a.c, minus(y), a.room-1.5*tick, Type{Size: a.size, Anchor: End}))
	}
	for _, x := range roundSteps(a.left*scaleX, a.right*scaleX, a.plot.Width/(4.5*a.size)) {
		p, t := a.at(x/scaleX, a.low), Type{Size: a.size, Anchor: Middle}
		if p.X+a.c.Width(minus(x), t)/2 > right+0.1*a.size {
			continue // no room for the number
		}
		a.c.Line(p.X, p.Y, p.X, p.Y+tick, thin)
		a.c.Text(p.X, p.Y+1.4*tick+a.size, minus(x), t)
	}
	richText(a.c, a.plot.X-1.5*tick, a.plot.Y-0.55*a.size, titleY, Type{Size: a.size})
	richText(a.c, right, bottom+3*a.size, titleX, Type{Size: a.size, Anchor: End})
}

// minus prints a number of an axis with a true minus.
func minus(v float64) string {
	text := fmt.Sprintf("%.6g", math.Abs(v))
	if v < 0 {
		return "−" + text
	}
	return text
}

// roundSteps returns the multiples of a round step between low and high, about n of
// them; none for an axis without length.
func roundSteps(low, high, n float64) []float64 {
	raw := (high - low) / math.Max(1, n)
	if !(raw > 0) || !finite(low, high) {
		return nil
	}
	power := math.Pow(10, math.Floor(math.Log10(raw)))
	step := 10 * power
	for _, m := range []float64{1, 2, 5} {
		if m*power >= raw {
			step = m * power
			break
		}
	}
	var steps []float64
	for i := math.Ceil(low / step); i*step <= high; i++ {
		steps = append(steps, i*step)
	}
	return steps
}

// arrow draws a vertical arrow from a number to another, as slim as it is short.
func (a axes) arrow(x, from, to float64, s Stroke) {
	p, q := a.at(x, from), a.at(x, to)
	a.arrowOnPage(p, q, s)
}

func (a axes) arrowOnPage(p, q Point, s Stroke) {
	length := math.Min(0.6*a.size, 0.7*math.Abs(q.Y-p.Y))
	head := math.Copysign(length, q.Y-p.Y)
	a.c.Line(p.X, p.Y, q.X, q.Y-head/2, s)
	a.c.Polygon([]Point{{q.X, q.Y}, {q.X - length/2, q.Y - head}, {q.X + length/2, q.Y - head}}, 0, Stroke{})
}

// span draws a dimension between two numbers: a thin line with an arrow at each end,
// so far right of x on the page; it returns its middle.
func (a axes) span(x, from, to, offset float64) Point {
	p, q := a.at(x, from), a.at(x, to)
	p.X += offset
	q.X += offset
	middle := Point{p.X, (p.Y + q.Y) / 2}
	a.arrowOnPage(middle, p, thin)
	a.arrowOnPage(middle, q, thin)
	return middle
}
