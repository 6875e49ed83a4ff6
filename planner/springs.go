package planner

import (
	"clampback/planner/fastener"
	"clampback/planner/stiffness"
)

// springs works out the compliances of bolt and clamped parts and the load
// factor.
func (w *work) springs() {
	w.describeLayers()
	w.boltSpring()
	w.clampedSpring()

	w.bending(w.joint.body().Cones())
	n := w.introduction()
	if e := w.joint.Eccentric; e != nil {
		w.loadFactor = w.lineBy("Phi.eccentric", "Phi", "load factor",
			n*w.eccentricLoading/(w.boltCompliance+w.eccentricClamping), "-", guideline+"R3")
		w.momentFactor = w.line("Phi_m", "bolt force over working moment",
			n*e.BoltOffset*w.tilt/(w.boltCompliance+w.eccentricClamping), "1/mm", guideline+"R3")
		return
	}
	w.loadFactor = w.line("Phi", "load factor",
		stiffness.LoadFactor(n, w.boltCompliance, w.clampedCompliance), "-", guideline+"R3")
}

func (w *work) describeLayers() {
	for i, l := range w.joint.layers() {
		w.inputAt(i+1, "h", "thickness of "+l.name, l.thickness, "mm", stated)
		w.inputAt(i+1, "d_h", "hole in "+l.name, l.hole, "mm", stated)
		w.inputAt(i+1, "E", "modulus of "+l.name, l.modulus, "MPa", l.source)
	}
	w.line("l_K", "grip", w.joint.Grip(), "mm", arithmetic)
}

// boltSpring adds the bolt's pieces in series.
func (w *work) boltSpring() {
	j, t := w.joint, w.thread
	modulus := j.Bolt.Class.Modulus
	w.input("E_S", "modulus of the bolt", modulus, "MPa", j.Bolt.Class.Source)

	headLength := headLengthOf(j.Bolt.Head)
	w.input("c_SK", "equivalent length of the head over d", headLength, "-", guideline+"5.1.1")
	sum := w.line("delta_SK", "compliance of the head",
		stiffness.Rod(headLength*t.diameter, t.nominalArea, modulus)+w.headThread(), "mm/N", guideline+"5.1.1")

	var shank float64
	for i, s := range j.Bolt.pieces() {
		shank += s.Length
		sum += w.lineAt(i+1, "delta_S", "compliance of the shank",
			stiffness.Rod(s.Length, circleArea(s.Diameter), modulus), "mm/N", guideline+"5.1.1")
	}
	rule := "l_Gew"
	if shank > 0 {
		rule = "l_Gew.shank"
	}
	free := j.Grip() - shank
	if j.LockNut != nil {
		w.input("m_T", "height of the thin nut", j.LockNut.Height, "mm", j.LockNut.Source)
		free += j.LockNut.Height
	}
	w.freeThread = w.lineBy(rule, "l_Gew", "free thread in the grip", free, "mm", arithmetic)
	sum += w.line("delta_Gew", "compliance of the free thread",
		stiffness.Rod(free, t.minorArea, modulus), "mm/N", guideline+"5.1.1")
	sum += w.line("delta_G", "compliance of the engaged thread",
		stiffness.Rod(stiffness.EngagedThreadLength*t.diameter, t.minorArea, modulus), "mm/N", guideline+"5.1.1")
	sum += w.engagementSpring()

	rule = "delta_S"
	if shank > 0 {
		rule = "delta_S.shank"
	}
	w.boltCompliance = w.lineBy(rule, "delta_S", "compliance of the bolt", sum, "mm/N", guideline+"5.1.1")
}

// headThread is the give of the engaged thread where a nut stands in place of the head.
func (w *work) headThread() float64 {
	if w.joint.HeadNut == nil {
		return 0
	}
	w.input("c_GK", "engaged thread at the nut in place of the head over d", stiffness.EngagedThreadLength, "-", guideline+"5.1.1")
	return stiffness.Rod(stiffness.EngagedThreadLength*w.thread.diameter, w.thread.minorArea, w.joint.Bolt.Class.Modulus)
}

// headLengthOf returns l_SK/d of a head, l_M/d of a nut in its place.
func headLengthOf(h fastener.Head) float64 {
	if h.Kind == "stud" {
		return stiffness.NutThreadLength
	}
	if h.Kind == "socket cap" {
		return stiffness.SocketHeadLength
	}
	return stiffness.HexagonHeadLength
}

// engagementSpring is the give of the nut or of the tapped thread.
func (w *work) engagementSpring() float64 {
	j, t := w.joint, w.thread
	if j.Tapped != nil {
		w.input("c_M", "equivalent length of the tapped thread over d", stiffness.TappedThreadLength, "-", guideline+"5.1.1")
		w.input("E_M", "modulus of the tapped part", j.Tapped.Material.Modulus, "MPa", j.Tapped.Material.Source)
		return w.line("delta_M", "compliance of the tapped thread",
			stiffness.Rod(stiffness.TappedThreadLength*t.diameter, t.nominalArea,
				j.Tapped.Material.Modulus), "mm/N", guideline+"5.1.1")
	}
	w.input("c_M", "equivalent length of the nut over d", stiffness.NutThreadLength, "-", guideline+"5.1.1")
	w.input("E_M", "modulus of the nut, as the bolt's", j.Bolt.Class.Modulus, "MPa", j.Bolt.Class.Source)
	return w.line("delta_M", "compliance of the nut",
		stiffness.Rod(stiffness.NutThreadLength*t.diameter, t.nominalArea, j.Bolt.Class.Modulus), "mm/N", guideline+"5.1.1")
}

// clampedSpring integrates cone and sleeve layer by layer.
func (w *work) clampedSpring() {
	cones := w.joint.body().Cones()
	joint := "through"
	w.input("d_W", "bearing diameter of the head", cones.HeadBearing, "mm", w.joint.Bolt.Head.Source)
	if cones.Tapped {
		joint = "tapped"
	} else {
		w.input("d_W_N", "bearing diameter of the nut", cones.FarBearing, "mm", w.joint.Nut.Source)
	}
	w.input("D_A", "smallest outer diameter of the parts", cones.OuterDiameter, "mm", stated)
	w.lineBy("d_Wm."+joint, "d_Wm", "bearing diameter for the cone angle", cones.MeanBearing(), "mm", guideline+"5.1.2")
	w.lineBy("tan_phi."+joint, "tan_phi", "tangent of the cone angle", cones.Tangent, "-", guideline+"5.1.2")
	w.lineBy("x_H."+joint, "x_H", "depth where the head's cone ends", cones.HeadEnd, "mm", guideline+"5.1.2")
	w.lineBy("x_N."+joint, "x_N", "depth where the far cone begins", cones.FarStart, "mm", guideline+"5.1.2")

	var depth, sum float64
	for i, l := range w.joint.layers() {
		end := w.lineAt(i+1, "x", "depth of the end of "+l.name, depth+l.thickness, "mm", arithmetic)
		piece := cones.Layer(depth, end, l.hole)
		w.lineAt(i+1, "c_H", "head cone in "+l.name+", length over area", piece.HeadCone, "1/mm", guideline+"5.1.2")
		w.lineAt(i+1, "c_S", "sleeve in "+l.name+", length over area", piece.Sleeve, "1/mm", guideline+"5.1.2")
		if !cones.Tapped {
			w.lineAt(i+1, "c_N", "nut cone in "+l.name+", length over area", piece.FarCone, "1/mm", guideline+"5.1.2")
		}
		compliance := w.lineByAt("delta_P_i."+joint, i+1, "delta_P", "compliance of "+l.name, piece.Sum()/l.modulus, "mm/N",
			guideline+"5.1.2")
		w.layerCompliances = append(w.layerCompliances, compliance)
		sum += compliance
		depth = end
	}
	w.clampedCompliance = w.line("delta_P", "compliance of the clamped parts", sum, "mm/N", guideline+"5.1.2")
}

// body returns the deformation body of the clamped parts.
func (j Joint) body() stiffness.Body {
	b := stiffness.Body{
		HeadBearing:   j.Bolt.Head.BearingDiameter,
		Length:        j.Grip(),
		OuterDiameter: j.SmallestOuterDiameter(),
		Tapped:        j.Tapped != nil,
	}
	if j.Nut != nil {
		b.FarBearing = j.Nut.BearingDiameter
	}
	return b
}
