package heat

import (
	"math"
	"slices"

	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// operator holds the coefficients of the discrete equation. With a uniform heat
// capacity everything is divided by it once: fluxes are then those of
// temperature, conductances are diffusivities per distance.
type operator struct {
	g      *staggered.Grid
	nx, nz int
	ring   bool // sides are periodic

	dx, dz, ix, iz []float64   // cell sizes and their inverses
	wl, wr, wb, wa []float64   // weights of the cells left, right, below, above a face
	upx            rows.Upwind // weights of the bounded scheme at x-faces
	upz            rows.Upwind // and at z-faces

	// kappa is the conductivity of a cell over the uniform heat capacity.
	kappa func(i, k int) float64

	// Conductances of interior faces per area: of x-faces one row of nx+1 for
	// all rows, or one for each; of z-faces one number for all columns, or a
	// row of nx.
	varying bool
	cx, cz  []float64

	walls [4]wallLine

	capacity   float64   // the uniform heat capacity, 1 if capacities is set
	capacities []float64 // of each cell, nil if uniform

	steepest      float64 // the largest of ix
	stiffness     float64 // bound of the modulus of the conductive eigenvalues
	decay         float64 // largest coefficient of a cell's own temperature
	softest       float64 // smallest diffusivity
	temperatureAt bool    // some wall determines the temperature
}

func newOperator(eq *Equation) (*operator, error) {
	g := eq.Grid
	nx, nz := g.Cells()
	op := &operator{
		g: g, nx: nx, nz: nz, ring: eq.Walls.Left.kind == periodic,
		dx: g.DX(), dz: g.DZ(), capacity: 1,
	}
	op.ix, op.iz = inverses(op.dx), inverses(op.dz)
	op.steepest = slices.Max(op.ix)
	op.wl, op.wr = linearWeights(op.dx)
	op.wb, op.wa = linearWeights(op.dz)
	op.upx, op.upz = upwindWeights(op.dx, op.ring), upwindWeights(op.dz, false)
	if c := eq.HeatCapacity; c != nil {
		if op.capacity = c.Values[0]; !same(c.Values) {
			op.capacity, op.capacities = 1, append([]float64(nil), c.Values...)
		}
	}
	op.kappa = op.conductivity(eq.Conductivity)
	op.setConductances()
	if err := op.setWalls(&eq.Walls); err != nil {
		return nil, err
	}
	op.bound()
	return op, nil
}

// conductivity returns what op.kappa is to be.
func (op *operator) conductivity(field *staggered.Scalar) func(i, k int) float64 {
	if field == nil {
		kappa := 1 / op.capacity
		return func(int, int) float64 { return kappa }
	}
	op.varying = !same(field.Values)
	values, nx, capacity := append([]float64(nil), field.Values...), op.nx, op.capacity
	return func(i, k int) float64 { return values[k*nx+i] / capacity }
}

func (op *operator) setConductances() {
	nx, nz, kappa := op.nx, op.nz, op.kappa
	rowsX, colsZ := 1, 1
	if op.varying {
		rowsX, colsZ = nz, nx
	}
	op.cx = make([]float64, rowsX*(nx+1))
	for k := range rowsX {
		c := op.cx[k*(nx+1) : (k+1)*(nx+1)]
		for i := 1; i < nx; i++ {
			c[i] = inSeries(op.dx[i-1]/2, kappa(i-1, k), op.dx[i]/2, kappa(i, k))
		}
		if op.ring {
			c[0] = inSeries(op.dx[nx-1]/2, kappa(nx-1, k), op.dx[0]/2, kappa(0, k))
			c[nx] = c[0]
		}
	}
	op.cz = make([]float64, colsZ*(nz+1))
	for k := 1; k < nz; k++ {
		for i := range colsZ {
			op.cz[k*colsZ+i] = inSeries(op.dz[k-1]/2, kappa(i, k-1), op.dz[k]/2, kappa(i, k))
		}
	}
}

// inSeries is the conductance per area of two layers in series.
func inSeries(h1, k1, h2, k2 float64) float64 { return 1 / (h1/k1 + h2/k2) }

// rowX returns the conductances of the x-faces of row k.
func (op *operator) rowX(k int) []float64 {
	if !op.varying {
		return op.cx
	}
	return op.cx[k*(op.nx+1) : (k+1)*(op.nx+1)]
}

// faceX and faceZ return the conductance of one interior face.
func (op *operator) faceX(i, k int) float64 { return op.rowX(k)[i] }

func (op *operator) faceZ(i, k int) float64 {
	if !op.varying {
		return op.cz[k]
	}
	return op.cz[k*op.nx+i]
}

// capacityOf returns the factor between the operator's rates and those of heat.
func (op *operator) capacityOf(cell int) float64 {
	if op.capacities != nil {
		return op.capacities[cell]
	}
	return op.capacity
}

// cellCapacity returns the heat capacity that the coefficients are not divided
// by yet.
func (op *operator) cellCapacity(cell int) float64 {
	if op.capacities != nil {
		return op.capacities[cell]
	}
	return 1
}

// bound sets what the stable step needs to know of conduction.
func (op *operator) bound() {
	op.decay, op.stiffness, op.softest = 0, 0, math.Inf(1)
	for k := range op.nz {
		for i := range op.nx {
			own, others := op.conduction(i, k)
			c := op.cellCapacity(k*op.nx + i)
			op.decay = math.Max(op.decay, own/c)
			op.stiffness = math.Max(op.stiffness, (own+others)/c)
			op.softest = math.Min(op.softest, op.kappa(i, k)/c)
		}
	}
}

// conduction returns the coefficient of a cell's own temperature in the heat
// per volume that it loses by conduction, and the sum of those of its
// neighbours in what it gains.
func (op *operator) conduction(i, k int) (own, others float64) {
	s, volume := op.stencil(i, k, nil, 0), op.dx[i]*op.dz[k]
	return s.centre / volume, -(s.south + s.west + s.east + s.north) / volume
}

// linearWeights returns the weights with which the cells before and after each
// face enter its linearly interpolated value. Those of the first and last face
// join the ends.
func linearWeights(h []float64) (before, after []float64) {
	n := len(h)
	before, after = make([]float64, n+1), make([]float64, n+1)
	for i := range before {
		a, b := h[(i+n-1)%n], h[i%n]
		before[i], after[i] = b/(a+b), a/(a+b)
	}
	return before, after
}

// upwindWeights returns the weights of the parabola whose means over the cells
// U, C and D are theirs, at the face between C and D (Colella & Woodward 1984,
// eq. 1.6 without its fourth cell). Next to a wall U is the wall itself and the
// value at the face continues the line from the wall through the centre of C.
func upwindWeights(h []float64, ring bool) rows.Upwind {
	n := len(h)
	var w rows.Upwind
	for d := range 2 {
		w.Down[d], w.Up[d] = make([]float64, n+1), make([]float64, n+1)
	}
	at := func(i int) float64 { return h[((i%n)+n)%n] }
	set := func(d, i int, u, c, e float64) {
		all := u + c + e
		w.Down[d][i] = c * (u + c) / ((c + e) * all)
		w.Up[d][i] = c * e / ((u + c) * all)
	}
	for i := range n + 1 {
		set(0, i, at(i-2), at(i-1), at(i))
		set(1, i, at(i+1), at(i), at(i-1))
	}
	if !ring && n > 1 {
		w.Down[0][1], w.Up[0][1] = 0, 1
		w.Down[1][n-1], w.Up[1][n-1] = 0, 1
	}
	return w
}

func inverses(h []float64) []float64 {
	inv := make([]float64, len(h))
	for i, v := range h {
		inv[i] = 1 / v
	}
	return inv
}

// same reports whether all values are equal.
func same(v []float64) bool {
	for _, x := range v {
		if x != v[0] {
			return false
		}
	}
	return true
}
