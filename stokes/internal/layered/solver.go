package layered

import (
	"example.org/overturn/stokes/internal/multigrid"
	"example.org/overturn/stokes/internal/team"
)

// A Solver finds velocities from momentum residuals. Its unknowns are the
// amplitudes of modes of ψ on the nz−1 rows of corners between the walls.
type Solver struct {
	l     *multigrid.Level
	modes int
	rows  int
	team  *team.Team

	kappa2 []float64 // κ² of each mode
	scale  float64   // of right-hand sides

	// Factors L D Lᵀ of each mode, row after row: 1/D and both subdiagonals
	// of L.
	inverse, below, below2 []float64

	psi        []float64   // amplitudes, then values of ψ
	loads      [][]float64 // right-hand side of one row, for each part
	transforms []transform
	channel    *channel // nil between closed sides

	u Fields
	r Fields

	factorPass, forwardPass, solvePass, backPass, addPass func(part int)
}

// Fields are those of the multigrid levels.
type Fields = multigrid.Fields

// largestFactor is the largest prime factor of a number of columns for which
// the transform is fast.
const largestFactor = 11

// Suits reports whether the geometry allows the direct solution: it takes
// equally wide columns, whose number has only small prime factors, sides that
// are periodic or closed and free of shear stress, and at least two rows.
func Suits(l *multigrid.Level) bool {
	if l.X.N < 3 || l.Z.N < 2 || l.X.Lo == multigrid.Stick || l.X.Hi == multigrid.Stick {
		return false
	}
	for i := 2; i <= l.X.N; i++ {
		if l.X.H[i] != l.X.H[1] {
			return false
		}
	}
	n := l.X.N
	for p := 2; p <= largestFactor; p++ {
		for n%p == 0 {
			n /= p
		}
	}
	return n == 1
}

// New makes a solver for a level that suits it.
func New(l *multigrid.Level, t *team.Team) *Solver {
	sv := &Solver{l: l, rows: l.Z.N - 1, team: t}
	make1, modes := newSine, sineModes
	if l.X.Lo == multigrid.Wrap {
		make1, modes = newPeriodic, periodicModes
		sv.channel = newChannel(l.Z.N)
	}
	var factor float64
	sv.kappa2, factor = modes(l.X.N, l.X.H[1])
	sv.scale = 1 / (factor * l.X.H[1]) // the quadratic form carries dx
	sv.modes = len(sv.kappa2)
	for range t.Size() {
		sv.transforms = append(sv.transforms, make1(l.X.N))
		sv.loads = append(sv.loads, make([]float64, sv.values()))
	}
	n := sv.modes * sv.rows
	all := make([]float64, 3*n)
	sv.inverse, sv.below, sv.below2 = all[:n], all[n:2*n], all[2*n:]
	sv.psi = make([]float64, max(sv.modes, sv.values())*sv.rows)
	byModes := func(work func(lo, hi int)) func(int) {
		return func(part int) { work(team.Block(sv.modes, part, t.Size())) }
	}
	byRows := func(rows int, work func(part, row int)) func(int) {
		return func(part int) {
			lo, hi := team.Block(rows, part, t.Size())
			for k := lo; k < hi; k++ {
				work(part, k)
			}
		}
	}
	sv.factorPass = byModes(sv.factor)
	sv.forwardPass = byRows(sv.rows, sv.loadRow)
	sv.solvePass = byModes(sv.eliminate)
	sv.backPass = byRows(sv.rows, func(part, k int) { sv.transforms[part].back(sv.psiRow(k)[:sv.values()], sv.psiRow(k)[:sv.modes]) })
	sv.addPass = byRows(l.Z.N, sv.addRow)
	return sv
}

// row returns row k of an array of unknowns, which is corner row k+2.
func (sv *Solver) row(a []float64, k int) []float64 { return a[k*sv.modes:][:sv.modes] }

// values returns the number of columns of corners where ψ is unknown.
func (sv *Solver) values() int {
	if sv.l.X.Lo == multigrid.Wrap {
		return sv.l.X.N
	}
	return sv.l.X.N - 1
}

// psiRow returns row k of ψ, with room for values and for modes.
func (sv *Solver) psiRow(k int) []float64 {
	stride := max(sv.modes, sv.values())
	return sv.psi[k*stride:][:stride]
}

// Factor takes over the viscosity of the level, which must not vary along x.
func (sv *Solver) Factor() {
	sv.team.Run(sv.factorPass)
	if sv.channel != nil {
		sv.channel.factor(sv)
	}
}

// factor computes L D Lᵀ for the modes lo ≤ m < hi. With row k of an upper
// triangle that begins d, e, f, the recursions are
//
//	b2[k] = f[k-2]/D[k-2]
//	b1[k] = (e[k-1] − D[k-2] b1[k-1] b2[k]) / D[k-1]
//	D[k]  = d[k] − D[k-1] b1[k]² − D[k-2] b2[k]²
func (sv *Solver) factor(lo, hi int) {
	for k := range sv.rows {
		d, e, f := sv.coefficients(k), sv.coefficients(k-1), sv.coefficients(k-2)
		inverse, below, below2 := sv.row(sv.inverse, k), sv.row(sv.below, k), sv.row(sv.below2, k)
		var i1, i2, b1 []float64
		if k > 0 {
			i1, b1 = sv.row(sv.inverse, k-1), sv.row(sv.below, k-1)
		}
		if k > 1 {
			i2 = sv.row(sv.inverse, k-2)
		}
		for m := lo; m < hi; m++ {
			q := sv.kappa2[m]
			pivot := d.diagonal(q)
			below[m], below2[m] = 0, 0
			if k > 1 {
				v := f.second()
				below2[m] = v * i2[m]
				pivot -= v * below2[m]
			}
			if k > 0 {
				v := e.first(q)
				if k > 1 {
					v -= f.second() * b1[m]
				}
				below[m] = v * i1[m]
				pivot -= v * below[m]
			}
			inverse[m] = 1 / pivot
		}
	}
}

// A stencil holds what the upper triangle of one row of the matrix is made of:
// the corner's own shear and those of the corners below and above, and the
// stretching of the cells below and above.
type stencil struct {
	cellLow, cellUp float64    // 4η/dz, to be multiplied by κ²
	s               [3]float64 // η_n [dz] of corners below, at and above
	low, mid, up    float64    // shear at this corner: low ψ below + (κ² − mid) ψ + up ψ above
	fromBelow       float64    // weight of ψ here in the shear of the corner below
	fromAbove       float64    // and of the corner above
	midAbove        float64    // and of the corner above: its own
	upAbove         float64
}

// coefficients returns the stencil of unknown row k.
func (sv *Solver) coefficients(k int) stencil {
	if k < 0 {
		return stencil{}
	}
	l, j := sv.l, k+2
	z := &l.Z
	eta := func(j int) float64 { return l.Row(l.Eta, j)[1] }
	shear := func(j int) float64 { return l.Shear(2, j) * z.D[j] }
	c := stencil{
		cellLow: 4 * eta(j-1) * z.RH[j-1], cellUp: 4 * eta(j) * z.RH[j],
		s:   [3]float64{shear(j - 1), shear(j), shear(j + 1)},
		low: z.RH[j-1] * z.RD[j], up: z.RH[j] * z.RD[j],
		fromBelow: z.RH[j-1] * z.RD[j-1], fromAbove: z.RH[j] * z.RD[j+1],
	}
	c.mid = c.low + c.up
	if j < z.N {
		c.upAbove = z.RH[j+1] * z.RD[j+1]
		c.midAbove = c.fromAbove + c.upAbove
	}
	return c
}

func (c *stencil) diagonal(k2 float64) float64 {
	own := k2 - c.mid
	return (c.cellLow+c.cellUp)*k2 + c.s[0]*c.fromBelow*c.fromBelow + c.s[1]*own*own + c.s[2]*c.fromAbove*c.fromAbove
}

// first is the entry that couples to the row above.
func (c *stencil) first(k2 float64) float64 {
	return -c.cellUp*k2 + c.s[1]*(k2-c.mid)*c.up + c.s[2]*c.fromAbove*(k2-c.midAbove)
}

// second is the entry that couples to the row after that.
func (c *stencil) second() float64 { return c.s[2] * c.fromAbove * c.upAbove }

// Add adds to the velocity u the one that the momentum residual r, integrated
// over control volumes, drives. Its divergence is zero to rounding.
func (sv *Solver) Add(u, r Fields) {
	sv.u, sv.r = u, r
	sv.team.Run(sv.forwardPass)
	sv.team.Run(sv.solvePass)
	sv.team.Run(sv.backPass)
	sv.team.Run(sv.addPass)
	if sv.channel != nil {
		sv.channel.add(sv, u, r)
	}
}

// loadRow transforms the curl of the residual at corner row k+2.
func (sv *Solver) loadRow(part, k int) {
	l, j := sv.l, k+2
	x0, x1, z := l.Row(sv.r.X, j-1), l.Row(sv.r.X, j), l.Row(sv.r.Z, j)
	rdx, r0, r1 := l.X.RH[1], l.Z.RH[j-1], l.Z.RH[j]
	b := sv.loads[part]
	first := l.X.N - len(b) + 1 // column of the first corner
	left := z[l.X.N]            // of corner 1
	if first == 2 {
		left = z[1]
	}
	x0, x1, z = x0[first:][:len(b)], x1[first:][:len(b)], z[first:][:len(b)]
	for i := range b {
		b[i] = sv.scale * ((x0[i]*r0 - x1[i]*r1) + (z[i]-left)*rdx)
		left = z[i]
	}
	sv.transforms[part].forward(sv.psiRow(k)[:sv.modes], b)
}

// eliminate solves for the modes lo ≤ m < hi.
func (sv *Solver) eliminate(lo, hi int) {
	for k := 1; k < sv.rows; k++ {
		y, y1, b1 := sv.psiRow(k)[lo:hi], sv.psiRow(k - 1)[lo:hi], sv.row(sv.below, k)[lo:hi]
		y1, b1 = y1[:len(y)], b1[:len(y)]
		if k == 1 {
			for m := range y {
				y[m] -= b1[m] * y1[m]
			}
			continue
		}
		y2, b2 := sv.psiRow(k - 2)[lo:hi][:len(y)], sv.row(sv.below2, k)[lo:hi][:len(y)]
		for m := range y {
			y[m] -= b1[m]*y1[m] + b2[m]*y2[m]
		}
	}
	for k := sv.rows - 1; k >= 0; k-- {
		y, d := sv.psiRow(k)[lo:hi], sv.row(sv.inverse, k)[lo:hi]
		d = d[:len(y)]
		for m := range y {
			y[m] *= d[m]
		}
		for n := 1; n <= 2 && k+n < sv.rows; n++ {
			b := sv.row(sv.below, k+1)
			if n == 2 {
				b = sv.row(sv.below2, k+2)
			}
			b, x := b[lo:hi][:len(y)], sv.psiRow(k + n)[lo:hi][:len(y)]
			for m := range y {
				y[m] -= b[m] * x[m]
			}
		}
	}
}

// addRow adds the velocity of ψ to cell row k+1.
func (sv *Solver) addRow(_, k int) {
	l, j := sv.l, k+1
	n := sv.values()
	first := l.X.N - n + 1
	x := l.Row(sv.u.X, j)[first:][:n]
	rdz, rdx := l.Z.RH[j], l.X.RH[1]
	if k < sv.rows {
		for i, v := range sv.psiRow(k)[:n] { // the upper corners
			x[i] += v * rdz
		}
	}
	if k == 0 {
		return
	}
	lower, z := sv.psiRow(k - 1)[:n], l.Row(sv.u.Z, j)[1:][:l.X.N]
	left := 0.0 // of cell 1
	if first == 1 {
		left = lower[0]
	}
	rest := lower[2-first:] // from the right corner of cell 1
	for i, v := range lower {
		x[i] -= v * rdz
	}
	for i, v := range rest {
		z[i] -= (v - left) * rdx
		left = v
	}
	last := 0.0 // of the right corner of the last cell
	if first == 1 {
		last = lower[0]
	}
	z[l.X.N-1] -= (last - left) * rdx
}
