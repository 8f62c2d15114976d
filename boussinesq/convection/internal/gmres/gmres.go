// Package gmres solves linear systems that are known only through their
// product with a vector, by the generalised minimal residual method of Saad &
// Schultz (1986).
package gmres

import (
	"context"
	"errors"
	"math"

	"gonum.org/v1/gonum/floats"
)

// ErrNotConverged reports that the basis was used up before the residual fell
// below the tolerance. The solution found so far is the best in its space.
var ErrNotConverged = errors.New("gmres: not converged")

// An Operator stores the product of the system with src in dst. It must be
// linear up to an error well below the tolerance of the solve.
type Operator func(dst, src []float64) error

// A Solver owns the memory of repeated solves of one size. It serves one
// goroutine at a time.
type Solver struct {
	basis [][]float64 // orthonormal directions, made as needed
	// The upper triangular factor of the Hessenberg matrix, column by column,
	// and the Givens rotations that made it so.
	columns  [][]float64
	cos, sin []float64
	rhs      []float64
}

// New returns a solver for systems of n unknowns that keeps at most
// maxDirections directions.
func New(n, maxDirections int) *Solver {
	m := min(n, maxDirections)
	return &Solver{
		basis:   make([][]float64, 0, m+1),
		columns: make([][]float64, m),
		cos:     make([]float64, m),
		sin:     make([]float64, m),
		rhs:     make([]float64, m+1),
	}
}

// Solve stores in x an approximate solution of A x = b, starting from zero,
// whose residual is at most tolerance times the norm of b. It returns the
// number of products with A.
func (s *Solver) Solve(ctx context.Context, x, b []float64, a Operator, tolerance float64) (int, error) {
	clear(x)
	norm := floats.Norm(b, 2)
	if norm == 0 {
		return 0, nil
	}
	s.basis = s.basis[:0]
	clear(s.rhs)
	s.rhs[0] = norm
	s.direction(0, len(b))
	floats.ScaleTo(s.basis[0], 1/norm, b)

	steps := 0
	for steps < len(s.columns) && math.Abs(s.rhs[steps]) > tolerance*norm {
		if err := ctx.Err(); err != nil {
			return steps, err
		}
		broken, err := s.extend(steps, a)
		if err != nil {
			return steps, err
		}
		steps++
		if broken {
			break
		}
	}
	s.combine(x, steps)
	if math.Abs(s.rhs[steps]) > tolerance*norm {
		return steps, ErrNotConverged
	}
	return steps, nil
}

// direction makes room for direction j.
func (s *Solver) direction(j, n int) []float64 {
	s.basis = s.basis[:j+1]
	if len(s.basis[j]) != n {
		s.basis[j] = make([]float64, n)
	}
	return s.basis[j]
}

// extend adds direction j+1 to the basis by the Arnoldi step with modified
// Gram-Schmidt and rotates the new column of the Hessenberg matrix. It reports
// whether the space is exhausted, so that the solution is exact.
func (s *Solver) extend(j int, a Operator) (exhausted bool, err error) {
	w := s.direction(j+1, len(s.basis[0]))
	if err := a(w, s.basis[j]); err != nil {
		return false, err
	}
	if len(s.columns[j]) == 0 {
		s.columns[j] = make([]float64, j+1)
	}
	column, before := s.columns[j], floats.Norm(w, 2)
	for i, v := range s.basis[:j+1] {
		column[i] = floats.Dot(w, v)
		floats.AddScaled(w, -column[i], v)
	}
	below := floats.Norm(w, 2)
	// What is left after subtracting everything is rounding, not a direction.
	exhausted = below <= 1e-14*before
	if !exhausted {
		floats.Scale(1/below, w)
	}
	for i := range j {
		column[i], column[i+1] = s.cos[i]*column[i]+s.sin[i]*column[i+1], -s.sin[i]*column[i]+s.cos[i]*column[i+1]
	}
	r := math.Hypot(column[j], below)
	if r == 0 {
		return true, errors.New("gmres: singular system")
	}
	s.cos[j], s.sin[j] = column[j]/r, below/r
	column[j] = r
	s.rhs[j+1] = -s.sin[j] * s.rhs[j]
	s.rhs[j] *= s.cos[j]
	return exhausted, nil
}

// combine solves the triangular system and adds up the directions. It clears x
// first: the products may have used it as scratch.
func (s *Solver) combine(x []float64, steps int) {
	y := s.rhs[:steps]
	for i := steps - 1; i >= 0; i-- {
		y[i] /= s.columns[i][i]
		for k := range i {
			y[k] -= s.columns[i][k] * y[i]
		}
	}
	clear(x)
	for i, c := range y {
		floats.AddScaled(x, c, s.basis[i])
	}
}
