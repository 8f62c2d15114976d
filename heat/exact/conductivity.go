package exact

import (
	"fmt"
	"math"
)

// ConductivityLinear is the steady layer between z = 0 and z = Thickness whose
// conductivity depends on temperature, k = Conductivity (1 + Slope·T). By
// Kirchhoff's transform T + ½ Slope T² is linear in z (Carslaw & Jaeger 1959,
// 1.6; section from memory).
type ConductivityLinear struct {
	Material          // at T = 0
	Thickness float64 // default 1
	Slope     float64 // relative growth of conductivity per temperature
	Low, High float64 // temperatures of z = 0 and z = Thickness
}

func (s ConductivityLinear) profile(z, _ float64) (float64, float64) {
	l := orOne(s.Thickness)
	// With θ = T − Low, a linear law again: θ + ½ b θ² = (1 + ½ b step) step z/L,
	// solved in the form of the quadratic formula that does not cancel.
	base, step := 1+s.Slope*s.Low, s.High-s.Low
	b := s.Slope / base
	rise := (1 + b*step/2) * step
	theta := 2 * rise * z / l / (1 + math.Sqrt(1+2*b*rise*z/l))
	return s.Low + theta, -s.conductivity() * base * rise / l
}

// Solve implements [Problem].
func (s ConductivityLinear) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s ConductivityLinear) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s ConductivityLinear) Medium(x, z, t float64) Medium {
	m := s.medium()
	m.Conductivity *= 1 + s.Slope*s.At(x, z, t).Temperature
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness.
func (s ConductivityLinear) Domain() Domain { return layer(orOne(s.Thickness), forever) }

// Validate implements [Solution].
func (s ConductivityLinear) Validate() error {
	if err := first(
		s.check("ConductivityLinear"),
		notNegative("ConductivityLinear.Thickness", s.Thickness),
		anyFinite("ConductivityLinear.Slope", s.Slope),
		anyFinite("ConductivityLinear.Low", s.Low),
		anyFinite("ConductivityLinear.High", s.High),
	); err != nil {
		return err
	}
	if lowest := 1 + min(s.Slope*s.Low, s.Slope*s.High); !(lowest > 0) {
		return fmt.Errorf("exact: ConductivityLinear.Slope is %g, want a conductivity > 0 between %g and %g", s.Slope, s.Low, s.High)
	}
	return nil
}

// ConductivityInverse is the steady layer between z = 0 and z = Thickness whose
// conductivity falls with the absolute temperature, k = Conductivity Reference/T,
// as that of ice and of many crystals does. Its temperature is geometric,
// T = Low (High/Low)^(z/L), by Kirchhoff's transform.
type ConductivityInverse struct {
	Material          // at the temperature Reference
	Thickness float64 // L; default 1
	Reference float64 // absolute temperature; default 1
	Low, High float64 // absolute temperatures of z = 0 and z = L; default 1
}

func (s ConductivityInverse) profile(z, _ float64) (float64, float64) {
	l, low := orOne(s.Thickness), orOne(s.Low)
	rate := math.Log(orOne(s.High)/low) / l
	return low * math.Exp(rate*z), -s.conductivity() * orOne(s.Reference) * rate
}

// Solve implements [Problem].
func (s ConductivityInverse) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s ConductivityInverse) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s ConductivityInverse) Medium(x, z, t float64) Medium {
	m := s.medium()
	m.Conductivity *= orOne(s.Reference) / s.At(x, z, t).Temperature
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness.
func (s ConductivityInverse) Domain() Domain { return layer(orOne(s.Thickness), forever) }

// Validate implements [Solution].
func (s ConductivityInverse) Validate() error {
	return first(
		s.check("ConductivityInverse"),
		notNegative("ConductivityInverse.Thickness", s.Thickness),
		notNegative("ConductivityInverse.Reference", s.Reference),
		notNegative("ConductivityInverse.Low", s.Low),
		notNegative("ConductivityInverse.High", s.High),
	)
}

// ConductivityExponential is the steady layer between z = 0 and z = Thickness
// whose conductivity grows with z, k = Conductivity exp(Growth·z/L):
//
//	T = Low + (High − Low) (1 − exp(−Growth z/L))/(1 − exp(−Growth))
//
// (elementary).
type ConductivityExponential struct {
	Material          // at z = 0
	Thickness float64 // L; default 1
	Growth    float64 // natural logarithm of the contrast of conductivity
	Low, High float64 // temperatures of z = 0 and z = L
}

func (s ConductivityExponential) profile(z, _ float64) (float64, float64) {
	l, step := orOne(s.Thickness), s.High-s.Low
	if s.Growth < 0 {
		// From the other end the growth is positive and nothing overflows.
		theta, slope := throughflow(-s.Growth, z/l)
		return s.Low + step*theta, -s.conductivity() * step / l * slope * math.Exp(s.Growth*z/l)
	}
	theta, slope := throughflow(s.Growth, 1-z/l)
	return s.High - step*theta, -s.conductivity() * step / l * slope * math.Exp(s.Growth*z/l)
}

// Solve implements [Problem].
func (s ConductivityExponential) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s ConductivityExponential) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s ConductivityExponential) Medium(_, z, _ float64) Medium {
	m := s.medium()
	m.Conductivity *= math.Exp(s.Growth * z / orOne(s.Thickness))
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness.
func (s ConductivityExponential) Domain() Domain { return layer(orOne(s.Thickness), forever) }

// Validate implements [Solution].
func (s ConductivityExponential) Validate() error {
	return first(
		s.check("ConductivityExponential"),
		notNegative("ConductivityExponential.Thickness", s.Thickness),
		anyFinite("ConductivityExponential.Growth", s.Growth),
		anyFinite("ConductivityExponential.Low", s.Low),
		anyFinite("ConductivityExponential.High", s.High),
	)
}
