package card

import (
	"fmt"
	"strconv"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/stiffness"
	"clampback/report/figure"
)

// calculation returns the blocks of the engineer's page: the joint diagram, of a
// cyclic load the fatigue diagrams, what binds, the work-back, the window, the checks
// and the assumptions.
func (d *document) calculation(p planner.Plan) []block {
	say := d.words.say
	title := d.paragraph(say("calc_title"), bold(d.body()))
	title.fresh = true
	blocks := []block{title}
	if !p.Feasible {
		blocks = append(blocks, d.paragraph(say("calc_infeasible"), bold(figure.Type{Size: d.mm(titleSize)})))
	}
	height := d.mm(70)
	diagram := block{height: height, draw: func(y float64) {
		figure.JointDiagram(d.canvas, p, figure.Box{X: d.left(), Y: y, Width: d.wide(), Height: height}, say)
	}}
	blocks = append(blocks, diagram)
	if f, ok := planner.FatigueDiagram(p); ok {
		blocks = append(blocks, d.fatigue(p, f))
	}
	blocks = append(blocks, d.flow(say("calc_binds"), plainItems(p.Binds), d.small())...)
	if who := d.governing(p); len(who) > 0 {
		blocks = append(blocks, d.flow(say("calc_governs"), plainItems(who), d.small())...)
	}
	blocks = append(blocks, d.twoLists(p))
	blocks = append(blocks, d.checkTable(p)...)
	return append(blocks, d.flow(say("calc_assumptions"), plainItems(p.Assumptions), d.small())...)
}

// fatigue sets the Haigh diagram beside the Smith diagram, with where they come from
// below.
func (d *document) fatigue(p planner.Plan, f stiffness.FatigueDiagram) block {
	say := d.words.say
	rolled := say("fatigue_before")
	if f.RolledAfter {
		rolled = say("fatigue_after")
	}
	key := "fatigue_caption"
	if f.Spectrum {
		key = "fatigue_caption_spectrum"
	}
	text := say(key, "rolled", rolled, "cycles", figure.Cycles(f.Cycles))
	if p.ResidualClamp.Lowest < 0 {
		text += " " + say("fatigue_opens")
	}
	caption := d.paragraph(text, d.small())
	drawing, between := d.mm(61), d.mm(4)
	width := (d.wide() - between) / 2
	return block{height: drawing + caption.height, draw: func(y float64) {
		figure.Haigh(d.canvas, f, figure.Box{X: d.left(), Y: y, Width: width, Height: drawing}, say)
		figure.Smith(d.canvas, f, figure.Box{X: d.left() + width + between, Y: y, Width: width, Height: drawing}, say)
		caption.draw(y + drawing)
	}}
}

// twoLists sets the work-back beside the setting.
func (d *document) twoLists(p planner.Plan) block {
	say := d.words.say
	half := d.wide()/2 - d.mm(2)
	b := p.WorkBack
	rows := [][2]string{
		{say("calc_residual"), kilo(quantity.RoundUp(b.RequiredResidualClamp, 10))},
		{"+ " + say("calc_relief"), kilo(quantity.RoundUp(b.LoadRelief, 10))},
		{"+ " + say("calc_embedding"), kilo(quantity.RoundUp(b.EmbeddingLoss, 10))},
		{"+ " + say("calc_thermal"), kilo(quantity.RoundUp(b.ThermalLoss, 10))},
	}
	for _, loss := range []struct {
		key    string
		newton float64
	}{{"calc_closing", b.ClosingLoss}, {"calc_softening", b.SofteningLoss}, {"calc_relaxation", b.RelaxationLoss}} {
		if loss.newton > 0 {
			rows = append(rows, [2]string{"+ " + say(loss.key), kilo(quantity.RoundUp(loss.newton, 10))})
		}
	}
	rows = append(rows, [][2]string{
		{"= " + say("calc_required"), kilo(quantity.RoundUp(b.RequiredPreload, 10))},
		{say("calc_limit"), kilo(quantity.RoundDown(p.Preload.Limit, 10))},
	}...)
	setting := d.newList(say("calc_setting"), plainItems(d.settingLines(p)), half, d.small())
	line := d.mm(smallSize) * lineHeight
	head := d.mm(smallSize) * headingHeight
	height := max(head+float64(len(rows))*line*1.1, setting.height())
	return block{height: height, draw: func(y float64) {
		d.heading(say("calc_workback"), d.left(), y, d.small())
		at := y + head
		for _, r := range rows {
			at += line * 1.1
			end := d.small()
			end.Anchor = figure.End
			d.canvas.Text(d.left(), at-0.25*d.mm(smallSize), r[0], d.fit(r[0], half-d.mm(14), d.small()))
			d.canvas.Text(d.left()+half-d.mm(2), at-0.25*d.mm(smallSize), r[1], end)
		}
		setting.draw(d.left()+half+d.mm(4), y)
	}}
}

// settingLines are the window, the target and what it gives.
func (d *document) settingLines(p planner.Plan) []string {
	say := d.words.say
	var lines []string
	if isAngle(p) {
		lines = append(lines, say("calc_window_angle", "low", fmt.Sprintf("%.1f", quantity.RoundUp(p.AngleWindow.Low, 0.1)),
			"high", fmt.Sprintf("%.1f", quantity.RoundDown(p.AngleWindow.High, 0.1)), "snug", quantity.Trim(p.Angle.SnugTorque)))
	} else {
		lines = append(lines, say("calc_window", "low", fmt.Sprintf("%.1f", quantity.RoundUp(p.Torque.WindowLow, 0.1)),
			"high", fmt.Sprintf("%.1f", quantity.RoundDown(p.Torque.WindowHigh, 0.1))))
		if p.Torque.Target > 0 {
			lines = append(lines, say("calc_target", "target", quantity.Trim(p.Torque.Target)))
		}
	}
	f, s := p.Joint.Friction, p.Stiffness
	return append(lines,
		say("calc_preload", "low", kilo(quantity.RoundDown(p.Preload.Lowest, 10)),
			"high", kilo(quantity.RoundUp(p.Preload.Highest, 10)),
			"factor", fmt.Sprintf("%.2f", p.Preload.ScatterFactor)),
		say("calc_left", "low", kilo(quantity.RoundDown(p.ResidualClamp.Lowest, 10)),
			"high", kilo(quantity.RoundUp(p.ResidualClamp.Highest, 10))),
		say("calc_stiffness", "bolt", fmt.Sprintf("%.4g", s.BoltCompliance*1e6),
			"parts", fmt.Sprintf("%.4g", s.ClampedCompliance*1e6), "factor", fmt.Sprintf("%.4f", s.LoadFactor)),
		say("calc_friction", "thread", d.span(f.Thread), "head", d.span(f.Head), "source", f.Source),
	)
}

func kilo(newton float64) string { return fmt.Sprintf("%.2f", newton/1000) }

// span prints a range of coefficients of friction.
func (d *document) span(r quantity.Range) string {
	if r.IsSingle() {
		return coefficient(r.Low)
	}
	return d.words.say("range", "low", coefficient(r.Low), "high", coefficient(r.High))
}

// coefficient prints a coefficient with two decimals, or more where it has them.
func coefficient(mu float64) string {
	if text := quantity.Trim(mu); len(text) > len("0.00") {
		return text
	}
	return fmt.Sprintf("%.2f", mu)
}

// checkTable lists the checks with how much each uses, a row a block.
func (d *document) checkTable(p planner.Plan) []block {
	say := d.words.say
	t := d.small()
	blocks := []block{d.checkRow([...]string{say("calc_check"), say("calc_value"), say("calc_allowed"), "",
		say("calc_used"), ""}, bold(t))}
	for _, c := range p.Checks {
		verdict, face := say("calc_ok"), t
		if !c.OK {
			verdict, face = say("calc_fails"), bold(t)
		}
		relation := "≤ "
		if c.AtLeast {
			relation = "≥ "
		}
		blocks = append(blocks, d.checkRow([...]string{c.Name, quantity.Plain(c.Value), relation + quantity.Plain(c.Limit),
			c.Unit, fmt.Sprintf("%.0f %%", c.Utilisation*100), verdict}, face))
	}
	blocks[len(blocks)-1].tight = false
	return blocks
}

// checkRow is a row of the table of checks: name, value, limit, unit, use and
// verdict.
func (d *document) checkRow(cells [6]string, t figure.Type) block {
	line := d.mm(smallSize) * lineHeight * 1.12
	end := t
	end.Anchor = figure.End
	x, w := d.left(), d.wide()
	return block{height: line, tight: true, draw: func(y float64) {
		base := y + line*0.8
		d.canvas.Text(x, base, cells[0], d.fit(cells[0], 0.48*w, t))
		d.canvas.Text(x+0.60*w, base, cells[1], end)
		d.canvas.Text(x+0.74*w, base, cells[2], end)
		d.canvas.Text(x+0.75*w, base, cells[3], t)
		d.canvas.Text(x+0.89*w, base, cells[4], end)
		d.canvas.Text(x+0.91*w, base, cells[5], t)
	}}
}

// governing says which bolt in which load case decides what; nothing where the loads
// are those of one bolt.
func (d *document) governing(p planner.Plan) []string {
	var who []string
	for _, g := range p.Governing {
		who = append(who, d.words.say("calc_governing", "what", g.For, "bolt", strconv.Itoa(g.Bolt), "case", g.Case))
	}
	return who
}
