package heat

import (
	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// Convection in a box of equal cells with constant properties is worth a way of
// its own: all that a stage does to a row in one loop.

// even reports whether the pass at hand can go that way, and with what numbers.
func (s *sweep) even() (rows.Even, bool) {
	op := s.op
	if s.advection != Central || s.vx == nil || s.source != nil ||
		op.varying || op.capacities != nil || op.nx < 2 || op.nz < 2 ||
		!op.g.UniformX() || !op.g.UniformZ() {
		return rows.Even{}, false
	}
	ix, iz := op.ix[0], op.iz[0]
	return rows.Even{HalfX: ix / 2, HalfZ: iz / 2, CondX: op.cx[1] * ix, CondZ: op.cz[1] * iz}, true
}

// evenRows works on the rows of a block. Fluxes are divided by the cell size.
func (s *sweep) evenRows(b *block, e rows.Even) {
	op := s.op
	n := op.nx
	below := b.heat.Below
	if b.lo == 0 {
		s.wallZ(b, staggered.Bottom, 0)
		scale(below, b.heat.Above, op.iz[0])
	} else {
		rows.CentralEvenZ(below, s.row(b.lo-1), s.row(b.lo), s.vz[b.lo*n:], e)
	}
	for k := b.lo; k < b.hi; k++ {
		left, right := s.evenEnds(b, k)
		t, out, old := s.row(k), s.out[k*n:(k+1)*n], s.old[k*n:(k+1)*n]
		vx := s.vx[k*(n+1) : (k+1)*(n+1)]
		if k < op.nz-1 {
			rows.CentralEven(out, old, t, s.row(k+1), vx, s.vz[(k+1)*n:(k+2)*n], below, left, right, e, s.weights)
		} else {
			s.wallZ(b, staggered.Top, op.nz)
			above, x := b.heat.Above, b.heat.X
			scale(above, above, op.iz[0])
			rows.CentralX(x, t, vx, op.wl, op.wr, op.cx)
			rows.Update(out, old, t, &rows.Fluxes{X: x, Below: below, Above: above}, nil, op.ix, 1, 1, s.weights)
		}
		if s.inspecting {
			s.inspect(k)
		}
	}
}

// evenEnds returns the fluxes through the ends of row k, and leaves them
// undivided in b.heat.X.
func (s *sweep) evenEnds(b *block, k int) (left, right float64) {
	op := s.op
	n := op.nx
	x := b.heat.X
	if op.ring {
		t, v, c := s.row(k), s.vx[k*(n+1)], op.cx[0]
		x[0] = (v*op.wl[0]+c)*t[n-1] + (v*op.wr[0]-c)*t[0]
		x[n] = x[0]
	} else {
		s.wallX(b, staggered.Left, k, 0, 0, 1, 1)
		s.wallX(b, staggered.Right, k, n, n-1, n-2, -1)
	}
	return x[0] * op.ix[0], x[n] * op.ix[0]
}

// scale stores factor times src in dst.
func scale(dst, src []float64, factor float64) {
	for i, v := range src {
		dst[i] = factor * v
	}
}
