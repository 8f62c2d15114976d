// Package heat solves the equation of heat in a rectangle of moving fluid.
package heat
