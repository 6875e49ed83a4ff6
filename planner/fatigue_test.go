package planner_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/quantity"
)

// VDI 2230-1 R9 (CV1269, CV1270, from memory): sigma_ASG = (2 - F_Sm/F_0.2min) sigma_ASV
// from 0.3 to 1, and the finite-life lines with exponents 3 and 6.
func TestRolledAfterHeatTreatment(t *testing.T) {
	assert.InEpsilon(t, 1.3*planner.EnduranceLimit(12), planner.EnduranceLimitRolledAfter(12, 0.7), 1e-12)
	assert.InEpsilon(t, 1.7*planner.EnduranceLimit(12), planner.EnduranceLimitRolledAfter(12, 0.1), 1e-12)
	assert.InEpsilon(t, planner.EnduranceLimit(12), planner.EnduranceLimitRolledAfter(12, 1.2), 1e-12)

	j := flange(t)
	j.Bolt.RolledAfter = true
	j.Loads.Cycles = 2e6
	p := work(t, j)
	mean := p.Preload.Highest + p.Stiffness.LoadFactor*9500/2
	want := planner.EnduranceLimitRolledAfter(12, mean/(940*line(t, p, "A_0")))
	assert.InEpsilon(t, want, line(t, p, "sigma_lim"), 1e-12)
	j.Loads.Cycles = 2e6 / 64
	assert.InEpsilon(t, 2*want, line(t, work(t, j), "sigma_lim"), 1e-12, "64 to the sixth root is 2")
	j.Bolt.RolledAfter = false
	assert.InEpsilon(t, 4*planner.EnduranceLimit(12), line(t, work(t, j), "sigma_lim"), 1e-12, "64 to the third root is 4")
}

// Palmgren and Miner by hand: no damage below the endurance limit; above it each block
// adds n/N with N = 2e6 (sigma_AS/sigma_a)^3. A block alone at its life gives 1.
func TestSpectrum(t *testing.T) {
	j := flange(t)
	j.Clamp.Residual = 500
	*j.Loads.IntroductionFactor = 1
	spectrum := func(blocks ...planner.Block) planner.Plan {
		j.Loads.Spectrum = blocks
		j.Loads.Axial = quantity.Range{High: 40000}
		return work(t, j)
	}
	low := spectrum(planner.Block{High: 10000, Cycles: 1e9})
	assert.Zero(t, line(t, low, "D_sum"))
	phi, area := low.Stiffness.LoadFactor, line(t, low, "A_S")
	limit := planner.EnduranceLimit(12)
	amplitude := func(load float64) float64 { return phi * load / 2 / area }
	require.Greater(t, amplitude(40000), limit, "the case needs an amplitude above the limit")

	life := func(load float64) float64 { r := limit / amplitude(load); return 2e6 * r * r * r }
	p := spectrum(planner.Block{High: 40000, Cycles: life(40000) / 2}, planner.Block{High: 36000, Cycles: life(36000) / 4})
	assert.InEpsilon(t, 0.75, line(t, p, "D_sum"), 1e-9)
	p = spectrum(planner.Block{High: 40000, Cycles: 1.01 * life(40000)})
	for _, c := range p.Checks {
		if c.Name == "fatigue damage" {
			assert.False(t, c.OK)
		}
	}
	assert.False(t, p.Feasible)
}

// Alexander's factor of dilation (CV1277, CV1278, from memory) on a boss.
func TestDilationOfABoss(t *testing.T) {
	at := func(width float64) float64 {
		j := tapped(t)
		j.Tapped.OuterDiameter = width
		return line(t, work(t, j), "C_1")
	}
	assert.InDelta(t, 0.84, at(18), 1e-9, "s/d = 1.5")
	assert.InDelta(t, 1.00, at(22.8), 1e-9, "s/d = 1.9")
	assert.InDelta(t, 1.00, at(40), 1e-9)
	j := tapped(t)
	wide := work(t, j)
	j.Tapped.OuterDiameter = 18
	assert.InEpsilon(t, 0.84*line(t, wide, "F_strip"), line(t, work(t, j), "F_strip"), 1e-9)
}

// A joint held by friction is checked for what carries the load if it slips: tau_B/R_m
// 0.62 of a 10.9 bolt (VDI 2230-1, from memory) on the stress area 84.3 mm2 of ISO 898-1.
func TestShearAfterSlip(t *testing.T) {
	j := flange(t)
	j.Clamp = planner.Clamp{Transverse: 3000, InterfaceFriction: 0.15, Interfaces: 1}
	j.Safety.Shear = 1.1
	p := work(t, j)
	var names []string
	for _, c := range p.Checks {
		if c.Name == "bolt shear after slip" {
			assert.InDelta(t, 3000/84.3, c.Value, 0.03)
			assert.InEpsilon(t, 0.62*1040/1.1, c.Limit, 1e-9)
		}
		if c.Name == "hole in rail after slip" {
			assert.InEpsilon(t, 3000.0/(12*15), c.Value, 1e-12)
		}
		names = append(names, c.Name)
	}
	assert.Contains(t, names, "bolt shear after slip")
	assert.Contains(t, names, "hole in flange after slip")
}
