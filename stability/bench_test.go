package stability

import (
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
