package heat

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// A Report is the heat budget of a time step or of a steady state. All powers
// are means over the step, per length perpendicular to the plane; what enters
// the box counts as positive. Arrays are indexed by [staggered.Side].
type Report struct {
	Step      float64    // length of the time step, 0 of a steady state
	Conducted [4]float64 // power conducted through each wall
	Advected  [4]float64 // power carried by flow through each wall
	Heating   float64    // power of the source

	// Exchange is the power that fluid gains by moving into cells of another
	// heat capacity; zero where the capacity is uniform.
	Exchange float64

	Iterations int     // of a steady solve
	Residual   float64 // of a steady solve, see Settings.Tolerance
}

// Power returns the sum of all powers. Times Step it is the change of
// [Stepper.HeatContent], to rounding; of a steady state it vanishes.
func (r *Report) Power() float64 {
	p := r.Heating + r.Exchange
	for _, s := range staggered.Sides() {
		p += r.Conducted[s] + r.Advected[s]
	}
	return p
}

// String gives the budget in one line.
func (r Report) String() string {
	return fmt.Sprintf("step %.3g: conducted %.6g, advected %.6g (left, right, bottom, top), heating %.6g, exchange %.3g",
		r.Step, r.Conducted, r.Advected, r.Heating, r.Exchange)
}

// addWeighted adds w times the powers of another budget.
func (r *Report) addWeighted(w float64, o *Report) {
	for s := range r.Conducted {
		r.Conducted[s] += w * o.Conducted[s]
		r.Advected[s] += w * o.Advected[s]
	}
	r.Heating += w * o.Heating
	r.Exchange += w * o.Exchange
}
