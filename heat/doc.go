// Package heat solves the heat equation in a rectangle of moving fluid.
//
// On the cells of a staggered grid, uniform or stretched, it integrates
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source,
//
// with the heat capacity per volume C = ρ·cp and the conductivity k constant or
// given for each cell, and a velocity free of divergence at the faces. Each wall
// is held at a temperature, lets a given flux pass, exchanges heat with its
// surroundings, or insulates; its values may change in time ([Stepper.MoveWalls]).
// The sides may be periodic.
//
//	st, err := heat.NewStepper(heat.Equation{Grid: g, Walls: heat.Walls{Bottom: heat.Isothermal(1), Top: heat.Isothermal(0)}}, nil)
//	rep, err := st.Step(ctx, temperature, flow, 0.9*st.StableStep(flow))
//
// [Stepper.Steady] finds the steady state without time stepping;
// [Stepper.RateTo], [Stepper.Factor] and [Stepper.SolveTo] give the discrete
// operator and its inverse to solvers of coupled problems.
//
// # Conventions
//
// Numbers are in any one consistent set of units: all SI, or all without
// dimension. x runs to the right, z up. A flux through a wall is positive if it
// brings heat into the box, whether prescribed or reported. Heat, power and
// budgets are per length perpendicular to the plane.
//
// # Heat budget
//
// What leaves one cell enters the next, and the fluxes that are reported are
// those with which cells are updated. So the change of [Stepper.HeatContent] in
// a step is Step times [Report.Power] to rounding, with every scheme, wall and
// flow. A constant temperature stays constant in a flow whose discrete
// divergence is zero, such as that of staggered.Flow.FillFromStream.
// Where the capacity varies, a parcel of fluid keeps its temperature, not its
// heat, as it moves into cells of another capacity: the equation above says so.
// Report.Exchange counts the difference.
//
// Fluid that enters through an isothermal wall has the temperature of the wall,
// through a Robin wall that of the surroundings, and through a wall of given
// flux the temperature extrapolated to the wall.
//
// # Method
//
// Conduction takes the harmonic, distance-weighted mean of the conductivities on
// both sides of a face: two layers in series. The flux through a wall is the
// slope there of the parabola through the wall's temperature and those of the
// first two cells, in the scheme itself as in the report; the abscissa is the
// thermal resistance, so that layered conductors are exact. Temperature and wall
// flux are second order in the cell size, also on grids that stretch smoothly,
// with one exception: in the cell next to a corner, where a wall of given flux
// or heat transfer meets another, on stretched grids or if the flux along it is
// not even, the error of the other wall's flux falls as h² log h.
//
// Advection is [Central] or [Bounded]: linear interpolation, or the third-order
// upwind-biased one with the limiter of Koren (1993), generalised to unequal
// cells. In a flow free of divergence it makes no new extrema, to rounding, up to
// [Stepper.StableStep] of the explicit schemes, between walls that are insulating,
// isothermal or of the Robin kind without inflow of unknown temperature.
//
// In time: the strong-stability-preserving Runge-Kutta methods of Shu & Osher
// (1988; Gottlieb, Shu & Tadmor 2001), or, if conduction is stiff, the Rosenbrock
// method ROS2 of Verwer, Spee, Blom & Hundsdorfer (1999) with conduction in its
// matrix, factored by directions (approximate matrix factorisation: Hundsdorfer &
// Verwer 2003). All are of second order or better.
//
// Steady states come from nested dissection (George 1973), see
// [Stepper.Factor].
//
// # Limits
//
// Two dimensions. Coefficients do not depend on temperature within a step.
// [Implicit] is stable for conduction at any step but damps little of what is
// rough in both directions at steps far beyond the explicit limit, and keeps no
// bounds there. A factored operator takes about 0.7 kB per cell. A step of the explicit schemes beyond [Stepper.StableStep] is an
// error unless [Settings] say otherwise.
package heat
