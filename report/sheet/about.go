package sheet

import (
	"slices"

	"clampback/planner"
)

// writeAbout writes how to read the book, the cautions and the sources.
func (b *book) writeAbout(plans []planner.Plan) error {
	joints := make([]planner.Joint, len(plans))
	for i, p := range plans {
		joints[i] = p.Joint
	}
	stream, err := b.openSheet(aboutSheet, len(plans)+1, page{head: planner.Headings(joints)}, []float64{4, 110})
	if err != nil {
		return err
	}
	w := &writer{stream, 1}
	blocks := []struct {
		heading string
		lines   []string
	}{
		{"How to read this workbook", []string{
			"Register: one row a joint. Its numbers are links to the joint's own sheet.",
			"A joint's sheet: every line of the calculation with symbol, meaning, value, unit and source, from the inputs to the torque and the checks.",
			"Framed cells are inputs and can be changed; the formulas follow. The sheets are protected without a password against slips, not against intent.",
			"The formulas are a second statement of the calculation, independent of the program that planned the joints; the program's own values stand in the cells until the spreadsheet recalculates.",
			"What binds and the assumptions are text, as planned: they do not follow a changed input.",
			"Inputs do not follow each other. What one statement of the register fixes together is changed together by hand: a hole, D_Ki and d_in; an outer diameter, D_A and D_out; the thread and all that was looked up for it; a temperature in the heat and the moduli and strengths at it; a place of load introduction and the cells of its table.",
			"Which bolt of a group and which load case governs was found for the loads as planned: with other loads, plan anew.",
			"A load of another kind (compression, slip, cycles) may need checks that the sheet does not hold: plan the joint anew.",
			"Units: N, mm, MPa, N.m, deg, degC. Torques of the trace are N.m.",
		}},
		{"Cautions", []string{
			caution,
			"A changed input is a new calculation: plan, check and release it before anyone tightens by it.",
			"An infeasible joint has no setting. Do not tighten it by any figure of its sheet.",
		}},
		{"Where the numbers come from", sourcesOf(plans)},
	}
	if err := w.put(cell(b.styles.title, "About this workbook")); err != nil {
		return err
	}
	for _, block := range blocks {
		if err := w.put(); err != nil {
			return err
		}
		if err := w.put(cell(b.styles.bold, block.heading)); err != nil {
			return err
		}
		for _, line := range block.lines {
			if err := w.putLines(linesOf(line, 110), nil, cell(b.styles.wrapped, clean(line))); err != nil {
				return err
			}
		}
	}
	return stream.Flush()
}

// sourcesOf lists every source that the plans cite, in order of the alphabet.
func sourcesOf(plans []planner.Plan) []string {
	seen := map[string]bool{}
	var all []string
	for _, p := range plans {
		for _, l := range p.Trace {
			if !seen[l.Source] {
				seen[l.Source] = true
				all = append(all, l.Source)
			}
		}
	}
	slices.Sort(all)
	return all
}
