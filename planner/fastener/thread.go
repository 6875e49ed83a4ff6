package fastener

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"sync"

	"clampback/planner/table"
)

// Thread is an ISO metric screw thread, ISO 68-1/ISO 261, or a unified inch thread,
// ASME B1.1, which has the same profile. Metric diameters are rounded to 3 decimals, as
// ISO 724 prints them and the guideline's tables use them; inch ones are not.
type Thread struct {
	Designation string  // "M12", "M12x1.25", "1/2-13 UNC"
	Diameter    float64 // d, mm
	Pitch       float64 // P, mm
	Coarse      bool
	Inch        bool // unified: the stress area is ASME B1.1's

	Own    bool   // of a user's own library, with the same profile
	Source string // of an own thread; else from ISO 261 or ASME B1.1
}

// ParseThread reads a designation of ISO 965-1: "M12" is the coarse thread,
// "M12x1.25" a fine one. X, × and blanks about the sign are read too, and the
// coarse pitch may be written out. A size without that pitch is a plain error
// that names the pitches there are; anything else that is not in ISO 261 from M3 to
// M100 or ASME B1.1 is a *table.UnknownError. An inch designation may leave its series out
// where size and pitch say which it is.
func ParseThread(designation string) (Thread, error) {
	series := threads()
	if inch, found := series.byName[inchName(designation)]; found && inch.Inch {
		return inch, nil
	}
	size, pitch, fine := strings.Cut(multiplication.Replace(strings.TrimSpace(designation)), "x")
	name := strings.TrimRight(size, " ")
	if fine {
		name += "x" + strings.TrimLeft(pitch, " ")
	}
	if t, found := series.byName[name]; found {
		return t, nil
	}
	diameter, _, _ := strings.Cut(name, "x")
	if pitches, found := series.pitches[diameter]; found {
		return Thread{}, fmt.Errorf("thread %s has no pitch %q: ISO 261 has %s", diameter, strings.TrimSpace(pitch),
			strings.Join(pitches, ", "))
	}
	return Thread{}, &table.UnknownError{Kind: "thread", Name: designation, Known: series.names}
}

// multiplication maps the signs people write to the one ISO 965-1 prints.
var multiplication = strings.NewReplacer("X", "x", "×", "x")

// threadSeries is the thread table, ready for lookups.
type threadSeries struct {
	names   []string            // designations in table order
	byName  map[string]Thread   // also by the coarse thread's written-out pitch
	pitches map[string][]string // of a size such as "M12", coarse first

	inchSizes []inchSize
}

var threads = sync.OnceValue(func() threadSeries {
	s := threadSeries{byName: map[string]Thread{}, pitches: map[string][]string{}}
	for _, r := range table.Read(tables, "threads.csv") {
		size := "M" + r.Text("d_mm")
		full := size + "x" + r.Text("pitch_mm")
		t := Thread{
			Designation: full,
			Diameter:    r.Number("d_mm"),
			Pitch:       r.Number("pitch_mm"),
			Coarse:      r.Text("series") == "coarse",
		}
		pitch := r.Text("pitch_mm")
		if t.Coarse {
			t.Designation = size
			pitch += " (coarse)"
		}
		s.names = append(s.names, t.Designation)
		s.pitches[size] = append(s.pitches[size], pitch)
		s.byName[t.Designation] = t
		s.byName[full] = t
	}
	for _, r := range table.Read(tables, "inch_threads.csv") {
		t := Thread{
			Designation: r.Text("size") + "-" + r.Text("threads_per_inch") + " " + r.Text("series"),
			Diameter:    r.Number("diameter_in") * mmPerInch,
			Pitch:       mmPerInch / r.Number("threads_per_inch"),
			Coarse:      r.Text("series") == "UNC",
			Inch:        true,
		}
		s.names = append(s.names, t.Designation)
		s.byName[t.Designation] = t
		bare, _, _ := strings.Cut(t.Designation, " UN")
		s.byName[bare] = t
		s.inchSizes = append(s.inchSizes, inchSize{t.Diameter, r.Text("size")})
	}
	return s
})

const mmPerInch = 25.4

// inchName brings an inch designation to the way the table writes it: "1-1/4-8UN" is
// "1 1/4-8 UN".
func inchName(designation string) string {
	name := strings.Join(strings.Fields(strings.ReplaceAll(designation, "UN", " UN")), " ")
	if size, rest, found := strings.Cut(name, "-"); found && !strings.Contains(size, "/") && strings.Contains(rest, "/") {
		name = size + " " + rest
	}
	return name
}

// inchSize is a diameter in mm and its name in inches.
type inchSize struct {
	diameter float64
	name     string
}

// fundamentalTriangle is H of ISO 68-1, mm.
func (t Thread) fundamentalTriangle() float64 { return math.Sqrt(3) / 2 * t.Pitch }

// PitchDiameter returns d2 = d - 3/4 H, mm (ISO 724).
func (t Thread) PitchDiameter() float64 {
	return t.rounded(t.Diameter - 3.0/4*t.fundamentalTriangle())
}

// MinorDiameter returns d3 = d - 17/12 H, mm: the root of the bolt's thread
// with a root radius of H/6 (ISO 898-1).
func (t Thread) MinorDiameter() float64 {
	return t.rounded(t.Diameter - 17.0/12*t.fundamentalTriangle())
}

// NutMinorDiameter returns D1 = d - 5/4 H, mm (ISO 724).
func (t Thread) NutMinorDiameter() float64 {
	return t.rounded(t.Diameter - 5.0/4*t.fundamentalTriangle())
}

// StressDiameter returns d0, mm, the diameter of the stress area: (d2 + d3)/2
// (ISO 898-1), of an inch thread d - 0.9743 P (ASME B1.1).
func (t Thread) StressDiameter() float64 {
	if t.Inch {
		return t.Diameter - 0.9743*t.Pitch
	}
	return (t.PitchDiameter() + t.MinorDiameter()) / 2
}

// StressArea returns A_S = pi/4 d0^2, mm2 (ISO 898-1).
func (t Thread) StressArea() float64 { return circleArea(t.StressDiameter()) }

// NominalArea returns A_N = pi/4 d^2, mm2.
func (t Thread) NominalArea() float64 { return circleArea(t.Diameter) }

// MinorArea returns A_d3 = pi/4 d3^2, mm2.
func (t Thread) MinorArea() float64 { return circleArea(t.MinorDiameter()) }

// rounded is a diameter as the standard has it: of metric threads to the micrometre.
func (t Thread) rounded(mm float64) float64 {
	if t.Inch {
		return mm
	}
	return math.Round(mm*1000) / 1000
}

func circleArea(diameter float64) float64 { return math.Pi / 4 * diameter * diameter }

// isInchSize reports whether a diameter is one of the inch threads.
func isInchSize(diameter float64) bool {
	return slices.ContainsFunc(threads().inchSizes, func(s inchSize) bool { return s.diameter == diameter })
}

// nominal names the size without its pitch: "M12", "1/2 in".
func nominal(diameter float64) string {
	for _, s := range threads().inchSizes {
		if s.diameter == diameter {
			return s.name + " in"
		}
	}
	return "M" + strconv.FormatFloat(diameter, 'f', -1, 64)
}
