package boussinesq

import (
	"fmt"

	"example.org/overturn/units"
)

// Layer is a horizontal layer of one material between two walls.
//
// Its top is isothermal. Its bottom is isothermal where Bottom is given;
// where Bottom is zero, heat enters at BottomFlux, and a BottomFlux of zero
// insulates it.
type Layer struct {
	Material Material

	Depth   units.Length       // thickness d, from wall to wall
	Gravity units.Acceleration // g

	Top    units.Temperature // absolute temperature of the top wall
	Bottom units.Temperature // of the bottom wall; zero where its flux is given instead

	BottomFlux units.HeatFlux          // heat that enters through the bottom; only where Bottom is zero
	Heating    units.VolumetricHeating // heat that is made inside, per volume
}

// Check returns an error that names the first field without sense. A layer
// that passes may still be stable: see [Layer.Rayleigh].
func (l Layer) Check() error {
	err := first(
		l.Material.Check(),
		positive("Layer.Depth", l.Depth),
		positive("Layer.Gravity", l.Gravity),
		positive("Layer.Top", l.Top),
		notNegative("Layer.Bottom", l.Bottom),
		finite("Layer.BottomFlux", l.BottomFlux),
		finite("Layer.Heating", l.Heating),
	)
	if err != nil {
		return err
	}
	if l.isothermalBottom() && l.BottomFlux != 0 {
		return &FieldError{
			Field: "Layer.BottomFlux", Value: fmt.Sprint(l.BottomFlux),
			Want: "0 beside a Bottom of " + fmt.Sprint(l.Bottom),
		}
	}
	return nil
}

// TemperatureDrop returns T(bottom) − T(top) of isothermal walls, negative for
// a layer heated from above.
func (l Layer) TemperatureDrop() (units.TemperatureDifference, error) {
	if err := first(positive("Layer.Top", l.Top), positive("Layer.Bottom", l.Bottom)); err != nil {
		return 0, err
	}
	return l.Bottom.Sub(l.Top), nil
}

// TopFlux returns q_top = BottomFlux + Heating · Depth, the heat that leaves
// the top in steady state, convecting or not. It is for a bottom of given
// flux: between isothermal walls the flux is what a model has to find.
func (l Layer) TopFlux() (units.HeatFlux, error) {
	if err := l.Check(); err != nil {
		return 0, err
	}
	if l.isothermalBottom() {
		return 0, &FieldError{Field: "Layer.Bottom", Value: fmt.Sprint(l.Bottom), Want: "0: a bottom of given flux"}
	}
	return inRange("heat flux through the top", l.topFlux())
}

// TemperatureScale returns θ, the unit of temperature differences in this
// layer: the drop between isothermal walls; q_top d/k over a bottom of given
// flux; H d²/k over an insulating bottom, and between walls of one temperature
// that are heated inside.
//
// A layer with nothing to drive it is an error: one of isothermal walls that
// wraps [ErrStable], or one of given flux whose q_top is not positive.
func (l Layer) TemperatureScale() (units.TemperatureDifference, error) {
	if err := l.Check(); err != nil {
		return 0, err
	}
	switch {
	case l.Bottom > l.Top:
		return l.Bottom.Sub(l.Top), nil
	case l.Bottom == l.Top && l.Heating > 0:
		return l.internalScale()
	case l.isothermalBottom():
		return 0, l.stable()
	default:
		return l.fluxScale()
	}
}

// fluxScale returns q_top d/k of a checked layer.
func (l Layer) fluxScale() (units.TemperatureDifference, error) {
	q := l.topFlux()
	if !(q > 0) {
		return 0, &FieldError{Field: "heat flux through the top", Value: fmt.Sprint(q), Want: "> 0"}
	}
	scale := float64(q) * float64(l.Depth) / float64(l.Material.Conductivity)
	return inRange("temperature scale", units.TemperatureDifference(scale))
}

// internalScale returns H d²/k of a checked layer.
func (l Layer) internalScale() (units.TemperatureDifference, error) {
	if err := positive("Layer.Heating", l.Heating); err != nil {
		return 0, err
	}
	d := float64(l.Depth)
	scale := float64(l.Heating) * d * d / float64(l.Material.Conductivity)
	return inRange("temperature scale", units.TemperatureDifference(scale))
}

func (l Layer) topFlux() units.HeatFlux {
	return l.BottomFlux + units.HeatFlux(float64(l.Heating)*float64(l.Depth))
}

func (l Layer) isothermalBottom() bool { return l.Bottom != 0 }

// stable is the error of a layer that is not hotter at the bottom.
func (l Layer) stable() error {
	return &FieldError{
		Field: "Layer.Bottom", Value: fmt.Sprint(l.Bottom),
		Want: "above a Top of " + fmt.Sprint(l.Top), Err: ErrStable,
	}
}
