package stability

import (
	"fmt"
	"math"
)

// A Boundary is what holds at the bottom or at the top of a layer: a [Wall],
// which by itself is isothermal, or a wall with another thermal condition from
// [Wall.FixedFlux] or [Wall.Robin]. A nil Boundary means Free.
type Boundary interface {
	// String names the mechanical and the thermal condition.
	String() string
	conditions() conditions
}

// A Wall is the mechanical condition at a boundary. No wall lets the layer's
// fluid through but Permeable.
type Wall int

const (
	// Free is a flat boundary without shear stress: w = D²w = 0. At the edge
	// of a porous layer it is the same as Impermeable.
	Free Wall = iota
	// Rigid is a wall that the fluid sticks to: w = Dw = 0.
	Rigid
	// Impermeable closes a porous layer: w = 0.
	Impermeable
	// Permeable opens a porous layer to a reservoir at constant pressure: Dw = 0.
	Permeable
)

var wallNames = [...]string{"free", "rigid", "impermeable", "permeable"}

// String returns the name of the wall.
func (w Wall) String() string {
	if w < 0 || int(w) >= len(wallNames) {
		return fmt.Sprintf("Wall(%d)", int(w))
	}
	return wallNames[w]
}

func (w Wall) conditions() conditions { return conditions{w, math.Inf(1)} }

// Isothermal keeps the boundary at its temperature: θ = 0.
func (w Wall) Isothermal() Boundary { return w.conditions() }

// FixedFlux keeps the heat flow through the boundary: Dθ = 0.
func (w Wall) FixedFlux() Boundary { return conditions{w, 0} }

// Robin exchanges heat with surroundings of fixed temperature: Dθ = -Bi θ at
// the top and Dθ = Bi θ at the bottom. The Biot number Bi = h d/k, with h the
// heat-transfer coefficient, runs from 0, fixed flux, to infinity, isothermal.
func (w Wall) Robin(biot float64) Boundary { return conditions{w, biot} }

// conditions are the mechanical and the thermal condition of a boundary.
type conditions struct {
	wall Wall
	biot float64
}

func (c conditions) conditions() conditions { return c }

func (c conditions) String() string {
	switch {
	case math.IsInf(c.biot, 1):
		return c.wall.String() + ", isothermal"
	case c.biot == 0:
		return c.wall.String() + ", fixed flux"
	}
	return fmt.Sprintf("%v, Biot number %g", c.wall, c.biot)
}

func (c conditions) isothermal() bool { return math.IsInf(c.biot, 1) }

// conditionsOf returns the conditions of a boundary that may be nil.
func conditionsOf(b Boundary) conditions {
	if b == nil {
		return Free.conditions()
	}
	return b.conditions()
}

func (c conditions) check(name string, porous bool) error {
	if !(c.biot >= 0) {
		return &InputError{name + " Biot number", c.biot, "≥ 0"}
	}
	switch c.wall {
	case Free:
		return nil
	case Rigid:
		if !porous {
			return nil
		}
		return fmt.Errorf("stability: %s of a porous layer is Rigid, want Impermeable or Permeable", name)
	case Impermeable, Permeable:
		if porous {
			return nil
		}
		return fmt.Errorf("stability: %s of a fluid layer is %v, want Free or Rigid", name, c.wall)
	}
	return fmt.Errorf("stability: %s is %v, want one of the declared walls", name, c.wall)
}
