package convection

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// A sampler computes diagnostics in memory of its own.
type sampler struct {
	sys    *system
	flux   []float64 // conducted into the box along a wall
	along  []float64 // velocity along the top
	bottom wallTemperature
	top    wallTemperature
}

func newSampler(sys *system) *sampler {
	dz, nx := sys.Grid.DZ(), sys.Grid.NX()
	n := len(dz)
	return &sampler{
		sys:    sys,
		flux:   make([]float64, nx),
		along:  make([]float64, nx+1),
		bottom: newWallTemperature(dz[0], dz[min(1, n-1)], n),
		top:    newWallTemperature(dz[n-1], dz[max(n-2, 0)], n),
	}
}

// A wallTemperature finds the temperature of a wall from the flux conducted
// through it and the first two cells: the one for which the parabola through
// wall and cells, with which package heat computes wall fluxes, has that flux.
type wallTemperature struct {
	resistance, first, second float64
}

// newWallTemperature takes the heights of the first two cells of n.
func newWallTemperature(h1, h2 float64, n int) wallTemperature {
	a, b := 0.5*h1, h1+0.5*h2
	if n == 1 {
		return wallTemperature{resistance: a, first: 1}
	}
	return wallTemperature{
		resistance: a * b / (a + b),
		first:      b * b / (b*b - a*a),
		second:     -a * a / (b*b - a*a),
	}
}

// diagnose returns the numbers of one state.
func (s *sampler) diagnose(t *staggered.Scalar, flow *staggered.Flow) (Diagnostics, error) {
	d := Diagnostics{
		RMSVelocity:     flow.RMS(),
		SurfaceVelocity: s.surfaceVelocity(flow),
		MeanTemperature: t.Mean(),
	}
	if err := s.heatFlow(&d, t); err != nil {
		return d, fmt.Errorf("convection: %w", err)
	}
	corners, err := s.sys.heat.CornerFluxes(t)
	if err != nil {
		return d, fmt.Errorf("convection: %w", err)
	}
	k := s.sys.Conductivity
	d.CornerGradients = [4]float64{-corners.TopLeft / k, -corners.TopRight / k, corners.BottomRight / k, corners.BottomLeft / k}
	d.BuoyancyWork = s.sys.work(t, flow)
	if s.sys.viscosity != nil {
		// What it holds may be of another temperature: one that was rejected.
		s.sys.viscosityTo(s.sys.viscosity, t)
	}
	if d.Dissipation, err = s.sys.stokes.DissipationTo(nil, flow, s.sys.viscosity); err != nil {
		return d, fmt.Errorf("convection: %w", err)
	}
	return d, nil
}

// dropRounding is the share of the temperature below which a difference between
// bottom and top is rounding: they are equal.
const dropRounding = 1e-12

// heatFlow sets heat flows and Nusselt numbers.
func (s *sampler) heatFlow(d *Diagnostics, t *staggered.Scalar) error {
	nz := s.sys.Grid.NZ()
	into, warm, err := s.wall(staggered.Bottom, s.bottom, t, 0, min(1, nz-1))
	if err != nil {
		return err
	}
	out, cold, err := s.wall(staggered.Top, s.top, t, nz-1, max(nz-2, 0))
	if err != nil {
		return err
	}
	drop := warm - cold
	if math.Abs(drop) <= dropRounding*max(math.Abs(warm), math.Abs(cold), extent(t)) {
		drop = 0
	}
	conducted := s.sys.Conductivity * drop / s.sys.Grid.Height()
	d.HeatFlowBottom, d.HeatFlowTop = into, -out
	d.NuBottom, d.NuTop = into/conducted, -out/conducted
	return nil
}

// extent returns the range of a temperature.
func extent(t *staggered.Scalar) float64 {
	lowest, highest := t.Extrema()
	return highest.Value - lowest.Value
}

// wall returns the mean flux conducted into the box through Bottom or Top and
// the mean temperature there.
func (s *sampler) wall(side staggered.Side, w wallTemperature, t *staggered.Scalar, k1, k2 int) (flux, temperature float64, err error) {
	if _, err := s.sys.heat.WallFluxTo(s.flux, side, t, nil); err != nil {
		return 0, 0, err
	}
	first, second := t.Row(k1), t.Row(k2)
	for i, dx := range s.sys.Grid.DX() {
		flux += s.flux[i] * dx
		temperature += (w.resistance*s.flux[i]/s.sys.Conductivity + w.first*first[i] + w.second*second[i]) * dx
	}
	width := s.sys.Grid.Width()
	return flux / width, temperature / width, nil
}

// surfaceVelocity integrates over the nodes of the top by the trapezoidal rule.
func (s *sampler) surfaceVelocity(flow *staggered.Flow) float64 {
	v := s.alongTop(flow)
	sum := 0.0
	for i, dx := range s.sys.Grid.DX() {
		sum += 0.5 * dx * (v[i]*v[i] + v[i+1]*v[i+1])
	}
	return math.Sqrt(sum / s.sys.Grid.Width())
}

// alongTop returns the velocity at the nodes of the top: the wall's own where
// fluid sticks to it, else, below a wall without shear stress, that of the
// parabola with its vertex on the wall through the two nearest rows.
func (s *sampler) alongTop(flow *staggered.Flow) []float64 {
	g, top := s.sys.Grid, s.sys.Walls.Top
	nx, nz := g.Cells()
	if top.Sticks() {
		for i, x := range g.XNodes() {
			s.along[i] = top.Velocity(x)
		}
		return s.along
	}
	if nz < 2 || top.Crossed() {
		return flow.TangentialTo(s.along, staggered.Top)
	}
	dz := g.DZ()
	a, b := 0.5*dz[nz-1], dz[nz-1]+0.5*dz[nz-2]
	near, next := b*b/(b*b-a*a), -a*a/(b*b-a*a)
	upper, lower := flow.VX[(nz-1)*(nx+1):][:nx+1], flow.VX[(nz-2)*(nx+1):][:nx+1]
	for i := range s.along {
		s.along[i] = near*upper[i] + next*lower[i]
	}
	return s.along
}
