package planner_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/group"
	"clampback/planner/internal/published"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// grouped is the plain flange as a group of 8 on a circle under load cases.
func grouped(t require.TestingT, loads ...group.Load) planner.Joint {
	j := flange(t)
	j.Pattern = pattern.NewCircle(8, 180)
	shares, err := group.Distribute(j.Pattern.Points, loads)
	require.NoError(t, err)
	j.Group, j.GroupLoads = shares, loads
	j.Loads.Axial = quantity.Range{}
	j.Clamp = planner.Clamp{Residual: 2000, InterfaceFriction: 0.2, Interfaces: 1}
	return j
}

// Whatever the load cases, the preload that the plan demands is the largest that any
// bolt in any case would demand by itself, and so are the loads of the other checks.
func TestNoBoltOfAGroupNeedsMore(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var loads []group.Load
		for _, name := range []string{"a", "b", "c"} {
			v := func(what string, most float64) group.Vector {
				f := func(axis string) float64 { return rapid.Float64Range(-most, most).Draw(t, name+what+axis) }
				return group.Vector{X: f("x"), Y: f("y"), Z: f("z")}
			}
			loads = append(loads, group.Load{Name: name, Force: v("force", 20000), Moment: v("moment", 1e6), At: v("at", 200)})
		}
		j := grouped(t, loads...)
		j.Loads.Cycles = rapid.SampledFrom([]float64{0, 2e6}).Draw(t, "cycles")
		p := work(t, j)
		var need, high, low, across float64
		for _, s := range j.Group {
			single := j
			single.Group, single.GroupLoads = nil, nil
			single.Loads.Axial = quantity.Single(s.Axial)
			single.Clamp.Transverse = math.Hypot(s.X, s.Y)
			need = math.Max(need, work(t, single).WorkBack.RequiredPreload)
			high, low = math.Max(high, s.Axial), math.Min(low, s.Axial)
			across = math.Max(across, single.Clamp.Transverse)
		}
		require.InEpsilon(t, need, p.WorkBack.RequiredPreload, 1e-9)
		require.InDelta(t, high, math.Max(0, line(t, p, "F_A_max")), 1e-6)
		require.InDelta(t, low, line(t, p, "F_A_min"), 1e-6)
		require.InDelta(t, across, line(t, p, "F_Q_max"), 1e-6)
		require.InDelta(t, widestSwing(j), line(t, p, "F_A_o")-line(t, p, "F_A_u"), 1e-6)
		require.NotEmpty(t, p.Governing)
	})
}

// widestSwing is the largest range of one bolt over its load cases and no load.
func widestSwing(j planner.Joint) float64 {
	var widest float64
	for bolt := 1; bolt <= j.Count; bolt++ {
		var high, low float64
		for _, s := range j.Group {
			if s.Bolt == bolt {
				high, low = math.Max(high, s.Axial), math.Min(low, s.Axial)
			}
		}
		widest = math.Max(widest, high-low)
	}
	return widest
}

// A textbook bolt circle under a moment: the bolt furthest out gets 4 M/(n D), and the
// plan names it and its load case.
func TestGoverningBoltIsNamed(t *testing.T) {
	j := grouped(t, group.Load{Name: "idle", Force: group.Vector{Z: 8000}},
		group.Load{Name: "tilt", Moment: group.Vector{Y: -900e3}})
	p := work(t, j)
	assert.InEpsilon(t, 4*900e3/(8*180), line(t, p, "F_A_max"), 1e-12)
	require.Equal(t, "required preload", p.Governing[0].For)
	assert.Equal(t, "tilt", p.Governing[0].Case)
	at := j.Pattern.Points[p.Governing[0].Bolt-1]
	assert.InDelta(t, 90, at.X, 1e-9, "the bolt at the far side")
}

// VDI 2230-1 Table 2 as collected (from memory): every cell is met, and between cells
// the factor lies between theirs. Unknown cells are refused.
func TestIntroductionTable(t *testing.T) {
	for _, row := range published.Rows(t, "load_introduction.csv") {
		for _, kind := range []string{"SV1", "SV2", "SV3", "SV4", "SV5", "SV6"} {
			j := flange(t)
			j.Loads.IntroductionFactor = nil
			lead, arm, n := number(t, row, "l_A_h"), number(t, row, "a_k_h"), number(t, row, kind)
			j.Loads.Introduction = &planner.Introduction{Type: kind, Height: 100, Lead: 100 * lead, Arm: 100 * arm}
			assert.InDelta(t, n, line(t, work(t, j), "n"), 1e-12, "%v %s", row, kind)
		}
	}
	j := flange(t)
	j.Loads.IntroductionFactor = nil
	j.Loads.Introduction = &planner.Introduction{Type: "SV1", Height: 100, Lead: 5, Arm: 5}
	assert.InDelta(t, (0.70+0.55+0.52+0.41)/4, line(t, work(t, j), "n"), 1e-12, "the middle of four cells")
	j.Loads.Introduction.Lead, j.Loads.Introduction.Arm = 20, 50
	faults := j.Faults()
	require.Len(t, faults, 1)
	assert.Contains(t, faults[0].Message, "the table has no factor for l_A/h 0.2 with a_k/h 0.5")
	j.Loads.Introduction.Lead, j.Loads.Introduction.Arm = 500, 0
	assert.InDelta(t, 0.16, line(t, work(t, j), "n"), 1e-12, "beyond the table its last row")
}
