package fastener

// Thread is an ISO metric screw thread, ISO 68-1/ISO 261. Diameters are
// rounded to 3 decimals, as ISO 724 prints them and the guideline's tables
// use them.
type Thread struct {
	Designation string  // "M12", "M12x1.25"
	Diameter    float64 // d, mm
	Pitch       float64 // P, mm
	Coarse      bool
}
