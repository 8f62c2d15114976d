package staggered_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/staggered"
)

func TestUniformGrid(t *testing.T) {
	g, err := staggered.Uniform(4, 2, 2, 3)
	require.NoError(t, err)
	nx, nz := g.Cells()
	assert.Equal(t, [2]int{4, 2}, [2]int{nx, nz})
	assert.Equal(t, []float64{0, 0.5, 1, 1.5, 2}, g.XNodes())
	assert.Equal(t, []float64{0, 1.5, 3}, g.ZNodes())
	assert.Equal(t, []float64{0.25, 0.75, 1.25, 1.75}, g.XCentres())
	assert.Equal(t, []float64{0.75, 2.25}, g.ZCentres())
	assert.Equal(t, []float64{0.5, 0.5, 0.5, 0.5}, g.DX())
	assert.Equal(t, []float64{1.5, 1.5}, g.DZ())
	assert.True(t, g.UniformX())
	assert.True(t, g.UniformZ())
	assert.Equal(t, 6.0, g.Area())
	assert.Equal(t, "4x2 cells, 2 x 3", g.String())
}

func TestGridFromNodesCopiesThem(t *testing.T) {
	x := []float64{-1, 0, 2}
	g, err := staggered.NewGrid(x, []float64{0, 1})
	require.NoError(t, err)
	x[0] = -9
	assert.Equal(t, []float64{-1, 0, 2}, g.XNodes())
	assert.Equal(t, []float64{1, 2}, g.DX())
	assert.Equal(t, []float64{-0.5, 1}, g.XCentres())
	assert.Equal(t, 3.0, g.Width())
	assert.False(t, g.UniformX())
	assert.True(t, g.UniformZ())
}

// Nodes that a caller computed as multiples of a spacing carry rounding errors;
// they must still count as uniform, far from the origin too, and a real
// gradation must not.
func TestUniformIsRecognised(t *testing.T) {
	nodes := func(first, h float64, n int) []float64 {
		x := make([]float64, n+1)
		for i := range x {
			x[i] = first + float64(i)*h
		}
		return x
	}
	tests := []struct {
		name string
		x    []float64
		want bool
	}{
		{"sums of tenths", nodes(0, 0.1, 30), true},
		{"offset", nodes(7e3, 0.3, 100), true},
		{"graded by a millionth", []float64{0, 1, 2.000003, 3}, false},
		{"graded far away", []float64{1e9, 1e9 + 1, 1e9 + 3, 1e9 + 4}, false},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			g, err := staggered.NewGrid(tt.x, []float64{0, 1})
			require.NoError(t, err)
			assert.Equal(t, tt.want, g.UniformX())
			sum := 0.0
			for _, w := range g.DX() {
				sum += w
				assert.InEpsilon(t, g.DX()[0], w, 1)
			}
			assert.InEpsilon(t, g.Width(), sum, 1e-12)
		})
	}
}

func TestBadGridsAreErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	unit := []float64{0, 1}
	for want, build := range map[string]func() (*staggered.Grid, error){
		"nx is 0":             func() (*staggered.Grid, error) { return staggered.Uniform(0, 1, 1, 1) },
		"nz is -3":            func() (*staggered.Grid, error) { return staggered.Uniform(1, -3, 1, 1) },
		"width is 0":          func() (*staggered.Grid, error) { return staggered.Uniform(1, 1, 0, 1) },
		"width is NaN":        func() (*staggered.Grid, error) { return staggered.Uniform(1, 1, nan, 1) },
		"width is +Inf":       func() (*staggered.Grid, error) { return staggered.Uniform(1, 1, inf, 1) },
		"height is -1":        func() (*staggered.Grid, error) { return staggered.Uniform(1, 1, 1, -1) },
		"height is +Inf":      func() (*staggered.Grid, error) { return staggered.Uniform(1, 1, 1, inf) },
		"x has 1 node":        func() (*staggered.Grid, error) { return staggered.NewGrid([]float64{0}, unit) },
		"z has 0 node":        func() (*staggered.Grid, error) { return staggered.NewGrid(unit, nil) },
		"x node 1 is NaN":     func() (*staggered.Grid, error) { return staggered.NewGrid([]float64{0, nan}, unit) },
		"z node 0 is +Inf":    func() (*staggered.Grid, error) { return staggered.NewGrid(unit, []float64{inf, 1}) },
		"z nodes 1 and 2":     func() (*staggered.Grid, error) { return staggered.NewGrid(unit, []float64{0, 1, 1}) },
		"overflows":           func() (*staggered.Grid, error) { return staggered.NewGrid([]float64{-1.5e308, 1.5e308}, unit) },
		"grading of the left": func() (*staggered.Grid, error) { return staggered.Graded(8, 8, 1, 1, staggered.Grading{Left: 0.5}) },
		"the top wall is NaN": func() (*staggered.Grid, error) { return staggered.Graded(8, 8, 1, 1, staggered.Grading{Top: nan}) },
		"bottom wall is 1e+04": func() (*staggered.Grid, error) {
			return staggered.Graded(8, 8, 1, 1, staggered.Grading{Bottom: 10000})
		},
	} {
		g, err := build()
		assert.Nil(t, g)
		assert.ErrorContains(t, err, "staggered: ")
		if want == "bottom wall is 1e+04" {
			want = "bottom wall is 10000"
		}
		assert.ErrorContains(t, err, want)
	}
}

func TestGradedRefinesTheNamedWallsOnly(t *testing.T) {
	g, err := staggered.Graded(400, 400, 3, 2, staggered.Grading{Left: 4, Bottom: 8, Top: 2})
	require.NoError(t, err)
	assert.Equal(t, 3.0, g.Width())
	assert.Equal(t, 2.0, g.Height())
	// Far from all walls the spacing of x is 1 − a(1−s)³; at s = 1 it is 1.
	dx, dz := g.DX(), g.DZ()
	assert.InEpsilon(t, 4, dx[399]/dx[0], 0.03, "left against right")
	assert.InEpsilon(t, 4, dz[399]/dz[0], 0.03, "top is refined 2, bottom 8")
	for i := range dx[1:] {
		assert.GreaterOrEqual(t, dx[i+1], dx[i])
		assert.Less(t, dx[i+1]/dx[i], 1.03, "neighbours differ little")
	}
	assert.False(t, g.UniformX())
}

func TestGradingOfOneIsUniform(t *testing.T) {
	g, err := staggered.Graded(7, 5, 1, 1, staggered.Grading{Left: 1, Top: 1})
	require.NoError(t, err)
	u, err := staggered.Uniform(7, 5, 1, 1)
	require.NoError(t, err)
	assert.True(t, g.Equal(u))
	assert.True(t, g.Equal(g))
	other, err := staggered.Uniform(7, 5, 1, 2)
	require.NoError(t, err)
	assert.False(t, g.Equal(other))
	assert.False(t, g.Equal(nil))
}

// The same grading on twice the cells splits each cell in two: the mapping is
// one smooth function of the cell number.
func TestGradedGridsNest(t *testing.T) {
	gr := staggered.Grading{Left: 3, Right: 5}
	coarse, err := staggered.Graded(20, 1, 1, 1, gr)
	require.NoError(t, err)
	fine, err := staggered.Graded(40, 1, 1, 1, gr)
	require.NoError(t, err)
	for i, x := range coarse.XNodes() {
		assert.InDelta(t, x, fine.XNodes()[2*i], 1e-15)
	}
}

func TestSides(t *testing.T) {
	var names []string
	for _, s := range staggered.Sides() {
		names = append(names, s.String())
		assert.Equal(t, s == staggered.Bottom || s == staggered.Top, s.Horizontal())
	}
	assert.Equal(t, []string{"left", "right", "bottom", "top"}, names)
	assert.Equal(t, "Side(7)", staggered.Side(7).String())
}
