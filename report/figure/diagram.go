package figure

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// JointDiagram draws the joint diagram to scale into a box: force over change of
// length, the bolt's line rising, the clamped parts' lines falling, the range of
// preload as a band, and at the lowest preload after losses the operating force
// with its two shares and the residual clamp it leaves. The words come from say,
// by the keys of the cards' words that begin with diagram_.
func JointDiagram(c Canvas, p planner.Plan, box Box, say Words) {
	d := newDiagram(c, p.Diagram, box)
	d.say = say
	d.axes()
	d.band()
	d.limits()
	d.lines()
	d.load()
	d.labels()
}

// Words returns the phrase of a key with its {names} filled from pairs of name
// and value.
type Words func(key string, pairs ...string) string

// diagram is a joint diagram while it is drawn.
type diagram struct {
	c     Canvas
	say   Words
	d     stiffness.Diagram
	size  float64 // of the type of labels, mm
	plot  Box     // the area of the axes
	side  float64 // x where the labels begin
	right float64 // x where they end
	force float64 // top of the force axis, N
	reach float64 // end of the length axis, mm
	notes []note
}

// note is a label at the side with the height it belongs to.
type note struct {
	at   float64 // y on the page, mm
	from float64 // x on the page where its leader begins, mm
	text string
}

// noteSize is the type of labels in a drawing of drawingWidth, mm; both grow
// together.
const (
	noteSize     = 2.7
	drawingWidth = 132.0
)

// The strokes of the diagram.
var (
	thin   = Stroke{Width: 0.2}
	medium = Stroke{Width: 0.35}
	heavy  = Stroke{Width: 0.7}
)

func newDiagram(c Canvas, d stiffness.Diagram, box Box) *diagram {
	size := noteSize * box.Width / drawingWidth
	left, below, above := 4.8*size, 4*size, 1.9*size
	side := 0.41 * box.Width
	g := &diagram{
		c: c, d: d, size: size,
		plot: Box{box.X + left, box.Y + above, box.Width - left - side - size, box.Height - above - below},
		side: box.X + box.Width - side, right: box.X + box.Width,
	}
	top := math.Max(d.Limit, math.Max(d.Preload.High, g.serviceForce()+d.BoltShare))
	g.force = 1.08 * top
	g.reach = 1.04 * math.Max(d.Preload.High, g.serviceForce()) * (d.BoltCompliance + d.ClampedCompliance)
	return g
}

// serviceForce is the lowest preload after losses, N: where the load acts.
func (g *diagram) serviceForce() float64 { return g.d.Preload.Low - g.d.Loss }

// at places a change of length (mm) and a force (N) on the page.
func (g *diagram) at(length, force float64) Point {
	return Point{g.plot.X + g.plot.Width*length/g.reach, g.plot.Y + g.plot.Height*(1-force/g.force)}
}

func (g *diagram) line(x1, f1, x2, f2 float64, s Stroke) {
	a, b := g.at(x1, f1), g.at(x2, f2)
	g.c.Line(a.X, a.Y, b.X, b.Y, s)
}

// axes draws the axes with round numbers: force in kN, change of length in um.
func (g *diagram) axes() {
	g.line(0, 0, g.reach, 0, medium)
	g.line(0, 0, 0, g.force, medium)
	tick := Type{Size: g.size, Anchor: End}
	for _, f := range roundSteps(g.force/1000, 5) {
		p := g.at(0, f*1000)
		g.c.Line(p.X-1, p.Y, p.X, p.Y, thin)
		g.c.Text(p.X-1.5, p.Y+g.size*0.36, fmt.Sprintf("%g", f), tick)
	}
	for _, l := range roundSteps(g.reach*1000, 4) {
		p := g.at(l/1000, 0)
		g.c.Line(p.X, p.Y, p.X, p.Y+1, thin)
		g.c.Text(p.X, p.Y+1.4+g.size, fmt.Sprintf("%g", l), Type{Size: g.size, Anchor: Middle})
	}
	g.c.Text(g.plot.X-1.5, g.plot.Y-1.5, g.say("diagram_force"), Type{Size: g.size, Anchor: Start})
	g.c.Text(g.plot.X+g.plot.Width, g.plot.Y+g.plot.Height+3*g.size, g.say("diagram_length"),
		Type{Size: g.size, Anchor: End})
}

// roundSteps returns multiples of a round step up to top, about n of them; none
// for an axis without length.
func roundSteps(top float64, n int) []float64 {
	if top <= 0 || !finite(top) {
		return nil
	}
	raw := top / float64(n)
	power := math.Pow(10, math.Floor(math.Log10(raw)))
	step := 10 * power
	for _, m := range []float64{1, 2, 5} {
		if m*power >= raw {
			step = m * power
			break
		}
	}
	var steps []float64
	for i := 0; float64(i)*step <= top; i++ {
		steps = append(steps, math.Round(float64(i)*step*1e6)/1e6)
	}
	return steps
}

// band shades the range of preload that the setting gives.
func (g *diagram) band() {
	low, high := g.d.Preload.Low, g.d.Preload.High
	a, b := g.at(0, low), g.at(g.reach, high)
	g.c.Polygon([]Point{{a.X, a.Y}, {b.X, a.Y}, {b.X, b.Y}, {a.X, b.Y}}, 0.88, Stroke{})
	g.note(g.reach, high, g.say("diagram_highest", "force", kilo(high, true)))
	g.note(g.reach, low, g.say("diagram_lowest", "force", kilo(low, false)))
}

// limits draws what the joint tolerates and what it must keep.
func (g *diagram) limits() {
	g.line(0, g.d.Limit, g.reach, g.d.Limit, Stroke{Width: 0.5, Dash: []float64{3, 1}})
	g.note(g.reach, g.d.Limit, g.say("diagram_limit", "force", kilo(g.d.Limit, false)))
	g.line(0, g.d.RequiredResidual, g.reach, g.d.RequiredResidual, Stroke{Width: 0.5, Dash: []float64{1, 1}})
	g.note(g.reach, g.d.RequiredResidual, g.say("diagram_required", "force", kilo(g.d.RequiredResidual, true)))
}

// lines draws bolt and clamped parts as springs: heavy from the lowest preload
// after losses, thin from the highest.
func (g *diagram) lines() {
	bolt, parts := g.d.BoltCompliance, g.d.ClampedCompliance
	high, low := g.d.Preload.High, g.serviceForce()
	g.line(0, 0, high*bolt, high, heavy)
	if g.d.BoltShare > 0 && low+g.d.BoltShare > high {
		g.line(high*bolt, high, (low+g.d.BoltShare)*bolt, low+g.d.BoltShare, heavy)
	}
	g.line(high*bolt, high, high*(bolt+parts), 0, thin)
	if low <= 0 {
		return // nothing is left to draw a triangle from
	}
	g.line(low*bolt, low, low*(bolt+parts), 0, heavy)
	g.line(0, low, low*bolt, low, Stroke{Width: 0.2, Dash: []float64{0.6, 0.6}})
	label := Type{Size: g.size, Bold: true}
	b := g.at(0.45*high*bolt, 0.45*high)
	name := g.say("diagram_bolt")
	g.c.Text(b.X-1-g.c.Width(name, label), b.Y, name, label)
	q := g.at(low*bolt+0.8*low*parts, 0.2*low)
	name = g.say("diagram_parts")
	g.c.Text(q.X-2-g.c.Width(name, label), q.Y, name, label)
	if g.d.Loss > 0 {
		g.note(low*bolt, low, g.say("diagram_losses", "loss", kilo(g.d.Loss, true), "force", kilo(low, false)))
	}
}

// load draws the operating force at the lowest preload after losses: its share
// that the bolt carries above, the share that relieves the clamp below. For a
// compressive force the shares change sides.
func (g *diagram) load() {
	low := g.serviceForce()
	if low <= 0 {
		return
	}
	x := low * g.d.BoltCompliance
	if g.d.Axial.High > 0 {
		g.arrow(x, low, low+g.d.BoltShare)
		left := math.Max(0, g.d.ResidualClamp.Low) // a gaping interface holds nothing
		g.arrow(x, low, left)
		g.note(x, low+g.d.BoltShare, g.say("diagram_bolt_load", "force", kilo(low+g.d.BoltShare, true),
			"share", kilo(g.d.BoltShare, true)))
		g.note(x, left, g.say("diagram_clamp_load", "force", kilo(g.d.ResidualClamp.Low, false),
			"share", kilo(g.d.ClampShare, true)))
	}
	if g.d.Axial.Low < 0 {
		compression := -g.d.Axial.Low
		g.arrow(x, low, low+(1-g.d.LoadFactor)*compression)
		g.arrow(x, low, low-g.d.LoadFactor*compression)
		g.note(x, low+(1-g.d.LoadFactor)*compression,
			g.say("diagram_clamp_compression", "force", kilo(low+(1-g.d.LoadFactor)*compression, true)))
		g.note(x, low-g.d.LoadFactor*compression, g.say("diagram_bolt_compression",
			"force", kilo(low-g.d.LoadFactor*compression, false)))
	}
}

// arrow draws a vertical arrow from a force to another.
func (g *diagram) arrow(x, from, to float64) {
	a, b := g.at(x, from), g.at(x, to)
	g.c.Line(a.X, a.Y, b.X, b.Y, Stroke{Width: 0.5})
	head := math.Copysign(math.Min(1.6, math.Abs(b.Y-a.Y)), b.Y-a.Y)
	g.c.Polygon([]Point{{b.X, b.Y}, {b.X - 0.8, b.Y - head}, {b.X + 0.8, b.Y - head}}, 0, Stroke{})
}

func (g *diagram) note(length, force float64, text string) {
	p := g.at(length, force)
	g.notes = append(g.notes, note{at: p.Y, from: p.X, text: text})
}

// labels prints the notes at the side, moved apart where they would overlap,
// each with a thin leader to its height.
func (g *diagram) labels() {
	slices.SortStableFunc(g.notes, func(a, b note) int { return cmp.Compare(a.at, b.at) })
	spacing := g.size * 1.35
	y := make([]float64, len(g.notes))
	for i, n := range g.notes {
		y[i] = n.at
		if i > 0 {
			y[i] = math.Max(y[i], y[i-1]+spacing)
		}
	}
	// What ran out below is pushed up again.
	bottom := g.plot.Y + g.plot.Height
	for i := len(y) - 1; i >= 0; i-- {
		y[i] = math.Min(y[i], bottom)
		bottom = y[i] - spacing
	}
	for i, n := range g.notes {
		g.c.Line(n.from, n.at, g.side-4, n.at, Stroke{Width: 0.12, Grey: 0.5})
		g.c.Line(g.side-4, n.at, g.side-1, y[i], Stroke{Width: 0.12, Grey: 0.5})
		size := g.size
		if w := g.c.Width(n.text, Type{Size: size}); w > g.right-g.side {
			size *= (g.right - g.side) / w
		}
		g.c.Text(g.side, y[i]+size*0.36, n.text, Type{Size: size})
	}
}

// kilo prints a force in kN with two decimals, rounded up or down.
func kilo(newton float64, up bool) string {
	if up {
		return fmt.Sprintf("%.2f", quantity.RoundUp(newton, 10)/1000)
	}
	return fmt.Sprintf("%.2f", quantity.RoundDown(newton, 10)/1000)
}
