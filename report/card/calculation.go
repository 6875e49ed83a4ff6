package card

import (
	"fmt"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/report"
	"clampback/report/figure"
)

// calculation returns the blocks of the engineer's page: the joint diagram, the
// work-back, the window, the checks and the assumptions.
func (d *document) calculation(p planner.Plan) []block {
	say := d.words.say
	white := func(b block) block { return b }
	if !p.Feasible {
		white = d.onWhite
	}
	title := d.paragraph(say("calc_title"), bold(d.body()))
	title.fresh = true
	blocks := []block{white(title)}
	if !p.Feasible {
		blocks = append(blocks, white(d.paragraph(say("calc_infeasible"), bold(figure.Type{Size: d.mm(titleSize)}))))
	}
	height := d.mm(62)
	diagram := block{height: height, draw: func(y float64) {
		figure.JointDiagram(d.canvas, p, figure.Box{X: d.left(), Y: y, Width: d.wide(), Height: height})
	}}
	blocks = append(blocks, white(diagram), white(d.twoLists(p)), white(d.listBlock(say("calc_binds"), plainItems(p.Binds), d.small())), white(d.checkTable(p)))
	// Assumptions may be many: each is a block of its own, so that they flow.
	blocks = append(blocks, white(d.paragraph(say("calc_assumptions"), bold(d.small()))))
	for _, a := range p.Assumptions {
		blocks = append(blocks, white(d.tight(d.listBlock("", plainItems([]string{a}), d.small()))))
	}
	return blocks
}

// tight takes the gap after a block back.
func (d *document) tight(b block) block {
	b.height -= d.mm(gap) * 0.85
	return b
}

func plainItems(texts []string) []item {
	items := make([]item, len(texts))
	for i, t := range texts {
		items[i] = item{mark: "–", text: t}
	}
	return items
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
		{"= " + say("calc_required"), kilo(quantity.RoundUp(b.RequiredPreload, 10))},
		{say("calc_limit"), kilo(quantity.RoundDown(p.Preload.Limit, 10))},
	}
	setting := d.newList(say("calc_setting"), plainItems(d.settingLines(p)), half, d.small())
	line := d.mm(smallSize) * lineHeight
	head := line * 1.25
	height := max(head+float64(len(rows))*line*1.1, setting.height())
	return block{height: height, draw: func(y float64) {
		h := bold(d.small())
		h.Size *= 1.15
		d.canvas.Text(d.left(), y+h.Size, say("calc_workback"), h)
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
		say("calc_preload", "low", kilo(quantity.RoundDown(p.Preload.Lowest, 10)), "high", kilo(quantity.RoundUp(p.Preload.Highest, 10)),
			"factor", fmt.Sprintf("%.2f", p.Preload.ScatterFactor)),
		say("calc_left", "low", kilo(quantity.RoundDown(p.ResidualClamp.Lowest, 10)), "high", kilo(quantity.RoundUp(p.ResidualClamp.Highest, 10))),
		say("calc_stiffness", "bolt", fmt.Sprintf("%.4g", s.BoltCompliance*1e6), "parts", fmt.Sprintf("%.4g", s.ClampedCompliance*1e6), "factor", fmt.Sprintf("%.4f", s.LoadFactor)),
		say("calc_friction", "thread", span(f.Thread), "head", span(f.Head), "source", f.Source),
	)
}

func kilo(newton float64) string { return fmt.Sprintf("%.2f", newton/1000) }

func span(r quantity.Range) string {
	if r.IsSingle() {
		return quantity.Trim(r.Low)
	}
	return quantity.Trim(r.Low) + " to " + quantity.Trim(r.High)
}

// checkTable lists the checks with a bar of how much each uses.
func (d *document) checkTable(p planner.Plan) block {
	say := d.words.say
	line := d.mm(smallSize) * lineHeight * 1.12
	t := d.small()
	end := t
	end.Anchor = figure.End
	x, w := d.left(), d.wide()
	columns := []float64{x, x + 0.60*w, x + 0.74*w, x + 0.83*w, x + 0.92*w}
	return block{height: line * float64(len(p.Checks)+1), draw: func(y float64) {
		base := y + line*0.8
		d.canvas.Text(columns[0], base, say("calc_check"), bold(t))
		for i, key := range []string{"calc_value", "calc_allowed"} {
			d.canvas.Text(columns[i+1], base, say(key), bold(end))
		}
		d.canvas.Text(columns[4], base, say("calc_used"), bold(end))
		for _, c := range p.Checks {
			base += line
			verdict, face := say("calc_ok"), t
			if !c.OK {
				verdict, face = say("calc_fails"), bold(t)
			}
			relation := "≤"
			if c.AtLeast {
				relation = "≥"
			}
			d.canvas.Text(columns[0], base, c.Name, d.fit(c.Name, 0.47*w, face))
			d.canvas.Text(columns[1], base, report.Plain(c.Value), end)
			d.canvas.Text(columns[2], base, relation+" "+report.Plain(c.Limit), end)
			d.canvas.Text(columns[2]+d.mm(1), base, c.Unit, t)
			d.canvas.Text(columns[4], base, fmt.Sprintf("%.0f %%", c.Utilisation*100), end)
			d.canvas.Text(columns[4]+d.mm(1.5), base, verdict, face)
		}
	}}
}
