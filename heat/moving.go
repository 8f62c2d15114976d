package heat

import (
	"errors"
	"fmt"
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
// order if the step is refined in proportion to the cells, and so is the
// temperature beside a side wall whose parts change at different speeds: take
// shorter steps or an explicit scheme there.
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
