package planner

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"clampback/planner/quantity"
)

func (v *validator) spectrum(l Loads) {
	v.require(len(l.Spectrum) == 0 || l.Cycles == 0, at("loads.spectrum", "loads.cycles"), "keep one of them",
		"both cycles and a spectrum are stated")
	v.require(len(l.Spectrum) <= 1000, at("loads.spectrum"), "state at most 1000 blocks", "the spectrum has %d blocks", len(l.Spectrum))
	for i, b := range l.Spectrum {
		inside := b.Low <= b.High && b.Low >= l.Axial.Low && b.High <= l.Axial.High
		v.require(inside, itemOf("loads.spectrum", i, "axial", "loads.axial"), "state a range within loads.axial, low end first",
			"the block from %s to %s does not lie within the axial load", measured{b.Low, quantity.Force}, measured{b.High, quantity.Force})
		v.require(b.Cycles >= cycleRange.least && b.Cycles <= cycleRange.most, itemOf("loads.spectrum", i, "cycles"),
			"state how often the load goes from end to end, for example 2e6", "%g load cycles are impossible", b.Cycles)
	}
}

func (v *validator) introduction(j Joint) {
	i := j.Loads.Introduction
	if i == nil {
		return
	}
	v.require(j.Loads.IntroductionFactor == nil, at("loads.introduction", "loads.introduction_factor"), "keep one of them",
		"both the load introduction and its factor are stated")
	ok := v.require(slices.Contains(introductionTypes, i.Type), at("loads.introduction.type"),
		"state one of "+strings.Join(introductionTypes, ", "), "unknown type %q", i.Type)
	before := len(v.faults)
	v.positiveOrNone(i.Height, lengths, at("loads.introduction.height"), "the height of the parts", "state it as a length, for example 33 mm")
	v.notNegative(i.Arm, lengths, at("loads.introduction.a_k"), "the distance a_k")
	v.notNegative(i.Lead, lengths, at("loads.introduction.l_a"), "the distance l_a")
	if !ok || len(v.faults) > before || !(i.height(j.Grip()) > 0) {
		return
	}
	v.require(!math.IsNaN(i.interpolate(j.Grip()).factor()), at("loads.introduction", fitFields(j)...),
		"state introduction_factor, or a place with l_A/h up to 0.1 or a_k/h up to 0.3",
		"the table has no factor for l_A/h %.3g with a_k/h %.3g", i.Lead/i.height(j.Grip()), i.Arm/i.height(j.Grip()))
}

func (v *validator) group(j Joint) {
	if len(j.Group) == 0 {
		return
	}
	v.require(j.Loads.Axial == quantity.Range{}, at("loads.axial", "group"), "keep one of them",
		"both the loads of the group and those of one bolt are stated")
	v.require(j.Clamp.Transverse == 0, at("clamp.transverse", "group"), "keep one of them",
		"both the loads of the group and the transverse load of one bolt are stated")
	v.require(len(j.Loads.Spectrum) == 0, at("loads.spectrum", "group"), "state cycles: each bolt then swings between its load cases",
		"a spectrum goes with the loads of one bolt, not of a group")
	v.require(j.Eccentric == nil, at("eccentric", "group"), "state the loads of the bolt that governs",
		"an eccentric joint is planned from the loads of one bolt, not of a group")
	for _, s := range j.Group {
		sound := s.Bolt >= 1 && s.Bolt <= j.Count && math.Abs(s.Axial) <= forces.most && math.Abs(s.X) <= forces.most && math.Abs(s.Y) <= forces.most
		if !sound {
			v.require(false, at("group", "count"), fmt.Sprintf("state forces for bolts 1 to %d", j.Count),
				"bolt %d in load case %q has no possible force", s.Bolt, s.Case)
			return
		}
	}
}

// eccentric requires what bending needs to know, and that the preload alone closes the
// whole interface.
func (v *validator) eccentric(j Joint) {
	e := j.Eccentric
	if e == nil {
		return
	}
	before := len(v.faults)
	v.require(e.LoadArm != nil || j.Loads.Axial == quantity.Range{}, at("eccentric.a", "loads.axial"),
		"add a: 18 mm, the distance of the load from the axis of the parts", "an eccentric joint with an axial load has no a")
	within := func(value, most float64) bool { return math.Abs(value) <= most }
	v.require(e.arm() >= 0 && e.arm() <= lengths.most, at("eccentric.a"), "state it to the side of the load, so 0 or more; s_sym may be negative",
		"the load's distance from the axis is %s", mm(e.arm()))
	v.require(within(e.BoltOffset, lengths.most), at("eccentric.s_sym"), "state the offset of the bolt as a length",
		"the bolt's offset from the axis is %s", mm(e.BoltOffset))
	v.require(within(e.MomentLow, torques.most) && within(e.MomentHigh, torques.most), at("eccentric.moment"), "state it as a torque",
		"the working moment is impossible")
	v.positive(e.Depth, lengths, at("eccentric.depth"), "the depth of the interface", "state it in the direction of bending")
	v.positive(e.Width, lengths, at("eccentric.width"), "the width of the interface", "state it across the direction of bending")
	if len(v.faults) > before || len(j.Parts) == 0 {
		return
	}
	rests := append([]string{"eccentric.depth", "eccentric.width", "eccentric.s_sym"}, fitFields(j)...)
	hole := j.largestHole()
	if !v.require(math.Min(e.Depth, e.Width) > hole, at("eccentric.depth", rests...), "state the interface between the parts",
		"the interface of %s by %s is no larger than the hole of %s", mm(e.Depth), mm(e.Width), mm(hole)) {
		return
	}
	area, moment := e.interfaceArea(hole)
	v.require(moment > math.Abs(e.BoltOffset)*e.Depth/2*area, at("eccentric.s_sym", rests...),
		"move the bolt to the middle third of the interface", "at an offset of %s the preload alone leaves an edge of the interface open",
		mm(e.BoltOffset))
}
