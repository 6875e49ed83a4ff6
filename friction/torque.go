package friction

import "math"

// flankFactor is 1/cos(30 deg) as the guideline's tables round it; mu' =
// 1.155 mu_G is the friction on the 60 deg flank. VDI 2230-1:2015, R13.
const flankFactor = 1.155

// LeadAngle returns phi, the angle of the thread's helix at the pitch
// diameter, rad. pitch and pitchDiameter in mm.
func LeadAngle(pitch, pitchDiameter float64) float64 {
	return math.Atan(pitch / (math.Pi * pitchDiameter))
}

// FlankAngle returns rho', the angle of friction on the thread's flank, rad.
func FlankAngle(threadFriction float64) float64 {
	return math.Atan(flankFactor * threadFriction)
}

// ThreadLever returns the thread torque per clamp force, mm:
// d_2/2 tan(phi + rho'). It is the torque that twists the bolt.
func ThreadLever(pitch, pitchDiameter, threadFriction float64) float64 {
	return pitchDiameter / 2 * math.Tan(LeadAngle(pitch, pitchDiameter)+FlankAngle(threadFriction))
}

// BearingLever returns the torque lost under the turned face per clamp force,
// mm: mu_K D_Km/2 with D_Km the mean of the face's outer and inner diameter.
func BearingLever(outerDiameter, innerDiameter, headFriction float64) float64 {
	return headFriction * (outerDiameter + innerDiameter) / 4
}
