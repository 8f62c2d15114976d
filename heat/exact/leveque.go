package exact

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// Leveque is the thermal boundary layer of a shear flow v = (Shear·z, 0) along a
// wall z = 0 that is at the temperature Wall from x = 0 on:
//
//	T = Wall + (Far − Wall) P(1/3, η³/9),  η = z (Shear/(κx))^(1/3)
//
// with P the regularised lower incomplete gamma function (Lévêque 1928).
// Conduction along x is left out, of the solution and of its FluxX: the full
// equation holds where x is many times (κ/Shear)^(1/2).
type Leveque struct {
	Material
	Shear     float64 // velocity per distance; default 1
	Wall, Far float64 // temperatures
}

// levequeGradient is 1/(9^(1/3) Γ(4/3)).
var levequeGradient = 1 / (math.Cbrt(9) * math.Gamma(4.0/3))

// layerScale returns (Shear/(κx))^(1/3).
func (s Leveque) layerScale(x float64) float64 {
	return math.Cbrt(orOne(s.Shear) / (s.Diffusivity() * x))
}

// WallGradient returns ∂T/∂z at the wall.
func (s Leveque) WallGradient(x float64) float64 {
	return (s.Far - s.Wall) * levequeGradient * s.layerScale(x)
}

func (s Leveque) state(x, z, _ float64) State {
	if z == 0 {
		return State{Temperature: s.Wall, FluxZ: -s.conductivity() * s.WallGradient(x)}
	}
	eta := z * s.layerScale(x)
	if math.IsInf(eta, 1) {
		return State{Temperature: s.Far}
	}
	y := eta * eta * eta / 9
	return State{
		Temperature: s.Wall + (s.Far-s.Wall)*mathext.GammaIncReg(1.0/3, y),
		FluxZ:       -s.conductivity() * s.WallGradient(x) * math.Exp(-y),
	}
}

// Solve implements [Problem].
func (s Leveque) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Leveque) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s Leveque) Medium(_, z, _ float64) Medium {
	m := s.medium()
	m.VX = orOne(s.Shear) * z
	return m
}

// Domain implements [Solution]: x ≥ 0, z ≥ 0.
func (s Leveque) Domain() Domain { return Domain{0, far, 0, far, forever} }

// Validate implements [Solution].
func (s Leveque) Validate() error {
	return first(
		s.check("Leveque"),
		notNegative("Leveque.Shear", s.Shear),
		anyFinite("Leveque.Wall", s.Wall),
		anyFinite("Leveque.Far", s.Far),
	)
}
