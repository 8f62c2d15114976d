package convection

import (
	"context"
	"math"

	"example.org/overturn/stokes/staggered"
)

// A Model is a run of a [Problem] in time. It serves one goroutine at a time;
// models share nothing.
type Model struct {
	settings Settings
	sys      *system
	sampler  *sampler

	temperature *staggered.Scalar
	flow        *staggered.Flow // of temperature, if solved
	previous    *staggered.Flow // of the step before, if hasPrevious
	middle      *staggered.Flow // scratch: at the middle, then at the end of a step
	old         *staggered.Scalar

	time        float64
	steps       int
	last        float64 // length of the step from previous to flow
	limit       float64 // longest next step by Settings.FlowError
	change      float64
	budget      float64
	iterations  int
	solved      bool // flow belongs to temperature
	hasPrevious bool
}

// New returns a model at time zero, in the initial state of the problem. It
// fails on input that makes no sense and where the problem has no conducting
// state to start from.
func New(p Problem, s *Settings) (*Model, error) {
	m, err := newModel(p, s)
	if err != nil {
		return nil, err
	}
	m.temperature, err = m.sys.start(context.Background())
	return m, err
}

func newModel(p Problem, s *Settings) (*Model, error) {
	settings, err := s.withDefaults()
	if err != nil {
		return nil, err
	}
	sys, err := newSystem(p, settings)
	if err != nil {
		return nil, err
	}
	g := sys.Grid
	return &Model{
		settings:    settings,
		sys:         sys,
		sampler:     newSampler(sys),
		temperature: staggered.NewScalar(g),
		flow:        staggered.NewFlow(g),
		previous:    staggered.NewFlow(g),
		middle:      staggered.NewFlow(g),
		old:         staggered.NewScalar(g),
		limit:       math.Inf(1),
	}, nil
}

// Time returns the time reached.
func (m *Model) Time() float64 { return m.time }

// StepsTaken returns the number of time steps since time zero.
func (m *Model) StepsTaken() int { return m.steps }

// Temperature returns the temperature, which the model goes on using: change
// it through SetTemperature or Perturb.
func (m *Model) Temperature() *staggered.Scalar { return m.temperature }

// Flow returns velocity and pressure, which the model goes on using. They
// belong to Temperature once a sample of [Model.Steps] has been seen.
func (m *Model) Flow() *staggered.Flow { return m.flow }

// Viscosity returns the viscosity that the law gives for the present
// temperature, in memory of its own.
func (m *Model) Viscosity() *staggered.Scalar {
	eta := uniform(m.sys.Grid, 1)
	if m.sys.Viscosity != nil {
		m.sys.viscosityTo(eta, m.temperature)
	}
	return eta
}

// SetTemperature copies t, on the grid of the problem or on another one of the
// same box, from which it interpolates. The time stays; the next step starts
// afresh, without use of earlier flows.
func (m *Model) SetTemperature(t *staggered.Scalar) error {
	if err := m.sys.checkGiven("temperature", t); err != nil {
		return err
	}
	transfer(m.temperature, t)
	m.restart()
	return nil
}

// Perturb adds a mode to the temperature.
func (m *Model) Perturb(d Mode) error {
	d, err := d.resolve(&m.sys.Problem, m.temperature)
	if err != nil {
		return err
	}
	copy(m.old.Values, m.temperature.Values)
	d.addTo(m.temperature)
	if err := checkTemperature(m.temperature); err != nil {
		copy(m.temperature.Values, m.old.Values)
		return err
	}
	m.restart()
	return nil
}

// restart forgets what belongs to an earlier temperature.
func (m *Model) restart() {
	m.solved, m.hasPrevious = false, false
	m.limit = math.Inf(1)
}

// transfer copies a field, or interpolates it where the grids differ.
func transfer(dst, src *staggered.Scalar) {
	if dst.Grid.Equal(src.Grid) {
		copy(dst.Values, src.Values)
		return
	}
	x0, z0 := src.Grid.XNodes()[0]-dst.Grid.XNodes()[0], src.Grid.ZNodes()[0]-dst.Grid.ZNodes()[0]
	dst.Fill(func(x, z float64) float64 { return src.ValueAt(x+x0, z+z0) })
}
