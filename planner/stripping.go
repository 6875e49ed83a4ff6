package planner

import (
	"math"
	"strings"

	"clampback/planner/fastener"
)

// Stripping of a tapped thread after Alexander's model, as VDI 2230-1:2015 R11
// uses it, at the least material that thread tolerance 6H/6g allows. The
// polynomials are from memory.

// threadLimits is the thread at least material, mm.
type threadLimits struct {
	boltMajorMin float64 // d min, 6g
	boltPitchMin float64 // d_2 min, 6g
	nutPitchMax  float64 // D_2 max, 6H
	nutMinorMax  float64 // D_1 max, 6H
	pitch        float64
}

// limitsOf computes the limits of size from the formulas of ISO 965-1
// (fundamental deviation g, tolerance grade 6), before the standard rounds
// them to preferred numbers: within 9 um of the printed limits to M24. Inch threads
// have those of ASME B1.1, classes 2A and 2B.
func limitsOf(thread fastener.Thread) threadLimits {
	if thread.Inch {
		return inchLimits(thread)
	}
	diameter, pitch := thread.Diameter, thread.Pitch
	deviation := (15 + 11*pitch) / 1000                                     // es of g
	major := (180*math.Cbrt(pitch*pitch) - 3.15/math.Sqrt(pitch)) / 1000    // Td(6)
	boltPitch := 90 * math.Pow(pitch, 0.4) * math.Pow(diameter, 0.1) / 1000 // Td2(6)
	minor := 230 * math.Pow(pitch, 0.7) / 1000                              // TD1(6), P >= 1 mm
	if pitch < 1 {
		minor = (433*pitch - 190*math.Pow(pitch, 1.22)) / 1000 // TD1(6), P <= 0.8 mm
	}
	return threadLimits{
		boltMajorMin: diameter - deviation - major,
		boltPitchMin: thread.PitchDiameter() - deviation - boltPitch,
		nutPitchMax:  thread.PitchDiameter() + 1.32*boltPitch, // TD2(6)
		nutMinorMax:  thread.NutMinorDiameter() + minor,
		pitch:        pitch,
	}
}

// inchLimits are the limits of classes 2A and 2B by the formulas of ASME B1.1 (from
// memory), in inches inside: T_d2 = 0.0015 (d^1/3 + L_e^1/2) + 0.015 P^2/3 with an
// engagement L_e of d, of 9 P in the 8-thread series; allowance 0.3 T_d2, T_d 0.06 P^2/3,
// T_D2 1.3 T_d2. The minor diameter of the nut: 0.25 P - 0.4 P^2 from 1/4 in, and
// 0.05 P^2/3 + 0.03 P/d - 0.002 below.
func inchLimits(thread fastener.Thread) threadLimits {
	const inch = 25.4
	d, p := thread.Diameter/inch, thread.Pitch/inch
	engaged := d
	if strings.HasSuffix(thread.Designation, "-8 UN") {
		engaged = 9 * p
	}
	boltPitch := 0.0015*(math.Cbrt(d)+math.Sqrt(engaged)) + 0.015*math.Cbrt(p*p)
	allowance := 0.3 * boltPitch
	minor := 0.25*p - 0.4*p*p
	if d < 0.25 {
		minor = 0.05*math.Cbrt(p*p) + 0.03*p/d - 0.002
	}
	return threadLimits{
		boltMajorMin: thread.Diameter - inch*(allowance+0.06*math.Cbrt(p*p)),
		boltPitchMin: thread.PitchDiameter() - inch*(allowance+boltPitch),
		nutPitchMax:  thread.PitchDiameter() + inch*1.3*boltPitch,
		nutMinorMax:  thread.NutMinorDiameter() + inch*minor,
		pitch:        thread.Pitch,
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

// engagement puts down how much thread holds.
func (w *work) engagement() {
	j := w.joint
	w.input("l_b", "length of the bolt under the head; of a stud, its whole length", j.Bolt.Length, "mm", stated)
	if j.HeadNut != nil {
		w.input("m_K", "height of the nut in place of the head", j.HeadNut.Height, "mm", j.HeadNut.Source)
	}
	if j.Tapped != nil {
		w.input("t_T", "usable depth of the tapped thread", j.Tapped.Depth, "mm", stated)
		w.lineBy("l_eng.tapped", "l_eng", "length of engaged thread", j.Engagement(), "mm", arithmetic)
		return
	}
	w.input("m_N", "height of the nut", j.Nut.Height, "mm", j.Nut.Source)
	w.lineBy("l_eng.nut", "l_eng", "length of engaged thread", j.Engagement(), "mm", arithmetic)
}

// strips reports whether the force that strips the thread is known: always of a tapped
// part, of a nut when its shear strength is stated.
func (w *work) strips() bool { return w.joint.Tapped != nil || w.joint.NutShear > 0 }

// mate is what the bolt's thread is engaged in.
type mate struct {
	name     string
	strength float64 // tau_BM, MPa
	width    float64 // s or outer diameter, mm; 0: too wide to dilate
	source   string
}

func (j Joint) mate() mate {
	if j.Tapped != nil {
		return mate{"tapped part", j.Tapped.Material.ShearStrength, j.Tapped.OuterDiameter, j.Tapped.Material.Source}
	}
	return mate{"nut", j.NutShear, j.Nut.WidthAcrossFlats, stated}
}

// dilation returns C_1, what the widening of a nut or boss leaves of the strength:
// 3.8 s/d - (s/d)^2 - 2.61 from s/d = 1.4 to 1.9, where it is 1. VDI 2230-1:2015 R11,
// after Alexander, from memory.
func dilation(ratio float64) float64 {
	r := math.Min(math.Max(ratio, 1.4), 1.9)
	return 3.8*r - r*r - 2.61
}

// stripping works out the bolt force that strips the engaged thread, F_strip, and the
// length of engagement with which the bolt would break first. An insert holds what its
// maker states.
func (w *work) stripping() {
	if w.joint.Tapped != nil && w.joint.Tapped.Insert != nil {
		i := w.joint.Tapped.Insert
		w.input("F_strip", "bolt force that pulls the insert out", i.PullOut, "N", i.Source)
		w.input("l_req", "length of the insert", i.Length, "mm", i.Source)
		w.strip, w.engagementNeeded = i.PullOut, i.Length
		return
	}
	tappedArea, boltArea := w.shearAreas()
	j, t, m := w.joint, w.thread, w.joint.mate()
	class := j.Bolt.Class
	w.input("tau_BM", "shear strength of the "+m.name, m.strength, "MPa", m.source)
	w.shearRatio()
	boltStrength := class.ShearRatio * class.TensileStrength
	ratio := w.line("R_S", "strength ratio of the "+m.name+"'s thread to the bolt's",
		m.strength*tappedArea/(boltStrength*boltArea), "-", guideline+"R11")
	boltFactor := w.line("C_2", "bending factor of the bolt thread", boltBending(ratio), "-", guideline+"R11, from memory")
	tappedFactor := w.line("C_3", "bending factor of the "+m.name+"'s thread", tappedBending(ratio), "-",
		guideline+"R11, from memory")
	perLength := math.Min(tappedFactor*m.strength*tappedArea, boltFactor*boltStrength*boltArea)
	if m.width > 0 {
		w.input("w_M", "width of the "+m.name+" around the thread", m.width, "mm", m.source)
		perLength *= w.line("C_1", "factor of the widening of the "+m.name, dilation(m.width/t.diameter), "-", guideline+"R11, from memory")
	}
	w.line("q_strip", "stripping force over length of engagement", perLength, "N/mm", guideline+"R11")
	effective := math.Max(0, j.Engagement()-0.8*t.pitch)
	w.strip = w.line("F_strip", "bolt force that strips the thread", perLength*effective, "N", guideline+"R11")
	w.engagementNeeded = w.line("l_req", "engagement with which the bolt breaks first",
		class.TensileStrength*t.stressArea/perLength+0.8*t.pitch, "mm", guideline+"R11")
}

// shearAreas puts down the shear areas of both threads per length of engagement, at
// least material.
func (w *work) shearAreas() (tapped, bolt float64) {
	t := w.thread
	l := limitsOf(w.joint.Bolt.Thread)
	source, inch := "ISO 965-1, 6H/6g (formulas from memory)", ""
	minor := minorRule(t.pitch)
	if w.joint.Bolt.Thread.Inch {
		source, inch = "ASME B1.1, 2A/2B (formulas from memory)", ".inch"
		minor = w.inchEngagement()
	}
	w.lineBy("d_6g"+inch, "d_6g", "least thread diameter of the bolt", l.boltMajorMin, "mm", source)
	w.lineBy("d_2_6g"+inch, "d_2_6g", "least pitch diameter of the bolt", l.boltPitchMin, "mm", source)
	w.lineBy("D_2_6H"+inch, "D_2_6H", "largest pitch diameter of the internal thread", l.nutPitchMax, "mm", source)
	w.lineBy(minor, "D_1_6H", "largest minor diameter of the internal thread", l.nutMinorMax, "mm", source)
	tapped = w.line("A_SGM", "shear area of the internal thread over length",
		tappedThreadArea(l.boltMajorMin, l.nutPitchMax, l.pitch), "mm", guideline+"R11")
	bolt = w.line("A_SGS", "shear area of the bolt thread over length",
		boltThreadArea(l.boltPitchMin, l.nutMinorMax, l.pitch), "mm", guideline+"R11")
	return tapped, bolt
}

// inchEngagement puts down the length of engagement that inch tolerances go by, and
// returns the rule of the minor diameter.
func (w *work) inchEngagement() string {
	t := w.joint.Bolt.Thread
	engaged := t.Diameter
	if strings.HasSuffix(t.Designation, "-8 UN") {
		engaged = 9 * t.Pitch
	}
	w.input("L_e", "length of engagement that the tolerances go by", engaged, "mm", asme)
	w.line("T_d2", "tolerance of the pitch diameter, 2A", 25.4*(0.0015*(math.Cbrt(t.Diameter/25.4)+math.Sqrt(engaged/25.4))+
		0.015*math.Pow(t.Pitch/25.4, 2.0/3)), "mm", asme)
	if t.Diameter < 6.35 {
		return "D_1_6H.inch.small"
	}
	return "D_1_6H.inch"
}

// shearRatio puts down tau_B/R_m of the bolt, once.
func (w *work) shearRatio() {
	if !w.shearRatioDown {
		w.shearRatioDown = true
		w.input("r_tau", "shear strength of the bolt over its tensile strength", w.joint.Bolt.Class.ShearRatio, "-", w.joint.Bolt.Class.Source)
	}
}

func minorRule(pitch float64) string {
	if pitch < 1 {
		return "D_1_6H.fine"
	}
	return "D_1_6H"
}
