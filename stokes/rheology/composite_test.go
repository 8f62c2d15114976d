package rheology

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// One path of one mechanism is that mechanism in second invariants.
func TestCompositeOfOne(t *testing.T) {
	s := State{Temperature: 1500, Pressure: 3e9, GrainSize: 5e-3}
	for _, m := range []Creep{OlivineDiffusionDry(), OlivineDislocationDry()} {
		c := Composite{Paths: []Path{Alone(m)}}
		want, err := m.Invariants().ViscosityAtStrainRate(1e-14, s)
		require.NoError(t, err)
		got, err := c.ViscosityAtStrainRate(1e-14, s)
		require.NoError(t, err)
		near(t, want, got, 1e-13, m.Name)
		want, err = m.Invariants().ViscosityAtStress(1e6, s)
		require.NoError(t, err)
		got, err = c.ViscosityAtStress(1e6, s)
		require.NoError(t, err)
		near(t, want, got, 1e-13, m.Name)
	}
}

// Side by side strain rates add; in series their inverses do.
func TestCompositeAddsRates(t *testing.T) {
	s := State{Temperature: 230, GrainSize: 1e-3}
	c := Composite{Paths: ColdIce()}
	rate := func(m Creep) float64 {
		r, err := m.Invariants().StrainRate(2e4, s)
		require.NoError(t, err)
		return r
	}
	total := rate(IceDislocation()) + 1/(1/rate(IceGrainBoundarySliding())+1/rate(IceBasalSlip()))
	eta, err := c.ViscosityAtStress(2e4, s)
	require.NoError(t, err)
	near(t, 2e4/(2*total), eta, 1e-13, "at stress")
	eta, err = c.ViscosityAtStrainRate(total, s)
	require.NoError(t, err)
	near(t, 2e4/(2*total), eta, 1e-12, "at strain rate")
}

// Viscosity at the strain rate of a stress is that at the stress, over all the
// stresses, temperatures and grain sizes of a planet.
func TestCompositeInvertsItself(t *testing.T) {
	hard := Olivine()
	hard[1][0].StressExponent = 0.3 // below 1, as no known mechanism: the solver must not care
	for name, paths := range map[string][]Path{"dry": Olivine(), "wet": WetOlivine(), "ice": ColdIce(), "hard": hard, "chain": {InSeries(hard[0][0], hard[1][0], Olivine()[1][0])}} {
		c := Composite{Paths: paths}
		for _, temperature := range []float64{60, 250, 700, 1400, 2200} {
			for _, grain := range []float64{1e-6, 1e-3, 1} {
				for stress := 1.0; stress < 1e10; stress *= 30 {
					s := State{Temperature: temperature, Pressure: 1e9, GrainSize: grain, Water: 300}
					want, err := c.ViscosityAtStress(stress, s)
					if err != nil {
						require.ErrorIs(t, err, ErrOutOfRange)
					}
					rate := stress / (2 * want)
					if rate < 1e-300 {
						continue
					}
					got, err := c.ViscosityAtStrainRate(rate, s)
					if err != nil {
						require.ErrorIs(t, err, ErrOutOfRange)
					}
					near(t, want, got, 5e-12, name)
				}
			}
		}
	}
}

func TestCompositeAsLaw(t *testing.T) {
	c := Composite{
		Paths: WetOlivine(), StrainRate: 1e-15, GrainSize: 5e-3, Water: 600,
		PressureGradient: 3.2e4, SurfacePressure: 1e9, Min: 1e17, Max: 1e24,
	}
	state := State{Temperature: 1600, Pressure: 1e9 + 3.2e4*100e3, GrainSize: 5e-3, Water: 600}
	want, err := c.ViscosityAtStrainRate(1e-15, state)
	require.NoError(t, err)
	near(t, want, at(c, 1600, 100e3), 1e-14, "strain rate")

	c.StrainRate, c.Stress = 0, 1e6
	want, err = c.ViscosityAtStress(1e6, state)
	require.NoError(t, err)
	near(t, want, at(c, 1600, 100e3), 1e-14, "stress")

	state.Temperature = 400
	eta, err := c.ViscosityAtStress(1e6, state)
	require.NoError(t, err)
	assert.Equal(t, 1e24, eta)
	state.Temperature = 4000
	eta, err = c.ViscosityAtStrainRate(1e-10, state)
	require.NoError(t, err)
	assert.Equal(t, 1e17, eta)
}

func TestCompositeErrors(t *testing.T) {
	c, s := Composite{Paths: ColdIce()}, State{Temperature: 250, GrainSize: 1e-3}
	_, err := c.ViscosityAtStrainRate(0, s)
	require.ErrorContains(t, err, "strain rate is 0")
	_, err = c.ViscosityAtStress(-1, s)
	require.ErrorContains(t, err, "stress is -1")
	_, err = Composite{}.ViscosityAtStress(1, s)
	require.ErrorContains(t, err, "Paths of Composite are empty")
	_, err = c.ViscosityAtStress(1, State{GrainSize: 1})
	require.ErrorContains(t, err, "Temperature is 0")
	_, err = c.ViscosityAtStress(1, State{Temperature: 1, Pressure: math.Inf(1), GrainSize: 1})
	require.ErrorContains(t, err, "Pressure is +Inf")
	_, err = c.ViscosityAtStress(1, State{Temperature: 1})
	require.ErrorContains(t, err, "GrainSize is 0")
	_, err = Composite{Paths: ColdIce(), Max: -1}.ViscosityAtStress(1, s)
	require.ErrorContains(t, err, "Max of Composite")

	require.NoError(t, c.Covers(255))
	require.ErrorIs(t, c.Covers(256), ErrOutOfRange)
	require.ErrorContains(t, c.Covers(256), "grain-boundary sliding")
	require.ErrorContains(t, c.Covers(270), "dislocation")
	s.Temperature = 256
	eta, err := c.ViscosityAtStrainRate(1e-12, s)
	require.ErrorIs(t, err, ErrOutOfRange)
	assert.Positive(t, eta)
}
