package stokestest

import (
	"fmt"
	"slices"

	"example.org/overturn/stokes/exact"
)

// Defaults of [Settings].
const (
	DefaultSlack     = 0.3
	DefaultTolerance = 1e-6
)

// DefaultCells returns the default of Settings.Cells.
func DefaultCells() []int { return []int{24, 48, 96} }

// Settings says what is tested and how strictly. A nil *Settings, or a zero
// field, means the default.
type Settings struct {
	// Cases are the exact solutions. Default exact.All().
	Cases []exact.Case

	// Cells are the numbers of cells along the shorter side of the box, on
	// one grid after the other, rising. Default [DefaultCells], 24, 48 and 96.
	Cells []int

	// Stretch is how many times wider the widest cells are than the narrowest,
	// which are at the walls and at jumps of viscosity. Default 1, uniform.
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

	// Monitor, if not nil, is called with the result of each case when
	// it is known.
	Monitor func(r Result)
}

// Orders are powers of the width of cells with which errors should fall.
type Orders struct{ Velocity, Pressure, Stress float64 }

// AtMost returns the orders, but none above limit: those of a scheme whose
// own order that is.
func (o Orders) AtMost(limit float64) Orders {
	return Orders{min(o.Velocity, limit), min(o.Pressure, limit), min(o.Stress, limit)}
}

// Expected returns the orders of a scheme of second order, as [exact.Orders]
// describes. Stress has the order of the pressure, or where there is none to
// measure that of the velocity, but not more than 1.5: that of a stress which is
// of second order but in the cells next to walls, where it is of first.
func Expected(c exact.Case) Orders {
	o := Orders{Velocity: c.Expect.Velocity, Pressure: c.Expect.Pressure, Stress: c.Expect.Pressure}
	if o.Stress == 0 {
		o.Stress = o.Velocity
	}
	o.Stress = min(o.Stress, 1.5)
	return o
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
	if set.Stretch == 0 {
		set.Stretch = 1
	}
	if set.Expect == nil {
		set.Expect = Expected
	}
	if set.Slack == 0 {
		set.Slack = DefaultSlack
	}
	if set.Tolerance == 0 {
		set.Tolerance = DefaultTolerance
	}
	return set, set.check()
}

func (s Settings) check() error {
	rising := slices.IsSorted(s.Cells) && len(slices.Compact(slices.Clone(s.Cells))) == len(s.Cells)
	if len(s.Cells) < 2 || s.Cells[0] < 1 || !rising {
		return fmt.Errorf("stokestest: Settings.Cells is %v, want two or more numbers >= 1 that rise", s.Cells)
	}
	if !(s.Stretch >= 1 && s.Stretch <= 1000) {
		return fmt.Errorf("stokestest: Settings.Stretch is %v, want between 1 and 1000", s.Stretch)
	}
	if !(s.Slack > 0) {
		return fmt.Errorf("stokestest: Settings.Slack is %v, want > 0", s.Slack)
	}
	if !(s.Tolerance > 0) {
		return fmt.Errorf("stokestest: Settings.Tolerance is %v, want > 0", s.Tolerance)
	}
	for _, c := range s.Cases {
		if c.Solution == nil || !(c.Box.Width() > 0) || !(c.Box.Height() > 0) {
			return fmt.Errorf("stokestest: case %q has solution %v and box %v, want a solution and a box", c.Name, c.Solution, c.Box)
		}
	}
	return nil
}
