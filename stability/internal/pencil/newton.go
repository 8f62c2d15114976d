package pencil

import (
	"errors"
	"math"
)

// ErrDiverged reports that Newton's method did not settle on a solution.
var ErrDiverged = errors.New("pencil: Newton's method diverged")

// A Kind says which numbers are unknown at a given wavenumber.
type Kind int

const (
	// Marginal solves for a driving number at a given real σ.
	Marginal Kind = iota
	// MarginalOscillation solves for a driving number and a frequency at a
	// given growth rate.
	MarginalOscillation
	// Growth solves for a real σ.
	Growth
	// GrowingOscillation solves for a complex σ.
	GrowingOscillation
)

// Oscillating reports whether solutions of the kind are complex.
func (k Kind) Oscillating() bool { return k == MarginalOscillation || k == GrowingOscillation }

// A Curve is a family of solutions over the wavenumber: a kind of solution and
// the index of the driving number that is unknown or of interest.
type Curve struct {
	Kind  Kind
	Drive int
}

// A Solution is a point of a curve. The objective is its first unknown: the
// driving number or the growth rate.
type Solution struct {
	Point
	Slope     float64 // of the objective in k
	Curvature float64 // second derivative of the objective in k

	// Sensitivity is the derivative of σ with respect to the driving number
	// at fixed k.
	Sensitivity complex128

	// Residual is the last relative step of Newton's method.
	Residual float64
}

// Objective returns the first unknown of the solution.
func (c Curve) Objective(pt *Point) float64 {
	if c.Kind == Marginal || c.Kind == MarginalOscillation {
		return pt.Drive[c.Drive]
	}
	return real(pt.Sigma)
}

// An unknown is the real variable whose change by 1 changes g by factor times
// the derivative of g in a direction.
type unknown struct {
	along  Direction
	factor complex128
}

var unknowns = [...][]unknown{
	Marginal:            {{AlongDrive, 1}},
	MarginalOscillation: {{AlongDrive, 1}, {AlongSigma, 1i}},
	Growth:              {{AlongSigma, 1}},
	GrowingOscillation:  {{AlongSigma, 1}, {AlongSigma, 1i}},
}

// move changes the unknowns of a point and returns the largest relative change.
func (c Curve) move(pt *Point, d [2]float64) float64 {
	switch c.Kind {
	case Marginal:
		pt.Drive[c.Drive] += d[0]
		return math.Abs(d[0] / pt.Drive[c.Drive])
	case MarginalOscillation:
		pt.Drive[c.Drive] += d[0]
		pt.Sigma += complex(0, d[1])
		return math.Abs(d[0]/pt.Drive[c.Drive]) + math.Abs(d[1]/imag(pt.Sigma))
	case Growth:
		pt.Sigma += complex(d[0], 0)
		return math.Abs(d[0]) / (math.Abs(real(pt.Sigma)) + pt.K*pt.K)
	default:
		pt.Sigma += complex(d[0], d[1])
		return math.Hypot(d[0], d[1]) / math.Hypot(real(pt.Sigma), imag(pt.Sigma))
	}
}

// linear solves F_u du = -f for the derivatives of the real equations Re g = 0
// (and Im g = 0) in the unknowns.
func (c Curve) linear(j *Jet, f complex128) (du [2]float64) {
	u := unknowns[c.Kind]
	a := j.First[u[0].along] * u[0].factor
	if len(u) == 1 {
		return [2]float64{-real(f) / real(a), 0}
	}
	b := j.First[u[1].along] * u[1].factor
	det := real(a)*imag(b) - imag(a)*real(b)
	return [2]float64{
		-(real(f)*imag(b) - imag(f)*real(b)) / det,
		-(real(a)*imag(f) - imag(a)*real(f)) / det,
	}
}

// slope returns the derivatives of the unknowns in k, and curvature the second.
func (c Curve) slope(j *Jet) [2]float64 { return c.linear(j, j.First[AlongK]) }

func (c Curve) curvature(j *Jet, slope [2]float64) [2]float64 {
	f := j.Second[AlongK][AlongK]
	us := unknowns[c.Kind]
	for i, u := range us {
		v := u.factor * complex(slope[i], 0)
		f += 2 * j.Second[AlongK][u.along] * v
		for l, u2 := range us {
			f += j.Second[u.along][u2.along] * v * u2.factor * complex(slope[l], 0)
		}
	}
	return c.linear(j, f)
}

// drift returns the change of the slope that a change d of the unknowns makes
// at fixed k.
func (c Curve) drift(j *Jet, slope, d [2]float64) [2]float64 {
	f := complex(0, 0)
	us := unknowns[c.Kind]
	for i, u := range us {
		v := u.factor * complex(d[i], 0)
		f += j.Second[AlongK][u.along] * v
		for l, u2 := range us {
			f += j.Second[u.along][u2.along] * v * u2.factor * complex(slope[l], 0)
		}
	}
	return c.linear(j, f)
}

const (
	maxNewton = 30
	// A relative step below settled leaves an error of about its square. One
	// more step makes that round-off, in the solution vector too.
	settled = 1e-7
)

// Solve follows a curve to a solution at the wavenumber of a nearby point.
func (w *Workspace) Solve(c Curve, pt Point) (Solution, error) {
	w.prepare(c.Kind.Oscillating())
	w.startBorder()
	s, last := Solution{Point: pt}, math.Inf(1)
	for i := range maxNewton {
		j := w.jet(&s.Point, c.Drive, false)
		if i > 0 { // at first the border is arbitrary, and with it the scale of g
			s.Residual = c.move(&s.Point, c.linear(j, j.G))
			if !(s.Residual < math.MaxFloat64) {
				break
			}
			if last < settled {
				c.finish(&s, j)
				return s, nil
			}
			last = s.Residual
		}
		w.adoptBorder()
	}
	return s, ErrDiverged
}

// Bend completes the solution that Solve has just returned with its curvature.
func (w *Workspace) Bend(c Curve, s *Solution) {
	j := &w.derivative
	w.curvature(&s.Point, c.Drive, j)
	s.Curvature = c.curvature(j, c.slope(j))[0]
}

// finish fills in what follows from the last jet.
func (c Curve) finish(s *Solution, j *Jet) {
	s.Slope = c.slope(j)[0]
	s.Sensitivity = -j.First[AlongDrive] / j.First[AlongSigma]
}

// Extremum follows a curve from a nearby point to the wavenumber between lo and
// hi at which the objective has zero slope.
func (w *Workspace) Extremum(c Curve, pt Point, lo, hi float64) (Solution, error) {
	w.prepare(c.Kind.Oscillating())
	w.startBorder()
	s, last := Solution{Point: pt}, math.Inf(1)
	for i := range maxNewton {
		j := w.jet(&s.Point, c.Drive, i > 0)
		if i > 0 {
			curvature, ok := c.stepToExtremum(&s, j, lo, hi)
			if !ok {
				break
			}
			if last < settled {
				c.finish(&s, j)
				s.Slope, s.Curvature = 0, curvature
				return s, nil
			}
			last = s.Residual
		}
		w.adoptBorder()
	}
	return s, ErrDiverged
}

// stepToExtremum is one step of Newton's method for g = 0 and a zero slope. It
// is refused if it leads out of the interval.
func (c Curve) stepToExtremum(s *Solution, j *Jet, lo, hi float64) (curvature float64, ok bool) {
	d, u1 := c.linear(j, j.G), c.slope(j)
	u2 := c.curvature(j, u1)
	dk := -(u1[0] + c.drift(j, u1, d)[0]) / u2[0]
	if !(s.K+dk > lo && s.K+dk < hi) {
		return 0, false
	}
	for a := range d {
		d[a] += dk * (u1[a] + dk*u2[a]/2)
	}
	s.K += dk
	s.Residual = c.move(&s.Point, d) + math.Abs(dk/s.K)
	return u2[0], s.Residual < math.MaxFloat64
}
