package fastener

import (
	"fmt"
	"sync"

	"clampback/planner/table"
)

// FindHead returns the head of that kind ("hexagon", "hexagon flange",
// "socket cap") for the size of t. Fine threads have the dimensions of the
// coarse size and their own product standard.
func FindHead(kind string, t Thread) (Head, error) {
	found, err := heads().find(kind, t)
	if err != nil {
		return Head{}, err
	}
	return found.of(t), nil
}

// FindNut returns the nut of that kind ("hexagon", "hexagon flange") for the
// size of t.
func FindNut(kind string, t Thread) (Nut, error) {
	found, err := nuts().find(kind, t)
	if err != nil {
		return Nut{}, err
	}
	return found.of(t), nil
}

// FindWasher returns the washer of that standard for the size of t. A name
// without a hardness ("ISO 7089") is the 200 HV class.
func FindWasher(standard string, t Thread) (Washer, error) {
	return washers().find(standard, t)
}

// MediumHole returns the clearance hole of the medium series for t, mm
// (ISO 273).
func MediumHole(t Thread) (float64, error) {
	return holes().find("medium", t)
}

// ReferenceThreadLength returns b, mm: the thread length that the product
// standard of the head gives a bolt of that length, also in mm. ISO 4014 and
// the flange bolts have three bands of length, ISO 4762 one. Bolts shorter
// than their standard's shortest length are threaded to the head; here b then
// reaches or exceeds the length.
func ReferenceThreadLength(head Head, t Thread, length float64) float64 {
	switch {
	case t.Inch && length <= 6*mmPerInch:
		return 2*t.Diameter + mmPerInch/4 // ASME B18.2.1, from memory
	case t.Inch:
		return 2*t.Diameter + mmPerInch/2
	case head.Kind == "socket cap":
		return 2*t.Diameter + 12
	case length <= 125:
		return 2*t.Diameter + 6
	case length <= 200:
		return 2*t.Diameter + 12
	default:
		return 2*t.Diameter + 25
	}
}

// byPitch is a record whose product standard depends on the thread's pitch.
type byPitch[T any] struct{ coarse, fine T }

func (b byPitch[T]) of(t Thread) T {
	if t.Coarse {
		return b.coarse
	}
	return b.fine
}

var heads = sync.OnceValue(func() *catalogue[byPitch[Head]] {
	c := newCatalogue[byPitch[Head]]("head")
	for _, r := range table.Read(tables, "heads.csv") {
		coarse := Head{
			Kind:             r.Text("kind"),
			Standard:         r.Text("standard"),
			BearingDiameter:  r.Number("bearing_diameter_mm"),
			Height:           r.Number("height_mm"),
			WidthAcrossFlats: r.Number("width_across_flats_mm"),
			Source:           source(r),
		}
		fine := coarse
		fine.Standard = r.Text("standard_fine")
		c.add(coarse.Kind, r.Number("d_mm"), byPitch[Head]{coarse, fine})
	}
	for _, r := range table.Read(tables, "inch_heads.csv") {
		h := Head{
			Kind:             r.Text("kind"),
			Standard:         r.Text("standard"),
			BearingDiameter:  r.Number("bearing_diameter_in") * mmPerInch,
			Height:           r.Number("height_in") * mmPerInch,
			WidthAcrossFlats: r.Number("width_across_flats_in") * mmPerInch,
			Source:           r.Text("standard") + " (from memory)",
		}
		c.add(h.Kind, r.Number("d_in")*mmPerInch, byPitch[Head]{h, h})
	}
	return c
})

var nuts = sync.OnceValue(func() *catalogue[byPitch[Nut]] {
	c := newCatalogue[byPitch[Nut]]("nut")
	for _, r := range table.Read(tables, "nuts.csv") {
		coarse := Nut{
			Kind:             r.Text("kind"),
			Standard:         r.Text("standard"),
			BearingDiameter:  r.Number("bearing_diameter_mm"),
			Height:           r.Number("least_height_mm"),
			WidthAcrossFlats: r.Number("width_across_flats_mm"),
			Source:           source(r),
		}
		fine := coarse
		fine.Standard = r.Text("standard_fine")
		c.add(coarse.Kind, r.Number("d_mm"), byPitch[Nut]{coarse, fine})
	}
	for _, r := range table.Read(tables, "inch_nuts.csv") {
		n := Nut{
			Kind:             r.Text("kind"),
			Standard:         r.Text("standard"),
			BearingDiameter:  r.Number("bearing_diameter_in") * mmPerInch,
			Height:           r.Number("least_height_in") * mmPerInch,
			WidthAcrossFlats: r.Number("width_across_flats_in") * mmPerInch,
			Source:           r.Text("standard") + " (from memory)",
		}
		c.add(n.Kind, r.Number("d_in")*mmPerInch, byPitch[Nut]{n, n})
	}
	return c
})

var washers = sync.OnceValue(func() *catalogue[Washer] {
	c := newCatalogue[Washer]("washer")
	dimensions := map[string][]table.Row{}
	for _, r := range table.Read(tables, "washers.csv") {
		standard := r.Text("standard")
		dimensions[standard] = append(dimensions[standard], r)
	}
	for _, grade := range table.Read(tables, "washer_grades.csv") {
		for _, r := range dimensions[grade.Text("dimensions")] {
			c.add(grade.Text("name"), r.Number("d_mm"), Washer{
				Standard:         grade.Text("name"),
				InnerDiameter:    r.Number("inner_diameter_mm"),
				OuterDiameter:    r.Number("outer_diameter_mm"),
				Thickness:        r.Number("thickness_mm"),
				HardnessHV:       grade.Number("hardness_HV"),
				LimitingPressure: grade.Number("limiting_pressure_MPa"),
				Modulus:          grade.Number("modulus_MPa"),
				Expansion:        grade.Number("expansion_1_K"),
				Source:           fmt.Sprintf("%s; p_G %s", source(r), source(grade)),
			})
		}
	}
	for _, r := range table.Read(tables, "inch_washers.csv") {
		c.add("ASTM F436", r.Number("d_in")*mmPerInch, Washer{
			Standard:         "ASTM F436",
			InnerDiameter:    r.Number("inner_diameter_in") * mmPerInch,
			OuterDiameter:    r.Number("outer_diameter_in") * mmPerInch,
			Thickness:        r.Number("thickness_in") * mmPerInch,
			HardnessHV:       r.Number("hardness_HV"),
			LimitingPressure: r.Number("limiting_pressure_MPa"),
			Modulus:          205000,
			Expansion:        11.5e-6,
			Source:           "ASTM F436 (from memory); p_G that of ISO 7089 300 HV, a softer steel",
		})
	}
	return c
})

var holes = sync.OnceValue(func() *catalogue[float64] {
	c := newCatalogue[float64]("clearance hole series")
	for _, r := range table.Read(tables, "holes.csv") {
		c.add("medium", r.Number("d_mm"), r.Number("medium_mm"))
	}
	return c
})
