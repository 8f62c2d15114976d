package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/root"
)

// The constants of Grossmann and Lohse's theory as refitted by Stevens, van der
// Poel, Grossmann and Lohse (2013), from memory.
const (
	grossmannC1 = 8.05
	grossmannC2 = 1.38
	grossmannC3 = 0.487
	grossmannC4 = 0.0252
	grossmannA  = 0.922
)

// GrossmannLohse is the heat flux of turbulent convection between rigid walls
// in a cylinder as wide as it is deep, before the ultimate regime: the solution
// of two coupled balances, of kinetic and of thermal dissipation,
//
//	(Nu-1) Ra/Pr² = c₁ Re²/g(√(Re_c/Re)) + c₂ Re³
//	Nu-1 = c₃ √(Re Pr f(X)) + c₄ Pr Re f(X),  X = (2a Nu/√Re_c) g(√(Re_c/Re))
//	f(x) = (1+x⁴)^(-1/4),  g(x) = x f(x),  Re_c = 4a²
//
// (Grossmann & Lohse 2000, 2001; constants of Stevens et al. 2013).
func GrossmannLohse() Law {
	l := grossmannLohse()
	l.Name, l.Formula, l.Quantity = "turbulent layer, heat flux", "Nu of the coupled equations", Nusselt
	l.Value = func(v Groups) float64 {
		nu, _ := grossmannLohseAt(v.Rayleigh, v.Prandtl)
		return nu
	}
	return l
}

// GrossmannLohseReynolds is the Reynolds number of the large-scale flow that
// goes with [GrossmannLohse].
func GrossmannLohseReynolds() Law {
	l := grossmannLohse()
	l.Name, l.Formula, l.Quantity = "turbulent layer, Reynolds number", "Re of the coupled equations", Reynolds
	l.Value = func(v Groups) float64 {
		_, re := grossmannLohseAt(v.Rayleigh, v.Prandtl)
		return re
	}
	return l
}

func grossmannLohse() Law {
	return Law{
		Geometry: HorizontalLayer, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: TimeDependent,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, PrandtlNumber},
		Limits: []Limit{{RayleighNumber, 1e5, 1e14}, {PrandtlNumber, 1e-3, 1e4}},
		Source: "Grossmann & Lohse (2000, 2001), Stevens et al. (2013)", Status: FromMemory,
		Note: "cylinder of unit aspect ratio; the range in Pr is common practice",
	}
}

// grossmannLohseAt solves the two balances for Nu and Re. The first gives Nu as
// a rising function of Re; put into the second it leaves one equation, which
// has a single root because the right side rises more slowly.
func grossmannLohseAt(ra, pr float64) (nu, re float64) {
	rec := 4 * grossmannA * grossmannA
	saturated := func(re float64) float64 { // g(√(Re_c/Re))
		x := math.Sqrt(rec / re)
		return x * math.Pow(1+x*x*x*x, -0.25)
	}
	kinetic := func(re float64) float64 { // Nu - 1
		return (grossmannC1*re*re/saturated(re) + grossmannC2*re*re*re) * pr * pr / ra
	}
	mismatch := func(lnRe float64) float64 {
		re := math.Exp(lnRe)
		excess := kinetic(re)
		x := 2 * grossmannA * (1 + excess) / math.Sqrt(rec) * saturated(re)
		f := math.Pow(1+x*x*x*x, -0.25)
		thermal := grossmannC3*math.Sqrt(re*pr*f) + grossmannC4*pr*re*f
		return math.Log(excess / thermal)
	}
	lnRe, err := root.Find(mismatch, math.Log(1e-8), math.Log(1e14), 0)
	if err != nil {
		return math.NaN(), math.NaN()
	}
	re = math.Exp(lnRe)
	return 1 + kinetic(re), re
}
