package group_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/group"
	"clampback/planner/pattern"
)

func TestWhatCannotBeShared(t *testing.T) {
	square := []pattern.Point{{X: 0, Y: 0}, {X: 100, Y: 0}, {X: 100, Y: 100}, {X: 0, Y: 100}}
	row := []pattern.Point{{X: 10, Y: 0.1}, {X: 60, Y: 0.1}, {X: 90, Y: 0.1}}
	column := []pattern.Point{{X: 0.1, Y: 0}, {X: 0.1, Y: 50}}
	// On a line 30 deg from x, rounded as a drawing does.
	slope := []pattern.Point{{X: 0, Y: 0}, {X: 86.603, Y: 50}, {X: 173.205, Y: 100}}
	pull := func(at group.Vector) []group.Load {
		return []group.Load{{Name: "pull", Force: group.Vector{Z: 1000}, At: at}}
	}
	huge := group.Load{Name: "huge", Force: group.Vector{X: 2e9}, Moment: group.Vector{Y: 2e12}, At: group.Vector{Z: 2e5}}
	cases := []struct {
		name   string
		points []pattern.Point
		loads  []group.Load
		want   []string // path: message
	}{
		{"no bolts", nil, pull(group.Vector{}), []string{"points: there are no bolts to share the loads"}},
		{"no load case", square, nil, []string{"loads: there is no load case"}},
		{"no name", square, []group.Load{{Name: " "}}, []string{"loads[0]: load case 1 has no name"}},
		{"one name twice", square, []group.Load{{Name: "a"}, {Name: "b"}, {Name: "a"}},
			[]string{`loads[2]: load cases 1 and 3 are both named "a"`}},
		{"no numbers", []pattern.Point{{X: math.NaN()}, {Y: math.Inf(1)}},
			[]group.Load{{Name: "a", Force: group.Vector{X: math.Inf(-1)}, Moment: group.Vector{Y: math.NaN()}}},
			[]string{"points[0]: x of bolt 1 is no finite number", "points[1]: y of bolt 2 is no finite number",
				`loads[0].force: x of the force of load case "a" is no finite number`,
				`loads[0].moment: y of the moment of load case "a" is no finite number`}},
		{"huge", append([]pattern.Point{{X: -2e5}}, square...), []group.Load{huge}, []string{
			"points[0]: x of bolt 1 is -200000 mm; it must be at most 100000 mm",
			`loads[0].force: x of the force of load case "huge" is 2000000 kN; it must be at most 1000000 kN`,
			`loads[0].moment: y of the moment of load case "huge" is 2e+09 N.m; it must be at most 1e+09 N.m`,
			`loads[0].at: z of the point of action of load case "huge" is 200000 mm; it must be at most 100000 mm`}},
		{"one place", append(square, pattern.Point{X: 99.9999, Y: 0.0002}), pull(group.Vector{}),
			[]string{"points[4]: bolts 2 and 5 sit in one place"}},
		{"single bolt", square[:1], pull(group.Vector{X: 0, Y: 20, Z: 5}),
			[]string{`loads[0]: a single bolt cannot carry the moment of 20 N.m about the x axis in load case "pull"`}},
		{"single bolt, three axes", square[:1], []group.Load{{Name: "m", Moment: group.Vector{X: 1e3, Y: 2e3, Z: 3e3}}},
			[]string{`loads[0]: a single bolt cannot carry the moment of 1 N.m about the x axis in load case "m"`,
				`loads[0]: a single bolt cannot carry the moment of 2 N.m about the y axis in load case "m"`,
				`loads[0]: a single bolt cannot carry the moment of 3 N.m about the z axis in load case "m"`}},
		{"row", row, pull(group.Vector{Y: 10}),
			[]string{`loads[0]: the bolts stand in one line and cannot carry the moment of 9.9 N.m about the x axis in load case "pull"`}},
		{"column", column, pull(group.Vector{X: 10}),
			[]string{`loads[0]: the bolts stand in one line and cannot carry the moment of -9.9 N.m about the y axis in load case "pull"`}},
		{"slope", slope, []group.Load{{Name: "m", Moment: group.Vector{X: 1e6}}},
			[]string{`loads[0]: the bolts stand in one line and cannot carry the moment of 866.025 N.m about the line, which is 30 deg from the x axis, in load case "m"`}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			shares, err := group.Distribute(c.points, c.loads)
			assert.Nil(t, shares)
			var e *group.FaultsError
			require.ErrorAs(t, err, &e)
			var got []string
			for _, f := range e.Faults {
				got = append(got, f.Path+": "+f.Message)
				assert.NotEmpty(t, f.Mend)
			}
			assert.Equal(t, c.want, got)
			assert.Contains(t, err.Error(), c.want[0])
		})
	}
}

// What a line or a single bolt can carry is shared.
func TestWhatALineCarries(t *testing.T) {
	row := []pattern.Point{{X: 0, Y: 0.1}, {X: 50, Y: 0.1}, {X: 100, Y: 0.1}}
	shares, err := group.Distribute(row, []group.Load{
		{Name: "pull", Force: group.Vector{Z: 900}, At: group.Vector{X: 75, Y: 0.1, Z: 200}},
		{Name: "turn", Moment: group.Vector{Z: 1000}},
	})
	require.NoError(t, err)
	for i, want := range []float64{75, 300, 525} { // 900/3 and 22500/5000 a mm
		assert.InDelta(t, want, shares[i].Axial, 1e-9)
	}
	for i, want := range []float64{-10, 0, 10} {
		assert.InDelta(t, want, shares[3+i].Y, 1e-12)
	}
	// A moment across a line 30 deg from x, places rounded to 0.01 mm.
	slope := []pattern.Point{{X: 0, Y: 0}, {X: 86.6, Y: 50}, {X: 173.21, Y: 100}}
	shares, err = group.Distribute(slope, []group.Load{{Name: "m", Moment: group.Vector{X: -600e3, Y: 1039.23e3}}})
	require.NoError(t, err)
	for i, want := range []float64{6000, 0, -6000} { // 1200 N.m over 200 mm
		assert.InDelta(t, want, shares[i].Axial, 1)
	}
	// A force at the centroid, where the sums leave rounding for a moment.
	p := group.PropertiesOf(slope)
	for _, off := range []float64{0, 1e-11} {
		shares, err = group.Distribute(slope, []group.Load{{Name: "pull", Force: group.Vector{Z: 3e5}, At: group.Vector{X: p.CentroidX + off, Y: p.CentroidY}}})
		require.NoError(t, err)
		for _, s := range shares {
			assert.InDelta(t, 1e5, s.Axial, 1e-6)
		}
	}
	_, err = group.Distribute(slope, []group.Load{{Name: "m", Moment: group.Vector{X: -600e3, Y: 1038e3}}})
	assert.ErrorContains(t, err, "about the line, which is 29.9993 deg from the x axis")
	shares, err = group.Distribute([]pattern.Point{{X: 25.4, Y: -3.3}}, []group.Load{
		{Name: "pull", Force: group.Vector{X: 5, Z: 900}, At: group.Vector{X: 25.4, Y: -3.3}}})
	require.NoError(t, err)
	assert.Equal(t, []group.Share{{Case: "pull", Bolt: 1, Axial: 900, X: 5}}, shares)
}

// Two bolts are in one place when nearer than a micrometre, wherever that falls.
func TestOnePlaceIsFoundEverywhere(t *testing.T) {
	for angle := range 360 {
		sin, cos := math.Sincos(float64(angle) * math.Pi / 180)
		for _, distance := range []float64{0, 0.0003, 0.0009, 0.0011} {
			points := []pattern.Point{{X: 500, Y: 0}, {X: -33.3337, Y: 71.0002}, {X: -33.3337 + distance*cos, Y: 71.0002 + distance*sin}}
			_, err := group.Distribute(points, []group.Load{{Name: "none"}})
			if distance < 0.001 {
				assert.ErrorContains(t, err, "bolts 2 and 3 sit in one place", "%d deg, %g mm", angle, distance)
			} else {
				assert.NoError(t, err)
			}
		}
	}
}
