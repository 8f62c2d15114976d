package exact

import "fmt"

// A Wall says what holds on one side of a box. The zero value is [FreeSlip].
type Wall int

// The kinds of walls.
const (
	FreeSlip Wall = iota // no velocity across the wall, no shear stress on it
	NoSlip               // no velocity
	Driven               // the velocity is that of the exact solution, across and along the wall
	Periodic             // what leaves through one side enters through the other
)

// String names the kind of wall.
func (w Wall) String() string {
	names := [...]string{"free slip", "no slip", "driven", "periodic"}
	if w < 0 || int(w) >= len(names) {
		return fmt.Sprintf("Wall(%d)", int(w))
	}
	return names[w]
}

// Walls are the four sides of a box.
type Walls struct{ Left, Right, Bottom, Top Wall }

// A Box is the rectangle Left ≤ x ≤ Right, Bottom ≤ z ≤ Top.
type Box struct{ Left, Right, Bottom, Top float64 }

// Width returns the extent in x.
func (b Box) Width() float64 { return b.Right - b.Left }

// Height returns the extent in z.
func (b Box) Height() float64 { return b.Top - b.Bottom }
