package trial_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.org/overturn/stokes/stokestest/trial"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var box = trial.Grid{X: []float64{0, 1, 2}, Z: []float64{0, 0.25, 1}}

func TestGrid(t *testing.T) {
	assert.Equal(t, "2x2", box.String())
	assert.Equal(t, []float64{0.5, 1.5}, box.XCentres())
	assert.Equal(t, []float64{0.125, 0.625}, box.ZCentres())
	assert.Equal(t, []float64{0, 0.75, 1}, box.MirroredZ().Z)
	assert.Equal(t, []float64{0, 1, 2}, trial.Grid{X: []float64{0, 1, 2}, Z: box.Z}.MirroredX().X)
	assert.Equal(t, []float64{0, 1, 4}, box.Scaled(4).Z)
	assert.Equal(t, 0.25, box.Z[1], "scaling makes a copy")
	width, height := box.Size()
	assert.Equal(t, []float64{2, 1}, []float64{width, height})
	sum := func(x, z float64) float64 { return 10*x + z }
	assert.Equal(t, []float64{10, 20, 11, 21}, trial.Tabulate(sum, []float64{1, 2}, []float64{0, 1}))
}

func TestEdges(t *testing.T) {
	assert.Equal(t, []float64{0, 0.25, 0.5, 0.75, 1}, trial.Edges(1, nil, 0.25, 1))
	assert.Equal(t, []float64{0, 0.1, 0.4, 0.7, 1}, round(trial.Edges(1, []float64{0.1}, 0.3, 1)))
	assert.Equal(t, []float64{0, 1}, trial.Edges(1, nil, 5, 1))
	e := trial.Edges(3, []float64{1}, 1e-3, 5)
	narrow, wide := math.Inf(1), 0.0
	for i := range e[1:] {
		narrow, wide = min(narrow, e[i+1]-e[i]), max(wide, e[i+1]-e[i])
	}
	assert.InDelta(t, 5, wide/narrow, 1e-3)
	assert.InDelta(t, narrow, e[1], 1e-8, "the narrowest are at the walls")
}

func round(s []float64) []float64 {
	for i := range s {
		s[i] = math.Round(s[i]*1e9) / 1e9
	}
	return s
}

// Points of a lattice weigh what is nearest to them.
func TestWeights(t *testing.T) {
	at := func(f trial.Field) trial.Samples {
		s, err := f.Sample(box)
		require.NoError(t, err)
		return s
	}
	s := at(trial.Lattice([]float64{0, 1, 2}, []float64{0.5}, []float64{1, 2, 4}))
	assert.Equal(t, []float64{0.25, 0.5, 0.25}, s.Weight)
	assert.Equal(t, 2.25, s.Mean())
	assert.Equal(t, math.Sqrt(0.25+2+4), s.RMS())
	s = at(trial.Lattice([]float64{0.5, 1.5}, []float64{0, 0.5}, []float64{1, 2, 3, 4}))
	assert.Equal(t, []float64{0.125, 0.125, 0.375, 0.375}, s.Weight)
	assert.Equal(t, []float64{0.5, 1.5, 0.5, 1.5}, s.X)
	assert.Equal(t, []float64{0, 0, 0.5, 0.5}, s.Z)
	s = at(trial.Function(func(x, z float64) float64 { return x + 10*z }))
	assert.Equal(t, []float64{0.125, 0.125, 0.375, 0.375}, s.Weight)
	assert.Equal(t, []float64{1.75, 2.75, 6.75, 7.75}, s.Value)
	s = at(trial.Points([]float64{0, 1}, []float64{1, 0}, []float64{3, 5}))
	assert.Equal(t, 4.0, s.Mean())
	s, err := trial.Profile([]float64{0.5, 1.5, 3}, []float64{1, 0, 0}).SampleWall(4)
	require.NoError(t, err)
	assert.Equal(t, []float64{0.25, 0.3125, 0.4375}, s.Weight)
}

func TestFieldsThatAreWrong(t *testing.T) {
	for want, f := range map[string]trial.Field{
		"not given":                            {},
		"a profile, want a field in the box":   trial.Profile([]float64{1}, []float64{1}),
		"2 values at points with 2 x and 1 z":  trial.Points([]float64{0, 1}, []float64{0}, []float64{1, 2}),
		"0 values at points":                   trial.Points(nil, nil, nil),
		"3 values on a lattice of 2 by 1":      trial.Lattice([]float64{0, 1}, []float64{0}, []float64{1, 2, 3}),
		"no coordinate z, want one at least":   trial.Lattice([]float64{0, 1}, nil, nil),
		"coordinate x goes from 1 to 1":        trial.Lattice([]float64{1, 1}, []float64{0}, []float64{1, 2}),
		"a point at (2.5, 0), want it in the":  trial.Points([]float64{2.5}, []float64{0}, []float64{1}),
		"a point at (0, -1), want it in the":   trial.Points([]float64{0}, []float64{-1}, []float64{1}),
		"NaN at (0, 1), want a finite number":  trial.Points([]float64{0}, []float64{1}, []float64{math.NaN()}),
		"+Inf at (1, 1), want a finite number": trial.Points([]float64{1}, []float64{1}, []float64{math.Inf(1)}),
	} {
		_, err := f.Sample(box)
		require.ErrorContains(t, err, want)
	}
	_, err := trial.Lattice(box.X, box.Z, nil).SampleWall(1)
	require.ErrorContains(t, err, "a field in the box, want a profile")
	_, err = trial.Profile([]float64{1, 0}, []float64{1, 2}).SampleWall(1)
	require.ErrorContains(t, err, "coordinate s goes from 1 to 0")
	_, err = trial.Profile([]float64{0, 1}, []float64{1}).SampleWall(1)
	require.ErrorContains(t, err, "1 values at 2 coordinates")
	_, err = trial.Profile([]float64{0, 2}, []float64{1, 1}).SampleWall(1)
	require.ErrorContains(t, err, "a point at (2, 0)")
}

func TestOnLattice(t *testing.T) {
	f := trial.Lattice([]float64{0, 1, 2 + 1e-12}, box.Z, nil)
	assert.True(t, f.OnLattice(box.X, box.Z))
	assert.False(t, f.OnLattice(box.X, box.ZCentres()))
	assert.False(t, f.OnLattice(box.X[:2], box.Z))
	assert.False(t, trial.Lattice(nil, nil, nil).OnLattice(nil, nil))
	assert.False(t, f.OnLattice(box.Z, box.Z))
	assert.False(t, trial.Points(box.X, box.Z, nil).OnLattice(box.X, box.Z))
	assert.True(t, trial.Field{}.IsMissing())
	assert.False(t, f.IsMissing())
}

func TestDifference(t *testing.T) {
	s, err := trial.Lattice(box.X, box.Z, []float64{1, 2, 3, 4, 5, 6, 7, 8, 9}).Sample(box)
	require.NoError(t, err)
	mirrored := s.Moved(func(x, z float64) (float64, float64) { return 2 - x + 1e-9, z - 1e-9 })
	d, ok := mirrored.Difference(s, 2)
	require.True(t, ok)
	assert.Equal(t, []float64{-2, 0, 2, -2, 0, 2, -2, 0, 2}, d.Value)
	_, ok = s.Moved(func(x, z float64) (float64, float64) { return x + 1e-3, z }).Difference(s, 2)
	assert.False(t, ok)
	assert.Equal(t, []float64{2, 3, 4, 5, 6, 7, 8, 9, 10}, s.Plus(1).Value)
	assert.Equal(t, 18.0, s.Times(2).Value[8])
	assert.Equal(t, 9.0, s.Value[8])
	assert.Equal(t, 6.0, s.Minus(func(x, z float64) float64 { return x + z }).Value[8])
}

// Points beside one another are found however rounding falls, on both sides.
func TestDifferenceFindsNeighbours(t *testing.T) {
	edge := trial.Samples{X: []float64{1.5e-6}, Z: []float64{2.5e-6}, Weight: []float64{1}, Value: []float64{1}}
	for _, dx := range []float64{-1e-9, 0, 1e-9} {
		for _, dz := range []float64{-1e-9, 0, 1e-9} {
			_, ok := edge.Moved(func(x, z float64) (float64, float64) { return x + dx, z + dz }).Difference(edge, 1)
			assert.True(t, ok)
		}
	}
}

func TestConvergence(t *testing.T) {
	measure := func(errs ...float64) trial.Convergence {
		return trial.Measure("x", []float64{1, 0.5, 0.25}[:len(errs)], errs, 2, 0.25, 1e-6)
	}
	c := measure(9, 4, 1)
	assert.Equal(t, 2.0, c.Observed)
	assert.Equal(t, 1.0, c.Last())
	assert.True(t, c.Passed())
	assert.True(t, measure(9, 4, 1.18).Passed())
	assert.False(t, measure(9, 4, 1.2).Passed())
	assert.True(t, measure(9, 1e-6, 1e-6).Passed())
	assert.False(t, measure(9, 1e-6, 1.1e-6).Passed())
	assert.False(t, measure(9).Passed())
	assert.False(t, measure(math.NaN(), math.NaN()).Passed())
	assert.True(t, math.IsNaN(trial.Convergence{}.Last()))
	assert.True(t, trial.Measure("x", []float64{1, 0.5}, []float64{1, 1}, 0, 0.25, 1e-6).Passed())
	assert.False(t, trial.Check{Value: math.NaN(), Limit: 1}.Passed())
	assert.True(t, trial.Check{Value: 1, Limit: 1}.Passed())
}

func TestReport(t *testing.T) {
	broken := errors.New("broken")
	good := trial.Measure("heat", []float64{1, 0.5}, []float64{4, 1}, 2, 0.25, 1e-6)
	bad := trial.Measure("mass", []float64{1, 0.5}, []float64{2, 1}, 2, 0.25, 1e-6)
	free := trial.Measure("mass", []float64{1, 0.5}, []float64{2, 1}, 0, 0.25, 1e-6)
	r := &trial.Report{Kit: "kit", Results: []trial.Result{
		{Name: "first", Source: "me", Grids: []string{"1x1", "2x2"}, Convergence: []trial.Convergence{good},
			Checks: []trial.Check{{"turned", 1, 2}, {"moved", 3, 2}}},
		{Name: "second", Source: "me", Grids: []string{"1x1", "2x2"}, Convergence: []trial.Convergence{good, bad}},
		{Name: "third", Skipped: errors.ErrUnsupported},
		{Name: "fourth", Err: broken},
		{Name: "fifth", Source: "me", Grids: []string{"1x1", "2x2"}, Convergence: []trial.Convergence{free}},
	}}
	assert.Equal(t, strings.TrimLeft(`
case    finest              heat           mass  checks
first   2x2        1.0e+00  2.00              -     1/2  FAILED
second  2x2        1.0e+00  2.00  1.0e+00  1.00     0/0  FAILED
third   skipped: unsupported operation
fourth  FAILED
fifth   2x2                    -  1.0e+00  1.00     0/0  ok
first: moved is 3, want <= 2
second: order of mass is 1, want >= 1.75
fourth: broken
`, "\n"), r.String())
	err := r.Err()
	require.EqualError(t, err, "kit found errors:\nfirst: moved is 3, want <= 2\nsecond: order of mass is 1, want >= 1.75\nfourth: broken")
	require.ErrorIs(t, err, broken)
	f, ok := errors.AsType[*trial.Failure](err)
	require.True(t, ok)
	assert.Equal(t, trial.Failure{Case: "first", What: "moved", Value: 3, Want: "<= 2"}, *f)

	assert.Equal(t, strings.TrimLeft(`
second (me)
  cells              heat         mass
  1x1            4.00e+00     2.00e+00
  2x2            1.00e+00     1.00e+00
  order              2.00         1.00
  expected           2.00         2.00
                       ok       FAILED
`, "\n"), r.Results[1].String())
	assert.Contains(t, r.Results[0].String(), "  moved                          3.0e+00, want <= 2.0e+00  FAILED\n")
	assert.Contains(t, r.Results[4].String(), "  expected              -\n")
	assert.Equal(t, "third ()\n  skipped: unsupported operation\n", r.Results[2].String())
	assert.Equal(t, "fourth ()\n  FAILED: broken\n", r.Results[3].String())

	r.Results = r.Results[2:3]
	require.ErrorIs(t, r.Err(), trial.ErrNothingTested)
	r.Results = append(r.Results, trial.Result{})
	require.NoError(t, r.Err())
}
