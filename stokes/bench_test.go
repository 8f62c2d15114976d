package stokes_test

import (
	"context"
	"fmt"
	"math"
	"runtime"
	"testing"
	"time"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// Classes of viscosity in the unit box: a is uniform, b3 to b10 fall smoothly
// with temperature by 10³ to 10¹⁰, c6 jumps by 10⁶ at x = 0.53, e4 has a stiff
// layer, d3, d6 and d-3 eight stiff or weak circles.
var classes = []struct {
	name string
	eta  func(x, z float64) float64
}{
	{"a", func(x, z float64) float64 { return 1 }},
	{"b3", thermal(1e3)},
	{"b6", thermal(1e6)},
	{"b10", thermal(1e10)},
	{"c6", func(x, z float64) float64 {
		if x > 0.53 {
			return 1e6
		}
		return 1
	}},
	{"e4", func(x, z float64) float64 { return 1 + 9999*float64(int(z*3)&1) }},
	{"d3", circles(1e3)},
	{"d6", circles(1e6)},
	{"d-3", circles(1e-3)},
}

func thermal(contrast float64) func(x, z float64) float64 {
	return func(x, z float64) float64 {
		return math.Pow(contrast, -(1 - z + 0.2*math.Cos(pi*x)*math.Sin(pi*z)))
	}
}

func circles(contrast float64) func(x, z float64) float64 {
	bodies := [][3]float64{{.2, .2, .09}, {.52, .17, .11}, {.81, .23, .08}, {.25, .52, .1}, {.6, .5, .12}, {.86, .57, .07}, {.37, .82, .1}, {.73, .81, .09}}
	return func(x, z float64) float64 {
		for _, c := range bodies {
			if math.Hypot(x-c[0], z-c[1]) < c[2] {
				return contrast
			}
		}
		return 1
	}
}

func BenchmarkSolve(b *testing.B) {
	for _, class := range classes {
		for _, n := range []int{64, 128, 256, 512, 1024, 2048} {
			for _, workers := range []int{1, 2} {
				for _, method := range []stokes.Method{stokes.Multigrid, stokes.Transform} {
					if method == stokes.Transform && class.name != "a" {
						continue
					}
					b.Run(fmt.Sprintf("class=%s/cells=%dx%d/workers=%d/method=%v", class.name, n, n, workers, method), func(b *testing.B) {
						benchmarkSolve(b, n, class.eta, &stokes.Settings{Workers: workers, Method: method})
					})
				}
			}
		}
	}
}

func benchmarkSolve(b *testing.B, n int, viscosity func(x, z float64) float64, s *stokes.Settings) {
	g := uniform(b, n, n, 1, 1)
	eta, force, flow := staggered.NewScalar(g), staggered.NewVector(g), staggered.NewFlow(g)
	eta.Fill(viscosity)
	force.Fill(nil, func(x, z float64) float64 { return math.Cos(pi*x) * math.Sin(pi*z) })
	var before, after runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&before)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, s)
	if err != nil {
		b.Fatal(err)
	}
	solve := func() stokes.Report {
		clear(flow.VX)
		clear(flow.VZ)
		clear(flow.P)
		r, err := sv.Solve(context.Background(), flow, eta, force)
		if err != nil {
			b.Fatal(err)
		}
		return r
	}
	r := solve()
	runtime.ReadMemStats(&after)
	b.ReportAllocs()
	for b.Loop() {
		r = solve()
	}
	unknowns := float64(3 * n * n)
	each := b.Elapsed() / time.Duration(b.N)
	b.ReportMetric(float64(each.Nanoseconds())/unknowns, "ns/unknown")
	b.ReportMetric(float64(r.Iterations), "iterations")
	b.ReportMetric(float64(after.HeapAlloc-before.HeapAlloc)/unknowns, "bytes/unknown")

	// The work unit: one evaluation of the momentum operator. That of ApplyTo,
	// with its checks and copies, takes about twice the time of the kernel.
	out := staggered.NewVector(g)
	const times = 5
	start := time.Now()
	for range times {
		if err := sv.ApplyTo(out, flow, eta); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(each)*times/float64(time.Since(start)), "applications")
}
