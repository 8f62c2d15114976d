package staggered

import (
	"fmt"
	"math"
	"slices"
)

// A Scalar is a field at cell centres: temperature, viscosity, pressure. The
// value of the cell in column i from the left and row k from the bottom is
// Values[k*nx+i].
type Scalar struct {
	Grid   *Grid
	Values []float64 // nx·nz
}

// NewScalar returns a field of zeros on g.
func NewScalar(g *Grid) *Scalar {
	return &Scalar{Grid: g, Values: make([]float64, g.NX()*g.NZ())}
}

// WrapScalar returns a field on g that uses values itself, without a copy. It
// fails when values does not hold nx·nz numbers.
func WrapScalar(g *Grid, values []float64) (*Scalar, error) {
	if err := checkLength("values", values, cells, g); err != nil {
		return nil, err
	}
	return &Scalar{Grid: g, Values: values}, nil
}

// At returns the value of the cell in column i and row k.
func (s *Scalar) At(i, k int) float64 { return s.Values[k*s.Grid.NX()+i] }

// Set changes the value of the cell in column i and row k.
func (s *Scalar) Set(i, k int, v float64) { s.Values[k*s.Grid.NX()+i] = v }

// Row returns row k, counted from the bottom, as a slice of the field's own
// memory.
func (s *Scalar) Row(k int) []float64 {
	nx := s.Grid.NX()
	return s.Values[k*nx : (k+1)*nx : (k+1)*nx]
}

// Fill sets each cell to f at its centre.
func (s *Scalar) Fill(f func(x, z float64) float64) { s.lattice().fill(f) }

// SetAll sets every cell to v.
func (s *Scalar) SetAll(v float64) { setAll(s.Values, v) }

// CopyFrom copies the values of t, which must have as many columns and rows.
func (s *Scalar) CopyFrom(t *Scalar) error {
	if s.Grid.NX() != t.Grid.NX() || s.Grid.NZ() != t.Grid.NZ() || len(s.Values) != len(t.Values) {
		return fmt.Errorf("staggered: copy of a field on %v into one on %v", t.Grid, s.Grid)
	}
	copy(s.Values, t.Values)
	return nil
}

// Clone returns a copy with memory of its own on the same grid.
func (s *Scalar) Clone() *Scalar {
	return &Scalar{Grid: s.Grid, Values: slices.Clone(s.Values)}
}

// Integral returns the integral over the box: the sum of value times cell area.
func (s *Scalar) Integral() float64 {
	dx := s.Grid.DX()
	total := 0.0
	for k, dz := range s.Grid.DZ() {
		sum := 0.0
		for i, v := range s.Row(k) {
			sum += v * dx[i]
		}
		total += sum * dz
	}
	return total
}

// Mean returns the area-weighted mean over the box.
func (s *Scalar) Mean() float64 { return s.Integral() / s.Grid.Area() }

// RMS returns the root of the area-weighted mean square over the box.
func (s *Scalar) RMS() float64 {
	dx := s.Grid.DX()
	total := 0.0
	for k, dz := range s.Grid.DZ() {
		sum := 0.0
		for i, v := range s.Row(k) {
			sum += v * v * dx[i]
		}
		total += sum * dz
	}
	return math.Sqrt(total / s.Grid.Area())
}

// HorizontalMeans stores the mean of each row of cells, from bottom to top, in
// dst and returns it. A nil dst is allocated; else it must hold nz values.
func (s *Scalar) HorizontalMeans(dst []float64) []float64 {
	if dst == nil {
		dst = make([]float64, s.Grid.NZ())
	}
	dx, width := s.Grid.DX(), s.Grid.Width()
	for k := range dst[:s.Grid.NZ()] {
		sum := 0.0
		for i, v := range s.Row(k) {
			sum += v * dx[i]
		}
		dst[k] = sum / width
	}
	return dst
}

// Extrema returns the smallest and the largest cell value and the centres of
// their cells, the first in storage order where several are equal. Both are
// NaN where the field holds a NaN.
func (s *Scalar) Extrema() (lowest, highest Extremum) { return s.lattice().extrema() }

// ValueAt interpolates bilinearly between cell centres; within half a cell of
// a wall it extrapolates linearly. A point outside the box is first moved to
// the nearest point of it.
func (s *Scalar) ValueAt(x, z float64) float64 {
	x, z = s.Grid.clamp(x, z)
	return s.lattice().at(x, z)
}

// Dims returns the number of columns and rows. With X, Y and Z it makes a
// Scalar the gridded data that gonum's plotting library draws as a heat map or
// as contours.
func (s *Scalar) Dims() (c, r int) { return s.Grid.Cells() }

// X returns the coordinate of the centre of column c.
func (s *Scalar) X(c int) float64 { return s.Grid.x.centres[c] }

// Y returns the coordinate z of the centre of row r.
func (s *Scalar) Y(r int) float64 { return s.Grid.z.centres[r] }

// Z returns the value in column c and row r.
func (s *Scalar) Z(c, r int) float64 { return s.At(c, r) }

func (s *Scalar) lattice() lattice {
	return lattice{xs: s.Grid.x.centres, zs: s.Grid.z.centres, values: s.Values}
}

func setAll(values []float64, v float64) {
	for j := range values {
		values[j] = v
	}
}

// A count is how many numbers a kind of field has on nx by nz cells.
type count func(nx, nz int) int

func cells(nx, nz int) int   { return nx * nz }
func corners(nx, nz int) int { return (nx + 1) * (nz + 1) }
func xFaces(nx, nz int) int  { return (nx + 1) * nz }
func zFaces(nx, nz int) int  { return nx * (nz + 1) }

// checkLength reports whether values hold one number for each place of g.
func checkLength(name string, values []float64, places count, g *Grid) error {
	if g == nil {
		return fmt.Errorf("staggered: %s: grid is nil, want a grid", name)
	}
	if want := places(g.Cells()); len(values) != want {
		return fmt.Errorf("staggered: %s holds %d numbers, want %d for %dx%d cells", name, len(values), want, g.NX(), g.NZ())
	}
	return nil
}
