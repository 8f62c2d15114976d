package heattest

import (
	"fmt"
	"math"
	"slices"

	"example.org/overturn/heat/exact"
)

// Defaults of [Settings].
const (
	DefaultStepsPerCell = 2.0
	DefaultSlack        = 0.3
	DefaultTolerance    = 1e-6
	DefaultOvershoot    = 0.05
)

// DefaultCells returns the default of Settings.Cells.
func DefaultCells() []int { return []int{12, 24, 48} }

// Settings says what is tested and how strictly. A nil *Settings, or a zero
// field, means the default.
type Settings struct {
	// Cases are the exact solutions. Default exact.All().
	Cases []exact.Case

	// Cells are the numbers of cells along the shorter side of the box, on
	// one grid after the other, rising. Default [DefaultCells], 12, 24 and 48.
	Cells []int

	// StepsPerCell is the number of time steps for each of these cells. Default
	// [DefaultStepsPerCell].
	StepsPerCell float64

	// Stretch is how many times wider the widest cells are than the narrowest,
	// which are at the walls and at jumps of conductivity. Default 1, uniform.
	Stretch float64

	// Expect says at which order the solver should converge on a case; zero
	// orders are not judged. Default [Expected].
	Expect func(c exact.Case) Orders

	// Slack is by how much the observed order may fall short of the expected
	// one. Default [DefaultSlack].
	Slack float64

	// Tolerance is the relative accuracy to which the solver solves its
	// discrete equations. Errors that are smaller pass whatever their order,
	// and properties must hold to this. Default [DefaultTolerance].
	Tolerance float64

	// Overshoot is how far temperatures may leave the bounds of the maximum
	// principle, relative to the range of the bounds. A scheme that claims to
	// keep them wants 1e-12 here. Default [DefaultOvershoot].
	Overshoot float64

	// Monitor, if not nil, is called with the result of each case when
	// it is known.
	Monitor func(r Result)
}

// Orders are powers of the width of cells, and of the time step with it, with
// which errors should fall.
type Orders struct{ Temperature, Flux float64 }

// AtMost returns the orders, but none above limit: those of a scheme whose
// own order that is.
func (o Orders) AtMost(limit float64) Orders {
	return Orders{min(o.Temperature, limit), min(o.Flux, limit)}
}

// thinLayer is the Péclet number of the box, v·length/κ, above which the layer
// κ/v in which an isothermal wall cools or heats the fluid that leaves through
// it is too thin for the usual grids.
const thinLayer = 100

// Expected returns the orders that the case expects of a scheme of second order.
// The order of the flux is zero where the flux is infinite in a corner of the
// box, and where fluid leaves through an isothermal wall at a Péclet number of the
// box above a hundred: the layer next to such a wall is thinner than the cells.
func Expected(c exact.Case) Orders {
	o := Orders(c.Expect)
	if singular(c) || thin(c) {
		o.Flux = 0
	}
	return o
}

func singular(c exact.Case) bool {
	for _, x := range []float64{c.Box.Left, c.Box.Right} {
		for _, z := range []float64{c.Box.Bottom, c.Box.Top} {
			if f := c.At(x, z, c.End); math.IsInf(f.FluxX, 0) || math.IsInf(f.FluxZ, 0) {
				return true
			}
		}
	}
	return false
}

func thin(c exact.Case) bool {
	b := c.Box
	number := func(m exact.Medium, outward, length float64) float64 {
		return m.HeatCapacity * outward * length / m.Conductivity
	}
	worst := 0.0
	for i := range 33 {
		x, z := b.Left+b.Width()*float64(i)/32, b.Bottom+b.Height()*float64(i)/32
		left, right := c.Medium(b.Left, z, c.End), c.Medium(b.Right, z, c.End)
		bottom, top := c.Medium(x, b.Bottom, c.End), c.Medium(x, b.Top, c.End)
		for _, side := range []struct {
			wall   exact.Wall
			number float64
		}{
			{c.Walls.Left, number(left, -left.VX, b.Width())},
			{c.Walls.Right, number(right, right.VX, b.Width())},
			{c.Walls.Bottom, number(bottom, -bottom.VZ, b.Height())},
			{c.Walls.Top, number(top, top.VZ, b.Height())},
		} {
			if side.wall == exact.Isothermal {
				worst = max(worst, side.number)
			}
		}
	}
	return worst > thinLayer
}

// complete returns the settings with defaults in place of zeros.
func (s *Settings) complete() (Settings, error) {
	var set Settings
	if s != nil {
		set = *s
	}
	if set.Cases == nil {
		set.Cases = exact.All()
	}
	if set.Cells == nil {
		set.Cells = DefaultCells()
	}
	if set.Expect == nil {
		set.Expect = Expected
	}
	for _, f := range []struct {
		to    *float64
		value float64
	}{
		{&set.StepsPerCell, DefaultStepsPerCell},
		{&set.Stretch, 1},
		{&set.Slack, DefaultSlack},
		{&set.Tolerance, DefaultTolerance},
		{&set.Overshoot, DefaultOvershoot},
	} {
		if *f.to == 0 {
			*f.to = f.value
		}
	}
	return set, set.check()
}

func (s Settings) check() error {
	rising := slices.IsSorted(s.Cells) && len(slices.Compact(slices.Clone(s.Cells))) == len(s.Cells)
	if len(s.Cells) < 2 || s.Cells[0] < 1 || !rising {
		return fmt.Errorf("heattest: Settings.Cells is %v, want two or more numbers >= 1 that rise", s.Cells)
	}
	if !(s.Stretch >= 1 && s.Stretch <= 1000) {
		return fmt.Errorf("heattest: Settings.Stretch is %v, want between 1 and 1000", s.Stretch)
	}
	for _, f := range []struct {
		name  string
		value float64
	}{{"StepsPerCell", s.StepsPerCell}, {"Slack", s.Slack}, {"Tolerance", s.Tolerance}, {"Overshoot", s.Overshoot}} {
		if !(f.value > 0 && !math.IsInf(f.value, 1)) {
			return fmt.Errorf("heattest: Settings.%s is %v, want > 0 and finite", f.name, f.value)
		}
	}
	for _, c := range s.Cases {
		if err := c.Validate(); err != nil {
			return fmt.Errorf("heattest: Settings.Cases: %w", err)
		}
	}
	return nil
}
