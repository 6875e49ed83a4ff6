package planner

import (
	"math"

	"clampback/friction"
)

// torsionRatio returns tau/sigma of the bolt's weakest section while it is
// tightened: 1.5 d_2/d_0 tan(phi + rho'), the fully plastic section modulus
// pi d_0^3/12 taken. VDI 2230-1:2015 R7. Lengths mm.
func torsionRatio(pitch, pitchDiameter, weakestDiameter, threadFriction float64) float64 {
	return 3 * friction.ThreadLever(pitch, pitchDiameter, threadFriction) / weakestDiameter
}

// YieldPreload returns the preload, N, at which tension and torsion together
// reach a share nu of the yield strength while tightening:
// nu R_p0.2 A_0/sqrt(1 + 3 (tau/sigma)^2). VDI 2230-1:2015 R7; the guideline
// prints it as F_M,Tab. Lengths mm, yield strength MPa.
func YieldPreload(pitch, pitchDiameter, weakestDiameter, threadFriction, utilisation, yieldStrength float64) float64 {
	ratio := torsionRatio(pitch, pitchDiameter, weakestDiameter, threadFriction)
	return utilisation * yieldStrength * circleArea(weakestDiameter) / math.Sqrt(1+3*ratio*ratio)
}

// workingPreload returns the largest preload, N, at which the bolt in service,
// with an extra force from load and temperature and a remaining share of the
// torsion, still stays within the yield force R_p0.2 A_0. VDI 2230-1:2015 R8
// solved for the preload: (F + extra)^2 + 3 (k_tau ratio F)^2 = yield^2.
func workingPreload(yieldForce, extra, torsion float64) float64 {
	if extra >= yieldForce {
		return 0
	}
	q := 1 + 3*torsion*torsion
	return (math.Sqrt(extra*extra+q*(yieldForce*yieldForce-extra*extra)) - extra) / q
}

func circleArea(diameter float64) float64 { return math.Pi / 4 * diameter * diameter }
