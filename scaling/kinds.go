package scaling

import "fmt"

// Quantity is what a law gives.
type Quantity int

// Quantities. In a [Query], AnyQuantity matches all.
const (
	AnyQuantity       Quantity = iota
	Nusselt                    // total heat flux over that of conduction
	Reynolds                   // rms speed · depth/kinematic viscosity
	Peclet                     // speed · depth/diffusivity
	MeanTemperature            // of the layer, in the temperature drop
	HeatedTemperature          // of the interior, in H d²/k
	CriticalRayleigh           // at the onset of convection
	ViscosityContrast          // that separates two regimes
)

// String returns the name of the quantity.
func (q Quantity) String() string {
	return name(int(q), "any quantity", "Nusselt number", "Reynolds number", "Péclet number",
		"mean temperature", "temperature in H d²/k", "critical Rayleigh number", "viscosity contrast")
}

// Geometry is the shape that a law is made for.
type Geometry int

// Geometries. In a [Query], AnyGeometry matches all.
const (
	AnyGeometry     Geometry = iota
	HorizontalLayer          // wide, between horizontal walls
	InclinedLayer            // between parallel walls at an angle
	PorousLayer              // horizontal, filled with a porous medium
	Slot                     // upright, heated on one side
	VerticalPlate            // in open surroundings
	HorizontalCylinder
	PlateFacingUp // a heated face up, or a cooled face down
	PlateFacingDown
)

// String returns the name of the geometry.
func (g Geometry) String() string {
	return name(int(g), "any geometry", "horizontal layer", "inclined layer", "porous layer", "side-heated slot",
		"vertical plate", "horizontal cylinder", "hot plate facing up", "hot plate facing down")
}

// Walls says what the two walls do to the flow.
type Walls int

// Walls. In a [Query], AnyWalls matches all; a law for any walls matches every
// query.
const (
	AnyWalls      Walls = iota
	Free                // both stress-free
	Rigid               // both no-slip
	FreeOverRigid       // one of each
)

// String returns the name of the walls.
func (w Walls) String() string {
	return name(int(w), "any walls", "free walls", "rigid walls", "one free, one rigid wall")
}

// Heating says where the heat comes from.
type Heating int

// Modes of heating. In a [Query], AnyHeating matches all.
const (
	AnyHeating Heating = iota
	FromBelow
	FromWithin
	Mixed    // from below and from within
	FromSide // horizontal temperature difference, or a single hot surface
)

// String returns the name of the mode of heating.
func (h Heating) String() string {
	return name(int(h), "any heating", "heated from below", "heated from within", "mixed heating", "heated from the side")
}

// Rheology says what the viscosity depends on.
type Rheology int

// Rheologies. In a [Query], AnyRheology matches all.
const (
	AnyRheology        Rheology = iota
	Isoviscous                  // constant
	ThermallyActivated          // strongly temperature dependent
	NonNewtonian                // stress dependent
	Pseudoplastic               // temperature dependent with a yield stress
	PorousMedium                // Darcy's law
)

// String returns the name of the rheology.
func (r Rheology) String() string {
	return name(int(r), "any rheology", "constant viscosity", "thermally activated viscosity", "stress-dependent viscosity",
		"yielding lid", "porous medium")
}

// Flow says what kind of flow a law describes.
type Flow int

// Kinds of flow. In a [Query], AnyFlow matches all.
const (
	AnyFlow Flow = iota
	Steady
	TimeDependent // including turbulent
)

// String returns the name of the kind of flow.
func (f Flow) String() string {
	return name(int(f), "any flow", "steady", "time dependent")
}

// Status says how well the source of a law or constant is known to us.
type Status int

// From best to worst. Unconfirmed laws are in no list but that of
// [Unconfirmed].
const (
	Derived      Status = iota // derived and computed in this package
	Published                  // read in the source
	Abstract                   // read in the abstract of the source
	SecondHand                 // read in a secondary source
	FromMemory                 // known to the trade, not re-read
	NotConfirmed               // remembered, contradicted or doubtful: do not rely on it
)

// String returns the name of the status.
func (s Status) String() string {
	return name(int(s), "derived here", "read in the source", "read in the abstract", "read in a secondary source",
		"from memory", "not confirmed")
}

func name(i int, names ...string) string {
	if i >= 0 && i < len(names) {
		return names[i]
	}
	return fmt.Sprintf("unknown kind %d", i)
}
