package planner

import (
	"math"

	"clampback/friction"
)

// threadNumbers is the bolt's geometry as the formulas use it, mm and mm2.
type threadNumbers struct {
	diameter       float64 // d
	pitch          float64 // P
	pitchDiameter  float64 // d_2
	minorDiameter  float64 // d_3
	stressDiameter float64 // d_0, of the weakest section
	stressArea     float64 // A_S
	weakestArea    float64 // A_0
	nominalArea    float64 // A_N
	minorArea      float64 // A_d3
}

// levers are torques per clamp force, mm, at the ends of the friction ranges.
type levers struct {
	least      float64 // k at least friction
	most       float64 // k at most friction
	threadLow  float64 // thread share at least friction
	threadHigh float64 // thread share at most friction
}

// describe puts down the bolt, its strength, the friction and the tightening.
func (w *work) describe() {
	w.describeThread()
	w.describeFriction()

	class := w.joint.Bolt.Class
	t := w.joint.Tightening
	w.input("R_p02", "yield strength of the bolt", class.YieldStrength, "MPa", class.Source)
	w.input("R_m", "tensile strength of the bolt", class.TensileStrength, "MPa", class.Source)
	w.input("nu", "utilisation of the yield strength at assembly", t.Utilisation, "-", guideline+"R7")
	w.input("s_T", "resolution of the torque setting", t.Step/1000, "N.m", stated)
	if t.Scatter == RangeScatter {
		w.input("tol_T", "tolerance of the tool", t.Tool.Tolerance, "-", stated)
	}
}

func (w *work) describeThread() {
	t := w.joint.Bolt.Thread
	n := &w.thread
	n.diameter, n.pitch = t.Diameter, t.Pitch
	series, basic, stress, inch := "ISO 261", iso724, iso898, ""
	if t.Inch {
		series, basic, stress, inch = asme, asme, asme, ".inch"
	}
	if t.Own {
		series = t.Source
	}
	w.input("d", "thread diameter", t.Diameter, "mm", series)
	w.input("P", "pitch", t.Pitch, "mm", series)
	n.pitchDiameter = w.lineBy("d_2"+inch, "d_2", "pitch diameter", t.PitchDiameter(), "mm", basic)
	n.minorDiameter = w.lineBy("d_3"+inch, "d_3", "minor diameter", t.MinorDiameter(), "mm", "ISO 68-1")
	n.stressArea = w.lineBy("A_S"+inch, "A_S", "stress area of the thread", t.StressArea(), "mm2", stress)
	n.nominalArea = w.line("A_N", "nominal cross-section", t.NominalArea(), "mm2", arithmetic)
	n.minorArea = w.line("A_d3", "cross-section of the minor diameter", t.MinorArea(), "mm2", arithmetic)
	w.describePieces()
	n.weakestArea = w.line("A_0", "weakest cross-section", math.Pi/4*n.stressDiameter*n.stressDiameter, "mm2", guideline+"R7")
}

// describePieces puts down the pieces of shank and the diameter of the weakest
// section: the thread's stress diameter, or a waist below it.
func (w *work) describePieces() {
	n := &w.thread
	n.stressDiameter = w.joint.Bolt.Thread.StressDiameter()
	rule := "d_0"
	if w.joint.Bolt.Thread.Inch {
		rule += ".inch"
	}
	pieces := w.joint.Bolt.pieces()
	if len(pieces) > 0 {
		rule += ".shank"
	}
	for i, s := range pieces {
		w.inputAt(i+1, "l_S", "length of the shank in the grip", s.Length, "mm", stated)
		w.inputAt(i+1, "d_S", "diameter of the shank", s.Diameter, "mm", stated)
		n.stressDiameter = math.Min(n.stressDiameter, s.Diameter)
	}
	w.lineBy(rule, "d_0", "diameter of the weakest section", n.stressDiameter, "mm", guideline+"R7")
}

// pieces returns the unthreaded pieces of the bolt in the grip.
func (b Bolt) pieces() []Segment {
	if len(b.Segments) > 0 {
		return b.Segments
	}
	if b.Shank == nil || *b.Shank == 0 {
		return nil
	}
	return []Segment{{Length: *b.Shank, Diameter: b.Thread.Diameter}}
}

// describeFriction puts down the friction ranges and the torque per clamp
// force at their ends.
func (w *work) describeFriction() {
	w.faces = w.joint.bearingFaces()
	f, n, turned := w.joint.Friction, w.thread, w.joint.turnedFace(w.faces)
	w.input("mu_G_min", "least friction in the thread", f.Thread.Low, "-", f.Source)
	w.input("mu_G_max", "most friction in the thread", f.Thread.High, "-", f.Source)
	w.input("mu_K_min", "least friction under the head", f.Head.Low, "-", f.Source)
	w.input("mu_K_max", "most friction under the head", f.Head.High, "-", f.Source)
	w.input("D_Ka", "outer diameter of the face that turns", turned.outer, "mm", turned.source)
	w.input("D_Ki", "inner diameter of the face that turns", turned.inner, "mm", stated)
	w.line("D_Km", "effective diameter of the friction under the head", (turned.outer+turned.inner)/2, "mm", guideline+"R13")
	w.line("lead", "lead angle of the thread, tangent", math.Tan(friction.LeadAngle(n.pitch, n.pitchDiameter)), "-",
		guideline+"R13")

	k := &w.friction
	k.threadLow = w.line("k_G_min", "thread torque per clamp force, least friction",
		friction.ThreadLever(n.pitch, n.pitchDiameter, f.Thread.Low), "mm", guideline+"R13")
	k.threadHigh = w.line("k_G_max", "thread torque per clamp force, most friction",
		friction.ThreadLever(n.pitch, n.pitchDiameter, f.Thread.High), "mm", guideline+"R13")
	k.least = w.line("k_min", "torque per clamp force, least friction",
		k.threadLow+friction.BearingLever(turned.outer, turned.inner, f.Head.Low), "mm", guideline+"R13")
	k.most = w.line("k_max", "torque per clamp force, most friction",
		k.threadHigh+friction.BearingLever(turned.outer, turned.inner, f.Head.High), "mm", guideline+"R13")
}
