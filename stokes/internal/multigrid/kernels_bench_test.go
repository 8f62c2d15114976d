package multigrid

import (
	"fmt"
	"math"
	"testing"
	"time"
)

// Kernels per cell. A work unit is one residual of the finest level.
func BenchmarkKernels(b *testing.B) {
	for _, n := range []int{256, 1024} {
		p := newProblem(square(n), exponential(1e6))
		sv := p.sv
		l := sv.Finest()
		sv.X.clear()
		sv.Residual(p)
		sv.grow(5)
		sv.Precondition(sv.z[0], sv.R)
		zero := noLoad{}
		s := newScratch(l.stride)
		for _, k := range []struct {
			name string
			run  func()
		}{
			{"residual", func() { sv.Residual(zero) }},
			{"operator", func() {
				l.begin(s, sv.z[0], 1)
				for j := 1; j <= n; j++ {
					l.operatorRow(s, sv.z[0], j)
				}
			}},
			{"relaxX", func() {
				for c := range 2 {
					for j := 1; j <= n; j++ {
						l.relaxX(j, c)
					}
				}
			}},
			{"relaxZ", func() {
				for c := range 2 {
					for j := 1; j <= n; j++ {
						l.relaxZ(j, c)
					}
				}
			}},
			{"press", func() {
				for j := 1; j <= n; j++ {
					l.pressBefore(j)
					l.pressAfter(j)
				}
			}},
			{"distribute", func() {
				for c := range 2 {
					for j := 1; j <= n; j++ {
						l.distribute(j, c)
					}
				}
			}},
			{"sweep", func() { l.passes.sweep.run() }},
			{"restrict", func() { l.passes.restrict.run() }},
			{"prolong", func() { l.passes.prolong.run() }},
			{"freshDown", func() { l.passes.freshDown.run() }},
			{"up", func() { l.passes.up.run() }},
			{"cycle", func() { sv.Precondition(sv.z[0], sv.R) }},
			{"apply2", func() { sv.k = 2; sv.run(0, sv.applyPass) }},
			{"update2", func() { sv.k = 2; sv.run(0, sv.updatePass) }},
			{"full", func() { sv.solveFull(sv.z[0], sv.R) }},
			{"refresh", func() { sv.Refresh() }},
			{"jumps", func() { l.findJumps() }},
		} {
			b.Run(fmt.Sprintf("%s/cells=%dx%d", k.name, n, n), func(b *testing.B) {
				for b.Loop() {
					k.run()
				}
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
			})
		}
	}
}

type noLoad struct{}

func (noLoad) AddRow(int, []float64, []float64, []float64) {}

func BenchmarkRelaxJumps(b *testing.B) {
	p := newProblem(square(256), circles(1e3))
	sv := p.sv
	sv.X.clear()
	sv.Residual(p)
	sv.grow(1)
	sv.Precondition(sv.z[0], sv.R)
	jp := &sv.Finest().jumps
	for b.Loop() {
		sv.relaxJumps(0)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(jp.columns)*jp.sweeps), "ns/cell")
}

// Full multigrid in work units: its time over that of a residual, the shortest
// of both, taken by turns in one process.
func BenchmarkFullMultigrid(b *testing.B) {
	for _, n := range []int{64, 128, 256, 512, 1024} {
		b.Run(fmt.Sprintf("cells=%dx%d", n, n), func(b *testing.B) {
			p := newProblem(square(n), func(x, z float64) float64 { return 1 })
			sv := p.sv
			sv.X.clear()
			sv.Residual(p)
			sv.grow(1)
			r := sv.R.clone()
			sv.finish = nil // the operator that follows is no part of it
			full, residual := time.Duration(math.MaxInt64), time.Duration(math.MaxInt64)
			for b.Loop() {
				start := time.Now()
				sv.solveFull(sv.z[0], r)
				middle := time.Now()
				sv.Residual(noLoad{})
				full, residual = min(full, middle.Sub(start)), min(residual, time.Since(middle))
			}
			b.ReportMetric(full.Seconds()/residual.Seconds(), "work-units")
			b.ReportMetric(float64(full.Nanoseconds())/float64(3*n*n), "ns/unknown")
		})
	}
}
