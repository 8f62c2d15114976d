package stability

import (
	"math"

	"example.org/overturn/stability/internal/pencil"
)

// A bound limits from below every driving number at which a disturbance of
// wavenumber k can be neutral, stationary or not. Multiply the momentum equation
// by w and integrate. Neither rotation nor a magnetic field does work on a
// neutral mode on balance, so that
//
//	a(w,w) ≤ k² ∫ (Ra θ - Ra_S s) w + stress at the top,
//
// and the heat equation gives ‖θ‖ ≤ max|f| ‖w‖ / (k² + λ), with λ the smallest
// eigenvalue of -D² under the thermal conditions. Where the sum of all driving
// terms, each over its bound, is below 1, nothing is neutral.
type bound struct {
	// stiffness coefficients: a(w,w) ≥ (a₀ + a₂k² + a₄k⁴) ∫w²
	a0, a2, a4 float64
	softness   *softness
	viscosity  float64 // smallest
	gradient   float64 // largest |f|
	thermal    float64 // λ
	inertia    float64 // 1/Pr

	concentration, diffusivity float64 // largest |h|, τ
	solutal                    float64 // λ of the solute

	heats  bool // a uniform gradient f > 0: a negative Ra only stabilises
	weighs bool // a uniform gradient h > 0: a positive Ra_S only stabilises
}

// Smallest eigenvalues of D⁴ for a clamped and a hinged end: (βL)⁴ of beams.
const (
	clampedClamped = 500.5639 // rounded down
	clampedHinged  = 237.7210
)

func newBound(l *Layer, base *baseState, eta *viscosityState) bound {
	bottom, top := conditionsOf(l.Bottom), conditionsOf(l.Top)
	b := bound{
		viscosity: eta.least, gradient: base.largest, thermal: firstEigenvalue(bottom.biot, top.biot),
		heats: base.uniform && base.gradient(0.5) > 0, inertia: l.inertia(), diffusivity: 1,
	}
	switch {
	case l.Porous == Darcy:
		b.a0, b.a2 = porousStiffness(bottom.wall, top.wall), 1
	case bottom.wall == Rigid && top.wall == Rigid:
		b.a0, b.a2, b.a4 = clampedClamped, 2*math.Pi*math.Pi, 1
	case bottom.wall == Rigid || top.wall == Rigid:
		b.a0, b.a2, b.a4 = clampedHinged, 2*math.Pi*math.Pi, 1
	default:
		b.a0, b.a2, b.a4 = math.Pow(math.Pi, 4), 2*math.Pi*math.Pi, 1
	}
	b.a0, b.a2, b.a4 = b.a0*eta.least, b.a2*eta.least, b.a4*eta.least
	if l.Solute.Diffusivity > 0 {
		b.soluteBound(l, base)
	}
	return b
}

func (b *bound) soluteBound(l *Layer, base *baseState) {
	biot := func(w SoluteWall) float64 {
		if w == FixedConcentration {
			return math.Inf(1)
		}
		return 0
	}
	b.solutal = firstEigenvalue(biot(l.Solute.Bottom), biot(l.Solute.Top))
	h, uniform := 1.0, true
	if base.solute != nil {
		h = largest(base.solute)
		uniform = base.solute.Constant() && base.solute.At(0) > 0
	}
	b.concentration, b.diffusivity, b.weighs = h, l.Solute.Diffusivity, uniform
}

// porousStiffness returns the smallest eigenvalue of -D².
func porousStiffness(bottom, top Wall) float64 {
	switch {
	case bottom == Permeable && top == Permeable:
		return 0
	case bottom == Permeable || top == Permeable:
		return math.Pi * math.Pi / 4
	}
	return math.Pi * math.Pi
}

// firstEigenvalue returns the smallest eigenvalue μ² of -D² with Dθ = b θ at 0
// and Dθ = -c θ at 1, which solves (μ² - b c) sin μ = μ (b + c) cos μ with
// 0 ≤ μ ≤ π.
func firstEigenvalue(b, c float64) float64 {
	if math.IsInf(b, 1) && math.IsInf(c, 1) {
		return math.Pi * math.Pi
	}
	f := func(mu float64) float64 { return (mu*mu-b*c)*math.Sin(mu) - mu*(b+c)*math.Cos(mu) }
	if math.IsInf(b, 1) || math.IsInf(c, 1) {
		bi := min(b, c) // divide by the infinite one
		f = func(mu float64) float64 { return -bi*math.Sin(mu) - mu*math.Cos(mu) }
	}
	if b == 0 && c == 0 {
		return 0
	}
	lo, hi := 0.0, math.Pi // f < 0 in between, up to the eigenvalue
	for range 60 {
		if m := (lo + hi) / 2; f(m) < 0 {
			lo = m
		} else {
			hi = m
		}
	}
	return lo * lo
}

// terms returns, for each number, what one unit of it can drive at most at
// growth rate σ ≥ 0, relative to the stiffness.
func (b *bound) terms(k, sigma float64) [3]float64 {
	k2 := k * k
	stiffness := b.a0 + k2*(b.a2+k2*b.a4)
	if b.softness != nil {
		stiffness = max(stiffness, b.softness.at(k))
	}
	stiffness += sigma * b.inertia * (math.Pi*math.Pi + k2)
	heat := b.gradient / (sigma + k2 + b.thermal)
	t := [3]float64{
		ThermalRayleigh: k2 * heat / stiffness,
		SoluteRayleigh:  k2 * b.concentration / ((sigma + b.diffusivity*(k2+b.solutal)) * stiffness),
	}
	// |θ(1)|² ≤ ‖θ‖² + t(θ,θ)/k and |w'(1)|² ≤ a(w,w)/(√2 k η)
	surface := math.Sqrt(heat*heat + heat*b.gradient/k)
	t[MarangoniNumber] = k2 * surface / math.Sqrt(math.Sqrt2*k*b.viscosity*stiffness)
	return t
}

// softness is the smallest eigenvalue of the dissipation, relative to ∫w², of a
// layer of variable viscosity. It knows that the weakest part of the layer is
// thin, which the smallest viscosity alone does not tell.
type softness struct {
	level *level
	known map[float64]float64 // by wavenumber
}

// softShare of the eigenvalue is a safe bound: the discrete one is a little too
// large.
const softShare = 0.9

// soften prepares the eigenvalue problem a(w,w) = λ ∫w².
func (b *bound) soften(l *Layer, base *baseState, eta *viscosityState) {
	s := newSystem(1, false)
	viscosity := s.coefficient(eta.at)
	if l.Porous == Darcy {
		s.darcy(l, viscosity, false)
	} else {
		s.stokes(&Layer{Bottom: l.Bottom, Top: l.Top}, viscosity)
	}
	s.add(integral{pencil.Mass, 0, s.velocity, s.velocity, 0}, 0, 0, -1)
	s.nodes = layerNodes(l, base, eta)
	s.operator.Excess += (eta.degree() + 1) / 2
	b.softness = &softness{newLevel(s, s.nodes, coarseDegrees[0]), map[float64]float64{}}
}

func (s *softness) at(k float64) float64 {
	v, ok := s.known[k]
	if !ok {
		v = softShare * s.level.work.SlowestDecay(k)
		s.known[k] = v
	}
	return v
}

// driven adds up the terms of all numbers but one, n, or of all if n < 0. What
// can only stabilise counts for nothing.
func (b *bound) driven(t [3]float64, drive [3]float64, n Number) float64 {
	sum := 0.0
	for i, v := range drive {
		switch {
		case i == int(n),
			i == int(ThermalRayleigh) && v < 0 && b.heats,
			i == int(SoluteRayleigh) && v < 0 && b.weighs: // the drive is -Ra_S
			continue
		}
		sum += math.Abs(v) * t[i]
	}
	return sum
}

// exactShare keeps the bound below the truth where the two are equal, as between
// free isothermal boundaries.
const exactShare = 1 - 1e-9

// lower returns the bound for a number at wavenumber k > 0, the other numbers
// having fixed values. Zero means that nothing is known.
func (b *bound) lower(k float64, n Number, fixed [3]float64) float64 {
	t := b.terms(k, 0)
	left := 1 - b.driven(t, fixed, n)
	if left <= 0 || t[n] == 0 {
		return 0
	}
	return exactShare * left / t[n]
}

// growth returns a rate that no disturbance of wavenumber k exceeds, or zero
// if none grows.
func (b *bound) growth(k float64, drive [3]float64) float64 {
	grows := func(sigma float64) bool { return b.driven(b.terms(k, sigma), drive, -1) >= 1 }
	if !grows(0) {
		return 0
	}
	hi := 1.0
	for grows(hi) && hi < 1e300 {
		hi *= 2
	}
	lo := 0.0
	for hi-lo > 1e-3*hi {
		if m := (lo + hi) / 2; grows(m) {
			lo = m
		} else {
			hi = m
		}
	}
	return hi
}
