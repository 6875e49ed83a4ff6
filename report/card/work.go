package card

import (
	"strconv"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/report/figure"
)

// steps are the numbered actions of the method, settings as bold leads.
func (d *document) steps(p planner.Plan) []item {
	say := d.words.say
	snug, target := quantity.Trim(p.Angle.SnugTorque), quantity.Trim(p.Torque.Target)
	items := []item{{text: say("step_read")}, {text: say("step_parts")}}
	if heat := p.Joint.Temperature; len(heat.States) > 0 || heat.Service != heat.Assembly {
		t := heat.Assembly
		text := say("step_temperature_one", "low", quantity.Trim(t.Low))
		if !t.IsSingle() {
			text = say("step_temperature", "low", quantity.Trim(t.Low), "high", quantity.Trim(t.High))
		}
		items = append(items, item{text: text})
	}
	if p.Joint.Friction.State != "" {
		items = append(items, item{text: say("step_lubricate")})
	}
	items = append(items, item{text: say("step_hand")})
	for _, c := range p.Joint.Bolt.Class.Cautions() {
		if c.Kind == "seizing" {
			items = append(items, item{text: say("step_seizing")})
		}
	}
	if key := held(p.Joint); key != "" {
		items = append(items, item{text: say(key)})
	}
	first := item{lead: say("step_set", "torque", snug), text: say("step_snug")}
	switch {
	case isAngle(p):
		items = append(items, first, item{text: say("step_mark_start")},
			item{lead: say("step_turn", "angle", quantity.Trim(p.Angle.FromSnug)), text: say("step_angle")})
	case p.Count > 1:
		items = append(items, first, item{lead: say("step_set", "torque", target), text: say("step_final")})
		if p.Count >= 4 {
			items = append(items, item{lead: say("step_check", "torque", target), text: say("step_check_pass")})
		}
	default:
		items = append(items, item{lead: say("step_set", "torque", target), text: say("step_final_one")})
	}
	items = append(items, item{text: say("step_record")})
	for i := range items {
		items[i].mark = strconv.Itoa(i + 1)
	}
	return items
}

// held names the step that says what is held and what is turned; none where a bolt
// goes into a tapped part.
func held(j planner.Joint) string {
	switch {
	case j.HeadNut != nil && j.Tapped != nil:
		return "step_stud_tapped"
	case j.HeadNut != nil:
		return "step_stud_through"
	case j.LockNut != nil:
		return "step_lock"
	case j.Nut != nil:
		return "step_hold"
	}
	return ""
}

// inwards prints the ends of a range rounded inwards, to the coarsest of the
// steps that is not above a fifth of it; in full where there is none.
func inwards(r quantity.Range, steps ...float64) (low, high string) {
	for _, step := range steps {
		if step <= (r.High-r.Low)/5 {
			return quantity.Trim(quantity.RoundUp(r.Low, step)), quantity.Trim(quantity.RoundDown(r.High, step))
		}
	}
	return quantity.Trim(r.Low), quantity.Trim(r.High)
}

// verdict says which readings are OK, what counts as a failure and what to do
// then.
func (d *document) verdict(p planner.Plan) block {
	say := d.words.say
	lowAngle, highAngle := inwards(quantity.Range{Low: p.Angle.Low, High: p.Angle.High}, 1, 0.1, 0.01)
	var items []item
	if isAngle(p) {
		lowTorque, highTorque := inwards(quantity.Range{Low: p.Torque.WindowLow, High: p.Torque.WindowHigh}, 1, 0.1, 0.01)
		items = append(items, item{"✓", say("accept_end_lead"),
			say("accept_end", "anglelow", lowAngle, "anglehigh", highAngle, "low", lowTorque, "high", highTorque)})
	} else {
		items = append(items,
			item{"✓", say("accept_angle_lead"), say("accept_angle", "snug", quantity.Trim(p.Angle.SnugTorque),
				"low", lowAngle, "high", highAngle)},
			item{mark: "×", text: say("nok_spin")})
	}
	for _, key := range []string{"nok_early", "nok_reading", "nok_parts"} {
		items = append(items, item{mark: "×", text: say(key)})
	}
	items = append(items, item{"→", say("nok_do_lead"), say("nok_do")})
	l := d.newList(say("verdict_heading"), items, d.wide()-d.mm(4), d.body())
	return d.framed(l.height(), 0.5, l.draw)
}

// heavyTorque is from where the reaction of the tool needs a warning, N.m;
// common practice, no source.
const heavyTorque = 200

// warnings lists the hazards to people that apply.
func (d *document) warnings(p planner.Plan) []block {
	var items []item
	for _, c := range d.cautions {
		applies := c.when == "always" ||
			(c.when == "seal" && p.Joint.Clamp.SealPressure > 0) ||
			(c.when == "heavy" && p.Torque.WindowHigh >= heavyTorque) ||
			(c.when == "nut" && p.Joint.Nut != nil)
		if applies {
			items = append(items, item{"▲", c.hazard + ":", c.text})
		}
	}
	return d.flow(d.words.say("caution_heading"), items, d.body())
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
