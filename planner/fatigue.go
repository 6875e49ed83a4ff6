package planner

import "math"

// Fatigue of threads, VDI 2230-1:2015 R9 (from memory).
const (
	enduranceCycles = 2e6
	fewestCycles    = 1e4 // the guideline's finite-life line starts here
)

// Block is a part of a load spectrum: so many cycles between the ends of an axial load.
type Block struct {
	Low, High float64 // N
	Cycles    float64
}

// EnduranceLimit returns sigma_ASV, the stress amplitude, MPa, that a thread of
// diameter d (mm) rolled before heat treatment endures 2e6 times:
// 0.85 (150/d + 45). VDI 2230-1:2015 R9, from memory.
func EnduranceLimit(d float64) float64 { return 0.85 * (150/d + 45) }

// EnduranceLimitRolledAfter returns sigma_ASG of a thread rolled after heat treatment:
// (2 - F_Sm/F_0.2min) sigma_ASV, where the mean force is meanShare of the yield force.
// The guideline gives it from 0.3 to 1: below, 0.3 is taken, above, 1.
// VDI 2230-1:2015 R9, from memory.
func EnduranceLimitRolledAfter(d, meanShare float64) float64 {
	return (2 - math.Min(math.Max(meanShare, 0.3), 1)) * EnduranceLimit(d)
}

// lifeExponent is the slope of the finite-life line, N = N_D (sigma_AS/sigma_a)^m.
func (b Bolt) lifeExponent() float64 {
	if b.RolledAfter {
		return 6
	}
	return 3
}

// cyclic reports whether fatigue is judged.
func (l Loads) cyclic() bool { return l.Cycles > 0 || len(l.Spectrum) > 0 }

// checkFatigue compares the stress amplitude on the stress area with the endurance
// limit of the thread, raised for a finite life, or adds up the damage of a spectrum.
func (w *work) checkFatigue() {
	endurance := w.endurance()
	w.safety("S_D", "least safety factor of the stress amplitude", w.stated.Fatigue)
	w.input("m_life", "exponent of the finite-life line", w.joint.Bolt.lifeExponent(), "-", guideline+"R9, from memory")
	if len(w.joint.Loads.Spectrum) > 0 {
		w.checkSpectrum(endurance)
		return
	}
	cycles := w.joint.Loads.Cycles
	w.input("N_cyc", "load cycles", cycles, "-", stated)
	a := w.axial
	e := w.joint.Eccentric
	var moment float64
	if e != nil {
		moment = e.MomentHigh - e.MomentLow
	}
	amplitude := w.line("sigma_a", "stress amplitude in the thread", w.amplitude(a.swingHi-a.swingLo, moment), "MPa", guideline+"R9")
	if e != nil {
		amplitude = w.line("sigma_ab", "stress amplitude in the thread with bending",
			amplitude+w.bendingAmplitude(a.swingHi-a.swingLo, moment), "MPa", guideline+"R9")
	}
	life := math.Pow(enduranceCycles/math.Min(math.Max(cycles, fewestCycles), enduranceCycles), 1/w.joint.Bolt.lifeExponent())
	limit := w.line("sigma_lim", "fatigue limit at the stated cycles", endurance*life, "MPa", guideline+"R9, from memory")
	w.fatigue = &Fatigue{Rolled: w.joint.Bolt.rolled(), Amplitude: amplitude, Endurance: endurance, Limit: limit / w.joint.Safety.Fatigue,
		Cycles: cycles, Mean: w.meanForce() / w.thread.stressArea, Yield: w.joint.Bolt.Class.YieldStrength, Yielding: w.yielding()}
	w.atMost("fatigue", amplitude, limit/w.joint.Safety.Fatigue, "MPa", guideline+"R9")
}

// Fatigue is the thread under a cyclic load: what a Haigh or a Smith diagram shows.
// Stresses on the stress area, MPa.
type Fatigue struct {
	Rolled    string  // "before heat treatment" or "after heat treatment"
	Mean      float64 // at the highest preload
	Amplitude float64 // of a spectrum, the largest
	Endurance float64 // sigma_AS at 2e6 cycles and this mean stress
	Limit     float64 // at the stated cycles, the safety factor taken off
	Yield     float64 // R_p0.2
	Yielding  float64 // mean stress at which the weakest section of the bolt yields, F_0.2min/A_S
	Cycles    float64 // 0: a spectrum
}

func (b Bolt) rolled() string {
	if b.RolledAfter {
		return "after heat treatment"
	}
	return "before heat treatment"
}

// meanForce is F_Sm, the mean bolt force at the highest preload, with what heat and a working
// moment add.
func (w *work) meanForce() float64 {
	var moment float64
	if e := w.joint.Eccentric; e != nil {
		moment = e.MomentHigh + e.MomentLow
	}
	return w.highest + w.thermalGain + (w.loadFactor*(w.axial.swingHi+w.axial.swingLo)+w.momentFactor*moment)/2
}

// yielding is F_0.2min over the stress area, MPa: of a waisted bolt below R_p0.2.
func (w *work) yielding() float64 {
	return w.joint.Bolt.Class.YieldStrength * w.thread.weakestArea / w.thread.stressArea
}

// endurance puts down sigma_AS of the thread.
func (w *work) endurance() float64 {
	d := w.thread.diameter
	before := w.line("sigma_ASV", "endurance limit, rolled before heat treatment", EnduranceLimit(d), "MPa", guideline+"R9, from memory")
	if !w.joint.Bolt.RolledAfter {
		return w.lineBy("sigma_AS.before", "sigma_AS", "endurance limit of the thread", before, "MPa", guideline+"R9, from memory")
	}
	share := w.line("r_Sm", "mean bolt force over yield force", w.meanForce()/(w.joint.Bolt.Class.YieldStrength*w.thread.weakestArea), "-",
		guideline+"R9")
	return w.lineBy("sigma_AS.after", "sigma_AS", "endurance limit of the thread, rolled after heat treatment",
		EnduranceLimitRolledAfter(d, share), "MPa", guideline+"R9, from memory")
}

// amplitude is the stress amplitude on the stress area of a swing of the axial load
// (N) and of the working moment (N.mm) with it.
func (w *work) amplitude(swing, moment float64) float64 {
	return math.Abs(w.loadFactor*swing+w.momentFactor*moment) / 2 / w.thread.stressArea
}

// bendingAmplitude is what bending adds: the bolt turns with the parts by
// beta_P (F_A a + M_B - F_SA s_sym), which bends it by that over beta_S.
func (w *work) bendingAmplitude(swing, moment float64) float64 {
	e := w.joint.Eccentric
	share := w.loadFactor*swing + w.momentFactor*moment
	bend := w.tilt / w.boltTilt * (swing*e.arm() + moment - share*e.BoltOffset)
	d := (w.thread.pitchDiameter + w.thread.minorDiameter) / 2
	return math.Abs(bend) / 2 / (math.Pi / 32 * d * d * d)
}

// checkSpectrum adds up the damage of the blocks after Palmgren and Miner. Where no
// amplitude exceeds the endurance limit there is none; where one does, the finite-life
// line goes on below the limit for all, which is cautious.
func (w *work) checkSpectrum(endurance float64) {
	exponent := w.joint.Bolt.lifeExponent()
	limit := endurance / w.joint.Safety.Fatigue
	var largest, damage float64
	for i, b := range w.joint.Loads.Spectrum {
		w.inputAt(i+1, "N_B", "cycles of block", b.Cycles, "-", stated)
		amplitude := w.amplitude(b.High-b.Low, 0)
		rule := "sig_B_i"
		if w.joint.Eccentric != nil {
			rule = "sig_B_i.bending"
			amplitude += w.bendingAmplitude(b.High-b.Low, 0)
		}
		w.lineByAt(rule, i+1, "sig_B", "stress amplitude in the thread, block", amplitude, "MPa", guideline+"R9")
		damage += w.lineAt(i+1, "D_B", "damage of block", b.Cycles/enduranceCycles*math.Pow(amplitude/limit, exponent), "-",
			"Palmgren-Miner, elementary")
		largest = math.Max(largest, amplitude)
	}
	w.lineBy("sigma_a.spectrum", "sigma_a", "largest stress amplitude in the thread", largest, "MPa", guideline+"R9")
	if largest <= limit {
		damage = 0
	}
	w.line("D_sum", "damage sum, 0 while no amplitude exceeds the endurance limit", damage, "-", "Palmgren-Miner, elementary")
	shortest := w.lineBy("sigma_lim.spectrum", "sigma_lim", "fatigue limit where the finite-life line begins, 1e4 cycles",
		endurance*math.Pow(enduranceCycles/fewestCycles, 1/exponent), "MPa", guideline+"R9, from memory")
	w.fatigue = &Fatigue{Rolled: w.joint.Bolt.rolled(), Amplitude: largest, Endurance: endurance, Limit: limit,
		Mean: w.meanForce() / w.thread.stressArea, Yield: w.joint.Bolt.Class.YieldStrength, Yielding: w.yielding()}
	w.atMost("fatigue", largest, shortest/w.joint.Safety.Fatigue, "MPa", guideline+"R9").Rule = "fatigue of a spectrum"
	w.atMost("fatigue damage", damage, 1, "-", "Palmgren-Miner, elementary")
}
