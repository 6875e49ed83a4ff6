package planner

import (
	"fmt"
	"slices"
	"strings"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// MaxCount is the largest number of bolts in a joint, MaxPositions the largest of
// a pattern, which is drawn.
const (
	MaxCount     = 10_000
	MaxPositions = 1_000
)

// Faults returns everything that is impossible about the joint; none means that
// Work can plan it. These rules stand here alone: readers attach positions to
// them. What needs several fields to be judged is not judged while one of them is
// impossible by itself.
func (j Joint) Faults() []Fault {
	v := &validator{}
	v.identity(j)
	before := len(v.faults)
	v.bolt(j.Bolt)
	v.ends(j)
	for i, p := range j.Parts {
		v.part(i, p, j.Bolt.Thread.Diameter)
	}
	if v.require(len(j.Parts) > 0, at("clamped"), "list the clamped parts from the head down", "no clamped part is stated") {
		v.fit(j, len(v.faults) == before)
	}
	v.own(j)
	v.materials(j)
	v.pattern(j)
	v.clamp(j.Clamp, j.slips())
	v.loads(j.Loads, len(j.Group) > 0)
	v.spectrum(j.Loads)
	v.introduction(j)
	v.group(j)
	v.eccentric(j)
	v.safety(j.Safety)
	v.losses(j.Losses)
	before = len(v.faults)
	v.temperature(j.Temperature)
	v.hotValues(j)
	if len(v.faults) == before && j.Temperature != nil {
		v.heat(j)
	}
	v.friction(j.Friction)
	v.tightening(j.Tightening)
	v.require(j.Roughness >= 0 && j.Roughness < MaxRoughness, at("surfaces"), "state Rz above 0 and below 160 um",
		"Rz %g um lies outside the embedding table, which ends at 160 um", j.Roughness*1000)
	return v.faults
}

// validID reports whether an id can name a file: 1 to 40 letters, digits, . _ -, not
// dots alone and no - in front.
func validID(id string) bool {
	if len(id) > 40 || strings.Trim(id, ".") == "" || id[0] == '-' {
		return false
	}
	for _, r := range id {
		letter := r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9'
		if !letter && r != '.' && r != '_' && r != '-' {
			return false
		}
	}
	return true
}

func (v *validator) identity(j Joint) {
	v.require(validID(j.ID), at("id"), "use 1 to 40 letters, digits, . _ - and begin with none of \"-\"",
		"id %q cannot name a file", j.ID)
	v.require(j.Count >= 1 && j.Count <= MaxCount, at("count"),
		fmt.Sprintf("state how many bolts the joint has, 1 to %d", MaxCount), "count is %d", j.Count)
}

func (v *validator) bolt(b Bolt) {
	thread := b.Thread.Diameter
	v.require(thread > 0, at("bolt.thread"), "state the thread, for example M12", "no thread is stated")
	v.require(b.Head.BearingDiameter > 0, at("bolt.head", "bolt.thread", "nut"), "state the head, for example hexagon",
		"no head is stated")
	v.require(b.Class.YieldStrength > 0, at("bolt.property_class", "bolt.thread"), "state the property class, for example 8.8",
		"no property class is stated")
	v.positive(b.Length, lengths, at("bolt.length"), "the bolt's length", "state the length from under the head to the end")
	if b.Shank != nil {
		v.require(len(b.Segments) == 0, at("bolt.segments", "bolt.shank"), "keep one of them",
			"both shank and segments are stated")
		v.notNegative(*b.Shank, lengths, at("bolt.shank"), "the shank")
	}
	for i, s := range b.Segments {
		v.positive(s.Length, lengths, itemOf("bolt.segments", i, "length"), "the segment's length",
			"state a length, or leave the segment out")
		v.require(s.Diameter >= lengths.least && s.Diameter <= thread, itemOf("bolt.segments", i, "diameter", "bolt.thread"),
			"state a diameter above 0 and not above the thread's",
			"the segment's diameter is %s, the thread's %s", mm(s.Diameter), mm(thread))
	}
}

func (v *validator) ends(j Joint) {
	if !v.require(j.Nut != nil || j.Tapped != nil, at("nut", "tapped"),
		"add nut: hexagon, or tapped: {material: S355, depth: 24 mm}", "neither nut nor tapped is stated") {
		return
	}
	v.require(j.Nut == nil || j.Tapped == nil, at("tapped", "nut", "bolt.head"), "keep one of them, or state head: stud", "both nut and tapped are stated")
	v.nuts(j)
	if j.Tapped == nil {
		v.require(j.Nut.Height > 0 && j.Nut.BearingDiameter > 0, at("nut", "bolt.thread"), "state the nut, for example hexagon",
			"the nut has no height or no bearing face")
		return
	}
	v.require(j.NutWasher == nil || j.Nut != nil, at("washers.nut", "nut"),
		"remove it, or state washers: {nut: none} where defaults have one", "a nut washer is stated, but there is no nut")
	v.tapped(j)
	v.positive(j.Tapped.Depth, lengths, at("tapped.depth"), "the thread depth", "state the usable depth of the thread")
}

func (v *validator) part(i int, p Part, thread float64) {
	in := func(field string, rests ...string) place { return itemOf("clamped", i, field, rests...) }
	v.positive(p.Thickness, lengths, in("thickness"), "the thickness", "state the part's thickness, or leave the part out")
	if v.require(p.Hole >= thread, in("hole", "bolt.thread"), "state the clearance hole: at least the thread's diameter",
		"the hole of %s is smaller than the thread of %s", mm(p.Hole), mm(thread)) {
		v.require(p.OuterDiameter > p.Hole, in("outer_diameter", in("hole").path()), "state what the part offers around the bolt axis",
			"the outer diameter of %s is not larger than the hole of %s", mm(p.OuterDiameter), mm(p.Hole))
	}
	v.require(p.OuterDiameter <= lengths.most, in("outer_diameter"), "state what the part offers around the bolt axis",
		"the outer diameter is %s; it must be at most %s", mm(p.OuterDiameter), mm(lengths.most))
}

// materials requires what the checks need to know of each part.
func (v *validator) materials(j Joint) {
	const noStrength = "state shear_strength: without it stripping cannot be judged"
	for i, p := range j.Parts {
		where := itemOf("clamped", i, "material.")
		v.material(p.Material, where)
		where.field += "bearing_pressure"
		v.positive(p.Material.LimitingPressure, pressures, where, "the limiting bearing pressure",
			"state bearing_pressure: without it the faces cannot be judged")
	}
	if j.Tapped != nil {
		v.material(j.Tapped.Material, at("tapped.material."))
		if j.Tapped.Insert == nil {
			v.positive(j.Tapped.Material.ShearStrength, pressures, at("tapped.material.shear_strength"),
				"the shear strength of the tapped part", noStrength)
		}
	}
}

// material requires what every material has; where is the path up to the
// property.
func (v *validator) material(m fastener.Material, where place) {
	v.elastic(m.Modulus, m.Expansion, where)
	where.field += "tensile_strength"
	v.notNegative(m.TensileStrength, pressures, where, "the tensile strength")
}

// elastic requires a possible modulus and thermal expansion.
func (v *validator) elastic(modulus, expansion float64, where place) {
	property := func(name string) place {
		p := where
		p.field += name
		return p
	}
	v.positive(modulus, moduli, property("modulus"), "the modulus", "state modulus, for example 205 GPa")
	const steepest = 1e-3
	v.require(expansion > -steepest && expansion < steepest, property("expansion"),
		"state expansion, for example 11.5 um/m/K",
		"the thermal expansion is %s; no material has that", measured{expansion, quantity.Expansion})
}

func (v *validator) clamp(c Clamp, slips bool) {
	v.notNegative(c.Residual, forces, at("clamp.residual"), "the residual clamp force")
	v.notNegative(c.Transverse, forces, at("clamp.transverse"), "the transverse load")
	v.notNegative(c.Torque, torques, at("clamp.torque"), "the torque about the bolt axis")
	v.notNegative(c.SealArea, areas, at("clamp.seal.area"), "the sealed area")
	v.notNegative(c.SealPressure, pressures, at("clamp.seal.pressure"), "the sealed pressure")
	v.require(c.Interfaces >= 0 && c.Interfaces <= 100, at("clamp.interfaces"),
		"state how many faces carry the load, for example 1", "the number of slip faces is %d", c.Interfaces)
	nothing := !slips && c.Residual == 0 && c.Transverse == 0 && c.Torque == 0 && c.SealArea*c.SealPressure == 0
	v.require(!nothing, at("clamp"), "state residual, transverse, torque or seal", "nothing says what the joint must hold")
	v.require(c.TorqueRadius != 0 || c.Torque <= 0, at("clamp.torque_radius", "clamp.torque"), "add torque_radius: 40 mm",
		"the torque about the bolt axis has no friction radius")
	v.positiveOrNone(c.TorqueRadius, lengths, at("clamp.torque_radius"), "the friction radius of the torque",
		"state it as a length, for example 40 mm")
	if c.InterfaceFriction == 0 {
		v.require(!slips, at("clamp.interface_friction", "clamp.transverse", "clamp.torque", "group"), "add interface_friction: 0.12",
			"friction must carry a load, but the interface friction is not stated")
		return
	}
	v.coefficient(quantity.Single(c.InterfaceFriction), at("clamp.interface_friction"), "the interface friction",
		"state the least one as a plain number, for example 0.12")
}

func (v *validator) loads(l Loads, grouped bool) {
	inside := l.Axial.Low >= -forces.most && l.Axial.High <= forces.most
	v.require(inside && l.Axial.Low <= l.Axial.High, at("loads.axial"), "write it as 0 to 9.5 kN",
		"the axial load of %s to %s is impossible", measured{l.Axial.Low, quantity.Force}, measured{l.Axial.High, quantity.Force})
	if l.IntroductionFactor == nil {
		v.require(l.Introduction != nil || (!grouped && l.Axial == quantity.Range{}), at("loads.introduction_factor", "loads.axial", "loads.introduction", "loads.spectrum", "group"),
			"state introduction_factor: 1 where the load enters at head and nut, 0.5 where it enters half way to the interface, less nearer to it",
			"the axial load has no load introduction factor")
	} else {
		n := *l.IntroductionFactor
		v.require(n >= 0 && n <= 1, at("loads.introduction_factor"), "state a number from 0 to 1",
			"the load introduction factor is %g", n)
	}
	v.require(l.Cycles == 0 || (l.Cycles >= cycleRange.least && l.Cycles <= cycleRange.most), at("loads.cycles"),
		"state how often the axial load goes from end to end, for example 2e6",
		"%g load cycles are impossible", l.Cycles)
}

func (v *validator) temperature(t *Temperature) {
	if t == nil {
		return
	}
	possible := func(c float64) bool { return c >= -273.15 && c <= 1000 }
	for i, s := range t.States {
		v.require(possible(s.Bolt), itemOf("temperature.states", i, "bolt"), "state -273.15 to 1000 degC",
			"%g degC is impossible", s.Bolt)
		v.require(possible(s.Parts), itemOf("temperature.states", i, "parts"), "state -273.15 to 1000 degC",
			"%g degC is impossible", s.Parts)
	}
	v.require(possible(t.Assembly.Low) && possible(t.Assembly.High) && t.Assembly.Low <= t.Assembly.High, at("temperature.assembly"),
		"state -273.15 to 1000 degC, low end first", "%g to %g degC is impossible", t.Assembly.Low, t.Assembly.High)
	v.require(possible(t.Service.Low) && possible(t.Service.High) && t.Service.Low <= t.Service.High,
		at("temperature.service"), "state -273.15 to 1000 degC, low end first",
		"%g to %g degC is impossible", t.Service.Low, t.Service.High)
}

func (v *validator) friction(f Friction) {
	v.coefficient(f.Thread, at("friction.thread"), "the friction in the thread", "write it as 0.10 to 0.14")
	v.coefficient(f.Head, at("friction.head"), "the friction under the head", "write it as 0.10 to 0.14")
}

func (v *validator) tightening(t Tightening) {
	v.word(string(t.Method), "tightening.method", string(TorqueMethod), string(TorqueAndAngleMethod))
	v.word(string(t.Scatter), "tightening.scatter", string(RangeScatter), string(GuideScatter))
	v.word(string(t.Aim), "tightening.aim", string(AimHigh), string(AimMiddle))
	v.settings(t)
	if t.Tool != nil {
		v.require(t.Tool.Tolerance >= 0 && t.Tool.Tolerance < 0.5, at("tightening.tool.tolerance"),
			"state a tolerance from 0 to below 50 %, for example 4 %", "the tool's tolerance is %g %%", t.Tool.Tolerance*100)
	}
	if t.Scatter == GuideScatter {
		v.require(t.Method != TorqueAndAngleMethod, at("tightening.scatter", "tightening.method"), "state scatter: range",
			"the guide scatter factor is for torque, not for torque and angle")
		return
	}
	if v.require(t.ScatterFactor == 0, at("tightening.scatter_factor", "tightening.scatter"),
		"state scatter: guide, or leave the factor out", "a scatter factor is stated, but the scatter comes from the ranges") {
		v.require(t.Tool != nil, at("tightening.tool", "tightening.scatter"), "add tightening: {tool: {tolerance: 4 %}}", "no tool is stated")
	}
}

// settings judges the numbers of the tightening, each by itself.
func (v *validator) settings(t Tightening) {
	share := func(value float64) bool { return value >= 0 && value < 1 }
	v.require(t.Utilisation == 0 || (t.Utilisation >= 0.01 && t.Utilisation <= 1), at("tightening.utilisation"),
		"state a share of the yield strength from 0.01 to 1, usually 0.9", "the utilisation is %g", t.Utilisation)
	v.require(share(t.Snug), at("tightening.snug"), "state a share between 0 and 100 %",
		"the snug torque is %g %% of the target", t.Snug*100)
	v.require(t.Snug == 0 || t.SnugTorque == 0, at("tightening.snug_torque", "tightening.snug"), "keep one of them",
		"both snug and snug_torque are stated")
	v.require(share(t.ElasticSpread), at("tightening.elastic_spread"), "state a share between 0 and 100 %",
		"the uncertainty of the compliances is %g %%", t.ElasticSpread*100)
	const leaveOut = "state a value above 0, or leave it out"
	v.positiveOrNone(t.Step, torques, at("tightening.step"), "the resolution of the setting", leaveOut)
	v.positiveOrNone(t.SnugTorque, torques, at("tightening.snug_torque"), "the snug torque", leaveOut)
	turn := bounds{quantity.Angle, 0.01, 360}
	v.positiveOrNone(t.AngleStep, turn, at("tightening.angle_step"), "the resolution of the angle", leaveOut)
	v.notNegative(t.AngleTol, turn, at("tightening.angle_tolerance"), "the tolerance of the angle")
	v.require(t.ScatterFactor == 0 || (t.ScatterFactor >= 1 && t.ScatterFactor <= 10), at("tightening.scatter_factor"),
		"state alpha_A from 1 to 10, for example 1.6", "the tightening factor is %g", t.ScatterFactor)
}

// word requires one of the known words, or none.
func (v *validator) word(word, field string, known ...string) {
	v.require(word == "" || slices.Contains(known, word), at(field), "state "+known[0]+" or "+known[1],
		"unknown word %q", word)
}
