package convection

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func sequence(f func(h float64) float64, h ...float64) (sizes, values []float64) {
	for _, v := range h {
		values = append(values, f(v))
	}
	return h, values
}

// A series in h² and h⁴ is removed exactly, whatever the ratio of the grids.
func TestExtrapolateRemovesTwoTerms(t *testing.T) {
	f := func(h float64) float64 { return 3 + 0.7*h*h - 0.4*math.Pow(h, 4) }
	for _, h := range [][]float64{{0.4, 0.2, 0.1}, {0.3, 0.2, 0.15}, {0.9, 0.2, 0.1, 0.07}} {
		e, err := Extrapolate(sequence(f, h...))
		require.NoError(t, err)
		assert.InDelta(t, 3, e.Value, 1e-13)
		assert.InDelta(t, 2, e.Order, 0.15)
		assert.Equal(t, f(h[len(h)-1]), e.Finest)
		assert.Greater(t, e.Uncertainty, math.Abs(e.Value-3))
		assert.Less(t, e.Uncertainty, math.Abs(e.Finest-3))
	}
}

// The next term of the series must be covered by the uncertainty.
func TestUncertaintyCoversTheError(t *testing.T) {
	f := func(h float64) float64 { return 5 + h*h + 2*math.Pow(h, 4) + 3*math.Pow(h, 6) }
	for _, h := range [][]float64{{0.2, 0.1}, {0.4, 0.2, 0.1}, {0.2, 0.1, 0.05}, {0.3, 0.2, 0.1}} {
		e, err := Extrapolate(sequence(f, h...))
		require.NoError(t, err)
		assert.LessOrEqual(t, math.Abs(e.Value-5), 1.02*e.Uncertainty, "%v", h)
	}
}

func TestExtrapolateOfTwoGrids(t *testing.T) {
	e, err := Extrapolate([]float64{0.2, 0.1}, []float64{1.04, 1.01})
	require.NoError(t, err)
	assert.InDelta(t, 1, e.Value, 1e-14)
	assert.InDelta(t, 0.01, e.Uncertainty, 1e-14)
	assert.True(t, math.IsNaN(e.Order))
}

func TestObservedOrder(t *testing.T) {
	for _, p := range []float64{0.5, 1, 1.9, 2, 2.3, 4} {
		h, v := sequence(func(h float64) float64 { return 2 - 5*math.Pow(h, p) }, 0.5, 0.2, 0.1)
		assert.InDelta(t, p, observedOrder(h, v), 1e-9)
	}
}

// A sequence of another order is not extrapolated, and its uncertainty holds
// the truth.
func TestOtherOrdersAreNotBelieved(t *testing.T) {
	for _, p := range []float64{0.8, 1, 3} {
		h, v := sequence(func(h float64) float64 { return 2 - 5*math.Pow(h, p) }, 0.2, 0.1, 0.05)
		e, err := Extrapolate(h, v)
		require.NoError(t, err)
		assert.Equal(t, v[2], e.Value)
		assert.Greater(t, e.Uncertainty, math.Abs(v[2]-2))
		assert.Less(t, e.Uncertainty, 8*math.Abs(v[2]-2), "three times 7/3, the most that order 2 makes of order 3")
		assert.InDelta(t, p, e.Order, 1e-6)
	}
	e, err := Extrapolate([]float64{0.4, 0.2, 0.1}, []float64{1, 2, 1.5})
	require.NoError(t, err)
	assert.Equal(t, 1.5, e.Value)
	assert.Equal(t, 3.0, e.Uncertainty, "three times the range")
	assert.True(t, math.IsNaN(e.Order))
}

func TestEqualValuesNeedNoOrder(t *testing.T) {
	e, err := Extrapolate([]float64{0.4, 0.2, 0.1}, []float64{0.5, 0.5, 0.5})
	require.NoError(t, err)
	assert.Equal(t, 0.5, e.Value)
	assert.Zero(t, e.Uncertainty)
}

func TestBadSequencesAreErrors(t *testing.T) {
	nan := math.NaN()
	for _, tt := range []struct {
		h, v []float64
		want string
	}{
		{[]float64{1, 0.5}, []float64{1}, "2 cell sizes and 1 values"},
		{[]float64{1}, []float64{1}, "at least two grids"},
		{[]float64{0.5, 1}, []float64{1, 1}, "cell size 1 is 1"},
		{[]float64{0.5, 0.5}, []float64{1, 1}, "strictly decreasing"},
		{[]float64{0.5, 0}, []float64{1, 1}, "cell size 1 is 0"},
		{[]float64{math.Inf(1), 1}, []float64{1, 1}, "cell size 0 is +Inf"},
		{[]float64{nan, 1}, []float64{1, 1}, "cell size 0 is NaN"},
		{[]float64{1, 0.5}, []float64{1, nan}, "value 1 is NaN"},
	} {
		_, err := Extrapolate(tt.h, tt.v)
		assert.ErrorContains(t, err, tt.want)
	}
}
