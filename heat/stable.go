package heat

import (
	"math"

	"example.org/overturn/stokes/staggered"
)

// Extents of the regions of absolute stability, from below, of the third-order
// Runge-Kutta methods: the half-ellipse with these half-axes to the left of the
// origin is inside.
const (
	realExtent      = 2.5
	imaginaryExtent = 1.73
)

// StableStep returns the longest time step that is stable under the flow, nil
// at rest; +Inf if there is no limit, 0 for a flow of the wrong size or with a
// number that is not finite.
//
// Under Bounded advection and an explicit scheme it is the step up to which no
// new extremum can appear. Under Central it is the bound of linear stability of
// constant coefficients, with the largest velocity and diffusivity of the box.
func (st *Stepper) StableStep(flow *staggered.Flow) float64 {
	if checkFlow(st.op.g, flow) != nil {
		return 0
	}
	return st.stableStep(flow)
}

func (st *Stepper) stableStep(flow *staggered.Flow) float64 {
	if flow == nil {
		return st.stepFor(0, 0)
	}
	return st.stepFor(st.op.courantRate(flow.VX, flow.VZ))
}

// stepFor returns the stable step for the largest Courant rate and squared
// speed.
func (st *Stepper) stepFor(rate, speed2 float64) float64 {
	op := st.op
	if !(rate <= math.MaxFloat64) {
		return 0
	}
	implicit := st.set.Scheme == Implicit
	switch {
	case st.set.Advection == Bounded && implicit:
		return 1 / (2 * rate)
	case st.set.Advection == Bounded:
		return 1 / (2*rate + op.decay)
	case st.set.Scheme == RungeKutta3:
		return 1 / math.Hypot(rate/imaginaryExtent, op.stiffness/realExtent)
	case implicit:
		return secondOrderStep(rate, speed2/op.softest, 0)
	}
	return secondOrderStep(rate, speed2/op.softest, op.stiffness)
}

// secondOrderStep bounds the step of a two-stage method of second order with
// central differences. Its amplification of the eigenvalue −a + ib is at most 1
// if b⁴/4 ≤ a(1−a/2)(b²+3/2). Waves have b ≤ c = rate·dt and
// b² ≤ a·dt·v²/κ, so that c²·dt·v²/κ ≤ 6(1−a/2) with a ≤ stiffness·dt is enough.
func secondOrderStep(rate, speed2PerKappa, stiffness float64) float64 {
	if rate == 0 {
		return 2 / stiffness
	}
	if math.IsInf(speed2PerKappa, 1) {
		return 0
	}
	// The positive root of cubic·dt³ + 3·stiffness·dt = 6, by Newton's
	// method from above.
	cubic := rate * rate * speed2PerKappa
	dt := math.Cbrt(6 / cubic)
	for range 60 {
		next := dt - (cubic*dt*dt*dt+3*stiffness*dt-6)/(3*cubic*dt*dt+3*stiffness)
		if next >= dt {
			break
		}
		dt = next
	}
	return math.Min(dt, 1/rate)
}

// courantRate returns the largest rate at which flow passes through a cell, the
// sum over directions of |v|/Δ, and the largest squared speed; NaN or +Inf if a
// velocity is. Nil velocities are zero.
func (op *operator) courantRate(vx, vz []float64) (rate, speed2 float64) {
	if vx == nil {
		return 0, 0
	}
	nx := op.nx
	sum := 0.0
	for k := range op.nz {
		row := vx[k*(nx+1) : (k+1)*(nx+1)]
		lower, upper := vz[k*nx:(k+1)*nx], vz[(k+1)*nx:(k+2)*nx]
		half, ix := op.iz[k]/2, op.ix[:nx]
		left := math.Abs(row[0])
		for i, v := range row[1:] {
			right, up := math.Abs(v), math.Abs(lower[i])+math.Abs(upper[i])
			across := left + right
			r := across*ix[i]/2 + up*half
			sum += r
			if r > rate {
				rate = r
			}
			if s := (across*across + up*up) / 4; s > speed2 {
				speed2 = s
			}
			left = right
		}
	}
	return rate + 0*sum, speed2
}

// courantBound bounds the numbers of courantRate by the peaks of the rows,
// which a pass has seen.
func (s *sweep) courantBound() (rate, speed2 float64) {
	if s.vx == nil {
		return 0, 0
	}
	for k, iz := range s.op.iz {
		u, v := s.peaks[0][k], math.Max(s.peaks[1][k], s.peaks[1][k+1])
		rate = math.Max(rate, u*s.op.steepest+v*iz)
		speed2 = math.Max(speed2, u*u+v*v)
	}
	return rate, speed2
}
