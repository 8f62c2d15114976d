package trial

import (
	"fmt"
	"math"
	"slices"
)

// A Grid is a box cut into cells. X holds the edges of the columns from left
// to right, Z those of the rows from bottom to top. Both start at 0.
type Grid struct{ X, Z []float64 }

// Cells returns the numbers of columns and rows.
func (g Grid) Cells() (nx, nz int) { return len(g.X) - 1, len(g.Z) - 1 }

// Size returns the extents in x and z.
func (g Grid) Size() (width, height float64) { return g.X[len(g.X)-1], g.Z[len(g.Z)-1] }

// XCentres returns the middles of the columns.
func (g Grid) XCentres() []float64 { return middles(g.X) }

// ZCentres returns the middles of the rows.
func (g Grid) ZCentres() []float64 { return middles(g.Z) }

// String gives the numbers of columns and rows.
func (g Grid) String() string {
	nx, nz := g.Cells()
	return fmt.Sprintf("%dx%d", nx, nz)
}

// MirroredX returns the grid seen from behind.
func (g Grid) MirroredX() Grid { return Grid{X: mirrored(g.X), Z: g.Z} }

// MirroredZ returns the grid upside down.
func (g Grid) MirroredZ() Grid { return Grid{X: g.X, Z: mirrored(g.Z)} }

// Scaled returns the grid with all lengths multiplied by factor.
func (g Grid) Scaled(factor float64) Grid {
	times := func(s []float64) []float64 {
		s = slices.Clone(s)
		for i := range s {
			s[i] *= factor
		}
		return s
	}
	return Grid{X: times(g.X), Z: times(g.Z)}
}

func middles(edges []float64) []float64 {
	m := make([]float64, len(edges)-1)
	for i := range m {
		m[i] = 0.5 * (edges[i] + edges[i+1])
	}
	return m
}

func mirrored(edges []float64) []float64 {
	m := make([]float64, len(edges))
	for i, e := range edges {
		m[len(m)-1-i] = edges[len(edges)-1] - e
	}
	return m
}

// Edges cuts a span from 0 into cells about as wide as width. Each of the
// lines, which ascend, becomes an edge. Between two lines the cells widen
// towards the middle by the factor stretch, at least 1, smoothly, so that a
// finer grid has the same shape.
func Edges(length float64, lines []float64, width, stretch float64) []float64 {
	a := (stretch - 1) / (stretch + 1)
	edges := []float64{0}
	start := 0.0
	for _, end := range append(slices.Clone(lines), length) {
		n := max(1, int(math.Round((end-start)/width)))
		for i := 1; i < n; i++ {
			u := float64(i) / float64(n)
			edges = append(edges, start+(end-start)*(u-a/(2*math.Pi)*math.Sin(2*math.Pi*u)))
		}
		edges = append(edges, end)
		start = end
	}
	return edges
}

// Tabulate returns f on the lattice of the coordinates x and z, row-major, x
// fastest.
func Tabulate(f func(x, z float64) float64, x, z []float64) []float64 {
	values := make([]float64, 0, len(x)*len(z))
	for _, zk := range z {
		for _, xi := range x {
			values = append(values, f(xi, zk))
		}
	}
	return values
}
