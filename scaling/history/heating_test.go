package history

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"

	"example.org/overturn/units"
)

// Energy is the integral of the heating.
func TestEnergyIsTheIntegral(t *testing.T) {
	r, err := NewRadiogenic(McDonoughSun(), Isotopes(), 4.5*gyr)
	require.NoError(t, err)
	for _, h := range []Heating{r, Constant(5e-12)} {
		for _, span := range [][2]units.Time{{0, 4.5 * gyr}, {gyr, 1.001 * gyr}, {3 * gyr, gyr}} {
			want := quad.Fixed(func(t float64) float64 { return float64(h.At(units.Time(t))) }, float64(min(span[0], span[1])), float64(max(span[0], span[1])), 40, nil, 0)
			if span[1] < span[0] {
				want = -want
			}
			require.InEpsilon(t, want, float64(h.Energy(span[0], span[1])), 1e-12)
		}
	}
	require.Zero(t, Radiogenic{}.At(gyr))
	require.Zero(t, Radiogenic{}.Energy(0, gyr))
}

// One isotope alone halves in its half-life.
func TestHalving(t *testing.T) {
	potassium := Composition{Potassium: 1e-3}
	r, err := NewRadiogenic(potassium, Isotopes(), 4.5*gyr)
	require.NoError(t, err)
	half := Isotopes()[3].HalfLife
	require.InEpsilon(t, 2, float64(r.At(gyr)/r.At(gyr+half)), 1e-12)
	require.InEpsilon(t, 1e-3*1.196e-4*28.761e-6, float64(r.At(4.5*gyr)), 1e-12)
}

// The two sources of heat per element differ by 0.02, 0.7 and 1.6%, as the
// comment on Isotopes says.
func TestSourcesOfHeat(t *testing.T) {
	for _, tt := range []struct {
		c    Composition
		more float64
	}{{Composition{Uranium: 1e-6}, 0.0002}, {Composition{Thorium: 1e-6}, 0.0072}, {Composition{Potassium: 1e-6}, 0.0156}} {
		r, err := NewRadiogenic(tt.c, Isotopes(), 0)
		require.NoError(t, err)
		p, err := PresentHeating(tt.c)
		require.NoError(t, err)
		require.InDelta(t, tt.more, float64(r.At(0)/p)-1, 3e-4)
	}
	// 19.75 TW in 4.04e24 kg of silicate Earth; 19.9 ± 3.0 TW in McDonough,
	// Šrámek & Wipperfurth (2020, abstract).
	p, err := PresentHeating(McDonoughSun())
	require.NoError(t, err)
	require.InDelta(t, 19.75e12, float64(p)*4.04e24, 0.01e12)
}

// Rybach (1988) for 4 ppm U, 15 ppm Th and 3.5% K at 2700 kg/m³: by hand,
// 0.027 (38.08 + 38.4 + 12.18) µW/m³.
func TestRockHeating(t *testing.T) {
	a, err := RockHeating(2700, Composition{Uranium: 4e-6, Thorium: 15e-6, Potassium: 0.035})
	require.NoError(t, err)
	require.InEpsilon(t, 2.39382e-6, float64(a), 1e-12)
}

func TestHeatingErrors(t *testing.T) {
	for want, c := range map[string]Composition{
		"Composition.Potassium": {Potassium: -1}, "Composition.Thorium": {Thorium: 2}, "Composition.Uranium": {Uranium: math.NaN()},
	} {
		_, err := PresentHeating(c)
		require.ErrorContains(t, err, want)
		_, err = RockHeating(3000, c)
		require.ErrorContains(t, err, want)
		_, err = NewRadiogenic(c, Isotopes(), 0)
		require.ErrorContains(t, err, want)
	}
	_, err := RockHeating(0, Composition{})
	require.ErrorContains(t, err, "density")
	good := Isotope{"X", "U", 1, 1, 1}
	for want, change := range map[string]func(*Isotope){
		"X: half-life": func(i *Isotope) { i.HalfLife = 0 },
		"X: heat":      func(i *Isotope) { i.Heat = -1 },
		"X: abundance": func(i *Isotope) { i.Abundance = 2 },
		"X: element":   func(i *Isotope) { i.Element = "Rb" },
	} {
		i := good
		change(&i)
		_, err := NewRadiogenic(McDonoughSun(), []Isotope{i}, 0)
		require.ErrorContains(t, err, want)
	}
	_, err = NewRadiogenic(McDonoughSun(), Isotopes(), units.Time(math.NaN()))
	require.ErrorContains(t, err, "present")
	_, err = NewRadiogenic(McDonoughSun(), Isotopes(), 1e6*gyr)
	require.ErrorContains(t, err, "heating at time zero")

	_, err = PowerLawCooling(0, 1, 1)
	require.ErrorContains(t, err, "start")
	_, err = PowerLawCooling(1, math.NaN(), 1)
	require.ErrorContains(t, err, "beta")
	_, err = PowerLawCooling(1, 1, math.Inf(1))
	require.ErrorContains(t, err, "time")
	_, err = PowerLawCooling(1, 1, -2)
	require.ErrorContains(t, err, "time")
}
