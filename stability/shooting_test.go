package stability

import (
	"math"
	"math/cmplx"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/stability/internal/gauss"
)

// A shooting solves the equations as a first-order system of ordinary
// differential equations, from bottom to top, and looks for the zero of the
// determinant of the conditions at the top: a route that shares nothing with
// elements, weak forms and eigenvalue routines. The unknowns are
//
//	w, w', S = η(w″+k²w), N = S' - 4k²ηw', θ, θ', ζ, ηζ', s, s', b, b'
//
// as many as the layer has.
type shooting struct {
	k                          float64
	ra, ta, q, rs, ma, inertia float64
	tau, induction             float64 // zero for no solute, no induction
	sigma                      complex128
	eta, f                     func(z float64) float64
	bottom, top                conditions
	porous                     bool
}

// unknowns of the first-order system
const (
	iW = iota
	iU
	iS
	iN
	iT
	iTz
	iZ
	iZz
	iC
	iCz
	iB
	iBz
	width
)

// matrix writes dy/dz = m y at height z. Absent fields stay zero.
func (s *shooting) matrix(z float64, m *[width][width]complex128) {
	*m = [width][width]complex128{}
	k2 := complex(s.k*s.k, 0)
	m[iT][iTz] = 1
	m[iTz][iT] = k2 + s.sigma
	m[iTz][iW] = complex(-s.f(z), 0)
	if s.porous { // w' = u, u' = k²w - Ra k²θ
		m[iW][iU] = 1
		m[iU][iW] = k2
		m[iU][iT] = complex(-s.ra, 0) * k2
		return
	}
	eta := complex(s.eta(z), 0)
	m[iW][iU] = 1
	m[iU][iS], m[iU][iW] = 1/eta, -k2
	m[iS][iN], m[iS][iU] = 1, 4*k2*eta
	m[iN][iT] = complex(s.ra, 0) * k2
	m[iN][iS] = -k2
	drag := s.sigma * complex(s.inertia, 0) // (σ/Pr)(w″ - k²w)
	m[iN][iS] += drag / eta
	m[iN][iW] -= 2 * k2 * drag
	if s.ta > 0 {
		m[iN][iZz] += complex(s.ta, 0) / eta
		m[iZ][iZz] = 1 / eta
		m[iZz][iZ], m[iZz][iU] = k2*eta+drag, -1
	}
	if s.tau > 0 {
		m[iN][iC] -= complex(s.rs, 0) * k2
		m[iC][iCz] = 1
		m[iCz][iC], m[iCz][iW] = k2+s.sigma/complex(s.tau, 0), complex(-1/s.tau, 0)
	}
	q := complex(s.q, 0)
	m[iN][iS] += q / eta // Q w″
	m[iN][iW] -= q * k2
	if s.induction > 0 {
		m[iN][iBz] -= q * s.sigma * complex(s.induction, 0)
		m[iB][iBz] = 1
		m[iBz][iB], m[iBz][iU] = k2+s.sigma*complex(s.induction, 0), -1
	}
}

// starts returns the solutions that satisfy the conditions at the bottom, and
// ends the conditions at the top as functions of the unknowns there.
func (s *shooting) starts() [][width]complex128 {
	unit := func(is ...int) (v [width]complex128) {
		for _, i := range is {
			v[i] = 1
		}
		return v
	}
	var out [][width]complex128
	switch {
	case s.porous && s.bottom.wall == Permeable:
		out = append(out, unit(iW))
	case s.porous:
		out = append(out, unit(iU))
	case s.bottom.wall == Rigid:
		out = append(out, unit(iS), unit(iN))
	default:
		out = append(out, unit(iU), unit(iN))
	}
	heat := unit(iTz)
	if !s.bottom.isothermal() {
		heat = unit(iT)
		heat[iTz] = complex(s.bottom.biot, 0)
	}
	out = append(out, heat)
	if s.ta > 0 {
		if s.bottom.wall == Rigid {
			out = append(out, unit(iZz))
		} else {
			out = append(out, unit(iZ))
		}
	}
	if s.tau > 0 {
		out = append(out, unit(iCz))
	}
	if s.induction > 0 { // insulating: Db = k b
		field := unit(iB)
		field[iBz] = complex(s.k, 0)
		out = append(out, field)
	}
	return out
}

func (s *shooting) ends(y [width]complex128) []complex128 {
	var out []complex128
	switch {
	case s.porous && s.top.wall == Permeable:
		out = append(out, y[iU])
	case s.porous:
		out = append(out, y[iW])
	case s.top.wall == Rigid:
		out = append(out, y[iW], y[iU])
	default:
		out = append(out, y[iW], y[iS]+complex(s.ma*s.k*s.k, 0)*y[iT])
	}
	if s.top.isothermal() {
		out = append(out, y[iT])
	} else {
		out = append(out, y[iTz]+complex(s.top.biot, 0)*y[iT])
	}
	if s.ta > 0 {
		if s.top.wall == Rigid {
			out = append(out, y[iZ])
		} else {
			out = append(out, y[iZz])
		}
	}
	if s.tau > 0 {
		out = append(out, y[iC])
	}
	if s.induction > 0 {
		out = append(out, y[iBz]+complex(s.k, 0)*y[iB])
	}
	return out
}

// determinant integrates by Gauss collocation of order 12 and returns the
// determinant of the conditions at the top, scaled.
func (s *shooting) determinant() complex128 {
	const steps = 48
	ys := s.starts()
	for step := range steps {
		s.step(float64(step)/steps, 1.0/steps, ys)
		for i := range ys {
			size := 0.0
			for _, v := range ys[i] {
				size = max(size, cmplx.Abs(v))
			}
			for j := range ys[i] {
				ys[i][j] /= complex(size, 0)
			}
		}
	}
	n := len(ys)
	a := make([][]complex128, n)
	for i := range a {
		a[i] = make([]complex128, n)
	}
	for j, y := range ys {
		for i, v := range s.ends(y) {
			a[i][j] = v
		}
	}
	return determinantOf(a)
}

const stages = 6

// collocation returns the points, the weights and the matrix of the Gauss
// method on 0 < c < 1: a[i][j] is the integral of the j-th Lagrange polynomial up to c[i].
func collocation() (c, b [stages]float64, a [stages][stages]float64) {
	x, w := gauss.Rule(stages)
	for i := range c {
		c[i], b[i] = (1+x[i])/2, w[i]/2
	}
	for i := range c {
		for j := range c {
			for q := range c { // integrate over 0 … c[i] by the same rule
				t := c[i] * c[q]
				l := 1.0
				for m := range c {
					if m != j {
						l *= (t - c[m]) / (c[j] - c[m])
					}
				}
				a[i][j] += c[i] * b[q] * l
			}
		}
	}
	return c, b, a
}

// step advances all solutions over one step, by solving for the stage slopes.
func (s *shooting) step(z, h float64, ys [][width]complex128) {
	c, b, a := collocation()
	active := s.active()
	n := len(active)
	order := stages * n
	system := make([][]complex128, order)
	for i := range system {
		system[i] = make([]complex128, order+len(ys))
	}
	var m [width][width]complex128
	for i := range stages {
		s.matrix(z+c[i]*h, &m)
		for r, ar := range active {
			row := system[i*n+r]
			row[i*n+r] = 1
			for col, ac := range active {
				for j := range stages {
					row[j*n+col] -= complex(h*a[i][j], 0) * m[ar][ac]
				}
				for l := range ys {
					row[order+l] += m[ar][ac] * ys[l][ac]
				}
			}
		}
	}
	eliminate(system, order)
	for l := range ys {
		for r, ar := range active {
			for i := range stages {
				ys[l][ar] += complex(h*b[i], 0) * system[i*n+r][order+l]
			}
		}
	}
}

// active lists the unknowns that the layer has.
func (s *shooting) active() []int {
	out := []int{iW, iU, iT, iTz}
	if !s.porous {
		out = append(out, iS, iN)
	}
	for _, f := range []struct {
		present bool
		first   int
	}{{s.ta > 0, iZ}, {s.tau > 0, iC}, {s.induction > 0, iB}} {
		if f.present {
			out = append(out, f.first, f.first+1)
		}
	}
	return out
}

// eliminate solves the first n columns against the others, in place.
func eliminate(a [][]complex128, n int) {
	for p := range n {
		best := p
		for r := p + 1; r < n; r++ {
			if cmplx.Abs(a[r][p]) > cmplx.Abs(a[best][p]) {
				best = r
			}
		}
		a[p], a[best] = a[best], a[p]
		for r := range n {
			if r == p || a[r][p] == 0 {
				continue
			}
			f := a[r][p] / a[p][p]
			for c := p; c < len(a[r]); c++ {
				a[r][c] -= f * a[p][c]
			}
		}
	}
	for p := range n {
		for c := n; c < len(a[p]); c++ {
			a[p][c] /= a[p][p]
		}
	}
}

func determinantOf(a [][]complex128) complex128 {
	det := complex(1, 0)
	for p := range a {
		best := p
		for r := p + 1; r < len(a); r++ {
			if cmplx.Abs(a[r][p]) > cmplx.Abs(a[best][p]) {
				best = r
			}
		}
		if best != p {
			a[p], a[best] = a[best], a[p]
			det = -det
		}
		det *= a[p][p]
		for r := p + 1; r < len(a); r++ {
			f := a[r][p] / a[p][p]
			for c := p; c < len(a); c++ {
				a[r][c] -= f * a[p][c]
			}
		}
	}
	return det
}

// root finds a zero of a function of one real number near a guess, by secants.
func root(f func(x float64) float64, guess float64) float64 {
	a, b := guess*(1+1e-4), guess*(1-1e-4)
	fa, fb := f(a), f(b)
	for range 20 {
		if fb == fa {
			break
		}
		c := b - fb*(b-a)/(fb-fa)
		a, fa = b, fb
		b, fb = c, f(c)
		if math.Abs(b-a) < 1e-14*math.Abs(b) {
			break
		}
	}
	return b
}

// root2 finds a zero of a complex function of two real numbers, by Newton's
// method with differences.
func root2(f func(x, y float64) complex128, x, y float64) (float64, float64) {
	for range 20 {
		const h = 1e-6
		f0 := f(x, y)
		fx, fy := (f(x*(1+h), y)-f(x*(1-h), y))/complex(2*h*x, 0), (f(x, y*(1+h))-f(x, y*(1-h)))/complex(2*h*y, 0)
		det := real(fx)*imag(fy) - imag(fx)*real(fy)
		dx := (real(f0)*imag(fy) - imag(f0)*real(fy)) / det
		dy := (real(fx)*imag(f0) - imag(fx)*real(f0)) / det
		x, y = x-dx, y-dy
		if math.Abs(dx) < 1e-13*math.Abs(x) && math.Abs(dy) < 1e-13*math.Abs(y) {
			break
		}
	}
	return x, y
}

// shootingOf translates a layer.
func shootingOf(t *testing.T, l Layer, k float64) *shooting {
	t.Helper()
	base, err := l.Base.resolve()
	require.NoError(t, err)
	s := &shooting{
		k: k, ta: l.Taylor, q: l.Magnetic.Chandrasekhar, rs: l.Solute.Rayleigh, ma: l.Marangoni,
		tau: l.Solute.Diffusivity, induction: l.Magnetic.induction(), inertia: l.inertia(),
		f: base.gradient, bottom: conditionsOf(l.Bottom), top: conditionsOf(l.Top), porous: l.Porous == Darcy,
		eta: func(z float64) float64 {
			if l.Viscosity.law == nil {
				return 1
			}
			return l.Viscosity.law(z, base.temperature(z))
		},
	}
	return s
}

// Stationary neutral states, growth rates and oscillations agree with shooting
// to 1e-9, in settings that have little in common.
func TestAgreesWithShooting(t *testing.T) {
	skipIfShort(t)
	const tolerance = 1e-9
	tests := []struct {
		name  string
		layer Layer
		k     float64
		ra    float64 // for growth; 0 asks for the neutral state
	}{
		{"rigid walls", Layer{Bottom: Rigid, Top: Rigid}, 3.1, 0},
		{"rigid and free, Robin", Layer{Bottom: Rigid.Robin(0.3), Top: Free.Robin(7)}, 2.2, 0},
		{"internal heating, flux below", Layer{Bottom: Rigid.FixedFlux(), Base: InternalHeating()}, 2.3, 0},
		{"mixed heating", Layer{Bottom: Rigid, Top: Rigid, Base: MixedHeating(7)}, 3.3, 0},
		{"stiff lid", Layer{Bottom: Rigid, Top: Free, Viscosity: Exponential(math.Log(3000), 0.5)}, 3, 0},
		{"Arrhenius", Layer{Viscosity: Arrhenius(2, 0.4, 1)}, 2.4, 0},
		{"rotation", Layer{Bottom: Rigid, Top: Free, Taylor: 2000}, 3.5, 0},
		{"rotation, viscosity with depth", Layer{Bottom: Rigid, Top: Free, Taylor: 1000,
			Viscosity: ViscosityLaw(func(z, _ float64) float64 { return 1 + z*z })}, 3.2, 0},
		{"magnetic field", Layer{Bottom: Rigid, Magnetic: Magnetic{Chandrasekhar: 60}}, 4, 0},
		{"porous, open top", Layer{Porous: Darcy, Bottom: Impermeable.Robin(2), Top: Permeable, Base: MixedFlux(0.4)}, 2, 0},
		{"growth, finite Prandtl number", Layer{Bottom: Rigid, Top: Free.Robin(2), Prandtl: 0.7}, 3, 5000},
		{"growth, cooling", Layer{Bottom: Rigid.FixedFlux(), Base: CoolingFromAbove(0.02), Prandtl: 3}, 4, 2e4},
		{"decay", Layer{Bottom: Rigid, Top: Rigid, Prandtl: 5}, 2, 500},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			solver, err := NewSolver(tt.layer, nil)
			require.NoError(t, err)
			s := shootingOf(t, tt.layer, tt.k)
			if tt.ra == 0 {
				o, err := solver.Neutral(Search{}, tt.k)
				require.NoError(t, err)
				want := root(func(ra float64) float64 { s.ra = ra; return real(s.determinant()) }, o.Value)
				require.InEpsilon(t, want, o.Value, tolerance)
				return
			}
			g, err := solver.Growth(tt.ra, tt.k)
			require.NoError(t, err)
			s.ra = tt.ra
			want := root(func(sigma float64) float64 { s.sigma = complex(sigma, 0); return real(s.determinant()) }, g.Rate)
			require.InEpsilon(t, want, g.Rate, tolerance)
		})
	}
}

func TestOscillationsAgreeWithShooting(t *testing.T) {
	skipIfShort(t)
	const tolerance = 1e-9
	tests := []struct {
		name  string
		layer Layer
		k     float64
	}{
		{"rotation, low Prandtl number", Layer{Bottom: Rigid, Top: Rigid, Taylor: 1e4, Prandtl: 0.025}, 2.5},
		{"solute", Layer{Bottom: Rigid, Top: Free, Prandtl: 7, Solute: Solute{Rayleigh: 5000, Diffusivity: 0.1}}, 2.8},
		{"magnetic field, slow induction", Layer{Bottom: Rigid, Top: Rigid, Prandtl: 1,
			Magnetic: Magnetic{Chandrasekhar: 100, Diffusivity: 0.2}}, 3},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			solver, err := NewSolver(tt.layer, nil)
			require.NoError(t, err)
			o, err := solver.Neutral(Search{}, tt.k)
			require.NoError(t, err)
			require.True(t, o.Oscillates(), "%v", o)
			s := shootingOf(t, tt.layer, tt.k)
			ra, omega := root2(func(ra, omega float64) complex128 {
				s.ra, s.sigma = ra, complex(0, omega)
				return s.determinant()
			}, o.Value*(1+1e-5), o.Frequency*(1-1e-5))
			require.InEpsilon(t, ra, o.Value, tolerance)
			require.InEpsilon(t, omega, o.Frequency, tolerance)
		})
	}
}

func TestThermocapillarityAgreesWithShooting(t *testing.T) {
	layer := Layer{Bottom: Rigid.Robin(3), Top: Free.Robin(0.5)}
	solver, err := NewSolver(layer, nil)
	require.NoError(t, err)
	o, err := solver.Neutral(Search{Number: MarangoniNumber, Rayleigh: 200}, 2.1)
	require.NoError(t, err)
	s := shootingOf(t, layer, 2.1)
	s.ra = 200
	want := root(func(ma float64) float64 { s.ma = ma; return real(s.determinant()) }, o.Value)
	require.InEpsilon(t, want, o.Value, 1e-9)
	require.Equal(t, 200.0, o.Rayleigh)
	require.Equal(t, o.Value, o.Marangoni)
}
