package planner

import (
	"fmt"
	"math"

	"clampback/friction"
	"clampback/planner/quantity"
)

// window is the interval the setting may lie in: a torque (N.mm) for torque
// control, an angle (deg) for torque and angle.
type window struct {
	low    float64
	high   float64
	target float64 // 0: no setting of the stated resolution lies inside
}

// torqueWindow turns the preload window into torques and picks the target.
func (w *work) torqueWindow() {
	t := w.joint.Tightening
	if t.Scatter == GuideScatter {
		w.window = w.guideWindow()
	} else {
		w.window = w.rangeWindow()
	}
	w.window.target = settingIn(w.window, math.Sqrt(w.window.low*w.window.high), t.Step, t.Aim)
	w.lineBy("T_A."+string(t.Aim), "T_A", "setting in the window before the checks, 0 when there is none", w.window.target/1000, "N.m",
		"largest or middle setting in the window")

	torque := w.window.target
	if torque == 0 {
		torque, w.checkedAt = w.window.high, AtUpperEnd
	}
	if torque == 0 {
		torque, w.checkedAt = w.window.low, AtLowerEnd
	}
	w.line("T_E", "torque that the checks are made at", torque/1000, "N.m", "the setting; an end of the window when there is none")
	w.torque = torque
	w.torques = Torque{WindowLow: w.window.low / 1000, Target: w.window.target / 1000, WindowHigh: w.window.high / 1000}
	if t.Scatter == GuideScatter {
		w.highest = w.lineBy("F_Mmax.guide", "F_Mmax", "highest preload that the setting gives",
			torque/w.friction.least, "N", guideline+"R6, R13")
		w.lowest = w.lineBy("F_Mmin.guide", "F_Mmin", "lowest preload that the setting gives",
			w.highest/w.scatterFactor, "N", guideline+"R6")
		return
	}
	tolerance := t.Tool.Tolerance
	w.highest = w.lineBy("F_Mmax.range", "F_Mmax", "highest preload that the setting gives",
		torque*(1+tolerance)/w.friction.least, "N", guideline+"R13")
	w.lowest = w.lineBy("F_Mmin.range", "F_Mmin", "lowest preload that the setting gives",
		torque*(1-tolerance)/w.friction.most, "N", guideline+"R13")
}

// rangeWindow takes the ends of the friction and tool ranges: the lowest
// torque secures the joint at most friction and least torque, the highest
// spares it at least friction and most torque.
func (w *work) rangeWindow() window {
	tolerance := w.joint.Tightening.Tool.Tolerance
	low := w.required * w.friction.most / (1 - tolerance)
	high := w.tolerated * w.friction.least / (1 + tolerance)
	w.lineBy("T_lo.range", "T_lo", "lowest torque that secures the joint", low/1000, "N.m", guideline+"R13")
	w.lineBy("T_hi.range", "T_hi", "highest torque that the joint tolerates", high/1000, "N.m", guideline+"R13")
	return window{low: low, high: high}
}

// guideWindow takes the guideline's tightening factor alpha_A, which holds
// friction and tool together: torque and highest preload go by the least
// friction, the lowest preload is alpha_A times smaller.
func (w *work) guideWindow() window {
	w.scatterFactor = w.guideFactor()
	low := w.scatterFactor * w.required * w.friction.least
	high := w.tolerated * w.friction.least
	w.lineBy("T_lo.guide", "T_lo", "lowest torque that secures the joint", low/1000, "N.m", guideline+"R6, R13")
	w.lineBy("T_hi.guide", "T_hi", "highest torque that the joint tolerates", high/1000, "N.m", guideline+"R13")
	return window{low: low, high: high}
}

// settingIn returns the setting in a window: the largest multiple of step, or
// the one nearest to the window's middle. 0 when none lies inside.
func settingIn(win window, middle, step float64, aim Aim) float64 {
	if !(win.low <= win.high) || win.high <= 0 {
		return 0
	}
	highest := quantity.RoundDown(win.high, step)
	setting := highest
	if aim == AimMiddle {
		setting = quantity.RoundDown(middle+step/2, step)
		if setting < win.low*(1-rounding) {
			setting += step
		}
		setting = math.Min(setting, highest)
	}
	if setting < win.low*(1-rounding) || setting <= 0 {
		return 0
	}
	return setting
}

// rounding is the relative noise of the arithmetic, far below any tolerance:
// a window that ends on a multiple of the step includes it.
const rounding = 1e-12

// guideFactor returns alpha_A: as stated, or the upper value of the guide for
// a torque wrench.
func (w *work) guideFactor() float64 {
	if factor := w.joint.Tightening.ScatterFactor; factor > 0 {
		w.input("alpha_A", "tightening factor", factor, "-", stated)
		return factor
	}
	guide := friction.GuideFor(w.joint.Friction.Thread.Low)
	w.assumed(fmt.Sprintf("tightening factor not stated: %.3g, the upper guide value for %s (%.3g to %.3g)",
		guide.Factor.High, guide.Name, guide.Factor.Low, guide.Factor.High))
	w.input("alpha_A", "tightening factor, upper guide value", guide.Factor.High, "-", guide.Source)
	return guide.Factor.High
}
