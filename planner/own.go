package planner

import (
	"fmt"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// What a user's own library may state, and what a joint must state besides when it
// uses that: nothing is known of an own thread, head, nut or class but its entry.

// Bounds of own threads, mm: the sizes and pitches for which the formulas of
// ISO 965-1 hold (from memory), and no thread deeper than those of ISO 261.
var (
	threadSizes   = bounds{quantity.Length, 0.99, 355}
	threadPitches = bounds{quantity.Length, 0.2, 8}
)

// leastTurns is the least diameter of a thread in pitches; ISO 261 has none under 4.
const leastTurns = 3.5

// ThreadFaults returns what is impossible about an own thread. Here and in the
// functions below, the paths are the keys of a library's entry.
func ThreadFaults(t fastener.Thread) []Fault {
	v := &validator{}
	v.positive(t.Diameter, threadSizes, at("diameter"), "the diameter", "state the nominal diameter of the thread, for example 12 mm")
	before := len(v.faults)
	v.positive(t.Pitch, threadPitches, at("pitch"), "the pitch", "state the pitch of the thread, for example 1.25 mm")
	v.require(len(v.faults) > before || t.Pitch*leastTurns <= t.Diameter, at("pitch", "diameter"),
		"state the pitch of the thread, for example 1.25 mm",
		"a pitch of %s is impossible on a diameter of %s", mm(t.Pitch), mm(t.Diameter))
	return v.faults
}

// HeadFaults returns what is impossible about an own head of that thread.
func HeadFaults(h fastener.Head, t fastener.Thread) []Fault {
	v := &validator{}
	v.bearing(h.BearingDiameter, t)
	v.positive(h.Height, lengths, at("height"), "the height", "state the height of the head")
	v.positive(h.WidthAcrossFlats, lengths, at("width_across_flats"), "the width across flats", "state the size of the spanner")
	return v.faults
}

// NutFaults returns what is impossible about an own nut of that thread.
func NutFaults(n fastener.Nut, t fastener.Thread) []Fault {
	v := &validator{}
	v.bearing(n.BearingDiameter, t)
	v.positive(n.Height, lengths, at("height"), "the height", "state the least height of the nut")
	v.positive(n.WidthAcrossFlats, lengths, at("width_across_flats"), "the width across flats", "state the size of the spanner")
	v.require(!(n.WidthAcrossFlats > 0) || n.WidthAcrossFlats > t.Diameter, at("width_across_flats", "thread"), "state the size of the spanner",
		"the width across flats of %s is not larger than the thread of %s", mm(n.WidthAcrossFlats), mm(t.Diameter))
	return v.faults
}

// bearing judges the bearing face of a head or a nut.
func (v *validator) bearing(diameter float64, t fastener.Thread) {
	const mend = "state the least outer diameter of the bearing face"
	v.positive(diameter, lengths, at("bearing_diameter"), "the bearing diameter", mend)
	v.require(!(diameter > 0) || diameter > t.Diameter, at("bearing_diameter", "thread"), mend,
		"the bearing diameter of %s is not larger than the thread of %s", mm(diameter), mm(t.Diameter))
}

// WasherFaults returns what is impossible about an own washer of that thread.
func WasherFaults(w fastener.Washer, t fastener.Thread) []Fault {
	v := &validator{}
	const hole = "state the hole of the washer: at least the thread's diameter"
	v.positive(w.InnerDiameter, lengths, at("inner_diameter"), "the inner diameter", hole)
	v.require(!(w.InnerDiameter > 0) || w.InnerDiameter >= t.Diameter, at("inner_diameter", "thread"), hole,
		"the inner diameter of %s is smaller than the thread of %s", mm(w.InnerDiameter), mm(t.Diameter))
	v.require(w.OuterDiameter > w.InnerDiameter, at("outer_diameter", "inner_diameter"), "state the outer diameter of the washer",
		"the outer diameter of %s is not larger than the inner one of %s", mm(w.OuterDiameter), mm(w.InnerDiameter))
	v.require(w.OuterDiameter <= lengths.most, at("outer_diameter"), "state the outer diameter of the washer",
		"the outer diameter is %s; it must be at most %s", mm(w.OuterDiameter), mm(lengths.most))
	v.positive(w.Thickness, lengths, at("thickness"), "the thickness", "state the thickness of the washer")
	const softest, hardest = 10, 1500 // HV: lead to hard metal, from memory
	v.require(w.HardnessHV == 0 || w.HardnessHV >= softest && w.HardnessHV <= hardest, at("hardness"), "state it as 300 HV, or leave it out",
		"the hardness is %s; it must lie between %d and %d HV", measured{w.HardnessHV, quantity.Hardness}, softest, hardest)
	v.positive(w.LimitingPressure, pressures, at("bearing_pressure"), "the limiting bearing pressure",
		"state bearing_pressure: without it the faces cannot be judged")
	v.elastic(w.Modulus, w.Expansion, at(""))
	return v.faults
}

// ClassFaults returns what is impossible about an own property class.
func ClassFaults(c fastener.PropertyClass) []Fault {
	v := &validator{}
	v.positive(c.YieldStrength, pressures, at("yield"), "the yield strength", "state the least yield strength, for example 940 MPa")
	v.positive(c.TensileStrength, pressures, at("tensile"), "the tensile strength", "state the least tensile strength, for example 1040 MPa")
	v.require(c.YieldStrength <= c.TensileStrength || !(c.TensileStrength > 0), at("yield", "tensile"),
		"state the least yield and the least tensile strength",
		"the yield strength of %s is above the tensile strength of %s", measured{c.YieldStrength, quantity.Pressure},
		measured{c.TensileStrength, quantity.Pressure})
	v.require(c.ShearRatio >= 0 && c.ShearRatio <= 1, at("shear_ratio"), "state shear strength over tensile strength, for example 0.6, or leave it out",
		"the shear strength is %.4g times the tensile strength; it must lie between 0 and 1", c.ShearRatio)
	v.elastic(c.Modulus, c.Expansion, at(""))
	return v.faults
}

// MaterialFaults returns what is impossible about an own material.
func MaterialFaults(m fastener.Material) []Fault {
	v := &validator{}
	v.material(m, at(""))
	v.positiveOrNone(m.LimitingPressure, pressures, at("bearing_pressure"), "the limiting bearing pressure", "state it as 760 MPa, or leave it out")
	v.positiveOrNone(m.ShearStrength, pressures, at("shear_strength"), "the shear strength", "state it as 300 MPa, or leave it out")
	return v.faults
}

// own judges what a joint must state besides the entries of a user's own library.
func (v *validator) own(j Joint) {
	b := j.Bolt
	standardLength := !b.Head.Own && !b.Thread.Own || j.HeadNut != nil
	v.require(standardLength || b.Shank != nil || len(b.Segments) > 0, at("bolt.shank", "bolt.thread", "bolt.head", "bolt.segments", "nut"),
		"add shank: 0 mm where the bolt is threaded to the head, else the part of the shank inside the grip",
		"the shank is not stated, and no standard gives the thread length of a bolt whose head or thread is your own")
	needsShear := j.slips() || j.Tapped != nil && j.Tapped.Insert == nil || j.NutShear > 0
	v.require(!needsShear || !b.Class.Own || b.Class.ShearRatio > 0,
		at("bolt.property_class", "bolt.thread", "clamp", "group", "loads", "tapped", "nut"),
		"add shear_ratio to its entry in your library",
		"the shear strength of class %s is not known, by which stripping and shear of the bolt are judged", b.Class.Name)
	if j.Nut == nil {
		return
	}
	v.require(!b.Class.Own || b.Class.NutClass() != "", at("bolt.property_class", "bolt.thread", "nut"), "tap the part, or state a class of at most 1220 MPa",
		"class %s has a tensile strength of %s, more than any nut class of ISO 898-2 goes with", b.Class.Name,
		measured{b.Class.TensileStrength, quantity.Pressure})
	v.ownNut(j)
}

// ownNut judges an own nut: that the bolt yields before a thread strips is known of
// nuts of 0.8 d and more (ISO 898-2: regular nuts, from memory); how it widens, from
// 1.4 d across flats on (VDI 2230-1:2015 R11, from memory).
func (v *validator) ownNut(j Joint) {
	n, d := *j.Nut, j.Bolt.Thread.Diameter
	if !n.Own {
		return
	}
	v.require(n.Height >= 0.8*d || j.NutShear > 0, at("nut", "bolt.thread"),
		"write nut: {kind: "+n.Kind+", shear_strength: 480 MPa} with its strength, so that stripping is computed",
		"the nut is %s high, less than 0.8 times the thread: its thread may strip before the bolt yields", mm(n.Height))
	v.require(j.NutShear == 0 || n.WidthAcrossFlats >= 1.4*d, at("nut", "bolt.thread"),
		"state a nut of 1.4 times the thread or more across flats, or leave out its shear_strength",
		"the nut is %s across flats; how nuts widen is not known below 1.4 times the thread", mm(n.WidthAcrossFlats))
}

// assumeOwn says what is taken for granted of the entries of a user's own library.
func (w *work) assumeOwn() {
	j, b := w.joint, w.joint.Bolt
	if b.Thread.Own {
		w.assumed(fmt.Sprintf("thread %s has the 60 degree profile of ISO 68-1; what is not your own of head, nut and washers has the dimensions of the standard's size",
			b.Thread.Designation))
	}
	if b.Head.Own && j.HeadNut == nil {
		w.assumed(fmt.Sprintf("head %s gives under load as a hexagon head does, and does not break off before the bolt", b.Head.Kind))
	}
	if j.Nut != nil && j.Nut.Own {
		w.assumed(fmt.Sprintf("nut %s gives under load as a hexagon nut does", j.Nut.Kind))
	}
}
