package pattern

import (
	"cmp"
	"math"
	"slices"
)

// Order returns the tightening order as bolt numbers from 1: the star pattern
// for a circle, from the centre outwards for a grid and for free points; nil
// when no pattern is stated.
func (p Pattern) Order() []int {
	if p.Kind == Circle {
		return StarOrder(len(p.Points))
	}
	return centreOutwards(p.Points)
}

// StarOrder returns the crosswise order of n bolts on a circle. A multiple of
// four goes in quads k, k + n/2, k + n/4, k + 3n/4, the quads again crosswise;
// other even numbers in opposite pairs, odd ones in the largest step below half
// the circle that reaches every bolt. The legacy pattern of ASME PCC-1 (from
// memory) for 4 to 24 bolts.
func StarOrder(n int) []int {
	switch {
	case n <= 3:
		return count(n)
	case n%4 == 0:
		return expand(quadStarts(n/4), 0, n/2, n/4, 3*n/4)
	case n%2 == 0:
		return expand(stepped(n/2), 0, n/2)
	}
	order := stepped(n)
	for i := range order {
		order[i]++
	}
	return order
}

// expand turns each start s, from 0, into the bolts s+1+offset.
func expand(starts []int, offsets ...int) []int {
	order := make([]int, 0, len(starts)*len(offsets))
	for _, s := range starts {
		for _, offset := range offsets {
			order = append(order, s+offset+1)
		}
	}
	return order
}

// quadStarts returns the first bolts of the quads, from 0, crosswise again: an
// even number of quads in opposite pairs, an odd one in steps.
func quadStarts(n int) []int {
	if n%2 != 0 {
		return stepped(n)
	}
	starts := make([]int, 0, n)
	for k := range n / 2 {
		starts = append(starts, k, k+n/2)
	}
	return starts
}

// stepped returns 0..n-1 in steps of the largest number not above half of n
// that reaches all of them.
func stepped(n int) []int {
	step := max(1, n/2)
	for gcd(step, n) != 1 {
		step--
	}
	order := make([]int, n)
	for i := range order {
		order[i] = i * step % n
	}
	return order
}

func gcd(a, b int) int {
	for b != 0 {
		a, b = b, a%b
	}
	return a
}

func count(n int) []int {
	order := make([]int, n)
	for i := range order {
		order[i] = i + 1
	}
	return order
}

// centreOutwards goes from the bolt nearest the middle to the farthest; bolts
// equally far follow each other across the middle: the next is the one farthest
// from the last.
func centreOutwards(points []Point) []int {
	if len(points) == 0 {
		return nil
	}
	var middle Point
	for _, p := range points {
		middle.X += p.X / float64(len(points))
		middle.Y += p.Y / float64(len(points))
	}
	order := count(len(points))
	// Distances within a micrometre are the same ring.
	ring := func(number int) float64 { return math.Round(distance(points[number-1], middle) * 1000) }
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(ring(a), ring(b)) })
	for from := 0; from < len(order); {
		to := from + 1
		for to < len(order) && ring(order[to]) == ring(order[from]) {
			to++
		}
		crosswise(points, order[from:to])
		from = to
	}
	return order
}

// crosswise orders a ring of bolts so that each next one is the farthest from
// the last.
func crosswise(points []Point, ring []int) {
	for i := 1; i < len(ring); i++ {
		last, best := points[ring[i-1]-1], i
		for k := i + 1; k < len(ring); k++ {
			if distance(points[ring[k]-1], last) > distance(points[ring[best]-1], last)+1e-6 {
				best = k
			}
		}
		ring[i], ring[best] = ring[best], ring[i]
		slices.Sort(ring[i+1:])
	}
}

func distance(a, b Point) float64 { return math.Hypot(a.X-b.X, a.Y-b.Y) }
