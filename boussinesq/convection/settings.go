package convection

import (
	"fmt"
	"math"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
)

// Defaults of [Settings].
const (
	DefaultCourant   = 0.5
	DefaultFlowError = 0.01
	DefaultEvery     = 1
)

// Settings tunes a [Model]. A nil *Settings, or a zero field, means the
// default.
type Settings struct {
	// Courant is the time step as a fraction of the longest stable one of the
	// heat stepper. Default 0.5.
	Courant float64

	// FlowError is the relative difference, root mean square, that the next
	// time step aims at between the flow extrapolated from the last two and the
	// flow solved for: it keeps steps short while convection sets in. Default
	// 0.01.
	FlowError float64

	// MaxStep is the longest time step. Default none.
	MaxStep float64

	// EndTime is when [Model.Steps] stops, exactly. Default never.
	EndTime float64

	// MaxSteps is how many steps Model.Steps takes at most. Default no bound.
	MaxSteps int

	// SteadyTolerance stops Model.Steps when [Sample.Change] has fallen to it.
	// Default never.
	SteadyTolerance float64

	// Every is the number of steps from one sample to the next. Default 1.
	Every int

	// Stokes and Heat tune the kernels. Nil means their defaults.
	Stokes *stokes.Settings
	Heat   *heat.Settings
}

func (s *Settings) withDefaults() (Settings, error) {
	var c Settings
	if s != nil {
		c = *s
	}
	if c.Courant == 0 {
		c.Courant = DefaultCourant
	}
	if c.FlowError == 0 {
		c.FlowError = DefaultFlowError
	}
	if c.Every == 0 {
		c.Every = DefaultEvery
	}
	if c.MaxStep == 0 {
		c.MaxStep = math.Inf(1)
	}
	if c.EndTime == 0 {
		c.EndTime = math.Inf(1)
	}
	for _, f := range []struct {
		name  string
		value float64
		valid bool
		want  string
	}{
		{"Courant", c.Courant, c.Courant > 0 && c.Courant <= 1, "between 0 and 1"},
		{"FlowError", c.FlowError, c.FlowError > 0, "> 0"},
		{"MaxStep", c.MaxStep, c.MaxStep > 0, "> 0"},
		{"EndTime", c.EndTime, c.EndTime > 0, "> 0"},
		{"MaxSteps", float64(c.MaxSteps), c.MaxSteps >= 0, ">= 0"},
		{"SteadyTolerance", c.SteadyTolerance, c.SteadyTolerance >= 0, ">= 0"},
		{"Every", float64(c.Every), c.Every > 0, "> 0"},
	} {
		if !f.valid {
			return c, fmt.Errorf("convection: Settings.%s is %v, want %s", f.name, f.value, f.want)
		}
	}
	return c, nil
}
