package exact

import "fmt"

// A Wall says what holds on one side of a box. The zero value is [Insulating].
type Wall int

// The kinds of walls.
const (
	Insulating Wall = iota // no heat is conducted through it
	Isothermal             // the temperature is that of the exact solution
	Flux                   // the flux is that of the exact solution
	Robin                  // the flux into the box is Transfer times the excess of the surroundings' temperature
	Periodic               // what leaves through one side enters through the other
)

// String names the kind of wall.
func (w Wall) String() string {
	names := [...]string{"insulating", "isothermal", "flux", "Robin", "periodic"}
	if w < 0 || int(w) >= len(names) {
		return fmt.Sprintf("Wall(%d)", int(w))
	}
	return names[w]
}

// Walls are the four sides of a box.
type Walls struct{ Left, Right, Bottom, Top Wall }

// check reports walls that no box has.
func (w Walls) check(of string) error {
	for _, side := range []struct {
		name string
		wall Wall
	}{{"Left", w.Left}, {"Right", w.Right}, {"Bottom", w.Bottom}, {"Top", w.Top}} {
		if side.wall < Insulating || side.wall > Periodic {
			return fmt.Errorf("exact: %s.Walls.%s is %v, want one of the kinds", of, side.name, side.wall)
		}
	}
	if w.Bottom == Periodic || w.Top == Periodic {
		return fmt.Errorf("exact: %s.Walls has bottom %v and top %v, want only sides periodic", of, w.Bottom, w.Top)
	}
	if (w.Left == Periodic) != (w.Right == Periodic) {
		return fmt.Errorf("exact: %s.Walls has left %v and right %v, want both periodic or neither", of, w.Left, w.Right)
	}
	return nil
}

// A Box is the rectangle Left ≤ x ≤ Right, Bottom ≤ z ≤ Top.
type Box struct{ Left, Right, Bottom, Top float64 }

// Width returns the extent in x.
func (b Box) Width() float64 { return b.Right - b.Left }

// Height returns the extent in z.
func (b Box) Height() float64 { return b.Top - b.Bottom }

// A Side is one of the four sides of a box.
type Side int

// The four sides.
const (
	Left Side = iota
	Right
	Bottom
	Top
)

// String names the side.
func (s Side) String() string {
	names := [...]string{"left", "right", "bottom", "top"}
	if s < 0 || int(s) >= len(names) {
		return fmt.Sprintf("Side(%d)", int(s))
	}
	return names[s]
}
