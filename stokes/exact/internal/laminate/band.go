package laminate

import "math"

// Rows of the linear system reach this far below and above the diagonal:
// four unknowns a layer, four conditions an interface, two at the low end.
const (
	lower = 5
	upper = 5
	width = 2*lower + upper + 1 // of the rows of the factors, with fill-in
)

// A band is a square banded matrix with its triangular factors.
type band struct {
	n       int
	entries []float64 // row r, column c at r*width + c - r + lower
	factors []float64
	swaps   []int
}

func newBand(n int) *band {
	return &band{
		n:       n,
		entries: make([]float64, n*width),
		factors: make([]float64, n*width),
		swaps:   make([]int, n),
	}
}

func (m *band) set(row, column int, v float64) { m.entries[row*width+column-row+lower] = v }

// span returns the columns of a row that may hold entries.
func (m *band) span(row int) (from, to int) {
	return max(0, row-lower), min(m.n, row+upper+1)
}

// balance divides each row and its right-hand side by the power of two next
// to the largest entry of the row, which rounds nothing.
func (m *band) balance(rhs []float64) {
	for r := range m.n {
		largest := 0.0
		row := m.entries[r*width:][:width]
		for _, v := range row {
			largest = max(largest, math.Abs(v))
		}
		_, exponent := math.Frexp(largest)
		for i, v := range row {
			row[i] = math.Ldexp(v, -exponent)
		}
		rhs[r] = math.Ldexp(rhs[r], -exponent)
	}
}

// factorise computes P·L·U with partial pivoting.
func (m *band) factorise() {
	f, n := m.factors, m.n
	copy(f, m.entries)
	at := func(r, c int) *float64 { return &f[r*width+c-r+lower] }
	for c := range n {
		last := min(n-1, c+lower)
		end := min(n, c+lower+upper+1)
		pivot := c
		for r := c + 1; r <= last; r++ {
			if math.Abs(*at(r, c)) > math.Abs(*at(pivot, c)) {
				pivot = r
			}
		}
		m.swaps[c] = pivot
		if pivot != c {
			for j := c; j < end; j++ {
				a, b := at(c, j), at(pivot, j)
				*a, *b = *b, *a
			}
		}
		for r := c + 1; r <= last; r++ {
			l := *at(r, c) / *at(c, c)
			*at(r, c) = l
			for j := c + 1; j < end; j++ {
				*at(r, j) -= l * *at(c, j)
			}
		}
	}
}

// solve overwrites x, the right-hand side, by the solution.
func (m *band) solve(x []float64) {
	f, n := m.factors, m.n
	for c := range n {
		p := m.swaps[c]
		x[c], x[p] = x[p], x[c]
		for r := c + 1; r <= min(n-1, c+lower); r++ {
			x[r] -= f[r*width+c-r+lower] * x[c]
		}
	}
	for r := n - 1; r >= 0; r-- {
		sum := x[r]
		for c := r + 1; c < min(n, r+lower+upper+1); c++ {
			sum -= f[r*width+c-r+lower] * x[c]
		}
		x[r] = sum / f[r*width+lower]
	}
}

// residual stores rhs − A·x in r, accumulated in twice the working precision
// (Ogita, Rump & Oishi 2005, algorithm 5.3).
func (m *band) residual(r, rhs, x []float64) {
	for i := range m.n {
		sum, tail := rhs[i], 0.0
		from, to := m.span(i)
		for c := from; c < to; c++ {
			a := -m.entries[i*width+c-i+lower]
			product := a * x[c]
			tail += math.FMA(a, x[c], -product)
			next := sum + product
			b := next - sum
			tail += (sum - (next - b)) + (product - b)
			sum = next
		}
		r[i] = sum + tail
	}
}

// uncertainty returns a change of the solution x that a relative rounding of
// all entries could bring about: that for errors of the largest size and of
// signs without a pattern.
func (m *band) uncertainty(x []float64) []float64 {
	d := make([]float64, m.n)
	sign := uint32(1)
	for i := range m.n {
		from, to := m.span(i)
		for c := from; c < to; c++ {
			d[i] += math.Abs(m.entries[i*width+c-i+lower] * x[c])
		}
		d[i] *= epsilon
		sign = sign*1664525 + 1013904223 // a linear congruence; its highest bit decides
		if sign>>31 != 0 {
			d[i] = -d[i]
		}
	}
	m.solve(d)
	return d
}

const epsilon = 0x1p-52

// refinements is the number of corrections after the first solution. Each
// gains as many digits as the first solution has.
const refinements = 3

// solveRefined returns the solution of A·x = rhs.
func (m *band) solveRefined(rhs []float64) []float64 {
	m.balance(rhs)
	m.factorise()
	x := make([]float64, m.n)
	copy(x, rhs)
	m.solve(x)
	r := make([]float64, m.n)
	for range refinements {
		m.residual(r, rhs, x)
		m.solve(r)
		for i, d := range r {
			x[i] += d
		}
	}
	return x
}
