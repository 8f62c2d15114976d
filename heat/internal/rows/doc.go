// Package rows holds the inner loops of package heat. Each works on one row of
// cells at a time: fluxes through the faces of the row first, then the update
// of its cells.
//
// The face before cell i is face i. A flux is positive along the axis. Slices
// are cut by the callee; all must be as long as the row says.
package rows
