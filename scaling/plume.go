package scaling

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/scaling/internal/ode"
	"example.org/overturn/units"
)

// Conduit is a vertical pipe of hot fluid that rises through cooler fluid at
// rest.
type Conduit struct {
	Radius     units.Length
	Excess     units.TemperatureDifference // of the hot fluid
	Viscosity  units.DynamicViscosity      // of the hot fluid
	MeanSpeed  units.Velocity
	VolumeFlux float64     // m³/s
	MassFlux   float64     // buoyancy flux ρ α ΔT Q, in kg/s
	HeatFlux   units.Power // (c_p/α) times the buoyancy flux
}

// ConduitOf returns the fluxes of a conduit of given radius,
//
//	Q = π ρ α ΔT g a⁴/(8μ),  B = ρ α ΔT Q,  heat = c_p B/α
//
// (flow: Hagen and Poiseuille; buoyancy flux as defined by Sleep 1990 and Olson
// 1990). The layer gives the material and gravity; viscosity is that of the hot
// fluid.
func ConduitOf(l boussinesq.Layer, radius units.Length, excess units.TemperatureDifference, eta units.DynamicViscosity) (Conduit, error) {
	err := check.First(
		l.Material.Check(), check.Positive(pkg, "Layer.Gravity", l.Gravity),
		check.Positive(pkg, "radius", radius), check.Positive(pkg, "temperature excess", excess), check.Positive(pkg, "viscosity", eta),
	)
	if err != nil {
		return Conduit{}, err
	}
	m := l.Material
	a := float64(radius)
	lighter := float64(m.Density) * float64(m.Expansivity) * float64(excess)
	q := math.Pi * lighter * float64(l.Gravity) * a * a * a * a / (8 * float64(eta))
	c := Conduit{
		Radius: radius, Excess: excess, Viscosity: eta,
		MeanSpeed:  units.Velocity(q / (math.Pi * a * a)),
		VolumeFlux: q, MassFlux: lighter * q,
		HeatFlux: units.Power(float64(m.Density) * float64(m.SpecificHeat) * float64(excess) * q),
	}
	if _, err := check.Result(pkg, "heat flux of the conduit", c.HeatFlux); err != nil {
		return Conduit{}, err
	}
	return c, nil
}

// ConduitCarrying returns the conduit that carries a buoyancy flux, in kg/s: the
// inverse of [ConduitOf].
func ConduitCarrying(l boussinesq.Layer, massFlux float64, excess units.TemperatureDifference, eta units.DynamicViscosity) (Conduit, error) {
	if err := check.Positive(pkg, "buoyancy flux", massFlux); err != nil {
		return Conduit{}, err
	}
	const unit = 1e3 // any radius: fluxes go as its fourth power
	c, err := ConduitOf(l, unit, excess, eta)
	if err != nil {
		return Conduit{}, err
	}
	return ConduitOf(l, units.Length(unit*math.Sqrt(math.Sqrt(massFlux/c.MassFlux))), excess, eta)
}

// Head is the head of a starting plume.
type Head struct {
	Time     units.Time // since the source was switched on
	Diameter units.Length
	Height   units.Length // that its centre has risen
	Speed    units.Velocity
	Excess   units.TemperatureDifference // mean of the head
}

// Entrainment is the constant C of a plume head that grows by the layer of
// fluid which it heats as it passes: it swallows C κ^(1/2) a^(3/2) U^(1/2) of
// volume a second, with radius a and speed U (after Griffiths & Campbell 1990).
// C is of order one and could not be confirmed: treat it as uncertain. Zero is a
// head that is fed by its source only (Whitehead & Luther 1975).
type Entrainment float64

// StartingPlume returns the head of a plume a time t after a source of volume
// flux q (m³/s) and temperature excess was switched on below the layer's
// material. The head is a sphere that keeps all of the heat released,
//
//	(4/3)πa³ ΔT = ΔT₀ q t,  U = f ρ g α ΔT a²/μ,
//
// that rises at the speed of a drop without viscosity of its own, f = 1/3, in
// the material. Derived here. Without entrainment a ~ t^(1/3) and z ~ t^(5/3);
// where entrainment prevails a ~ t^(3/4), z ~ t^(5/4) and a ~ z^(3/5), the form of
// Griffiths & Campbell (1990).
func StartingPlume(l boussinesq.Layer, q float64, excess units.TemperatureDifference, c Entrainment, t units.Time) (Head, error) {
	err := check.First(
		l.Material.Check(), check.Positive(pkg, "Layer.Gravity", l.Gravity),
		check.Positive(pkg, "volume flux", q), check.Positive(pkg, "temperature excess", excess),
		check.NotNegative(pkg, "entrainment", c), check.Positive(pkg, "time", t),
	)
	if err != nil {
		return Head{}, err
	}
	m := l.Material
	kappa := float64(m.Conductivity) / (float64(m.Density) * float64(m.SpecificHeat))
	// U = b t/a, with b from the reduced gravity at the source.
	const drop = 1. / 3
	b := drop * float64(l.Gravity) * float64(m.Expansivity) * float64(excess) * float64(m.Density) / float64(m.Viscosity) * 3 * q / (4 * math.Pi)
	end := float64(t)
	volume, rise, err := growHead(q, float64(c)*math.Sqrt(kappa*b), end)
	if err != nil {
		return Head{}, err
	}
	a := math.Cbrt(volume * 3 / (4 * math.Pi))
	h := Head{
		Time: t, Diameter: units.Length(2 * a), Height: units.Length(b * rise), Speed: units.Velocity(b * end / a),
		Excess: excess * units.TemperatureDifference(q*end/volume),
	}
	if _, err := check.Result(pkg, "plume head", float64(h.Height)+float64(h.Diameter)); err != nil {
		return Head{}, err
	}
	return h, nil
}

// growHead returns the volume of a plume head at time t and ∫ t/a dt, for
// dV/dt = q + e a √t. In units in which both terms are equal at time one,
//
//	w' = 1 + w^(1/3) τ^(1/2),
//
// which starts as w = τ + (6/11) τ^(11/6) and is integrated in logarithms.
func growHead(q, e, t float64) (volume, rise float64, err error) {
	third := 1. / 3
	a1 := math.Cbrt(3 * q / (4 * math.Pi)) // radius of a head fed by the source for one second
	start := func(tau float64) (w, z float64) {
		return tau + 6./11*math.Pow(tau, 11./6), 0.6 * math.Pow(tau, 5./3)
	}
	if e == 0 {
		return q * t, 0.6 * math.Pow(t, 5./3) / a1, nil
	}
	unit := math.Pow(q/(e*a1), 6./5)
	tau := t / unit
	const early = 1e-8
	w, z := start(math.Min(tau, early))
	if tau > early {
		s := ode.NewSolver(1, 1)
		s.Tol = ode.Tolerance{Relative: 1e-11, Absolute: 1e-11}
		s.Start(headGrowth{}, math.Log(early), []float64{math.Log(w)}, math.Log(tau))
		for !s.Done() {
			if err := s.Step(); err != nil {
				return 0, 0, fmt.Errorf("scaling: growth of the plume head: %w", err)
			}
		}
		y, dz := s.End()
		w, z = math.Exp(y[0]), z+dz[0]
	}
	// z is ∫ τ w^(-1/3) dτ
	return q * unit * w, z * unit * unit / (a1 * math.Pow(unit, third)), nil
}

// headGrowth is the growth of a plume head in x = ln τ and y = ln w.
type headGrowth struct{}

// Rates implements the system to integrate.
func (headGrowth) Rates(dst, y []float64, x float64) {
	tau := math.Exp(x)
	dst[0] = math.Exp(x-y[0]) + math.Exp(1.5*x-2./3*y[0])
	dst[1] = tau * tau * math.Exp(-y[0]/3)
}
