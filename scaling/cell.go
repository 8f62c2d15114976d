package scaling

import (
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
	"gonum.org/v1/gonum/integrate/quad"
)

// Cell is one steady roll between free isothermal walls, heated from below. It
// balances the force of its plumes with viscous stress, and the heat that they
// carry with the cooling of a half-space that moves along the walls.
type Cell struct {
	// Width is a, the width of the roll in depths: half a wavelength.
	Width float64

	// Core is the flow outside the boundary layers. Default [SineCore].
	Core Core

	// Heat says what the layer that arrives at a wall remembers. The default
	// goes with the core: forgetful for [SineCore], recirculated for the others.
	Heat Recirculation

	// StressExponent is n of a creep law, strain rate ~ stressⁿ, for a
	// [SineCore]. Default 1. The viscosity in Ra is then that at the strain rate
	// κ/d², the second invariant √(ε:ε/2) being meant.
	StressExponent float64
}

// Recirculation says how much heat a layer brings back from the last wall.
type Recirculation int

const (
	// CoreDefault is Forgetful for a [SineCore], Recirculated for the others.
	CoreDefault Recirculation = iota
	// Forgetful layers meet each wall with the temperature of the core:
	// half-space cooling.
	Forgetful
	// Recirculated layers keep the heat that their plume carried: [Exchange].
	Recirculated
)

// String returns the name of the choice.
func (r Recirculation) String() string {
	return name(int(r), "default of the core", "forgetful", "recirculated")
}

// Balance is a cell in dimensionless numbers: lengths in d, times in d²/κ,
// speeds in κ/d, stresses in ηκ/d² (η at the reference state).
type Balance struct {
	Rayleigh float64
	Width    float64

	Nusselt       float64
	SurfaceSpeed  float64 // mean of |u| along a wall
	PlumeSpeed    float64 // mean of |w| along a plume
	RMSSpeed      float64 // of the whole cell
	ResidenceTime float64 // of fluid at a wall, Width/SurfaceSpeed
	TurnoverTime  float64 // once around along walls and plumes

	// LayerThickness is that of the conductive layer with half of the drop and
	// the mean flux, 1/(2 Nu). EndThickness is the depth at the end of a wall to
	// which nine tenths of half the drop are made up, 2.326 √t for t the
	// ResidenceTime: half-space cooling.
	LayerThickness, EndThickness float64

	// PlumeFlux is the heat that one plume (its two halves) carries, per length
	// along the roll and in kΔT: Nu · Width.
	PlumeFlux float64

	// EdgeStress is the shear stress at the side of a plume and, the two being
	// in balance, the buoyancy of half a plume per height: Ra Nu a/2 over the
	// PlumeSpeed.
	EdgeStress float64

	// RMSStress is the root mean square of twice viscosity times strain rate;
	// √(Ra Nu) for n = 1. It is zero for an InviscidCore, whose stress is where
	// the core is not.
	RMSStress float64

	// Dissipation is that of the whole cell per area, Ra Nu: the work of
	// buoyancy. (Exact is Ra (Nu-1): the balance is one of Nu >> 1.)
	Dissipation float64
}

// maxStressExponent bounds n: creep laws have 1 to 5.
const maxStressExponent = 20

// Balance solves the balance of the cell at a Rayleigh number.
//
// With ∫|u| dx = A τ over a wall at amplitude A of the core, the layer takes up
// Nu a = √(Aτ) Q, Q = 1/√π for half-space cooling, and buoyancy works at the rate
// Ra Nu, which viscosity dissipates: A^(1+1/n) D. Hence
//
//	Nu = (Ra/D)^(n/(n+2)) (τQ²/a²)^((n+1)/(n+2)),
//
// Nu ~ Ra^(1/3), speed ~ Ra^(2/3), stress ~ Ra^(2/3) for n = 1.
func (c Cell) Balance(ra float64) (Balance, error) {
	n, err := c.check()
	if err != nil {
		return Balance{}, err
	}
	if err := check.Positive(pkg, "Rayleigh number", ra); err != nil {
		return Balance{}, err
	}
	a := c.Width
	core, err := c.Core.circulation(a)
	if err != nil {
		return Balance{}, err
	}
	q := 1 / math.Sqrt(math.Pi)
	if c.recirculates() {
		if q, err = Exchange(core.plume / core.plate); err != nil {
			return Balance{}, err
		}
	}
	stress := math.Sqrt(core.dissipation)
	dissipation := core.dissipation
	if n != 1 {
		dissipation, stress = sineCreep(a, n)
	}
	nu := math.Pow(ra/dissipation, n/(n+2)) * math.Pow(core.plate*q*q/(a*a), (n+1)/(n+2))
	amplitude := nu * nu * a * a / (core.plate * q * q)
	b := Balance{
		Rayleigh: ra, Width: a, Nusselt: nu,
		SurfaceSpeed: amplitude * core.plate / a, PlumeSpeed: amplitude * core.plume,
		RMSSpeed:       amplitude * math.Sqrt(core.kinetic),
		LayerThickness: 1 / (2 * nu),
		PlumeFlux:      nu * a,
		Dissipation:    ra * nu,
	}
	b.ResidenceTime = a / b.SurfaceSpeed
	b.TurnoverTime = 2 * (b.ResidenceTime + 1/b.PlumeSpeed)
	b.EndThickness = ninetyPercent * math.Sqrt(b.ResidenceTime)
	b.EdgeStress = ra * nu * a / 2 / b.PlumeSpeed
	if c.Core != InviscidCore {
		b.RMSStress = stress * math.Pow(amplitude, 1/n)
	}
	if _, err := check.Result(pkg, "balance at this Rayleigh number", b.Dissipation+b.SurfaceSpeed+b.ResidenceTime+b.EdgeStress); err != nil {
		return Balance{}, err
	}
	return b, nil
}

// ninetyPercent is 2 erf⁻¹(0.9): the 0.9 isotherm of a half-space is at this
// times √(κt).
var ninetyPercent = 2 * math.Erfinv(0.9)

func (c Cell) check() (n float64, err error) {
	n = c.StressExponent
	if n == 0 {
		n = 1
	}
	err = check.First(
		check.Within(pkg, "Cell.Width", c.Width, MinCellWidth, MaxCellWidth),
		check.Within(pkg, "Cell.StressExponent", n, 1, maxStressExponent),
	)
	switch {
	case err != nil:
	case c.Core < SineCore || c.Core > InviscidCore:
		err = &FieldError{Package: string(pkg), Field: "Cell.Core", Value: c.Core.String(), Want: "SineCore, ViscousCore or InviscidCore"}
	case c.Heat < CoreDefault || c.Heat > Recirculated:
		err = &FieldError{Package: string(pkg), Field: "Cell.Heat", Value: c.Heat.String(), Want: "CoreDefault, Forgetful or Recirculated"}
	case n != 1 && c.Core != SineCore:
		err = &FieldError{Package: string(pkg), Field: "Cell.StressExponent", Value: formatFloat(n), Want: "1 for a " + c.Core.String()}
	}
	return n, err
}

func (c Cell) recirculates() bool {
	return c.Heat == Recirculated || c.Heat == CoreDefault && c.Core != SineCore
}

// sineCreep returns the dissipation 4⟨ε^(1+1/n)⟩ and the rms stress 2⟨ε^(2/n)⟩^½
// of one mode of unit amplitude in a creeping material, with ε the second
// invariant of the strain rate and viscosity ε^(1/n-1).
func sineCreep(a, n float64) (dissipation, stress float64) {
	const points = 60
	x, w := make([]float64, points), make([]float64, points)
	quad.Legendre{}.FixedLocations(x, w, 0, 1) // a quarter of the cell, scaled
	kx, kz := math.Pi/a, math.Pi
	for i := range x {
		sx, cx := math.Sincos(math.Pi / 2 * x[i])
		for k := range x {
			sz, cz := math.Sincos(math.Pi / 2 * x[k])
			stretch := kx * kz * cx * cz
			shear := (kx*kx - kz*kz) / 2 * sx * sz
			rate := math.Hypot(stretch, shear)
			dissipation += w[i] * w[k] * 4 * math.Pow(rate, 1+1/n)
			stress += w[i] * w[k] * 4 * math.Pow(rate, 2/n)
		}
	}
	return dissipation, math.Sqrt(stress)
}

// Estimate is a [Balance] in units.
type Estimate struct {
	Balance Balance

	HeatFlux        units.HeatFlux // through either wall
	SurfaceSpeed    units.Velocity // mean along a wall
	PlumeSpeed      units.Velocity // mean along a plume
	RMSSpeed        units.Velocity
	ResidenceTime   units.Time
	TurnoverTime    units.Time
	LayerThickness  units.Length
	EndThickness    units.Length
	EdgeStress      units.Pressure
	RMSStress       units.Pressure
	PlumeHeat       units.Power // that one plume carries along the given length of roll
	MeanDissipation units.VolumetricHeating
}

// Estimate returns what the cell does in a layer between isothermal walls that
// is heated from below. PlumeHeat is for one depth of length along the roll.
func (c Cell) Estimate(l boussinesq.Layer) (Estimate, error) {
	ra, err := l.Rayleigh()
	if err != nil {
		return Estimate{}, err
	}
	scales, err := l.Scales()
	if err != nil {
		return Estimate{}, err
	}
	b, err := c.Balance(ra)
	if err != nil {
		return Estimate{}, err
	}
	return Estimate{
		Balance:         b,
		HeatFlux:        scales.HeatFlux(b.Nusselt),
		SurfaceSpeed:    scales.Velocity(b.SurfaceSpeed),
		PlumeSpeed:      scales.Velocity(b.PlumeSpeed),
		RMSSpeed:        scales.Velocity(b.RMSSpeed),
		ResidenceTime:   scales.Time(b.ResidenceTime),
		TurnoverTime:    scales.Time(b.TurnoverTime),
		LayerThickness:  scales.Length(b.LayerThickness),
		EndThickness:    scales.Length(b.EndThickness),
		EdgeStress:      scales.Stress(b.EdgeStress),
		RMSStress:       scales.Stress(b.RMSStress),
		PlumeHeat:       units.Power(float64(scales.HeatFlux(b.PlumeFlux)) * float64(l.Depth) * float64(l.Depth)),
		MeanDissipation: scales.Dissipation(b.Dissipation),
	}, nil
}
