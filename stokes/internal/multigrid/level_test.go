package multigrid

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.org/overturn/stokes/internal/team"
	"github.com/stretchr/testify/require"
)

// boxes are small grids with every kind of end, odd and graded sizes.
func boxes() map[string]box {
	graded := []float64{.3, .4, .5, .7, .8, .8, .9, 1.1, 1.2, 1, .8, .6, .5}
	return map[string]box{
		"free slip": {hx: equal(17, 1.3), hz: equal(75, 1)},
		"no slip":   {hx: graded, hz: equal(12, 4), sides: Stick, bot: Stick, top: Stick},
		"mixed":     {hx: equal(20, 5), hz: graded, bot: Stick},
		"periodic":  {hx: graded, hz: graded, sides: Wrap, top: Stick},
		"even":      {hx: equal(16, 1), hz: equal(70, 5), sides: Wrap},
	}
}

func wavy(x, z float64) float64 { return math.Exp(math.Sin(3*x) + math.Cos(2*z)) }

// random fills the free unknowns of u.
func (l *Level) random(u Fields, seed uint64) {
	r := rand.New(rand.NewPCG(seed, 1))
	u.clear()
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			c := j*l.stride + i
			if l.ix[c] > 0 {
				u.X[c] = r.NormFloat64()
			}
			if l.iz[c] > 0 {
				u.Z[c] = r.NormFloat64()
			}
			u.P[c] = r.NormFloat64()
		}
	}
	l.WrapFields(u)
}

// apply returns the operator applied to u.
func (l *Level) apply(u Fields) Fields {
	out, s := newFields(l.size()), newScratch(l.stride)
	l.begin(s, u, 1)
	for j := 1; j <= l.Z.N; j++ {
		l.operatorRow(s, u, j)
		copy(l.row(out.X, j), s.rx)
		copy(l.row(out.Z, j), s.rz)
		copy(l.row(out.P, j), s.rp)
	}
	return out
}

// dot sums over the unknowns.
func (l *Level) dot(a, b Fields) float64 {
	sum := 0.0
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			c := j*l.stride + i
			sum += a.X[c]*b.X[c] + a.Z[c]*b.Z[c] + a.P[c]*b.P[c]
		}
	}
	return sum
}

// balance makes u the solution of the correction equation of l.
func (l *Level) balance(seed uint64) {
	l.u, l.f = newFields(l.size()), newFields(l.size())
	l.random(l.u, seed)
	f := l.apply(l.u)
	for i := range f.X {
		l.f.X[i], l.f.Z[i], l.f.P[i] = -f.X[i], -f.Z[i], -f.P[i]
	}
}

func (u Fields) clone() Fields {
	return Fields{append([]float64{}, u.X...), append([]float64{}, u.Z...), append([]float64{}, u.P...)}
}

func requireClose(t *testing.T, want, got Fields, tolerance float64) {
	t.Helper()
	require.InDeltaSlice(t, want.X, got.X, tolerance)
	require.InDeltaSlice(t, want.Z, got.Z, tolerance)
	require.InDeltaSlice(t, want.P, got.P, tolerance)
}

func TestOperatorIsSymmetric(t *testing.T) {
	for name, b := range boxes() {
		for k, l := range newProblem(b, wavy).sv.Levels {
			u, v := newFields(l.size()), newFields(l.size())
			l.random(u, 1)
			l.random(v, 2)
			au, av := l.apply(u), l.apply(v)
			require.InEpsilon(t, l.dot(v, au), l.dot(u, av), 1e-10, "%s, level %d", name, k)
			// Without pressure it takes energy out of any flow.
			clear(u.P)
			require.Negative(t, l.dot(u, l.apply(u)), name)
		}
	}
}

func TestDiagonalIsThatOfTheOperator(t *testing.T) {
	for name, b := range boxes() {
		l := newProblem(b, wavy).sv.Finest()
		u := newFields(l.size())
		for j := 1; j <= l.Z.N; j += 3 {
			for i := 1; i <= l.X.N; i += 2 {
				c := j*l.stride + i
				for _, f := range []struct{ field, inverse []float64 }{{u.X, l.ix}, {u.Z, l.iz}} {
					if f.inverse[c] == 0 {
						continue
					}
					f.field[c] = 1
					l.WrapFields(u)
					out := l.apply(u)
					got := -out.X[c]
					if &f.field[0] == &u.Z[0] {
						got = -out.Z[c]
					}
					require.InEpsilon(t, 1/f.inverse[c], got, 1e-12, "%s at %d, %d", name, i, j)
					f.field[c] = 0
					l.WrapFields(u)
				}
			}
		}
	}
}

func TestSmoothersKeepTheSolution(t *testing.T) {
	for name, b := range boxes() {
		p := newProblem(b, circles(1e3))
		for k, l := range p.sv.Levels {
			l.balance(3)
			want := l.u.clone()
			newPipeline(l.Z.N, nil, 1, p.sv.s, l.sweepStages()).run()
			p.sv.relaxJumps(k)
			scale := 0.0
			for _, e := range l.Eta {
				scale = max(scale, e)
			}
			requireClose(t, want, l.u, 1e-9*scale)
			require.False(t, t.Failed(), name)
		}
	}
}

func TestDistributionRemovesMassDefects(t *testing.T) {
	l := newProblem(boxes()["mixed"], wavy).sv.Finest()
	l.u, l.f = newFields(l.size()), newFields(l.size())
	l.random(l.u, 5)
	for colour := range 2 {
		for j := 1; j <= l.Z.N; j++ {
			l.distribute(j, colour)
		}
		rp := l.apply(l.u).P
		for j := 1; j <= l.Z.N; j++ {
			for i := 1; i <= l.X.N; i++ {
				if (i+j+colour)%2 == 0 {
					require.InDelta(t, 0, rp[j*l.stride+i], 1e-13)
				}
			}
		}
	}
}

// Rows taken through a pipeline, in any number of blocks, give what whole
// passes one after the other give.
func TestPipelinesAreExact(t *testing.T) {
	for name, b := range boxes() {
		b.hz = append(append([]float64{}, b.hz...), equal(101, 3)...) // rows for several blocks
		p := newProblem(b, wavy)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u, l.f = newFields(l.size()), newFields(l.size())
		l.random(l.f, 6)
		c.random(c.u, 7)
		for which := range 4 {
			run := func(blocks int) (fine, coarse Fields) {
				l.random(l.u, 8)
				l.makePasses(team.New(max(1, blocks)), max(1, blocks), c, []*scratch{newScratch(l.stride), newScratch(l.stride), newScratch(l.stride)})
				pipe := []*pipeline{l.passes.freshDown, l.passes.down, l.passes.up, l.passes.sweep}[which]
				if blocks > 0 {
					pipe.run()
				} else {
					for _, st := range pipe.stages {
						for j := 1; j <= l.Z.N; j++ {
							st.row(0, j)
						}
					}
				}
				return l.u.clone(), c.f.clone()
			}
			fine, coarse := run(0)
			for blocks := 1; blocks <= 3; blocks++ {
				f, cc := run(blocks)
				require.Equal(t, fine, f, "%s, pipeline %d, %d blocks", name, which, blocks)
				require.Equal(t, coarse, cc, "%s, pipeline %d, %d blocks, restriction", name, which, blocks)
			}
		}
	}
}
