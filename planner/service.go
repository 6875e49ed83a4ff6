package planner

import "math"

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

// checkThread checks that the thread holds: in a nut, that the bolt fills it;
// in a tapped part, that the bolt breaks before the thread strips.
func (w *work) checkThread() {
	if w.joint.Nut != nil {
		w.atLeast("thread engagement", w.joint.Engagement(), w.joint.Nut.Height, "mm",
			"ISO 898-2: the nut's full height").Rule = "nut engagement"
		return
	}
	w.atLeast("thread engagement", w.joint.Engagement(), w.engagementNeeded, "mm", guideline+"R11").Rule = "tapped engagement"
	w.atMost("thread stripping", w.largest, w.strip/w.joint.Safety.Stripping, "N", guideline+"R11")
}
