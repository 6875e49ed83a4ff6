package group

import (
	"math"

	"clampback/planner/pattern"
)

// Vector is a force in N, a moment in N.mm or a place in mm. X and Y lie in the
// plane of the pattern, in its coordinates; Z points along the bolts, the way in
// which a force pulls the joint open.
type Vector struct{ X, Y, Z float64 }

// Load is one load case on the whole joint.
type Load struct {
	Name   string
	Force  Vector // N; a positive Z pulls the joint open
	Moment Vector // N.mm, besides that of the force; right-handed about the axes
	At     Vector // mm: where the force acts; Z is its height above the interface
}

// Share is what one bolt gets in one load case.
type Share struct {
	Case  string
	Bolt  int     // from 1, as the pattern numbers them
	Axial float64 // N; positive opens the joint
	X, Y  float64 // N, transverse, in the pattern's axes
}

// Properties are the sums over a pattern of bolts of equal stiffness, about its
// centroid.
type Properties struct {
	CentroidX, CentroidY float64 // mm
	Sxx                  float64 // sum of x^2, mm2
	Syy                  float64 // sum of y^2, mm2
	Sxy                  float64 // sum of x y, mm2
}

// PropertiesOf returns the sums of a pattern; of no points, zeros.
func PropertiesOf(points []pattern.Point) Properties {
	var p Properties
	if len(points) == 0 {
		return p
	}
	// From the first bolt on, so that a coordinate that all share is exact.
	first := points[0]
	for _, at := range points {
		p.CentroidX += at.X - first.X
		p.CentroidY += at.Y - first.Y
	}
	n := float64(len(points))
	p.CentroidX, p.CentroidY = first.X+p.CentroidX/n, first.Y+p.CentroidY/n
	for _, at := range points {
		x, y := at.X-p.CentroidX, at.Y-p.CentroidY
		p.Sxx += x * x
		p.Syy += y * y
		p.Sxy += x * y
	}
	return p
}

// Polar returns the sum of r^2 about the centroid, mm2.
func (p Properties) Polar() float64 { return p.Sxx + p.Syy }

// flattest is the least ratio of width to length (root mean squares) at which a
// pattern can carry a moment about its length: in a narrower one the rounding of
// the positions would decide on the forces.
const flattest = 1e-3

// InLine reports whether the bolts stand in one line, or so nearly that the
// width of the pattern carries nothing; so does a single bolt.
func (p Properties) InLine() bool {
	return p.determinant() <= flattest*flattest*p.Polar()*p.Polar()
}

// determinant is S_xx S_yy - S_xy^2: the product of the principal sums.
func (p Properties) determinant() float64 { return p.Sxx*p.Syy - p.Sxy*p.Sxy }

// Moment returns the moment of a load about the centroid in the interface, N.mm:
// the stated one and (At - centroid) x Force.
func (p Properties) Moment(l Load) Vector {
	x, y, z := l.At.X-p.CentroidX, l.At.Y-p.CentroidY, l.At.Z
	return Vector{
		X: l.Moment.X + y*l.Force.Z - z*l.Force.Y,
		Y: l.Moment.Y + z*l.Force.X - x*l.Force.Z,
		Z: l.Moment.Z + x*l.Force.Y - y*l.Force.X,
	}
}

// ShareAt returns what the bolt at a point gets of a load; n is the number of
// bolts. With x, y from the centroid and M the moment about it,
//
//	axial = F_z/n + a y + b x
//	a = (M_x S_xx + M_y S_xy)/D, b = -(M_y S_yy + M_x S_xy)/D, D = S_xx S_yy - S_xy^2
//	X = F_x/n - M_z y/(S_xx + S_yy), Y = F_y/n + M_z x/(S_xx + S_yy):
//
// unsymmetric bending of the bolts' areas as in any text on strength of
// materials, and torsion by the elastic method. Bolts in one line carry the
// moment across the line, a single bolt none; Distribute refuses what they do
// not carry, this function leaves it out. Case and Bolt are the caller's.
func ShareAt(p Properties, n int, l Load, at pattern.Point) Share {
	x, y, m := at.X-p.CentroidX, at.Y-p.CentroidY, p.Moment(l)
	count, polar := float64(n), p.Polar()
	s := Share{Axial: l.Force.Z / count, X: l.Force.X / count, Y: l.Force.Y / count}
	if polar == 0 {
		return s
	}
	s.X -= m.Z * y / polar
	s.Y += m.Z * x / polar
	if p.InLine() { // the pseudo-inverse of the sums, whose one principal sum is the polar one
		s.Axial += ((p.Sxy*x+p.Syy*y)*m.X - (p.Sxx*x+p.Sxy*y)*m.Y) / (polar * polar)
		return s
	}
	d := p.determinant()
	a, b := (m.X*p.Sxx+m.Y*p.Sxy)/d, -(m.Y*p.Syy+m.X*p.Sxy)/d
	s.Axial += a*y + b*x
	return s
}

// Distribute shares load cases out over bolts: for each case in order, the share
// of each bolt in order. The error is a *FaultsError with everything that is
// wrong: no bolts or no load case, a case without a name or with one that is
// taken, numbers that are none or lie beyond any joint, two bolts in one place, a
// moment that a single bolt or a line of bolts cannot carry.
func Distribute(points []pattern.Point, loads []Load) ([]Share, error) {
	c := checker{}
	c.points(points)
	c.loads(loads)
	if len(c.faults) == 0 {
		c.moments(points, loads)
	}
	if len(c.faults) > 0 {
		return nil, &FaultsError{c.faults}
	}
	p := PropertiesOf(points)
	shares := make([]Share, 0, len(loads)*len(points))
	for _, l := range loads {
		for i, at := range points {
			s := ShareAt(p, len(points), l, at)
			s.Case, s.Bolt = l.Name, i+1
			shares = append(shares, s)
		}
	}
	return shares, nil
}

// direction returns the unit vector along the longer principal axis.
func (p Properties) direction() (x, y float64) {
	y, x = math.Sincos(math.Atan2(2*p.Sxy, p.Sxx-p.Syy) / 2)
	return x, y
}
