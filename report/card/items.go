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
	items   []laidItem
	t       figure.Type
	indent  float64
}

// laidItem is an item broken into lines. The text begins on the last line of the
// lead; its first line is empty when there is no room left.
type laidItem struct {
	mark  string
	lead  []string
	text  []string
	start float64 // where the text begins after the lead, mm
}

// newList lays items out in a width; the marks hang in an indent.
func (d *document) newList(heading string, items []item, width float64, t figure.Type) *list {
	l := &list{d: d, heading: heading, t: t, indent: d.markWidth(items, t)}
	for _, it := range items {
		laid := laidItem{mark: it.mark}
		if it.lead != "" {
			laid.lead = d.wrap(it.lead, width-l.indent, bold(t))
			laid.start = d.canvas.Width(laid.lead[len(laid.lead)-1]+" ", bold(t))
		}
		laid.text = d.wrapAfter(laid.start, it.text, width-l.indent, t)
		l.items = append(l.items, laid)
	}
	return l
}

// markWidth returns how far the text of items is indented for their marks, mm.
func (d *document) markWidth(items []item, t figure.Type) float64 {
	indent := 0.0
	for _, it := range items {
		if it.mark != "" {
			indent = max(indent, d.canvas.Width(it.mark, bold(t))+0.5*t.Size)
		}
	}
	return indent
}

// Measures of lists over the type size.
const (
	itemGap       = 0.28 // between items
	headingHeight = lineHeight * 1.25
	headingSize   = 1.15
)

// lines counts the lines of an item.
func (it laidItem) lines() int { return max(1, len(it.lead)) + len(it.text) - 1 }

func (l *list) height() float64 {
	h := 0.0
	if l.heading != "" {
		h += l.t.Size * headingHeight
	}
	for _, it := range l.items {
		h += float64(it.lines())*l.t.Size*lineHeight + itemGap*l.t.Size
	}
	return h
}

func (l *list) draw(x, y float64) {
	if l.heading != "" {
		l.d.heading(l.heading, x, y, l.t)
		y += l.t.Size * headingHeight
	}
	line := l.t.Size * lineHeight
	for _, it := range l.items {
		l.d.lines([]string{it.mark}, x, y, bold(l.t))
		l.d.lines(it.lead, x+l.indent, y, bold(l.t))
		last := y + float64(max(1, len(it.lead))-1)*line // of the lead
		l.d.lines(it.text[:1], x+l.indent+it.start, last, l.t)
		l.d.lines(it.text[1:], x+l.indent, last+line, l.t)
		y += float64(it.lines())*line + itemGap*l.t.Size
	}
}

// heading prints the heading of a list of a type.
func (d *document) heading(text string, x, y float64, t figure.Type) {
	t = bold(t)
	t.Size *= headingSize
	d.canvas.Text(x, y+t.Size, text, t)
}

// listBlock is a list over the whole width that is never split.
func (d *document) listBlock(heading string, items []item, t figure.Type) block {
	l := d.newList(heading, items, d.wide(), t)
	return block{height: l.height(), draw: func(y float64) { l.draw(d.left(), y) }}
}

// flow is a list over the whole width that may run over pages, an item a block;
// the heading stays with the first.
func (d *document) flow(heading string, items []item, t figure.Type) []block {
	blocks := make([]block, len(items))
	for i, it := range items {
		blocks[i] = d.listBlock(heading, []item{it}, t)
		blocks[i].tight = i < len(items)-1
		heading = ""
	}
	return blocks
}

// plainItems are texts with a dash each.
func plainItems(texts []string) []item {
	items := make([]item, len(texts))
	for i, t := range texts {
		items[i] = item{mark: "–", text: t}
	}
	return items
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
	d.canvas.Polygon([]figure.Point{{X: x, Y: y}, {X: x + width, Y: y}, {X: x + width, Y: y + height},
		{X: x, Y: y + height}}, grey, s)
}
