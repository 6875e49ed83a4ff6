package stiffness

import "math"

// Body is the deformation body of the clamped parts: a cone that widens from
// under the head, for a through bolt a second one from the nut, cut off to a
// sleeve where they would leave the parts. All lengths in mm.
type Body struct {
	HeadBearing   float64 // d_W of the head
	FarBearing    float64 // d_W of the nut; of no meaning when Tapped
	Length        float64 // l_K, grip with washers
	OuterDiameter float64 // D_A, the smallest of the parts
	Tapped        bool    // the bolt goes into a tapped part: one cone only (w = 2)
}

// MeanBearing returns the bearing diameter that the cone angle rests on, mm:
// the mean of head and nut, or the head's alone when tapped.
func (b Body) MeanBearing() float64 {
	if b.Tapped {
		return b.HeadBearing
	}
	return (b.HeadBearing + b.FarBearing) / 2
}

// ConeTangent returns tan phi_D of a through bolt or tan phi_E of a tapped
// joint, VDI 2230-1:2015, 5.1.2. Parts that are narrower than
// the bearing face have no cone; the value then has no effect.
func (b Body) ConeTangent() float64 {
	slenderness := b.Length / b.MeanBearing()             // beta_L
	width := math.Max(1, b.OuterDiameter/b.MeanBearing()) // y
	if b.Tapped {
		return 0.348 + 0.013*math.Log(slenderness) + 0.193*math.Log(width)
	}
	return 0.362 + 0.032*math.Log(slenderness/2) + 0.153*math.Log(width)
}

// Cones is a Body with its cones placed: depths in mm below the head's
// bearing face. From 0 to HeadEnd the head's cone, from HeadEnd to FarStart
// the sleeve, from FarStart to the body's Length the nut's cone.
type Cones struct {
	Body
	Tangent  float64 // tan phi
	HeadEnd  float64
	FarStart float64
}

// Cones places the cones at the guideline's angle.
func (b Body) Cones() Cones { return b.ConesAt(b.ConeTangent()) }

// ConesAt places the cones at a given tangent of their angle. Head and nut of
// different bearing diameters meet where both cones are equally wide, not at
// half the grip.
func (b Body) ConesAt(tangent float64) Cones {
	headEnd := math.Max(0, (b.OuterDiameter-b.HeadBearing)/(2*tangent)) // where the head's cone reaches D_A
	if b.Tapped {
		return Cones{b, tangent, math.Min(b.Length, headEnd), b.Length}
	}
	meet := b.Length/2 + (b.FarBearing-b.HeadBearing)/(4*tangent)
	meet = math.Min(math.Max(meet, 0), b.Length)
	farStart := b.Length - math.Max(0, (b.OuterDiameter-b.FarBearing)/(2*tangent))
	return Cones{b, tangent, math.Min(meet, headEnd), math.Max(meet, farStart)}
}

// Width returns the outer diameter of the body at a depth, mm.
func (c Cones) Width(depth float64) float64 {
	width := math.Min(c.OuterDiameter, c.HeadBearing+2*depth*c.Tangent)
	if c.Tapped {
		return width
	}
	return math.Min(width, c.FarBearing+2*(c.Length-depth)*c.Tangent)
}

// Layer is what one layer of the clamped parts adds: the integrals of 1/area
// over its thickness, 1/mm, split by the piece of the body they lie in. Its
// compliance is Sum/E.
type Layer struct {
	HeadCone float64
	Sleeve   float64
	FarCone  float64
}

// Sum returns the integral over the whole layer, 1/mm.
func (l Layer) Sum() float64 { return l.HeadCone + l.Sleeve + l.FarCone }

// Layer integrates the layer between two depths around a hole, mm, in closed
// form. The body must be wider than the hole everywhere in the layer.
func (c Cones) Layer(from, to, hole float64) Layer {
	var l Layer
	if end := math.Min(to, c.HeadEnd); end > from {
		l.HeadCone = c.cone(c.HeadBearing+2*from*c.Tangent, c.HeadBearing+2*end*c.Tangent, hole)
	}
	if start := math.Max(from, c.FarStart); to > start {
		l.FarCone = c.cone(c.FarBearing+2*(c.Length-to)*c.Tangent, c.FarBearing+2*(c.Length-start)*c.Tangent, hole)
	}
	if length := math.Min(to, c.FarStart) - math.Max(from, c.HeadEnd); length > 0 {
		l.Sleeve = 4 * length / (math.Pi * (c.OuterDiameter*c.OuterDiameter - hole*hole))
	}
	return l
}

// cone integrates a frustum that widens from narrow to wide around a hole:
// the antiderivative behind VDI 2230-1:2015, 5.1.2.
func (c Cones) cone(narrow, wide, hole float64) float64 {
	ratio := (wide - hole) * (narrow + hole) / ((wide + hole) * (narrow - hole))
	return math.Log(ratio) / (math.Pi * c.Tangent * hole)
}
