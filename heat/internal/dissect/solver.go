package dissect

import (
	"errors"
	"sync"

	blasimpl "gonum.org/v1/gonum/blas/gonum"
	lapackimpl "gonum.org/v1/gonum/lapack/gonum"
)

var (
	dense  blasimpl.Implementation
	lapack lapackimpl.Implementation
)

// ErrSingular reports a matrix that has no inverse, or that cannot be factored
// cut by cut.
var ErrSingular = errors.New("dissect: singular matrix")

// Matrix holds the five coefficients of each cell's row, cell (i, k) at index
// k·nx+i. Coefficients that point beyond a wall are not read. On a ring the
// western neighbour of the first cell of a row is the last one.
type Matrix struct{ Centre, South, West, East, North []float64 }

func (m *Matrix) coefficients() [5][]float64 {
	return [5][]float64{centre: m.Centre, south: m.South, west: m.West, east: m.East, north: m.North}
}

// Solver keeps the elimination tree of one size of rectangle and the factors
// of the last matrix.
type Solver struct {
	fronts []front
	twigs  []twig // subtrees that can be factored at the same time
	top    []int  // the fronts that join them, children first
	work   []float64
	gather []float64
}

// twig is a subtree, the fronts first to last.
type twig struct {
	first, last int
	work        []float64 // room for its largest front
	err         error
}

// twigsWanted is into how many subtrees the factorisation is split. It does
// not depend on the machine: the result must not either.
const twigsWanted = 4

// New plans the elimination of an nx-by-nz rectangle; ring closes its rows.
func New(nx, nz int, ring bool) *Solver {
	s := &Solver{fronts: plan(nx, nz, ring).fronts}
	s.split()
	widest, joint := 0, 0
	for i := range s.fronts {
		widest = max(widest, s.fronts[i].size())
	}
	for _, t := range s.top {
		f := &s.fronts[t]
		joint = max(joint, f.size()*f.size())
		f.schur = make([]float64, f.rest()*f.rest())
	}
	s.work = make([]float64, joint)
	s.gather = make([]float64, widest)
	for i := range s.twigs {
		s.reserve(&s.twigs[i])
	}
	return s
}

// split cuts the tree below its uppermost fronts.
func (s *Solver) split() {
	roots := []int{len(s.fronts) - 1}
	for len(roots) < twigsWanted {
		var next []int
		for _, r := range roots {
			next = append(next, s.fronts[r].children...)
		}
		if len(next) == 0 {
			break
		}
		s.top = append(roots, s.top...)
		roots = next
	}
	for _, r := range roots {
		s.twigs = append(s.twigs, twig{first: s.firstBelow(r), last: r})
	}
}

func (s *Solver) firstBelow(r int) int {
	for len(s.fronts[r].children) > 0 {
		r = s.fronts[r].children[0]
	}
	return r
}

// reserve gives each front of a twig its place on the stack of Schur
// complements: a front takes the place of its children.
func (s *Solver) reserve(t *twig) {
	largest, depth := 0, 0
	start := make([]int, t.last-t.first+1)
	level := 0
	for n := t.first; n <= t.last; n++ {
		f := &s.fronts[n]
		if len(f.children) > 0 {
			level = start[f.children[0]-t.first]
		}
		start[n-t.first] = level
		level += f.rest() * f.rest()
		depth = max(depth, level)
		largest = max(largest, f.size()*f.size())
	}
	t.work = make([]float64, largest)
	stack := make([]float64, depth)
	for n := t.first; n <= t.last; n++ {
		f := &s.fronts[n]
		at := start[n-t.first]
		f.schur = stack[at : at+f.rest()*f.rest()]
	}
}

// Factor eliminates m with up to workers goroutines. The factors do not depend
// on workers.
func (s *Solver) Factor(m Matrix, workers int) error {
	c := m.coefficients()
	if workers < 2 {
		for i := range s.twigs {
			s.factorTwig(&s.twigs[i], &c)
		}
	} else {
		var wg sync.WaitGroup
		for i := range s.twigs {
			wg.Go(func() { s.factorTwig(&s.twigs[i], &c) })
		}
		wg.Wait()
	}
	for i := range s.twigs {
		if err := s.twigs[i].err; err != nil {
			return err
		}
	}
	for _, n := range s.top {
		if !s.factorFront(&s.fronts[n], s.work, &c) {
			return ErrSingular
		}
	}
	return nil
}

func (s *Solver) factorTwig(t *twig, c *[5][]float64) {
	t.err = nil
	for n := t.first; n <= t.last; n++ {
		if !s.factorFront(&s.fronts[n], t.work, c) {
			t.err = ErrSingular
			return
		}
	}
}

// factorFront assembles and eliminates one front:
//
//	| A  B |   A = P·L·U, upper = L⁻¹·Pᵀ·B, lower = C·U⁻¹,
//	| C  D |   schur = D − lower·upper.
//
// It reports whether A has an inverse.
func (s *Solver) factorFront(f *front, work []float64, c *[5][]float64) bool {
	n, own, rest := f.size(), f.own, f.rest()
	a := work[:n*n]
	s.assemble(f, a, c)
	if !lapack.Dgetrf(own, own, a, n, f.swaps) {
		return false
	}
	copyBlock(f.lu, a, n, own, own)
	if rest == 0 {
		return true
	}
	b, low, d := a[own:], a[own*n:], a[own*n+own:]
	lapack.Dlaswp(rest, b, n, 0, own-1, f.swaps, 1)
	dense.Dtrsm(left, lowerHalf, noTrans, unitDiagonal, own, rest, 1, a, n, b, n)
	dense.Dtrsm(right, upperHalf, noTrans, anyDiagonal, rest, own, 1, a, n, low, n)
	copyBlock(f.upper, b, n, own, rest)
	copyBlock(f.lower, low, n, rest, own)
	copyBlock(f.schur, d, n, rest, rest)
	dense.Dgemm(noTrans, noTrans, rest, rest, own, -1, f.lower, own, f.upper, rest, 1, f.schur, rest)
	return true
}

// assemble adds up the coefficients that appear first in f and the Schur
// complements of its children.
func (s *Solver) assemble(f *front, a []float64, c *[5][]float64) {
	clear(a)
	for _, e := range f.entries {
		a[e.at] += c[e.direction][e.cell]
	}
	n := f.size()
	for j, ch := range f.children {
		into, schur := f.into[j], s.fronts[ch].schur
		for r, to := range into {
			row := a[int(to)*n : int(to)*n+n]
			for q, v := range schur[r*len(into) : (r+1)*len(into)] {
				row[into[q]] += v
			}
		}
	}
}

// copyBlock copies the rows×cols block at the start of src, whose rows are
// stride apart.
func copyBlock(dst, src []float64, stride, rows, cols int) {
	for r := range rows {
		copy(dst[r*cols:(r+1)*cols], src[r*stride:])
	}
}

// SolveTo puts the solution for the right-hand side rhs into dst, which may be
// rhs itself. It allocates nothing.
func (s *Solver) SolveTo(dst, rhs []float64) {
	copy(dst, rhs)
	for n := range s.fronts {
		s.fronts[n].forward(dst, s.gather)
	}
	for n := len(s.fronts) - 1; n >= 0; n-- {
		s.fronts[n].backward(dst, s.gather)
	}
}

// forward eliminates f's own unknowns from the right-hand side.
func (f *front) forward(x, gather []float64) {
	own, rest := f.own, f.rest()
	y := gather[:own]
	for j, c := range f.cells[:own] {
		y[j] = x[c]
	}
	for j, to := range f.swaps {
		y[j], y[to] = y[to], y[j]
	}
	dense.Dtrsv(lowerHalf, noTrans, unitDiagonal, own, f.lu, own, y, 1)
	for j, c := range f.cells[:own] {
		x[c] = y[j]
	}
	if rest == 0 {
		return
	}
	z := gather[own : own+rest]
	dense.Dgemv(noTrans, rest, own, 1, f.lower, own, y, 1, 0, z, 1)
	for j, c := range f.cells[own:] {
		x[c] -= z[j]
	}
}

// backward recovers f's own unknowns from those around them.
func (f *front) backward(x, gather []float64) {
	own, rest := f.own, f.rest()
	y, z := gather[:own], gather[own:own+rest]
	for j, c := range f.cells[:own] {
		y[j] = x[c]
	}
	for j, c := range f.cells[own:] {
		z[j] = x[c]
	}
	if rest > 0 {
		dense.Dgemv(noTrans, own, rest, -1, f.upper, rest, z, 1, 1, y, 1)
	}
	dense.Dtrsv(upperHalf, noTrans, anyDiagonal, own, f.lu, own, y, 1)
	for j, c := range f.cells[:own] {
		x[c] = y[j]
	}
}
