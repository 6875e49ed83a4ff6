package quantity

import (
	"slices"
	"strings"
)

// Dimension is what a number measures; it decides which units may follow it.
type Dimension int

// The dimensions, with the internal unit of each.
const (
	Number      Dimension = iota // plain number, no unit
	Ratio                        // plain ratio; may be written in %
	Length                       // mm
	Area                         // mm2
	Force                        // N
	Torque                       // N.mm
	Pressure                     // MPa
	Angle                        // deg
	Temperature                  // degC
	Expansion                    // 1/K
	Hardness                     // HV
)

// dimensions says for each dimension how an error names it and an example.
var dimensions = map[Dimension]struct{ name, example string }{
	Number:      {"plain number", "8"},
	Ratio:       {"ratio", "0.12 or 12 %"},
	Length:      {"length", "12 mm"},
	Area:        {"area", "2400 mm2"},
	Force:       {"force", "12 kN"},
	Torque:      {"torque", "80 N.m"},
	Pressure:    {"pressure or stress", "10 bar or 900 MPa"},
	Angle:       {"angle", "30 deg"},
	Temperature: {"temperature", "90 degC"},
	Expansion:   {"thermal expansion", "11.5 um/m/K"},
	Hardness:    {"hardness", "300 HV"},
}

// String names the dimension as error messages do.
func (d Dimension) String() string { return dimensions[d].name }

// oneOf names the dimension with its article: "a force", "an angle".
func (d Dimension) oneOf() string {
	name := d.String()
	if strings.IndexByte("aeiou", name[0]) >= 0 {
		return "an " + name
	}
	return "a " + name
}

// Example returns a quantity of the dimension as it is written.
func (d Dimension) Example() string { return dimensions[d].example }

// unit is a unit by the factor that brings it to the internal unit; offset is
// added after the factor.
type unit struct {
	name      string
	dimension Dimension
	factor    float64
	offset    float64
}

// The exact factors of SI: 1 in = 25.4 mm, 1 lb = 0.45359237 kg, standard gravity
// 9.80665 m/s2, so 1 lbf = 4.4482216152605 N. NIST SP 811, appendix B.
const (
	inch       = 25.4
	poundForce = 0.45359237 * 9.80665
	psi        = poundForce / (inch * inch)
)

// units are all units, in the order in which errors list them.
var units = []unit{
	{"mm", Length, 1, 0},
	{"um", Length, 1e-3, 0},
	{"m", Length, 1e3, 0},
	{"in", Length, inch, 0},
	{"mm2", Area, 1, 0},
	{"cm2", Area, 100, 0},
	{"in2", Area, inch * inch, 0},
	{"N", Force, 1, 0},
	{"kN", Force, 1e3, 0},
	{"lbf", Force, poundForce, 0},
	{"kip", Force, 1e3 * poundForce, 0},
	{"N.m", Torque, 1e3, 0},
	{"N.mm", Torque, 1, 0},
	{"lbf.ft", Torque, poundForce * 12 * inch, 0},
	{"lbf.in", Torque, poundForce * inch, 0},
	{"MPa", Pressure, 1, 0},
	{"GPa", Pressure, 1e3, 0},
	{"bar", Pressure, 0.1, 0},
	{"psi", Pressure, psi, 0},
	{"ksi", Pressure, 1e3 * psi, 0},
	{"deg", Angle, 1, 0},
	{"degC", Temperature, 1, 0},
	{"degF", Temperature, 5.0 / 9, -160.0 / 9},
	{"K", Temperature, 1, -273.15},
	{"um/m/K", Expansion, 1e-6, 0},
	{"1/K", Expansion, 1, 0},
	{"HV", Hardness, 1, 0},
	{"%", Ratio, 0.01, 0},
}

// spellings are units that people write otherwise; they are not accepted, but
// the error says how to write them.
var spellings = map[string]string{
	"Nm": "N.m", "N·m": "N.m", "N*m": "N.m", "Nmm": "N.mm", "ft.lbf": "lbf.ft", "ft.lb": "lbf.ft", "lb.ft": "lbf.ft",
	"ft-lb": "lbf.ft", "in.lbf": "lbf.in", "in-lb": "lbf.in", "lb.in": "lbf.in", "lb": "lbf", "µm": "um", "μm": "um",
	"micron": "um", "°": "deg", "°C": "degC", "C": "degC", "°F": "degF", "F": "degF", "inch": "in", "\"": "in", "N/mm2": "MPa",
	"N/mm²": "MPa", "mm²": "mm2", "cm²": "cm2", "kpsi": "ksi", "percent": "%", "KN": "kN", "kn": "kN", "mpa": "MPa", "MM": "mm",
	"degrees": "deg", "degree": "deg", "mm^2": "mm2", "cm^2": "cm2", "in^2": "in2", "N/mm^2": "MPa", "lbs": "lbf", "lbf-ft": "lbf.ft",
	"lbf-in": "lbf.in", "ft-lbf": "lbf.ft", "in-lbf": "lbf.in", "µm/m/K": "um/m/K", "μm/m/K": "um/m/K", "ppm/K": "um/m/K",
	"um/(m.K)": "um/m/K", "1/degC": "1/K", "/K": "1/K", "K^-1": "1/K", "Celsius": "degC",
}

func findUnit(name string) (unit, bool) {
	i := slices.IndexFunc(units, func(u unit) bool { return u.name == name })
	if i < 0 {
		return unit{}, false
	}
	return units[i], true
}

// unitsOf lists the units of a dimension: "mm, um, m or in".
func unitsOf(d Dimension) string {
	var names []string
	for _, u := range units {
		if u.dimension == d {
			names = append(names, u.name)
		}
	}
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	return strings.Join(names[:len(names)-1], ", ") + " or " + names[len(names)-1]
}
