package rheology

import "math"

// FrankKamenetskii is the exponential law
//
//	η = Reference exp(-ThermalExponent (T - ReferenceTemperature)/TemperatureScale
//	                  + DepthExponent depth/DepthScale)
//
// after Frank-Kamenetskii (1955), the linearisation of an Arrhenius exponent.
// Zero fields make it dimensionless, so that
//
//	rheology.FrankKamenetskii{ThermalExponent: math.Log(1000)}
//
// is exp(-b T), with a contrast of 1000 between T = 0 and T = 1, the law of
// case 2a of Blankenbach et al. (1989), and DepthExponent is their c of case 2b.
type FrankKamenetskii struct {
	// Reference is the viscosity at ReferenceTemperature and depth 0.
	// Default 1.
	Reference float64

	// ThermalExponent is b, the natural logarithm of the viscosity contrast
	// over one TemperatureScale; positive where heating softens.
	ThermalExponent float64

	// DepthExponent is c, the natural logarithm of the viscosity contrast
	// over one DepthScale; positive where viscosity grows with depth.
	DepthExponent float64

	// ReferenceTemperature is T₀. Default 0.
	ReferenceTemperature float64

	// TemperatureScale is ΔT. Default 1.
	TemperatureScale float64

	// DepthScale is D, as a rule the thickness of the layer. Default 1.
	DepthScale float64
}

// ViscosityTo implements [Law].
func (f FrankKamenetskii) ViscosityTo(dst, temperature []float64, depth float64) {
	reference := orDefault(f.Reference, 1)
	deltaT := orDefault(f.TemperatureScale, 1)
	deep := f.DepthExponent * depth / orDefault(f.DepthScale, 1)
	b, t0 := f.ThermalExponent, f.ReferenceTemperature
	if b == 0 {
		fill(dst, reference*math.Exp(deep))
		return
	}
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		dst[i] = reference * math.Exp(deep-b*((t-t0)/deltaT))
	}
}

// Validate implements [Validator].
func (f FrankKamenetskii) Validate() error {
	return first(
		notNegative("Reference of FrankKamenetskii", f.Reference),
		anyFinite("ThermalExponent of FrankKamenetskii", f.ThermalExponent),
		anyFinite("DepthExponent of FrankKamenetskii", f.DepthExponent),
		anyFinite("ReferenceTemperature of FrankKamenetskii", f.ReferenceTemperature),
		notNegative("TemperatureScale of FrankKamenetskii", f.TemperatureScale),
		notNegative("DepthScale of FrankKamenetskii", f.DepthScale),
	)
}
