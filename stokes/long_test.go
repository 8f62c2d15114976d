package stokes_test

import (
	"math"
	"os"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// TestLargeGrids takes minutes; set OVERTURN_LONG=1 to run it.
func TestLargeGrids(t *testing.T) {
	if os.Getenv("OVERTURN_LONG") == "" {
		t.Skip("OVERTURN_LONG is not set")
	}
	most := map[string]int{"a": 8, "b3": 8, "b6": 8, "b10": 9, "c6": 12, "e4": 18, "d3": 13, "d6": 22, "d-3": 11}
	for _, n := range []int{256, 512, 1024, 2048} {
		g := uniform(t, n, n, 1, 1)
		force := staggered.NewVector(g)
		force.Fill(nil, func(x, z float64) float64 { return math.Cos(pi*x) * math.Sin(pi*z) })
		_, r := solve(t, g, stokes.Walls{}, nil, force, &stokes.Settings{Method: stokes.Transform, Tolerance: 1e-9})
		t.Logf("%d: %v", n, r)
		if n == 2048 {
			break
		}
		for _, class := range classes {
			eta := staggered.NewScalar(g)
			eta.Fill(class.eta)
			_, r := solve(t, g, stokes.Walls{}, eta, force, &stokes.Settings{Method: stokes.Multigrid})
			t.Logf("%d, class %s: %v", n, class.name, r)
			require.LessOrEqual(t, r.Iterations, most[class.name], class.name)
		}
	}
}
