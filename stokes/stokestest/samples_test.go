package stokestest_test

import (
	"context"
	"math"
	"testing"

	"example.org/overturn/stokes/stokestest"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A code may give its answer at nodes, at scattered points or as a function,
// without pressure and stress. One that is exact passes whatever its order.
func TestAnyKindOfAnswerWillDo(t *testing.T) {
	mode := cases(t, "box mode")[0]
	vx := func(x, z float64) float64 { return mode.At(x, z).VX }
	vz := func(x, z float64) float64 { return mode.At(x, z).VZ }
	for name, tt := range map[string]struct {
		answer func(p stokestest.Problem) stokestest.Answer
		checks []string
	}{
		"function": {
			func(stokestest.Problem) stokestest.Answer {
				return stokestest.Answer{VX: stokestest.Function(vx), VZ: stokestest.Function(vz)}
			},
			[]string{"mirrored in x", "mirrored in z", "in other units"},
		},
		"nodes": {
			func(p stokestest.Problem) stokestest.Answer {
				return stokestest.Answer{
					VX: stokestest.Lattice(p.X, p.Z, p.Tabulate(vx, p.X, p.Z)),
					VZ: stokestest.Lattice(p.X, p.Z, p.Tabulate(vz, p.X, p.Z)),
				}
			},
			[]string{"mirrored in x", "mirrored in z", "in other units"},
		},
		"points": { // which have no images upside down
			func(p stokestest.Problem) stokestest.Answer {
				width, height := p.Size()
				x, z := []float64{0.1 * width, 0.9 * width, 0.5 * width}, []float64{0.3 * height, 0.3 * height, 0.8 * height}
				at := func(f func(x, z float64) float64) (v []float64) {
					for i := range x {
						v = append(v, f(x[i], z[i]))
					}
					return v
				}
				return stokestest.Answer{VX: stokestest.Points(x, z, at(vx)), VZ: stokestest.Points(x, z, at(vz))}
			},
			[]string{"mirrored in x", "in other units"},
		},
	} {
		solve := func(_ context.Context, p stokestest.Problem) (stokestest.Answer, error) { return tt.answer(p), nil }
		r, err := stokestest.Run(t.Context(), solve, &stokestest.Settings{Cells: []int{4, 8}, Cases: cases(t, "box mode")})
		require.NoError(t, err)
		res := r.Results[0]
		require.Len(t, res.Convergence, 1)
		assert.Less(t, res.Convergence[0].Last(), 1e-14, name)
		assert.True(t, res.Convergence[0].Passed(), name)
		var names []string
		for _, c := range res.Checks { // which fail: the solver knows one problem only
			names = append(names, c.Name)
			assert.False(t, c.Passed(), "%s: %s", name, c.Name)
		}
		assert.Equal(t, tt.checks, names, name)
	}
}

// Rules of quadrature over cells, by one point, by faces and by Gauss, find
// the whole of a force that is concentrated on a line.
func TestLoadsOnLinesAreWhole(t *testing.T) {
	c := cases(t, "rayleigh-taylor wave")
	gauss := 0.5 - 0.5/math.Sqrt(3)
	var first *stokestest.Problem
	look := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		if first == nil {
			first = &p
		}
		return ours(ctx, p)
	}
	set := &stokestest.Settings{Cells: []int{24, 48}, Stretch: 2, Slack: 0.5, Cases: c}
	require.NoError(t, stokestest.Check(t.Context(), look, set))
	for _, rule := range [][]float64{{0.5}, {0, 1}, {gauss, 1 - gauss}} {
		sum := 0.0
		for k := range first.Z[1:] {
			for _, u := range rule {
				dz := first.Z[k+1] - first.Z[k]
				sum += first.ForceZ(0.2, first.Z[k]+u*dz) * dz / float64(len(rule))
			}
		}
		assert.InDelta(t, c[0].Sheets[0].At(0.2), sum, 1e-12)
	}
}

// The problems in a mirror and in other units are those of the case.
func TestTwinsAreTheSameProblem(t *testing.T) {
	c := cases(t, "columns")[0]
	var asked []stokestest.Problem
	look := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		asked = append(asked, p)
		return ours(ctx, p)
	}
	require.NoError(t, stokestest.Check(t.Context(), look, &stokestest.Settings{Cells: []int{16, 32}, Slack: 0.5, Cases: cases(t, c.Name)}))
	require.Len(t, asked, 5)
	here, behind, below, large := asked[0], asked[2], asked[3], asked[4]
	const x, z = 0.3, 0.2
	bx, bz := c.Force(x, z)
	eta := c.Viscosity(x, z)

	assert.Equal(t, eta, here.Viscosity(x, z))
	assert.Equal(t, bz, here.ForceZ(x, z))
	assert.Equal(t, 0.25, here.X[4])

	assert.Equal(t, c.Walls.Left, behind.Walls.Right)
	assert.Equal(t, 0.75, behind.X[12])
	assert.InEpsilon(t, eta, behind.Viscosity(1-x, z), 1e-12)
	assert.InDelta(t, -bx, behind.ForceX(1-x, z), 1e-12)
	assert.InDelta(t, bz, behind.ForceZ(1-x, z), 1e-12)
	vx, vz := behind.WallVelocity(1-x, z)
	assert.InDelta(t, -c.At(x, z).VX, vx, 1e-12)
	assert.InDelta(t, c.At(x, z).VZ, vz, 1e-12)

	assert.InEpsilon(t, eta, below.Viscosity(x, 1-z), 1e-12)
	assert.InDelta(t, -bz, below.ForceZ(x, 1-z), 1e-12)
	vx, vz = below.WallVelocity(x, 1-z)
	assert.InDelta(t, c.At(x, z).VX, vx, 1e-12)
	assert.InDelta(t, -c.At(x, z).VZ, vz, 1e-12)

	width, _ := large.Size()
	assert.Equal(t, math.Ldexp(1, 21), width)
	assert.InEpsilon(t, math.Ldexp(eta, 70), large.Viscosity(x*width, z*width), 1e-12)
	assert.InEpsilon(t, math.Ldexp(bz, 70-30-21-21), large.ForceZ(x*width, z*width), 1e-12)
	_, vz = large.WallVelocity(x*width, z*width)
	assert.InEpsilon(t, math.Ldexp(c.At(x, z).VZ, -30), vz, 1e-12)
}
