package exact

import "math"

// Manufactured is a smooth temperature in a box with walls of any kinds, in a
// material whose conductivity and capacity vary and in a closed flow. Temperature
// and coefficients are chosen, and the source is what the equation asks for. In
// the box 0 ≤ x ≤ W = Width, 0 ≤ z ≤ H = Height,
//
//	T = 1 + 0.8 sin(a X + 0.4) cos(1.7 Z/H + 0.3) + 0.3 exp(−Decay t) B
//
// where X = x, Z = z and a = 2.3/W, except that beside an insulating wall X or Z
// is a half or a quarter of a cosine without slope there, and that a = 2π/W where
// the sides are periodic. B = sin²(πx/W) sin²(πz/H) vanishes at all walls
// together with its slope, so that the conditions of the walls do not change in
// time; with periodic sides it is (1 + ½ sin(2πx/W)) sin²(πz/H). With C = Contrast,
//
//	k  = Conductivity C^(½ sin(2πx/W + 0.7) cos(1.9 z/H + 0.3))
//	ρcp = HeatCapacity C^(½ sin(2πx/W + 2) cos(1.3 z/H + 1))
//
// and the stream function, vx = ∂ψ/∂z and vz = −∂ψ/∂x, is
//
//	ψ = Velocity H/π sin(πx/W) sin(πz/H) (1 + ½ sin(2πx/W + 1)),
//
// without the first sine where the sides are periodic, so that fluid passes
// through them.
type Manufactured struct {
	Material
	Walls         Walls
	Width, Height float64 // default 1
	Contrast      float64 // largest ratio of conductivities, and of capacities; default 1
	Velocity      float64 // zero is a body at rest
	Decay         float64 // zero is a steady temperature
}

func (s Manufactured) periodic() bool { return s.Walls.Left == Periodic }

// flat maps the coordinate s of a span of the given length so that it has no
// slope at the ends that insulate.
func flat(low, high Wall, length, s float64) curve {
	switch {
	case low == Insulating && high == Insulating:
		return wave(math.Pi/length, -math.Pi/2, s).scaled(length/2, length/2)
	case low == Insulating:
		return wave(math.Pi/(2*length), -math.Pi/2, s).scaled(length, length)
	case high == Insulating:
		return wave(math.Pi/(2*length), 0, s).scaled(length, 0)
	}
	return line(s)
}

// bump is sin² over the span.
func bump(length, s float64) curve {
	w := wave(math.Pi/length, 0, s)
	return w.times(w)
}

// temperature returns T, and ∂T/∂t.
func (s Manufactured) temperature(x, z, t float64) (temperature surface, rate float64) {
	w, h := orOne(s.Width), orOne(s.Height)
	k, hillX := 2.3/w, bump(w, x)
	if s.periodic() {
		k, hillX = 2*math.Pi/w, wave(2*math.Pi/w, 0, x).scaled(0.5, 1)
	}
	alongX, alongZ := flat(s.Walls.Left, s.Walls.Right, w, x), flat(s.Walls.Bottom, s.Walls.Top, h, z)
	base := product(
		wave(k, 0.4, alongX[0]).of(alongX),
		wave(1.7/h, 0.3+math.Pi/2, alongZ[0]).of(alongZ),
	)
	hill, amplitude := product(hillX, bump(h, z)), 0.3*math.Exp(-s.Decay*t)
	temperature = surface{value: 1}.plus(0.8, base).plus(amplitude, hill)
	return temperature, -s.Decay * amplitude * hill.value
}

// varying returns mean·Contrast^(½g) for the g of conductivity or capacity.
func (s Manufactured) varying(mean, phase, k, phaseZ, x, z float64) surface {
	w, h := orOne(s.Width), orOne(s.Height)
	growth := math.Log(orOne(s.Contrast)) / 2
	return product(wave(2*math.Pi/w, phase, x).scaled(growth, 0), wave(k/h, phaseZ+math.Pi/2, z)).exp(mean)
}

func (s Manufactured) conductivityAt(x, z float64) surface {
	return s.varying(s.conductivity(), 0.7, 1.9, 0.3, x, z)
}

// stream returns ψ.
func (s Manufactured) stream(x, z float64) surface {
	w, h := orOne(s.Width), orOne(s.Height)
	alongX := wave(2*math.Pi/w, 1, x).scaled(0.5, 1)
	if !s.periodic() {
		alongX = alongX.times(wave(math.Pi/w, 0, x))
	}
	return product(alongX.scaled(s.Velocity*h/math.Pi, 0), wave(math.Pi/h, 0, z))
}

// Stream returns the stream function, whose differences along the faces of
// cells are a flow free of divergence.
func (s Manufactured) Stream(x, z float64) float64 { return s.stream(x, z).value }

func (s Manufactured) state(x, z, t float64) State {
	temperature, _ := s.temperature(x, z, t)
	k := s.conductivityAt(x, z).value
	return State{Temperature: temperature.value, FluxX: -k * temperature.x, FluxZ: -k * temperature.z}
}

// Solve implements [Problem].
func (s Manufactured) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Manufactured) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s Manufactured) Medium(x, z, t float64) Medium {
	temperature, rate := s.temperature(x, z, t)
	k, psi := s.conductivityAt(x, z), s.stream(x, z)
	c := s.varying(s.capacity(), 2, 1.3, 1, x, z).value
	carried := psi.z*temperature.x - psi.x*temperature.z
	conducted := k.value*(temperature.xx+temperature.zz) + k.x*temperature.x + k.z*temperature.z
	return Medium{
		Conductivity: k.value, HeatCapacity: c,
		Source: c*(rate+carried) - conducted,
		VX:     psi.z, VZ: -psi.x,
	}
}

// Domain implements [Solution]: the box, all times.
func (s Manufactured) Domain() Domain {
	return rectangle(orOne(s.Width), orOne(s.Height), forever)
}

// Validate implements [Solution].
func (s Manufactured) Validate() error {
	return first(
		s.check("Manufactured"),
		s.Walls.check("Manufactured"),
		notNegative("Manufactured.Width", s.Width),
		notNegative("Manufactured.Height", s.Height),
		notNegative("Manufactured.Contrast", s.Contrast),
		anyFinite("Manufactured.Velocity", s.Velocity),
		anyFinite("Manufactured.Decay", s.Decay),
	)
}
