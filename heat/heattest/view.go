package heattest

import (
	"math"
	"slices"

	"example.org/overturn/heat/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// A view is a case in a box whose lower left corner is at 0 and from a time 0
// on, perhaps in a mirror, in other units or warmer.
type view struct {
	exact.Case
	flipX, flipZ bool
	units        units
	warmer       float64
}

// units are the factors of numbers in other units.
type units struct{ length, conductivity, capacity, temperature float64 }

var sameUnits = units{1, 1, 1, 1}

// otherUnits are powers of two so that no digit is lost. They take a box of size
// 1 to a mantle in SI.
var otherUnits = units{math.Ldexp(1, 21), math.Ldexp(1, 2), math.Ldexp(1, 22), math.Ldexp(1, 11)}

func (u units) time() float64     { return u.length * u.length * u.capacity / u.conductivity }
func (u units) velocity() float64 { return u.length / u.time() }
func (u units) flux() float64     { return u.conductivity * u.temperature / u.length }

func viewOf(c exact.Case) view { return view{Case: c, units: sameUnits} }

// mirroredX, mirroredZ, in and warmerBy return other views of the case.

func (v view) mirroredX() view {
	v.flipX = !v.flipX
	return v
}

func (v view) mirroredZ() view {
	v.flipZ = !v.flipZ
	return v
}

func (v view) in(u units) view {
	v.units = u
	return v
}

func (v view) warmerBy(temperature float64) view {
	v.warmer = temperature
	return v
}

// grid cuts the box into cells about as wide as the given share of its
// shorter side.
func (v view) grid(width, stretch float64) trial.Grid {
	b := v.Box
	width *= min(b.Width(), b.Height())
	edges := func(start, length float64, lines []float64) []float64 {
		lines = slices.Clone(lines)
		for i := range lines {
			lines[i] -= start
		}
		return trial.Edges(length, lines, width, stretch)
	}
	return trial.Grid{X: edges(b.Left, b.Width(), v.XLines), Z: edges(b.Bottom, b.Height(), v.ZLines)}
}

// point takes a point of the view to one of the case.
func (v view) point(x, z float64) (float64, float64) {
	l := v.units.length
	return place(x/l, v.flipX, v.Box.Left, v.Box.Right, v.XLines), place(z/l, v.flipZ, v.Box.Bottom, v.Box.Top, v.ZLines)
}

// place returns where the coordinate s of the box is in the case. Next to a
// side or a line it returns that itself, so that rounding does not decide on
// which side of a jump a point is, nor whether it is in the domain.
func place(s float64, flip bool, start, end float64, lines []float64) float64 {
	at := start + s
	if flip {
		at = end - s
	}
	near := 1e-12 * (end - start)
	for _, line := range lines {
		if math.Abs(at-line) < near {
			return line
		}
	}
	if math.Abs(at-start) < near {
		return start
	}
	if math.Abs(at-end) < near {
		return end
	}
	return at
}

// time takes a time of the view to one of the case.
func (v view) time(t float64) float64 { return v.Start + t/v.units.time() }

func (v view) duration() float64 { return (v.End - v.Start) * v.units.time() }

func sign(flip bool) float64 {
	if flip {
		return -1
	}
	return 1
}

// state returns the exact temperature and flux.
func (v view) state(x, z, t float64) exact.State {
	xc, zc := v.point(x, z)
	f := v.At(xc, zc, v.time(t))
	q := v.units.flux()
	return exact.State{
		Temperature: v.temperature(f.Temperature),
		FluxX:       sign(v.flipX) * q * f.FluxX,
		FluxZ:       sign(v.flipZ) * q * f.FluxZ,
	}
}

// temperature takes one of the case to that of the view.
func (v view) temperature(t float64) float64 { return v.units.temperature*t + v.warmer }

func (v view) medium(x, z, t float64) exact.Medium {
	xc, zc := v.point(x, z)
	m := v.Medium(xc, zc, v.time(t))
	u := v.units
	m.Conductivity *= u.conductivity
	m.HeatCapacity *= u.capacity
	m.Source *= u.flux() / u.length
	m.VX *= sign(v.flipX) * u.velocity()
	m.VZ *= sign(v.flipZ) * u.velocity()
	return m
}

// side takes a side of the view to one of the case.
func (v view) side(s exact.Side) exact.Side {
	switch {
	case s == exact.Left && v.flipX:
		return exact.Right
	case s == exact.Right && v.flipX:
		return exact.Left
	case s == exact.Bottom && v.flipZ:
		return exact.Top
	case s == exact.Top && v.flipZ:
		return exact.Bottom
	}
	return s
}

// along takes a coordinate along a side to that of the case.
func (v view) along(side exact.Side, s float64) float64 {
	x, z := v.point(s, s)
	if side == exact.Bottom || side == exact.Top {
		return x
	}
	return z
}

// kinds returns the kinds of walls on the sides of the view.
func (v view) kinds() [4]exact.Wall {
	of := [4]exact.Wall{v.Walls.Left, v.Walls.Right, v.Walls.Bottom, v.Walls.Top}
	var kinds [4]exact.Wall
	for side := exact.Left; side <= exact.Top; side++ {
		kinds[side] = of[v.side(side)]
	}
	return kinds
}

// wallValue returns what [Problem] says of WallValue.
func (v view) wallValue(side exact.Side, s, t float64) float64 {
	value := v.WallAt(v.side(side), v.along(side, s), v.time(t))
	switch v.kinds()[side] {
	case exact.Isothermal, exact.Robin:
		return v.temperature(value)
	case exact.Flux:
		return v.units.flux() * value
	}
	return 0
}

// inflow returns the exact flux into the box at a point of a side.
func (v view) inflow(side exact.Side, s, t float64) float64 {
	width, height := v.Box.Width()*v.units.length, v.Box.Height()*v.units.length
	switch side {
	case exact.Left:
		return v.state(0, s, t).FluxX
	case exact.Right:
		return -v.state(width, s, t).FluxX
	case exact.Bottom:
		return v.state(s, 0, t).FluxZ
	}
	return -v.state(s, height, t).FluxZ
}

// problem returns what a solver is asked for. The grid is in the units of the
// view.
func (v view) problem(g trial.Grid, steps int) Problem {
	kinds := v.kinds()
	initial := func(x, z float64) float64 { return v.state(x, z, 0).Temperature }
	if v.Steady() {
		initial = func(_, _ float64) float64 { return 0 }
		steps = 0
	}
	return Problem{
		Name:         v.Name,
		Grid:         g,
		Duration:     v.duration(),
		Steps:        steps,
		Initial:      initial,
		Conductivity: func(x, z float64) float64 { return v.medium(x, z, 0).Conductivity },
		HeatCapacity: func(x, z float64) float64 { return v.medium(x, z, 0).HeatCapacity },
		Velocity: func(x, z float64) (vx, vz float64) {
			m := v.medium(x, z, 0)
			return m.VX, m.VZ
		},
		Source:    func(x, z, t float64) float64 { return v.medium(x, z, t).Source },
		Walls:     exact.Walls{Left: kinds[exact.Left], Right: kinds[exact.Right], Bottom: kinds[exact.Bottom], Top: kinds[exact.Top]},
		WallValue: v.wallValue,
		Transfer:  v.Transfer * v.units.conductivity / v.units.length,
	}
}

// uniform returns the problem whose answer is the temperature 1 everywhere:
// the same body and flow without sources, between walls at that temperature.
// It reports false if nothing would hold a steady temperature.
func uniform(p Problem) (Problem, bool) {
	kinds := [4]exact.Wall{p.Walls.Left, p.Walls.Right, p.Walls.Bottom, p.Walls.Top}
	held := slices.Contains(kinds[:], exact.Isothermal) || slices.Contains(kinds[:], exact.Robin)
	if !p.Steady() {
		p.Initial = func(_, _ float64) float64 { return 1 }
	}
	p.Source = func(_, _, _ float64) float64 { return 0 }
	p.WallValue = func(side exact.Side, _, _ float64) float64 {
		if k := kinds[side]; k == exact.Isothermal || k == exact.Robin {
			return 1
		}
		return 0
	}
	return p, held || !p.Steady()
}
