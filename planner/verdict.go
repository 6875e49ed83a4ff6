package planner

import (
	"fmt"
	"math"

	"clampback/planner/quantity"
)

// feasible reports whether a setting was found and every check passes.
func (w *work) feasible() bool { return w.window.target > 0 && len(w.failures()) == 0 }

// verdict says what binds: of a feasible joint what sets the ends of its
// window, of an infeasible one every reason.
func (w *work) verdict() {
	if w.feasible() {
		w.binds = []string{"lower end: required preload", "upper end: " + w.toleratedBy}
		return
	}
	if w.window.target == 0 {
		w.binds = append(w.binds, w.emptyWindow())
	}
	w.binds = append(w.binds, w.failures()...)
}

// snugTooHigh reports whether a stated snug torque leaves nothing to tighten up to.
func (w *work) snugTooHigh() bool {
	return w.joint.Tightening.Method == TorqueMethod && w.snug >= w.torque
}

// emptyWindow says why no setting lies in the window.
func (w *work) emptyWindow() string {
	t := w.joint.Tightening
	unit, scale, step := "N.m", 1000.0, t.Step
	if t.Method == TorqueAndAngleMethod {
		unit, scale, step = "deg", 1, t.AngleStep
	}
	low, high := inwards(w.window.low/scale, w.window.high/scale)
	if w.window.low <= w.window.high {
		return fmt.Sprintf("no multiple of %.4g %s lies in the window %.4g to %.4g %s", step/scale, unit, low, high, unit)
	}
	return fmt.Sprintf("no window: at least %.4g %s is needed to hold the joint, at most %.4g %s is tolerated (%s)",
		low, unit, high, unit, w.toleratedBy)
}

// inwards rounds the ends of a window to 4 significant digits, inwards.
func inwards(low, high float64) (float64, float64) {
	step := func(v float64) float64 {
		if v == 0 {
			return 1
		}
		return math.Pow(10, math.Floor(math.Log10(math.Abs(v)))-3)
	}
	return quantity.RoundUp(low, step(low)), quantity.RoundDown(high, step(high))
}

// failures lists the checks that fail, and a snug torque that leaves nothing
// to tighten.
func (w *work) failures() []string {
	var all []string
	for _, c := range w.checks {
		if c.OK {
			continue
		}
		verb := "exceeds"
		if c.AtLeast {
			verb = "does not reach"
		}
		all = append(all, fmt.Sprintf("%s: %s %s %s %s %s", c.Name, quantity.Plain(c.Value), c.Unit, verb, quantity.Plain(c.Limit), c.Unit))
	}
	if w.snugTooHigh() {
		all = append(all, fmt.Sprintf("snug torque: %.4g N.m is not below the target torque %.4g N.m", w.snug/1000,
			w.torque/1000))
	}
	return all
}
