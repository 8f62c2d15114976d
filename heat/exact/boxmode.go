package exact

import (
	"fmt"
	"math"
)

// BoxMode is a harmonic that dies away in a box whose walls are at 0:
//
//	T = Amplitude sin(Mπx/Width) sin(Nπz/Height) exp(Rate t),  Rate = −κπ² (M²/Width² + N²/Height²)
//
// (separation of variables).
type BoxMode struct {
	Material
	Width, Height float64 // default 1
	M, N          int     // half waves in the box; default 1
	Amplitude     float64 // of temperature; default 1
}

// wavenumbers returns Mπ/Width and Nπ/Height.
func (s BoxMode) wavenumbers() (kx, kz float64) {
	return float64(oneHalfWave(s.M)) * math.Pi / orOne(s.Width), float64(oneHalfWave(s.N)) * math.Pi / orOne(s.Height)
}

func oneHalfWave(n int) int {
	if n == 0 {
		return 1
	}
	return n
}

// Rate returns the rate of change of the mode, < 0.
func (s BoxMode) Rate() float64 {
	kx, kz := s.wavenumbers()
	return -s.Diffusivity() * (kx*kx + kz*kz)
}

// FivePointRate returns the rate of the same mode where second derivatives are
// differences of neighbours at the distances hx and hz,
// −κ [4/hx² sin²(kx hx/2) + 4/hz² sin²(kz hz/2)].
func (s BoxMode) FivePointRate(hx, hz float64) float64 {
	kx, kz := s.wavenumbers()
	sx, sz := 2/hx*math.Sin(kx*hx/2), 2/hz*math.Sin(kz*hz/2)
	return -s.Diffusivity() * (sx*sx + sz*sz)
}

func (s BoxMode) state(x, z, t float64) State {
	kx, kz := s.wavenumbers()
	amplitude, k := orOne(s.Amplitude)*math.Exp(s.Rate()*t), s.conductivity()
	sinX, cosX := math.Sincos(kx * x)
	sinZ, cosZ := math.Sincos(kz * z)
	return State{
		Temperature: amplitude * sinX * sinZ,
		FluxX:       -k * amplitude * kx * cosX * sinZ,
		FluxZ:       -k * amplitude * kz * sinX * cosZ,
	}
}

// Solve implements [Problem].
func (s BoxMode) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s BoxMode) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s BoxMode) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: the box, all times.
func (s BoxMode) Domain() Domain { return rectangle(orOne(s.Width), orOne(s.Height), forever) }

// Validate implements [Solution].
func (s BoxMode) Validate() error {
	if s.M < 0 || s.N < 0 {
		return fmt.Errorf("exact: BoxMode.M and N are %d and %d, want >= 0", s.M, s.N)
	}
	return first(
		s.check("BoxMode"),
		notNegative("BoxMode.Width", s.Width),
		notNegative("BoxMode.Height", s.Height),
		anyFinite("BoxMode.Amplitude", s.Amplitude),
	)
}
