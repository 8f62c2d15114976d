package heattest

import (
	"fmt"
	"math"

	"example.org/overturn/heat/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// A trialRun is a problem with its answer.
type trialRun struct {
	view
	Problem
	answer Answer

	temperatures trial.Samples
	flux         [4]trial.Samples // those not given are empty
}

// sample reads the fields of the answer.
func (r *trialRun) sample() (err error) {
	if r.temperatures, err = r.answer.Temperature.Sample(r.Grid); err != nil {
		return fmt.Errorf("Answer.Temperature: %w", err)
	}
	for side := exact.Left; side <= exact.Top; side++ {
		f := r.answer.Flux[side]
		if f.IsMissing() || r.kinds()[side] == exact.Periodic {
			continue
		}
		if r.flux[side], err = f.SampleWall(r.wallLength(side)); err != nil {
			return fmt.Errorf("Answer.Flux[%v]: %w", side, err)
		}
	}
	return nil
}

func (r *trialRun) wallLength(side exact.Side) float64 {
	width, height := r.Grid.Size()
	if side == exact.Bottom || side == exact.Top {
		return width
	}
	return height
}

// temperatureError returns the root mean square error relative to the size of
// the temperature.
func (r *trialRun) temperatureError() float64 {
	e := r.temperatures.Minus(func(x, z float64) float64 { return r.state(x, z, r.Duration).Temperature })
	return e.RMS() / r.sizes().temperature
}

// fluxError returns the root mean square error over the walls whose flux is
// given, relative to the size of the flux in the box. It reports false if there
// is no such wall.
func (r *trialRun) fluxError() (float64, bool) {
	sum, length := 0.0, 0.0
	for side, s := range r.flux {
		if len(s.Value) == 0 {
			continue
		}
		l := r.wallLength(exact.Side(side))
		e := s.Minus(func(s, _ float64) float64 { return r.inflow(exact.Side(side), s, r.Duration) }).RMS()
		sum += l * e * e
		length += l
	}
	if length == 0 {
		return 0, false
	}
	return math.Sqrt(sum/length) / r.sizes().flux, true
}

// sizes are the root mean squares of the exact temperature, less what makes it
// warmer, and of the exact flux, over the middles of the cells, each the
// larger of those at start and end; and the mean of C|T| at the end.
type sizes struct{ temperature, flux, heat float64 }

func (r *trialRun) sizes() sizes {
	mean := func(f func(x, z float64) float64) float64 {
		s, err := trial.Function(f).Sample(r.Grid)
		if err != nil { // exact solutions are finite in the middles of cells
			return math.NaN()
		}
		return s.Mean()
	}
	var size sizes
	for _, t := range []float64{0, r.Duration} {
		square := mean(func(x, z float64) float64 {
			v := r.state(x, z, t).Temperature - r.warmer
			return v * v
		})
		flux := mean(func(x, z float64) float64 {
			f := r.state(x, z, t)
			return f.FluxX*f.FluxX + f.FluxZ*f.FluxZ
		})
		size.temperature = max(size.temperature, math.Sqrt(square))
		size.flux = max(size.flux, math.Sqrt(flux))
	}
	size.heat = mean(func(x, z float64) float64 {
		return r.HeatCapacity(x, z) * math.Abs(r.state(x, z, r.Duration).Temperature)
	})
	return size
}
