package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/check"
)

// Bounds of the regimes of convection with strongly temperature-dependent
// viscosity, in θ/(n+1) (Solomatov 1995, from memory).
const (
	SmallContrastBound = 2 // below: as with constant viscosity; θ < 4 for n = 1
	StagnantLidBound   = 4 // above: a stagnant lid; θ > 8 for n = 1
)

// SolomatovMoresi is the heat flux of time-dependent convection under a stagnant
// lid, heated from within,
//
//	Nu = (0.31 + 0.22 n) θ^(-2(1+n)/(2+n)) Ra_i^(n/(n+2)),
//
// for a creep law of exponent n; 0.53 θ^(-4/3) Ra_i^(1/3) for n = 1 (Solomatov &
// Moresi 2000).
func SolomatovMoresi() Law {
	return Law{
		Name: "stagnant lid, time dependent", Formula: "Nu = (0.31+0.22n) θ^(-2(1+n)/(2+n)) Ra_i^(n/(n+2))",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Free, Heating: FromWithin, Rheology: ThermallyActivated, Flow: TimeDependent,
		Basis: InteriorRayleighNumber, Needs: []Group{InteriorRayleighNumber, FrankKamenetskiiParameter},
		Limits: []Limit{{LidParameter, StagnantLidBound, math.Inf(1)}},
		Source: "Solomatov & Moresi (2000)", Status: FromMemory,
		Note: "two-dimensional; the laboratory law of Davaille & Jaupart is 13% lower",
		Value: func(v Groups) float64 {
			n := StressExponent.Of(v)
			return (0.31 + 0.22*n) * math.Pow(v.FrankKamenetskii, -2*(1+n)/(2+n)) * math.Pow(v.InteriorRayleigh, n/(n+2))
		},
	}
}

// RheologicalDrop returns the temperature drop of the layer that convects under a
// stagnant lid, over the whole drop: 1.2 (n+1)/θ for a creep law of exponent n
// (Solomatov & Moresi 2000, from memory).
func RheologicalDrop(theta, n float64) (float64, error) {
	err := check.First(check.Positive(pkg, "Frank-Kamenetskii parameter", theta), check.Within(pkg, "stress exponent", n, 1, maxStressExponent))
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "rheological drop", 1.2*(n+1)/theta)
}

// StagnantLid is the general law of a marginally stable layer under a stagnant
// lid,
//
//	Nu = C θ^(-4/3) Ra_i^(1/3),  q = C k (ρ g α/(κη_i))^(1/3) ΔT_v^(4/3),
//
// with the constants of a [LidLaw] and the name of their source.
func StagnantLid(s LidLaw, source string) Law {
	return Law{
		Name: "stagnant lid, marginal layer", Formula: "Nu = C θ^(-4/3) Ra_i^(1/3)",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: AnyWalls, Heating: AnyHeating, Rheology: ThermallyActivated, Flow: TimeDependent,
		Basis: InteriorRayleighNumber, Needs: []Group{InteriorRayleighNumber, FrankKamenetskiiParameter},
		Limits: []Limit{{LidParameter, StagnantLidBound, math.Inf(1)}},
		Source: source, Status: Derived,
		Prefactor: s.Prefactor, Powers: []Power{{InteriorRayleighNumber, third}, {FrankKamenetskiiParameter, -4. / 3}},
	}
}

// DavailleJaupart is the laboratory law Nu = 0.47 θ^(-4/3) Ra_i^(1/3), measured
// in syrups cooled from above with viscosity contrasts up to 1e6 (Davaille &
// Jaupart 1993). For a planet θ is larger: that extrapolation is common, and
// the law says so by its range.
func DavailleJaupart() Law {
	l := StagnantLid(DavailleJaupartLid, "Davaille & Jaupart (1993)")
	l.Name, l.Formula, l.Status = "stagnant lid, laboratory", "Nu = 0.47 θ^(-4/3) Ra_i^(1/3)", FromMemory
	l.Walls, l.Note = Rigid, "viscosity contrast to 1e6; cooled from above"
	l.Limits = append(l.Limits, Limit{FrankKamenetskiiParameter, 0, 6 * math.Ln10})
	return l
}

// SteadyLid is the heat flux of steady convection under a stagnant lid, heated
// from below, Nu = 1.89 θ^(-1.02) Ra_bottom^0.2 (Moresi & Solomatov 1995).
func SteadyLid() Law {
	return Law{
		Name: "stagnant lid, steady", Formula: "Nu = 1.89 θ^(-1.02) Ra_bottom^0.2",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Free, Heating: FromBelow, Rheology: ThermallyActivated, Flow: Steady,
		Basis: BottomRayleighNumber, Needs: []Group{BottomRayleighNumber, FrankKamenetskiiParameter},
		Limits: []Limit{{LidParameter, StagnantLidBound, math.Inf(1)}},
		Source: "Moresi & Solomatov (1995)", Status: FromMemory, Note: "two-dimensional, square cells",
		Prefactor: 1.89, Powers: []Power{{BottomRayleighNumber, 0.2}, {FrankKamenetskiiParameter, -1.02}},
	}
}

// LidOnset is the critical Rayleigh number, with the viscosity at the bottom, of
// a layer with a strong lid: 20.9 θ⁴ for large θ (Stengel, Oliver & Booker 1982;
// Solomatov 1995).
func LidOnset() Law {
	return Law{
		Name: "onset under a stagnant lid", Formula: "Ra_bottom = 20.9 θ⁴",
		Quantity: CriticalRayleigh, Geometry: HorizontalLayer, Heating: FromBelow, Rheology: ThermallyActivated, Flow: Steady,
		Basis: FrankKamenetskiiParameter, Needs: []Group{FrankKamenetskiiParameter},
		Limits: []Limit{{LidParameter, StagnantLidBound, math.Inf(1)}},
		Source: "Stengel, Oliver & Booker (1982), Solomatov (1995)", Status: FromMemory, Note: "leading order for large θ",
		Prefactor: 20.9, Powers: []Power{{FrankKamenetskiiParameter, 4}},
	}
}

// OgawaLid is the viscosity contrast above which three-dimensional convection
// heated from below has a stagnant lid, 1.18e3 Ra_top^0.309 (Ogawa et al.
// 1991), studied for contrasts up to 1e5.
func OgawaLid() Law {
	return Law{
		Name: "bound of the stagnant lid in 3-D", Formula: "r = 1.18e3 Ra_top^0.309",
		Quantity: ViscosityContrast, Geometry: HorizontalLayer, Heating: FromBelow, Rheology: ThermallyActivated, Flow: Steady,
		Basis: TopRayleighNumber, Needs: []Group{TopRayleighNumber},
		Source: "Ogawa et al. (1991)", Status: Abstract, Note: "viscosity contrasts up to 1e5",
		Prefactor: 1.18e3, Powers: []Power{{TopRayleighNumber, 0.309}},
	}
}

// OgawaBimodal is the viscosity contrast above which whole-layer convection
// heated from below turns from rolls to three-dimensional bimodal flow,
// 3.84e6 Ra_top^(-1.35) (Ogawa et al. 1991).
func OgawaBimodal() Law {
	l := OgawaLid()
	l.Name, l.Formula = "bound of bimodal flow in 3-D", "r = 3.84e6 Ra_top^(-1.35)"
	l.Prefactor, l.Powers = 3.84e6, []Power{{TopRayleighNumber, -1.35}}
	return l
}

// YieldingLid is the viscosity contrast of a lithosphere with a yield stress
// above which its plates stop moving, 0.25 Ra_i^(1/2) (Korenaga 2010; the root is
// read in the abstract, the prefactor from memory).
func YieldingLid() Law {
	return Law{
		Name: "bound of plate motion", Formula: "contrast = 0.25 Ra_i^(1/2)",
		Quantity: ViscosityContrast, Geometry: HorizontalLayer, Heating: AnyHeating, Rheology: Pseudoplastic, Flow: TimeDependent,
		Basis: InteriorRayleighNumber, Needs: []Group{InteriorRayleighNumber},
		Source: "Korenaga (2010)", Status: FromMemory, Note: "exponent read in the abstract, prefactor from memory",
		Prefactor: 0.25, Powers: []Power{{InteriorRayleighNumber, 0.5}},
	}
}

// ConductivityFactor returns the factor by which a conductivity that falls like
// 1/T, in the given ratio between top and bottom, lowers the heat flux:
// ratio^(-0.82) (Deschamps 2021, read in the abstract).
func ConductivityFactor(ratio float64) (float64, error) {
	if !(ratio >= 1) || math.IsInf(ratio, 0) {
		return 0, &FieldError{Package: string(pkg), Field: "conductivity ratio", Value: formatFloat(ratio), Want: ">= 1 and finite"}
	}
	return math.Pow(ratio, -0.82), nil
}
