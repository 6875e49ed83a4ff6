package planner

import (
	"math"

	"clampback/planner/fastener"
)

// Grip returns l_K, the clamped length between head and nut or tapped part,
// washers included, mm.
func (j Joint) Grip() float64 {
	var grip float64
	for _, l := range j.layers() {
		grip += l.thickness
	}
	return grip
}

// Engagement returns the length of thread that holds in the nut or the tapped
// part, mm. It is negative when the bolt does not reach it.
func (j Joint) Engagement() float64 {
	reach := j.Bolt.Length - j.Grip() - j.nutStack()
	if j.Tapped != nil {
		return math.Min(reach, j.Tapped.Depth)
	}
	return math.Min(reach, j.Nut.Height)
}

// nutStack is the length of bolt that a nut at the head end of a stud and a thin
// lock nut take up, mm.
func (j Joint) nutStack() float64 {
	var length float64
	if j.HeadNut != nil {
		length += j.HeadNut.Height
	}
	if j.LockNut != nil {
		length += j.LockNut.Height
	}
	return length
}

func heightOf(n *fastener.Nut) float64 {
	if n == nil {
		return 0
	}
	return n.Height
}

// SmallestOuterDiameter returns D_A, the smallest outer diameter of the
// clamped parts, mm; washers do not count.
func (j Joint) SmallestOuterDiameter() float64 {
	smallest := math.Inf(1)
	for _, p := range j.Parts {
		smallest = math.Min(smallest, p.OuterDiameter)
	}
	return smallest
}

// Waist returns the smallest diameter of a shank that is thinner than the
// thread, mm; 0 when there is none.
func (b Bolt) Waist() float64 {
	waist := 0.0
	for _, s := range b.Segments {
		if s.Diameter < b.Thread.Diameter && (waist == 0 || s.Diameter < waist) {
			waist = s.Diameter
		}
	}
	return waist
}

// slips reports whether friction must carry a load.
func (c Clamp) slips() bool { return c.Transverse > 0 || c.Torque > 0 }

// layer is one layer of what is clamped, washers included.
type layer struct {
	name      string
	thickness float64
	hole      float64
	modulus   float64
	expansion float64
	source    string

	material   string  // its name, as the tables of heat know it
	hotModulus float64 // stated, MPa; 0: from the tables
}

// turnedFace returns the bearing face of what is turned: the head, the nut of a stud,
// or the upper of two nuts, which bears on the lower one around the thread.
func (j Joint) turnedFace(faces []face) face {
	if j.LockNut == nil {
		return faces[0]
	}
	return face{name: "upper nut", outer: math.Min(j.Nut.BearingDiameter, j.LockNut.BearingDiameter), inner: j.Bolt.Thread.Diameter,
		source: j.Nut.Source}
}

// layers returns what is clamped, from the head down.
func (j Joint) layers() []layer {
	all := make([]layer, 0, len(j.Parts)+2)
	if j.HeadWasher != nil {
		all = append(all, washerLayer("head washer", *j.HeadWasher))
	}
	for _, p := range j.Parts {
		all = append(all, layer{p.Name, p.Thickness, p.Hole, p.Material.Modulus, p.Material.Expansion,
			p.Material.Source, curveName(p.Material.Name, p.Material.Own), p.HotModulus})
	}
	if j.NutWasher != nil {
		all = append(all, washerLayer("nut washer", *j.NutWasher))
	}
	return all
}

func washerLayer(name string, w fastener.Washer) layer {
	return layer{name, w.Thickness, w.InnerDiameter, w.Modulus, w.Expansion, w.Source, curveName("steel washer", w.Own), 0}
}

// face is a bearing face that the preload presses on.
type face struct {
	name     string
	outer    float64 // mm
	inner    float64 // mm
	pressure float64 // p_G of the softer side, MPa
	source   string
}

// area returns A_p of the face, mm2.
func (f face) area() float64 { return math.Pi / 4 * (f.outer*f.outer - f.inner*f.inner) }

// bearingFaces returns the faces under head and nut, and under their washers,
// from the head down.
func (j Joint) bearingFaces() []face {
	first, last := j.Parts[0], j.Parts[len(j.Parts)-1]
	faces := endFaces("head", j.Bolt.Head.BearingDiameter, j.HeadWasher, first)
	if j.Nut != nil {
		bearing := j.Nut.BearingDiameter
		if j.LockNut != nil {
			bearing = j.LockNut.BearingDiameter
		}
		faces = append(faces, endFaces("nut", bearing, j.NutWasher, last)...)
	}
	return faces
}

// endFaces returns the faces at one end. A washer spreads the force: its lower
// face bears on d_W + 1.6 h, VDI 2230-1:2015 R10.
func endFaces(end string, bearing float64, washer *fastener.Washer, part Part) []face {
	if washer == nil {
		outer := math.Min(bearing, part.OuterDiameter)
		return []face{{end, outer, part.Hole, part.Material.LimitingPressure, part.Material.Source}}
	}
	spread := math.Min(bearing+1.6*washer.Thickness, math.Min(washer.OuterDiameter, part.OuterDiameter))
	return []face{
		{end, math.Min(bearing, washer.OuterDiameter), washer.InnerDiameter, washer.LimitingPressure, washer.Source},
		{end + " washer", spread, math.Max(part.Hole, washer.InnerDiameter), part.Material.LimitingPressure,
			part.Material.Source},
	}
}
