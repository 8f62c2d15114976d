package laminate

import (
	"fmt"
	"math"
)

// RoundingTolerance is the largest estimate of the rounding error, relative to
// the largest velocity or stress on any face or in the middle of any layer,
// that [Solve] lets pass.
const RoundingTolerance = 1e-9

// A RoundingError says that contributions to velocity or stress cancel to so
// many digits that the rest cannot be trusted, or that numbers overflow.
type RoundingError struct {
	Estimate float64 // relative error; NaN after an overflow
}

func (e *RoundingError) Error() string {
	return fmt.Sprintf("rounding error is about %.1e of the largest velocity or stress, want at most %.0e",
		e.Estimate, RoundingTolerance)
}

// Solve finds the flow. The error is nil or a [*RoundingError].
func Solve(p Problem) (*Flow, error) {
	f, e := lay(p).solve(p)
	if !(e <= RoundingTolerance) {
		return nil, &RoundingError{e}
	}
	return f, nil
}

// solve finds the amplitudes of the homogeneous solutions, adds these to the
// flow and estimates the relative rounding error.
func (s *stack) solve(p Problem) (f *Flow, roundingError float64) {
	c := newConditions(p, s)
	amplitudes := c.matrix.solveRefined(c.rhs)
	for i, sp := range s.spans {
		for j := range sp.basis {
			s.flow.layers[i].fields.add(&sp.basis[j], amplitudes[sp.first+j])
		}
	}
	return s.flow, c.roundingError(amplitudes)
}

// A traction holds the components that are continuous across an interface.
type traction [4]float64

const (
	velocityAcross = iota
	velocityAlong
	stressAcross
	stressAlong
)

// components returns those that an end prescribes.
func (e End) components() [2]int {
	return [...][2]int{
		Slip:  {velocityAcross, stressAlong},
		Stick: {velocityAcross, velocityAlong},
		Open:  {stressAcross, stressAlong},
	}[e]
}

// A face holds velocities and tractions on a plane of a layer: those of the
// particular solution and those of each homogeneous solution.
type face struct {
	first int // number of the first amplitude
	given traction
	basis []traction
	unit  float64 // 2ηk: stress over the velocity that belongs to it
}

func newFace(l *layer, sp *span, k, s float64) *face {
	eta := l.viscosity(s)
	f := &face{first: sp.first, given: l.fields.at(s).traction(k, eta), unit: 2 * eta * k}
	for i := range sp.basis {
		f.basis = append(f.basis, sp.basis[i].at(s).traction(k, eta))
	}
	return f
}

// conditions are those at walls and interfaces, linear in the amplitudes of
// the homogeneous solutions.
type conditions struct {
	matrix *band
	rhs    []float64
	row    int
	planes []*face // all faces and middles of layers
}

func newConditions(p Problem, s *stack) *conditions {
	c := &conditions{matrix: newBand(s.size), rhs: make([]float64, s.size)}
	var below *face
	for i := range s.spans {
		l, sp := &s.flow.layers[i], &s.spans[i]
		low, high := newFace(l, sp, p.K, l.low), newFace(l, sp, p.K, l.high)
		c.planes = append(c.planes, low, high, newFace(l, sp, p.K, 0.5*(l.low+l.high)))
		if i > 0 {
			sheet := s.spans[i-1].sheet
			for component := range sheet {
				c.add(below, low, component, sheet[component])
			}
		} else if len(sp.basis) == 4 { // else it is infinite
			for _, component := range p.Low.components() {
				c.add(nil, low, component, 0)
			}
		}
		below = high
	}
	if c.row < s.size { // else the highest is infinite
		sheet := s.spans[len(s.spans)-1].sheet
		for _, component := range p.High.components() {
			c.add(below, nil, component, sheet[component])
		}
	}
	return c
}

// add appends the condition that a component above an interface, less that
// below, plus the load on the interface, be zero. A nil face contributes
// nothing.
func (c *conditions) add(below, above *face, component int, load float64) {
	c.rhs[c.row] = -load
	if below != nil {
		c.rhs[c.row] += below.given[component]
		for i, t := range below.basis {
			c.matrix.set(c.row, below.first+i, -t[component])
		}
	}
	if above != nil {
		c.rhs[c.row] -= above.given[component]
		for i, t := range above.basis {
			c.matrix.set(c.row, above.first+i, t[component])
		}
	}
	c.row++
}

// roundingError estimates the relative error of velocities or stresses,
// whichever is larger, from the uncertainty of the amplitudes and the rounding
// of the sums.
func (c *conditions) roundingError(amplitudes []float64) float64 {
	uncertainty := c.matrix.uncertainty(amplitudes)
	var velocity, stress, velocityError, stressError float64
	for _, f := range c.planes {
		value, wrong := f.given, traction{}
		for component := range value {
			rounding, change := math.Abs(value[component]), 0.0
			for i, t := range f.basis {
				v := amplitudes[f.first+i] * t[component]
				value[component] += v
				rounding += math.Abs(v)
				change += uncertainty[f.first+i] * t[component]
			}
			wrong[component] = epsilon*rounding + math.Abs(change)
		}
		velocity = max(velocity, math.Abs(value[velocityAcross]), math.Abs(value[velocityAlong]))
		velocityError = max(velocityError, wrong[velocityAcross], wrong[velocityAlong])
		stress = max(stress, math.Abs(value[stressAcross]), math.Abs(value[stressAlong]), f.unit*math.Abs(value[velocityAlong]))
		stressError = max(stressError, wrong[stressAcross], wrong[stressAlong])
	}
	if velocityError == 0 && stressError == 0 {
		return 0 // at rest
	}
	return max(velocityError/velocity, stressError/stress)
}
