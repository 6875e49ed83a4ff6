package fastener

import (
	"slices"
	"sync"

	"clampback/planner/table"
)

// FindClass returns the strength of a property class or grade at the size of t: of ISO
// 898-1 (8.8 has two bands of size, 9.8 ends at 16 mm; beyond M39 the standard does not
// apply and the record's source says so), ISO 3506-1, SAE J429, ASTM A193, A320, A574.
// Metric classes go with metric threads, SAE grades and A574 with inch threads.
func FindClass(name string, t Thread) (PropertyClass, error) {
	return classes().find(name, t)
}

// FindMaterial returns the material of that name, or a *table.UnknownError.
func FindMaterial(name string) (Material, error) {
	library := materials()
	if m, found := library.byName[name]; found {
		return m, nil
	}
	return Material{}, &table.UnknownError{Kind: "material", Name: name, Known: library.names}
}

// MaterialNames returns the names of the library in table order; the slice is
// the caller's own.
func MaterialNames() []string { return slices.Clone(materials().names) }

// classes spreads each band of sizes over the thread sizes in it, so that a
// lookup is one step and the error names sizes.
var classes = sync.OnceValue(func() *catalogue[PropertyClass] {
	c := newCatalogue[PropertyClass]("property class")
	diameters := nominalDiameters()
	for _, r := range table.Read(tables, "classes.csv") {
		class := PropertyClass{
			Name:            r.Text("name"),
			TensileStrength: r.Number("tensile_strength_MPa"),
			YieldStrength:   r.Number("yield_strength_MPa"),
			ProofStress:     r.Number("proof_stress_MPa"),
			ShearRatio:      r.Number("shear_ratio"),
			Modulus:         r.Number("modulus_MPa"),
			Expansion:       r.Number("expansion_1_K"),
			Source:          source(r),
		}
		over, upTo := r.Number("over_mm"), r.Number("up_to_mm")
		for _, d := range diameters {
			system := r.Text("threads")
			if over < d && d <= upTo && (system == "both" || (system == "inch") == isInchSize(d)) {
				c.add(class.Name, d, class)
			}
		}
	}
	return c
})

// nominalDiameters returns the sizes of the thread table, ascending, mm.
func nominalDiameters() []float64 {
	var all []float64
	for _, name := range threads().names {
		if d := threads().byName[name].Diameter; !slices.Contains(all, d) {
			all = append(all, d)
		}
	}
	return all
}

// materialLibrary is the material table, ready for lookups.
type materialLibrary struct {
	names  []string // in table order
	byName map[string]Material
}

var materials = sync.OnceValue(func() materialLibrary {
	l := materialLibrary{byName: map[string]Material{}}
	for _, r := range table.Read(tables, "materials.csv") {
		m := Material{
			Name:             r.Text("name"),
			Modulus:          r.Number("modulus_MPa"),
			LimitingPressure: r.Number("limiting_pressure_MPa"),
			Expansion:        r.Number("expansion_1_K"),
			ShearStrength:    r.Number("shear_strength_MPa"),
			TensileStrength:  r.Number("tensile_strength_MPa"),
			Source:           source(r),
		}
		l.names = append(l.names, m.Name)
		l.byName[m.Name] = m
	}
	return l
})
