package exact_test

import (
	"fmt"
	"log"
	"math"

	"example.org/overturn/heat/exact"
)

const (
	year = 365.25 * 86400.0
	myr  = 1e6 * year
)

// Temperature and heat flow of the ocean floor 60 million years after it was
// made, by cooling of a half-space.
func ExampleHalfSpace() {
	floor := exact.HalfSpace{
		Material: exact.Material{Conductivity: 3.3, HeatCapacity: 3.3e6},
		Initial:  1350, Surface: 0, // °C
	}
	s, err := floor.Solve()
	if err != nil {
		log.Fatal(err)
	}
	age := 60 * myr
	fmt.Printf("%.0f °C at 50 km, %.1f mW/m² through the surface, 1200 °C at %.0f km\n",
		s.At(0, 50e3, age).Temperature, -1e3*s.At(0, 0, age).FluxZ,
		floor.IsothermDepth(1200.0/1350, age)/1e3)
	// Output: 788 °C at 50 km, 57.8 mW/m² through the surface, 1200 °C at 98 km
}

// How thick does ice grow in a day at −10 °C on water of 5 °C?
func ExampleStefanTwoPhase() {
	lake := exact.StefanTwoPhase{
		Solid:      exact.Material{Conductivity: 2.22, HeatCapacity: 917 * 2100},
		Liquid:     exact.Material{Conductivity: 0.56, HeatCapacity: 917 * 4200},
		LatentHeat: 917 * 334e3,
		Surface:    -10, Melting: 0, Initial: 5,
	}
	if err := lake.Validate(); err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%.1f cm\n", 100*lake.Front(86400))
	// Output: 10.5 cm
}

// The steady states of a layer with fluid seeping up through it, at Péclet
// numbers that would overflow an exponential.
func ExampleThroughflow() {
	for _, pe := range []float64{0, 5, 1000} {
		s, err := exact.Throughflow{Velocity: pe, High: 1}.Solve()
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("Pe %4g: T = %.3g at z = 0.9\n", pe, s.At(0, 0.9, 0).Temperature)
	}
	// Output:
	// Pe    0: T = 0.9 at z = 0.9
	// Pe    5: T = 0.604 at z = 0.9
	// Pe 1000: T = 3.72e-44 at z = 0.9
}

// A scheme of one's own, here explicit central differences in a column, meets
// a case of the catalogue on three grids: its errors fall by four each time.
func ExampleAll() {
	for _, c := range exact.All() {
		if c.Name != "slab" {
			continue
		}
		for _, n := range []int{16, 32, 64} {
			fmt.Printf("%d cells: error %.1e\n", n, errorOfDifferences(c, n))
		}
	}
	// Output:
	// 16 cells: error 9.5e-04
	// 32 cells: error 2.4e-04
	// 64 cells: error 6.1e-05
}

// errorOfDifferences marches a column of n intervals from Start to End and
// returns the largest error.
func errorOfDifferences(c exact.Case, n int) float64 {
	h := c.Box.Height() / float64(n)
	z := func(k int) float64 { return c.Box.Bottom + float64(k)*h }
	now, next := make([]float64, n+1), make([]float64, n+1)
	for k := range now {
		now[k] = c.At(0, z(k), c.Start).Temperature
	}
	steps := int(math.Ceil((c.End - c.Start) / (0.4 * h * h)))
	dt := (c.End - c.Start) / float64(steps)
	for j := range steps {
		time := c.Start + float64(j)*dt
		next[0], next[n] = c.WallAt(exact.Bottom, 0, time+dt), c.WallAt(exact.Top, 0, time+dt)
		for k := 1; k < n; k++ {
			m := c.Medium(0, z(k), time)
			diffusion := m.Conductivity * (now[k-1] - 2*now[k] + now[k+1]) / (h * h)
			next[k] = now[k] + dt*(diffusion+m.Source)/m.HeatCapacity
		}
		now, next = next, now
	}
	worst := 0.0
	for k, v := range now {
		worst = max(worst, math.Abs(v-c.At(0, z(k), c.End).Temperature))
	}
	return worst
}
