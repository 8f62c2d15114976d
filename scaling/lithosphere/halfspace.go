package lithosphere

import (
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// HalfSpace is a lithosphere that cools for ever. Its Material needs no
// viscosity.
type HalfSpace struct {
	Material   boussinesq.Material
	Surface    units.Temperature
	Mantle     units.Temperature
	Overburden units.Density // of the fluid above, for the subsidence
}

var _ Model = HalfSpace{}

// Check returns an error that names the first field without sense.
func (h HalfSpace) Check() error { return checkRock(h.Material, h.Surface, h.Mantle, h.Overburden) }

func (h HalfSpace) drop() float64 { return float64(h.Mantle.Sub(h.Surface)) }

// diffusion returns √(κt) of a checked half-space.
func (h HalfSpace) diffusion(age units.Time) float64 {
	return math.Sqrt(diffusivity(h.Material) * float64(age))
}

// Temperature returns T at a depth and an age, which may be zero.
func (h HalfSpace) Temperature(depth units.Length, age units.Time) (units.Temperature, error) {
	if err := check.First(h.Check(), check.NotNegative(pkg, "depth", depth), check.NotNegative(pkg, "age", age)); err != nil {
		return 0, err
	}
	switch {
	case depth == 0:
		return h.Surface, nil
	case age == 0:
		return h.Mantle, nil
	}
	x := math.Erf(float64(depth) / (2 * h.diffusion(age)))
	return h.Surface.Add(units.TemperatureDifference(h.drop() * x)), nil
}

// HeatFlux returns k (T_m-T_s)/√(πκt).
func (h HalfSpace) HeatFlux(age units.Time) (units.HeatFlux, error) {
	if err := check.First(h.Check(), check.Positive(pkg, "age", age)); err != nil {
		return 0, err
	}
	return check.Result(pkg, "heat flux", units.HeatFlux(float64(h.Material.Conductivity)*h.drop()/(math.Sqrt(math.Pi)*h.diffusion(age))))
}

// Thickness returns 2 erf⁻¹(fraction) √(κt).
func (h HalfSpace) Thickness(fraction float64, age units.Time) (units.Length, error) {
	if err := check.First(h.Check(), check.NotNegative(pkg, "age", age), checkFraction(fraction)); err != nil {
		return 0, err
	}
	return check.Result(pkg, "thickness", units.Length(2*math.Erfinv(fraction)*h.diffusion(age)))
}

// Subsidence returns 2ρα (T_m-T_s)/(ρ-ρ_w) √(κt/π).
func (h HalfSpace) Subsidence(age units.Time) (units.Length, error) {
	if err := check.First(h.Check(), check.NotNegative(pkg, "age", age)); err != nil {
		return 0, err
	}
	return check.Result(pkg, "subsidence", units.Length(h.contraction()*2/math.Sqrt(math.Pi)*h.diffusion(age)))
}

// contraction returns ρα (T_m-T_s)/(ρ-ρ_w).
func (h HalfSpace) contraction() float64 {
	m := h.Material
	return float64(m.Density) * float64(m.Expansivity) * h.drop() / float64(m.Density-h.Overburden)
}

// AgeOfHeatFlux returns the age at which the heat flux is q.
func (h HalfSpace) AgeOfHeatFlux(q units.HeatFlux) (units.Time, error) {
	if err := check.First(h.Check(), check.Positive(pkg, "heat flux", q)); err != nil {
		return 0, err
	}
	x := float64(h.Material.Conductivity) * h.drop() / float64(q)
	return check.Result(pkg, "age", units.Time(x*x/(math.Pi*diffusivity(h.Material))))
}

// AgeOfSubsidence returns the age at which the surface has subsided by s.
func (h HalfSpace) AgeOfSubsidence(s units.Length) (units.Time, error) {
	if err := check.First(h.Check(), check.NotNegative(pkg, "subsidence", s), check.Positive(pkg, "Material.Expansivity", h.Material.Expansivity)); err != nil {
		return 0, err
	}
	x := float64(s) / h.contraction()
	return check.Result(pkg, "age", units.Time(x*x*math.Pi/(4*diffusivity(h.Material))))
}
