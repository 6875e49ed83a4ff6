package card

import (
	"clampback/planner"
	"clampback/report/figure"
)

// forbidden returns the page of an infeasible joint: it forbids in the largest
// type of all pages, on a hatched ground, and holds no figure that could be taken
// for a setting.
func (d *document) forbidden(p planner.Plan) []block {
	say := d.words.say
	heading := d.fit(say("forbid_heading"), d.wide(), figure.Type{Size: d.mm(16), Bold: true, Grey: 1})
	banner := block{height: heading.Size * 1.8, draw: func(y float64) {
		d.rectangle(0, y, d.paper.width, heading.Size*1.8, 0, figure.Stroke{})
		t := heading
		t.Anchor = figure.Middle
		d.canvas.Text(d.paper.width/2, y+heading.Size*1.25, say("forbid_heading"), t)
	}}
	large := figure.Type{Size: d.mm(nameSize)}
	return []block{
		banner,
		d.onWhite(d.paragraph(say("forbid_title", "id", p.ID), bold(figure.Type{Size: d.mm(titleSize)}))),
		d.onWhite(d.paragraph(say("forbid_text"), large)),
		d.onWhite(d.listBlock(say("forbid_reasons"), d.reasons(p), large)),
		d.onWhite(d.paragraph(say("forbid_do"), bold(large))),
	}
}

// reasons names what fails, without numbers.
func (d *document) reasons(p planner.Plan) []item {
	var items []item
	if p.Torque.Target == 0 || (isAngle(p) && p.Angle.FromSnug == 0) {
		items = append(items, item{mark: "×", text: d.words.say("forbid_window")})
	}
	for _, c := range p.Checks {
		if !c.OK {
			items = append(items, item{mark: "×", text: d.words.say("forbid_check", "check", c.Name)})
		}
	}
	return items
}

// onWhite puts a block on a white ground, so that it reads on the hatching.
func (d *document) onWhite(b block) block {
	pad := d.mm(1.5)
	return block{height: b.height + 2*pad, fresh: b.fresh, draw: func(y float64) {
		d.rectangle(d.left()-pad, y, d.wide()+2*pad, b.height+2*pad, 1, figure.Stroke{})
		b.draw(y + pad)
	}}
}

// hatch covers the page with slanting strokes and a heavy frame.
func (d *document) hatch() {
	w, h := d.paper.width, d.paper.height
	stroke := figure.Stroke{Width: d.mm(1.6), Grey: 0.8}
	for x := -h; x < w; x += d.mm(7) {
		from, to := figure.Point{X: x, Y: h}, figure.Point{X: x + h, Y: 0}
		d.canvas.Line(from.X, from.Y, to.X, to.Y, stroke)
	}
	edge := d.mm(3)
	for _, r := range []figure.Box{{Width: w, Height: edge}, {Y: h - edge, Width: w, Height: edge}, {Width: edge, Height: h}, {X: w - edge, Width: edge, Height: h}} {
		d.rectangle(r.X, r.Y, r.Width, r.Height, 0, figure.Stroke{})
	}
	d.rectangle(d.left()-d.mm(1.5), d.mm(margin)-d.mm(2), d.wide()+d.mm(3), d.mm(18), 1, figure.Stroke{})
	d.rectangle(d.left()-d.mm(1.5), h-d.mm(margin)-d.mm(footer), d.wide()+d.mm(3), d.mm(footer)+d.mm(1.5), 1, figure.Stroke{})
}
