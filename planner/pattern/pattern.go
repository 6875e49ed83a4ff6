// Package pattern knows where the bolts of a joint sit and in which order they
// are tightened.
//
// In: a circle, a grid or free points, in mm. Out: positions (x to the right,
// y up), numbered as a person would mark the flange, and a tightening order as
// a list of those numbers. It never draws.
package pattern

import "math"

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

// NewCircle places n bolts on a circle of a diameter, mm: bolt 1 at the top,
// then clockwise. The origin is the centre.
func NewCircle(n int, diameter float64) Pattern {
	p := Pattern{Kind: Circle, Diameter: diameter, Points: make([]Point, n)}
	for i := range p.Points {
		sin, cos := math.Sincos(2 * math.Pi * float64(i) / float64(n))
		p.Points[i] = Point{diameter / 2 * sin, diameter / 2 * cos}
	}
	return p
}

// NewGrid places rows x columns bolts at pitches in mm, along a row and from
// row to row: bolt 1 at the top left, then row by row. The origin is the centre.
func NewGrid(rows, columns int, alongRow, betweenRows float64) Pattern {
	p := Pattern{Kind: Grid, Rows: rows, Columns: columns, Points: make([]Point, 0, rows*columns)}
	for r := range rows {
		for c := range columns {
			p.Points = append(p.Points, Point{
				X: (float64(c) - float64(columns-1)/2) * alongRow,
				Y: (float64(rows-1)/2 - float64(r)) * betweenRows,
			})
		}
	}
	return p
}

// NewFree places bolts at points, mm, numbered as they are given.
func NewFree(points []Point) Pattern { return Pattern{Kind: Free, Points: points} }
