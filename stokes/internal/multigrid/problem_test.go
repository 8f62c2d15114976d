package multigrid

import (
	"context"
	"math"
	"testing"

	"example.org/overturn/stokes/internal/team"
)

// A problem is a buoyancy in a box.
type problem struct {
	sv     *Solver
	fx, fz func(x, z float64) float64
	x, z   []float64 // nodes
}

func equal(n int, length float64) []float64 {
	h := make([]float64, n)
	for i := range h {
		h[i] = length / float64(n)
	}
	return h
}

func nodes(h []float64) []float64 {
	x := make([]float64, len(h)+1)
	for i, v := range h {
		x[i+1] = x[i] + v
	}
	return x
}

type box struct {
	hx, hz          []float64
	sides, bot, top End
	workers         int
}

func square(n int) box { return box{hx: equal(n, 1), hz: equal(n, 1)} }

func newProblem(b box, eta func(x, z float64) float64) *problem {
	x, z := NewAxis(b.hx, b.sides, b.sides), NewAxis(b.hz, b.bot, b.top)
	p := &problem{sv: NewSolver(x, z, team.New(max(1, b.workers))), x: nodes(b.hx), z: nodes(b.hz)}
	p.fx = func(x, z float64) float64 { return 0 }
	p.fz = func(x, z float64) float64 {
		return math.Cos(math.Pi*x/last(p.x)) * math.Sin(math.Pi*z/last(p.z))
	}
	l := p.sv.Finest()
	for j := 1; j <= z.N; j++ {
		for i := 1; i <= x.N; i++ {
			l.Eta[j*l.stride+i] = eta(0.5*(p.x[i-1]+p.x[i]), 0.5*(p.z[j-1]+p.z[j]))
		}
	}
	l.WrapViscosity()
	if l.X.wraps() {
		for _, j := range []int{0, z.N + 1} {
			l.wrapX(l.row(l.Eta, j))
		}
	}
	for j := 1; j <= z.N+1; j++ {
		for i := 1; i <= x.N+1; i++ {
			c := j*l.stride + i
			l.Corner[c] = math.Sqrt(math.Sqrt(l.Eta[c]*l.Eta[c-1]) * math.Sqrt(l.Eta[c-l.stride]*l.Eta[c-1-l.stride]))
		}
	}
	p.sv.Refresh()
	return p
}

func last(s []float64) float64 { return s[len(s)-1] }

func (p *problem) AddRow(j int, fx, fz, g []float64) {
	l := p.sv.Finest()
	for i := 1; i <= l.X.N; i++ {
		xc, zc := 0.5*(p.x[i-1]+p.x[i]), 0.5*(p.z[j-1]+p.z[j])
		fx[i] += p.fx(p.x[i-1], zc) * l.X.D[i] * l.Z.H[j]
		fz[i] += p.fz(xc, p.z[j-1]) * l.X.H[i] * l.Z.D[j]
	}
}

func (p *problem) solve(t testing.TB) (int, Norms) {
	p.sv.X.clear()
	rest := p.sv.Residual(p)
	norms, n, err := p.sv.Solve(context.Background(), p, Limits{Target: 1e-8 * rest.Weighted, Iterations: 200, Basis: 200})
	if err != nil {
		t.Fatal(err)
	}
	norms.Weighted /= rest.Weighted
	norms.Momentum /= rest.Momentum
	return n, norms
}

func exponential(contrast float64) func(x, z float64) float64 {
	return func(x, z float64) float64 {
		temperature := 1 - z + 0.2*math.Cos(math.Pi*x)*math.Sin(math.Pi*z)
		return math.Exp(-math.Log(contrast) * temperature)
	}
}

func jump(contrast, at float64) func(x, z float64) float64 {
	return func(x, z float64) float64 {
		if x > at {
			return contrast
		}
		return 1
	}
}

func circles(contrast float64) func(x, z float64) float64 {
	centres := [][3]float64{{.2, .2, .09}, {.52, .17, .11}, {.81, .23, .08}, {.25, .52, .1}, {.6, .5, .12}, {.86, .57, .07}, {.37, .82, .1}, {.73, .81, .09}}
	return func(x, z float64) float64 {
		for _, c := range centres {
			if (x-c[0])*(x-c[0])+(z-c[1])*(z-c[1]) < c[2]*c[2] {
				return contrast
			}
		}
		return 1
	}
}
