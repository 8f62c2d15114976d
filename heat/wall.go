package heat

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// A Wall is the thermal condition on one side of the box. The zero value
// insulates. Make others with [Isothermal], [Profile], [Flux], [FluxProfile],
// [Robin] and [RobinProfile].
type Wall struct {
	kind        wallKind
	value       float64                 // temperature, flux or ambient temperature
	profile     func(s float64) float64 // in place of value
	coefficient float64                 // of heat transfer
}

type wallKind int

const (
	prescribedFlux wallKind = iota // zero: insulating
	prescribedTemperature
	heatTransfer
	periodic
)

var (
	// Insulating lets no heat pass by conduction. It is the zero Wall.
	Insulating = Wall{}

	// Periodic joins the left wall to the right one. Both must be periodic or
	// neither.
	Periodic = Wall{kind: periodic}
)

// Isothermal holds a wall at the temperature t.
func Isothermal(t float64) Wall { return Wall{kind: prescribedTemperature, value: t} }

// Profile holds a wall at the temperature t(s), where s is the coordinate along
// the wall: z on Left and Right, x on Bottom and Top. The function is called by
// [NewStepper] and [Stepper.SetWalls] only, at the centres of the wall's cells.
func Profile(t func(s float64) float64) Wall {
	return Wall{kind: prescribedTemperature, profile: orNaN(t)}
}

// Flux conducts the heat q into the box per area and time; negative values draw
// heat from it.
func Flux(q float64) Wall { return Wall{value: q} }

// FluxProfile conducts the heat q(s) into the box per area and time, with s as
// for [Profile].
func FluxProfile(q func(s float64) float64) Wall { return Wall{profile: orNaN(q)} }

// Robin exchanges heat with surroundings at the temperature ambient: the flux
// into the box is coefficient·(ambient − T) with T the temperature of the wall.
// The coefficient, a conductivity per length, must not be negative.
func Robin(coefficient, ambient float64) Wall {
	return Wall{kind: heatTransfer, coefficient: coefficient, value: ambient}
}

// RobinProfile is [Robin] with surroundings at the temperature ambient(s), with
// s as for [Profile].
func RobinProfile(coefficient float64, ambient func(s float64) float64) Wall {
	return Wall{kind: heatTransfer, coefficient: coefficient, profile: orNaN(ambient)}
}

// orNaN makes a missing function an error that the check of its values finds.
func orNaN(f func(s float64) float64) func(s float64) float64 {
	if f == nil {
		return func(float64) float64 { return math.NaN() }
	}
	return f
}

// String describes the wall in a few words.
func (w Wall) String() string {
	value := fmt.Sprint(w.value)
	if w.profile != nil {
		value = "profile"
	}
	switch {
	case w.kind == prescribedTemperature:
		return "isothermal " + value
	case w.kind == heatTransfer:
		return fmt.Sprintf("Robin %v to %s", w.coefficient, value)
	case w.kind == periodic:
		return "periodic"
	case w.profile == nil && w.value == 0:
		return "insulating"
	}
	return "flux " + value
}

// at returns the wall's number at the coordinate s.
func (w Wall) at(s float64) float64 {
	if w.profile != nil {
		return w.profile(s)
	}
	return w.value
}

// Walls are the conditions on the four sides. The zero value insulates all.
type Walls struct{ Left, Right, Bottom, Top Wall }

// side returns the wall on one side.
func (w *Walls) side(s staggered.Side) Wall {
	return [...]Wall{w.Left, w.Right, w.Bottom, w.Top}[s]
}

// check looks at what does not depend on the grid.
func (w *Walls) check() error {
	for _, s := range staggered.Sides() {
		wall := w.side(s)
		if wall.kind == periodic && s.Horizontal() {
			return fmt.Errorf("heat: %v wall is periodic, want that of Left and Right only", s)
		}
		if wall.kind == heatTransfer && !(wall.coefficient >= 0 && wall.coefficient <= math.MaxFloat64) {
			return fmt.Errorf("heat: coefficient of the %v wall is %v, want finite and >= 0", s, wall.coefficient)
		}
	}
	if (w.Left.kind == periodic) != (w.Right.kind == periodic) {
		return fmt.Errorf("heat: left wall is %v and right wall %v, want both periodic or neither", w.Left, w.Right)
	}
	return nil
}

// conductsAs reports whether the flux through each wall depends on temperature
// as with other walls, whatever the prescribed numbers.
func (w *Walls) conductsAs(other *Walls) bool {
	for _, s := range staggered.Sides() {
		a, b := w.side(s), other.side(s)
		if a.kind != b.kind || a.coefficient != b.coefficient {
			return false
		}
	}
	return true
}

// IsPeriodic reports whether the wall is [Periodic].
func (w Wall) IsPeriodic() bool { return w.kind == periodic }
