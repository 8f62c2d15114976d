package convection

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

// One coupled step in steady time stepping: a Stokes solve from a good guess, a
// heat step and the diagnostics. Unknowns are two velocities, pressure and
// temperature of each cell.
func BenchmarkStep(b *testing.B) {
	for _, n := range []int{64, 128, 256} {
		for _, law := range []struct {
			name string
			law  rheology.Law
		}{{"uniform", nil}, {"1e3", rheology.FrankKamenetskii{ThermalExponent: math.Log(1e3)}}} {
			b.Run(fmt.Sprintf("cells=%dx%d/contrast=%s", n, n, law.name), func(b *testing.B) {
				g, err := staggered.Uniform(n, n, 1, 1)
				if err != nil {
					b.Fatal(err)
				}
				m := run(b, Problem{Grid: g, Rayleigh: 1e4, Viscosity: law.law}, &Settings{MaxSteps: 5})
				ctx := context.Background()
				b.ReportAllocs()
				iterations := 0
				for b.Loop() {
					if err := m.advance(ctx); err != nil {
						b.Fatal(err)
					}
					iterations += m.iterations
				}
				b.ReportMetric(float64(iterations)/float64(b.N), "iterations")
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*4*n*n), "ns/unknown")
			})
		}
	}
}

func BenchmarkSteady(b *testing.B) {
	for _, n := range []int{64, 128} {
		b.Run(fmt.Sprintf("cells=%dx%d", n, n), func(b *testing.B) {
			g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 8, Right: 8, Bottom: 8, Top: 8})
			if err != nil {
				b.Fatal(err)
			}
			for b.Loop() {
				if _, err := Steady(context.Background(), Problem{Grid: g, Rayleigh: 1e5}, nil); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*4*n*n), "ns/unknown")
		})
	}
}
