package stability

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"example.org/overturn/stability/internal/element"
	"example.org/overturn/stability/internal/pencil"
	"example.org/overturn/stability/internal/piecewise"
)

// A Shell is a spherical shell of thickness 1, or a full sphere of radius 1,
// at rest. Lengths are in the thickness d, so that the radii are r_i = η/(1-η)
// and r_o = 1/(1-η) for a ratio η. Disturbances are spherical harmonics of
// degree l, with W = r u_r:
//
//	D_l²W = Ra l(l+1) (g/r) θ    σθ = D_l θ + f W/r    D_l = d²/dr² + (2/r) d/dr - l(l+1)/r²
//
// for a uniform viscosity, Ra being built on gravity at the outer radius, and
// f = -dT₀/dr. Their order does not matter to the onset. A Shell is a value,
// safe for concurrent use.
type Shell struct {
	// RadiusRatio is η = r_i/r_o, ≥ 0 and < 1. Zero is a full sphere.
	RadiusRatio float64

	// Inner and Outer are the boundaries. nil means Free.Isothermal(). A
	// sphere has no inner boundary. A Biot number is built on the thickness.
	Inner, Outer Boundary

	// Gravity at radius r over that at r_o. nil means 1 in a shell and r in a
	// sphere.
	Gravity func(r float64) float64

	// Gradient is f = -dT₀/dr in units of ΔT/d. nil means conduction between
	// isothermal boundaries a temperature ΔT apart, r_i r_o/r², in a shell, and
	// uniform heating, r, in a sphere: with 2βr the gradient and γr gravity,
	// the Rayleigh number is Chandrasekhar's C = 2βγ α R⁶/(κν) then.
	Gradient func(r float64) float64

	// Viscosity at radius r, relative to that in the Rayleigh number. nil
	// means 1.
	Viscosity func(r float64) float64

	// Breaks are radii at which one of the functions is not smooth.
	Breaks []float64

	// Prandtl is ν/κ, > 0. Zero stands for infinity.
	Prandtl float64
}

// A ShellOnset is a neutral state of a shell.
type ShellOnset struct {
	// Degree is that of the spherical harmonic.
	Degree int

	// Rayleigh is the neutral value and Error an estimate of its error.
	Rayleigh, Error float64

	// Mode is the shape along the radius.
	Mode *ShellMode
}

// A ShellGrowth is a growing disturbance of a shell.
type ShellGrowth struct {
	Degree int

	// Rate is in κ/d², Frequency in radians per d²/κ.
	Rate, Frequency, Error float64

	Mode *ShellMode
}

// largestDegree bounds the search for the most unstable degree.
const largestDegree = 2000

// Critical returns the onset of the most unstable degree.
func (s Shell) Critical() (ShellOnset, error) {
	q, err := s.question()
	if err != nil {
		return ShellOnset{}, err
	}
	var best answer
	best.value = math.Inf(1)
	degree := 0
	for l := 1; l <= largestDegree && q.lowerBound(wavenumberOfDegree(l)) < best.value; l++ {
		at, err := q.stationary(wavenumberOfDegree(l))
		if err != nil {
			return ShellOnset{}, err
		}
		if !(at.value < above(best.value)) && best.re != nil || at.missing() {
			continue
		}
		a, err := q.stationaryNeutral(wavenumberOfDegree(l))
		if err != nil && !errors.Is(err, ErrNotConverged) {
			return ShellOnset{}, err
		}
		if a.value < best.value {
			best, degree = a, l
		}
	}
	if degree == 0 {
		return ShellOnset{}, &NoOnsetError{
			Wavenumber: [2]float64{wavenumberOfDegree(1), wavenumberOfDegree(largestDegree)},
		}
	}
	return newShellOnset(degree, &best), nil
}

// Neutral returns the neutral state of a degree ≥ 1.
func (s Shell) Neutral(degree int) (ShellOnset, error) {
	q, err := s.question()
	if err != nil {
		return ShellOnset{}, err
	}
	if degree < 1 {
		return ShellOnset{}, &InputError{"degree", float64(degree), "≥ 1"}
	}
	k := wavenumberOfDegree(degree)
	a, err := q.stationaryNeutral(k)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return ShellOnset{}, err
	}
	if math.IsInf(a.value, 1) {
		return ShellOnset{}, &NoOnsetError{Wavenumber: [2]float64{k, k}}
	}
	return newShellOnset(degree, &a), err
}

// Growth returns the fastest-growing disturbance of a degree ≥ 1 at a Rayleigh
// number.
func (s Shell) Growth(rayleigh float64, degree int) (ShellGrowth, error) {
	q, err := s.question()
	if err != nil {
		return ShellGrowth{}, err
	}
	if degree < 1 {
		return ShellGrowth{}, &InputError{"degree", float64(degree), "≥ 1"}
	}
	if math.IsNaN(rayleigh) || math.IsInf(rayleigh, 0) {
		return ShellGrowth{}, &InputError{"Rayleigh number", rayleigh, "finite"}
	}
	g := growing{engine: q.engine, drive: [3]float64{rayleigh}}
	a, err := g.at(wavenumberOfDegree(degree), 0)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return ShellGrowth{}, err
	}
	return ShellGrowth{degree, real(a.Sigma), math.Abs(imag(a.Sigma)), a.valueError, newShellMode(&a)}, err
}

func newShellOnset(degree int, a *answer) ShellOnset {
	return ShellOnset{Degree: degree, Rayleigh: a.value, Error: a.valueError, Mode: newShellMode(a)}
}

// wavenumberOfDegree is what takes the place of k in a shell: √(l(l+1)).
func wavenumberOfDegree(l int) float64 { return math.Sqrt(float64(l) * float64(l+1)) }

// Radii returns the inner and the outer radius, in units of the thickness.
func (s Shell) Radii() (inner, outer float64) {
	return s.RadiusRatio / (1 - s.RadiusRatio), 1 / (1 - s.RadiusRatio)
}

// profiles returns the functions of the radius with their defaults.
func (s Shell) profiles() (gravity, gradient, viscosity func(r float64) float64) {
	inner, outer := s.Radii()
	gravity, gradient, viscosity = s.Gravity, s.Gradient, s.Viscosity
	one := func(float64) float64 { return 1 }
	identity := func(r float64) float64 { return r }
	if gravity == nil {
		if gravity = one; inner == 0 {
			gravity = identity
		}
	}
	if gradient == nil {
		if gradient = (func(r float64) float64 { return inner * outer / (r * r) }); inner == 0 {
			gradient = identity
		}
	}
	if viscosity == nil {
		viscosity = one
	}
	return gravity, gradient, viscosity
}

// question checks the shell and prepares its discretisation.
func (s Shell) question() (*question, error) {
	if !(s.RadiusRatio >= 0 && s.RadiusRatio < 1) {
		return nil, &InputError{"Shell.RadiusRatio", s.RadiusRatio, "≥ 0 and < 1"}
	}
	if !(s.Prandtl >= 0) {
		return nil, &InputError{"Shell.Prandtl", s.Prandtl, "> 0, or 0 for infinity"}
	}
	if err := conditionsOf(s.Inner).check("inner boundary", false); err != nil {
		return nil, err
	}
	if err := conditionsOf(s.Outer).check("outer boundary", false); err != nil {
		return nil, err
	}
	b, nodes, degree, err := s.resolve()
	if err != nil {
		return nil, err
	}
	scale := 1 / math.Sqrt(max(1, b.lower(wavenumberOfDegree(2), ThermalRayleigh, [3]float64{})))
	e := &engine{bound: b, diffuses: true, from: leastWavenumber, tolerance: DefaultTolerance, maxUnknowns: DefaultMaxUnknowns}
	e.still = &ladder{system: s.system(true, scale, nodes, degree)}
	e.moving = &ladder{system: s.system(false, scale, nodes, degree)}
	return &question{engine: e, number: ThermalRayleigh}, nil
}

// resolve checks the profiles and returns what they imply: a bound, a mesh, and
// the largest polynomial degree.
func (s Shell) resolve() (*shellBound, []float64, int, error) {
	inner, outer := s.Radii()
	gravity, gradient, viscosity := s.profiles()
	b := &shellBound{inner: inner, outer: outer, least: math.Inf(1)}
	nodes := []float64{inner, outer}
	degree := 0
	for _, p := range []struct {
		name  string
		f     func(float64) float64
		scale piecewise.Scale
	}{{"gravity", gravity, piecewise.Global}, {"base temperature gradient", gradient, piecewise.Global}, {"viscosity", viscosity, piecewise.Local}} {
		f, err := piecewise.Resolve(p.f, inner, outer, s.Breaks, p.scale)
		if err != nil {
			return nil, nil, 0, valueError(p.name, "finite", err)
		}
		nodes = append(nodes, f.Nodes...)
		degree = max(degree, f.Degree())
	}
	var g, f, rg, rf float64
	for i := range 1001 {
		r := inner + float64(i)/1000
		eta := viscosity(r)
		if !(eta > 0) {
			return nil, nil, 0, &InputError{fmt.Sprintf("viscosity at r = %g", r), eta, "finite and > 0"}
		}
		b.least = min(b.least, eta/boundFactor)
		rg, rf = max(rg, math.Abs(r*gravity(r))), max(rf, math.Abs(r*gradient(r)))
		g, f = max(g, math.Abs(r*r*gravity(r))), max(f, math.Abs(r*r*gradient(r)))
	}
	b.weighted, b.local = g*f*boundFactor*boundFactor, rg*rf*boundFactor*boundFactor
	b.thermal = inner * inner * firstEigenvalue(conditionsOf(s.Inner).biot, conditionsOf(s.Outer).biot)
	slices.Sort(nodes)
	nodes = slices.CompactFunc(nodes, func(a, b float64) bool { return math.Abs(b-a) < sameNode })
	nodes[len(nodes)-1] = outer
	return b, nodes, degree, nil
}

// A shellBound limits what disturbances of a shell can do. For a uniform
// viscosity the dissipation of a harmonic, times L = l(l+1), is
//
//	∫ r²W″² + 2(L+1)W'² + L(L-2)W²/r² dr
//
// under either mechanical condition: at least η times a multiple of ∫W²/r².
type shellBound struct {
	inner, outer float64
	least        float64 // viscosity
	thermal      float64 // ∫r²θ'² over ∫θ²
	weighted     float64 // max|r²g| max|r²f|
	local        float64 // max|rg| max|rf|
}

func (b *shellBound) stiffness(l float64) float64 {
	hardy := max(0.25, math.Pi*math.Pi*b.inner*b.inner) // ∫W'² over ∫W²/r²
	return b.least * (l*(l-2) + 2*(l+1)*hardy)
}

// lower bounds the Rayleigh number at k = √L.
func (b *shellBound) lower(k float64, _ Number, _ [3]float64) float64 {
	l := k * k
	return b.stiffness(l) * (l + b.thermal) / (l * b.weighted)
}

// growth bounds the growth rate.
func (b *shellBound) growth(k float64, drive [3]float64) float64 {
	l := k * k
	return max(0, l*math.Abs(drive[0])*b.local/b.stiffness(l)-l/(b.outer*b.outer))
}

// system builds the equations of a shell. With U = W/r and X = W' + W/r, the
// dissipation of a harmonic with L = l(l+1), times L, is
//
//	∫ η r² {2L U'Ũ' + (W″+(L-2)W/r²)(~) + (2/r²)[(L-1)XX̃ - L(UX̃+XŨ) + 2L UŨ]} dr
//
// and k stands for √L.
func (s Shell) system(still bool, scale float64, nodes []float64, degree int) *system {
	sys := newSystem(scale, still)
	sys.nodes = nodes
	sys.operator.Excess = degree + 6 // factors of 1/r included
	gravity, gradient, viscosity := s.profiles()
	inner, outer := conditionsOf(s.Inner), conditionsOf(s.Outer)
	flow := element.Field{Class: element.C1, Fixed: [2]int{1, 1}}
	heat := element.Field{Class: element.C0}
	biot := [2]float64{inner.biot, outer.biot}
	if s.RadiusRatio == 0 {
		biot[0] = 0 // the centre is no boundary: r² kills its flux
	} else if inner.wall == Rigid {
		flow.Fixed[0] = 2
	}
	if outer.wall == Rigid {
		flow.Fixed[1] = 2
	}
	for i, b := range biot {
		if math.IsInf(b, 1) {
			heat.Fixed[i], biot[i] = 1, 0
		}
	}
	sys.velocity = sys.field(flow)
	sys.temperature = sys.field(heat)
	sys.shellFlow(viscosity, s.Prandtl)
	sys.shellHeat(biot, nodes[0], nodes[len(nodes)-1])
	w, t := sys.velocity, sys.temperature
	force := sys.coefficient(func(r float64) float64 { return r * gravity(r) })
	advected := sys.coefficient(func(r float64) float64 { return r * gradient(r) })
	sys.add(integral{pencil.FirstDrive, 1, w, t, force}, 0, 0, -scale)
	sys.add(integral{pencil.Base, 1, t, w, advected}, 0, 0, -1/scale)
	return sys
}

func (s *system) shellFlow(viscosity func(float64) float64, prandtl float64) {
	w := s.velocity
	times := func(power float64) int {
		return s.coefficient(func(r float64) float64 { return viscosity(r) * math.Pow(r, power) })
	}
	add := func(power, coefficient int, i, j int, scale float64) {
		s.add(integral{pencil.Base, power, w, w, coefficient}, i, j, scale)
		if i != j {
			s.add(integral{pencil.Base, power, w, w, coefficient}, j, i, scale)
		}
	}
	r2, r0, inv1, inv2 := times(2), times(0), times(-1), times(-2)
	// L⁰: r²(W″-2W/r²)(~) - 2XX̃
	add(0, r2, 2, 2, 1)
	add(0, r0, 2, 0, -2)
	add(0, inv2, 0, 0, 4)
	add(0, r0, 1, 1, -2)
	add(0, inv1, 1, 0, -2)
	add(0, inv2, 0, 0, -2)
	// L¹: 2r²U'Ũ' + W″W̃ + WW̃″ - 4WW̃/r² + 2XX̃ - 2(UX̃+XŨ) + 4UŨ
	add(2, r0, 1, 1, 2)
	add(2, inv1, 1, 0, -2)
	add(2, inv2, 0, 0, 2)
	add(2, r0, 2, 0, 1)
	add(2, inv2, 0, 0, -4)
	add(2, r0, 1, 1, 2)
	add(2, inv1, 1, 0, 2)
	add(2, inv2, 0, 0, 2)
	add(2, inv1, 1, 0, -2)
	add(2, inv2, 0, 0, -4)
	add(2, inv2, 0, 0, 4)
	// L²: WW̃/r²
	add(4, inv2, 0, 0, 1)
	if prandtl == 0 || math.IsInf(prandtl, 1) {
		return
	}
	// (σ/Pr) ∫ (r²XX̃ + L r²UŨ)
	square := s.coefficient(func(r float64) float64 { return r * r })
	first := s.coefficient(func(r float64) float64 { return r })
	mass := integral{pencil.Mass, 0, w, w, square}
	s.add(mass, 1, 1, -1/prandtl)
	mass.coefficient = first
	s.add(mass, 1, 0, -1/prandtl)
	s.add(mass, 0, 1, -1/prandtl)
	mass.coefficient = 0
	s.add(mass, 0, 0, -1/prandtl)
	mass.power = 2
	s.add(mass, 0, 0, -1/prandtl)
}

// shellHeat adds ∫ r²θ'φ' + Lθφ + σr²θφ and the fluxes r²Bi θφ at the ends.
func (s *system) shellHeat(biot [2]float64, inner, outer float64) {
	t := s.temperature
	square := s.coefficient(func(r float64) float64 { return r * r })
	s.add(integral{pencil.Base, 0, t, t, square}, 1, 1, 1)
	s.add(integral{pencil.Base, 2, t, t, 0}, 0, 0, 1)
	s.add(integral{pencil.Mass, 0, t, t, square}, 0, 0, -1)
	for end, r := range []float64{inner, outer} {
		s.addEnd(integral{pencil.Base, 0, t, t, 0}, end, 0, 0, biot[end]*r*r)
	}
}

// A ShellMode is the shape of a disturbance of a shell along the radius. Its
// amplitude is arbitrary: the largest W = r u_r is 1.
type ShellMode struct{ mode *Mode }

func newShellMode(a *answer) *ShellMode {
	m := newMode(a)
	if m == nil {
		return nil
	}
	return &ShellMode{m}
}

// RadialVelocity returns the amplitude of u_r at radius r > 0.
func (m *ShellMode) RadialVelocity(r float64) float64 { return m.mode.Velocity(r) / r }

// Temperature returns the amplitude of the temperature at radius r.
func (m *ShellMode) Temperature(r float64) float64 { return m.mode.Temperature(r) }
