package rolls

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

// Six digits computed by another program: biharmonic core, |ω w| = 1 on the
// plumes; problem of Roberts (1979) and Jimenez and Zufiria (1987).
func TestFreeReference(t *testing.T) {
	c, err := Free(1)
	require.NoError(t, err)
	require.InEpsilon(t, 0.23461499, c.PlateTime, 3e-8)
	require.InEpsilon(t, 0.38685591, c.PlumeTime, 3e-8)
}

// ⟨|u|²⟩ of a single mode, ψ = sinh-type between the plumes, by quadrature of the
// flow itself.
func TestMeanSquareSpeedOfOneMode(t *testing.T) {
	const a, k = 0.8, 3 * math.Pi
	e := newEdge(0.15)
	w := make([]float64, len(e.t))
	for i, s := range e.s {
		w[i] = math.Sin(k*s) * e.root[i]
	}
	// ψ(x) sin kz: the mean over z of u² + w² is (k²ψ² + ψ'²)/2.
	psi := func(x float64) float64 {
		return ((a-x)*math.Sinh(k*x) + x*math.Sinh(k*(a-x))) / (4 * k * math.Pow(math.Cosh(k*a/2), 2))
	}
	sum := 0.0
	const n = 4000
	for i := range n {
		x := (float64(i) + 0.5) * a / n
		d := (psi(x+1e-5) - psi(x-1e-5)) / 2e-5
		sum += (k*k*psi(x)*psi(x) + d*d) / 2 / n
	}
	require.InEpsilon(t, sum, e.meanSquareSpeed(w, a, lastMode), 3e-6)
}

// The closing term makes up for the modes left out.
func TestModesLeftOut(t *testing.T) {
	e := newEdge(1)
	w, err := e.plumeVorticity(e.alongside(1))
	require.NoError(t, err)
	require.InEpsilon(t, e.meanSquareSpeed(w, 1, 61), e.meanSquareSpeed(w, 1, 21), 1e-5)
	require.InEpsilon(t, e.meanSquareSpeed(w, 1, 61), e.meanSquareSpeed(w, 1, 41), 1e-6)
}

// A finer grid changes nothing: the error falls exponentially.
func TestFreeIsResolved(t *testing.T) {
	widths := []float64{1, 3}
	if !testing.Short() {
		widths = append(widths, 0.3, MaxFreeWidth, MinWidth) // the last: five hundred unknowns
	}
	for _, a := range widths {
		c, err := Free(a)
		require.NoError(t, err)
		e := newEdge(0.6 * math.Min(1, a))
		w, err := e.plumeVorticity(e.alongside(a))
		require.NoError(t, err)
		require.InEpsilon(t, e.integral(product(e.alongside(a), w)), c.PlumeTime, 1e-10, "a = %g", a)
		require.InEpsilon(t, a*e.integral(product(e.across(1, a), w)), c.PlateTime, 1e-9, "a = %g", a)
		require.InEpsilon(t, e.meanSquareSpeed(w, a, lastMode), c.MeanSquareSpeed, 2e-6, "a = %g", a)
	}
}

// Opposite edges that are far apart do not see each other: the plate is left
// with one corner flow at each end, and its integral does not depend on a.
func TestWideFreeRollsForgetTheirWidth(t *testing.T) {
	five, err := Free(5)
	require.NoError(t, err)
	ten, err := Free(10)
	require.NoError(t, err)
	require.InDelta(t, five.PlateTime, ten.PlateTime, 1e-5)
	require.InDelta(t, five.PlumeTime, ten.PlumeTime, 1e-5)
}

// Speed along the edge in single sine modes: (tanh q + q/cosh²q)/(2k).
func TestAlongsideSineModes(t *testing.T) {
	for _, d := range []float64{0.5, 1, 3} {
		e := newEdge(0.2)
		a := e.alongside(d)
		for _, mode := range []float64{1, 2, 3} {
			k := mode * math.Pi
			w := make([]float64, len(e.t))
			for i := range w {
				w[i] = math.Sin(k*e.s[i]) * e.root[i]
			}
			v := product(a, w)
			q := k * d / 2
			want := (math.Tanh(q) + q/math.Pow(math.Cosh(q), 2)) / (2 * k)
			for i, s := range e.s {
				if s > 0.05 && s < 0.95 {
					require.InDelta(t, want*math.Sin(k*s), v[i]*e.root[i], 1e-11, "d %g mode %g s %g", d, mode, s)
				}
			}
		}
	}
}

// The same for the edges across: Σ of one mode is
// (1/4) [(d-x) sinh kx + x sinh k(d-x)]/cosh²(kd/2).
func TestAcrossSineModes(t *testing.T) {
	for _, d := range []float64{0.5, 1, 3} {
		e := newEdge(0.2)
		a := e.across(1, d)
		for _, mode := range []float64{1, 3} {
			k := mode * math.Pi
			w := make([]float64, len(e.t))
			for i := range w {
				w[i] = math.Sin(k*e.s[i]) * e.root[i]
			}
			u := product(a, w)
			for i, s := range e.s {
				if s > 0.05 && s < 0.95 {
					x := s * d
					want := ((d-x)*math.Sinh(k*x) + x*math.Sinh(k*(d-x))) / (4 * math.Pow(math.Cosh(k*d/2), 2))
					require.InDelta(t, want, u[i]*e.root[i], 1e-11, "d %g mode %g s %g", d, mode, s)
				}
			}
		}
	}
}

// The plates of a rigid roll stand still, and near a corner |ω|√x tends to
// 1/√2 there, because ψ ~ r^(3/2) with ωV = 1 on the plume.
func TestRigidReference(t *testing.T) {
	// Prefactors of Nu/Ra^(1/5) to the four digits that can be trusted, by
	// another program; problem of Roberts (1979).
	for a, want := range map[float64]float64{0.5: 0.580185, 1: 0.413249, math.Sqrt2: 0.327016, 2: 0.247529} {
		c, err := Rigid(a)
		require.NoError(t, err)
		i := math.Pow(c.RootShear, 2./3) / (math.Cbrt(9) * math.Gamma(4./3))
		got := math.Pow(0.75/a*math.Pow(a/2, 1./6)*i, 1.2)
		require.InEpsilon(t, want, got, 5e-5, "a = %g", a)
	}
}

// Exchanging the sides of the rectangle scales the inviscid core by a².
func TestInviscidExchangesSides(t *testing.T) {
	for _, a := range []float64{0.01, 0.3, 1, 2, 7} {
		c, d := Inviscid(a), Inviscid(1/a)
		require.InEpsilon(t, a*a*d.PlumeTime, c.PlateTime, 1e-12)
		require.InEpsilon(t, a*a*d.PlateTime, c.PlumeTime, 1e-9)
		require.InEpsilon(t, a*a*d.MeanStream, c.MeanStream, 1e-9)
	}
	// A tall cell is a strip, ψ = x(a-x)/2.
	require.InEpsilon(t, 1e-4/12, Inviscid(0.01).MeanStream, 0.02)
}

func TestWidthsOutOfRange(t *testing.T) {
	for _, a := range []float64{0, -1, 0.09, 11, math.NaN(), math.Inf(1)} {
		_, err := Free(a)
		require.ErrorContains(t, err, "roll width")
		_, err = Rigid(a)
		require.ErrorContains(t, err, "roll width")
	}
	_, err := Rigid(2.6)
	require.ErrorContains(t, err, "roll width is 2.6, want 0.1 to 2.5")
}

// Ci(π) from tables (15 digits); Ci decays like sin x/x - cos x/x².
func TestCosineIntegral(t *testing.T) {
	require.InEpsilon(t, 0.0736679120464254, cosineIntegral(math.Pi), 1e-14)
	require.InEpsilon(t, 1/math.Pow(200*math.Pi, 2), -cosineIntegral(200*math.Pi), 2e-5)
}

func BenchmarkCore(b *testing.B) {
	for _, a := range []float64{0.3, 1} {
		b.Run(fmt.Sprintf("free/width=%g", a), func(b *testing.B) {
			for b.Loop() {
				if _, err := Free(a); err != nil {
					b.Fatal(err)
				}
			}
		})
		b.Run(fmt.Sprintf("rigid/width=%g", a), func(b *testing.B) {
			for b.Loop() {
				if _, err := Rigid(a); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
