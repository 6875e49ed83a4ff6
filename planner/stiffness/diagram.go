package stiffness

import "clampback/planner/quantity"

// Diagram is what the joint diagram is drawn from: forces in N, lengths in mm.
// The bolt line rises from the origin at 1/BoltCompliance, the clamped parts'
// line falls from the preload point at 1/ClampedCompliance.
type Diagram struct {
	BoltCompliance    float64        // delta_S, mm/N
	ClampedCompliance float64        // delta_P, mm/N
	Preload           quantity.Range // assembly preload that the setting gives
	Loss              float64        // embedding and thermal loss, N
	Axial             quantity.Range // operating force
	LoadFactor        float64        // Phi
	BoltShare         float64        // Phi F_Amax, N: added to the bolt
	ClampShare        float64        // (1 - Phi) F_Amax, N: taken from the clamp
	ResidualClamp     quantity.Range // left in service
	RequiredResidual  float64        // F_Kerf
	Limit             float64        // F_lim
}
