package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func growthOf(t *testing.T, s Stack, k float64) []StackGrowth {
	t.Helper()
	g, err := s.Growth(k)
	require.NoError(t, err)
	return g
}

// Two half-spaces of the same viscosity: σ = Δρ g/(4 η k), the limit of short
// waves (from memory; it follows from F = 4ηk w for a force on an interface).
func TestShortWavesDoNotSeeTheWalls(t *testing.T) {
	s := Stack{Gravity: 2, Bottom: Rigid, Layers: []Stratum{{1, 1, 3, 0}, {1, 6, 3, 0}}}
	for _, k := range []float64{15, 25} {
		assert.InEpsilon(t, 5*2/(4*3*k), growthOf(t, s, k)[0].Rate, 1e-9)
	}
	s.Layers[1].Viscosity = 9 // F = 2(η₁+η₂)k w
	assert.InEpsilon(t, 5*2/(2*12*20.0), growthOf(t, s, 20)[0].Rate, 1e-9)
}

// The rates scale with gravity, density, viscosity and length as they should,
// whatever the units.
func TestStackInOtherUnits(t *testing.T) {
	s := Stack{Gravity: 1, Bottom: Rigid, Top: Free, Layers: []Stratum{{0.3, 1, 1, 0.01}, {0.3, 1.5, 5, 0}, {0.4, 1.2, 2, 0}}}
	a := growthOf(t, s, 3)
	si := Stack{Gravity: 9.81, Bottom: Rigid, Top: Free}
	const length, density, viscosity = 7000.0, 2800.0, 4e19
	for _, l := range s.Layers {
		si.Layers = append(si.Layers, Stratum{
			l.Thickness * length, l.Density * density, l.Viscosity * viscosity, l.Tension * density * 9.81 * length * length,
		})
	}
	b := growthOf(t, si, 3/length)
	require.Len(t, a, 2)
	require.Len(t, b, 2)
	for i := range a {
		assert.InEpsilon(t, a[i].Rate, b[i].Rate*viscosity/(density*9.81*length), 1e-10)
		assert.InDeltaSlice(t, a[i].Displacements, b[i].Displacements, 1e-9)
	}
	assert.Positive(t, a[0].Rate)
	assert.Negative(t, a[1].Rate)
	assert.InEpsilon(t, math.Log(10)/a[0].Rate, a[0].Time(10), 1e-14)
}

// Splitting a layer into two of the same fluid changes nothing but for an
// interface that does not move by itself.
func TestSplitLayer(t *testing.T) {
	whole := growthOf(t, Stack{Gravity: 1, Bottom: Rigid, Layers: []Stratum{{0.4, 0, 1, 0}, {0.6, 1, 10, 0}}}, 2.5)
	split := growthOf(t, Stack{Gravity: 1, Bottom: Rigid, Layers: []Stratum{{0.4, 0, 1, 0}, {0.2, 1, 10, 0}, {0.4, 1, 10, 0}}}, 2.5)
	require.Len(t, split, 2)
	assert.InEpsilon(t, whole[0].Rate, split[0].Rate, 1e-11)
	assert.InDelta(t, 0, split[1].Rate, 1e-12)
}

// Turned upside down with the densities exchanged, a stack grows alike.
func TestStackUpsideDown(t *testing.T) {
	a := growthOf(t, Stack{Gravity: 1, Bottom: Rigid, Layers: []Stratum{{0.3, 0, 1, 0}, {0.7, 1, 20, 0}}}, 4)
	b := growthOf(t, Stack{Gravity: 1, Top: Rigid, Layers: []Stratum{{0.7, 0, 20, 0}, {0.3, 1, 1, 0}}}, 4)
	assert.InEpsilon(t, a[0].Rate, b[0].Rate, 1e-11)
}

// Surface tension stops waves shorter than 2π√(γ/Δρ g).
func TestTensionStopsShortWaves(t *testing.T) {
	s := Stack{Gravity: 1, Layers: []Stratum{{0.5, 0, 1, 0.01}, {0.5, 1, 1, 0}}}
	assert.Positive(t, growthOf(t, s, 9.99)[0].Rate)
	assert.InDelta(t, 0, growthOf(t, s, 10)[0].Rate, 1e-14)
	assert.Negative(t, growthOf(t, s, 10.01)[0].Rate)
	fast, err := s.Fastest()
	require.NoError(t, err)
	assert.Less(t, fast.Wavenumber, 10.0)
}

// A free surface relaxes: a deep fluid at σ = -ρ g/(2 η k) (from memory; F = 2ηk w
// for a force on a surface without shear stress).
func TestDeformableSurface(t *testing.T) {
	s := Stack{Gravity: 3, Bottom: Rigid, Open: Deformable, Layers: []Stratum{{1, 2, 5, 0}}}
	assert.InEpsilon(t, -2*3/(2*5*20.0), growthOf(t, s, 20)[0].Rate, 1e-9)
	_, err := s.Fastest()
	assert.ErrorIs(t, err, ErrStable)
	// Over a buoyant layer it moves with the interface, which grows faster than
	// under a flat top.
	two := []Stratum{{0.2, 1, 1, 0}, {0.2, 1.1, 1, 0}}
	flat, err := Stack{Gravity: 1, Bottom: Rigid, Layers: two}.Fastest()
	require.NoError(t, err)
	open, err := Stack{Gravity: 1, Bottom: Rigid, Layers: two, Open: Deformable}.Fastest()
	require.NoError(t, err)
	assert.Greater(t, open.Rate, flat.Rate)
	assert.Len(t, open.Displacements, 2)
	assert.InDelta(t, 1, math.Abs(open.Displacements[0]), 1e-12)
	assert.Less(t, math.Abs(open.Displacements[1]), 0.2)
}

func TestFastestIsTheLargest(t *testing.T) {
	skipIfShort(t)
	s := Stack{Gravity: 1, Bottom: Rigid, Top: Rigid, Layers: []Stratum{{0.1, 0, 0.01, 0}, {0.5, 1, 1, 0}, {0.4, 1.3, 0.1, 0}}}
	fast, err := s.Fastest()
	require.NoError(t, err)
	for k := 0.05; k < 40; k *= 1.5 {
		assert.LessOrEqual(t, growthOf(t, s, k)[0].Rate, fast.Rate*(1+1e-12), "k = %g", k)
		e, _, err := s.engine()
		require.NoError(t, err)
		assert.Less(t, growthOf(t, s, k)[0].Rate*s.scales().time, e.bound.growth(k, [3]float64{}), "bound at k = %g", k)
	}
}
