package rheology

import "math"

// GasConstant is the molar gas constant in J/(mol K), exact since the 2019
// revision of the SI (to the digits given; CODATA 2018).
const GasConstant = 8.314462618

// Arrhenius is the law of a thermally activated creep with a stress exponent
// of 1,
//
//	η = Reference exp((E + P V)/(R T) - (E + P₀ V)/(R T₀)),  P = SurfacePressure + PressureGradient depth,
//
// relative to its viscosity at a reference temperature and depth (P₀ is the
// pressure there).
//
// In SI, with temperatures in kelvin, only the first fields are needed. A
// dimensionless model sets GasConstant to 1, E to E/(R ΔT) and TemperatureOffset
// to the surface temperature over ΔT.
type Arrhenius struct {
	// Reference is the viscosity at ReferenceTemperature and ReferenceDepth.
	// Default 1.
	Reference float64

	// ActivationEnergy is E, in J/mol.
	ActivationEnergy float64

	// ActivationVolume is V, in m³/mol. Default 0.
	ActivationVolume float64

	// PressureGradient is density times gravity, in Pa/m. Default 0.
	PressureGradient float64

	// SurfacePressure is the pressure at depth 0, in Pa. Default 0.
	SurfacePressure float64

	// ReferenceTemperature is T₀, on the scale of the temperatures that the
	// law is given. With TemperatureOffset it must be above absolute zero.
	ReferenceTemperature float64

	// ReferenceDepth is the depth at which Reference holds. Default 0.
	ReferenceDepth float64

	// TemperatureOffset is added to every temperature to make it absolute:
	// 273.15 for temperatures in °C. Default 0.
	TemperatureOffset float64

	// Min and Max bound the viscosity. Default 0: no bound.
	Min, Max float64

	// GasConstant is R. Default [GasConstant], in J/(mol K).
	GasConstant float64
}

// coldest stands for absolute zero and below, where an iterate may stray: the
// law is then at its stiffest instead of dividing by zero or turning soft.
const coldest = 1e-300

// enthalpy returns (E + P V)/R at a depth, in units of temperature.
func (a Arrhenius) enthalpy(depth float64) float64 {
	pressure := a.SurfacePressure + a.PressureGradient*depth
	return (a.ActivationEnergy + pressure*a.ActivationVolume) / orDefault(a.GasConstant, GasConstant)
}

// ViscosityTo implements [Law]. The viscosity is infinite where no double can
// hold it; set Max.
func (a Arrhenius) ViscosityTo(dst, temperature []float64, depth float64) {
	reference, offset := orDefault(a.Reference, 1), a.TemperatureOffset
	h := a.enthalpy(depth)
	h0 := a.enthalpy(a.ReferenceDepth) / (a.ReferenceTemperature + offset)
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		dst[i] = reference * math.Exp(h/max(t+offset, coldest)-h0)
	}
	clamp(dst, a.Min, a.Max)
}

// Linearised returns the exponential law with the same viscosity and the same
// relative slopes in temperature and in depth at one temperature and depth:
// b = (E + P V)/(R T²) a unit of temperature and c = V dP/dz/(R T) a unit of
// depth (Frank-Kamenetskii 1955). It leaves out Min and Max.
func (a Arrhenius) Linearised(temperature, depth float64) FrankKamenetskii {
	t := temperature + a.TemperatureOffset
	b := a.enthalpy(depth) / (t * t)
	c := (a.enthalpy(1) - a.enthalpy(0)) / t
	var eta [1]float64
	free := a
	free.Min, free.Max = 0, 0
	free.ViscosityTo(eta[:], []float64{temperature}, depth)
	return FrankKamenetskii{
		Reference:            eta[0] * math.Exp(-c*depth),
		ThermalExponent:      b,
		DepthExponent:        c,
		ReferenceTemperature: temperature,
	}
}

// Validate implements [Validator].
func (a Arrhenius) Validate() error {
	return first(
		notNegative("Reference of Arrhenius", a.Reference),
		notNegative("ActivationEnergy of Arrhenius", a.ActivationEnergy),
		anyFinite("ActivationVolume of Arrhenius", a.ActivationVolume),
		anyFinite("PressureGradient of Arrhenius", a.PressureGradient),
		anyFinite("SurfacePressure of Arrhenius", a.SurfacePressure),
		anyFinite("TemperatureOffset of Arrhenius", a.TemperatureOffset),
		positive("ReferenceTemperature plus TemperatureOffset of Arrhenius", a.ReferenceTemperature+a.TemperatureOffset),
		anyFinite("ReferenceDepth of Arrhenius", a.ReferenceDepth),
		bounds("Arrhenius", a.Min, a.Max),
		notNegative("GasConstant of Arrhenius", a.GasConstant),
	)
}
