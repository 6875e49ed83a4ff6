package planner

import (
	"math"
	"strconv"
)

// heat works out what a change of temperature does to the preload. Service may
// bring a loss in one state and a gain in another: only a loss raises the
// requirement, a gain raises the highest bolt force.
func (w *work) heat() {
	w.input("alpha_S", "expansion of the bolt", w.joint.Bolt.Class.Expansion, "1/K", w.joint.Bolt.Class.Source)
	for i, l := range w.joint.layers() {
		w.inputAt(i+1, "alpha_P", "expansion of "+l.name, l.expansion, "1/K", l.source)
	}
	t := w.joint.Temperature
	w.input("temp_M", "lowest temperature at assembly", t.Assembly.Low, "degC", stated)
	w.input("temp_N", "highest temperature at assembly", t.Assembly.High, "degC", stated)
	if len(t.States) > 0 || t.softens() {
		w.heatByState()
	} else {
		w.heatAlike()
	}
	w.hotStrength()
}

// heatAlike is heat for bolt and parts at one temperature with their moduli of room
// temperature.
func (w *work) heatAlike() {
	j, t := w.joint, w.joint.Temperature
	var excess float64 // growth of the bolt over the parts, mm/K
	for _, l := range j.layers() {
		excess += (j.Bolt.Class.Expansion - l.expansion) * l.thickness
	}
	w.input("temp_lo", "lowest temperature in service", t.Service.Low, "degC", stated)
	w.input("temp_hi", "highest temperature in service, moduli as at room temperature", t.Service.High, "degC", stated)
	perDegree := w.line("dF_K", "preload lost per degree of warming",
		excess/(w.boltCompliance+w.clampedCompliance), "N/K", guideline+"R4")
	low, high := perDegree*(t.Service.Low-t.Assembly.High), perDegree*(t.Service.High-t.Assembly.Low)
	w.thermalLoss = w.line("dF_Vth", "preload lost by temperature", math.Max(0, math.Max(low, high)), "N", guideline+"R4")
	w.thermalGain = w.line("dF_gain", "preload gained by temperature", math.Max(0, math.Max(-low, -high)), "N",
		guideline+"R4")
}

// hotState is what one state of service does to the clamp.
type hotState struct {
	name string
	loss float64 // N, of preload by expansion, the most; negative: a gain
	gain float64 // N, the most
	rest float64 // q_E, share of the preload that the fall of the moduli leaves
}

// heatByState is heat for bolt and parts at temperatures of their own, with the
// moduli they have there: dF = (l_K alpha_S dT_S - sum alpha_P h dT_P)/delta_T and
// q_E = (delta_S + delta_P)/delta_T with delta_T = sum delta E_room/E_T.
// VDI 2230-1:2015 R4.
func (w *work) heatByState() {
	j, t := w.joint, w.joint.Temperature
	var parts float64 // growth of the parts, mm/K
	for _, l := range j.layers() {
		parts += l.expansion * l.thickness
	}
	bolt := j.Bolt.Class.Expansion * j.Grip()
	cold := w.boltCompliance + w.clampedCompliance
	for k, s := range t.states() {
		at := ", " + s.Name
		w.inputAt(k+1, "temp_S", "temperature of the bolt"+at, s.Bolt, "degC", stated)
		w.inputAt(k+1, "temp_P", "temperature of the parts"+at, s.Parts, "degC", stated)
		softness, source, _ := j.boltSoftness(s.Bolt)
		w.inputAt(k+1, "soft_S", "modulus of the bolt cold over hot"+at, softness, "-", source)
		hot := w.boltCompliance * softness
		for i, l := range j.layers() {
			softness, source, _ := layerSoftness(l, s.Parts)
			w.inputAt(i+1, "soft"+strconv.Itoa(k+1), "modulus of "+l.name+" cold over hot"+at, softness, "-", source)
			hot += w.layerCompliances[i] * softness
		}
		w.lineAt(k+1, "delta_T", "compliance of bolt and parts"+at, hot, "mm/N", guideline+"R4")
		from := func(assembly float64) float64 { return (bolt*(s.Bolt-assembly) - parts*(s.Parts-assembly)) / hot }
		w.hot = append(w.hot, hotState{
			s.Name,
			w.lineAt(k+1, "dF_T", "most preload lost by expansion"+at, math.Max(from(t.Assembly.Low), from(t.Assembly.High)), "N", guideline+"R4"),
			-w.lineAt(k+1, "dF_U", "least preload lost by expansion, negative is a gain"+at,
				math.Min(from(t.Assembly.Low), from(t.Assembly.High)), "N", guideline+"R4"),
			w.lineAt(k+1, "q_E", "share of the preload that the fall of the moduli leaves"+at, cold/hot, "-", guideline+"R4"),
		})
	}
	for _, s := range w.hot {
		w.thermalLoss = math.Max(w.thermalLoss, s.loss)
		w.thermalGain = math.Max(w.thermalGain, s.gain)
	}
	w.lineBy("dF_Vth.state", "dF_Vth", "preload lost by temperature", w.thermalLoss, "N", guideline+"R4")
	w.lineBy("dF_gain.state", "dF_gain", "preload gained by temperature", w.thermalGain, "N", guideline+"R4")
}

// hotStrength works out the yield strength that the bolt has at its highest
// temperature in service.
func (w *work) hotStrength() {
	w.hotYield = w.joint.Bolt.Class.YieldStrength
	highest := math.Inf(-1)
	for _, s := range w.joint.Temperature.states() {
		highest = math.Max(highest, s.Bolt)
	}
	ratio, source, _ := w.joint.hotYield(highest)
	if ratio == 1 {
		return
	}
	w.input("r_Rp", "yield strength of the bolt at its highest temperature over room temperature", ratio, "-", source)
	w.hotYield = w.line("R_pT", "yield strength of the bolt at its highest temperature",
		w.hotYield*math.Min(1, ratio), "MPa", guideline+"R8")
}
