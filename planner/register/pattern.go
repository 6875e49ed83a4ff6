package register

import (
	"fmt"

	"clampback/planner"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// readPattern reads where the bolts sit. A pattern that the rules will refuse
// for its number of bolts is not laid out: it has no positions.
func readPattern(f field, count int) pattern.Pattern {
	o := f.object("circle", "rows", "columns", "pitch", "points")
	circle, points := o.stated("circle"), o.stated("points")
	grid := o.stated("rows") || o.stated("columns") || o.stated("pitch")
	switch {
	case circle && grid, circle && points, grid && points:
		f.wrong("the pattern is stated in two ways", "keep circle, or rows, columns and pitch, or points")
	case circle:
		diameter := o.at("circle").quantity(quantity.Length)
		if count < 1 || count > planner.MaxPositions {
			return pattern.Pattern{Kind: pattern.Circle, Diameter: diameter}
		}
		return pattern.NewCircle(count, diameter)
	case points:
		return pattern.NewFree(readPoints(o.at("points")))
	case grid:
		return readGrid(o)
	case o.node.kind == mapping && len(o.node.entries) == 0:
		f.wrong("the pattern is empty", "write it as {circle: 180 mm}, or remove the key")
	}
	return pattern.Pattern{}
}

func readGrid(o *object) pattern.Pattern {
	o.require("rows", "2")
	o.require("columns", "4")
	o.require("pitch", "[60 mm, 80 mm]")
	rows, columns, pitch := readSide(o, "rows"), readSide(o, "columns"), readPitch(o)
	if !o.d.knows(o.path) {
		return pattern.Pattern{}
	}
	if rows > planner.MaxPositions/columns {
		o.wrong(fmt.Sprintf("the pattern has %d rows and %d columns", rows, columns),
			fmt.Sprintf("state at most %d positions, or leave the pattern out", planner.MaxPositions))
		return pattern.Pattern{}
	}
	return pattern.NewGrid(rows, columns, pitch.X, pitch.Y)
}

// readSide reads how many bolts one side of a grid has.
func readSide(o *object, key string) int {
	if !o.stated(key) {
		return 0
	}
	unread := len(o.d.unread)
	n := o.at(key).whole()
	if n < 1 && len(o.d.unread) == unread {
		o.at(key).wrong(fmt.Sprintf("%s is %d", key, n), "state how many bolts there are, at least 1")
	}
	return n
}

func readPitch(o *object) pattern.Point {
	if !o.stated("pitch") {
		return pattern.Point{}
	}
	pitch := readPair(o.at("pitch"))
	if pitch.X < 0 || pitch.Y < 0 {
		o.at("pitch").wrong("a pitch is negative", "state distances: [60 mm, 80 mm]")
	}
	return pitch
}

func readPoints(f field) []pattern.Point {
	var points []pattern.Point
	for _, item := range f.items("point") {
		points = append(points, readPair(item))
	}
	return points
}

// readPair reads two lengths: [60 mm, 80 mm].
func readPair(f field) pattern.Point {
	const mend = "write it as [60 mm, 80 mm]"
	if !f.is(list, mend) {
		return pattern.Point{}
	}
	if n := len(f.node.items); n != 2 {
		f.wrong(fmt.Sprintf("%s has %d lengths, but two belong here", f.name, n), mend)
		return pattern.Point{}
	}
	pair := f.items(f.name)
	return pattern.Point{X: pair[0].quantity(quantity.Length), Y: pair[1].quantity(quantity.Length)}
}
