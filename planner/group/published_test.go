package group_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/group"
	"clampback/planner/internal/published"
	"clampback/planner/pattern"
)

func vector(t *testing.T, text string) group.Vector {
	var v group.Vector
	n, err := fmt.Sscan(text, &v.X, &v.Y, &v.Z)
	require.NoError(t, err, "%d numbers in %q", n, text)
	return v
}

func points(t *testing.T, text string) []pattern.Point {
	var all []pattern.Point
	for pair := range strings.SplitSeq(text, ";") {
		var p pattern.Point
		_, err := fmt.Sscan(pair, &p.X, &p.Y)
		require.NoError(t, err, pair)
		all = append(all, p)
	}
	return all
}

// Worked examples of textbooks are printed rounded or cut off: a unit of the
// last digit.
func TestWorkedExamples(t *testing.T) {
	for _, row := range published.Rows(t, "group_examples.csv") {
		shares, err := group.Distribute(points(t, row["points"]), []group.Load{{Name: row["example"],
			Force: vector(t, row["force"]), Moment: vector(t, row["moment"]), At: vector(t, row["at"])}})
		require.NoError(t, err)
		bolt, _ := published.Number(t, row, "bolt")
		s := shares[int(bolt)-1]
		got, known := map[string]float64{"axial": s.Axial, "x": s.X, "y": s.Y, "resultant": math.Hypot(s.X, s.Y)}[row["part"]]
		require.True(t, known, row["part"])
		want, half := published.Number(t, row, "value")
		assert.InDelta(t, want, got, 2*half, "%v", row)
	}
}

// The highest force of a bolt circle under a moment is 4 M/(n D) = 2 M/(n R), where
// a bolt stands on the side that opens: pressure vessel handbooks on anchor
// bolts (from memory), there with the weight's part -W/n.
func TestBoltCircleUnderAMoment(t *testing.T) {
	const moment, diameter, weight = 48e6, 600.0, 90e3
	for n := 3; n <= 64; n++ {
		circle := pattern.NewCircle(n, diameter)
		shares, err := group.Distribute(circle.Points, []group.Load{{Name: "wind", Force: group.Vector{Z: -weight},
			Moment: group.Vector{X: moment}}}) // bolt 1 stands at y = R
		require.NoError(t, err)
		assert.InEpsilon(t, 4*moment/(float64(n)*diameter)-weight/float64(n), shares[0].Axial, 1e-12, "%d bolts", n)
		for _, s := range shares {
			assert.LessOrEqual(t, s.Axial, shares[0].Axial*(1+1e-12))
		}
	}
}

// Torsion on a bolt circle: M/(n R) for each bolt, across its radius.
func TestBoltCircleUnderTorsion(t *testing.T) {
	circle := pattern.NewCircle(10, 250)
	shares, err := group.Distribute(circle.Points, []group.Load{{Name: "start", Moment: group.Vector{Z: 2e6}}})
	require.NoError(t, err)
	for i, s := range shares {
		assert.InEpsilon(t, 2e6/(10*125), math.Hypot(s.X, s.Y), 1e-12)
		assert.InDelta(t, 0, s.X*circle.Points[i].X+s.Y*circle.Points[i].Y, 1e-9)
		assert.Positive(t, circle.Points[i].X*s.Y-circle.Points[i].Y*s.X, "turns the way the moment does")
	}
}
