package scaling

import (
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// Onset is the first instability of a boundary layer that grows by conduction.
type Onset struct {
	Time       units.Time   // since cooling began
	Thickness  units.Length // √(πκt) of the layer at that time
	Wavelength units.Length // of the first drips
}

// Criterion says when a growing boundary layer is unstable: at a local critical
// Rayleigh number, on the wavelength 2π/Wavenumber in thicknesses of the layer.
// Values of Rayleigh from about 500 to 2000 are in use, so that a time is known
// to a factor of two or so; give it as a range.
type Criterion struct {
	Rayleigh   float64
	Wavenumber float64
}

// CriterionOf returns the criterion of a layer between such walls; a layer that
// grows under a rigid lid into fluid is commonly taken as [FreeOverRigid].
func CriterionOf(w Walls) (Criterion, error) {
	ra, k, err := w.Critical()
	return Criterion{ra, k}, err
}

// Onset returns when a layer that has been cooled from above (or heated from
// below) by drop since time zero starts to convect:
//
//	ρ g α ΔT (πκt)^(3/2)/(κη) = Rd,  t = (κη Rd/(ρ g α ΔT))^(2/3)/(πκ)
//
// (Howard 1966), independent of the depth of the layer. Under a stagnant lid the
// drop is the rheological one and the viscosity that of the interior: see
// [Criterion.OnsetUnderLid].
//
// The wavelength goes with the same assumption. Laws with other constants
// (Korenaga & Jordan 2003 and others) exist but could not be confirmed.
//
// An onset after the layer has grown through the whole depth is reported as
// [ErrOutOfRange] beside the answer.
func (c Criterion) Onset(l boussinesq.Layer, drop units.TemperatureDifference) (Onset, error) {
	if err := check.First(l.Check(), check.Positive(pkg, "temperature drop", drop)); err != nil {
		return Onset{}, err
	}
	return c.onset(l, float64(l.Material.Viscosity), float64(drop))
}

// OnsetUnderLid is [Criterion.Onset] for a fluid of temperature-dependent
// viscosity whose interior is at the given temperature: the part of the layer
// that can move has the drop of the lid law. The time grows like θ^(2/3).
func (c Criterion) OnsetUnderLid(l boussinesq.Layer, s LidLaw, eta Viscosity, interior units.Temperature) (Onset, error) {
	if err := check.First(s.check(l, eta), check.Positive(pkg, "interior temperature", interior)); err != nil {
		return Onset{}, err
	}
	return c.onset(l, float64(eta.At(interior)), s.Drop*float64(eta.Scale(interior)))
}

func (c Criterion) onset(l boussinesq.Layer, viscosity, drop float64) (Onset, error) {
	err := check.First(check.Positive(pkg, "Criterion.Rayleigh", c.Rayleigh), check.Positive(pkg, "Criterion.Wavenumber", c.Wavenumber))
	if err != nil {
		return Onset{}, err
	}
	m := l.Material
	kappa := float64(m.Conductivity) / (float64(m.Density) * float64(m.SpecificHeat))
	delta := math.Cbrt(viscosity * c.Rayleigh / (buoyancy(l) * drop))
	o := Onset{
		Time:       units.Time(delta * delta / (math.Pi * kappa)),
		Thickness:  units.Length(delta),
		Wavelength: units.Length(2 * math.Pi / c.Wavenumber * delta),
	}
	if _, err := check.Result(pkg, "onset time", o.Time); err != nil {
		return Onset{}, err
	}
	if o.Thickness > l.Depth {
		d := float64(l.Depth)
		return o, &RangeError{Law: "onset in a growing layer", Violations: []Violation{
			{Limit{RayleighNumber, c.Rayleigh, math.Inf(1)}, buoyancy(l) * drop * d * d * d / viscosity}}}
	}
	return o, nil
}
