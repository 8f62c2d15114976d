package layered

import (
	"math"
	"testing"

	"example.org/overturn/stokes/internal/multigrid"
	"example.org/overturn/stokes/internal/team"
	"github.com/stretchr/testify/require"
)

// force is a load of point values.
type force struct {
	l     *multigrid.Level
	shift float64 // horizontal force taken out
}

// mean returns the mean horizontal force.
func (f force) mean() float64 {
	sum, area := 0.0, 0.0
	for j := 1; j <= f.l.Z.N; j++ {
		for i := 1; i <= f.l.X.N; i++ {
			v := f.l.X.D[i] * f.l.Z.H[j]
			sum += math.Sin(float64(i*i)+3*float64(j)) * v
			area += v
		}
	}
	return sum / area
}

func (f force) AddRow(j int, fx, fz, g []float64) {
	for i := 1; i <= f.l.X.N; i++ {
		s := float64(i*i) + 3*float64(j)
		fx[i] += (math.Sin(s) - f.shift) * f.l.X.D[i] * f.l.Z.H[j]
		fz[i] += math.Cos(2*s) * f.l.X.H[i] * f.l.Z.D[j]
	}
}

func widths(n int, ratio float64) []float64 {
	h := make([]float64, n)
	for i := range h {
		h[i] = math.Pow(ratio, float64(i)/float64(n)) / float64(n)
	}
	return h
}

// A rough force on graded rows of layers a thousand times stiffer than others:
// one solution leaves nothing but rounding.
func TestOneSolutionIsExact(t *testing.T) {
	for _, n := range [][2]int{{3, 2}, {12, 3}, {24, 37}, {50, 20}, {33, 9}} {
		for _, ends := range [][2]multigrid.End{{multigrid.Slip, multigrid.Slip}, {multigrid.Stick, multigrid.Slip}, {multigrid.Slip, multigrid.Stick}, {multigrid.Stick, multigrid.Stick}} {
			for _, sides := range []multigrid.End{multigrid.Slip, multigrid.Wrap} {
				solveOnce(t, n, ends, sides)
			}
		}
	}
}

func solveOnce(t *testing.T, n [2]int, ends [2]multigrid.End, sides multigrid.End) {
	tm := team.New(2)
	mg := multigrid.NewSolver(multigrid.NewAxis(widths(n[0], 1), sides, sides), multigrid.NewAxis(widths(n[1], 5), ends[0], ends[1]), tm)
	l := mg.Finest()
	for j := 1; j <= n[1]; j++ {
		eta := l.Row(l.Eta, j)
		for i := range eta {
			eta[i] = 1 + 1000*float64(j&2)
		}
	}
	l.WrapViscosity()
	for j := 1; j <= n[1]+1; j++ {
		corner := l.Row(l.Corner, j)
		for i := range corner {
			corner[i] = math.Sqrt(l.Row(l.Eta, j-1)[1] * l.Row(l.Eta, j)[1])
		}
	}
	mg.RefreshFinest()
	require.True(t, Suits(l))
	sv := New(l, tm)
	sv.Factor()
	load := force{l, 0}
	if l.Drifts() {
		load.shift = load.mean()
	}
	rest := mg.Residual(load)
	sv.Add(mg.X, mg.R)
	mg.Residual(load)
	sv.Balance(mg.X.P, mg.R)
	after := mg.Residual(load)
	require.Less(t, after.Weighted, 1e-9*rest.Weighted, "%v cells, ends %v, sides %v", n, ends, sides)
	require.Less(t, after.Continuity, 1e-11*math.Sqrt(rest.Weighted), "%v cells", n)
}

func TestSuits(t *testing.T) {
	level := func(x, z []float64, lo, hi multigrid.End) *multigrid.Level {
		return multigrid.NewSolver(multigrid.NewAxis(x, lo, hi), multigrid.NewAxis(z, multigrid.Slip, multigrid.Stick), team.New(1)).Finest()
	}
	ok := widths(22, 1)
	require.True(t, Suits(level(ok, widths(5, 2), multigrid.Slip, multigrid.Slip)))
	require.False(t, Suits(level(ok, widths(1, 2), multigrid.Slip, multigrid.Slip)), "one row")
	require.False(t, Suits(level(widths(2, 1), widths(5, 2), multigrid.Slip, multigrid.Slip)), "two columns")
	require.False(t, Suits(level(widths(26, 1), widths(5, 2), multigrid.Slip, multigrid.Slip)), "13 columns twice")
	require.False(t, Suits(level(widths(22, 1.1), widths(5, 2), multigrid.Slip, multigrid.Slip)), "graded columns")
	require.False(t, Suits(level(ok, widths(5, 2), multigrid.Stick, multigrid.Slip)), "a no-slip side")
	require.False(t, Suits(level(ok, widths(5, 2), multigrid.Slip, multigrid.Stick)), "a no-slip side")
	require.True(t, Suits(level(ok, widths(5, 2), multigrid.Wrap, multigrid.Wrap)))
}
