package register

import (
	"fmt"
	"strings"

	"clampback/friction"
	"clampback/planner"
	"clampback/planner/fastener"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// jointKeys are the keys of a joint, and so of defaults.
var jointKeys = []string{
	"id", "name", "count", "pattern", "bolt", "nut", "tapped", "washers", "clamped", "clamp", "loads", "temperature",
	"friction", "tightening", "surfaces",
}

// joint reads one joint, already merged with the defaults.
func (d *decoder) joint(n *node) planner.Joint {
	o := d.object(n, "the joint", jointKeys...)
	var j planner.Joint
	if o.require("id", "A-010") {
		j.ID = o.text("id")
	}
	if o.require("name", "what the joint connects") {
		j.Name = o.label("name")
	}
	if o.require("count", "8") {
		j.Count = o.whole("count")
	}
	j.Bolt = d.bolt(o)
	d.ends(o, &j)
	if o.require("clamped", "[{part: ..., material: ..., thickness: ..., hole: ..., outer_diameter: ...}]") {
		j.Parts = d.parts(o.node.get("clamped"))
	}
	if o.require("clamp", "{residual: 12 kN}") {
		j.Clamp = d.clamp(o.node.get("clamp"))
	}
	if o.require("loads", "{axial: 0 to 9.5 kN, introduction_factor: 0.5}, or {axial: 0 kN} where there is none") {
		j.Loads = d.loads(o.node.get("loads"))
	}
	if o.stated("temperature") {
		j.Temperature = d.temperature(o.node.get("temperature"))
	}
	if o.require("friction", "{thread: 0.10 to 0.14, head: 0.09 to 0.13}") {
		j.Friction = d.friction(o.node.get("friction"))
	}
	if o.stated("surfaces") {
		j.Roughness = d.surfaces(o)
	}
	j.Tightening = d.tightening(o.node.get("tightening"))
	if o.stated("pattern") {
		j.Pattern = d.pattern(o.node.get("pattern"), j.Count)
	}
	return j
}

// isInchThread reports whether a designation is one of a unified thread: "1/2-13
// UNC", "#8-32", "3/4-16".
func isInchThread(designation string) bool {
	size, rest, found := strings.Cut(designation, "-")
	return strings.Contains(designation, "UN") ||
		(found && rest != "" && strings.Trim(size, "#0123456789/ ") == "" && size != "")
}

func (d *decoder) bolt(parent *object) planner.Bolt {
	var b planner.Bolt
	if !parent.require("bolt", "{thread: M12, length: 60 mm, head: hexagon, property_class: 10.9}") {
		return b
	}
	o := d.object(parent.node.get("bolt"), "bolt", "thread", "length", "head", "property_class", "shank", "segments")
	if isInchThread(o.textIfScalar("thread")) {
		d.at(o.node.get("thread").pos, "inch threads are not planned by this version",
			"state an ISO metric thread, for example M12")
		return b
	}
	b.Thread = find(o, "thread", "M12", fastener.ParseThread)
	if o.require("length", "60 mm") {
		b.Length = o.one("length", quantity.Length)
	}
	if o.textIfScalar("head") == "stud" {
		d.at(o.node.get("head").pos, "studs are not planned by this version",
			"state a bolt with head: hexagon, hexagon flange or socket cap")
	} else if b.Thread.Diameter > 0 {
		b.Head = find(o, "head", "hexagon", func(s string) (fastener.Head, error) { return fastener.FindHead(s, b.Thread) })
		b.Class = find(o, "property_class", `"10.9"`, func(s string) (fastener.PropertyClass, error) { return fastener.FindClass(s, b.Thread) })
	}
	if o.stated("shank") {
		shank := o.one("shank", quantity.Length)
		b.Shank = &shank
	}
	for i, n := range d.list(o.node.get("segments"), "segments") {
		s := d.object(n, fmt.Sprintf("segment %d", i+1), "length", "diameter")
		if s.require("length", "20 mm") && s.require("diameter", "10 mm") {
			b.Segments = append(b.Segments, planner.Segment{Length: s.one("length", quantity.Length),
				Diameter: s.one("diameter", quantity.Length)})
		}
	}
	return b
}

// textIfScalar returns a scalar's text without judging it.
func (o *object) textIfScalar(key string) string {
	if n := o.node.get(key); n != nil && n.kind == scalar {
		return n.text
	}
	return ""
}

// list returns the items of a list, none when it is absent.
func (d *decoder) list(n *node, name string) []*node {
	if n == nil || n.kind == refused {
		return nil
	}
	if n.kind != list {
		d.at(n.pos, fmt.Sprintf("%s is %s, but a list belongs here", name, n.kind),
			"write it as [..., ...], or one item a line that begins with \"- \"")
		return nil
	}
	return n.items
}

// ends reads what the bolt goes into and the washers.
func (d *decoder) ends(o *object, j *planner.Joint) {
	t := j.Bolt.Thread
	sized := t.Diameter > 0
	if o.stated("nut") && sized {
		nut := find(o, "nut", "hexagon", func(s string) (fastener.Nut, error) { return fastener.FindNut(s, t) })
		j.Nut = &nut
	}
	if o.stated("tapped") {
		tapped := d.object(o.node.get("tapped"), "tapped", "material", "depth")
		if tapped.require("depth", "24 mm") && tapped.require("material", "S355") {
			j.Tapped = &planner.Tapped{Material: d.material(tapped), Depth: tapped.one("depth", quantity.Length)}
		}
	}
	if !o.stated("washers") || !sized {
		return
	}
	washers := d.object(o.node.get("washers"), "washers", "head", "nut")
	washer := func(key string) *fastener.Washer {
		if !washers.stated(key) || washers.textIfScalar(key) == "none" {
			return nil
		}
		w := find(washers, key, "ISO 7089", func(s string) (fastener.Washer, error) { return fastener.FindWasher(s, t) })
		return &w
	}
	j.HeadWasher, j.NutWasher = washer("head"), washer("nut")
}

func (d *decoder) parts(n *node) []planner.Part {
	var parts []planner.Part
	for i, item := range d.list(n, "clamped") {
		o := d.object(item, fmt.Sprintf("clamped part %d", i+1), "part", "material", "thickness", "hole", "outer_diameter")
		var p planner.Part
		if o.require("part", "flange") {
			p.Name = o.label("part")
		}
		if o.require("material", "S355") {
			p.Material = d.material(o)
		}
		if o.require("thickness", "15 mm") {
			p.Thickness = o.one("thickness", quantity.Length)
		}
		if o.require("hole", "13.5 mm") {
			p.Hole = o.one("hole", quantity.Length)
		}
		if o.require("outer_diameter", "34 mm") {
			p.OuterDiameter = o.one("outer_diameter", quantity.Length)
		}
		parts = append(parts, p)
	}
	return parts
}

// material reads a name of the library or a mapping of properties.
func (d *decoder) material(parent *object) fastener.Material {
	n := parent.node.get("material")
	if n.kind != mapping {
		return find(parent, "material", "S355", fastener.FindMaterial)
	}
	o := d.object(n, "material", "modulus", "bearing_pressure", "expansion", "shear_strength", "tensile_strength")
	if !o.require("modulus", "205 GPa") || !o.require("expansion", "11.5 um/m/K") {
		return fastener.Material{}
	}
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

func (d *decoder) clamp(n *node) planner.Clamp {
	o := d.object(n, "clamp", "residual", "transverse", "torque", "torque_radius", "interface_friction", "interfaces", "seal")
	seal := d.object(o.node.get("seal"), "seal", "area", "pressure")
	if o.stated("seal") {
		seal.require("area", "2400 mm2")
		seal.require("pressure", "10 bar")
	}
	return planner.Clamp{
		Residual:          o.one("residual", quantity.Force),
		Transverse:        o.one("transverse", quantity.Force),
		Torque:            o.one("torque", quantity.Torque),
		TorqueRadius:      o.one("torque_radius", quantity.Length),
		InterfaceFriction: o.one("interface_friction", quantity.Ratio),
		Interfaces:        o.whole("interfaces"),
		SealArea:          seal.one("area", quantity.Area),
		SealPressure:      seal.one("pressure", quantity.Pressure),
	}
}

func (d *decoder) loads(n *node) planner.Loads {
	o := d.object(n, "loads", "axial", "introduction_factor", "cycles")
	var l planner.Loads
	if o.require("axial", "0 to 9.5 kN") {
		l.Axial = o.span("axial", quantity.Force)
	}
	if o.stated("introduction_factor") {
		factor := o.one("introduction_factor", quantity.Ratio)
		l.IntroductionFactor = &factor
	}
	l.Cycles = o.one("cycles", quantity.Number)
	if o.stated("cycles") && l.Cycles == 0 {
		l.Cycles = -1 // a stated 0 is impossible, not "static"
	}
	return l
}

func (d *decoder) temperature(n *node) *planner.Temperature {
	o := d.object(n, "temperature", "assembly", "service")
	if !o.require("assembly", "20 degC") || !o.require("service", "90 degC") {
		return nil
	}
	return &planner.Temperature{Assembly: o.one("assembly", quantity.Temperature),
		Service: o.span("service", quantity.Temperature)}
}

func (d *decoder) friction(n *node) planner.Friction {
	o := d.object(n, "friction", "thread", "head", "condition", "evidence", "lubrication")
	state := o.label("lubrication")
	switch {
	case o.stated("evidence"):
		d.at(o.node.get("evidence").pos, "friction from test evidence is not read by this version",
			"state the ranges that the tests gave: {thread: 0.10 to 0.14, head: 0.09 to 0.13}")
	case o.stated("condition"):
		if o.stated("thread") || o.stated("head") {
			d.at(o.node.get("condition").pos, "both a condition and ranges are stated", "keep one of them")
		}
		c := find(o, "condition", "class B", friction.FindCondition)
		return planner.Friction{Thread: c.Thread, Head: c.Head, State: state, Source: c.Name + ", " + c.Source}
	default:
		if o.require("thread", "0.10 to 0.14") && o.require("head", "0.09 to 0.13") {
			return planner.Friction{Thread: o.span("thread", quantity.Ratio), Head: o.span("head", quantity.Ratio),
				State: state, Source: "stated in the register"}
		}
	}
	return planner.Friction{}
}

// surfaces reads "Rz 16 um".
func (d *decoder) surfaces(o *object) float64 {
	n := o.node.get("surfaces")
	text := o.text("surfaces")
	rest, ok := strings.CutPrefix(text, "Rz ")
	if !ok {
		if text != "" {
			d.at(n.pos, fmt.Sprintf("surfaces: %q is no roughness", text), "write it as Rz 16 um")
		}
		return 0
	}
	rz, err := quantity.Parse(rest, quantity.Length)
	d.quantityProblem(n, "surfaces", err)
	if err == nil && rz <= 0 {
		d.at(n.pos, fmt.Sprintf("surfaces: Rz %g um is impossible", rz*1000), "write it as Rz 16 um")
	}
	return rz
}

func (d *decoder) pattern(n *node, count int) pattern.Pattern {
	o := d.object(n, "pattern", "circle", "rows", "columns", "pitch", "points")
	switch {
	case o.stated("circle"):
		diameter := o.one("circle", quantity.Length)
		if diameter <= 0 || count < 1 || count > planner.MaxCount {
			return pattern.Pattern{}
		}
		return pattern.NewCircle(count, diameter)
	case o.stated("points"):
		return d.points(o.node.get("points"))
	}
	if !o.require("rows", "2") || !o.require("columns", "4") || !o.require("pitch", "[60 mm, 80 mm]") {
		return pattern.Pattern{}
	}
	rows, columns := o.whole("rows"), o.whole("columns")
	pitch := d.pair(o.node.get("pitch"), "pitch")
	if rows < 1 || columns < 1 || rows > planner.MaxCount/columns {
		d.at(o.node.get("rows").pos, fmt.Sprintf("a pattern of %d rows and %d columns is impossible", rows, columns),
			"state how many rows and columns of bolts there are")
		return pattern.Pattern{}
	}
	return pattern.NewGrid(rows, columns, pitch.X, pitch.Y)
}

func (d *decoder) points(n *node) pattern.Pattern {
	var points []pattern.Point
	for _, item := range d.list(n, "points") {
		points = append(points, d.pair(item, "point"))
	}
	return pattern.NewFree(points)
}

// pair reads two lengths: [60 mm, 80 mm].
func (d *decoder) pair(n *node, name string) pattern.Point {
	if n.kind != list || len(n.items) != 2 {
		d.at(n.pos, name+" is no pair of lengths", "write it as [60 mm, 80 mm]")
		return pattern.Point{}
	}
	return pattern.Point{X: d.one(n.items[0], name, quantity.Length), Y: d.one(n.items[1], name, quantity.Length)}
}

func (d *decoder) tightening(n *node) planner.Tightening {
	o := d.object(n, "tightening", "method", "scatter", "scatter_factor", "tool", "utilisation", "aim", "step", "snug",
		"snug_torque", "angle_step", "angle_tolerance", "elastic_spread")
	t := planner.Tightening{
		Method: planner.Method(o.planned("method", []string{"torque", "torque and angle"},
			[]string{"yield", "tension", "stretch"})),
		Scatter:       planner.Scatter(o.planned("scatter", []string{"range", "guide"}, []string{"chance"})),
		ScatterFactor: o.one("scatter_factor", quantity.Number),
		Utilisation:   o.one("utilisation", quantity.Ratio),
		Aim:           planner.Aim(o.choice("aim", "high", "middle")),
		Step:          o.one("step", quantity.Torque),
		Snug:          o.one("snug", quantity.Ratio),
		SnugTorque:    o.one("snug_torque", quantity.Torque),
		AngleStep:     o.one("angle_step", quantity.Angle),
		AngleTol:      o.one("angle_tolerance", quantity.Angle),
		ElasticSpread: o.one("elastic_spread", quantity.Ratio),
	}
	if o.stated("tool") {
		tool := d.object(o.node.get("tool"), "tool", "name", "tolerance")
		if tool.require("tolerance", "4 %") {
			t.Tool = &planner.Tool{Name: tool.label("name"), Tolerance: tool.one("tolerance", quantity.Ratio)}
		}
	}
	return t
}

// planned returns a word that this version plans; words of the register that it
// does not are refused by name.
func (o *object) planned(key string, planned, later []string) string {
	text := o.textIfScalar(key)
	for _, word := range later {
		if text == word {
			o.d.at(o.node.get(key).pos, fmt.Sprintf("%s: %q is not planned by this version", key, text),
				"state "+strings.Join(planned, " or "))
			return ""
		}
	}
	return o.choice(key, planned...)
}
