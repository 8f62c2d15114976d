package units

import "math"

// Constants of physics, as plain numbers in SI units. "Exact" means fixed by the
// definition of the SI of 2019; the only measured one is from the CODATA
// adjustment of 2022 (Tiesinga, Mohr, Newell and Taylor, 2024).
const (
	SpeedOfLight      = 299792458       // m/s, exact
	PlanckConstant    = 6.62607015e-34  // J s, exact
	ElementaryCharge  = 1.602176634e-19 // C, exact
	BoltzmannConstant = 1.380649e-23    // J/K, exact
	AvogadroConstant  = 6.02214076e23   // 1/mol, exact

	// MolarGasConstant is R = N_A k_B, 8.314 462 618 153 24 J/(mol K), exact.
	MolarGasConstant = AvogadroConstant * BoltzmannConstant

	// StefanBoltzmannConstant is σ = 2π⁵k_B⁴/(15h³c²),
	// 5.670 374 419…e-8 W/(m² K⁴). It is irrational, and exact in that sense.
	StefanBoltzmannConstant = 2 * math.Pi * math.Pi * math.Pi * math.Pi * math.Pi *
		BoltzmannConstant * BoltzmannConstant * BoltzmannConstant * BoltzmannConstant /
		(15 * PlanckConstant * PlanckConstant * PlanckConstant * SpeedOfLight * SpeedOfLight)

	// GravitationalConstant is G in m³/(kg s²): 6.674 30(15)e-11, measured
	// (CODATA 2022, the same as in 2018), relative uncertainty
	// [GravitationalConstantUncertainty].
	GravitationalConstant = 6.67430e-11

	// GravitationalConstantUncertainty is the relative standard uncertainty of
	// [GravitationalConstant] (CODATA 2022).
	GravitationalConstantUncertainty = 2.2e-5
)

// StandardGravity is the conventional acceleration g_n on the Earth's surface,
// 9.806 65 m/s² by definition (3rd CGPM, 1901; resolution from memory).
const StandardGravity Acceleration = 9.80665

// ZeroCelsius is the temperature 0 °C, 273.15 K by definition.
const ZeroCelsius Temperature = 273.15
