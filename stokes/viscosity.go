package stokes

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// setViscosity puts the viscosity on the finest level, divided by the power of
// two nearest below its largest value, so that units and powers of two
// change no bit of the arithmetic. If it is the one that is there already,
// nothing has to be derived from it again.
func (sv *Solver) setViscosity(viscosity *staggered.Scalar) error {
	largest, err := sv.checkViscosity(viscosity)
	if err != nil {
		return err
	}
	_, exponent := math.Frexp(largest)
	scale := math.Ldexp(1, exponent-1)
	if sv.storeViscosity(viscosity, scale) && sv.known {
		sv.scale = scale
		return nil
	}
	sv.scale, sv.known, sv.fresh, sv.factored = scale, true, false, false
	sv.layered = sv.isLayered()
	sv.level.WrapViscosity()
	for j := 1; j <= sv.grid.NZ()+1; j++ {
		sv.setCorners(j)
	}
	sv.mg.RefreshFinest()
	return nil
}

// isLayered reports whether the viscosity does not vary along x.
func (sv *Solver) isLayered() bool {
	nx, nz := sv.grid.Cells()
	for j := 1; j <= nz; j++ {
		row := sv.level.Row(sv.level.Eta, j)[1:][:nx]
		for _, v := range row {
			if v != row[0] {
				return false
			}
		}
	}
	return true
}

// storeViscosity copies the viscosity and reports whether it is the old one.
func (sv *Solver) storeViscosity(viscosity *staggered.Scalar, scale float64) bool {
	nx, nz := sv.grid.Cells()
	same := true
	inverse := 1 / scale
	for j := 1; j <= nz; j++ {
		row := sv.level.Row(sv.level.Eta, j)[1:][:nx]
		if viscosity == nil {
			for i := range row {
				same = same && row[i] == 1
				row[i] = 1
			}
			continue
		}
		for i, eta := range viscosity.Values[(j-1)*nx:][:nx] {
			v := eta * inverse
			same = same && row[i] == v
			row[i] = v
		}
	}
	return same
}

// setCorners averages the viscosities of the cells around each corner of row
// j; at a wall those of the two cells inside.
func (sv *Solver) setCorners(j int) {
	l := sv.level
	below, above, corner := l.Row(l.Eta, j-1), l.Row(l.Eta, j), l.Row(l.Corner, j)
	n := len(corner)
	below, above = below[:n], above[:n]
	switch sv.settings.CornerMean {
	case Geometric:
		for i := 1; i < n; i++ {
			corner[i] = math.Sqrt(math.Sqrt(below[i-1]*below[i]) * math.Sqrt(above[i-1]*above[i]))
		}
	case Arithmetic:
		for i := 1; i < n; i++ {
			corner[i] = 0.25 * ((below[i-1] + below[i]) + (above[i-1] + above[i]))
		}
	case Harmonic:
		for i := 1; i < n; i++ {
			corner[i] = 4 / ((1/below[i-1] + 1/below[i]) + (1/above[i-1] + 1/above[i]))
		}
	}
}

// maxContrast is the largest ratio of viscosities whose product with a
// residual still has digits.
const maxContrast = 1e15

func (sv *Solver) checkViscosity(viscosity *staggered.Scalar) (largest float64, err error) {
	if viscosity == nil {
		return 1, nil
	}
	if !sv.grid.Equal(viscosity.Grid) {
		return 0, fmt.Errorf("stokes: viscosity is on %v, want %v", viscosity.Grid, sv.grid)
	}
	nx := sv.grid.NX()
	if err := checkCount("viscosity", viscosity.Values, nx*sv.grid.NZ()); err != nil {
		return 0, err
	}
	smallest := math.Inf(1)
	for c, eta := range viscosity.Values {
		if !(eta > 0 && eta <= math.MaxFloat64) {
			return 0, fmt.Errorf("stokes: viscosity of the cell in column %d, row %d is %v, want a finite number > 0", c%nx, c/nx, eta)
		}
		largest, smallest = max(largest, eta), min(smallest, eta)
	}
	if largest/smallest > maxContrast {
		return 0, fmt.Errorf("stokes: viscosity varies from %v to %v, by more than a factor of %v", smallest, largest, maxContrast)
	}
	return largest, nil
}
