package stability_test

import (
	"context"
	"errors"
	"fmt"
	"log"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/stability"
	"example.org/overturn/units"
)

func ExampleLayer_Critical() {
	onset, err := stability.Layer{Bottom: stability.Rigid, Top: stability.Free.Isothermal()}.Critical()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.2f at k = %.3f, wavelength %.2f depths\n", onset.Rayleigh, onset.Wavenumber, onset.Wavelength)
	// Output: Ra = 1100.65 at k = 2.682, wavelength 2.34 depths
}

// Between boundaries of fixed flux, the widest rolls set in first.
func ExampleOnset_LongWave() {
	flux := stability.Rigid.FixedFlux()
	onset, err := stability.Layer{Bottom: flux, Top: flux}.Critical()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.0f, long wave: %v, wavelength %v\n", onset.Rayleigh, onset.LongWave(), onset.Wavelength)
	// Output: Ra = 720, long wave: true, wavelength +Inf
}

// A stiff lid: viscosity falls by a factor of 1e6 from top to bottom, and is 1
// at the bottom, which the Rayleigh number is built on.
func ExampleExponential() {
	layer := stability.Layer{Viscosity: stability.Exponential(math.Log(1e6), 1)}
	onset, err := layer.Critical()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.4g at k = %.3f, strongest flow at z = %.1f\n", onset.Rayleigh, onset.Wavenumber, onset.Mode.Peak())
	// Output: Ra = 7.606e+05 at k = 5.275, strongest flow at z = 0.1
}

func ExampleSolver_Find() {
	layer := stability.Layer{Bottom: stability.Rigid, Top: stability.Free.Robin(1)}
	s, err := stability.NewSolver(layer, nil)
	if err != nil {
		log.Fatal(err)
	}
	// Surface tension alone, then with buoyancy.
	for _, ra := range []float64{0, 300} {
		o, err := s.Find(stability.Search{Number: stability.MarangoniNumber, Rayleigh: ra})
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("Ra = %3.0f: Ma = %.2f at k = %.3f\n", ra, o.Marangoni, o.Wavenumber)
	}
	// Output:
	// Ra =   0: Ma = 116.13 at k = 2.246
	// Ra = 300: Ma = 73.94 at k = 2.231
}

// A mode is a set of functions of height, times cos kx or sin kx.
func ExampleMode() {
	onset, err := stability.Layer{Bottom: stability.Rigid, Top: stability.Rigid}.Critical()
	if err != nil {
		log.Fatal(err)
	}
	m := onset.Mode
	for _, z := range []float64{0.25, 0.5} {
		fmt.Printf("z = %.2f: w = %.3f, θ = %.4f, ψ = %.3f\n", z, m.Velocity(z), m.Temperature(z), m.StreamFunction(z))
	}
	// Output:
	// z = 0.25: w = 0.565, θ = 0.0314, ψ = -0.181
	// z = 0.50: w = 1.000, θ = 0.0468, ψ = -0.321
}

// A stable gradient has no onset.
func ExampleNoOnsetError() {
	layer := stability.Layer{Base: stability.Gradient(func(z float64) float64 { return -1 - z })}
	_, err := layer.Critical()
	fmt.Println(errors.Is(err, stability.ErrNoOnset))
	// Output: true
}

func ExampleLayer_Fastest() {
	layer := stability.Layer{Bottom: stability.Rigid, Top: stability.Rigid, Prandtl: 7}
	g, err := layer.Fastest(1e5)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("wavelength %.3f, rate %.1f, a hundredfold in a time of %.4f\n", g.Wavelength, g.Rate, g.Time(100))
	// Output: wavelength 1.095, rate 530.5, a hundredfold in a time of 0.0087
}

func ExampleLayer_InBox() {
	layer := stability.Layer{Bottom: stability.Rigid, Top: stability.Rigid}
	first, second, err := layer.InBox(stability.Box{Aspect: 2.5})
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%d rolls at Ra = %.0f, %d rolls at Ra = %.0f\n", first.Rolls, first.Rayleigh, second.Rolls, second.Rayleigh)
	// Output: 3 rolls at Ra = 1804, 2 rolls at Ra = 1817
}

func ExampleShell_Critical() {
	onset, err := stability.Shell{RadiusRatio: 0.55, Inner: stability.Free, Outer: stability.Free}.Critical()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("degree %d at Ra = %.2f\n", onset.Degree, onset.Rayleigh)
	// Output: degree 3 at Ra = 711.95
}

// A dense layer 3 km thick over 2 km of buoyant rock that is ten times weaker.
func ExampleStack_Fastest() {
	s := stability.Stack{
		Bottom: stability.Rigid, Top: stability.Free, Gravity: 9.81,
		Layers: []stability.Stratum{
			{Thickness: 2000, Density: 2200, Viscosity: 1e18},
			{Thickness: 3000, Density: 2500, Viscosity: 1e19},
		},
	}
	g, err := s.Fastest()
	if err != nil {
		log.Fatal(err)
	}
	rate := units.StrainRate(g.Rate)
	fmt.Printf("wavelength %.1f km, e-folding time %.0f kyr\n", 2*math.Pi/g.Wavenumber/1000, 1/rate.In(units.PerYear)/1000)
	// Output: wavelength 9.3 km, e-folding time 227 kyr
}

func ExampleJudge() {
	syrup := boussinesq.Material{
		Density: 1420 * units.KilogramPerCubicMetre, Expansivity: 4e-4 * units.PerKelvin,
		Conductivity: 0.35 * units.WattPerMetreKelvin, SpecificHeat: 2300 * units.JoulePerKilogramKelvin,
		Viscosity: 40 * units.PascalSecond,
	}
	tank := boussinesq.Layer{
		Material: syrup, Depth: 12 * units.Centimetre, Gravity: units.StandardGravity,
		Top: units.Celsius(20), Bottom: units.Celsius(45),
	}
	v, err := stability.Judge(tank, stability.Conditions{Bottom: stability.Rigid, Top: stability.Rigid})
	if err != nil {
		log.Fatal(err)
	}
	fmt.Print(v)
	// Output:
	// The layer convects. Its Rayleigh number, 5.61e+04, is 32.9 times the critical one, 1708.
	// Convection sets in at a wavelength of 0.242 m, two rolls.
	// What grows fastest has a wavelength of 0.162 m, and grows by a factor e in 2.86 minutes.
}

func ExampleJudgeUncertain() {
	u := boussinesq.Uncertain{
		Layer: boussinesq.Layer{
			Material: boussinesq.Material{
				Density: 1420, Expansivity: 4e-4, Conductivity: 0.35, SpecificHeat: 2300, Viscosity: 40,
			},
			Depth: 4 * units.Centimetre, Gravity: units.StandardGravity,
			Top: units.Celsius(20), Bottom: units.Celsius(45),
		},
		Ranges: boussinesq.Ranges{Viscosity: boussinesq.Decades[units.DynamicViscosity](15, 150)},
	}
	odds, err := stability.JudgeUncertain(context.Background(), u,
		stability.Conditions{Bottom: stability.Rigid, Top: stability.Rigid}, nil)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("at best values: %.1f times critical; probability %.2f\n", odds.Best.Ratio, odds.Probability)
	// Output: at best values: 1.2 times critical; probability 0.51
}
