package lithosphere

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/scaling/internal/root"
	"example.org/overturn/units"
)

// Plate is a lithosphere whose base stays at the temperature of the mantle. Its
// Material needs no viscosity.
type Plate struct {
	Material   boussinesq.Material
	Surface    units.Temperature
	Mantle     units.Temperature // at the base
	BaseDepth  units.Length      // a, the thickness
	Overburden units.Density     // of the fluid above, for the subsidence

	// Spreading is the speed of the plate. Where it is given the plate conducts
	// heat along itself too, which matters near the ridge only; zero leaves that
	// out.
	Spreading units.Velocity
}

var _ Model = Plate{}

// Check returns an error that names the first field without sense.
func (p Plate) Check() error {
	return check.First(
		checkRock(p.Material, p.Surface, p.Mantle, p.Overburden),
		check.Positive(pkg, "BaseDepth", p.BaseDepth), check.NotNegative(pkg, "Spreading", p.Spreading),
	)
}

func (p Plate) drop() float64 { return float64(p.Mantle.Sub(p.Surface)) }

// shape returns the dimensionless plate at an age: κt/a², and the Péclet number
// ua/(2κ), infinite where nothing is conducted along the plate.
func (p Plate) shape(age units.Time) series {
	a := float64(p.BaseDepth)
	kappa := diffusivity(p.Material)
	s := series{tau: kappa / a * float64(age) / a, peclet: math.Inf(1)}
	if p.Spreading > 0 {
		s.peclet = float64(p.Spreading) * a / (2 * kappa)
	}
	return s
}

// Temperature returns T at a depth, at most the thickness of the plate, and an
// age, which may be zero.
func (p Plate) Temperature(depth units.Length, age units.Time) (units.Temperature, error) {
	err := check.First(p.Check(), check.Within(pkg, "depth", depth, 0, p.BaseDepth), check.NotNegative(pkg, "age", age))
	if err != nil {
		return 0, err
	}
	if age == 0 && depth > 0 {
		return p.Mantle, nil
	}
	s := p.shape(age)
	if err := s.check(); err != nil {
		return 0, err
	}
	return p.Surface.Add(units.TemperatureDifference(p.drop() * s.temperature(float64(depth/p.BaseDepth)))), nil
}

// HeatFlux returns the heat flux through the surface.
func (p Plate) HeatFlux(age units.Time) (units.HeatFlux, error) {
	if err := check.First(p.Check(), check.Positive(pkg, "age", age)); err != nil {
		return 0, err
	}
	s := p.shape(age)
	if err := s.check(); err != nil {
		return 0, err
	}
	return check.Result(pkg, "heat flux", units.HeatFlux(float64(p.Material.Conductivity)*p.drop()/float64(p.BaseDepth)*s.flux()))
}

// Thickness returns the depth at which the fraction of the temperature drop is
// made up; for an old plate, that fraction of the plate.
func (p Plate) Thickness(fraction float64, age units.Time) (units.Length, error) {
	if err := check.First(p.Check(), check.NotNegative(pkg, "age", age), checkFraction(fraction)); err != nil {
		return 0, err
	}
	if age == 0 {
		return 0, nil
	}
	s := p.shape(age)
	if err := s.check(); err != nil {
		return 0, err
	}
	x, err := root.Find(func(x float64) float64 { return s.temperature(x) - fraction }, 0, 1, 0)
	if err != nil {
		return 0, fmt.Errorf("lithosphere: thickness at age %v: %w", age, err)
	}
	return units.Length(x) * p.BaseDepth, nil
}

// Subsidence returns the subsidence of the surface since age zero.
func (p Plate) Subsidence(age units.Time) (units.Length, error) {
	if err := check.First(p.Check(), check.NotNegative(pkg, "age", age)); err != nil {
		return 0, err
	}
	if age == 0 {
		return 0, nil
	}
	s := p.shape(age)
	if err := s.check(); err != nil {
		return 0, err
	}
	return check.Result(pkg, "subsidence", units.Length(p.contraction()*s.contraction()))
}

// FinalSubsidence returns the subsidence of a plate that has stopped cooling.
func (p Plate) FinalSubsidence() (units.Length, error) {
	if err := p.Check(); err != nil {
		return 0, err
	}
	return check.Result(pkg, "subsidence", units.Length(p.contraction()/2))
}

// FinalHeatFlux returns k (T_m-T_s)/a, the heat flux of a plate that has stopped
// cooling.
func (p Plate) FinalHeatFlux() (units.HeatFlux, error) {
	if err := p.Check(); err != nil {
		return 0, err
	}
	return check.Result(pkg, "heat flux", units.HeatFlux(float64(p.Material.Conductivity)*p.drop()/float64(p.BaseDepth)))
}

// contraction returns ρα (T_m-T_s) a/(ρ-ρ_w).
func (p Plate) contraction() float64 {
	m := p.Material
	return float64(m.Density) * float64(m.Expansivity) * p.drop() * float64(p.BaseDepth) / float64(m.Density-p.Overburden)
}

// AgeOfHeatFlux returns the age at which the heat flux is q, which must be above
// [Plate.FinalHeatFlux]. Near that the age is hardly known: the flux differs
// from it by exp(-π²κt/a²).
func (p Plate) AgeOfHeatFlux(q units.HeatFlux) (units.Time, error) {
	final, err := p.FinalHeatFlux()
	if err != nil {
		return 0, err
	}
	if err := check.Above(pkg, "heat flux", q, final); err != nil {
		return 0, err
	}
	return p.age("heat flux", float64(q), func(s series) float64 { return s.flux() - float64(q/final) })
}

// AgeOfSubsidence returns the age at which the surface has subsided by s, which
// must be less than [Plate.FinalSubsidence].
func (p Plate) AgeOfSubsidence(s units.Length) (units.Time, error) {
	final, err := p.FinalSubsidence()
	if err != nil {
		return 0, err
	}
	if s == 0 {
		return 0, nil
	}
	if !(s > 0 && s < final) {
		return 0, &FieldError{Package: string(pkg), Field: "subsidence", Value: fmt.Sprint(s), Want: fmt.Sprintf("0 to less than %v", final)}
	}
	return p.age("subsidence", float64(s), func(x series) float64 { return x.contraction() - float64(s/final)/2 })
}

// age finds the age at which f vanishes, in ln(κt/a²).
func (p Plate) age(field string, value float64, f func(series) float64) (units.Time, error) {
	unit := float64(p.BaseDepth) * float64(p.BaseDepth) / diffusivity(p.Material)
	peclet := p.shape(0).peclet
	at := func(lnTau float64) float64 { return f(series{math.Exp(lnTau), peclet}) }
	plate := series{peclet: peclet}
	youngest, oldest := 1e-16, plate.oldest()
	if plate.alongPlate() {
		youngest = plate.youngest()
	}
	x, err := root.Find(at, math.Log(youngest), math.Log(oldest), 0)
	if err != nil {
		return 0, &FieldError{Package: string(pkg), Field: field, Value: fmt.Sprint(value), Want: "a value that the plate has at some age", Err: err}
	}
	return units.Time(unit * math.Exp(x)), nil
}
