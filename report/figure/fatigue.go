package figure

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// Haigh draws the Haigh diagram of a bolt's thread to scale into a box: the limit of
// the stress amplitude over the mean stress at the stated cycles, heavy, and the
// endurance limit, dashed where it is another, both ending on the yield line; and
// the operating point with its way to the limit. A key below names each with its
// numbers. The words come from say, by the keys that begin with fatigue_; an
// underscore in them begins a subscript.
func Haigh(c Canvas, d stiffness.FatigueDiagram, box Box, say Words) {
	top := d.Operating.Amplitude
	for _, p := range slices.Concat(d.Curve, d.Endurance) {
		top = math.Max(top, p.Amplitude)
	}
	g := newFatigue(c, d, box, 0, top)
	g.frame(1, 1, say("fatigue_mean"), say("fatigue_amplitude"))
	g.name(say("fatigue_haigh"))

	shown := math.Min(g.high, d.Yield)
	g.line(d.Yield-shown, shown, d.Yield, 0, thin)
	g.curves(func(p stiffness.StressPoint) float64 { return p.Amplitude })
	g.line(d.Operating.Mean, d.Operating.Amplitude, d.Operating.Mean, d.Limit, dotted)
	at := g.at(d.Operating.Mean, d.Operating.Amplitude)
	g.mark(at)

	g.key(bold, say("fatigue_limit", "limit", stress(d.Limit, false), "cycles", Cycles(d.Cycles)))
	if !d.Endures() {
		g.key(dashed, say("fatigue_limit", "limit", stress(d.LeastLimit, false), "cycles", Cycles(d.Endured)))
	}
	g.key(thin, say("fatigue_yield", "yield", quantity.Trim(d.Yield)))
	g.mark(g.keyPlace())
	g.key(Stroke{}, say("fatigue_operating", "mean", stress(d.Operating.Mean, true),
		"amplitude", stress(d.Operating.Amplitude, true)))
	if d.Spectrum {
		g.key(dotted, say("fatigue_safety_only", "safety", safety(d)))
		return
	}
	g.key(dotted, say("fatigue_safety", "safety", safety(d), "demanded", quantity.Trim(d.Demanded)))
}

// Smith draws the Smith diagram of a bolt's thread to scale into a box: the upper and
// the lower stress that the limits leave over the mean stress, the upper one cut at
// the yield strength, and the operating point's swing. Lines, key and words are
// Haigh's.
func Smith(c Canvas, d stiffness.FatigueDiagram, box Box, say Words) {
	low, high := math.Min(0, d.Operating.Lower()), math.Max(d.Yield, d.Operating.Upper())
	for _, p := range slices.Concat(d.Curve, d.Endurance) {
		low = math.Min(low, p.Lower())
	}
	g := newFatigue(c, d, box, low, high)
	g.frame(1, 1, say("fatigue_mean"), say("fatigue_stress"))
	g.name(say("fatigue_smith"))

	g.line(g.left, 0, g.right, 0, Stroke{Width: 0.12, Grey: 0.5})
	g.line(0, d.Yield, d.Yield, d.Yield, thin)
	end := math.Min(g.right, g.high)
	g.line(0, 0, end, end, dotted)
	g.curves(stiffness.StressPoint.Upper)
	g.curves(stiffness.StressPoint.Lower)
	o := d.Operating
	g.line(o.Mean, o.Lower(), o.Mean, o.Upper(), medium)
	for _, s := range []float64{o.Lower(), o.Upper()} {
		p := g.at(o.Mean, s)
		c.Line(p.X-0.5*g.size, p.Y, p.X+0.5*g.size, p.Y, medium)
	}

	limits := func(limit, n float64) string {
		at := stiffness.StressPoint{Mean: o.Mean, Amplitude: limit}
		return say("fatigue_limits", "upper", stress(at.Upper(), false), "lower", stress(at.Lower(), true), "cycles", Cycles(n))
	}
	g.key(bold, limits(d.Limit, d.Cycles))
	if !d.Endures() {
		g.key(dashed, limits(d.LeastLimit, d.Endured))
	}
	g.key(thin, say("fatigue_yield", "yield", quantity.Trim(d.Yield)))
	p := g.keyPlace()
	for _, side := range []float64{-1, 1} {
		c.Line(p.X-0.5*g.size, p.Y+side*0.3*g.size, p.X+0.5*g.size, p.Y+side*0.3*g.size, medium)
	}
	c.Line(p.X, p.Y-0.3*g.size, p.X, p.Y+0.3*g.size, medium)
	g.key(Stroke{}, say("fatigue_swing", "upper", stress(o.Upper(), true), "lower", stress(o.Lower(), false)))
	g.key(dotted, say("fatigue_middle", "mean", stress(o.Mean, true)))
}

// FatigueRows is how many lines the keys of Haigh and Smith have at most.
const FatigueRows = 5

// fatigue is a Haigh or a Smith diagram while it is drawn.
type fatigue struct {
	axes
	d    stiffness.FatigueDiagram
	box  Box
	rows int // of the key so far
}

// Measures of the fatigue diagrams over the type size.
const (
	fatigueWidth = 24.0 // of the box
	fatigueKey   = 1.4  // from line to line of the key
	sampleLength = 2.8  // of a line of the key
)

// newFatigue lays a diagram out for stresses from low to high over the mean stress.
func newFatigue(c Canvas, d stiffness.FatigueDiagram, box Box, low, high float64) *fatigue {
	size := box.Width / fatigueWidth
	left, above, below := 3.6*size, 1.9*size, (3.6+fatigueKey*FatigueRows)*size
	g := &fatigue{d: d, box: box, axes: axes{
		c: c, size: size, room: left, plot: Box{box.X + left, box.Y + above, box.Width - left - 0.5*size, box.Height - above - below},
		left: 1.1 * math.Min(0, d.Operating.Mean), low: 1.1 * low, high: 1.12 * high, right: 1.08 * math.Max(d.Yield, d.Operating.Mean),
	}}
	if !(g.right > 0) {
		g.right = 1
	}
	if !(g.high > g.low) {
		g.high = g.low + 1
	}
	return g
}

// name prints which diagram it is, above its right end.
func (g *fatigue) name(text string) {
	g.c.Text(g.plot.X+g.plot.Width, g.plot.Y-0.55*g.size, text, Type{Size: g.size, Bold: true, Anchor: End})
}

// curves draws the limits: a stress of each of their corners over the mean stress.
func (g *fatigue) curves(of func(stiffness.StressPoint) float64) {
	draw := func(curve []stiffness.StressPoint, s Stroke) {
		for i := 1; i < len(curve); i++ {
			g.line(curve[i-1].Mean, of(curve[i-1]), curve[i].Mean, of(curve[i]), s)
		}
	}
	if !g.d.Endures() {
		draw(g.d.Endurance, dashed)
	}
	draw(g.d.Curve, bold)
}

// mark draws the operating point.
func (g *fatigue) mark(p Point) { g.c.Circle(p.X, p.Y, 0.26*g.size, 0, Stroke{}) }

// keyPlace is the middle of the sample of the next line of the key.
func (g *fatigue) keyPlace() Point {
	y := g.plot.Y + g.plot.Height + (4.1+fatigueKey*float64(g.rows))*g.size
	return Point{g.box.X + sampleLength/2*g.size, y}
}

// key prints the next line of the key behind a sample of its stroke.
func (g *fatigue) key(s Stroke, text string) {
	p := g.keyPlace()
	g.c.Line(p.X-sampleLength/2*g.size, p.Y, p.X+sampleLength/2*g.size, p.Y, s)
	g.rows++
	x := p.X + (sampleLength/2+0.5)*g.size
	richText(g.c, x, p.Y+0.36*g.size, text, fitted(g.c, text, g.box.X+g.box.Width-x, Type{Size: g.size}))
}

// stress prints a stress with one decimal, rounded up or down.
func stress(mpa float64, up bool) string {
	const step = 0.1
	v := quantity.RoundDown(mpa, step)
	if up {
		v = quantity.RoundUp(mpa, step)
	}
	text := fmt.Sprintf("%.1f", math.Abs(v))
	if v < 0 {
		return "−" + text
	}
	return text
}

// safety prints S_D with two decimals, rounded down; without a swing it has no end.
func safety(d stiffness.FatigueDiagram) string {
	const most = 999
	if d.Operating.Amplitude <= 0 {
		return "–"
	}
	if d.Safety > most {
		return fmt.Sprintf(">%d", most)
	}
	return fmt.Sprintf("%.2f", quantity.RoundDown(d.Safety, 0.01))
}

// Cycles prints a number of cycles as it is stated: 500, 2e6.
func Cycles(n float64) string {
	if n < 1e4 {
		return quantity.Trim(n)
	}
	mantissa, power, _ := strings.Cut(strconv.FormatFloat(n, 'e', -1, 64), "e+")
	return mantissa + "e" + strings.TrimLeft(power, "0")
}
