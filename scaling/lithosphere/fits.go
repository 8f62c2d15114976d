package lithosphere

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// SteinStein returns the plate of Stein & Stein (1992): a = 95 ± 15 km, T_m =
// 1450 ± 250 °C over a surface at 0 °C, k = 3.138 W/(m K), c = 1171 J/(kg K), ρ =
// 3330 kg/m³, α = 3.1e-5 /K, under sea water of 1000 kg/m³. The constants are from
// memory; together they give the coefficients of that paper's fits, 510 mW/m²
// √Myr and 365 m/√Myr, to 0.1%.
func SteinStein() Plate {
	return Plate{
		Material: boussinesq.Material{
			Name: "oceanic lithosphere", Source: "Stein & Stein (1992), from memory",
			Density: 3330, Expansivity: 3.1e-5, Conductivity: 3.138, SpecificHeat: 1171,
		},
		Surface: units.Celsius(0), Mantle: units.Celsius(1450), BaseDepth: 95 * units.Kilometre, Overburden: 1000,
	}
}

// SteinSteinRidge is the depth of the ridge crest that goes with [SteinStein].
const SteinSteinRidge = 2600 * units.Metre

// ParsonsSclater returns the plate of Parsons & Sclater (1977): a = 125 ± 10 km,
// T_m = 1350 ± 275 °C, α = (3.2 ± 1.1)e-5 /K (abstract; many papers quote 1333 °C);
// k, c and ρ, those of [SteinStein], are from memory.
func ParsonsSclater() Plate {
	p := SteinStein()
	p.Material.Source = "Parsons & Sclater (1977), abstract; k, c and ρ from memory"
	p.Material.Expansivity = 3.2e-5
	p.Mantle, p.BaseDepth = units.Celsius(1350), 125*units.Kilometre
	return p
}

// HeatFlowUnit is 1 µcal/(cm² s), the unit of older papers, with the
// thermochemical calorie.
const HeatFlowUnit units.HeatFlux = 41.84e-3

// SteinSteinFit returns the heat flux and the depth of the sea floor that Stein
// & Stein (1992) fitted to data; ages t in Myr:
//
//	q = 510/√t for t <= 55, 48 + 96 exp(-0.0278t) beyond, in mW/m²
//	depth = 2600 + 365 √t for t < 20, 5651 - 2473 exp(-0.0278t) beyond, in m
//
// (510, 5.65 - 2.47 exp(-t/36) and 55 read in a secondary source, the rest from
// memory). The branches do not quite meet.
func SteinSteinFit(age units.Time) (units.HeatFlux, units.Length, error) {
	if err := check.Positive(pkg, "age", age); err != nil {
		return 0, 0, err
	}
	t := age.In(units.Megayear)
	q, depth := 510/math.Sqrt(t), 2600+365*math.Sqrt(t)
	if t > 55 {
		q = 48 + 96*math.Exp(-0.0278*t)
	}
	if t >= 20 {
		depth = 5651 - 2473*math.Exp(-0.0278*t)
	}
	return units.HeatFlux(q) * units.MilliwattPerSquareMetre, units.Length(depth), nil
}

// ParsonsSclaterDepth returns the depth of the sea floor that Parsons & Sclater
// (1977, abstract) fitted to data; ages t in Myr:
//
//	2500 + 350 √t for t < 70;  6400 - 3200 exp(-t/62.8) for t > 20, in m
//
// Where both hold, the first is taken.
func ParsonsSclaterDepth(age units.Time) (units.Length, error) {
	if err := check.NotNegative(pkg, "age", age); err != nil {
		return 0, err
	}
	t := age.In(units.Megayear)
	if t < 70 {
		return units.Length(2500 + 350*math.Sqrt(t)), nil
	}
	return units.Length(6400 - 3200*math.Exp(-t/62.8)), nil
}

// ParsonsSclaterFlux returns the heat flux that Parsons & Sclater (1977,
// abstract) give, 11.3/√t in [HeatFlowUnit] for an age t in Myr, 0 < t < 120;
// beyond, the value comes with [scaling.ErrOutOfRange].
func ParsonsSclaterFlux(age units.Time) (units.HeatFlux, error) {
	if err := check.Positive(pkg, "age", age); err != nil {
		return 0, err
	}
	t := age.In(units.Megayear)
	q := units.HeatFlux(11.3/math.Sqrt(t)) * HeatFlowUnit
	if t > 120 {
		return q, fmt.Errorf("lithosphere: age is %.4g Myr, want <= 120: %w", t, scaling.ErrOutOfRange)
	}
	return q, nil
}
