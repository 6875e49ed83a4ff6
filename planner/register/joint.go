package register

import (
	"errors"
	"slices"

	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/quantity"
	"clampback/planner/table"
)

// jointKeys are the keys of a joint, and so of defaults.
var jointKeys = []string{
	"id", "name", "count", "pattern", "bolt", "nut", "tapped", "washers", "clamped", "clamp", "loads", "group",
	"eccentric", "losses", "temperature", "friction", "tightening", "surfaces", "safety",
}

// joint reads one joint, already merged with the defaults.
func (d *decoder) joint(n *node) planner.Joint {
	o := field{d, n, "the joint", ""}.object(jointKeys...)
	var j planner.Joint
	if o.require("id", "A-010") {
		j.ID = o.at("id").text()
	}
	if o.require("name", "what the joint connects") {
		j.Name = o.at("name").label()
	}
	if o.require("count", "8") {
		j.Count = o.at("count").whole()
	}
	if o.require("bolt", "{thread: M12, length: 60 mm, head: hexagon, property_class: 10.9}") {
		j.Bolt = readBolt(o.at("bolt"))
	}
	readEnds(o, &j)
	if o.require("clamped", "[{part: ..., material: ..., thickness: ..., hole: ..., outer_diameter: ...}]") {
		j.Parts = readParts(o.at("clamped"))
	}
	if o.require("clamp", "{residual: 12 kN}") {
		j.Clamp = readClamp(o.at("clamp"))
	}
	if o.stated("temperature") {
		j.Temperature = readTemperature(o.at("temperature"))
	}
	if o.require("friction", "{thread: 0.10 to 0.14, head: 0.09 to 0.13}") {
		j.Friction = readFriction(o.at("friction"))
	}
	if o.stated("tightening") {
		j.Tightening = readTightening(o.at("tightening"))
	}
	if o.stated("surfaces") {
		j.Roughness = readSurfaces(o.at("surfaces"))
	}
	if o.stated("eccentric") {
		j.Eccentric = readEccentric(o.at("eccentric"))
	}
	if o.stated("safety") {
		j.Safety = readSafety(o.at("safety"))
	}
	if o.stated("losses") {
		j.Losses = readLosses(o.at("losses"))
	}
	if o.stated("pattern") {
		j.Pattern = readPattern(o.at("pattern"), j.Count)
	}
	readAllLoads(o, &j) // after the pattern, over which a group's are shared out
	return j
}

func readBolt(f field) planner.Bolt {
	o := f.object("thread", "length", "head", "property_class", "shank", "segments", "rolled", "hot_modulus", "hot_yield")
	var b planner.Bolt
	if o.require("thread", "M12") {
		b.Thread = lookUp(o.at("thread"), o.d.library.findThread)
	}
	if o.require("length", "60 mm") {
		b.Length = o.at("length").quantity(quantity.Length)
	}
	readHead(o, &b)
	if o.stated("shank") {
		shank := o.at("shank").quantity(quantity.Length)
		b.Shank = &shank
	}
	if o.stated("rolled") {
		b.RolledAfter = o.at("rolled").choice("before heat treatment", "after heat treatment") == "after heat treatment"
	}
	b.HotModulus, b.HotYield = o.some("hot_modulus", quantity.Pressure), o.some("hot_yield", quantity.Pressure)
	if !o.stated("segments") {
		return b
	}
	for _, item := range o.at("segments").items("segment") {
		s := item.object("length", "diameter")
		s.require("length", "20 mm")
		s.require("diameter", "10 mm")
		b.Segments = append(b.Segments, planner.Segment{
			Length: s.one("length", quantity.Length), Diameter: s.one("diameter", quantity.Length),
		})
	}
	return b
}

// readHead reads head and property class, which are looked up at the thread's
// size; where that could not be read, they are not.
func readHead(o *object, b *planner.Bolt) {
	hasHead, hasClass := o.require("head", "hexagon"), o.require("property_class", `"10.9"`)
	if hasHead && o.word("head") == "stud" {
		b.Head.Kind = "stud" // the rest comes from its nut
		hasHead = false
	}
	if b.Thread.Diameter == 0 {
		return
	}
	if hasHead {
		b.Head = lookUp(o.at("head"), func(kind string) (fastener.Head, error) {
			head, err := o.d.library.findHead(kind, b.Thread)
			var unknown *table.UnknownError
			if errors.As(err, &unknown) {
				unknown.Known = append(slices.Clone(unknown.Known), "stud")
			}
			return head, err
		})
	}
	if hasClass {
		b.Class = lookUp(o.at("property_class"), func(name string) (fastener.PropertyClass, error) {
			return o.d.library.findClass(name, b.Thread)
		})
	}
}

// readEnds reads what the bolt goes into and the washers. A nut that is not
// looked up for want of a thread is still a nut.
func readEnds(o *object, j *planner.Joint) {
	t := j.Bolt.Thread
	sized := t.Diameter > 0
	if o.stated("nut") {
		readNut(o.at("nut"), j, sized)
	}
	if o.stated("tapped") {
		tapped := o.at("tapped").object("material", "depth", "outer_diameter", "insert")
		j.Tapped = &planner.Tapped{}
		if tapped.require("material", "S355") {
			j.Tapped.Material = readMaterial(tapped.at("material"))
		}
		if tapped.require("depth", "24 mm") {
			j.Tapped.Depth = tapped.at("depth").quantity(quantity.Length)
		}
		j.Tapped.OuterDiameter = tapped.some("outer_diameter", quantity.Length)
		if tapped.stated("insert") {
			j.Tapped.Insert = readInsert(tapped.at("insert"))
		}
	}
	if j.Bolt.Head.Kind == "stud" {
		setStud(o, j)
	}
	if !o.stated("washers") {
		return
	}
	washers := o.at("washers").object("head", "nut")
	washer := func(key string) *fastener.Washer {
		if !washers.stated(key) || washers.word(key) == "none" {
			return nil
		}
		w := &fastener.Washer{}
		if sized {
			*w = lookUp(washers.at(key), func(name string) (fastener.Washer, error) { return o.d.library.findWasher(name, t) })
		}
		return w
	}
	j.HeadWasher, j.NutWasher = washer("head"), washer("nut")
}

// nutClasses are those of ISO 898-2 and ISO 3506-2, and the grades that ASTM and SAE
// bolts go with.
var nutClasses = []string{"5", "6", "8", "9", "10", "12", "A2-50", "A2-70", "A2-80", "A4-50", "A4-70", "A4-80", "2H",
	"SAE grade 2", "SAE grade 5", "SAE grade 8"}

// readNut reads a nut: its kind, or a mapping that says more.
func readNut(f field, j *planner.Joint, sized bool) {
	t := j.Bolt.Thread
	find := func(f field) *fastener.Nut {
		n := &fastener.Nut{}
		if sized {
			*n = lookUp(f, func(kind string) (fastener.Nut, error) { return f.d.library.findNut(kind, t) })
		}
		return n
	}
	if f.node.kind != mapping {
		j.Nut = find(f)
		return
	}
	o := f.object("kind", "class", "shear_strength", "lock")
	j.Nut = &fastener.Nut{}
	if o.require("kind", "hexagon") {
		j.Nut = find(o.at("kind"))
	}
	if o.stated("class") {
		j.NutClass = o.at("class").choice(nutClasses...)
	}
	j.NutShear = o.some("shear_strength", quantity.Pressure)
	if o.stated("lock") {
		j.LockNut = find(o.at("lock"))
	}
}

// setStud gives a stud the nut that is turned in place of a head. In a tapped part it
// is the only nut.
func setStud(o *object, j *planner.Joint) {
	b := &j.Bolt
	if j.Nut == nil {
		if o.d.knows("nut") {
			head := field{o.d, o.node.get("bolt").get("head"), "head", "bolt.head"}
			head.wrong("a stud needs a nut in place of a head", "add nut: hexagon")
		}
		return
	}
	nut := *j.Nut
	j.HeadNut = &nut
	b.Head = fastener.Head{Kind: "stud", Standard: nut.Standard, BearingDiameter: nut.BearingDiameter, Height: nut.Height,
		WidthAcrossFlats: nut.WidthAcrossFlats, Source: nut.Source}
	if j.Tapped != nil {
		j.Nut = nil
	}
}

func readInsert(f field) *planner.Insert {
	o := f.object("length", "pull_out", "source")
	o.require("length", "18 mm")
	o.require("pull_out", "40 kN")
	o.require("source", "where the strength comes from")
	return &planner.Insert{Length: o.one("length", quantity.Length), PullOut: o.one("pull_out", quantity.Force), Source: o.label("source")}
}

func readParts(f field) []planner.Part {
	var parts []planner.Part
	for _, item := range f.items("clamped part") {
		o := item.object("part", "material", "thickness", "hole", "outer_diameter", "hot_modulus")
		var p planner.Part
		if o.require("part", "flange") {
			p.Name = o.at("part").label()
		}
		if o.require("material", "S355") {
			p.Material = readMaterial(o.at("material"))
		}
		o.require("thickness", "15 mm")
		o.require("hole", "13.5 mm")
		o.require("outer_diameter", "34 mm")
		p.Thickness = o.one("thickness", quantity.Length)
		p.Hole = o.one("hole", quantity.Length)
		p.OuterDiameter = o.one("outer_diameter", quantity.Length)
		p.HotModulus = o.some("hot_modulus", quantity.Pressure)
		parts = append(parts, p)
	}
	return parts
}

// readMaterial reads a name of the tables or the library, or a mapping of properties.
func readMaterial(f field) fastener.Material {
	if f.node.kind != mapping {
		return lookUp(f, f.d.library.findMaterial)
	}
	o := f.object("modulus", "bearing_pressure", "expansion", "shear_strength", "tensile_strength")
	o.require("modulus", "205 GPa")
	o.require("expansion", "11.5 um/m/K")
	return fastener.Material{
		Name:             "material of the register",
		Modulus:          o.one("modulus", quantity.Pressure),
		LimitingPressure: o.one("bearing_pressure", quantity.Pressure),
		Expansion:        o.one("expansion", quantity.Expansion),
		ShearStrength:    o.one("shear_strength", quantity.Pressure),
		TensileStrength:  o.one("tensile_strength", quantity.Pressure),
		Source:           "stated in the register",
	}
}
