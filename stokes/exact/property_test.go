package exact_test

import (
	"math"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Where walls do no work the dissipation equals the work of the forces.
func TestDissipationIsTheWorkOfTheForces(t *testing.T) {
	closed := 0
	for _, c := range exact.All() {
		w := c.Walls
		if w.Left == exact.Driven || w.Right == exact.Driven || w.Bottom == exact.Driven || w.Top == exact.Driven {
			continue
		}
		closed++
		heat := integral(c, func(x, z float64) float64 { return c.At(x, z).Dissipation() })
		work := integral(c, func(x, z float64) float64 {
			f := c.At(x, z)
			bx, bz := c.Force(x, z)
			return bx*f.VX + bz*f.VZ
		})
		for _, s := range c.Sheets {
			line := exact.Case{Box: exact.Box{Left: c.Box.Left, Right: c.Box.Right, Top: 1}}
			work += integral(line, func(x, _ float64) float64 { return s.At(x) * c.At(x, s.Z).VZ })
		}
		assert.Positive(t, heat, c.Name)
		assert.InEpsilon(t, heat, work, 1e-11, c.Name)
	}
	assert.GreaterOrEqual(t, closed, 10)
}

// The pressure has zero mean over the box where a problem says so.
func TestMeanPressures(t *testing.T) {
	for _, name := range []string{"box mode", "column jump", "exponential viscosity", "layers", "rayleigh-taylor wave",
		"manufactured, free slip", "manufactured, no slip", "manufactured, periodic"} {
		c := find(t, name)
		mean := integral(c, func(x, z float64) float64 { return c.At(x, z).P })
		rms := rootMeanSquare(c, func(f exact.Fields) float64 { return f.P * f.P })
		assert.InDelta(t, 0, mean, 1e-13*rms*c.Box.Width()*c.Box.Height(), name)
	}
}

// Columns in the opposite order are the mirror image.
func TestColumnsMirrored(t *testing.T) {
	p := exact.ColumnJump{Width: 1, Jump: 0.3, Left: 1, Right: 50, KX: math.Pi, KZ: 2, Force: 1}
	q := exact.ColumnJump{Width: 1, Jump: 0.7, Left: 50, Right: 1, KX: math.Pi, KZ: 2, Force: -1} // cos π(1−x) = −cos πx
	a, b := solve(t, p), solve(t, q)
	speed, _ := scales(exact.Case{Solution: a, Box: unit})
	for _, point := range points(exact.Case{Box: unit}, 50) {
		x, z := point[0], point[1]
		f, g := a.At(x, z), b.At(1-x, z)
		assert.InDelta(t, f.VX, -g.VX, 1e-14*speed)
		assert.InDelta(t, f.VZ, g.VZ, 1e-14*speed)
		assert.InDelta(t, f.P, g.P, 1e-14)
		assert.InDelta(t, f.Stress.XZ, -g.Stress.XZ, 1e-14)
	}
}

// Layers upside down, with forces turned around, are the flow upside down.
func TestLayersUpsideDown(t *testing.T) {
	up := exact.Layers{KX: 3, Bottom: exact.NoSlip, Layers: []exact.Layer{
		{Thickness: 0.25, Viscosity: 2, Contrast: 8, Force: exact.Profile{Mean: 1}, Sheet: 0.5},
		{Thickness: 0.75, Viscosity: 1, Force: exact.Profile{Sine: 2, Cosine: 1, Wavenumber: math.Pi}},
	}}
	down := exact.Layers{KX: 3, Top: exact.NoSlip, Layers: []exact.Layer{
		{Thickness: 0.75, Viscosity: 1, Force: exact.Profile{Sine: -2, Cosine: 1, Wavenumber: math.Pi}, Sheet: -0.5}, // π − πz
		{Thickness: 0.25, Viscosity: 16, Contrast: 0.125, Force: exact.Profile{Mean: -1}},
	}}
	a, b := solve(t, up), solve(t, down)
	for _, point := range points(exact.Case{Box: unit, ZLines: []float64{0.25}}, 50) {
		x, z := point[0], point[1]
		f, g := a.At(x, z), b.At(x, 1-z)
		assert.InDelta(t, f.VX, g.VX, 1e-15)
		assert.InDelta(t, f.VZ, -g.VZ, 1e-15)
		assert.InDelta(t, f.Stress.ZZ, g.Stress.ZZ, 1e-13)
	}
}

// A load at one height moves the fluid at another as the same load there moves
// the fluid here (Lorentz 1896, from memory).
func TestLayersAreReciprocal(t *testing.T) {
	stack := func(loaded int) exact.Solution {
		p := exact.Layers{KX: 4, Bottom: exact.NoSlip, Layers: []exact.Layer{
			{Thickness: 0.2, Viscosity: 1}, {Thickness: 0.3, Viscosity: 1e3, Contrast: 0.01},
			{Thickness: 0.4, Viscosity: 0.1}, {Thickness: 0.1, Viscosity: 1e4},
		}}
		p.Layers[loaded].Sheet = 1
		return solve(t, p)
	}
	faces := []float64{0.2, 0.5, 0.9}
	for i, zi := range faces {
		for j, zj := range faces {
			assert.InEpsilon(t, stack(i).At(0, zj).VZ, stack(j).At(0, zi).VZ, 1e-11)
		}
	}
}

// Other units change the numbers by their factors, to the bit where these are
// powers of two.
func TestUnitsDoNotMatter(t *testing.T) {
	const length, viscosity, force = 1 << 40, 1.0 / (1 << 20), 1 << 30
	const stress, velocity = force * length, force * length * length / viscosity
	base, scaled := twelve(2), twelve(2.0/length)
	for i := range scaled.Layers {
		l := &scaled.Layers[i]
		l.Thickness *= length
		l.Viscosity *= viscosity
		l.Force.Mean *= force
		l.Force.Sine *= force
		l.Force.Cosine *= force
		l.Force.Wavenumber /= length
		l.Sheet *= stress
	}
	a, b := solve(t, base), solve(t, scaled)
	for _, p := range points(exact.Case{Box: exact.Box{Right: 3, Top: 1.28125}}, 30) {
		f, g := a.At(p[0], p[1]), b.At(length*p[0], length*p[1])
		require.Equal(t, velocity*f.VX, g.VX)
		require.Equal(t, velocity*f.VZ, g.VZ)
		require.Equal(t, stress*f.P, g.P)
		require.Equal(t, stress*f.Stress.XZ, g.Stress.XZ)
		require.Equal(t, f.StrainRate.XX*(velocity/length), g.StrainRate.XX)
	}
}

// In SI numbers of a mantle nothing overflows.
func TestNumbersOfAMantle(t *testing.T) {
	s := solve(t, exact.ColumnJump{Width: 3e6, Jump: 1e6, Left: 1e25, Right: 1e19, KX: math.Pi / 3e6, KZ: math.Pi / 3e6, Force: 300})
	d := solve(t, exact.ColumnJump{Width: 3, Jump: 1, Left: 1e6, Right: 1, KX: math.Pi / 3, KZ: math.Pi / 3, Force: 1})
	f, g := s.At(2e6, 1.4e6), d.At(2, 1.4)
	assert.InEpsilon(t, g.VZ*300*1e12/1e19, f.VZ, 1e-12)
	assert.InEpsilon(t, g.P*300*1e6, f.P, 1e-12)
}

// The flow is linear in what drives it.
func TestFlowsSuperpose(t *testing.T) {
	a := solve(t, exact.Inclusion{Radius: 1, Inside: 5, Outside: 1, Stretch: 1})
	b := solve(t, exact.Inclusion{Radius: 1, Inside: 5, Outside: 1, Shear: 1})
	c := solve(t, exact.Inclusion{Radius: 1, Inside: 5, Outside: 1, Stretch: 2, Shear: -3})
	f, g, h := a.At(0.8, 1.1), b.At(0.8, 1.1), c.At(0.8, 1.1)
	assert.InDelta(t, 2*f.VX-3*g.VX, h.VX, 1e-14)
	assert.InDelta(t, 2*f.P-3*g.P, h.P, 1e-14)

	m := solve(t, exact.Manufactured{Walls: exact.NoSlip, Width: 1, Height: 1, Viscosity: 2, Contrast: 10, Velocity: 1})
	n := solve(t, exact.Manufactured{Walls: exact.NoSlip, Width: 1, Height: 1, Viscosity: 2, Contrast: 10, Velocity: -4})
	bx, bz := m.Force(0.3, 0.6)
	cx, cz := n.Force(0.3, 0.6)
	assert.InDelta(t, -4*bx, cx, 1e-11)
	assert.InDelta(t, -4*bz, cz, 1e-11)
}

// The viscosity of a manufactured flow stays within its bounds and comes near
// to both.
func TestManufacturedContrast(t *testing.T) {
	for _, walls := range []exact.Wall{exact.FreeSlip, exact.NoSlip, exact.Periodic} {
		s := solve(t, exact.Manufactured{Walls: walls, Width: 2, Height: 1, Viscosity: 3, Contrast: 100, Velocity: 1})
		low, high := math.Inf(1), 0.0
		for i := range 101 {
			for k := range 101 {
				eta := s.Viscosity(0.02*float64(i), 0.01*float64(k))
				low, high = min(low, eta), max(high, eta)
			}
		}
		assert.GreaterOrEqual(t, low, 3*(1-1e-14), walls)
		assert.LessOrEqual(t, high, 300*(1+1e-14), walls)
		assert.Greater(t, high/low, 20.0, walls)
	}
}

// Manufactured flows are those that their documentation describes.
func TestManufacturedFormulas(t *testing.T) {
	const width, height, eta, contrast, velocity = 2.0, 0.5, 3.0, 1e3, 0.7
	a, c := math.Pi/width, math.Pi/height
	sin, cos := math.Sin, math.Cos
	for walls, f := range map[exact.Wall]struct{ psi, g func(x, z float64) float64 }{
		exact.FreeSlip: {
			func(x, z float64) float64 { return sin(2*a*x) * sin(c*z) },
			func(x, z float64) float64 { return cos(a*x) * sin(c*z+math.Pi/4) },
		},
		exact.NoSlip: {
			func(x, z float64) float64 { return sin(a*x) * sin(a*x) * sin(c*z) * sin(c*z) },
			func(x, z float64) float64 { return sin(a*x+1) * cos(c*z) },
		},
		exact.Periodic: {
			func(x, z float64) float64 { return sin(2*a*x+0.5) * sin(c*z) * sin(c*z) },
			func(x, z float64) float64 { return cos(2*a*x) * cos(c*z) },
		},
	} {
		s := solve(t, exact.Manufactured{Walls: walls, Width: width, Height: height, Viscosity: eta, Contrast: contrast, Velocity: velocity})
		for _, p := range points(exact.Case{Box: exact.Box{Right: width, Top: height}}, 20) {
			x, z := p[0], p[1]
			got := s.At(x, z)
			factor := velocity * height / math.Pi
			vx := derivative(func(z float64) float64 { return factor * f.psi(x, z) }, z, 0.05)
			vz := -derivative(func(x float64) float64 { return factor * f.psi(x, z) }, x, 0.05)
			assert.InDelta(t, vx, got.VX, 1e-10, walls)
			assert.InDelta(t, vz, got.VZ, 1e-10, walls)
			assert.InEpsilon(t, eta*math.Pow(contrast, 0.5*(1+f.g(x, z))), s.Viscosity(x, z), 1e-12, walls)
			pressure := math.Sqrt(contrast) * eta * velocity / height * sin(2*a*x+1) * sin(c*z+1)
			assert.InDelta(t, pressure, got.P, 1e-11, walls)
		}
	}
}

// The plates of a corner move as they should, from edge to edge.
func TestCornerPlates(t *testing.T) {
	plates := []exact.Corner{
		{Viscosity: 1, From: exact.Plate{Angle: -math.Pi, VX: -1}, To: exact.Plate{Angle: 0, VX: 1}},
		{Viscosity: 7, From: exact.Plate{Angle: 0.3, VX: 0.4, VZ: -0.2}, To: exact.Plate{Angle: 1.5, VX: -3, VZ: 2}},
		{Viscosity: 1, From: exact.Plate{Angle: 2, VZ: 1}, To: exact.Plate{Angle: 5}},
		{Viscosity: 1, From: exact.Plate{Angle: -0.01, VX: 1}, To: exact.Plate{Angle: 0.01, VX: 2}},
	}
	for _, p := range plates {
		s := solve(t, p)
		for _, plate := range []exact.Plate{p.From, p.To} {
			sin, cos := math.Sincos(plate.Angle)
			for _, r := range []float64{1e-6, 1, 1e6} {
				f := s.At(r*cos, r*sin)
				assert.InDelta(t, plate.VX, f.VX, 1e-10)
				assert.InDelta(t, plate.VZ, f.VZ, 1e-10)
			}
		}
	}
	f := solve(t, plates[0]).At(0, 0)
	assert.True(t, math.IsNaN(f.VX) && !(math.Abs(f.P) < math.MaxFloat64), "the apex has no values")
}

// A plate that is drawn along under another, at right angles and at rest: the
// scraper of Batchelor (1967, section 4.8, from memory). The conditions f = 0,
// f′ = U at θ = 0 and f = f′ = 0 at π/2 give, with q = π²/4,
//
//	f = U (q sin θ − θ cos θ − ½π θ sin θ) / (q − 1).
func TestCornerScraper(t *testing.T) {
	const u, eta = 2.0, 3.0
	s := solve(t, exact.Corner{Viscosity: eta, From: exact.Plate{Angle: 0, VX: u}, To: exact.Plate{Angle: math.Pi / 2}})
	q := math.Pi * math.Pi / 4
	mid := s.At(1, 1) // θ = π/4
	f := u * (q*math.Sqrt2/2 - math.Pi/4*math.Sqrt2/2 - math.Pi*math.Pi/8*math.Sqrt2/2) / (q - 1)
	assert.InEpsilon(t, f, (mid.VX-mid.VZ)*math.Sqrt2/2, 1e-13)
	for _, r := range []float64{0.1, 1, 5} {
		f := s.At(r, 0)
		// f + f″ = −πU/(q − 1) and f′ + f‴ = 2U/(q − 1) on the moving plate.
		assert.InEpsilon(t, -math.Pi*u/(q-1)*eta/r, f.Stress.XZ, 1e-13)
		assert.InEpsilon(t, -2*u/(q-1)*eta/r, f.P, 1e-13)
	}
}

// A spreading ridge is symmetric.
func TestSpreadingIsSymmetric(t *testing.T) {
	c := find(t, "spreading plates")
	for _, p := range points(c, 30) {
		f, g := c.At(p[0], p[1]), c.At(-p[0], p[1])
		assert.InDelta(t, f.VX, -g.VX, 1e-14)
		assert.InDelta(t, f.VZ, g.VZ, 1e-14)
		assert.InDelta(t, f.P, g.P, 1e-13)
	}
	assert.InDelta(t, 0, c.At(0, -1).VX, 1e-15)
	assert.Positive(t, c.At(0, -1).VZ, "the mantle rises below the ridge")
	assert.Negative(t, c.At(0, -1).P, "and is sucked up")
}
