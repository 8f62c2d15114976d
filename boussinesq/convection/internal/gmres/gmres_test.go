package gmres_test

import (
	"context"
	"errors"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"example.org/overturn/boussinesq/convection/internal/gmres"
)

func system(n int, shift float64) (gmres.Operator, *mat.Dense, []float64) {
	rng := rand.New(rand.NewPCG(1, 2))
	a := mat.NewDense(n, n, nil)
	b := make([]float64, n)
	for i := range n {
		for j := range n {
			a.Set(i, j, rng.NormFloat64())
		}
		a.Set(i, i, a.At(i, i)+shift)
		b[i] = rng.NormFloat64()
	}
	return func(dst, src []float64) error {
		mat.NewVecDense(n, dst).MulVec(a, mat.NewVecDense(n, src))
		return nil
	}, a, b
}

func residual(op gmres.Operator, x, b []float64) float64 {
	r := make([]float64, len(b))
	_ = op(r, x)
	floats.Sub(r, b)
	return floats.Norm(r, 2) / floats.Norm(b, 2)
}

func TestSolveReachesTolerance(t *testing.T) {
	const n = 60
	op, a, b := system(n, 20)
	s, x := gmres.New(n, n), make([]float64, n)
	coarse, err := s.Solve(context.Background(), x, b, op, 1e-3)
	require.NoError(t, err)
	assert.LessOrEqual(t, residual(op, x, b), 1.0001e-3)
	fine, err := s.Solve(context.Background(), x, b, op, 1e-11)
	require.NoError(t, err)
	assert.LessOrEqual(t, residual(op, x, b), 1e-10)
	assert.Less(t, coarse, fine)
	assert.Less(t, fine, n, "well conditioned: fewer steps than unknowns")
	want := mat.NewVecDense(n, nil)
	require.NoError(t, want.SolveVec(a, mat.NewVecDense(n, b)))
	assert.InDeltaSlice(t, want.RawVector().Data, x, 1e-9)
}

// In as many steps as there are unknowns the method is exact, whatever the
// spectrum.
func TestSolveEndsInNSteps(t *testing.T) {
	const n = 12
	op, _, b := system(n, 0)
	s, x := gmres.New(n, n), make([]float64, n)
	steps, err := s.Solve(context.Background(), x, b, op, 1e-9)
	require.NoError(t, err)
	assert.LessOrEqual(t, steps, n)
	assert.LessOrEqual(t, residual(op, x, b), 1e-8)
}

// Two distinct eigenvalues: two steps.
func TestStepsFollowTheMinimalPolynomial(t *testing.T) {
	op := func(dst, src []float64) error {
		for i, v := range src {
			dst[i] = float64(2+3*(i%2)) * v
		}
		return nil
	}
	b := []float64{1, 2, 3, 4, 5, 6}
	x := make([]float64, 6)
	steps, err := gmres.New(6, 6).Solve(context.Background(), x, b, op, 1e-14)
	require.NoError(t, err)
	assert.Equal(t, 2, steps)
	assert.InDeltaSlice(t, []float64{0.5, 0.4, 1.5, 0.8, 2.5, 1.2}, x, 1e-14)
}

func TestSolveReportsFailure(t *testing.T) {
	const n = 40
	op, _, b := system(n, 0)
	x := make([]float64, n)
	steps, err := gmres.New(n, 5).Solve(context.Background(), x, b, op, 1e-9)
	assert.ErrorIs(t, err, gmres.ErrNotConverged)
	assert.Equal(t, 5, steps)
	assert.Less(t, residual(op, x, b), 1.0, "the best of its space")

	broken := errors.New("broken")
	_, err = gmres.New(n, 5).Solve(context.Background(), x, b, func(_, _ []float64) error { return broken }, 1e-9)
	assert.ErrorIs(t, err, broken)
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = gmres.New(n, 5).Solve(ctx, x, b, op, 1e-9)
	assert.ErrorIs(t, err, context.Canceled)
	_, err = gmres.New(n, 5).Solve(context.Background(), x, b, func(dst, _ []float64) error { clear(dst); return nil }, 1e-9)
	assert.ErrorContains(t, err, "singular")

	steps, err = gmres.New(n, 5).Solve(context.Background(), x, make([]float64, n), op, 1e-9)
	require.NoError(t, err)
	assert.Zero(t, steps)
	assert.Equal(t, make([]float64, n), x)
}
