package exact

import "math"

// SlabRobin is a slab with a plane of symmetry, or an insulated face, at z = 0
// and a face at z = Thickness that exchanges heat with surroundings from t = 0
// on, the flux out of it being Coefficient (T − Ambient):
//
//	T = Ambient + (Initial − Ambient) Σ 4 sin β/(2β + sin 2β) cos(βz/L) exp(−β²κt/L²)
//
// over the roots of β tan β = Bi = Coefficient L/k (Carslaw & Jaeger 1959, 3.11;
// section from memory). At early times, where this sum converges slowly, the
// face and its mirror image act as half-spaces do.
type SlabRobin struct {
	Material
	Thickness   float64 // L, half of that of the symmetric slab; default 1
	Initial     float64 // temperature
	Ambient     float64 // temperature of the surroundings
	Coefficient float64 // of heat transfer; default 1
}

// earlySlabRobin is the κt/L² below which faces do not feel the images of each
// other to rounding; above it sixteen harmonics suffice.
const (
	earlySlabRobin     = 0.025
	slabRobinHarmonics = 16
)

// Biot returns Coefficient·Thickness/k.
func (s SlabRobin) Biot() float64 {
	return orOne(s.Coefficient) * orOne(s.Thickness) / s.conductivity()
}

// Root returns β number n = 0, 1, … of β tan β = Bi.
func (s SlabRobin) Root(n int) float64 { return biotRoot(n, s.Biot()) }

// biotRoot solves β − nπ = atan(Bi/β). The difference is concave and rises, so
// that Newton's method climbs to the root from any point below it: nπ, or for
// n = 0 the bound that tan β < β/(1 − 4β²/π²) gives.
func biotRoot(n int, bi float64) float64 {
	low := float64(n) * math.Pi
	beta := low
	if n == 0 {
		beta = math.Sqrt(bi / (1 + 4*bi/(math.Pi*math.Pi)))
	}
	for {
		next := beta + (math.Atan2(bi, beta)-(beta-low))/(1+bi/(beta*beta+bi*bi))
		if !(next > beta*(1+1e-15)) {
			return max(next, beta)
		}
		beta = next
	}
}

func (s SlabRobin) profile(z, t float64) (float64, float64) {
	l := orOne(s.Thickness)
	tau, zeta := s.Diffusivity()*t/(l*l), z/l
	step := s.Initial - s.Ambient
	var theta, slope float64
	if tau < earlySlabRobin {
		near, nearSlope := robinStep(1-zeta, tau, s.Biot())
		image, imageSlope := robinStep(1+zeta, tau, s.Biot())
		theta, slope = 1-near-image, nearSlope-imageSlope
	} else {
		theta, slope = s.late(zeta, tau)
	}
	return s.Ambient + step*theta, -s.conductivity() * step * slope / l
}

func (s SlabRobin) late(zeta, tau float64) (theta, slope float64) {
	bi := s.Biot()
	for n := range slabRobinHarmonics {
		beta := biotRoot(n, bi)
		amplitude := 4 * math.Sin(beta) / (2*beta + math.Sin(2*beta)) * math.Exp(-beta*beta*tau)
		sin, cos := math.Sincos(beta * zeta)
		theta += amplitude * cos
		slope -= amplitude * beta * sin
		if beta*beta*tau > 60 {
			break
		}
	}
	return theta, slope
}

// Solve implements [Problem].
func (s SlabRobin) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s SlabRobin) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s SlabRobin) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: 0 ≤ z ≤ Thickness, t ≥ 0.
func (s SlabRobin) Domain() Domain { return layer(orOne(s.Thickness), 0) }

// Validate implements [Solution].
func (s SlabRobin) Validate() error {
	return first(
		s.check("SlabRobin"),
		notNegative("SlabRobin.Thickness", s.Thickness),
		anyFinite("SlabRobin.Initial", s.Initial),
		anyFinite("SlabRobin.Ambient", s.Ambient),
		notNegative("SlabRobin.Coefficient", s.Coefficient),
	)
}
