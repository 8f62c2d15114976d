package units_test

import (
	"testing"

	"example.org/overturn/units"
)

func BenchmarkParse(b *testing.B) {
	for _, bm := range []struct{ name, text string }{
		{"decimal", "4.2e-9 mm/s"},
		{"year", "4.2 cm/yr"},
		{"long", "4.2123456789012345678 km yr^-1"},
	} {
		b.Run("text="+bm.name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := units.Parse[units.Velocity](bm.text); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
	b.Run("text=celsius", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			if _, err := units.Parse[units.Temperature]("1350 °C"); err != nil {
				b.Fatal(err)
			}
		}
	})
}

func BenchmarkFormat(b *testing.B) {
	v := 1.33e-9 * units.MetrePerSecond
	for _, bm := range []struct {
		name, unit string
		digits     int
	}{
		{"decimal/digits=3", "mm/s", 3},
		{"year/digits=3", "cm/yr", 3},
		{"year/digits=all", "cm/yr", 0},
		{"year/digits=17", "cm/yr", 17},
	} {
		b.Run("unit="+bm.name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := units.Format(v, bm.unit, bm.digits); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
	b.Run("unit=celsius/digits=4", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			if _, err := units.Format(units.Temperature(1623.45), "°C", 4); err != nil {
				b.Fatal(err)
			}
		}
	})
}

func BenchmarkAppendText(b *testing.B) {
	v := 1.33e-9 * units.MetrePerSecond
	buf := make([]byte, 0, 64)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := v.AppendText(buf); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParseUnit(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := units.ParseUnit("MPa^-3.5 s^-1"); err != nil {
			b.Fatal(err)
		}
	}
}
