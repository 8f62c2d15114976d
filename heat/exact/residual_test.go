package exact

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/require"
)

// derivative differentiates f at x by central differences of step up to h,
// extrapolated to step zero (Ridders 1982), and returns the value of the
// smallest estimated error.
func derivative(f func(float64) float64, x, h float64) float64 {
	const rows, shrink = 12, 1.5
	var previous, row [rows]float64
	best, smallest := math.NaN(), math.Inf(1)
	for i := range rows {
		row[0] = (f(x+h) - f(x-h)) / (2 * h)
		factor := 1.0
		for j := 1; j <= i; j++ {
			factor *= shrink * shrink
			row[j] = (row[j-1]*factor - previous[j-1]) / (factor - 1)
			e := math.Max(math.Abs(row[j]-row[j-1]), math.Abs(row[j]-previous[j-1]))
			if e < smallest {
				best, smallest = row[j], e
			}
		}
		previous = row
		h /= shrink
	}
	return best
}

// moreCases are solutions with other parameters, and those that All leaves out.
// Those of freezing have their front as a line at the time of the box.
func moreCases(t *testing.T) []Case {
	rock := Material{Conductivity: 3, HeatCapacity: 4e6}
	ice := StefanTwoPhase{
		Solid: Material{2.22, 917 * 2100}, Liquid: Material{0.56, 917 * 4200}, LatentHeat: 917 * 334000,
		Surface: -10, Melting: 0, Initial: 5,
	}
	one := StefanOnePhase{Melting: 1, LatentHeat: 2}
	melt := StefanOnePhase{Material: Material{2, 3}, Surface: 1, LatentHeat: 0.2}
	magma := StefanContact{LatentHeat: 0.5, Melting: 1}
	const km, myr = 1e3, 1e6 * year
	problems := []struct {
		name       string
		p          Problem
		box        Box
		start, end float64
		lines      []float64
	}{
		{"half-space in SI", HalfSpace{Material: rock, Initial: 1623, Surface: 273}, Box{0, 50 * km, 0, 100 * km}, 20 * myr, 80 * myr, nil},
		{"half-space with flux in SI", HalfSpaceFlux{Material: rock, Initial: 273, Flux: 0.05}, Box{0, 50 * km, 0, 100 * km}, 20 * myr, 80 * myr, nil},
		{"half-space in surroundings in SI", HalfSpaceRobin{Material: rock, Initial: 300, Ambient: 250, Coefficient: 1e-4}, Box{0, 50 * km, 0, 100 * km}, 20 * myr, 80 * myr, nil},
		{"annual wave", PeriodicSurface{Material: rock, Mean: 280, Amplitude: 15, Period: year}, Box{0, 5, 0, 10}, 0, year, nil},
		{"slab late", Slab{Thickness: 2, Initial: 1, Low: 3, High: -1, Source: 5}, Box{0, 1, 0, 2}, 0.5, 1, nil},
		{"slab early in SI", Slab{Material: rock, Thickness: 95 * km, Initial: 1450, High: 1450, Source: 1e-7}, Box{0, 50 * km, 0, 95 * km}, 5 * myr, 20 * myr, nil},
		{"insulated slab late", SlabInsulated{Material: Material{2, 3}, Thickness: 0.5, Initial: 1, Low: 2, Source: 3}, Box{0, 1, 0, 0.5}, 0.3, 0.5, nil},
		{"slab in surroundings early", SlabRobin{Material: Material{2, 3}, Thickness: 2, Initial: 5, Ambient: 1, Coefficient: 7}, Box{0, 1, 0, 2}, 0.03, 0.14, nil},
		{"throughflow down", Throughflow{Material: Material{2, 3}, Thickness: 2, Velocity: -1.5, Low: 1, High: 4}, Box{0, 1, 0, 2}, 0, 0, nil},
		{"outflow", Inflow{Material: Material{0.5, 3}, Velocity: -1, Initial: 1, Surface: 4}, Box{0, 1, 0, 1}, 0.1, 0.5, nil},
		{"stagnation flow", StagnationFlow{Material: Material{0.5, 3}, Surface: 1, Far: 4}, Box{-1, 1, 0, 1}, 0, 0, nil},
		{"upflow", Upflow{Material: Material{0.5, 3}, Surface: 1, Deep: 4}, Box{-1, 1, 0, 1}, 0, 0, nil},
		{"couette heating", CouetteHeating{Material: Material{0.5, 3}, Thickness: 2, Viscosity: 3, Speed: -2, Low: 5}, Box{-1, 1, 0, 2}, 0, 0, nil},
		{"contact in SI", Contact{rock, Material{2.5, 2.9e6}, 1600, 600}, Box{0, 5 * km, -10 * km, 10 * km}, 0.2 * myr, myr, []float64{0}},
		{"gaussian", Gaussian{Material: Material{0.2, 3}, Amplitude: -3, Width: 0.3, X: 1, VZ: -2}, Box{0, 1, 0, 1}, 0, 1, nil},
		{"gaussian in rotation", GaussianRotation{Material: Material{0.2, 3}, Amplitude: -3, Width: 0.3, X: 1, Z: 0.2, Rate: -2}, Box{0, 1, 0, 1}, 0, 1, nil},
		{"gaussian in shear", GaussianShear{Material: Material{0.2, 3}, Amplitude: -3, Width: 0.3, X: -1, Z: 0.5, Rate: -2}, Box{-1, 1, -1, 1}, 0, 1, nil},
		{"line source", LineSource{Material: Material{0.2, 3}, Heat: 4, X: 1, Z: 2}, Box{0, 2, 1, 3}, 1, 4, nil},
		{"cylinder early", Cylinder{Material: Material{2, 3}, Radius: 2, Initial: 1, Surface: 4}, Box{-1.41, 1.41, -1.41, 1.41}, 1e-3, 2.2e-3, nil},
		{"cylinder late", Cylinder{Material: Material{2, 3}, Radius: 2, Initial: 1, Surface: 4}, Box{-1.41, 1.41, -1.41, 1.41}, 0.1, 2, nil},
		{"box mode", BoxMode{Material: Material{2, 3}, Width: 2, Height: 0.5, M: 3, N: 2, Amplitude: 4}, Box{0, 2, 0, 0.5}, 0, 0.02, nil},
		{"hot top, flat", HotTop{Material: Material{2, 3}, Width: 2, Height: 0.3, Top: 1, Others: 3}, Box{0, 2, 0, 0.3}, 0, 0, nil},
		{"hot top, tall", HotTop{Width: 0.5, Height: 3, Top: 1}, Box{0, 0.5, 2, 3}, 0, 0, nil},
		{"conductivity linear", ConductivityLinear{Material: Material{2, 3}, Thickness: 2, Slope: -0.2, Low: 4, High: 1}, Box{0, 1, 0, 2}, 0, 0, nil},
		{"ice", ConductivityInverse{Material: Material{Conductivity: 567}, Thickness: 20 * km, Low: 100, High: 270}, Box{0, 10 * km, 0, 20 * km}, 0, 0, nil},
		{"conductivity exponential", ConductivityExponential{Material: Material{2, 3}, Thickness: 2, Growth: -3, Low: 4, High: 1}, Box{0, 1, 0, 2}, 0, 0, nil},
		{"three layers", Layers{[]float64{1, 0.5, 2}, []float64{3, 1, 2}, 4, 1}, Box{0, 1, 0, 3.5}, 0, 0, []float64{1, 1.5}},
		{"cell", Cell{Material: Material{2, 3}, Width: 2, Height: 0.5, Velocity: -2, Decay: 3}, Box{0, 2, 0, 0.5}, 0, 1, nil},
		{"cell, isothermal", Cell{Material: Material{2, 3}, Width: 2, Height: 0.5, Sides: Isothermal, Velocity: 2, Decay: -1}, Box{0, 2, 0, 0.5}, 0, 1, nil},
		{"geotherm", Geotherm{Material: rock, Surface: 283, HeatFlow: 0.06, Source: 1e-6}, Box{0, 10 * km, 0, 40 * km}, 0, 0, nil},
		{"leveque", Leveque{Material: Material{0.2, 3}, Shear: 2, Wall: 1, Far: 3}, Box{0.5, 2, 0, 1}, 0, 0, nil},
		{"freezing", one, Box{0, 1, 0, 1}, 0.3, 0.3, []float64{one.Front(0.3)}},
		{"melting", melt, Box{0, 1, 0, 1}, 0.3, 0.3, []float64{melt.Front(0.3)}},
		{"freezing lake", ice, Box{0, 0.2, 0, 0.4}, day, day, []float64{ice.Front(day)}},
		{"freezing magma", magma, Box{0, 0.5, -1, 1}, 0.3, 0.3, []float64{magma.Front(0.3)}},
		{"manufactured, at rest", Manufactured{Walls: Walls{Top: Isothermal}, Material: Material{2, 3}, Width: 2, Height: 3}, Box{0, 2, 0, 3}, 0, 0, nil},
		{"manufactured, all insulating", Manufactured{Contrast: 9, Velocity: 3, Decay: -1}, Box{0, 1, 0, 1}, 0, 1, nil},
		{"manufactured, insulating on the right", Manufactured{Walls: Walls{Isothermal, Insulating, Isothermal, Insulating}, Contrast: 9}, Box{0, 1, 0, 1}, 0, 1, nil},
	}
	cases := make([]Case, len(problems))
	for i, p := range problems {
		s, err := p.p.Solve()
		require.NoError(t, err, p.name)
		cases[i] = Case{Name: p.name, Solution: s, Box: p.box, Start: p.start, End: p.end, ZLines: p.lines}
	}
	return cases
}

// clearance is the distance of a point from the nearest wall, and from the
// nearest line where the coefficients or the slope of the temperature jump.
func clearance(c Case, x, z float64) float64 {
	d := min(x-c.Box.Left, c.Box.Right-x, z-c.Box.Bottom, c.Box.Top-z)
	for _, line := range c.XLines {
		d = min(d, math.Abs(x-line))
	}
	for _, line := range c.ZLines {
		d = min(d, math.Abs(z-line))
	}
	return d
}

// Each solution satisfies the equation, and its flux Fourier's law, at random
// places and times.
func TestSolutionsSatisfyTheEquation(t *testing.T) {
	for _, c := range append(All(), moreCases(t)...) {
		t.Run(c.Name, func(t *testing.T) {
			random, worst := rand.New(rand.NewPCG(1, 2)), 0.0
			size := min(c.Box.Width(), c.Box.Height())
			for n := 0; n < 60; {
				x := c.Box.Left + c.Box.Width()*random.Float64()
				z := c.Box.Bottom + c.Box.Height()*random.Float64()
				time := c.Start + (c.End-c.Start)*random.Float64()
				if clearance(c, x, z) > 0.02*size {
					n++
					worst = max(worst, residual(t, c, x, z, time))
				}
			}
			t.Logf("largest relative residual %.1e", worst)
		})
	}
}

func residual(t *testing.T, c Case, x, z, time float64) float64 {
	t.Helper()
	const tolerance = 1e-9
	size := min(c.Box.Width(), c.Box.Height())
	h := 0.4 * min(clearance(c, x, z), 0.1*size)
	temperature := func(f State) float64 { return f.Temperature }
	fluxX, fluxZ := func(f State) float64 { return f.FluxX }, func(f State) float64 { return f.FluxZ }
	alongX := func(of func(State) float64) float64 {
		return derivative(func(s float64) float64 { return of(c.At(s, z, time)) }, x, h)
	}
	alongZ := func(of func(State) float64) float64 {
		return derivative(func(s float64) float64 { return of(c.At(x, s, time)) }, z, h)
	}
	f, m := c.At(x, z, time), c.Medium(x, z, time)
	slopeX, slopeZ := alongX(temperature), alongZ(temperature)
	worst := 0.0
	check := func(what string, difference, scale float64) {
		t.Helper()
		if scale == 0 && difference == 0 {
			return
		}
		r := math.Abs(difference) / scale
		worst = max(worst, r)
		if !(r <= tolerance) {
			t.Errorf("at (%.4g, %.4g) and t = %.4g: %s is off by %.3g, scale %.3g", x, z, time, what, difference, scale)
		}
	}
	k, approximate := m.Conductivity, c.Name == "leveque"
	flux := math.Abs(f.FluxX) + math.Abs(f.FluxZ) + k*math.Abs(f.Temperature)/size
	if !approximate {
		check("FluxX", f.FluxX+k*slopeX, flux)
	}
	check("FluxZ", f.FluxZ+k*slopeZ, flux)

	rate := 0.0
	if start := c.Domain().Start; !math.IsInf(start, -1) || c.End > c.Start {
		step := 0.05 * max(c.End-c.Start, 0.1*c.End)
		if !math.IsInf(start, -1) {
			step = min(step, 0.2*(time-start))
		}
		if c.Start == c.End { // the front must not pass
			step = min(step, 0.1*h/size*time)
		}
		rate = derivative(func(s float64) float64 { return c.At(x, z, s).Temperature }, time, step)
	}
	stored, carried := m.HeatCapacity*rate, m.HeatCapacity*(m.VX*slopeX+m.VZ*slopeZ)
	spreadX, spreadZ := alongX(fluxX), alongZ(fluxZ)
	scale := math.Abs(stored) + math.Abs(m.HeatCapacity*m.VX*slopeX) + math.Abs(m.HeatCapacity*m.VZ*slopeZ) +
		math.Abs(spreadX) + math.Abs(spreadZ) + math.Abs(m.Source) + flux/size
	check("the balance", stored+carried+spreadX+spreadZ-m.Source, scale)
	return worst
}

// A sphere balances with the divergence in three dimensions.
func TestSphereSatisfiesTheEquation(t *testing.T) {
	s := Sphere{Material: Material{2, 3}, Radius: 2, Initial: 1, Surface: 4}
	require.NoError(t, s.Validate())
	for _, time := range []float64{0.01, 0.1, 0.59, 0.61, 3} {
		for _, r := range []float64{0.05, 0.2, 0.37, 1, 1.7} {
			_, flux := s.At(r, time)
			slope := derivative(func(r float64) float64 { v, _ := s.At(r, time); return v }, r, 0.5*min(r, 2-r))
			rate := derivative(func(time float64) float64 { v, _ := s.At(r, time); return v }, time, 0.2*time)
			spread := derivative(func(r float64) float64 { _, q := s.At(r, time); return r * r * q }, r, 0.5*min(r, 2-r)) / (r * r)
			scale := math.Abs(flux) + 1
			if math.Abs(flux+2*slope) > 1e-9*scale || math.Abs(3*rate+spread) > 1e-9*(scale+math.Abs(spread)) {
				t.Errorf("r = %g, t = %g: flux %g, slope %g; rate %g, divergence %g", r, time, flux, slope, rate, spread)
			}
		}
	}
}
