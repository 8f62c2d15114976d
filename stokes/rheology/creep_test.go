package rheology

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The check values were computed apart, with 40 digits, from the constants of
// the presets, as ratios of uniaxial stress to twice the axial rate, and
// printed to seven digits (ice: six).
func TestOlivineAgainstCheckValues(t *testing.T) {
	state := State{Temperature: 1673.15, Pressure: 3e9, GrainSize: 10e-3, Water: 1000}
	for _, tt := range []struct {
		c    Creep
		want float64
	}{
		{OlivineDiffusionDry(), 6.192131e20},
		{OlivineDiffusionWet(), 3.403061e19},
		{OlivineDislocationDry(), 1.188202e20},
		{OlivineDislocationWet(), 2.524081e19},
	} {
		eta, err := tt.c.ViscosityAtStrainRate(1e-15, state)
		require.NoError(t, err)
		near(t, tt.want, eta, 5e-7, tt.c.Name)
	}
}

func TestIceAgainstCheckValues(t *testing.T) {
	state := State{Temperature: 240, GrainSize: 1e-3}
	rate, err := IceGrainBoundarySliding().StrainRate(0.1e6, state)
	require.NoError(t, err)
	near(t, 2.12178e-11, rate, 3e-6, "grain-boundary sliding")
	rate, err = IceDislocation().StrainRate(0.1e6, state)
	require.NoError(t, err)
	near(t, 3.49667e-12, rate, 3e-6, "dislocation creep")
	rate, err = IceBasalSlip().StrainRate(0.1e6, state)
	require.NoError(t, err)
	near(t, 5.5e7*math.Pow(0.1, 2.4)*math.Exp(-60e3/(GasConstant*240)), rate, 1e-12, "basal slip")
}

// Rate, viscosity at a stress and viscosity at a strain rate are one law.
func TestCreepIsConsistent(t *testing.T) {
	state := State{Temperature: 1500, Pressure: 2e9, GrainSize: 3e-3, Water: 500}
	for _, c := range []Creep{OlivineDiffusionWet(), OlivineDislocationWet(), OlivineDislocationWet().Invariants()} {
		rate, err := c.StrainRate(2e6, state)
		require.NoError(t, err)
		eta, err := c.ViscosityAtStress(2e6, state)
		require.NoError(t, err)
		near(t, 2e6/(2*rate), eta, 1e-13, "at stress")
		eta, err = c.ViscosityAtStrainRate(rate, state)
		require.NoError(t, err)
		near(t, 2e6/(2*rate), eta, 1e-13, "at strain rate")
	}
}

// A uniaxial test has σ₁₁ = σ, so that its deviator is (2, -1, -1)σ/3 and its
// strain rate (1, -½, -½)ε: the invariants of these tensors must obey the
// converted law, and the viscosity is s₁₁/(2 ε₁₁) = σ/(3ε).
func TestInvariantsDescribeTheSameTest(t *testing.T) {
	state := State{Temperature: 1500, Pressure: 2e9, GrainSize: 3e-3, Water: 500}
	for _, c := range []Creep{OlivineDiffusionDry(), OlivineDislocationWet(), IceGrainBoundarySliding()} {
		c.MaxTemperature = 0
		sigma := 3e6
		axial, err := c.StrainRate(sigma, state)
		require.NoError(t, err)
		s, e := []float64{2 * sigma / 3, -sigma / 3, -sigma / 3}, []float64{axial, -axial / 2, -axial / 2}
		got, err := c.Invariants().StrainRate(second(s), state)
		require.NoError(t, err)
		near(t, second(e), got, 1e-13, c.Name)
		eta, err := c.Invariants().ViscosityAtStress(second(s), state)
		require.NoError(t, err)
		near(t, sigma/(3*axial), eta, 1e-13, c.Name)
		assert.Equal(t, c.Invariants(), c.Invariants().Invariants())
	}
	near(t, 1.5, OlivineDiffusionDry().Invariants().Prefactor/1.5e9, 1e-14, "n = 1")
}

// second returns the root of the second invariant of a diagonal deviator.
func second(v []float64) float64 {
	sum := 0.0
	for _, x := range v {
		sum += x * x
	}
	return math.Sqrt(sum / 2)
}

func TestCreepSaysWhatIsWrong(t *testing.T) {
	c, good := OlivineDiffusionWet(), State{Temperature: 1500, GrainSize: 1e-3, Water: 100}
	for _, tt := range []struct {
		stress float64
		s      State
		want   string
	}{
		{0, good, "stress is 0"},
		{math.NaN(), good, "stress is NaN"},
		{1, State{GrainSize: 1, Water: 1}, "Temperature is 0"},
		{1, State{Temperature: 1, Pressure: math.NaN(), GrainSize: 1, Water: 1}, "Pressure is NaN"},
		{1, State{Temperature: 1, Water: 1}, "GrainSize is 0"},
		{1, State{Temperature: 1, GrainSize: 1}, "Water is 0"},
	} {
		_, err := c.StrainRate(tt.stress, tt.s)
		assert.ErrorContains(t, err, tt.want)
		_, err = c.ViscosityAtStress(tt.stress, tt.s)
		assert.ErrorContains(t, err, tt.want)
		_, err = c.ViscosityAtStrainRate(tt.stress, tt.s)
		require.Error(t, err)
	}
	_, err := Creep{}.StrainRate(1, good)
	require.ErrorContains(t, err, "Prefactor")
	_, err = OlivineDislocationDry().StrainRate(1, State{Temperature: 1500})
	require.NoError(t, err, "neither grain size nor water matters")
}

func TestCreepOutOfRange(t *testing.T) {
	s := State{Temperature: 255, GrainSize: 1e-3}
	c := IceGrainBoundarySliding()
	edge, err := c.StrainRate(1e5, s)
	require.NoError(t, err)
	s.Temperature = 255.001
	rate, err := c.StrainRate(1e5, s)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.ErrorContains(t, err, "ice grain-boundary sliding at 255.001 K, measured to 255 K")
	near(t, edge, rate, 1e-3, "extrapolated")
	_, err = c.ViscosityAtStress(1e5, s)
	require.ErrorIs(t, err, ErrOutOfRange)
	_, err = c.ViscosityAtStrainRate(1e-12, s)
	require.ErrorIs(t, err, ErrOutOfRange)
}

func TestCreepPrintsItself(t *testing.T) {
	assert.Equal(t, "uniaxial", Uniaxial.String())
	assert.Equal(t, "invariant", Invariant.String())
	assert.Equal(t, "olivine dislocation creep, wet: A 90, n 3.5, p 0, r 1.2, E 480000 J/mol, V 1.1e-05 m³/mol, uniaxial; "+
		"Hirth & Kohlstedt (2003, AGU Geophys. Monogr. 138, table 1), from memory", OlivineDislocationWet().String())
}
