package convection

import (
	"context"
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// A Mode is a small disturbance of the temperature,
//
//	Amplitude · cos(Wavenumber·x) · Shape(z),
//
// with x and z measured from the lower left corner of the box: a start of
// convection, hot at x = 0 for a positive amplitude.
type Mode struct {
	// Amplitude in units of temperature. Zero means a twentieth of the
	// temperature range of the state that is disturbed.
	Amplitude float64

	// Wavenumber in radians per length. Zero means rolls about as wide as the
	// layer is deep that fit into the box.
	Wavenumber float64

	// Shape of z from 0 to the height of the box. Nil means a half wave,
	// sin(πz/height).
	Shape func(z float64) float64
}

// defaultAmplitude is a fraction of the temperature range: large enough to
// shorten the wait for convection, small enough to choose no more than the
// number of rolls.
const defaultAmplitude = 0.05

// resolve returns the mode with its zero fields filled in.
func (d Mode) resolve(p *Problem, t *staggered.Scalar) (Mode, error) {
	width, height := p.Grid.Width(), p.Grid.Height()
	if d.Amplitude == 0 {
		lowest, highest := t.Extrema()
		d.Amplitude = defaultAmplitude * (highest.Value - lowest.Value)
	}
	if d.Wavenumber == 0 {
		// Half waves between walls, whole waves on a ring.
		d.Wavenumber = math.Pi / width * max(1, math.Round(width/height))
		if p.Walls.Left.IsPeriodic() {
			d.Wavenumber = 2 * math.Pi / width * max(1, math.Round(0.5*width/height))
		}
	}
	if d.Shape == nil {
		d.Shape = func(z float64) float64 { return math.Sin(math.Pi * z / height) }
	}
	if math.IsNaN(d.Amplitude) || math.IsInf(d.Amplitude, 0) {
		return d, fmt.Errorf("convection: Mode.Amplitude is %v, want a finite number", d.Amplitude)
	}
	if math.IsNaN(d.Wavenumber) || math.IsInf(d.Wavenumber, 0) {
		return d, fmt.Errorf("convection: Mode.Wavenumber is %v, want a finite number", d.Wavenumber)
	}
	return d, nil
}

// addTo adds the mode to a temperature.
func (d Mode) addTo(t *staggered.Scalar) {
	g := t.Grid
	for k, z := range g.ZCentres() {
		row, shape := t.Row(k), d.Amplitude*d.Shape(z-g.ZNodes()[0])
		for i, x := range g.XCentres() {
			row[i] += shape * math.Cos(d.Wavenumber*(x-g.XNodes()[0]))
		}
	}
}

// Conducting returns the temperature of the layer at rest in steady state. It
// fails with [heat.ErrSingular] where the walls do not determine one.
func Conducting(ctx context.Context, p Problem) (*staggered.Scalar, error) {
	sys, err := newSystem(p, Settings{})
	if err != nil {
		return nil, err
	}
	return sys.conducting(ctx)
}

func (sys *system) conducting(ctx context.Context) (*staggered.Scalar, error) {
	t := staggered.NewScalar(sys.Grid)
	if _, err := sys.heat.Steady(ctx, t, nil); err != nil {
		return nil, fmt.Errorf("convection: no conducting state, give Problem.Initial: %w", err)
	}
	return t, nil
}

// start returns the temperature at the start of a run.
func (sys *system) start(ctx context.Context) (*staggered.Scalar, error) {
	if sys.Initial != nil {
		t := staggered.NewScalar(sys.Grid)
		t.Fill(sys.Initial)
		return t, checkTemperature(t)
	}
	t, err := sys.conducting(ctx)
	if err != nil {
		return nil, err
	}
	d, err := Mode{}.resolve(&sys.Problem, t)
	if err != nil {
		return nil, err
	}
	d.addTo(t)
	return t, nil
}

// checkGiven checks a temperature that a caller made: on any grid of the same
// box, and whole.
func (sys *system) checkGiven(name string, t *staggered.Scalar) error {
	if t == nil || t.Grid == nil {
		return fmt.Errorf("convection: %s has no grid", name)
	}
	if n := t.Grid.NX() * t.Grid.NZ(); len(t.Values) != n {
		return fmt.Errorf("convection: %s holds %d values, want %d for %v", name, len(t.Values), n, t.Grid)
	}
	g := sys.Grid
	if !sameExtent(t.Grid.Width(), g.Width()) || !sameExtent(t.Grid.Height(), g.Height()) {
		return fmt.Errorf("convection: %s lives on a box of %vx%v, want %vx%v",
			name, t.Grid.Width(), t.Grid.Height(), g.Width(), g.Height())
	}
	return checkFinite(name, t)
}

func checkTemperature(t *staggered.Scalar) error { return checkFinite("temperature", t) }

func checkFinite(name string, t *staggered.Scalar) error {
	nx := t.Grid.NX()
	for c, v := range t.Values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return fmt.Errorf("convection: %s of cell (%d, %d) is %v, want a finite number", name, c%nx, c/nx, v)
		}
	}
	return nil
}
