package stiffness

// StressPoint is a cyclic stress, MPa: it swings by an amplitude about a mean.
type StressPoint struct{ Mean, Amplitude float64 }

// Upper is the upper stress, sigma_o, MPa.
func (p StressPoint) Upper() float64 { return p.Mean + p.Amplitude }

// Lower is the lower stress, sigma_u, MPa.
func (p StressPoint) Lower() float64 { return p.Mean - p.Amplitude }

// FatigueDiagram is what the Haigh and the Smith diagram of a bolt's thread are drawn
// from. Stresses on the stress area, MPa.
type FatigueDiagram struct {
	RolledAfter bool          // thread rolled after heat treatment
	Yield       float64       // R_p0.2
	Spectrum    bool          // the load is a spectrum, and the operating point its largest amplitude
	Cycles      float64       // that Curve holds for
	Endured     float64       // cycles that Endurance holds for
	Operating   StressPoint   // in the thread, at the highest preload
	Limit       float64       // sigma_A: the amplitude of Curve at the operating mean stress
	LeastLimit  float64       // the same of Endurance
	Safety      float64       // S_D = sigma_A/sigma_a; 0 where nothing swings
	Demanded    float64       // least S_D; of a spectrum its damage is judged instead
	Curve       []StressPoint // limits at Cycles, by mean stress
	Endurance   []StressPoint // the same at Endured
}

// Endures reports whether the curve is the endurance limit itself.
func (d FatigueDiagram) Endures() bool { return d.Cycles >= d.Endured }
