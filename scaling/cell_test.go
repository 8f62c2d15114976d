package scaling

import (
	"math"
	"sync"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/rolls"
	"example.org/overturn/units"
)

var cells = []Cell{
	{Width: 1}, {Width: 0.4}, {Width: 2.5, Heat: Recirculated}, {Width: 1, StressExponent: 3}, {Width: 1.7, StressExponent: 3.5},
	{Width: 1, Core: ViscousCore}, {Width: 0.6, Core: ViscousCore, Heat: Forgetful}, {Width: 2, Core: ViscousCore},
	{Width: 1, Core: InviscidCore}, {Width: 2.2, Core: InviscidCore}, {Width: 0.5, Core: InviscidCore, Heat: Forgetful},
}

// The pieces multiply to the whole: heat and force are balanced by the numbers
// that the balance returns.
func TestPiecesOfTheBalance(t *testing.T) {
	for _, c := range cells {
		for _, ra := range []float64{1e5, 1e8} {
			b, err := c.Balance(ra)
			require.NoError(t, err)

			// Heat: what the layer takes up is the flux through the wall.
			q := 1 / math.Sqrt(math.Pi)
			if c.recirculates() {
				core, err := c.Core.circulation(c.Width)
				require.NoError(t, err)
				q, err = Exchange(core.plume / core.plate)
				require.NoError(t, err)
			}
			require.InEpsilon(t, b.Nusselt*c.Width, math.Sqrt(b.SurfaceSpeed*c.Width)*q, 1e-12)
			require.InEpsilon(t, b.PlumeFlux, b.Nusselt*c.Width, 1e-14)

			// Force: the work of the two half plumes, each with the buoyancy
			// EdgeStress and the speed PlumeSpeed, is the dissipation.
			require.InEpsilon(t, b.Dissipation, 2*b.EdgeStress*b.PlumeSpeed/c.Width, 1e-12)
			require.InEpsilon(t, ra*b.Nusselt, b.Dissipation, 1e-14)

			// Kinematics
			require.InEpsilon(t, c.Width, b.ResidenceTime*b.SurfaceSpeed, 1e-14)
			require.InEpsilon(t, 1, 2*b.LayerThickness*b.Nusselt, 1e-14)
			require.InEpsilon(t, 2.32617*math.Sqrt(b.ResidenceTime), b.EndThickness, 1e-5)
			require.InEpsilon(t, 2*c.Width/b.SurfaceSpeed+2/b.PlumeSpeed, b.TurnoverTime, 1e-12)
		}
	}
}

// The stress of one mode: its mean square is the dissipation for n = 1, and
// stress times strain rate is the dissipation for any n.
func TestStressOfTheBalance(t *testing.T) {
	for _, core := range []Core{SineCore, ViscousCore} {
		b, err := Cell{Width: 1.3, Core: core}.Balance(1e6)
		require.NoError(t, err)
		require.InEpsilon(t, b.Dissipation, b.RMSStress*b.RMSStress, 1e-12)
	}
	b, err := Cell{Width: 1, Core: InviscidCore}.Balance(1e6)
	require.NoError(t, err)
	require.Zero(t, b.RMSStress)

	// n = 1 by the quadrature of the general case is the closed form.
	d, s := sineCreep(1.3, 1)
	k := math.Pi * math.Pi * (1 + 1/(1.3*1.3))
	require.InEpsilon(t, k*k/4, d, 1e-12)
	require.InEpsilon(t, k/2, s, 1e-12)
	// A square cell shears nowhere along the axes: its second invariant is
	// π² |cos πx cos πz|, and means of powers of cosines are Beta functions.
	const n = 3.0
	d, _ = sineCreep(1, n)
	mean := math.Gamma((2+1/n)/2) / (math.Sqrt(math.Pi) * math.Gamma((3+1/n)/2))
	require.InEpsilon(t, 4*math.Pow(math.Pi*math.Pi, 1+1/n)*mean*mean, d, 1e-4)
}

// Exponents of the balance in Ra.
func TestBalanceScaling(t *testing.T) {
	slope := func(c Cell, f func(Balance) float64) float64 {
		a, err := c.Balance(1e6)
		require.NoError(t, err)
		b, err := c.Balance(1e9)
		require.NoError(t, err)
		return math.Log(f(b)/f(a)) / math.Log(1e3)
	}
	for _, c := range cells {
		n := max(1, c.StressExponent)
		nu := slope(c, func(b Balance) float64 { return b.Nusselt })
		require.InDelta(t, n/(n+2), nu, 1e-12)
		require.InDelta(t, 2*nu, slope(c, func(b Balance) float64 { return b.SurfaceSpeed }), 1e-12)
		require.InDelta(t, 2*nu, slope(c, func(b Balance) float64 { return b.PlumeSpeed }), 1e-12)
		require.InDelta(t, 2*nu, slope(c, func(b Balance) float64 { return b.RMSSpeed }), 1e-12)
		require.InDelta(t, -nu, slope(c, func(b Balance) float64 { return b.EndThickness }), 1e-12)
		require.InDelta(t, 1-nu, slope(c, func(b Balance) float64 { return b.EdgeStress }), 1e-12)
		if c.Core != InviscidCore {
			require.InDelta(t, 2*nu/n, slope(c, func(b Balance) float64 { return b.RMSStress }), 1e-12)
		}
	}
}

// Blankenbach et al. (1989), cases 1a to 1c: square cell, free walls, infinite
// Prandtl number; Nu and rms speed. The asymptotic theory is below them, in
// Nu by 13, 13 and 10.5% and in speed by 23, 21 and 15%.
func TestViscousCoreAgainstBenchmark(t *testing.T) {
	tests := []struct{ ra, nu, speed float64 }{
		{1e4, 4.884409, 42.864947}, {1e5, 10.534095, 193.214540}, {1e6, 21.972465, 833.989771},
	}
	speed := 0.75
	for _, tt := range tests {
		b, err := Cell{Width: 1, Core: ViscousCore}.Balance(tt.ra)
		require.NoError(t, err)
		require.InDelta(t, 0.93, b.Nusselt/tt.nu, 0.07, "Nu at Ra = %g", tt.ra)
		require.Greater(t, b.RMSSpeed/tt.speed, speed, "Ra = %g", tt.ra)
		require.Less(t, b.RMSSpeed/tt.speed, 1.0, "Ra = %g", tt.ra)
		speed = b.RMSSpeed / tt.speed
	}
	b, err := Cell{Width: 1, Core: ViscousCore}.Balance(1e6)
	require.NoError(t, err)
	require.InDelta(t, 0.1966/0.2197, b.Nusselt/21.972465, 1e-3)
}

// The layer theory is right to 0.6% at Ra = 1e6 if it is given the measured
// speeds: from a spectral run, plate and plume integrals 1.134 and 0.948 of those
// of the core (computed for this library; Nu = 21.972465 is Blankenbach et al.
// 1989).
func TestExchangeWithMeasuredSpeeds(t *testing.T) {
	core, err := ViscousCore.circulation(1)
	require.NoError(t, err)
	amplitude := math.Sqrt(1e6 * 21.972465 / 2)
	plate, plume := 1.134*amplitude*core.plate, 0.948*amplitude*core.plume
	q, err := Exchange(plume / plate)
	require.NoError(t, err)
	require.InEpsilon(t, 21.83, math.Sqrt(plate)*q, 1e-3)
}

// Wen et al. (2020, abstract): the largest heat flux at a period of about 1.9,
// the largest speed at about 4.5.
func TestBestCellWidth(t *testing.T) {
	a, c, err := BestCellWidth(Nusselt)
	require.NoError(t, err)
	require.InDelta(t, 1.9, 2*a, 0.05)
	for _, other := range []float64{0.9 * a, 0.99 * a, 1.01 * a, 1.1 * a} {
		d, err := freeRollPrefactor(InviscidCore, other)
		require.NoError(t, err)
		require.Less(t, d, c)
	}
	a, _, err = BestCellWidth(Reynolds)
	require.NoError(t, err)
	require.InDelta(t, 4.5, 2*a, 0.05)
	_, _, err = BestCellWidth(Peclet)
	require.ErrorContains(t, err, "quantity")
}

func TestCellErrors(t *testing.T) {
	for want, c := range map[string]Cell{
		"Cell.Width is 0,":          {},
		"Cell.Width is NaN,":        {Width: math.NaN()},
		"Cell.Width is 11,":         {Width: 11},
		"Cell.StressExponent is 0.": {Width: 1, StressExponent: 0.5},
		"Cell.StressExponent is 3,": {Width: 1, StressExponent: 3, Core: ViscousCore},
		"Cell.Core":                 {Width: 1, Core: 7},
		"Cell.Heat":                 {Width: 1, Heat: 7},
	} {
		_, err := c.Balance(1e6)
		require.ErrorContains(t, err, "scaling: "+want)
	}
	for _, ra := range []float64{0, -1, math.NaN(), math.Inf(1)} {
		_, err := Cell{Width: 1}.Balance(ra)
		require.ErrorContains(t, err, "Rayleigh number")
	}
	_, err := Cell{Width: 1}.Balance(1e300)
	require.ErrorContains(t, err, "range of float64")
	refuses(t, "plume ratio")(Exchange(1e-4))
	for _, bad := range []float64{0, math.NaN()} {
		_, err = SurfaceSpeed(bad, 1)
		require.Error(t, err)
		_, err = SurfaceSpeed(1, bad)
		require.Error(t, err)
		for i := range 4 {
			x := [4]float64{1, 1, 1, 1}
			x[i] = bad
			_, err = EdgeStress(x[0], x[1], x[2], x[3])
			require.Error(t, err)
		}
	}
}

func mantle() boussinesq.Layer {
	return boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000, Viscosity: 1e21},
		Depth:    1000 * units.Kilometre, Gravity: 10, Top: 300, Bottom: 1300,
	}
}

// An estimate is its balance in the units of the layer.
func TestEstimateScales(t *testing.T) {
	l := mantle()
	e, err := Cell{Width: 1.5}.Estimate(l)
	require.NoError(t, err)
	// κ = 1e-6, d = 1e6, ΔT = 1000: κ/d = 1e-12, kΔT/d = 3.3e-3, ηκ/d² = 1e3
	b := e.Balance
	require.InEpsilon(t, 3300*3e-5*10*1000*1e18/(1e-6*1e21), b.Rayleigh, 1e-12)
	require.InEpsilon(t, 3.3e-3*b.Nusselt, float64(e.HeatFlux), 1e-12)
	require.InEpsilon(t, 1e-12*b.SurfaceSpeed, float64(e.SurfaceSpeed), 1e-12)
	require.InEpsilon(t, 1e-12*b.PlumeSpeed, float64(e.PlumeSpeed), 1e-12)
	require.InEpsilon(t, 1e-12*b.RMSSpeed, float64(e.RMSSpeed), 1e-12)
	require.InEpsilon(t, 1e18*b.ResidenceTime, float64(e.ResidenceTime), 1e-12)
	require.InEpsilon(t, 1e18*b.TurnoverTime, float64(e.TurnoverTime), 1e-12)
	require.InEpsilon(t, 1e6*b.LayerThickness, float64(e.LayerThickness), 1e-12)
	require.InEpsilon(t, 1e6*b.EndThickness, float64(e.EndThickness), 1e-12)
	require.InEpsilon(t, 1e3*b.EdgeStress, float64(e.EdgeStress), 1e-12)
	require.InEpsilon(t, 1e3*b.RMSStress, float64(e.RMSStress), 1e-12)
	require.InEpsilon(t, 3.3e9*b.PlumeFlux, float64(e.PlumeHeat), 1e-12)
	require.InEpsilon(t, 1e3*1e-18*b.Dissipation, float64(e.MeanDissipation), 1e-12)
	// Dissipation over the flux of heat through the layer is Di (1-1/Nu) ~ Di.
	di, err := l.DissipationNumber()
	require.NoError(t, err)
	require.InEpsilon(t, di, float64(e.MeanDissipation)*1e6/float64(e.HeatFlux), 1e-12)

	l.Bottom = 200
	_, err = Cell{Width: 1}.Estimate(l)
	require.ErrorIs(t, err, boussinesq.ErrStable)
	refuses(t, "Cell.Width")(Cell{}.Estimate(mantle()))
}

func TestGroupsOf(t *testing.T) {
	l := mantle()
	v, err := GroupsOf(l)
	require.NoError(t, err)
	require.InEpsilon(t, 9.9e5, v.Rayleigh, 1e-12)
	require.InEpsilon(t, 1e21/(3300*1e-6), v.Prandtl, 1e-12)
	require.Zero(t, v.Heating)
	l.Heating = 3.3e-8 // H d²/(kΔT) = 3.3e-8·1e12/3300
	v, err = GroupsOf(l)
	require.NoError(t, err)
	require.InEpsilon(t, 10, v.Heating, 1e-12)
	require.InEpsilon(t, 9.9e6, v.HeatingRayleigh, 1e-12)
	l.Bottom = 0
	v, err = GroupsOf(l)
	require.NoError(t, err)
	require.Zero(t, v.Rayleigh)
	require.InEpsilon(t, 9.9e6, v.HeatingRayleigh, 1e-12)
	l.Heating, l.Bottom = 0, 200
	_, err = GroupsOf(l)
	require.ErrorIs(t, err, boussinesq.ErrStable)
	l.Depth = 0
	refuses(t, "Layer.Depth")(GroupsOf(l))
}

func TestCoolingPieces(t *testing.T) {
	q, err := CoolingFlux(3, 1000, 1e-6, 1e15)
	require.NoError(t, err)
	d, err := GradientThickness(1e-6, 1e15)
	require.NoError(t, err)
	require.InEpsilon(t, 3*1000/float64(d), float64(q), 1e-12)
	mean, err := PlateFlux(3, 1000, 1e-6, 1e-9, 1e6) // age 1e15 s at its end
	require.NoError(t, err)
	require.InEpsilon(t, 2*float64(q), float64(mean), 1e-12)
	z, err := IsothermDepth(0.5, 1e-6, 1e15)
	require.NoError(t, err)
	require.InEpsilon(t, 0.5, math.Erf(float64(z)/(2*math.Sqrt(1e9))), 1e-12)

	// The deficit is the integral of the flux; its rate is the flux.
	m := mantle().Material
	const at, dt = 1e15, 1e10
	before, err := HeatDeficit(m, 1000, at-dt)
	require.NoError(t, err)
	after, err := HeatDeficit(m, 1000, at+dt)
	require.NoError(t, err)
	flux, err := CoolingFlux(m.Conductivity, 1000, 1e-6, at)
	require.NoError(t, err)
	require.InEpsilon(t, float64(flux), (after-before)/(2*dt), 1e-6)
	pull, err := SheetPull(mantle(), 1000, at)
	require.NoError(t, err)
	// ρ α ΔT g over a thickness of 2√(κt/π)
	require.InEpsilon(t, 3300*3e-5*1000*10*2*math.Sqrt(1e9/math.Pi), float64(pull), 1e-12)
	refuses(t, "time")(HeatDeficit(m, 1000, -1))
	refuses(t, "time")(SheetPull(mantle(), 1000, -1))
	refuses(t, "Material.Density")(HeatDeficit(boussinesq.Material{}, 1000, 1))
	refuses(t, "Layer.Gravity")(SheetPull(boussinesq.Layer{}, 1000, 1))

	nan := math.NaN()
	refuses(t, "conductivity")(CoolingFlux(0, 1, 1, 1))
	refuses(t, "temperature drop")(CoolingFlux(1, units.TemperatureDifference(nan), 1, 1))
	refuses(t, "diffusivity")(CoolingFlux(1, 1, 0, 1))
	refuses(t, "time")(CoolingFlux(1, 1, 1, 0))
	refuses(t, "speed")(PlateFlux(1, 1, 1, 0, 1))
	refuses(t, "length")(PlateFlux(1, 1, 1, 1, -1))
	refuses(t, "fraction")(IsothermDepth(1, 1, 1))
	refuses(t, "diffusivity")(IsothermDepth(0.5, 0, 1))
	refuses(t, "time")(GradientThickness(1, -1))
}

// The widths that the documentation states are those that the solvers take.
func TestCellWidths(t *testing.T) {
	require.Equal(t, rolls.MinWidth, MinCellWidth)
	require.EqualValues(t, rolls.MaxFreeWidth, MaxCellWidth)
	require.Equal(t, rolls.MaxRigidWidth, MaxRigidCellWidth)
}

func TestMemoryIsSafeAndForgets(t *testing.T) {
	m := memory[float64]{compute: func(x float64) (float64, error) { return 2 * x, nil }}
	var wg sync.WaitGroup
	for w := range 4 {
		wg.Go(func() {
			for i := range 3000 {
				x := float64(w*1500 + i)
				y, err := m.at(x)
				if err != nil || y != 2*x {
					t.Error(x, y, err)
				}
			}
		})
	}
	wg.Wait()
	require.LessOrEqual(t, len(m.known), maxKnown)
}

func BenchmarkBalance(b *testing.B) {
	for _, core := range []Core{SineCore, ViscousCore, InviscidCore} {
		b.Run("core="+core.String()[:4], func(b *testing.B) {
			c := Cell{Width: 1, Core: core}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := c.Balance(1e7); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
