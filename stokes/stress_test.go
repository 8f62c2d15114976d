package stokes_test

import (
	"math"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// postProcess returns root mean square errors of what a solver derives from
// the exact flow of case c on n by n cells: normal strain rate, shear strain
// rate, stress, dissipation.
func postProcess(t *testing.T, flow manufactured, walls stokes.Walls, n int) [5]float64 {
	g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 1.5, Top: 2})
	require.NoError(t, err)
	sv, err := stokes.NewSolver(g, walls, nil)
	require.NoError(t, err)
	exact, eta := flow.exact(g), flow.viscosity(g)
	mean := flow.p(g.XCentres()[0], g.ZCentres()[0]) - exact.P[0]
	rate, stress, density := stokes.NewTensor(g), stokes.NewTensor(g), staggered.NewScalar(g)
	require.NoError(t, sv.StrainRateTo(rate, exact))
	require.NoError(t, sv.StressTo(stress, exact, eta))
	_, err = sv.DissipationTo(density, exact, eta)
	require.NoError(t, err)
	var sum [5]float64
	for k, z := range g.ZCentres() {
		for i, x := range g.XCentres() {
			e, s := flow.stretch(x, z), flow.shear(x, z)
			viscosity := flow.eta(x, z)
			for q, d := range []float64{
				rate.XX.At(i, k) - e, rate.ZZ.At(i, k) + e,
				stress.XX.At(i, k) - (2*viscosity*e - flow.p(x, z) + mean),
				stress.ZZ.At(i, k) - (-2*viscosity*e - flow.p(x, z) + mean),
				density.At(i, k) - viscosity*(4*e*e+s*s),
			} {
				sum[q] += d * d
			}
		}
	}
	for q := range sum {
		sum[q] = math.Sqrt(sum[q]) / float64(n)
	}
	return sum
}

func TestPostProcessingIsSecondOrder(t *testing.T) {
	for _, c := range cases()[:3] { // faces of through-flow hold means, not the point values of exact
		coarse, fine := postProcess(t, c.flow, c.walls, 40), postProcess(t, c.flow, c.walls, 80)
		for q := range coarse {
			order := math.Log2(coarse[q] / fine[q])
			least := 1.8
			if q == 4 && c.name != "free slip" {
				least = 1.4 // the quadratic form is first order in the rows at no-slip walls
			}
			require.Greater(t, order, least, "%s, quantity %d: %.2e, %.2e", c.name, q, coarse[q], fine[q])
		}
	}
}

func TestShearAtCorners(t *testing.T) {
	for _, c := range cases()[:3] {
		worst := [2]float64{}
		for k, n := range []int{40, 80} {
			g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 1.5, Top: 2})
			require.NoError(t, err)
			sv, err := stokes.NewSolver(g, c.walls, nil)
			require.NoError(t, err)
			rate := stokes.NewTensor(g)
			require.NoError(t, sv.StrainRateTo(rate, c.flow.exact(g)))
			for j, z := range g.ZNodes() {
				for i, x := range g.XNodes() {
					worst[k] = max(worst[k], math.Abs(rate.XZ.At(i, j)-0.5*c.flow.shear(x, z)))
				}
			}
		}
		require.Greater(t, math.Log2(worst[0]/worst[1]), 1.7, "%s: %v", c.name, worst)
	}
}

func TestStressIsViscosityTimesStrainRate(t *testing.T) {
	c := cases()[3]
	g := uniform(t, 12, 9, 1, 1)
	sv, err := stokes.NewSolver(g, c.walls, nil)
	require.NoError(t, err)
	flow, eta := c.flow.exact(g), staggered.NewScalar(g)
	eta.SetAll(3)
	rate, stress := stokes.NewTensor(g), stokes.NewTensor(g)
	require.NoError(t, sv.StrainRateTo(rate, flow))
	require.NoError(t, sv.StressTo(stress, flow, eta))
	for q, v := range rate.XZ.Values {
		require.InDelta(t, 6*v, stress.XZ.Values[q], 1e-12)
	}
	for q, v := range rate.XX.Values {
		require.InDelta(t, 6*v-flow.P[q], stress.XX.Values[q], 1e-12)
		require.InDelta(t, 6*rate.ZZ.Values[q]-flow.P[q], stress.ZZ.Values[q], 1e-12)
	}
}

func TestNormalStressIsSecondOrder(t *testing.T) {
	for _, c := range cases()[:4] {
		for _, side := range staggered.Sides() {
			if testing.Short() && side != staggered.Top {
				continue
			}
			var errors [2]float64
			for k, n := range []int{40, 80} {
				g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 1.5, Top: 2})
				require.NoError(t, err)
				flow, _ := solve(t, g, c.walls, c.flow.viscosity(g), c.flow.force(g), nil)
				sv, err := stokes.NewSolver(g, c.walls, nil)
				require.NoError(t, err)
				got, err := sv.NormalStressTo(nil, side, flow, c.flow.viscosity(g))
				require.NoError(t, err)
				exact := c.flow.exact(g)
				mean := c.flow.p(g.XCentres()[0], g.ZCentres()[0]) - exact.P[0]
				at, centres := float64(int(side)%2), g.ZCentres() // 0 or 1
				if side.Horizontal() {
					centres = g.XCentres()
				}
				for q, s := range centres {
					x, z, sign := at, s, 2.0
					if side.Horizontal() {
						x, z, sign = s, at, -2.0
					}
					want := sign*c.flow.eta(x, z)*c.flow.stretch(x, z) - c.flow.p(x, z) + mean
					errors[k] += (got[q] - want) * (got[q] - want) / float64(n)
				}
				errors[k] = math.Sqrt(errors[k])
			}
			least := 1.8
			switch c.name {
			case "no slip", "moving":
				least = 1.5 // less accurate in the corners of the box
			case "through-flow":
				least = 1.2 // where one face mean meets another, first order
			}
			require.Greater(t, math.Log2(errors[0]/errors[1]), least, "%s, %v: %v", c.name, side, errors)
		}
	}
}

// A lid dragged over a layer at rest below: uniform shear.
func TestDraggedLayer(t *testing.T) {
	g := uniform(t, 6, 10, 3, 2)
	walls := stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip,
		Top: stokes.NoSlip.Moving(func(float64) float64 { return 4 })}
	flow, r := solve(t, g, walls, nil, nil, nil)
	require.LessOrEqual(t, r.Residual, 1e-8)
	eta := staggered.NewScalar(g)
	eta.SetAll(5)
	sv, err := stokes.NewSolver(g, walls, nil)
	require.NoError(t, err)
	stress := stokes.NewTensor(g)
	require.NoError(t, sv.StressTo(stress, flow, eta))
	for _, tau := range stress.XZ.Values {
		require.InDelta(t, 10, tau, 1e-6, "viscosity times shear")
	}
	density := staggered.NewScalar(g)
	total, err := sv.DissipationTo(density, flow, eta)
	require.NoError(t, err)
	require.InEpsilon(t, 5*2*2*g.Area(), total, 1e-7)
	for _, d := range density.Values {
		require.InDelta(t, 20, d, 1e-5, "the same everywhere")
	}
	require.InDelta(t, 4*0.95, flow.VX[9*7+2], 1e-7, "half a cell below the lid")
}

func TestBadDestinationsAreErrors(t *testing.T) {
	g, other := uniform(t, 8, 6, 1, 1), uniform(t, 7, 6, 1, 1)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	require.ErrorContains(t, sv.StrainRateTo(nil, flow), "tensor or a component of it is nil")
	require.ErrorContains(t, sv.StressTo(stokes.NewTensor(other), flow, nil), "tensor.XX holds 42 numbers, want 48")
	require.ErrorContains(t, sv.StrainRateTo(stokes.NewTensor(g), nil), "flow is nil")
	require.ErrorContains(t, sv.ApplyTo(nil, flow, nil), "destination is nil")
	require.ErrorContains(t, sv.ApplyTo(staggered.NewVector(other), flow, nil), "destination.X holds 48 numbers, want 54")
	_, err = sv.DissipationTo(staggered.NewScalar(other), flow, nil)
	require.ErrorContains(t, err, "destination holds 42 numbers, want 48")
	_, err = sv.NormalStressTo(make([]float64, 3), staggered.Top, flow, nil)
	require.ErrorContains(t, err, "destination holds 3 numbers, want 8")
	_, err = sv.NormalStressTo(nil, staggered.Side(9), flow, nil)
	require.ErrorContains(t, err, "side is Side(9)")
}
