package planner_test

import (
	"maps"
	"math"

	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// textbook is a joint as American textbooks state it: a bolt with a bearing face
// of 1.5 d on plates whose hole is the bolt, load at head and nut (n = 1), a
// preload without torsion. Lengths in, forces kip, stresses kpsi, moduli Mpsi.
type textbook struct {
	size      float64 // d
	perInch   float64 // threads
	area      float64 // A_t: the thread is made to have it; 0: the thread's own
	shank     float64 // l_d
	bolt      float64 // E of the bolt; 0: 30
	slabs     []slab  // from the head down
	tapped    float64 // E of the part the bolt is screwed into; 0: a nut
	bearing   float64 // d_W; 0: 1.5 d
	outer     float64 // D_A; 0: where the guideline's cone has the textbooks' 30 deg
	proof     float64 // S_p, taken for the yield strength
	preload   float64 // F_i
	load      float64 // P, from 0
	residual  float64 // clamp force that must stay
	cycles    float64
	friction  float64 // thread and head; 0: little
	tolerance float64 // of the tool
}

// slab is one clamped layer.
type slab struct{ thickness, modulus float64 }

// joint states the textbook joint for the planner. What the textbook has no word
// for is set where it has no say: strong faces, a shear strength that never strips.
func (b textbook) joint() planner.Joint {
	d := b.size * inch
	n := 1.0
	orElse := func(v, other float64) float64 {
		if v == 0 {
			return other
		}
		return v
	}
	bearing := orElse(b.bearing, 1.5*b.size) * inch
	shank := b.shank * inch
	var grip float64
	for _, s := range b.slabs {
		grip += s.thickness * inch
	}
	outer := orElse(b.outer*inch, widthOfCone(math.Tan(math.Pi/6), grip, bearing))
	j := planner.Joint{
		ID: "EX", Count: 1,
		Bolt: planner.Bolt{
			Thread: b.thread(), Length: grip + 2*d, Shank: &shank,
			Head: fastener.Head{Kind: "hexagon", BearingDiameter: bearing, Source: "example"},
			Class: fastener.PropertyClass{Name: "example", TensileStrength: 1.5 * b.proof * ksi, YieldStrength: b.proof * ksi,
				ProofStress: b.proof * ksi, ShearRatio: 0.6, Modulus: orElse(b.bolt, 30) * 1000 * ksi, Source: "example"},
		},
		Clamp: planner.Clamp{Residual: math.Max(b.residual*1000*lbf, 1)},
		Loads: planner.Loads{Axial: quantity.Range{High: b.load * 1000 * lbf}, IntroductionFactor: &n, Cycles: b.cycles},
		Friction: planner.Friction{
			Thread: quantity.Single(orElse(b.friction, 0.05)), Head: quantity.Single(orElse(b.friction, 0.05)), Source: "example"},
		Tightening: planner.Tightening{Tool: &planner.Tool{Tolerance: b.tolerance}, Aim: planner.AimHigh, Step: 1, Snug: 0.2},
	}
	for _, s := range b.slabs {
		j.Parts = append(j.Parts, planner.Part{Name: "plate", Material: strong(s.modulus), Thickness: s.thickness * inch, Hole: d,
			OuterDiameter: outer})
	}
	if b.tapped > 0 {
		j.Tapped = &planner.Tapped{Material: strong(b.tapped), Depth: 3 * d}
	} else {
		j.Nut = &fastener.Nut{BearingDiameter: bearing, Height: 0.8 * d, Source: "example"}
	}
	j.Tightening.Utilisation = b.utilisation(j.Bolt.Thread)
	return j
}

// thread is the unified thread; its profile is that of ISO 68-1. Where the example
// prints its stress area, the pitch is made so that (d_2 + d_3)/2 gives it.
func (b textbook) thread() fastener.Thread {
	th := fastener.Thread{Designation: "example", Diameter: b.size * inch, Pitch: inch / b.perInch}
	if b.area > 0 {
		th.Pitch = (th.Diameter - math.Sqrt(4/math.Pi*b.area)*inch) / (13.0 / 24 * math.Sqrt(3))
	}
	return th
}

// utilisation is the share of the yield strength at which tension alone is the
// stated preload at the tool's middle: the textbooks count no torsion. Worked by
// hand from the thread: tau/sigma = 1.5 d_2/d_0 tan(phi + rho').
func (b textbook) utilisation(th fastener.Thread) float64 {
	d0, d2 := th.Diameter-13.0/24*math.Sqrt(3)*th.Pitch, th.Diameter-3.0/8*math.Sqrt(3)*th.Pitch
	mu := b.friction
	if mu == 0 {
		mu = 0.05
	}
	ratio := 1.5 * d2 / d0 * math.Tan(math.Atan(th.Pitch/(math.Pi*d2))+math.Atan(1.155*mu))
	tension := b.preload * 1000 * lbf * (1 + b.tolerance) / (math.Pi / 4 * d0 * d0 * b.proof * ksi)
	return tension * math.Sqrt(1+3*ratio*ratio)
}

// strong is a material that only its modulus, Mpsi, tells from others.
func strong(modulus float64) fastener.Material {
	return fastener.Material{Name: "example", Modulus: modulus * 1000 * ksi, LimitingPressure: 1e5, ShearStrength: 1e5,
		TensileStrength: 1e5, Source: "example"}
}

// widthOfCone is the outer diameter D_A at which tan phi_D of a through bolt,
// VDI 2230-1:2015 5.1.2, comes to the stated tangent.
func widthOfCone(tangent, grip, bearing float64) float64 {
	return bearing * math.Exp((tangent-0.362-0.032*math.Log(grip/bearing/2))/0.153)
}

// withSprings gives bolt and parts the moduli with which the whole bolt has the
// stiffness kb and the parts have km, N/mm: the examples' own springs.
func withSprings(t require.TestingT, j planner.Joint, kb, km float64) planner.Joint {
	s := work(t, j).Stiffness
	j.Bolt.Class.Modulus *= s.BoltCompliance * kb
	parts := make([]planner.Part, len(j.Parts))
	for i, p := range j.Parts {
		p.Material.Modulus *= s.ClampedCompliance * km
		parts[i] = p
	}
	j.Parts = parts
	return j
}

// itsSprings takes from the planner's own springs what the textbook counts: the
// bolt in the grip alone, its thread on the stress area.
func itsSprings(t require.TestingT, j planner.Joint) planner.Joint {
	p := work(t, j)
	kb := 1 / evaluate(t, "delta_S-delta_SK-delta_G-delta_M-delta_Gew+delta_Gew*A_d3/A_S", p)
	return withSprings(t, j, kb, 1/p.Stiffness.ClampedCompliance)
}

const megaSpring = 1e6 * lbf / inch // 1 Mlbf/in in N/mm

// exampleJoints are the joints by the name of their example.
func exampleJoints(t require.TestingT) map[string]planner.Joint {
	all := map[string]planner.Joint{}
	maps.Copy(all, shigleyJoints(t))
	maps.Copy(all, otherJoints(t))
	maps.Copy(all, agencyJoints())
	return all
}

// shigleyJoints: Shigley's Mechanical Engineering Design, 9th edition, and the
// solutions of its problems. "planner's model" is the planner without regard to
// the textbook: plates three bearing diameters wide, the thread's own area.
func shigleyJoints(t require.TestingT) map[string]planner.Joint {
	ownModel := func(b textbook) planner.Joint {
		b.area, b.outer = 0, 3*1.5*b.size
		return b.joint()
	}
	steelAndIron := textbook{size: 0.5, perInch: 20, slabs: []slab{{0.095, 30}, {0.5, 30}, {0.75, 14.5}}, proof: 85, preload: 8}
	allSteel := steelAndIron
	allSteel.slabs = []slab{{0.095, 30}, {0.5, 30}, {0.75, 30}}

	ex3 := textbook{size: 0.75, perInch: 16, area: 0.373, slabs: []slab{{1.5, 30}}, proof: 85, preload: 25, load: 6, friction: 0.15}
	ex3Torque := ex3
	ex3Torque.area = 0

	ex4 := textbook{size: 0.625, perInch: 11, area: 0.226, shank: 0.75, slabs: []slab{{1.5, 14}}, proof: 85,
		preload: 0.75 * 0.226 * 85, load: 6}
	ex5 := textbook{size: 0.625, perInch: 11, area: 0.226, slabs: []slab{{0.6875, 30}, {0.3125, 16}}, proof: 85,
		preload: 0.75 * 0.226 * 85, load: 5, cycles: 2e6}
	ex5Tapped := ex5
	ex5Tapped.slabs, ex5Tapped.tapped = []slab{{0.6875, 30}}, 16

	p24 := textbook{size: 0.5, perInch: 13, area: 0.1419, shank: 0.5, slabs: []slab{{0.5, 30}, {0.625, 14.5}, {0.095, 30}},
		proof: 85, preload: 8}
	p25 := textbook{size: 0.5, perInch: 13, area: 0.1419, slabs: []slab{{0.595, 30}, {0.25, 14.5}}, proof: 85, preload: 8}
	p25Tapped := p25
	p25Tapped.slabs, p25Tapped.tapped = []slab{{0.595, 30}}, 14.5

	return map[string]planner.Joint{
		"Shigley ex 8-2":                  steelAndIron.joint(),
		"Shigley ex 8-2, all steel":       allSteel.joint(),
		"Shigley ex 8-2, planner's model": ownModel(steelAndIron),

		"Shigley ex 8-3":         withSprings(t, ex3.joint(), 6.5*megaSpring, 13.8*megaSpring),
		"Shigley ex 8-3, torque": ex3Torque.joint(),

		"Shigley ex 8-4":                  ex4.joint(),
		"Shigley ex 8-4, its springs":     itsSprings(t, ex4.joint()),
		"Shigley ex 8-4, planner's model": ownModel(ex4),

		"Shigley ex 8-5":                  ex5.joint(),
		"Shigley ex 8-5, its springs":     itsSprings(t, ex5.joint()),
		"Shigley ex 8-5, planner's model": ownModel(ex5Tapped),

		"Shigley prob 8-24":                  p24.joint(),
		"Shigley prob 8-24, its springs":     itsSprings(t, p24.joint()),
		"Shigley prob 8-24, planner's model": ownModel(p24),

		"Shigley prob 8-25":                  p25.joint(),
		"Shigley prob 8-25, planner's model": ownModel(p25Tapped),

		"Shigley M30 problem": m30(t),
	}
}

// m30 is the problem in SI units: C = 0.33 is stated, not its springs.
func m30(t require.TestingT) planner.Joint {
	b := textbook{size: 30 / inch, area: 561 / inch / inch, slabs: []slab{{2, 30}}, proof: 600 / ksi, preload: 252.45 / lbf,
		load: 80 / lbf, cycles: 2e6}
	return withSprings(t, b.joint(), 0.33*1e6, 0.67*1e6)
}

// otherJoints: other textbooks, a supplier, and the guideline itself.
func otherJoints(t require.TestingT) map[string]planner.Joint {
	// Juvinall and Marshek: kb = 2 kc, and the load at which the clamp falls to 225 lbf.
	review := textbook{size: 0.375, perInch: 16, slabs: []slab{{1, 30}}, proof: 85, preload: 2.25, load: 6.075, residual: 0.225}

	// Norton: a tube of 1 in under a head as wide as the tube.
	tube := textbook{size: 0.3125, perInch: 18, area: 0.052431, shank: 1.625, slabs: []slab{{2, 30}}, bearing: 1, outer: 1,
		proof: 85, preload: 0.9 * 85 * 0.052431, load: 2}

	// A supplier's M12 8.8 with the guideline's tightening factor 1.8.
	supplier := flange(t)
	class, err := fastener.FindClass("8.8", supplier.Bolt.Thread)
	require.NoError(t, err)
	supplier.Bolt.Class = class
	supplier.Clamp.Residual = 5000
	supplier.Friction.Thread, supplier.Friction.Head = quantity.Single(0.14), quantity.Single(0.14)
	supplier.Tightening.Tool, supplier.Tightening.Scatter, supplier.Tightening.ScatterFactor = nil, planner.GuideScatter, 1.8
	supplier.Tightening.Step = 1

	// VDI 2230-1 annex B2: 13 kN.m through 12 bolts on a circle of 258 mm.
	coupling := flange(t)
	coupling.Clamp = planner.Clamp{Torque: 13e6 / 12, TorqueRadius: 258.0 / 2, InterfaceFriction: 0.15, Interfaces: 1}

	return map[string]planner.Joint{
		"Juvinall review problem":         withSprings(t, review.joint(), 2*megaSpring, megaSpring),
		"Norton ex 15-2":                  tube.joint(),
		"Norton ex 15-2, its springs":     itsSprings(t, tube.joint()),
		"Norton ex 15-2, planner's model": func() planner.Joint { b := tube; b.area, b.bearing = 0, 0; return b.joint() }(),
		"Supplier's M12":                  supplier,
		"VDI 2230-1 B2":                   coupling,
	}
}

// agencyJoints are the fasteners of NASA TM-106943, Tables I and II: 65 % of the
// yield strength by a torque wrench of 25 %.
func agencyJoints() map[string]planner.Joint {
	sizes := []struct {
		name                string
		size, perInch, area float64
	}{
		{"#2-56", 0.086, 56, 0.0037}, {"#4-40", 0.112, 40, 0.00604}, {"#6-32", 0.138, 32, 0.00909}, {"#8-32", 0.164, 32, 0.014},
		{"#10-32", 0.190, 32, 0.02}, {"1/4-28", 0.25, 28, 0.0364}, {"5/16-24", 0.3125, 24, 0.058}, {"3/8-24", 0.375, 24, 0.0878},
		{"7/16-20", 0.4375, 20, 0.1187}, {"1/2-20", 0.5, 20, 0.1599}, {"9/16-18", 0.5625, 18, 0.203}, {"5/8-18", 0.625, 18, 0.256},
		{"3/4-16", 0.75, 16, 0.373},
	}
	all := map[string]planner.Joint{}
	for table, yield := range map[string]float64{"I": 85, "II": 26} {
		for _, s := range sizes {
			all["NASA TM-106943 Table "+table+" "+s.name] = textbook{size: s.size, perInch: s.perInch, area: s.area,
				slabs: []slab{{2 * s.size, 30}}, proof: yield, preload: 0.65 * yield * s.area, tolerance: 0.25}.joint()
		}
	}
	return all
}
