package rheology

// Tables of creep laws use megapascals, and micrometres (olivine) or metres
// (ice) for the grain size.
const (
	megapascal = 1e6
	micrometre = 1e-6
)

const (
	hirthKohlstedt    = "Hirth & Kohlstedt (2003, AGU Geophys. Monogr. 138, table 1), from memory"
	goldsbyKohlstedt  = "Goldsby & Kohlstedt (2001, JGR 106), n and p as in its abstract, A and E from memory"
	coldDislocation   = 258 // K, above which the ice turns softer
	coldGrainBoundary = 255 // K
)

// OlivineDiffusionDry is diffusion creep of dry olivine: A = 1.5e9 (MPa, µm),
// n = 1, p = 3, E = 375 ± 50 kJ/mol and V = 6 cm³/mol, the middle of the 2 to
// 10 that are in use (Hirth & Kohlstedt 2003, table 1, from memory).
func OlivineDiffusionDry() Creep {
	return Creep{
		Name: "olivine diffusion creep, dry", Source: hirthKohlstedt,
		Prefactor: 1.5e9, StressUnit: megapascal, GrainUnit: micrometre,
		StressExponent: 1, GrainExponent: 3,
		ActivationEnergy: 375e3, ActivationVolume: 6e-6,
	}
}

// OlivineDiffusionWet is diffusion creep of olivine with a given content of
// water: A = 1.0e6 (MPa, µm, H/10⁶ Si), n = 1, p = 3, r = 1, E = 335 ± 75
// kJ/mol, V = 4 cm³/mol (Hirth & Kohlstedt 2003, table 1, constant-C(OH) form,
// from memory). The table has another wet form, for a water content that
// follows the fugacity; the two must not be mixed.
func OlivineDiffusionWet() Creep {
	return Creep{
		Name: "olivine diffusion creep, wet", Source: hirthKohlstedt,
		Prefactor: 1.0e6, StressUnit: megapascal, GrainUnit: micrometre,
		StressExponent: 1, GrainExponent: 3, WaterExponent: 1,
		ActivationEnergy: 335e3, ActivationVolume: 4e-6,
	}
}

// OlivineDislocationDry is dislocation creep of dry olivine: A = 1.1e5 (MPa),
// n = 3.5 ± 0.3, E = 530 ± 4 kJ/mol and V = 14 cm³/mol, the low end of the 14
// to 27 that are in use: it is an open question (Hirth & Kohlstedt 2003, table
// 1, from memory).
func OlivineDislocationDry() Creep {
	return Creep{
		Name: "olivine dislocation creep, dry", Source: hirthKohlstedt,
		Prefactor: 1.1e5, StressUnit: megapascal,
		StressExponent:   3.5,
		ActivationEnergy: 530e3, ActivationVolume: 14e-6,
	}
}

// OlivineDislocationWet is dislocation creep of olivine with a given content
// of water: A = 90 (MPa, H/10⁶ Si), n = 3.5 ± 0.3, r = 1.2, E = 480 ± 40
// kJ/mol, V = 11 cm³/mol (Hirth & Kohlstedt 2003, table 1, constant-C(OH)
// form, from memory). See [OlivineDiffusionWet] for the other form.
func OlivineDislocationWet() Creep {
	return Creep{
		Name: "olivine dislocation creep, wet", Source: hirthKohlstedt,
		Prefactor: 90, StressUnit: megapascal,
		StressExponent: 3.5, WaterExponent: 1.2,
		ActivationEnergy: 480e3, ActivationVolume: 11e-6,
	}
}

// IceDislocation is dislocation creep of ice Ih below 258 K: A = 4.0e5 (MPa),
// n = 4.0, E = 60 kJ/mol (Goldsby & Kohlstedt 2001: n read in the abstract, A
// and E from memory). Warmer ice creeps faster than this branch says. The
// branch for it is not here: as it is remembered it misses the cold one at the
// switch by a factor of ten.
func IceDislocation() Creep {
	return Creep{
		Name: "ice dislocation creep", Source: goldsbyKohlstedt,
		Prefactor: 4.0e5, StressUnit: megapascal,
		StressExponent: 4, ActivationEnergy: 60e3,
		MaxTemperature: coldDislocation,
	}
}

// IceGrainBoundarySliding is grain-boundary sliding of ice Ih below 255 K:
// A = 3.9e-3 (MPa, m), n = 1.8, p = 1.4, E = 49 kJ/mol (Goldsby & Kohlstedt
// 2001: n and p read in the abstract, A and E from memory). It has no warm
// branch here for the reason given at [IceDislocation].
func IceGrainBoundarySliding() Creep {
	return Creep{
		Name: "ice grain-boundary sliding", Source: goldsbyKohlstedt,
		Prefactor: 3.9e-3, StressUnit: megapascal,
		StressExponent: 1.8, GrainExponent: 1.4, ActivationEnergy: 49e3,
		MaxTemperature: coldGrainBoundary,
	}
}

// IceBasalSlip is slip of ice Ih on its basal planes: A = 5.5e7 (MPa), n = 2.4,
// E = 60 kJ/mol (Goldsby & Kohlstedt 2001: n read in the abstract, A and E from
// memory). In a polycrystal it cannot act alone: it goes in series with
// [IceGrainBoundarySliding], see [Composite].
func IceBasalSlip() Creep {
	return Creep{
		Name: "ice basal slip", Source: goldsbyKohlstedt,
		Prefactor: 5.5e7, StressUnit: megapascal,
		StressExponent: 2.4, ActivationEnergy: 60e3,
	}
}

// Olivine returns the two mechanisms of dry olivine, which act side by side.
func Olivine() []Path {
	return []Path{Alone(OlivineDiffusionDry()), Alone(OlivineDislocationDry())}
}

// WetOlivine returns the two mechanisms of olivine with a given content of
// water, which act side by side.
func WetOlivine() []Path {
	return []Path{Alone(OlivineDiffusionWet()), Alone(OlivineDislocationWet())}
}

// ColdIce returns the composite creep of ice Ih below 255 K: dislocation creep
// beside grain-boundary sliding in series with basal slip (Goldsby &
// Kohlstedt 2001, eq. 3, from memory, less its diffusion creep).
func ColdIce() []Path {
	return []Path{Alone(IceDislocation()), InSeries(IceGrainBoundarySliding(), IceBasalSlip())}
}
