package pencil

import (
	"cmp"
	"errors"
	"math"
	"slices"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/lapack"
	"gonum.org/v1/gonum/lapack/lapack64"
)

// ErrSingular reports that a matrix which should be regular is not, or that
// the dense eigenvalue routine failed.
var ErrSingular = errors.New("pencil: singular matrix")

// An eigenspace is the work space of the dense eigenproblems.
type eigenspace struct {
	matrix, inverse []float64
	reduced         []float64
	factor, similar []float64
	pivot           []int
	where           []int // unknowns that the reduced problem keeps
	place           []int // of an unknown in where, -1 for none
	wr, wi, work    []float64
	found           []complex128
}

// rowsOf lists the unknowns in whose equations a part occurs.
func (w *Workspace) rowsOf(part int) {
	s := &w.eigen
	if s.place == nil {
		s.place = make([]int, w.p.n)
	}
	for i := range s.place {
		s.place[i] = -1
	}
	s.where = s.where[:0]
	for i := range w.p.blocks {
		b := &w.p.blocks[i]
		if b.Part != part {
			continue
		}
		for r := b.Row; r < b.Row+b.Rows; r++ {
			if s.place[r] < 0 {
				s.place[r] = 0
				s.where = append(s.where, r)
			}
		}
	}
	slices.Sort(s.where)
	for i, r := range s.where {
		s.place[r] = i
	}
}

// invert factors J at a point and solves for the columns of the identity that
// where lists.
func (w *Workspace) invert(pt *Point) error {
	s, n, m := &w.eigen, w.p.n, len(w.eigen.where)
	s.matrix = resize(s.matrix, n*n)
	s.inverse = resize(s.inverse, n*m)
	if cap(s.pivot) < n {
		s.pivot = make([]int, n)
	}
	s.pivot = s.pivot[:n]
	w.setWeights(pt.coefficients(), pt.K, 0)
	clear(s.matrix)
	w.p.combine(s.matrix, n, w.re)
	a := blas64.General{Rows: n, Cols: n, Stride: n, Data: s.matrix}
	if !lapack64.Getrf(a, s.pivot) {
		return ErrSingular
	}
	clear(s.inverse)
	for i, r := range s.where {
		s.inverse[r*m+i] = 1
	}
	lapack64.Getrs(blas.NoTrans, a, blas64.General{Rows: n, Cols: m, Stride: max(m, 1), Data: s.inverse}, s.pivot)
	return nil
}

// reduce sets the reduced matrix to the given part's rows times the inverse.
func (w *Workspace) reduce(part int, k float64) {
	s, m := &w.eigen, len(w.eigen.where)
	s.reduced = resize(s.reduced, m*m)
	clear(s.reduced)
	var c [parts]complex128
	c[part] = 1
	w.setWeights(c, k, 0)
	for i := range w.p.blocks {
		b, weight := &w.p.blocks[i], w.re[i]
		if weight == 0 {
			continue
		}
		for r := range b.Rows {
			to := s.reduced[s.place[b.Row+r]*m:][:m]
			for j, v := range b.Data[r*b.Cols : (r+1)*b.Cols] {
				if v != 0 {
					floats.AddScaled(to, weight*v, s.inverse[(b.Col+j)*m:][:m])
				}
			}
		}
	}
}

// symmetricAlike is the asymmetry, relative to the largest element, up to which
// a matrix is taken for symmetric.
const symmetricAlike = 1e-12

// symmetrise tries to make the reduced matrix symmetric by a similarity
// transformation. With G the inverse of J in the kept unknowns, the reduced
// matrix is C = B G, or a product that acts like it; if the problem is
// self-adjoint, G = UᵀU is positive definite and U C U⁻¹ symmetric.
func (w *Workspace) symmetrise() bool {
	s, m := &w.eigen, len(w.eigen.where)
	s.factor, s.similar = resize(s.factor, m*m), resize(s.similar, m*m)
	for i, r := range s.where {
		copy(s.factor[i*m:(i+1)*m], s.inverse[r*m:(r+1)*m])
	}
	if !alike(s.factor, m) {
		return false
	}
	u, ok := lapack64.Potrf(blas64.Symmetric{N: m, Stride: m, Data: s.factor, Uplo: blas.Upper})
	if !ok {
		return false
	}
	copy(s.similar, s.reduced)
	c := blas64.General{Rows: m, Cols: m, Stride: m, Data: s.similar}
	blas64.Trmm(blas.Left, blas.NoTrans, 1, u, c)
	blas64.Trsm(blas.Right, blas.NoTrans, 1, u, c)
	return alike(s.similar, m)
}

// alike reports whether a matrix of order m is symmetric but for round-off.
func alike(a []float64, m int) bool {
	largest, difference := 0.0, 0.0
	for i := range m {
		for j := range i + 1 {
			largest = max(largest, math.Abs(a[i*m+j]))
			difference = max(difference, math.Abs(a[i*m+j]-a[j*m+i]))
		}
	}
	return difference <= symmetricAlike*largest
}

// eigenvalues returns the eigenvalues of the reduced matrix, which it destroys.
func (w *Workspace) eigenvalues() ([]complex128, error) {
	s, m := &w.eigen, len(w.eigen.where)
	if m == 0 {
		return nil, nil
	}
	s.wr, s.wi = resize(s.wr, m), resize(s.wi, m)
	for _, v := range s.reduced {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return nil, ErrSingular
		}
	}
	s.work = resize(s.work, 64*m)
	if w.symmetrise() {
		clear(s.wi)
		a := blas64.Symmetric{N: m, Stride: m, Data: s.similar, Uplo: blas.Upper}
		if !lapack64.Syev(lapack.EVNone, a, s.wr, s.work, len(s.work)) {
			return nil, ErrSingular
		}
	} else {
		a := blas64.General{Rows: m, Cols: m, Stride: m, Data: s.reduced}
		none := blas64.General{Stride: 1}
		if lapack64.Geev(lapack.LeftEVNone, lapack.RightEVNone, a, s.wr, s.wi, none, none, s.work, len(s.work)) != 0 {
			return nil, ErrSingular
		}
	}
	s.found = s.found[:0]
	for i, re := range s.wr {
		s.found = append(s.found, complex(re, s.wi[i]))
	}
	return s.found, nil
}

// zeroEigenvalue is the size, relative to the largest one, under which an
// eigenvalue of a reduced matrix is taken for the zero that it would be in
// exact arithmetic: an infinite driving number or growth rate.
const zeroEigenvalue = 1e-13

// largestSize returns the size of the largest eigenvalue.
func largestSize(found []complex128) float64 {
	largest := 0.0
	for _, mu := range found {
		largest = max(largest, math.Hypot(real(mu), imag(mu)))
	}
	return largest
}

// DriveEigenvalues returns the positive real values of a driving number at
// which J is singular, in increasing order; the point's own value of that number
// does not matter, its σ must be real. The slice is valid until the next call.
func (w *Workspace) DriveEigenvalues(pt Point, drive int) ([]float64, error) {
	pt.Drive[drive] = 0
	w.rowsOf(FirstDrive + drive)
	if err := w.invert(&pt); err != nil {
		return nil, err
	}
	w.reduce(FirstDrive+drive, pt.K) // y = B x has  y = -R B J⁻¹ y
	found, err := w.eigenvalues()
	if err != nil {
		return nil, err
	}
	largest := largestSize(found)
	values := w.eigen.wr[:0]
	for _, mu := range found {
		if real(mu) < -zeroEigenvalue*largest && math.Abs(imag(mu)) <= 1e-9*math.Abs(real(mu)) {
			values = append(values, -1/real(mu))
		}
	}
	slices.Sort(values)
	return values, nil
}

// GrowthEigenvalues returns all growth rates σ at a point, the fastest first.
// The point's own σ, which must be real and should exceed all of them, only
// centres the computation. The slice is valid until the next call.
func (w *Workspace) GrowthEigenvalues(pt Point) ([]complex128, error) {
	w.rowsOf(Mass)
	if err := w.invert(&pt); err != nil {
		return nil, err
	}
	w.reduce(Mass, pt.K) // (J(s) - (σ - s) M) x = 0
	found, err := w.eigenvalues()
	if err != nil {
		return nil, err
	}
	largest := largestSize(found)
	values := found[:0]
	for _, mu := range found {
		if math.Hypot(real(mu), imag(mu)) > zeroEigenvalue*largest {
			values = append(values, pt.Sigma+1/mu)
		}
	}
	slices.SortStableFunc(values, func(a, b complex128) int {
		return cmp.Or(cmp.Compare(real(b), real(a)), cmp.Compare(imag(b), imag(a)))
	})
	return values, nil
}

// SolveLinear returns x with J x = b at a point of real σ, where J is regular.
// Both are in the basis that the blocks were made with.
func (w *Workspace) SolveLinear(pt Point, b []float64) ([]float64, error) {
	w.eigen.where = w.eigen.where[:0]
	if err := w.invert(&pt); err != nil {
		return nil, err
	}
	n := w.p.n
	x := make([]float64, n)
	copy(x, b)
	w.p.Unscale(x) // J is D J₀ D with D the scale
	luSolve(blas64.General{Rows: n, Cols: n, Stride: n, Data: w.eigen.matrix}, w.eigen.pivot, x)
	w.p.Unscale(x)
	return x, nil
}

// SlowestDecay returns the smallest λ > 0 with (A - λ(-M)) x = 0 at wavenumber k,
// for a positive definite A and a negative definite M, or 0 if A is singular. It
// is good to a few digits, and not below the true one.
func (w *Workspace) SlowestDecay(k float64) float64 {
	const (
		digits        = 1e-4
		maxIterations = 100
	)
	w.eigen.where = w.eigen.where[:0]
	pt := Point{K: k}
	if w.invert(&pt) != nil {
		return 0
	}
	w.prepare(false)
	w.startBorder() // c is the first guess
	var mass [parts]complex128
	mass[Mass] = -1
	n, last := w.p.n, 0.0
	lu := blas64.General{Rows: n, Cols: n, Stride: n, Data: w.eigen.matrix}
	for range maxIterations {
		w.apply(w.x, w.c, mass, k, 0)
		before := floats.Dot(w.x[:n], w.c[:n])
		copy(w.y[:n], w.x[:n])
		luSolve(lu, w.eigen.pivot, w.y[:n])
		lambda := before / floats.Dot(w.x[:n], w.y[:n])
		copy(w.c, w.y)
		w.normalise(w.c)
		if math.Abs(lambda-last) < digits*lambda {
			return lambda
		}
		last = lambda
	}
	return last
}
