package group_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner/group"
	"clampback/planner/pattern"
)

// anyPoints draws bolts at least 20 mm apart, each in a field of its own, that do
// not stand in one line.
func anyPoints(t *rapid.T) []pattern.Point {
	const across = 7 // fields of 120 mm
	fields := rapid.SliceOfNDistinct(rapid.IntRange(0, across*across-1), 3, 24, rapid.ID[int]).Draw(t, "fields")
	inside := rapid.Float64Range(-50, 50)
	var all []pattern.Point
	for _, f := range fields {
		all = append(all, pattern.Point{X: 120*float64(f%across) - 200 + inside.Draw(t, "x"),
			Y: 120*float64(f/across) - 300 + inside.Draw(t, "y")})
	}
	p := group.PropertiesOf(all)
	if p.Sxx*p.Syy-p.Sxy*p.Sxy < 0.003*p.Polar()*p.Polar() {
		t.Skip("nearly a line")
	}
	return all
}

func anyVector(t *rapid.T, label string, most float64) group.Vector {
	draw := rapid.Float64Range(-most, most)
	return group.Vector{X: draw.Draw(t, label+" x"), Y: draw.Draw(t, label+" y"), Z: draw.Draw(t, label+" z")}
}

func anyLoad(t *rapid.T) group.Load {
	return group.Load{Name: "any", Force: anyVector(t, "force", 1e5), Moment: anyVector(t, "moment", 1e7),
		At: anyVector(t, "at", 1000)}
}

func distribute(t require.TestingT, points []pattern.Point, loads ...group.Load) []group.Share {
	shares, err := group.Distribute(points, loads)
	require.NoError(t, err)
	return shares
}

func cross(a, b group.Vector) group.Vector {
	return group.Vector{X: a.Y*b.Z - a.Z*b.Y, Y: a.Z*b.X - a.X*b.Z, Z: a.X*b.Y - a.Y*b.X}
}

func minus(a, b group.Vector) group.Vector {
	return group.Vector{X: a.X - b.X, Y: a.Y - b.Y, Z: a.Z - b.Z}
}

func size(v group.Vector) float64 { return math.Hypot(math.Hypot(v.X, v.Y), v.Z) }

// assertEquilibrium requires that the bolt forces are together the load: forces,
// and moments about a point, within a part of the forces and of the forces at the
// longest lever.
func assertEquilibrium(t require.TestingT, points []pattern.Point, l group.Load, shares []group.Share, about group.Vector, part float64) {
	arm := cross(minus(l.At, about), l.Force)
	moment := group.Vector{X: l.Moment.X + arm.X, Y: l.Moment.Y + arm.Y, Z: l.Moment.Z + arm.Z}
	force, forceSize, longest := l.Force, size(l.Force), size(minus(l.At, about))
	for i, s := range shares {
		f := group.Vector{X: s.X, Y: s.Y, Z: s.Axial}
		lever := minus(group.Vector{X: points[i].X, Y: points[i].Y}, about)
		force, moment = minus(force, f), minus(moment, cross(lever, f))
		forceSize += size(f)
		longest = max(longest, size(lever))
	}
	require.LessOrEqual(t, size(force), part*forceSize, "forces")
	require.LessOrEqual(t, size(moment), part*(size(l.Moment)+longest*forceSize), "moments")
}

func TestEquilibrium(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points, l := anyPoints(t), anyLoad(t)
		assertEquilibrium(t, points, l, distribute(t, points, l), anyVector(t, "about", 2000), 1e-12)
	})
}

// Bolts in one line, or two, carry every load without a moment about the line.
func TestEquilibriumOfALine(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		angle := rapid.Float64Range(-math.Pi, math.Pi).Draw(t, "angle")
		sin, cos := math.Sincos(angle)
		origin := anyVector(t, "origin", 300)
		var points []pattern.Point
		for i := range rapid.IntRange(2, 12).Draw(t, "n") {
			s := 40*float64(i) + rapid.Float64Range(0, 20).Draw(t, "s")
			points = append(points, pattern.Point{X: origin.X + s*cos, Y: origin.Y + s*sin})
		}
		s := rapid.Float64Range(-1000, 1000).Draw(t, "at")
		across := rapid.Float64Range(-1e7, 1e7).Draw(t, "moment")
		l := group.Load{Name: "any", Force: anyVector(t, "force", 1e5),
			Moment: group.Vector{X: -across * sin, Y: across * cos, Z: rapid.Float64Range(-1e7, 1e7).Draw(t, "torsion")},
			At:     group.Vector{X: origin.X + s*cos, Y: origin.Y + s*sin}}
		assertEquilibrium(t, points, l, distribute(t, points, l), anyVector(t, "about", 2000), 1e-12)
	})
}

// Three bolts are statically determinate: a force at a place gives them its
// barycentric coordinates in their triangle.
func TestThreeBoltsByStaticsAlone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := pattern.Point{X: 10, Y: -20}, pattern.Point{X: 170, Y: 35}, pattern.Point{X: -15, Y: 90}
		x, y := rapid.Float64Range(-500, 500).Draw(t, "x"), rapid.Float64Range(-500, 500).Draw(t, "y")
		area := func(p, q pattern.Point) float64 { return (p.X-x)*(q.Y-y) - (q.X-x)*(p.Y-y) }
		whole := area(a, b) + area(b, c) + area(c, a)
		got := distribute(t, []pattern.Point{a, b, c}, group.Load{Name: "pull", Force: group.Vector{Z: 6000},
			At: group.Vector{X: x, Y: y}})
		for i, opposite := range []float64{area(b, c), area(c, a), area(a, b)} {
			require.InDelta(t, 6000*opposite/whole, got[i].Axial, 1e-7)
		}
	})
}

// The plates stay plane: axial forces are linear over the pattern, and the
// transverse ones those of a turn in the plane. With equilibrium this leaves one
// solution.
func TestPlatesStayPlane(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points, l := anyPoints(t), anyLoad(t)
		p, n := group.PropertiesOf(points), len(points)
		a, b := points[0], points[1]
		part := rapid.Float64Range(-1, 2).Draw(t, "part")
		between := group.ShareAt(p, n, l, pattern.Point{X: a.X + part*(b.X-a.X), Y: a.Y + part*(b.Y-a.Y)})
		first, second := group.ShareAt(p, n, l, a), group.ShareAt(p, n, l, b)
		require.InDelta(t, first.Axial+part*(second.Axial-first.Axial), between.Axial,
			1e-10*(math.Abs(first.Axial)+math.Abs(second.Axial)+size(l.Force)))
		// The difference of two bolts' forces stands across what joins them.
		dx, dy := second.X-first.X, second.Y-first.Y
		require.InDelta(t, 0, dx*(b.X-a.X)+dy*(b.Y-a.Y),
			1e-10*(1+math.Hypot(dx, dy)+size(l.Force))*math.Hypot(b.X-a.X, b.Y-a.Y))
	})
}

// Turning pattern and loads about the bolts' direction turns the shares.
func TestRotation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points, l := anyPoints(t), anyLoad(t)
		sin, cos := math.Sincos(rapid.Float64Range(-4, 4).Draw(t, "angle"))
		turn := func(v group.Vector) group.Vector {
			return group.Vector{X: cos*v.X - sin*v.Y, Y: sin*v.X + cos*v.Y, Z: v.Z}
		}
		var turned []pattern.Point
		for _, p := range points {
			v := turn(group.Vector{X: p.X, Y: p.Y})
			turned = append(turned, pattern.Point{X: v.X, Y: v.Y})
		}
		before := distribute(t, points, l)
		after := distribute(t, turned, group.Load{Name: l.Name, Force: turn(l.Force), Moment: turn(l.Moment), At: turn(l.At)})
		for i, s := range before {
			want := turn(group.Vector{X: s.X, Y: s.Y, Z: s.Axial})
			assertClose(t, want, after[i], largest(before))
		}
	})
}

// largest is the size that rounding is held against.
func largest(shares []group.Share) float64 {
	most := 1.0
	for _, s := range shares {
		most = max(most, size(group.Vector{X: s.X, Y: s.Y, Z: s.Axial}))
	}
	return most
}

func assertClose(t require.TestingT, want group.Vector, got group.Share, scale float64) {
	require.InDelta(t, want.X, got.X, 1e-9*scale)
	require.InDelta(t, want.Y, got.Y, 1e-9*scale)
	require.InDelta(t, want.Z, got.Axial, 1e-9*scale)
}

// A force may be moved along itself; a force moved elsewhere with the moment that
// makes up for it is the same load.
func TestPointOfActionAlongTheForce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points, l := anyPoints(t), anyLoad(t)
		before := distribute(t, points, l)
		along := rapid.Float64Range(-1e-2, 1e-2).Draw(t, "along")
		moved := l
		moved.At = group.Vector{X: l.At.X + along*l.Force.X, Y: l.At.Y + along*l.Force.Y, Z: l.At.Z + along*l.Force.Z}
		for i, s := range distribute(t, points, moved) {
			assertClose(t, group.Vector{X: before[i].X, Y: before[i].Y, Z: before[i].Axial}, s, largest(before)+size(l.Force))
		}
		moved = l
		moved.At = anyVector(t, "elsewhere", 1000)
		m := cross(minus(l.At, moved.At), l.Force)
		moved.Moment = group.Vector{X: l.Moment.X + m.X, Y: l.Moment.Y + m.Y, Z: l.Moment.Z + m.Z}
		for i, s := range distribute(t, points, moved) {
			assertClose(t, group.Vector{X: before[i].X, Y: before[i].Y, Z: before[i].Axial}, s, largest(before)+size(l.Force))
		}
	})
}

// The shares of two loads at one place are together those of their sum.
func TestSuperposition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points, a, b := anyPoints(t), anyLoad(t), anyLoad(t)
		a.Name, b.Name, b.At = "a", "b", a.At
		sum := group.Load{Name: "sum", At: a.At,
			Force:  group.Vector{X: a.Force.X + b.Force.X, Y: a.Force.Y + b.Force.Y, Z: a.Force.Z + b.Force.Z},
			Moment: group.Vector{X: a.Moment.X + b.Moment.X, Y: a.Moment.Y + b.Moment.Y, Z: a.Moment.Z + b.Moment.Z}}
		n := len(points)
		all := distribute(t, points, a, b, sum)
		for i := range n {
			first, second := all[i], all[n+i]
			assertClose(t, group.Vector{X: first.X + second.X, Y: first.Y + second.Y, Z: first.Axial + second.Axial},
				all[2*n+i], largest(all))
		}
	})
}

func TestOrderOfShares(t *testing.T) {
	points := []pattern.Point{{X: 0, Y: 0}, {X: 100, Y: 0}, {X: 0, Y: 50}}
	shares := distribute(t, points, group.Load{Name: "start", Force: group.Vector{Z: 3}, At: group.Vector{X: 100.0 / 3, Y: 50.0 / 3}},
		group.Load{Name: "run", Force: group.Vector{X: 6}, At: group.Vector{X: 100.0 / 3, Y: 50.0 / 3}})
	for i, s := range shares {
		assert.Equal(t, i%3+1, s.Bolt)
		assert.Equal(t, []string{"start", "run"}[i/3], s.Case)
	}
	assert.InDelta(t, 1, shares[1].Axial, 1e-12)
	assert.InDelta(t, 2, shares[4].X, 1e-12)
}
