package quantity

// Range is a closed interval of one quantity, Low <= High. A single value is a
// range of no width. The unit is that of the field that holds the range.
type Range struct {
	Low  float64
	High float64
}

// Single returns the range of no width at v.
func Single(v float64) Range { return Range{Low: v, High: v} }

// Width returns High - Low.
func (r Range) Width() float64 { return r.High - r.Low }

// Middle returns the arithmetic middle of the range.
func (r Range) Middle() float64 { return r.Low + r.Width()/2 }

// IsSingle reports whether the range has no width.
func (r Range) IsSingle() bool { return r.Low == r.High }
