package units_test

import (
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestFormat(t *testing.T) {
	length := func(x float64, unit string, digits int) func() (string, error) {
		return func() (string, error) { return units.Format(units.Length(x), unit, digits) }
	}
	tests := []struct {
		format func() (string, error)
		want   string
	}{
		{length(0.0015, "mm", 0), "1.5 mm"},
		{length(0.0015, "mm", -1), "1.5 mm"},
		{length(0.0015, "mm", 1), "2 mm"}, // 0.0015 is above the tie
		{length(0.0015, "mm", 4), "1.500 mm"},
		{length(1500, "", 3), "1500 m"},
		{length(1500, "  ", 3), "1500 m"},
		{length(1550, " km ", 2), "1.6 km"}, // 1.55, an exact tie in km
		{length(1450, "km", 2), "1.4 km"},   // ties to even
		{length(123456, "m", 2), "120000 m"},
		{length(999999, "m", 2), "1.0e6 m"},
		{length(999999, "m", 6), "999999 m"},
		{length(999999, "m", 7), "999999.0 m"},
		{length(1e6, "m", 3), "1.00e6 m"},
		{length(1e6, "m", 1), "1e6 m"},
		{length(0.0001, "m", 0), "0.0001 m"},
		{length(0.00099996, "m", 4), "0.001000 m"},
		{length(0.01, "m", 2), "0.010 m"},
		{length(0.1, "m", 2), "0.10 m"},
		{length(0.000099, "m", 1), "0.0001 m"},
		{length(0.000099, "m", 2), "9.9e-5 m"},
		{length(-0.000012345, "m", 0), "-1.2345e-5 m"},
		{length(0, "km", 0), "0 km"},
		{length(0, "km", 3), "0.00 km"},
		{length(0, "ft", 2), "0.0 ft"},
		{length(1, "ft", 4), "3.281 ft"},
		{length(10, "m", 0), "10 m"},
		{length(1.7e308, "qm", 3), "1.70e338 qm"},
		{length(5e-324, "Qm", 2), "4.9e-354 Qm"},
		{length(5e-324, "m", 0), "5e-324 m"},
		{length(1.0/3, "m", 20), "0.33333333333333331483 m"},
		{length(3.168808781402895, "m yr/s", 4), "1.004e-7 m yr/s"},
		{func() (string, error) { return units.Format(units.Celsius(20), "degF", 3) }, "68.0 degF"},
		{func() (string, error) { return units.Format(units.ZeroCelsius, "°C", 3) }, "0.00 °C"},
		{func() (string, error) { return units.Format(units.ZeroCelsius, "°C", 0) }, "0 °C"},
		{func() (string, error) { return units.Format(20*units.Kelvin, "degC", 3) }, "20.0 degC"},
		{func() (string, error) { return units.Format(0.25*units.PartsPerMillion, "", 0) }, "2.5e-7"},
		{func() (string, error) { return units.Format(3*units.Percent, "%", 2) }, "3.0 %"},
		{func() (string, error) { return units.Format(3e-5*units.PerKelvin, "10^-5/K", 2) }, "3.0 10^-5/K"},
		{func() (string, error) { return units.Format(3e-5*units.PerKelvin, "1/K", 2) }, "3.0e-5 1/K"},
	}
	for _, tt := range tests {
		got, err := tt.format()
		require.NoError(t, err)
		assert.Equal(t, tt.want, got)
	}
}

func TestFormatOfManyDigits(t *testing.T) {
	text, err := units.Format(1*units.Metre, "yr m/s", 1<<40)
	require.NoError(t, err)
	assert.Less(t, len(text), 1300)
	assert.True(t, strings.HasPrefix(text, "3.16880878140289"), text)
}

func TestFormatErrors(t *testing.T) {
	_, err := units.Format(5*units.Metre, "kg", 3)
	assert.EqualError(t, err, `units: "kg": mass (kg), want length (m)`)
	_, err = units.Format(5*units.Metre, "furlong", 3)
	assert.ErrorIs(t, err, units.ErrUnknownUnit)
	_, err = units.Format(5*units.Metre, "5 m", 3)
	assert.ErrorIs(t, err, units.ErrSyntax)
	_, err = units.Format(units.Celsius(5), "m degC/m", 3)
	assert.ErrorIs(t, err, units.ErrSyntax)
}
