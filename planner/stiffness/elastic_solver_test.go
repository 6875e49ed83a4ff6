package stiffness_test

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/blas/blas64"
	"gonum.org/v1/gonum/lapack/lapack64"
	"gonum.org/v1/gonum/mat"
)

// stack is what a bolt presses together, as an elastic body of revolution: layers
// that touch, pressed by a head above and by a nut below or, in a tapped joint,
// pulled up by the thread in the bore of the last layer. Lengths mm, MPa.
type stack struct {
	layers     []elastic // from the head down
	bearing    float64   // d_W of head and nut
	outer      float64
	poisson    float64
	thread     float64 // d of a tapped joint; 0: a nut
	engagement float64 // length of thread that pulls
	bonded     bool    // the layers cannot part
}

type elastic struct{ thickness, modulus, hole float64 }

// fixed is a support so stiff that what rests on it does not move, N/mm.
const fixed = 1e14

// touching is the stiffness of a node that touches the next layer, N/mm.
const touching = 1e11

// mesh is a stack cut into ring elements: rows of nodes downwards, columns
// outwards. Where layers touch, the row stands twice.
type mesh struct {
	stack
	radii   []float64
	depths  []float64 // of each row
	layerOf []int     // of each row
	active  []bool    // of each node: an element touches it
	closed  []bool    // of each node of a layer's last row: it touches the next layer
}

func (m *mesh) node(row, column int) int { return row*len(m.radii) + column }

// compliance solves the axisymmetric elastic problem with bilinear finite elements
// and returns the closing of head and far end over the force, mm/N. It knows
// nothing of cones. A soft end presses evenly, and its movement is the mean over
// it; a rigid one moves as one. The truth lies between the two. The layers stick
// where they are pressed together and part where they would be pulled apart.
func (s stack) compliance(t testing.TB, n int, rigid bool) float64 {
	m := s.cut(n)
	head, far := m.headWeights(), m.farWeights()
	for range 30 {
		closing, force, changed := m.solve(t, head, far, rigid)
		if !changed {
			return closing / force
		}
	}
	require.Fail(t, "the contact of the layers does not settle")
	return 0
}

// cut divides the stack into about n by n elements, nodes on every edge.
func (s stack) cut(n int) *mesh {
	m := &mesh{stack: s}
	hole := s.layers[0].hole
	if s.thread > 0 {
		for i := range n / 6 {
			m.radii = append(m.radii, s.thread/2+(hole-s.thread)/2*float64(i)/float64(n/6))
		}
	}
	// Stress is steep at the edge of the bearing face: the finest elements lie there.
	within := n / 2
	finest := (s.bearing - hole) / 2 / float64(within) / 4
	for _, step := range growing((s.bearing-hole)/2, finest, within) {
		m.radii = append(m.radii, s.bearing/2-step)
	}
	slices.Reverse(m.radii[len(m.radii)-within-1:])
	if s.outer > s.bearing {
		for _, step := range growing((s.outer-s.bearing)/2, finest, n/2)[1:] {
			m.radii = append(m.radii, s.bearing/2+step)
		}
	}
	var depth float64
	for k, l := range s.layers {
		for _, step := range s.rows(k, n, finest) {
			m.depths = append(m.depths, depth+step)
			m.layerOf = append(m.layerOf, k)
		}
		depth += l.thickness
	}
	nodes := len(m.radii) * len(m.depths)
	m.active, m.closed = make([]bool, nodes), make([]bool, nodes)
	m.eachElement(func(corners [4]int, _, _ int) {
		for _, c := range corners {
			m.active[c] = true
		}
	})
	for row := range m.depths {
		for column := range m.radii {
			m.closed[m.node(row, column)] = m.touches(row, column)
		}
	}
	return m
}

// rows returns the rows of a layer below its upper face: finest where it is pressed
// or pulled.
func (s stack) rows(layer, n int, finest float64) []float64 {
	thickness, last := s.layers[layer].thickness, len(s.layers)-1
	fromAbove := growing(thickness, finest, n/2)
	switch {
	case last == 0: // pressed on both faces
		half := growing(thickness/2, finest, n/2)
		for i := len(half) - 2; i >= 0; i-- {
			half = append(half, thickness-half[i])
		}
		return half
	case layer == last && s.thread == 0:
		fromBelow := make([]float64, len(fromAbove))
		for i, step := range fromAbove {
			fromBelow[len(fromAbove)-1-i] = thickness - step
		}
		return fromBelow
	case layer == 0 || layer == last:
		return fromAbove
	}
	return growing(thickness, 2*thickness/float64(n), n/2)
}

// growing returns 0 to length in n steps that grow by one factor from the first;
// even ones where the first would be too long.
func growing(length, first float64, n int) []float64 {
	first = math.Min(first, length/float64(n)*(1-1e-6))
	sum := func(q float64, n int) float64 { return first * (math.Pow(q, float64(n)) - 1) / (q - 1) }
	low, high := 1+1e-9, 10.0
	for range 100 {
		if q := (low + high) / 2; sum(q, n) < length {
			low = q
		} else {
			high = q
		}
	}
	steps := make([]float64, n+1)
	for i := 1; i < n; i++ {
		steps[i] = sum(low, i)
	}
	steps[n] = length
	return steps
}

// eachElement visits the elements: corners, row and column of the first.
func (m *mesh) eachElement(visit func(corners [4]int, row, column int)) {
	for row := range len(m.depths) - 1 {
		if m.layerOf[row] != m.layerOf[row+1] {
			continue
		}
		for column := range len(m.radii) - 1 {
			if m.radii[column] >= m.layers[m.layerOf[row]].hole/2-1e-9 {
				visit([4]int{m.node(row, column), m.node(row, column+1), m.node(row+1, column+1), m.node(row+1, column)}, row, column)
			}
		}
	}
}

// touches reports whether a node lies on the next layer.
func (m *mesh) touches(row, column int) bool {
	return row+1 < len(m.depths) && m.layerOf[row] != m.layerOf[row+1] &&
		m.active[m.node(row, column)] && m.active[m.node(row+1, column)]
}

// faceWeights returns the share of an even pressure on the bearing face that each
// node of a row takes.
func (m *mesh) faceWeights(row int) map[int]float64 {
	weights := map[int]float64{}
	hole := m.layers[m.layerOf[row]].hole
	total := math.Pi / 4 * (m.bearing*m.bearing - hole*hole)
	for i := range len(m.radii) - 1 {
		a, b := m.radii[i], m.radii[i+1]
		if a < hole/2-1e-9 || b > m.bearing/2+1e-9 {
			continue
		}
		area, moment := math.Pi*(b*b-a*a), 2*math.Pi*(b*b*b-a*a*a)/3
		share := (moment - a*area) / (b - a)
		weights[m.node(row, i)] += (area - share) / total
		weights[m.node(row, i+1)] += share / total
	}
	return weights
}

func (m *mesh) headWeights() map[int]float64 { return m.faceWeights(0) }

// farWeights is the nut's face, or an even pull along the engaged thread.
func (m *mesh) farWeights() map[int]float64 {
	if m.thread == 0 {
		return m.faceWeights(len(m.depths) - 1)
	}
	weights := map[int]float64{}
	last := len(m.layers) - 1
	var top float64
	for _, l := range m.layers[:last] {
		top += l.thickness
	}
	for row := range len(m.depths) - 1 {
		if m.layerOf[row] != last {
			continue
		}
		// An element that the end of the engagement cuts pulls with its share.
		length := math.Max(0, math.Min(m.depths[row+1], top+m.engagement)-m.depths[row])
		weights[m.node(row, 0)] += length / 2 / m.engagement
		weights[m.node(row+1, 0)] += length / 2 / m.engagement
	}
	return weights
}

// solve presses the ends together and looks which nodes touch now.
func (m *mesh) solve(t testing.TB, head, far map[int]float64, rigid bool) (closing, force float64, changed bool) {
	dof := 2 * len(m.active)
	k := mat.NewSymBandDense(dof, 2*(len(m.radii)+1)+1, nil)
	add := func(i, j int, v float64) { k.SetSymBand(i, j, k.At(i, j)+v) }
	m.eachElement(func(corners [4]int, row, column int) { m.element(add, corners, row, column) })
	for node, active := range m.active {
		if !active {
			add(2*node, 2*node, fixed)
			add(2*node+1, 2*node+1, fixed)
		}
	}
	next := len(m.radii) // from a node to the one below
	for node, closed := range m.closed {
		if closed {
			for d := 2 * node; d < 2*node+2; d++ {
				add(d, d, touching)
				add(d+2*next, d+2*next, touching)
				add(d, d+2*next, -touching)
			}
		}
	}
	u := make([]float64, dof) // forces, then movements: outwards and down, of each node
	for node, w := range head {
		if rigid { // pushed down by 1 mm
			add(2*node+1, 2*node+1, fixed)
			u[2*node+1] = fixed
		} else { // by a force of 1 N in all
			u[2*node+1] = w
		}
	}
	for node, w := range far {
		switch {
		case rigid && w > 0:
			add(2*node+1, 2*node+1, fixed)
		case !rigid:
			u[2*node+1] = -w
		}
	}
	if !rigid { // the forces are in balance: one node anywhere holds the body
		node := m.node(len(m.depths)-1, len(m.radii)-1)
		add(2*node+1, 2*node+1, touching)
	}
	factor, ok := lapack64.Pbtrf(k.RawSymBand())
	require.True(t, ok)
	lapack64.Pbtrs(factor, blas64.General{Rows: dof, Cols: 1, Stride: 1, Data: u})

	force = 1
	if rigid {
		force = 0
	}
	for node, w := range head {
		closing += w * u[2*node+1]
		if rigid {
			force += fixed * (1 - u[2*node+1])
		}
	}
	for node, w := range far {
		closing -= w * u[2*node+1]
	}
	return closing, force, m.contact(u)
}

// contact closes what is pressed together, opens what would be pulled apart, and
// reports whether anything changed.
func (m *mesh) contact(u []float64) bool {
	changed := false
	if m.bonded {
		return false
	}
	next := len(m.radii)
	for row := range m.depths {
		for column := range m.radii {
			node := m.node(row, column)
			if !m.touches(row, column) {
				continue
			}
			pressed := u[2*node+1] > u[2*(node+next)+1]
			changed = changed || pressed != m.closed[node]
			m.closed[node] = pressed
		}
	}
	return changed
}

// element adds the stiffness of a rectangular ring element by 2 x 2 Gauss points.
func (m *mesh) element(add func(i, j int, v float64), corners [4]int, row, column int) {
	e, nu := m.layers[m.layerOf[row]].modulus, m.poisson
	r0, dr, dz := m.radii[column], m.radii[column+1]-m.radii[column], m.depths[row+1]-m.depths[row]
	c := e / ((1 + nu) * (1 - 2*nu))
	d := [4][4]float64{ // strains: rr, zz, tt, rz
		{c * (1 - nu), c * nu, c * nu, 0}, {c * nu, c * (1 - nu), c * nu, 0},
		{c * nu, c * nu, c * (1 - nu), 0}, {0, 0, 0, c * (1 - 2*nu) / 2},
	}
	g := 1 / math.Sqrt(3)
	var ke [8][8]float64
	for _, xi := range []float64{-g, g} {
		for _, eta := range []float64{-g, g} {
			radius := r0 + dr*(1+xi)/2
			var b [4][8]float64
			signs := [4][2]float64{{-1, -1}, {1, -1}, {1, 1}, {-1, 1}}
			for n, s := range signs {
				shape := (1 + s[0]*xi) * (1 + s[1]*eta) / 4
				byR, byZ := s[0]*(1+s[1]*eta)/4*2/dr, s[1]*(1+s[0]*xi)/4*2/dz
				b[0][2*n], b[1][2*n+1], b[2][2*n] = byR, byZ, shape/radius
				b[3][2*n], b[3][2*n+1] = byZ, byR
			}
			volume := 2 * math.Pi * radius * dr * dz / 4
			for q := range 8 {
				var stress [4]float64
				for i := range 4 {
					for j := range 4 {
						stress[i] += d[i][j] * b[j][q] * volume
					}
				}
				for p := range 8 {
					for i := range 4 {
						ke[p][q] += b[i][p] * stress[i]
					}
				}
			}
		}
	}
	for p := range 8 {
		for q := range 8 {
			i, j := 2*corners[p/2]+p%2, 2*corners[q/2]+q%2
			if i <= j {
				add(i, j, ke[p][q])
			}
		}
	}
}
