package fastener

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/internal/published"

	"clampback/planner/table"
)

func TestWashersAsPrinted(t *testing.T) {
	for _, row := range published.Rows(t, "washers.csv") {
		washer, err := FindWasher(row["standard"], parse(t, row["thread"]))
		require.NoError(t, err)
		assertPrinted(t, row, "d1_mm", washer.InnerDiameter)
		assertPrinted(t, row, "d2_mm", washer.OuterDiameter)
		assertPrinted(t, row, "h_mm", washer.Thickness)
	}
}

// A washer is wider than the nut's face, and each size larger than the one
// before.
func TestWashersFit(t *testing.T) {
	for _, standard := range washers().kinds {
		last := Washer{}
		for _, d := range metricSizes(washers().sizes[standard]) {
			thread := parse(t, nominal(d))
			washer, err := FindWasher(standard, thread)
			require.NoError(t, err)
			assert.Equal(t, standard, washer.Standard)
			assert.Greater(t, washer.InnerDiameter, math.Max(d, last.InnerDiameter), "%s M%g", standard, d)
			assert.Greater(t, washer.OuterDiameter, last.OuterDiameter, "%s M%g", standard, d)
			assert.GreaterOrEqual(t, washer.Thickness, last.Thickness, "%s M%g", standard, d)
			if nut, err := FindNut("hexagon", thread); err == nil {
				assert.Greater(t, washer.OuterDiameter, nut.BearingDiameter, "%s M%g", standard, d)
			}
			last = washer
		}
	}
}

// Up to M36 the hole of ISO 7089 and ISO 7093-1 is the fine series of ISO 273;
// ISO 7090 is ISO 7089 with a chamfer (from memory).
func TestWashersAgree(t *testing.T) {
	for _, row := range published.Rows(t, "clearance_holes.csv") {
		thread := parse(t, row["thread"])
		for _, standard := range []string{"ISO 7089", "ISO 7093-1"} {
			if thread.Diameter > 36 || thread.Designation == "M7" {
				continue
			}
			washer, err := FindWasher(standard, thread)
			require.NoError(t, err)
			assertPrinted(t, row, "fine_mm", washer.InnerDiameter)
		}
	}
	for _, d := range metricSizes(washers().sizes["ISO 7090"]) {
		plain, err := FindWasher("ISO 7089", parse(t, nominal(d)))
		require.NoError(t, err)
		chamfered, err := FindWasher("ISO 7090", parse(t, nominal(d)))
		require.NoError(t, err)
		plain.Standard, plain.Source = chamfered.Standard, chamfered.Source
		assert.Equal(t, plain, chamfered, "M%g", d)
	}
}

// p_G of a washer is the larger of two figures of VDI 2230-1 Table A9: p_G/R_m of
// quenched and tempered steel times R_m at the least hardness, ISO 18265 Table A.1
// (from memory), and the confirmed p_G of S355, a softer steel.
func TestWasherPressureFromHardness(t *testing.T) {
	quenched := map[string]bool{"Cq 45": true, "34CrNiMo6": true, "16MnCr5": true, "38MnSiVS5-BY": true}
	ratio, softer, seen := math.Inf(1), 0.0, 0
	for _, row := range published.Rows(t, "limiting_pressure.csv") {
		if row["material"] == "S355" {
			require.Equal(t, "yes", row["confirmed"])
			softer, _ = published.Number(t, row, "p_G_MPa")
		}
		if quenched[row["material"]] {
			strength, _ := published.Number(t, row, "Rm_MPa")
			pressure, _ := published.Number(t, row, "p_G_MPa")
			ratio = math.Min(ratio, pressure/strength)
			seen++
		}
	}
	require.Equal(t, len(quenched), seen)
	strengths := map[float64]float64{200: 640, 300: 965}
	for _, r := range table.Read(tables, "washer_grades.csv") {
		assert.Equal(t, strengths[r.Number("hardness_HV")], r.Number("tensile_strength_MPa"), r.Text("name"))
	}
	for _, standard := range washers().kindsAt(parse(t, "M12")) {
		washer, err := FindWasher(standard, parse(t, "M12"))
		require.NoError(t, err)
		assert.Equal(t, math.Max(softer, math.Floor(ratio*strengths[washer.HardnessHV])), washer.LimitingPressure, standard)
		assert.Contains(t, washer.Source, "derived", standard)
	}
}
