package multigrid

import (
	"fmt"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestSmallLevelsAreSolvedExactly(t *testing.T) {
	for name, b := range boxes() {
		p := newProblem(b, wavy)
		for k, l := range p.sv.Levels {
			if l.cells() <= 256 {
				requireExact(t, l, fmt.Sprintf("%s, level %d", name, k))
			}
		}
	}
}

func requireExact(t *testing.T, l *Level, name string) {
	l.u = newFields(l.size())
	d := newElimination(l)
	d.factor()
	l.balance(4)
	want := l.u.clone()
	d.solve()
	// Pressure is known but for a constant and, in a layer that slides freely, vx too.
	free := newFields(l.size())
	for c := range free.P {
		free.X[c], free.P[c] = l.u.X[c]-want.X[c], l.u.P[c]-want.P[c]
	}
	shift, slide := free.P[l.stride+1], 0.0
	if l.Drifts() {
		slide = free.X[l.stride+1]
	}
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			c := j*l.stride + i
			require.InDelta(t, shift, free.P[c], 1e-9, name)
			if l.ix[c] > 0 {
				require.InDelta(t, slide, free.X[c], 1e-9, name)
			}
			require.InDelta(t, want.Z[c], l.u.Z[c], 1e-9, name)
		}
	}
}

func TestCoarseningEndsWhereStiffBodiesAre(t *testing.T) {
	for _, tt := range []struct {
		name string
		b    box
		eta  func(x, z float64) float64
		nx   int
	}{
		{"smooth", square(64), exponential(1e8), 4},
		{"jumps", square(64), circles(100), 16},
		{"jumps on a fine grid", square(256), circles(100), 32},
		{"jumps between periodic sides", box{hx: equal(64, 1), hz: equal(64, 1), sides: Wrap}, circles(100), 8},
		{"jumps on a coarse grid", square(8), circles(100), 4},
	} {
		sv := newProblem(tt.b, tt.eta).sv
		require.Equal(t, tt.nx, sv.Levels[sv.end].X.N, tt.name)
	}
	// The next viscosity may be another.
	p := newProblem(square(64), circles(100))
	for i := range p.sv.Finest().Eta {
		p.sv.Finest().Eta[i] = 1
	}
	p.sv.Refresh()
	require.Equal(t, 4, p.sv.Levels[p.sv.end].X.N)
}
