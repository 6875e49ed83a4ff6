package planner

import (
	"math"

	"clampback/planner/stiffness"
)

// CyclicThread is a bolt's thread under a cyclic load. Stresses on the stress area.
type CyclicThread struct {
	Diameter    float64               // d, mm
	Yield       float64               // R_p0.2, MPa
	Yielding    float64               // mean stress at which the bolt yields, F_0.2min/A_S, MPa; 0: Yield
	RolledAfter bool                  // rolled after heat treatment; false: before
	Cycles      float64               // load cycles; 0: as many as the endurance limit holds for
	Operating   stiffness.StressPoint // MPa
	Demanded    float64               // least safety factor S_D
}

// FatigueDiagram returns the diagram of a plan's thread at the highest preload, where
// the mean stress is largest and a thread rolled after heat treatment endures least;
// false where no fatigue is checked. The operating point is that of the plan's check.
func FatigueDiagram(p Plan) (stiffness.FatigueDiagram, bool) {
	f := p.Fatigue
	if f == nil {
		return stiffness.FatigueDiagram{}, false
	}
	d := CyclicThread{
		Diameter: p.Joint.Bolt.Thread.Diameter, Yield: f.Yield, Yielding: f.Yielding, RolledAfter: p.Joint.Bolt.RolledAfter,
		Cycles: f.Cycles, Operating: stiffness.StressPoint{Mean: f.Mean, Amplitude: f.Amplitude},
		Demanded: p.Joint.Safety.Fatigue,
	}.Diagram()
	d.Spectrum = f.Cycles == 0
	return d, true
}

// Diagram returns the limits of the thread with its operating point and margin.
func (t CyclicThread) Diagram() stiffness.FatigueDiagram {
	if t.Cycles == 0 {
		t.Cycles = enduranceCycles
	}
	d := stiffness.FatigueDiagram{
		RolledAfter: t.RolledAfter, Yield: t.Yield, Cycles: t.Cycles, Endured: enduranceCycles, Operating: t.Operating,
		Demanded:  t.Demanded,
		Curve:     underYield(t.limits(t.Cycles), t.Yield),
		Endurance: underYield(t.limits(enduranceCycles), t.Yield),
	}
	d.Limit, d.LeastLimit = amplitudeAt(d.Curve, t.Operating.Mean), amplitudeAt(d.Endurance, t.Operating.Mean)
	if t.Operating.Amplitude > 0 {
		d.Safety = d.Limit / t.Operating.Amplitude
	}
	return d
}

// leastMeanShare is the mean force over F_0.2min from which the guideline gives the
// limit of threads rolled after heat treatment; below it the limit is held.
const leastMeanShare = 0.3

// limits returns the corners of the limit amplitude over the mean stress: level for a
// thread rolled before heat treatment, sigma_ASV; falling for one rolled after,
// sigma_ASG = (2 - F_Sm/F_0.2min) sigma_ASV from 0.3 to 1. Below 2e6 cycles they rise
// by (2e6/N)^(1/3) and by (2e6/N)^(1/6). VDI 2230-1:2015 R9, from memory.
func (t CyclicThread) limits(cycles float64) []stiffness.StressPoint {
	life := enduranceCycles / math.Min(math.Max(cycles, fewestCycles), enduranceCycles)
	if !t.RolledAfter {
		limit := EnduranceLimit(t.Diameter) * math.Cbrt(life)
		return []stiffness.StressPoint{{Mean: 0, Amplitude: limit}, {Mean: t.Yield, Amplitude: limit}}
	}
	yielding := t.Yielding
	if yielding == 0 {
		yielding = t.Yield
	}
	var corners []stiffness.StressPoint
	for _, mean := range []float64{0, leastMeanShare * yielding, math.Min(yielding, t.Yield), t.Yield} {
		if i := len(corners); i > 0 && mean <= corners[i-1].Mean {
			continue
		}
		corners = append(corners, stiffness.StressPoint{Mean: mean,
			Amplitude: EnduranceLimitRolledAfter(t.Diameter, mean/yielding) * math.Pow(life, 1.0/6)})
	}
	return corners
}

// underYield cuts a curve at the yield line, sigma_m + sigma_a = R_p0.2, which it
// crosses once at most: a corner is added there, and the line followed from it.
func underYield(curve []stiffness.StressPoint, yield float64) []stiffness.StressPoint {
	var cut []stiffness.StressPoint
	for i, p := range curve {
		if p.Upper() <= yield {
			cut = append(cut, p)
			continue
		}
		if i > 0 && curve[i-1].Upper() < yield {
			before := curve[i-1]
			share := (yield - before.Upper()) / (p.Upper() - before.Upper())
			mean := before.Mean + share*(p.Mean-before.Mean)
			cut = append(cut, stiffness.StressPoint{Mean: mean, Amplitude: yield - mean})
		}
		cut = append(cut, stiffness.StressPoint{Mean: p.Mean, Amplitude: yield - p.Mean})
	}
	return cut
}

// amplitudeAt returns the amplitude of a curve at a mean stress; that of its first
// point before it, 0 behind its last.
func amplitudeAt(curve []stiffness.StressPoint, mean float64) float64 {
	if mean <= curve[0].Mean {
		return curve[0].Amplitude
	}
	for i, p := range curve[1:] {
		before := curve[i]
		if mean <= p.Mean {
			return before.Amplitude + (mean-before.Mean)/(p.Mean-before.Mean)*(p.Amplitude-before.Amplitude)
		}
	}
	return 0
}
