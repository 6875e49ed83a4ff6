package planner_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/quantity"
)

// lever is the plain flange as a lever: bolt and load off the axis of the parts.
func lever(t require.TestingT, offset, arm float64) planner.Joint {
	j := flange(t)
	j.Parts[0].Material = material(t, "S355")
	j.Eccentric = &planner.Eccentric{BoltOffset: offset, LoadArm: &arm, Depth: 34, Width: 34}
	return j
}

// Bolt and load on the axis of the parts are the concentric joint, VDI 2230-1:2015,
// 5.1.2.2 and R3: delta_P* = delta_P** = delta_P, no force against opening.
func TestEccentricityOfNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		plain := drawJoint(t)
		j := plain
		zero := 0.0
		j.Eccentric = &planner.Eccentric{LoadArm: &zero, Depth: 34, Width: 34}
		p, q := work(t, plain), work(t, j)
		require.InEpsilon(t, 1+p.Stiffness.LoadFactor, 1+q.Stiffness.LoadFactor, 1e-12)
		require.InEpsilon(t, p.WorkBack.RequiredPreload, q.WorkBack.RequiredPreload, 1e-12)
		require.Equal(t, p.Torque, q.Torque)
	})
}

// The springs of an eccentric joint against the statics of the system they stand for,
// solved by itself: a bolt delta_S at s_sym in series with a body that gives by delta_P
// along its axis and by beta_P in bending, the load acting with the lever a on the
// fraction n of the body. From compatibility at the bolt's axis:
//
//	F_SA (delta_S + delta_P + s^2 beta_P) = n (delta_P + a s beta_P) F_A + n s beta_P M_B
//
// Here with n = 1 as a linear system of bolt force, body displacement and rotation.
func TestEccentricLoadFactorByStatics(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s, a := rapid.Float64Range(-3, 3).Draw(t, "s"), rapid.Float64Range(0, 40).Draw(t, "a")
		j := lever(t, s, a)
		*j.Loads.IntroductionFactor = 1
		j.Eccentric.MomentHigh = 1
		p := work(t, j)
		dS, dP, beta := p.Stiffness.BoltCompliance, p.Stiffness.ClampedCompliance, line(t, p, "beta_P")
		// Unknowns: F_SA, body force F_P (compression lost), tilt. The load of 1 N at a opens.
		solve := func(force, moment float64) float64 {
			m := mat.NewDense(4, 4, []float64{
				1, 1, 0, 0, // F_SA + F_P = F_A
				s, 0, 1, 0, // M_P = F_A a + M_B - F_SA s
				dS, -dP, -beta * s, 0, // the bolt lengthens as the body does at s
				0, 0, 0, 1,
			})
			var x mat.VecDense
			require.NoError(t, x.SolveVec(m, mat.NewVecDense(4, []float64{force, force*a + moment, 0, 0})))
			return x.AtVec(0)
		}
		require.InDelta(t, solve(1, 0), p.Stiffness.LoadFactor, 1e-9)
		require.InDelta(t, solve(0, 1), line(t, p, "Phi_m"), 1e-9)
	})
}

// With the clamp force F_KA the pressure at one edge of the interface just vanishes and
// nowhere is it negative: by the beam formula, strength of materials.
func TestOpeningForceLeavesTheEdgeAtNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s, a := rapid.Float64Range(-3, 3).Draw(t, "s"), rapid.Float64Range(0, 40).Draw(t, "a")
		j := lever(t, s, a)
		j.Clamp = planner.Clamp{Residual: 1}
		j.Loads.Axial = quantity.Range{High: rapid.Float64Range(0, 9000).Draw(t, "load")}
		j.Eccentric.MomentHigh = rapid.Float64Range(-30000, 30000).Draw(t, "moment")
		p := work(t, j)
		force := line(t, p, "F_KA")
		hole := math.Pi / 4 * 13.5 * 13.5
		area := 34*34 - hole
		inertia := math.Pow(34, 4)/12 - hole*13.5*13.5/16 - hole*s*s
		edge := func(u float64) float64 {
			tilt := force*s - (j.Loads.Axial.High*(a-s) + j.Eccentric.MomentHigh)
			return force/area + tilt*u/inertia
		}
		least := math.Min(edge(17), edge(-17))
		require.InDelta(t, 0, least, 1e-9*(1+force))
		require.GreaterOrEqual(t, p.WorkBack.RequiredResidualClamp, force)
	})
}

// The second moment of the cones by integration: the compliance in bending of a cone is
// the integral of dx/(E I(x)); the guideline's mean of a cone is that of its length over
// it. The sum of h/E with one modulus is l_K/E.
func TestBodyMomentByIntegration(t *testing.T) {
	j := lever(t, 0, 10)
	for i := range j.Parts {
		j.Parts[i].OuterDiameter = 200 // cones only
	}
	p := work(t, j)
	tan, grip, dW := line(t, p, "tan_phi"), j.Grip(), line(t, p, "d_W")
	require.InDelta(t, grip/2, line(t, p, "x_H"), 0.05, "the cones meet in the middle")
	const steps = 100000
	var sum float64
	for i := range steps {
		x := grip * (float64(i) + 0.5) / steps
		width := math.Min(dW+2*x*tan, line(t, p, "d_W_N")+2*(grip-x)*tan)
		sum += grip / steps / (math.Pi / 64 * math.Pow(width, 4))
	}
	assert.InEpsilon(t, grip/sum-math.Pi/64*math.Pow(13.5, 4), line(t, p, "I_Bers"), 1e-4)
}

// An eccentric joint is judged in fatigue with the bending that the guideline prints:
// sigma_SAb = sigma_SA (1 + (1/Phi - s/a) (l_K/l_ers) (E_S/E_P) pi a d_S^3/(8 I_Bers)),
// VDI 2230-1:2015 R9, from memory; l_ers = beta_S E_S I_3 with I_3 of d_S.
func TestBendingStressIsTheGuidelines(t *testing.T) {
	j := lever(t, 2, 15)
	j.Loads.Cycles = 2e6
	p := work(t, j)
	phi, area := p.Stiffness.LoadFactor, line(t, p, "A_S")
	dS := (line(t, p, "d_2") + line(t, p, "d_3")) / 2
	const modulus = 205e3 // of bolt and parts
	replacement := line(t, p, "beta_S") * modulus * math.Pi / 64 * math.Pow(dS, 4)
	sigma := phi * 9500 / 2 / area
	bent := sigma * (1 + (1/phi-2.0/15)*j.Grip()/replacement*math.Pi*15*dS*dS*dS/(8*line(t, p, "I_Bers")))
	assert.InEpsilon(t, bent, line(t, p, "sigma_ab"), 1e-9)
}

// Mistakes of an eccentric joint, one fault each.
func TestImpossibleEccentric(t *testing.T) {
	arm := 20.0
	plain := func(t require.TestingT) planner.Joint { return lever(t, 2, arm) }
	checkSpoils(t, plain, []spoil{
		{"no arm", func(j *planner.Joint) { j.Eccentric.LoadArm = nil }, "eccentric.a", "an eccentric joint with an axial load has no a"},
		{"outside the kern", func(j *planner.Joint) { j.Eccentric.BoltOffset = 7 }, "eccentric.s_sym", "the preload alone leaves an edge of the interface open"},
		{"no depth", func(j *planner.Joint) { j.Eccentric.Depth = 0 }, "eccentric.depth", "the depth of the interface is 0 mm"},
		{"all hole", func(j *planner.Joint) { j.Eccentric.Width = 13 }, "eccentric.depth", "is no larger than the hole"},
	})
}

// The mean bolt force of a thread rolled after heat treatment holds what a working
// moment adds: F_Sm = F_Mmax + (Phi (F_A,max + F_A,min) + Phi_m (M_max + M_min))/2.
func TestMeanForceHoldsTheMoment(t *testing.T) {
	j := lever(t, 2, 15)
	j.Bolt.RolledAfter, j.Loads.Cycles = true, 2e6
	j.Eccentric.MomentHigh = 40000
	p := work(t, j)
	mean := p.Preload.Highest + (p.Stiffness.LoadFactor*9500+line(t, p, "Phi_m")*40000)/2
	assert.InEpsilon(t, mean/(940*line(t, p, "A_0")), line(t, p, "r_Sm"), 1e-12)
}
