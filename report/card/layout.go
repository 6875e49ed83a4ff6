package card

import (
	"strconv"

	"clampback/planner"
	"clampback/report/figure"
)

// block is a piece of a page that is never split.
type block struct {
	height float64 // mm
	draw   func(y float64)
	fresh  bool // begins a page
	tight  bool // the next block follows without a gap
}

// sheet is one page: its blocks with their places.
type sheet struct {
	blocks  []block
	at      []float64 // y of each block, mm
	hatched bool      // the page forbids
}

// Measures of the page on A5, mm; type sizes too. They grow with the paper.
const (
	margin     = 8.0
	gap        = 3.2  // between blocks
	bodySize   = 3.5  // 9.9 point
	leastBody  = 3.2  // 9.1 point: what would not fit on a page shrinks to this
	smallSize  = 2.6  // 7.4 point: foot, side notes and calculation page only
	titleSize  = 6.4  // id of the joint
	nameSize   = 4.6  // its name
	lineHeight = 1.28 // over the type size
)

func (d *document) mm(v float64) float64 { return v * d.paper.scale }

func (d *document) left() float64  { return d.mm(margin) }
func (d *document) right() float64 { return d.paper.width - d.mm(margin) }
func (d *document) wide() float64  { return d.right() - d.left() }

func (d *document) body() figure.Type  { return figure.Type{Size: d.mm(d.bodySize)} }
func (d *document) small() figure.Type { return figure.Type{Size: d.mm(smallSize)} }

func bold(t figure.Type) figure.Type { t.Bold = true; return t }

// top and bottom are the ends of what a page of a joint holds between head and
// foot, mm.
func (d *document) top(p planner.Plan) float64 {
	return d.mm(margin) + d.layHead(p).height + d.mm(gap)
}

func (d *document) bottom(p planner.Plan) float64 {
	return d.paper.height - d.mm(margin) - d.footHeight(p) - d.mm(gap)/2
}

// shrunk lays blocks out that should share a page: in body type, or in smaller
// type down to leastBody where they would not fit. What still does not fit then
// runs on to another page.
func (d *document) shrunk(p planner.Plan, lay func(*document) []block) []block {
	room := d.bottom(p) - d.top(p)
	sized := *d
	for {
		blocks := lay(&sized)
		if stack(blocks, d.mm(gap)) <= room || sized.bodySize <= leastBody {
			return blocks
		}
		sized.bodySize = max(leastBody, sized.bodySize-0.1)
	}
}

// stack returns the height of blocks one below the other, mm.
func stack(blocks []block, between float64) float64 {
	height := 0.0
	for i, b := range blocks {
		height += b.height
		if i < len(blocks)-1 && !b.tight {
			height += between
		}
	}
	return height
}

// paginate puts blocks on pages one below the other.
func (d *document) paginate(p planner.Plan, blocks []block, hatched bool) []sheet {
	top, bottom := d.top(p), d.bottom(p)
	sheets := []sheet{{hatched: hatched}}
	y := top
	for _, b := range blocks {
		current := &sheets[len(sheets)-1]
		if (b.fresh || y+b.height > bottom) && len(current.blocks) > 0 {
			sheets = append(sheets, sheet{hatched: hatched})
			current = &sheets[len(sheets)-1]
			y = top
		}
		current.blocks = append(current.blocks, b)
		current.at = append(current.at, y)
		y += b.height
		if !b.tight {
			y += d.mm(gap)
		}
	}
	return sheets
}

// print draws a page with its head and foot.
func (d *document) print(p planner.Plan, s sheet, page, pages int) {
	if s.hatched {
		d.hatch(p, s)
	}
	d.head(p)
	for i, b := range s.blocks {
		b.draw(s.at[i])
	}
	d.foot(p, page, pages)
}

// pageHead is the head of a joint's pages, laid out: id and name at the left, what
// they belong to at the right, or below the id where that needs the whole width.
type pageHead struct {
	id      figure.Type
	name    []string
	face    figure.Type // of the name
	belongs []string
	below   bool // belongs stands below the id
	height  float64
}

func (d *document) layHead(p planner.Plan) pageHead {
	h := pageHead{id: figure.Type{Size: d.mm(titleSize), Bold: true}, face: figure.Type{Size: d.mm(nameSize), Bold: true}}
	left, right := d.wide()*0.62, d.wide()*0.34
	if d.canvas.Width(p.ID, h.id) > left {
		h.id, h.below = d.fit(p.ID, d.wide(), h.id), true
	}
	h.name = d.wrap(p.Name, left, h.face)
	if len(h.name) > 2 {
		h.face = bold(d.body())
		h.name = d.wrap(p.Name, left, h.face)
	}
	h.belongs = append(d.wrap(p.Joint.Assembly, right, d.body()), d.wrap(d.revision(p), right, d.body())...)
	names := float64(len(h.name)) * h.face.Size * lineHeight
	side := float64(len(h.belongs)) * d.body().Size * lineHeight
	if h.below {
		h.height = h.id.Size*lineHeight + max(names, side)
	} else {
		h.height = max(h.id.Size*lineHeight+names, side)
	}
	h.height += d.mm(1)
	return h
}

func (d *document) head(p planner.Plan) {
	h := d.layHead(p)
	top := d.mm(margin)
	y := top + h.id.Size
	d.canvas.Text(d.left(), y, p.ID, h.id)
	for _, line := range h.name {
		y += h.face.Size * lineHeight
		d.canvas.Text(d.left(), y, line, h.face)
	}
	y = top
	if h.below {
		y += h.id.Size * lineHeight
	}
	t := d.body()
	t.Anchor = figure.End
	d.lines(h.belongs, d.right(), y, t)
	d.canvas.Line(d.left(), top+h.height, d.right(), top+h.height, figure.Stroke{Width: d.mm(0.5)})
}

// footLines are the lines of the foot above the page number.
func (d *document) footLines(p planner.Plan) []string {
	text := d.words.say("footer_tested")
	if p.Joint.PreparedBy != "" {
		text = d.words.say("prepared_by", "name", p.Joint.PreparedBy) + " " + text
	}
	return d.wrap(text, d.wide(), d.small())
}

func (d *document) footHeight(p planner.Plan) float64 {
	return (float64(len(d.footLines(p))+1) + 0.4) * d.mm(smallSize) * lineHeight
}

func (d *document) foot(p planner.Plan, page, pages int) {
	bottom := d.paper.height - d.mm(margin)
	y := bottom - d.footHeight(p)
	d.canvas.Line(d.left(), y, d.right(), y, figure.Stroke{Width: d.mm(0.2)})
	d.lines(d.footLines(p), d.left(), y+0.4*d.mm(smallSize), d.small())
	number := d.words.say("page", "page", strconv.Itoa(page), "pages", strconv.Itoa(pages))
	end := bold(d.small())
	end.Anchor = figure.End
	base := bottom - 0.25*d.mm(smallSize)
	d.canvas.Text(d.right(), base, number, end)
	room := d.wide() - d.canvas.Width(number, end) - d.mm(3)
	which := p.ID + ", " + d.revision(p)
	if d.canvas.Width(which, d.small()) > room {
		which = p.ID // the head holds the revision in full
	}
	d.canvas.Text(d.left(), base, which, d.fit(which, room, d.small()))
}

func (d *document) revision(p planner.Plan) string {
	revision := p.Joint.Revision
	if revision == "" {
		revision = d.words.say("not_stated")
	}
	return d.words.say("revision", "revision", revision)
}

// wrap breaks a text into lines of a width.
func (d *document) wrap(text string, width float64, t figure.Type) []string {
	return d.wrapAfter(0, text, width, t)
}

// wrapAfter breaks a text into lines of a width, the first after an indent.
func (d *document) wrapAfter(indent float64, text string, width float64, t figure.Type) []string {
	return figure.Wrap(figure.Printable(text), indent, width, func(s string) float64 { return d.canvas.Width(s, t) })
}

// fit shrinks type so that a line keeps within a width.
func (d *document) fit(text string, width float64, t figure.Type) figure.Type {
	if w := d.canvas.Width(text, t); w > width {
		t.Size *= width / w
	}
	return t
}

// paragraph is a block of wrapped text.
func (d *document) paragraph(text string, t figure.Type) block {
	lines := d.wrap(text, d.wide(), t)
	return block{height: float64(len(lines)) * t.Size * lineHeight,
		draw: func(y float64) { d.lines(lines, d.left(), y, t) }}
}

// lines prints lines of text below y.
func (d *document) lines(lines []string, x, y float64, t figure.Type) {
	for _, line := range lines {
		y += t.Size * lineHeight
		d.canvas.Text(x, y-0.25*t.Size, line, t)
	}
}
