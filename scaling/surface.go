package scaling

import "math"

// VerticalPlateAllRegimes is a correlation for a hot vertical plate in open surroundings
// over all regimes, with Nu and Ra on its height,
//
//	Nu = (0.825 + 0.387 Ra^(1/6)/[1+(0.492/Pr)^(9/16)]^(8/27))²
//
// (Churchill & Chu 1975a). It is a handbook correlation with the scatter of
// one: where safety depends on the result, local codes and licensed practice
// decide.
func VerticalPlateAllRegimes() Law {
	return surface(Law{
		Name: "vertical plate, all regimes", Formula: "Nu = (0.825 + 0.387 Ra^(1/6)/[1+(0.492/Pr)^(9/16)]^(8/27))²",
		Geometry: VerticalPlate, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 0.1, 1e12}},
		Source: "Churchill & Chu (1975a)", Status: FromMemory, Note: handbook,
		Value: func(v Groups) float64 {
			return math.Pow(0.825+0.387*math.Pow(v.Rayleigh, 1./6)/math.Pow(prandtlFactor(0.492, v.Prandtl), 8./27), 2)
		},
	})
}

// VerticalPlateLaminar is the more exact correlation for laminar flow,
//
//	Nu = 0.68 + 0.670 Ra^(1/4)/[1+(0.492/Pr)^(9/16)]^(4/9)
//
// (Churchill & Chu 1975a). Sources differ: one prints 0.663 for 0.670 and a
// limit of 1e8. It is a handbook correlation with the scatter of one: where
// safety depends on the result, local codes and licensed practice decide.
func VerticalPlateLaminar() Law {
	return surface(Law{
		Name: "vertical plate, laminar", Formula: "Nu = 0.68 + 0.670 Ra^(1/4)/[1+(0.492/Pr)^(9/16)]^(4/9)",
		Geometry: VerticalPlate, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 0.1, 1e9}},
		Source: "Churchill & Chu (1975a)", Status: FromMemory, Note: "some print 0.663 and Ra up to 1e8; " + handbook,
		Value: func(v Groups) float64 {
			return 0.68 + 0.670*math.Pow(v.Rayleigh, 0.25)/math.Pow(prandtlFactor(0.492, v.Prandtl), 4./9)
		},
	})
}

// VerticalPlateRough are the two old power laws for vertical plates,
// 0.59 Ra^(1/4) up to Ra = 1e9 and 0.10 Ra^(1/3) above: good for a first
// estimate. They are handbook correlations with the scatter of such: where
// safety depends on the result, local codes and licensed practice decide.
func VerticalPlateRough() (laminar, turbulent Law) {
	laminar = surface(Law{
		Name: "vertical plate, rough, laminar", Formula: "Nu = 0.59 Ra^(1/4)",
		Geometry: VerticalPlate, Needs: []Group{RayleighNumber},
		// The usual lower limit, 1e4: common practice.
		Limits: []Limit{{RayleighNumber, 1e4, 1e9}},
		Source: "common practice of the handbooks", Status: SecondHand, Note: handbook,
		Prefactor: 0.59, Powers: []Power{{RayleighNumber, 0.25}},
	})
	turbulent = surface(Law{
		Name: "vertical plate, rough, turbulent", Formula: "Nu = 0.10 Ra^(1/3)",
		Geometry: VerticalPlate, Needs: []Group{RayleighNumber},
		// The usual upper limit, 1e13: common practice.
		Limits: []Limit{{RayleighNumber, 1e9, 1e13}},
		Source: "common practice of the handbooks", Status: SecondHand, Note: handbook,
		Prefactor: 0.10, Powers: []Power{{RayleighNumber, third}},
	})
	return laminar, turbulent
}

// Cylinder is a correlation for a long horizontal cylinder, with Nu and Ra on
// its diameter,
//
//	Nu = (0.60 + 0.387 Ra^(1/6)/[1+(0.559/Pr)^(9/16)]^(8/27))²
//
// (Churchill & Chu 1975b). It is a handbook correlation with the scatter of
// one: where safety depends on the result, local codes and licensed practice
// decide.
func Cylinder() Law {
	return surface(Law{
		Name: "horizontal cylinder", Formula: "Nu = (0.60 + 0.387 Ra^(1/6)/[1+(0.559/Pr)^(9/16)]^(8/27))²",
		Geometry: HorizontalCylinder, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 0, 1e12}},
		Source: "Churchill & Chu (1975b)", Status: SecondHand, Note: handbook,
		Value: func(v Groups) float64 {
			return math.Pow(0.60+0.387*math.Pow(v.Rayleigh, 1./6)/math.Pow(prandtlFactor(0.559, v.Prandtl), 8./27), 2)
		},
	})
}

// HotPlateUp are the two power laws for a hot plate that faces up, or a cold
// one that faces down: 0.54 Ra^(1/4) from 1e4 to 1e7 and 0.15 Ra^(1/3) from 1e7
// to 1e11, with the length area over perimeter. They are handbook correlations
// with the scatter of such: where safety depends on the result, local codes and
// licensed practice decide.
func HotPlateUp() (laminar, turbulent Law) {
	laminar = surface(Law{
		Name: "hot plate facing up, laminar", Formula: "Nu = 0.54 Ra^(1/4)",
		Geometry: PlateFacingUp, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 1e4, 1e7}},
		Source: "handbooks", Status: SecondHand, Note: "length is area over perimeter; " + handbook,
		Prefactor: 0.54, Powers: []Power{{RayleighNumber, 0.25}},
	})
	turbulent = surface(Law{
		Name: "hot plate facing up, turbulent", Formula: "Nu = 0.15 Ra^(1/3)",
		Geometry: PlateFacingUp, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 1e7, 1e11}},
		Source: "handbooks", Status: SecondHand, Note: "length is area over perimeter; " + handbook,
		Prefactor: 0.15, Powers: []Power{{RayleighNumber, third}},
	})
	return laminar, turbulent
}

// HotPlateDown are two laws for a hot plate that faces down, or a cold one that
// faces up, with the length area over perimeter; sources differ. The older is
// 0.27 Ra^(1/4), the newer 0.52 Ra^(1/5), both from 1e5 to 1e10. They are
// handbook correlations with the scatter of such: where safety depends on the
// result, local codes and licensed practice decide.
func HotPlateDown() (older, newer Law) {
	older = surface(Law{
		Name: "hot plate facing down, older", Formula: "Nu = 0.27 Ra^(1/4)",
		Geometry: PlateFacingDown, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 1e5, 1e10}},
		Source: "handbooks", Status: SecondHand, Note: "sources differ; length is area over perimeter; " + handbook,
		Prefactor: 0.27, Powers: []Power{{RayleighNumber, 0.25}},
	})
	newer = older
	newer.Name, newer.Formula = "hot plate facing down, newer", "Nu = 0.52 Ra^(1/5)"
	newer.Prefactor, newer.Powers = 0.52, []Power{{RayleighNumber, 0.2}}
	return older, newer
}

func surface(l Law) Law {
	l.Quantity, l.Walls, l.Heating, l.Rheology, l.Flow = Nusselt, Rigid, FromSide, Isoviscous, TimeDependent
	l.Basis = RayleighNumber
	return l
}

// prandtlFactor is 1 + (c/Pr)^(9/16).
func prandtlFactor(c, pr float64) float64 { return 1 + math.Pow(c/pr, 9./16) }
