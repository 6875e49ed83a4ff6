package planner

import (
	"math"

	"clampback/planner/stiffness"
)

// Eccentric says where bolt and load lie off the axis of the deformation body, which
// bends then. Distances along the direction of bending, from that axis, positive to
// the side of the load. VDI 2230-1:2015, 5.1.2.2 and R2, R3, R9.
type Eccentric struct {
	BoltOffset float64  // s_sym of the bolt's axis, mm
	LoadArm    *float64 // a, of the line of the load, mm; nil: not stated
	MomentLow  float64  // M_B, working moment at the low end of the axial load, N.mm
	MomentHigh float64  // M_B at its high end
	Depth      float64  // c_T of the interface and the sleeve in the direction of bending, mm
	Width      float64  // b_T of them across it, mm
}

// arm returns a, 0 where there is no load to have one.
func (e Eccentric) arm() float64 {
	if e.LoadArm == nil {
		return 0
	}
	return *e.LoadArm
}

// interfaceArea returns A_T, mm2, and the second moment I_T, mm4, of the rectangular
// interface less the hole at the bolt.
func (e Eccentric) interfaceArea(hole float64) (area, moment float64) {
	area = e.Depth*e.Width - circleArea(hole)
	moment = e.Width*e.Depth*e.Depth*e.Depth/12 - circleArea(hole)*(hole*hole/16+e.BoltOffset*e.BoltOffset)
	return area, moment
}

// largestHole returns the largest hole in the clamped layers, mm.
func (j Joint) largestHole() float64 {
	var hole float64
	for _, l := range j.layers() {
		hole = math.Max(hole, l.hole)
	}
	return hole
}

// bending works out what eccentricity adds to the springs: the compliance of the
// parts for a preload off their axis, delta_P*, for the load, delta_P**, and the bolt
// force that a working moment adds.
func (w *work) bending(cones stiffness.Cones) {
	e := w.joint.Eccentric
	if e == nil {
		return
	}
	w.input("s_sym", "offset of the bolt from the axis of the parts", e.BoltOffset, "mm", stated)
	w.input("a_A", "offset of the load from the axis of the parts", e.arm(), "mm", stated)
	w.input("M_B_lo", "working moment at the lowest axial load", e.MomentLow/1000, "N.m", stated)
	w.input("M_B_hi", "working moment at the highest axial load", e.MomentHigh/1000, "N.m", stated)
	w.input("c_T", "depth of the interface in the direction of bending", e.Depth, "mm", stated)
	w.input("b_T", "width of the interface", e.Width, "mm", stated)
	hole := w.joint.largestHole()
	w.input("d_hT", "largest hole in the parts", hole, "mm", stated)

	moment := w.bodyMoment(cones, hole)
	var give float64 // sum of h/E, mm3/N
	for _, l := range w.joint.layers() {
		give += l.thickness / l.modulus
	}
	w.tilt = w.line("beta_P", "bending compliance of the parts", give/moment, "1/(N mm)", guideline+"5.1.2.2")
	s, a := e.BoltOffset, e.arm()
	w.eccentricClamping = w.line("delta_P_st", "compliance of the parts, preload off their axis",
		w.clampedCompliance+s*s*w.tilt, "mm/N", guideline+"5.1.2.2")
	w.eccentricLoading = w.line("delta_P_dst", "compliance of the parts for a load off their axis",
		w.clampedCompliance+a*s*w.tilt, "mm/N", guideline+"5.1.2.2")
	w.boltBendingCompliance()
}

// bodyMoment returns I_Bers, the second moment of the deformation body less the hole:
// the pieces of cone and sleeve in series, the cones with the offset of the bolt.
func (w *work) bodyMoment(c stiffness.Cones, hole float64) float64 {
	e := w.joint.Eccentric
	headWide := w.line("D_H", "width of the head's cone at its end", c.HeadBearing+2*c.HeadEnd*c.Tangent, "mm", guideline+"5.1.2.2")
	head := w.line("I_H", "second moment of the head's cone", coneMoment(c.HeadBearing, headWide, e.BoltOffset), "mm4", guideline+"5.1.2.2")
	sleeve := w.line("I_S", "second moment of the sleeve", e.Width*e.Depth*e.Depth*e.Depth/12, "mm4", guideline+"5.1.2.2")
	sum := c.HeadEnd/head + (c.FarStart-c.HeadEnd)/sleeve
	rule := "I_Bers.tapped"
	if !c.Tapped {
		rule = "I_Bers.through"
		wide := w.line("D_N", "width of the nut's cone at its end", c.FarBearing+2*(c.Length-c.FarStart)*c.Tangent, "mm", guideline+"5.1.2.2")
		far := w.line("I_N", "second moment of the nut's cone", coneMoment(c.FarBearing, wide, e.BoltOffset), "mm4", guideline+"5.1.2.2")
		sum += (c.Length - c.FarStart) / far
	}
	return w.lineBy(rule, "I_Bers", "second moment of the parts in bending", c.Length/sum-math.Pi/64*math.Pow(hole, 4), "mm4",
		guideline+"5.1.2.2")
}

// coneMoment returns I of a cone that widens from narrow to wide, mean of the
// compliance over its length, about an axis at an offset. VDI 2230-1:2015, 5.1.2.2:
// 0.147 (D_A - d_W) d_W^3 D_A^3/(D_A^3 - d_W^3) + s_sym^2 pi/4 D_A^2; 0.147 is 3 pi/64.
func coneMoment(narrow, wide, offset float64) float64 {
	own := math.Pi / 64 * math.Pow(narrow, 4)
	if wide > narrow*(1+1e-9) {
		n, w := narrow*narrow*narrow, wide*wide*wide
		own = 3 * math.Pi / 64 * (wide - narrow) * n * w / (w - n)
	}
	return own + offset*offset*circleArea(wide)
}

// boltBendingCompliance puts down beta_S, the rotation of the bolt's ends over the
// moment that bends it. VDI 2230-1:2015, 5.1.1.2.
func (w *work) boltBendingCompliance() {
	j, t := w.joint, w.thread
	inertia := func(d float64) float64 { return math.Pi / 64 * d * d * d * d }
	var sum float64
	for _, s := range j.Bolt.pieces() {
		sum += s.Length / inertia(s.Diameter)
	}
	sum += headLengthOf(j.Bolt.Head)*t.diameter/inertia(t.diameter) + (w.freeThread+stiffness.EngagedThreadLength*t.diameter)/inertia(t.minorDiameter)
	if j.HeadNut != nil {
		sum += stiffness.EngagedThreadLength * t.diameter / inertia(t.minorDiameter)
	}
	far := stiffness.NutThreadLength * t.diameter / (inertia(t.diameter) * j.Bolt.Class.Modulus)
	if j.Tapped != nil {
		far = stiffness.TappedThreadLength * t.diameter / (inertia(t.diameter) * j.Tapped.Material.Modulus)
	}
	rule := "beta_S"
	if len(j.Bolt.pieces()) > 0 {
		rule = "beta_S.shank"
	}
	w.boltTilt = w.lineBy(rule, "beta_S", "bending compliance of the bolt", sum/j.Bolt.Class.Modulus+far, "1/(N mm)", guideline+"5.1.1.2")
}

// openingForce puts down F_KA, the clamp force that keeps both edges of the interface
// closed while load and moment tilt it: the pressure at an edge at u = c_T/2,
// F_K/A + (F_K s_sym - F_A (a - s_sym) - M_B) u/I, must not vanish. VDI 2230-1:2015 R2.
func (w *work) openingForce() float64 {
	e := w.joint.Eccentric
	if e == nil {
		return 0
	}
	area, moment := e.interfaceArea(w.joint.largestHole())
	w.line("A_T", "area of the interface", area, "mm2", arithmetic)
	w.line("I_T", "second moment of the interface", moment, "mm4", arithmetic)
	return w.line("F_KA", "clamp force against one-sided opening", e.openingForce(w.joint.Loads.Axial.Low, w.joint.Loads.Axial.High,
		w.joint.largestHole()), "N", guideline+"R2")
}

func (e Eccentric) openingForce(low, high, hole float64) float64 {
	area, moment := e.interfaceArea(hole)
	s, u := e.BoltOffset, e.Depth/2
	tilt := e.arm() - s
	var force float64
	for _, m := range []float64{low*tilt + e.MomentLow, high*tilt + e.MomentHigh} {
		for _, side := range []float64{1, -1} {
			force = math.Max(force, side*m*u*area/(moment+side*s*u*area))
		}
	}
	return force
}
