package figure

// Canvas is what a drawing is made on. Coordinates are mm on the page, x to the
// right, y down. Grey goes from 0, black, to 1, white.
type Canvas interface {
	// Line draws a straight stroke.
	Line(x1, y1, x2, y2 float64, s Stroke)
	// Polygon fills a closed area, and outlines it when the stroke has a width.
	Polygon(points []Point, grey float64, s Stroke)
	// Circle fills a circle, and outlines it when the stroke has a width.
	Circle(x, y, radius, grey float64, s Stroke)
	// Text prints one line with its base line at y; size is the type size, mm.
	Text(x, y float64, text string, t Type)
	// Width returns how wide a line of text is, mm.
	Width(text string, t Type) float64
}

// Point is a place on the page, mm.
type Point struct{ X, Y float64 }

// Box is an area on the page, mm.
type Box struct{ X, Y, Width, Height float64 }

// Stroke is how a line is drawn. The zero value draws nothing.
type Stroke struct {
	Width float64   // mm
	Grey  float64   // 0 black to 1 white
	Dash  []float64 // lengths of dash and gap, mm; nil: solid
}

// Anchor says which point of a line of text its x is.
type Anchor int

// The anchors.
const (
	Start Anchor = iota
	Middle
	End
)

// Type is how text is set.
type Type struct {
	Size   float64 // mm
	Bold   bool
	Grey   float64 // 0 black to 1 white
	Anchor Anchor
}
