package figure

import (
	"fmt"
	"math"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// JointDiagram draws the joint diagram to scale into a box: force over change of
// length, the bolt's line rising, the clamped parts' lines falling, the range of
// preload as a band, and at the lowest preload after losses the operating force
// with its two shares, the residual clamp it leaves and, of a cyclic force, the
// swing of the bolt force. The largest bolt force stands at the highest preload.
// The words come from say, by the keys of the cards' words that begin with
// diagram_; an underscore in them begins a subscript.
func JointDiagram(c Canvas, p planner.Plan, box Box, say Words) {
	g := newDiagram(c, p.Diagram, box, say)
	g.band()
	g.frame(1000, 0.001, say("diagram_length"), say("diagram_force"))
	g.limits()
	g.springs()
	g.losses(p.WorkBack.SofteningLoss+p.WorkBack.RelaxationLoss > 0)
	g.tension()
	g.compression()
	g.swing()
	g.largest()
	notes(c, g.notes, g.column, g.size)
}

// Words returns the phrase of a key with its {names} filled from pairs of name
// and value.
type Words func(key string, pairs ...string) string

// diagram is a joint diagram while it is drawn.
type diagram struct {
	axes
	say    Words
	d      stiffness.Diagram
	column Box // of the labels
	notes  []note
}

// noteSize is the type of labels in a drawing of drawingWidth, mm; both grow
// together.
const (
	noteSize     = 2.7
	drawingWidth = 132.0
)

// Measures beside a state under load over the type size: two columns of dimensions,
// then the wave of a cyclic force.
const (
	sharesColumn = 1.0
	loadColumn   = 2.3
	waveColumn   = 3.4
	waveLength   = 4.0
)

func newDiagram(c Canvas, d stiffness.Diagram, box Box, say Words) *diagram {
	size := noteSize * box.Width / drawingWidth
	left, above, below := 4.8*size, 1.9*size, 3.4*size
	side := 0.43 * box.Width
	g := &diagram{
		axes: axes{
			c: c, size: size, room: left,
			plot: Box{box.X + left, box.Y + above, box.Width - left - side - 1.5*size, box.Height - above - below},
		},
		say: say, d: d,
		column: Box{box.X + box.Width - side, box.Y, side, box.Height},
	}
	top := math.Max(d.Limit, math.Max(d.RequiredResidual, d.Most()))
	_, reach := d.Unloaded(math.Max(d.Most(), d.Preload.Low))
	states := []stiffness.State{g.pulled(), d.Under(d.Least(), math.Min(0, d.Axial.Low)), d.Largest()}
	tension, compression := states[0].Length, states[1].Length
	if low, high, ok := d.Swing(); ok {
		states = append(states, low, high)
		tension = math.Max(tension, math.Max(low.Length, high.Length))
	}
	for _, s := range states {
		top = math.Max(top, math.Max(s.Bolt, s.Clamp))
		reach = math.Max(reach, s.Length)
		compression = math.Min(compression, s.Length)
	}
	// A joint of nothing is drawn on empty axes.
	const leastForce, leastLength = 1e-3, 1e-6 // N, mm
	g.widen(math.Max(1.04*reach, leastLength), compression, tension)
	g.high = math.Max(1.06*top, leastForce)
	return g
}

// pulled is the lowest preload after losses under the load of the bolt whose clamp is
// needed most.
func (g *diagram) pulled() stiffness.State {
	return g.d.With(g.d.Under(g.d.Least(), math.Max(0, g.d.ClampAxial)), math.Max(0, g.d.Moment.High))
}

// widen sets the ends of the length axis: to hold zero and a reach, and beside the
// states under compression and tension the columns of their dimensions.
func (g *diagram) widen(reach, compression, tension float64) {
	g.left, g.right = math.Min(0, compression), reach
	before, behind := 0.0, 0.0 // shares of the width
	if g.d.Axial.Low < 0 {
		before = (loadColumn + 0.5) * g.size / g.plot.Width
	}
	if _, _, ok := g.d.Swing(); ok || g.d.ClampAxial > 0 {
		behind = (waveColumn + waveLength) * g.size / g.plot.Width
	}
	// Each end moves a little further when the other does: by far less each time.
	for range 8 {
		g.left = math.Min(g.left, (compression-before*g.right)/(1-before))
		g.right = math.Max(g.right, (tension-behind*g.left)/(1-behind))
	}
}

// band shades the range of preload that the setting gives.
func (g *diagram) band() {
	low, high := g.d.Preload.Low, g.d.Preload.High
	a, b := g.at(g.left, math.Max(0, low)), g.at(g.right, math.Max(0, high))
	g.c.Polygon([]Point{{a.X, a.Y}, {b.X, a.Y}, {b.X, b.Y}, {a.X, b.Y}}, 0.88, Stroke{})
	g.noteAt(g.right, high, false, "diagram_highest", "force", kilo(high, true))
	g.noteAt(g.right, low, false, "diagram_lowest", "force", kilo(low, false))
}

// limits draws what the joint tolerates and what it must keep.
func (g *diagram) limits() {
	g.line(g.left, g.d.Limit, g.right, g.d.Limit, dashed)
	g.noteAt(g.right, g.d.Limit, false, "diagram_limit", "force", kilo(g.d.Limit, false))
	g.line(g.left, g.d.RequiredResidual, g.right, g.d.RequiredResidual, level)
	g.noteAt(g.right, g.d.RequiredResidual, false, "diagram_required", "force", kilo(g.d.RequiredResidual, true))
}

// springs draws bolt and clamped parts: heavy from the lowest preload after losses,
// thin from the highest.
func (g *diagram) springs() {
	low, high := g.d.Least(), g.d.Preload.High
	if high > 0 {
		bolt, end := g.d.Unloaded(high)
		g.line(0, 0, bolt, high, heavy)
		g.line(bolt, high, end, 0, thin)
		named := 0.16 * high
		g.noteAt(named*g.d.BoltCompliance, named, true, "diagram_bolt", "compliance", compliance(g.d.BoltCompliance))
	}
	if low <= 0 {
		return // nothing is left to draw a triangle from
	}
	bolt, end := g.d.Unloaded(low)
	g.line(bolt, low, end, 0, heavy)
	g.line(g.left, low, bolt, low, dotted)
	named := 0.08 * low
	parts := "diagram_parts"
	if g.d.Eccentric {
		parts = "diagram_parts_eccentric"
	}
	g.noteAt(end-named*g.d.ClampedCompliance, named, true, parts, "compliance", compliance(g.d.ClampedCompliance))
}

// losses draws what takes the lowest preload down to F_V: embedding, closing layers
// and the rest, which is temperature alone unless something else is lost over time.
func (g *diagram) losses(overTime bool) {
	later := "diagram_loss_thermal"
	if overTime {
		later = "diagram_loss_time"
	}
	x := g.left + 0.06*(g.right-g.left)
	from := g.d.Preload.Low
	for _, loss := range []struct {
		key   string
		force float64
	}{{"diagram_loss_embedding", g.d.Embedding}, {"diagram_loss_closing", g.d.Closing}, {later, g.d.LaterLoss()}} {
		const nothing = 1e-6 // N: the rounding of sums
		if loss.force <= nothing {
			continue
		}
		to := math.Max(0, from-loss.force)
		if from > 0 {
			g.arrow(x, from, to, medium)
		}
		g.noteAt(x, (math.Max(0, from)+to)/2, true, loss.key, "force", kilo(loss.force, true))
		from -= loss.force
	}
	key := "diagram_least"
	if g.d.Least() <= 0 {
		key = "diagram_least_none"
	}
	bolt, _ := g.d.Unloaded(math.Max(0, g.d.Least()))
	g.noteAt(bolt, math.Max(0, g.d.Least()), true, key, "force", kilo(g.d.Least(), false))
}

// tension draws a tensile operating force at the lowest preload after losses: the
// share that the bolt carries above, the share that relieves the clamp below.
func (g *diagram) tension() {
	load := g.d.ClampAxial
	if load <= 0 {
		g.noteAt(g.right, math.Max(0, g.d.ResidualClamp.Low), false, "diagram_clamp", "force", kilo(g.d.ResidualClamp.Low, false))
		return
	}
	low, s := math.Max(0, g.d.Least()), g.pulled()
	g.path(low, s)
	boltKey, clampKey, clampShare := "diagram_bolt_load", "diagram_clamp_load", g.d.ClampShare
	if s.Open {
		boltKey, clampKey, clampShare = "diagram_bolt_open", "diagram_clamp_open", low
	}
	g.noteAt(s.Length, s.Bolt, true, boltKey, "force", kilo(s.Bolt, true), "share", kilo(s.Bolt-low, true))
	g.noteAt(s.Length, s.Clamp, true, clampKey, "force", kilo(g.d.ResidualClamp.Low, false), "share", kilo(clampShare, true))
	g.shares(low, s, load, g.size)
}

// compression draws a compressive operating force: the bolt's share below, what the
// clamp gains above.
func (g *diagram) compression() {
	load := g.d.Axial.Low
	if load >= 0 {
		return
	}
	low := math.Max(0, g.d.Least())
	s := g.d.Under(low, load)
	g.path(low, s)
	key := "diagram_bolt_compression"
	if s.Slack {
		key = "diagram_bolt_slack"
	}
	g.noteAt(s.Length, s.Clamp, true, "diagram_clamp_compression", "force", kilo(s.Clamp, true))
	g.noteAt(s.Length, s.Bolt, true, key, "force", kilo(s.Bolt, false), "share", kilo(low-s.Bolt, true))
	g.shares(low, s, load, -g.size)
}

// path draws the lines on which an operating force moves bolt and parts away from
// the preload point.
func (g *diagram) path(preload float64, s stiffness.State) {
	bolt, _ := g.d.Unloaded(preload)
	g.line(bolt, preload, s.Length, s.Bolt, thin)
	if s.Open {
		// The parts part where nothing presses on them any more.
		end := g.d.Under(preload, preload/(1-g.d.LoadFactor))
		g.line(bolt, preload, end.Length, 0, thin)
		return
	}
	g.line(bolt, preload, s.Length, s.Clamp, thin)
}

// shares draws the two shares of an operating force as arrows from the preload, and
// the whole as a dimension, beside its state: a column is so wide, to the right or,
// below 0, to the left.
func (g *diagram) shares(preload float64, s stiffness.State, load, column float64) {
	for _, force := range []float64{s.Bolt, s.Clamp} {
		p := g.at(s.Length, force)
		g.c.Line(p.X, p.Y, p.X+(loadColumn+0.3)*column, p.Y, thin)
		from, to := g.at(s.Length, preload), p
		from.X += sharesColumn * column
		to.X = from.X
		g.arrowOnPage(from, to, bold)
	}
	// The bolt may hold more than the load adds: what a working moment does.
	g.line(s.Length, s.Clamp, s.Length, s.Clamp+load, dotted)
	middle := g.span(s.Length, s.Clamp, s.Clamp+load, loadColumn*column)
	g.notes = append(g.notes, note{middle, true, g.say("diagram_load", "force", signed(load))})
}

// swing draws the bolt force of a cyclic load as a wave between its two values.
func (g *diagram) swing() {
	low, high, ok := g.d.Swing()
	if !ok {
		return
	}
	const steps, waves = 72, 3
	start := g.at(math.Max(high.Length, low.Length), 0).X + waveColumn*g.size
	length := (waveLength - 0.4) * g.size
	at := func(i int) Point {
		angle := 2 * math.Pi * waves * float64(i) / steps
		middle, amplitude := (low.Bolt+high.Bolt)/2, (high.Bolt-low.Bolt)/2
		return Point{start + length*float64(i)/steps, g.at(0, middle+amplitude*math.Sin(angle)).Y}
	}
	for i := range steps {
		p, q := at(i), at(i+1)
		g.c.Line(p.X, p.Y, q.X, q.Y, medium)
	}
	g.notes = append(g.notes, note{at(steps), false,
		g.say("diagram_swing", "low", kilo(low.Bolt, false), "high", kilo(high.Bolt, true))})
}

// largest draws the largest bolt force, at the highest preload with what temperature
// adds.
func (g *diagram) largest() {
	most, s := g.d.Most(), g.d.Largest()
	if most <= 0 || s.Open {
		return // the load alone, which stands beside its shares
	}
	bolt, _ := g.d.Unloaded(g.d.Preload.High)
	hot, _ := g.d.Unloaded(most)
	g.line(bolt, g.d.Preload.High, hot, most, thin)
	g.line(hot, most, s.Length, s.Bolt, thin)
	g.noteAt(s.Length, s.Bolt, true, "diagram_largest", "force", kilo(s.Bolt, true))
}

// noteAt names a place of the diagram. What lies below zero force is named at zero.
func (g *diagram) noteAt(length, force float64, dot bool, key string, pairs ...string) {
	g.notes = append(g.notes, note{g.at(length, math.Max(0, force)), dot, g.say(key, pairs...)})
}

// kilo prints a force in kN with two decimals, rounded up or down.
func kilo(newton float64, up bool) string {
	if up {
		return places(quantity.RoundUp(newton, 10) / 1000)
	}
	return places(quantity.RoundDown(newton, 10) / 1000)
}

// signed prints a stated force in kN, rounded to two decimals.
func signed(newton float64) string { return places(newton / 1000) }

func places(v float64) string {
	text := fmt.Sprintf("%.2f", math.Abs(v))
	if v < 0 && text != "0.00" {
		return "−" + text
	}
	return text
}

// compliance prints a compliance in um/kN.
func compliance(mmPerNewton float64) string { return fmt.Sprintf("%.4g", mmPerNewton*1e6) }
