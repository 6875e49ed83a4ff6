package planner_test

import (
	"fmt"
	"os"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/group"
	"clampback/planner/quantity"
)

// A joint that is impossible is an error with every fault; one that is merely
// infeasible is a plan that says why.
func TestImpossibleIsAnErrorInfeasibleAPlan(t *testing.T) {
	j := flange(t)
	j.Parts[0].Hole, j.Parts[1].Thickness = 11, 0
	_, err := planner.Work(j)
	var faults *planner.FaultsError
	require.ErrorAs(t, err, &faults)
	assert.Len(t, faults.Faults, 2)
	assert.EqualError(t, err, "joint J-1: clamped[0].hole: the hole of 11 mm is smaller than the thread of 12 mm; "+
		"clamped[1].thickness: the thickness is 0 mm; it must be above 0")

	j = flange(t)
	j.Clamp.Residual = 60000
	p := work(t, j)
	assert.False(t, p.Feasible)
	assert.Zero(t, p.Torque.Target)
	require.NotEmpty(t, p.Binds)
	assert.Contains(t, p.Binds[0], "no window")
	assert.Greater(t, p.Torque.WindowLow, p.Torque.WindowHigh)
}

// With the guide's factor the joint is feasible just when alpha_A F_Mreq does not
// exceed F_lim: the guideline's own condition, VDI 2230-1:2015 R6 and R7.
func TestGuideScatterIsTheGuidelinesCondition(t *testing.T) {
	for _, factor := range []float64{1.1, 1.6, 2, 2.5, 3, 4} {
		j := flange(t)
		j.Tightening.Tool = nil
		j.Tightening.Scatter, j.Tightening.ScatterFactor = planner.GuideScatter, factor
		j.Tightening.Step = 1 // N.mm, so that rounding decides nothing
		p := work(t, j)
		assert.Equal(t, factor*p.WorkBack.RequiredPreload <= p.Preload.Limit, p.Feasible, "alpha_A %g", factor)
		if p.Feasible {
			assert.InEpsilon(t, factor, p.Preload.ScatterFactor, 1e-12)
		}
	}
}

// A supplier's worked example after VDI 2230 (CV1171, seen): F_M,max = 41.9 kN of
// an M12 8.8 at mu 0.14 and alpha_A = 1.8 leave F_M,min = 23.3 kN.
func TestLowestPreloadOfAWorkedExample(t *testing.T) {
	th := flange(t).Bolt.Thread
	highest := planner.YieldPreload(th.Pitch, th.PitchDiameter(), th.StressDiameter(), 0.14, 0.9, 640)
	assert.InDelta(t, 41900, highest, 50)
	assert.InDelta(t, 23300, highest/1.8, 50)
}

// The working stress is the guideline's equation R8 turned round: at the limit
// it gives the yield strength back.
func TestWorkingStressAtItsLimit(t *testing.T) {
	j := flange(t)
	j.Tightening.Utilisation = 1 // so that service binds, not assembly
	j.Loads.Axial = quantity.Range{High: 60000}
	p := work(t, j)
	force, added, ratio := line(t, p, "F_work"), line(t, p, "F_add"), line(t, p, "r_T")
	area := line(t, p, "A_0")
	tension, torsion := (force+added)/area, 0.5*ratio*4/3*force/area // elastic section modulus in service
	assert.InEpsilon(t, 940*940, tension*tension+3*torsion*torsion, 1e-12)
}

// A load that is always compressive relieves nothing: it may be absent. It takes
// from the bolt what the load factor says.
func TestCompression(t *testing.T) {
	j := flange(t)
	j.Loads.Axial = quantity.Range{Low: -20000, High: -5000}
	p := work(t, j)
	assert.Zero(t, p.WorkBack.LoadRelief)
	taken := p.WorkBack.EmbeddingLoss + p.Stiffness.LoadFactor*20000
	assert.InEpsilon(t, taken, line(t, p, "F_taken"), 1e-12)
	assert.InEpsilon(t, p.Preload.Highest-p.WorkBack.EmbeddingLoss+(1-p.Stiffness.LoadFactor)*20000,
		p.ResidualClamp.Highest, 1e-12)
}

// Only a loss by temperature raises the requirement; a gain raises the highest
// bolt force. The bolt of steel grows 11.5e-6/K, grey iron 10e-6/K.
func TestTemperature(t *testing.T) {
	at := func(service float64) planner.Plan {
		j := flange(t)
		j.Parts[0].Material.Expansion, j.Parts[1].Material.Expansion = 10e-6, 10e-6 // grey iron
		j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Single(service)}
		return work(t, j)
	}
	hot, cold, same := at(100), at(-60), at(20)
	assert.Zero(t, same.WorkBack.ThermalLoss)
	elongation := 33.0 * 1.5e-6 * 80 // mm; the washers are steel like the bolt
	compliance := same.Stiffness.BoltCompliance + same.Stiffness.ClampedCompliance
	assert.InEpsilon(t, elongation/compliance, hot.WorkBack.ThermalLoss, 1e-9)
	assert.Zero(t, cold.WorkBack.ThermalLoss)
	assert.InEpsilon(t, hot.WorkBack.ThermalLoss, line(t, cold, "dF_gain"), 1e-9)
	assert.Less(t, cold.Preload.Limit, same.Preload.Limit+1)
}

func TestFrictionGripByHand(t *testing.T) {
	j := flange(t)
	j.Clamp = planner.Clamp{Transverse: 2400, Torque: 8000, TorqueRadius: 9, InterfaceFriction: 0.18, Interfaces: 1}
	assert.InEpsilon(t, (2400+8000.0/9)/0.18, work(t, j).WorkBack.RequiredResidualClamp, 1e-12)
	j.Clamp.Interfaces = 2
	assert.InEpsilon(t, (2400+8000.0/9)/0.36, work(t, j).WorkBack.RequiredResidualClamp, 1e-12)
	j.Clamp = planner.Clamp{SealArea: 2400, SealPressure: 1, Residual: 2000}
	assert.InEpsilon(t, 2400, work(t, j).WorkBack.RequiredResidualClamp, 1e-12)
}

// The aims, and a window between two settings.
func TestAimAndStep(t *testing.T) {
	j := flange(t)
	j.Tightening.Step = 5000
	high := work(t, j)
	assert.InDelta(t, 95, high.Torque.Target, 1e-9)
	j.Tightening.Aim = planner.AimMiddle
	middle := work(t, j)
	assert.InDelta(t, 75, middle.Torque.Target, 1e-9, "nearest to the geometric middle of 54 and 98 N.m")
	j.Tightening.Step = 100000
	none := work(t, j)
	assert.False(t, none.Feasible)
	assert.Contains(t, none.Binds[0], "no multiple of 100 N.m")
}

// Every default that the register may leave open is printed when it is used.
func TestNoSilentDefault(t *testing.T) {
	j := flange(t)
	j.Tightening = planner.Tightening{Tool: &planner.Tool{Tolerance: 0.04}}
	j.Roughness, j.Bolt.Shank = 0, nil
	p := work(t, j)
	all := fmt.Sprint(p.Assumptions)
	for _, word := range []string{"method", "aim", "utilisation", "resolution", "snug", "compliances", "roughness",
		"temperature", "cycles", "shank", "lubrication", "head", "nut"} {
		assert.Contains(t, all, word)
	}
	stated := len(work(t, flange(t)).Assumptions)
	assert.Greater(t, len(p.Assumptions), stated)
}

func ExampleWork() {
	t := fatal{}
	p, err := planner.Work(flange(t))
	if err != nil {
		fmt.Println(err)
		return
	}
	b := p.WorkBack
	fmt.Printf("needed %.0f N = %.0f + %.0f + %.0f N\n", b.RequiredPreload, b.RequiredResidualClamp, b.LoadRelief,
		b.EmbeddingLoss)
	fmt.Printf("tighten to %g N.m\n", p.Torque.Target)
	// Output:
	// needed 24348 N = 12000 + 8391 + 3957 N
	// tighten to 98 N.m
}

// fatal ends an example on a failed requirement.
type fatal struct{}

func (fatal) Errorf(format string, args ...any) { fmt.Printf(format, args...) }
func (fatal) FailNow()                          { os.Exit(1) }

// Target: under 100 us a joint on one core, whatever it asks for.
func BenchmarkWork(b *testing.B) {
	plain := flange(b)
	plain.Loads.Cycles = 2e6
	hot := flange(b)
	hot.Temperature = &planner.Temperature{Assembly: quantity.Range{Low: 5, High: 35}, States: []planner.ThermalState{
		{Name: "warming up", Bolt: 60, Parts: 150}, {Name: "running", Bolt: 140, Parts: 150}, {Name: "cooling", Bolt: 140, Parts: 90},
	}}
	whole := grouped(b, group.Load{Name: "idle", Force: group.Vector{Z: 8000}}, group.Load{Name: "start", Force: group.Vector{X: 4000, Z: 2000},
		Moment: group.Vector{Y: 900e3, Z: 400e3}}, group.Load{Name: "stop", Force: group.Vector{Y: -4000}, Moment: group.Vector{X: 300e3}})
	whole.Loads.Cycles = 1e5
	for name, j := range map[string]planner.Joint{"plain": plain, "hot": hot, "eccentric": lever(b, 2, 10), "group": whole} {
		b.Run(name, func(b *testing.B) {
			for b.Loop() {
				if _, err := planner.Work(j); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
