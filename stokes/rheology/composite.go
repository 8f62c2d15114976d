package rheology

import (
	"errors"
	"fmt"
	"math"
)

// A Path is a way for a polycrystal to deform: one mechanism, or a chain of
// mechanisms that need each other, of which the slowest sets the pace,
// 1/rate = Σ 1/rateⱼ.
type Path []Creep

// Alone is the path of one mechanism.
func Alone(c Creep) Path { return Path{c} }

// InSeries is the path of mechanisms that need each other.
func InSeries(links ...Creep) Path { return links }

// Composite is creep along several paths side by side under the same stress,
// so that their strain rates add. It is a [Law] at one strain rate, or at one
// stress, that stands for the whole layer.
//
// Its viscosity is that of an isotropic flow, τ/(2ε) in second invariants:
// mechanisms that are [Uniaxial] are converted by [Creep.Invariants].
// Everything is in SI.
type Composite struct {
	// Paths of deformation, at least one; [Olivine], [WetOlivine] and
	// [ColdIce] return sets of them.
	Paths []Path

	// StrainRate is the second invariant of the strain rate at which
	// ViscosityTo evaluates the law, in 1/s. Give this or Stress.
	StrainRate float64

	// Stress is the second invariant of the stress at which ViscosityTo
	// evaluates the law, in Pa. Give this or StrainRate.
	Stress float64

	// GrainSize in m and Water in H atoms per 10⁶ Si, where a mechanism
	// depends on them.
	GrainSize, Water float64

	// PressureGradient is density times gravity, in Pa/m. Default 0.
	PressureGradient float64

	// SurfacePressure is the pressure at depth 0, in Pa. Default 0.
	SurfacePressure float64

	// Min and Max bound the viscosity, in Pa s. Default 0: no bound.
	Min, Max float64
}

// ViscosityTo implements [Law], temperatures in kelvin and depth in metres.
// It extrapolates mechanisms beyond their MaxTemperature: see
// [Composite.Covers].
func (c Composite) ViscosityTo(dst, temperature []float64, depth float64) {
	var room [8]branch
	s := State{Pressure: c.SurfacePressure + c.PressureGradient*depth, GrainSize: c.GrainSize, Water: c.Water}
	branches := appendBranches(room[:0], c.Paths, s)
	temperature = temperature[:len(dst)]
	if c.Stress > 0 {
		log := math.Log(c.Stress)
		for i, t := range temperature {
			dst[i] = atStress(branches, log, max(t, coldest))
		}
	} else {
		log := math.Log(c.StrainRate)
		for i, t := range temperature {
			dst[i] = atStrainRate(branches, log, max(t, coldest))
		}
	}
	clamp(dst, c.Min, c.Max)
}

// ViscosityAtStrainRate returns the viscosity in Pa s at a strain rate (second
// invariant, 1/s, > 0) and a state, within Min and Max. The other fields of
// the receiver do not count, only its paths and bounds. Beyond the range of a
// mechanism the error is an [ErrOutOfRange] and the viscosity that of the laws
// extrapolated.
func (c Composite) ViscosityAtStrainRate(rate float64, s State) (float64, error) {
	return c.viscosityAt("strain rate", rate, s, atStrainRate)
}

// ViscosityAtStress is ViscosityAtStrainRate at a stress (second invariant,
// Pa, > 0).
func (c Composite) ViscosityAtStress(stress float64, s State) (float64, error) {
	return c.viscosityAt("stress", stress, s, atStress)
}

func (c Composite) viscosityAt(name string, v float64, s State, at func([]branch, float64, float64) float64) (float64, error) {
	if err := first(positive(name, v), c.validateAt(s)); err != nil {
		return 0, err
	}
	eta := [1]float64{at(appendBranches(nil, c.Paths, s), math.Log(v), s.Temperature)}
	clamp(eta[:], c.Min, c.Max)
	return eta[0], c.Covers(s.Temperature)
}

// Covers returns an [ErrOutOfRange] that names the first mechanism for which
// the temperature, in kelvin, is too high, as that of a layer may be at its
// bottom.
func (c Composite) Covers(temperature float64) error {
	for _, path := range c.Paths {
		for _, m := range path {
			if err := m.covers(temperature); err != nil {
				return err
			}
		}
	}
	return nil
}

// Validate implements [Validator].
func (c Composite) Validate() error {
	if (c.StrainRate != 0) == (c.Stress != 0) {
		return fmt.Errorf("rheology: StrainRate and Stress of Composite are %g and %g, want exactly one of them", c.StrainRate, c.Stress)
	}
	return first(
		notNegative("StrainRate of Composite", c.StrainRate),
		notNegative("Stress of Composite", c.Stress),
		anyFinite("PressureGradient of Composite", c.PressureGradient),
		anyFinite("SurfacePressure of Composite", c.SurfacePressure),
		bounds("Composite", c.Min, c.Max),
		c.validatePaths(State{GrainSize: c.GrainSize, Water: c.Water}),
	)
}

func (c Composite) validateAt(s State) error {
	return first(
		positive("Temperature", s.Temperature),
		anyFinite("Pressure", s.Pressure),
		bounds("Composite", c.Min, c.Max),
		c.validatePaths(s),
	)
}

func (c Composite) validatePaths(s State) error {
	if len(c.Paths) == 0 {
		return errors.New("rheology: Paths of Composite are empty, want at least one")
	}
	for i, path := range c.Paths {
		if len(path) == 0 {
			return fmt.Errorf("rheology: Paths[%d] of Composite is empty, want at least one mechanism", i)
		}
		for _, m := range path {
			if err := first(m.Validate(), s.validateMaterial(m)); err != nil {
				return fmt.Errorf("rheology: Paths[%d] of Composite: %w", i, err)
			}
		}
	}
	return nil
}
