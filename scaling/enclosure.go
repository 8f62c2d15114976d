package scaling

import "math"

// handbook is the caution that goes with every correlation for enclosures and
// surfaces.
const handbook = "engineering correlation, scatter of 10 to 20% and more is usual: not a basis for the safety of " +
	"equipment or people; follow local codes and licensed practice"

// Correlations of the handbooks for enclosures. They condense measurements with
// a scatter of ten to twenty per cent and more. Where people or equipment
// depend on the result (hot or pressurised fluids, insulation, fire), do not
// rely on them: local codes and licensed practice decide.

// GlobeDropkin is Nu = 0.069 Ra^(1/3) Pr^0.074 for liquids in a horizontal layer
// between rigid walls (Globe & Dropkin 1959). It is a handbook correlation with
// the scatter of one: where safety depends on the result, local codes and
// licensed practice decide.
func GlobeDropkin() Law {
	return Law{
		Name: "horizontal liquid layer", Formula: "Nu = 0.069 Ra^(1/3) Pr^0.074",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 3e5, 7e9}, {PrandtlNumber, 0.02, 8750}},
		Source: "Globe & Dropkin (1959)", Status: FromMemory,
		Note:      "range of the handbooks; the paper has Ra 1.5e5 to 6.8e8; " + handbook,
		Prefactor: 0.069, Powers: []Power{{RayleighNumber, third}, {PrandtlNumber, 0.074}},
	}
}

// HollandsHorizontal is a correlation for a wide horizontal layer between rigid
// walls from conduction to turbulence,
//
//	Nu = 1 + [1-1708/Ra]⁺ (k₁ + 2 x^(1-ln x)) + [(Ra/5830)^(1/3)-1]⁺,  x = Ra^(1/3)/k₂,
//	k₁ = 1.44/(1+0.018/Pr+0.00136/Pr²),  k₂ = 75 exp(1.5/√Pr),
//
// where [y]⁺ is y or, if y is negative, zero (Hollands, Raithby & Konicek 1975).
// It is a handbook correlation with the scatter of one: where safety depends on
// the result, local codes and licensed practice decide.
func HollandsHorizontal() Law {
	return Law{
		Name:     "wide horizontal layer, all regimes",
		Formula:  "Nu = 1 + [1-1708/Ra]⁺ (k₁ + 2 x^(1-ln x)) + [(Ra/5830)^(1/3)-1]⁺, x = Ra^(1/3)/k₂",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 0, 1e9}},
		Source: "Hollands, Raithby & Konicek (1975)", Status: FromMemory,
		Note: "upper limit between 1e8 and 1e9; " + handbook,
		Value: func(v Groups) float64 {
			pr := v.Prandtl
			k1 := 1.44 / (1 + 0.018/pr + 0.00136/(pr*pr))
			x := math.Cbrt(v.Rayleigh) / (75 * math.Exp(1.5/math.Sqrt(pr)))
			return 1 + positivePart(1-1708/v.Rayleigh)*(k1+2*math.Pow(x, 1-math.Log(x))) +
				positivePart(math.Cbrt(v.Rayleigh/5830)-1)
		},
	}
}

// HollandsInclined is a correlation for air between parallel plates at an angle
// φ to the horizontal, heated from below,
//
//	Nu = 1 + 1.44 [1-1708/(Ra c)]⁺ (1-1708 sin(1.8φ)^1.6/(Ra c)) + [(Ra c/5830)^(1/3)-1]⁺,  c = cos φ
//
// (Hollands, Unny, Raithby & Konicek 1976), for gaps at least 12 times as long
// as wide and φ up to 60° (75° is also quoted). It is a handbook correlation
// with the scatter of one: where safety depends on the result, local codes and
// licensed practice decide.
func HollandsInclined() Law {
	return Law{
		Name:     "inclined air layer",
		Formula:  "Nu = 1 + 1.44 [1-1708/(Ra c)]⁺ (1-1708 sin(1.8φ)^1.6/(Ra c)) + [(Ra c/5830)^(1/3)-1]⁺, c = cos φ",
		Quantity: Nusselt, Geometry: InclinedLayer, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		// Pr of air: within the usual spread about 0.71.
		Limits: []Limit{{RayleighNumber, 0, 1e5}, {Inclination, 0, math.Pi / 3}, {Slenderness, 12, math.Inf(1)}, {PrandtlNumber, 0.68, 0.75}},
		Source: "Hollands, Unny, Raithby & Konicek (1976)", Status: FromMemory,
		Note: "for air; slenderness is length over gap; " + handbook,
		Value: func(v Groups) float64 {
			rac := v.Rayleigh * math.Cos(v.Inclination)
			sin := math.Sin(1.8 * v.Inclination)
			return 1 + 1.44*positivePart(1-1708/rac)*(1-1708*math.Pow(sin, 1.6)/rac) + positivePart(math.Cbrt(rac/5830)-1)
		},
	}
}

// CattonSquare is a correlation for slots about as tall as wide, heated on one
// side, Nu = 0.18 (Ra Pr/(0.2+Pr))^0.29 (Catton 1978); Ra on the width. It is a
// handbook correlation with the scatter of one: where safety depends on the
// result, local codes and licensed practice decide.
func CattonSquare() Law {
	return Law{
		Name: "square slot", Formula: "Nu = 0.18 (Ra Pr/(0.2+Pr))^0.29",
		Quantity: Nusselt, Geometry: Slot, Walls: Rigid, Heating: FromSide, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{Slenderness, 1, 2}, {PrandtlNumber, 1e-3, 1e5}, {SlotRayleighNumber, 1e3, math.Inf(1)}},
		Source: "Catton (1978)", Status: SecondHand, Note: handbook,
		Value: func(v Groups) float64 { return 0.18 * math.Pow(SlotRayleighNumber.Of(v), 0.29) },
	}
}

// CattonTall is a correlation for slots two to ten times as tall as wide,
// heated on one side, Nu = 0.22 (Ra Pr/(0.2+Pr))^0.28 (H/L)^(-1/4) (Catton 1978);
// Ra on the width. It is a handbook correlation with the scatter of one: where
// safety depends on the result, local codes and licensed practice decide.
func CattonTall() Law {
	return Law{
		Name: "tall slot", Formula: "Nu = 0.22 (Ra Pr/(0.2+Pr))^0.28 (H/L)^(-1/4)",
		Quantity: Nusselt, Geometry: Slot, Walls: Rigid, Heating: FromSide, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber, Slenderness},
		Limits: []Limit{{RayleighNumber, 1e3, 1e10}, {Slenderness, 2, 10}, {PrandtlNumber, 0, 1e5}},
		Source: "Catton (1978)", Status: SecondHand, Note: handbook,
		Value: func(v Groups) float64 {
			return 0.22 * math.Pow(SlotRayleighNumber.Of(v), 0.28) * math.Pow(v.Slenderness, -0.25)
		},
	}
}

// MacGregorEmery is a correlation for very tall slots, heated on one side,
// Nu = 0.42 Ra^(1/4) Pr^0.012 (H/L)^(-0.3) (MacGregor & Emery 1969); Ra on the
// width. It is a handbook correlation with the scatter of one: where safety
// depends on the result, local codes and licensed practice decide.
func MacGregorEmery() Law {
	return Law{
		Name: "very tall slot", Formula: "Nu = 0.42 Ra^(1/4) Pr^0.012 (H/L)^(-0.3)",
		Quantity: Nusselt, Geometry: Slot, Walls: Rigid, Heating: FromSide, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber, Slenderness},
		Limits: []Limit{{RayleighNumber, 1e4, 1e7}, {Slenderness, 10, 40}, {PrandtlNumber, 1, 2e4}},
		Source: "MacGregor & Emery (1969)", Status: FromMemory, Note: handbook,
		Prefactor: 0.42, Powers: []Power{{RayleighNumber, 0.25}, {PrandtlNumber, 0.012}, {Slenderness, -0.3}},
	}
}

// MacGregorEmeryTurbulent is the correlation of the same authors at high
// Rayleigh numbers, Nu = 0.046 Ra^(1/3) (MacGregor & Emery 1969); Ra on the
// width. It is a handbook correlation with the scatter of one: where safety
// depends on the result, local codes and licensed practice decide.
func MacGregorEmeryTurbulent() Law {
	return Law{
		Name: "slot, turbulent", Formula: "Nu = 0.046 Ra^(1/3)",
		Quantity: Nusselt, Geometry: Slot, Walls: Rigid, Heating: FromSide, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 1e6, 1e9}, {Slenderness, 1, 40}, {PrandtlNumber, 1, 20}},
		Source: "MacGregor & Emery (1969)", Status: FromMemory, Note: handbook,
		Prefactor: 0.046, Powers: []Power{{RayleighNumber, third}},
	}
}

func positivePart(x float64) float64 { return math.Max(0, x) }
