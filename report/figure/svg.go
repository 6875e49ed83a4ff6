package figure

import (
	"encoding/xml"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// SVG is a canvas that makes a standalone drawing.
type SVG struct {
	width, height float64
	body          strings.Builder
}

// NewSVG returns a canvas of a size, mm.
func NewSVG(width, height float64) *SVG { return &SVG{width: width, height: height} }

// String returns the drawing as an SVG document. Its text asks for a sans serif
// face of the reader's.
func (s *SVG) String() string {
	return fmt.Sprintf(`<svg xmlns="http://www.w3.org/2000/svg" width="%smm" height="%smm" viewBox="0 0 %s %s" font-family="DejaVu Sans, sans-serif">
<rect width="100%%" height="100%%" fill="#fff"/>
%s</svg>
`, number(s.width), number(s.height), number(s.width), number(s.height), s.body.String())
}

// Line implements Canvas.
func (s *SVG) Line(x1, y1, x2, y2 float64, k Stroke) {
	if k.Width <= 0 || !finite(x1, y1, x2, y2) {
		return
	}
	fmt.Fprintf(&s.body, "<line x1=\"%s\" y1=\"%s\" x2=\"%s\" y2=\"%s\"%s/>\n", number(x1), number(y1), number(x2),
		number(y2), pen(k))
}

// Polygon implements Canvas.
func (s *SVG) Polygon(points []Point, grey float64, k Stroke) {
	corners := make([]string, len(points))
	for i, p := range points {
		if !finite(p.X, p.Y) {
			return
		}
		corners[i] = number(p.X) + "," + number(p.Y)
	}
	fmt.Fprintf(&s.body, "<polygon points=\"%s\" fill=\"%s\"%s/>\n", strings.Join(corners, " "), shade(grey), pen(k))
}

// Circle implements Canvas.
func (s *SVG) Circle(x, y, radius, grey float64, k Stroke) {
	if !finite(x, y, radius) {
		return
	}
	fmt.Fprintf(&s.body, "<circle cx=\"%s\" cy=\"%s\" r=\"%s\" fill=\"%s\"%s/>\n", number(x), number(y),
		number(radius), shade(grey), pen(k))
}

// Text implements Canvas.
func (s *SVG) Text(x, y float64, text string, t Type) {
	if !finite(x, y, t.Size) {
		return
	}
	weight := ""
	if t.Bold {
		weight = ` font-weight="bold"`
	}
	var escaped strings.Builder
	// A strings.Builder never fails.
	_ = xml.EscapeText(&escaped, []byte(Printable(text)))
	fmt.Fprintf(&s.body, "<text x=\"%s\" y=\"%s\" font-size=\"%s\" text-anchor=\"%s\" fill=\"%s\"%s>%s</text>\n",
		number(x), number(y), number(t.Size), [...]string{"start", "middle",
			"end"}[t.Anchor], shade(t.Grey), weight, escaped.String())
}

// Width implements Canvas.
func (s *SVG) Width(text string, t Type) float64 { return textWidth(text, t) }

func pen(k Stroke) string {
	if k.Width <= 0 {
		return ""
	}
	dash := ""
	if len(k.Dash) > 0 {
		lengths := make([]string, len(k.Dash))
		for i, d := range k.Dash {
			lengths[i] = number(d)
		}
		dash = fmt.Sprintf(` stroke-dasharray="%s"`, strings.Join(lengths, " "))
	}
	return fmt.Sprintf(` stroke="%s" stroke-width="%s"%s`, shade(k.Grey), number(k.Width), dash)
}

func shade(grey float64) string {
	level := int(math.Round(grey * 255))
	return fmt.Sprintf("#%02x%02x%02x", level, level, level)
}

// number writes micrometres at most: enough for print, and the same everywhere.
func number(v float64) string { return strconv.FormatFloat(math.Round(v*1000)/1000, 'f', -1, 64) }
