package exact

import "math"

// All returns the cases, always in the same order. Left out are [Leveque],
// whose equation lacks conduction along the wall, the problems of freezing, whose
// front the heat equation alone does not know, and the [Sphere].
func All() []Case {
	cases := make([]Case, 0, len(catalogue))
	for _, entry := range catalogue {
		s, err := entry.problem.Solve()
		if err != nil {
			panic(err) // a test solves each of them
		}
		entry.Solution = s
		cases = append(cases, entry.Case)
	}
	return cases
}

const carslawJaeger = "Carslaw & Jaeger (1959)"

var (
	unit = Box{Left: 0, Right: 1, Bottom: 0, Top: 1}
	tall = Box{Left: 0, Right: 0.5, Bottom: 0, Top: 2}

	// follow are walls that take their temperatures from the solution, ends
	// those of a column that is insulated sideways.
	follow = Walls{Left: Isothermal, Right: Isothermal, Bottom: Isothermal, Top: Isothermal}
	ends   = Walls{Bottom: Isothermal, Top: Isothermal}

	// second are the orders of most cases, within those of spots that hardly
	// reach the walls.
	second = Orders{Temperature: 2, Flux: 2}
	within = Orders{Temperature: 2}
)

var catalogue = []struct {
	Case
	problem Problem
}{
	{
		Case: Case{Name: "half-space", Source: carslawJaeger + " 2.4", Box: tall, Walls: ends, Start: 0.05, End: 0.25, Expect: second},

		problem: HalfSpace{Initial: 1},
	},
	{
		Case: Case{Name: "half-space with flux", Source: carslawJaeger + " 2.9", Box: tall,
			Walls: Walls{Bottom: Flux, Top: Isothermal}, Start: 0.05, End: 0.25, Expect: second},
		problem: HalfSpaceFlux{Flux: 1},
	},
	{
		Case: Case{Name: "half-space in surroundings", Source: carslawJaeger + " 2.7", Box: tall,
			Walls: Walls{Bottom: Robin, Top: Isothermal}, Transfer: 2, Start: 0.05, End: 0.25, Expect: second},
		problem: HalfSpaceRobin{Ambient: 1, Coefficient: 2},
	},
	{
		Case:    Case{Name: "periodic surface", Source: carslawJaeger + " 2.6", Box: tall, Walls: ends, Start: 0, End: 0.5, Expect: second},
		problem: PeriodicSurface{},
	},
	{
		Case:    Case{Name: "slab", Source: carslawJaeger + " 3.3, 3.14", Box: unit, Walls: ends, Start: 0.02, End: 0.1, Expect: second},
		problem: Slab{Initial: 1, High: 0.5, Source: 2},
	},
	{
		Case:    Case{Name: "insulated slab", Source: carslawJaeger + " 3.3", Box: unit, Walls: Walls{Bottom: Isothermal}, Start: 0.02, End: 0.2, Expect: second},
		problem: SlabInsulated{Initial: 1, Source: 1},
	},
	{
		Case: Case{Name: "slab in surroundings", Source: carslawJaeger + " 3.11", Box: unit,
			Walls: Walls{Top: Robin}, Transfer: 1, Start: 0.05, End: 0.5, Expect: second},
		problem: SlabRobin{Initial: 1},
	},
	{
		Case: Case{Name: "gaussian in uniform flow", Source: carslawJaeger + " 10.3, moved", Box: unit, Walls: follow,
			Start: 0, End: 0.2, Expect: within},
		problem: Gaussian{Material: Material{Conductivity: 0.02}, Width: 0.15, X: 0.3, Z: 0.4, VX: 1, VZ: 0.5},
	},
	{
		Case: Case{Name: "gaussian in rotation", Source: "derived", Box: Box{Left: -1, Right: 1, Bottom: -1, Top: 1}, Walls: follow,
			Start: 0, End: 0.25, Expect: within},
		problem: GaussianRotation{Material: Material{Conductivity: 0.005}, Width: 0.2, X: 0.4, Rate: 2 * math.Pi},
	},
	{
		Case: Case{Name: "gaussian in shear", Source: "derived", Box: Box{Left: -1, Right: 1, Bottom: -1, Top: 1}, Walls: follow,
			Start: 0, End: 0.5, Expect: within},
		problem: GaussianShear{Material: Material{Conductivity: 0.01}, Width: 0.2, Rate: 2},
	},
	{
		Case: Case{Name: "line source", Source: carslawJaeger + " 10.3", Box: Box{Left: -1, Right: 1, Bottom: -1, Top: 1}, Walls: follow,
			Start: 0.05, End: 0.2, Expect: second},
		problem: LineSource{},
	},
	{
		Case:    Case{Name: "throughflow", Source: "elementary", Box: unit, Walls: ends, Expect: second},
		problem: Throughflow{Velocity: 5, High: 1},
	},
	{
		Case:    Case{Name: "inflow", Source: "Ogata & Banks (1961)", Box: tall, Walls: ends, Start: 0.2, End: 0.8, Expect: second},
		problem: Inflow{Material: Material{Conductivity: 0.1}, Velocity: 1, Surface: 1},
	},
	{
		Case:    Case{Name: "upflow", Source: "elementary", Box: unit, Walls: ends, Expect: second},
		problem: Upflow{Speed: 3, Deep: 1},
	},
	{
		Case: Case{Name: "stagnation flow", Source: "derived", Box: Box{Left: -0.5, Right: 0.5, Bottom: 0, Top: 1}, Walls: follow,
			Expect: second},
		problem: StagnationFlow{Material: Material{Conductivity: 0.5}, Rate: 2, Far: 1},
	},
	{
		Case: Case{Name: "couette heating", Source: "elementary", Box: unit,
			Walls: Walls{Left: Periodic, Right: Periodic, Bottom: Isothermal, Top: Isothermal}, Expect: second},
		problem: CouetteHeating{Speed: 2, High: 1},
	},
	{
		Case: Case{Name: "contact", Source: carslawJaeger + " 2.15", Box: Box{Left: 0, Right: 0.5, Bottom: -1, Top: 1}, Walls: ends,
			ZLines: []float64{0}, Start: 0.02, End: 0.1, Expect: second},
		problem: Contact{Lower: Material{Conductivity: 3, HeatCapacity: 2}, LowerInitial: 1},
	},
	{
		Case: Case{Name: "cylinder", Source: carslawJaeger + " 7.6", Box: Box{Left: -0.7, Right: 0.7, Bottom: -0.7, Top: 0.7}, Walls: follow,
			Start: 0.02, End: 0.1, Expect: second},
		problem: Cylinder{Initial: 1},
	},
	{
		Case: Case{Name: "box mode", Source: "separation of variables", Box: unit, Walls: follow,
			Start: 0, End: 0.02, Expect: second},
		problem: BoxMode{N: 2},
	},
	{
		Case:    Case{Name: "hot top", Source: carslawJaeger + " 5.3", Box: Box{Left: 0, Right: 1, Bottom: 0, Top: 0.75}, Walls: follow, Expect: second},
		problem: HotTop{Top: 1},
	},
	{
		Case:    Case{Name: "geotherm", Source: "elementary", Box: unit, Walls: Walls{Bottom: Isothermal, Top: Flux}, Expect: second},
		problem: Geotherm{HeatFlow: 2, Source: 1},
	},
	{
		Case: Case{Name: "geotherm with exponential heating", Source: "Lachenbruch (1970)", Box: unit,
			Walls: Walls{Bottom: Isothermal, Top: Flux}, Expect: second},
		problem: GeothermExponential{MantleFlow: 0.5, Source: 3, Depth: 0.3},
	},
	{
		Case:    Case{Name: "conductivity linear in temperature", Source: carslawJaeger + " 1.6", Box: unit, Walls: ends, Expect: second},
		problem: ConductivityLinear{Slope: 0.5, High: 1},
	},
	{
		Case:    Case{Name: "conductivity of a crystal", Source: "Kirchhoff's transform", Box: unit, Walls: ends, Expect: second},
		problem: ConductivityInverse{High: 4},
	},
	{
		Case:    Case{Name: "conductivity exponential in height", Source: "elementary", Box: unit, Walls: ends, Expect: second},
		problem: ConductivityExponential{Growth: 2, High: 1},
	},
	{
		Case:    Case{Name: "layers", Source: "elementary", Box: unit, Walls: ends, ZLines: []float64{0.5}, Expect: second},
		problem: Layers{Thicknesses: []float64{0.5, 0.5}, Conductivities: []float64{1, 10}, High: 1},
	},
	{
		Case: Case{Name: "cell between insulating sides", Source: "chosen here", Box: unit, Walls: ends,
			Start: 0, End: 0.2, Expect: second},
		problem: Cell{Material: Material{Conductivity: 0.1}, Velocity: 2 * math.Pi},
	},
	{
		Case: Case{Name: "cell between isothermal sides", Source: "chosen here", Box: unit, Walls: follow,
			Start: 0, End: 0.2, Expect: second},
		problem: Cell{Material: Material{Conductivity: 0.1}, Sides: Isothermal, Velocity: 2 * math.Pi},
	},
	manufactured("manufactured, isothermal", Walls{Isothermal, Isothermal, Isothermal, Isothermal}),
	manufactured("manufactured, flux", Walls{Flux, Isothermal, Flux, Isothermal}),
	manufactured("manufactured, insulating", Walls{Insulating, Insulating, Isothermal, Isothermal}),
	manufactured("manufactured, surroundings", Walls{Robin, Robin, Robin, Robin}),
	manufactured("manufactured, periodic", Walls{Periodic, Periodic, Robin, Isothermal}),
	manufactured("manufactured, mixed", Walls{Robin, Insulating, Flux, Isothermal}),
}

// manufactured is a case in a box of its own, all of whose coefficients vary.
func manufactured(name string, walls Walls) (entry struct {
	Case
	problem Problem
}) {
	p := Manufactured{Walls: walls, Width: 1.5, Contrast: 4, Velocity: 2, Decay: 1}
	entry.problem = p
	entry.Case = Case{
		Name: name, Source: "chosen here", Walls: walls, Transfer: 3,
		Box:   Box{Right: p.Width, Top: 1},
		Start: 0, End: 0.1, Expect: second,
	}
	return entry
}
