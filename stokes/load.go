package stokes

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/internal/multigrid"
	"example.org/overturn/stokes/staggered"
)

// A load is the force and the source of one Solve as the kernels see them: per
// control volume, and without the part of the force that a pressure balances
// for sure. A force that depends on z alone, or on x alone, moves nothing. In
// many layers it is far the largest part: the weight of the mean temperature
// of each depth. Left in, it would hide the residual of the flow.
type load struct {
	level  *multigrid.Level
	force  *staggered.Vector
	source *staggered.Scalar
	scale  float64

	meanX, meanZ []float64 // force taken out, per node
	pX, pZ       []float64 // pressure that balances it, per column and row
	shift        float64   // uniform force in x taken out, where the layer slides freely
	size         float64   // norm of what was taken out
	missing      float64   // source per volume that balances rounding
}

func newLoad(l *multigrid.Level) load {
	return load{
		level: l,
		meanX: make([]float64, l.X.N+2), pX: make([]float64, l.X.N+2),
		meanZ: make([]float64, l.Z.N+2), pZ: make([]float64, l.Z.N+2),
	}
}

// noiseLevel is the rounding error of a difference of two forces, relative to
// each, that is taken for zero.
const noiseLevel = 1e-14

// noise is the norm of the residual that rounding leaves of a force that was
// taken out as a whole.
func (ld *load) noise() float64 { return noiseLevel * ld.size }

// clear forgets all forces.
func (ld *load) clear() {
	ld.force, ld.source = nil, nil
	ld.shift, ld.size, ld.missing = 0, 0, 0
	clear(ld.meanX)
	clear(ld.meanZ)
	clear(ld.pX)
	clear(ld.pZ)
}

// set takes over force and source, which were checked before.
func (ld *load) set(sv *Solver, force *staggered.Vector, source *staggered.Scalar) error {
	ld.clear()
	ld.force, ld.source, ld.scale = force, source, sv.scale
	if err := ld.balanceSource(sv); err != nil {
		return err
	}
	if force == nil {
		return nil
	}
	ld.takeWeight()
	if sv.walls.Left.kind == periodic {
		clear(ld.meanX)
		if ld.level.Drifts() {
			if err := ld.takeShift(); err != nil {
				return err
			}
		}
	}
	ld.integrate()
	return nil
}

// balanceSource checks that the source equals the net outflow.
func (ld *load) balanceSource(sv *Solver) error {
	net, size := sv.motion.outflow(sv.grid)
	if ld.source == nil {
		if math.Abs(net) > fluxTolerance*size {
			return fmt.Errorf("stokes: normal velocities of the walls let out %.6g more than they let in (of %.6g in all), want no net flux", net, size)
		}
		return nil
	}
	nx, nz := sv.grid.Cells()
	sum, dx, dz := 0.0, sv.grid.DX(), sv.grid.DZ()
	for k := range nz {
		for i := range nx {
			v := ld.source.Values[k*nx+i] * dx[i] * dz[k]
			sum += v
			size += math.Abs(v)
		}
	}
	if math.Abs(sum-net) > fluxTolerance*size {
		return fmt.Errorf("stokes: source makes %.6g of volume per time and the walls let out %.6g, want the same", sum, net)
	}
	ld.missing = (net - sum) / sv.grid.Area()
	return nil
}

// takeWeight finds the mean vertical force of each row of faces and the mean
// horizontal force of each column.
func (ld *load) takeWeight() {
	x, z := &ld.level.X, &ld.level.Z
	nx, nz := x.N, z.N
	width, height := 0.0, 0.0
	for i := 1; i <= nx; i++ {
		width += x.H[i]
	}
	for j := 1; j <= nz; j++ {
		height += z.H[j]
	}
	for j := 1; j <= nz; j++ {
		fx, fz := ld.force.X[(j-1)*(nx+1):][:nx+1], ld.force.Z[(j-1)*nx:][:nx]
		sum := 0.0
		for i, f := range fz {
			sum += f * x.H[i+1]
		}
		ld.meanZ[j] = sum / width
		w := z.H[j] / height
		for i, f := range fx {
			ld.meanX[i+1] += f * w
		}
	}
}

// slideTolerance is the sum of the horizontal forces on a freely sliding layer,
// relative to the sum of their sizes, that counts as an error of sampling.
const slideTolerance = 1e-3

// takeShift takes out the horizontal force on the whole layer, which has to be
// zero but for rounding.
func (ld *load) takeShift() error {
	x, z, nx := &ld.level.X, &ld.level.Z, ld.level.X.N
	sum, size, area := 0.0, 0.0, 0.0
	for j := 1; j <= z.N; j++ {
		for i, f := range ld.force.X[(j-1)*(nx+1):][:nx] {
			v := x.D[i+1] * z.H[j]
			sum += f * v
			size += math.Abs(f) * v
			area += v
		}
	}
	if math.Abs(sum) > slideTolerance*size {
		return fmt.Errorf("stokes: horizontal force on a periodic layer between free-slip walls adds up to %.6g (of %.6g in all), want zero: nothing resists it", sum, size)
	}
	ld.shift = sum / area
	return nil
}

// integrate finds the pressure that balances the mean forces.
func (ld *load) integrate() {
	x, z := &ld.level.X, &ld.level.Z
	sum := 0.0
	for j := 2; j <= z.N; j++ {
		ld.pZ[j] = ld.pZ[j-1] + ld.meanZ[j]*z.D[j]
		sum += ld.meanZ[j] * ld.meanZ[j] * z.D[j]
	}
	width, height := 0.0, 0.0
	for j := 1; j <= z.N; j++ {
		height += z.H[j]
	}
	for i := 1; i <= x.N; i++ {
		width += x.H[i]
	}
	ld.size = sum * width
	sum = 0
	for i := 2; i <= x.N; i++ {
		ld.pX[i] = ld.pX[i-1] + ld.meanX[i]*x.D[i]
		sum += ld.meanX[i] * ld.meanX[i] * x.D[i]
	}
	ld.size = math.Sqrt(ld.size + sum*height)
}

// withWeight stores in dst row j of the pressure with the balance of weights.
func (ld *load) withWeight(dst, p []float64, j int) {
	pz, px := ld.pZ[j], ld.pX[1:]
	for i := range dst {
		dst[i] = p[i] + (px[i] + pz)
	}
}

// withoutWeight does the reverse.
func (ld *load) withoutWeight(dst, p []float64, j int) {
	pz, px := ld.pZ[j], ld.pX[1:]
	for i := range p {
		dst[i] = p[i] - (px[i] + pz)
	}
}

// AddRow implements [multigrid.Load].
func (ld *load) AddRow(j int, rx, rz, rp []float64) {
	nx := ld.level.X.N
	h, d := ld.level.X.H, ld.level.X.D
	dz, dzn := ld.level.Z.H[j], ld.level.Z.D[j]
	if ld.force != nil {
		fx, fz := ld.force.X[(j-1)*(nx+1):][:nx], ld.force.Z[(j-1)*nx:][:nx]
		rx, rz := rx[1:][:len(fx)], rz[1:][:len(fx)]
		meanX, d, h := ld.meanX[1:][:len(fx)], d[1:][:len(fx)], h[1:][:len(fx)]
		mean, shift := ld.meanZ[j], ld.shift
		fz = fz[:len(fx)]
		for i := range fx {
			rx[i] += (fx[i] - meanX[i] - shift) * d[i] * dz
			rz[i] += (fz[i] - mean) * h[i] * dzn
		}
	}
	if ld.source != nil {
		for i, s := range ld.source.Values[(j-1)*nx:][:nx] {
			rp[i+1] -= (s + ld.missing) * ld.scale * h[i+1] * dz
		}
	}
}

func (sv *Solver) checkLoad(force *staggered.Vector, source *staggered.Scalar) error {
	nx, nz := sv.grid.Cells()
	if force != nil {
		if !sv.grid.Equal(force.Grid) {
			return fmt.Errorf("stokes: force is on %v, want %v", force.Grid, sv.grid)
		}
		if err := checkNumbers("force.X", force.X, (nx+1)*nz); err != nil {
			return err
		}
		if err := checkNumbers("force.Z", force.Z, nx*(nz+1)); err != nil {
			return err
		}
	}
	if source != nil {
		if !sv.grid.Equal(source.Grid) {
			return fmt.Errorf("stokes: source is on %v, want %v", source.Grid, sv.grid)
		}
		return checkNumbers("source", source.Values, nx*nz)
	}
	return nil
}

// checkNumbers fails unless values holds want finite numbers.
func checkNumbers(name string, values []float64, want int) error {
	if err := checkCount(name, values, want); err != nil {
		return err
	}
	for i, v := range values {
		if !finite(v) {
			return fmt.Errorf("stokes: %s[%d] is %v, want a finite number", name, i, v)
		}
	}
	return nil
}

func checkCount(name string, values []float64, want int) error {
	if len(values) != want {
		return fmt.Errorf("stokes: %s holds %d numbers, want %d", name, len(values), want)
	}
	return nil
}
