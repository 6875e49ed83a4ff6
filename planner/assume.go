package planner

import (
	"fmt"
	"math"
	"slices"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// What is taken when the register is silent. Each use is printed.
const (
	usualUtilisation   = 0.9  // nu, VDI 2230-1:2015 R7
	usualStep          = 1000 // N.mm: a setting to the whole N.m
	usualSnug          = 0.20 // of the target torque; common practice, no source
	usualRoughness     = 0.016
	usualAngleStep     = 5.0  // deg; common practice, no source
	usualAngleTol      = 2.0  // deg; common practice, no source
	usualElasticSpread = 0.10 // of the compliances; common practice, no source
	roomTemperature    = 20.0 // degC
)

// assume completes the joint where the register is silent and says so.
func (w *work) assume() {
	j := &w.joint
	t := &j.Tightening
	take := func(missing bool, value *float64, usual float64, text string) {
		if missing {
			*value = usual
			w.assumed(text)
		}
	}
	if t.Method == "" {
		t.Method = TorqueMethod
		w.assumed("tightening method not stated: torque")
	}
	if t.Scatter == "" {
		t.Scatter = RangeScatter
	}
	if t.Aim == "" {
		t.Aim = AimHigh
		w.assumed("aim not stated: high, the largest setting the joint tolerates")
	}
	take(t.Utilisation == 0, &t.Utilisation, usualUtilisation,
		"utilisation not stated: 90 % of the yield strength, with torsion (VDI 2230-1)")
	take(t.Step == 0, &t.Step, usualStep, "resolution of the torque setting not stated: 1 N.m")
	take(t.Snug == 0 && t.SnugTorque == 0, &t.Snug, usualSnug,
		"snug torque not stated: 20 % of the target torque (common practice, no source)")
	take(t.ElasticSpread == 0, &t.ElasticSpread, usualElasticSpread,
		"uncertainty of the compliances not stated: +/-10 % (common practice, no source)")
	if t.Method == TorqueAndAngleMethod {
		take(t.AngleStep == 0, &t.AngleStep, usualAngleStep,
			"resolution of the angle setting not stated: 5 deg (common practice, no source)")
		take(t.AngleTol == 0, &t.AngleTol, usualAngleTol,
			"tolerance of the angle not stated: +/-2 deg (common practice, no source)")
	}
	take(j.Roughness == 0, &j.Roughness, usualRoughness, "surface roughness not stated: Rz 10 to 40 um for embedding")
	w.assumeSafety()
	w.assumeLoads()
	w.assumeShank()
	w.assumeMethod()
}

func (w *work) assumeLoads() {
	j := &w.joint
	if j.Loads.IntroductionFactor == nil && j.Loads.Introduction == nil {
		none := 1.0
		j.Loads.IntroductionFactor = &none
		w.assumed("no axial load, so the load introduction factor has no effect: 1 is shown")
	}
	if j.Temperature == nil {
		j.Temperature = &Temperature{Assembly: quantity.Single(roomTemperature)}
		j.Temperature.Service.Low, j.Temperature.Service.High = roomTemperature, roomTemperature
		w.assumed("temperature not stated: service at the temperature of assembly, 20 degC")
	}
	if !j.Loads.cyclic() && (j.Loads.Axial.Width() > 0 || len(j.Group) > 0) {
		w.assumed("load cycles not stated: the axial load is taken as static and fatigue is not checked")
	}
	if j.slips() && j.Clamp.Interfaces == 0 {
		j.Clamp.Interfaces = 1
		w.assumed("number of slip faces not stated: 1")
	}
}

// assumeShank takes the product standard's thread length when neither shank
// nor segments are stated.
func (w *work) assumeShank() {
	b := &w.joint.Bolt
	if b.Shank != nil || len(b.Segments) > 0 {
		return
	}
	if w.joint.HeadNut != nil {
		none := 0.0
		b.Shank = &none
		w.assumed("shank not stated: the stud is threaded over the whole grip")
		return
	}
	thread := fastener.ReferenceThreadLength(b.Head, b.Thread, b.Length)
	shank := math.Min(math.Max(b.Length-thread, 0), w.joint.Grip())
	b.Shank = &shank
	if shank == 0 {
		w.assumed("shank not stated: threaded to the head")
		return
	}
	w.assumed(fmt.Sprintf("shank not stated: %.4g mm in the grip, from the thread length %.4g mm of %s", shank,
		thread, b.Head.Standard))
}

// assumeMethod says what the method takes for granted in every joint.
func (w *work) assumeMethod() {
	j := w.joint
	w.assumeLoading()
	w.assumed(j.turnedBy())
	w.assumed("friction: " + j.Friction.Source)
	if j.Friction.State == "" {
		w.assumed("lubrication not stated: the friction range holds only for the state it was found with")
	}
	for _, c := range j.Bolt.Class.Cautions() {
		w.assumed("caution: " + c.Text + " (" + c.Source + ", from memory)")
	}
	w.assumed("bearing faces reach to the hole: countersinks and chamfers of the holes are not deducted")
	w.assumeHeat()
	w.assumeThread()
	w.assumeOwn()
	if j.Nut != nil && j.NutClass == "" {
		w.assumed(fmt.Sprintf("the nut matches the bolt (class %s or higher), so the bolt yields before its thread strips", j.Bolt.Class.NutClass()))
	}
	if j.Loads.cyclic() {
		w.assumeFatigue()
	}
	if j.Loads.cyclic() && !j.Bolt.RolledAfter {
		w.assumed("thread rolled before heat treatment (the lower fatigue limit)")
	}
	if j.Tightening.Scatter == GuideScatter {
		w.assumed("guide scatter: the tightening factor holds friction and tool together; only the least friction sets the torque, and a stated tool tolerance is not counted again")
	}
}

// assumeSafety takes 1 for the factors that are not stated. The guideline leaves them
// to the user and recommends more for some.
func (w *work) assumeSafety() {
	w.stated = w.joint.Safety
	s := &w.joint.Safety
	recommended := func(factor *float64, of string) {
		if *factor == 0 {
			w.assumed("safety factor " + of)
		}
	}
	if w.slips() {
		recommended(&s.Slip, "against slip not stated: 1 (VDI 2230-1 recommends 1.2, 1.8 for alternating loads)")
		recommended(&s.Shear, "against shear after slip not stated: 1 (VDI 2230-1 recommends 1.1)")
	}
	if w.joint.Loads.cyclic() {
		recommended(&s.Fatigue, "against fatigue not stated: 1 (VDI 2230-1 recommends 1.2)")
	}
	recommended(&s.Yield, "against yield in service, bearing pressure and stripping: 1 where not stated (VDI 2230-1: 1.0)")
	for _, factor := range []*float64{&s.Slip, &s.Yield, &s.Fatigue, &s.Pressure, &s.Stripping, &s.Shear} {
		if *factor == 0 {
			*factor = 1
		}
	}
}

// assumeHeat says what the heat is taken to do to moduli and strengths.
func (w *work) assumeHeat() {
	t := w.joint.Temperature
	highest, lowest := math.Inf(-1), math.Inf(1)
	for _, s := range t.states() {
		highest = math.Max(highest, math.Max(s.Bolt, s.Parts))
		lowest = math.Min(lowest, math.Min(s.Bolt, s.Parts))
	}
	switch {
	case t.softens():
		w.assumed("moduli above 100 degC from the tables or as stated; limiting bearing pressure and thread strength as at room temperature")
	case highest > roomTemperature:
		w.assumed("moduli and limiting bearing pressure as at room temperature (up to 100 degC moduli fall by some 3 %)")
	default:
		w.assumed("moduli and strengths are those at room temperature")
	}
	if lowest < roomTemperature-40 {
		w.assumed("toughness in the cold is not judged: properties below 20 degC are taken as at 20 degC")
	}
}

// assumeLoading says how the bolt is taken to be loaded.
func (w *work) assumeLoading() {
	j := w.joint
	if e := j.Eccentric; e != nil {
		w.assumed("eccentric: the parts bend as one body about the stated axis, and what a working moment adds to the clamp is not counted on")
		limit := math.Min(j.Bolt.Head.BearingDiameter, j.bearingOfNut()) + j.thinnestPart()
		if e.Depth > limit {
			w.assumed(fmt.Sprintf("the interface is %.4g mm deep, more than d_W + h = %.4g mm, for which the guideline's eccentric formulas hold: check by other means", e.Depth, limit))
		}
	} else {
		w.assumed("loaded and clamped concentrically; loads need no further factor")
	}
	if reach := j.coneReach(); j.SmallestOuterDiameter() > 2*reach {
		w.assumed(fmt.Sprintf("the parts are stated %.4g mm wide, the pressure cone reaches %.4g mm: the guideline's cone angle grows with the stated width, so state what the parts offer around one bolt", j.SmallestOuterDiameter(), reach))
	}
	switch {
	case len(j.GroupLoads) > 0:
		w.assumed("rigid plates share the loads on the joint over bolts of equal stiffness (VDI 2230-2): where the plates bend, state bolt forces of a finite-element run")
	case len(j.Group) > 0:
		w.assumed("bolt forces are those of the finite-element run, taken as operating loads of the bolts without preload")
	}
	if len(j.Group) > 0 && j.Loads.cyclic() {
		w.assumed("each bolt swings between its load cases, and the unloaded joint")
	}
}

// coneReach returns D_A,Gr, how wide the pressure cones grow in the grip, mm.
func (j Joint) coneReach() float64 {
	c := j.body().Cones()
	if c.Tapped {
		return c.HeadBearing + 2*c.Length*c.Tangent
	}
	return c.MeanBearing() + c.Length*c.Tangent
}

// bearingOfNut returns d_W at the far end; that of the head where there is no nut.
func (j Joint) bearingOfNut() float64 {
	if j.Nut == nil {
		return j.Bolt.Head.BearingDiameter
	}
	return j.Nut.BearingDiameter
}

func (j Joint) thinnestPart() float64 {
	thinnest := math.Inf(1)
	for _, p := range j.Parts {
		thinnest = math.Min(thinnest, p.Thickness)
	}
	return thinnest
}

// assumeFatigue says where the fatigue limit of the guideline is used beyond what it was
// found on: bolts of 8.8 to 12.9 up to M40 (from memory).
func (w *work) assumeFatigue() {
	class, d := w.joint.Bolt.Class.Name, w.joint.Bolt.Thread.Diameter
	if !slices.Contains([]string{"8.8", "9.8", "10.9", "12.9"}, class) {
		w.assumed("the fatigue limit is the guideline's for classes 8.8 to 12.9; that class " + class + " reaches it must be shown by other means")
	}
	if d > 40 {
		w.assumed("the fatigue limit is the guideline's for threads up to 40 mm; larger ones endure less")
	}
}

// turnedBy says which member is turned, on whose face the torque was reckoned.
func (j Joint) turnedBy() string {
	switch {
	case j.LockNut != nil:
		return "double nut: the thin nut lies on the part and is held while the thick nut on top of it is turned, which then carries the bolt force (common practice, no source)"
	case j.HeadNut != nil && j.Tapped != nil:
		return "the nut of the stud is turned; the stud stays in its thread"
	case j.HeadNut != nil:
		return "one nut of the stud is turned; the other is held"
	}
	return "the bolt is turned at the head; the other end is held"
}

// assumeThread says what is taken for granted of the engaged thread.
func (w *work) assumeThread() {
	j := w.joint
	if j.Tapped != nil && j.Tapped.Insert != nil {
		w.assumed("the insert holds what its maker states, in this material and at this temperature; the bolt's own thread in it is not the weaker one")
		return
	}
	if j.Tapped != nil && j.Tapped.OuterDiameter == 0 {
		w.assumed("the tapped part is wide enough not to widen under load (1.9 d and more)")
	}
	if w.strips() {
		classes := "6g and 6H"
		if j.Bolt.Thread.Inch {
			classes = "2A and 2B"
		}
		w.assumed("threads at least material of " + classes)
	}
	if j.HeadNut != nil {
		w.assumed("both ends of the stud have the same thread; the nut on the stud matches its class")
	}
}
