package scaling

import "math"

// CriticalPorous is the critical porous Rayleigh number of a wide horizontal
// layer between impermeable isothermal walls, 4π² (Horton & Rogers 1945;
// Lapwood 1948; from memory).
const CriticalPorous = 4 * math.Pi * math.Pi

// PorousElder is Nu = Ra_porous/40 (Elder 1967), within about 10% from just
// above onset to a few hundred.
func PorousElder() Law {
	return Law{
		Name: "porous layer", Formula: "Nu = Ra_porous/40",
		Quantity: Nusselt, Geometry: PorousLayer, Walls: AnyWalls, Heating: FromBelow, Rheology: PorousMedium, Flow: Steady,
		Basis: PorousRayleighNumber, Needs: []Group{PorousRayleighNumber},
		Limits: []Limit{{PorousRayleighNumber, 40, 400}},
		Source: "Elder (1967)", Status: FromMemory, Note: "about 10%",
		Prefactor: 1. / 40, Powers: []Power{{PorousRayleighNumber, 1}},
	}
}
