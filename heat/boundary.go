package heat

import (
	"fmt"
	"math"

	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// wallLine holds, for each cell along a wall, the heat conducted into the box
// and the temperature of the wall as functions of the temperatures T1, T2 of
// the first and second cell inside:
//
//	flux        = b − c1·T1 + c2·T2
//	temperature = e0 + e1·T1 + e2·T2
//	inflow      = i0 + i1·T1 + i2·T2, carried by fluid that enters
type wallLine struct {
	b, c1, c2  []float64
	e0, e1, e2 []float64
	i0, i1, i2 []float64
	isothermal bool
}

func newWallLine(n int) wallLine {
	m := make([]float64, 9*n)
	cut := func(j int) []float64 { return m[j*n : (j+1)*n : (j+1)*n] }
	return wallLine{
		b: cut(0), c1: cut(1), c2: cut(2),
		e0: cut(3), e1: cut(4), e2: cut(5),
		i0: cut(6), i1: cut(7), i2: cut(8),
	}
}

// flux returns the heat conducted into the box at cell j of the wall.
func (w *wallLine) flux(j int, t1, t2 float64) float64 {
	return w.b[j] - w.c1[j]*t1 + w.c2[j]*t2
}

// temperature returns that of the wall.
func (w *wallLine) temperature(j int, t1, t2 float64) float64 {
	return w.e0[j] + w.e1[j]*t1 + w.e2[j]*t2
}

// carried returns the temperature of what flows through the wall with the
// velocity v into the box. The bounded scheme lets out what the limiter allows.
func (w *wallLine) carried(j int, t1, t2, v float64, a Advection) float64 {
	switch {
	case v > 0:
		return w.i0[j] + w.i1[j]*t1 + w.i2[j]*t2
	case a == Central:
		return w.temperature(j, t1, t2)
	case w.isothermal:
		return rows.Limited(t2, t1, w.e0[j], 1, 0)
	}
	return t1
}

// fill sets the coefficients of cell j from the wall's own number and the
// coefficients of the conducted flux, k ∂T/∂n = a0·Twall − a1·T1 + a2·T2.
func (w *wallLine) fill(j int, wall Wall, value, capacity float64, a [3]float64) {
	for _, c := range [][]float64{w.b, w.c1, w.c2, w.e0, w.e1, w.e2, w.i0, w.i1, w.i2} {
		c[j] = 0
	}
	switch wall.kind {
	case prescribedTemperature:
		w.b[j], w.c1[j], w.c2[j] = a[0]*value, a[1], a[2]
		w.e0[j], w.i0[j] = value, value
	case heatTransfer:
		h := wall.coefficient / capacity
		share := 0.0
		if h > 0 {
			share = h / (h + a[0])
		}
		w.b[j], w.c1[j], w.c2[j] = share*a[0]*value, share*a[1], share*a[2]
		w.setTemperature(j, h*value, h, a)
		w.i0[j] = value
	default:
		q := value / capacity
		w.b[j] = q
		w.setTemperature(j, q, 0, a)
		w.i0[j], w.i1[j], w.i2[j] = w.e0[j], w.e1[j], w.e2[j]
	}
}

// setTemperature solves q − h·T = a0·T − a1·T1 + a2·T2 for the temperature of
// the wall. Where nothing conducts it is that of the first cell.
func (w *wallLine) setTemperature(j int, q, h float64, a [3]float64) {
	sum := h + a[0]
	if sum == 0 {
		w.e1[j] = 1
		return
	}
	w.e0[j], w.e1[j], w.e2[j] = q/sum, a[1]/sum, -a[2]/sum
}

// setWalls computes the coefficients of all walls.
func (op *operator) setWalls(walls *Walls) error {
	op.temperatureAt = false
	for _, s := range staggered.Sides() {
		wall := walls.side(s)
		if wall.kind == prescribedTemperature || wall.kind == heatTransfer && wall.coefficient > 0 {
			op.temperatureAt = true
		}
	}
	return op.fillWalls(&op.walls, walls)
}

// fillWalls computes the coefficients of all walls into lines.
func (op *operator) fillWalls(lines *[4]wallLine, walls *Walls) error {
	for _, s := range staggered.Sides() {
		wall := walls.side(s)
		along, n := op.g.XCentres(), op.nx
		if !s.Horizontal() {
			along, n = op.g.ZCentres(), op.nz
		}
		line := &lines[s]
		if line.b == nil {
			*line = newWallLine(n)
		}
		line.isothermal = wall.kind == prescribedTemperature
		if wall.kind == periodic {
			continue
		}
		for j, at := range along {
			value := wall.at(at)
			if !(math.Abs(value) <= math.MaxFloat64) {
				return fmt.Errorf("heat: %v wall (%v) has the value %v at %g, want a finite number", s, wall, value, at)
			}
			line.fill(j, wall, value, op.capacity, op.wallConductance(s, j))
		}
	}
	return nil
}

// wallConductance returns the coefficients of the flux conducted through a
// wall: the slope, at the wall, of the parabola through its temperature and
// those of the first two cells. The abscissa is the thermal resistance counted
// from the wall, in which the temperature of conducting layers is a straight
// line whatever their conductivities.
func (op *operator) wallConductance(s staggered.Side, j int) [3]float64 {
	kappa := op.kappa
	n, h := op.nz, op.dz
	if !s.Horizontal() {
		n, h = op.nx, op.dx
	}
	cell := func(m int) (size, k float64) { // the m-th cell from the wall
		at := m
		if s == staggered.Right || s == staggered.Top {
			at = n - 1 - m
		}
		if s.Horizontal() {
			return h[at], kappa(j, at)
		}
		return h[at], kappa(at, j)
	}
	h1, k1 := cell(0)
	if k1 == 0 {
		return [3]float64{}
	}
	if n == 1 {
		a := 2 * k1 / h1
		return [3]float64{a, a, 0}
	}
	h2, k2 := cell(1)
	r1, r12 := h1/2/k1, h1/2/k1+h2/2/k2
	if h3, k3 := cell(min(2, n-1)); n > 2 && k2 > 0 && k3 > 0 {
		r1 /= math.Exp(-h1 / 4 * steadier(math.Log(k2/k1)/((h1+h2)/2), math.Log(k3/k2)/((h2+h3)/2)))
	}
	if math.IsInf(r12, 1) {
		return [3]float64{1 / r1, 1 / r1, 0}
	}
	r2 := r1 + r12
	a1, a2 := r2/(r1*r12), r1/(r2*r12)
	return [3]float64{a1 - a2, a1, a2}
}

// steadier returns the smaller of two slopes, zero if they disagree in sign:
// a conductivity that varies smoothly is continued to the wall, one that jumps
// is not.
func steadier(a, b float64) float64 {
	if a*b > 0 {
		if math.Abs(a) < math.Abs(b) {
			return a
		}
		return b
	}
	return 0
}
