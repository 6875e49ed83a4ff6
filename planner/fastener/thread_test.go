package fastener

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/internal/published"
	"clampback/planner/table"
)

// metricSizes are the sizes of metric threads up to M64 among them, mm.
func metricSizes(sizes []float64) []float64 {
	var metric []float64
	for _, d := range sizes {
		if !isInchSize(d) && d <= 64 {
			metric = append(metric, d)
		}
	}
	return metric
}

// parse reads a designation that the table must have.
func parse(t testing.TB, designation string) Thread {
	t.Helper()
	thread, err := ParseThread(designation)
	require.NoError(t, err)
	return thread
}

// assertPrinted compares a tabled value with the print it is copied from:
// exactly, for both are read from decimals.
func assertPrinted(t testing.TB, row map[string]string, column string, got float64) {
	t.Helper()
	want, _ := published.Number(t, row, column)
	assert.Equal(t, want, got, "%s of %v", column, row)
}

// ISO 724, printed to the micrometre: the rounded diameters are exact.
func TestThreadGeometryISO724(t *testing.T) {
	for _, row := range published.Rows(t, "thread_geometry.csv") {
		thread := parse(t, row["thread"])
		d2, _ := published.Number(t, row, "d2_mm")
		d3, _ := published.Number(t, row, "d3_mm")
		d1, _ := published.Number(t, row, "D1_mm")
		assertPrinted(t, row, "pitch_mm", thread.Pitch)
		assert.InDelta(t, d2, thread.PitchDiameter(), 1e-9, "d2 of %s", row["thread"])
		assert.InDelta(t, d3, thread.MinorDiameter(), 1e-9, "d3 of %s", row["thread"])
		assert.InDelta(t, d1, thread.NutMinorDiameter(), 1e-9, "D1 of %s", row["thread"])
	}
}

// ISO 898-1 prints A_s,nom to three figures, GB/T 16823.1 to two decimals, both
// from diameters that are not rounded. Ours are, to 0.5 um, which moves the area
// by up to pi/2 d0 0.0005 mm: M24 is 352.490 here and 352.504, printed 353, there.
func TestStressAreaISO898(t *testing.T) {
	for _, row := range published.Rows(t, "stress_area.csv") {
		thread := parse(t, row["thread"])
		want, half := published.Number(t, row, "area_mm2")
		if row["thread"] == "M39x3" {
			half = 5 // 1030 has three figures
		}
		rounding := math.Pi / 2 * thread.StressDiameter() * 0.0005
		assert.InDelta(t, want, thread.StressArea(), half+rounding, "%v", row)
		if row["pitch_mm"] != "" {
			assertPrinted(t, row, "pitch_mm", thread.Pitch)
		}
	}
}

// The areas and the stress diameter are the ones their definitions name.
func TestThreadAreas(t *testing.T) {
	m10 := parse(t, "M10")
	assert.InDelta(t, 78.5398, m10.NominalArea(), 1e-4, "pi/4 10^2")
	assert.InDelta(t, 8.593, m10.StressDiameter(), 1e-9, "(9.026 + 8.160)/2 of ISO 724")
	assert.InDelta(t, 52.2962, m10.MinorArea(), 1e-4, "pi/4 8.160^2; ISO 724")
}

// ISO 261: 27 sizes from M3 to M64, each with one coarse pitch and below it fine
// pitches of one common series (from memory).
func TestThreadTable(t *testing.T) {
	finePitches := []float64{0.35, 0.5, 0.75, 1, 1.25, 1.5, 2, 3, 4}
	coarse := map[float64]float64{}
	for _, name := range threads().names {
		thread := parse(t, name)
		if thread.Inch || thread.Diameter > 64 {
			continue
		}
		if thread.Coarse {
			coarse[thread.Diameter] = thread.Pitch
			assert.NotContains(t, thread.Designation, "x")
			continue
		}
		require.Contains(t, coarse, thread.Diameter, "coarse thread stands first")
		assert.Contains(t, finePitches, thread.Pitch, name)
		assert.Less(t, thread.Pitch, coarse[thread.Diameter], name)
	}
	assert.Len(t, coarse, 27)
}

func TestParseThreadSpellings(t *testing.T) {
	want := Thread{Designation: "M12x1.25", Diameter: 12, Pitch: 1.25}
	for _, spelling := range []string{"M12x1.25", "M12X1.25", "M12×1.25", "M12 x 1.25", "  M12x1.25 ", "M12 ×1.25"} {
		got, err := ParseThread(spelling)
		require.NoError(t, err, spelling)
		assert.Equal(t, want, got, spelling)
	}
	written, err := ParseThread("M12x1.75")
	require.NoError(t, err)
	assert.Equal(t, parse(t, "M12"), written, "the coarse pitch written out is the coarse thread")
}

func TestParseThreadRefuses(t *testing.T) {
	for _, bad := range []string{"", "M", "m12", "12", "M11", "M12.0", "M012", "1/2-14 UNC", "1/2", "#10", "M 12", "M1e1", "x",
		"Mx1", "M2", "M65", "M\x00"} {
		_, err := ParseThread(bad)
		var unknown *table.UnknownError
		require.ErrorAs(t, err, &unknown, "%q", bad)
		assert.Equal(t, "thread", unknown.Kind)
		assert.Equal(t, bad, unknown.Name)
		assert.Equal(t, "M3", unknown.Known[0])
	}
	for bad, mend := range map[string]string{
		"M12x1.3":   `thread M12 has no pitch "1.3": ISO 261 has 1.75 (coarse), 1.5, 1.25, 1`,
		"M8x":       `thread M8 has no pitch "": ISO 261 has 1.25 (coarse), 1, 0.75`,
		"M10x1,25":  `thread M10 has no pitch "1,25": ISO 261 has 1.5 (coarse), 1.25, 1, 0.75`,
		"M10x1x1":   `thread M10 has no pitch "1x1": ISO 261 has 1.5 (coarse), 1.25, 1, 0.75`,
		"M5 x 0.50": `thread M5 has no pitch "0.50": ISO 261 has 0.8 (coarse), 0.5`,
	} {
		_, err := ParseThread(bad)
		assert.EqualError(t, err, mend)
	}
}

// Whatever is written, a thread that comes back is one of the table and reads
// back to itself, with the order of diameters of ISO 68-1.
func FuzzParseThread(f *testing.F) {
	for _, seed := range []string{"M12", "M12x1.25", "M12 × 1.25", "M12x1.75", "M64X4", "M12x", "x", "M",
		"1/2-13 UNC", "M\xff", "M12x1,25"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, designation string) {
		got, err := ParseThread(designation)
		if err != nil {
			if got != (Thread{}) {
				t.Fatalf("%q: error %v with thread %v", designation, err, got)
			}
			return
		}
		again, err := ParseThread(got.Designation)
		if err != nil || again != got {
			t.Fatalf("%q gave %v, which reads back as %v, %v", designation, got, again, err)
		}
		d3, d1, d2 := got.MinorDiameter(), got.NutMinorDiameter(), got.PitchDiameter()
		if !(0 < d3 && d3 < d1 && d1 < d2 && d2 < got.Diameter) {
			t.Fatalf("%v: d3 %v, D1 %v, d2 %v", got, d3, d1, d2)
		}
	})
}

// Stress areas of the large sizes with a pitch of 6 mm, as handbooks print them, mm2
// (from memory, after DIN 13-28): three figures.
func TestStressAreaOfLargeSizes(t *testing.T) {
	for designation, area := range map[string]float64{
		"M68": 3060, "M72": 3460, "M72x6": 3460, "M76": 3890, "M80x6": 4340, "M90": 5590, "M100": 6990,
	} {
		assert.InEpsilon(t, area, parse(t, designation).StressArea(), 0.002, designation)
	}
}
