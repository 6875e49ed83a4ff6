package planner_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// spoil is one way to make the plain joint impossible, and the one fault that it
// must give. The rules are geometry and definitions of the quantities; no source.
type spoil struct {
	name    string
	change  func(j *planner.Joint)
	path    string
	message string
}

func checkSpoils(t *testing.T, plain func(require.TestingT) planner.Joint, cases []spoil) {
	require.Empty(t, plain(t).Faults())
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			j := plain(t)
			c.change(&j)
			faults := j.Faults()
			require.Len(t, faults, 1, "%v", faults)
			assert.Equal(t, c.path, faults[0].Path)
			assert.Contains(t, faults[0].Message, c.message)
			assert.NotEmpty(t, faults[0].Mend)
			_, err := planner.Work(j)
			assert.Error(t, err, "an impossible joint is not planned")
		})
	}
}

func TestImpossibleIdentityAndPattern(t *testing.T) {
	circle := func(n int, diameter float64) func(*planner.Joint) {
		return func(j *planner.Joint) { j.Pattern = pattern.NewCircle(n, diameter) }
	}
	checkSpoils(t, flange, []spoil{
		{"no id", func(j *planner.Joint) { j.ID = "" }, "id", `id "" cannot name a file`},
		{"id of dots", func(j *planner.Joint) { j.ID = ".." }, "id", `id ".."`},
		{"id that is a path", func(j *planner.Joint) { j.ID = "a/b" }, "id", `id "a/b"`},
		{"id that is a flag", func(j *planner.Joint) { j.ID = "-rf" }, "id", `id "-rf"`},
		{"id of 41", func(j *planner.Joint) { j.ID = strings.Repeat("x", 41) }, "id", "cannot name a file"},
		{"no bolts", func(j *planner.Joint) { j.Count = 0 }, "count", "count is 0"},
		{"countless", func(j *planner.Joint) { j.Count = 10001 }, "count", "count is 10001"},
		{"count and pattern", circle(6, 200), "pattern", "the pattern has 6 positions, the joint 8 bolts"},
		{"circle of nothing", circle(8, -200), "pattern.circle", "the bolt circle is -200 mm"},
		{"bolts overlap", circle(8, 25), "pattern", "bolts 7 and 8 are 9.56709 mm apart, less than the thread of 12 mm"},
		{"bolts at one place", func(j *planner.Joint) { j.Pattern = pattern.NewGrid(2, 4, 0, 80) }, "pattern",
			"are 0 mm apart"},
		{"too many to draw", func(j *planner.Joint) {
			j.Count, j.Pattern = 1001, pattern.NewCircle(1001, 9000)
		}, "pattern", "a pattern has at most 1000 positions, the joint has 1001 bolts"},
		{"nowhere", func(j *planner.Joint) {
			j.Pattern = pattern.NewCircle(8, 200)
			j.Pattern.Points[3].X = math.NaN()
		}, "pattern", "bolt 4 sits NaN mm from the middle"},
	})
}

func TestImpossibleBolt(t *testing.T) {
	checkSpoils(t, flange, []spoil{
		{"thin nut alone", func(j *planner.Joint) { j.Nut.Kind = "hexagon thin" }, "nut", "a thin nut alone does not carry the bolt"},
		{"no length", func(j *planner.Joint) { j.Bolt.Length = 0 }, "bolt.length", "the bolt's length is 0 mm"},
		{"not reaching", func(j *planner.Joint) { j.Bolt.Length = 38 }, "bolt.length",
			"the grip of 38 mm is longer than the bolt of 38 mm"},
		{"shank too long", func(j *planner.Joint) { *j.Bolt.Shank = 39 }, "bolt.shank",
			"the shank of 39 mm is longer than the grip of 38 mm"},
		{"shank below 0", func(j *planner.Joint) { *j.Bolt.Shank = -1 }, "bolt.shank", "the shank is -1 mm"},
		{"shank and segments", func(j *planner.Joint) { j.Bolt.Segments = []planner.Segment{{Length: 5, Diameter: 10}} },
			"bolt.segments", "both shank and segments are stated"},
		{"segment too thick", func(j *planner.Joint) {
			j.Bolt.Shank, j.Bolt.Segments = nil, []planner.Segment{{Length: 5, Diameter: 12.1}}
		}, "bolt.segments[0].diameter", "the segment's diameter is 12.1 mm, the thread's 12 mm"},
		{"segments too long", func(j *planner.Joint) {
			j.Bolt.Shank, j.Bolt.Segments = nil, []planner.Segment{{Length: 20, Diameter: 10}, {Length: 20, Diameter: 12}}
		}, "bolt.segments", "the shank of 40 mm is longer than the grip of 38 mm"},
		{"no thread", func(j *planner.Joint) { j.Bolt.Thread = fastener.Thread{} }, "bolt.thread", "no thread is stated"},
		{"no head", func(j *planner.Joint) { j.Bolt.Head = fastener.Head{} }, "bolt.head", "no head is stated"},
		{"no class", func(j *planner.Joint) { j.Bolt.Class = fastener.PropertyClass{} }, "bolt.property_class",
			"no property class is stated"},
	})
}

func TestImpossibleParts(t *testing.T) {
	part := func(change func(p *planner.Part)) func(*planner.Joint) {
		return func(j *planner.Joint) { change(&j.Parts[1]) }
	}
	checkSpoils(t, flange, []spoil{
		{"no parts", func(j *planner.Joint) { j.Parts = nil }, "clamped", "no clamped part is stated"},
		{"no thickness", part(func(p *planner.Part) { p.Thickness = 0 }), "clamped[1].thickness", "the thickness is 0 mm"},
		{"thickness in the wrong unit", part(func(p *planner.Part) { p.Thickness = 0.005 }), "clamped[1].thickness",
			"it must lie between 0.01 mm and 100000 mm"},
		{"small hole", part(func(p *planner.Part) { p.Hole = 11 }), "clamped[1].hole",
			"the hole of 11 mm is smaller than the thread of 12 mm"},
		{"no material around", part(func(p *planner.Part) { p.OuterDiameter = 13.5 }), "clamped[1].outer_diameter",
			"the outer diameter of 13.5 mm is not larger than the hole of 13.5 mm"},
		{"endless", part(func(p *planner.Part) { p.OuterDiameter = math.Inf(1) }), "clamped[1].outer_diameter", "+Inf"},
		{"no modulus", part(func(p *planner.Part) { p.Material.Modulus = 0 }), "clamped[1].material.modulus", "the modulus is 0 MPa"},
		{"no bearing pressure", part(func(p *planner.Part) { p.Material.LimitingPressure = 0 }),
			"clamped[1].material.bearing_pressure", "the limiting bearing pressure is 0 MPa"},
		{"expansion without its 1e-6", part(func(p *planner.Part) { p.Material.Expansion = 11.5 }),
			"clamped[1].material.expansion", "no material has that"},
		{"no face", func(j *planner.Joint) { j.HeadWasher, j.Parts[0].Hole = nil, 17 }, "clamped[0].hole",
			"the face under the head has no area"},
		{"washer falls through", func(j *planner.Joint) { j.Parts[0].Hole = 26 }, "clamped[0].hole",
			"the face under the head washer has no area"},
		{"neither end", func(j *planner.Joint) { j.Nut = nil }, "nut", "neither nut nor tapped is stated"},
		{"both ends", func(j *planner.Joint) { j.Tapped = tapped(t).Tapped }, "tapped", "both nut and tapped are stated"},
		{"rough beyond the table", func(j *planner.Joint) { j.Roughness = 0.2 }, "surfaces", "Rz 200 um lies outside"},
	})
	checkSpoils(t, tapped, []spoil{
		{"bottoms", func(j *planner.Joint) { j.Tapped.Depth = 24 }, "tapped.depth",
			"the bolt bottoms: it reaches 24.5 mm into a thread of 24 mm"},
		{"no depth", func(j *planner.Joint) { j.Tapped.Depth = 0 }, "tapped.depth", "the thread depth is 0 mm"},
		{"nut washer", func(j *planner.Joint) { j.NutWasher = j.HeadWasher }, "washers.nut", "there is no nut"},
		{"no shear strength", func(j *planner.Joint) { j.Tapped.Material.ShearStrength = 0 },
			"tapped.material.shear_strength", "the shear strength of the tapped part is 0 MPa"},
	})
}

func TestImpossibleService(t *testing.T) {
	checkSpoils(t, flange, []spoil{
		{"no demand", func(j *planner.Joint) { j.Clamp = planner.Clamp{} }, "clamp", "nothing says what the joint must hold"},
		{"negative residual", func(j *planner.Joint) { j.Clamp.Residual = -12000 }, "clamp.residual",
			"the residual clamp force is -12 kN; it cannot be negative"},
		{"endless residual", func(j *planner.Joint) { j.Clamp.Residual = 1e300 }, "clamp.residual", "it must be at most 1000000 kN"},
		{"slip without friction", func(j *planner.Joint) { j.Clamp.Transverse = 500 }, "clamp.interface_friction",
			"the interface friction is not stated"},
		{"torque without radius", func(j *planner.Joint) { j.Clamp.Torque, j.Clamp.InterfaceFriction = 500, 0.1 },
			"clamp.torque_radius", "has no friction radius"},
		{"interface friction", func(j *planner.Joint) { j.Clamp.InterfaceFriction = 5 }, "clamp.interface_friction",
			"the interface friction is 5"},
		{"negative interfaces", func(j *planner.Joint) { j.Clamp.Interfaces = -1 }, "clamp.interfaces", "slip faces is -1"},
		{"suction", func(j *planner.Joint) { j.Clamp.SealArea, j.Clamp.SealPressure = 100, -1 }, "clamp.seal.pressure",
			"the sealed pressure is -1 MPa"},
		{"load without introduction factor", func(j *planner.Joint) { j.Loads.IntroductionFactor = nil },
			"loads.introduction_factor", "no load introduction factor"},
		{"introduction factor", func(j *planner.Joint) { *j.Loads.IntroductionFactor = 1.1 }, "loads.introduction_factor", "1.1"},
		{"load backwards", func(j *planner.Joint) { j.Loads.Axial = quantity.Range{Low: 2000, High: 1000} }, "loads.axial",
			"the axial load of 2 kN to 1 kN is impossible"},
		{"load that is no number", func(j *planner.Joint) { j.Loads.Axial.High = math.NaN() }, "loads.axial", "NaN"},
		{"half a cycle", func(j *planner.Joint) { j.Loads.Cycles = 0.5 }, "loads.cycles", "0.5 load cycles"},
		{"below absolute zero", func(j *planner.Joint) {
			j.Temperature = &planner.Temperature{Assembly: quantity.Single(-274), Service: quantity.Single(20)}
		}, "temperature.assembly", "-274 degC is impossible"},
		{"molten", func(j *planner.Joint) {
			j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Range{Low: 20, High: 1500}}
		}, "temperature.service", "20 to 1500 degC is impossible"},
		{"friction of 5", func(j *planner.Joint) { j.Friction.Thread = quantity.Single(5) }, "friction.thread",
			"the friction in the thread is 5;"},
		{"frictionless", func(j *planner.Joint) { j.Friction.Head.Low = 0 }, "friction.head",
			"the friction under the head is 0 to 0.13;"},
	})
}

func TestImpossibleTightening(t *testing.T) {
	tightening := func(change func(t *planner.Tightening)) func(*planner.Joint) {
		return func(j *planner.Joint) { change(&j.Tightening) }
	}
	checkSpoils(t, flange, []spoil{
		{"method", tightening(func(t *planner.Tightening) { t.Method = "hammer" }), "tightening.method", `unknown word "hammer"`},
		{"aim", tightening(func(t *planner.Tightening) { t.Aim = "low" }), "tightening.aim", `unknown word "low"`},
		{"no tool", tightening(func(t *planner.Tightening) { t.Tool = nil }), "tightening.tool", "no tool is stated"},
		{"wild tool", tightening(func(t *planner.Tightening) { t.Tool.Tolerance = 0.5 }), "tightening.tool.tolerance", "50 %"},
		{"utilisation", tightening(func(t *planner.Tightening) { t.Utilisation = 90 }), "tightening.utilisation", "90"},
		{"step", tightening(func(t *planner.Tightening) { t.Step = -1 }), "tightening.step", "-0.001 N.m; it must be above 0"},
		{"snug of all", tightening(func(t *planner.Tightening) { t.Snug = 1 }), "tightening.snug", "100 % of the target"},
		{"two snugs", tightening(func(t *planner.Tightening) { t.SnugTorque = 1000 }), "tightening.snug_torque", "both"},
		{"angle step", tightening(func(t *planner.Tightening) { t.AngleStep = -5 }), "tightening.angle_step", "-5 deg"},
		{"angle tolerance", tightening(func(t *planner.Tightening) { t.AngleTol = -5 }), "tightening.angle_tolerance", "-5 deg"},
		{"spread", tightening(func(t *planner.Tightening) { t.ElasticSpread = 1.5 }), "tightening.elastic_spread", "150 %"},
		{"factor without guide", tightening(func(t *planner.Tightening) { t.ScatterFactor = 1.6 }), "tightening.scatter_factor",
			"the scatter comes from the ranges"},
		{"guide for an angle", tightening(func(t *planner.Tightening) {
			t.Scatter, t.Method = planner.GuideScatter, planner.TorqueAndAngleMethod
		}), "tightening.scatter", "not for torque and angle"},
		{"factor below 1", tightening(func(t *planner.Tightening) {
			t.Scatter, t.ScatterFactor = planner.GuideScatter, 0.9
		}), "tightening.scatter_factor", "the tightening factor is 0.9"},
	})
}

// Several impossible values are several faults; a bad name does not hide that the
// bolt is too short, and a value that others rest on is judged once.
func TestFaultsDoNotHideEachOther(t *testing.T) {
	j := flange(t)
	j.ID, j.Bolt.Length, j.Parts[1].Material.LimitingPressure, j.Friction.Head = "", 30, 0, quantity.Single(2)
	var paths []string
	for _, f := range j.Faults() {
		paths = append(paths, f.Path)
	}
	assert.Equal(t, []string{"id", "bolt.length", "clamped[1].material.bearing_pressure", "friction.head"}, paths)
}

// No two neighbours on any pattern may overlap; the search for them may not miss
// the nearest pair. Compared with all pairs.
func TestSpacingAgreesWithAllPairs(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		coordinate := rapid.Float64Range(-60, 60)
		points := make([]pattern.Point, rapid.IntRange(2, 12).Draw(t, "bolts"))
		for i := range points {
			points[i] = pattern.Point{X: coordinate.Draw(t, "x"), Y: coordinate.Draw(t, "y") * 2}
		}
		j := flange(t)
		j.Count, j.Pattern = len(points), pattern.NewFree(points)
		nearest := math.Inf(1)
		for i, a := range points {
			for _, b := range points[:i] {
				nearest = math.Min(nearest, math.Hypot(a.X-b.X, a.Y-b.Y))
			}
		}
		if math.Abs(nearest-12) < 1e-6 {
			t.Skip("within rounding of the thread's diameter")
		}
		require.Equal(t, nearest < 12, len(j.Faults()) > 0, "nearest %g mm", nearest)
	})
}

// What the rules let through can be planned: whatever the numbers, near or at the
// ends of what is possible, every number of the plan is finite.
func TestPossibleJointsGiveFinitePlans(t *testing.T) {
	planned := 0
	rapid.Check(t, func(t *rapid.T) {
		j := drawJoint(t)
		wild := func(name string, value *float64) {
			if rapid.IntRange(0, 3).Draw(t, name+" is wild") == 0 {
				*value = rapid.SampledFrom([]float64{0, 1e-300, 0.001, 0.01, 1, 100, 1e5, 1e6, 1e9, 1e12, math.Inf(1), math.NaN(),
					-1}).Draw(t, name)
			}
		}
		wild("residual", &j.Clamp.Residual)
		wild("transverse", &j.Clamp.Transverse)
		wild("torque", &j.Clamp.Torque)
		wild("radius", &j.Clamp.TorqueRadius)
		wild("interface friction", &j.Clamp.InterfaceFriction)
		wild("axial", &j.Loads.Axial.High)
		wild("cycles", &j.Loads.Cycles)
		wild("thickness", &j.Parts[0].Thickness)
		wild("outer diameter", &j.Parts[1].OuterDiameter)
		wild("modulus", &j.Parts[0].Material.Modulus)
		wild("pressure", &j.Parts[1].Material.LimitingPressure)
		wild("expansion", &j.Parts[0].Material.Expansion)
		wild("friction", &j.Friction.Thread.Low)
		wild("step", &j.Tightening.Step)
		wild("snug", &j.Tightening.Snug)
		wild("utilisation", &j.Tightening.Utilisation)
		wild("spread", &j.Tightening.ElasticSpread)
		if len(j.Faults()) > 0 {
			return
		}
		planned++
		for _, l := range work(t, j).Trace {
			require.False(t, math.IsNaN(l.Value) || math.IsInf(l.Value, 0), fmt.Sprintf("%s = %g", l.Symbol, l.Value))
		}
	})
	assert.Positive(t, planned, "some joint must come through")
}
