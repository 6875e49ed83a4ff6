package planner

import "math"

// Stripping of a tapped thread after Alexander's model, as VDI 2230-1:2015 R11
// uses it, at the least material that thread tolerance 6H/6g allows. The
// polynomials are from memory.

// threadLimits is the thread at least material, mm.
type threadLimits struct {
	boltMajorMin  float64 // d min, 6g
	boltPitchMin  float64 // d_2 min, 6g
	nutPitchMax   float64 // D_2 max, 6H
	nutMinorMax   float64 // D_1 max, 6H
	majorDiameter float64 // d, nominal
	pitch         float64
}

// limitsOf computes the limits of size from the formulas of ISO 965-1
// (fundamental deviation g, tolerance grade 6), before the standard rounds
// them to preferred numbers: within 9 um of the printed limits to M24.
func limitsOf(diameter, pitch, pitchDiameter, nutMinorDiameter float64) threadLimits {
	deviation := (15 + 11*pitch) / 1000                                     // es of g
	major := (180*math.Cbrt(pitch*pitch) - 3.15/math.Sqrt(pitch)) / 1000    // Td(6)
	boltPitch := 90 * math.Pow(pitch, 0.4) * math.Pow(diameter, 0.1) / 1000 // Td2(6)
	minor := 230 * math.Pow(pitch, 0.7) / 1000                              // TD1(6), P >= 1 mm
	if pitch < 1 {
		minor = (433*pitch - 190*math.Pow(pitch, 1.22)) / 1000 // TD1(6), P <= 0.8 mm
	}
	return threadLimits{
		boltMajorMin:  diameter - deviation - major,
		boltPitchMin:  pitchDiameter - deviation - boltPitch,
		nutPitchMax:   pitchDiameter + 1.32*boltPitch, // TD2(6)
		nutMinorMax:   nutMinorDiameter + minor,
		majorDiameter: diameter,
		pitch:         pitch,
	}
}

// tappedThreadArea returns the shear area of the tapped thread per length of
// engagement, mm: pi d/P (P/2 + (d - D_2) tan 30 deg).
func tappedThreadArea(boltMajor, nutPitch, pitch float64) float64 {
	return math.Pi * boltMajor / pitch * (pitch/2 + (boltMajor-nutPitch)*tan30)
}

// boltThreadArea returns the shear area of the bolt thread per length of
// engagement, mm: pi D_1/P (P/2 + (d_2 - D_1) tan 30 deg).
func boltThreadArea(boltPitch, nutMinor, pitch float64) float64 {
	return math.Pi * nutMinor / pitch * (pitch/2 + (boltPitch-nutMinor)*tan30)
}

const tan30 = 0.57735026918962576451

// boltBending returns C_2, what bending of the threads leaves of the bolt
// thread's strength. ratio is R_S, the strength of the tapped thread over that
// of the bolt's; the polynomial holds from 1 to 2.2.
func boltBending(ratio float64) float64 {
	if ratio <= 1 {
		return 0.897
	}
	r := math.Min(ratio, 2.2)
	return 5.594 - 13.682*r + 14.107*r*r - 6.057*r*r*r + 0.9353*r*r*r*r
}

// tappedBending returns C_3, what bending of the threads leaves of the tapped
// thread's strength. The polynomial holds from R_S = 0.4 to 1.
func tappedBending(ratio float64) float64 {
	if ratio >= 1 {
		return 0.897
	}
	r := math.Max(ratio, 0.4)
	return 0.728 + 1.769*r - 2.896*r*r + 1.296*r*r*r
}

// stripping works out the bolt force that strips the thread in the tapped
// part, F_strip, and the length of engagement with which the bolt would break
// first. The tapped part is taken as wide enough not to dilate (C_1 = 1).
func (w *work) stripping() {
	j, t := w.joint, w.thread
	l := limitsOf(t.diameter, t.pitch, t.pitchDiameter, j.Bolt.Thread.NutMinorDiameter())
	const iso965 = "ISO 965-1, 6H/6g (formulas from memory)"
	w.line("d_6g", "least thread diameter of the bolt", l.boltMajorMin, "mm", iso965)
	w.line("d_2_6g", "least pitch diameter of the bolt", l.boltPitchMin, "mm", iso965)
	w.line("D_2_6H", "largest pitch diameter of the tapped thread", l.nutPitchMax, "mm", iso965)
	w.lineBy(minorRule(t.pitch), "D_1_6H", "largest minor diameter of the tapped thread", l.nutMinorMax, "mm", iso965)
	tappedArea := w.line("A_SGM", "shear area of the tapped thread over length",
		tappedThreadArea(l.boltMajorMin, l.nutPitchMax, l.pitch), "mm", guideline+"R11")
	boltArea := w.line("A_SGS", "shear area of the bolt thread over length",
		boltThreadArea(l.boltPitchMin, l.nutMinorMax, l.pitch), "mm", guideline+"R11")

	class, tapped := j.Bolt.Class, j.Tapped.Material
	w.input("tau_BM", "shear strength of the tapped part", tapped.ShearStrength, "MPa", tapped.Source)
	w.input("r_tau", "shear strength of the bolt over its tensile strength", class.ShearRatio, "-", class.Source)
	boltStrength := class.ShearRatio * class.TensileStrength
	ratio := w.line("R_S", "strength ratio of tapped to bolt thread",
		tapped.ShearStrength*tappedArea/(boltStrength*boltArea), "-", guideline+"R11")
	boltFactor := w.line("C_2", "bending factor of the bolt thread", boltBending(ratio), "-", guideline+"R11, from memory")
	tappedFactor := w.line("C_3", "bending factor of the tapped thread", tappedBending(ratio), "-",
		guideline+"R11, from memory")

	perLength := w.line("q_strip", "stripping force over length of engagement",
		math.Min(tappedFactor*tapped.ShearStrength*tappedArea, boltFactor*boltStrength*boltArea), "N/mm", guideline+"R11")
	w.input("l_b", "length of the bolt under the head", j.Bolt.Length, "mm", stated)
	w.input("t_T", "usable depth of the tapped thread", j.Tapped.Depth, "mm", stated)
	w.lineBy("l_eng.tapped", "l_eng", "length of engaged thread", j.Engagement(), "mm", arithmetic)
	effective := math.Max(0, j.Engagement()-0.8*t.pitch)
	w.strip = w.line("F_strip", "bolt force that strips the thread", perLength*effective, "N", guideline+"R11")
	w.engagementNeeded = w.line("l_req", "engagement with which the bolt breaks first",
		class.TensileStrength*t.stressArea/perLength+0.8*t.pitch, "mm", guideline+"R11")
}

func minorRule(pitch float64) string {
	if pitch < 1 {
		return "D_1_6H.fine"
	}
	return "D_1_6H"
}
