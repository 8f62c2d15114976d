// Package lines solves tridiagonal systems along the rows or the columns of a
// rectangle of cells, many at a time.
//
// The matrices are 1 + f·A with A loaded once and f changed whenever needed, as
// with a time step. Solving is one forward and one backward sweep (Thomas 1949), in
// place, for a range of lines, so that several goroutines can share the work. Rows
// may close to rings.
//
// The matrices must be diagonally dominant: there is no pivoting.
package lines
