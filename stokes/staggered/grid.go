package staggered

import (
	"fmt"
	"math"
	"slices"
)

// A Grid is a rectangular box cut into rectangular cells by lines of constant
// x and z. It is immutable and safe for concurrent use. Make one with
// [Uniform], [Graded] or [NewGrid].
type Grid struct {
	x, z axis
}

// An axis is one direction of the grid.
type axis struct {
	nodes   []float64 // n+1 cell edges
	centres []float64 // n midpoints of the cells
	widths  []float64 // n cell widths
	uniform bool
}

// uniformTolerance is how far nodes may lie from equal spacing, relative to
// the largest coordinate, and still be taken as equally spaced: the rounding
// of a few operations.
const uniformTolerance = 4e-15

// Uniform returns a grid of nx by nz equal cells over the box
// 0 ≤ x ≤ width, 0 ≤ z ≤ height.
func Uniform(nx, nz int, width, height float64) (*Grid, error) {
	if err := checkBox(nx, nz, width, height); err != nil {
		return nil, err
	}
	return NewGrid(equalNodes(nx, width), equalNodes(nz, height))
}

// NewGrid returns the grid whose cell edges lie at the coordinates x, from
// left to right, and z, from bottom to top. Both must be finite and strictly
// increasing and hold at least two values; they are copied.
func NewGrid(x, z []float64) (*Grid, error) {
	ax, err := newAxis("x", x)
	if err != nil {
		return nil, err
	}
	az, err := newAxis("z", z)
	if err != nil {
		return nil, err
	}
	return &Grid{x: ax, z: az}, nil
}

// Cells returns the number of columns and of rows of cells.
func (g *Grid) Cells() (nx, nz int) { return len(g.x.widths), len(g.z.widths) }

// NX returns the number of columns of cells.
func (g *Grid) NX() int { return len(g.x.widths) }

// NZ returns the number of rows of cells.
func (g *Grid) NZ() int { return len(g.z.widths) }

// Width returns the extent of the box in x.
func (g *Grid) Width() float64 { return g.x.extent() }

// Height returns the extent of the box in z.
func (g *Grid) Height() float64 { return g.z.extent() }

// Area returns width times height.
func (g *Grid) Area() float64 { return g.Width() * g.Height() }

// XNodes returns the nx+1 cell edges in x. The slice is shared: do not change it.
func (g *Grid) XNodes() []float64 { return g.x.nodes }

// ZNodes returns the nz+1 cell edges in z. The slice is shared: do not change it.
func (g *Grid) ZNodes() []float64 { return g.z.nodes }

// XCentres returns the nx cell midpoints in x. The slice is shared: do not change it.
func (g *Grid) XCentres() []float64 { return g.x.centres }

// ZCentres returns the nz cell midpoints in z. The slice is shared: do not change it.
func (g *Grid) ZCentres() []float64 { return g.z.centres }

// DX returns the nx cell widths. The slice is shared: do not change it.
func (g *Grid) DX() []float64 { return g.x.widths }

// DZ returns the nz cell heights. The slice is shared: do not change it.
func (g *Grid) DZ() []float64 { return g.z.widths }

// UniformX reports whether all columns have the same width, to rounding; DX
// then holds one value nx times.
func (g *Grid) UniformX() bool { return g.x.uniform }

// UniformZ reports whether all rows have the same height, to rounding; DZ
// then holds one value nz times.
func (g *Grid) UniformZ() bool { return g.z.uniform }

// Equal reports whether h has the same cell edges as g.
func (g *Grid) Equal(h *Grid) bool {
	if g == h {
		return true
	}
	return g != nil && h != nil &&
		slices.Equal(g.x.nodes, h.x.nodes) && slices.Equal(g.z.nodes, h.z.nodes)
}

// String describes the grid in one line.
func (g *Grid) String() string {
	return fmt.Sprintf("%dx%d cells, %s x %s", g.NX(), g.NZ(), g.x.describe(), g.z.describe())
}

func (a axis) extent() float64 { return a.nodes[len(a.nodes)-1] - a.nodes[0] }

func (a axis) describe() string {
	if a.uniform {
		return fmt.Sprintf("%.6g", a.extent())
	}
	return fmt.Sprintf("%.6g (spacing %.3g to %.3g)", a.extent(), slices.Min(a.widths), slices.Max(a.widths))
}

func newAxis(name string, nodes []float64) (axis, error) {
	if len(nodes) < 2 {
		return axis{}, fmt.Errorf("staggered: %s has %d node coordinates, want at least 2", name, len(nodes))
	}
	for i, v := range nodes {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return axis{}, fmt.Errorf("staggered: %s node %d is %v, want a finite number", name, i, v)
		}
		if i > 0 && !(v > nodes[i-1]) {
			return axis{}, fmt.Errorf("staggered: %s nodes %d and %d are %v and %v, want strictly increasing",
				name, i-1, i, nodes[i-1], v)
		}
	}
	n := len(nodes) - 1
	a := axis{nodes: slices.Clone(nodes), centres: make([]float64, n), widths: make([]float64, n)}
	if math.IsInf(a.extent(), 0) {
		return axis{}, fmt.Errorf("staggered: %s nodes run from %v to %v, a distance that overflows", name, nodes[0], nodes[n])
	}
	a.uniform = equallySpaced(a.nodes)
	for i := range n {
		a.centres[i] = nodes[i] + 0.5*(nodes[i+1]-nodes[i])
		a.widths[i] = nodes[i+1] - nodes[i]
		if a.uniform {
			// One value for all cells: rounding in the node coordinates
			// would otherwise break the symmetry of the kernels.
			a.widths[i] = a.extent() / float64(n)
		}
	}
	return a, nil
}

func equallySpaced(nodes []float64) bool {
	n := len(nodes) - 1
	first, last := nodes[0], nodes[n]
	tolerance := uniformTolerance * max(math.Abs(first), math.Abs(last))
	// A box far from the origin may have cells no wider than the rounding.
	tolerance = min(tolerance, 1e-6*(last-first)/float64(n))
	for i, v := range nodes {
		if math.Abs(v-(first+(last-first)*float64(i)/float64(n))) > tolerance {
			return false
		}
	}
	return true
}

func equalNodes(n int, length float64) []float64 {
	nodes := make([]float64, n+1)
	for i := range nodes {
		nodes[i] = length * float64(i) / float64(n)
	}
	return nodes
}

func checkBox(nx, nz int, width, height float64) error {
	switch {
	case nx < 1:
		return fmt.Errorf("staggered: nx is %d, want at least 1", nx)
	case nz < 1:
		return fmt.Errorf("staggered: nz is %d, want at least 1", nz)
	case !(width > 0) || math.IsInf(width, 1):
		return fmt.Errorf("staggered: width is %v, want a finite number > 0", width)
	case !(height > 0) || math.IsInf(height, 1):
		return fmt.Errorf("staggered: height is %v, want a finite number > 0", height)
	}
	return nil
}
