package stokes

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// The kernels keep velocities multiplied by the viscosity scale, pressures
// without the part that balances mean weights, and everything padded. This
// file goes to and fro.

// any reports whether a wall moves or is crossed.
func (m *wallMotion) any() bool {
	for _, side := range staggered.Sides() {
		if m.tangential[side] != nil || m.normal[side] != nil {
			return true
		}
	}
	return false
}

// setWalls stores the prescribed velocities in the slots of the solution.
func (sv *Solver) setWalls() {
	l, x, m := sv.level, sv.mg.X, &sv.motion
	nx, nz := sv.grid.Cells()
	put := func(dst, src []float64) {
		clear(dst)
		for i, v := range src {
			dst[i] = v * sv.scale
		}
	}
	put(l.Row(x.X, 0)[1:], m.tangential[staggered.Bottom])
	put(l.Row(x.X, nz+1)[1:], m.tangential[staggered.Top])
	put(l.Row(x.Z, 1)[1:nx+1], m.normal[staggered.Bottom])
	put(l.Row(x.Z, nz+1)[1:nx+1], m.normal[staggered.Top])
	if sv.walls.Left.kind == periodic {
		return
	}
	for _, w := range []struct {
		side    staggered.Side
		face    int // column of its normal velocities
		outside int // column of its tangential velocities
	}{{staggered.Left, 1, 0}, {staggered.Right, nx + 1, nx + 1}} {
		tangential, normal := m.tangential[w.side], m.normal[w.side]
		for j := 1; j <= nz+1; j++ {
			l.Row(x.Z, j)[w.outside] = 0
			if tangential != nil {
				l.Row(x.Z, j)[w.outside] = tangential[j-1] * sv.scale
			}
			if j <= nz {
				l.Row(x.X, j)[w.face] = 0
				if normal != nil {
					l.Row(x.X, j)[w.face] = normal[j-1] * sv.scale
				}
			}
		}
	}
}

// rest sets the solution to fluid at rest between moving walls.
func (sv *Solver) rest() {
	clear(sv.mg.X.X)
	clear(sv.mg.X.Z)
	clear(sv.mg.X.P)
	sv.setWalls()
}

// guess takes the solution from a flow.
func (sv *Solver) guess(flow *staggered.Flow) {
	nx, nz := sv.grid.Cells()
	l, x := sv.level, sv.mg.X
	for j := 1; j <= nz; j++ {
		scaleTo(l.Row(x.X, j)[1:], flow.VX[(j-1)*(nx+1):][:nx+1], sv.scale)
		scaleTo(l.Row(x.Z, j)[1:], flow.VZ[(j-1)*nx:][:nx], sv.scale)
		sv.load.withoutWeight(l.Row(x.P, j)[1:], flow.P[(j-1)*nx:][:nx], j)
	}
	sv.setWalls()
}

// store writes the solution to a flow, with a pressure of zero mean and, where
// the layer may slide freely, a velocity of zero mean.
func (sv *Solver) store(flow *staggered.Flow) {
	nx, nz := sv.grid.Cells()
	l, x := sv.level, sv.mg.X
	sv.setWalls()
	slide := sv.slide()
	for j := 1; j <= nz+1; j++ {
		scaleTo(flow.VZ[(j-1)*nx:][:nx], l.Row(x.Z, j)[1:], 1/sv.scale)
		if j == nz+1 {
			break
		}
		vx := flow.VX[(j-1)*(nx+1):][:nx+1]
		scaleTo(vx, l.Row(x.X, j)[1:], 1/sv.scale)
		if l.Drifts() {
			for i := range vx {
				vx[i] -= slide
			}
		}
		if sv.walls.Left.kind == periodic {
			vx[nx] = vx[0]
		}
		sv.load.withWeight(flow.P[(j-1)*nx:][:nx], l.Row(x.P, j)[1:], j)
	}
	removeMean(sv.grid, flow.P)
}

// slide returns the mean horizontal velocity.
func (sv *Solver) slide() float64 {
	if !sv.level.Drifts() {
		return 0
	}
	nx, nz := sv.grid.Cells()
	sum := 0.0
	for j := 1; j <= nz; j++ {
		row := 0.0
		for i := 1; i <= nx; i++ {
			row += sv.level.Row(sv.mg.X.X, j)[i] * sv.level.X.D[i]
		}
		sum += row * sv.level.Z.H[j]
	}
	return sum / sv.grid.Area() / sv.scale
}

// removeMean makes the area-weighted mean of cell values zero.
func removeMean(g *staggered.Grid, p []float64) {
	mean := (&staggered.Scalar{Grid: g, Values: p}).Mean()
	for i := range p {
		p[i] -= mean
	}
}

func scaleTo(dst, src []float64, factor float64) {
	n := min(len(dst), len(src))
	dst, src = dst[:n], src[:n]
	for i := range dst {
		dst[i] = src[i] * factor
	}
}

func (sv *Solver) checkFlow(flow *staggered.Flow) error {
	nx, nz := sv.grid.Cells()
	switch {
	case flow == nil:
		return fmt.Errorf("stokes: flow is nil, want a flow on %v", sv.grid)
	case !sv.grid.Equal(flow.Grid):
		return fmt.Errorf("stokes: flow is on %v, want %v", flow.Grid, sv.grid)
	}
	if err := checkNumbers("flow.VX", flow.VX, (nx+1)*nz); err != nil {
		return err
	}
	if err := checkNumbers("flow.VZ", flow.VZ, nx*(nz+1)); err != nil {
		return err
	}
	return checkNumbers("flow.P", flow.P, nx*nz)
}
