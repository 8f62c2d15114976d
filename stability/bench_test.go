package stability

import (
	"fmt"
	"math"
	"testing"
)

// BenchmarkCritical is the whole search for the critical point of a layer
// between rigid walls, to 1e-10 in the Rayleigh number and the wavenumber, with a
// solver that has answered before.
func BenchmarkCritical(b *testing.B) {
	for _, bm := range []struct {
		name  string
		layer Layer
	}{
		{"rigid", Layer{Bottom: Rigid, Top: Rigid}},
		{"free", Layer{}},
	} {
		b.Run(bm.name, func(b *testing.B) {
			s, err := NewSolver(bm.layer, nil)
			if err != nil {
				b.Fatal(err)
			}
			if _, err := s.Critical(); err != nil {
				b.Fatal(err)
			}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := s.Critical(); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkGrowth is the growth rate at one wavenumber, with its error estimate
// and mode.
func BenchmarkGrowth(b *testing.B) {
	for _, bm := range []struct {
		name  string
		layer Layer
	}{
		{"Pr=inf", Layer{Bottom: Rigid, Top: Rigid}},
		{"Pr=7", Layer{Bottom: Rigid, Top: Rigid, Prandtl: 7}},
		{"Ta=1e3", Layer{Bottom: Rigid, Top: Rigid, Prandtl: 7, Taylor: 1e3}},
	} {
		b.Run(bm.name, func(b *testing.B) {
			s, err := NewSolver(bm.layer, nil)
			if err != nil {
				b.Fatal(err)
			}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := s.Growth(2000, 3.1); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkContrast is the search for the critical point of a layer of
// exponential viscosity, everything that a new layer needs included.
func BenchmarkContrast(b *testing.B) {
	for _, contrast := range []float64{1e2, 1e4, 1e6, 1e9} {
		b.Run(fmt.Sprintf("contrast=%.0e", contrast), func(b *testing.B) {
			l := Layer{Bottom: Rigid, Top: Rigid, Viscosity: Exponential(math.Log(contrast), 0.5)}
			unknowns := 0
			for b.Loop() {
				o, err := l.Critical()
				if err != nil {
					b.Fatal(err)
				}
				unknowns = o.Mode.layout.Size()
			}
			b.ReportMetric(float64(unknowns), "unknowns")
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*unknowns), "ns/unknown")
		})
	}
}

// BenchmarkNewLayer is the critical point of a layer never seen before.
func BenchmarkNewLayer(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := (Layer{Bottom: Rigid, Top: Rigid}).Critical(); err != nil {
			b.Fatal(err)
		}
	}
}

// A solver that has answered before allocates the answer, and little else.
func TestAllocations(t *testing.T) {
	s, err := NewSolver(Layer{Bottom: Rigid, Top: Rigid}, nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		name string
		ask  func()
		most float64
	}{
		{"critical point", func() { _, _ = s.Critical() }, 19},
		{"neutral state", func() { _, _ = s.Neutral(Search{}, 3) }, 12},
		{"growth rate", func() { _, _ = s.Growth(2000, 3.1) }, 12},
	} {
		tt.ask()
		if n := testing.AllocsPerRun(50, tt.ask); n > tt.most {
			t.Errorf("%s: %g allocations, want at most %g", tt.name, n, tt.most)
		}
	}
}
