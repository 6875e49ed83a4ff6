package planner

import "math"

// losses works out what the preload loses between assembly and service:
// embedding, closing layers and temperature. What grows with the preload itself,
// softening and relaxation, comes with the requirement.
func (w *work) losses() {
	w.embed()
	w.close()
	w.heat()
}

// embed works out the loss by embedding, F_Z: from the guide values, or from a
// measured closing. A joint with a transverse load embeds as in shear, the larger
// guide value.
func (w *work) embed() {
	var total float64
	if settlement := w.joint.Losses.Settlement; settlement > 0 {
		total = settlement * 1000
		w.input("fz_sum", "embedding, measured", total, "um", w.joint.Losses.SettlementSource)
	} else {
		total = w.guideEmbedding()
	}
	w.embedding = w.line("F_Z", "preload lost by embedding",
		total/1000/(w.boltCompliance+w.clampedCompliance), "N", guideline+"R4")
}

// guideEmbedding adds up the guide values, um.
func (w *work) guideEmbedding() float64 {
	load := "axial"
	if w.slips() {
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
	threads := 1.0
	if w.joint.HeadNut != nil {
		threads = 2
		w.input("n_G_thr", "number of engaged threads", threads, "-", "counted")
	}
	w.input("n_B", "number of bearing faces", float64(faces), "-", "counted")
	w.input("n_I", "number of inner interfaces", float64(inner), "-", "counted")
	total := threads*guide.thread + float64(faces)*guide.bearingFace + float64(inner)*guide.innerInterface
	return w.line("fz_sum", "embedding", total, "um", guideline+"Table 5")
}

// close works out the loss by layers that get thinner in service: gasket, paint,
// coating, F_L.
func (w *work) close() {
	layers := w.joint.Losses.Layers
	if len(layers) == 0 {
		return
	}
	var total float64
	for i, l := range layers {
		w.inputAt(i+1, "fz_L", "closing of "+l.Name, l.Amount*1000, "um", l.Source)
		total += l.Amount
	}
	w.closing = w.line("F_L", "preload lost by closing layers", total/(w.boltCompliance+w.clampedCompliance), "N",
		guideline+"R4")
}

// requirement sums up the preload that assembly must give at least, F_Mreq,
// and the share of the load that the bolt gets. The load may be absent, so a
// load that is always compressive relieves nothing.
func (w *work) requirement() {
	w.relief = w.line("F_PA", "share of the load that relieves the clamp",
		(1-w.loadFactor)*math.Max(w.axial.clamp, 0), "N", guideline+"R3")
	share := math.Max(0, w.loadFactor*math.Max(w.axial.high, 0))
	if e := w.joint.Eccentric; e != nil {
		share += math.Max(0, w.momentFactor*e.MomentHigh)
	}
	w.boltShare = w.line("F_SA", "share of the load that the bolt carries", share, "N", guideline+"R3")
	w.soften()
	w.relax()
	w.required = w.line("F_Mreq", "required assembly preload", w.beforeRelaxation()+w.relaxation, "N", guideline+"R5")
}

// soften works out what the fall of the moduli takes at the required preload: the
// bolt and the parts give more in the heat, so a share of the preload is lost.
func (w *work) soften() {
	if len(w.hot) == 0 {
		return
	}
	cold := w.residualClamp + w.relief + w.thermalLoss
	most := cold
	for k, s := range w.hot {
		need := w.lineAt(k+1, "F_hot", "clamp force to set out from, "+s.name,
			(w.residualClamp+w.relief+math.Max(0, s.loss))/s.rest, "N", guideline+"R4")
		most = math.Max(most, need)
	}
	w.softening = w.line("F_soft", "preload lost by the fall of the moduli", most-cold, "N", guideline+"R4")
}

// relax works out what relaxation takes, a stated share of the preload.
func (w *work) relax() {
	share := w.joint.Losses.Relaxation
	if share == 0 {
		return
	}
	w.input("rho_rel", "share of the preload lost over time", share, "-", w.joint.Losses.RelaxationSource)
	w.relaxation = w.line("F_rel", "preload lost by relaxation", share/(1-share)*w.beforeRelaxation(), "N", arithmetic)
}

func (w *work) beforeRelaxation() float64 {
	return w.residualClamp + w.relief + w.embedding + w.closing + w.thermalLoss + w.softening
}

// leastClamp returns the clamp force that a preload leaves in the worst state of
// service, with the load on. N.
func (w *work) leastClamp(preload float64) float64 {
	rest := preload*(1-w.joint.Losses.Relaxation) - w.embedding - w.closing
	if len(w.hot) == 0 {
		return w.line("F_KR_min", lowestClampMeaning, rest-w.thermalLoss-w.relief, "N", guideline+"R12")
	}
	least := rest - w.relief // still at the temperature of assembly
	for k, s := range w.hot {
		left := w.lineAt(k+1, "F_KR_T", "lowest residual clamp force, "+s.name,
			rest*s.rest-math.Max(0, s.loss)-w.relief, "N", guideline+"R12")
		least = math.Min(least, left)
	}
	return w.lineBy("F_KR_min.state", "F_KR_min", lowestClampMeaning, least, "N", guideline+"R12")
}

const lowestClampMeaning = "lowest residual clamp force in service"
