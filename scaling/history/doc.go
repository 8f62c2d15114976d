// Package history integrates the thermal history of a planet, an ice shell, a
// magma body: reservoirs that lie on one another and lose heat through their
// tops.
//
// Each reservoir i, of mass M, specific heat c and one temperature T, obeys
//
//	M_i c_i dT_i/dt = M_i H_i(t) + A_{i-1} q_{i-1} - A_i q_i,
//
// where q_i is the heat flux through its top, of area A_i, to the reservoir above
// or to the surface, and H_i its heating per mass. One reservoir is the
// classical parameterised model; a core below a mantle makes two. The flux is a
// [Loss]: any law of package scaling with a temperature-dependent viscosity
// ([Convection]), a stagnant lid ([StagnantLid]), a boundary layer at the bottom
// of the reservoir above ([BottomLayer]), or your own. In a few lines:
//
//	model, err := history.New(history.Body{Reservoirs: ..., Surface: ...}, nil)
//	h, err := model.Run(0, 4.5*units.Gigayear)
//	s, err := h.At(2 * units.Gigayear)   // temperatures, fluxes, Urey ratio ...
//	b, err := h.Budget()                 // where the heat went
//
// # Conventions
//
// Reservoirs count from the deepest, 0. Time runs from zero; [Radiogenic] heating
// says at which time it has the present strength. Fluxes count as positive
// upwards. A run may go backward in time, from the present say, with the
// temperatures at its start given.
//
// # Method
//
// Collocation at five Radau points: order nine at the ends of steps, L-stable,
// with a dense output of order six whose error the step size controls. Stiff
// reservoirs, thin ones or hot ones with a viscosity a million times lower, cost
// no more steps than others once their first adjustment is over. Radiogenic
// energy is integrated exactly, heat that is lost with the collocation formula,
// so that the residual of [History.Budget] measures the error of the
// integration.
//
// Parameterised histories: Christensen (1985), Korenaga (2006).
//
// # Limits
//
// Reservoirs are well mixed and have one temperature each, constant mass and
// specific heat; no melting, no growing inner core, no growing lid of its own
// heat content. A backward run follows growing modes: errors of the present grow
// as they shrank on the way, and laws with exponents of 0.3 and more run away
// within a few billion years if the present heating is weak (the thermal
// catastrophe): that run ends with [ErrRunaway].
package history
