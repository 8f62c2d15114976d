package boussinesq

import (
	"math"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func judged(t testing.TB, l Layer) map[string]Criterion {
	t.Helper()
	list, err := l.Validity()
	require.NoError(t, err)
	byName := map[string]Criterion{}
	for _, c := range list {
		byName[c.Name] = c
	}
	require.Len(t, byName, len(list), "names are unique")
	return byName
}

// d = 2, κ = 1/8, θ = 4, ρ = 4, α = 1/4, g = 8, c_p = 2, Pr = 32.
func TestCriteriaByHand(t *testing.T) {
	l := round()
	l.Material.BulkModulus = 256
	l.Material.Sensitivity = Sensitivity{Viscosity: -0.5, Expansivity: 0.02, Conductivity: -0.03, SpecificHeat: 0.001}
	for name, want := range map[string]struct {
		value, bound float64
		verdict      Verdict
	}{
		"thermal expansion":            {1, 0.1, Strained},
		"dissipation number":           {2, 0.1, Strained},
		"adiabatic temperature change": {302 * math.Expm1(2) / 4, 0.1, Strained},
		"kinetic energy against heat":  {1. / 16 / 16 / 4 / 2, 0.1, Holds},
		"inertia":                      {1. / 32, 0.01, Strained},
		"compression":                  {0.25, 0.1, Strained},
		"Mach number":                  {0.5, 0.3, Strained},
		"change of viscosity":          {2, 0.1, Strained},
		"change of expansivity":        {0.08, 0.1, Holds},
		"change of conductivity":       {0.12, 0.1, Strained},
		"change of specific heat":      {0.004, 0.1, Holds},
	} {
		c := judged(t, l)[name]
		inRelative(t, want.value, c.Value, 1e-14, name)
		assert.Equal(t, want.bound, c.Bound, name)
		assert.Equal(t, want.verdict, c.Verdict, name)
		assert.Equal(t, c.Value/c.Bound, c.Excess(), name)
	}
	assert.Len(t, judged(t, l), 11)
}

func TestCriteriaNameWhatIsNotKnown(t *testing.T) {
	list := judged(t, round())
	for _, name := range []string{
		"compression", "Mach number", "change of viscosity", "change of expansivity",
		"change of conductivity", "change of specific heat",
	} {
		c := list[name]
		assert.Equal(t, NotJudged, c.Verdict, name)
		assert.Zero(t, c.Value)
		assert.Contains(t, c.Sentence, "material", name)
		assert.Contains(t, c.String(), "not judged", name)
	}
	assert.Contains(t, list["change of specific heat"].Sentence, "specific heat")
}

func TestEachCriterionIsDocumented(t *testing.T) {
	for _, l := range []Layer{round(), upperMantle(t), tank(t)} {
		for name, c := range judged(t, l) {
			assert.NotEmpty(t, c.Formula, name)
			assert.NotEmpty(t, c.Source, name)
			assert.True(t, strings.HasSuffix(c.Sentence, "."), name)
			assert.Positive(t, c.Bound, name)
			assert.True(t, strings.HasPrefix(c.String(), name+": "), name)
		}
	}
}

// A bound is the last value that holds.
func TestVerdictTurnsAtTheBound(t *testing.T) {
	c := Criterion{Value: 0.1, Bound: 0.1}
	c.judge()
	assert.Equal(t, Holds, c.Verdict)
	c.Value = math.Nextafter(0.1, 1)
	c.judge()
	assert.Equal(t, Strained, c.Verdict)
	c = Criterion{Value: 9, Bound: 0.1, Verdict: NotJudged}
	c.judge()
	assert.Equal(t, NotJudged, c.Verdict)
	assert.Equal(t, []string{"holds", "strained", "not judged", "Verdict(5)"},
		[]string{Holds.String(), Strained.String(), NotJudged.String(), Verdict(5).String()})
}

// The ten percent criterion of Gray & Giorgini (1976), numbers from memory.
// Air near 15 °C: ΔT up to 28.6 K and depths up to 830 m; ours is air at 20 °C.
// Water: ΔT up to 1.25 K, where its expansivity at 15 °C has changed by 10 %.
func TestLimitsOfGrayAndGiorgini(t *testing.T) {
	p, err := ByName("air-20C")
	require.NoError(t, err)
	air := Layer{Material: p.Material(), Depth: 830, Gravity: 9.81, Top: 293, Bottom: 293 + 28.6}
	list := judged(t, air)
	assert.InDelta(t, 1, list["thermal expansion"].Excess(), 0.03)
	assert.InDelta(t, 0.7, list["compression"].Excess(), 0.02) // isentropic: 1/1.4 of their isothermal one

	water := Layer{Material: water(t), Depth: 0.01, Gravity: 9.81, Top: 293, Bottom: 293 + 1.25}
	list = judged(t, water)
	c := list["change of expansivity"]
	assert.InDelta(t, 0.064, c.Value, 1e-3) // 0.051 a kelvin at 20 °C, 0.08 at 15 °C
	assert.Equal(t, Holds, c.Verdict)
	water.Bottom = 293 + 2.5
	assert.Equal(t, Strained, judged(t, water)["change of expansivity"].Verdict)
}

// The whole mantle strains what the laboratory does not.
func TestWhatStrainsTheMantle(t *testing.T) {
	mantle := judged(t, upperMantle(t))
	inRelative(t, 0.1617, mantle["dissipation number"].Value, 1e-14, "α g d/c_p; computed apart")
	assert.Equal(t, Strained, mantle["dissipation number"].Verdict)
	assert.Equal(t, Strained, mantle["compression"].Verdict)
	assert.Equal(t, Holds, mantle["inertia"].Verdict)
	assert.Less(t, mantle["inertia"].Value, 1e-20)
	lab := judged(t, tank(t))
	for _, name := range []string{"thermal expansion", "dissipation number", "adiabatic temperature change", "compression", "Mach number"} {
		assert.Equal(t, Holds, lab[name].Verdict, name)
	}
	assert.Equal(t, Strained, lab["inertia"].Verdict)
}

// Numbers without dimension do not know the unit.
func TestCriteriaAreInvariantToUnits(t *testing.T) {
	u := unit{length: 16, time: 0.5, mass: 1024, temperature: 4}
	for _, l := range []Layer{tank(t), upperMantle(t)} {
		a, b := judged(t, l), judged(t, u.rescale(l))
		for name := range a {
			assert.Equal(t, a[name].Value, b[name].Value, name)
			assert.Equal(t, a[name].Sentence, b[name].Sentence, name)
		}
	}
}

func TestCriterionPrints(t *testing.T) {
	l := round()
	assert.Equal(t, "thermal expansion: α ΔT = 1, strained (bound 0.1). "+
		"Density changes by 100 % with temperature; the approximation keeps that in the buoyancy alone.",
		judged(t, l)["thermal expansion"].String())
	l.Material.Sensitivity = Sensitivity{Viscosity: -0.5, Conductivity: 0.03}
	list := judged(t, l)
	assert.Contains(t, list["change of viscosity"].Sentence, "a factor 7.4: let the model carry a viscosity law.")
	assert.Contains(t, list["change of conductivity"].Sentence, "12 %: let the model")
	l.Material.Sensitivity.Conductivity = 0.02
	assert.True(t, strings.HasSuffix(judged(t, l)["change of conductivity"].Sentence, "about 8 %."))
}

func TestValidityOutOfRange(t *testing.T) {
	l := round()
	l.Material.SpecificHeat, l.Gravity = 1e-2, 1e6
	_, err := l.Validity()
	wantField(t, err, "adiabatic temperature change")
	l = round()
	l.Bottom = units.Temperature(299)
	_, err = l.Validity()
	assert.ErrorIs(t, err, ErrStable)
}
