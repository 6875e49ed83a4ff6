package card

import (
	"slices"
	"strconv"
	"strings"

	"clampback/planner"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
	"clampback/report/figure"
)

// instruction returns the blocks of a feasible joint's card, in the order in
// which a technician needs them: the front to read before work, the back to work
// by.
func (d *document) instruction(p planner.Plan) []block {
	front := d.shrunk(p, func(d *document) []block {
		blocks := append([]block{d.what(p), d.setting(p)}, d.toolAndLubrication(p)...)
		return append(blocks, d.warnings(p)...)
	})
	back := d.shrunk(p, func(d *document) []block {
		return append(d.orderAndSteps(p), d.verdict(p), d.record())
	})
	back[0].fresh = true
	blocks := slices.Concat(front, back)
	if p.Count > 1 && p.Joint.Pattern.Kind != pattern.Unstated && !d.drawnBesideSteps(p) {
		blocks = append(blocks, d.orderPage(p)...)
	}
	return blocks
}

// isAngle reports whether the joint is tightened by torque and angle.
func isAngle(p planner.Plan) bool { return p.Joint.Tightening.Method == planner.TorqueAndAngleMethod }

// what says how many of which bolts.
func (d *document) what(p planner.Plan) block {
	j := p.Joint
	count := d.words.say("bolts_one")
	if p.Count != 1 {
		count = d.words.say("bolts_many", "count", strconv.Itoa(p.Count))
	}
	b := j.Bolt
	key := "bolt_line"
	if j.HeadNut != nil {
		key = "stud_line"
	}
	lines := []string{
		d.words.say(key, "thread", b.Thread.Designation, "length", quantity.Trim(b.Length), "head", headWord(j),
			"standard", b.Head.Standard, "class", b.Class.Name) + ". " + d.spanner(p),
		d.mating(j),
		d.washers(j),
	}
	if waist := b.Waist(); waist > 0 {
		lines[0] += " " + d.words.say("waisted", "diameter", quantity.Trim(waist))
	}
	large := figure.Type{Size: d.mm(6.4), Bold: true}
	side := d.canvas.Width(count, large) + d.mm(4)
	var wrapped []string
	for _, l := range lines {
		wrapped = append(wrapped, d.wrap(l, d.wide()-side, d.body())...)
	}
	height := max(large.Size*lineHeight, float64(len(wrapped))*d.body().Size*lineHeight)
	return block{height: height, draw: func(y float64) {
		d.canvas.Text(d.left(), y+large.Size*0.85, count, large)
		d.lines(wrapped, d.left()+side, y, d.body())
	}}
}

// headWord names the head, or the nut that is turned in its place.
func headWord(j planner.Joint) string {
	if j.HeadNut != nil {
		return j.HeadNut.Kind
	}
	return j.Bolt.Head.Kind
}

func (d *document) spanner(p planner.Plan) string {
	h := p.Joint.Bolt.Head
	key := "spanner"
	if h.Kind == "socket cap" {
		key = "hexagon_key"
	}
	return d.words.say(key, "size", quantity.Trim(h.WidthAcrossFlats))
}

// mating says what the bolt goes into.
func (d *document) mating(j planner.Joint) string {
	if j.HeadNut != nil && j.Nut != nil {
		return d.words.say("nuts_line", "kind", j.Nut.Kind, "standard", j.Nut.Standard, "class", j.Bolt.Class.NutClass())
	}
	if j.LockNut != nil {
		return d.words.say("lock_line", "thin", j.LockNut.Standard, "kind", j.Nut.Kind, "standard", j.Nut.Standard, "class", j.Bolt.Class.NutClass())
	}
	if j.Nut == nil {
		return d.words.say("tapped_line", "material", j.Tapped.Material.Name)
	}
	return d.words.say("nut_line", "kind", j.Nut.Kind, "standard", j.Nut.Standard, "class", j.Bolt.Class.NutClass())
}

func (d *document) washers(j planner.Joint) string {
	switch {
	case j.HeadWasher != nil && j.NutWasher != nil:
		return d.words.say("washers_both", "head", j.HeadWasher.Standard, "nut", j.NutWasher.Standard)
	case j.HeadWasher != nil:
		return d.words.say("washers_head", "head", j.HeadWasher.Standard)
	case j.NutWasher != nil:
		return d.words.say("washers_nut", "nut", j.NutWasher.Standard)
	}
	return d.words.say("washers_none")
}

// figureBox is a setting in large figures: label, number and unit.
type figureBox struct{ label, number, unit string }

// The type of the settings: digits are 0.73 of it high, 14 mm at least on A5.
const (
	oneFigure  = 33.0 // of a single setting: digits 24 mm high
	twoFigures = 24.0 // of each of two: digits 17.5 mm high
	unitSize   = 8.0
	labelSize  = 4.6
	labelWidth = 36.0 // of the labels beside two figures
)

// setting is the frame with what the tool is set to, the largest thing on the
// card: one figure below its label, or two in their order, each beside its label.
func (d *document) setting(p planner.Plan) block {
	if isAngle(p) {
		return d.twoSettings(
			figureBox{d.words.say("first_torque"), quantity.Trim(p.Angle.SnugTorque), d.words.say("unit_torque")},
			figureBox{d.words.say("then_angle"), quantity.Trim(p.Angle.FromSnug), d.words.say("unit_angle")})
	}
	b := figureBox{d.words.say("set_tool"), quantity.Trim(p.Torque.Target), d.words.say("unit_torque")}
	above := d.mm(labelSize) * 1.7
	digits := d.mm(oneFigure) * figure.DigitHeight
	return d.framed(above+digits+d.mm(1), 0.9, func(x, y float64) {
		d.canvas.Text(x, y+d.mm(labelSize), b.label, figure.Type{Size: d.mm(labelSize), Bold: true})
		d.figures(b, x, y+above+digits, d.wide()-d.mm(4), d.mm(oneFigure))
	})
}

func (d *document) twoSettings(boxes ...figureBox) block {
	label := figure.Type{Size: d.mm(labelSize), Bold: true}
	digits := d.mm(twoFigures) * figure.DigitHeight
	row := digits + d.mm(5)
	side := d.mm(labelWidth)
	return d.framed(row*float64(len(boxes))-d.mm(2), 0.9, func(x, y float64) {
		for i, b := range boxes {
			if i > 0 {
				d.canvas.Line(x, y-d.mm(1), x+d.wide()-d.mm(4), y-d.mm(1), figure.Stroke{Width: d.mm(0.25)})
			}
			base := y + d.mm(1.5) + digits
			d.canvas.Text(x, base, b.label, d.fit(b.label, side-d.mm(2), label))
			d.figures(b, x+side, base, d.wide()-d.mm(4)-side, d.mm(twoFigures))
			y += row
		}
	})
}

// figures prints a setting and its unit on a base line, shrunk only when it is
// wider than its room.
func (d *document) figures(b figureBox, x, base, width, size float64) {
	unit := figure.Type{Size: d.mm(unitSize), Bold: true}
	space := d.mm(3)
	number := d.fit(b.number, width-d.canvas.Width(b.unit, unit)-space, figure.Type{Size: size, Bold: true})
	d.canvas.Text(x, base, b.number, number)
	d.canvas.Text(x+d.canvas.Width(b.number, number)+space, base, b.unit, unit)
}

// toolAndLubrication says what the setting rests on. With the guide's scatter the
// register may leave the tool out.
func (d *document) toolAndLubrication(p planner.Plan) []block {
	say := d.words.say
	tool := say("tool_unnamed")
	if t := p.Joint.Tightening.Tool; t != nil {
		if t.Name != "" {
			tool = t.Name
		}
		tool = say("tool_accuracy", "tool", tool, "tolerance", quantity.Trim(t.Tolerance*100))
	}
	f := p.Joint.Friction
	state := f.State
	if state == "" {
		state = say("lubrication_missing")
	}
	blocks := d.flow("", []item{{lead: say("tool"), text: tool}, {lead: say("lubrication"), text: state}}, d.body())
	blocks[len(blocks)-1].tight = true
	return append(blocks, d.paragraph(say("friction_assumed", "thread", d.span(f.Thread), "head", d.span(f.Head)),
		d.small()))
}

// The drawing of the order takes so much of the page, and its digits must be so
// high to be followed; else it gets a page of its own.
const (
	drawingWidth   = 60.0 // mm
	readableDigits = 2.0  // mm
)

// besideSteps is the room for the drawing beside the steps.
func (d *document) besideSteps() figure.Box {
	return figure.Box{Width: d.mm(drawingWidth), Height: d.mm(drawingWidth)}
}

// drawnBesideSteps reports whether the order can be followed when it is drawn
// beside the steps.
func (d *document) drawnBesideSteps(p planner.Plan) bool {
	return p.Count > 1 && p.Joint.Pattern.Kind != pattern.Unstated &&
		figure.DigitOf(p.Joint.Pattern, d.besideSteps()) >= readableDigits
}

// orderAndSteps puts the drawing of the order beside the steps, or says where or
// what the order is.
func (d *document) orderAndSteps(p planner.Plan) []block {
	steps := d.steps(p)
	if d.drawnBesideSteps(p) {
		return []block{d.orderBesideSteps(p, steps)}
	}
	if p.Count > 1 {
		order := item{mark: "●", lead: d.words.say("order_lead"), text: d.words.say("order_unstated")}
		if p.Joint.Pattern.Kind != pattern.Unstated {
			order.text = d.words.say("order_other_page")
		}
		steps = append([]item{order}, steps...)
	}
	return d.flow(d.words.say("steps_heading"), steps, d.body())
}

func (d *document) orderBesideSteps(p planner.Plan, steps []item) block {
	box := d.besideSteps()
	box.Height = figure.PatternHeight(p.Joint.Pattern, box)
	aside := box.Width + d.mm(4)
	l := d.newList(d.words.say("steps_heading"), steps, d.wide()-aside, d.body())
	note := d.wrap(d.words.say("order_note"), box.Width, d.small())
	head := d.body().Size * headingHeight
	drawing := head + box.Height + d.mm(1) + float64(len(note))*d.mm(smallSize)*lineHeight
	return block{height: max(l.height(), drawing), draw: func(y float64) {
		d.heading(d.words.say("order_heading"), d.left(), y, d.body())
		box.X, box.Y = d.left(), y+head
		figure.BoltPattern(d.canvas, p.Joint.Pattern, box)
		d.lines(note, d.left(), box.Y+box.Height+d.mm(1), d.small())
		l.draw(d.left()+aside, y)
	}}
}

// numbering says how the bolts are counted.
func (d *document) numbering(p planner.Plan) string {
	switch p.Joint.Pattern.Kind {
	case pattern.Circle:
		return d.words.say("order_numbering_circle")
	case pattern.Grid:
		return d.words.say("order_numbering_grid")
	}
	return d.words.say("order_numbering_points")
}

// orderPage draws the order over a whole page; where even that is too small to
// follow, it lists the bolt numbers.
func (d *document) orderPage(p planner.Plan) []block {
	pat := p.Joint.Pattern
	note := d.wrap(d.words.say("order_note"), d.wide(), d.body())
	head := d.body().Size * headingHeight
	below := d.mm(1) + float64(len(note))*d.body().Size*lineHeight
	box := figure.Box{X: d.left(), Width: d.wide(), Height: min(d.wide(), d.bottom(p)-d.top(p)-head-below)}
	if figure.DigitOf(pat, box) >= readableDigits {
		box.Height = figure.PatternHeight(pat, box)
		return []block{{height: head + box.Height + below, fresh: true, draw: func(y float64) {
			d.heading(d.words.say("order_heading"), d.left(), y, d.body())
			box.Y = y + head
			figure.BoltPattern(d.canvas, pat, box)
			d.lines(note, d.left(), box.Y+box.Height+d.mm(1), d.body())
		}}}
	}
	return d.orderList(p)
}

// orderList lists the bolt numbers in their order, on a page of its own.
func (d *document) orderList(p planner.Plan) []block {
	pat := p.Joint.Pattern
	order := pat.Order()
	numbers := make([]string, len(order))
	for i, n := range order {
		numbers[i] = strconv.Itoa(n)
	}
	blocks := d.flow(d.words.say("order_heading"), []item{{text: d.numbering(p)}}, d.body())
	blocks[0].fresh = true
	const perBlock = 120 // so that a long list flows over pages
	for from := 0; from < len(numbers); from += perBlock {
		part := strings.Join(numbers[from:min(from+perBlock, len(numbers))], " · ")
		blocks = append(blocks, d.paragraph(d.words.say("order_list", "list", part), d.body()))
	}
	return blocks
}
