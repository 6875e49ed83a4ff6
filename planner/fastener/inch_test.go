package fastener

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/internal/published"
	"clampback/planner/table"
)

const (
	in2 = 25.4 * 25.4
	ksi = 6.894757
)

// ASME B1.1 tensile stress areas, seen in handbooks, to the printed digit; those that
// their own note says are printed from another formula, within its deviation.
func TestStressAreaASMEB11(t *testing.T) {
	for _, row := range published.Rows(t, "unified_stress_area.csv") {
		thread := parse(t, row["thread"])
		want, half := published.Number(t, row, "area_in2")
		if row["note"] != "" {
			half = math.Max(half, 0.01*want)
		}
		assert.InDelta(t, want, thread.StressArea()/in2, half*1.001, "%v", row)
		assert.True(t, thread.Inch)
	}
}

// ASME B1.1 basic sizes of 1/2-13 UNC, in (from memory): pitch diameter 0.4500, minor
// diameter of the internal thread 0.4167, of the external UNR thread 0.4069 (d - 17/12 H,
// printed 0.4069 or 0.4041 by edition).
func TestBasicSizesASMEB11(t *testing.T) {
	thread := parse(t, "1/2-13 UNC")
	assert.InDelta(t, 0.4500, thread.PitchDiameter()/25.4, 5e-5)
	assert.InDelta(t, 0.4167, thread.NutMinorDiameter()/25.4, 5e-5)
	assert.InDelta(t, 0.5-17.0/12*math.Sqrt(3)/2/13, thread.MinorDiameter()/25.4, 5e-5)
}

func TestInchSpellings(t *testing.T) {
	want := parse(t, "1 1/4-8 UN")
	for _, spelling := range []string{"1 1/4-8", "1-1/4-8 UN", "1 1/4-8UN", " 1 1/4-8  UN "} {
		assert.Equal(t, want, parse(t, spelling), spelling)
	}
	assert.Equal(t, parse(t, "#10-32 UNF"), parse(t, "#10-32"))
	assert.Equal(t, "1/2-20 UNF", parse(t, "1/2-20").Designation)
	for _, mixed := range []string{"1/2-13 UNF", "1/2-20 UNC", "1/2-13 UN"} {
		_, err := ParseThread(mixed)
		assert.Error(t, err, mixed)
	}
}

// Strengths as SAE J429, ASTM A193 and ISO 3506-1 print them, ksi and MPa (from memory;
// ISO 3506-1 A2-50 to A2-80 seen, stainless_classes.csv).
func TestStrengthOfGrades(t *testing.T) {
	for _, c := range []struct {
		thread, class          string
		yield, tensile, factor float64
	}{
		{"1/2-13 UNC", "SAE grade 2", 57, 74, ksi},
		{"1-8 UNC", "SAE grade 2", 36, 60, ksi},
		{"3/4-10 UNC", "SAE grade 5", 92, 120, ksi},
		{"1 1/4-7 UNC", "SAE grade 5", 81, 105, ksi},
		{"5/8-18 UNF", "SAE grade 8", 130, 150, ksi},
		{"1-8 UNC", "A193 B7", 105, 125, ksi},
		{"2 3/4-8 UN", "A193 B7", 95, 115, ksi},
		{"M30", "A193 B7", 105, 125, ksi},
		{"3/4-10 UNC", "A193 B8 class 2", 100, 125, ksi},
		{"1 1/2-8 UN", "A193 B8 class 2", 50, 100, ksi},
		{"M12", "A4-80", 600, 800, 1},
		{"3/4-10 UNC", "A2-70", 450, 700, 1},
		{"M20", "A320 L7", 105, 125, ksi},
	} {
		class, err := FindClass(c.class, parse(t, c.thread))
		require.NoError(t, err, "%v", c)
		assert.InDelta(t, c.yield*c.factor, class.YieldStrength, 0.51, "%v", c)
		assert.InDelta(t, c.tensile*c.factor, class.TensileStrength, 0.51, "%v", c)
	}
	for _, row := range published.Rows(t, "stainless_classes.csv") {
		class, err := FindClass(row["class"], parse(t, "M12"))
		require.NoError(t, err)
		assertPrinted(t, row, "Rm_MPa", class.TensileStrength)
		assertPrinted(t, row, "Rp_MPa", class.YieldStrength)
	}
}

// Metric classes and inch grades do not mix; the error names what the thread can have.
func TestClassesKeepToTheirThreads(t *testing.T) {
	for class, thread := range map[string]string{"8.8": "1/2-13 UNC", "SAE grade 5": "M12", "A574": "M12"} {
		_, err := FindClass(class, parse(t, thread))
		var unknown *table.UnknownError
		require.ErrorAs(t, err, &unknown)
		assert.NotContains(t, unknown.Known, class)
		assert.Contains(t, unknown.Known, "A193 B7")
	}
}

// Inch parts: ASME B18.2.1, B18.2.2 (from memory). A nut as high as its thread is wide
// less a tenth, flats 1.5 d and up, a heavy nut 1.5 d + 1/8 in; each fits its thread.
func TestInchParts(t *testing.T) {
	nut, err := FindNut("hexagon", parse(t, "1/2-13 UNC"))
	require.NoError(t, err)
	assert.InDelta(t, 0.427*25.4, nut.Height, 1e-9)
	heavy, err := FindNut("heavy hexagon", parse(t, "1-8 UNC"))
	require.NoError(t, err)
	assert.InDelta(t, 1.625*25.4, heavy.WidthAcrossFlats, 1e-9)
	head, err := FindHead("hexagon", parse(t, "3/4-16 UNF"))
	require.NoError(t, err)
	assert.InDelta(t, 1.125*25.4, head.WidthAcrossFlats, 1e-9)
	assert.InDelta(t, 0.75*2*25.4+6.35, ReferenceThreadLength(head, parse(t, "3/4-16 UNF"), 80), 1e-9, "2 d + 1/4 in")
	assert.InDelta(t, 0.75*2*25.4+12.7, ReferenceThreadLength(head, parse(t, "3/4-16 UNF"), 160), 1e-9, "2 d + 1/2 in")
	for _, kind := range heads().kinds {
		for _, d := range heads().sizes[kind] {
			if isInchSize(d) {
				h := heads().at[entry{kind, d}].coarse
				assert.True(t, d < h.BearingDiameter && h.Height < 1.05*d, "%s %s", kind, nominal(d))
			}
		}
	}
	for _, kind := range nuts().kinds {
		for _, d := range nuts().sizes[kind] {
			if isInchSize(d) {
				n := nuts().at[entry{kind, d}].coarse
				assert.True(t, d < n.BearingDiameter && 0.8*d < n.Height && n.Height < d, "%s %s", kind, nominal(d))
			}
		}
	}
	_, err = FindHead("hexagon", parse(t, "2 1/2-8 UN"))
	assert.ErrorContains(t, err, `no head "hexagon" of size 2 1/2 in: the table has 1/4 in`)
	_, err = FindHead("hexagon flange", parse(t, "1/2-13 UNC"))
	var unknown *table.UnknownError
	require.ErrorAs(t, err, &unknown)
	assert.Equal(t, []string{"hexagon", "socket cap"}, unknown.Known)
}

func TestCautionsOfClasses(t *testing.T) {
	caution := func(class, thread string) string {
		c, err := FindClass(class, parse(t, thread))
		require.NoError(t, err)
		var all string
		for _, k := range c.Cautions() {
			all += k.Text + k.Source
		}
		return all
	}
	assert.Contains(t, caution("12.9", "M12"), "Hydrogen")
	assert.Contains(t, caution("A4-80", "M12"), "seize")
	assert.Empty(t, caution("8.8", "M12"))
}
