package pattern_test

import (
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner/pattern"
)

// The legacy cross pattern of ASME PCC-1, positions numbered clockwise (from
// memory).
func TestStarOrderPCC1(t *testing.T) {
	published := map[int][][]int{
		4:  {{1, 3, 2, 4}},
		8:  {{1, 5, 3, 7}, {2, 6, 4, 8}},
		12: {{1, 7, 4, 10}, {2, 8, 5, 11}, {3, 9, 6, 12}},
		16: {{1, 9, 5, 13}, {3, 11, 7, 15}, {2, 10, 6, 14}, {4, 12, 8, 16}},
		20: {{1, 11, 6, 16}, {3, 13, 8, 18}, {5, 15, 10, 20}, {2, 12, 7, 17}, {4, 14, 9, 19}},
		24: {{1, 13, 7, 19}, {4, 16, 10, 22}, {2, 14, 8, 20}, {5, 17, 11, 23}, {3, 15, 9, 21}, {6, 18, 12, 24}},
	}
	for n, quads := range published {
		assert.Equal(t, slices.Concat(quads...), pattern.StarOrder(n), "%d bolts", n)
	}
}

func TestStarOrderOfOtherCounts(t *testing.T) {
	assert.Equal(t, []int{1, 2, 3}, pattern.StarOrder(3))
	assert.Equal(t, []int{1, 4, 2, 5, 3, 6}, pattern.StarOrder(6), "opposite pairs")
	assert.Equal(t, []int{1, 3, 5, 2, 4}, pattern.StarOrder(5), "step 2")
	assert.Equal(t, []int{1, 4, 7, 3, 6, 2, 5}, pattern.StarOrder(7), "step 3")
}

func TestGridGoesFromTheCentreOutwards(t *testing.T) {
	assert.Equal(t, []int{2, 7, 3, 6, 1, 8, 5, 4}, pattern.NewGrid(2, 4, 60, 80).Order())
	assert.Equal(t, []int{1, 4, 2, 3}, pattern.NewGrid(2, 2, 60, 80).Order())
}

// Every order visits each bolt once.
func TestOrderIsAPermutation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var p pattern.Pattern
		switch rapid.IntRange(0, 2).Draw(t, "kind") {
		case 0:
			p = pattern.NewCircle(rapid.IntRange(1, 200).Draw(t, "n"), 100)
		case 1:
			p = pattern.NewGrid(rapid.IntRange(1, 12).Draw(t, "rows"), rapid.IntRange(1, 12).Draw(t, "columns"), 50, 70)
		default:
			n := rapid.IntRange(1, 30).Draw(t, "n")
			points := make([]pattern.Point, n)
			for i := range points {
				points[i] = pattern.Point{X: rapid.Float64Range(-500, 500).Draw(t, "x"),
					Y: rapid.Float64Range(-500, 500).Draw(t, "y")}
			}
			p = pattern.NewFree(points)
		}
		order := p.Order()
		sorted := slices.Sorted(slices.Values(order))
		require.Len(t, order, len(p.Points))
		for i, number := range sorted {
			require.Equal(t, i+1, number)
		}
		require.Equal(t, order, p.Order())
	})
}

// In a circle of an even number of bolts each second bolt lies opposite the
// one before.
func TestStarPairsAreOpposite(t *testing.T) {
	for n := 4; n <= 64; n += 2 {
		order := pattern.StarOrder(n)
		for i := 0; i < n; i += 2 {
			assert.Equal(t, n/2, order[i+1]-order[i], "%d bolts: %v", n, order)
		}
	}
}

// Ten thousand bolts, the most a joint may have, are ordered at once.
func BenchmarkOrder10000(b *testing.B) {
	p := pattern.NewCircle(10000, 5000)
	for b.Loop() {
		p.Order()
	}
}
