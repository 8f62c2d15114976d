package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// The pieces of which the balance of a [Cell] is made, for half-spaces and
// plates that cool: Carslaw & Jaeger (1959), derived again here.

// CoolingFlux returns k ΔT/√(πκt), the heat flux of a half-space at the time t
// after its surface was cooled by ΔT.
func CoolingFlux(k units.Conductivity, drop units.TemperatureDifference, kappa units.Diffusivity, t units.Time) (units.HeatFlux, error) {
	err := check.First(
		check.Positive(pkg, "conductivity", k), check.Finite(pkg, "temperature drop", drop),
		check.Positive(pkg, "diffusivity", kappa), check.Positive(pkg, "time", t),
	)
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "heat flux", units.HeatFlux(float64(k)*float64(drop)/math.Sqrt(math.Pi*float64(kappa)*float64(t))))
}

// PlateFlux returns 2k ΔT √(u/(πκL)), the mean heat flux through a plate of length
// L that moves at speed u away from where it starts to cool.
func PlateFlux(k units.Conductivity, drop units.TemperatureDifference, kappa units.Diffusivity, u units.Velocity, l units.Length) (units.HeatFlux, error) {
	if err := check.First(check.Positive(pkg, "speed", u), check.Positive(pkg, "length", l)); err != nil {
		return 0, err
	}
	q, err := CoolingFlux(k, drop, kappa, units.Time(float64(l)/float64(u)))
	return 2 * q, err
}

// IsothermDepth returns the depth in a cooling half-space at which the given
// fraction of the temperature drop is made up, 2 erf⁻¹(f) √(κt); 2.326 √(κt) for
// 0.9.
func IsothermDepth(fraction float64, kappa units.Diffusivity, t units.Time) (units.Length, error) {
	err := check.First(check.Positive(pkg, "diffusivity", kappa), check.NotNegative(pkg, "time", t))
	if err != nil {
		return 0, err
	}
	if !(fraction > 0 && fraction < 1) {
		return 0, &FieldError{Package: string(pkg), Field: "fraction", Value: formatFloat(fraction), Want: "> 0 and < 1"}
	}
	return check.Result(pkg, "depth", units.Length(2*math.Erfinv(fraction)*math.Sqrt(float64(kappa)*float64(t))))
}

// GradientThickness returns √(πκt): the layer that would conduct the flux of a
// cooling half-space in steady state.
func GradientThickness(kappa units.Diffusivity, t units.Time) (units.Length, error) {
	err := check.First(check.Positive(pkg, "diffusivity", kappa), check.NotNegative(pkg, "time", t))
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "thickness", units.Length(math.Sqrt(math.Pi*float64(kappa)*float64(t))))
}

// SurfaceSpeed returns the mean speed of a free wall, in κ/d, at which
// half-space cooling with half of the drop gives the Nusselt number in a cell of
// width a: π a Nu². It is the heat side of [Cell.Balance].
func SurfaceSpeed(nusselt, width float64) (float64, error) {
	if err := check.First(check.Positive(pkg, "Nusselt number", nusselt), check.Positive(pkg, "width", width)); err != nil {
		return 0, err
	}
	return check.Result(pkg, "surface speed", math.Pi*width*nusselt*nusselt)
}

// EdgeStress returns the shear stress at the side of a plume, in ηκ/d²: half of
// the cell's buoyancy works through it, Ra Nu a/2 = stress · speed, with the
// speed of the plume in κ/d. It is the force side of [Cell.Balance].
func EdgeStress(rayleigh, nusselt, width, speed float64) (float64, error) {
	err := check.First(
		check.Positive(pkg, "Rayleigh number", rayleigh), check.Positive(pkg, "Nusselt number", nusselt),
		check.Positive(pkg, "width", width), check.Positive(pkg, "plume speed", speed),
	)
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "edge stress", rayleigh*nusselt*width/2/speed)
}
