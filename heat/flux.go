package heat

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// WallFluxTo stores in dst the heat flux into the box at the centres of the
// cells along a wall, from left to right or from bottom to top, and returns dst;
// nil is allocated. It is the conducted flux, second order in the cell size,
// plus, with a flow that passes through the wall, the heat it carries. The flux
// through a wall is the one with which Step updates the cells: their budgets
// agree to rounding. Through periodic sides no heat enters.
func (st *Stepper) WallFluxTo(dst []float64, side staggered.Side, temperature *staggered.Scalar, flow *staggered.Flow) ([]float64, error) {
	op := st.op
	if side < staggered.Left || side > staggered.Top {
		return dst, fmt.Errorf("heat: side is %v, want one of the four", side)
	}
	if err := st.check(temperature, flow); err != nil {
		return dst, err
	}
	n := op.nz
	if side.Horizontal() {
		n = op.nx
	}
	if dst == nil {
		dst = make([]float64, n)
	}
	if len(dst) != n {
		return dst, fmt.Errorf("heat: dst has %d values, want %d along the %v wall: %w", len(dst), n, side, ErrSize)
	}
	if op.ring && !side.Horizontal() {
		clear(dst)
		return dst, nil
	}
	st.sweep.begin(st.set.Advection, flow, st.source)
	for j := range dst {
		first, second, v := op.atWall(side, j, flow)
		t := temperature.Values
		f := st.sweep.wallFlux(&op.walls[side], j, first, t[first], t[second], v)
		dst[j] = f.conducted*op.capacity + f.power*op.capacity
	}
	return dst, nil
}

// atWall returns the first and second cell inside a wall and the velocity into
// the box.
func (op *operator) atWall(side staggered.Side, j int, flow *staggered.Flow) (first, second int, v float64) {
	nx, nz := op.nx, op.nz
	face, sign := 0, 1.0
	switch side {
	case staggered.Left:
		first, second, face = j*nx, j*nx+min(1, nx-1), j*(nx+1)
	case staggered.Right:
		first, second, face, sign = j*nx+nx-1, j*nx+max(nx-2, 0), j*(nx+1)+nx, -1
	case staggered.Bottom:
		first, second, face = j, min(1, nz-1)*nx+j, j
	default:
		first, second, face, sign = (nz-1)*nx+j, max(nz-2, 0)*nx+j, nz*nx+j, -1
	}
	switch {
	case flow == nil:
	case side.Horizontal():
		v = sign * flow.VZ[face]
	default:
		v = sign * flow.VX[face]
	}
	return first, second, v
}

// Corners are the heat fluxes conducted into the box through Bottom and Top at
// the corners, where each wall meets the sides.
type Corners struct{ TopLeft, TopRight, BottomRight, BottomLeft float64 }

// CornerFluxes returns the conducted fluxes at the corners. Beside an
// insulating side the flux along the wall is even about the corner: the
// parabola with its vertex there is put through the nearest two cells. On
// periodic sides both corners take the mean of the cells beside them; beside
// other walls the line through the nearest two cells is continued.
//
// For unit conductivity between isothermal walls these are, up to sign, the
// temperature gradients q1 to q4 of Blankenbach et al. (1989).
func (st *Stepper) CornerFluxes(temperature *staggered.Scalar) (Corners, error) {
	if err := st.check(temperature, nil); err != nil {
		return Corners{}, err
	}
	var c Corners
	c.BottomLeft, c.BottomRight = st.ends(staggered.Bottom, temperature.Values)
	c.TopLeft, c.TopRight = st.ends(staggered.Top, temperature.Values)
	return c, nil
}

// ends returns the conducted flux at the left and the right end of a wall.
func (st *Stepper) ends(side staggered.Side, t []float64) (left, right float64) {
	op := st.op
	flux := func(j int) float64 {
		first, second, _ := op.atWall(side, j, nil)
		return op.capacity * op.walls[side].flux(j, t[first], t[second])
	}
	n := op.nx
	if n == 1 {
		return flux(0), flux(0)
	}
	if op.ring {
		wrapped := op.wl[0]*flux(n-1) + op.wr[0]*flux(0)
		return wrapped, wrapped
	}
	left = toCorner(st.walls.Left, op.dx[0], op.dx[1], flux(0), flux(1))
	right = toCorner(st.walls.Right, op.dx[n-1], op.dx[n-2], flux(n-1), flux(n-2))
	return left, right
}

// toCorner continues the fluxes q1 and q2 of the nearest two cells, of widths
// h1 and h2, to the corner.
func toCorner(side Wall, h1, h2, q1, q2 float64) float64 {
	x1, x2 := h1/2, h1+h2/2
	if side.kind == prescribedFlux && side.profile == nil && side.value == 0 {
		x1, x2 = x1*x1, x2*x2
	}
	return q1 + (q1-q2)*x1/(x2-x1)
}
