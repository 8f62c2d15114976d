package multigrid

import (
	"math"
	"slices"
)

// A merge says how the cells of one axis become those of the next coarser
// level. Each coarse cell is one, two or three fine cells; coarse nodes are
// therefore fine nodes.
type merge struct {
	fine, coarse *Axis

	count []int // count[I]: fine cells in coarse cell I, from 1
	node  []int // node[I]: fine node of coarse node I; padded at the upper end
	cell  []int // cell[i]: coarse cell of fine cell i

	// Linear interpolation: the value at fine node f is
	// (1-nodeW[f]) of coarse node cell[f] plus nodeW[f] of the next, and that
	// at the centre of fine cell i is lowW[i] of the coarse centre low[i] plus
	// highW[i] of the next one. The two weights of a centre beside a Slip end
	// repeat the nearest value; beside a Stick end they lead to zero at the wall.
	nodeW     []float64
	low       []int
	lowW, upW []float64
	lowN, upN []float64 // gather weights of nodes node[I]-1 and node[I]+1
	triples   []int     // coarse cells with three children
	allPairs  bool      // every coarse cell is two fine cells
}

// An axis is coarsened when its thinnest cell is no wider than aspectLimit
// times the thinnest of both axes; its cells are merged while they are no wider
// than spreadLimit times its own thinnest. Where that would leave more than
// leastShrink of the cells, both limits rise. Faster coarsening of graded grids
// costs iterations: with leastShrink 0.75 up to three times as many, growing
// with the size. So does coarsening a layer of variable viscosity down to two
// rows: up to three times as many in a wide box.
const (
	aspectLimit = 1.5
	spreadLimit = 2.0
	leastShrink = 0.95
	limitGrowth = 1.5
	fewestCells = 4 // an axis is not coarsened below
)

// coarsen chooses the merges of both axes such that the thinnest cells become
// thicker: on a uniform grid of square cells all of them are paired, flat
// cells are merged in their short direction only, and on a graded grid just
// the thin rows are. A pointwise smoother then works on any grid, for it sees
// errors that vary on the scale of the thinnest cells only where cells are thin
// and coarsening takes over where they are not. It returns false when no axis
// can be coarsened.
func coarsen(x, z *Axis) (mx, mz *merge, ok bool) {
	thinnest := min(x.thinnest(), z.thinnest())
	if math.IsInf(thinnest, 1) {
		return nil, nil, false
	}
	for f := 1.0; ; f *= limitGrowth {
		cx, cz := x.groups(thinnest, f), z.groups(thinnest, f)
		if float64(len(cx)*len(cz)) <= leastShrink*float64(x.N*z.N) ||
			f*thinnest > slices.Max(x.H) && f*thinnest > slices.Max(z.H) {
			return newMerge(x, cx), newMerge(z, cz), len(cx)*len(cz) < x.N*z.N
		}
	}
}

// thinnest returns the smallest width of an axis that can be coarsened, else
// infinity.
func (a *Axis) thinnest() float64 {
	if a.N < 2*fewestCells {
		return math.Inf(1)
	}
	return slices.Min(a.widths())
}

// groups returns the numbers of cells of a that make up each coarse cell, when
// the thinnest cell of both axes is given and the limits are raised by f.
func (a *Axis) groups(thinnest, f float64) []int {
	limit := 0.0 // merge nothing
	if h := a.thinnest(); h <= aspectLimit*f*thinnest {
		limit = spreadLimit * f * h
	}
	return groups(a.widths(), limit)
}

// groups returns the numbers of fine cells that make up each coarse cell when
// neighbours no wider than limit are paired. A thin cell between wide ones is
// left alone.
func groups(h []float64, limit float64) []int {
	n := len(h)
	var counts []int
	for i := 0; i < n; {
		if h[i] > limit {
			counts = append(counts, 1)
			i++
			continue
		}
		run := 1
		for i+run < n && h[i+run] <= limit {
			run++
		}
		counts = append(counts, pairUp(h[i:i+run])...)
		i += run
	}
	return counts
}

// pairUp splits a run of cells of widths h into pairs and, when their number is
// odd, one triple, of those cells that are thinnest together, as near to the
// middle as can be.
func pairUp(h []float64) []int {
	n := len(h)
	if n == 1 {
		return []int{1}
	}
	counts := make([]int, n/2)
	for i := range counts {
		counts[i] = 2
	}
	if n%2 == 1 {
		best, least := 0, math.Inf(1)
		for i := range counts {
			sum := h[2*i] + h[2*i+1] + h[2*i+2]
			closer := abs(2*i+1-n/2) < abs(2*best+1-n/2)
			if sum < least*(1-sameWidth) || sum < least*(1+sameWidth) && closer {
				best, least = i, sum
			}
		}
		counts[best] = 3
	}
	return counts
}

// sameWidth is the relative difference of widths that rounding may make.
const sameWidth = 1e-9

func abs(i int) int { return max(i, -i) }

func newMerge(fine *Axis, count []int) *merge {
	n := len(count)
	m := &merge{fine: fine, count: make([]int, n+2), node: make([]int, n+2), cell: make([]int, fine.N+2)}
	widths := make([]float64, n)
	m.allPairs = true
	f := 1
	for I := 1; I <= n; I++ {
		m.count[I] = count[I-1]
		m.node[I] = f
		if count[I-1] != 2 {
			m.allPairs = false
		}
		if count[I-1] == 3 {
			m.triples = append(m.triples, I)
		}
		for range count[I-1] {
			m.cell[f] = I
			widths[I-1] += fine.H[f]
			f++
		}
	}
	m.node[n+1] = f
	m.cell[f] = n + 1
	a := NewAxis(widths, fine.Lo, fine.Hi)
	m.coarse = &a
	m.setNodeWeights()
	m.setCentreWeights()
	return m
}

func (m *merge) setNodeWeights() {
	m.nodeW = make([]float64, m.fine.N+2)
	m.lowN, m.upN = make([]float64, m.coarse.N+2), make([]float64, m.coarse.N+2)
	for I := 1; I <= m.coarse.N; I++ {
		sum := 0.0
		for f := m.node[I]; f < m.node[I+1]; f++ {
			m.nodeW[f] = sum * m.coarse.RH[I]
			sum += m.fine.H[f]
		}
		if m.count[I] > 1 {
			m.upN[I] = 1 - m.nodeW[m.node[I]+1]
			m.lowN[I+1] = m.nodeW[m.node[I+1]-1]
		}
	}
	if m.fine.wraps() {
		m.lowN[1] = m.lowN[m.coarse.N+1]
	}
}

func (m *merge) setCentreWeights() {
	m.low = make([]int, m.fine.N+2)
	m.lowW, m.upW = make([]float64, m.fine.N+2), make([]float64, m.fine.N+2)
	for I := 1; I <= m.coarse.N; I++ {
		position := -0.5 * m.coarse.H[I] // of the fine centre, from the coarse one
		for f := m.node[I]; f < m.node[I+1]; f++ {
			position += 0.5 * m.fine.H[f]
			m.setCentreWeight(f, I, position)
			position += 0.5 * m.fine.H[f]
		}
	}
}

// setCentreWeight interpolates to a centre at a distance from that of its
// coarse cell I.
func (m *merge) setCentreWeight(f, I int, distance float64) {
	a := m.coarse
	low, end := I, a.Hi
	if distance < 0 {
		low, end = I-1, a.Lo
	}
	m.low[f] = low
	far := 0.0 // weight of the neighbour of cell I
	if distance < 0 {
		far = -distance * a.RD[I]
	} else {
		far = distance * a.RD[I+1]
	}
	near := 1 - far
	if atWall := low == 0 || low == a.N; atWall && end != Wrap {
		far = 0
		if end == Slip {
			near = 1
		}
	}
	m.lowW[f], m.upW[f] = near, far
	if distance < 0 {
		m.lowW[f], m.upW[f] = far, near
	}
}
