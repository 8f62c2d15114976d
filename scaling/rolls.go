package scaling

import (
	"math"
	"strconv"
)

// FreeRolls is the heat flux of steady two-dimensional rolls between free walls
// as Ra → ∞,
//
//	Nu = C(a) Ra^(1/3),
//
// with C from the exact solution of the boundary layer around the core. For
// [ViscousCore], infinite Pr, C(1) = 0.19662: at Ra = 1e6 Nu/Ra^(1/3) is still
// 0.2197, twelve per cent above, and approaches C like Ra^(-0.2). For
// [InviscidCore], finite Pr, C is largest, 0.2723, at a = 0.938. For [SineCore]
// the law is that of one mode without the heat that plumes bring back,
//
//	Nu = (16/π⁶)^(1/3) (a/(1+a²))^(2/3) Ra^(1/3),
//
// eighteen per cent below that of ViscousCore at a = 1.
func FreeRolls(core Core) Law {
	l := rollLaw()
	l.Quantity, l.Walls = Nusselt, Free
	l.Value = func(v Groups) float64 {
		c, err := freeRollPrefactor(core, v.CellWidth)
		if err != nil {
			return math.NaN()
		}
		return c * math.Cbrt(v.Rayleigh)
	}
	switch core {
	case ViscousCore:
		l.Name, l.Formula = "steady rolls, free walls, infinite Pr", "Nu = C(a) Ra^(1/3), viscous core"
		l.Limits = append(l.Limits, Limit{CellWidth, MinCellWidth, MaxCellWidth}, Limit{PrandtlNumber, viscousPrandtl, math.Inf(1)})
		l.Source = "theory of Roberts (1979), Olson & Corcos (1980), Jimenez & Zufiria (1987)"
		l.Note = "C computed here; Nu/Ra^(1/3) is 12% above C at Ra = 1e6 and a = 1, 8% at 1e7; bound in Pr common practice"
	case InviscidCore:
		l.Name, l.Formula = "steady rolls, free walls, finite Pr", "Nu = C(a) Ra^(1/3), inviscid core"
		l.Limits = append(l.Limits, Limit{CellPeriod, math.Pi / 5, 4 * math.Pi}, Limit{PrandtlNumber, 0.01, 100})
		l.Source = "theory of Chini & Cox (2009); computations of Wen, Goluskin, LeDuc, Chini & Doering (2020)"
		l.Note = "C computed here; the limits are those of the computations, Ra to 1e11; slower approach at large Pr and small cells"
	default:
		l.Name, l.Formula = "one-mode loop", "Nu = (16/π⁶)^(1/3) (a/(1+a²))^(2/3) Ra^(1/3)"
		l.Limits = []Limit{{RayleighNumber, CriticalFree, math.Inf(1)}}
		l.Source, l.Note = "half-space cooling and energy balance of one mode", "18% below the viscous core at a = 1"
	}
	return l
}

// viscousPrandtl is where inertia no longer matters: common practice.
const viscousPrandtl = 100

// asymptoticRayleigh is where the asymptotic laws of steady rolls are within
// about 15% of computed flows.
const asymptoticRayleigh = 1e6

func rollLaw() Law {
	return Law{
		Geometry: HorizontalLayer, Heating: FromBelow, Rheology: Isoviscous, Flow: Steady,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber, CellWidth},
		Limits: []Limit{{RayleighNumber, asymptoticRayleigh, math.Inf(1)}},
		Powers: []Power{{RayleighNumber, third}},
		Status: Derived,
	}
}

func freeRollPrefactor(core Core, a float64) (float64, error) {
	b, err := Cell{Width: a, Core: core}.Balance(1)
	return b.Nusselt, err
}

// FreeRollsReynolds is the Reynolds number, on the rms speed and the depth, of
// the rolls of [FreeRolls] with an [InviscidCore],
//
//	Re = C(a) Ra^(2/3)/Pr,  C = √(C_Nu ⟨ψ⟩),
//
// with ⟨ψ⟩ the mean stream function at vorticity one (Chini & Cox 2009). It is
// largest, 0.1174, at a = 2.264.
func FreeRollsReynolds() Law {
	l := FreeRolls(InviscidCore)
	l.Name, l.Formula, l.Quantity = "steady rolls, free walls, finite Pr: speed", "Re = C(a) Ra^(2/3)/Pr, inviscid core", Reynolds
	l.Needs = append(l.Needs, PrandtlNumber)
	l.Powers = []Power{{RayleighNumber, 2. / 3}, {PrandtlNumber, -1}}
	l.Value = func(v Groups) float64 {
		b, err := Cell{Width: v.CellWidth, Core: InviscidCore}.Balance(1)
		if err != nil {
			return math.NaN()
		}
		return b.RMSSpeed * math.Pow(v.Rayleigh, 2./3) / v.Prandtl
	}
	return l
}

// RigidRolls is the heat flux of steady two-dimensional rolls between rigid
// walls at infinite Prandtl number as Ra → ∞,
//
//	Nu = C(a) Ra^(1/5)
//
// (exponent: Roberts 1979). C, from a layer in the shear flow at the plates, is
// leading order only, and the corrections decay extremely slowly: use it for
// exponents and trends, not for predictions.
func RigidRolls() Law {
	l := rollLaw()
	l.Name, l.Formula, l.Quantity, l.Walls = "steady rolls, rigid walls, infinite Pr", "Nu = C(a) Ra^(1/5)", Nusselt, Rigid
	l.Powers = []Power{{RayleighNumber, 0.2}}
	l.Limits = append(l.Limits, Limit{CellWidth, MinCellWidth, MaxRigidCellWidth}, Limit{PrandtlNumber, viscousPrandtl, math.Inf(1)})
	l.Source = "theory of Roberts (1979)"
	l.Note = "C computed here; corrections decay extremely slowly: for exponents and trends, not for predictions"
	l.Value = func(v Groups) float64 { return rigidRollPrefactor(v.CellWidth) * math.Pow(v.Rayleigh, 0.2) }
	return l
}

// rigidRollPrefactor balances the heat of a layer in a shear flow (Lévêque),
// Nu a = (3/4) I^(2/3)/(9^(1/3) Γ(4/3)) with I = ∫√shear dx, and the speed of the
// core, which goes as √(Ra Nu a/2).
func rigidRollPrefactor(a float64) float64 {
	core, err := rigidCores.at(a)
	if err != nil {
		return math.NaN()
	}
	heat := math.Pow(core.RootShear, 2./3) / (math.Cbrt(9) * math.Gamma(4./3))
	return math.Pow(0.75/a*math.Pow(a/2, 1./6)*heat, 1.2)
}

// BestRigidRolls is the heat flux of steady rolls between rigid walls at Pr = 7
// whose width is chosen for the largest flux at each Ra, Nu = 0.115 Ra^0.31
// (Waleffe, Boonkasame & Smith 2015).
func BestRigidRolls() Law {
	return Law{
		Name: "steady rolls of best width, rigid walls", Formula: "Nu = 0.115 Ra^0.31",
		Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Rigid, Heating: FromBelow, Rheology: Isoviscous, Flow: Steady,
		Basis: RayleighNumber, Needs: []Group{RayleighNumber},
		Limits: []Limit{{RayleighNumber, 1e7, 1e9}, {PrandtlNumber, 6, 8}},
		Source: "Waleffe, Boonkasame & Smith (2015)", Status: FromMemory,
		Note:      "exponent also read in the abstract of Sondak, Smith & Waleffe (2015); lower limit in Ra common practice",
		Prefactor: 0.115, Powers: []Power{{RayleighNumber, 0.31}},
	}
}

// BestCellWidth returns the width of a free cell with an [InviscidCore] that
// makes Nu (or, for Quantity [Reynolds], the speed) largest, and the prefactor
// of the law there.
func BestCellWidth(q Quantity) (width, prefactor float64, err error) {
	var f func(a float64) float64
	switch q {
	case Nusselt:
		f = func(a float64) float64 { c, _ := freeRollPrefactor(InviscidCore, a); return c }
	case Reynolds:
		f = func(a float64) float64 {
			b, _ := Cell{Width: a, Core: InviscidCore}.Balance(1)
			return b.RMSSpeed
		}
	default:
		return 0, 0, &FieldError{Package: string(pkg), Field: "quantity", Value: q.String(), Want: "Nusselt or Reynolds"}
	}
	width = maximum(f, 0.5, 4)
	return width, f(width), nil
}

// maximum returns where f, with one maximum between a and b, is largest. Near
// it the values alone would give half of the digits, so that the last steps fit
// a parabola to points far enough apart to see the curvature.
func maximum(f func(float64) float64, a, b float64) float64 {
	golden := (math.Sqrt(5) - 1) / 2
	for b-a > 0.02 {
		c, d := b-golden*(b-a), a+golden*(b-a)
		if f(c) > f(d) {
			b = d
		} else {
			a = c
		}
	}
	// The zero of the derivative, by differences of sixth order and secant steps.
	slope := func(x float64) float64 {
		const h = 0.02
		return (45*(f(x+h)-f(x-h)) - 9*(f(x+2*h)-f(x-2*h)) + (f(x+3*h) - f(x-3*h))) / (60 * h)
	}
	x0, x1 := a, b
	s0, s1 := slope(x0), slope(x1)
	for range 20 {
		if s1 == s0 || x0 == x1 {
			break
		}
		x0, x1, s0 = x1, x1-s1*(x1-x0)/(s1-s0), s1
		s1 = slope(x1)
		if math.Abs(x1-x0) < 1e-12 {
			break
		}
	}
	return x1
}

func formatFloat(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }
