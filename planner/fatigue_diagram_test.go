package planner_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/internal/published"
	"clampback/planner/stiffness"
)

// Worked by hand with VDI 2230-1 (formulas from memory): an M12, sigma_ASV =
// 0.85 (150/12 + 45) = 48.875 MPa, of class 10.9, R_p0.2 = 940 MPa; of class 4.6,
// 240 MPa, where the limit at 1e4 cycles, 48.875 * 200^(1/3) = 285.83, is over yield.
func TestFatigueLimitsByHand(t *testing.T) {
	for _, c := range []struct {
		name      string
		yield     float64
		after     bool
		cycles    float64
		curve     []stiffness.StressPoint
		mean      float64
		amplitude float64
		limit     float64
		safety    float64
	}{
		{"before, endurance", 940, false, 2e6,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 48.875}, {Mean: 891.125, Amplitude: 48.875}, {Mean: 940, Amplitude: 0}},
			700, 10, 48.875, 4.8875},
		{"before, more cycles than the endurance limit needs", 940, false, 1e9,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 48.875}, {Mean: 891.125, Amplitude: 48.875}, {Mean: 940, Amplitude: 0}},
			910, 10, 30, 3},
		{"before, 1e5 cycles: times 20^(1/3) = 2.71442", 940, false, 1e5,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 132.667}, {Mean: 807.333, Amplitude: 132.667}, {Mean: 940, Amplitude: 0}},
			0, 0, 132.667, 0},
		{"after, endurance: 1.7 times at 0.3", 940, true, 2e6,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 83.0875}, {Mean: 282, Amplitude: 83.0875}, {Mean: 888.4443, Amplitude: 51.5557},
				{Mean: 940, Amplitude: 0}},
			470, 20, 73.3125, 3.665625},
		{"after, 1e5 cycles: times 20^(1/6) = 1.64755", 940, true, 1e5,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 136.8907}, {Mean: 282, Amplitude: 136.8907}, {Mean: 851.9318, Amplitude: 88.0682},
				{Mean: 940, Amplitude: 0}},
			1000, 20, 0, 0},
		{"over yield at any mean stress", 240, false, 1e4,
			[]stiffness.StressPoint{{Mean: 0, Amplitude: 240}, {Mean: 240, Amplitude: 0}}, 60, 90, 180, 2},
	} {
		d := planner.CyclicThread{Diameter: 12, Yield: c.yield, RolledAfter: c.after, Cycles: c.cycles,
			Operating: stiffness.StressPoint{Mean: c.mean, Amplitude: c.amplitude}}.Diagram()
		require.Len(t, d.Curve, len(c.curve), c.name)
		for i, p := range c.curve {
			assert.InDelta(t, p.Mean, d.Curve[i].Mean, 5e-4, "%s, %d", c.name, i)
			assert.InDelta(t, p.Amplitude, d.Curve[i].Amplitude, 5e-4, "%s, %d", c.name, i)
		}
		assert.InDelta(t, c.limit, d.Limit, 5e-4, c.name)
		assert.InDelta(t, c.safety, d.Safety, 1e-6, c.name)
		assert.Equal(t, c.cycles >= 2e6, d.Endures(), c.name)
	}
}

// The level of the diagram is the table of fatigue limits (VDI 2230-1, from memory).
func TestFatigueDiagramHoldsTheTable(t *testing.T) {
	for _, row := range published.Rows(t, "fatigue.csv") {
		d := planner.CyclicThread{Diameter: number(t, row, "d_mm"), Yield: 940}.Diagram()
		printed, half := published.Number(t, row, "sigma_ASV_MPa")
		assert.InDelta(t, printed, d.Endurance[0].Amplitude, half*1.0001, row["id"])
	}
}

// No limit passes the yield line or rises with the mean stress; fewer cycles and
// rolling after heat treatment never lower it; the endurance limit is the least.
func TestLawsOfFatigueLimits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		thread := planner.CyclicThread{
			Diameter: rapid.Float64Range(4, 39).Draw(t, "d"), Yield: rapid.Float64Range(190, 1100).Draw(t, "R_p0.2"),
			RolledAfter: rapid.Bool().Draw(t, "after"), Cycles: math.Pow(10, rapid.Float64Range(3, 8).Draw(t, "log N")),
			Operating: stiffness.StressPoint{Mean: rapid.Float64Range(0, 1200).Draw(t, "mean"), Amplitude: 1},
		}
		d := thread.Diagram()
		for _, curve := range [][]stiffness.StressPoint{d.Curve, d.Endurance} {
			for i, p := range curve {
				require.LessOrEqual(t, p.Upper(), thread.Yield+1e-9)
				require.GreaterOrEqual(t, p.Amplitude, 0.0)
				if i > 0 {
					require.Greater(t, p.Mean, curve[i-1].Mean)
					require.LessOrEqual(t, p.Amplitude, curve[i-1].Amplitude+1e-9)
				}
			}
			require.Equal(t, stiffness.StressPoint{Mean: thread.Yield}, curve[len(curve)-1])
		}
		more, other, endured := thread, thread, thread
		more.Cycles *= 2
		require.LessOrEqual(t, more.Diagram().Limit, d.Limit+1e-9)
		endured.Cycles = 2e6
		require.InDelta(t, endured.Diagram().Limit, d.LeastLimit, 1e-9)
		require.LessOrEqual(t, d.LeastLimit, d.Limit+1e-9)
		if thread.Cycles >= 2e6 {
			other.RolledAfter = true
			require.GreaterOrEqual(t, other.Diagram().Limit, d.Limit-1e-9)
		}
	})
}

// A bolt that is waisted to 0.8 of the stress area yields at 752 MPa of mean stress:
// the fall of the limit is over that (by hand: 2 - 376/752 = 1.5 times 48.875 MPa at
// 376 MPa), and ends there.
func TestFatigueLimitOfAWaistedBolt(t *testing.T) {
	thread := planner.CyclicThread{Diameter: 12, Yield: 940, Yielding: 752, RolledAfter: true,
		Operating: stiffness.StressPoint{Mean: 376, Amplitude: 10}}
	assert.InDelta(t, 73.3125, thread.Diagram().Limit, 1e-9)
	thread.Operating.Mean = 800
	assert.InDelta(t, 48.875, thread.Diagram().Limit, 1e-9)
}

// The diagram of a plan has the operating point and the limits of the plan's own check,
// where the yield line does not cut them; a static joint has none.
func TestFatigueDiagramOfPlan(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		j.Bolt.RolledAfter = rapid.Bool().Draw(t, "rolled after")
		p := work(t, j)
		d, ok := planner.FatigueDiagram(p)
		require.Equal(t, p.Fatigue != nil, ok)
		if !ok {
			return
		}
		require.Equal(t, j.Loads.Cycles == 0, d.Spectrum)
		require.InEpsilon(t, line(t, p, "sigma_a")+1, d.Operating.Amplitude+1, 1e-9)
		axial := j.Loads.Axial
		mean := (p.Preload.Highest + p.Stiffness.LoadFactor*axial.Middle()) / line(t, p, "A_S")
		require.InDelta(t, mean, d.Operating.Mean, 1e-9*math.Abs(mean)+1e-9)
		for limit, got := range map[float64]float64{line(t, p, "sigma_lim"): d.Limit, line(t, p, "sigma_AS"): d.LeastLimit} {
			if d.Operating.Mean+limit <= d.Yield {
				require.InEpsilon(t, limit, got, 1e-9)
			} else {
				require.InDelta(t, math.Max(0, d.Yield-d.Operating.Mean), got, 1e-6)
			}
		}
	})
}
