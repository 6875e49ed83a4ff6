package register

import (
	"fmt"
	"strings"

	"clampback/friction"
	"clampback/planner"
	"clampback/planner/quantity"
)

func readClamp(f field) planner.Clamp {
	o := f.object("residual", "transverse", "torque", "torque_radius", "interface_friction", "interfaces", "seal")
	c := planner.Clamp{
		Residual:          o.one("residual", quantity.Force),
		Transverse:        o.one("transverse", quantity.Force),
		Torque:            o.one("torque", quantity.Torque),
		TorqueRadius:      o.some("torque_radius", quantity.Length),
		InterfaceFriction: o.some("interface_friction", quantity.Ratio),
	}
	if o.stated("interfaces") {
		c.Interfaces = o.at("interfaces").whole()
		if o.word("interfaces") == "0" {
			o.at("interfaces").wrong("interfaces is 0", "state how many faces carry the load, for example 1")
		}
	}
	if o.stated("seal") {
		seal := o.at("seal").object("area", "pressure")
		seal.require("area", "2400 mm2")
		seal.require("pressure", "10 bar")
		c.SealArea, c.SealPressure = seal.some("area", quantity.Area), seal.some("pressure", quantity.Pressure)
	}
	return c
}

// needsAxial reports whether a joint must state the axial load of one bolt: where it
// has no group, the loads on all of them.
func needsAxial(joint *object) bool { return !joint.stated("group") && joint.d.knows("group") }

// readAllLoads reads the loads of one bolt, and those of the group.
func readAllLoads(o *object, j *planner.Joint) {
	if o.stated("loads") || needsAxial(o) &&
		o.require("loads", "{axial: 0 to 9.5 kN, introduction_factor: 0.5}, or {axial: 0 kN} where there is none") {
		j.Loads = readLoads(o)
	}
	if o.stated("group") {
		j.Group = readGroup(o, j)
	}
}

// readLoads reads the loads of one bolt.
func readLoads(joint *object) planner.Loads {
	o := joint.at("loads").object("axial", "introduction_factor", "introduction", "cycles", "spectrum")
	l := planner.Loads{Cycles: o.some("cycles", quantity.Number)}
	switch {
	case o.stated("axial") && joint.stated("group"):
		o.at("axial").wrong("both axial, the load of one bolt, and group, the loads of the whole joint, are stated", "keep one of them")
	case o.stated("spectrum") && !o.stated("axial"):
		l.Spectrum, l.Axial = readSpectrum(o.at("spectrum"))
	case o.stated("axial") || needsAxial(joint) && o.d.knows(o.pathOf("spectrum")) && o.require("axial", "0 to 9.5 kN"):
		l.Axial = o.at("axial").span(quantity.Force)
	}
	if o.stated("spectrum") && o.stated("axial") {
		l.Spectrum, _ = readSpectrum(o.at("spectrum"))
	}
	if o.stated("introduction") {
		l.Introduction = readIntroduction(o.at("introduction"))
	}
	if o.stated("introduction_factor") {
		factor := o.at("introduction_factor").quantity(quantity.Ratio)
		l.IntroductionFactor = &factor
	}
	return l
}

// readSpectrum reads the blocks of a load spectrum, and the range that they span.
func readSpectrum(f field) ([]planner.Block, quantity.Range) {
	var blocks []planner.Block
	var span quantity.Range
	for i, item := range f.items("block") {
		o := item.object("axial", "cycles")
		o.require("axial", "0 to 9.5 kN")
		o.require("cycles", "2e6")
		b := planner.Block{Cycles: o.some("cycles", quantity.Number)}
		if o.stated("axial") {
			axial := o.at("axial").span(quantity.Force)
			b.Low, b.High = axial.Low, axial.High
		}
		if i == 0 {
			span = quantity.Range{Low: b.Low, High: b.High}
		}
		span = quantity.Range{Low: min(span.Low, b.Low), High: max(span.High, b.High)}
		blocks = append(blocks, b)
	}
	if len(blocks) == 0 && f.node.kind == list {
		f.wrong("spectrum is empty", "list at least one block: {axial: 0 to 9.5 kN, cycles: 1e5}")
	}
	return blocks, span
}

// readIntroduction reads where the load enters the parts.
func readIntroduction(f field) *planner.Introduction {
	o := f.object("type", "height", "a_k", "l_a")
	o.require("type", "SV1")
	o.require("a_k", "4 mm")
	o.require("l_a", "0 mm")
	i := planner.Introduction{Height: o.some("height", quantity.Length), Arm: o.one("a_k", quantity.Length), Lead: o.one("l_a", quantity.Length)}
	if o.stated("type") {
		i.Type = o.at("type").choice("SV1", "SV2", "SV3", "SV4", "SV5", "SV6")
	}
	return &i
}

// readEccentric reads where bolt and load lie off the axis of the parts.
func readEccentric(f field) *planner.Eccentric {
	o := f.object("s_sym", "a", "moment", "depth", "width")
	o.require("s_sym", "3 mm")
	o.require("depth", "40 mm")
	o.require("width", "34 mm")
	e := planner.Eccentric{BoltOffset: o.one("s_sym", quantity.Length), Depth: o.one("depth", quantity.Length), Width: o.one("width", quantity.Length)}
	if o.stated("a") {
		arm := o.at("a").quantity(quantity.Length)
		e.LoadArm = &arm
	}
	if o.stated("moment") {
		moment := o.at("moment").span(quantity.Torque)
		e.MomentLow, e.MomentHigh = moment.Low, moment.High
	}
	return &e
}

func readTemperature(f field) *planner.Temperature {
	o := f.object("assembly", "service", "states")
	var t planner.Temperature
	if o.require("assembly", "20 degC") {
		t.Assembly = o.at("assembly").span(quantity.Temperature)
	}
	if o.stated("states") {
		if o.stated("service") {
			o.at("service").wrong("both service and states are stated", "keep one of them")
		}
		t.States = readThermalStates(o.at("states"))
		return &t
	}
	if o.d.knows(o.pathOf("states")) && o.require("service", "90 degC") {
		t.Service = o.at("service").span(quantity.Temperature)
	}
	return &t
}

func readFriction(f field) planner.Friction {
	o := f.object("thread", "head", "condition", "evidence", "lubrication")
	state := o.label("lubrication")
	switch {
	case o.stated("evidence"):
		o.at("evidence").wrong("friction from test evidence is not read by this version",
			"state the ranges that the tests gave: {thread: 0.10 to 0.14, head: 0.09 to 0.13}")
		f.lose()
		return planner.Friction{}
	case o.stated("condition") && (o.stated("thread") || o.stated("head")):
		o.at("condition").wrong("both a condition and ranges are stated", "keep one of them")
		f.lose()
		return planner.Friction{}
	case o.stated("condition"):
		c := lookUp(o.at("condition"), friction.FindCondition)
		if c.Name == "" {
			f.lose()
		}
		return planner.Friction{Thread: c.Thread, Head: c.Head, State: state, Source: c.Name + ", " + c.Source}
	}
	result := planner.Friction{State: state, Source: "stated in the register"}
	if o.require("thread", "0.10 to 0.14") {
		result.Thread = o.at("thread").span(quantity.Ratio)
	}
	if o.require("head", "0.09 to 0.13") {
		result.Head = o.at("head").span(quantity.Ratio)
	}
	return result
}

// readSurfaces reads "Rz 16 um".
func readSurfaces(f field) float64 {
	const mend = "write it as Rz 16 um"
	text := f.text()
	if text == "" {
		return 0
	}
	rest, ok := strings.CutPrefix(text, "Rz ")
	if !ok {
		f.wrong(fmt.Sprintf("surfaces: %q is no roughness", text), mend)
		return 0
	}
	rz, err := quantity.Parse(rest, quantity.Length)
	f.noteQuantity(err)
	if err == nil && rz <= 0 {
		f.wrong(fmt.Sprintf("surfaces: Rz %g um is impossible", rz*1000), mend)
	}
	return rz
}

// readThermalStates reads the states in which bolt and parts differ.
func readThermalStates(f field) []planner.ThermalState {
	var states []planner.ThermalState
	for _, item := range f.items("state") {
		o := item.object("state", "bolt", "parts")
		o.require("state", "start-up")
		o.require("bolt", "20 degC")
		o.require("parts", "90 degC")
		states = append(states, planner.ThermalState{
			Name: o.label("state"), Bolt: o.one("bolt", quantity.Temperature), Parts: o.one("parts", quantity.Temperature),
		})
	}
	if len(states) == 0 && f.node.kind == list {
		f.wrong("states is empty", "list at least one: {state: running, bolt: 90 degC, parts: 110 degC}")
	}
	return states
}

func readSafety(f field) planner.Safety {
	o := f.object("slip", "yield", "fatigue", "bearing_pressure", "stripping", "shear")
	return planner.Safety{
		Slip:      o.some("slip", quantity.Number),
		Yield:     o.some("yield", quantity.Number),
		Fatigue:   o.some("fatigue", quantity.Number),
		Pressure:  o.some("bearing_pressure", quantity.Number),
		Stripping: o.some("stripping", quantity.Number),
		Shear:     o.some("shear", quantity.Number),
	}
}

// readLosses reads what the clamp loses in service. Each share or length that is no
// guide value needs its source.
func readLosses(f field) planner.Losses {
	o := f.object("settlement", "settlement_source", "layers", "relaxation", "relaxation_source")
	l := planner.Losses{Settlement: o.some("settlement", quantity.Length), Relaxation: o.some("relaxation", quantity.Ratio)}
	if o.stated("settlement") && o.require("settlement_source", "where it was measured") {
		l.SettlementSource = o.at("settlement_source").label()
	}
	if o.stated("relaxation") && o.require("relaxation_source", "where the share comes from") {
		l.RelaxationSource = o.at("relaxation_source").label()
	}
	if !o.stated("layers") {
		return l
	}
	for _, item := range o.at("layers").items("layer") {
		layer := item.object("layer", "amount", "source")
		layer.require("layer", "paint")
		layer.require("amount", "10 um")
		layer.require("source", "where the amount comes from")
		l.Layers = append(l.Layers, planner.Closing{
			Name: layer.label("layer"), Amount: layer.one("amount", quantity.Length), Source: layer.label("source"),
		})
	}
	return l
}
