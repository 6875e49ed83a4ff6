package planner

import "math"

// bound is one thing that limits the preload.
type bound struct {
	name  string
	force float64 // largest preload it tolerates, N
}

// limit works out the highest preload that bolt and parts tolerate, F_lim:
// the smallest of assembly stress, stress in service, bearing pressure and
// thread stripping. What the bolt gets on top in service, from load and
// temperature, is taken off first, so that a window that is open at assembly
// is not closed in service.
func (w *work) limit() {
	extra := w.boltShare + w.thermalGain
	w.line("F_add", "bolt force added in service by load and temperature", extra, "N", guideline+"R8")
	bounds := []bound{w.assemblyBound(), w.workingBound(extra)}
	bounds = append(bounds, w.bearingBounds(extra)...)
	rule := "F_lim"
	w.engagement()
	if w.strips() {
		w.stripping()
		w.safety("S_M", "least safety factor of the thread against stripping", w.stated.Stripping)
		force := w.line("F_thr", "preload that the thread tolerates",
			math.Max(0, w.strip/w.joint.Safety.Stripping-extra), "N", guideline+"R11")
		bounds = append(bounds, bound{"thread stripping", force})
		rule = "F_lim.tapped"
	}
	least := bounds[0]
	for _, b := range bounds[1:] {
		if b.force < least.force {
			least = b
		}
	}
	w.toleratedBy = least.name
	w.tolerated = w.lineBy(rule, "F_lim", "highest preload that bolt and parts tolerate", least.force, "N",
		guideline+"R7 to R11")
}

// threadFriction returns the coefficient in the thread that goes with the
// highest preload: with torque the least friction gives it; with an angle the
// preload does not depend on friction, and most friction twists most.
func (w *work) threadFriction() float64 {
	if w.joint.Tightening.Method == TorqueAndAngleMethod {
		return w.joint.Friction.Thread.High
	}
	return w.joint.Friction.Thread.Low
}

func (w *work) assemblyBound() bound {
	t, nu, yield := w.thread, w.joint.Tightening.Utilisation, w.joint.Bolt.Class.YieldStrength
	rule := "r_T.torque"
	if w.joint.Tightening.Method == TorqueAndAngleMethod {
		rule = "r_T.angle"
	}
	w.torsion = w.lineBy(rule, "r_T", "torsion over tension in the bolt at assembly",
		torsionRatio(t.pitch, t.pitchDiameter, t.stressDiameter, w.threadFriction()), "-", guideline+"R7")
	force := w.line("F_yield", "preload that the bolt tolerates at assembly",
		YieldPreload(t.pitch, t.pitchDiameter, t.stressDiameter, w.threadFriction(), nu, yield), "N", guideline+"R7")
	return bound{"assembly stress", force}
}

// remainingTorsion is k_tau, the share of the assembly torsion that stays in
// the bolt in service; elasticTorsion is what the torsional stress is larger by
// with the elastic section modulus pi d_0^3/16, which R8 takes, than with the
// plastic one of R7, pi d_0^3/12. VDI 2230-1:2015 R8, from memory.
const (
	remainingTorsion = 0.5
	elasticTorsion   = 4.0 / 3
)

func (w *work) workingBound(extra float64) bound {
	w.safety("S_F", "least safety factor of the yield strength in service", w.stated.Yield)
	yieldForce := w.hotYield / w.joint.Safety.Yield * w.thread.weakestArea
	w.input("k_tau", "share of the torsion that remains in service", remainingTorsion, "-", guideline+"R8")
	force := w.line("F_work", "preload that the bolt tolerates in service",
		workingPreload(yieldForce, extra, remainingTorsion*elasticTorsion*w.torsion), "N", guideline+"R8")
	return bound{"working stress", force}
}

func (w *work) bearingBounds(extra float64) []bound {
	bounds := make([]bound, 0, len(w.faces))
	w.safety("S_P", "least safety factor of the bearing pressure", w.stated.Pressure)
	for i, f := range w.faces {
		w.inputAt(i+1, "D_out", "outer diameter of the face under the "+f.name, f.outer, "mm", guideline+"R10")
		w.inputAt(i+1, "d_in", "inner diameter of the face under the "+f.name, f.inner, "mm", stated)
		w.inputAt(i+1, "p_G", "limiting bearing pressure under the "+f.name, f.pressure, "MPa", f.source)
		area := w.lineAt(i+1, "A_p", "bearing area under the "+f.name, f.area(), "mm2", guideline+"R10")
		force := w.lineAt(i+1, "F_p", "preload that the face under the "+f.name+" tolerates",
			math.Max(0, f.pressure/w.joint.Safety.Pressure*area-extra), "N", guideline+"R10")
		bounds = append(bounds, bound{"bearing pressure under the " + f.name, force})
	}
	return bounds
}
