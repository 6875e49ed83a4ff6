package quantity

import (
	"math"
	"strconv"
)

// A computed number carries rounding noise: a value this close to a multiple of
// the step counts as the multiple. The first is relative to the value, the
// second, in steps, keeps the first from growing with it.
const (
	noise     = 1e-12
	mostNoise = 1e-6
)

// RoundDown returns the largest multiple of step, which is above 0, not above v.
// Use it for upper limits: they then never move outwards.
func RoundDown(v, step float64) float64 {
	return multiple(math.Floor(v/step+slack(v/step)), step)
}

// RoundUp returns the smallest multiple of step, which is above 0, not below v.
// Use it for lower limits.
func RoundUp(v, step float64) float64 {
	return multiple(math.Ceil(v/step-slack(v/step)), step)
}

func slack(steps float64) float64 { return math.Min(noise*math.Abs(steps), mostNoise) }

// multiple returns n step. A decimal step is taken as the whole number that it is
// of a power of ten, so that three steps of 0.1 are the number written 0.3.
func multiple(n, step float64) float64 {
	for power := 1.0; power <= 1e6; power *= 10 {
		if whole := math.Round(step * power); whole/power == step {
			return n * whole / power
		}
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

// Format prints a value in the internal unit of its dimension as a person writes
// it: up to 6 significant digits, the unit after it, forces from 1000 N in kN.
// Parse reads it back.
func Format(v float64, d Dimension) string {
	name := map[Dimension]string{Length: "mm", Area: "mm2", Force: "N", Torque: "N.m", Pressure: "MPa", Angle: "deg",
		Temperature: "degC", Expansion: "um/m/K", Hardness: "HV"}[d]
	if d == Force && math.Abs(v) >= 1e3 {
		name = "kN"
	}
	u, ok := findUnit(name)
	if !ok {
		return short(v)
	}
	return short(v/u.factor) + " " + name
}

// short is Trim, but with an exponent where zeros would fill the line.
func short(v float64) string {
	if size := math.Abs(v); size >= 1e9 || (size < 1e-4 && v != 0) {
		return strconv.FormatFloat(v, 'g', 6, 64)
	}
	return Trim(v)
}

// Plain prints a number with 4 significant digits and without an exponent, as long
// as it is of a size that people read.
func Plain(v float64) string {
	if size := math.Abs(v); size >= 1000 && size < 1e12 {
		return strconv.FormatFloat(v, 'f', 0, 64)
	}
	return strconv.FormatFloat(v, 'g', 4, 64)
}
