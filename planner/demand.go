package planner

import "math"

// demand works out the clamp force that must remain in service, F_Kerf: the
// largest of friction grip, sealing with the force against one-sided opening, and
// what is stated.
func (w *work) demand() {
	c := w.joint.Clamp
	c.Transverse = w.axial.transverse
	w.input("F_K_res", "residual clamp force, stated", c.Residual, "N", stated)
	w.input("M_Y", "torque about the bolt axis carried by friction", c.Torque/1000, "N.m", stated)
	w.input("r_a", "friction radius of the torque", c.TorqueRadius, "mm", stated)
	w.input("mu_T", "least friction of the interface", c.InterfaceFriction, "-", stated)
	w.input("q_F", "number of slip faces", float64(c.Interfaces), "-", stated)
	w.input("A_D", "area sealed by one bolt", c.SealArea, "mm2", stated)
	w.input("p_D", "pressure to seal", c.SealPressure, "MPa", stated)

	w.safety("S_G", "least safety factor against slip", w.stated.Slip)
	grip := w.line("F_KQ", "clamp force for friction grip", w.joint.Safety.Slip*c.frictionGrip(), "N", guideline+"R2")
	seal := w.line("F_KP", "clamp force for sealing", c.SealArea*c.SealPressure, "N", guideline+"R2")
	opening := w.openingForce()
	w.residualClamp = w.line("F_Kerf", "required residual clamp force",
		math.Max(c.Residual, math.Max(grip, seal+opening)), "N", guideline+"R2")
}

// slips reports whether friction must carry a load.
func (w *work) slips() bool { return w.joint.slips() }

func (j Joint) slips() bool {
	for _, s := range j.Group {
		if transverse(s) > 0 {
			return true
		}
	}
	return j.Clamp.slips()
}

// frictionGrip returns F_KQ = F_Q/(q_F mu_T) + M_Y/(q_M r_a mu_T), N.
func (c Clamp) frictionGrip() float64 {
	if !c.slips() {
		return 0
	}
	grip := c.InterfaceFriction * float64(c.Interfaces) // mu_T q_F
	force := c.Transverse / grip
	if c.Torque > 0 {
		force += c.Torque / (c.TorqueRadius * grip)
	}
	return force
}
