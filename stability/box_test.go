package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// In every box, the first and the second pattern are those of the neutral
// curve at the wavenumbers that fit.
func TestBoxesOfManyWidths(t *testing.T) {
	skipIfShort(t)
	s, err := NewSolver(Layer{Bottom: Rigid}, nil)
	require.NoError(t, err)
	for _, aspect := range []float64{0.2, 0.5, 1, 1.7, 3, 7.3} {
		for _, sides := range []Sides{Mirrors, Periodic} {
			box := Box{Aspect: aspect, Sides: sides}
			var values []float64
			best, next := 0, 0
			for n := 1; n <= 2 || box.wavenumber(n) < 9; n++ { // two, and all near the minimum
				o, err := s.Neutral(Search{}, float64(n)*math.Pi*float64(1+int(sides))/aspect)
				require.NoError(t, err)
				values = append(values, o.Value)
				switch i := n - 1; {
				case i == 0:
				case values[i] < values[best]:
					best, next = i, best
				case next == best || values[i] < values[next]:
					next = i
				}
			}
			first, second, err := s.InBox(Search{}, box)
			require.NoError(t, err)
			assert.Equal(t, (best+1)*(1+int(sides)), first.Rolls, "%+v", box)
			assert.Equal(t, (next+1)*(1+int(sides)), second.Rolls, "%+v", box)
			assert.Equal(t, values[best], first.Value)
			assert.Equal(t, values[next], second.Value)
		}
	}
}

// In a narrow box, or one of other sides, wavenumbers left of the minimum are
// passed over as long as the bound falls, not taken for the end.
func TestNarrowWavesDoNotEndTheSearch(t *testing.T) {
	s, err := NewSolver(Layer{}, nil)
	require.NoError(t, err)
	q, err := s.question(Search{})
	require.NoError(t, err)
	assert.False(t, q.rises(1))
	assert.True(t, q.rises(4))
	first, _, err := s.InBox(Search{}, Box{Aspect: 60})
	require.NoError(t, err)
	assert.InEpsilon(t, 27*math.Pow(math.Pi, 4)/4, first.Value, 1e-3)
	assert.Greater(t, first.Rolls, 40)
}

// A wide box is no different from a layer without sides.
func TestWideBox(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Rigid}
	o := critical(t, l)
	first, second, err := l.InBox(Box{Aspect: 300})
	require.NoError(t, err)
	assert.InEpsilon(t, o.Value, first.Value, 1e-5)
	assert.InEpsilon(t, o.Value, second.Value, 1e-4)
	assert.InEpsilon(t, 300*o.Wavenumber/math.Pi, float64(first.Rolls), 0.01)
}

// Waves of a rotating layer fit into a box too, and so do long waves.
func TestBoxesOfOtherOnsets(t *testing.T) {
	first, _, err := Layer{Bottom: Rigid, Top: Rigid, Taylor: 1e4, Prandtl: 0.025}.InBox(Box{Aspect: 2})
	require.NoError(t, err)
	assert.True(t, first.Oscillates())
	flux := Layer{Bottom: Rigid.FixedFlux(), Top: Rigid.FixedFlux()}
	one, two, err := flux.InBox(Box{Aspect: 5, Sides: Periodic})
	require.NoError(t, err)
	assert.Equal(t, [2]int{2, 4}, [2]int{one.Rolls, two.Rolls})
	s, err := NewSolver(Layer{Bottom: Rigid, Top: Free.Robin(1)}, nil)
	require.NoError(t, err)
	surface, _, err := s.InBox(Search{Number: MarangoniNumber}, Box{Aspect: 1.5})
	require.NoError(t, err)
	n, err := s.Neutral(Search{Number: MarangoniNumber}, surface.Wavenumber)
	require.NoError(t, err)
	assert.Equal(t, n.Value, surface.Marangoni)
}
