package planner

import (
	"math"
	"slices"
	"sync"

	"clampback/planner/table"
)

// Introduction says where the load enters the parts, from which the guideline's table
// gives the load introduction factor. VDI 2230-1:2015, 5.2.2 and Table 2.
type Introduction struct {
	Type   string  // SV1 to SV6, by where the load enters
	Height float64 // h of the parts that the load enters, mm; 0: the grip
	Arm    float64 // a_k, from the edge of the pressed area to where the load enters, mm
	Lead   float64 // l_A, from there to the next joint face, mm
}

// introductionTypes are the joint types of the guideline's table.
var introductionTypes = []string{"SV1", "SV2", "SV3", "SV4", "SV5", "SV6"}

// introductionGrid is Table 2: for each type n at each l_A/h and a_k/h; NaN where it is
// not known.
type introductionGrid struct {
	leads, arms []float64
	factors     map[string][][]float64 // by type, [lead][arm]
}

var introductions = sync.OnceValue(func() introductionGrid {
	g := introductionGrid{factors: map[string][][]float64{}}
	rows := table.Read(tables, "introduction.csv")
	for _, r := range rows {
		if lead := r.Number("l_A_h"); !slices.Contains(g.leads, lead) {
			g.leads = append(g.leads, lead)
		}
		if arm := r.Number("a_k_h"); !slices.Contains(g.arms, arm) {
			g.arms = append(g.arms, arm)
		}
	}
	for _, kind := range introductionTypes {
		for range g.leads {
			row := make([]float64, len(g.arms))
			for i := range row {
				row[i] = math.NaN()
			}
			g.factors[kind] = append(g.factors[kind], row)
		}
		for _, r := range rows {
			lead, arm := slices.Index(g.leads, r.Number("l_A_h")), slices.Index(g.arms, r.Number("a_k_h"))
			g.factors[kind][lead][arm] = r.Number(kind)
		}
	}
	return g
})

// cell returns the interval of a grid that holds a value, and the share of it at
// which the value lies; beyond the grid its ends.
func cell(grid []float64, value float64) (low, high int, share float64) {
	value = math.Min(math.Max(value, grid[0]), grid[len(grid)-1])
	high = 1
	for grid[high] < value {
		high++
	}
	return high - 1, high, (value - grid[high-1]) / (grid[high] - grid[high-1])
}

// interpolation is a place in Table 2: the four values around it, by lead and arm.
type interpolation struct {
	corners        [4]float64 // low lead low arm, low high, high low, high high
	lead, arm      float64    // the shares between them
	leadLo, leadHi float64
	armLo, armHi   float64
}

func (i Introduction) interpolate(grip float64) interpolation {
	g, h := introductions(), i.height(grip)
	l0, l1, lead := cell(g.leads, i.Lead/h)
	a0, a1, arm := cell(g.arms, i.Arm/h)
	f := g.factors[i.Type]
	p := interpolation{[4]float64{f[l0][a0], f[l0][a1], f[l1][a0], f[l1][a1]}, lead, arm,
		g.leads[l0], g.leads[l1], g.arms[a0], g.arms[a1]}
	for k, weight := range p.weights() {
		if weight == 0 && math.IsNaN(p.corners[k]) { // a corner that does not count need not be known
			p.corners[k] = p.corners[0]
		}
	}
	return p
}

func (p interpolation) weights() [4]float64 {
	return [4]float64{(1 - p.lead) * (1 - p.arm), (1 - p.lead) * p.arm, p.lead * (1 - p.arm), p.lead * p.arm}
}

func (p interpolation) factor() float64 {
	var n float64
	for k, weight := range p.weights() {
		n += weight * p.corners[k]
	}
	return n
}

func (i Introduction) height(grip float64) float64 {
	if i.Height > 0 {
		return i.Height
	}
	return grip
}

// introduction puts down the load introduction factor: stated, or from the type of the
// joint.
func (w *work) introduction() float64 {
	i := w.joint.Loads.Introduction
	if i == nil {
		n := *w.joint.Loads.IntroductionFactor
		w.input("n", "load introduction factor", n, "-", stated)
		return n
	}
	const source = guideline + "Table 2, from memory"
	p := i.interpolate(w.joint.Grip())
	w.input("h_A", "height of the parts that the load enters", i.height(w.joint.Grip()), "mm", stated)
	w.input("a_k", "from the pressed area to where the load enters", i.Arm, "mm", stated)
	w.input("l_A", "from where the load enters to the joint face", i.Lead, "mm", stated)
	w.input("l_A_0", "l_A/h of the table below", p.leadLo, "-", source)
	w.input("l_A_1", "l_A/h of the table above", p.leadHi, "-", source)
	w.input("a_k_0", "a_k/h of the table below", p.armLo, "-", source)
	w.input("a_k_1", "a_k/h of the table above", p.armHi, "-", source)
	for k, name := range []string{"l_A below, a_k below", "l_A below, a_k above", "l_A above, a_k below", "l_A above, a_k above"} {
		w.inputAt(k+1, "n_T", i.Type+", n of the table, "+name, p.corners[k], "-", source)
	}
	return w.line("n", "load introduction factor of "+i.Type, p.factor(), "-", source)
}
