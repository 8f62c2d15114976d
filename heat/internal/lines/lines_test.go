package lines

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/require"
)

// dominant returns the rows of diagonally dominant matrices.
func dominant(n int, shared bool, closed bool) Row {
	return func(line, j int) (before, here, after float64) {
		if shared {
			line = 0
		}
		r := rand.New(rand.NewPCG(uint64(line), uint64(j)))
		before, here, after = -r.Float64(), 2.5+r.Float64(), r.Float64()
		if !closed && j == 0 {
			before = 0
		}
		if !closed && j == n-1 {
			after = 0
		}
		return before, here, after
	}
}

func TestSolveInvertsProduct(t *testing.T) {
	const f = 0.7
	for _, n := range []int{1, 2, 3, 4, 9, 70} {
		for _, count := range []int{1, 3, 4, 11, 130} {
			for _, sharing := range []Sharing{Shared, Each} {
				for _, kind := range []string{"rows", "ring", "columns"} {
					t.Run(fmt.Sprintf("%s/n=%d/lines=%d/sharing=%d", kind, n, count, sharing), func(t *testing.T) {
						row := dominant(n, sharing == Shared, kind == "ring")
						s := NewColumns(count, n, sharing)
						at := func(line, j int) int { return j*count + line }
						if kind != "columns" {
							s = NewRows(n, count, sharing, kind == "ring")
							at = func(line, j int) int { return line*n + j }
						}
						s.Load(row)
						s.Factor(1, 0, count/2)
						s.Factor(1, count/2, count)
						s.Factor(f, 0, count/2)
						s.Factor(f, count/2, count)
						want := make([]float64, n*count)
						for c := range want {
							want[c] = math.Cos(float64(2 * c))
						}
						got := make([]float64, n*count)
						for line := range count {
							for j := range n {
								b, h, a := row(line, j)
								x := want[at(line, j)]
								got[at(line, j)] = x + f*(b*want[at(line, (j+n-1)%n)]+h*x+a*want[at(line, (j+1)%n)])
							}
						}
						parts := append([]float64(nil), got...)
						s.Solve(got, 0, count)
						require.InDeltaSlice(t, want, got, 1e-13)
						// In two parts: the same bits.
						s.Solve(parts, 0, count/3)
						s.Solve(parts, count/3, count)
						for c := range got {
							require.Equal(t, math.Float64bits(got[c]), math.Float64bits(parts[c]))
						}
					})
				}
			}
		}
	}
}
