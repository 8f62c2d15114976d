package rolls

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The heat exchange is a smooth function of the plume ratio: it is the mean of
// its neighbours but for a curvature that changes little. Near r = 7 the number
// of quadrature points used to pass through 26, for which gonum's nodes are wrong.
func TestExchangeIsSmooth(t *testing.T) {
	at := func(r float64) float64 {
		q, err := HeatExchange(r)
		require.NoError(t, err)
		return q
	}
	const h = 0.02
	for r := 5.0; r <= 9; r += 0.1 {
		fourth := at(r-2*h) - 4*at(r-h) + 6*at(r) - 4*at(r+h) + at(r+2*h)
		assert.Less(t, math.Abs(fourth), 1e-9, "r = %.2f", r)
	}
}

func TestNoQuadratureOf26Points(t *testing.T) {
	for i := -600; i <= 600; i++ {
		_, n := exchangeSizes(math.Pow(10, float64(i)/100))
		assert.NotEqual(t, 26, n)
	}
}
