package multigrid

import (
	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
	"gonum.org/v1/gonum/lapack/lapack64"
)

// coarsestCells is the size below which a level is solved directly.
const coarsestCells = 32

// A dense solver factors the operator of the coarsest level. Its unknowns are
// the velocities of free faces and all pressures.
type dense struct {
	l      *Level
	s      *scratch
	index  []int // positions of the unknowns in one field after the other
	a      blas64.General
	pivots []int
	b      blas64.General
	drifts bool // a uniform vx meets no resistance
}

func newDense(l *Level) *dense {
	d := &dense{l: l, s: newScratch(l.stride)}
	x, z, n := &l.X, &l.Z, l.size()
	for j := 1; j <= z.N; j++ {
		for i := x.firstFree(); i <= x.N; i++ {
			d.index = append(d.index, j*l.stride+i)
		}
	}
	for j := 2; j <= z.N; j++ {
		for i := 1; i <= x.N; i++ {
			d.index = append(d.index, n+j*l.stride+i)
		}
	}
	for j := 1; j <= z.N; j++ {
		for i := 1; i <= x.N; i++ {
			d.index = append(d.index, 2*n+j*l.stride+i)
		}
	}
	size := len(d.index)
	d.a = blas64.General{Rows: size, Cols: size, Stride: size, Data: make([]float64, size*size)}
	d.b = blas64.General{Rows: size, Cols: 1, Stride: 1, Data: make([]float64, size)}
	d.pivots = make([]int, size)
	d.drifts = l.Drifts()
	return d
}

// Drifts reports whether a uniform vx meets no resistance: periodic sides
// between walls without shear stress.
func (l *Level) Drifts() bool {
	return l.X.wraps() && l.Z.Lo == Slip && l.Z.Hi == Slip
}

// at returns the field that unknown k belongs to and its position there.
func (d *dense) at(u Fields, k int) (field []float64, position int) {
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

// factor probes the operator with unit vectors. It is singular, for a uniform
// pressure drives nothing; a term that lifts the mean pressure, and where the
// fluid drifts the mean vx, takes nothing from consistent right-hand sides.
func (d *dense) factor() {
	l, size := d.l, len(d.index)
	l.u.clear()
	meanP, meanD, free := 0.0, 0.0, 0
	for k := range d.index {
		field, at := d.at(l.u, k)
		field[at] = 1
		l.WrapFields(l.u)
		d.column(k)
		field[at] = 0
	}
	l.WrapFields(l.u)
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			meanP += l.X.H[i] * l.Z.H[j] / l.Eta[j*l.stride+i]
			if v := l.ix[j*l.stride+i]; v > 0 {
				meanD += 1 / v
				free++
			}
		}
	}
	cells := float64(l.cells())
	lift := meanP / cells / cells
	firstP := size - l.cells()
	for a := firstP; a < size; a++ {
		for b := firstP; b < size; b++ {
			d.a.Data[a*size+b] -= lift
		}
	}
	if d.drifts {
		lift := meanD / float64(free) / float64(free)
		for a := range free {
			for b := range free {
				d.a.Data[a*size+b] -= lift
			}
		}
	}
	lapack64.Getrf(d.a, d.pivots)
}

// column stores the operator applied to the present unit vector in column k.
func (d *dense) column(k int) {
	l, size := d.l, len(d.index)
	for q := range size {
		d.a.Data[q*size+k] = 0
	}
	row := 0
	nx, nz := l.X.N, l.Z.N
	facesX := nx + 1 - l.X.firstFree()
	xz := facesX * nz
	l.begin(d.s, l.u, 1)
	for j := 1; j <= nz; j++ {
		l.operatorRow(d.s, l.u, j)
		for i := l.X.firstFree(); i <= nx; i++ {
			d.a.Data[row*size+k] = d.s.rx[i]
			row++
		}
		for i := 1; i <= nx; i++ {
			if j > 1 {
				d.a.Data[(xz+(j-2)*nx+i-1)*size+k] = d.s.rz[i]
			}
			d.a.Data[(xz+(nz-1)*nx+(j-1)*nx+i-1)*size+k] = d.s.rp[i]
		}
	}
}

// solve stores the solution of the correction equation in l.u.
func (d *dense) solve() {
	for k := range d.index {
		field, at := d.at(d.l.f, k)
		d.b.Data[k] = -field[at]
	}
	lapack64.Getrs(blas.NoTrans, d.a, d.b, d.pivots)
	for k := range d.index {
		field, at := d.at(d.l.u, k)
		field[at] = d.b.Data[k]
	}
	d.l.WrapFields(d.l.u)
}
