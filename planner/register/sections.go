package register

import (
	"errors"
	"fmt"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/quantity"
	"clampback/planner/table"
)

// inTable returns whether a table has a designation, for whatever thread.
func inTable[T any](find func(string, fastener.Thread) (T, error)) func(name string) bool {
	return func(name string) bool {
		for _, t := range []fastener.Thread{{}, {Inch: true}} {
			var unknown *table.UnknownError
			if _, err := find(name, t); !errors.As(err, &unknown) {
				return true
			}
		}
		return false
	}
}

func (l *library) readThreads(file libraryFile) {
	readSection(l, file, &l.threads, section[fastener.Thread]{
		key: "threads", one: "thread", keys: []string{"diameter", "pitch", "angle"},
		taken: func(name string) bool {
			_, err := fastener.ParseThread(name)
			return err == nil
		},
		read: readThread,
	})
}

// readParts reads every section but the threads.
func (l *library) readParts(file libraryFile) {
	readSection(l, file, &l.heads, section[fastener.Head]{
		key: "heads", one: "head", keys: []string{"bearing_diameter", "height", "width_across_flats"}, reserved: "stud", sized: true,
		taken: inTable(fastener.FindHead),
		read:  readOwnHead,
	})
	readSection(l, file, &l.nuts, section[fastener.Nut]{
		key: "nuts", one: "nut", keys: []string{"bearing_diameter", "height", "width_across_flats"}, sized: true,
		taken: inTable(fastener.FindNut),
		read:  readOwnNut,
	})
	readSection(l, file, &l.washers, section[fastener.Washer]{
		key: "washers", one: "washer", reserved: "none", sized: true,
		keys:  []string{"inner_diameter", "outer_diameter", "thickness", "hardness", "bearing_pressure", "modulus", "expansion"},
		taken: inTable(fastener.FindWasher),
		read:  readOwnWasher,
	})
	readSection(l, file, &l.classes, section[fastener.PropertyClass]{
		key: "property_classes", one: "property class", keys: []string{"yield", "tensile", "shear_ratio", "modulus", "expansion"},
		taken: inTable(fastener.FindClass),
		read:  readOwnClass,
	})
	readSection(l, file, &l.materials, section[fastener.Material]{
		key: "materials", one: "material",
		keys: []string{"modulus", "bearing_pressure", "expansion", "shear_strength", "tensile_strength"},
		taken: func(name string) bool {
			_, err := fastener.FindMaterial(name)
			return err == nil
		},
		read: readOwnMaterial,
	})
}

// must returns the quantity of a key that an entry needs.
func (e entryOf) must(key string, dim quantity.Dimension, example string) float64 {
	e.require(key, example)
	return e.one(key, dim)
}

func readThread(e entryOf) (fastener.Thread, []planner.Fault) {
	t := fastener.Thread{
		Designation: e.name, Own: true, Source: e.source,
		Diameter: e.must("diameter", quantity.Length, "12 mm"), Pitch: e.must("pitch", quantity.Length, "1.5 mm"),
	}
	const profile = 60.0 // deg, ISO 68-1
	if angle := e.some("angle", quantity.Angle); angle != 0 && angle != profile {
		e.at("angle").wrong(fmt.Sprintf("threads of %g deg are not planned by this version", angle),
			"leave out threads that have not the 60 degree profile of ISO 68-1")
	}
	return t, planner.ThreadFaults(t)
}

func readOwnHead(e entryOf) (fastener.Head, []planner.Fault) {
	h := fastener.Head{
		Kind: e.name, Standard: e.origin, Source: e.source, Own: true,
		BearingDiameter:  e.must("bearing_diameter", quantity.Length, "17.2 mm"),
		Height:           e.must("height", quantity.Length, "12 mm"),
		WidthAcrossFlats: e.must("width_across_flats", quantity.Length, "18 mm"),
	}
	return h, planner.HeadFaults(h, e.thread)
}

func readOwnNut(e entryOf) (fastener.Nut, []planner.Fault) {
	n := fastener.Nut{
		Kind: e.name, Standard: e.origin, Source: e.source, Own: true,
		BearingDiameter:  e.must("bearing_diameter", quantity.Length, "17.2 mm"),
		Height:           e.must("height", quantity.Length, "10.4 mm"),
		WidthAcrossFlats: e.must("width_across_flats", quantity.Length, "18 mm"),
	}
	return n, planner.NutFaults(n, e.thread)
}

func readOwnWasher(e entryOf) (fastener.Washer, []planner.Fault) {
	w := fastener.Washer{
		Standard: e.name, Source: e.source, Own: true,
		InnerDiameter:    e.must("inner_diameter", quantity.Length, "13 mm"),
		OuterDiameter:    e.must("outer_diameter", quantity.Length, "24 mm"),
		Thickness:        e.must("thickness", quantity.Length, "2.5 mm"),
		HardnessHV:       e.some("hardness", quantity.Hardness),
		LimitingPressure: e.must("bearing_pressure", quantity.Pressure, "760 MPa"),
		Modulus:          e.must("modulus", quantity.Pressure, "205 GPa"),
		Expansion:        e.must("expansion", quantity.Expansion, "11.5 um/m/K"),
	}
	return w, planner.WasherFaults(w, e.thread)
}

func readOwnClass(e entryOf) (fastener.PropertyClass, []planner.Fault) {
	c := fastener.PropertyClass{
		Name: e.name, Source: e.source, Own: true,
		YieldStrength:   e.must("yield", quantity.Pressure, "940 MPa"),
		TensileStrength: e.must("tensile", quantity.Pressure, "1040 MPa"),
		ShearRatio:      e.some("shear_ratio", quantity.Ratio),
		Modulus:         e.must("modulus", quantity.Pressure, "205 GPa"),
		Expansion:       e.must("expansion", quantity.Expansion, "11.5 um/m/K"),
	}
	return c, planner.ClassFaults(c)
}

func readOwnMaterial(e entryOf) (fastener.Material, []planner.Fault) {
	m := fastener.Material{
		Name: e.name, Source: e.source, Own: true,
		Modulus:          e.must("modulus", quantity.Pressure, "205 GPa"),
		LimitingPressure: e.some("bearing_pressure", quantity.Pressure),
		Expansion:        e.must("expansion", quantity.Expansion, "11.5 um/m/K"),
		ShearStrength:    e.some("shear_strength", quantity.Pressure),
		TensileStrength:  e.some("tensile_strength", quantity.Pressure),
	}
	return m, planner.MaterialFaults(m)
}
