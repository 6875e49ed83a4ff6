package figure

import (
	"math"

	"github.com/go-pdf/fpdf"
)

// The names under which a document knows the faces.
const pdfFamily = "DejaVu"

// mmPerPoint converts type sizes.
const mmPerPoint = 25.4 / 72

// PDF is a canvas on the current page of a document.
type PDF struct{ doc *fpdf.Fpdf }

// NewPDF adds the faces to a document and returns a canvas on its pages. The
// document's unit must be mm.
func NewPDF(doc *fpdf.Fpdf) *PDF {
	doc.AddUTF8FontFromBytes(pdfFamily, "", RegularFont)
	doc.AddUTF8FontFromBytes(pdfFamily, "B", BoldFont)
	return &PDF{doc}
}

// Line implements Canvas.
func (p *PDF) Line(x1, y1, x2, y2 float64, s Stroke) {
	if !p.stroke(s) || !finite(x1, y1, x2, y2) {
		return
	}
	p.doc.Line(x1, y1, x2, y2)
}

// Polygon implements Canvas.
func (p *PDF) Polygon(points []Point, grey float64, s Stroke) {
	corners := make([]fpdf.PointType, len(points))
	for i, c := range points {
		if !finite(c.X, c.Y) {
			return
		}
		corners[i] = fpdf.PointType{X: c.X, Y: c.Y}
	}
	p.fill(grey)
	p.doc.Polygon(corners, p.mode(s))
}

// Circle implements Canvas.
func (p *PDF) Circle(x, y, radius, grey float64, s Stroke) {
	if !finite(x, y, radius) {
		return
	}
	p.fill(grey)
	p.doc.Circle(x, y, radius, p.mode(s))
}

// Text implements Canvas.
func (p *PDF) Text(x, y float64, text string, t Type) {
	if !finite(x, y, t.Size) {
		return
	}
	text = Printable(text)
	switch t.Anchor {
	case Middle:
		x -= p.Width(text, t) / 2
	case End:
		x -= p.Width(text, t)
	}
	p.set(t)
	level := int(math.Round(t.Grey * 255))
	p.doc.SetTextColor(level, level, level)
	p.doc.Text(x, y, text)
}

// Width implements Canvas.
func (p *PDF) Width(text string, t Type) float64 { return textWidth(text, t) }

func (p *PDF) set(t Type) {
	style := ""
	if t.Bold {
		style = "B"
	}
	p.doc.SetFont(pdfFamily, style, t.Size/mmPerPoint)
}

// stroke sets the pen and reports whether there is something to draw.
func (p *PDF) stroke(s Stroke) bool {
	if s.Width <= 0 {
		return false
	}
	level := int(math.Round(s.Grey * 255))
	p.doc.SetDrawColor(level, level, level)
	p.doc.SetLineWidth(s.Width)
	p.doc.SetDashPattern(s.Dash, 0)
	return true
}

func (p *PDF) fill(grey float64) {
	level := int(math.Round(grey * 255))
	p.doc.SetFillColor(level, level, level)
}

func (p *PDF) mode(s Stroke) string {
	if p.stroke(s) {
		return "FD"
	}
	return "F"
}

// finite keeps numbers that are none out of a document, which would be written
// silently and damage it.
func finite(values ...float64) bool {
	for _, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}
