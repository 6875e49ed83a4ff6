package planner

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"clampback/planner/quantity"
)

// Fault is one thing that is wrong with a joint. Path names the field as the
// register spells it ("clamped[1].hole"), so that a reader can point at it.
type Fault struct {
	Path    string
	Message string // what is wrong, with the numbers
	Mend    string // how to put it right
}

// FaultsError is every fault of one joint.
type FaultsError struct {
	ID     string
	Faults []Fault
}

// Error lists the faults on one line.
func (e *FaultsError) Error() string {
	texts := make([]string, len(e.Faults))
	for i, f := range e.Faults {
		texts[i] = f.Path + ": " + f.Message
	}
	return "joint " + e.ID + ": " + strings.Join(texts, "; ")
}

// MaxCount is the largest number of bolts in a joint.
const MaxCount = 10000

// Faults returns everything that is impossible about the joint, in the order
// of the register's keys; none means that Work can plan it. These rules stand
// here alone: readers attach positions to them.
func (j Joint) Faults() []Fault {
	v := &validator{}
	v.identity(j)
	v.bolt(j)
	v.ends(j)
	v.parts(j)
	if len(v.faults) == 0 {
		v.fit(j) // needs the single dimensions in order
	}
	v.clamp(j.Clamp)
	v.loads(j)
	v.temperature(j.Temperature)
	v.friction(j.Friction)
	v.tightening(j.Tightening)
	v.require(j.Roughness >= 0 && j.Roughness < MaxRoughness, "surfaces",
		fmt.Sprintf("Rz %g um lies outside the embedding table, which ends at 160 um",
			j.Roughness*1000), "state Rz below 160 um")
	return v.faults
}

// validator gathers faults. Messages are only put together for what fails.
type validator struct {
	faults []Fault
	list   string // the list whose item is judged: paths are then list[index].field
	index  int
}

// require adds a fault unless ok.
func (v *validator) require(ok bool, field, mend, format string, args ...any) bool {
	if !ok {
		if v.list != "" {
			field = fmt.Sprintf("%s[%d].%s", v.list, v.index, field)
		}
		v.faults = append(v.faults, Fault{field, fmt.Sprintf(format, args...), mend})
	}
	return ok
}

// positive requires a number above 0.
func (v *validator) positive(value float64, field, what, mend string) {
	v.require(value > 0 && !math.IsInf(value, 0), field, mend, "%s is %g; it must be above 0", what, value)
}

// notNegative requires a number of 0 or more.
func (v *validator) notNegative(value float64, field, what string) {
	v.require(value >= 0 && !math.IsInf(value, 0), field, "state it as a positive number, or leave it out",
		"%s is %g; it cannot be negative", what, value)
}

// validID reports whether an id can name a file: 1 to 40 letters, digits, . _ -, not
// dots alone and no - in front.
func validID(id string) bool {
	if len(id) > 40 || strings.Trim(id, ".") == "" || id[0] == '-' {
		return false
	}
	for _, r := range id {
		letter := r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9'
		if !letter && r != '.' && r != '_' && r != '-' {
			return false
		}
	}
	return true
}

func (v *validator) identity(j Joint) {
	v.require(validID(j.ID), "id",
		"use 1 to 40 letters, digits, . _ - and begin with none of \"-\"",
		"id %q cannot name a file", j.ID)
	v.require(j.Count >= 1 && j.Count <= MaxCount, "count",
		fmt.Sprintf("state how many bolts the joint has, 1 to %d", MaxCount),
		"count is %d", j.Count)
	if n := len(j.Pattern.Points); n > 0 {
		v.require(n == j.Count, "pattern", "make count and pattern agree",
			"the pattern has %d positions, the joint %d bolts", n, j.Count)
	}
}

func (v *validator) bolt(j Joint) {
	b := j.Bolt
	v.positive(b.Length, "bolt.length", "the bolt's length", "state the length from under the head to the end")
	if b.Shank != nil {
		v.require(len(b.Segments) == 0, "bolt.segments", "keep one of them", "both shank and segments are stated")
		v.notNegative(*b.Shank, "bolt.shank", "the shank")
	}
	for i, s := range b.Segments {
		v.list, v.index = "bolt.segments", i
		v.positive(s.Length, "length", "the segment's length", "state a length, or leave the segment out")
		v.require(s.Diameter > 0 && s.Diameter <= b.Thread.Diameter, "diameter",
			"state a diameter above 0 and not above the thread's",
			"the segment's diameter is %g mm, the thread's %g mm", s.Diameter, b.Thread.Diameter)
	}
	v.list = ""
}

func (v *validator) ends(j Joint) {
	if !v.require(j.Nut != nil || j.Tapped != nil, "nut", "add nut: hexagon, or tapped: {material: S355, depth: 24 mm}",
		"neither nut nor tapped is stated") {
		return
	}
	if !v.require(j.Nut == nil || j.Tapped == nil, "tapped", "keep one of them",
		"both nut and tapped are stated") || j.Tapped == nil {
		return
	}
	v.require(j.NutWasher == nil, "washers.nut", "remove it", "a nut washer is stated, but there is no nut")
	v.positive(j.Tapped.Depth, "tapped.depth", "the thread depth", "state the usable depth of the thread")
	v.positive(j.Tapped.Material.Modulus, "tapped.material", "the modulus", "state modulus, for example 205 GPa")
	v.positive(j.Tapped.Material.ShearStrength, "tapped.material", "the shear strength of the tapped part",
		"state shear_strength: without it stripping cannot be judged")
}

func (v *validator) parts(j Joint) {
	v.require(len(j.Parts) > 0, "clamped", "list the clamped parts from the head down", "no clamped part is stated")
	for i, p := range j.Parts {
		v.list, v.index = "clamped", i
		v.positive(p.Thickness, "thickness", "the thickness", "state the part's thickness, or leave the part out")
		v.require(p.Hole >= j.Bolt.Thread.Diameter, "hole", "state the clearance hole: at least the thread's diameter",
			"the hole of %g mm is smaller than the thread of %g mm", p.Hole, j.Bolt.Thread.Diameter)
		v.require(p.OuterDiameter > p.Hole, "outer_diameter", "state what the part offers around the bolt axis",
			"the outer diameter of %g mm is not larger than the hole of %g mm", p.OuterDiameter, p.Hole)
		v.positive(p.Material.Modulus, "material", "the modulus", "state modulus, for example 205 GPa")
		v.positive(p.Material.LimitingPressure, "material", "the limiting bearing pressure",
			"state bearing_pressure: without it the faces cannot be judged")
	}
	v.list = ""
}

// fit checks that bolt and parts go together.
func (v *validator) fit(j Joint) {
	grip, length := j.Grip(), j.Bolt.Length
	if !v.require(length > grip, "bolt.length", "state a longer bolt, or thinner parts",
		"the grip of %.5g mm is longer than the bolt of %g mm", grip, length) {
		return
	}
	if j.Tapped != nil {
		v.require(length-grip <= j.Tapped.Depth, "tapped.depth", "state a deeper thread or a shorter bolt",
			"the bolt bottoms: it reaches %.5g mm into a thread of %g mm", length-grip, j.Tapped.Depth)
	}
	var shank float64
	path := "bolt.shank"
	if j.Bolt.Shank != nil {
		shank = *j.Bolt.Shank
	}
	for _, s := range j.Bolt.Segments {
		shank += s.Length
		path = "bolt.segments"
	}
	v.require(shank <= grip, path, "state the part of the shank that lies inside the grip",
		"the shank of %.5g mm is longer than the grip of %.5g mm", shank, grip)
	v.faces(j)
	v.cone(j)
}

// faces checks that head, nut and washers have a face to bear on.
func (v *validator) faces(j Joint) {
	for _, f := range j.bearingFaces() {
		if f.outer > f.inner {
			continue
		}
		part := 0
		if strings.HasPrefix(f.name, "nut") {
			part = len(j.Parts) - 1
		}
		v.require(false, fmt.Sprintf("clamped[%d].hole", part), "state a smaller hole, or a washer that spans it",
			"the face under the %s has no area: %.5g mm outside, %.5g mm inside", f.name, f.outer, f.inner)
	}
}

// cone checks that the deformation body is wider than every hole it meets.
func (v *validator) cone(j Joint) {
	if len(v.faults) > 0 {
		return
	}
	cones := j.body().Cones()
	var depth float64
	first := 0 // layers before the first part
	if j.HeadWasher != nil {
		first = 1
	}
	for i, l := range j.layers() {
		narrowest := math.Min(cones.Width(depth), cones.Width(depth+l.thickness))
		depth += l.thickness
		if narrowest > l.hole {
			continue
		}
		part := min(max(i-first, 0), len(j.Parts)-1) // a washer is blamed on its neighbour
		v.require(false, fmt.Sprintf("clamped[%d].hole", part), "state a smaller hole or a larger outer diameter",
			"the hole of %.5g mm in %s is wider than the pressure cone, %.5g mm", l.hole, l.name, narrowest)
	}
}

func (v *validator) clamp(c Clamp) {
	v.notNegative(c.Residual, "clamp.residual", "the residual clamp force")
	v.notNegative(c.Transverse, "clamp.transverse", "the transverse load")
	v.notNegative(c.Torque, "clamp.torque", "the torque about the bolt axis")
	v.notNegative(c.SealArea, "clamp.seal.area", "the sealed area")
	v.notNegative(c.SealPressure, "clamp.seal.pressure", "the sealed pressure")
	v.require(c.Interfaces >= 0 && c.Interfaces <= 100, "clamp.interfaces",
		"state how many faces carry the load, for example 1",
		"the number of slip faces is %d", c.Interfaces)
	v.require(c.Residual > 0 || c.slips() || c.SealArea*c.SealPressure > 0, "clamp",
		"state residual, transverse, torque or seal",
		"nothing says what the joint must hold")
	if c.Torque > 0 {
		v.positive(c.TorqueRadius, "clamp.torque_radius", "the friction radius of the torque", "state torque_radius")
	}
	if c.slips() {
		v.coefficient(c.InterfaceFriction, "clamp.interface_friction", "the interface friction")
	}
}

// coefficient requires a possible coefficient of friction.
func (v *validator) coefficient(mu float64, path, what string) {
	v.require(mu > 0 && mu <= 1, path, "state it as a plain number, for example 0.12",
		"%s is %g; a coefficient of friction lies above 0 and not above 1", what, mu)
}

func (v *validator) loads(j Joint) {
	l := j.Loads
	v.require(l.Axial.IsFinite() && l.Axial.Low <= l.Axial.High, "loads.axial", "write it as 0 to 9.5 kN",
		"the axial load is no range")
	if l.IntroductionFactor == nil {
		v.require(l.Axial == quantity.Range{}, "loads.introduction_factor",
			"state introduction_factor: 1 where the load enters at head and nut, 0.5 where it enters half way to the interface, less nearer to it",
			"the axial load has no load introduction factor")
	} else {
		n := *l.IntroductionFactor
		v.require(n >= 0 && n <= 1, "loads.introduction_factor", "state a number from 0 to 1",
			"the load introduction factor is %g", n)
	}
	v.require(l.Cycles == 0 || (l.Cycles >= 1 && !math.IsInf(l.Cycles, 0)), "loads.cycles",
		"state how often the axial load goes from end to end, for example 2e6",
		"%g load cycles are impossible", l.Cycles)
}

func (v *validator) temperature(t *Temperature) {
	if t == nil {
		return
	}
	possible := func(c float64) bool { return c >= -273.15 && c <= 1000 }
	v.require(possible(t.Assembly), "temperature.assembly", "state -273.15 to 1000 degC",
		"%g degC is impossible", t.Assembly)
	v.require(possible(t.Service.Low) && possible(t.Service.High) && t.Service.Low <= t.Service.High, "temperature.service",
		"state -273.15 to 1000 degC, low end first",
		"%g to %g degC is impossible", t.Service.Low, t.Service.High)
}

func (v *validator) friction(f Friction) {
	v.frictionRange(f.Thread, "friction.thread", "the friction in the thread")
	v.frictionRange(f.Head, "friction.head", "the friction under the head")
}

func (v *validator) frictionRange(r quantity.Range, path, what string) {
	v.require(r.Low > 0 && r.High <= 1 && r.Low <= r.High, path, "write it as 0.10 to 0.14",
		"%s is %g to %g; a coefficient of friction lies above 0 and not above 1", what, r.Low, r.High)
}

func (v *validator) tightening(t Tightening) {
	v.word(string(t.Method), "tightening.method", string(TorqueMethod), string(TorqueAndAngleMethod))
	v.word(string(t.Scatter), "tightening.scatter", string(RangeScatter), string(GuideScatter))
	v.word(string(t.Aim), "tightening.aim", string(AimHigh), string(AimMiddle))
	share := func(value float64) bool { return value == 0 || (value > 0 && value < 1) }
	v.require(t.Utilisation >= 0 && t.Utilisation <= 1, "tightening.utilisation",
		"state a share of the yield strength above 0 and not above 1, usually 0.9",
		"the utilisation is %g", t.Utilisation)
	v.require(share(t.Snug), "tightening.snug", "state a share between 0 and 100 %",
		"the snug torque is %g of the target", t.Snug)
	v.require(t.Snug == 0 || t.SnugTorque == 0, "tightening.snug_torque", "keep one of them",
		"both snug and snug_torque are stated")
	v.require(share(t.ElasticSpread), "tightening.elastic_spread", "state a share between 0 and 100 %",
		"the uncertainty of the compliances is %g", t.ElasticSpread)
	v.notNegative(t.Step, "tightening.step", "the resolution of the setting")
	v.notNegative(t.SnugTorque, "tightening.snug_torque", "the snug torque")
	v.notNegative(t.AngleStep, "tightening.angle_step", "the resolution of the angle")
	v.notNegative(t.AngleTol, "tightening.angle_tolerance", "the tolerance of the angle")
	v.require(t.ScatterFactor == 0 || (t.ScatterFactor >= 1 && t.ScatterFactor <= 10), "tightening.scatter_factor",
		"state alpha_A from 1 to 10, for example 1.6",
		"the tightening factor is %g", t.ScatterFactor)
	if t.Scatter == GuideScatter {
		v.require(t.Method != TorqueAndAngleMethod, "tightening.scatter", "state scatter: range",
			"the guide scatter factor is for torque, not for torque and angle")
		return
	}
	v.require(t.ScatterFactor == 0, "tightening.scatter_factor", "state scatter: guide, or leave the factor out",
		"a scatter factor is stated, but the scatter comes from the ranges")
	if v.require(t.Tool != nil, "tightening.tool", "add tool: {tolerance: 4 %}", "no tool is stated") {
		v.require(t.Tool.Tolerance >= 0 && t.Tool.Tolerance < 0.5, "tightening.tool.tolerance",
			"state a tolerance from 0 to below 50 %, for example 4 %",
			"the tool's tolerance is %g", t.Tool.Tolerance)
	}
}

// word requires one of the known words, or none.
func (v *validator) word(word, field string, known ...string) {
	v.require(word == "" || slices.Contains(known, word), field, "state "+known[0]+" or "+known[1],
		"unknown word %q", word)
}
