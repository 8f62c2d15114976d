package heat

import (
	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// facesZ computes the fluxes through the faces below row k into b.heat.Above
// (and, where the capacity varies, those of temperature into b.carried.Above).
func (s *sweep) facesZ(b *block, k int) {
	op := s.op
	switch k {
	case 0:
		s.wallZ(b, staggered.Bottom, k)
		return
	case op.nz:
		s.wallZ(b, staggered.Top, k)
		return
	}
	conductance, below, above := b.rowZ(op, k), s.row(k-1), s.row(k)
	if s.vz == nil || op.capacities != nil {
		rows.ConductZ(b.heat.Above, below, above, conductance)
	}
	if s.vz == nil {
		return
	}
	f := b.heat.Above
	if op.capacities != nil {
		f, conductance = b.carried.Above, b.zeros[:op.nx]
	}
	v := s.vz[k*op.nx : (k+1)*op.nx]
	if s.advection == Central {
		rows.CentralZ(f, below, above, v, conductance, op.wb[k], op.wa[k])
		return
	}
	rows.BoundedZ(f, s.behind(k-2), below, above, s.behind(k+1), v, conductance,
		[2]float64{op.upz.Down[0][k], op.upz.Down[1][k]}, [2]float64{op.upz.Up[0][k], op.upz.Up[1][k]})
}

// behind returns row k, or what stands for it beyond a wall in the bounded
// scheme: the wall's temperature where that is held, else the row at the wall,
// which leaves the upwind value there.
func (s *sweep) behind(k int) []float64 {
	wall := staggered.Bottom
	switch {
	case k >= 0 && k < s.op.nz:
		return s.row(k)
	case k >= 0:
		wall, k = staggered.Top, s.op.nz-1
	default:
		k = 0
	}
	if w := &s.op.walls[wall]; w.isothermal {
		return w.e0
	}
	return s.row(k)
}

// rowZ returns the conductances of the z-faces below row k.
func (b *block) rowZ(op *operator, k int) []float64 {
	if op.varying {
		return op.cz[k*op.nx : (k+1)*op.nx]
	}
	if c := op.cz[k]; c != b.filled {
		b.filled = c
		for i := range b.conductance {
			b.conductance[i] = c
		}
	}
	return b.conductance
}

// wallZ computes the fluxes through the bottom or the top.
func (s *sweep) wallZ(b *block, side staggered.Side, k int) {
	op := s.op
	first, second, up := 0, min(1, op.nz-1), 1.0
	if side == staggered.Top {
		first, second, up = op.nz-1, max(op.nz-2, 0), -1
	}
	w, t1, t2 := &op.walls[side], s.row(first), s.row(second)
	var conducted, advected float64
	for i := range t1 {
		v := 0.0
		if s.vz != nil {
			v = up * s.vz[k*op.nx+i]
		}
		f := s.wallFlux(w, i, first*op.nx+i, t1[i], t2[i], v)
		conducted += f.conducted * op.dx[i]
		advected += f.power * op.dx[i]
		f.store(up, &b.heat.Above[i], carriedAt(b.carried.Above, i))
	}
	s.conducted[side][0], s.advected[side][0] = conducted, advected
}

// wallFlux is what enters a cell through its wall.
type wallFlux struct {
	conducted float64 // heat by conduction
	carried   float64 // temperature by flow
	power     float64 // heat by flow
}

func (s *sweep) wallFlux(w *wallLine, j, cell int, t1, t2, v float64) wallFlux {
	f := wallFlux{conducted: w.flux(j, t1, t2)}
	if v != 0 {
		f.carried = v * w.carried(j, t1, t2, v, s.advection)
		f.power = f.carried
		if s.op.capacities != nil {
			f.power *= s.op.capacities[cell]
		}
	}
	return f
}

// carriedAt returns the place of a carried flux, nil if there is none.
func carriedAt(f []float64, i int) *float64 {
	if f == nil {
		return nil
	}
	return &f[i]
}

// store turns what enters through a wall into fluxes along the axis.
func (f wallFlux) store(along float64, heat, carried *float64) {
	if carried == nil {
		*heat = along * (f.conducted + f.carried)
		return
	}
	*heat, *carried = along*f.conducted, along*f.carried
}

// facesX computes the fluxes through the vertical faces of row k.
func (s *sweep) facesX(b *block, k int) {
	op := s.op
	n, t, conductance := op.nx, s.row(k), op.rowX(k)
	if s.vx == nil || op.capacities != nil {
		rows.ConductX(b.heat.X, t, conductance)
		if op.ring {
			b.heat.X[0] = conductance[0] * (t[n-1] - t[0])
		}
	}
	if s.vx != nil {
		f := b.heat.X
		if op.capacities != nil {
			f, conductance = b.carried.X, b.zeros
		}
		s.carryX(f, t, s.vx[k*(n+1):(k+1)*(n+1)], conductance, k)
	}
	if op.ring {
		b.heat.X[n] = b.heat.X[0]
		if b.carried.X != nil {
			b.carried.X[n] = b.carried.X[0]
		}
		return
	}
	s.wallX(b, staggered.Left, k, 0, 0, min(1, n-1), 1)
	s.wallX(b, staggered.Right, k, n, n-1, max(n-2, 0), -1)
}

// carryX stores the fluxes through the inner faces of row k.
func (s *sweep) carryX(f, t, v, c []float64, k int) {
	op := s.op
	n := op.nx
	if s.advection == Central {
		rows.CentralX(f, t, v, op.wl, op.wr, c)
		if op.ring {
			f[0] = (v[0]*op.wl[0]+c[0])*t[n-1] + (v[0]*op.wr[0]-c[0])*t[0]
		}
		return
	}
	rows.BoundedX(f, t, v, c, &op.upx)
	// The faces whose reconstruction reaches beyond the ends of the row.
	if op.ring {
		s.boundedFace(f, t, v, c, 0, k)
	}
	for _, i := range [...]int{1, n - 1} {
		if i > 0 && i < n {
			s.boundedFace(f, t, v, c, i, k)
		}
	}
}

// boundedFace stores the flux through face i of row k under the bounded scheme.
func (s *sweep) boundedFace(f, t, v, c []float64, i, k int) {
	w := &s.op.upx
	left, right := s.beside(t, i-1, k), s.beside(t, i, k)
	face := 0.0
	if v[i] > 0 {
		face = rows.Limited(s.beside(t, i-2, k), left, right, w.Down[0][i], w.Up[0][i])
	} else {
		face = rows.Limited(s.beside(t, i+1, k), right, left, w.Down[1][i], w.Up[1][i])
	}
	f[i] = v[i]*face + c[i]*(left-right)
}

// beside returns cell i of row k, or what stands for it beyond the ends, as
// behind does for rows.
func (s *sweep) beside(t []float64, i, k int) float64 {
	n := s.op.nx
	switch {
	case i >= 0 && i < n:
		return t[i]
	case s.op.ring:
		return t[(i+2*n)%n]
	}
	wall, end := &s.op.walls[staggered.Left], 0
	if i >= n {
		wall, end = &s.op.walls[staggered.Right], n-1
	}
	if wall.isothermal {
		return wall.e0[k]
	}
	return t[end]
}

// wallX computes the fluxes through one end of row k: face is its index, first
// and second the cells inside, along the direction into the box.
func (s *sweep) wallX(b *block, side staggered.Side, k, face, first, second int, along float64) {
	n, t := s.op.nx, s.row(k)
	v := 0.0
	if s.vx != nil {
		v = along * s.vx[k*(n+1)+face]
	}
	f := s.wallFlux(&s.op.walls[side], k, k*n+first, t[first], t[second], v)
	s.conducted[side][k], s.advected[side][k] = f.conducted, f.power
	f.store(along, &b.heat.X[face], carriedAt(b.carried.X, face))
}
