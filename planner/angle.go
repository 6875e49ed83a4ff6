package planner

import (
	"math"

	"clampback/planner/quantity"
)

// anglePerForce puts down the angle turned per clamp force built up, deg/N:
// (360/P)(delta_S + delta_P).
func (w *work) anglePerForce() float64 {
	w.input("eps", "relative uncertainty of the compliances", w.joint.Tightening.ElasticSpread, "-", stated)
	return w.line("c_ang", "angle per clamp force",
		360/w.thread.pitch*(w.boltCompliance+math.Max(w.clampedCompliance, w.eccentricClamping)), "deg/N", "thread geometry and "+guideline+"5.1")
}

// monitoringAngle works out the angle that torque control turns from snug to
// target: at the middle of the preload range, and at its ends with the
// compliances at theirs.
func (w *work) monitoringAngle() {
	t := w.joint.Tightening
	perForce := w.anglePerForce()
	rule := "T_S.share"
	w.snug = snugOf(t, w.torque)
	if t.SnugTorque > 0 {
		rule = "T_S.stated"
		w.input("T_S_set", "snug torque stated", t.SnugTorque/1000, "N.m", stated)
	} else {
		w.input("s_S", "snug torque over target torque", t.Snug, "-", stated)
	}
	w.lineBy(rule, "T_S", "snug torque, where the angle count starts", w.snug/1000, "N.m", "rounded to the resolution")
	left := w.line("rest_S", "share of the clamp force built up after snug", 1-w.snug/w.torque, "-", arithmetic)

	middle := (w.lowest + w.highest) / 2
	w.angleSetting = w.line("ang", "angle from snug to target", perForce*middle*left, "deg", arithmetic)
	w.angleLow = w.line("ang_lo", "smallest angle to expect", perForce*(1-t.ElasticSpread)*w.lowest*left, "deg", arithmetic)
	w.angleHigh = w.line("ang_hi", "largest angle to expect", perForce*(1+t.ElasticSpread)*w.highest*left, "deg", arithmetic)
}

// snugOf returns the snug torque, N.mm: as stated, or a share of the target
// torque rounded to the resolution, as long as that is not coarser than the
// snug torque itself.
func snugOf(t Tightening, target float64) float64 {
	if t.SnugTorque > 0 {
		return t.SnugTorque
	}
	snug := t.Snug * target
	if snug < t.Step {
		return snug
	}
	return quantity.RoundDown(snug+t.Step/2, t.Step)
}

// angleWindow plans torque to snug, then angle: the snug torque gives a
// preload that scatters with friction and tool, the angle adds one that
// scatters with the compliances and the tolerance of the angle. The torque
// record then is what the tool should read at the end.
func (w *work) angleWindow() {
	t := w.joint.Tightening
	perForce := w.anglePerForce()
	most, least := perForce*(1+t.ElasticSpread), perForce*(1-t.ElasticSpread)
	w.input("tol_ang", "tolerance of the angle", t.AngleTol, "deg", stated)
	w.input("s_ang", "resolution of the angle setting", t.AngleStep, "deg", stated)
	snugLow, snugHigh := w.snugPreload()

	w.window = window{
		low: w.line("ang_wlo", "smallest angle setting that secures the joint", (w.required-snugLow)*most+t.AngleTol,
			"deg", arithmetic),
		high: w.line("ang_whi", "largest angle setting that the joint tolerates",
			(w.tolerated-snugHigh)*least-t.AngleTol, "deg", arithmetic),
	}
	w.window.target = settingIn(w.window, (math.Max(0, w.window.low)+w.window.high)/2, t.AngleStep, t.Aim)
	w.angleSetting = w.lineBy("ang."+string(t.Aim), "ang", "angle in the window before the checks, 0 when there is none",
		w.window.target, "deg", "largest or middle setting in the window")
	angle := w.window.target
	if angle == 0 {
		// Show what the most tolerable angle would give; a little where none is.
		angle, w.checkedAt = math.Max(w.window.high, 2*t.AngleTol), AtUpperEnd
	}
	w.line("ang_E", "angle that the checks are made at", angle, "deg", "the setting; the upper end when there is none")
	w.angleLow = w.lineBy("ang_lo.angle", "ang_lo", "smallest angle to accept", angle-t.AngleTol, "deg", arithmetic)
	w.angleHigh = w.lineBy("ang_hi.angle", "ang_hi", "largest angle to accept", angle+t.AngleTol, "deg", arithmetic)

	w.lowest = w.lineBy("F_Mmin.angle", "F_Mmin", "lowest preload that the setting gives", snugLow+w.angleLow/most,
		"N", arithmetic)
	w.highest = w.lineBy("F_Mmax.angle", "F_Mmax", "highest preload that the setting gives",
		snugHigh+w.angleHigh/least, "N", arithmetic)
	w.endTorque()
}

// snugPreload puts down the snug torque and the ends of the preload it gives.
// A share is taken of the torque that would reach the limit at least friction.
func (w *work) snugPreload() (low, high float64) {
	t := w.joint.Tightening
	reference := w.line("T_ref", "torque that reaches the limit at least friction", w.tolerated*w.friction.least/1000,
		"N.m", guideline+"R13")
	rule := "T_S.angle"
	w.snug = snugOf(t, reference*1000)
	if t.SnugTorque > 0 {
		rule = "T_S.stated"
		w.input("T_S_set", "snug torque stated", t.SnugTorque/1000, "N.m", stated)
	} else {
		w.input("s_S", "snug torque over the reference torque", t.Snug, "-", stated)
	}
	w.lineBy(rule, "T_S", "snug torque, where the angle count starts", w.snug/1000, "N.m", "rounded to the resolution")
	low = w.line("F_S_min", "lowest preload at snug", w.snug*(1-t.Tool.Tolerance)/w.friction.most, "N", guideline+"R13")
	high = w.line("F_S_max", "highest preload at snug", w.snug*(1+t.Tool.Tolerance)/w.friction.least, "N", guideline+"R13")
	return low, high
}

// endTorque puts down the torque to expect at the target angle.
func (w *work) endTorque() {
	k := w.friction
	low := w.lineBy("T_lo.angle", "T_lo", "lowest torque to expect at the end", w.lowest*k.least/1000, "N.m", guideline+"R13")
	high := w.lineBy("T_hi.angle", "T_hi", "highest torque to expect at the end", w.highest*k.most/1000, "N.m",
		guideline+"R13")
	middle := w.lineBy("T_A.angle", "T_A", "torque to expect at the end, middle of the ranges",
		(w.lowest+w.highest)/2*(k.least+k.most)/2/1000, "N.m", guideline+"R13")
	w.torques = Torque{WindowLow: low, Target: middle, WindowHigh: high}
}
