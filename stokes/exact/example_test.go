package exact_test

import (
	"fmt"
	"log"
	"math"

	"example.org/overturn/stokes/exact"
)

// The pressure around a stiff inclusion that is squeezed from above: high
// above and below it, low at its sides.
func Example() {
	s, err := exact.Inclusion{Radius: 1, Inside: 1000, Outside: 1, Stretch: 1}.Solve()
	if err != nil {
		log.Fatal(err)
	}
	for _, p := range [][2]float64{{0, 0.5}, {1.2, 0}, {0, 1.2}} {
		f := s.At(p[0], p[1])
		fmt.Printf("(%.1f, %.1f): velocity (%.3f, %.3f), pressure %+.3f\n", p[0], p[1], f.VX, f.VZ, f.P)
	}
	// Output:
	// (0.0, 0.5): velocity (0.000, -0.001), pressure +0.000
	// (1.2, 0.0): velocity (0.114, 0.000), pressure -2.772
	// (0.0, 1.2): velocity (0.000, -0.114), pressure +2.772
}

// What a test of a solver needs: how many cases there are, and what to tell the
// solver about the first.
func ExampleAll() {
	cases := exact.All()
	c := cases[0]
	fmt.Println(len(cases), "cases")
	fmt.Println(c.Name, "in", c.Box, "between", c.Walls.Left, "walls")
	fmt.Println("expected orders:", c.Expect.Velocity, "and", c.Expect.Pressure)
	_, bz := c.Force(0.2, 0.5)
	fmt.Printf("at (0.2, 0.5): viscosity %g, force %.4f, vz = %.5f\n", c.Viscosity(0.2, 0.5), bz, c.At(0.2, 0.5).VZ)
	// Output:
	// 19 cases
	// box mode in {0 1 0 1} between free slip walls
	// expected orders: 2 and 2
	// at (0.2, 0.5): viscosity 1, force 0.8090, vz = 0.02049
}

// How long topography of 3000 km wavelength lasts on a uniform mantle, and on
// one with a soft layer of 100 km on top.
func ExampleRelaxation() {
	const (
		km, year = 1e3, 31557600.0
		mantle   = 1e21 // Pa s
	)
	below := exact.Layer{Thickness: math.Inf(1), Viscosity: mantle}
	uniform := exact.Relaxation{
		KX:     2 * math.Pi / (3000 * km),
		Layers: []exact.Layer{below},
		Weight: 3300 * 9.8,
	}
	soft := uniform
	soft.Layers = []exact.Layer{below, {Thickness: 100 * km, Viscosity: mantle / 100}}
	for _, p := range []exact.Relaxation{uniform, soft} {
		rate, err := p.Rate()
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%d layers: topography falls to 1/e in %.0f years\n", len(p.Layers), 1/rate/year)
	}
	// Output:
	// 1 layers: topography falls to 1/e in 4104 years
	// 2 layers: topography falls to 1/e in 2621 years
}

// The wavelength at which a light layer rises fastest through a thick
// overburden a hundred times as stiff.
func ExampleRayleighTaylor() {
	best, fastest := 0.0, 0.0
	for wavelength := 1.0; wavelength < 20; wavelength += 0.1 {
		rate, err := exact.RayleighTaylor{
			KX:     2 * math.Pi / wavelength,
			Lower:  exact.Layer{Thickness: 1, Viscosity: 1},
			Upper:  exact.Layer{Thickness: 4, Viscosity: 100},
			Bottom: exact.NoSlip,
			Weight: 1,
		}.Rate()
		if err != nil {
			log.Fatal(err)
		}
		if rate > best {
			best, fastest = rate, wavelength
		}
	}
	fmt.Printf("%.1f times the thickness of the layer\n", fastest)
	// Output: 10.9 times the thickness of the layer
}
