package stability

import (
	"errors"
	"math"
)

// A Growth is a disturbance that grows, or decays, exponentially: everything
// in it is multiplied by exp(Rate t) while it oscillates with the Frequency.
type Growth struct {
	// Rate is in κ/d², negative for decay.
	Rate float64

	// Frequency is the angular frequency in κ/d², zero for no oscillation.
	Frequency float64

	// Wavenumber is in radians per depth, Wavelength in depths.
	Wavenumber, Wavelength float64

	// Error estimates the errors, see [Onset].
	Error GrowthError

	// Mode is the shape of the disturbance.
	Mode *Mode
}

// GrowthError holds estimates of absolute errors.
type GrowthError struct {
	Rate, Frequency, Wavenumber float64
}

// Time returns the time, in d²/κ, in which the disturbance grows by a factor:
// ln(factor)/Rate. It is negative, a time in the past, for what decays.
func (g Growth) Time(factor float64) float64 { return math.Log(factor) / g.Rate }

func newGrowth(a *answer) Growth {
	return Growth{
		Rate: real(a.Sigma), Frequency: math.Abs(imag(a.Sigma)), Wavenumber: a.K, Wavelength: 2 * math.Pi / a.K,
		Error: GrowthError{a.valueError, a.omegaError, a.kError},
		Mode:  newMode(a),
	}
}

// Growth returns the fastest-growing disturbance of wavenumber k > 0 at a
// Rayleigh number, which may be negative: a layer heated from above.
func (l Layer) Growth(rayleigh, k float64) (Growth, error) {
	s, err := NewSolver(l, nil)
	if err != nil {
		return Growth{}, err
	}
	return s.Growth(rayleigh, k)
}

// Fastest returns the disturbance that grows fastest of all at a Rayleigh
// number. The error is [ErrStable] if none grows.
func (l Layer) Fastest(rayleigh float64) (Growth, error) {
	s, err := NewSolver(l, nil)
	if err != nil {
		return Growth{}, err
	}
	return s.Fastest(rayleigh)
}

// Growth returns the fastest-growing disturbance of wavenumber k > 0 at a
// Rayleigh number, which may be negative: a layer heated from above.
func (s *Solver) Growth(rayleigh, k float64) (Growth, error) {
	g, err := s.growing(rayleigh, k)
	if err != nil {
		return Growth{}, err
	}
	a, err := g.at(k, 0)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return Growth{}, err
	}
	return newGrowth(&a), err
}

// Spectrum returns the n fastest-growing disturbances of wavenumber k > 0 at a
// Rayleigh number, the fastest first. A pair that oscillates with the same
// frequency in opposite phase counts once.
func (s *Solver) Spectrum(rayleigh, k float64, n int) ([]Growth, error) {
	g, err := s.growing(rayleigh, k)
	if err != nil {
		return nil, err
	}
	if n < 1 {
		return nil, &InputError{"number of modes", float64(n), "≥ 1"}
	}
	out := make([]Growth, 0, n)
	for i := range n {
		a, err := g.at(k, i)
		if err != nil {
			return out, err
		}
		out = append(out, newGrowth(&a))
	}
	return out, nil
}

// Fastest returns the disturbance that grows fastest of all at a Rayleigh
// number. The error is [ErrStable] if none grows.
func (s *Solver) Fastest(rayleigh float64) (Growth, error) {
	g, err := s.growing(rayleigh, 1)
	if err != nil {
		return Growth{}, err
	}
	a, err := g.fastest()
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return Growth{}, err
	}
	return newGrowth(&a), err
}

func (s *Solver) growing(rayleigh, k float64) (*growing, error) {
	if math.IsNaN(rayleigh) || math.IsInf(rayleigh, 0) {
		return nil, &InputError{"Rayleigh number", rayleigh, "finite"}
	}
	if err := checkWavenumber(k); err != nil {
		return nil, err
	}
	return &growing{&s.engine, s.drives(rayleigh)}, nil
}
