package exact_test

import (
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func solve(t *testing.T, p exact.Problem) exact.Solution {
	t.Helper()
	s, err := p.Solve()
	require.NoError(t, err)
	return s
}

// difference returns the largest differences of velocity and of stress at
// points of the box, relative to the largest velocity and stress.
func difference(a, b exact.Solution, box exact.Box) (velocity, stress float64) {
	c := exact.Case{Solution: b, Box: box}
	speed, size := scales(c)
	for _, p := range points(c, 100) {
		f, g := a.At(p[0], p[1]), b.At(p[0], p[1])
		velocity = max(velocity, math.Hypot(f.VX-g.VX, f.VZ-g.VZ)/speed)
		stress = max(stress, math.Abs(f.Stress.XX-g.Stress.XX)/size,
			math.Abs(f.Stress.ZZ-g.Stress.ZZ)/size, math.Abs(f.Stress.XZ-g.Stress.XZ)/size)
	}
	return velocity, stress
}

func assertSame(t *testing.T, a, b exact.Solution, box exact.Box, tolerance float64) {
	t.Helper()
	v, s := difference(a, b, box)
	if !(v <= tolerance && s <= tolerance) {
		t.Errorf("velocities differ by %.2e, stresses by %.2e, want at most %.0e", v, s, tolerance)
	}
}

// Without a jump or a gradient of viscosity all harmonic problems are the box
// mode.
func TestUniformViscosityIsTheBoxMode(t *testing.T) {
	const kx, kz, eta, force = 2 * math.Pi, math.Pi, 3.0, 7.0
	want := solve(t, exact.BoxMode{Viscosity: eta, KX: kx, KZ: kz, Force: force})
	sine, cosine := exact.Profile{Sine: force, Wavenumber: kz}, exact.Profile{Cosine: force, Wavenumber: kx}
	for name, p := range map[string]exact.Problem{
		"column jump": exact.ColumnJump{Width: 1, Jump: 0.4, Left: eta, Right: eta, KX: kx, KZ: kz, Force: force},
		"columns": exact.Columns{KZ: kz, Columns: []exact.Column{
			{Width: 0.1, Viscosity: eta, Force: cosine}, {Width: 0.5, Viscosity: eta, Contrast: 1, Force: cosine}, {Width: 0.4, Viscosity: eta, Force: cosine}}},
		"exponential": exact.ExponentialViscosity{Height: 1, AtBottom: eta, AtTop: eta, KX: kx, KZ: kz, Force: force},
		"one layer":   exact.Layers{KX: kx, Layers: []exact.Layer{{Thickness: 1, Viscosity: eta, Force: sine}}},
		"five layers": exact.Layers{KX: kx, Layers: []exact.Layer{
			{Thickness: 0.5, Viscosity: eta, Force: sine}, {Thickness: 0.25, Viscosity: eta, Force: sine},
			{Thickness: 0.125, Viscosity: eta, Force: sine}, {Thickness: 0.0625, Viscosity: eta, Force: sine},
			{Thickness: 0.0625, Viscosity: eta, Force: sine}}},
	} {
		t.Run(name, func(t *testing.T) { assertSame(t, solve(t, p), want, unit, 1e-13) })
	}
}

// A jump that vanishes leaves the uniform answer, in proportion.
func TestSmallJumpsAreSmall(t *testing.T) {
	want := solve(t, exact.BoxMode{Viscosity: 1, KX: math.Pi, KZ: math.Pi, Force: 1})
	for _, d := range []float64{1e-3, 1e-6, 1e-9} {
		jump := solve(t, exact.ColumnJump{Width: 1, Jump: 0.3, Left: 1, Right: 1 + d, KX: math.Pi, KZ: math.Pi, Force: 1})
		v, _ := difference(jump, want, unit)
		assert.Less(t, v, d)
		assert.Greater(t, v, 0.01*d)
		gradient := solve(t, exact.ExponentialViscosity{Height: 1, AtBottom: 1, AtTop: 1 + d, KX: math.Pi, KZ: math.Pi, Force: 1})
		v, _ = difference(gradient, want, unit)
		assert.Less(t, v, d)
		assert.Greater(t, v, 0.01*d)
	}
}

// A layer may be cut into layers with the same viscosity and force.
func TestCutLayersAreTheWholeLayer(t *testing.T) {
	force := exact.Profile{Mean: 1, Sine: 2, Cosine: 0.5, Wavenumber: 5}
	for _, kx := range []float64{1e-3, 1, 7, 30, 1000} {
		t.Run(fmt.Sprint("kx=", kx), func(t *testing.T) {
			whole := exact.Layers{KX: kx, Bottom: exact.NoSlip, Layers: []exact.Layer{{Thickness: 1, Viscosity: 2, Contrast: 16, Force: force}}}
			cut := exact.Layers{KX: kx, Bottom: exact.NoSlip, Layers: []exact.Layer{
				{Thickness: 0.25, Viscosity: 2, Contrast: 2, Force: force},
				{Thickness: 0.5, Viscosity: 4, Contrast: 4, Force: force},
				{Thickness: 0.25, Viscosity: 16, Contrast: 2, Force: force},
			}}
			assertSame(t, solve(t, cut), solve(t, whole), exact.Box{Right: 3 / kx, Top: 1}, 1e-12)
		})
	}
}

// A stair of uniform layers tends to the exponential viscosity as the square
// of their thickness, if each has the viscosity of its middle. The velocity is
// compared at faces that all stairs have; within a layer it wobbles.
func TestStairConvergesToExponentialViscosity(t *testing.T) {
	const contrast = 1e4
	want := solve(t, exact.ExponentialViscosity{Height: 1, AtBottom: 1, AtTop: contrast, KX: math.Pi, KZ: math.Pi, Force: 1})
	previous := math.NaN()
	for _, n := range []int{32, 64, 128, 256, 512, 1024} {
		p := exact.Layers{KX: math.Pi}
		for i := range n {
			middle := (float64(i) + 0.5) / float64(n)
			p.Layers = append(p.Layers, exact.Layer{
				Thickness: 1 / float64(n),
				Viscosity: math.Pow(contrast, middle),
				Force:     exact.Profile{Sine: 1, Wavenumber: math.Pi},
			})
		}
		s, e := solve(t, p), 0.0
		for i := range 31 {
			z := float64(i+1) / 32
			e = max(e, math.Abs(s.At(0, z).VZ/want.At(0, z).VZ-1))
		}
		if order := math.Log2(previous / e); n > 32 && !(math.Abs(order-2) < 0.05) {
			t.Errorf("%d layers: error %.2e, order %.2f, want 2 ± 0.05", n, e, order)
		}
		previous = e
	}
}

// Thousands of layers and very short waves neither overflow nor lose digits:
// far from the faces the flow is that of an unbounded fluid.
func TestManyLayersAndShortWaves(t *testing.T) {
	const n, kx, kz = 4000, 5e4, 3e4
	p := exact.Layers{KX: kx}
	for i := range n {
		p.Layers = append(p.Layers, exact.Layer{
			Thickness: 1.0 / 4, Viscosity: []float64{1, 1e6, 10}[i%3], Force: exact.Profile{Sine: 1, Wavenumber: kz},
		})
	}
	s := solve(t, p)
	for _, i := range []int{0, 1, 1999, 2000, 2001, n - 1} {
		z := (float64(i) + 0.5) / 4
		want := math.Sin(kz*z) / s.Viscosity(0, z) * math.Pow(kx/(kx*kx+kz*kz), 2)
		assert.InEpsilon(t, want, s.At(0, z).VZ, 1e-9)
	}
}

// Interleaved thin layers act as one anisotropic layer; the answer settles as
// they become thinner.
func TestThinInterleavedLayersSettle(t *testing.T) {
	previous, change := math.NaN(), math.NaN()
	for _, n := range []int{10, 20, 40, 80, 160} {
		p := exact.Layers{KX: 2}
		for i := range 2 * n {
			p.Layers = append(p.Layers, exact.Layer{
				Thickness: 0.5 / float64(n), Viscosity: []float64{1, 100}[i%2], Force: exact.Profile{Sine: 1, Wavenumber: math.Pi},
			})
		}
		v := solve(t, p).At(0, 0.5).VZ
		if n > 20 {
			assert.Less(t, math.Abs(v-previous), 0.7*change)
		}
		change, previous = math.Abs(v-previous), v
	}
}

// A layer much thinner than its wavelength: lubrication theory, the error of
// which is of order (kh)².
func TestLongWavesAreLubrication(t *testing.T) {
	const eta, h, weight = 2.0, 0.5, 3.0
	for _, kh := range []float64{1e-2, 1e-4, 1e-6} {
		k := kh / h
		rate, err := exact.Relaxation{KX: k, Weight: weight, Bottom: exact.NoSlip,
			Layers: []exact.Layer{{Thickness: h, Viscosity: eta}}}.Rate()
		require.NoError(t, err)
		assert.InEpsilon(t, weight*k*k*h*h*h/(3*eta), rate, 2*kh*kh+1e-13) // Reynolds 1886, from memory
		rate, err = exact.Relaxation{KX: k, Weight: weight, Layers: []exact.Layer{{Thickness: h, Viscosity: eta}}}.Rate()
		require.NoError(t, err)
		assert.InEpsilon(t, weight*h/(4*eta), rate, 2*kh*kh+1e-13) // stretching of a sheet, Trouton's 4η
	}
}

func TestInclusionLimits(t *testing.T) {
	box := exact.Box{Left: -2, Right: 2, Bottom: -2, Top: 2}
	c := exact.Case{Box: box, Circle: 1}
	same := solve(t, exact.Inclusion{Radius: 1, Inside: 2, Outside: 2, Stretch: 0.5, Shear: 3})
	rigid := solve(t, exact.Inclusion{Radius: 1, Inside: 1e15, Outside: 1, Stretch: 1, Shear: 2})
	empty := solve(t, exact.Inclusion{Radius: 1, Inside: 1e-15, Outside: 1, Stretch: 1})
	for _, p := range points(c, 50) {
		x, z := p[0], p[1]
		f := same.At(x, z)
		assert.InDelta(t, 0.5*x+3*z, f.VX, 1e-14)
		assert.InDelta(t, -0.5*z, f.VZ, 1e-14)
		assert.InDelta(t, 0, f.P, 1e-15)
		f = rigid.At(x, z)
		if math.Hypot(x, z) < 1 { // turns as a body, at half the shear rate
			assert.InDelta(t, z, f.VX, 1e-14)
			assert.InDelta(t, -x, f.VZ, 1e-14)
		}
		f = empty.At(x, z)
		if math.Hypot(x, z) < 1 { // stretches at twice the rate
			assert.InDelta(t, 2*x, f.VX, 1e-14)
			assert.InDelta(t, -2*z, f.VZ, 1e-14)
			assert.InDelta(t, 0, f.Stress.XX, 1e-14)
		}
	}
	far := rigid.At(3e5, 4e5)
	assert.InEpsilon(t, 3e5+2*4e5, far.VX, 1e-10)
	assert.InEpsilon(t, -4e5, far.VZ, 1e-10)
}

// Simple shear is pure shear turned by 45° plus rotation.
func TestSimpleShearIsPureShearTurned(t *testing.T) {
	pure := solve(t, exact.Inclusion{Radius: 1, Inside: 50, Outside: 1, Stretch: 1})
	simple := solve(t, exact.Inclusion{Radius: 1, Inside: 50, Outside: 1, Shear: 2})
	r := math.Sqrt2 / 2
	for _, p := range points(exact.Case{Box: exact.Box{Left: -2, Right: 2, Bottom: -2, Top: 2}, Circle: 1}, 50) {
		x, z := p[0], p[1]
		f, g := pure.At(r*(x+z), r*(z-x)), simple.At(x, z)
		assert.InDelta(t, f.P, g.P, 1e-13)
		assert.InDelta(t, r*(f.VX-f.VZ)+z, g.VX, 1e-13)
		assert.InDelta(t, r*(f.VX+f.VZ)-x, g.VZ, 1e-13)
	}
}

func TestClassicalChannels(t *testing.T) {
	couette := solve(t, exact.Channel{Height: 2, AtBottom: 3, AtTop: 3, VBottom: 1, VTop: 5})
	poiseuille := solve(t, exact.Channel{Height: 2, AtBottom: 3, AtTop: 3, PressureGradient: -6})
	slope := solve(t, exact.Channel{Height: 2, AtBottom: 3, AtTop: 3, Force: 6})
	film := solve(t, exact.Channel{Height: 1, AtBottom: 3, AtTop: 3, Force: 6, FreeTop: true})
	balanced := solve(t, exact.Channel{Height: 2, AtBottom: 3, AtTop: 30, VBottom: 1, VTop: 1, Force: 6, PressureGradient: 6})
	for _, z := range []float64{0, 0.3, 1, 1.7, 2} {
		assert.InDelta(t, 1+2*z, couette.At(0.5, z).VX, 1e-14)
		assert.InDelta(t, 6, couette.At(0.5, z).Stress.XZ, 1e-13)
		assert.InDelta(t, z*(2-z), poiseuille.At(0.5, z).VX, 1e-14)
		assert.InDelta(t, -3, poiseuille.At(0.5, z).P, 1e-15)
		assert.InDelta(t, z*(2-z), slope.At(0.5, z).VX, 1e-14)
		assert.Zero(t, slope.At(0.5, z).P)
		assert.InDelta(t, 1, balanced.At(0.5, z).VX, 1e-15)
		if z <= 1 {
			assert.InDelta(t, z*(2-z), film.At(0, z).VX, 1e-14)
		}
	}
	assert.InDelta(t, 0, film.At(0, 1).Stress.XZ, 1e-15)
}

// Exponential viscosity: the same flow seen upside down, at any contrast and
// across the switch between series and closed form.
func TestChannelUpsideDown(t *testing.T) {
	for _, contrast := range []float64{1 + 1e-12, 1.5, 2.6, math.E, 2.8, 1e3, 1e8} {
		up := solve(t, exact.Channel{Height: 1, AtBottom: 1, AtTop: contrast, VBottom: 1, VTop: -2, Force: 3})
		down := solve(t, exact.Channel{Height: 1, AtBottom: contrast, AtTop: 1, VBottom: -2, VTop: 1, Force: 3})
		for _, z := range []float64{0, 0.1, 0.5, 0.8, 1} {
			f, g := up.At(0, z), down.At(0, 1-z)
			assert.InDelta(t, f.VX, g.VX, 1e-13, "contrast %v", contrast)
			assert.InDelta(t, f.Stress.XZ, -g.Stress.XZ, 1e-12*(1+math.Abs(f.Stress.XZ)), "contrast %v", contrast)
		}
		assert.InDelta(t, -2, up.At(0, 1).VX, 1e-13)
		assert.InDelta(t, 1, up.At(0, 0).VX, 1e-13)
	}
}

func TestRelaxationRates(t *testing.T) {
	const eta, weight = 3.0, 7.0
	for _, k := range []float64{0.1, 1, 20} {
		rate, err := exact.Relaxation{KX: k, Weight: weight, Layers: []exact.Layer{{Thickness: math.Inf(1), Viscosity: eta}}}.Rate()
		require.NoError(t, err)
		assert.InEpsilon(t, weight/(2*eta*k), rate, 1e-14)
		for _, h := range []float64{0.2, 1, 3} {
			y := k * h
			if y > 100 || y < 0.05 {
				continue
			}
			sinh, cosh := math.Sinh(y), math.Cosh(y)
			layer := []exact.Layer{{Thickness: h, Viscosity: eta}}
			stick, err := exact.Relaxation{KX: k, Weight: weight, Layers: layer, Bottom: exact.NoSlip}.Rate()
			require.NoError(t, err)
			assert.InEpsilon(t, weight/(2*eta*k)*(sinh*cosh-y)/(cosh*cosh+y*y), stick, 1e-11)
			slip, err := exact.Relaxation{KX: k, Weight: weight, Layers: layer}.Rate()
			require.NoError(t, err)
			assert.InEpsilon(t, weight/(2*eta*k)*sinh*sinh/(sinh*cosh+y), slip, 1e-13)
		}
	}
}

// The surface of a relaxing layer carries the weight of its topography and no
// shear; the surface sinks where it is high.
func TestRelaxationSurface(t *testing.T) {
	p := exact.Relaxation{KX: 2, Weight: 5, Amplitude: 0.01, Bottom: exact.NoSlip,
		Layers: []exact.Layer{{Thickness: 0.6, Viscosity: 1}, {Thickness: 0.4, Viscosity: 1000}}}
	s := solve(t, p)
	rate, err := p.Rate()
	require.NoError(t, err)
	for _, x := range []float64{0, 0.3, 1, 2} {
		f := s.At(x, 1)
		h := 0.01 * math.Cos(2*x)
		assert.InDelta(t, -5*h, f.Stress.ZZ, 1e-14)
		assert.InDelta(t, 0, f.Stress.XZ, 1e-14)
		assert.InDelta(t, -rate*h, f.VZ, 1e-14)
	}
}

func TestRayleighTaylorOfHalfSpaces(t *testing.T) {
	for _, k := range []float64{0.01, 1, 50} {
		rate, err := exact.RayleighTaylor{KX: k, Weight: 3,
			Lower: exact.Layer{Thickness: math.Inf(1), Viscosity: 4}, Upper: exact.Layer{Thickness: math.Inf(1), Viscosity: 0.5}}.Rate()
		require.NoError(t, err)
		assert.InEpsilon(t, 3/(2*4.5*k), rate, 1e-14) // Chandrasekhar (1961, ch. X), from memory
	}
}

// By symmetry the interface of two like layers between rigid walls moves up and
// down without stretching, which makes the rate a formula of one line.
func TestRayleighTaylorOfLikeLayers(t *testing.T) {
	const weight, eta, b = 3.0, 2.0, 0.5
	layer := exact.Layer{Thickness: b, Viscosity: eta}
	for _, k := range []float64{0.5, 3, 10} {
		rate, err := exact.RayleighTaylor{KX: k, Weight: weight, Bottom: exact.NoSlip, Top: exact.NoSlip, Lower: layer, Upper: layer}.Rate()
		require.NoError(t, err)
		y := k * b
		sinh, cosh := math.Sinh(y), math.Cosh(y)
		assert.InEpsilon(t, weight/(4*eta*k)*(sinh*sinh-y*y)/(sinh*cosh+y), rate, 1e-12)
	}
}

// van Keken et al. (1997, isoviscous case; from memory) start with a wave of a
// tenth of the thickness of the lower layer, and codes find growth rates
// that scatter about 0.011.
func TestRayleighTaylorPublished(t *testing.T) {
	rate, err := exact.RayleighTaylor{KX: math.Pi / 0.9142, Weight: 1, Bottom: exact.NoSlip, Top: exact.NoSlip,
		Lower: exact.Layer{Thickness: 0.2, Viscosity: 1}, Upper: exact.Layer{Thickness: 0.8, Viscosity: 1}}.Rate()
	require.NoError(t, err)
	assert.InEpsilon(t, 0.011, rate, 0.05)
}
