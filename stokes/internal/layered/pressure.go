package layered

// Balance changes the pressure p such that the residual r of the momentum
// equations, computed with the velocity of [Solver.Add] and the old pressure,
// vanishes but for the error of that velocity: along each row the pressure
// follows from the x-momentum, from row to row from the mean z-momentum.
func (sv *Solver) Balance(p []float64, r Fields) {
	l := sv.l
	n := l.X.N
	rdx := l.X.RH[1]
	level, meanBelow := 0.0, 0.0
	for j := 1; j <= l.Z.N; j++ {
		row, x, z := l.Row(p, j), l.Row(r.X, j), l.Row(r.Z, j)
		rdz := l.Z.RH[j]
		sum, along, weight := 0.0, 0.0, 0.0
		for i := 1; i <= n; i++ {
			if i > 1 {
				along += x[i] * rdz
			}
			sum += along
			weight += z[i]
		}
		mean := sum / float64(n)
		if j > 1 {
			level += weight/float64(n)*rdx - mean + meanBelow
		} else {
			level = -mean
		}
		meanBelow = mean
		along = level
		for i := 1; i <= n; i++ {
			if i > 1 {
				along += x[i] * rdz
			}
			row[i] += along
		}
	}
}
