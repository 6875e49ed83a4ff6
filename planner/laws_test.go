package planner_test

import (
	"encoding/json"
	"math"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
)

// slack is the relative rounding that a law may lose.
const slack = 1e-9

// The work-back adds up, and every number of the record is finite.
func TestWorkBackAddsUp(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := work(t, drawJoint(t))
		b := p.WorkBack
		require.InEpsilon(t, b.RequiredResidualClamp+b.LoadRelief+b.EmbeddingLoss+b.ClosingLoss+b.ThermalLoss+b.SofteningLoss+
			b.RelaxationLoss, b.RequiredPreload, slack)
		for _, l := range p.Trace {
			require.False(t, math.IsNaN(l.Value) || math.IsInf(l.Value, 0), "%s = %g", l.Symbol, l.Value)
		}
		for _, c := range p.Checks {
			require.False(t, math.IsNaN(c.Value+c.Limit+c.Utilisation) || math.IsInf(c.Utilisation, 0), "%+v", c)
		}
		_, err := json.Marshal(p) // which refuses what is no number
		require.NoError(t, err)
	})
}

// At the window's lower end the lowest residual clamp is the requirement: the
// work-back is the inverse of the way forward.
func TestLowerEndLeavesTheRequirement(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		if j.Tightening.Method != planner.TorqueMethod {
			t.Skip("the window is an angle")
		}
		p := work(t, j)
		lowest := p.Torque.WindowLow * 1000 * (1 - j.Tightening.Tool.Tolerance) / line(t, p, "k_max")
		if j.Tightening.Scatter == planner.GuideScatter {
			lowest = p.Torque.WindowLow * 1000 / line(t, p, "k_min") / j.Tightening.ScatterFactor
		}
		require.InDelta(t, p.WorkBack.RequiredResidualClamp, leastClamp(t, p, j, lowest), slack*lowest)
	})
}

// leastClamp goes the way forward from a preload through every state of service.
func leastClamp(t *rapid.T, p planner.Plan, j planner.Joint, preload float64) float64 {
	b := p.WorkBack
	rest := preload*(1-j.Losses.Relaxation) - b.EmbeddingLoss - b.ClosingLoss
	if b.SofteningLoss == 0 {
		return rest - b.ThermalLoss - b.LoadRelief
	}
	least := math.Inf(1)
	for _, k := range []string{"1", "2"} {
		least = math.Min(least, rest*line(t, p, "q_E_"+k)-math.Max(0, line(t, p, "dF_T_"+k))-b.LoadRelief)
	}
	return least
}

// A setting in the window holds the joint and spares the bolt at every corner
// of friction and tool.
func TestFeasibleMeansEveryCornerHolds(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := work(t, drawJoint(t))
		if !p.Feasible {
			t.Skip("infeasible")
		}
		require.GreaterOrEqual(t, p.ResidualClamp.Lowest, p.WorkBack.RequiredResidualClamp*(1-slack))
		require.LessOrEqual(t, p.Preload.Highest, p.Preload.Limit*(1+slack))
		require.GreaterOrEqual(t, p.Preload.Lowest, p.WorkBack.RequiredPreload*(1-slack))
		for _, c := range p.Checks {
			require.True(t, c.OK, "%s", c.Name)
		}
	})
}

// An infeasible joint is never given a setting, whatever makes it infeasible.
func TestInfeasibleGivesNoSetting(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		if rapid.Bool().Draw(t, "bolt too short") {
			j.Bolt.Length = j.Grip() + 1
		}
		p := work(t, j)
		require.Equal(t, p.Feasible, p.Torque.Target > 0)
		require.Equal(t, p.Feasible, p.Angle.FromSnug > 0)
	})
}

// More friction at the same torque never gives more preload.
func TestMoreFrictionNeverGivesMorePreload(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		j.Tightening.Method, j.Tightening.Scatter, j.Tightening.ScatterFactor = planner.TorqueMethod, planner.RangeScatter, 0
		more := j
		grow := rapid.Float64Range(1, 1.5).Draw(t, "more friction")
		more.Friction.Thread.Low *= grow
		more.Friction.Thread.High *= grow
		more.Friction.Head.Low *= grow
		more.Friction.Head.High *= grow
		before, after := work(t, j), work(t, more)
		for _, k := range []string{"k_min", "k_max", "k_G_min", "k_G_max"} {
			require.GreaterOrEqual(t, line(t, after, k), line(t, before, k)*(1-slack), "torque per clamp force %s", k)
		}
	})
}

// A larger required clamp never gives a lower torque window, and never a
// higher upper end.
func TestMoreClampNeverLowersTheWindow(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		j.Tightening.Method = planner.TorqueMethod
		more := j
		more.Clamp.Residual *= rapid.Float64Range(1, 2).Draw(t, "more clamp")
		before, after := work(t, j), work(t, more)
		require.GreaterOrEqual(t, after.Torque.WindowLow, before.Torque.WindowLow*(1-slack))
		require.InDelta(t, before.Torque.WindowHigh, after.Torque.WindowHigh, slack*before.Torque.WindowHigh)
		if after.Feasible {
			require.True(t, before.Feasible)
		}
	})
}

// A worse tool only narrows the window.
func TestWorseToolNarrowsTheWindow(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		j.Tightening.Method, j.Tightening.Scatter, j.Tightening.ScatterFactor = planner.TorqueMethod, planner.RangeScatter, 0
		worse, tool := j, *j.Tightening.Tool
		tool.Tolerance += rapid.Float64Range(0, 0.2).Draw(t, "worse by")
		worse.Tightening.Tool = &tool
		before, after := work(t, j), work(t, worse)
		require.GreaterOrEqual(t, after.Torque.WindowLow, before.Torque.WindowLow*(1-slack))
		require.LessOrEqual(t, after.Torque.WindowHigh, before.Torque.WindowHigh*(1+slack))
	})
}

// Symbols are unique without case and can be cell names of a spreadsheet.
func TestSymbolsAreCellNames(t *testing.T) {
	name := regexp.MustCompile(`^[A-Za-z][A-Za-z0-9_]*$`)
	reference := regexp.MustCompile(`^([A-Za-z]{1,3}[0-9]+|[RrCc])$`)
	rapid.Check(t, func(t *rapid.T) {
		seen := map[string]bool{}
		for _, l := range work(t, drawJoint(t)).Trace {
			require.Regexp(t, name, l.Symbol)
			require.NotRegexp(t, reference, l.Symbol)
			require.False(t, seen[strings.ToLower(l.Symbol)], "symbol %s twice", l.Symbol)
			seen[strings.ToLower(l.Symbol)] = true
			require.NotEmpty(t, l.Source, l.Symbol)
			require.NotEmpty(t, l.Unit, l.Symbol)
			require.Equal(t, l.Input, l.Rule == "", l.Symbol)
		}
	})
}

// Work changes nothing it was given and gives the same plan again.
func TestWorkIsPure(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		j.Bolt.Shank = nil
		first := work(t, j)
		require.Nil(t, j.Bolt.Shank)
		require.Equal(t, first, work(t, j))
	})
}
