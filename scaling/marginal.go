package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/check"
)

// Critical Rayleigh numbers of a layer between isothermal walls and the
// horizontal wavenumbers, times depth, at which motion starts. They serve as
// the local critical number of a boundary layer, for which values from about
// 500 to 2000 are in use. Free: 27π⁴/4 and π/√2 (Rayleigh 1916). Rigid, and
// rigid with a free top: Chandrasekhar (1961), digits computed for this
// library.
const (
	CriticalFree            = 27 * math.Pi * math.Pi * math.Pi * math.Pi / 4
	CriticalRigid           = 1707.761777104718
	CriticalFreeOverRigid   = 1100.649606887677
	WavenumberFree          = math.Pi / math.Sqrt2
	WavenumberRigid         = 3.116323554821122
	WavenumberFreeOverRigid = 2.682321757693414
)

// Critical returns the critical Rayleigh number of a layer between such walls
// and the wavenumber, times depth, at which it convects first. Walls must be
// one of [Free], [Rigid] and [FreeOverRigid].
func (w Walls) Critical() (rayleigh, wavenumber float64, err error) {
	switch w {
	case Free:
		return CriticalFree, WavenumberFree, nil
	case Rigid:
		return CriticalRigid, WavenumberRigid, nil
	case FreeOverRigid:
		return CriticalFreeOverRigid, WavenumberFreeOverRigid, nil
	}
	return 0, 0, &FieldError{Package: string(pkg), Field: "walls", Value: w.String(), Want: "Free, Rigid or FreeOverRigid"}
}

// third is the exponent of laws in which the depth of the layer drops out of
// the heat flux.
const third = 1.0 / 3

// MarginalLayer is the law of two steady boundary layers, each with half of the
// temperature drop and as thick as its own stability allows:
//
//	ρ g α (ΔT/2) δ³/(κη) = Rd,  Nu = d/(2δ) = (Ra/(16 Rd))^(1/3)
//
// (Malkus 1954). Rd is the local critical Rayleigh number, walls the walls that
// it was chosen for.
func MarginalLayer(rd float64, walls Walls) Law {
	return Law{
		Name: "marginally stable boundary layers", Formula: "Nu = (Ra/(16 Rd))^(1/3)",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: walls, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 16 * rd, math.Inf(1)}},
		Source: "Malkus (1954), Howard (1966)", Status: Derived,
		Note:      "lower limit: Nu = 1",
		Prefactor: math.Cbrt(1 / (16 * rd)), Powers: []Power{{RayleighNumber, third}},
	}
}

// HowardCycle is the law of boundary layers that grow by conduction, δ = √(πκt),
// until they reach the local critical Rayleigh number Rd and fall off. The
// time-mean flux is twice the final one, so that the law is twice
// [MarginalLayer]:
//
//	Nu = (Ra/(2 Rd))^(1/3)
//
// (Howard 1966).
func HowardCycle(rd float64, walls Walls) Law {
	return Law{
		Name: "intermittent boundary layers", Formula: "Nu = (Ra/(2 Rd))^(1/3)",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: walls, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 2 * rd, math.Inf(1)}},
		Source: "Howard (1966)", Status: Derived,
		Note:      "lower limit: Nu = 1",
		Prefactor: math.Cbrt(1 / (2 * rd)), Powers: []Power{{RayleighNumber, third}},
	}
}

// WholeLayer is the form of parameterised models, Nu = (Ra/Ra_c)^β: one at the
// critical Rayleigh number of the whole layer. β = 1/3 is Malkus (1954); 0.3 is
// common practice; for plates with a strong lid far smaller values, even
// negative ones, have been argued for (Christensen 1985; Korenaga 2006; from
// memory).
func WholeLayer(critical, beta float64, walls Walls) Law {
	return Law{
		Name: "whole-layer power law", Formula: "Nu = (Ra/Ra_c)^β",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: walls, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, critical, math.Inf(1)}},
		Source: "Malkus (1954)", Status: Derived,
		Prefactor: math.Pow(critical, -beta), Powers: []Power{{RayleighNumber, beta}},
	}
}

// LocalRayleigh returns Rd = ρ g α ΔT δ³/(κη) of a boundary layer: the share of
// the temperature drop that it takes and its thickness in depths turn Ra into
// it.
func LocalRayleigh(ra, drop, thickness float64) (float64, error) {
	err := check.First(
		check.NotNegative(pkg, "Rayleigh number", ra),
		check.NotNegative(pkg, "temperature drop", drop),
		check.NotNegative(pkg, "thickness", thickness),
	)
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "local Rayleigh number", ra*drop*thickness*thickness*thickness)
}
