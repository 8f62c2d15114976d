package history

import (
	"fmt"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/units"
)

// The case of the reference values: one reservoir, Ra^(1/3) law with a critical
// number of 1100, Arrhenius viscosity, four isotopes.
func referenceBody(t testing.TB, start units.Temperature) Body {
	heating, err := NewRadiogenic(McDonoughSun(), Isotopes(), 4.5*units.Gigayear)
	require.NoError(t, err)
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 2.5e-5, Conductivity: 4, SpecificHeat: 4 / (3300 * 1e-6)},
		Depth:    2.89e6, Gravity: 9.8,
	}
	return Body{
		Reservoirs: []Reservoir{{
			Name: "mantle", Mass: 4e24, SpecificHeat: 1250, Heating: heating, Area: 5.1e14, Start: start,
			Loss: Convection{
				Layer: layer, Law: scaling.WholeLayer(1100, 1./3, scaling.AnyWalls),
				Viscosity: scaling.Arrhenius{Reference: 1e21, Anchor: 1600, Energy: 300 * units.KilojoulePerMole},
			},
		}},
		Surface: 273,
	}
}
func TestX(t *testing.T) {
	for _, tol := range []float64{1e-6, 1e-8, 1e-9, 1e-10} {
		m, err := New(referenceBody(t, 2000), &Settings{Tolerance: tol})
		require.NoError(t, err)
		h, err := m.Run(0, 4.5*units.Gigayear)
		require.NoError(t, err)
		s, err := h.At(4.5 * units.Gigayear)
		require.NoError(t, err)
		s1, _ := h.At(1 * units.Gigayear)
		b, _ := h.Budget()
		fmt.Printf("%g %d %d %.12g %.12g %.12g %.12g budget %.2g\n", tol, h.Steps, h.Evaluations, float64(s.Temperature[0])-1588.796773329, s.Urey/0.781344603378-1, float64(s.Flux[0])/0.0493614090517-1, float64(s1.Temperature[0])-1796.137158856, b.Relative)
		body := referenceBody(t, s.Temperature[0])
		mb, _ := New(body, &Settings{Tolerance: tol})
		hb, err := mb.Run(4.5*units.Gigayear, 0)
		if err != nil {
			fmt.Println(err)
			continue
		}
		sb, _ := hb.At(0)
		bb, _ := hb.Budget()
		fmt.Println("  back", hb.Steps, hb.Evaluations, float64(sb.Temperature[0])-2000, bb.Relative)
	}
}
func BenchmarkX(b *testing.B) {
	m, _ := New(referenceBody(b, 2000), nil)
	for b.Loop() {
		m.Run(0, 4.5*units.Gigayear)
	}
}
