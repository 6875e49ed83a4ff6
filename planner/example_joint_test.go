package planner_test

import (
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// flange is a joint that is feasible and plain: M12 10.9 through grey iron and
// steel, 33 mm, with hard washers.
func flange(t require.TestingT) planner.Joint {
	thread, err := fastener.ParseThread("M12")
	require.NoError(t, err)
	head, err := fastener.FindHead("hexagon", thread)
	require.NoError(t, err)
	nut, err := fastener.FindNut("hexagon", thread)
	require.NoError(t, err)
	washer, err := fastener.FindWasher("ISO 7089 300 HV", thread)
	require.NoError(t, err)
	class, err := fastener.FindClass("10.9", thread)
	require.NoError(t, err)
	shank, n := 18.0, 0.5
	return planner.Joint{
		ID: "J-1", Name: "flange", Count: 8,
		Bolt:       planner.Bolt{Thread: thread, Head: head, Class: class, Length: 60, Shank: &shank},
		Nut:        &nut,
		HeadWasher: &washer,
		NutWasher:  &washer,
		Parts: []planner.Part{
			{Name: "flange", Material: material(t, "EN-GJL-250"), Thickness: 18, Hole: 13.5, OuterDiameter: 34},
			{Name: "rail", Material: material(t, "S355"), Thickness: 15, Hole: 13.5, OuterDiameter: 40},
		},
		Roughness: 0.016,
		Clamp:     planner.Clamp{Residual: 12000},
		Loads:     planner.Loads{Axial: quantity.Range{High: 9500}, IntroductionFactor: &n},
		Friction: planner.Friction{
			Thread: quantity.Range{Low: 0.10, High: 0.14}, Head: quantity.Range{Low: 0.09,
				High: 0.13}, Source: "stated in the register",
		},
		Tightening: planner.Tightening{
			Method: planner.TorqueMethod, Tool: &planner.Tool{Tolerance: 0.04},
			Utilisation: 0.9, Aim: planner.AimHigh, Step: 1000, Snug: 0.2, ElasticSpread: 0.1,
		},
	}
}

// tapped is the same joint with the bolt screwed into grey iron.
func tapped(t require.TestingT) planner.Joint {
	j := flange(t)
	j.Nut, j.NutWasher = nil, nil
	j.Tapped = &planner.Tapped{Material: material(t, "EN-GJL-250"), Depth: 60}
	return j
}

func material(t require.TestingT, name string) fastener.Material {
	m, err := fastener.FindMaterial(name)
	require.NoError(t, err)
	return m
}

func work(t require.TestingT, j planner.Joint) planner.Plan {
	p, err := planner.Work(j)
	require.NoError(t, err)
	return p
}

// drawJoint draws a possible joint around the plain ones: through or tapped,
// with tension or compression, any scatter and method.
func drawJoint(t *rapid.T) planner.Joint {
	j := flange(t)
	if rapid.Bool().Draw(t, "tapped") {
		j = tapped(t)
	}
	for i := range j.Parts {
		j.Parts[i].Thickness = rapid.Float64Range(8, 17).Draw(t, "thickness")
		j.Parts[i].OuterDiameter = rapid.Float64Range(24, 120).Draw(t, "outer diameter")
	}
	*j.Bolt.Shank = rapid.Float64Range(0, 16).Draw(t, "shank")
	j.Clamp.Residual = drawSize(t, "residual", 500, 40000)
	low := drawSize(t, "axial low", 0, 8000) - drawSize(t, "compression", 0, 8000)
	j.Loads.Axial = quantity.Range{Low: low, High: low + drawSize(t, "axial width", 0, 12000)}
	j.Loads.Cycles = rapid.SampledFrom([]float64{0, 1e5, 2e6}).Draw(t, "cycles")
	if rapid.Bool().Draw(t, "transverse") {
		j.Clamp.Transverse, j.Clamp.InterfaceFriction, j.Clamp.Interfaces = 500, 0.15, 1
	}
	*j.Loads.IntroductionFactor = rapid.Float64Range(0, 1).Draw(t, "n")
	drawService(t, &j)
	j.Friction.Thread = drawRange(t, "thread friction")
	j.Friction.Head = drawRange(t, "head friction")
	j.Tightening.Tool.Tolerance = rapid.Float64Range(0, 0.2).Draw(t, "tolerance")
	switch rapid.IntRange(0, 2).Draw(t, "method") {
	case 1:
		j.Tightening.Scatter, j.Tightening.ScatterFactor = planner.GuideScatter, rapid.Float64Range(1.1, 2.5).Draw(t,
			"alpha_A")
	case 2:
		j.Tightening.Method = planner.TorqueAndAngleMethod
	}
	return j
}

// drawService draws temperatures, losses and safety factors.
func drawService(t *rapid.T, j *planner.Joint) {
	temperature := func(name string) float64 { return rapid.Float64Range(-200, 300).Draw(t, name) }
	j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Single(temperature("service"))}
	if rapid.Bool().Draw(t, "states") {
		j.Temperature.States = []planner.ThermalState{
			{Name: "start-up", Bolt: temperature("bolt 1"), Parts: temperature("parts 1")},
			{Name: "running", Bolt: temperature("bolt 2"), Parts: temperature("parts 2")},
		}
	}
	if rapid.Bool().Draw(t, "losses") {
		j.Losses = planner.Losses{
			Settlement: rapid.Float64Range(0.001, 0.02).Draw(t, "settlement"), SettlementSource: "measured",
			Layers:     []planner.Closing{{Name: "paint", Amount: rapid.Float64Range(0.001, 0.02).Draw(t, "paint"), Source: "measured"}},
			Relaxation: rapid.Float64Range(0, 0.3).Draw(t, "relaxation"), RelaxationSource: "measured",
		}
	}
	if rapid.Bool().Draw(t, "safety") {
		factor := func(name string) float64 { return rapid.Float64Range(1, 2).Draw(t, name) }
		j.Safety = planner.Safety{Slip: factor("S_G"), Yield: factor("S_F"), Fatigue: factor("S_D"),
			Pressure: factor("S_P"), Stripping: factor("S_M"), Shear: factor("S_A")}
	}
}

// drawSize draws a number that is usually plain and now and then far too large
// for the joint.
func drawSize(t *rapid.T, name string, low, high float64) float64 {
	if rapid.IntRange(0, 9).Draw(t, name+" is huge") == 0 {
		return high * rapid.Float64Range(1, 1000).Draw(t, name+" times")
	}
	return rapid.Float64Range(low, high).Draw(t, name)
}

func drawRange(t *rapid.T, name string) quantity.Range {
	low := rapid.Float64Range(0.04, 0.25).Draw(t, name)
	return quantity.Range{Low: low, High: low * rapid.Float64Range(1, 1.8).Draw(t, name+" high over low")}
}

func line(t require.TestingT, p planner.Plan, symbol string) float64 {
	for _, l := range p.Trace {
		if l.Symbol == symbol {
			return l.Value
		}
	}
	require.Fail(t, "no trace line "+symbol)
	return 0
}
