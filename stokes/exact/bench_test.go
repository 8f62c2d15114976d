package exact_test

import (
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/assert"
)

var sink float64

func BenchmarkAt(b *testing.B) {
	for _, c := range exact.All() {
		b.Run("case="+c.Name, func(b *testing.B) {
			list := points(c, 64)
			b.ReportAllocs()
			i := 0
			for b.Loop() {
				p := list[i&63]
				sink += c.At(p[0], p[1]).P
				i++
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N), "ns/point")
		})
	}
}

func BenchmarkLayersSolve(b *testing.B) {
	for _, n := range []int{1, 10, 100, 1000} {
		b.Run(fmt.Sprintf("layers=%d", n), func(b *testing.B) {
			p := exact.Layers{KX: math.Pi}
			for i := range n {
				p.Layers = append(p.Layers, exact.Layer{Thickness: 1 / float64(n), Viscosity: 1 + float64(i%7),
					Force: exact.Profile{Sine: 1, Wavenumber: math.Pi}})
			}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := p.Solve(); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n), "ns/layer")
		})
	}
}

func TestSolutionsDoNotAllocate(t *testing.T) {
	for _, c := range append(exact.All(), moreCases(t)...) {
		x, z := c.Box.Left+0.3*c.Box.Width(), c.Box.Bottom+0.7*c.Box.Height()
		n := testing.AllocsPerRun(20, func() {
			bx, bz := c.Force(x, z)
			sink += c.At(x, z).VX + c.Viscosity(x, z) + bx + bz
		})
		assert.Zero(t, n, c.Name)
	}
}
