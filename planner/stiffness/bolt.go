package stiffness

// Lengths that stand for the parts of a bolt that are not in the grip, as
// multiples of the thread diameter d. VDI 2230-1:2015, 5.1.1.
const (
	HexagonHeadLength   = 0.5  // l_SK/d, hexagon and flange heads
	SocketHeadLength    = 0.4  // l_SK/d, socket cap heads
	EngagedThreadLength = 0.5  // l_G/d
	NutThreadLength     = 0.4  // l_M/d of a nut
	TappedThreadLength  = 0.33 // l_M/d of a tapped part
)

// Rod returns the compliance of a cylinder in tension, mm/N: l/(E A). The bolt
// is a series of them, one a piece. length mm, area mm2, modulus MPa.
func Rod(length, area, modulus float64) float64 {
	return length / (modulus * area) // VDI 2230-1:2015, 5.1.1
}

// LoadFactor returns Phi, the share of a concentric axial load that the bolt
// carries: n delta_P/(delta_S + delta_P). Compliances in mm/N,
// introductionFactor n from 0 (load enters at the interface) to 1 (at head and
// nut).
func LoadFactor(introductionFactor, bolt, clamped float64) float64 {
	return introductionFactor * clamped / (bolt + clamped)
}
