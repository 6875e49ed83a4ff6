package fastener

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"sync"

	"clampback/planner/table"
)

// Thread is an ISO metric screw thread, ISO 68-1/ISO 261. Diameters are
// rounded to 3 decimals, as ISO 724 prints them and the guideline's tables
// use them.
type Thread struct {
	Designation string  // "M12", "M12x1.25"
	Diameter    float64 // d, mm
	Pitch       float64 // P, mm
	Coarse      bool

	Own    bool   // of a user's own library, with the same profile
	Source string // of an own thread; else ISO 261
}

// ParseThread reads a designation of ISO 965-1: "M12" is the coarse thread,
// "M12x1.25" a fine one. X, × and blanks about the sign are read too, and the
// coarse pitch may be written out. A size without that pitch is a plain error
// that names the pitches there are; anything else that is not in ISO 261 from
// M3 to M64 is an *UnknownError.
func ParseThread(designation string) (Thread, error) {
	series := threads()
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
	return Thread{}, &UnknownError{Kind: "thread", Name: designation, Known: series.names}
}

// multiplication maps the signs people write to the one ISO 965-1 prints.
var multiplication = strings.NewReplacer("X", "x", "×", "x")

// threadSeries is the thread table, ready for lookups.
type threadSeries struct {
	names   []string            // designations in table order
	byName  map[string]Thread   // also by the coarse thread's written-out pitch
	pitches map[string][]string // of a size such as "M12", coarse first
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
	return s
})

// fundamentalTriangle is H of ISO 68-1, mm.
func (t Thread) fundamentalTriangle() float64 { return math.Sqrt(3) / 2 * t.Pitch }

// PitchDiameter returns d2 = d - 3/4 H, mm (ISO 724).
func (t Thread) PitchDiameter() float64 {
	return roundToMicrometre(t.Diameter - 3.0/4*t.fundamentalTriangle())
}

// MinorDiameter returns d3 = d - 17/12 H, mm: the root of the bolt's thread
// with a root radius of H/6 (ISO 898-1).
func (t Thread) MinorDiameter() float64 {
	return roundToMicrometre(t.Diameter - 17.0/12*t.fundamentalTriangle())
}

// NutMinorDiameter returns D1 = d - 5/4 H, mm (ISO 724).
func (t Thread) NutMinorDiameter() float64 {
	return roundToMicrometre(t.Diameter - 5.0/4*t.fundamentalTriangle())
}

// StressDiameter returns d0 = (d2 + d3)/2, mm: the diameter of the stress
// area (ISO 898-1).
func (t Thread) StressDiameter() float64 { return (t.PitchDiameter() + t.MinorDiameter()) / 2 }

// StressArea returns A_S = pi/4 d0^2, mm2 (ISO 898-1).
func (t Thread) StressArea() float64 { return circleArea(t.StressDiameter()) }

// NominalArea returns A_N = pi/4 d^2, mm2.
func (t Thread) NominalArea() float64 { return circleArea(t.Diameter) }

// MinorArea returns A_d3 = pi/4 d3^2, mm2.
func (t Thread) MinorArea() float64 { return circleArea(t.MinorDiameter()) }

func roundToMicrometre(mm float64) float64 { return math.Round(mm*1000) / 1000 }

func circleArea(diameter float64) float64 { return math.Pi / 4 * diameter * diameter }

// nominal names the size without its pitch: "M12".
func nominal(diameter float64) string {
	return "M" + strconv.FormatFloat(diameter, 'f', -1, 64)
}
