package scaling

import (
	"math"

	"example.org/overturn/boussinesq"
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

// HeatDeficit returns 2ρc ΔT √(κt/π), the heat that a half-space has lost per
// area at the time t, in J/m²: the integral of [CoolingFlux].
func HeatDeficit(m boussinesq.Material, drop units.TemperatureDifference, t units.Time) (float64, error) {
	err := check.First(
		check.Positive(pkg, "Material.Density", m.Density), check.Positive(pkg, "Material.SpecificHeat", m.SpecificHeat),
		check.Positive(pkg, "Material.Conductivity", m.Conductivity),
		check.Finite(pkg, "temperature drop", drop), check.NotNegative(pkg, "time", t),
	)
	if err != nil {
		return 0, err
	}
	heat := float64(m.Density) * float64(m.SpecificHeat)
	kappa := float64(m.Conductivity) / heat
	return check.Result(pkg, "heat deficit", 2*heat*float64(drop)*math.Sqrt(kappa*float64(t)/math.Pi))
}

// SheetPull returns the weight, per area of a plate that has cooled for the time
// t, by which it is heavier than warm fluid: gα/c times the [HeatDeficit]. Times
// the length of a sheet that hangs down it is the pull of that sheet per length
// along the strike.
func SheetPull(l boussinesq.Layer, drop units.TemperatureDifference, t units.Time) (units.Pressure, error) {
	err := check.First(check.Positive(pkg, "Layer.Gravity", l.Gravity), check.Positive(pkg, "Material.Expansivity", l.Material.Expansivity))
	if err != nil {
		return 0, err
	}
	deficit, err := HeatDeficit(l.Material, drop, t)
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "pull", units.Pressure(deficit*float64(l.Gravity)*float64(l.Material.Expansivity)/float64(l.Material.SpecificHeat)))
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
