package planner

import (
	"math"

	"clampback/planner/group"
)

// Governing says which bolt in which load case decides something, where a whole joint
// is planned from its load cases.
type Governing struct {
	For  string `json:"for"`
	Case string `json:"load_case"`
	Bolt int    `json:"bolt"`
}

// axialLoads are the axial loads of the bolt that the steps reckon with, N. They are
// one bolt's range, or of a group each those of the bolt that governs.
type axialLoads struct {
	low, high         float64 // lowest and highest of all
	clamp             float64 // of the bolt whose clamp is needed most
	swingLo, swingHi  float64 // ends of the largest swing of one bolt
	transverse        float64 // with clamp
	largestTransverse float64
}

// operate puts down the operating loads of the bolt: as stated, or of the bolts that
// govern the group.
func (w *work) operate() {
	j := w.joint
	a := &w.axial
	if len(j.Group) == 0 {
		axial := j.Loads.Axial
		w.axialRange()
		w.input("F_Q", "transverse load carried by friction", j.Clamp.Transverse, "N", stated)
		*a = axialLoads{axial.Low, axial.High, axial.High, axial.Low, axial.High, j.Clamp.Transverse, j.Clamp.Transverse}
		return
	}
	g := w.governing()
	rows := w.groupRows(g)
	w.pick(rows, g.clamp, "required preload")
	w.pick(rows, g.highest, "highest axial load")
	w.pick(rows, g.lowest, "lowest axial load")
	if j.Loads.cyclic() {
		w.pick(rows, g.swingHigh, "fatigue")
	}
	if j.Loads.cyclic() && g.swingLow != g.swingHigh {
		w.pick(rows, g.swingLow, "fatigue, lower end")
	}
	w.pick(rows, g.transverse, "highest transverse load")
	at := func(symbol, meaning, rule string, share int, value float64) float64 {
		w.trace = append(w.trace, Line{Symbol: symbol, Meaning: meaning, Value: value, Unit: "N",
			Source: "VDI 2230-2, rigid plates", Rule: rule, Index: rows[share]})
		return value
	}
	shares := j.Group
	a.low = at("F_A_min", "lowest axial load of any bolt", "group.low", g.lowest, math.Min(0, shares[g.lowest].Axial))
	a.high = at("F_A_max", "highest axial load of any bolt", "group.axial", g.highest, shares[g.highest].Axial)
	a.clamp = at("F_A_K", "axial load of the bolt whose clamp is needed most", "group.axial", g.clamp, shares[g.clamp].Axial)
	a.swingLo = at("F_A_u", "lower end of the largest swing, unloaded included", "group.low", g.swingLow, math.Min(0, shares[g.swingLow].Axial))
	a.swingHi = at("F_A_o", "upper end of the largest swing, unloaded included", "group.high", g.swingHigh, math.Max(0, shares[g.swingHigh].Axial))
	a.transverse = at("F_Q", "transverse load of the bolt whose clamp is needed most", "group.transverse", g.clamp, transverse(shares[g.clamp]))
	a.largestTransverse = at("F_Q_max", "highest transverse load of any bolt", "group.transverse", g.transverse, transverse(shares[g.transverse]))
}

// axialRange puts down the ends of the axial load, which a spectrum sets where they
// are the ends of its blocks.
func (w *work) axialRange() {
	const low, high = "lowest axial load, negative is compression", "highest axial load"
	l := w.joint.Loads
	least, most := math.Inf(1), math.Inf(-1)
	for i, b := range l.Spectrum {
		w.inputAt(i+1, "F_B_lo", "axial load, lower end of block", b.Low, "N", stated)
		w.inputAt(i+1, "F_B_hi", "axial load, upper end of block", b.High, "N", stated)
		least, most = math.Min(least, b.Low), math.Max(most, b.High)
	}
	if least == l.Axial.Low && most == l.Axial.High {
		w.lineBy("F_A_min.spectrum", "F_A_min", low, least, "N", arithmetic)
		w.lineBy("F_A_max.spectrum", "F_A_max", high, most, "N", arithmetic)
		return
	}
	w.input("F_A_min", low, l.Axial.Low, "N", stated)
	w.input("F_A_max", high, l.Axial.High, "N", stated)
}

func transverse(s group.Share) float64 { return math.Hypot(s.X, s.Y) }

// governingShares are the places in Joint.Group of what governs.
type governingShares struct{ clamp, highest, lowest, swingHigh, swingLow, transverse int }

// governing finds the shares that govern: the clamp by what each bolt needs in each
// case, the swing by the bolt whose axial load goes furthest from case to case, the
// unloaded joint included.
func (w *work) governing() governingShares {
	shares := w.joint.Group
	var g governingShares
	most := math.Inf(-1)
	type swing struct{ low, high int } // -1: unloaded
	swings := map[int]swing{}
	axial := func(i int) float64 {
		if i < 0 {
			return 0
		}
		return shares[i].Axial
	}
	for i, s := range shares {
		if need := w.need(s); need > most {
			most, g.clamp = need, i
		}
		if s.Axial > shares[g.highest].Axial {
			g.highest = i
		}
		if s.Axial < shares[g.lowest].Axial {
			g.lowest = i
		}
		if transverse(s) > transverse(shares[g.transverse]) {
			g.transverse = i
		}
		b, seen := swings[s.Bolt]
		if !seen {
			b = swing{-1, -1}
		}
		if s.Axial < axial(b.low) {
			b.low = i
		}
		if s.Axial > axial(b.high) {
			b.high = i
		}
		swings[s.Bolt] = b
	}
	widest := -1.0
	for bolt := 1; bolt <= w.joint.Count; bolt++ { // in order, so that ties fall alike
		b, seen := swings[bolt]
		if width := axial(b.high) - axial(b.low); seen && width > widest {
			widest = width
			g.swingHigh, g.swingLow = b.high, b.low
		}
	}
	// Where one end is the unloaded joint, the row of the other end gives it: no load of
	// that bolt is beyond 0 there.
	if g.swingHigh < 0 {
		g.swingHigh = max(g.swingLow, 0)
	}
	if g.swingLow < 0 {
		g.swingLow = g.swingHigh
	}
	return g
}

// need is the clamp force that a share asks for before losses: F_Kerf + F_PA.
func (w *work) need(s group.Share) float64 {
	j := w.joint
	c := j.Clamp
	c.Transverse = transverse(s)
	required := math.Max(c.Residual, math.Max(j.Safety.Slip*c.frictionGrip(), c.SealArea*c.SealPressure))
	return required + (1-w.loadFactor)*math.Max(0, s.Axial)
}

// pick notes what a share governs, once its row is in the trace.
func (w *work) pick(rows map[int]int, share int, what string) {
	s := w.joint.Group[share]
	if rows[share] > 0 {
		w.governs = append(w.governs, Governing{what, s.Case, s.Bolt})
	}
}

// groupRows puts down the shares that govern, each once, and returns the number of its
// row: by rigid plates from the load case, or as the finite-element run gave it.
func (w *work) groupRows(g governingShares) map[int]int {
	rows := map[int]int{}
	j := w.joint
	p := group.PropertiesOf(j.Pattern.Points)
	if len(j.GroupLoads) > 0 {
		w.input("n_G", "number of bolts in the group", float64(len(j.Pattern.Points)), "-", stated)
		w.input("S_xx", "sum of x^2 of the bolts about their centroid", p.Sxx, "mm2", "pattern")
		w.input("S_yy", "sum of y^2 of the bolts about their centroid", p.Syy, "mm2", "pattern")
		w.input("S_xy", "sum of x y of the bolts about their centroid", p.Sxy, "mm2", "pattern")
	}
	for _, share := range []int{g.clamp, g.highest, g.lowest, g.swingHigh, g.swingLow, g.transverse} {
		if rows[share] > 0 {
			continue
		}
		rows[share] = len(rows) + 1
		w.groupRow(rows[share], j.Group[share], p)
	}
	return rows
}

func (w *work) groupRow(i int, s group.Share, p group.Properties) {
	who := ", bolt " + itoa(s.Bolt) + ", " + s.Case
	const fe = "bolt forces of a finite-element run"
	load, ok := w.loadCase(s.Case)
	if !ok {
		w.inputAt(i, "G_A", "axial load"+who, s.Axial, "N", fe)
		w.inputAt(i, "G_X", "transverse load along x"+who, s.X, "N", fe)
		w.inputAt(i, "G_Y", "transverse load along y"+who, s.Y, "N", fe)
	} else {
		const method = "VDI 2230-2, rigid plates"
		at, m := w.joint.Pattern.Points[s.Bolt-1], p.Moment(load)
		w.inputAt(i, "g_fx", "force along x on the joint"+who, load.Force.X, "N", stated)
		w.inputAt(i, "g_fy", "force along y on the joint"+who, load.Force.Y, "N", stated)
		w.inputAt(i, "g_fz", "force along the bolts on the joint"+who, load.Force.Z, "N", stated)
		w.inputAt(i, "g_mx", "moment about x at the centroid"+who, m.X, "N.mm", stated)
		w.inputAt(i, "g_my", "moment about y at the centroid"+who, m.Y, "N.mm", stated)
		w.inputAt(i, "g_mz", "moment about the bolts at the centroid"+who, m.Z, "N.mm", stated)
		w.inputAt(i, "pos_x", "place of the bolt from the centroid along x"+who, at.X-p.CentroidX, "mm", stated)
		w.inputAt(i, "pos_y", "place of the bolt from the centroid along y"+who, at.Y-p.CentroidY, "mm", stated)
		rule := "G_A.plane"
		switch {
		case p.Polar() == 0:
			rule = "G_A.single"
		case p.InLine():
			rule = "G_A.line"
		}
		w.lineByAt(rule, i, "G_A", "axial load"+who, s.Axial, "N", method)
		torsion := ""
		if p.Polar() == 0 {
			torsion = ".single"
		}
		w.lineByAt("G_X"+torsion, i, "G_X", "transverse load along x"+who, s.X, "N", method)
		w.lineByAt("G_Y"+torsion, i, "G_Y", "transverse load along y"+who, s.Y, "N", method)
	}
	w.lineByAt("G_Q", i, "G_Q", "transverse load"+who, transverse(s), "N", arithmetic)
}

// loadCase returns the load case of a name, where the group is stated by loads.
func (w *work) loadCase(name string) (group.Load, bool) {
	for _, l := range w.joint.GroupLoads {
		if l.Name == name {
			return l, true
		}
	}
	return group.Load{}, false
}
