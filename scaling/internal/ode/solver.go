package ode

import (
	"errors"
	"fmt"
	"math"
)

// System is y' = f(t, y) together with integrands whose integrals along the
// solution are wanted but do not act back on it.
type System interface {
	// Rates fills dst with the derivatives of the unknowns, then the integrands.
	Rates(dst, y []float64, t float64)
}

// Sentinel errors; the error that wraps them is a [*StepError].
var (
	// ErrCollapsed reports a step size below round-off: the solution runs away
	// in finite time, or the rates jump or are not finite.
	ErrCollapsed = errors.New("step size collapsed")
	// ErrTooManySteps reports that the allowed number of steps was used up.
	ErrTooManySteps = errors.New("too many steps")
)

// StepError says where an integration stopped short.
type StepError struct {
	Time, Step float64
	Err        error
}

// Error says what stopped the integration, and when.
func (e *StepError) Error() string {
	return fmt.Sprintf("%v at time %.6g (last step %.2g)", e.Err, e.Time, e.Step)
}

// Unwrap returns one of the sentinel errors.
func (e *StepError) Unwrap() error { return e.Err }

// Tolerance bounds the local error of each unknown by Relative·|y| + Absolute.
type Tolerance struct{ Relative, Absolute float64 }

// Solver integrates systems of one size. It owns its workspace, allocates
// nothing in a step but room on its [Path], and serves one goroutine at a time.
type Solver struct {
	MaxSteps int
	Tol      Tolerance
	Path     Path // of the integration so far

	n, m int // unknowns, integrands
	tab  *tableau
	sys  System

	t, end, h float64
	y, q      []float64 // state and integrals at t
	f         []float64 // rates at t: n derivatives, m integrands
	rejected  bool

	jac      []float64 // n×n
	lu       []float64 // stages·n square
	perm     []int
	filter   []float64 // n×n: 1 - h·dense·J
	filterP  []int
	z, dz    []float64 // stages·n: increments of the stages
	rates    []float64 // stages·(n+m)
	stage    []float64
	rate2    []float64
	work     []float64
	lastErr  float64
	lastStep float64

	// Counts of work since Start.
	Steps, Rejections, Evaluations int
}

// NewSolver returns a solver for systems of the given numbers of unknowns and
// integrands.
func NewSolver(unknowns, integrands int) *Solver {
	n, m := unknowns, integrands
	s := &Solver{n: n, m: m, tab: radau(), MaxSteps: 100000}
	s.y, s.q, s.f = make([]float64, n), make([]float64, m), make([]float64, n+m)
	s.jac, s.filter = make([]float64, n*n), make([]float64, n*n)
	s.lu = make([]float64, stages*n*stages*n)
	s.perm, s.filterP = make([]int, stages*n), make([]int, n)
	s.z, s.dz = make([]float64, stages*n), make([]float64, stages*n)
	s.rates = make([]float64, stages*(n+m))
	s.stage, s.rate2, s.work = make([]float64, n), make([]float64, n+m), make([]float64, n)
	return s
}

// Start begins an integration at t0 from y0 towards end, which may lie before
// t0. It forgets the path of an earlier one but keeps its memory.
func (s *Solver) Start(sys System, t0 float64, y0 []float64, end float64) {
	s.sys, s.t, s.end = sys, t0, end
	copy(s.y, y0)
	clear(s.q)
	s.Path.reset(s.tab, s.n, s.m, t0)
	s.Steps, s.Rejections, s.Evaluations = 0, 0, 0
	s.rejected, s.lastErr, s.lastStep = false, 0, 0
	s.evaluate(s.f, s.y, s.t)
	s.h = s.firstStep()
}

// firstStep lets no unknown change by more than a few per cent at its initial
// rate, but is at least a millionth of the span; the error control corrects it.
func (s *Solver) firstStep() float64 {
	span := s.end - s.t
	share := 0.05
	for i, y := range s.y {
		if limit := 0.03 * math.Abs(y/(s.f[i]*span)); limit < share {
			share = math.Max(limit, 1e-6)
		}
	}
	return share * span
}

// Time returns the end of the last step.
func (s *Solver) Time() float64 { return s.t }

// End returns the unknowns and the integrals at the end of the last step. The
// next step changes them.
func (s *Solver) End() (y, q []float64) { return s.y, s.q }

// Done reports whether the integration has arrived.
func (s *Solver) Done() bool { return s.t == s.end }

// Step advances by one accepted step and appends it to the path.
func (s *Solver) Step() error {
	if s.Steps >= s.MaxSteps {
		return &StepError{s.t, s.h, ErrTooManySteps}
	}
	s.jacobian()
	for {
		last := false
		if left := s.end - s.t; math.Abs(s.h) >= math.Abs(left)*(1-1e-12) {
			s.h, last = left, true
		} else if math.Abs(s.h) > math.Abs(left)/2 {
			s.h = left / 2 // no tiny last step
		}
		if t := s.t + s.h; t == s.t || math.Abs(s.h) < 1e-14*math.Abs(s.end-s.Path.times[0]) || math.IsNaN(s.h) {
			return &StepError{s.t, s.h, ErrCollapsed}
		}
		s.factor()
		if !s.newton() {
			s.reject(0.3)
			continue
		}
		err := s.denseError()
		if !(err <= 1) {
			s.reject(math.Max(0.1, 0.9*math.Pow(err, -1./DenseOrder)))
			continue
		}
		s.accept(err, last)
		return nil
	}
}

func (s *Solver) reject(factor float64) {
	if math.IsNaN(factor) {
		factor = 0.1
	}
	s.h *= factor
	s.rejected = true
	s.Rejections++
}

// accept moves to the end of the step and proposes the next step size: that
// which keeps the error, with the trend of the last two (Gustafsson 1994).
func (s *Solver) accept(err float64, last bool) {
	end := s.t + s.h
	if last {
		end = s.end
	}
	s.Path.append(s, end)
	tail := (stages - 1) * s.n
	for i := range s.y {
		s.y[i] += s.z[tail+i]
	}
	for k := range s.m {
		s.q[k] += s.h * s.quadrature(k)
	}
	s.t = end
	s.evaluate(s.f, s.y, s.t)
	s.Steps++

	err = math.Max(err, 1e-10)
	factor := 0.9 * math.Pow(err, -1./DenseOrder)
	if s.lastStep != 0 {
		trend := 0.9 * s.h / s.lastStep * math.Pow(s.lastErr/(err*err), 1./DenseOrder)
		factor = math.Min(factor, trend)
	}
	ceiling := 6.0
	if s.rejected {
		ceiling = 1
	}
	s.lastErr, s.lastStep = err, s.h
	s.h *= math.Min(ceiling, math.Max(0.2, factor))
	s.rejected = false
}

func (s *Solver) quadrature(k int) float64 {
	sum := 0.0
	for i := range stages {
		sum += s.tab.a[stages-1][i] * s.rates[i*(s.n+s.m)+s.n+k]
	}
	return sum
}

func (s *Solver) evaluate(dst, y []float64, t float64) {
	s.Evaluations++
	s.sys.Rates(dst, y, t)
}

// jacobian differences the rates at the start of a step.
func (s *Solver) jacobian() {
	n := s.n
	copy(s.stage, s.y)
	for j := range n {
		delta := 1e-8 * math.Max(math.Abs(s.y[j]), s.Tol.Absolute)
		if delta == 0 {
			delta = 1e-8
		}
		s.stage[j] = s.y[j] + delta
		delta = s.stage[j] - s.y[j]
		s.evaluate(s.rate2, s.stage, s.t)
		for i := range n {
			s.jac[i*n+j] = (s.rate2[i] - s.f[i]) / delta
		}
		s.stage[j] = s.y[j]
	}
}

// factor decomposes 1 - h A⊗J and the filter of the error estimate.
func (s *Solver) factor() {
	n, size := s.n, stages*s.n
	for i := range stages {
		for j := range stages {
			ha := s.h * s.tab.a[i][j]
			for k := range n {
				row := s.lu[(i*n+k)*size+j*n:][:n]
				for l := range row {
					row[l] = -ha * s.jac[k*n+l]
				}
				if i == j {
					row[k]++
				}
			}
		}
	}
	decompose(s.lu, s.perm, size)
	for k, v := range s.jac {
		s.filter[k] = -s.h * s.tab.dense * v
	}
	for k := range n {
		s.filter[k*n+k]++
	}
	decompose(s.filter, s.filterP, n)
}

const maxNewton = 10

// newton solves for the increments of the stages, z = h (A⊗1) f(y+z), and
// reports whether it converged. On success the rates belong to the final z up
// to the tolerance of the iteration.
func (s *Solver) newton() bool {
	s.guess()
	n, nm := s.n, s.n+s.m
	prev := math.Inf(1)
	for iter := range maxNewton {
		for i := range stages {
			for k := range n {
				s.stage[k] = s.y[k] + s.z[i*n+k]
			}
			s.evaluate(s.rates[i*nm:][:nm], s.stage, s.t+s.tab.c[i]*s.h)
		}
		for i := range stages {
			for k := range n {
				sum := 0.0
				for j := range stages {
					sum += s.tab.a[i][j] * s.rates[j*nm+k]
				}
				s.dz[i*n+k] = s.h*sum - s.z[i*n+k]
			}
		}
		substitute(s.lu, s.perm, s.dz, stages*n)
		size := 0.0      // of the correction, in tolerances
		rounding := true // whether it is the last digits only
		for i := range s.z {
			s.z[i] += s.dz[i]
			d := math.Abs(s.dz[i])
			size = math.Max(size, d/s.scale(i%n))
			rounding = rounding && d <= roundOff*math.Abs(s.y[i%n])
		}
		rate := size / prev
		switch {
		case math.IsNaN(size) || math.IsInf(size, 0):
			return false
		case size < newtonTolerance || rounding:
			return true
		case iter > 0 && rate < 1 && size*rate/(1-rate) < newtonTolerance:
			return true
		case iter > 1 && rate > 0.9:
			return false
		}
		prev = size
	}
	return false
}

// newtonTolerance is the error of the stages relative to the tolerance of a
// step; the rates that enter the integrals lag one iteration behind.
const (
	newtonTolerance = 1e-4
	roundOff        = 1e-14
)

func (s *Solver) scale(k int) float64 {
	return s.Tol.Relative*math.Abs(s.y[k]) + s.Tol.Absolute
}

// guess continues the polynomial of the last step.
func (s *Solver) guess() {
	if s.lastStep == 0 || s.rejected || s.h/s.lastStep > 4 {
		clear(s.z)
		return
	}
	for i := range stages {
		s.Path.extrapolate(s.work, 1+s.tab.c[i]*s.h/s.lastStep)
		for k := range s.n {
			s.z[i*s.n+k] = s.work[k] - s.y[k]
		}
	}
}

// denseError estimates the error of the polynomial within the step, relative to
// the tolerance: its defect u' - f at the start, of which all of the defect is a
// known multiple up to higher order, integrated. The filter keeps stiff
// components from being overrated (Hairer and Wanner 1996, eq. IV.8.20).
func (s *Solver) denseError() float64 {
	n := s.n
	for k := range n {
		sum := 0.0
		for i := range stages {
			sum += s.tab.start[i] * s.z[i*n+k]
		}
		s.work[k] = s.tab.dense * (sum - s.h*s.f[k])
	}
	substitute(s.filter, s.filterP, s.work, n)
	err := 0.0
	for k := range n {
		tail := s.y[k] + s.z[(stages-1)*n+k]
		scale := s.Tol.Relative*math.Max(math.Abs(s.y[k]), math.Abs(tail)) + s.Tol.Absolute
		e := math.Abs(s.work[k]) / scale
		if math.IsNaN(e) {
			return math.NaN()
		}
		err = math.Max(err, e)
	}
	return err
}
