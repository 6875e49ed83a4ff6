package quantity

import (
	"math"
	"strconv"
)

// noise is the relative rounding noise of a computed number: a value that close
// to a multiple of the step counts as the multiple.
const noise = 1e-12

// RoundDown returns the largest multiple of step not above v. Use it for upper
// limits: they then never move outwards.
func RoundDown(v, step float64) float64 {
	return multiple(math.Floor(v/step+noise*math.Abs(v/step)), step)
}

// RoundUp returns the smallest multiple of step not below v. Use it for lower
// limits.
func RoundUp(v, step float64) float64 {
	return multiple(math.Ceil(v/step-noise*math.Abs(v/step)), step)
}

// multiple returns n step; for steps below 1 by division, so that 0.1 steps give
// the nearest number to the decimal one.
func multiple(n, step float64) float64 {
	if inverse := 1 / step; step < 1 && inverse == math.Round(inverse) {
		return n / inverse
	}
	return n * step
}

// Trim prints a number with up to 6 significant digits and no trailing zeros:
// a setting such as 83 or 9.5.
func Trim(v float64) string {
	if v == 0 {
		return "0" // also for -0
	}
	return strconv.FormatFloat(roundTo6(v), 'f', -1, 64)
}

func roundTo6(v float64) float64 {
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'e', 5, 64), 64)
	if err != nil {
		return v
	}
	return r
}
