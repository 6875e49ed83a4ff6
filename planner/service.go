package planner

import (
	"math"
	"strconv"

	"clampback/planner/fastener"
)

// residual works out the clamp force that the setting leaves in service. The
// most remains at the highest preload with no load, or under compression.
func (w *work) residual() {
	w.lowestClamp = w.leastClamp(w.lowest)
	w.highestClamp = w.line("F_KR_max", "highest residual clamp force in service",
		w.highest-w.embedding+w.thermalGain+(1-w.loadFactor)*math.Max(-w.axial.low, 0), "N", guideline+"R12")
}

// check makes the service checks at the preloads that the setting gives.
func (w *work) check() {
	w.checkStress()
	w.checkClamp()
	if w.joint.Loads.cyclic() {
		w.checkFatigue()
	}
	w.checkBearing()
	w.checkThread()
	w.checkShear()
}

// passes is how far over 1 a utilisation may come by rounding alone: the
// target may sit exactly on the end of its window.
const passes = 1 + 1e-9

// atMost adds a check of a value that must not exceed its limit. The rule that
// restates it goes by the name; a check that differs sets it on what is returned,
// which holds until the next check.
func (w *work) atMost(name string, value, limit float64, unit, source string) *Check {
	utilisation := math.Inf(1)
	if limit > 0 {
		utilisation = value / limit
	}
	return w.add(Check{Name: name, Rule: name, Value: value, Limit: limit, Unit: unit, Utilisation: utilisation,
		Source: source})
}

// atLeast adds a check of a value that must reach its limit.
func (w *work) atLeast(name string, value, limit float64, unit, source string) *Check {
	utilisation := math.Inf(1)
	if value > 0 {
		utilisation = limit / value
	}
	return w.add(Check{Name: name, Rule: name, Value: value, Limit: limit, Unit: unit, Utilisation: utilisation,
		Source: source, AtLeast: true})
}

// maxUtilisation stands for a check that fails without measure, so that the
// record stays a number.
const maxUtilisation = 999

func (w *work) add(c Check) *Check {
	c.OK = c.Utilisation <= passes
	c.Utilisation = math.Min(c.Utilisation, maxUtilisation)
	w.checks = append(w.checks, c)
	return &w.checks[len(w.checks)-1]
}

func (w *work) checkStress() {
	class, t := w.joint.Bolt.Class, w.thread
	tension := w.highest / t.weakestArea
	assembly := w.line("sigma_M", "equivalent stress at assembly",
		tension*math.Sqrt(1+3*w.torsion*w.torsion), "MPa", guideline+"R7")
	w.atMost("assembly stress", assembly, w.joint.Tightening.Utilisation*class.YieldStrength, "MPa", guideline+"R7")

	w.largest = w.line("F_Smax", "largest bolt force in service", w.highest+w.boltShare+w.thermalGain, "N", guideline+"R8")
	working := w.line("sigma_B", "equivalent stress in service",
		math.Hypot(w.largest/t.weakestArea, math.Sqrt(3)*remainingTorsion*elasticTorsion*w.torsion*tension), "MPa", guideline+"R8")
	w.atMost("working stress", working, w.hotYield/w.joint.Safety.Yield, "MPa", guideline+"R8")
}

func (w *work) checkClamp() {
	w.atLeast("residual clamp", w.lowestClamp, w.residualClamp, "N", guideline+"R12")
	c := w.joint.Clamp
	c.Transverse = w.axial.transverse
	if c.slips() {
		demand := c.Transverse
		if c.Torque > 0 {
			demand += c.Torque / c.TorqueRadius
		}
		w.line("F_slip", "load that friction must carry", demand, "N", guideline+"R12")
		holds := w.line("F_grip", "load that friction holds at the lowest residual clamp",
			math.Max(0, w.lowestClamp)*c.InterfaceFriction*float64(c.Interfaces), "N", guideline+"R12")
		w.atMost("slip", demand, holds/w.joint.Safety.Slip, "N", guideline+"R12")
	}
	if w.axial.low < 0 {
		taken := w.line("F_taken", "preload taken from the bolt by the losses and by compression",
			w.lowest-w.lowestClamp-w.relief-w.loadFactor*w.axial.low, "N", guideline+"R3")
		w.atMost("bolt force under compression", taken, w.lowest, "N", guideline+"R3")
	}
}

// checkBearing compares the pressure under head, nut and washers at assembly
// and in service.
func (w *work) checkBearing() {
	for i, f := range w.faces {
		assembly := w.lineAt(i+1, "p_M", "bearing pressure under the "+f.name+" at assembly", w.highest/f.area(),
			"MPa", guideline+"R10")
		service := w.lineAt(i+1, "p_B", "bearing pressure under the "+f.name+" in service", w.largest/f.area(), "MPa",
			guideline+"R10")
		c := w.atMost("bearing pressure under the "+f.name+", assembly", assembly, f.pressure/w.joint.Safety.Pressure, "MPa", guideline+"R10")
		c.Rule, c.Index = "bearing assembly", i+1
		c = w.atMost("bearing pressure under the "+f.name+", service", service, f.pressure/w.joint.Safety.Pressure, "MPa", guideline+"R10")
		c.Rule, c.Index = "bearing service", i+1
	}
}

// checkThread checks that the thread holds: in a nut, that the bolt fills it and the
// nut's class belongs to the bolt's; where the stripping force is known, that the bolt
// breaks first.
func (w *work) checkThread() {
	j := w.joint
	if j.Nut != nil {
		w.atLeast("thread engagement", j.Engagement(), j.Nut.Height, "mm",
			"ISO 898-2: the nut's full height").Rule = "nut engagement"
		w.checkNut()
	} else {
		w.atLeast("thread engagement", j.Engagement(), w.engagementNeeded, "mm", guideline+"R11").Rule = "tapped engagement"
	}
	if w.strips() {
		w.atMost("thread stripping", w.largest, w.strip/j.Safety.Stripping, "N", guideline+"R11")
	}
}

// checkNut compares the property class of the nut, where it is stated, with that of
// the bolt.
func (w *work) checkNut() {
	j := w.joint
	have, errHave := strconv.ParseFloat(j.NutClass, 64)
	need, errNeed := strconv.ParseFloat(j.Bolt.Class.NutClass(), 64)
	if errHave != nil || errNeed != nil {
		if j.NutClass != "" {
			w.assumed("nut class " + j.NutClass + ", not compared with the bolt's class " + j.Bolt.Class.Name + ": see that they belong together")
		}
		return
	}
	w.input("k_nut", "property class of the nut", have, "-", stated)
	w.input("k_bolt", "least property class of a nut for the bolt", need, "-", "ISO 898-2")
	w.atLeast("nut class", have, need, "-", "ISO 898-2")
	if stress, known := fastener.NutProofStress(j.NutClass, j.Bolt.Thread); known && j.Nut.Kind == "hexagon" && !j.Nut.Own {
		w.input("S_pN", "proof stress of the nut", stress, "MPa", "ISO 898-2")
		load := w.line("F_pN", "proof load of the nut", stress*w.thread.stressArea, "N", "ISO 898-2")
		w.atMost("nut proof load", w.largest, load, "N", "ISO 898-2")
	}
}

// checkShear checks what carries the transverse load if the joint should slip: the
// bolt in shear, the thread taken in the shear plane, and the walls of the holes. The
// walls are judged by the tensile strength of the part, far below the 2.5 times that
// EN 1993-1-8 allows away from edges: common practice, no source.
func (w *work) checkShear() {
	j, load := w.joint, w.axial.largestTransverse
	if load == 0 {
		return
	}
	w.shearRatio()
	w.safety("S_A", "least safety factor of shear and of the holes after slip", w.stated.Shear)
	stress := w.line("tau_Q", "shear stress in the bolt after slip", load/(float64(j.Clamp.Interfaces)*w.thread.weakestArea), "MPa", guideline+"R12")
	w.atMost("bolt shear after slip", stress, j.Bolt.Class.ShearRatio*j.Bolt.Class.TensileStrength/j.Safety.Shear, "MPa", guideline+"R12")
	for i, p := range j.Parts {
		if p.Material.TensileStrength == 0 {
			w.assumed("pressure of the bolt on the hole in " + p.Name + " after slip not checked: its tensile strength is not known")
			continue
		}
		w.inputAt(i+1, "h_Q", "thickness of "+p.Name, p.Thickness, "mm", stated)
		w.inputAt(i+1, "R_mQ", "tensile strength of "+p.Name, p.Material.TensileStrength, "MPa", p.Material.Source)
		pressure := w.lineAt(i+1, "p_Q", "pressure of the bolt on the hole in "+p.Name+" after slip", load/(w.thread.diameter*p.Thickness), "MPa", arithmetic)
		c := w.atMost("hole in "+p.Name+" after slip", pressure, p.Material.TensileStrength/j.Safety.Shear, "MPa", "common practice, no source")
		c.Rule, c.Index = "hole", i+1
	}
}
