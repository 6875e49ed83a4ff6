package planner

import (
	"cmp"
	"math"
	"slices"
	"strings"

	"clampback/planner/pattern"
)

// fit judges what only shows when bolt, parts and washers are put together;
// sound says that each is possible by itself.
func (v *validator) fit(j Joint, sound bool) {
	before := len(v.faults)
	if v.reach(j) && sound && v.faces(j) {
		v.cone(j)
	}
	for i := before; i < len(v.faults); i++ {
		v.faults[i].Rests = fitFields(j)
	}
}

// fitFields are the fields that decide how bolt and parts go together.
func fitFields(j Joint) []string {
	fields := []string{"bolt.thread", "bolt.length", "bolt.head", "bolt.shank", "bolt.segments", "nut", "tapped.depth", "washers"}
	for i := range j.Parts {
		for _, field := range []string{"thickness", "hole", "outer_diameter"} {
			fields = append(fields, itemOf("clamped", i, field).path())
		}
	}
	return fields
}

// reach judges lengths: the bolt must reach into its thread and not bottom, and
// its shank must end inside the grip.
func (v *validator) reach(j Joint) bool {
	for _, p := range j.Parts {
		if !(p.Thickness > 0) {
			return false
		}
	}
	grip, length := j.Grip(), j.Bolt.Length
	grip += j.nutStack()
	if !(length > 0) || !v.require(length > grip, at("bolt.length"), "state a longer bolt, or thinner parts",
		"the grip of %s is longer than the bolt of %s", mm(grip), mm(length)) {
		return false
	}
	ok := true
	if j.Tapped != nil && j.Tapped.Depth > 0 {
		ok = v.require(length-grip <= j.Tapped.Depth, at("tapped.depth"), "state a deeper thread or a shorter bolt",
			"the bolt bottoms: it reaches %s into a thread of %s", mm(length-grip), mm(j.Tapped.Depth))
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
	return v.require(shank <= grip, at(path), "state the part of the shank that lies inside the grip",
		"the shank of %s is longer than the grip of %s", mm(shank), mm(grip)) && ok
}

// faces judges that head, nut and washers have a face to bear on.
func (v *validator) faces(j Joint) bool {
	ok := true
	for _, f := range j.bearingFaces() {
		part := 0
		if strings.HasPrefix(f.name, "nut") {
			part = len(j.Parts) - 1
		}
		ok = v.require(f.outer > f.inner, itemOf("clamped", part, "hole"), "state a smaller hole, or a washer that spans it",
			"the face under the %s has no area: %s outside, %s inside", f.name, mm(f.outer), mm(f.inner)) && ok
	}
	return ok
}

// cone judges that the deformation body is wider than every hole it meets.
func (v *validator) cone(j Joint) {
	cones := j.body().Cones()
	var depth float64
	first := 0 // layers before the first part
	if j.HeadWasher != nil {
		first = 1
	}
	for i, l := range j.layers() {
		narrowest := math.Min(cones.Width(depth), cones.Width(depth+l.thickness))
		depth += l.thickness
		part := min(max(i-first, 0), len(j.Parts)-1) // a washer is blamed on its neighbour
		v.require(narrowest > l.hole, itemOf("clamped", part, "hole"), "state a smaller hole or a larger outer diameter",
			"the hole of %s in %s is wider than the pressure cone, %s", mm(l.hole), l.name, mm(narrowest))
	}
}

// pattern judges that the bolts have room where they sit.
func (v *validator) pattern(j Joint) {
	p := j.Pattern
	if p.Kind == pattern.Unstated {
		return
	}
	if p.Kind == pattern.Circle {
		v.positive(p.Diameter, lengths, at("pattern.circle"), "the bolt circle", "state the diameter of the bolt circle")
	}
	n := len(p.Points)
	if !v.require(n <= MaxPositions && j.Count <= max(MaxPositions, n), at("pattern", "count"),
		"leave the pattern out, or state the joint in parts",
		"a pattern has at most %d positions, the joint has %d bolts", MaxPositions, max(n, j.Count)) {
		return
	}
	if j.Count < 1 || !v.require(n == j.Count, at("pattern", "count"), "make count and pattern agree",
		"the pattern has %d positions, the joint %d bolts", n, j.Count) {
		return
	}
	for i, at := range p.Points {
		size := math.Max(math.Abs(at.X), math.Abs(at.Y))
		if !v.require(size <= lengths.most, place{field: "pattern"}, "state positions in the plane of the joint",
			"bolt %d sits %s from the middle; it must be at most %s", i+1, mm(size), mm(lengths.most)) {
			return
		}
	}
	v.spacing(p.Points, j.Bolt.Thread.Diameter)
}

// spacing requires that no two bolts overlap: it stops at the first pair.
func (v *validator) spacing(points []pattern.Point, thread float64) {
	const noise = 1 - 1e-9 // of positions on a circle
	order := make([]int, len(points))
	for i := range order {
		order[i] = i
	}
	along := longerAxis(points)
	slices.SortFunc(order, func(a, b int) int {
		return cmp.Or(cmp.Compare(along(points[a]), along(points[b])), cmp.Compare(a, b))
	})
	for i, a := range order {
		for _, b := range order[i+1:] {
			if along(points[b])-along(points[a]) >= thread {
				break
			}
			apart := math.Hypot(points[a].X-points[b].X, points[a].Y-points[b].Y)
			if !v.require(apart >= thread*noise, at("pattern", "count", "bolt.thread"), "state positions at which the bolts have room",
				"bolts %d and %d are %s apart, less than the thread of %s", min(a, b)+1, max(a, b)+1, mm(apart), mm(thread)) {
				return
			}
		}
	}
}

// longerAxis returns the coordinate in which the points spread further; neighbours
// in it are few.
func longerAxis(points []pattern.Point) func(pattern.Point) float64 {
	low, high := points[0], points[0]
	for _, p := range points {
		low.X, low.Y = math.Min(low.X, p.X), math.Min(low.Y, p.Y)
		high.X, high.Y = math.Max(high.X, p.X), math.Max(high.Y, p.Y)
	}
	if high.Y-low.Y > high.X-low.X {
		return func(p pattern.Point) float64 { return p.Y }
	}
	return func(p pattern.Point) float64 { return p.X }
}
