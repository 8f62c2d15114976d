package scaling

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
)

// Groups holds the dimensionless groups that laws are evaluated on. A group of
// zero is not given, except for Inclination; a law that needs it says so.
//
// With ρ density, g gravity, α expansivity, d depth, κ diffusivity, k
// conductivity, η viscosity, ΔT the temperature drop and H heating per volume:
type Groups struct {
	// Rayleigh is Ra = ρ g α ΔT d³/(κη). For a plate, a cylinder or a slot the
	// length is that which the law names.
	Rayleigh float64

	// HeatingRayleigh is Ra_H = ρ g α H d⁵/(kκη). Where it is not given but
	// Rayleigh and Heating are, it is their product.
	HeatingRayleigh float64

	// InteriorRayleigh is Ra with the viscosity of the well-mixed interior,
	// BottomRayleigh and TopRayleigh with that at the walls.
	InteriorRayleigh, BottomRayleigh, TopRayleigh float64

	// PorousRayleigh is ρ g α ΔT K d/(κη) with the permeability K.
	PorousRayleigh float64

	// Prandtl is Pr = η/(ρκ); infinite for creeping flow.
	Prandtl float64

	// Heating is H d²/(k ΔT).
	Heating float64

	// FrankKamenetskii is θ = ln(η(top)/η(bottom)) for a viscosity that goes as
	// exp(-θT/ΔT), or E ΔT/(R T²) of an Arrhenius law linearised at the
	// interior temperature.
	FrankKamenetskii float64

	// StressExponent is n of a creep law, strain rate ~ stressⁿ. Not given
	// means 1.
	StressExponent float64

	// CellWidth is the width of one roll in depths: half a wavelength.
	CellWidth float64

	// Slenderness is the height of a slot over its width.
	Slenderness float64

	// Inclination is the angle of a layer against the horizontal, in radians;
	// zero is heated from below.
	Inclination float64
}

// Group names one of the [Groups].
type Group int

// The groups, and some that are made of others.
const (
	RayleighNumber Group = iota + 1
	HeatingRayleighNumber
	InteriorRayleighNumber
	BottomRayleighNumber
	TopRayleighNumber
	PorousRayleighNumber
	PrandtlNumber
	HeatingNumber
	FrankKamenetskiiParameter
	StressExponent
	CellWidth
	Slenderness
	Inclination
	SlotRayleighNumber     // Ra Pr/(0.2+Pr)
	InclinedRayleighNumber // Ra cos φ
	CellPeriod             // width of a pair of rolls, twice the CellWidth
	LidParameter           // θ/(n+1), above which a lid stagnates
	lastGroup
)

var groupNames = [...]string{
	RayleighNumber:            "Ra",
	HeatingRayleighNumber:     "Ra_H",
	InteriorRayleighNumber:    "Ra_i",
	BottomRayleighNumber:      "Ra_bottom",
	TopRayleighNumber:         "Ra_top",
	PorousRayleighNumber:      "Ra_porous",
	PrandtlNumber:             "Pr",
	HeatingNumber:             "heating H",
	FrankKamenetskiiParameter: "θ",
	StressExponent:            "stress exponent n",
	CellWidth:                 "cell width",
	Slenderness:               "slenderness",
	Inclination:               "inclination",
	SlotRayleighNumber:        "Ra Pr/(0.2+Pr)",
	InclinedRayleighNumber:    "Ra cos φ",
	CellPeriod:                "cell period",
	LidParameter:              "θ/(n+1)",
}

// String returns the symbol or name of the group.
func (g Group) String() string {
	if g >= 1 && g < lastGroup {
		return groupNames[g]
	}
	return fmt.Sprintf("Group(%d)", int(g))
}

// Of returns the value of a group, zero where it is not given.
func (g Group) Of(v Groups) float64 {
	switch g {
	case RayleighNumber:
		return v.Rayleigh
	case HeatingRayleighNumber:
		if v.HeatingRayleigh == 0 {
			return v.Rayleigh * v.Heating
		}
		return v.HeatingRayleigh
	case InteriorRayleighNumber:
		return v.InteriorRayleigh
	case BottomRayleighNumber:
		return v.BottomRayleigh
	case TopRayleighNumber:
		return v.TopRayleigh
	case PorousRayleighNumber:
		return v.PorousRayleigh
	case PrandtlNumber:
		return v.Prandtl
	case HeatingNumber:
		return v.Heating
	case FrankKamenetskiiParameter:
		return v.FrankKamenetskii
	case StressExponent:
		if v.StressExponent == 0 {
			return 1
		}
		return v.StressExponent
	case CellWidth:
		return v.CellWidth
	case Slenderness:
		return v.Slenderness
	case Inclination:
		return v.Inclination
	case SlotRayleighNumber:
		return v.Rayleigh / (1 + 0.2/v.Prandtl)
	case InclinedRayleighNumber:
		return v.Rayleigh * math.Cos(v.Inclination)
	case CellPeriod:
		return 2 * v.CellWidth
	case LidParameter:
		return v.FrankKamenetskii / (StressExponent.Of(v) + 1)
	default:
		return 0
	}
}

// with returns the groups with one of the simple groups replaced.
func (v Groups) with(g Group, x float64) Groups {
	switch g {
	case RayleighNumber:
		v.Rayleigh = x
	case HeatingRayleighNumber:
		v.HeatingRayleigh = x
	case InteriorRayleighNumber:
		v.InteriorRayleigh = x
	case BottomRayleighNumber:
		v.BottomRayleigh = x
	case TopRayleighNumber:
		v.TopRayleigh = x
	case PorousRayleighNumber:
		v.PorousRayleigh = x
	case PrandtlNumber:
		v.Prandtl = x
	case HeatingNumber:
		v.Heating = x
	case FrankKamenetskiiParameter:
		v.FrankKamenetskii = x
	case StressExponent:
		v.StressExponent = x
	case CellWidth:
		v.CellWidth = x
	case Slenderness:
		v.Slenderness = x
	case Inclination:
		v.Inclination = x
	}
	return v
}

// Check returns an error that names the first group without sense: negative or
// NaN, or infinite where only the Prandtl number may be.
func (v Groups) Check() error {
	for g := RayleighNumber; g <= Slenderness; g++ {
		x := g.Of(v)
		if g == PrandtlNumber && math.IsInf(x, 1) {
			continue
		}
		if err := check.NotNegative(pkg, "Groups: "+g.String(), x); err != nil {
			return err
		}
	}
	return check.Within(pkg, "Groups: inclination", v.Inclination, 0, math.Pi)
}

// GroupsOf returns the groups that a layer of constant properties fixes: Ra and
// H between isothermal walls that are heated from below, Ra_H where there is
// internal heating, and Pr. The width of the cells and the like are for the
// caller to add.
//
// A layer with nothing to drive convection is an error that wraps
// [boussinesq.ErrStable].
func GroupsOf(l boussinesq.Layer) (Groups, error) {
	if err := l.Check(); err != nil {
		return Groups{}, err
	}
	var v Groups
	var err error
	if l.Heating > 0 {
		if v.HeatingRayleigh, err = l.RayleighInternal(); err != nil {
			return Groups{}, err
		}
	}
	if l.Bottom > l.Top {
		if v.Rayleigh, err = l.Rayleigh(); err != nil {
			return Groups{}, err
		}
		v.Heating = v.HeatingRayleigh / v.Rayleigh
	} else if _, err := l.TemperatureScale(); err != nil {
		return Groups{}, err
	}
	if v.Prandtl, err = l.Prandtl(); err != nil {
		return Groups{}, err
	}
	return v, nil
}
