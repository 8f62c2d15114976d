package check

import (
	"errors"
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestPredicates(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	tests := []struct {
		name      string
		check     func(float64) error
		good, bad []float64
		want      string
	}{
		{"positive", func(x float64) error { return Positive("p", "X.Y", x) }, []float64{1e-300, 1, 1e300}, []float64{0, -1, nan, inf, -inf}, "> 0 and finite"},
		{"not negative", func(x float64) error { return NotNegative("p", "X.Y", x) }, []float64{0, 1}, []float64{-1e-300, nan, inf}, ">= 0 and finite"},
		{"finite", func(x float64) error { return Finite("p", "X.Y", x) }, []float64{-1, 0, 1}, []float64{nan, inf, -inf}, "a finite number"},
		{"within", func(x float64) error { return Within("p", "X.Y", x, 1, 2) }, []float64{1, 1.5, 2}, []float64{0.999, 2.001, nan}, "1 to 2"},
		{"above", func(x float64) error { return Above("p", "X.Y", x, 1) }, []float64{1.001}, []float64{1, 0, nan, inf}, "> 1 and finite"},
	}
	for _, tt := range tests {
		for _, x := range tt.good {
			require.NoError(t, tt.check(x), tt.name)
		}
		for _, x := range tt.bad {
			var e *FieldError
			require.ErrorAs(t, tt.check(x), &e, tt.name)
			require.Equal(t, "X.Y", e.Field)
			require.Equal(t, tt.want, e.Want)
		}
	}
}

func TestResult(t *testing.T) {
	x, err := Result("p", "flux", 3.5)
	require.NoError(t, err)
	require.Equal(t, 3.5, x)
	_, err = Result("p", "flux", math.NaN())
	require.EqualError(t, err, "p: flux is NaN, want a number within the range of float64")
	_, err = Result("p", "flux", math.Inf(-1))
	require.Error(t, err)
}

func TestFieldErrorUnwraps(t *testing.T) {
	sentinel := errors.New("too hot")
	err := error(&FieldError{Package: "p", Field: "X", Value: "1", Want: "0", Err: sentinel})
	require.ErrorIs(t, err, sentinel)
	require.EqualError(t, err, "p: X is 1, want 0: too hot")
	require.NoError(t, First(nil, nil))
	require.Equal(t, err, First(nil, err, sentinel))
}
