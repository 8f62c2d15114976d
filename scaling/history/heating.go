package history

import (
	"math"

	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// Heating is the heat that is made in a reservoir, per mass.
type Heating interface {
	// At returns the heating at a time.
	At(units.Time) units.SpecificHeating
	// Energy returns its integral between two times, negative backward.
	Energy(from, to units.Time) units.SpecificEnergy
}

// Constant is heating that does not change with time.
type Constant units.SpecificHeating

// At implements [Heating].
func (c Constant) At(units.Time) units.SpecificHeating { return units.SpecificHeating(c) }

// Energy implements [Heating].
func (c Constant) Energy(from, to units.Time) units.SpecificEnergy {
	return units.SpecificEnergy(float64(c) * float64(to-from))
}

// Isotope is a radioactive isotope that heats.
type Isotope struct {
	Name     string
	Element  string
	HalfLife units.Time
	Heat     units.SpecificHeating // per mass of the isotope

	// Abundance is its present mass fraction of the element.
	Abundance float64
}

// decayPerYear turns a decay constant per year, the form of the sources, into a
// half-life.
func decayPerYear(lambda float64) units.Time {
	return units.Time(math.Ln2/lambda) * units.Year
}

// Isotopes returns the four isotopes that heat planets over billions of years,
// with the decay constants of Steiger & Jäger (1977) and the heat of Ruedas
// (2017), both from memory, per kilogram of isotope. Sources disagree a little:
// per kilogram of element this set gives 98.31 µW for uranium, 26.37 for thorium
// and 3.440e-3 for potassium, more by 0.02%, 0.7% and 1.6% than [PresentHeating];
// NUBASE lists half-lives of 14.0 and 1.248 Gyr for Th-232 and K-40.
func Isotopes() []Isotope {
	const micro = 1e-6
	return []Isotope{
		{"U-238", "U", decayPerYear(1.55125e-10), 94.946 * micro, 0.99284},
		{"U-235", "U", decayPerYear(9.8485e-10), 568.402 * micro, 0.00711},
		{"Th-232", "Th", decayPerYear(4.9475e-11), 26.368 * micro, 1},
		{"K-40", "K", decayPerYear(5.543e-10), 28.761 * micro, 1.196e-4},
	}
}

// Composition is the present content of heat-producing elements, as mass
// fractions (1 ppm is 1e-6).
type Composition struct {
	Potassium, Thorium, Uranium float64
}

// McDonoughSun is the silicate Earth of McDonough & Sun (1995, from memory):
// 240 ppm K, 79.5 ppb Th, 20.3 ppb U.
func McDonoughSun() Composition {
	return Composition{Potassium: 240e-6, Thorium: 79.5e-9, Uranium: 20.3e-9}
}

// Check returns an error that names the first field without sense.
func (c Composition) Check() error {
	return check.First(
		check.Within(pkg, "Composition.Potassium", c.Potassium, 0, 1),
		check.Within(pkg, "Composition.Thorium", c.Thorium, 0, 1),
		check.Within(pkg, "Composition.Uranium", c.Uranium, 0, 1),
	)
}

func (c Composition) of(element string) float64 {
	switch element {
	case "K":
		return c.Potassium
	case "Th":
		return c.Thorium
	case "U":
		return c.Uranium
	}
	return 0
}

// PresentHeating returns the present heating of a composition with the
// coefficients of McDonough, Šrámek & Wipperfurth (2020, abstract): 3.387e-9,
// 26.18e-6 and 98.29e-6 W per kilogram of K, Th and U.
func PresentHeating(c Composition) (units.SpecificHeating, error) {
	if err := c.Check(); err != nil {
		return 0, err
	}
	return units.SpecificHeating(3.387e-9*c.Potassium + 26.18e-6*c.Thorium + 98.29e-6*c.Uranium), nil
}

// RockHeating returns the heating per volume of a rock by the formula of Rybach
// (1988, from memory), with ρ in kg/m³ and the result in µW/m³:
//
//	A = 1e-5 ρ (9.52 U/ppm + 2.56 Th/ppm + 3.48 K/%)
func RockHeating(density units.Density, c Composition) (units.VolumetricHeating, error) {
	if err := check.First(check.Positive(pkg, "density", density), c.Check()); err != nil {
		return 0, err
	}
	a := 1e-5 * float64(density) * (9.52*c.Uranium*1e6 + 2.56*c.Thorium*1e6 + 3.48*c.Potassium*100)
	return check.Result(pkg, "heating", units.VolumetricHeating(a*1e-6))
}

// Radiogenic is the heating of a mixture of isotopes that decay. Make one with
// [NewRadiogenic]; the zero value does not heat.
type Radiogenic struct {
	rate    []float64 // 1/s
	heating []float64 // W/kg at time zero
}

// NewRadiogenic returns the heating of a composition whose contents are those at
// the time called present, for example 4.5 Gyr: H(t) = Σ c h exp(λ (present-t)).
func NewRadiogenic(c Composition, isotopes []Isotope, present units.Time) (Radiogenic, error) {
	if err := check.First(c.Check(), check.Finite(pkg, "present", present)); err != nil {
		return Radiogenic{}, err
	}
	var r Radiogenic
	for _, i := range isotopes {
		err := check.First(
			check.Positive(pkg, i.Name+": half-life", i.HalfLife),
			check.NotNegative(pkg, i.Name+": heat", i.Heat),
			check.Within(pkg, i.Name+": abundance", i.Abundance, 0, 1),
		)
		if err != nil {
			return Radiogenic{}, err
		}
		if !(i.Element == "K" || i.Element == "Th" || i.Element == "U") {
			return Radiogenic{}, &FieldError{Package: string(pkg), Field: i.Name + ": element", Value: i.Element, Want: "K, Th or U"}
		}
		rate := math.Ln2 / float64(i.HalfLife)
		h := c.of(i.Element) * i.Abundance * float64(i.Heat) * math.Exp(rate*float64(present))
		if _, err := check.Result(pkg, i.Name+": heating at time zero", h); err != nil {
			return Radiogenic{}, err
		}
		r.rate, r.heating = append(r.rate, rate), append(r.heating, h)
	}
	return r, nil
}

// At implements [Heating].
func (r Radiogenic) At(t units.Time) units.SpecificHeating {
	sum := 0.0
	for i, h := range r.heating {
		sum += h * math.Exp(-r.rate[i]*float64(t))
	}
	return units.SpecificHeating(sum)
}

// Energy implements [Heating], in closed form.
func (r Radiogenic) Energy(from, to units.Time) units.SpecificEnergy {
	sum := 0.0
	for i, h := range r.heating {
		lambda := r.rate[i]
		sum -= h / lambda * math.Exp(-lambda*float64(from)) * math.Expm1(-lambda*float64(to-from))
	}
	return units.SpecificEnergy(sum)
}
