package pencil

import (
	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/lapack/lapack64"
)

// A Workspace solves one pencil. It owns all storage that this takes, so that
// no method allocates after its first call. It serves one goroutine at a time.
//
// A complex problem is solved as a real one of twice the size: a vector then is
// its real part followed by its imaginary part.
type Workspace struct {
	p       *Pencil
	complex bool
	n       int // complex order of the bordered matrix: unknowns + 1
	order   int // real order, n or 2n

	lu         []float64
	pivot      []int
	b, c       []float64 // border
	x, y       []float64 // right and left solution, with g in element n-1
	dx         [directions][]float64
	work       []float64
	weight     []complex128
	re, im     []float64 // parts of weight
	eigen      eigenspace
	derivative Jet
}

// NewWorkspace makes a workspace. With oscillating set, σ may be complex.
func NewWorkspace(p *Pencil) *Workspace {
	w := &Workspace{p: p, n: p.n + 1}
	w.weight = make([]complex128, len(p.blocks))
	w.re = make([]float64, len(p.blocks))
	w.im = make([]float64, len(p.blocks))
	return w
}

// prepare makes room for real or complex solutions.
func (w *Workspace) prepare(oscillating bool) {
	w.complex = oscillating
	w.order = w.n
	if oscillating {
		w.order = 2 * w.n
	}
	w.lu = resize(w.lu, w.order*w.order)
	if cap(w.pivot) < w.order {
		w.pivot = make([]int, w.order)
	}
	w.pivot = w.pivot[:w.order]
	for _, v := range []*[]float64{&w.b, &w.c, &w.x, &w.y, &w.work, &w.dx[0], &w.dx[1], &w.dx[2]} {
		*v = resize(*v, w.order)
	}
}

func resize(v []float64, n int) []float64 {
	if cap(v) < n {
		return make([]float64, n)
	}
	return v[:n]
}

// startBorder fills the border with numbers that are not orthogonal to any
// solution except by an unlikely accident, the same ones each time.
func (w *Workspace) startBorder() {
	state := uint64(0x9e3779b97f4a7c15)
	for _, v := range [][]float64{w.b, w.c} {
		clear(v)
		for i := range w.p.n {
			state = state*6364136223846793005 + 1442695040888963407
			v[i] = 0.5 + float64(state>>40)/(1<<24)
			if state>>39&1 == 1 {
				v[i] = -v[i]
			}
		}
		w.normalise(v)
	}
}

// normalise scales v to length 1 in its unknowns and clears the last ones.
func (w *Workspace) normalise(v []float64) {
	v[w.n-1] = 0
	if w.complex {
		v[2*w.n-1] = 0
	}
	floats.Scale(1/floats.Norm(v, 2), v)
}

// adoptBorder takes the last solution as the border, which makes the bordered
// matrix as well conditioned as it can be.
func (w *Workspace) adoptBorder() {
	copy(w.b, w.y)
	copy(w.c, w.x)
	w.normalise(w.b)
	w.normalise(w.c)
	if w.complex { // J x + b g = 0 wants conj(y), and so does conj(x) in cᵀx
		floats.Scale(-1, w.b[w.n:])
		floats.Scale(-1, w.c[w.n:])
	}
}

// factor makes the triangular factors of the bordered matrix at a point.
func (w *Workspace) factor(pt *Point) {
	w.setWeights(pt.coefficients(), pt.K, 0)
	n, order := w.n, w.order
	clear(w.lu)
	w.p.combine(w.lu, order, w.re)
	for i := range w.p.n {
		w.lu[i*order+n-1] = w.b[i]
		w.lu[(n-1)*order+i] = w.c[i]
	}
	if w.complex {
		w.factorImaginary()
	}
	lapack64.Getrf(w.matrix(), w.pivot)
}

// factorImaginary completes [R -I; I R] from its upper left block.
func (w *Workspace) factorImaginary() {
	n, order := w.n, w.order
	lower := w.lu[n*order:]
	w.p.combine(lower, order, w.im)
	for i := range w.p.n {
		lower[i*order+n-1] = w.b[n+i]
		lower[(n-1)*order+i] = w.c[n+i]
	}
	for i := range n {
		copy(lower[i*order+n:(i+1)*order], w.lu[i*order:i*order+n])
		for j := range n {
			w.lu[i*order+n+j] = -lower[i*order+j]
		}
	}
}

func (w *Workspace) matrix() blas64.General {
	return blas64.General{Rows: w.order, Cols: w.order, Stride: w.order, Data: w.lu}
}

// setWeights computes the weights of all blocks.
func (w *Workspace) setWeights(c [parts]complex128, k float64, d int) {
	w.p.weights(w.weight, c, k, d)
	for i, v := range w.weight {
		w.re[i], w.im[i] = real(v), imag(v)
	}
}

// apply sets dst to the matrix of the given coefficients times x.
func (w *Workspace) apply(dst, x []float64, c [parts]complex128, k float64, d int) {
	w.setWeights(c, k, d)
	clear(dst)
	w.p.apply(dst, x, w.re)
	if !w.complex {
		return
	}
	n := w.n
	w.p.apply(dst[n:], x[n:], w.re)
	w.p.apply(dst[n:], x, w.im)
	floats.Scale(-1, w.im)
	w.p.apply(dst, x[n:], w.im)
}

// solve overwrites v with the solution of the bordered system.
func (w *Workspace) solve(v []float64) {
	luSolve(w.matrix(), w.pivot, v)
}

// solveTransposed does it for the transposed (not conjugate) system.
func (w *Workspace) solveTransposed(v []float64) {
	if w.complex {
		floats.Scale(-1, v[w.n:])
	}
	luSolveTransposed(w.matrix(), w.pivot, v)
	if w.complex {
		floats.Scale(-1, v[w.n:])
	}
}

// luSolve solves for one right-hand side, faster than Getrs does, which is made
// for many.
func luSolve(lu blas64.General, pivot []int, v []float64) {
	for i, p := range pivot {
		v[i], v[p] = v[p], v[i]
	}
	x := blas64.Vector{N: lu.Rows, Inc: 1, Data: v}
	blas64.Trsv(blas.NoTrans, triangle(lu, blas.Lower, blas.Unit), x)
	blas64.Trsv(blas.NoTrans, triangle(lu, blas.Upper, blas.NonUnit), x)
}

func luSolveTransposed(lu blas64.General, pivot []int, v []float64) {
	x := blas64.Vector{N: lu.Rows, Inc: 1, Data: v}
	blas64.Trsv(blas.Trans, triangle(lu, blas.Upper, blas.NonUnit), x)
	blas64.Trsv(blas.Trans, triangle(lu, blas.Lower, blas.Unit), x)
	for i := len(pivot) - 1; i >= 0; i-- {
		p := pivot[i]
		v[i], v[p] = v[p], v[i]
	}
}

func triangle(lu blas64.General, uplo blas.Uplo, diag blas.Diag) blas64.Triangular {
	return blas64.Triangular{N: lu.Rows, Stride: lu.Stride, Data: lu.Data, Uplo: uplo, Diag: diag}
}

// null solves for x, y and g at the point of the last factor.
func (w *Workspace) null() complex128 {
	clear(w.x)
	w.x[w.n-1] = 1
	w.solve(w.x)
	clear(w.y)
	w.y[w.n-1] = 1
	w.solveTransposed(w.y)
	return w.last(w.x)
}

// last returns the border element of a solution.
func (w *Workspace) last(v []float64) complex128 {
	if w.complex {
		return complex(v[w.n-1], v[2*w.n-1])
	}
	return complex(v[w.n-1], 0)
}

// product returns yᵀv over the unknowns.
func (w *Workspace) product(v []float64) complex128 {
	m, n := w.p.n, w.n
	if !w.complex {
		return complex(floats.Dot(w.y[:m], v[:m]), 0)
	}
	yr, yi, vr, vi := w.y[:m], w.y[n:n+m], v[:m], v[n:n+m]
	return complex(floats.Dot(yr, vr)-floats.Dot(yi, vi), floats.Dot(yr, vi)+floats.Dot(yi, vr))
}

// Vector copies the real and the imaginary part of the solution, as
// coefficients of the basis. The imaginary part of a real solution is nil.
func (w *Workspace) Vector() (re, im []float64) {
	re = make([]float64, w.p.n)
	copy(re, w.x)
	w.p.Unscale(re)
	if w.complex {
		im = make([]float64, w.p.n)
		copy(im, w.x[w.n:])
		w.p.Unscale(im)
	}
	return re, im
}

// Scaled returns the real part of the solution in scaled unknowns, in which
// its decay can be judged. It is valid until the next call.
func (w *Workspace) Scaled() []float64 { return w.x[:w.p.n] }
