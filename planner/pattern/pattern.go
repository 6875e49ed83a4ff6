// Package pattern knows where the bolts of a joint sit and in which order they
// are tightened.
//
// In: a circle, a grid or free points, in mm. Out: positions (x to the right,
// y up, origin anywhere), numbered as a person would mark the flange, and a
// tightening order as a list of those numbers. It never draws.
package pattern

// Kind names how a pattern was stated.
type Kind string

// The kinds; the zero value means that no pattern was stated.
const (
	Unstated Kind = ""
	Circle   Kind = "circle"
	Grid     Kind = "grid"
	Free     Kind = "points"
)

// Point is a bolt position, mm.
type Point struct {
	X float64
	Y float64
}

// Pattern is the set of bolt positions; Points[i] is the bolt numbered i+1.
type Pattern struct {
	Kind     Kind
	Diameter float64 // bolt circle diameter of a Circle, mm
	Rows     int     // of a Grid
	Columns  int     // of a Grid
	Points   []Point
}
