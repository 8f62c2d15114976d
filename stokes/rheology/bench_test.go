package rheology

import "testing"

// A row of 256 cells. A law writes and reads 8 bytes a cell; the time is that
// of its exponentials.
func BenchmarkViscosityTo(b *testing.B) {
	const n = 256
	dst, temperature := make([]float64, n), make([]float64, n)
	for name, c := range everyLaw() {
		b.Run("law="+name, func(b *testing.B) {
			for i := range temperature {
				w := float64(i) / (n - 1)
				temperature[i] = (1-w)*c.domain.ColdestTemperature + w*c.domain.HottestTemperature
			}
			b.ReportAllocs()
			for b.Loop() {
				c.law.ViscosityTo(dst, temperature, c.domain.Bottom)
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/n, "ns/cell")
			b.ReportMetric(16, "B/cell")
		})
	}
}
