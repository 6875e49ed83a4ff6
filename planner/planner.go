package planner

import (
	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// Work plans a joint: from the residual clamp back through load, embedding and
// temperature to the preload needed, from the strength of bolt and parts to
// the preload tolerated, and from both to torque and angle. An infeasible
// joint is a Plan too, with Feasible false and the reasons in Binds. The error
// is a *FaultsError: the joint as stated is impossible.
func Work(joint Joint) (Plan, error) {
	if faults := joint.Faults(); len(faults) > 0 {
		return Plan{}, &FaultsError{ID: joint.ID, Faults: faults}
	}
	w := newWork(joint)
	w.assume()
	w.describe()    // the bolt, the loads and the tightening as numbers
	w.springs()     // delta_S, delta_P, Phi
	w.operate()     // F_A, F_Q, of a group those of the bolts that govern
	w.demand()      // F_Kerf
	w.losses()      // F_Z, dF_Vth
	w.requirement() // F_Mreq
	w.limit()       // F_lim
	if w.joint.Tightening.Method == TorqueAndAngleMethod {
		w.angleWindow() // torque to snug, then angle
	} else {
		w.torqueWindow()
		w.monitoringAngle()
	}
	w.residual() // what the setting leaves in service
	w.check()
	return w.plan(), nil
}

// work is the calculation sheet of one joint. Forces N, lengths mm, stresses
// MPa, torques N.mm, angles deg; only the trace and the plan speak N.m.
type work struct {
	joint       Joint
	stated      Safety // the factors that the register states; joint has them completed
	trace       []Line
	assumptions []string
	checks      []Check
	binds       []string

	thread   threadNumbers
	faces    []face // bearing faces, from the head down
	friction levers
	torsion  float64 // tau/sigma of the bolt at assembly

	boltCompliance    float64 // delta_S
	clampedCompliance float64 // delta_P
	layerCompliances  []float64
	freeThread        float64 // l_Gew, mm
	loadFactor        float64 // Phi

	tilt              float64 // beta_P, of the parts in bending, 1/(N mm)
	eccentricClamping float64 // delta_P*
	eccentricLoading  float64 // delta_P**
	momentFactor      float64 // bolt force over working moment, 1/mm
	boltTilt          float64 // beta_S, of the bolt in bending, 1/(N mm)

	axial   axialLoads
	governs []Governing
	fatigue *Fatigue

	residualClamp float64 // F_Kerf
	relief        float64 // (1 - Phi) F_Amax, taken from the clamp
	boltShare     float64 // Phi F_Amax, added to the bolt
	embedding     float64 // F_Z
	closing       float64 // F_L, by layers that get thinner
	softening     float64 // F_soft, by the fall of the moduli
	relaxation    float64 // F_rel, over time
	hot           []hotState
	hotYield      float64 // R_p0.2 in service, MPa
	thermalLoss   float64 // dF_Vth where it is a loss
	thermalGain   float64 // dF_Vth where it is a gain
	required      float64 // F_Mreq

	shearRatioDown   bool    // r_tau stands in the trace
	strip            float64 // F_strip of a tapped thread
	engagementNeeded float64 // with which the bolt breaks before the thread strips
	tolerated        float64 // F_lim
	toleratedBy      string  // what sets F_lim

	window        window
	scatterFactor float64 // alpha_A of GuideScatter
	torque        float64 // that the checks are made at
	checkedAt     Setting
	snug          float64
	angleSetting  float64
	angleLow      float64
	angleHigh     float64
	torques       Torque

	lowest       float64 // F_Mmin
	highest      float64 // F_Mmax
	largest      float64 // F_Smax, in service
	lowestClamp  float64 // F_KRmin
	highestClamp float64 // F_KRmax
}

func newWork(joint Joint) *work {
	return &work{joint: joint, trace: make([]Line, 0, linesOf(joint)), checks: make([]Check, 0, 16)}
}

// linesOf estimates how many lines the trace of a joint has, so that it grows once.
func linesOf(j Joint) int {
	lines := 192
	if len(j.Group) > 0 {
		lines += 96
	}
	if j.Eccentric != nil {
		lines += 24
	}
	if j.Temperature != nil {
		lines += len(j.Temperature.States) * (len(j.Parts) + 10)
	}
	return lines + 5*len(j.Loads.Spectrum)
}

// plan gathers the record.
func (w *work) plan() Plan {
	w.verdict()
	torque, angle := w.given()
	return Plan{
		ID:        w.joint.ID,
		Name:      w.joint.Name,
		Count:     w.joint.Count,
		Feasible:  w.feasible(),
		Binds:     w.binds,
		Stiffness: Stiffness{w.boltCompliance, w.clampedCompliance, w.loadFactor},
		WorkBack: WorkBack{
			RequiredResidualClamp: w.residualClamp,
			LoadRelief:            w.relief,
			EmbeddingLoss:         w.embedding,
			ClosingLoss:           w.closing,
			ThermalLoss:           w.thermalLoss,
			SofteningLoss:         w.softening,
			RelaxationLoss:        w.relaxation,
			RequiredPreload:       w.required,
		},
		Preload:       Preload{Limit: w.tolerated, Lowest: w.lowest, Highest: w.highest, ScatterFactor: w.highest / w.lowest},
		Torque:        torque,
		Angle:         angle,
		ResidualClamp: ResidualClamp{Lowest: w.lowestClamp, Highest: w.highestClamp},
		Checks:        w.checks,
		Trace:         w.trace,
		Assumptions:   w.assumptions,
		CheckedAt:     w.checkedAt,
		SnugTooHigh:   w.snugTooHigh(),
		Joint:         w.joint,
		Diagram:       w.diagram(),
		AngleWindow:   w.angleRange(),
		Governing:     w.governs,
		Fatigue:       w.fatigue,
	}
}

// given returns the torques and angles that the plan gives out: no setting of an
// infeasible joint is among them.
func (w *work) given() (Torque, Angle) {
	torque := w.torques
	angle := Angle{SnugTorque: w.snug / 1000, FromSnug: w.angleSetting, Low: w.angleLow, High: w.angleHigh}
	if w.feasible() {
		return torque, angle
	}
	torque.Target = 0
	if w.joint.Tightening.Method == TorqueAndAngleMethod {
		return torque, Angle{SnugTorque: angle.SnugTorque}
	}
	return torque, Angle{}
}

// diagram gathers the points the joint diagram is drawn from.
func (w *work) diagram() stiffness.Diagram {
	d := stiffness.Diagram{
		BoltCompliance:    w.boltCompliance,
		ClampedCompliance: w.clampedCompliance,
		Preload:           quantity.Range{Low: w.lowest, High: w.highest},
		Embedding:         w.embedding,
		Closing:           w.closing,
		Loss:              w.lowest - w.lowestClamp - w.relief,
		Gain:              w.thermalGain,
		Axial:             quantity.Range{Low: w.axial.low, High: w.axial.high},
		ClampAxial:        w.axial.clamp,
		LoadFactor:        w.loadFactor,
		BoltShare:         w.boltShare,
		ClampShare:        w.relief,
		ResidualClamp:     quantity.Range{Low: w.lowestClamp, High: w.highestClamp},
		RequiredResidual:  w.residualClamp,
		Limit:             w.tolerated,
	}
	if w.joint.Loads.cyclic() {
		d.Swinging = quantity.Range{Low: w.axial.swingLo, High: w.axial.swingHi}
	}
	if e := w.joint.Eccentric; e != nil {
		d.Eccentric, d.ClampedCompliance = true, w.eccentricClamping
		d.Moment = quantity.Range{Low: w.momentFactor * e.MomentLow, High: w.momentFactor * e.MomentHigh}
	}
	return d
}

// angleRange is the window of the angle setting, where the angle is set.
func (w *work) angleRange() quantity.Range {
	if w.joint.Tightening.Method != TorqueAndAngleMethod {
		return quantity.Range{}
	}
	return quantity.Range{Low: w.window.low, High: w.window.high}
}
