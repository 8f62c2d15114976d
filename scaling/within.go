package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/root"
)

// MarginalTop is the temperature of a layer heated from within, all of whose
// heat passes one marginally stable boundary layer at the top:
//
//	T_i k/(H d²) = (Rd/Ra_H)^(1/4)
//
// with the local critical Rayleigh number Rd.
func MarginalTop(rd float64, walls Walls) Law {
	return Law{
		Name: "marginally stable top layer, heated from within", Formula: "T_i k/(H d²) = (Rd/Ra_H)^(1/4)",
		Quantity: HeatedTemperature, Geometry: HorizontalLayer, Walls: walls, Heating: FromWithin, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: HeatingRayleighNumber, Needs: []Group{HeatingRayleighNumber},
		// Below this the layer would be thicker than the depth.
		Limits: []Limit{{HeatingRayleighNumber, rd, math.Inf(1)}},
		Source: "scaling argument after Howard (1966)", Status: Derived,
		Note: "exponents close to -1/4 are also found by computation (Parmentier & Sotin 2000; Vilella & Kaminski 2017; " +
			"Vilella & Deschamps 2018; prefactors not known to us)",
		Prefactor: math.Pow(rd, 0.25), Powers: []Power{{HeatingRayleighNumber, -0.25}},
	}
}

// MarginalMixed is the heat flux through the top of a layer between isothermal
// walls that is heated from below and from within, both of whose boundary layers
// are marginally stable: with T the interior temperature in the drop,
//
//	Nu_top = (Ra/Rd)^(1/3) T^(4/3),  Nu_bottom = (Ra/Rd)^(1/3) (1-T)^(4/3),  Nu_top = Nu_bottom + H.
//
// It is [MarginalLayer] for H = 0. Marginal stability is confirmed for mixed
// heating once the two layers are allowed to interact (Ferrick & Korenaga 2023,
// abstract); here they are not. Above H = (Ra/Rd)^(1/3) the interior is hotter
// than the bottom and there is no value.
func MarginalMixed(rd float64, walls Walls) Law {
	l := marginalMixed(rd, walls)
	l.Name, l.Formula, l.Quantity = "marginally stable layers, mixed heating", "Nu = (Ra/Rd)^(1/3) T^(4/3), T of the balance with H", Nusselt
	l.Value = func(v Groups) float64 {
		return math.Cbrt(v.Rayleigh/rd) * math.Pow(mixedInterior(v.Heating/math.Cbrt(v.Rayleigh/rd)), 4./3)
	}
	return l
}

// MarginalMixedTemperature is the interior temperature that goes with
// [MarginalMixed], in the temperature drop.
func MarginalMixedTemperature(rd float64, walls Walls) Law {
	l := marginalMixed(rd, walls)
	l.Name, l.Formula, l.Quantity = "marginally stable layers, interior temperature", "T^(4/3) - (1-T)^(4/3) = H (Rd/Ra)^(1/3)", MeanTemperature
	l.Value = func(v Groups) float64 { return mixedInterior(v.Heating / math.Cbrt(v.Rayleigh/rd)) }
	return l
}

func marginalMixed(rd float64, walls Walls) Law {
	return Law{
		Geometry: HorizontalLayer, Walls: walls, Heating: Mixed, Rheology: Isoviscous, Flow: TimeDependent,
		// Heating may be zero, so that it is no group that must be given.
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 16 * rd, math.Inf(1)}},
		Source: "Malkus (1954), with a balance of heat", Status: Derived,
		Note: "the layers do not interact; no value above H = (Ra/Rd)^(1/3)",
	}
}

// mixedInterior solves T^(4/3) - (1-T)^(4/3) = h for 1/2 <= T <= 1.
func mixedInterior(h float64) float64 {
	if !(h >= 0 && h <= 1) {
		return math.NaN()
	}
	t, err := root.Find(func(t float64) float64 {
		return math.Pow(t, 4./3) - math.Pow(1-t, 4./3) - h
	}, 0.5, 1, 0)
	if err != nil {
		return math.NaN()
	}
	return t
}

// MixedHeating is the mean temperature of an isoviscous layer between free
// walls that is heated from below and from within,
//
//	T = 1/2 + 1.236 H^(3/4)/Ra^(1/4)
//
// (Sotin & Labrosse 1999). It is remembered but not confirmed, so that [Find]
// does not list it; [Unconfirmed] does.
func MixedHeating() Law {
	return Law{
		Name: "mixed heating, mean temperature", Formula: "T = 1/2 + 1.236 H^(3/4)/Ra^(1/4)",
		Quantity: MeanTemperature, Geometry: HorizontalLayer, Walls: Free, Heating: Mixed, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, HeatingNumber},
		Source: "Sotin & Labrosse (1999)", Status: NotConfirmed,
		Note: "constants remembered, not confirmed",
		Value: func(v Groups) float64 {
			return 0.5 + 1.236*math.Pow(v.Heating, 0.75)/math.Pow(v.Rayleigh, 0.25)
		},
	}
}

// Conduction of uniform heating over an insulated base, in H d²/k.
const (
	ConductiveBase = 1.0 / 2 // temperature of the base
	ConductiveMean = 1.0 / 3 // mean temperature
)

// Laws of which only the exponent is known to us. They compare with fitted
// exponents; [Law.At] returns [ErrExponentOnly].
func exponentLaws() []Law {
	layer := func(l Law) Law {
		if l.Geometry == AnyGeometry {
			l.Geometry = HorizontalLayer
		}
		return l
	}
	return []Law{
		layer(Law{
			Name: "mean temperature between equal walls, heated from within", Formula: "T ~ R^(-1/5)",
			Quantity: HeatedTemperature, Heating: FromWithin, Rheology: Isoviscous, Flow: TimeDependent,
			Basis: HeatingRayleighNumber, Powers: []Power{{HeatingRayleighNumber, -0.2}},
			Limits: []Limit{{PrandtlNumber, 0.01, 100}},
			Source: "Goluskin & Spiegel (2012)", Status: Abstract,
			Note: "two-dimensional, R up to 5e5 times critical",
		}),
		layer(Law{
			Name: "steady flow heated from within, variable viscosity", Formula: "Nu ~ Ra^(1/6)",
			Quantity: Nusselt, Heating: FromWithin, Rheology: ThermallyActivated, Flow: Steady,
			Basis: HeatingRayleighNumber, Powers: []Power{{HeatingRayleighNumber, 1. / 6}},
			Source: "Okuda, Takehiro & Labrosse (2025, preprint)", Status: Abstract,
			Note: "with mobile and with stagnant lids",
		}),
		layer(Law{
			Name: "steady rolls of fixed period between rigid walls", Formula: "Nu ~ Ra^(1/4)",
			Quantity: Nusselt, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: Steady,
			Basis: RayleighNumber, Powers: []Power{{RayleighNumber, 0.25}},
			Source: "Wen, Goluskin & Doering (2022)", Status: FromMemory, Note: "Pr = 1, Ra to 1e14",
		}),
		layer(Law{
			Name: "steady rolls of best period between rigid walls", Formula: "Nu ~ Ra^(1/3)",
			Quantity: Nusselt, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: Steady,
			Basis: RayleighNumber, Powers: []Power{{RayleighNumber, third}},
			Source: "Wen, Goluskin & Doering (2022)", Status: FromMemory, Note: "Pr = 1, Ra to 1e14, period chosen at each Ra",
		}),
		layer(Law{
			Name: "steady flow under a stagnant lid, asymptotic", Formula: "Nu ~ θ⁻¹ Ra_bottom^(1/5)",
			Quantity: Nusselt, Heating: FromBelow, Rheology: ThermallyActivated, Flow: Steady,
			Basis: BottomRayleighNumber, Powers: []Power{{BottomRayleighNumber, 0.2}, {FrankKamenetskiiParameter, -1}},
			Source: "Fowler (1985)", Status: Abstract, Note: "needs Ra_bottom >> θ⁵",
		}),
		layer(Law{
			Name: "high porous Rayleigh number", Formula: "Nu ~ Ra_porous",
			Geometry: PorousLayer, Quantity: Nusselt, Heating: FromBelow, Rheology: PorousMedium, Flow: TimeDependent,
			Basis: PorousRayleighNumber, Powers: []Power{{PorousRayleighNumber, 1}},
			Source: "Howard (1966), argument of marginal stability", Status: SecondHand,
		}),
	}
}
