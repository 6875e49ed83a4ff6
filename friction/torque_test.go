package friction_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/friction"
)

// Shigley's Mechanical Engineering Design, 9th edition, example 8-3(c), from
// memory (CV2028): 3/4-16 UNF, 25 kip, f = f_c = 0.15, collar diameter 1.25 d.
// The book prints 3551 lbf.in; its flank factor is 1/cos 30 deg, ours the
// guideline's 1.155, and its thread term is the square-thread form. Inch and
// kip go through unchanged: the lever has the unit of its lengths.
func TestTorqueTextbook(t *testing.T) {
	const mu, d, dm, pitch = 0.15, 0.75, 0.7094, 1.0 / 16
	lever := friction.ThreadLever(pitch, dm, mu) + friction.BearingLever(1.5*d, d, mu)
	assert.InEpsilon(t, 3551, 25000*lever, 2e-4)
}

// ISO 16047 (from memory): T = F (P/2pi + 0.577 d_2 mu_th + D_b/2 mu_b), the
// form without the product of the two tangents in tan(phi + rho'). With that
// product it is ours to the rounding of 0.577 and 1.155.
func TestTorqueAgreesWithISO16047(t *testing.T) {
	threads := []struct{ d2, pitch float64 }{{2.675, 0.5}, {7.188, 1.25}, {10.863, 1.75}, {27.727, 3.5}, {60.103, 6}}
	for _, th := range threads {
		for _, mu := range []float64{0.04, 0.12, 0.20} {
			iso := th.pitch/(2*math.Pi) + 0.577*th.d2*mu
			product := th.pitch / (math.Pi * th.d2) * mu / math.Cos(math.Pi/6)
			assert.InEpsilon(t, iso/(1-product), friction.ThreadLever(th.pitch, th.d2, mu), 9e-4, "d2 %g, mu %g", th.d2, mu)
		}
	}
	assert.InDelta(t, 0.12*(20+13.5)/2/2, friction.BearingLever(20, 13.5, 0.12), 1e-12)
}

// More friction always costs more torque.
func TestLeversGrowWithFriction(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d2 := rapid.Float64Range(2, 60).Draw(t, "d2")
		pitch := d2 * rapid.Float64Range(0.05, 0.2).Draw(t, "pitch over d2")
		mu := rapid.Float64Range(0.01, 0.5).Draw(t, "mu")
		require.Less(t, friction.ThreadLever(pitch, d2, mu), friction.ThreadLever(pitch, d2, mu*1.01))
		require.Less(t, friction.BearingLever(1.7*d2, 1.1*d2, mu), friction.BearingLever(1.7*d2, 1.1*d2, mu*1.01))
	})
}
