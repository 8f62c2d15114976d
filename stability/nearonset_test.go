package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The coefficients agree with differences of growth rates and neutral values.
func TestNearOnsetAgainstDifferences(t *testing.T) {
	for _, l := range []Layer{
		{Bottom: Rigid.FixedFlux(), Base: InternalHeating(), Prandtl: 3},
		{Porous: Darcy, Top: Permeable},
		{Bottom: Rigid, Top: Rigid, Taylor: 1e4, Prandtl: 0.025},
	} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		n, err := s.NearOnset()
		require.NoError(t, err)
		o := n.Onset
		const eps = 1e-5
		up, err := s.Growth(o.Rayleigh*(1+eps), o.Wavenumber)
		require.NoError(t, err)
		down, err := s.Growth(o.Rayleigh*(1-eps), o.Wavenumber)
		require.NoError(t, err)
		assert.InEpsilon(t, 2*eps/(up.Rate-down.Rate), n.Time, 1e-6, "%v", l)
		h := 1e-3 * o.Wavenumber
		left, err := s.Neutral(Search{}, o.Wavenumber-h)
		require.NoError(t, err)
		right, err := s.Neutral(Search{}, o.Wavenumber+h)
		require.NoError(t, err)
		curvature := (left.Value - 2*o.Value + right.Value) / (h * h)
		assert.InEpsilon(t, curvature/(2*o.Rayleigh), n.Coherence, 1e-4, "%v", l)
		assert.InEpsilon(t, 2*h*curvature, right.Slope-left.Slope, 1e-4)
	}
}

func TestNearOnsetAtZeroWavenumber(t *testing.T) {
	s, err := NewSolver(Layer{Bottom: Free.FixedFlux(), Top: Free.FixedFlux()}, nil)
	require.NoError(t, err)
	n, err := s.NearOnset()
	assert.ErrorIs(t, err, ErrNoTheory)
	assert.True(t, n.Onset.LongWave())
}

// Free rolls: the slope is 2 at every Prandtl number, and for porous layers too
// (Palm, Weber and Kvernvold 1972, from memory).
func TestNusseltSlopeIsTwo(t *testing.T) {
	for _, l := range []Layer{{}, {Prandtl: 0.1}, {Prandtl: 30}, {Porous: Darcy}} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		slope, e, err := s.NusseltSlope()
		require.NoError(t, err)
		assert.InEpsilon(t, 2, slope, 1e-11, "%v", l)
		assert.Less(t, e, 1e-9)
	}
}

// Mirror images have the same slope, with inertia and a viscosity that varies.
func TestNusseltSlopeOfMirrorImages(t *testing.T) {
	law := func(z, _ float64) float64 { return math.Exp(3 * z) }
	mirrored := func(z, t float64) float64 { return law(1-z, t) }
	slope := func(l Layer) float64 {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		v, _, err := s.NusseltSlope()
		require.NoError(t, err)
		return v
	}
	a := slope(Layer{Bottom: Rigid, Prandtl: 0.8, Viscosity: ViscosityLaw(law)})
	b := slope(Layer{Top: Rigid, Prandtl: 0.8, Viscosity: ViscosityLaw(mirrored)})
	assert.InEpsilon(t, a, b, 1e-10)
	assert.Greater(t, math.Abs(a-slope(Layer{Bottom: Rigid, Viscosity: ViscosityLaw(law)})), 1e-4, "inertia matters")
}

func TestNusseltSlopeWithoutTheory(t *testing.T) {
	for _, l := range []Layer{
		{Base: InternalHeating()}, {Bottom: Rigid.FixedFlux()}, {Top: Free.Robin(1)}, {Taylor: 1},
		{Magnetic: Magnetic{Chandrasekhar: 1}}, {Solute: Solute{Diffusivity: 1}},
		{Porous: Darcy, Top: Permeable},
	} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		_, _, err = s.NusseltSlope()
		assert.ErrorIs(t, err, ErrNoTheory, "%v", l)
	}
}
