package figure_test

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/stiffness"
	"clampback/report/figure"
	"clampback/report/internal/demo"
)

// drawFatigue draws both fatigue diagrams as on A5 and reads them back.
func drawFatigue(t require.TestingT, d stiffness.FatigueDiagram, say figure.Words) (haigh, smith drawing) {
	box := figure.Box{Width: 64, Height: 61}
	a, b := figure.NewSVG(64, 61), figure.NewSVG(64, 61)
	figure.Haigh(a, d, box, say)
	figure.Smith(b, d, box, say)
	return readBack(t, a.String()), readBack(t, b.String())
}

// thread is an M12 10.9 at 1e5 cycles: by hand, VDI 2230-1 from memory, sigma_A =
// 48.875 * 20^(1/3) = 132.667 MPa, the endurance limit 48.875 MPa, the yield line
// from 807.333 and from 891.125 to 940 MPa.
var thread = planner.CyclicThread{Diameter: 12, Yield: 940, Cycles: 1e5,
	Operating: stiffness.StressPoint{Mean: 500, Amplitude: 40}, Demanded: 1.2}

// corners are the points of a curve of a stroke, in numbers of the axes, without the
// sample in the key.
func corners(read func(figure.Point) (float64, float64), lines []stroke) [][2]float64 {
	const plotBottom = 61 - (3.6+1.4*figure.FatigueRows)*64/24
	var all [][2]float64
	for _, l := range lines {
		if l.from.Y > plotBottom {
			continue
		}
		for _, p := range []figure.Point{l.from, l.to} {
			x, y := read(p)
			all = append(all, [2]float64{x, y})
		}
	}
	return all
}

// Haigh's corners, yield line and operating point, and Smith's upper and lower lines
// lie where the numbers at the axes say. 4 MPa and 0.5 MPa: micrometres of the page
// over the distance of two numbers.
func TestFatigueDiagramsAreToScale(t *testing.T) {
	haigh, smith := drawFatigue(t, thread.Diagram(), english(t))
	near := func(name string, want, got [][2]float64, off float64) {
		require.Len(t, got, len(want), name)
		for i := range want {
			assert.InDelta(t, want[i][0], got[i][0], 1, "%s %d, mean", name, i)
			assert.InDelta(t, want[i][1], got[i][1], off, "%s %d", name, i)
		}
	}
	read := scale(t, haigh)
	near("Haigh, 1e5", [][2]float64{{0, 132.667}, {807.333, 132.667}, {807.333, 132.667}, {940, 0}},
		corners(read, haigh.find(0.5, "")), 0.1)
	near("Haigh, endurance", [][2]float64{{0, 48.875}, {891.125, 48.875}, {891.125, 48.875}, {940, 0}},
		corners(read, haigh.find(0.5, "3 1")), 0.1)
	mean, amplitude := read(haigh.dots[0])
	assert.InDelta(t, 500, mean, 1)
	assert.InDelta(t, 40, amplitude, 0.1)

	read = scale(t, smith)
	near("Smith, 1e5", [][2]float64{{0, 132.667}, {807.333, 940}, {807.333, 940}, {940, 940},
		{0, -132.667}, {807.333, 674.667}, {807.333, 674.667}, {940, 940}}, corners(read, smith.find(0.5, "")), 1)
	var swing []stroke
	for _, l := range smith.find(0.35, "") {
		if x, _ := read(l.from); l.from.X == l.to.X && math.Abs(x-500) < 1 {
			swing = append(swing, l)
		}
	}
	near("Smith, swing", [][2]float64{{500, 460}, {500, 540}}, corners(read, swing), 1)
}

// The key says every number with its symbol and unit.
func TestFatigueKeys(t *testing.T) {
	haigh, smith := drawFatigue(t, thread.Diagram(), english(t))
	for _, want := range []string{"Haigh diagram", "σA = 132.6 MPa at 1e5 cycles", "σA = 48.8 MPa at 2e6 cycles",
		"Rp0.2 = 940 MPa", "σm = 500.0 MPa, σa = 40.0 MPa", "SD = 3.31, at least 1.2"} {
		assert.Contains(t, haigh.words(), want)
	}
	for _, want := range []string{"Smith diagram", "σo = 632.6 MPa, σu = 367.4 MPa at 1e5", "σo = 548.8 MPa, σu = 451.2 MPa at 2e6",
		"Rp0.2 = 940 MPa", "σo = 540.0 MPa, σu = 460.0 MPa"} {
		assert.Contains(t, smith.words(), want)
	}
}

// Whatever the thread and its load, no label overlaps another, is struck through or
// leaves the drawing, and nothing is drawn outside; nothing swinging, over yield and
// under pressure too.
func TestFatigueDiagramsAreTidy(t *testing.T) {
	say := english(t)
	rapid.Check(t, func(t *rapid.T) {
		d := planner.CyclicThread{
			Diameter: rapid.Float64Range(3, 80).Draw(t, "d"), Yield: rapid.Float64Range(100, 1200).Draw(t, "R_p0.2"),
			RolledAfter: rapid.Bool().Draw(t, "after"),
			Cycles:      math.Round(math.Pow(10, rapid.Float64Range(0, 9).Draw(t, "log N"))),
			Operating: stiffness.StressPoint{Mean: rapid.Float64Range(-500, 2000).Draw(t, "mean"),
				Amplitude: math.Max(0, rapid.Float64Range(-100, 1000).Draw(t, "amplitude"))},
			Demanded: rapid.Float64Range(1, 5).Draw(t, "S_D"),
		}.Diagram()
		haigh, smith := drawFatigue(t, d, say)
		assertTidy(t, haigh, 64, 61)
		assertTidy(t, smith, 64, 61)
	})
	for _, d := range []stiffness.FatigueDiagram{{}, planner.CyclicThread{Diameter: 12, Yield: 940}.Diagram()} {
		haigh, smith := drawFatigue(t, d, say)
		assertTidy(t, haigh, 64, 61)
		assertTidy(t, smith, 64, 61)
	}
}

func TestFatigueDiagramsOfDemo(t *testing.T) {
	say := english(t)
	drawn := map[bool]int{}
	for _, p := range demo.Plans(t) {
		if d, ok := planner.FatigueDiagram(p); ok {
			haigh, smith := drawFatigue(t, d, say)
			assertTidy(t, haigh, 64, 61)
			assertTidy(t, smith, 64, 61)
			drawn[d.Spectrum]++
			assert.Equal(t, d.Spectrum, strings.Contains(haigh.words(), "see the damage sum"), p.ID)
		}
	}
	assert.Positive(t, drawn[true], "joints of the demo plant with a load spectrum")
	assert.Greater(t, drawn[false], 6, "joints of the demo plant with a cyclic load")
}

func TestCyclesAreWrittenAsStated(t *testing.T) {
	for n, want := range map[float64]string{1: "1", 500: "500", 1e4: "1e4", 5e5: "5e5", 2e6: "2e6", 1.25e7: "1.25e7", 1e10: "1e10"} {
		assert.Equal(t, want, figure.Cycles(n))
	}
}
