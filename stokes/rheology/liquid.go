package rheology

import (
	"fmt"
	"math"
)

// VogelFulcher is the law of glass-forming liquids, magmas and syrups,
//
//	η = Reference exp(Slope/(T - Pole)),
//
// after Vogel (1921), Fulcher (1925) and Tammann & Hesse (1926). At the pole
// and below it the liquid is as stiff as Max.
type VogelFulcher struct {
	// Reference is the viscosity in the limit of high temperature.
	// Default 1.
	Reference float64

	// Slope is B, in units of temperature, > 0. Published fits in powers of
	// ten have B/ln 10.
	Slope float64

	// Pole is C, the temperature at which the viscosity diverges.
	Pole float64

	// Min and Max bound the viscosity. Default 0: no bound.
	Min, Max float64
}

// ViscosityTo implements [Law].
func (v VogelFulcher) ViscosityTo(dst, temperature []float64, _ float64) {
	reference, b, c := orDefault(v.Reference, 1), v.Slope, v.Pole
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		dst[i] = reference * math.Exp(b/max(t-c, coldest))
	}
	clamp(dst, v.Min, v.Max)
}

// Validate implements [Validator].
func (v VogelFulcher) Validate() error {
	return first(
		notNegative("Reference of VogelFulcher", v.Reference),
		positive("Slope of VogelFulcher", v.Slope),
		anyFinite("Pole of VogelFulcher", v.Pole),
		bounds("VogelFulcher", v.Min, v.Max),
	)
}

// LogPolynomial is a fit to the measured viscosity of a liquid,
//
//	ln η = Σ Coefficients[k] xᵏ,  x = (T - ReferenceTemperature)/TemperatureScale.
//
// It is meant for laboratory syrups, whose law depends on the batch and must
// be measured. Outside the temperatures of the measurement the law holds its
// end values, because a polynomial means nothing there.
type LogPolynomial struct {
	// Coefficients of ln η, lowest power first.
	Coefficients []float64

	// ReferenceTemperature is T₀. Default 0.
	ReferenceTemperature float64

	// TemperatureScale is ΔT. Default 1.
	TemperatureScale float64

	// MinTemperature and MaxTemperature bound the measurement.
	MinTemperature, MaxTemperature float64
}

// ViscosityTo implements [Law].
func (p LogPolynomial) ViscosityTo(dst, temperature []float64, _ float64) {
	t0, scale := p.ReferenceTemperature, orDefault(p.TemperatureScale, 1)
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		x := (min(max(t, p.MinTemperature), p.MaxTemperature) - t0) / scale
		log := 0.0
		for k := len(p.Coefficients) - 1; k >= 0; k-- {
			log = log*x + p.Coefficients[k]
		}
		dst[i] = math.Exp(log)
	}
}

// Validate implements [Validator].
func (p LogPolynomial) Validate() error {
	if len(p.Coefficients) == 0 {
		return fmt.Errorf("rheology: Coefficients of LogPolynomial are empty, want at least one")
	}
	for k, c := range p.Coefficients {
		if err := anyFinite(fmt.Sprintf("Coefficients[%d] of LogPolynomial", k), c); err != nil {
			return err
		}
	}
	if err := first(
		anyFinite("ReferenceTemperature of LogPolynomial", p.ReferenceTemperature),
		notNegative("TemperatureScale of LogPolynomial", p.TemperatureScale),
		anyFinite("MinTemperature of LogPolynomial", p.MinTemperature),
		anyFinite("MaxTemperature of LogPolynomial", p.MaxTemperature),
	); err != nil {
		return err
	}
	if p.MinTemperature >= p.MaxTemperature {
		return fmt.Errorf("rheology: MinTemperature of LogPolynomial is %g, want below MaxTemperature, %g", p.MinTemperature, p.MaxTemperature)
	}
	return nil
}

// Glycerol is the viscosity of pure glycerol in Pa s between 273.15 K and
// 373.15 K, temperatures in kelvin,
//
//	η = 12.1 exp((θ - 1233) θ/(9900 + 70 θ)),  θ = T - 273.15 K,
//
// after Cheng (2008, Ind. Eng. Chem. Res. 47; the law is from memory and gives
// 1.4138 Pa s at 20 °C, where Segur & Oberstar 1951 measured 1.412). Outside
// that range it holds its end values. A few per cent of water lower the
// viscosity by a factor of two: for a number that matters, measure.
type Glycerol struct{}

// ViscosityTo implements [Law].
func (Glycerol) ViscosityTo(dst, temperature []float64, _ float64) {
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		c := min(max(t-273.15, 0), 100)
		dst[i] = 12.1 * math.Exp((c-1233)*c/(9900+70*c))
	}
}

// Validate returns nil: there is nothing to set.
func (Glycerol) Validate() error { return nil }
