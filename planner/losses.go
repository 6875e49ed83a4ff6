package planner

import (
	"math"
)

// losses works out what the assembly preload loses, or gains, before the load
// comes: embedding and temperature.
func (w *work) losses() {
	w.embed()
	w.heat()
}

// embed works out the loss by embedding, F_Z. A joint with a transverse load
// embeds as in shear, the larger guide value.
func (w *work) embed() {
	load := "axial"
	if w.joint.Clamp.slips() {
		load = "shear"
	}
	guide := findEmbedding(load, w.joint.Roughness)
	source := guideline + "Table 5, " + load + " load"
	faces := 1
	if w.joint.Nut != nil {
		faces = 2
	}
	inner := len(w.joint.layers()) - 1
	if w.joint.Tapped != nil {
		inner++ // the face on the tapped part
	}
	w.input("fz_G", "embedding in the thread", guide.thread, "um", source)
	w.input("fz_B", "embedding at a bearing face of head or nut", guide.bearingFace, "um", source)
	w.input("fz_I", "embedding at an inner interface", guide.innerInterface, "um", source)
	w.input("n_B", "number of bearing faces", float64(faces), "-", "counted")
	w.input("n_I", "number of inner interfaces", float64(inner), "-", "counted")

	total := guide.thread + float64(faces)*guide.bearingFace + float64(inner)*guide.innerInterface
	w.line("fz_sum", "embedding", total, "um", guideline+"Table 5")
	w.embedding = w.line("F_Z", "preload lost by embedding",
		total/1000/(w.boltCompliance+w.clampedCompliance), "N", guideline+"R4")
}

// heat works out what a change of temperature does to the preload. A range of
// service temperatures may bring a loss at one end and a gain at the other:
// only a loss raises the requirement, a gain raises the highest bolt force.
func (w *work) heat() {
	j := w.joint
	bolt := j.Bolt.Class
	t := j.Temperature
	w.input("alpha_S", "expansion of the bolt", bolt.Expansion, "1/K", bolt.Source)
	var excess float64 // growth of the bolt over the parts, mm/K
	for i, l := range j.layers() {
		w.inputAt(i+1, "alpha_P", "expansion of "+l.name, l.expansion, "1/K", l.source)
		excess += (bolt.Expansion - l.expansion) * l.thickness
	}
	w.input("temp_M", "temperature at assembly", t.Assembly, "degC", stated)
	w.input("temp_lo", "lowest temperature in service", t.Service.Low, "degC", stated)
	w.input("temp_hi", "highest temperature in service", t.Service.High, "degC", stated)

	perDegree := w.line("dF_K", "preload lost per degree of warming",
		excess/(w.boltCompliance+w.clampedCompliance), "N/K", guideline+"R4")
	low, high := perDegree*(t.Service.Low-t.Assembly), perDegree*(t.Service.High-t.Assembly)
	w.thermalLoss = w.line("dF_Vth", "preload lost by temperature", math.Max(0, math.Max(low, high)), "N", guideline+"R4")
	w.thermalGain = w.line("dF_gain", "preload gained by temperature", math.Max(0, math.Max(-low, -high)), "N",
		guideline+"R4")
}

// requirement sums up the preload that assembly must give at least, F_Mreq,
// and the share of the load that the bolt gets. The load may be absent, so a
// load that is always compressive relieves nothing.
func (w *work) requirement() {
	axial := w.joint.Loads.Axial
	w.input("F_A_min", "lowest axial load, negative is compression", axial.Low, "N", stated)
	w.input("F_A_max", "highest axial load", axial.High, "N", stated)
	tension := math.Max(axial.High, 0)
	w.relief = w.line("F_PA", "share of the load that relieves the clamp",
		(1-w.loadFactor)*tension, "N", guideline+"R3")
	w.boltShare = w.line("F_SA", "share of the load that the bolt carries",
		w.loadFactor*tension, "N", guideline+"R3")
	w.required = w.line("F_Mreq", "required assembly preload",
		w.residualClamp+w.relief+w.embedding+w.thermalLoss, "N", guideline+"R5")
}
