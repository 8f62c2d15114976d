package units_test

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
)

// The definitions: K = °C + 273.15, °F = 1.8 °C + 32, °F at absolute zero
// -459.67. The tolerance is one bit of a temperature of up to 2048 K, 1.8 times
// for °F.
func TestScalesOfTemperature(t *testing.T) {
	tests := []struct{ kelvin, celsius, fahrenheit float64 }{
		{0, -273.15, -459.67},
		{273.15, 0, 32},
		{293.15, 20, 68},
		{310.15, 37, 98.6},
		{373.15, 100, 212},
		{1623.15, 1350, 2462},
		{233.15, -40, -40},
	}
	const bit = 0x1p-42
	for _, tt := range tests {
		q := units.Temperature(tt.kelvin)
		assert.InDelta(t, tt.celsius, q.Celsius(), bit)
		assert.InDelta(t, tt.fahrenheit, q.Fahrenheit(), 1.8*bit)
		assert.InDelta(t, tt.kelvin, float64(units.Celsius(tt.celsius)), bit)
		assert.InDelta(t, tt.kelvin, float64(units.Fahrenheit(tt.fahrenheit)), bit)
	}
}

func TestTemperatureArithmetic(t *testing.T) {
	top, bottom := units.Temperature(300), units.Temperature(1600)
	assert.Equal(t, 1300*units.Kelvin, bottom.Sub(top))
	assert.Equal(t, -1300*units.Kelvin, top.Sub(bottom))
	assert.Equal(t, bottom, top.Add(bottom.Sub(top)))
	assert.Equal(t, units.Temperature(299.5), top.Add(-500*units.Millikelvin))
	assert.True(t, math.IsNaN(float64(top.Add(units.TemperatureDifference(math.NaN())))))
}
