package heat

import (
	"context"
	"fmt"
	"math"
	"sync"
	"testing"

	"example.org/overturn/stokes/staggered"
)

// benchmarkProblem is a closed convection cell on n×n cells, unit properties or
// properties that vary from cell to cell.
func benchmarkProblem(b *testing.B, n int, varying string, s Settings) (*Stepper, *staggered.Scalar, *staggered.Flow) {
	b.Helper()
	g, err := staggered.Uniform(n, n, 1, 1)
	if err != nil {
		b.Fatal(err)
	}
	eq := Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1), Top: Isothermal(0)}}
	if varying != "none" {
		eq.Conductivity = staggered.NewScalar(g)
		eq.Conductivity.Fill(func(x, z float64) float64 { return 1 + x*z })
	}
	if varying == "capacity" {
		eq.HeatCapacity = staggered.NewScalar(g)
		eq.HeatCapacity.Fill(func(x, z float64) float64 { return 1 + x*z })
	}
	st, err := NewStepper(eq, &s)
	if err != nil {
		b.Fatal(err)
	}
	flow := staggered.NewFlow(g)
	flow.FillFromStream(func(x, z float64) float64 {
		return 100 * math.Sin(2*math.Pi*x) * math.Sin(math.Pi*z)
	})
	temperature := staggered.NewScalar(g)
	temperature.Fill(func(x, z float64) float64 { return 1 - z + 0.1*math.Sin(7*x*z) })
	return st, temperature, flow
}

// stepFloats is how many numbers a step moves per cell if every array that a
// stage works on passes through the memory once per stage: temperature in and
// out, both velocities, and the older state where a stage combines two.
func stepFloats(s Scheme) int {
	switch s {
	case RungeKutta2:
		return 4 + 4 // T→u with vx, vz; u, T→T with vx, vz
	case RungeKutta3:
		return 4 + 5 + 4
	}
	// Two rates, two solves along two directions, a sum and a combination.
	return 4 + 2*2 + 3 + 5 + 2*2 + 4
}

func BenchmarkStep(b *testing.B) {
	for _, n := range []int{64, 256, 1024, 2048} {
		for _, scheme := range []Scheme{RungeKutta2, RungeKutta3, Implicit} {
			for _, advection := range []Advection{Central, Bounded} {
				for _, workers := range []int{1, 2} {
					name := fmt.Sprintf("cells=%dx%d/scheme=%v/advection=%v/workers=%d", n, n, scheme, advection, workers)
					b.Run(name, func(b *testing.B) {
						benchmarkStep(b, n, "none", Settings{Scheme: scheme, Advection: advection, Workers: workers})
					})
				}
			}
		}
	}
}

// BenchmarkStepVarying has a conductivity, or a conductivity and a capacity,
// that vary.
func BenchmarkStepVarying(b *testing.B) {
	for _, varying := range []string{"conductivity", "capacity"} {
		for _, scheme := range []Scheme{RungeKutta2, Implicit} {
			for _, advection := range []Advection{Central, Bounded} {
				b.Run(fmt.Sprintf("varying=%s/scheme=%v/advection=%v", varying, scheme, advection), func(b *testing.B) {
					benchmarkStep(b, 1024, varying, Settings{Scheme: scheme, Advection: advection, Workers: 1})
				})
			}
		}
	}
}

// BenchmarkStepAdaptive changes the length of each step, so that the implicit
// scheme has to factor anew.
func BenchmarkStepAdaptive(b *testing.B) {
	for _, varying := range []string{"none", "conductivity", "capacity"} {
		b.Run("varying="+varying, func(b *testing.B) {
			const n = 1024
			st, temperature, flow := benchmarkProblem(b, n, varying, Settings{Scheme: Implicit, Workers: 1})
			dt := 0.9 * st.StableStep(flow)
			ctx := context.Background()
			for b.Loop() {
				dt *= 0.999
				if _, err := st.Step(ctx, temperature, flow, dt); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
		})
	}
}

func benchmarkStep(b *testing.B, n int, varying string, s Settings) {
	st, temperature, flow := benchmarkProblem(b, n, varying, s)
	dt := 0.9 * st.StableStep(flow)
	ctx := context.Background()
	b.ReportAllocs()
	for b.Loop() {
		if _, err := st.Step(ctx, temperature, flow, dt); err != nil {
			b.Fatal(err)
		}
	}
	perCell := float64(b.Elapsed().Nanoseconds()) / float64(b.N*n*n)
	b.ReportMetric(perCell, "ns/cell")
	if varying == "none" {
		bytes := float64(8 * stepFloats(s.Scheme))
		b.ReportMetric(bytes/perCell, "GB/s")
		b.ReportMetric(bytes, "B/cell")
	}
}

// BenchmarkCopy measures what the memory can do, 16 bytes a number, between two
// arrays of 256 MB, beyond any cache: by a loop over the numbers, as any kernel
// written in Go has to move them, and by the runtime's copy, which goes past the
// cache with wide instructions.
func BenchmarkCopy(b *testing.B) {
	const n = 1 << 25
	src, dst := make([]float64, n), make([]float64, n)
	for i := range src {
		src[i], dst[i] = float64(i), 1 // or the pages would not exist
	}
	loop := func(dst, src []float64) {
		src = src[:len(dst)]
		for i := range dst {
			dst[i] = src[i] + 1 // without the sum the compiler calls copy
		}
	}
	for name, move := range map[string]func(dst, src []float64){
		"loop": loop, "runtime": func(dst, src []float64) { copy(dst, src) },
	} {
		for _, workers := range []int{1, 2} {
			b.Run(fmt.Sprintf("by=%s/workers=%d", name, workers), func(b *testing.B) {
				for b.Loop() {
					var wg sync.WaitGroup
					for w := range workers {
						lo, hi := n*w/workers, n*(w+1)/workers
						wg.Go(func() { move(dst[lo:hi], src[lo:hi]) })
					}
					wg.Wait()
				}
				b.ReportMetric(16*n*float64(b.N)/float64(b.Elapsed().Nanoseconds()), "GB/s")
			})
		}
	}
}

func BenchmarkFactor(b *testing.B) {
	for _, n := range []int{64, 128, 256} {
		b.Run(fmt.Sprintf("cells=%dx%d", n, n), func(b *testing.B) {
			st, _, flow := benchmarkProblem(b, n, "none", Settings{})
			for b.Loop() {
				if err := st.Factor(flow); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
		})
	}
}

func BenchmarkSolveTo(b *testing.B) {
	for _, n := range []int{64, 128, 256} {
		b.Run(fmt.Sprintf("cells=%dx%d", n, n), func(b *testing.B) {
			st, temperature, flow := benchmarkProblem(b, n, "none", Settings{})
			if err := st.Factor(flow); err != nil {
				b.Fatal(err)
			}
			dst := temperature.Clone()
			b.ReportAllocs()
			for b.Loop() {
				if err := st.SolveTo(dst, temperature); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
		})
	}
}
