package exact

import (
	"fmt"
	"math"
)

// Cell is a temperature that dies away in the box 0 ≤ x ≤ Width,
// 0 ≤ z ≤ Height with a convection cell in it, sustained by a source:
//
//	T = exp(−Decay t) cos(πx/W) sin(πz/H) + 1 − z/H   between insulating sides
//	T = exp(−Decay t) sin(πx/W) sin(πz/H)             between isothermal sides
//	ψ = Velocity H/π sin(πx/W) sin(πz/H),  vx = ∂ψ/∂z,  vz = −∂ψ/∂x
//
// Top and bottom are isothermal. Between isothermal sides the stream lines are
// isotherms, and the flow carries no heat.
type Cell struct {
	Material
	Width, Height float64 // W and H; default 1
	Sides         Wall    // Insulating or Isothermal
	Velocity      float64 // largest one along x
	Decay         float64 // rate of decay; default 1
}

// fields returns T with ∂T/∂t, and ψ.
func (s Cell) fields(x, z, t float64) (temperature surface, rate float64, psi surface) {
	w, h, decay := orOne(s.Width), orOne(s.Height), orOne(s.Decay)
	amplitude := math.Exp(-decay * t)
	sinX, sinZ := wave(math.Pi/w, 0, x), wave(math.Pi/h, 0, z)
	psi = product(sinX.scaled(s.Velocity*h/math.Pi, 0), sinZ)
	if s.Sides == Isothermal {
		mode := product(sinX.scaled(amplitude, 0), sinZ)
		return mode, -decay * mode.value, psi
	}
	mode := product(wave(math.Pi/w, math.Pi/2, x).scaled(amplitude, 0), sinZ)
	return mode.plus(1, surface{value: 1 - z/h, z: -1 / h}), -decay * mode.value, psi
}

func (s Cell) state(x, z, t float64) State {
	temperature, _, _ := s.fields(x, z, t)
	k := s.conductivity()
	return State{Temperature: temperature.value, FluxX: -k * temperature.x, FluxZ: -k * temperature.z}
}

// Stream returns the stream function, as of [Manufactured.Stream].
func (s Cell) Stream(x, z float64) float64 {
	_, _, psi := s.fields(x, z, 0)
	return psi.value
}

// Solve implements [Problem].
func (s Cell) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Cell) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s Cell) Medium(x, z, t float64) Medium {
	temperature, rate, psi := s.fields(x, z, t)
	m := s.medium()
	m.VX, m.VZ = psi.z, -psi.x
	m.Source = m.HeatCapacity*(rate+m.VX*temperature.x+m.VZ*temperature.z) - m.Conductivity*(temperature.xx+temperature.zz)
	return m
}

// Domain implements [Solution]: the box, all times.
func (s Cell) Domain() Domain { return rectangle(orOne(s.Width), orOne(s.Height), forever) }

// Validate implements [Solution].
func (s Cell) Validate() error {
	if s.Sides != Insulating && s.Sides != Isothermal {
		return fmt.Errorf("exact: Cell.Sides is %v, want insulating or isothermal", s.Sides)
	}
	return first(
		s.check("Cell"),
		notNegative("Cell.Width", s.Width),
		notNegative("Cell.Height", s.Height),
		anyFinite("Cell.Velocity", s.Velocity),
		anyFinite("Cell.Decay", s.Decay),
	)
}
