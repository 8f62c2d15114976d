package multigrid

import (
	"testing"

	"github.com/stretchr/testify/require"
)

func TestJumpsAreFound(t *testing.T) {
	smooth := newProblem(square(32), exponential(1e3)).sv.Finest()
	require.True(t, smooth.jumps.none())
	l := newProblem(square(32), jump(21, 0.5)).sv.Finest()
	for j := 1; j <= 32; j++ {
		require.Equal(t, []int32{15, 16, 17, 18}, l.jumps.row(j))
	}
	require.Equal(t, sharpSweeps, l.jumps.sweeps)
	require.True(t, newProblem(square(32), jump(19, 0.5)).sv.Finest().jumps.none())

	l = newProblem(box{hx: equal(12, 1), hz: equal(12, 1), sides: Wrap}, func(x, z float64) float64 {
		if x < 0.4 && z < 0.4 {
			return 100
		}
		return 1
	}).sv.Finest()
	require.Equal(t, []int32{1, 2, 3, 4, 5, 6, 7, 11, 12}, l.jumps.row(4), "across the seam and the edge")
	require.Equal(t, []int32{1, 2, 3, 4, 5, 6, 7, 11, 12}, l.jumps.row(7))
	require.Empty(t, l.jumps.row(8))

	steep := newProblem(square(32), exponential(1e20)).sv.Finest()
	require.Equal(t, steepSweeps, steep.jumps.sweeps)
}

// Rows of one colour may be shared out in any way.
func TestJumpsAreRelaxedInParallelToTheBit(t *testing.T) {
	for name, b := range boxes() {
		p := newProblem(b, circles(1e3))
		l := p.sv.Finest()
		l.u, l.f = newFields(l.size()), newFields(l.size())
		l.random(l.f, 1)
		run := func(parts int) Fields {
			l.random(l.u, 2)
			l.jumps.backwards = !l.jumps.backwards
			for c := range jumpColours {
				l.jumps.colour = c
				if parts == 0 {
					for j := 1 + c; j <= l.Z.N; j += jumpColours {
						l.relaxRow(j)
					}
					continue
				}
				for part := range parts {
					l.jumps.share(parts - 1 - part)
				}
			}
			l.jumps.backwards = !l.jumps.backwards
			return l.u.clone()
		}
		want := run(0)
		for parts := 1; parts <= 3; parts++ {
			columns, from := l.jumps.columns, l.jumps.from
			l.makeJumps(parts)
			l.jumps.columns, l.jumps.from = columns, from
			require.Equal(t, want, run(parts), "%s, %d parts", name, parts)
		}
	}
}
