package history

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/scaling"
	"example.org/overturn/units"
)

// Convection gives the law all that it asks for.
func TestConvectionFeedsTheLaw(t *testing.T) {
	var seen scaling.Groups
	c := Convection{
		Layer: mantleLayer, Viscosity: creep(300e3), Groups: scaling.Groups{CellWidth: 1.2},
		Law: scaling.Law{Name: "probe", Quantity: scaling.Nusselt, Basis: scaling.RayleighNumber, Value: func(v scaling.Groups) float64 { seen = v; return 7 }},
	}
	require.NoError(t, c.Check())
	q := c.Flux(1600, 300)
	require.InEpsilon(t, 7*4*1300/2.89e6, float64(q), 1e-12)
	ra := 3300 * 2.5e-5 * 9.8 * 1300 * math.Pow(2.89e6, 3) / (1e-6 * 1e21)
	require.InEpsilon(t, ra, seen.Rayleigh, 1e-12)
	require.Equal(t, seen.Rayleigh, seen.InteriorRayleigh)
	require.Equal(t, seen.Rayleigh, seen.BottomRayleigh)
	require.InEpsilon(t, 1e21/3300e-6, seen.Prandtl, 1e-12)
	require.InEpsilon(t, 300e3*1300/(8.31446261815324*1600*1600), seen.FrankKamenetskii, 1e-12)
	require.Equal(t, 1.2, seen.CellWidth)
}

// Below one the Nusselt number is one, unless the law is taken at its word;
// colder inside than outside, heat is conducted back.
func TestFloor(t *testing.T) {
	c := Convection{Layer: mantleLayer, Viscosity: creep(300e3), Law: scaling.WholeLayer(1e12, 1./3, scaling.AnyWalls)}
	conduction := 4 * 1300 / 2.89e6
	require.InEpsilon(t, conduction, float64(c.Flux(1600, 300)), 1e-12)
	nu := c.Describe(1600, 300).Nusselt
	require.Less(t, nu, 1.0)
	c.Floor = Extrapolate
	require.InEpsilon(t, nu*conduction, float64(c.Flux(1600, 300)), 1e-12)
	require.InEpsilon(t, -conduction, float64(c.Flux(300, 1600)), 1e-12)
	require.Zero(t, c.Flux(500, 500))
	l := c.Describe(500, 500)
	require.False(t, l.InRange)
	require.Equal(t, mantleLayer.Depth, l.Lid)
}

// The flux under a stagnant lid is that of scaling.LidLaw.
func TestStagnantLidLoss(t *testing.T) {
	s := StagnantLid{Layer: mantleLayer, Viscosity: creep(300e3), Law: scaling.SolomatovMoresiLid}
	require.NoError(t, s.Check())
	l := mantleLayer
	l.Top = 300
	want, err := scaling.SolomatovMoresiLid.Lid(l, creep(300e3), 1700)
	require.NoError(t, err)
	require.InEpsilon(t, float64(want.HeatFlux), float64(s.Flux(1700, 300)), 1e-12)
	d := s.Describe(1700, 300)
	require.InEpsilon(t, want.Nusselt, d.Nusselt, 1e-12)
	require.InEpsilon(t, want.InteriorRayleigh, d.Rayleigh, 1e-12)
	require.InEpsilon(t, want.FrankKamenetskii, d.FrankKamenetskii, 1e-12)
	require.InEpsilon(t, float64(want.Thickness+want.LayerThickness), float64(d.Lid), 1e-12)
	require.True(t, d.InRange)
	// Cold rock conducts.
	require.InEpsilon(t, 4*500/2.89e6, float64(s.Flux(800, 300)), 1e-12)
	require.False(t, s.Describe(800, 300).InRange)
	require.Negative(t, float64(s.Flux(200, 300)))
	require.Zero(t, s.Describe(200, 300).Nusselt)
}

// A marginal layer at the bottom: its local Rayleigh number is the critical one.
func TestBottomLayerLoss(t *testing.T) {
	b := BottomLayer{Layer: mantleLayer, Viscosity: creep(300e3), Critical: 660}
	require.NoError(t, b.Check())
	q := float64(b.Flux(2500, 1900))
	delta := 4 * 600 / q
	eta := float64(creep(300e3).At(2200))
	require.InEpsilon(t, 660, buoyancy(mantleLayer)*600*math.Pow(delta, 3)/eta, 1e-12)
	d := b.Describe(2500, 1900)
	require.InEpsilon(t, delta, float64(d.Lid), 1e-12)
	require.InEpsilon(t, 2.89e6/delta, d.Nusselt, 1e-12)
	require.InEpsilon(t, eta, float64(d.Viscosity), 1e-12)
	require.InEpsilon(t, buoyancy(mantleLayer)*600*math.Pow(2.89e6, 3)/eta, d.Rayleigh, 1e-12)
	require.InEpsilon(t, 600/float64(creep(300e3).Scale(2200)), d.FrankKamenetskii, 1e-12)
	require.True(t, d.InRange)
	// A colder core takes up heat by conduction.
	require.InEpsilon(t, -4*600/2.89e6, float64(b.Flux(1900, 2500)), 1e-12)
	require.False(t, b.Describe(1900, 2500).InRange)
	// Nearly equal: conduction, not less.
	require.InEpsilon(t, 4*1e-9/2.89e6, float64(b.Flux(units.Temperature(1900+1e-9), 1900)), 1e-3)
}
