package group

import (
	"fmt"
	"math"
	"strings"

	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// Fault is one thing that is wrong with bolts or load cases. Path names it:
// "points", "points[3]", "loads", "loads[1]" or "loads[1].force", from 0.
type Fault struct {
	Path    string
	Message string // what is wrong, with the numbers
	Mend    string // how to put it right
}

// FaultsError is everything that keeps loads from being shared out.
type FaultsError struct{ Faults []Fault }

// Error lists the faults on one line.
func (e *FaultsError) Error() string {
	texts := make([]string, len(e.Faults))
	for i, f := range e.Faults {
		texts[i] = f.Path + ": " + f.Message
	}
	return "sharing the loads out: " + strings.Join(texts, "; ")
}

// The largest numbers of a joint. They lie far outside any: they catch slips of
// unit, and keep every result a finite number.
const (
	mostLength = 100e3 // mm
	mostForce  = 1e9   // N
	mostTorque = 1e12  // N.mm
)

// apart is how far two bolts must at least be from each other, mm, not to be in one
// place. Whether they have room is for those who know their size.
const apart = 1e-3

// checker gathers faults.
type checker struct{ faults []Fault }

func (c *checker) fault(path, mend, format string, args ...any) {
	c.faults = append(c.faults, Fault{path, fmt.Sprintf(format, args...), mend})
}

func (c *checker) points(points []pattern.Point) {
	if len(points) == 0 {
		c.fault("points", "state where the bolts sit", "there are no bolts to share the loads")
		return
	}
	before := len(c.faults)
	for i, p := range points {
		c.number(fmt.Sprintf("points[%d]", i), fmt.Sprintf("x of bolt %d", i+1), p.X, mostLength, quantity.Length)
		c.number(fmt.Sprintf("points[%d]", i), fmt.Sprintf("y of bolt %d", i+1), p.Y, mostLength, quantity.Length)
	}
	if len(c.faults) > before {
		return
	}
	c.places(points)
}

// places requires that no two bolts sit in one place. The plane is cut into squares
// so small that two bolts in one of them do, and two that do are at most two squares
// away from each other.
func (c *checker) places(points []pattern.Point) {
	const side, reach = apart / 1.5, 2
	type square struct{ x, y float64 }
	taken := make(map[square]int, len(points))
	other := func(i int) (int, bool) {
		own := square{math.Floor(points[i].X / side), math.Floor(points[i].Y / side)}
		for dx := -reach; dx <= reach; dx++ {
			for dy := -reach; dy <= reach; dy++ {
				j, found := taken[square{own.x + float64(dx), own.y + float64(dy)}]
				if found && math.Hypot(points[j].X-points[i].X, points[j].Y-points[i].Y) < apart {
					return j, true
				}
			}
		}
		taken[own] = i
		return 0, false
	}
	for i := range points {
		if j, found := other(i); found {
			c.fault(fmt.Sprintf("points[%d]", i), "give each bolt a place of its own",
				"bolts %d and %d sit in one place", j+1, i+1)
		}
	}
}

func (c *checker) loads(loads []Load) {
	if len(loads) == 0 {
		c.fault("loads", "state at least one load case", "there is no load case")
	}
	seen := make(map[string]int, len(loads))
	for i, l := range loads {
		path := fmt.Sprintf("loads[%d]", i)
		name := fmt.Sprintf("load case %d", i+1)
		if strings.TrimSpace(l.Name) == "" {
			c.fault(path, "name each load case", "%s has no name", name)
		} else if j, twice := seen[l.Name]; twice {
			c.fault(path, "give each load case a name of its own", "load cases %d and %d are both named %q", j+1, i+1, l.Name)
		} else {
			seen[l.Name] = i
			name = fmt.Sprintf("load case %q", l.Name)
		}
		c.vector(path+".force", "the force of "+name, l.Force, mostForce, quantity.Force)
		c.vector(path+".moment", "the moment of "+name, l.Moment, mostTorque, quantity.Torque)
		c.vector(path+".at", "the point of action of "+name, l.At, mostLength, quantity.Length)
	}
}

func (c *checker) vector(path, what string, v Vector, most float64, d quantity.Dimension) {
	c.number(path, "x of "+what, v.X, most, d)
	c.number(path, "y of "+what, v.Y, most, d)
	c.number(path, "z of "+what, v.Z, most, d)
}

// number requires a finite number of a possible size.
func (c *checker) number(path, what string, v, most float64, d quantity.Dimension) {
	switch {
	case math.IsNaN(v) || math.IsInf(v, 0):
		c.fault(path, "state a number", "%s is no finite number", what)
	case math.Abs(v) > most:
		c.fault(path, "check the unit", "%s is %s; it must be at most %s", what, quantity.Format(v, d),
			quantity.Format(most, d))
	}
}

// What may be left of a moment that the bolts cannot carry and still be none:
// what the rounding of stated figures explains (places to 0.01 mm, moments to four
// digits), in parts of the moment, and what the rounding of sums explains, in
// parts of their terms.
const (
	statedRounding = 1e-4
	sumRounding    = 1e-12
)

// moments requires that a single bolt or a line of bolts has no moment that it
// cannot carry.
func (c *checker) moments(points []pattern.Point, loads []Load) {
	p := PropertiesOf(points)
	if !p.InLine() {
		return
	}
	for i, l := range loads {
		path, m, noise := fmt.Sprintf("loads[%d]", i), p.Moment(l), sumRounding*p.terms(l)
		if len(points) == 1 {
			c.single(path, l, m, noise)
			continue
		}
		x, y := p.direction()
		along := m.X*x + m.Y*y
		if math.Abs(along) <= noise+statedRounding*math.Hypot(m.X, m.Y) {
			continue
		}
		c.fault(path, "state bolts beside the line, or a load without a moment about it",
			"the bolts stand in one line and cannot carry the moment of %s about %s in load case %q",
			quantity.Format(along, quantity.Torque), axis(x, y), l.Name)
	}
}

// single requires that there is no moment at all.
func (c *checker) single(path string, l Load, m Vector, noise float64) {
	for _, about := range []struct {
		axis   string
		moment float64
	}{{"x", m.X}, {"y", m.Y}, {"z", m.Z}} {
		if math.Abs(about.moment) > noise {
			c.fault(path, "state more bolts, or a force through the bolt and no moment",
				"a single bolt cannot carry the moment of %s about the %s axis in load case %q",
				quantity.Format(about.moment, quantity.Torque), about.axis, l.Name)
		}
	}
}

// terms is the size of what Moment sums, N.mm.
func (p Properties) terms(l Load) float64 {
	size := func(v Vector) float64 { return math.Abs(v.X) + math.Abs(v.Y) + math.Abs(v.Z) }
	return size(l.Moment) + (size(l.At)+math.Abs(p.CentroidX)+math.Abs(p.CentroidY))*size(l.Force)
}

// axis names the axis through the centroid in a direction.
func axis(x, y float64) string {
	const straight = 1e-9
	switch {
	case math.Abs(y) < straight:
		return "the x axis"
	case math.Abs(x) < straight:
		return "the y axis"
	}
	return fmt.Sprintf("the line, which is %s from the x axis,",
		quantity.Format(math.Atan2(y, x)*180/math.Pi, quantity.Angle))
}
