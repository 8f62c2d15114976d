package history

import (
	"errors"
	"fmt"
	"math"
	"sync"

	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/scaling/internal/ode"
	"example.org/overturn/units"
)

// FieldError reports a field, or an argument, whose value makes no sense; its
// fields Package, Field, Value and Want say which and what is allowed.
type FieldError = check.FieldError

// pkg names this package in the errors of its checks.
const pkg = check.In("history")

// Errors that a caller can act on. The error that wraps them says when.
var (
	// ErrRunaway reports that a temperature runs away in finite time, falls to
	// zero, or that a flux is not a finite number. Backward runs of bodies with
	// little heating usually end so. What was integrated until then comes with
	// the error.
	ErrRunaway = errors.New("temperatures run away")

	// ErrTooManySteps reports that Settings.MaxSteps was used up. Usual causes:
	// a loss that jumps with temperature, or a tolerance near round-off.
	ErrTooManySteps = errors.New("too many steps")
)

// Reservoir is a well-mixed part of a body.
type Reservoir struct {
	Name         string
	Mass         units.Mass
	SpecificHeat units.SpecificHeat
	Heating      Heating // per mass; nil for none

	Area units.Area // of its top
	Loss Loss       // heat flux through the top

	Start units.Temperature // at the start of a run
}

// Body is a pile of reservoirs.
type Body struct {
	Reservoirs []Reservoir // from the deepest up
	Surface    units.Temperature
}

// Check returns an error that names the first field without sense.
func (b Body) Check() error {
	if len(b.Reservoirs) == 0 {
		return &FieldError{Package: string(pkg), Field: "Body.Reservoirs", Value: "empty", Want: "at least one"}
	}
	if err := check.Positive(pkg, "Body.Surface", b.Surface); err != nil {
		return err
	}
	for i, r := range b.Reservoirs {
		where := fmt.Sprintf("Reservoirs[%d].", i)
		err := check.First(
			check.Positive(pkg, where+"Mass", r.Mass),
			check.Positive(pkg, where+"SpecificHeat", r.SpecificHeat),
			check.Positive(pkg, where+"Area", r.Area),
			check.Positive(pkg, where+"Start", r.Start),
		)
		if err != nil {
			return err
		}
		if r.Loss == nil {
			return &FieldError{Package: string(pkg), Field: where + "Loss", Value: "nil", Want: "a Loss"}
		}
		if err := r.Loss.Check(); err != nil {
			return fmt.Errorf("history: %sLoss: %w", where, err)
		}
	}
	for i, r := range b.Reservoirs {
		q := r.Loss.Flux(r.Start, b.above(i))
		if err := check.Finite(pkg, fmt.Sprintf("Reservoirs[%d].Loss: flux at Start", i), q); err != nil {
			return err
		}
	}
	return nil
}

// above returns what lies above a reservoir at the start.
func (b Body) above(i int) units.Temperature {
	if i+1 < len(b.Reservoirs) {
		return b.Reservoirs[i+1].Start
	}
	return b.Surface
}

// Defaults of [Settings].
const (
	DefaultTolerance = 1e-9
	DefaultMaxSteps  = 20000
)

// Settings tunes a [Model]. A nil *Settings, or a zero field, means the default.
type Settings struct {
	// Tolerance is the relative error of a temperature that a step may add,
	// anywhere on the dense output; the ends of steps are far more accurate.
	// Default [DefaultTolerance].
	Tolerance float64

	// MaxSteps bounds the steps of a run. Default [DefaultMaxSteps].
	MaxSteps int

	// Events to look for, in any order.
	Events []Event
}

// Model is a body that is ready to run. It is not changed by running and is safe
// for concurrent use if its losses and heatings are, as those of this package.
type Model struct {
	body     Body
	settings Settings
	capacity []float64 // M c
	solvers  *sync.Pool
}

// pools keeps one pool of workspaces for each number of reservoirs, so that
// models that live for one run, as those of a Monte Carlo study, share them.
var pools sync.Map

// New checks a body and returns its model.
func New(b Body, settings *Settings) (*Model, error) {
	if err := b.Check(); err != nil {
		return nil, err
	}
	m := &Model{body: b}
	if settings != nil {
		m.settings = *settings
	}
	m.body.Reservoirs = append([]Reservoir(nil), b.Reservoirs...)
	s := &m.settings
	if s.Tolerance == 0 {
		s.Tolerance = DefaultTolerance
	}
	if s.MaxSteps == 0 {
		s.MaxSteps = DefaultMaxSteps
	}
	if err := check.Within(pkg, "Settings.Tolerance", s.Tolerance, 1e-14, 0.1); err != nil {
		return nil, err
	}
	if s.MaxSteps < 0 {
		return nil, &FieldError{Package: string(pkg), Field: "Settings.MaxSteps", Value: fmt.Sprint(s.MaxSteps), Want: "> 0"}
	}
	for i, e := range s.Events {
		if e.Value == nil {
			return nil, &FieldError{Package: string(pkg), Field: fmt.Sprintf("Settings.Events[%d].Value", i), Value: "nil", Want: "a function"}
		}
	}
	n := len(b.Reservoirs)
	for _, r := range b.Reservoirs {
		m.capacity = append(m.capacity, float64(r.Mass)*float64(r.SpecificHeat))
	}
	pool, _ := pools.LoadOrStore(n, &sync.Pool{New: func() any { return ode.NewSolver(n, n) }})
	m.solvers = pool.(*sync.Pool)
	return m, nil
}

// Body returns the body of the model.
func (m *Model) Body() Body {
	b := m.body
	b.Reservoirs = append([]Reservoir(nil), b.Reservoirs...)
	return b
}

// Rates implements the system to integrate: the rates of the temperatures, then
// the heat flows through the tops, whose integrals the budget needs.
func (m *Model) Rates(dst, y []float64, t float64) {
	n := len(y)
	below := 0.0
	for i := range m.body.Reservoirs {
		r := &m.body.Reservoirs[i]
		above := float64(m.body.Surface)
		if i+1 < n {
			above = y[i+1]
		}
		if !(y[i] > 0) {
			dst[i] = math.NaN() // no temperature: let the step be cut
			return
		}
		flow := float64(r.Area) * float64(r.Loss.Flux(units.Temperature(y[i]), units.Temperature(above)))
		made := 0.0
		if r.Heating != nil {
			made = float64(r.Mass) * float64(r.Heating.At(units.Time(t)))
		}
		dst[i] = (made + below - flow) / m.capacity[i]
		dst[n+i] = flow
		below = flow
	}
}

// Run integrates from one time to another, backward if to is the earlier, with
// the reservoirs at their Start temperatures at from.
//
// On an error that wraps [ErrRunaway] or [ErrTooManySteps], the history until
// then is returned with it, if there is any.
func (m *Model) Run(from, to units.Time) (*History, error) {
	if err := check.First(check.Finite(pkg, "from", from), check.Finite(pkg, "to", to)); err != nil {
		return nil, err
	}
	if from == to {
		return nil, &FieldError{Package: string(pkg), Field: "to", Value: fmt.Sprint(to), Want: "a time other than from"}
	}
	s := m.solvers.Get().(*ode.Solver)
	defer m.solvers.Put(s)
	s.MaxSteps = m.settings.MaxSteps
	s.Tol = ode.Tolerance{Relative: m.settings.Tolerance}
	start := make([]float64, len(m.capacity))
	for i, r := range m.body.Reservoirs {
		start[i] = float64(r.Start)
	}
	s.Start(m, float64(from), start, float64(to))
	h := &History{model: m, from: from, to: from}
	w := newWatch(h, &s.Path)
	var failure error
	for !s.Done() {
		if err := s.Step(); err != nil {
			failure = explain(err)
			break
		}
		h.to = units.Time(s.Time())
		if stop := w.step(); stop {
			break
		}
	}
	h.Steps, h.Evaluations = s.Steps, s.Evaluations
	if s.Steps == 0 {
		return nil, failure
	}
	h.path = s.Path.Clone()
	return h, failure
}

// explain turns an error of the integrator into one of this package.
func explain(err error) error {
	cause := ErrRunaway
	if errors.Is(err, ode.ErrTooManySteps) {
		cause = ErrTooManySteps
	}
	var stop *ode.StepError
	if errors.As(err, &stop) {
		return fmt.Errorf("history: %w at %.6g Myr", cause, units.Time(stop.Time).In(units.Megayear))
	}
	return fmt.Errorf("history: %w: %w", cause, err)
}
