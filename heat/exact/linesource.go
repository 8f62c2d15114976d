package exact

import "math"

// LineSource is heat set free at t = 0 on a line through the plane:
//
//	T = Heat/(4πkt) exp(−r²/(4κt))
//
// with r the distance from (X, Z) (Carslaw & Jaeger 1959, 10.3; section from
// memory).
type LineSource struct {
	Material
	Heat float64 // per length of the line; default 1
	X, Z float64 // place of the line
}

func (s LineSource) state(x, z, t float64) State {
	if t == 0 {
		if x == s.X && z == s.Z {
			return nowhere
		}
		return State{}
	}
	return spot{
		material: s.Material, heat: orOne(s.Heat) / (2 * math.Pi * s.capacity()),
		x: s.X, z: s.Z, spread: isotropic(0, s.Diffusivity()*t),
	}.at(x, z)
}

// Solve implements [Problem].
func (s LineSource) Solve() (Solution, error) { return checked(s) }

// At implements [Solution]. At t = 0 the line itself has no temperature: NaN.
func (s LineSource) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s LineSource) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: the plane, t ≥ 0.
func (s LineSource) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s LineSource) Validate() error {
	return checkSpot("LineSource", s.Material, s.Heat, 0, s.X, s.Z)
}
