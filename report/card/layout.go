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
	bodySize   = 3.3  // 9.4 point
	smallSize  = 2.6  // 7.4 point: footer and calculation page only
	titleSize  = 6.4  // id of the joint
	nameSize   = 4.6  // its name
	bigSize    = 21.2 // of the setting: digits 15.5 mm high
	lineHeight = 1.28 // over the type size
	footer     = 8.0  // kept free at the bottom
)

func (d *document) mm(v float64) float64 { return v * d.paper.scale }

func (d *document) left() float64  { return d.mm(margin) }
func (d *document) right() float64 { return d.paper.width - d.mm(margin) }
func (d *document) wide() float64  { return d.right() - d.left() }

func (d *document) body() figure.Type  { return figure.Type{Size: d.mm(bodySize)} }
func (d *document) small() figure.Type { return figure.Type{Size: d.mm(smallSize)} }

func bold(t figure.Type) figure.Type { t.Bold = true; return t }

// paginate puts blocks on pages one below the other.
func (d *document) paginate(p planner.Plan, blocks []block, hatched bool) []sheet {
	top := d.mm(margin) + d.headHeight(p) + d.mm(gap)
	bottom := d.paper.height - d.mm(margin) - d.mm(footer)
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
		y += b.height + d.mm(gap)
	}
	return sheets
}

// print draws a page with its head and foot.
func (d *document) print(p planner.Plan, s sheet, page, pages int) {
	if s.hatched {
		d.hatch()
	}
	d.head(p)
	for i, b := range s.blocks {
		b.draw(s.at[i])
	}
	d.foot(p, page, pages)
}

// headLines are the lines of the page's head: id and name, and what they belong
// to at the right.
func (d *document) headLines(p planner.Plan) (name, belongs []string) {
	name = d.wrap(p.Name, d.wide()*0.62, figure.Type{Size: d.mm(nameSize), Bold: true})
	j := p.Joint
	revision := j.Revision
	if revision == "" {
		revision = d.words.say("not_stated")
	}
	belongs = d.wrap(j.Assembly, d.wide()*0.34, d.body())
	belongs = append(belongs, d.words.say("revision", "revision", revision))
	return name, belongs
}

func (d *document) headHeight(p planner.Plan) float64 {
	name, belongs := d.headLines(p)
	left := d.mm(titleSize)*lineHeight + float64(len(name))*d.mm(nameSize)*lineHeight
	return max(left, float64(len(belongs))*d.mm(bodySize)*lineHeight) + d.mm(1)
}

func (d *document) head(p planner.Plan) {
	name, belongs := d.headLines(p)
	top := d.mm(margin)
	id := d.fit(p.ID, d.wide()*0.62, figure.Type{Size: d.mm(titleSize), Bold: true})
	y := top + d.mm(titleSize)
	d.canvas.Text(d.left(), y, p.ID, id)
	for _, line := range name {
		y += d.mm(nameSize) * lineHeight
		d.canvas.Text(d.left(), y, line, figure.Type{Size: d.mm(nameSize), Bold: true})
	}
	y = top
	for _, line := range belongs {
		y += d.mm(bodySize) * lineHeight
		t := d.body()
		t.Anchor = figure.End
		d.canvas.Text(d.right(), y, line, t)
	}
	rule := top + d.headHeight(p)
	d.canvas.Line(d.left(), rule, d.right(), rule, figure.Stroke{Width: d.mm(0.5)})
}

func (d *document) foot(p planner.Plan, page, pages int) {
	y := d.paper.height - d.mm(margin)
	d.canvas.Line(d.left(), y-d.mm(smallSize)*2.6, d.right(), y-d.mm(smallSize)*2.6, figure.Stroke{Width: d.mm(0.2)})
	first := d.words.say("footer_tested")
	if p.Joint.PreparedBy != "" {
		first = d.words.say("prepared_by", "name", p.Joint.PreparedBy) + ". " + first
	}
	number := d.words.say("page", "page", strconv.Itoa(page), "pages", strconv.Itoa(pages))
	end := bold(d.small())
	end.Anchor = figure.End
	d.canvas.Text(d.right(), y, number, end)
	room := d.wide() - d.canvas.Width(number, end) - d.mm(3)
	second := p.ID + ", " + d.headRevision(p)
	d.canvas.Text(d.left(), y-d.mm(smallSize)*1.25, first, d.fit(first, d.wide(), d.small()))
	d.canvas.Text(d.left(), y, second, d.fit(second, room, d.small()))
}

func (d *document) headRevision(p planner.Plan) string {
	revision := p.Joint.Revision
	if revision == "" {
		revision = d.words.say("not_stated")
	}
	return d.words.say("revision", "revision", revision)
}

// wrap breaks a text into lines of a width.
func (d *document) wrap(text string, width float64, t figure.Type) []string {
	return figure.Wrap(figure.Printable(text), width, func(s string) float64 { return d.canvas.Width(s, t) })
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
	return block{height: float64(len(lines)) * t.Size * lineHeight, draw: func(y float64) { d.lines(lines, d.left(), y, t) }}
}

// lines prints lines of text below y.
func (d *document) lines(lines []string, x, y float64, t figure.Type) {
	for _, line := range lines {
		y += t.Size * lineHeight
		d.canvas.Text(x, y-0.25*t.Size, line, t)
	}
}
