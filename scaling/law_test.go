package scaling

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

// given has every group, inside the range of most laws.
var given = Groups{
	Rayleigh: 1e7, HeatingRayleigh: 1e8, InteriorRayleigh: 1e8, BottomRayleigh: 1e8, TopRayleigh: 1e3, PorousRayleigh: 200,
	Prandtl: 7, Heating: 10, FrankKamenetskii: 12, StressExponent: 1, CellWidth: 1, Slenderness: 3, Inclination: 0.3,
}

// Every law of the catalogue is complete, and finite at a generous set of groups.
func TestCatalogueIsComplete(t *testing.T) {
	laws := append(All(), Unconfirmed()...)
	require.Greater(t, len(laws), 45)
	for _, l := range laws {
		t.Run(l.Name, func(t *testing.T) {
			require.NotEmpty(t, l.Formula)
			require.NotEmpty(t, l.Source)
			require.NotZero(t, l.Quantity)
			require.NotZero(t, l.Geometry)
			require.NotZero(t, l.Flow)
			require.NotZero(t, l.Rheology)
			require.NotZero(t, l.Basis)
			require.Contains(t, l.String(), l.Source)
			for _, limit := range l.Limits {
				require.Less(t, limit.Min, limit.Max)
			}
			if l.exponentOnly() {
				_, err := l.At(given)
				require.ErrorIs(t, err, ErrExponentOnly)
				_, ok := l.Exponent()
				require.True(t, ok)
				require.True(t, math.IsNaN(l.Evaluate(given)))
				return
			}
			require.Contains(t, l.Needs, l.Basis)
			x := l.Evaluate(given)
			require.False(t, math.IsNaN(x) || math.IsInf(x, 0))
			require.Positive(t, x)
			// Without the groups it needs there is no value, but an error.
			_, err := l.At(Groups{})
			require.ErrorIs(t, err, ErrMissing)
			require.ErrorContains(t, err, l.Needs[0].String())
		})
	}
}

// A law that lists its powers follows them: doubling a group multiplies the
// value by two to the exponent.
func TestPowersAreWhatTheyClaim(t *testing.T) {
	for _, l := range All() {
		if l.exponentOnly() {
			continue
		}
		for _, p := range l.Powers {
			v := given.with(p.Group, 2*p.Group.Of(given))
			require.InEpsilon(t, math.Pow(2, p.Exponent), l.Evaluate(v)/l.Evaluate(given), 1e-12, "%s in %v", l.Name, p.Group)
		}
	}
}

// The local power law touches the law: same value, same slope.
func TestLocalPowerLaw(t *testing.T) {
	for _, l := range All() {
		if l.exponentOnly() {
			continue
		}
		c, e, _ := l.Local(given)
		basis := l.Basis.Of(given)
		require.InEpsilon(t, l.Evaluate(given), c*math.Pow(basis, e), 1e-12, l.Name)
		up := l.Evaluate(given.with(l.Basis, 1.001*basis)) / l.Evaluate(given)
		require.InDelta(t, math.Log(up)/math.Log(1.001), e, 2e-3, l.Name)
	}
	_, _, err := exponentLaws()[0].Local(given)
	require.ErrorIs(t, err, ErrExponentOnly)
}

func TestRange(t *testing.T) {
	l := GlobeDropkin()
	inside := Groups{Rayleigh: 1e6, Prandtl: 7}
	x, err := l.At(inside)
	require.NoError(t, err)
	require.True(t, l.Holds(inside))
	require.NoError(t, l.InRange(inside))

	outside := Groups{Rayleigh: 1e4, Prandtl: 1e5}
	y, err := l.At(outside)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.InEpsilon(t, x*math.Pow(1e-2, 1./3)*math.Pow(1e5/7., 0.074), y, 1e-12)
	require.False(t, l.Holds(outside))
	var r *RangeError
	require.ErrorAs(t, err, &r)
	require.Len(t, r.Violations, 2)
	require.EqualError(t, err, "scaling: horizontal liquid layer: Ra is 1e+04, want 3e+05 to 7e+09, Pr is 1e+05, want 0.02 to 8750")

	// The ends belong to the range.
	for _, ra := range []float64{3e5, 7e9} {
		_, err := l.At(Groups{Rayleigh: ra, Prandtl: 0.02})
		require.NoError(t, err)
	}
	// A limit on a group that is not needed is tested where it is given.
	_, err = HollandsInclined().At(Groups{Rayleigh: 1e4})
	require.NoError(t, err)
	_, err = HollandsInclined().At(Groups{Rayleigh: 1e4, Prandtl: 7})
	require.ErrorIs(t, err, ErrOutOfRange)
	_, err = HollandsInclined().At(Groups{Rayleigh: 1e4, Inclination: 1.2})
	require.ErrorIs(t, err, ErrOutOfRange)
	require.Equal(t, ">= 3", Limit{RayleighNumber, 3, math.Inf(1)}.interval())
	require.Equal(t, "<= 3", Limit{RayleighNumber, 0, 3}.interval())
}

// The ranges of the laws, as their sources (or, where they have none, their
// comments) give them.
func TestRangesOfTheCatalogue(t *testing.T) {
	inf := math.Inf(1)
	want := map[string][]Limit{
		"one-mode loop":                         {{RayleighNumber, 27 * math.Pow(math.Pi, 4) / 4, inf}},
		"steady rolls, free walls, infinite Pr": {{RayleighNumber, 1e6, inf}, {CellWidth, 0.1, 10}, {PrandtlNumber, 100, inf}},
		// Wen et al. (2020): periods π/5 to 4π, Pr 0.01 to 100
		"steady rolls, free walls, finite Pr":        {{RayleighNumber, 1e6, inf}, {CellPeriod, 0.628318530717958, 12.5663706143592}, {PrandtlNumber, 0.01, 100}},
		"steady rolls, free walls, finite Pr: speed": {{RayleighNumber, 1e6, inf}, {CellPeriod, 0.628318530717958, 12.5663706143592}, {PrandtlNumber, 0.01, 100}},
		"steady rolls, rigid walls, infinite Pr":     {{RayleighNumber, 1e6, inf}, {CellWidth, 0.1, 2.5}, {PrandtlNumber, 100, inf}},
		"steady rolls of best width, rigid walls":    {{RayleighNumber, 1e7, 1e9}, {PrandtlNumber, 6, 8}},
		"porous layer":                       {{PorousRayleighNumber, 40, 400}},
		"turbulent layer, heat flux":         {{RayleighNumber, 1e5, 1e14}, {PrandtlNumber, 1e-3, 1e4}},
		"turbulent layer, Reynolds number":   {{RayleighNumber, 1e5, 1e14}, {PrandtlNumber, 1e-3, 1e4}},
		"stagnant lid, time dependent":       {{LidParameter, 4, inf}},
		"stagnant lid, laboratory":           {{LidParameter, 4, inf}, {FrankKamenetskiiParameter, 0, 13.8155105579643}},
		"stagnant lid, steady":               {{LidParameter, 4, inf}},
		"onset under a stagnant lid":         {{LidParameter, 4, inf}},
		"bound of the stagnant lid in 3-D":   nil,
		"bound of bimodal flow in 3-D":       nil,
		"bound of plate motion":              nil,
		"horizontal liquid layer":            {{RayleighNumber, 3e5, 7e9}, {PrandtlNumber, 0.02, 8750}},
		"wide horizontal layer, all regimes": {{RayleighNumber, 0, 1e9}},
		"inclined air layer":                 {{RayleighNumber, 0, 1e5}, {Inclination, 0, 1.0471975511966}, {Slenderness, 12, inf}, {PrandtlNumber, 0.68, 0.75}},
		"square slot":                        {{Slenderness, 1, 2}, {PrandtlNumber, 1e-3, 1e5}, {SlotRayleighNumber, 1e3, inf}},
		"tall slot":                          {{RayleighNumber, 1e3, 1e10}, {Slenderness, 2, 10}, {PrandtlNumber, 0, 1e5}},
		"very tall slot":                     {{RayleighNumber, 1e4, 1e7}, {Slenderness, 10, 40}, {PrandtlNumber, 1, 2e4}},
		"slot, turbulent":                    {{RayleighNumber, 1e6, 1e9}, {Slenderness, 1, 40}, {PrandtlNumber, 1, 20}},
		"vertical plate, all regimes":        {{RayleighNumber, 0.1, 1e12}},
		"vertical plate, laminar":            {{RayleighNumber, 0.1, 1e9}},
		"vertical plate, rough, laminar":     {{RayleighNumber, 1e4, 1e9}},
		"vertical plate, rough, turbulent":   {{RayleighNumber, 1e9, 1e13}},
		"horizontal cylinder":                {{RayleighNumber, 0, 1e12}},
		"hot plate facing up, laminar":       {{RayleighNumber, 1e4, 1e7}},
		"hot plate facing up, turbulent":     {{RayleighNumber, 1e7, 1e11}},
		"hot plate facing down, older":       {{RayleighNumber, 1e5, 1e10}},
		"hot plate facing down, newer":       {{RayleighNumber, 1e5, 1e10}},
	}
	seen := 0
	for _, l := range All() {
		limits, ok := want[l.Name]
		if !ok {
			continue // the marginal laws, whose range is that of their parameter, and exponents
		}
		seen++
		require.Len(t, l.Limits, len(limits), l.Name)
		for i, limit := range limits {
			require.Equal(t, limit.Group, l.Limits[i].Group, l.Name)
			require.InDelta(t, limit.Min, l.Limits[i].Min, 1e-12*limit.Min, l.Name)
			if math.IsInf(limit.Max, 1) {
				require.True(t, math.IsInf(l.Limits[i].Max, 1), l.Name)
			} else {
				require.InEpsilon(t, limit.Max, l.Limits[i].Max, 1e-12, l.Name)
			}
		}
	}
	require.Equal(t, len(want), seen)

	// The marginal laws begin where they give Nu = 1, or a layer as thick as the
	// depth.
	for _, l := range []Law{MarginalLayer(900, Free), HowardCycle(900, Free), WholeLayer(900, 0.3, Free), MarginalTop(900, Free), MarginalMixed(900, Free)} {
		least := l.Limits[0].Min
		require.InEpsilon(t, 1, l.Evaluate(Groups{}.with(l.Basis, least)), 1e-12, l.Name)
		require.True(t, l.Holds(Groups{}.with(l.Basis, least)))
		require.False(t, l.Holds(Groups{}.with(l.Basis, 0.999*least)))
		require.True(t, math.IsInf(l.Limits[0].Max, 1))
	}
}

// Correlations without a row among the check values, by hand at powers of ten.
func TestPowerLawsOfTheHandbooks(t *testing.T) {
	rough, roughTurbulent := VerticalPlateRough()
	up, upTurbulent := HotPlateUp()
	older, newer := HotPlateDown()
	for _, tt := range []struct {
		law    Law
		ra, nu float64
	}{
		{MacGregorEmeryTurbulent(), 1e9, 46}, {rough, 1e8, 59}, {roughTurbulent, 1e12, 1000}, {up, 1e4, 5.4}, {upTurbulent, 1e9, 150},
		{older, 1e8, 27}, {newer, 1e10, 52},
	} {
		nu, err := tt.law.At(Groups{Rayleigh: tt.ra})
		require.NoError(t, err)
		require.InEpsilon(t, tt.nu, nu, 1e-12, tt.law.Name)
	}
	nu, err := BestRigidRolls().At(Groups{Rayleigh: 1e8})
	require.NoError(t, err)
	require.InEpsilon(t, 0.115*math.Pow(10, 2.48), nu, 1e-12)
	// exponents that are known alone
	var exponents []float64
	for _, l := range exponentLaws() {
		e, ok := l.Exponent()
		require.True(t, ok)
		exponents = append(exponents, e)
	}
	// Goluskin & Spiegel (2012), Okuda et al. (2025), Wen et al. (2022) at fixed
	// and at best period, Fowler (1985), Howard's argument in a porous layer
	require.Equal(t, []float64{-0.2, 1. / 6, 0.25, 1. / 3, 0.2, 1}, exponents)
}

func TestLawErrors(t *testing.T) {
	l := HowardCycle(1000, Free)
	for _, bad := range []float64{-1, math.NaN(), math.Inf(1)} {
		_, err := l.At(Groups{Rayleigh: bad})
		var f *FieldError
		require.ErrorAs(t, err, &f)
		require.Equal(t, "Groups: Ra", f.Field)
	}
	_, err := l.At(Groups{Rayleigh: 1e6, Prandtl: math.Inf(1)})
	require.NoError(t, err)
	_, err = l.At(Groups{Rayleigh: 1e6, Prandtl: math.NaN()})
	require.ErrorContains(t, err, "Groups: Pr")
	_, err = l.At(Groups{Rayleigh: 1e6, Inclination: -0.1})
	require.ErrorContains(t, err, "inclination")
	_, err = GlobeDropkin().At(Groups{Rayleigh: 1e6})
	require.ErrorIs(t, err, ErrMissing)
	require.EqualError(t, err, "scaling: Groups: Pr is 0, want > 0 for horizontal liquid layer: not given")

	// An infinite value is an error, not a value.
	_, err = GlobeDropkin().At(Groups{Rayleigh: 1e6, Prandtl: math.Inf(1)})
	require.ErrorIs(t, err, ErrNoValue)
	// So is a cell width that the core cannot have.
	_, err = FreeRolls(ViscousCore).At(Groups{Rayleigh: 1e6, CellWidth: 50})
	require.ErrorIs(t, err, ErrNoValue)
	_, err = RigidRolls().At(Groups{Rayleigh: 1e6, CellWidth: 3})
	require.ErrorIs(t, err, ErrNoValue)
	_, err = FreeRollsReynolds().At(Groups{Rayleigh: 1e6, CellWidth: 50, Prandtl: 1})
	require.ErrorIs(t, err, ErrNoValue)
}

func TestOwnLaw(t *testing.T) {
	l := Law{
		Name: "tank runs", Formula: "Nu = 0.2 Ra^0.3", Quantity: Nusselt, Basis: RayleighNumber,
		Prefactor: 0.2, Powers: []Power{{RayleighNumber, 0.3}},
	}
	x, err := l.At(Groups{Rayleigh: 1e6})
	require.NoError(t, err)
	require.InEpsilon(t, 0.2*math.Pow(1e6, 0.3), x, 1e-14)
	// No Needs, so that a group of zero gives what the formula gives.
	x, err = l.At(Groups{})
	require.NoError(t, err)
	require.Zero(t, x)
}

func TestQueries(t *testing.T) {
	all := All()
	require.Equal(t, len(all), len(Find(Query{})))
	for _, l := range Find(Query{Walls: Free, Quantity: Nusselt, Heating: FromBelow, Flow: Steady}) {
		require.True(t, l.Walls == Free || l.Walls == AnyWalls)
		require.Equal(t, Nusselt, l.Quantity)
		require.Equal(t, Steady, l.Flow)
	}
	names := func(q Query) (s []string) {
		for _, l := range Find(q) {
			s = append(s, l.Name)
		}
		return s
	}
	require.Equal(t, []string{"porous layer", "high porous Rayleigh number"}, names(Query{Geometry: PorousLayer}))
	require.Equal(t, []string{"bound of plate motion"}, names(Query{Rheology: Pseudoplastic}))
	require.Contains(t, names(Query{Basis: BottomRayleighNumber}), "stagnant lid, steady")
	require.NotContains(t, names(Query{}), MixedHeating().Name)

	slot := Groups{Rayleigh: 1e6, Prandtl: 0.71, Slenderness: 4}
	require.Equal(t, []string{"tall slot"}, names(Query{Geometry: Slot, Within: slot}))
	slot.Slenderness = 20
	slot.Prandtl = 2
	require.Equal(t, []string{"very tall slot", "slot, turbulent"}, names(Query{Geometry: Slot, Within: slot}))
}

// The marginal laws hold one inside the other: the intermittent flux is twice
// the steady one, and both grow with a thinner layer.
func TestMarginalLaws(t *testing.T) {
	v := Groups{Rayleigh: 1e8}
	steady, cycle := MarginalLayer(1000, Free).Evaluate(v), HowardCycle(1000, Free).Evaluate(v)
	require.InEpsilon(t, 2, cycle/steady, 1e-14)
	// The layer of either is marginal by its own definition.
	rd, err := LocalRayleigh(1e8, 0.5, 1/(2*steady))
	require.NoError(t, err)
	require.InEpsilon(t, 1000, rd, 1e-12)
	rd, err = LocalRayleigh(1e8, 0.5, 1/cycle) // at the end of a cycle the flux is half of the mean
	require.NoError(t, err)
	require.InEpsilon(t, 1000, rd, 1e-12)
	for _, bad := range [][3]float64{{-1, 1, 1}, {1, math.NaN(), 1}, {1, 1, -1}} {
		_, err := LocalRayleigh(bad[0], bad[1], bad[2])
		require.Error(t, err)
	}
	// Whole-layer form: one at the critical number.
	require.InEpsilon(t, 1, WholeLayer(1708, 0.3, Rigid).Evaluate(Groups{Rayleigh: 1708}), 1e-14)
	// The top layer, heated from within: its local number is Rd.
	h := Groups{HeatingRayleigh: 1e9}
	ti := MarginalTop(1000, Free).Evaluate(h)
	// thickness k T/(H d) = T, so the local number is Ra_H T · T³
	require.InEpsilon(t, 1000, 1e9*math.Pow(ti, 4), 1e-12)
}

// Both layers are marginal and the heat is balanced.
func TestMarginalMixed(t *testing.T) {
	flux, temperature := MarginalMixed(1000, Free), MarginalMixedTemperature(1000, Free)
	for _, h := range []float64{0, 1, 5, 20, 46} {
		v := Groups{Rayleigh: 1e8, Heating: h}
		nu, err := flux.At(v)
		require.NoError(t, err)
		ti, err := temperature.At(v)
		require.NoError(t, err)
		bottom := nu - h
		for _, layer := range []struct{ drop, flux float64 }{{ti, nu}, {1 - ti, bottom}} {
			rd, err := LocalRayleigh(1e8, layer.drop, layer.drop/layer.flux)
			require.NoError(t, err)
			require.InEpsilon(t, 1000, rd, 1e-9, "H = %g", h)
		}
	}
	v := Groups{Rayleigh: 1e8}
	require.InEpsilon(t, MarginalLayer(1000, Free).Evaluate(v), flux.Evaluate(v), 1e-12)
	require.InEpsilon(t, 0.5, temperature.Evaluate(v), 1e-12)
	// H = (Ra/Rd)^(1/3) = 46.4: an interior as hot as the bottom; beyond, none.
	_, err := flux.At(Groups{Rayleigh: 1e8, Heating: 46.5})
	require.ErrorIs(t, err, ErrNoValue)
}

func TestWallsCritical(t *testing.T) {
	for _, w := range []Walls{Free, FreeOverRigid, Rigid} {
		ra, k, err := w.Critical()
		require.NoError(t, err)
		require.Greater(t, ra, 650.)
		require.Greater(t, k, 2.2)
	}
	ra, _, err := FreeOverRigid.Critical()
	require.NoError(t, err)
	require.InDelta(t, 1100.65, ra, 5e-3) // Chandrasekhar (1961)
	ra, k, err := Rigid.Critical()
	require.NoError(t, err)
	require.InDelta(t, 1707.762, ra, 5e-4) // Chandrasekhar (1961)
	require.InDelta(t, 3.117, k, 1e-3)
	_, _, err = AnyWalls.Critical()
	require.ErrorContains(t, err, "walls")
}

func TestNames(t *testing.T) {
	require.Equal(t, "Nusselt number", Nusselt.String())
	require.Equal(t, "unknown kind 99", Quantity(99).String())
	require.Equal(t, "unknown kind -1", Walls(-1).String())
	require.Equal(t, "Group(0)", Group(0).String())
	require.Equal(t, "Group(99)", Group(99).String())
	for g := RayleighNumber; g < lastGroup; g++ {
		require.NotContains(t, g.String(), "Group")
		require.NotEmpty(t, g.String())
	}
	kinds := [][]string{}
	add := func(n int, s func(int) string) {
		var names []string
		for i := range n {
			names = append(names, s(i))
		}
		kinds = append(kinds, names)
	}
	add(8, func(i int) string { return Quantity(i).String() })
	add(9, func(i int) string { return Geometry(i).String() })
	add(4, func(i int) string { return Walls(i).String() })
	add(5, func(i int) string { return Heating(i).String() })
	add(6, func(i int) string { return Rheology(i).String() })
	add(3, func(i int) string { return Flow(i).String() })
	add(6, func(i int) string { return Status(i).String() })
	add(4, func(i int) string { return Regime(i).String() })
	add(4, func(i int) string { return Pattern(i).String() })
	add(3, func(i int) string { return Core(i).String() })
	add(3, func(i int) string { return Recirculation(i).String() })
	add(2, func(i int) string { return Return(i).String() })
	for _, names := range kinds {
		seen := map[string]bool{}
		for _, s := range names {
			require.False(t, seen[s] || strings.HasPrefix(s, "unknown kind"), s)
			seen[s] = true
		}
	}
}

func TestDerivedGroups(t *testing.T) {
	v := Groups{Rayleigh: 1e6, Heating: 20, Prandtl: 0.8, Inclination: math.Pi / 3, CellWidth: 1.5, FrankKamenetskii: 12, StressExponent: 3}
	require.InEpsilon(t, 2e7, HeatingRayleighNumber.Of(v), 1e-14)
	require.InEpsilon(t, 8e5, SlotRayleighNumber.Of(v), 1e-14)
	require.InEpsilon(t, 5e5, InclinedRayleighNumber.Of(v), 1e-14)
	require.Equal(t, 3.0, CellPeriod.Of(v))
	require.Equal(t, 3.0, LidParameter.Of(v))
	require.Equal(t, 1.0, StressExponent.Of(Groups{}))
	require.Zero(t, Group(0).Of(v))
	v.HeatingRayleigh = 7
	require.Equal(t, 7.0, HeatingRayleighNumber.Of(v))
	for g := RayleighNumber; g <= Inclination; g++ {
		require.Equal(t, 0.25, g.Of(v.with(g, 0.25)), g.String())
	}
}

func TestEvaluateAllocatesNothing(t *testing.T) {
	for _, l := range []Law{HowardCycle(1000, Free), SolomatovMoresi(), GrossmannLohse(), CattonTall(), FreeRolls(ViscousCore)} {
		l.Evaluate(given) // fills the memory of cores
		require.Zero(t, testing.AllocsPerRun(100, func() { l.Evaluate(given) }), l.Name)
		require.Zero(t, testing.AllocsPerRun(100, func() { l.Holds(given) }), l.Name)
	}
}

func BenchmarkEvaluate(b *testing.B) {
	for _, l := range []Law{HowardCycle(1000, Free), SolomatovMoresi(), GrossmannLohse(), FreeRolls(ViscousCore)} {
		b.Run("law="+strings.ReplaceAll(l.Name, " ", "-"), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				l.Evaluate(given)
			}
		})
	}
}
