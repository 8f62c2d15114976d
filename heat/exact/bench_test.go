package exact

import (
	"strings"
	"testing"
)

// One point at one time, at the start and at the end of each case.
func BenchmarkAt(b *testing.B) {
	for _, c := range All() {
		name := "case=" + strings.NewReplacer(" ", "-", ",", "").Replace(c.Name)
		x, z := c.Box.Left+0.3*c.Box.Width(), c.Box.Bottom+0.4*c.Box.Height()
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			sum := 0.0
			for b.Loop() {
				sum += c.At(x, z, c.Start).Temperature + c.At(x, z, c.End).Temperature
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(2*b.N), "ns/point")
		})
	}
}

// The problems of freezing find λ at each call, or once.
func BenchmarkFreezing(b *testing.B) {
	lake := StefanTwoPhase{Melting: 1, Initial: 2}
	solved, err := lake.Solve()
	if err != nil {
		b.Fatal(err)
	}
	for name, s := range map[string]Solution{"solved=no": lake, "solved=yes": solved} {
		b.Run(name, func(b *testing.B) {
			for b.Loop() {
				s.At(0, 0.3, 0.1)
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N), "ns/point")
		})
	}
}

// A young cylinder and one on the edge of the expansion for a thin layer.
func BenchmarkCylinder(b *testing.B) {
	for name, time := range map[string]float64{"kt=1e-4": 1e-4, "kt=5e-4": 5e-4, "kt=0.1": 0.1} {
		b.Run(name, func(b *testing.B) {
			for b.Loop() {
				Cylinder{Initial: 1}.At(0.7, 0.69, time)
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N), "ns/point")
		})
	}
}

func TestAtDoesNotAllocate(t *testing.T) {
	for _, c := range append(All(), moreCases(t)...) {
		x, z := c.Box.Left+0.3*c.Box.Width(), c.Box.Bottom+0.4*c.Box.Height()
		if n := testing.AllocsPerRun(10, func() { c.At(x, z, c.Start); c.Medium(x, z, c.Start) }); n != 0 {
			t.Errorf("%s: %g allocations", c.Name, n)
		}
	}
	s := Sphere{Initial: 1}
	if n := testing.AllocsPerRun(10, func() { s.At(0.01, 0.05); s.At(0.5, 0.05) }); n != 0 {
		t.Errorf("sphere: %g allocations", n)
	}
}
