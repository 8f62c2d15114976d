package multigrid

import "example.org/overturn/stokes/internal/team"

// Near a jump of viscosity the distributive sweep smooths badly: a cell on
// the stiff side needs velocity and pressure changed together. There, and
// only there, each level is relaxed cell by cell (Vanka 1986, with the
// diagonal of the momentum equations), which costs nothing where the viscosity
// is smooth.
//
// The cells of a row are relaxed one after the other. Rows three apart share
// no face, not even to read, so that every third row may be relaxed at the
// same time.

const (
	jumpRatio   = 20.0 // of viscosities near a cell that makes it one of them
	jumpColours = 3
	jumpShare   = 4000 // cells from which goroutines share the work
)

// A level where neighbours differ by more than jumpRatio is relaxed eight times
// before and after each smoothing. Where the viscosity is smooth but as steep
// as that over some cells, as it becomes on coarse levels, half of it is enough.
const (
	jumpRadius  = 2
	sharpSweeps = 8
	steepSweeps = 4
)

// jumps lists the cells near jumps, row by row.
type jumps struct {
	columns []int32
	from    []int // from[j]: where row j begins in columns; one more than rows

	sweeps int
	ratios [2][]float64 // lowest and highest viscosity of the rows around one

	backwards bool // of the sweep under way
	colour    int
	share     func(part int)
}

func (jp *jumps) none() bool { return len(jp.columns) == 0 }

// sharp reports whether neighbours differ by more than jumpRatio.
func (jp *jumps) sharp() bool { return !jp.none() && jp.sweeps == sharpSweeps }

// row returns the columns of the cells of row j.
func (jp *jumps) row(j int) []int32 { return jp.columns[jp.from[j]:jp.from[j+1]] }

// makeJumps prepares the level for findJumps and relaxJumps.
func (l *Level) makeJumps(parts int) {
	l.jumps.from = make([]int, l.rows+1)
	l.jumps.ratios = [2][]float64{make([]float64, l.stride+2*jumpRadius), make([]float64, l.stride+2*jumpRadius)}
	l.jumps.share = func(part int) {
		rows := (l.Z.N + jumpColours - 1) / jumpColours
		lo, hi := team.Block(rows, part, parts)
		for k := lo; k < hi; k++ {
			if j := 1 + l.jumps.colour + k*jumpColours; j <= l.Z.N {
				l.relaxRow(j)
			}
		}
	}
}

// findJumps lists the cells whose neighbourhood holds a jump.
func (l *Level) findJumps() {
	jp := &l.jumps
	jp.columns = jp.columns[:0]
	clear(jp.from)
	contrast, steepest := l.contrasts()
	if contrast <= jumpRatio {
		return
	}
	jp.sweeps = steepSweeps
	if steepest > jumpRatio {
		jp.sweeps = sharpSweeps
	}
	for j := 1; j <= l.Z.N; j++ {
		jp.from[j] = len(jp.columns)
		l.rowRatios(j)
		lowest, highest := jp.ratios[0], jp.ratios[1]
		for i := 1; i <= l.X.N; i++ {
			lo, hi := lowest[i], highest[i]
			for d := 1; d <= 2*jumpRadius; d++ {
				lo, hi = min(lo, lowest[i+d]), max(hi, highest[i+d])
			}
			if hi > jumpRatio*lo {
				jp.columns = append(jp.columns, int32(i))
			}
		}
	}
	jp.from[l.Z.N+1] = len(jp.columns)
}

// contrasts returns the ratio of the largest to the smallest viscosity, and the
// largest ratio of two neighbours.
func (l *Level) contrasts() (all, neighbours float64) {
	lo, hi := l.Eta[l.stride+1], l.Eta[l.stride+1]
	steepest := 1.0
	for j := 1; j <= l.Z.N; j++ {
		e, above := l.row(l.Eta, j)[:l.stride], l.row(l.Eta, j+1)[:l.stride]
		for i := 1; i < len(e)-1; i++ {
			v := e[i]
			if v < lo {
				lo = v
			}
			if v > hi {
				hi = v
			}
			// The largest of four ratios without a division each.
			if v > steepest*e[i+1] || e[i+1] > steepest*v {
				steepest = max(v/e[i+1], e[i+1]/v)
			}
			if v > steepest*above[i] || above[i] > steepest*v {
				steepest = max(v/above[i], above[i]/v)
			}
		}
	}
	return hi / lo, steepest
}

// rowRatios stores the lowest and highest viscosity of each column within
// jumpRadius of row j, column i at i+jumpRadius, and what lies around: the other
// side of a periodic box, or the outermost columns again.
func (l *Level) rowRatios(j int) {
	const radius = jumpRadius
	n := l.X.N
	lowest, highest := l.jumps.ratios[0], l.jumps.ratios[1]
	lo, hi := lowest[1+radius:][:n], highest[1+radius:][:n]
	copy(lo, l.row(l.Eta, j)[1:])
	copy(hi, lo)
	for k := max(1, j-radius); k <= min(l.Z.N, j+radius); k++ {
		for i, e := range l.row(l.Eta, k)[1 : n+1] {
			if e < lo[i] {
				lo[i] = e
			}
			if e > hi[i] {
				hi[i] = e
			}
		}
	}
	for d := 1; d <= radius; d++ {
		left, right := 0, n-1
		if l.X.wraps() {
			left, right = ((n-d)%n+n)%n, (d-1)%n
		}
		lowest[1+radius-d], highest[1+radius-d] = lo[left], hi[left]
		lowest[radius+n+d], highest[radius+n+d] = lo[right], hi[right]
	}
}

// relaxJumps makes sweeps over the cells near jumps of level k, forwards and
// backwards in turn.
func (h *Hierarchy) relaxJumps(k int) {
	l := h.Levels[k]
	jp := &l.jumps
	if jp.none() {
		return
	}
	for s := range jp.sweeps {
		jp.backwards = s&1 == 1
		for c := range jumpColours {
			jp.colour = c
			if jp.backwards {
				jp.colour = jumpColours - 1 - c
			}
			if len(jp.columns) >= jumpShare {
				h.team.Run(jp.share)
				continue
			}
			for j := 1 + jp.colour; j <= l.Z.N; j += jumpColours {
				l.relaxRow(j)
			}
		}
	}
}

// relaxRow relaxes the marked cells of row j.
func (l *Level) relaxRow(j int) {
	columns := l.jumps.row(j)
	if len(columns) == 0 {
		return
	}
	m := l.rowMetric(j)
	wraps, last := l.X.wraps(), l.X.N
	for k := range columns {
		if l.jumps.backwards {
			k = len(columns) - 1 - k
		}
		i := int(columns[k])
		l.relaxCell(&m, j, i)
		if wraps && (i == 1 || i == last) {
			x := l.row(l.u.X, j)
			if i == last {
				x[1] = x[i+1] // the face at the seam has two slots
			}
			l.wrapX(x)
			l.wrapX(l.row(l.u.Z, j))
			l.wrapX(l.row(l.u.Z, j+1))
			l.wrapX(l.row(l.u.P, j))
		}
	}
}
