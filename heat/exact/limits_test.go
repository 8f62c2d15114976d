package exact

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"
)

// bodies are problems of cooling and heating in bodies between z = 0 and z = 1,
// with the range that the maximum principle allows their temperatures.
func bodies() map[string]struct {
	Solution
	low, high float64
} {
	return map[string]struct {
		Solution
		low, high float64
	}{
		"half-space":                 {HalfSpace{Initial: 1, Surface: -1}, -1, 1},
		"half-space in surroundings": {HalfSpaceRobin{Initial: 1, Ambient: 3}, 1, 3},
		"slab":                       {Slab{Initial: 1, Low: -2, High: 3}, -2, 3},
		"insulated slab":             {SlabInsulated{Initial: 1, Low: -2}, -2, 1},
		"slab in surroundings":       {SlabRobin{Initial: 1, Ambient: 4, Coefficient: 10}, 1, 4},
		"inflow":                     {Inflow{Velocity: 20, Initial: 1, Surface: 2}, 1, 2},
		"outflow":                    {Inflow{Velocity: -20, Initial: 1, Surface: 2}, 1, 2},
		"contact":                    {Contact{LowerInitial: 1, UpperInitial: 2, Upper: Material{3, 4}}, 1, 2},
		"cylinder":                   {Cylinder{Initial: 1, Surface: 2}, 1, 2},
		"freezing":                   {StefanOnePhase{Melting: 1}, 0, 1},
		"freezing lake":              {StefanTwoPhase{Melting: 1, Initial: 2}, 0, 2},
		"freezing magma":             {StefanContact{Melting: 1}, 0, 1},
	}
}

// At any time, however short or long, temperatures are numbers between those of
// the data.
func TestTemperaturesStayBetweenTheData(t *testing.T) {
	for name, b := range bodies() {
		for time := 1e-300; time < 1e12; time *= 3.7 {
			for _, z := range []float64{0, 1e-300, 1e-12, 1e-3, 0.3, 0.5, 0.7, 0.999, 1 - 1e-12, 1} {
				f := b.At(0, z, time)
				if !(f.Temperature >= b.low-1e-14 && f.Temperature <= b.high+1e-14) {
					t.Fatalf("%s: T = %g at z = %g, t = %g, want between %g and %g", name, f.Temperature, z, time, b.low, b.high)
				}
				if math.IsNaN(f.FluxZ) || math.IsNaN(f.FluxX) {
					t.Fatalf("%s: flux is NaN at z = %g, t = %g", name, z, time)
				}
			}
		}
	}
}

// At t = 0 a body has its initial temperature and conducts nothing inside, and
// its surface has the temperature that it will have.
func TestInitialStates(t *testing.T) {
	for _, tt := range []struct {
		s    Solution
		want float64
	}{
		{HalfSpace{Initial: 3, Surface: 1}, 3},
		{HalfSpaceFlux{Initial: 3, Flux: 1}, 3},
		{HalfSpaceRobin{Initial: 3, Ambient: 1}, 3},
		{Slab{Initial: 3, Low: 1, High: 2, Source: 7}, 3},
		{SlabInsulated{Initial: 3, Low: 1, Source: 7}, 3},
		{SlabRobin{Initial: 3, Ambient: 1}, 3},
		{Inflow{Velocity: 2, Initial: 3, Surface: 1}, 3},
		{Inflow{Velocity: -2, Initial: 3, Surface: 1}, 3},
		{Cylinder{Initial: 3, Surface: 1}, 3},
		{Contact{LowerInitial: 1, UpperInitial: 3}, 3},
		{StefanOnePhase{Melting: 3}, 3},
		{StefanTwoPhase{Melting: 2, Initial: 3}, 3},
		{StefanContact{Melting: 3}, 3},
		{LineSource{}, 0},
	} {
		for _, z := range []float64{0.2, 0.8} {
			assert.Equal(t, State{Temperature: tt.want}, tt.s.At(0, z, 0), "%T", tt.s)
		}
	}
	assert.Equal(t, 1.0, HalfSpace{Initial: 3, Surface: 1}.At(0, 0, 0).Temperature)
	assert.Equal(t, 2.0, Slab{Initial: 3, High: 2}.At(0, 1, 0).Temperature)
	assert.Equal(t, 1.0, Cylinder{Initial: 3, Surface: 1}.At(0, 1, 0).Temperature)
	assert.Equal(t, math.Inf(1), Cylinder{Initial: 3, Surface: 1}.At(0, 1, 0).FluxZ)
	assert.Equal(t, 1.0, Contact{LowerInitial: 1, UpperInitial: 3}.At(0, -0.1, 0).Temperature)
	assert.True(t, math.IsNaN(LineSource{}.At(0, 0, 0).Temperature))
	v, q := Sphere{Initial: 3, Surface: 1}.At(0.5, 0)
	assert.Equal(t, [2]float64{3, 0}, [2]float64{v, q})
	v, _ = Sphere{Initial: 3, Surface: 1}.At(0, 0)
	assert.Equal(t, 3.0, v)
	assert.Equal(t, 3.0, Slab{Initial: 3, Low: 1, Source: 7}.Mean(0))
}

// After a long time what is steady remains, to the last bit.
func TestFinalStates(t *testing.T) {
	slab := Slab{Initial: 9, Low: 1, High: 2, Source: 8, Thickness: 2, Material: Material{Conductivity: 4}}
	f := slab.At(0, 0.5, 1e9)
	near(t, 1+0.25+8.0/4/2*0.5*1.5, f.Temperature, 1e-15, "slab")
	near(t, -4*(0.5+8.0/4*(1-0.5)), f.FluxZ, 1e-15, "flux of the slab")
	near(t, 1.5+8.0*4/4/12, slab.Mean(1e9), 1e-15, "mean of the slab")
	assert.Equal(t, State{Temperature: 4}, SlabRobin{Initial: 9, Ambient: 4}.At(0, 0.3, 1e9))
	assert.Equal(t, State{Temperature: 4}, Cylinder{Initial: 9, Surface: 4}.At(0, 0.3, 1e9))
	assert.InDelta(t, 4, HalfSpaceRobin{Initial: 9, Ambient: 4}.At(0, 1, 1e30).Temperature, 1e-13)
}

// Both ways to evaluate a solution agree where one gives way to the other.
func TestEarlyMeetsLate(t *testing.T) {
	slab := Slab{Initial: 1, Low: 0.3, High: 3, Source: 2}
	for zeta := 0.0; zeta <= 1; zeta += 0.0625 {
		early, earlySlope := slab.early(zeta, earlySlab, 2)
		late, lateSlope := slab.late(zeta, earlySlab, 2)
		assert.InDelta(t, late, early, 5e-15)
		assert.InDelta(t, lateSlope, earlySlope, 5e-14)

		s := SlabRobin{Coefficient: 3}
		near1, slope1 := robinStep(1-zeta, earlySlabRobin, 3)
		near2, slope2 := robinStep(1+zeta, earlySlabRobin, 3)
		late, lateSlope = s.late(zeta, earlySlabRobin)
		assert.InDelta(t, late, 1-near1-near2, 5e-15)
		assert.InDelta(t, lateSlope, slope1-slope2, 5e-14)

		late, lateSlope = lateCylinder(max(zeta, 0.5), earlyCylinder)
		early, earlySlope = thinLayer(max(zeta, 0.5), earlyCylinder)
		assert.InDelta(t, late, early, 2e-14)
		assert.InDelta(t, lateSlope, earlySlope, 2e-12)

		late, lateSlope = lateSphere(zeta, earlySlab)
		if zeta > 0.3 {
			early, earlySlope = earlySphere(zeta, earlySlab)
		} else {
			early, earlySlope = earlySphereCentre(zeta, earlySlab)
		}
		assert.InDelta(t, late, early, 5e-15)
		assert.InDelta(t, lateSlope, earlySlope, 5e-14)
	}
	early, earlySlope := earlySphere(0.3, 0.09)
	centre, centreSlope := earlySphereCentre(0.3, 0.09)
	assert.InDelta(t, centre, early, 1e-15)
	assert.InDelta(t, centreSlope, earlySlope, 1e-14)
	assert.InDelta(t, slab.Mean(earlySlab), slab.Mean(math.Nextafter(earlySlab, 0)), 2e-15)
	j0, j1 := sphericalBessel(0.5)
	j0Near, j1Near := sphericalBessel(math.Nextafter(0.5, 0))
	assert.InDelta(t, j0, j0Near, 1e-15)
	assert.InDelta(t, j1, j1Near, 1e-15)
}

// The mean of a slab is the integral of its temperature, and what it loses or
// gains is what passes its faces and what is produced inside.
func TestSlabKeepsItsHeat(t *testing.T) {
	m := Material{Conductivity: 2, HeatCapacity: 3}
	slab := Slab{Material: m, Thickness: 2, Initial: 1, Low: 4, High: -2, Source: 5}
	half := SlabInsulated{Material: m, Thickness: 2, Initial: 1, Low: 4, Source: 5}
	for _, time := range []float64{1e-4, 0.01, 0.3, 0.59, 0.61, 2, 9} {
		for name, s := range map[string]interface {
			Solution
			Mean(float64) float64
		}{"slab": slab, "insulated": half} {
			mean := 0.0
			for _, part := range [][2]float64{{0, 0.05}, {0.05, 0.3}, {0.3, 1.7}, {1.7, 1.95}, {1.95, 2}} {
				mean += 0.5 * quad.Fixed(func(z float64) float64 { return s.At(0, z, time).Temperature }, part[0], part[1], 200, quad.Legendre{}, 1)
			}
			near(t, mean, s.Mean(time), 1e-12, name+": mean")
			rate := derivative(s.Mean, time, 0.2*time)
			flux := s.At(0, 0, time).FluxZ - s.At(0, 2, time).FluxZ
			assert.InDelta(t, (flux+10)/6, rate, 1e-9*(1+math.Abs(flux)), "%s at %g", name, time)
		}
	}
}

// What a half-space has lost is what has passed its surface, and what is
// missing inside.
func TestHalfSpaceKeepsItsHeat(t *testing.T) {
	s := HalfSpace{Material: Material{2, 3}, Initial: 5, Surface: 1}
	missing := quad.Fixed(func(z float64) float64 { return 3 * (5 - s.At(0, z, 0.7).Temperature) }, 0, 10, 60, quad.Legendre{}, 1)
	near(t, missing, s.HeatLost(0.7), 1e-12, "heat")
	near(t, -s.At(0, 0, 0.7).FluxZ, derivative(s.HeatLost, 0.7, 0.2), 1e-11, "flux")
	near(t, -s.At(0, 0, 0.7).FluxZ, 2*s.SurfaceGradient(0.7), 1e-15, "gradient")
	near(t, 1+0.9*4, s.At(0, s.IsothermDepth(0.9, 0.7), 0.7).Temperature, 1e-14, "isotherm")
	assert.True(t, math.IsNaN(s.IsothermDepth(1.1, 1)))
	assert.True(t, math.IsNaN(s.IsothermDepth(-0.1, 1)))
	assert.Zero(t, s.IsothermDepth(0, 1))
}

// Temperatures that are one by an identity of their series.
func TestIdentities(t *testing.T) {
	for _, time := range []float64{0.02, 0.05, 0.3} {
		v, _ := Sphere{Initial: 1}.At(0.5, time)
		near(t, SlabInsulated{Initial: 1}.At(0, 1, 4*time).Temperature, v, 1e-14, "the sphere halfway is the base of a slab")
	}
	// The centre of a box with one hot side has the mean of four sides.
	near(t, 0.25, HotTop{Top: 1}.At(0.5, 0.5, 0).Temperature, 1e-15, "the centre of a square")
	near(t, 2.25, HotTop{Width: 3, Height: 3, Top: 3, Others: 2}.At(1.5, 1.5, 0).Temperature, 1e-15, "the centre of a square")
	// A strongly cooled face is held at the temperature of the surroundings.
	held, cooled := Slab{Thickness: 2, Initial: 1}, SlabRobin{Initial: 1, Coefficient: 1e13}
	assert.InDelta(t, held.At(0, 1.4, 0.2).Temperature, cooled.At(0, 0.4, 0.2).Temperature, 1e-12)
	assert.InDelta(t, HalfSpace{Initial: 1}.At(0, 1, 0.1).Temperature, HalfSpaceRobin{Initial: 1, Coefficient: 1e14}.At(0, 1, 0.1).Temperature, 1e-12)
	// Two bodies alike touch at the mean of their temperatures.
	near(t, 2, Contact{LowerInitial: 1, UpperInitial: 3}.Interface(), 1e-15, "contact")
	// Without superheat the lake is the half-space of one phase.
	one := StefanOnePhase{Melting: 1, LatentHeat: 3}
	near(t, one.Lambda(), StefanTwoPhase{Melting: 1, Initial: 1, LatentHeat: 3}.Lambda(), 1e-15, "λ")
	// A spot that is born as a point.
	point, spot := LineSource{Material: Material{2, 3}, Heat: 5, X: 1}, Gaussian{Material: Material{2, 3}, Width: 1e-9, Amplitude: 5 / (6 * math.Pi) * 1e18, X: 1}
	near(t, spot.At(0.5, 0.3, 0.1).Temperature, point.At(0.5, 0.3, 0.1).Temperature, 1e-12, "line source")
	// In a fluid at rest all three spots are the same.
	rest := Gaussian{Width: 0.3, X: 0.1, Z: -0.2}.At(0.4, 0.1, 0.05)
	assert.Equal(t, rest, GaussianRotation{Width: 0.3, X: 0.1, Z: -0.2}.At(0.4, 0.1, 0.05))
	assert.Equal(t, rest, GaussianShear{Width: 0.3, X: 0.1, Z: -0.2}.At(0.4, 0.1, 0.05))
	// Without a velocity there is no throughflow, and little of it is no jump.
	near(t, Throughflow{High: 1}.At(0, 0.3, 0).Temperature, Throughflow{High: 1, Velocity: 1e-300}.At(0, 0.3, 0).Temperature, 1e-15, "Pe of nothing")
	// An infinite wave takes the phase of its depth.
	wave := PeriodicSurface{}
	near(t, -math.Exp(-math.Pi), wave.At(0, math.Pi*wave.SkinDepth(), 0).Temperature, 1e-14, "half a wavelength down")
	// The flux leads the temperature by an eighth of a period.
	near(t, wave.FluxAmplitude(), wave.At(0, 0, -0.125).FluxZ, 1e-14, "flux at its highest")
	near(t, 6, PeriodicSurface{Amplitude: -3, Period: math.Pi / 2}.FluxAmplitude(), 1e-15, "of negative amplitude")
}

// The walls of problems that name what holds there.
func TestSurfaces(t *testing.T) {
	for _, time := range []float64{1e-6, 0.01, 1, 100} {
		f := HalfSpaceFlux{Material: Material{2, 3}, Flux: 5}.At(0, 0, time)
		near(t, 5, f.FluxZ, 1e-15, "flux")
		f = HalfSpaceRobin{Material: Material{2, 3}, Initial: 1, Ambient: 4, Coefficient: 7}.At(0, 0, time)
		near(t, 7*(4-f.Temperature), f.FluxZ, 1e-13, "exchange")
		f = SlabRobin{Material: Material{2, 3}, Initial: 1, Ambient: 4, Coefficient: 7, Thickness: 2}.At(0, 2, time)
		assert.InDelta(t, 7*(f.Temperature-4), f.FluxZ, 1e-12)
		assert.InDelta(t, 0, SlabRobin{Initial: 1}.At(0, 0, time).FluxZ, 1e-15)
		assert.InDelta(t, 0, SlabInsulated{Initial: 1, Source: 2}.At(0, 1, time).FluxZ, 1e-14)
		f = Slab{Initial: 1, Low: 4, High: 5, Source: 3}.At(0, 0, time)
		near(t, 4, f.Temperature, 1e-15, "low face")
		f = Slab{Initial: 1, Low: 4, High: 5, Source: 3}.At(0, 1, time)
		near(t, 5, f.Temperature, 1e-15, "high face")
		near(t, 4, Inflow{Velocity: 2, Initial: 1, Surface: 4}.At(0, 0, time).Temperature, 1e-15, "inflow")
		near(t, 4, Inflow{Velocity: -2, Initial: 1, Surface: 4}.At(0, 0, time).Temperature, 1e-15, "outflow")
		near(t, 4, Cylinder{Initial: 1, Surface: 4}.At(0.6, 0.8, time).Temperature, 1e-14, "cylinder")
		v, _ := Sphere{Initial: 1, Surface: 4}.At(1, time)
		near(t, 4, v, 1e-14, "sphere")
	}
	top := HotTop{Top: 3, Others: 1, Width: 2}
	assert.Equal(t, 3.0, top.At(0.3, 1, 0).Temperature)
	assert.Equal(t, 1.0, top.At(0.3, 0, 0).Temperature)
	assert.Equal(t, 1.0, top.At(0, 0.4, 0).Temperature)
	assert.Equal(t, 1.0, top.At(2, 0.4, 0).Temperature)
	assert.Equal(t, 1.0, top.At(0, 1, 0).Temperature)
	assert.Equal(t, -math.Inf(1), top.At(0, 1, 0).FluxX)
	assert.Equal(t, math.Inf(1), top.At(2, 1, 0).FluxX)
	assert.Equal(t, -math.Inf(1), top.At(2, 1, 0).FluxZ)
	assert.Equal(t, State{Temperature: 3}, HotTop{Top: 3, Others: 3}.At(0, 1, 0))
	assert.Equal(t, State{Temperature: 1}, HotTop{Top: 3, Others: 1, Height: 300}.At(0.3, 20, 0), "far below a hot top")
	leveque := Leveque{Wall: 2, Far: 5, Shear: 3}
	assert.Equal(t, State{2, 0, -leveque.WallGradient(0.7)}, leveque.At(0.7, 0, 0))
	assert.Equal(t, State{Temperature: 5}, leveque.At(0, 1, 0))
	assert.InDelta(t, 5, leveque.At(1, 20, 0).Temperature, 1e-15)
}

// Freezing fronts move as fast as the heat that their flux takes away lets
// them: LatentHeat dX/dt is the jump of the flux.
func TestFrontsBalance(t *testing.T) {
	ice := StefanTwoPhase{
		Solid: Material{2.22, 2.1}, Liquid: Material{0.56, 4.2}, LatentHeat: 334, Surface: -10, Initial: 5,
	}
	for stefan := 1e-6; stefan < 1e4; stefan *= 10 {
		for name, s := range map[string]struct {
			Solution
			front  func(t float64) float64
			latent float64
		}{
			"freezing": {StefanOnePhase{Material: Material{2, 1}, Melting: stefan}, StefanOnePhase{Material: Material{2, 1}, Melting: stefan}.Front, 1},
			"melting":  {StefanOnePhase{Surface: stefan}, StefanOnePhase{Surface: stefan}.Front, -1},
			"magma":    {StefanContact{Melting: stefan}, StefanContact{Melting: stefan}.Front, 1},
			"lake":     {ice, ice.Front, 334},
			"hot lake": {StefanTwoPhase{Melting: 1, Initial: 1 + stefan}, StefanTwoPhase{Melting: 1, Initial: 1 + stefan}.Front, 1},
		} {
			x := s.front(0.3)
			near(t, x*math.Sqrt(2), s.front(0.6), 1e-14, name+": front")
			behind, beyond := s.At(0, x*(1-1e-14), 0.3), s.At(0, x*(1+1e-14), 0.3)
			jump := beyond.FluxZ - behind.FluxZ
			near(t, s.latent*x/(2*0.3), jump, 1e-7, name+": balance of the front")
			assert.InDelta(t, behind.Temperature, beyond.Temperature, 1e-11*(1+stefan), name)
		}
	}
	contact := StefanContact{Melting: 3, Rock: 1}
	near(t, contact.Interface(), contact.At(0, 0, 5).Temperature, 1e-15, "contact")
	near(t, 0.5, StefanOnePhase{Melting: 2, LatentHeat: 4}.StefanNumber(), 1e-15, "Stefan number")
	// Solved beforehand or at each call: the same bits.
	for _, p := range []interface {
		Problem
		Solution
	}{ice, contact, StefanOnePhase{Melting: 1}} {
		s, err := p.Solve()
		require.NoError(t, err)
		for _, z := range []float64{0, 0.1, 0.5, 3} {
			assert.Equal(t, p.At(0, z, 0.3), s.At(0, z, 0.3))
			assert.Equal(t, p.Medium(0, z, 0.3), s.Medium(0, z, 0.3))
		}
	}
}

// In other units the numbers differ by the factor of the units, to the bit
// where that is a power of two: lengths by 2ᵃ, times by 2ᵇ, temperatures by 2ᶜ
// and heat by 2ᵈ.
func TestUnitsDoNotMatter(t *testing.T) {
	const length, time, degree, heat = 1 << 7, 1 << 10, 1 << 3, 1 << 5
	material := func(u float64) Material {
		if u == 0 {
			return Material{0.7, 1.3}
		}
		return Material{0.7 * heat / (time * length * degree), 1.3 * heat / (length * length * length * degree)}
	}
	old, scaled := material(0), material(1)
	const speed, flux = float64(length) / time, float64(heat) / (length * length * time)
	for _, tt := range []struct{ a, b Solution }{
		{HalfSpace{old, 1, 3}, HalfSpace{scaled, degree, 3 * degree}},
		{HalfSpaceFlux{old, 1, 3}, HalfSpaceFlux{scaled, degree, 3 * flux}},
		{HalfSpaceRobin{old, 1, 3, 5}, HalfSpaceRobin{scaled, degree, 3 * degree, 5 * flux / degree}},
		{Slab{old, 2, 1, 3, 4, 5}, Slab{scaled, 2 * length, degree, 3 * degree, 4 * degree, 5 * flux / length}},
		{SlabRobin{old, 2, 1, 3, 4}, SlabRobin{scaled, 2 * length, degree, 3 * degree, 4 * flux / degree}},
		{Inflow{old, 2, 1, 3}, Inflow{scaled, 2 * speed, degree, 3 * degree}},
		{Throughflow{old, 2, 1, 3, 4}, Throughflow{scaled, 2 * length, speed, 3 * degree, 4 * degree}},
		{Cylinder{old, 2, 1, 3}, Cylinder{scaled, 2 * length, degree, 3 * degree}},
		{Geotherm{old, 2, 1, 3}, Geotherm{scaled, 2 * degree, flux, 3 * flux / length}},
		{Gaussian{old, 2, 1, 3, 4, 5, 6}, Gaussian{scaled, 2 * degree, length, 3 * length, 4 * length, 5 * speed, 6 * speed}},
		{GaussianShear{old, 2, 1, 3, 4, 5}, GaussianShear{scaled, 2 * degree, length, 3 * length, 4 * length, 5.0 / time}},
		{StefanOnePhase{old, 2, 1, 3}, StefanOnePhase{scaled, 2 * heat / (1 << 21), degree, 3 * degree}},
	} {
		for _, at := range [][2]float64{{0.25, 0.01}, {0.75, 0.1}, {1.25, 0.6}} {
			f, g := tt.a.At(0.5, at[0], at[1]), tt.b.At(0.5*length, at[0]*length, at[1]*time)
			assert.Equal(t, State{f.Temperature * degree, f.FluxX * flux, f.FluxZ * flux}, g, "%T", tt.a)
		}
	}
}

// Outside their domains solutions say so.
func TestDomains(t *testing.T) {
	inf := math.Inf(1)
	for _, tt := range []struct {
		s    Solution
		want Domain
	}{
		{HalfSpace{}, Domain{-inf, inf, 0, inf, 0}},
		{HalfSpaceFlux{}, Domain{-inf, inf, 0, inf, 0}},
		{HalfSpaceRobin{}, Domain{-inf, inf, 0, inf, 0}},
		{PeriodicSurface{}, Domain{-inf, inf, 0, inf, -inf}},
		{Slab{Thickness: 3}, Domain{-inf, inf, 0, 3, 0}},
		{SlabInsulated{Thickness: 3}, Domain{-inf, inf, 0, 3, 0}},
		{SlabRobin{}, Domain{-inf, inf, 0, 1, 0}},
		{Throughflow{}, Domain{-inf, inf, 0, 1, -inf}},
		{Inflow{}, Domain{-inf, inf, 0, inf, 0}},
		{Upflow{}, Domain{-inf, inf, 0, inf, -inf}},
		{StagnationFlow{}, Domain{-inf, inf, 0, inf, -inf}},
		{CouetteHeating{}, Domain{-inf, inf, 0, 1, -inf}},
		{Leveque{}, Domain{0, inf, 0, inf, -inf}},
		{Contact{}, Domain{-inf, inf, -inf, inf, 0}},
		{StefanOnePhase{Melting: 1}, Domain{-inf, inf, 0, inf, 0}},
		{StefanTwoPhase{Melting: 1, Initial: 1}, Domain{-inf, inf, 0, inf, 0}},
		{StefanContact{Melting: 1}, Domain{-inf, inf, -inf, inf, 0}},
		{Geotherm{}, Domain{-inf, inf, 0, inf, -inf}},
		{GeothermExponential{}, Domain{-inf, inf, 0, inf, -inf}},
		{Cylinder{Radius: 2}, Domain{-2, 2, -2, 2, 0}},
		{Gaussian{}, Domain{-inf, inf, -inf, inf, 0}},
		{GaussianRotation{}, Domain{-inf, inf, -inf, inf, 0}},
		{GaussianShear{}, Domain{-inf, inf, -inf, inf, 0}},
		{LineSource{}, Domain{-inf, inf, -inf, inf, 0}},
		{BoxMode{Width: 2}, Domain{0, 2, 0, 1, -inf}},
		{HotTop{Height: 2}, Domain{0, 1, 0, 2, -inf}},
		{ConductivityLinear{}, Domain{-inf, inf, 0, 1, -inf}},
		{ConductivityInverse{}, Domain{-inf, inf, 0, 1, -inf}},
		{ConductivityExponential{}, Domain{-inf, inf, 0, 1, -inf}},
		{Layers{Thicknesses: []float64{1, 2}, Conductivities: []float64{1, 1}}, Domain{-inf, inf, 0, 3, -inf}},
		{Cell{Height: 3}, Domain{0, 1, 0, 3, -inf}},
		{Manufactured{Width: 3}, Domain{0, 3, 0, 1, -inf}},
	} {
		d := tt.s.Domain()
		assert.Equal(t, tt.want, d, "%T", tt.s)
		x, z, time := 0.5, 0.5, 0.5
		assert.False(t, math.IsNaN(tt.s.At(x, z, time).Temperature), "%T", tt.s)
		for _, out := range [][4]float64{
			{d.Left - 1, z, time, d.Left}, {d.Right + 1, z, time, d.Right},
			{x, d.Bottom - 1, time, d.Bottom}, {x, d.Top + 1, time, d.Top}, {x, z, d.Start - 1, d.Start},
			{math.NaN(), z, time, 0}, {x, math.NaN(), time, 0}, {x, z, math.NaN(), 0},
		} {
			if math.IsInf(out[3], 0) {
				continue
			}
			f := tt.s.At(out[0], out[1], out[2])
			assert.True(t, math.IsNaN(f.Temperature) && math.IsNaN(f.FluxX) && math.IsNaN(f.FluxZ), "%T at %v", tt.s, out)
		}
	}
	assert.True(t, math.IsNaN(Cylinder{}.At(0.9, 0.9, 1).Temperature), "a corner of the square about a cylinder")
	for _, out := range [][2]float64{{-0.1, 1}, {1.1, 1}, {0.5, -1}, {math.NaN(), 1}, {0.5, math.NaN()}} {
		v, q := Sphere{}.At(out[0], out[1])
		assert.True(t, math.IsNaN(v) && math.IsNaN(q), "%v", out)
	}
}

func TestLayersAreExact(t *testing.T) {
	s := Layers{Thicknesses: []float64{1, 0.5, 2}, Conductivities: []float64{2, 1, 4}, Low: 3}
	near(t, 2, s.Flux(), 1e-15, "flux through a resistance of 1.5")
	for z, want := range map[float64]float64{0: 3, 0.5: 2.5, 1: 2, 1.25: 1.5, 1.5: 1, 2.5: 0.5, 3.5: 0} {
		assert.InDelta(t, want, s.At(0, z, 0).Temperature, 1e-15, "at %g", z)
	}
	assert.Equal(t, 2.0, s.Interface(0))
	assert.Equal(t, 1.0, s.Interface(1))
	solved, err := s.Solve()
	require.NoError(t, err)
	before := solved.At(0, 2, 0)
	s.Thicknesses[0], s.Conductivities[0] = 9, 9
	assert.Equal(t, before, solved.At(0, 2, 0), "the solution has its own copy")
	assert.Equal(t, []float64{1, 4}, []float64{solved.Medium(0, 1.25, 0).Conductivity, solved.Medium(0, 3, 0).Conductivity})
	assert.Equal(t, 1.0, solved.Medium(0, 0, 0).HeatCapacity)
}

func TestMaterial(t *testing.T) {
	m := Material{Conductivity: 3, HeatCapacity: 12}
	near(t, 0.25, m.Diffusivity(), 1e-15, "diffusivity")
	near(t, 6, m.Effusivity(), 1e-15, "effusivity")
	assert.Equal(t, 1.0, Material{}.Diffusivity())
}
