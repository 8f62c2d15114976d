package multigrid

import "math"

// coarsestCells is the size below which a level is solved directly.
const coarsestCells = 32

// Where the viscosity jumps on the finest grid, coarsening ends earlier: a
// stiff body that is no longer resolved becomes soft by the averages, and
// corrections from such levels strain it. It ends on the first level whose
// elimination is an effort, in units of [Level.effort], of no more than
// effortPerCell cells of the finest, or leastEffort (16 by 16 cells), but not
// more than mostEffort (32 by 32). On 4 by 4 cells, eight bodies 10⁶ times
// stiffer than their surroundings would take more than twice as many
// iterations.
const (
	effortPerCell = 16
	leastEffort   = 1 << 16
	mostEffort    = 1 << 20
)

// effort measures the elimination of a level: cells times the square of what
// is proportional to the width of the band.
func (l *Level) effort() int {
	side := min(l.X.N, l.Z.N)
	if l.X.wraps() {
		side = 2 * l.X.N
	}
	return l.cells() * side * side
}

// An elimination factors the operator of a coarse level. Its unknowns are the
// velocities of free faces and all pressures, those of a cell side by side and
// cells in order along the shorter axis, which makes the matrix a band.
//
// The matrix is singular, for a uniform pressure drives nothing and, where the
// fluid drifts, neither does a uniform vx. One equation of each kind follows
// from the others; it is given up for a zero.
type elimination struct {
	l *Level
	s *scratch

	index []int // positions of the unknowns in one field after the other
	first []int // first[c]: number of the first unknown of cell c
	count []int // count[c]: how many there are
	zero  []int // unknowns set to zero

	// Row k holds columns k-band to k+2·band: below the diagonal the factors
	// of elimination, above it room for what pivoting brings in.
	band   int
	a      []float64
	pivots []int
	b      []float64
}

func newElimination(l *Level) *elimination {
	d := &elimination{l: l, s: newScratch(l.stride), first: make([]int, l.size()), count: make([]int, l.size())}
	x, z := &l.X, &l.Z
	if x.wraps() || x.N <= z.N {
		for j := 1; j <= z.N; j++ {
			for i := 1; i <= x.N; i++ {
				d.number(i, j)
			}
		}
	} else {
		for i := 1; i <= x.N; i++ {
			for j := 1; j <= z.N; j++ {
				d.number(i, j)
			}
		}
	}
	n := len(d.index)
	d.zero = append(d.zero, n-1)
	if l.Drifts() {
		d.zero = append(d.zero, d.first[z.N*l.stride+x.N])
	}
	d.setBand()
	d.a, d.b, d.pivots = make([]float64, n*d.width()), make([]float64, n), make([]int, n)
	return d
}

// number gives the unknowns of a cell the next numbers.
func (d *elimination) number(i, j int) {
	l, n := d.l, d.l.size()
	c := j*l.stride + i
	d.first[c] = len(d.index)
	if i >= l.X.firstFree() {
		d.index = append(d.index, c)
	}
	if j > 1 {
		d.index = append(d.index, n+c)
	}
	d.index = append(d.index, 2*n+c)
	d.count[c] = len(d.index) - d.first[c]
}

// setBand finds the largest distance of unknowns of neighbours.
func (d *elimination) setBand() {
	l := d.l
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			c := j*l.stride + i
			d.neighbours(i, j, func(e int) {
				d.band = max(d.band, d.first[e]+d.count[e]-1-d.first[c])
			})
		}
	}
}

// neighbours calls use for each cell around (i, j) and for itself.
func (d *elimination) neighbours(i, j int, use func(c int)) {
	l := d.l
	for k := max(1, j-1); k <= min(l.Z.N, j+1); k++ {
		for h := i - 1; h <= i+1; h++ {
			switch {
			case h >= 1 && h <= l.X.N:
				use(k*l.stride + h)
			case l.X.wraps():
				use(k*l.stride + (h+l.X.N-1)%l.X.N + 1)
			}
		}
	}
}

func (d *elimination) width() int { return 3*d.band + 1 }

// row returns columns k-band to k+2·band of row k.
func (d *elimination) row(k int) []float64 {
	w := d.width()
	return d.a[k*w : (k+1)*w : (k+1)*w]
}

// Drifts reports whether a uniform vx meets no resistance: periodic sides
// between walls without shear stress.
func (l *Level) Drifts() bool {
	return l.X.wraps() && l.Z.Lo == Slip && l.Z.Hi == Slip
}

// at returns the field that unknown k belongs to and its position there.
func (d *elimination) at(u Fields, k int) (field []float64, position int) {
	q, n := d.index[k], d.l.size()
	switch {
	case q < n:
		return u.X, q
	case q < 2*n:
		return u.Z, q - n
	default:
		return u.P, q - 2*n
	}
}

// factor probes the operator with unit vectors and eliminates.
func (d *elimination) factor() {
	clear(d.a)
	d.l.u.clear()
	for k := range d.index {
		field, at := d.at(d.l.u, k)
		field[at] = 1
		d.l.WrapFields(d.l.u)
		d.probe(k, at%d.l.stride, at/d.l.stride)
		field[at] = 0
	}
	d.l.WrapFields(d.l.u)
	for _, k := range d.zero {
		clear(d.row(k))
		d.row(k)[d.band] = 1
	}
	d.eliminate()
}

// probe stores in column k the operator applied to the present unit vector,
// which belongs to cell (i, j).
func (d *elimination) probe(k, i, j int) {
	l, n := d.l, d.l.size()
	below := max(1, j-1)
	l.begin(d.s, l.u, below)
	for r := below; r <= min(l.Z.N, j+1); r++ {
		l.operatorRow(d.s, l.u, r)
		d.neighbours(i, r, func(c int) {
			if c/l.stride != r {
				return
			}
			at := c % l.stride
			for q := d.first[c]; q < d.first[c]+d.count[c]; q++ {
				v := d.s.rp[at]
				switch {
				case d.index[q] < n:
					v = d.s.rx[at]
				case d.index[q] < 2*n:
					v = d.s.rz[at]
				}
				d.row(q)[k-q+d.band] = v
			}
		})
	}
}

// eliminate is Gaussian elimination with row pivoting.
func (d *elimination) eliminate() {
	n, band := len(d.index), d.band
	for k := range n {
		last := min(n-1, k+band)
		p := k
		for i := k + 1; i <= last; i++ {
			if math.Abs(d.row(i)[k-i+band]) > math.Abs(d.row(p)[k-p+band]) {
				p = i
			}
		}
		d.pivots[k] = p
		right := min(n-1, k+2*band) - k + 1
		pivot := d.row(k)[band:][:right]
		if p != k {
			other := d.row(p)[k-p+band:][:right]
			for c := range pivot {
				pivot[c], other[c] = other[c], pivot[c]
			}
		}
		inverse := 1 / pivot[0]
		for i := k + 1; i <= last; i++ {
			row := d.row(i)[k-i+band:][:right]
			if row[0] == 0 {
				continue
			}
			row[0] *= inverse
			addScaled(row[1:], -row[0], pivot[1:])
		}
	}
}

// solve stores the solution of the correction equation in l.u.
func (d *elimination) solve() {
	n, band := len(d.index), d.band
	for k := range n {
		field, at := d.at(d.l.f, k)
		d.b[k] = -field[at]
	}
	for _, k := range d.zero {
		d.b[k] = 0
	}
	for k := range n {
		p := d.pivots[k]
		d.b[k], d.b[p] = d.b[p], d.b[k]
		for i := k + 1; i <= min(n-1, k+band); i++ {
			d.b[i] -= d.row(i)[k-i+band] * d.b[k]
		}
	}
	for k := n - 1; k >= 0; k-- {
		row := d.row(k)[band:]
		v := d.b[k]
		for c := 1; c <= min(n-1-k, 2*band); c++ {
			v -= row[c] * d.b[k+c]
		}
		d.b[k] = v / row[0]
		field, at := d.at(d.l.u, k)
		field[at] = d.b[k]
	}
	d.l.WrapFields(d.l.u)
}
