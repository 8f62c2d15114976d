package stokestest

import (
	"math"
	"slices"

	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// A view is a case in a box whose lower left corner is at 0, perhaps in a
// mirror or in other units.
type view struct {
	exact.Case
	flipX, flipZ                bool
	length, velocity, viscosity float64 // factors
}

func viewOf(c exact.Case) view { return view{Case: c, length: 1, velocity: 1, viscosity: 1} }

// mirroredX, mirroredZ and inUnits return other views of the case.

func (v view) mirroredX() view {
	v.flipX = !v.flipX
	v.Walls.Left, v.Walls.Right = v.Walls.Right, v.Walls.Left
	return v
}

func (v view) mirroredZ() view {
	v.flipZ = !v.flipZ
	v.Walls.Bottom, v.Walls.Top = v.Walls.Top, v.Walls.Bottom
	return v
}

func (v view) inUnits(length, velocity, viscosity float64) view {
	v.length *= length
	v.velocity *= velocity
	v.viscosity *= viscosity
	return v
}

// stress returns the factor of stresses.
func (v view) stress() float64 { return v.viscosity * v.velocity / v.length }

// grid cuts the box into cells about as wide as the given share of its
// shorter side.
func (v view) grid(width, stretch float64) trial.Grid {
	b := v.Box
	width *= min(b.Width(), b.Height())
	edges := func(start, length float64, lines []float64) []float64 {
		lines = slices.Clone(lines)
		for i := range lines {
			lines[i] -= start
		}
		return trial.Edges(length, lines, width, stretch)
	}
	return trial.Grid{X: edges(b.Left, b.Width(), v.XLines), Z: edges(b.Bottom, b.Height(), v.ZLines)}
}

// point takes a point of the view to one of the case.
func (v view) point(x, z float64) (float64, float64) {
	return place(x/v.length, v.flipX, v.Box.Left, v.Box.Right, v.XLines), place(z/v.length, v.flipZ, v.Box.Bottom, v.Box.Top, v.ZLines)
}

// place returns where the coordinate s of the box is in the case. Next to a
// side or a line it returns that itself, so that rounding does not decide on
// which side of a jump a point is.
func place(s float64, flip bool, start, end float64, lines []float64) float64 {
	at := start + s
	if flip {
		at = end - s
	}
	near := 1e-12 * (end - start)
	for _, line := range lines {
		if math.Abs(at-line) < near {
			return line
		}
	}
	if math.Abs(at-start) < near {
		return start
	}
	if math.Abs(at-end) < near {
		return end
	}
	return at
}

// flow returns the exact flow at a point of the view.
func (v view) flow(x, z float64) exact.Fields {
	f := v.At(v.point(x, z))
	u, s := v.velocity, v.stress()
	sx, sz := sign(v.flipX), sign(v.flipZ)
	return exact.Fields{
		VX: u * sx * f.VX, VZ: u * sz * f.VZ, P: s * f.P,
		StrainRate: scaled(f.StrainRate, u/v.length, sx*sz),
		Stress:     scaled(f.Stress, s, sx*sz),
	}
}

func sign(flip bool) float64 {
	if flip {
		return -1
	}
	return 1
}

// scaled returns a tensor multiplied by factor; turn is the additional sign of
// the shear component.
func scaled(t exact.Tensor, factor, turn float64) exact.Tensor {
	return exact.Tensor{XX: factor * t.XX, ZZ: factor * t.ZZ, XZ: factor * turn * t.XZ}
}

// problem returns what a solver is asked for. The grid is in the units of the
// view.
func (v view) problem(g trial.Grid) Problem {
	hats := v.hats(g)
	perVolume := v.stress() / v.length
	return Problem{
		Name: v.Name,
		Grid: g,
		Viscosity: func(x, z float64) float64 {
			return v.viscosity * v.Viscosity(v.point(x, z))
		},
		Force: func(x, z float64) (bx, bz float64) {
			xc, zc := v.point(x, z)
			bx, bz = v.Force(xc, zc)
			bx, bz = sign(v.flipX)*perVolume*bx, sign(v.flipZ)*perVolume*bz
			for _, h := range hats {
				bz += sign(v.flipZ) * v.stress() * h.load.At(xc) * h.density(z)
			}
			return bx, bz
		},
		Walls: v.Walls,
		WallVelocity: func(x, z float64) (vx, vz float64) {
			f := v.flow(x, z)
			return f.VX, f.VZ
		},
	}
}

// A hat spreads the force on a line linearly over the cells below and above
// it. Linear functions of z on a grid add up to one, so that most rules of
// quadrature find the whole force.
type hat struct {
	load             exact.Sheet
	below, at, above float64
}

func (v view) hats(g trial.Grid) []hat {
	list := make([]hat, 0, len(v.Sheets))
	_, height := g.Size()
	for _, s := range v.Sheets {
		z := (s.Z - v.Box.Bottom) * v.length
		if v.flipZ {
			z = height - z
		}
		k := nearest(g.Z, z)
		list = append(list, hat{load: s, below: g.Z[k-1], at: g.Z[k], above: g.Z[k+1]})
	}
	return list
}

// density returns the share of the force per length at z.
func (h hat) density(z float64) float64 {
	peak := 2 / (h.above - h.below)
	if z < h.at {
		return peak * max(0, (z-h.below)/(h.at-h.below))
	}
	return peak * max(0, (h.above-z)/(h.above-h.at))
}

// nearest returns the inner edge that is nearest to s.
func nearest(edges []float64, s float64) int {
	best := 1
	for i := 1; i < len(edges)-1; i++ {
		if math.Abs(edges[i]-s) < math.Abs(edges[best]-s) {
			best = i
		}
	}
	return best
}

// scales returns the root mean squares of the exact velocity and of the exact
// stress without its mean pressure, over the middles of the cells: the sizes
// to which errors are relative.
func (v view) scales(g trial.Grid) (speed, stress float64) {
	of := func(f func(exact.Fields) float64) trial.Samples {
		s, err := trial.Function(func(x, z float64) float64 { return f(v.flow(x, z)) }).Sample(g)
		if err != nil { // exact solutions are finite in the middles of cells
			return trial.Samples{}
		}
		return s
	}
	vx, vz := of(func(f exact.Fields) float64 { return f.VX }), of(func(f exact.Fields) float64 { return f.VZ })
	mean := of(func(f exact.Fields) float64 { return f.P }).Mean()
	stress2 := of(func(f exact.Fields) float64 {
		xx, zz := f.Stress.XX+mean, f.Stress.ZZ+mean
		return 0.5*(xx*xx+zz*zz) + f.Stress.XZ*f.Stress.XZ
	})
	return math.Hypot(vx.RMS(), vz.RMS()), math.Sqrt(stress2.Mean())
}
