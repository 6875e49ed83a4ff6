package fastener

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/internal/published"
)

// ISO 898-2 prints proof loads to three or four figures: the proof stress on the
// printed stress area gives them to half a percent.
func TestNutProofLoadsISO8982(t *testing.T) {
	checked := 0
	for _, row := range published.Rows(t, "nut_proof_loads.csv") {
		thread := parse(t, row["thread"])
		stress, known := NutProofStress(row["class"], thread)
		require.True(t, known, "%v", row)
		area, _ := published.Number(t, row, "area_mm2")
		load, _ := published.Number(t, row, "load_N")
		assert.InEpsilon(t, load, stress*area, 0.005, "%v", row)
		checked++
	}
	assert.Greater(t, checked, 35)
	for class, size := range map[string]string{"8": "M12x1.25", "10": "M42", "A2-70": "M12", "5": "1/2-13 UNC"} {
		_, known := NutProofStress(class, parse(t, size))
		assert.False(t, known, "%s %s", class, size)
	}
}
