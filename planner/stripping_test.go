package planner

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/fastener"
	"clampback/planner/internal/published"
)

// Shear areas of threads 6H/6g over 1 d of engagement, a handbook of bolted
// joints, 4th edition: with the handbook's limits of size to the printed
// digits, with ours from the formulas of ISO 965-1 to 1.5 %.
func TestThreadShearAreaHandbook(t *testing.T) {
	for _, row := range published.Rows(t, "thread_shear_area.csv") {
		size, _, _ := strings.Cut(row["thread"], "x")
		th, err := fastener.ParseThread(size)
		require.NoError(t, err)
		external, _ := published.Number(t, row, "external_min_mm")
		internal, _ := published.Number(t, row, "internal_max_mm")
		area, half := published.Number(t, row, "area_mm2")
		l := limitsOf(th)
		printed := tappedThreadArea(external, internal, th.Pitch)
		ours := tappedThreadArea(l.boltMajorMin, l.nutPitchMax, th.Pitch)
		if row["which"] == "bolt" {
			printed = boltThreadArea(external, internal, th.Pitch)
			ours = boltThreadArea(l.boltPitchMin, l.nutMinorMax, th.Pitch)
		}
		assert.InDelta(t, area, printed*th.Diameter, 2*half, "%s with printed limits", row["id"])
		assert.InEpsilon(t, area, ours*th.Diameter, 0.015, "%s with computed limits", row["id"])
	}
}

// Limits of size that ASME B1.1 prints, in (from memory): classes 2A and 2B.
func TestInchLimitsASMEB11(t *testing.T) {
	for _, c := range []struct {
		thread                                 string
		major, pitch, pitchInside, minorInside float64
	}{
		{"1/2-13 UNC", 0.4876, 0.4435, 0.4565, 0.434},
		{"1/4-20 UNC", 0.2408, 0.2127, 0.2224, 0.207},
		{"3/4-10 UNC", 0.7353, 0.6773, 0.6927, 0.663},
		{"1-8 UNC", 0.9830, 0.9100, 0.9276, 0.890},
		{"1/2-20 UNF", 0.4906, 0.4619, 0.4731, 0.457},
	} {
		th, err := fastener.ParseThread(c.thread)
		require.NoError(t, err)
		l := limitsOf(th)
		assert.InDelta(t, c.major, l.boltMajorMin/25.4, 2e-4, c.thread)
		assert.InDelta(t, c.pitch, l.boltPitchMin/25.4, 2e-4, c.thread)
		assert.InDelta(t, c.pitchInside, l.nutPitchMax/25.4, 2e-4, c.thread)
		assert.InDelta(t, c.minorInside, l.nutMinorMax/25.4, 1e-3, c.thread)
	}
}

// Alexander's bending factors at the ends of their polynomials, VDI 2230-1
// (from memory, ids CV1274 to CV1276).
func TestBendingFactors(t *testing.T) {
	assert.InDelta(t, 1.055, tappedBending(0.4), 0.0005)
	assert.InDelta(t, 0.897, tappedBending(0.99999), 0.0005)
	assert.InDelta(t, 0.897, boltBending(1.00001), 0.0005)
	assert.Equal(t, tappedBending(0.4), tappedBending(0.1), "no more than at the end of the polynomial")
	assert.Equal(t, boltBending(2.2), boltBending(5))
}

// Engagement in grey iron and structural steel: trial values of a manufacturer
// for M6 to M16 (ids CV1295 to CV1305, seen in a reprint) need 0.9 to 1.25 d for
// 8.8 and 10.9. The model, at least material, needs 0.8 to 2 times that.
func TestEngagementAgainstTrials(t *testing.T) {
	trials := []struct {
		id, class string
		tensile   float64 // R_m of the tapped part, MPa
		ratio     float64 // tau_B/R_m
		printed   float64 // engagement over d
	}{
		{"CV1295", "8.8", 360, 0.6, 1.0}, {"CV1296", "10.9", 360, 0.6, 1.25},
		{"CV1298", "8.8", 500, 0.6, 0.9}, {"CV1299", "10.9", 500, 0.6, 1.0},
		{"CV1301", "8.8", 800, 0.62, 0.8}, {"CV1302", "10.9", 800, 0.62, 0.9},
	}
	for _, c := range trials {
		for _, size := range []string{"M6", "M10", "M16"} {
			th, err := fastener.ParseThread(size)
			assert.NoError(t, err)
			class, err := fastener.FindClass(c.class, th)
			assert.NoError(t, err)
			l := limitsOf(th)
			tapped := tappedThreadArea(l.boltMajorMin, l.nutPitchMax, th.Pitch) * c.tensile * c.ratio
			bolt := boltThreadArea(l.boltPitchMin, l.nutMinorMax, th.Pitch) * class.ShearRatio * class.TensileStrength
			ratio := tapped / bolt
			perLength := min(tappedBending(ratio)*tapped, boltBending(ratio)*bolt)
			needed := (class.TensileStrength*th.StressArea()/perLength + 0.8*th.Pitch) / th.Diameter
			assert.Greater(t, needed, c.printed*0.8, "%s %s", c.id, size)
			assert.Less(t, needed, c.printed*2, "%s %s", c.id, size)
		}
	}
}
