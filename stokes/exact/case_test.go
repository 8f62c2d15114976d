package exact_test

import (
	"math"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var unit = exact.Box{Right: 1, Top: 1}

// twelve are the layers of testdata/layers.csv.
func twelve(kx float64) exact.Layers {
	layers := make([]exact.Layer, 12)
	for i := range layers {
		layers[i] = exact.Layer{
			Thickness: float64(5+(7*i)%5) / 64,
			Viscosity: math.Ldexp(1, 3*((5*i)%7)-9),
			Contrast:  1,
			Force: exact.Profile{
				Mean: float64((3*i)%5 - 2), Sine: 0.5, Cosine: float64(i % 2), Wavenumber: 3,
			},
			Sheet: float64((2*i)%3 - 1),
		}
		if i%3 == 0 {
			layers[i].Contrast = math.Ldexp(1, 2*(i%5)-4)
		}
	}
	return exact.Layers{KX: kx, Layers: layers, Bottom: exact.NoSlip}
}

// moreCases are solutions with other parameters than those of All. They have a
// box to look at but no walls.
func moreCases(t *testing.T) []exact.Case {
	inf := math.Inf(1)
	list := []struct {
		name    string
		problem exact.Problem
		c       exact.Case
	}{
		{"twelve layers", twelve(2), exact.Case{Box: exact.Box{Right: 3, Top: 1.28125}, ZLines: interfaces(twelve(2))}},
		{"long layers", twelve(0.01), exact.Case{Box: exact.Box{Right: 1, Top: 1.28125}, ZLines: interfaces(twelve(2))}},
		{"short waves", exact.Layers{KX: 300, Layers: []exact.Layer{
			{Thickness: 0.5, Viscosity: 1, Force: exact.Profile{Sine: 1, Wavenumber: 300}},
			{Thickness: 0.5, Viscosity: 5, Contrast: 0.1, Force: exact.Profile{Mean: 1}}}},
			exact.Case{Box: exact.Box{Right: 0.02, Bottom: 0.49, Top: 0.51}, ZLines: []float64{0.5}}},
		{"thick layer of steep viscosity", exact.Layers{KX: 3, Layers: []exact.Layer{
			{Thickness: 6, Viscosity: 1, Contrast: 1e-12, Force: exact.Profile{Cosine: 1, Wavenumber: 1}}}},
			exact.Case{Box: exact.Box{Right: 1, Top: 6}}},
		{"layers between half-spaces", exact.Layers{KX: 1, Layers: []exact.Layer{
			{Thickness: inf, Viscosity: 1, Force: exact.Profile{Mean: 1}},
			{Thickness: 1, Viscosity: 0.1, Contrast: 20, Sheet: 2, Force: exact.Profile{Sine: 1, Wavenumber: 40}},
			{Thickness: inf, Viscosity: 3, Contrast: 1, Force: exact.Profile{Cosine: 1, Wavenumber: 2}}}},
			exact.Case{Box: exact.Box{Right: 3, Bottom: -1, Top: 2}, ZLines: []float64{0, 1}}},
		{"columns between half-spaces", exact.Columns{KZ: 2, Columns: []exact.Column{
			{Width: inf, Viscosity: 1},
			{Width: 1, Viscosity: 10, Contrast: 0.1, Force: exact.Profile{Mean: 1, Sine: 1, Wavenumber: 3}},
			{Width: inf, Viscosity: 100}}},
			exact.Case{Box: exact.Box{Left: -1, Right: 2, Top: 3}, XLines: []float64{0, 1}}},
		{"column jump, long force", exact.ColumnJump{Width: 2, Jump: 0.7, Left: 1, Right: 20, KX: 0.1, KZ: 4, Force: 2},
			exact.Case{Box: exact.Box{Right: 2, Top: 1}, XLines: []float64{0.7}}},
		{"inclusion in mixed shear", exact.Inclusion{Radius: 0.5, Inside: 7, Outside: 2, Stretch: -1, Shear: 3},
			exact.Case{Box: exact.Box{Left: -1, Right: 1, Bottom: -1, Top: 1}, Circle: 0.5}},
		{"channel, all at once", exact.Channel{Height: 2, AtBottom: 3, AtTop: 1, VBottom: 1, VTop: -1, PressureGradient: 2, Force: 1},
			exact.Case{Box: exact.Box{Right: 1, Top: 2}}},
		{"channel, nearly uniform", exact.Channel{Height: 1, AtBottom: 1, AtTop: 1 + 1e-9, VTop: 1, Force: 1}, exact.Case{Box: unit}},
		{"corner, wide", exact.Corner{Viscosity: 2, From: exact.Plate{Angle: -2, VX: 1, VZ: 0.5}, To: exact.Plate{Angle: 3, VX: 0.3, VZ: -1}},
			exact.Case{Box: exact.Box{Left: 0.5, Right: 1.5, Bottom: -0.5, Top: 0.5}}},
		{"corner, slit", exact.Corner{Viscosity: 1, From: exact.Plate{VX: 1}, To: exact.Plate{Angle: 2 * math.Pi, VX: -1}},
			exact.Case{Box: exact.Box{Left: -2, Right: -1, Bottom: -0.5, Top: 0.5}}},
		{"relaxation, layers on a half-space", exact.Relaxation{KX: 1, Weight: 3, Amplitude: 0.1, Layers: []exact.Layer{
			{Thickness: inf, Viscosity: 10}, {Thickness: 0.3, Viscosity: 0.01}, {Thickness: 0.2, Viscosity: 1, Contrast: 100}}},
			exact.Case{Box: exact.Box{Right: 3, Bottom: -1, Top: 0.5}, ZLines: []float64{0, 0.3}}},
		{"rayleigh-taylor, half-spaces", exact.RayleighTaylor{KX: 2, Weight: 1, Amplitude: 0.1,
			Lower: exact.Layer{Thickness: inf, Viscosity: 3}, Upper: exact.Layer{Thickness: inf, Viscosity: 1}},
			exact.Case{Box: exact.Box{Right: 2, Bottom: -1, Top: 1}, ZLines: []float64{0}}},
	}
	cases := make([]exact.Case, 0, len(list))
	for _, entry := range list {
		s, err := entry.problem.Solve()
		require.NoError(t, err, entry.name)
		entry.c.Name, entry.c.Solution = entry.name, s
		cases = append(cases, entry.c)
	}
	return cases
}

func interfaces(p exact.Layers) []float64 {
	var list []float64
	z := 0.0
	for _, l := range p.Layers[:len(p.Layers)-1] {
		z += l.Thickness
		list = append(list, z)
	}
	return list
}

func TestAllCasesAreComplete(t *testing.T) {
	seen := map[string]bool{}
	for _, c := range exact.All() {
		assert.NotEmpty(t, c.Name)
		assert.NotEmpty(t, c.Source, c.Name)
		assert.False(t, seen[c.Name], "two cases are called %s", c.Name)
		seen[c.Name] = true
		assert.Positive(t, c.Box.Width(), c.Name)
		assert.Positive(t, c.Box.Height(), c.Name)
		assert.Positive(t, c.Expect.Velocity, c.Name)
		for _, x := range c.XLines {
			assert.True(t, c.Box.Left < x && x < c.Box.Right, c.Name)
		}
		for _, z := range c.ZLines {
			assert.True(t, c.Box.Bottom < z && z < c.Box.Top, c.Name)
		}
	}
	assert.GreaterOrEqual(t, len(seen), 19)
}

func TestAllGivesAwayCopies(t *testing.T) {
	for _, c := range exact.All() {
		for i := range c.XLines {
			c.XLines[i] = -1
		}
		for i := range c.Sheets {
			c.Sheets[i].Force = -1
		}
	}
	for _, c := range exact.All() {
		assert.NotContains(t, c.XLines, -1.0)
		for _, s := range c.Sheets {
			assert.Equal(t, 1.0, s.Force)
		}
	}
}

// Viscosity jumps on the lines and the circle of a case, and nowhere else.
func TestViscosityJumpsOnTheLinesOnly(t *testing.T) {
	for _, c := range exact.All() {
		for _, p := range points(c, 100) {
			x, z := p[0], p[1]
			h := 1e-9 * clearance(c, x, z)
			assert.InEpsilon(t, c.Viscosity(x, z), c.Viscosity(x+h, z-h), 1e-6, "%s at %v", c.Name, p)
		}
		mid := 0.5 * (c.Box.Bottom + c.Box.Top)
		for _, x := range c.XLines {
			assertJump(t, c.Viscosity(math.Nextafter(x, -9), mid), c.Viscosity(x, mid), c.Name)
		}
		if c.Circle > 0 {
			assertJump(t, c.Viscosity(math.Nextafter(c.Circle, 0), 0), c.Viscosity(c.Circle, 0), c.Name)
		}
	}
}

func assertJump(t *testing.T, a, b float64, name string) {
	t.Helper()
	assert.Greater(t, max(a/b, b/a), 1.001, name)
}

// Velocity and the stress on an interface are the same on both sides, but for
// the load of a sheet.
func TestVelocityAndTractionCrossInterfaces(t *testing.T) {
	const tolerance = 1e-12
	for _, c := range append(exact.All(), moreCases(t)...) {
		if c.Name == "twelve layers" || c.Name == "long layers" || c.Name == "layers between half-spaces" || c.Name == "rayleigh-taylor, half-spaces" {
			continue // have sheets that the case does not list
		}
		t.Run(c.Name, func(t *testing.T) {
			speed, stress := scales(c)
			same := func(what string, a, b, scale float64) {
				t.Helper()
				if !(math.Abs(a-b) <= tolerance*scale) {
					t.Errorf("%s jumps from %.15g to %.15g", what, a, b)
				}
			}
			for i := range 11 {
				share := 0.03 + 0.09*float64(i)
				for _, x := range c.XLines {
					z := c.Box.Bottom + share*c.Box.Height()
					a, b := c.At(math.Nextafter(x, -99), z), c.At(x, z)
					same("vx", a.VX, b.VX, speed)
					same("vz", a.VZ, b.VZ, speed)
					same("σxx", a.Stress.XX, b.Stress.XX, stress)
					same("σxz", a.Stress.XZ, b.Stress.XZ, stress)
				}
				for _, z := range c.ZLines {
					x := c.Box.Left + share*c.Box.Width()
					a, b := c.At(x, math.Nextafter(z, -99)), c.At(x, z)
					load := 0.0
					for _, s := range c.Sheets {
						if s.Z == z {
							load += s.At(x)
						}
					}
					same("vx", a.VX, b.VX, speed)
					same("vz", a.VZ, b.VZ, speed)
					same("σxz", a.Stress.XZ, b.Stress.XZ, stress)
					same("σzz", a.Stress.ZZ, b.Stress.ZZ+load, stress)
				}
				if c.Circle > 0 {
					sin, cos := math.Sincos(2 * math.Pi * share)
					in, out := c.Circle*(1-1e-15), c.Circle*(1+1e-15)
					a, b := c.At(in*cos, in*sin), c.At(out*cos, out*sin)
					same("vx", a.VX, b.VX, speed)
					same("vz", a.VZ, b.VZ, speed)
					same("traction along x", a.Stress.XX*cos+a.Stress.XZ*sin, b.Stress.XX*cos+b.Stress.XZ*sin, stress)
					same("traction along z", a.Stress.XZ*cos+a.Stress.ZZ*sin, b.Stress.XZ*cos+b.Stress.ZZ*sin, stress)
				}
			}
		})
	}
}

// scales returns the largest speed and stress at some points of the box.
func scales(c exact.Case) (speed, stress float64) {
	for _, p := range points(c, 100) {
		f := c.At(p[0], p[1])
		speed = max(speed, math.Hypot(f.VX, f.VZ))
		stress = max(stress, math.Abs(f.Stress.XX), math.Abs(f.Stress.ZZ), math.Abs(f.Stress.XZ))
	}
	return speed, stress
}

// The walls of each case do what their kind says.
func TestWallsOfAllCases(t *testing.T) {
	const tolerance = 1e-13
	for _, c := range exact.All() {
		t.Run(c.Name, func(t *testing.T) {
			speed, stress := scales(c)
			zero := func(what string, v, scale float64) {
				t.Helper()
				if !(math.Abs(v) <= tolerance*scale) {
					t.Errorf("%s is %.3g, want 0 against %.3g", what, v, scale)
				}
			}
			wall := func(kind exact.Wall, f exact.Fields, across, along float64) {
				t.Helper()
				switch kind {
				case exact.FreeSlip:
					zero("velocity across a free-slip wall", across, speed)
					zero("shear stress on a free-slip wall", f.Stress.XZ, stress)
				case exact.NoSlip:
					zero("velocity across a no-slip wall", across, speed)
					zero("velocity along a no-slip wall", along, speed)
				}
			}
			for i := range 12 {
				x := c.Box.Left + c.Box.Width()*float64(i)/11
				z := c.Box.Bottom + c.Box.Height()*float64(i)/11
				left, right := c.At(c.Box.Left, z), c.At(c.Box.Right, z)
				bottom, top := c.At(x, c.Box.Bottom), c.At(x, c.Box.Top)
				wall(c.Walls.Left, left, left.VX, left.VZ)
				wall(c.Walls.Right, right, right.VX, right.VZ)
				wall(c.Walls.Bottom, bottom, bottom.VZ, bottom.VX)
				wall(c.Walls.Top, top, top.VZ, top.VX)
				require.Equal(t, c.Walls.Left == exact.Periodic, c.Walls.Right == exact.Periodic)
				if c.Walls.Left == exact.Periodic {
					zero("difference of vx between periodic sides", left.VX-right.VX, speed)
					zero("difference of vz between periodic sides", left.VZ-right.VZ, speed)
					zero("difference of σxx between periodic sides", left.Stress.XX-right.Stress.XX, stress)
					zero("difference of σxz between periodic sides", left.Stress.XZ-right.Stress.XZ, stress)
				}
			}
		})
	}
}

func TestWallNames(t *testing.T) {
	assert.Equal(t, "free slip", exact.FreeSlip.String())
	assert.Equal(t, "no slip", exact.NoSlip.String())
	assert.Equal(t, "driven", exact.Driven.String())
	assert.Equal(t, "periodic", exact.Periodic.String())
	assert.Equal(t, "Wall(4)", exact.Wall(4).String())
	assert.Equal(t, "Wall(-1)", exact.Wall(-1).String())
}
