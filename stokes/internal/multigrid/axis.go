package multigrid

// An End says what happens at the two ends of an axis, or on one wall.
type End int

// The kinds of end.
const (
	Slip  End = iota // a wall without shear stress
	Stick            // a wall whose tangential velocity is given
	Wrap             // no wall: the far end follows, on both sides
)

// An Axis is one direction of a level: N cells, numbered from 1, and N+1
// nodes, of which node i is the lower edge of cell i. All slices are padded to
// N+2 numbers, so that index and neighbour exist everywhere.
type Axis struct {
	N      int
	Lo, Hi End

	H  []float64 // H[i]: width of cell i
	RH []float64 // 1/H
	D  []float64 // D[i]: distance of the centres beside node i; half a cell at a wall
	RD []float64 // 1/D
}

// NewAxis returns the axis of cells of the given widths.
func NewAxis(widths []float64, lo, hi End) Axis {
	n := len(widths)
	a := Axis{N: n, Lo: lo, Hi: hi,
		H: make([]float64, n+2), RH: make([]float64, n+2),
		D: make([]float64, n+2), RD: make([]float64, n+2)}
	copy(a.H[1:], widths)
	a.H[0], a.H[n+1] = widths[0], widths[n-1]
	if a.wraps() {
		a.H[0], a.H[n+1] = widths[n-1], widths[0]
	}
	for i := 1; i <= n+1; i++ {
		a.D[i] = 0.5 * (a.H[i-1] + a.H[i])
	}
	if !a.wraps() {
		a.D[1], a.D[n+1] = 0.5*a.H[1], 0.5*a.H[n]
	}
	a.D[0] = a.D[1]
	for i := range a.H {
		a.RH[i], a.RD[i] = 1/a.H[i], 1/a.D[i]
	}
	return a
}

func (a *Axis) wraps() bool { return a.Lo == Wrap }

// firstFree returns the lowest node whose normal velocity is unknown; the
// highest is N.
func (a *Axis) firstFree() int {
	if a.wraps() {
		return 1
	}
	return 2
}

// widths returns the N cell widths.
func (a *Axis) widths() []float64 { return a.H[1 : a.N+1] }
