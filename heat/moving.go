package heat

import (
	"errors"
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// SetWalls replaces the conditions on the walls at once. See [Stepper.MoveWalls]
// for values that change gradually. Sides cannot become periodic or cease to be.
// On error the walls are as before.
func (st *Stepper) SetWalls(w Walls) error {
	if err := w.check(); err != nil {
		return err
	}
	if (w.Left.kind == periodic) != st.op.ring {
		return fmt.Errorf("heat: left wall was %v and becomes %v, want both periodic or neither", st.walls.Left, w.Left)
	}
	old := st.walls
	if err := st.op.setWalls(&w); err != nil {
		return errors.Join(err, st.op.setWalls(&old))
	}
	st.walls, st.motion.under = w, false
	if w.conductsAs(&old) {
		return nil
	}
	st.op.bound()
	if st.implicit != nil {
		st.implicit = newImplicit(st.op, st.set.Workers)
	}
	return nil
}

// motion is a change of the walls' values during the next step.
type motion struct {
	under     bool // way
	walls     Walls
	from, end [4]wallLine
}

// MoveWalls lets the values of the walls go from what they are to those of w
// during the next [Stepper.Step], at a constant speed, so that conditions that
// change in time keep the temperature at second order. The kinds of the walls and
// their coefficients of heat transfer must stay the same. When the step fails
// the motion is still to come.
//
// Under [Implicit] the flux through a wall whose temperature changes is of first
// order if the step is refined in proportion to the cells.
func (st *Stepper) MoveWalls(w Walls) error {
	if err := w.check(); err != nil {
		return err
	}
	if !w.conductsAs(&st.walls) {
		return fmt.Errorf("heat: walls %v become %v, want the same kinds and coefficients", st.walls, w)
	}
	m := &st.motion
	m.under = false
	if err := errors.Join(st.op.fillWalls(&m.from, &st.walls), st.op.fillWalls(&m.end, &w)); err != nil {
		return err
	}
	m.under, m.walls = true, w
	return nil
}

// moveTo puts moving walls where they are at a share of the step.
func (st *Stepper) moveTo(share float64) {
	if !st.motion.under {
		return
	}
	for s := range st.op.walls {
		to, from, end := &st.op.walls[s], &st.motion.from[s], &st.motion.end[s]
		for j := range to.b {
			to.b[j] = from.b[j] + share*(end.b[j]-from.b[j])
			to.e0[j] = from.e0[j] + share*(end.e0[j]-from.e0[j])
			to.i0[j] = from.i0[j] + share*(end.i0[j]-from.i0[j])
		}
	}
}

// settle puts moving walls where a step leaves them: at the end of the motion,
// which is over, or on error where it began.
func (st *Stepper) settle(err error) {
	m := &st.motion
	switch {
	case !m.under:
	case err != nil:
		st.moveTo(0)
	default:
		st.moveTo(1)
		st.walls, m.under = m.walls, false
	}
}

// shift prepares what moving walls contribute to the implicit solves: to the
// fluxes through the bottom and the top, where k is solved for along z, their
// change Δ; to those through the sides, where (1 − γ dt Az) k is solved for along
// x, that of (1 − γ dt Az) Δ. Without the latter a wall whose parts change at
// different speeds costs the order of the scheme.
func (im *implicit) shift(m *motion) {
	im.shifting = 0
	if !m.under {
		return
	}
	im.shifting = 1
	op := im.op
	for _, side := range staggered.Sides() {
		from, end, shift := &m.from[side], &m.end[side], im.shifts[side]
		if side.Horizontal() || m.walls.side(side).kind == prescribedFlux {
			for j := range shift {
				shift[j] = end.b[j] - from.b[j]
			}
		} else {
			for j := range shift {
				shift[j] = end.i0[j] - from.i0[j]
			}
		}
		if side.Horizontal() || op.ring {
			continue
		}
		column := 0
		if side == staggered.Right {
			column = op.nx - 1
		}
		im.sharpen(shift, column)
		if m.walls.side(side).kind != prescribedFlux {
			for j := range shift {
				shift[j] *= from.c1[j] - from.c2[j]
			}
		}
	}
}

// sharpen replaces values along a side by (1 − γ dt Az) times them. At the ends
// it takes what conduction along z does to the values next to them.
func (im *implicit) sharpen(v []float64, column int) {
	op, n := im.op, len(v)
	if n < 3 {
		return
	}
	loss := im.sides[0] // free until the solve
	for k := 1; k < n-1; k++ {
		s := op.alongZ(column, k)
		loss[k] = (s.south*v[k-1] + s.centre*v[k] + s.north*v[k+1]) / (op.dz[k] * op.cellCapacity(k*op.nx+column))
	}
	loss[0], loss[n-1] = loss[1], loss[n-2]
	for k, l := range loss {
		v[k] += im.factor * l
	}
}

// enterSides adds what moving sides conduct to the cells beside them.
func (im *implicit) enterSides(p linePart) {
	op := im.op
	n := op.nx
	f := im.shifting * im.factor
	for j := p.row0; j < p.row1; j++ {
		first, last := j*n, j*n+n-1
		im.k[first] += f * im.shifts[staggered.Left][j] * op.ix[0] / op.cellCapacity(first)
		im.k[last] += f * im.shifts[staggered.Right][j] * op.ix[n-1] / op.cellCapacity(last)
	}
}

// enterEnds adds what a moving bottom and top conduct.
func (im *implicit) enterEnds(p linePart) {
	op := im.op
	top := (op.nz - 1) * op.nx
	f := im.shifting * im.factor
	for j := p.col0; j < p.col1; j++ {
		im.k[j] += f * im.shifts[staggered.Bottom][j] * op.iz[0] / op.cellCapacity(j)
		im.k[top+j] += f * im.shifts[staggered.Top][j] * op.iz[op.nz-1] / op.cellCapacity(top+j)
	}
}
