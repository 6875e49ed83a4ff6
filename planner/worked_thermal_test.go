package planner_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"clampback/planner"
	"clampback/planner/quantity"
)

// NASA TM-106943 (Chambers 1995) as a chain of its own formulas, seen in print (ids
// CV1396 to CV1398): bolt stiffness eq. 32, joint stiffness by a 45 deg cone eq. 33,
// thermal load eq. 10. The memorandum prints no figures with them. The plates are
// as wide as makes the guideline's cone 45 deg; the bolt has the stiffness of eq. 32.
func TestThermalLoadOfAnAgencyHandbook(t *testing.T) {
	cases := []struct {
		name           string
		d, l           float64 // in
		bolt, parts    float64 // Mpsi
		warming        float64 // K
		alphaB, alphaJ float64 // 1/K
	}{
		{"steel in aluminium, hot", 0.25, 1, 29.1, 10.3, 80, 16.4e-6, 23.4e-6},
		{"steel in aluminium, cold", 0.25, 1, 29.1, 10.3, -120, 16.4e-6, 23.4e-6},
		{"titanium in steel", 0.5, 2.5, 16, 29, 80, 8.6e-6, 11.5e-6},
		{"thin", 0.375, 0.3, 29, 29, 60, 16e-6, 11.5e-6},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			area := math.Pi / 4 * c.d * c.d
			kb := area * c.bolt / c.l                                                            // eq. 32, Mlbf/in
			kj := math.Pi * c.parts * c.d / (2 * math.Log(5*(c.l+0.5*c.d)/(c.l+2.5*c.d)))        // eq. 33
			thermal := kb * kj / (kb + kj) * 1e6 * c.l * c.warming * (c.alphaJ - c.alphaB) * lbf // eq. 10, N

			b := textbook{size: c.d, perInch: 16, slabs: []slab{{c.l, c.parts}}, bolt: c.bolt, proof: 120, preload: 60 * area,
				outer: widthOfCone(1, c.l, 1.5*c.d)}
			j := withSprings(t, b.joint(), kb*megaSpring, kj*megaSpring)
			assert.InEpsilon(t, kj*megaSpring, 1/work(t, b.joint()).Stiffness.ClampedCompliance, 1e-9, "eq. 33 is the cone at 45 deg")
			j.Bolt.Class.Expansion = c.alphaB
			for i := range j.Parts {
				j.Parts[i].Material.Expansion = c.alphaJ
			}
			j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Single(20 + c.warming)}
			p := work(t, j)
			gain := line(t, p, "dF_gain") - line(t, p, "dF_Vth")
			assert.InEpsilon(t, thermal, gain, 1e-9)
			assert.InDelta(t, math.Max(0, -thermal), p.WorkBack.ThermalLoss, 1e-9*math.Abs(thermal), "only a loss raises the requirement")
		})
	}
}
