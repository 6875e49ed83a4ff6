package card

import (
	"clampback/report/figure"
)

// item is a line of a list: a mark, a bold lead and a text.
type item struct{ mark, lead, text string }

// list is a column of items with a heading, laid out for a width.
type list struct {
	d       *document
	heading string
	items   []item
	t       figure.Type
	width   float64
	indent  float64
	wrapped [][]string
}

// newList lays items out in a width; the marks hang in an indent.
func (d *document) newList(heading string, items []item, width float64, t figure.Type) *list {
	l := &list{d: d, heading: heading, items: items, t: t, width: width}
	for _, it := range items {
		if it.mark != "" {
			l.indent = max(l.indent, d.canvas.Width(it.mark, bold(t))+0.5*t.Size)
		}
	}
	for _, it := range items {
		text := it.text
		if it.lead != "" {
			text = it.lead + ": " + text
		}
		// Bold leads are wider: wrap as if all were bold.
		measured := t
		if it.lead != "" {
			measured = bold(t)
		}
		l.wrapped = append(l.wrapped, d.wrap(text, width-l.indent, measured))
	}
	return l
}

// itemGap is the space between items over the type size.
const itemGap = 0.28

func (l *list) height() float64 {
	h := 0.0
	if l.heading != "" {
		h += l.t.Size * lineHeight * 1.25
	}
	for _, lines := range l.wrapped {
		h += float64(len(lines))*l.t.Size*lineHeight + itemGap*l.t.Size
	}
	return h
}

func (l *list) draw(x, y float64) {
	if l.heading != "" {
		head := bold(l.t)
		head.Size *= 1.15
		l.d.canvas.Text(x, y+head.Size, l.heading, head)
		y += l.t.Size * lineHeight * 1.25
	}
	for i, lines := range l.wrapped {
		l.d.canvas.Text(x, y+l.t.Size*(lineHeight-0.25), l.items[i].mark, bold(l.t))
		l.first(x+l.indent, y, l.items[i].lead, lines)
		y += float64(len(lines))*l.t.Size*lineHeight + itemGap*l.t.Size
	}
}

// first prints the lines of an item, the lead in bold.
func (l *list) first(x, y float64, lead string, lines []string) {
	if lead == "" {
		l.d.lines(lines, x, y, l.t)
		return
	}
	lead = figure.Printable(lead) + ":"
	base := y + l.t.Size*(lineHeight-0.25)
	if len(lines[0]) < len(lead) { // a lead that fills more than a line is all bold
		l.d.lines(lines, x, y, bold(l.t))
		return
	}
	l.d.canvas.Text(x, base, lead, bold(l.t))
	l.d.canvas.Text(x+l.d.canvas.Width(lead, bold(l.t)), base, lines[0][len(lead):], l.t)
	l.d.lines(lines[1:], x, y+l.t.Size*lineHeight, l.t)
}

// listBlock is a list over the whole width.
func (d *document) listBlock(heading string, items []item, t figure.Type) block {
	l := d.newList(heading, items, d.wide(), t)
	return block{height: l.height(), draw: func(y float64) { l.draw(d.left(), y) }}
}

// framed puts a frame around a block's drawing; inner draws within x, y.
func (d *document) framed(height float64, pen float64, inner func(x, y float64)) block {
	pad := d.mm(2)
	return block{height: height + 2*pad, draw: func(y float64) {
		d.rectangle(d.left(), y, d.wide(), height+2*pad, 1, figure.Stroke{Width: d.mm(pen)})
		inner(d.left()+pad, y+pad)
	}}
}

func (d *document) rectangle(x, y, width, height, grey float64, s figure.Stroke) {
	d.canvas.Polygon([]figure.Point{{X: x, Y: y}, {X: x + width, Y: y}, {X: x + width, Y: y + height}, {X: x, Y: y + height}}, grey, s)
}
