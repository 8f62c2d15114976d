package exact

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func find(t *testing.T, name string) Case {
	t.Helper()
	for _, c := range All() {
		if c.Name == name {
			return c
		}
	}
	t.Fatalf("no case %q", name)
	return Case{}
}

func TestAllCasesAreComplete(t *testing.T) {
	names := map[string]bool{}
	kinds := map[Wall]int{}
	for _, c := range All() {
		require.NoError(t, c.Validate(), c.Name)
		assert.False(t, names[c.Name], c.Name)
		names[c.Name] = true
		assert.NotEmpty(t, c.Name)
		assert.NotEmpty(t, c.Source, c.Name)
		expect := Orders{2, 2}
		if strings.HasPrefix(c.Name, "gaussian") {
			expect.Flux = 0
		}
		assert.Equal(t, expect, c.Expect, c.Name)
		for _, w := range []Wall{c.Walls.Left, c.Walls.Right, c.Walls.Bottom, c.Walls.Top} {
			kinds[w]++
		}
		middle := c.At((c.Box.Left+c.Box.Right)/2, (c.Box.Bottom+c.Box.Top)/2, c.End)
		assert.False(t, math.IsNaN(middle.Temperature), c.Name)
	}
	for w := Insulating; w <= Periodic; w++ {
		assert.Positive(t, kinds[w], w.String())
	}
}

// What a case says of its walls is what its solution does there: no flux
// through insulating ones, equal sides where they are periodic, and no flow
// through walls whose temperature is not prescribed.
func TestWallsOfAllCases(t *testing.T) {
	for _, c := range All() {
		for side := Left; side <= Top; side++ {
			for _, u := range []float64{0.01, 0.3, 0.5, 0.99} {
				s := c.Box.Bottom + u*c.Box.Height()
				if side == Bottom || side == Top {
					s = c.Box.Left + u*c.Box.Width()
				}
				for _, time := range []float64{c.Start, (c.Start + c.End) / 2, c.End} {
					checkWall(t, c, side, s, time)
				}
			}
		}
	}
}

func checkWall(t *testing.T, c Case, side Side, s, time float64) {
	t.Helper()
	w, x, z, nx, nz := c.side(side, s)
	f, m := c.At(x, z, time), c.Medium(x, z, time)
	flux, speed := nx*f.FluxX+nz*f.FluxZ, nx*m.VX+nz*m.VZ
	scale := m.Conductivity * (1 + math.Abs(f.Temperature))
	value := c.WallAt(side, s, time)
	switch w {
	case Insulating:
		assert.InDelta(t, 0, flux, 1e-14*scale, "%s %v", c.Name, side)
		assert.Zero(t, value)
	case Isothermal:
		assert.Equal(t, f.Temperature, value)
	case Flux:
		assert.InDelta(t, flux, value, 1e-15*scale, "%s %v", c.Name, side)
	case Robin:
		assert.InDelta(t, flux, c.Transfer*(value-f.Temperature), 1e-14*scale, "%s %v", c.Name, side)
	case Periodic:
		assert.Zero(t, value)
		g, n := c.At(c.Box.Left+c.Box.Right-x, z, time), c.Medium(c.Box.Left+c.Box.Right-x, z, time)
		assert.InDelta(t, f.Temperature, g.Temperature, 1e-14)
		assert.InDelta(t, f.FluxX, g.FluxX, 1e-14*scale)
		assert.InDelta(t, m.VX, n.VX, 1e-14*(1+math.Abs(m.VX)))
		assert.InDelta(t, m.Conductivity, n.Conductivity, 1e-14*scale)
		assert.InDelta(t, m.HeatCapacity, n.HeatCapacity, 1e-14*m.HeatCapacity)
	}
	if w == Flux || w == Robin || w == Insulating { // no fluid passes
		assert.InDelta(t, 0, speed, 1e-14*(1+math.Abs(m.VX)+math.Abs(m.VZ)), "%s %v", c.Name, side)
	}
}

// The numbers of walls whose problems name them.
func TestWallAt(t *testing.T) {
	assert.InDelta(t, 1, find(t, "half-space with flux").WallAt(Bottom, 0.2, 0.1), 1e-15)
	assert.InDelta(t, 1, find(t, "half-space in surroundings").WallAt(Bottom, 0.2, 0.1), 1e-15)
	assert.InDelta(t, 0, find(t, "slab in surroundings").WallAt(Top, 0.2, 0.3), 1e-15)
	assert.InDelta(t, 1, find(t, "throughflow").WallAt(Top, 0.2, 0), 0)
	// At its top, one below which a unit source has worked, a geotherm conducts
	// 2 − 1 down: into the box.
	assert.InDelta(t, 1, find(t, "geotherm").WallAt(Top, 0.2, 0), 1e-15)
	c := find(t, "manufactured, flux")
	f := c.At(0, 0.4, 0.1)
	assert.Equal(t, f.FluxX, c.WallAt(Left, 0.4, 0.1))
	c.Walls.Right = Flux
	assert.Equal(t, -c.At(1.5, 0.4, 0.1).FluxX, c.WallAt(Right, 0.4, 0.1))
	assert.True(t, math.IsNaN(c.WallAt(Side(9), 0, 0)))
}

// The conditions of the walls of manufactured cases do not change with time,
// although the temperature inside does.
func TestManufacturedWallsKeepStill(t *testing.T) {
	for _, name := range []string{"isothermal", "flux", "insulating", "surroundings", "periodic", "mixed"} {
		c := find(t, "manufactured, "+name)
		for side := Left; side <= Top; side++ {
			for _, s := range []float64{0.1, 0.6, 0.9} {
				assert.InDelta(t, c.WallAt(side, s, 0), c.WallAt(side, s, 7), 1e-14, "%s %v", name, side)
			}
		}
		assert.Greater(t, math.Abs(c.At(0.7, 0.5, 0).Temperature-c.At(0.7, 0.5, 7).Temperature), 0.1)
	}
}

// The coefficients of manufactured cases stay within their contrast and the
// velocity is that of the stream function.
func TestManufacturedCoefficients(t *testing.T) {
	m := Manufactured{Material: Material{2, 3}, Contrast: 9, Velocity: 5, Width: 2}
	low, high := math.Inf(1), 0.0
	for x := 0.0; x <= 2; x += 0.125 {
		for z := 0.0; z <= 1; z += 0.125 {
			at := m.Medium(x, z, 0)
			low, high = min(low, at.Conductivity), max(high, at.Conductivity)
			assert.GreaterOrEqual(t, at.HeatCapacity, 1.0)
			assert.LessOrEqual(t, at.HeatCapacity, 9.0)
			vx := derivative(func(z float64) float64 { return m.Stream(x, z) }, z, 0.1)
			vz := -derivative(func(x float64) float64 { return m.Stream(x, z) }, x, 0.1)
			assert.InDelta(t, vx, at.VX, 1e-10)
			assert.InDelta(t, vz, at.VZ, 1e-10)
		}
	}
	assert.GreaterOrEqual(t, low, 2.0/3)
	assert.LessOrEqual(t, high, 6.0)
	assert.Greater(t, high/low, 7.0)

	c := Cell{Width: 2, Velocity: 5}
	assert.InDelta(t, 5.0/math.Pi*math.Sin(math.Pi*0.35)*math.Sin(math.Pi*0.2), c.Stream(0.7, 0.2), 1e-15)
	assert.InDelta(t, 5, c.Medium(1, 0, 0).VX, 1e-14)
}

func TestWallNames(t *testing.T) {
	assert.Equal(t, "insulating", Insulating.String())
	assert.Equal(t, "isothermal", Isothermal.String())
	assert.Equal(t, "flux", Flux.String())
	assert.Equal(t, "Robin", Robin.String())
	assert.Equal(t, "periodic", Periodic.String())
	assert.Equal(t, "Wall(5)", Wall(5).String())
	assert.Equal(t, "Wall(-1)", Wall(-1).String())
	assert.Equal(t, "left right bottom top", Left.String()+" "+Right.String()+" "+Bottom.String()+" "+Top.String())
	assert.Equal(t, "Side(4)", Side(4).String())
	assert.Equal(t, "Side(-1)", Side(-1).String())
}

func TestCaseSaysWhatIsWrong(t *testing.T) {
	good := find(t, "slab")
	assert.False(t, good.Steady())
	assert.True(t, find(t, "geotherm").Steady())
	for want, change := range map[string]func(*Case){
		`Case.Solution of "slab" is nil`:            func(c *Case) { c.Solution = nil },
		"Slab.Thickness is -1":                      func(c *Case) { c.Solution = Slab{Thickness: -1} },
		"Case.Walls.Left is Wall(7)":                func(c *Case) { c.Walls.Left = 7 },
		"Case.Walls.Right is Wall(-1)":              func(c *Case) { c.Walls.Right = -1 },
		"Case.Walls has bottom periodic":            func(c *Case) { c.Walls.Bottom = Periodic },
		"top periodic, want only sides":             func(c *Case) { c.Walls.Top = Periodic },
		"right insulating, want both periodic":      func(c *Case) { c.Walls.Left = Periodic },
		"Case.Box.Width is 0":                       func(c *Case) { c.Box.Right = 0 },
		"Case.Box.Height is -1":                     func(c *Case) { c.Box.Top = -1 },
		"Case.Start is NaN":                         func(c *Case) { c.Start = math.NaN() },
		"Case.End less Start is -":                  func(c *Case) { c.End = 0 },
		"Case.Transfer is -1":                       func(c *Case) { c.Transfer = -1 },
		"want inside the domain {Left:-Inf":         func(c *Case) { c.Box.Top = 1.5 },
		"Case.Box is {Left:0 Right:1 Bottom:-1":     func(c *Case) { c.Box.Bottom = -1 },
		"Case.Box is {Left:0 Right:1 Bottom:0 Top:": func(c *Case) { c.Start = -1 },
	} {
		c := good
		change(&c)
		assert.ErrorContains(t, c.Validate(), want)
	}
}
