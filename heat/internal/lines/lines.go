package lines

// System holds tridiagonal matrices A of size n, one for all lines or one for
// each, and the factors of 1 + f·A.
type System struct {
	n, lines int
	shared   bool
	rows     bool // lines are contiguous in memory
	closed   bool // the ends of a line are neighbours
	ring     bool // they are, and that makes a difference

	before, here, after []float64 // A

	low    []float64 // multiplier of the place before
	inv    []float64 // inverse of the pivot
	up     []float64 // multiplier of the place after
	q      []float64 // on a ring: the solution for its corner column
	corner []float64 // and two numbers a matrix, see close
}

// NewRows returns room for the systems along the rows of nx×nz cells; ring closes
// each row.
func NewRows(nx, nz int, sharing Sharing, ring bool) *System {
	return newSystem(nx, nz, sharing, ring, true)
}

// NewColumns returns room for the systems along the columns of nx×nz cells.
func NewColumns(nx, nz int, sharing Sharing) *System {
	return newSystem(nz, nx, sharing, false, false)
}

// Sharing says whether all lines have the same matrix.
type Sharing int

const (
	// Shared means one matrix for all lines.
	Shared Sharing = iota
	// Each means one matrix for each line.
	Each
)

func newSystem(n, lines int, sharing Sharing, ring, rows bool) *System {
	s := &System{n: n, lines: lines, shared: sharing == Shared, rows: rows, closed: ring, ring: ring && n > 2}
	matrices := s.matrices()
	for _, v := range [...]*[]float64{&s.before, &s.here, &s.after, &s.low, &s.inv, &s.up} {
		*v = make([]float64, n*matrices)
	}
	if s.ring {
		s.q, s.corner = make([]float64, n*matrices), make([]float64, 2*matrices)
	}
	return s
}

// Sharing says whether the lines share their matrix.
func (s *System) Sharing() Sharing {
	if s.shared {
		return Shared
	}
	return Each
}

func (s *System) matrices() int {
	if s.shared {
		return 1
	}
	return s.lines
}

// place returns where the factors of place j of a matrix are stored: in the
// order of the cells.
func (s *System) place(matrix, j int) int {
	if s.rows || s.shared {
		return matrix*s.n + j
	}
	return j*s.lines + matrix
}

// thomas solves one contiguous line.
func (s *System) thomas(x []float64, m int) {
	n := len(x)
	at := m * n
	low, inv, up := s.low[at:at+n], s.inv[at:at+n], s.up[at:at+n]
	before := 0.0
	for j, v := range x {
		before = (v - low[j]*before) * inv[j]
		x[j] = before
	}
	after := 0.0
	for j := n - 1; j >= 0; j-- {
		after = x[j] - up[j]*after
		x[j] = after
	}
}

// Solve solves the lines lo ≤ line < hi in place; x holds all cells.
func (s *System) Solve(x []float64, lo, hi int) {
	if !s.rows {
		s.solveColumns(x, lo, hi)
		return
	}
	n := s.n
	line := lo
	for ; s.shared && line+4 <= hi; line += 4 {
		s.four(x[line*n : (line+4)*n])
	}
	for ; line < hi; line++ {
		s.thomas(x[line*n:(line+1)*n], s.matrix(line))
	}
	for line := lo; s.ring && line < hi; line++ {
		s.close(x[line*n:(line+1)*n], s.matrix(line))
	}
}

func (s *System) matrix(line int) int {
	if s.shared {
		return 0
	}
	return line
}

// four solves four adjoining rows at once: their recurrences do not wait for
// each other.
func (s *System) four(x []float64) {
	n := s.n
	x0, x1, x2, x3 := x[:n], x[n:2*n], x[2*n:3*n], x[3*n:4*n]
	low, inv, up := s.low[:n], s.inv[:n], s.up[:n]
	var a, b, c, d float64
	for j := range x0 {
		l, p := low[j], inv[j]
		a = (x0[j] - l*a) * p
		b = (x1[j] - l*b) * p
		c = (x2[j] - l*c) * p
		d = (x3[j] - l*d) * p
		x0[j], x1[j], x2[j], x3[j] = a, b, c, d
	}
	a, b, c, d = 0, 0, 0, 0
	for j := n - 1; j >= 0; j-- {
		u := up[j]
		a = x0[j] - u*a
		b = x1[j] - u*b
		c = x2[j] - u*c
		d = x3[j] - u*d
		x0[j], x1[j], x2[j], x3[j] = a, b, c, d
	}
}

// close corrects the solution of the opened ring.
func (s *System) close(x []float64, m int) {
	n := s.n
	q := s.q[m*n : (m+1)*n]
	f := (x[0] + s.corner[2*m]*x[n-1]) * s.corner[2*m+1]
	for j, v := range q {
		x[j] -= f * v
	}
}

// columnsAtOnce is a band of columns that stays in cache between the sweeps.
const columnsAtOnce = 64

// solveColumns sweeps up and down bands of columns, a row at a time.
func (s *System) solveColumns(x []float64, lo, hi int) {
	for ; lo < hi; lo += columnsAtOnce {
		s.band(x, lo, min(lo+columnsAtOnce, hi))
	}
}

func (s *System) band(x []float64, lo, hi int) {
	n, width := s.n, s.lines
	for j := range n {
		here := x[j*width+lo : j*width+hi]
		before := here
		if j > 0 {
			before = x[(j-1)*width+lo : (j-1)*width+hi]
		}
		if s.shared {
			forward(here, before, s.low[j], s.inv[j])
		} else {
			forwardEach(here, before, s.low[j*width+lo:j*width+hi], s.inv[j*width+lo:j*width+hi])
		}
	}
	for j := n - 2; j >= 0; j-- {
		here, after := x[j*width+lo:j*width+hi], x[(j+1)*width+lo:(j+1)*width+hi]
		if s.shared {
			backward(here, after, s.up[j])
		} else {
			backwardEach(here, after, s.up[j*width+lo:j*width+hi])
		}
	}
}

func forward(here, before []float64, low, inv float64) {
	before = before[:len(here)]
	for i, v := range here {
		here[i] = (v - low*before[i]) * inv
	}
}

func backward(here, after []float64, up float64) {
	after = after[:len(here)]
	for i, v := range after {
		here[i] -= up * v
	}
}

func forwardEach(here, before, low, inv []float64) {
	n := len(here)
	before, low, inv = before[:n], low[:n], inv[:n]
	for i, v := range here {
		here[i] = (v - low[i]*before[i]) * inv[i]
	}
}

func backwardEach(here, after, up []float64) {
	n := len(here)
	after, up = after[:n], up[:n]
	for i, v := range after {
		here[i] -= up[i] * v
	}
}
