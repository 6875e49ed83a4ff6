package stiffness_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"
	"pgregory.net/rapid"

	"clampback/planner/stiffness"
)

// slab is one layer of a textbook joint: thickness in, modulus Mpsi.
type slab struct{ thickness, modulus float64 }

// Member stiffness by 30 deg frusta, Shigley's Mechanical Engineering Design,
// 9th edition, in Mlbf/in. Examples 8-2 and part of 8-5 from memory, the rest
// seen in print (ids as in testdata/published).
func TestMemberStiffnessTextbook(t *testing.T) {
	cases := []struct {
		id            string
		bearing, hole float64 // in
		slabs         []slab
		printed       float64
		tolerance     float64 // half a unit of the last printed digit, or as said
	}{
		{"CV2021 example 8-2", 0.75, 0.5, []slab{{0.095, 30}, {0.5, 30}, {0.75, 14.5}}, 9.378, 0.0006},
		{"CV2022 example 8-2, all steel", 0.75, 0.5, []slab{{1.345, 30}}, 14.64, 0.005},
		{"CV2030 example 8-4", 0.9375, 0.625, []slab{{1.5, 14}}, 8.95, 0.005},
		{"CV2041 example 8-5", 0.9375, 0.625, []slab{{0.6875, 30}, {0.3125, 16}}, 17.40,
			0.006}, // the book rounds tan 30 deg to 0.577
		{"CV2054 problem 8-24", 0.75, 0.5, []slab{{0.5, 30}, {0.625, 14.5}, {0.095, 30}}, 10.79, 0.005},
		{"CV2055 problem 8-25", 0.75, 0.5, []slab{{0.595, 30}, {0.25, 14.5}}, 12.87,
			0.07}, // the solution starts the middle frustum at 1.018 in, not at 1.039 in
	}
	for _, c := range cases {
		t.Run(c.id, func(t *testing.T) {
			var grip float64
			for _, s := range c.slabs {
				grip += s.thickness
			}
			body := stiffness.Body{HeadBearing: c.bearing, FarBearing: c.bearing, Length: grip, OuterDiameter: 100}
			cones := body.ConesAt(math.Tan(math.Pi / 6))
			var depth, compliance float64
			for _, s := range c.slabs {
				compliance += cones.Layer(depth, depth+s.thickness, c.hole).Sum() / s.modulus
				depth += s.thickness
			}
			assert.InDelta(t, c.printed, 1/compliance, c.tolerance)
		})
	}
}

// Bolt stiffness and joint constant of the same textbook: example 8-4 and
// problem 8-25 (ids CV2029, CV2032, CV2056, CV2025, CV2053).
func TestBoltStiffnessTextbook(t *testing.T) {
	shank := stiffness.Rod(0.75, 0.3068, 30)
	thread := stiffness.Rod(0.75, 0.226, 30)
	assert.InDelta(t, 5.21, 1/(shank+thread), 0.005, "CV2029 example 8-4 kb, Mlbf/in")
	assert.InDelta(t, 5.04, 1/stiffness.Rod(0.845, 0.1419, 30), 0.005, "CV2056 problem 8-25 kb, Mlbf/in")

	// The textbook's C is the load factor for a load at head and nut, n = 1.
	assert.InDelta(t, 0.368, stiffness.LoadFactor(1, 1/5.21, 1/8.95), 0.0005, "CV2032 example 8-4")
	assert.InDelta(t, 0.320, stiffness.LoadFactor(1, 1/6.5, 1/13.8), 0.0005, "CV2025 example 8-3")
	assert.InDelta(t, 0.267, stiffness.LoadFactor(1, 1/3.94, 1/10.79), 0.0006, "CV2053 problem 8-24, printed truncated")
}

// The guideline's closed forms for one material, VDI 2230-1:2015, 5.1.2 (from
// memory): cones alone, cones with a sleeve, and a sleeve alone.
func TestClosedFormsOfTheGuideline(t *testing.T) {
	const dW, dh, modulus = 16.63, 13.5, 205000.0
	for _, tapped := range []bool{false, true} {
		for _, outer := range []float64{15, 20, 26, 34, 80} {
			for _, grip := range []float64{6, 33, 90} {
				body := stiffness.Body{HeadBearing: dW, FarBearing: dW, Length: grip, OuterDiameter: outer, Tapped: tapped}
				got := body.Cones().Layer(0, grip, dh).Sum() / modulus
				assert.InEpsilon(t, guidelineCompliance(body, dh, modulus), got, 1e-12,
					"outer %g, grip %g, tapped %v", outer, grip, tapped)
			}
		}
	}
}

// guidelineCompliance is delta_P as the guideline writes it, w = 1 or 2.
func guidelineCompliance(b stiffness.Body, dh, modulus float64) float64 {
	w := 1.0
	if b.Tapped {
		w = 2
	}
	dW, grip, outer := b.HeadBearing, b.Length, b.OuterDiameter
	t := b.ConeTangent()
	limit := dW + w*grip*t // D_A,Gr
	switch {
	case outer <= dW:
		return 4 * grip / (modulus * math.Pi * (outer*outer - dh*dh))
	case outer >= limit:
		return 2 * math.Log((dW+dh)*(dW+w*grip*t-dh)/((dW-dh)*(dW+w*grip*t+dh))) / (w * modulus * math.Pi * dh * t)
	}
	cone := 2 / (w * dh * t) * math.Log((dW+dh)*(outer-dh)/((dW-dh)*(outer+dh)))
	sleeve := 4 / (outer*outer - dh*dh) * (grip - (outer-dW)/(w*t))
	return (cone + sleeve) / (modulus * math.Pi)
}

// Cone angles of the guideline at two points, worked by hand from the printed
// formulas: ln 1 = 0 and ln e = 1 leave only their coefficients.
func TestConeTangent(t *testing.T) {
	through := stiffness.Body{HeadBearing: 10, FarBearing: 10, Length: 20, OuterDiameter: 10 * math.E}
	assert.InDelta(t, 0.362+0.153, through.ConeTangent(), 1e-12)
	tapped := stiffness.Body{HeadBearing: 10, Length: 10 * math.E, OuterDiameter: 10 * math.E, Tapped: true}
	assert.InDelta(t, 0.348+0.013+0.193, tapped.ConeTangent(), 1e-12)
}

// body draws a possible deformation body with a hole.
func body(t *rapid.T) (stiffness.Body, float64) {
	head := rapid.Float64Range(5, 90).Draw(t, "head bearing")
	b := stiffness.Body{
		HeadBearing:   head,
		FarBearing:    head * rapid.Float64Range(0.8, 1.4).Draw(t, "far over head"),
		Length:        rapid.Float64Range(2, 400).Draw(t, "grip"),
		OuterDiameter: head * rapid.Float64Range(0.7, 8).Draw(t, "outer over head"),
		Tapped:        rapid.Bool().Draw(t, "tapped"),
	}
	narrowest := math.Min(b.OuterDiameter, math.Min(b.HeadBearing, b.FarBearing))
	return b, narrowest * rapid.Float64Range(0.3, 0.95).Draw(t, "hole over narrowest")
}

// Cutting a part in two changes nothing, and the closed form is the integral
// of 1/area, done numerically by gonum.
func TestLayersAddUpAndMatchQuadrature(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b, hole := body(t)
		c := b.Cones()
		cut := b.Length * rapid.Float64Range(0, 1).Draw(t, "cut")
		whole := c.Layer(0, b.Length, hole).Sum()
		parts := c.Layer(0, cut, hole).Sum() + c.Layer(cut, b.Length, hole).Sum()
		require.InEpsilon(t, whole, parts, 1e-11)

		area := func(x float64) float64 {
			width := c.Width(x)
			return math.Pi / 4 * (width*width - hole*hole)
		}
		var sum float64 // piecewise, so that the kinks do not cost accuracy
		for _, p := range [][2]float64{{0, c.HeadEnd}, {c.HeadEnd, c.FarStart}, {c.FarStart, b.Length}} {
			sum += quad.Fixed(func(x float64) float64 { return 1 / area(x) }, p[0], p[1], 200, nil, 0)
		}
		require.InEpsilon(t, sum, whole, 1e-6)
	})
}

// A wider part is never more compliant at the same cone angle, and a longer
// one never less.
func TestComplianceIsMonotone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b, hole := body(t)
		tangent := b.ConeTangent()
		before := b.ConesAt(tangent).Layer(0, b.Length, hole).Sum()
		wider := b
		wider.OuterDiameter *= 1.1
		require.LessOrEqual(t, wider.ConesAt(tangent).Layer(0, b.Length, hole).Sum(), before*(1+1e-12))
		longer := b
		longer.Length *= 1.1
		require.GreaterOrEqual(t, longer.ConesAt(tangent).Layer(0, longer.Length, hole).Sum(), before*(1-1e-12))
	})
}
