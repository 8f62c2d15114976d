// Package rolls computes the asymptotic structure of steady convection rolls:
// the flow of the core and the heat that the layer around it carries.
package rolls
