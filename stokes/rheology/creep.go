package rheology

import (
	"errors"
	"fmt"
	"math"
)

// ErrOutOfRange reports a condition outside the range for which a law was
// measured. The value that comes with it is the extrapolated law.
var ErrOutOfRange = errors.New("outside the range of the law")

// Geometry says which stress and which strain rate a creep law relates.
type Geometry int

const (
	// Uniaxial: differential stress and axial strain rate, as measured in a
	// compression test and as printed in tables of creep laws.
	Uniaxial Geometry = iota

	// Invariant: the square roots of the second invariants of the stress and
	// strain-rate tensors, τ = √(½ τᵢⱼτᵢⱼ) and ε = √(½ εᵢⱼεᵢⱼ), as a flow
	// solver has them.
	Invariant
)

// String returns the name of the geometry in lower case.
func (g Geometry) String() string {
	switch g {
	case Uniaxial:
		return "uniaxial"
	case Invariant:
		return "invariant"
	}
	return fmt.Sprintf("Geometry(%d)", int(g))
}

// Creep is one creep mechanism of a polycrystal,
//
//	rate = A (σ/StressUnit)ⁿ (d/GrainUnit)⁻ᵖ Cʳ exp(-(E + P V)/(R T)),
//
// with stress σ, grain size d, water content C, pressure P and temperature T.
// Everything that a method takes or returns is in SI (Pa, m, 1/s, K); the two
// units let the prefactor A stand as its paper prints it.
type Creep struct {
	// Name of the mechanism and the Source of its constants.
	Name, Source string

	// Prefactor is A, the strain rate in 1/s at unit stress, grain size and
	// water content and infinite temperature.
	Prefactor float64

	// StressUnit is the unit of stress that Prefactor is made for, in Pa:
	// 1e6 for MPa. Default 1.
	StressUnit float64

	// GrainUnit is the unit of grain size that Prefactor is made for, in m:
	// 1e-6 for µm. Default 1.
	GrainUnit float64

	// StressExponent is n, > 0.
	StressExponent float64

	// GrainExponent is p; 0 for mechanisms that do not feel the grain size.
	GrainExponent float64

	// WaterExponent is r; 0 for dry laws.
	WaterExponent float64

	// ActivationEnergy is E, in J/mol.
	ActivationEnergy float64

	// ActivationVolume is V, in m³/mol.
	ActivationVolume float64

	// MaxTemperature is the upper end of the range of the law, in K; 0 where
	// the source gives none.
	MaxTemperature float64

	// Geometry says what stress and strain rate are. Default [Uniaxial].
	Geometry Geometry
}

// A State is what a creep law depends on beside stress.
type State struct {
	Temperature float64 // K
	Pressure    float64 // Pa
	GrainSize   float64 // m; not needed by laws with GrainExponent 0
	Water       float64 // H atoms per 10⁶ Si; not needed by laws with WaterExponent 0
}

// Invariants returns the mechanism as a relation of second invariants. In a
// uniaxial test τ = σ/√3 and ε = (√3/2) rate, so that the prefactor grows by
// 3^((n+1)/2)/2: by 1.5 for n = 1, by 5.9 for n = 3.5. A mechanism that is
// [Invariant] comes back as it is.
func (c Creep) Invariants() Creep {
	if c.Geometry == Uniaxial {
		c.Prefactor *= math.Pow(3, (c.StressExponent+1)/2) / 2
		c.Geometry = Invariant
	}
	return c
}

// StrainRate returns the strain rate in 1/s under a stress in Pa, > 0. Above
// MaxTemperature the error is an [ErrOutOfRange] and the rate that of the law
// extrapolated.
func (c Creep) StrainRate(stress float64, s State) (float64, error) {
	if err := first(positive("stress", stress), c.Validate(), s.validate(c)); err != nil {
		return 0, err
	}
	return math.Exp(c.logRate(s.Temperature, s) + c.StressExponent*math.Log(stress)), c.covers(s.Temperature)
}

// ViscosityAtStress returns σ/(2 rate) in Pa s under a stress in Pa, > 0. It is
// the viscosity of a flow only for a mechanism in terms of [Creep.Invariants];
// for a uniaxial one it is a mere ratio. Errors as StrainRate.
func (c Creep) ViscosityAtStress(stress float64, s State) (float64, error) {
	if err := first(positive("stress", stress), c.Validate(), s.validate(c)); err != nil {
		return 0, err
	}
	log := math.Log(stress)
	return 0.5 * math.Exp(log-c.logRate(s.Temperature, s)-c.StressExponent*log), c.covers(s.Temperature)
}

// ViscosityAtStrainRate returns σ/(2 rate) in Pa s at a strain rate in 1/s,
// > 0, with the reservation of ViscosityAtStress and errors as StrainRate.
func (c Creep) ViscosityAtStrainRate(rate float64, s State) (float64, error) {
	if err := first(positive("strain rate", rate), c.Validate(), s.validate(c)); err != nil {
		return 0, err
	}
	log := math.Log(rate)
	return 0.5 * math.Exp((log-c.logRate(s.Temperature, s))/c.StressExponent-log), c.covers(s.Temperature)
}

// String returns the mechanism as a table of creep laws would have it.
func (c Creep) String() string {
	return fmt.Sprintf("%s: A %.3g, n %g, p %g, r %g, E %g J/mol, V %g m³/mol, %v; %s",
		c.Name, c.Prefactor, c.StressExponent, c.GrainExponent, c.WaterExponent,
		c.ActivationEnergy, c.ActivationVolume, c.Geometry, c.Source)
}

// Validate implements [Validator].
func (c Creep) Validate() error {
	of := " of Creep"
	if c.Name != "" {
		of = " of " + c.Name
	}
	if err := first(
		positive("Prefactor"+of, c.Prefactor),
		notNegative("StressUnit"+of, c.StressUnit),
		notNegative("GrainUnit"+of, c.GrainUnit),
		positive("StressExponent"+of, c.StressExponent),
		notNegative("GrainExponent"+of, c.GrainExponent),
		anyFinite("WaterExponent"+of, c.WaterExponent),
		notNegative("ActivationEnergy"+of, c.ActivationEnergy),
		anyFinite("ActivationVolume"+of, c.ActivationVolume),
		notNegative("MaxTemperature"+of, c.MaxTemperature),
	); err != nil {
		return err
	}
	if c.Geometry != Uniaxial && c.Geometry != Invariant {
		return fmt.Errorf("rheology: Geometry%s is %v, want uniaxial or invariant", of, c.Geometry)
	}
	return nil
}

// validate checks what a mechanism needs of a state.
func (s State) validate(c Creep) error {
	return first(
		positive("Temperature", s.Temperature),
		anyFinite("Pressure", s.Pressure),
		s.validateMaterial(c),
	)
}

// validateMaterial checks grain size and water where they matter.
func (s State) validateMaterial(c Creep) error {
	if c.GrainExponent != 0 {
		if err := positive("GrainSize", s.GrainSize); err != nil {
			return err
		}
	}
	if c.WaterExponent != 0 {
		return positive("Water", s.Water)
	}
	return nil
}

// covers reports a temperature above the range of the law.
func (c Creep) covers(temperature float64) error {
	if c.MaxTemperature == 0 || temperature <= c.MaxTemperature {
		return nil
	}
	return fmt.Errorf("rheology: %s at %g K, measured to %g K: %w", c.Name, temperature, c.MaxTemperature, ErrOutOfRange)
}

// logRate returns ln(rate) less the n ln σ of the stress.
func (c Creep) logRate(temperature float64, s State) float64 {
	return c.logAthermal(s) - c.enthalpy(s.Pressure)/temperature
}

// logAthermal is the part of logRate that temperature and pressure do not
// touch. Working in logarithms keeps stresses to powers of 4 in range.
func (c Creep) logAthermal(s State) float64 {
	log := math.Log(c.Prefactor) - c.StressExponent*math.Log(orDefault(c.StressUnit, 1))
	if c.GrainExponent != 0 {
		log -= c.GrainExponent * math.Log(s.GrainSize/orDefault(c.GrainUnit, 1))
	}
	if c.WaterExponent != 0 {
		log += c.WaterExponent * math.Log(s.Water)
	}
	return log
}

// enthalpy returns (E + P V)/R in kelvin.
func (c Creep) enthalpy(pressure float64) float64 {
	return (c.ActivationEnergy + pressure*c.ActivationVolume) / GasConstant
}
