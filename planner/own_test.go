package planner_test

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// own marks all that a library may hold as the user's own, its numbers unchanged.
func own(t require.TestingT) planner.Joint {
	j := flange(t)
	nut, washer := *j.Nut, *j.HeadWasher
	nut.Own, washer.Own = true, true
	j.Nut, j.HeadWasher, j.NutWasher = &nut, &washer, &washer
	b := &j.Bolt
	b.Thread.Own, b.Head.Own, b.Class.Own = true, true, true
	b.Thread.Source = "library own.yaml: drawing 12"
	for i := range j.Parts {
		j.Parts[i].Material.Own = true
	}
	return j
}

// A user's own fasteners with the numbers of the standard's are planned alike; only
// what the tables know of heat, and a standard's thread length, is not known of them.
func TestOwnNumbersPlanAlike(t *testing.T) {
	want, got := work(t, flange(t)), work(t, own(t))
	require.Len(t, got.Trace, len(want.Trace))
	for i, l := range want.Trace {
		assert.Equal(t, l.Symbol, got.Trace[i].Symbol)
		assert.Equal(t, l.Value, got.Trace[i].Value, l.Symbol)
	}
	assert.Equal(t, want.Torque, got.Torque)
	assert.Equal(t, "library own.yaml: drawing 12", got.Trace[traceOf(t, got, "P")].Source)
	assumed := strings.Join(got.Assumptions, "\n")
	assert.Contains(t, assumed, "thread M12 has the 60 degree profile of ISO 68-1")
	assert.Contains(t, assumed, "head hexagon gives under load as a hexagon head does")
	assert.Contains(t, assumed, "nut hexagon gives under load as a hexagon nut does")
	assert.NotContains(t, strings.Join(want.Assumptions, "\n"), "gives under load")
}

func traceOf(t *testing.T, p planner.Plan, symbol string) int {
	for i, l := range p.Trace {
		if l.Symbol == symbol {
			return i
		}
	}
	require.Fail(t, "no trace line "+symbol)
	return 0
}

func TestWhatOwnPartsLeaveToTheJoint(t *testing.T) {
	hot := func(service float64) func(j *planner.Joint) {
		return func(j *planner.Joint) {
			j.Temperature = &planner.Temperature{Assembly: quantity.Single(20), Service: quantity.Single(service)}
			j.Bolt.HotModulus, j.Bolt.HotYield, j.Parts[0].HotModulus, j.Parts[1].HotModulus = 190e3, 800, 100e3, 190e3
			j.HeadWasher, j.NutWasher = nil, nil
		}
	}
	checkSpoils(t, own, []spoil{
		{"no shank", func(j *planner.Joint) { j.Bolt.Shank = nil }, "bolt.shank", "no standard gives the thread length"},
		{"low nut", func(j *planner.Joint) { j.Nut.Height = 9.5 }, "nut", "the nut is 9.5 mm high, less than 0.8 times the thread"},
		{"narrow nut", func(j *planner.Joint) { j.NutShear, j.Nut.WidthAcrossFlats, j.Bolt.Class.ShearRatio = 500, 16, 0.6 }, "nut", "the nut is 16 mm across flats"},
		{"shear strength of a class that slips", func(j *planner.Joint) {
			j.Clamp.Transverse, j.Clamp.InterfaceFriction, j.Bolt.Class.ShearRatio = 500, 0.2, 0
		}, "bolt.property_class", "the shear strength of class 10.9 is not known"},
		{"shear strength of a class in a tapped part", func(j *planner.Joint) {
			j.Nut, j.NutWasher, j.Tapped = nil, nil, &planner.Tapped{Material: j.Parts[0].Material, Depth: 60}
			j.Bolt.Class.ShearRatio = 0
		}, "bolt.property_class", "the shear strength of class 10.9 is not known"},
		{"no nut is strong enough", func(j *planner.Joint) { j.Bolt.Class.TensileStrength = 1221 }, "bolt.property_class",
			"more than any nut class of ISO 898-2 goes with"},
		{"hot class", func(j *planner.Joint) { hot(120)(j); j.Bolt.HotYield = 0 }, "temperature", "120 degC lies beyond the data for the yield strength of class 10.9"},
		{"hot modulus of the class", func(j *planner.Joint) { hot(120)(j); j.Bolt.HotModulus = 0 }, "temperature", "beyond the data for the modulus of class 10.9"},
		{"hot material", func(j *planner.Joint) { hot(120)(j); j.Parts[1].HotModulus = 0 }, "temperature", "beyond the data for the modulus of rail"},
		{"hot washer", func(j *planner.Joint) {
			hot(120)(j)
			j.NutWasher = own(t).NutWasher
		}, "temperature", "beyond the data for the modulus of the nut washer"},
	})
	j := own(t)
	j.Nut.Height, j.NutShear, j.Bolt.Class.ShearRatio = 9, 500, 0.6
	assert.Empty(t, j.Faults(), "a low nut whose strength is stated")
	hot(120)(&j)
	assert.Empty(t, j.Faults(), "all that is hot is stated")
}

// Nut classes by tensile strength: those of the standard bolts that each goes with,
// ISO 898-2 Table 1 and ISO 898-1 Table 3 (from memory).
func TestNutClassOfOwnClasses(t *testing.T) {
	for strength, want := range map[float64]string{400: "5", 520: "5", 521: "6", 800: "8", 830: "8", 1040: "10", 1150: "12", 1220: "12", 1221: ""} {
		c := fastener.PropertyClass{Name: "8.8 of the works", TensileStrength: strength, Own: true}
		assert.Equal(t, want, c.NutClass(), "%g MPa", strength)
	}
}

// Each impossible value of an entry is one fault at its key; the plain entries have
// none. The rules are geometry and the bounds stated in the code.
func TestFaultsOfOwnEntries(t *testing.T) {
	j := flange(t)
	m12 := j.Bolt.Thread
	check := func(name string, faults []planner.Fault, path, message string) {
		t.Helper()
		if path == "" {
			assert.Empty(t, faults, name)
			return
		}
		if assert.Len(t, faults, 1, name) {
			assert.Equal(t, path, faults[0].Path, name)
			assert.Contains(t, faults[0].Message, message, name)
			assert.NotEmpty(t, faults[0].Mend, name)
		}
	}
	thread := func(d, p float64) []planner.Fault {
		return planner.ThreadFaults(fastener.Thread{Diameter: d, Pitch: p})
	}
	check("thread", thread(12, 1.5), "", "")
	check("M1", thread(1, 0.25), "", "") // the steepest of ISO 261
	check("0.5 mm", thread(0.9, 0.2), "diameter", "it must lie between 0.99 mm and 355 mm")
	check("no pitch", thread(12, 0), "pitch", "the pitch is 0 mm")
	check("steep", thread(12, 4), "pitch", "a pitch of 4 mm is impossible on a diameter of 12 mm")
	check("NaN", thread(12, math.NaN()), "pitch", "the pitch is NaN mm")

	head := func(change func(h *fastener.Head)) []planner.Fault {
		h := j.Bolt.Head
		change(&h)
		return planner.HeadFaults(h, m12)
	}
	check("head", head(func(*fastener.Head) {}), "", "")
	check("head face", head(func(h *fastener.Head) { h.BearingDiameter = 12 }), "bearing_diameter", "not larger than the thread of 12 mm")
	check("head height", head(func(h *fastener.Head) { h.Height = -1 }), "height", "the height is -1 mm")
	check("head width", head(func(h *fastener.Head) { h.WidthAcrossFlats = 1e9 }), "width_across_flats", "it must lie between")

	nut := func(change func(n *fastener.Nut)) []planner.Fault {
		n := *j.Nut
		change(&n)
		return planner.NutFaults(n, m12)
	}
	check("nut", nut(func(*fastener.Nut) {}), "", "")
	check("nut face", nut(func(n *fastener.Nut) { n.BearingDiameter = 11 }), "bearing_diameter", "not larger than the thread of 12 mm")
	check("nut height", nut(func(n *fastener.Nut) { n.Height = 0 }), "height", "the height is 0 mm")
	check("nut width", nut(func(n *fastener.Nut) { n.WidthAcrossFlats = 12 }), "width_across_flats", "not larger than the thread of 12 mm")

	washer := func(change func(w *fastener.Washer)) []planner.Fault {
		w := *j.HeadWasher
		change(&w)
		return planner.WasherFaults(w, m12)
	}
	check("washer", washer(func(*fastener.Washer) {}), "", "")
	check("washer hole", washer(func(w *fastener.Washer) { w.InnerDiameter = 11.9 }), "inner_diameter", "smaller than the thread of 12 mm")
	check("washer rim", washer(func(w *fastener.Washer) { w.OuterDiameter = 13 }), "outer_diameter", "not larger than the inner one of 13 mm")
	check("washer size", washer(func(w *fastener.Washer) { w.OuterDiameter = 1e6 }), "outer_diameter", "must be at most")
	check("washer thickness", washer(func(w *fastener.Washer) { w.Thickness = 0 }), "thickness", "the thickness is 0 mm")
	check("washer hardness", washer(func(w *fastener.Washer) { w.HardnessHV = 5 }), "hardness", "the hardness is 5 HV; it must lie between 10 and 1500 HV")
	check("washer pressure", washer(func(w *fastener.Washer) { w.LimitingPressure = 0 }), "bearing_pressure", "0 MPa")
	check("washer modulus", washer(func(w *fastener.Washer) { w.Modulus = 0 }), "modulus", "0 MPa")

	class := func(change func(c *fastener.PropertyClass)) []planner.Fault {
		c := j.Bolt.Class
		change(&c)
		return planner.ClassFaults(c)
	}
	check("class", class(func(*fastener.PropertyClass) {}), "", "")
	check("class yield", class(func(c *fastener.PropertyClass) { c.YieldStrength = 0 }), "yield", "the yield strength is 0 MPa")
	check("class tensile", class(func(c *fastener.PropertyClass) { c.TensileStrength = 0 }), "tensile", "the tensile strength is 0 MPa")
	check("class above", class(func(c *fastener.PropertyClass) { c.YieldStrength = 1041 }), "yield", "is above the tensile strength of 1040 MPa")
	check("class shear", class(func(c *fastener.PropertyClass) { c.ShearRatio = 1.1 }), "shear_ratio", "1.1 times the tensile strength")
	check("class expansion", class(func(c *fastener.PropertyClass) { c.Expansion = 0.01 }), "expansion", "no material has that")

	metal := func(change func(m *fastener.Material)) []planner.Fault {
		m := j.Parts[0].Material
		change(&m)
		return planner.MaterialFaults(m)
	}
	check("material", metal(func(*fastener.Material) {}), "", "")
	check("material of which little is known", metal(func(m *fastener.Material) {
		m.LimitingPressure, m.ShearStrength, m.TensileStrength = 0, 0, 0
	}), "", "")
	check("material modulus", metal(func(m *fastener.Material) { m.Modulus = 1e9 }), "modulus", "it must lie between")
	check("material pressure", metal(func(m *fastener.Material) { m.LimitingPressure = -1 }), "bearing_pressure", "-1 MPa")
	check("material shear", metal(func(m *fastener.Material) { m.ShearStrength = -1 }), "shear_strength", "-1 MPa")
	check("material tensile", metal(func(m *fastener.Material) { m.TensileStrength = -1 }), "tensile_strength", "-1 MPa")
}
