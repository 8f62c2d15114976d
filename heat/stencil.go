package heat

import (
	"example.org/overturn/heat/internal/dissect"
	"example.org/overturn/stokes/staggered"
)

// stencil holds the coefficients of −rate(T)·Δx·Δz of one cell, linear part
// only, in the units of the operator.
type stencil struct{ centre, south, west, east, north float64 }

// stencil returns the coefficients of a cell; a nil flow is at rest. A neighbour
// beyond a wall has none. Faces take the share upwind of their temperature from
// the cell that the flow leaves, the rest by linear interpolation.
func (op *operator) stencil(i, k int, flow *staggered.Flow, upwind float64) stencil {
	nx := op.nx
	scale := op.cellCapacity(k*nx + i) // velocity counts as heat where it varies
	u, v := [2]float64{}, [2]float64{} // at the west and east, south and north face
	if flow != nil {
		u = [2]float64{scale * flow.VX[k*(nx+1)+i], scale * flow.VX[k*(nx+1)+i+1]}
		v = [2]float64{scale * flow.VZ[k*nx+i], scale * flow.VZ[(k+1)*nx+i]}
	}
	x := op.alongXWith(i, k, u, upwind)
	z := op.alongZWith(i, k, v, upwind)
	dx, dz := op.dx[i], op.dz[k]
	return stencil{x.centre*dz + z.centre*dx, z.south * dx, x.west * dz, x.east * dz, z.north * dx}
}

// alongX returns the part of conduction along x, per height.
func (op *operator) alongX(i, k int) stencil { return op.alongXWith(i, k, [2]float64{}, 0) }

// alongZ returns the part of conduction along z, per width.
func (op *operator) alongZ(i, k int) stencil { return op.alongZWith(i, k, [2]float64{}, 0) }

// alongXWith returns the part along x with the flow u through the west and the
// east face.
func (op *operator) alongXWith(i, k int, u [2]float64, upwind float64) (s stencil) {
	if i > 0 || op.ring {
		c := op.faceX(i, k)
		before, after := blend(u[0], op.wl[i], op.wr[i], upwind)
		s.west -= before + c
		s.centre -= after - c
	} else {
		op.walls[staggered.Left].enter(k, u[0], op.nx, &s.centre, &s.east)
	}
	if i < op.nx-1 || op.ring {
		c := op.faceX(i+1, k)
		before, after := blend(u[1], op.wl[i+1], op.wr[i+1], upwind)
		s.centre += before + c
		s.east += after - c
	} else {
		op.walls[staggered.Right].enter(k, -u[1], op.nx, &s.centre, &s.west)
	}
	return s
}

// alongZWith returns the part along z with the flow v through the south and the
// north face.
func (op *operator) alongZWith(i, k int, v [2]float64, upwind float64) (s stencil) {
	if k > 0 {
		c := op.faceZ(i, k)
		before, after := blend(v[0], op.wb[k], op.wa[k], upwind)
		s.south -= before + c
		s.centre -= after - c
	} else {
		op.walls[staggered.Bottom].enter(i, v[0], op.nz, &s.centre, &s.north)
	}
	if k < op.nz-1 {
		c := op.faceZ(i, k+1)
		before, after := blend(v[1], op.wb[k+1], op.wa[k+1], upwind)
		s.centre += before + c
		s.north += after - c
	} else {
		op.walls[staggered.Top].enter(i, -v[1], op.nz, &s.centre, &s.south)
	}
	return s
}

// blend returns the shares of the velocity v with which the temperatures before
// and after a face are carried through it.
func blend(v, before, after, upwind float64) (b, a float64) {
	b, a = (1-upwind)*v*before, (1-upwind)*v*after
	if v > 0 {
		return b + upwind*v, a
	}
	return b, a + upwind*v
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
func (op *operator) matrixTo(m *dissect.Matrix, flow *staggered.Flow, upwind float64) {
	for k := range op.nz {
		for i := range op.nx {
			c := k*op.nx + i
			s := op.stencil(i, k, flow, upwind)
			m.Centre[c], m.South[c], m.West[c], m.East[c], m.North[c] = s.centre, s.south, s.west, s.east, s.north
		}
	}
}
