package card

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"clampback/planner"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
	"clampback/report/figure"
)

// instruction returns the blocks of a feasible joint's card, in the order in
// which a technician needs them.
func (d *document) instruction(p planner.Plan) []block {
	blocks := []block{d.what(p), d.setting(p), d.lubrication(p)}
	blocks = append(blocks, d.orderAndSteps(p)...)
	return append(blocks, d.warnings(p), d.notOK(p), d.record())
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
	lines := []string{
		d.words.say("bolt_line", "thread", b.Thread.Designation, "length", quantity.Trim(b.Length), "head", b.Head.Kind, "standard", b.Head.Standard, "class", b.Class.Name) + ". " + d.spanner(p),
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
	height := max(large.Size*lineHeight, float64(len(wrapped))*d.mm(bodySize)*lineHeight)
	return block{height: height, draw: func(y float64) {
		d.canvas.Text(d.left(), y+large.Size*0.85, count, large)
		d.lines(wrapped, d.left()+side, y, d.body())
	}}
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

// setting is the frame with what the tool is set to, the largest thing on the
// card.
func (d *document) setting(p planner.Plan) block {
	boxes := []figureBox{{d.words.say("set_tool"), quantity.Trim(p.Torque.Target), d.words.say("unit_torque")}}
	if isAngle(p) {
		boxes = []figureBox{
			{d.words.say("first_torque"), quantity.Trim(p.Angle.SnugTorque), d.words.say("unit_torque")},
			{d.words.say("then_angle"), quantity.Trim(p.Angle.FromSnug), d.words.say("unit_angle")},
		}
	}
	tool := d.wrap(d.tool(p), d.wide()-d.mm(4), d.body())
	label := d.mm(bodySize) * 1.2
	height := label*lineHeight + d.mm(bigSize)*0.86 + float64(len(tool))*d.mm(bodySize)*lineHeight + d.mm(1.5)
	return d.framed(height, 0.9, func(x, y float64) {
		each := (d.wide() - d.mm(4)) / float64(len(boxes))
		for i, b := range boxes {
			d.figures(b, x+float64(i)*each, y, each, label)
		}
		d.lines(tool, x, y+label*lineHeight+d.mm(bigSize)*0.86+d.mm(1.5), d.body())
	})
}

// figures prints one setting in large figures, shrunk only when a number is
// wider than its room.
func (d *document) figures(b figureBox, x, y, width, label float64) {
	d.canvas.Text(x, y+label, b.label, figure.Type{Size: label, Bold: true})
	unit := figure.Type{Size: d.mm(8), Bold: true}
	number := d.fit(b.number, width-d.canvas.Width(b.unit, unit)-d.mm(6), figure.Type{Size: d.mm(bigSize), Bold: true})
	base := y + label*lineHeight + d.mm(bigSize)*0.8
	d.canvas.Text(x, base, b.number, number)
	d.canvas.Text(x+d.canvas.Width(b.number, number)+d.mm(3), base, b.unit, unit)
}

// tool names the tool and how well it reads. With the guide's scatter the
// register may leave the tool out.
func (d *document) tool(p planner.Plan) string {
	t := p.Joint.Tightening.Tool
	if t == nil {
		return d.words.say("tool_unnamed")
	}
	name := t.Name
	if name == "" {
		name = d.words.say("tool_unnamed")
	}
	return d.words.say("tool", "tool", name, "tolerance", quantity.Trim(t.Tolerance*100))
}

func (d *document) lubrication(p planner.Plan) block {
	state := p.Joint.Friction.State
	if state == "" {
		state = d.words.say("lubrication_missing")
	}
	return d.listBlock("", []item{{lead: d.words.say("lubrication"), text: state}}, d.body())
}

// The drawing of the order takes so much of the page, and its digits must be so
// high to be followed; else it gets a page of its own.
const (
	drawingWidth   = 58.0 // mm
	readableDigits = 1.7  // mm
)

// orderAndSteps puts the drawing of the order beside the steps, or after them on
// a page of its own.
func (d *document) orderAndSteps(p planner.Plan) []block {
	pat := p.Joint.Pattern
	steps := d.steps(p)
	side := d.mm(drawingWidth)
	box := figure.Box{Width: side, Height: side}
	drawn := p.Count > 1 && pat.Kind != pattern.Unstated
	if drawn && figure.DigitOf(pat, box) >= readableDigits {
		return []block{d.orderBesideSteps(p, steps, box)}
	}
	if p.Count > 1 && !drawn {
		steps = append([]item{{mark: "●", lead: d.words.say("order_heading"), text: d.words.say("order_unstated")}}, steps...)
	}
	if drawn {
		steps = append([]item{{mark: "●", lead: d.words.say("order_heading"), text: d.words.say("order_other_page")}}, steps...)
	}
	blocks := []block{d.listBlock(d.words.say("steps_heading"), steps, d.body())}
	if drawn {
		blocks = append(blocks, d.orderPage(p)...)
	}
	return blocks
}

func (d *document) orderBesideSteps(p planner.Plan, steps []item, box figure.Box) block {
	l := d.newList(d.words.say("steps_heading"), steps, d.wide()-box.Width-d.mm(3), d.body())
	note := d.wrap(d.words.say("order_note"), box.Width, d.small())
	drawing := d.mm(bodySize)*lineHeight*1.25 + box.Height + float64(len(note))*d.mm(smallSize)*lineHeight
	return block{height: max(l.height(), drawing), draw: func(y float64) {
		head := bold(d.body())
		head.Size *= 1.15
		d.canvas.Text(d.left(), y+head.Size, d.words.say("order_heading"), head)
		top := y + d.mm(bodySize)*lineHeight*1.25
		figure.BoltPattern(d.canvas, p.Joint.Pattern, figure.Box{X: d.left(), Y: top, Width: box.Width, Height: box.Height})
		d.lines(note, d.left(), top+box.Height, d.small())
		l.draw(d.left()+box.Width+d.mm(3), y)
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
	side := d.wide()
	heading := d.paragraph(d.words.say("order_heading"), bold(figure.Type{Size: d.mm(nameSize)}))
	heading.fresh = true
	if figure.DigitOf(pat, figure.Box{Width: side, Height: side}) >= readableDigits {
		note := d.paragraph(d.words.say("order_note"), d.body())
		drawing := block{height: side, draw: func(y float64) {
			figure.BoltPattern(d.canvas, pat, figure.Box{X: d.left(), Y: y, Width: side, Height: side})
		}}
		return []block{heading, drawing, note}
	}
	order := pat.Order()
	numbers := make([]string, len(order))
	for i, n := range order {
		numbers[i] = strconv.Itoa(n)
	}
	blocks := []block{heading, d.paragraph(d.numbering(p), d.body())}
	const perBlock = 120 // so that a long list flows over pages
	for from := 0; from < len(numbers); from += perBlock {
		part := strings.Join(numbers[from:min(from+perBlock, len(numbers))], " · ")
		blocks = append(blocks, d.paragraph(d.words.say("order_list", "list", part), d.body()))
	}
	return blocks
}

// steps are the numbered actions of the method.
func (d *document) steps(p planner.Plan) []item {
	say := d.words.say
	snug, target := quantity.Trim(p.Angle.SnugTorque), quantity.Trim(p.Torque.Target)
	texts := []string{say("step_read"), say("step_check")}
	if p.Joint.Friction.State != "" {
		texts = append(texts, say("step_lubricate"))
	}
	texts = append(texts, say("step_hand"))
	if p.Joint.Nut != nil {
		texts = append(texts, say("step_hold"))
	}
	several := p.Count > 1
	switch {
	case isAngle(p):
		texts = append(texts, say("step_snug", "snug", snug), say("step_mark_start"), say("step_angle", "angle", quantity.Trim(p.Angle.FromSnug)))
	case several:
		texts = append(texts, say("step_snug", "snug", snug), say("step_final", "target", target))
		if p.Count >= 4 {
			texts = append(texts, say("step_check_pass", "target", target))
		}
	default:
		texts = append(texts, say("step_final_one", "target", target))
	}
	texts = append(texts, say("step_record"))
	items := make([]item, len(texts))
	for i, t := range texts {
		items[i] = item{mark: strconv.Itoa(i + 1), text: t}
	}
	return items
}

// acceptance holds what a tool that reads may show, rounded inwards: whole
// degrees, and torques to a tenth of a N.m or three figures.
type acceptance struct{ lowAngle, highAngle, lowTorque, highTorque string }

func accept(p planner.Plan) acceptance {
	step := math.Pow(10, math.Floor(math.Log10(math.Max(p.Torque.WindowHigh, 1e-3)))-2)
	step = math.Max(step, 0.01)
	return acceptance{
		lowAngle:   fmt.Sprintf("%.0f", quantity.RoundUp(p.Angle.Low, 1)),
		highAngle:  fmt.Sprintf("%.0f", quantity.RoundDown(p.Angle.High, 1)),
		lowTorque:  quantity.Trim(quantity.RoundUp(p.Torque.WindowLow, step)),
		highTorque: quantity.Trim(quantity.RoundDown(p.Torque.WindowHigh, step)),
	}
}

// notOK says what counts as a failure and what to do then.
func (d *document) notOK(p planner.Plan) block {
	say := d.words.say
	a := accept(p)
	var items []item
	if isAngle(p) {
		items = append(items,
			item{"✓", say("accept_heading_torque"), say("accept_end", "anglelow", a.lowAngle, "anglehigh", a.highAngle, "low", a.lowTorque, "high", a.highTorque)},
			item{"×", "", say("nok_angle", "low", a.lowAngle, "high", a.highAngle)},
			item{"×", "", say("nok_torque", "low", a.lowTorque, "high", a.highTorque)})
	} else {
		items = append(items,
			item{"×", "", say("nok_spin")},
			item{"✓", say("accept_heading"), say("accept_angle", "snug", quantity.Trim(p.Angle.SnugTorque), "low", a.lowAngle, "high", a.highAngle)})
	}
	items = append(items, item{"×", "", say("nok_early")}, item{"×", "", say("nok_parts")})
	items = append(items, item{"→", say("nok_do_heading"), say("nok_do")})
	l := d.newList(say("nok_heading"), items, d.wide()-d.mm(4), d.body())
	return d.framed(l.height(), 0.5, l.draw)
}

// heavyTorque is from where the reaction of the tool needs a warning, N.m;
// common practice, no source.
const heavyTorque = 200

// warnings lists the hazards to people that apply.
func (d *document) warnings(p planner.Plan) block {
	var items []item
	for _, c := range d.cautions {
		applies := c.when == "always" ||
			(c.when == "seal" && p.Joint.Clamp.SealPressure > 0) ||
			(c.when == "heavy" && p.Torque.WindowHigh >= heavyTorque) ||
			(c.when == "nut" && p.Joint.Nut != nil)
		if applies {
			items = append(items, item{"▲", c.hazard, c.text})
		}
	}
	return d.listBlock(d.words.say("caution_heading"), items, d.body())
}

// record is the table to sign.
func (d *document) record() block {
	say := d.words.say
	cells := []string{say("sign_person"), say("sign_date"), say("sign_tool"), say("sign_due"), say("sign_checked")}
	row := d.mm(12)
	return block{height: row, draw: func(y float64) {
		width := d.wide() / float64(len(cells))
		for i, c := range cells {
			x := d.left() + float64(i)*width
			d.rectangle(x, y, width, row, 1, figure.Stroke{Width: d.mm(0.25)})
			d.canvas.Text(x+d.mm(1), y+d.mm(smallSize)*1.2, c, d.fit(c, width-d.mm(2), d.small()))
		}
	}}
}
