package planner

import (
	"fmt"
	"math"
)

func (v *validator) safety(s Safety) {
	factor := func(value float64, field string) {
		if value == 0 {
			return
		}
		v.require(value >= 1 && value <= 100, at("safety."+field),
			"state a factor of 1 or more, for example 1.2, or leave it out", "the safety factor is %g", value)
	}
	factor(s.Slip, "slip")
	factor(s.Yield, "yield")
	factor(s.Fatigue, "fatigue")
	factor(s.Pressure, "bearing_pressure")
	factor(s.Stripping, "stripping")
	factor(s.Shear, "shear")
}

func (v *validator) losses(l Losses) {
	closing := bounds{lengths.dimension, 1e-5, 10}
	v.positiveOrNone(l.Settlement, closing, at("losses.settlement"), "the measured settlement", "state a length, for example 8 um")
	for i, c := range l.Layers {
		v.positive(c.Amount, closing, itemOf("losses.layers", i, "amount"), "the closing of the layer",
			"state by how much the layer gets thinner, for example 10 um")
	}
	v.require(l.Relaxation >= 0 && l.Relaxation < 1, at("losses.relaxation"), "state a share between 0 and 100 %",
		"the share lost by relaxation is %g %%", l.Relaxation*100)
}

// hotValues judges what is stated for the heat.
func (v *validator) hotValues(j Joint) {
	b := j.Bolt
	v.positiveOrNone(b.HotModulus, moduli, at("bolt.hot_modulus"), "the bolt's modulus in the heat", "state it, for example 180 GPa")
	v.positiveOrNone(b.HotYield, pressures, at("bolt.hot_yield"), "the bolt's yield strength in the heat", "state it, for example 500 MPa")
	v.require(b.HotModulus <= b.Class.Modulus || b.Class.Modulus == 0, at("bolt.hot_modulus", "bolt.property_class"),
		"state the modulus at the highest temperature of the bolt", "the bolt's modulus in the heat is above the one at room temperature")
	v.require(b.HotYield <= b.Class.YieldStrength || b.Class.YieldStrength == 0, at("bolt.hot_yield", "bolt.property_class"),
		"state the yield strength at the highest temperature of the bolt", "the bolt's yield strength in the heat is above the one at room temperature")
	for i, p := range j.Parts {
		where := itemOf("clamped", i, "hot_modulus", itemOf("clamped", i, "material").path())
		v.positiveOrNone(p.HotModulus, moduli, where, "the part's modulus in the heat", "state it, for example 180 GPa")
		v.require(p.HotModulus <= p.Material.Modulus || p.Material.Modulus == 0, where,
			"state the modulus at the highest temperature of the parts", "the part's modulus in the heat is above the one at room temperature")
	}
}

// heat requires the data that the temperatures ask for: moduli of bolt and parts and
// the yield strength of the bolt.
func (v *validator) heat(j Joint) {
	bolt, parts := math.Inf(-1), math.Inf(-1)
	for _, s := range j.Temperature.states() {
		bolt, parts = math.Max(bolt, s.Bolt), math.Max(parts, s.Parts)
	}
	v.boltHeat(j, bolt)
	for i, l := range j.layers() {
		part := i
		if j.HeadWasher != nil {
			part--
		}
		if part < 0 || part >= len(j.Parts) {
			v.washerHeat(l, part, parts)
			continue
		}
		_, _, known := layerSoftness(l, parts)
		v.require(known, at("temperature", itemOf("clamped", part, "material").path()),
			fmt.Sprintf("state clamped[%d].hot_modulus, the modulus of that part at its highest temperature", part),
			"%g degC lies beyond the data for the modulus of %s", parts, l.name)
	}
}

// washerHeat judges a washer; the tables follow their steel further than any bolt.
func (v *validator) washerHeat(l layer, part int, highest float64) {
	key := "washers.head"
	if part >= 0 {
		key = "washers.nut"
	}
	_, _, known := layerSoftness(l, highest)
	v.require(known, at("temperature", key, "bolt.thread"), "list the washer as a clamped part with its hot_modulus",
		"%g degC lies beyond the data for the modulus of the %s", highest, l.name)
}

func (v *validator) boltHeat(j Joint, highest float64) {
	_, _, known := j.boltSoftness(highest)
	v.require(known, at("temperature", "bolt.property_class", "bolt.thread"), "state bolt: {hot_modulus: ...}, the modulus at the bolt's highest temperature",
		"%g degC lies beyond the data for the modulus of class %s", highest, j.Bolt.Class.Name)
	_, _, known = j.hotYield(highest)
	v.require(known, at("temperature", "bolt.property_class", "bolt.thread"),
		"state bolt: {hot_yield: ...}, the yield strength at the bolt's highest temperature",
		"%g degC lies beyond the data for the yield strength of class %s", highest, j.Bolt.Class.Name)
}
