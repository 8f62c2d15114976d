package heat

import (
	"example.org/overturn/heat/internal/dissect"
	"example.org/overturn/stokes/staggered"
)

// stencil holds the coefficients of −rate(T)·Δx·Δz of one cell, linear part
// only, in the units of the operator.
type stencil struct{ centre, south, west, east, north float64 }

// stencil returns the coefficients of a cell under Central advection; a nil
// flow is at rest. A neighbour beyond a wall has none.
func (op *operator) stencil(i, k int, flow *staggered.Flow) stencil {
	var s stencil
	nx, nz := op.nx, op.nz
	scale := 1.0 // velocity counts as heat where capacity varies
	if op.capacities != nil {
		scale = op.capacities[k*nx+i]
	}
	u, v := [2]float64{}, [2]float64{} // at the west and east, south and north face
	if flow != nil {
		u = [2]float64{scale * flow.VX[k*(nx+1)+i], scale * flow.VX[k*(nx+1)+i+1]}
		v = [2]float64{scale * flow.VZ[k*nx+i], scale * flow.VZ[(k+1)*nx+i]}
	}
	if i > 0 || op.ring {
		c := op.faceX(i, k)
		s.west -= u[0]*op.wl[i] + c
		s.centre -= u[0]*op.wr[i] - c
	} else {
		op.walls[staggered.Left].enter(k, u[0], nx, &s.centre, &s.east)
	}
	if i < nx-1 || op.ring {
		c := op.faceX(i+1, k)
		s.centre += u[1]*op.wl[i+1] + c
		s.east += u[1]*op.wr[i+1] - c
	} else {
		op.walls[staggered.Right].enter(k, -u[1], nx, &s.centre, &s.west)
	}
	s = s.times(op.dz[k])
	z := stencil{}
	if k > 0 {
		c := op.faceZ(i, k)
		z.south -= v[0]*op.wb[k] + c
		z.centre -= v[0]*op.wa[k] - c
	} else {
		op.walls[staggered.Bottom].enter(i, v[0], nz, &z.centre, &z.north)
	}
	if k < nz-1 {
		c := op.faceZ(i, k+1)
		z.centre += v[1]*op.wb[k+1] + c
		z.north += v[1]*op.wa[k+1] - c
	} else {
		op.walls[staggered.Top].enter(i, -v[1], nz, &z.centre, &z.south)
	}
	z = z.times(op.dx[i])
	return stencil{s.centre + z.centre, s.south + z.south, s.west + z.west, s.east + z.east, s.north + z.north}
}

func (s stencil) times(f float64) stencil {
	return stencil{s.centre * f, s.south * f, s.west * f, s.east * f, s.north * f}
}

// enter subtracts the heat that enters through cell j of the wall, conducted
// and carried with the velocity v into the box, from the coefficients of the
// first and the second cell. n is the number of cells across the box.
func (w *wallLine) enter(j int, v float64, n int, first, second *float64) {
	t1, t2 := w.e1[j], w.e2[j]
	if v > 0 {
		t1, t2 = w.i1[j], w.i2[j]
	}
	*first -= v*t1 - w.c1[j]
	if n > 1 {
		*second -= v*t2 + w.c2[j]
	}
}

// matrixTo stores the stencils of all cells.
func (op *operator) matrixTo(m *dissect.Matrix, flow *staggered.Flow) {
	for k := range op.nz {
		for i := range op.nx {
			c := k*op.nx + i
			s := op.stencil(i, k, flow)
			m.Centre[c], m.South[c], m.West[c], m.East[c], m.North[c] = s.centre, s.south, s.west, s.east, s.north
		}
	}
}
