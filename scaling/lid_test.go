package scaling

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/units"
)

var creep = Arrhenius{Reference: 1e19, Anchor: 1600, Energy: 300 * units.KilojoulePerMole}

func TestViscosities(t *testing.T) {
	// The scale is that of the derivative, |η/(dη/dT)|.
	for _, v := range []Viscosity{creep, Exponential{Reference: 1e19, Anchor: 1600, Fold: 70}} {
		require.InEpsilon(t, 1e19, float64(v.At(1600)), 1e-12)
		const h = 0.01
		slope := math.Log(float64(v.At(1500+h))/float64(v.At(1500-h))) / (2 * h)
		require.InEpsilon(t, -1/slope, float64(v.Scale(1500)), 1e-6)
	}
	for want, err := range map[string]error{
		"Arrhenius.Reference":   Arrhenius{Anchor: 1, Energy: 1}.Check(),
		"Arrhenius.Anchor":      Arrhenius{Reference: 1, Energy: 1}.Check(),
		"Arrhenius.Energy":      Arrhenius{Reference: 1, Anchor: 1}.Check(),
		"Exponential.Reference": Exponential{Anchor: 1, Fold: 1}.Check(),
		"Exponential.Anchor":    Exponential{Reference: 1, Fold: 1}.Check(),
		"Exponential.Fold":      Exponential{Reference: 1, Anchor: 1}.Check(),
	} {
		require.ErrorContains(t, err, want)
	}
}

// Lid, boundary layer and flux fit together, and the flux is that of the law on
// dimensionless groups.
func TestLidIsConsistent(t *testing.T) {
	l := mantle()
	for _, s := range []LidLaw{DavailleJaupartLid, SolomatovMoresiLid} {
		lid, err := s.Lid(l, creep, 1600)
		require.NoError(t, err)
		require.Equal(t, StagnantLidRegime, lid.Regime)
		k := float64(l.Material.Conductivity)
		q := float64(lid.HeatFlux)
		require.InEpsilon(t, q, k*float64(lid.Base.Sub(l.Top))/float64(lid.Thickness), 1e-12)
		require.InEpsilon(t, q, k*float64(lid.RheologicalDrop)/float64(lid.LayerThickness), 1e-12)
		require.InDelta(t, 1600, float64(lid.Base.Add(lid.RheologicalDrop)), 1e-9)
		require.InEpsilon(t, s.Drop*float64(lid.ViscousScale), float64(lid.RheologicalDrop), 1e-12)

		nu, err := StagnantLid(s, "").At(Groups{InteriorRayleigh: lid.InteriorRayleigh, FrankKamenetskii: lid.FrankKamenetskii})
		require.NoError(t, err)
		require.InEpsilon(t, nu, lid.Nusselt, 1e-12)

		// The boundary layer is marginal, with the law's own critical number.
		local := buoyancy(l) * float64(lid.RheologicalDrop) * math.Pow(float64(lid.LayerThickness), 3) / float64(creep.At(1600))
		critical, err := s.CriticalRayleigh()
		require.NoError(t, err)
		require.InEpsilon(t, critical, local, 1e-10)
	}
	// 0.53 and 0.47 differ by 13%.
	a, err := SolomatovMoresi().At(Groups{InteriorRayleigh: 1e8, FrankKamenetskii: 10})
	require.NoError(t, err)
	b, err := DavailleJaupart().At(Groups{InteriorRayleigh: 1e8, FrankKamenetskii: 10})
	require.NoError(t, err)
	require.InEpsilon(t, 0.53/0.47, a/b, 1e-12)
	// Beyond a contrast of 1e6 the laboratory law says that it is stretched.
	_, err = DavailleJaupart().At(Groups{InteriorRayleigh: 1e8, FrankKamenetskii: 18})
	require.ErrorIs(t, err, ErrOutOfRange)
}

func TestRheologicalDrop(t *testing.T) {
	x, err := RheologicalDrop(15, 1)
	require.NoError(t, err)
	require.InEpsilon(t, SolomatovMoresiLid.Drop/15, x, 1e-14)
	x, err = RheologicalDrop(40, 3)
	require.NoError(t, err)
	require.InEpsilon(t, 0.12, x, 1e-14)
	refuses(t, "Frank-Kamenetskii parameter")(RheologicalDrop(0, 1))
	refuses(t, "stress exponent")(RheologicalDrop(1, 0))
}

func TestMarginalLid(t *testing.T) {
	critical, err := DavailleJaupartLid.CriticalRayleigh()
	require.NoError(t, err)
	s, err := MarginalLid(2.24, critical)
	require.NoError(t, err)
	require.InEpsilon(t, DavailleJaupartLid.Prefactor, s.Prefactor, 1e-12)
	refuses(t, "LidLaw.Prefactor")(LidLaw{Drop: 1}.CriticalRayleigh())
	refuses(t, "LidLaw.Prefactor")(MarginalLid(1e300, 1))
	refuses(t, "drop")(MarginalLid(0, 1))
	refuses(t, "critical Rayleigh number")(MarginalLid(1, math.NaN()))
}

func TestLidOutOfRange(t *testing.T) {
	// A viscosity that changes by a factor e in 700 K makes no lid.
	weak := Exponential{Reference: 1e19, Anchor: 1600, Fold: 700}
	lid, err := DavailleJaupartLid.Lid(mantle(), weak, 1600)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.Equal(t, SmallContrast, lid.Regime)
	// Rock so stiff that the lid fills the layer: the violation names the
	// Rayleigh number at which it would not.
	lid, err = DavailleJaupartLid.Lid(mantle(), Arrhenius{Reference: 1e25, Anchor: 1600, Energy: creep.Energy}, 1600)
	var r *RangeError
	require.ErrorAs(t, err, &r)
	require.Less(t, lid.Nusselt, 1.0)
	least := r.Violations[0].Limit.Min
	nu, err := StagnantLid(DavailleJaupartLid, "").At(Groups{InteriorRayleigh: least, FrankKamenetskii: lid.FrankKamenetskii})
	require.NoError(t, err)
	require.InEpsilon(t, 1, nu, 1e-12)
}

func TestInteriorFor(t *testing.T) {
	l := mantle()
	for _, q := range []units.HeatFlux{5e-3, 20e-3, 80e-3} {
		interior, err := DavailleJaupartLid.InteriorFor(l, creep, q)
		require.NoError(t, err)
		lid, err := DavailleJaupartLid.Lid(l, creep, interior)
		require.NoError(t, err)
		require.InEpsilon(t, float64(q), float64(lid.HeatFlux), 1e-10)
	}
	_, err := DavailleJaupartLid.InteriorFor(l, creep, 0)
	require.ErrorContains(t, err, "heat flux")
	refuses(t, "heat flux")(DavailleJaupartLid.InteriorFor(l, creep, 1e30))
}

// In steady state the flux in is the flux out; a stronger dependence on
// temperature makes the interior nearly as hot as the bottom.
func TestInteriorBetween(t *testing.T) {
	l := mantle()
	l.Bottom = 1800
	const rd = 1000
	last := 0.0
	for _, fold := range []units.TemperatureDifference{160, 80, 40} {
		eta := Exponential{Reference: 1e19, Anchor: 1800, Fold: fold}
		interior, err := SolomatovMoresiLid.InteriorBetween(l, eta, rd)
		require.NoError(t, err)
		lid, _ := SolomatovMoresiLid.Lid(l, eta, interior)
		drop := float64(l.Bottom.Sub(interior))
		mean := interior.Add(units.TemperatureDifference(drop / 2))
		below := float64(l.Material.Conductivity) * math.Cbrt(buoyancy(l)/(float64(eta.At(mean))*rd)) * math.Pow(drop, 4./3)
		require.InEpsilon(t, float64(lid.HeatFlux), below, 1e-8)
		require.Greater(t, float64(interior), last)
		last = float64(interior)
	}
	require.Greater(t, last, 1690.)
	_, err := SolomatovMoresiLid.InteriorBetween(l, creep, 0)
	require.ErrorContains(t, err, "critical Rayleigh number")
	l.Bottom = l.Top
	refuses(t, "Layer.Bottom")(SolomatovMoresiLid.InteriorBetween(l, creep, rd))
}

func TestLidErrors(t *testing.T) {
	_, err := LidLaw{Prefactor: 1}.Lid(mantle(), creep, 1600)
	require.ErrorContains(t, err, "LidLaw.Drop")
	refuses(t, "LidLaw.Prefactor")(LidLaw{Drop: 1}.Lid(mantle(), creep, 1600))
	refuses(t, "viscosity is nil")(DavailleJaupartLid.Lid(mantle(), nil, 1600))
	refuses(t, "Arrhenius.Reference")(DavailleJaupartLid.Lid(mantle(), Arrhenius{}, 1600))
	refuses(t, "interior temperature")(DavailleJaupartLid.Lid(mantle(), creep, 300))
	l := mantle()
	l.Material.SpecificHeat = 0
	refuses(t, "Material.SpecificHeat")(DavailleJaupartLid.Lid(l, creep, 1600))
}

// Bounds of Solomatov (1995): θ of 4 and 8 for n = 1; 8 and 16 for n = 3.
func TestRegimes(t *testing.T) {
	for _, tt := range []struct {
		theta, n float64
		want     Regime
	}{
		{0, 1, SmallContrast}, {3.9, 1, SmallContrast}, {4.1, 1, Transitional}, {7.9, 1, Transitional}, {8.1, 1, StagnantLidRegime},
		{7.9, 3, SmallContrast}, {8.1, 3, Transitional}, {15.9, 3, Transitional}, {16.1, 3, StagnantLidRegime},
	} {
		r, err := RegimeOf(tt.theta, tt.n)
		require.NoError(t, err)
		require.Equal(t, tt.want, r, "θ %g n %g", tt.theta, tt.n)
	}
	_, err := RegimeOf(-1, 1)
	require.ErrorContains(t, err, "Frank-Kamenetskii parameter")
	refuses(t, "stress exponent")(RegimeOf(1, 0))
}

func TestPatterns(t *testing.T) {
	for _, tt := range []struct {
		top, contrast float64
		want          Pattern
	}{
		{1000, 9000, Bimodal}, {1000, 300, Rolls}, {1000, 11000, UnderneathLid}, {300, 1700, Rolls}, {300, 1800, Bimodal},
	} {
		p, err := PatternOf(tt.top, tt.contrast)
		require.NoError(t, err)
		require.Equal(t, tt.want, p, "Ra %g contrast %g", tt.top, tt.contrast)
	}
	p, err := PatternOf(1000, 1e6)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.Equal(t, UnderneathLid, p)
	refuses(t, "top Rayleigh number")(PatternOf(0, 10))
	refuses(t, "viscosity contrast")(PatternOf(1, math.NaN()))
}

func TestConductivityFactor(t *testing.T) {
	f, err := ConductivityFactor(2)
	require.NoError(t, err)
	require.InEpsilon(t, math.Pow(2, -0.82), f, 1e-14) // Deschamps (2021, abstract)
	f, err = ConductivityFactor(1)
	require.NoError(t, err)
	require.Equal(t, 1.0, f)
	for _, bad := range []float64{0.9, math.NaN(), math.Inf(1)} {
		refuses(t, "conductivity ratio")(ConductivityFactor(bad))
	}
}
