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
	blocks := []block{
		banner,
		d.paragraph(say("forbid_title", "id", p.ID), bold(figure.Type{Size: d.mm(titleSize)})),
		d.paragraph(say("forbid_text"), large),
	}
	blocks = append(blocks, d.flow(say("forbid_reasons"), d.reasons(p), large)...)
	return append(blocks, d.paragraph(say("forbid_do"), bold(large)))
}

// reasons names what fails, without numbers.
func (d *document) reasons(p planner.Plan) []item {
	var texts []string
	if p.CheckedAt != planner.AtTarget {
		texts = append(texts, d.words.say("forbid_window"))
	}
	for _, c := range p.Checks {
		if !c.OK {
			texts = append(texts, d.words.say("forbid_check", "check", c.Name))
		}
	}
	if p.SnugTooHigh {
		texts = append(texts, d.words.say("forbid_snug"))
	}
	if len(texts) == 0 {
		texts = append(texts, d.words.say("forbid_other"))
	}
	items := make([]item, len(texts))
	for i, t := range texts {
		items[i] = item{mark: "×", text: t}
	}
	return items
}

// hatch covers the page with slanting strokes and a heavy frame, and keeps white
// what the page says.
func (d *document) hatch(p planner.Plan, s sheet) {
	w, h := d.paper.width, d.paper.height
	stroke := figure.Stroke{Width: d.mm(1.6), Grey: 0.8}
	for x := -h; x < w; x += d.mm(7) {
		d.canvas.Line(x, h, x+h, 0, stroke)
	}
	edge := d.mm(3)
	for _, r := range []figure.Box{{Width: w, Height: edge}, {Y: h - edge, Width: w, Height: edge},
		{Width: edge, Height: h}, {X: w - edge, Width: edge, Height: h}} {
		d.rectangle(r.X, r.Y, r.Width, r.Height, 0, figure.Stroke{})
	}
	pad := d.mm(1.5)
	white := func(from, to float64) {
		d.rectangle(d.left()-pad, from-pad, d.wide()+2*pad, to-from+2*pad, 1, figure.Stroke{})
	}
	last := len(s.blocks) - 1
	white(d.mm(margin), s.at[last]+s.blocks[last].height)
	foot := h - d.mm(margin)
	white(foot-d.footHeight(p), foot)
}
