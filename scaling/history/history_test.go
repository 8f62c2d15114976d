package history

import (
	"math"
	"sync"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/units"
)

const gyr = units.Gigayear

var mantleLayer = boussinesq.Layer{
	Material: boussinesq.Material{Density: 3300, Expansivity: 2.5e-5, Conductivity: 4, SpecificHeat: 4 / (3300 * 1e-6)},
	Depth:    2.89e6, Gravity: 9.8,
}

func creep(e units.MolarEnergy) scaling.Arrhenius {
	return scaling.Arrhenius{Reference: 1e21, Anchor: 1600, Energy: e}
}

// planet is one reservoir with a Ra^(1/3) law, four isotopes and an Arrhenius
// viscosity.
func planet(t testing.TB, start units.Temperature) Body {
	heating, err := NewRadiogenic(McDonoughSun(), Isotopes(), 4.5*gyr)
	require.NoError(t, err)
	return Body{
		Reservoirs: []Reservoir{{
			Name: "mantle", Mass: 4e24, SpecificHeat: 1250, Heating: heating, Area: 5.1e14, Start: start,
			Loss: Convection{Layer: mantleLayer, Law: scaling.WholeLayer(1100, 1./3, scaling.AnyWalls), Viscosity: creep(300e3)},
		}},
		Surface: 273,
	}
}

// withCore puts a core below the mantle.
func withCore(t testing.TB, start, core units.Temperature) Body {
	b := planet(t, start)
	b.Reservoirs = append([]Reservoir{{
		Name: "core", Mass: 1.9e24, SpecificHeat: 750, Area: 1.5e14, Start: core,
		Loss: BottomLayer{Layer: mantleLayer, Viscosity: creep(300e3), Critical: 660},
	}}, b.Reservoirs...)
	return b
}

func run(t testing.TB, b Body, from, to units.Time, s *Settings) *History {
	t.Helper()
	m, err := New(b, s)
	require.NoError(t, err)
	h, err := m.Run(from, to)
	require.NoError(t, err)
	return h
}

func temperature(t testing.TB, h *History, at units.Time) float64 {
	t.Helper()
	s, err := h.Temperatures(nil, at)
	require.NoError(t, err)
	return float64(s[len(s)-1])
}

// A body of constant viscosity without heating cools as a power law: exact.
func TestPowerLawCooling(t *testing.T) {
	for _, beta := range []float64{0, 0.1, 1. / 3} {
		b := Body{
			Surface: 1,
			Reservoirs: []Reservoir{{
				Mass: 1, SpecificHeat: 1, Area: 1, Start: 1000,
				Loss: LossFunc(func(inside, _ units.Temperature) units.HeatFlux {
					return units.HeatFlux(math.Pow(float64(inside), 1+beta))
				}),
			}},
		}
		for _, tol := range []float64{1e-6, 1e-9, 1e-12} {
			h := run(t, b, 0, 5, &Settings{Tolerance: tol})
			for _, at := range []units.Time{0, 0.1, 1.234, 3, 5} {
				want, err := PowerLawCooling(1000, beta, float64(at))
				require.NoError(t, err)
				// a decaying solution adds up no more than a few steps' errors
				require.InEpsilon(t, want, temperature(t, h, at), 5*tol, "β %g t %g", beta, float64(at))
			}
		}
	}
}

// Self-regulation (row S138 of the check values against S134): starts 400 K
// apart end half a kelvin apart.
func TestSelfRegulation(t *testing.T) {
	hot := temperature(t, run(t, planet(t, 2000), 0, 4.5*gyr, nil), 4.5*gyr)
	cold := temperature(t, run(t, planet(t, 1600), 0, 4.5*gyr, nil), 4.5*gyr)
	require.InDelta(t, 0.452447934, hot-cold, 2e-6)
}

// The error of the end follows the tolerance at the rate that orders nine and
// six imply: steps are set by the dense error, h ~ tol^(1/6), and the end by
// h⁹. Halving the exponents of any stage would show.
func TestObservedOrderOfHistories(t *testing.T) {
	exact := temperature(t, run(t, planet(t, 2000), 0, 4.5*gyr, &Settings{Tolerance: 1e-13}), 2*gyr)
	worst := func(tol float64) (err float64, steps int) {
		h := run(t, planet(t, 2000), 0, 4.5*gyr, &Settings{Tolerance: tol})
		return math.Abs(temperature(t, h, 2*gyr) - exact), h.Steps
	}
	coarse, n1 := worst(1e-5)
	fine, n2 := worst(1e-10)
	require.Less(t, fine, 2000e-10)
	require.Less(t, coarse, 2000e-5)
	// Steps grow as tol^(-1/6): 10^(5/6) = 6.8 for five decades, once there are
	// several.
	ratio := float64(n2) / float64(n1)
	require.InDelta(t, 5.0/6, math.Log10(ratio), 0.35, "%d and %d steps", n1, n2)
}

// There and back again: 4.5 Gyr forward and backward, to 1e-6.
func TestForwardAndBackward(t *testing.T) {
	for _, start := range []units.Temperature{1600, 2000} {
		forward := run(t, planet(t, start), 0, 4.5*gyr, nil)
		back := run(t, planet(t, units.Temperature(temperature(t, forward, 4.5*gyr))), 4.5*gyr, 0, nil)
		require.InEpsilon(t, float64(start), temperature(t, back, 0), 1e-6)
		// and on the way
		require.InEpsilon(t, temperature(t, forward, gyr), temperature(t, back, gyr), 1e-6)
		from, to := back.Span()
		require.Equal(t, 4.5*gyr, from)
		require.Zero(t, to)
	}
}

// The budget closes to 1e-10: heat made in closed form, heat lost by the
// integrator, heat stored by the temperatures; whole run and any part of it,
// forward and backward, one reservoir and two.
func TestBudgetCloses(t *testing.T) {
	for name, b := range map[string]Body{"mantle": planet(t, 2000), "core and mantle": withCore(t, 1900, 3000)} {
		h := run(t, b, 0, 4.5*gyr, nil)
		for _, part := range [][2]units.Time{{0, 4.5 * gyr}, {4.5 * gyr, 0}, {0.3 * gyr, 2.1 * gyr}, {1.7 * gyr, 1.9 * gyr}} {
			budget, err := h.BudgetBetween(part[0], part[1])
			require.NoError(t, err)
			tol := 1e-10
			if part[0] != 0 && part[1] != 0 {
				tol = 1e-8 // within steps, where the dense output is accurate to the tolerance
			}
			require.Less(t, budget.Relative, tol, "%s from %v to %v", name, part[0], part[1])
			require.NotZero(t, budget.Residual)
			// Each reservoir for itself: the mantle gains what the core loses.
			in := units.Energy(0)
			for i := range budget.Stored {
				miss := budget.Stored[i] - budget.Made[i] - in + budget.Lost[i]
				require.Less(t, math.Abs(float64(miss)), tol*math.Abs(float64(budget.Lost[len(budget.Lost)-1])))
				in = budget.Lost[i]
			}
		}
	}
}

// The same without the integrator's own integrals: fluxes of the dense output,
// by Gauss-Legendre quadrature step by step.
func TestBudgetByQuadrature(t *testing.T) {
	h := run(t, planet(t, 2000), 0, 4.5*gyr, &Settings{Tolerance: 1e-11})
	lost := 0.0
	times := h.path.Times()
	for i := 1; i < len(times); i++ {
		lost += quad.Fixed(func(at float64) float64 {
			s, err := h.At(units.Time(at))
			require.NoError(t, err)
			return float64(s.Flow[0])
		}, times[i-1], times[i], 12, nil, 0)
	}
	b, err := h.Budget()
	require.NoError(t, err)
	require.InEpsilon(t, lost, float64(b.Lost[0]), 1e-10)
	stored := 4e24 * 1250 * (temperature(t, h, 4.5*gyr) - 2000)
	require.InEpsilon(t, stored, float64(b.Stored[0]), 1e-12)
	require.InDelta(t, 0, (stored-float64(b.Made[0])+lost)/lost, 1e-10)
}

// A viscosity a million times lower at the start than at the end, and a skin
// whose heat capacity is a millionth of the mantle's: rates that differ by far
// more than 1e6. The steps do not follow the fastest of them.
func TestStiffFeedback(t *testing.T) {
	b := planet(t, 2600)
	b.Reservoirs[0].Loss = Convection{Layer: mantleLayer, Law: scaling.WholeLayer(1100, 1./3, scaling.AnyWalls), Viscosity: creep(500e3)}
	mantle := b.Reservoirs[0].Loss.(Convection)
	contrast := mantle.Viscosity.At(1550) / mantle.Viscosity.At(2600)
	require.Greater(t, float64(contrast), 1e6)
	h := run(t, b, 0, 4.5*gyr, nil)
	require.Less(t, h.Steps, 100)
	budget, err := h.Budget()
	require.NoError(t, err)
	require.Less(t, budget.Relative, 1e-10)

	// A thin hot layer on top of the mantle that the flux law makes stiff: its
	// temperature relaxes within millennia, through all of the 4.5 Gyr.
	stiff := planet(t, 2000)
	stiff.Reservoirs = append(stiff.Reservoirs, Reservoir{
		Name: "skin", Mass: 4e18, SpecificHeat: 1250, Area: 5.1e14, Start: 600,
		Loss: LossFunc(func(inside, outside units.Temperature) units.HeatFlux {
			return units.HeatFlux(2 * float64(inside.Sub(outside)) / 1e3) // 1 km of rock
		}),
	})
	h = run(t, stiff, 0, 4.5*gyr, nil)
	relaxation := 4e18 * 1250 / (5.1e14 * 2e-3)
	require.Greater(t, float64(4.5*gyr)/relaxation, 1e6)
	require.Less(t, h.Steps, 150)
	budget, err = h.Budget()
	require.NoError(t, err)
	require.Less(t, budget.Relative, 1e-10)
	s, err := h.At(3 * gyr)
	require.NoError(t, err)
	require.InEpsilon(t, float64(s.Flux[0]), float64(s.Flux[1]), 1e-4) // the skin passes on what it gets
}

// Reservoirs that exchange heat only with one another keep it.
func TestHeatIsConserved(t *testing.T) {
	b := withCore(t, 1700, 3000)
	b.Reservoirs[1].Heating = nil
	b.Reservoirs[1].Loss = LossFunc(func(_, _ units.Temperature) units.HeatFlux { return 0 })
	h := run(t, b, 0, 4.5*gyr, nil)
	heat := func(at units.Time) float64 {
		s, err := h.At(at)
		require.NoError(t, err)
		return 1.9e24*750*float64(s.Temperature[0]) + 4e24*1250*float64(s.Temperature[1])
	}
	for _, at := range []units.Time{0.1 * gyr, gyr, 4.5 * gyr} {
		require.InEpsilon(t, heat(0), heat(at), 1e-13)
	}
	s, err := h.At(4.5 * gyr)
	require.NoError(t, err)
	require.Less(t, float64(s.Temperature[0].Sub(s.Temperature[1])), 300.) // they approach
	require.Zero(t, s.Urey)
}

func TestSampleIsConsistent(t *testing.T) {
	h := run(t, withCore(t, 1900, 3000), 0, 4.5*gyr, nil)
	at := 2 * gyr
	s, err := h.At(at)
	require.NoError(t, err)
	require.Equal(t, at, s.Time)
	require.InEpsilon(t, 5.1e14*float64(s.Flux[1]), float64(s.Flow[1]), 1e-14)
	require.InEpsilon(t, 1.5e14*float64(s.Flux[0]), float64(s.Flow[0]), 1e-14)
	require.InEpsilon(t, float64(s.Heating[1]/s.Flow[1]), s.Urey, 1e-14)
	require.Zero(t, s.Heating[0])
	// Cooling is the slope of the temperatures.
	for i := range s.Temperature {
		dt := 1e-4 * gyr
		before, err := h.At(at - dt)
		require.NoError(t, err)
		after, err := h.At(at + dt)
		require.NoError(t, err)
		slope := float64(after.Temperature[i].Sub(before.Temperature[i])) / 2e-4
		require.InEpsilon(t, -slope, float64(s.Cooling[i]), 1e-3)
	}
	// Layers: the lid conducts the flux.
	l := s.Layer[1]
	require.InEpsilon(t, float64(s.Flux[1]), 4*float64(s.Temperature[1].Sub(273))/float64(l.Lid), 1e-12)
	require.InEpsilon(t, math.Cbrt(l.Rayleigh/1100), l.Nusselt, 1e-12)
	require.True(t, l.InRange)
	require.Equal(t, creep(300e3).At(s.Temperature[1]), l.Viscosity)
	require.InEpsilon(t, float64(s.Temperature[1].Sub(273))/float64(creep(300e3).Scale(s.Temperature[1])), l.FrankKamenetskii, 1e-12)
	require.Greater(t, s.Layer[0].Nusselt, 1.0)
	buf := make([]units.Temperature, 0, 2)
	require.Zero(t, testing.AllocsPerRun(50, func() { _, _ = h.Temperatures(buf, at) }))
}

func TestEvents(t *testing.T) {
	b := planet(t, 2000)
	at1700 := CoolsTo(0, 1700)
	at1800 := CoolsTo(0, 1800)
	never := CoolsTo(0, 100)
	rising := Event{Name: "rising", Direction: Rising, Value: func(s Sample) float64 { return float64(s.Temperature[0]) - 1750 }}
	h := run(t, b, 0, 4.5*gyr, &Settings{Events: []Event{at1700, at1800, never, rising}})
	events := h.Events()
	require.Len(t, events, 2)
	require.Equal(t, "cools to 1800 K", events[0].Event)
	require.InDelta(t, 1800, temperature(t, h, events[0].Time), 1e-8)
	require.InDelta(t, 1700, temperature(t, h, events[1].Time), 1e-8)
	require.Less(t, events[0].Time, events[1].Time)

	// Backward it heats.
	present := units.Temperature(temperature(t, h, 4.5*gyr))
	back := run(t, planet(t, present), 4.5*gyr, 0, &Settings{Events: []Event{rising, at1700}})
	require.Len(t, back.Events(), 1)
	require.Equal(t, "rising", back.Events()[0].Event)

	// Several in one step come in their order in time, whatever that of the list;
	// nothing after one that stops the run.
	dense := []Event{CoolsTo(0, 1699.98), CoolsTo(0, 1699.99), CoolsTo(0, 1700), CoolsTo(0, 1699.97)}
	dense[1].After = Stop
	ordered := run(t, b, 0, 4.5*gyr, &Settings{Events: dense}).Events()
	require.Len(t, ordered, 2)
	require.Equal(t, "cools to 1700 K", ordered[0].Event)
	require.Equal(t, "cools to 1699.99 K", ordered[1].Event)

	// One that stops the run.
	at1700.After = Stop
	stopped := run(t, b, 0, 4.5*gyr, &Settings{Events: []Event{at1700, at1800}})
	require.Equal(t, []Occurrence{events[0], events[1]}, stopped.Events())
	_, end := stopped.Span()
	require.Equal(t, events[1].Time, end)
	_, err := stopped.At(end + gyr/1000)
	require.ErrorContains(t, err, "time")
	budget, err := stopped.Budget()
	require.NoError(t, err)
	require.Equal(t, end, budget.To)
}

// A small body stops convecting: at Nu = 1 its Rayleigh number is critical.
func TestStopsConvecting(t *testing.T) {
	layer := mantleLayer
	layer.Depth, layer.Gravity = 300*units.Kilometre, 1
	b := Body{
		Reservoirs: []Reservoir{{
			Mass: 1e20, SpecificHeat: 1250, Area: 1e11, Start: 1900,
			Loss: Convection{Layer: layer, Law: scaling.WholeLayer(1100, 1./3, scaling.AnyWalls), Viscosity: creep(300e3)},
		}},
		Surface: 200,
	}
	h := run(t, b, 0, 4.5*gyr, &Settings{Events: []Event{StopsConvecting(0)}})
	require.Len(t, h.Events(), 1)
	s, err := h.At(h.Events()[0].Time)
	require.NoError(t, err)
	require.InEpsilon(t, 1100, s.Layer[0].Rayleigh, 1e-9)
	// Afterwards it conducts.
	s, err = h.At(4.5 * gyr)
	require.NoError(t, err)
	require.Less(t, s.Layer[0].Nusselt, 1.0)
	require.InEpsilon(t, 4*float64(s.Temperature[0]-200)/300e3, float64(s.Flux[0]), 1e-12)
	require.False(t, s.Layer[0].InRange)
	budget, err := h.Budget()
	require.NoError(t, err)
	require.Less(t, budget.Relative, 1e-10)
}

func TestCrosses(t *testing.T) {
	for _, tt := range []struct {
		before, after           float64
		either, rising, falling bool
	}{
		{-1, 1, true, true, false}, {1, -1, true, false, true}, {-1, 0, true, true, false}, {1, 0, true, false, true},
		{0, 1, false, false, false}, {0, -1, false, false, false}, {1, 2, false, false, false},
		{math.NaN(), 1, false, false, false}, {1, math.NaN(), false, false, false},
	} {
		require.Equal(t, tt.either, crosses(tt.before, tt.after, Either), "%v", tt)
		require.Equal(t, tt.rising, crosses(tt.before, tt.after, Rising), "%v", tt)
		require.Equal(t, tt.falling, crosses(tt.before, tt.after, Falling), "%v", tt)
	}
}

// With little heating today a backward history runs away within some two
// billion years (the thermal catastrophe: Christensen 1985; Korenaga 2006).
func TestThermalCatastrophe(t *testing.T) {
	b := planet(t, 1620)
	weak := McDonoughSun()
	weak.Potassium, weak.Thorium, weak.Uranium = weak.Potassium/3, weak.Thorium/3, weak.Uranium/3
	var err error
	b.Reservoirs[0].Heating, err = NewRadiogenic(weak, Isotopes(), 4.5*gyr)
	require.NoError(t, err)
	m, err := New(b, nil)
	require.NoError(t, err)
	h, err := m.Run(4.5*gyr, 0)
	require.ErrorIs(t, err, ErrRunaway)
	require.NotNil(t, h)
	s, e := h.At(4.5 * gyr)
	require.NoError(t, e)
	require.InDelta(t, 0.25, s.Urey, 0.05)
	_, end := h.Span()
	age := (4.5*gyr - end).In(gyr)
	require.True(t, age > 0.7 && age < 2.5, "ran away %.2f Gyr ago", age)
	require.ErrorContains(t, err, "Myr")
	require.Greater(t, temperature(t, h, end), 3000.)
}

func TestRunErrors(t *testing.T) {
	m, err := New(planet(t, 2000), &Settings{MaxSteps: 3})
	require.NoError(t, err)
	h, err := m.Run(0, 4.5*gyr)
	require.ErrorIs(t, err, ErrTooManySteps)
	require.Equal(t, 3, h.Steps)
	_, err = m.Run(gyr, gyr)
	require.ErrorContains(t, err, "to is")
	_, err = m.Run(units.Time(math.NaN()), gyr)
	require.ErrorContains(t, err, "from")
	_, err = m.Run(0, units.Time(math.Inf(1)))
	require.ErrorContains(t, err, "to")

	// A body that cools to nothing
	b := planet(t, 2000)
	b.Reservoirs[0].Loss = LossFunc(func(_, _ units.Temperature) units.HeatFlux { return 100 })
	m, err = New(b, nil)
	require.NoError(t, err)
	_, err = m.Run(0, 4.5*gyr)
	require.ErrorIs(t, err, ErrRunaway)
	// A flux that is not a number from some temperature on
	b.Reservoirs[0].Loss = LossFunc(func(t, _ units.Temperature) units.HeatFlux { return units.HeatFlux(1 + math.Sqrt(float64(t)-1900)) })
	m, err = New(b, nil)
	require.NoError(t, err)
	_, err = m.Run(0, 4.5*gyr)
	require.ErrorIs(t, err, ErrRunaway)
}

// A run that cannot take its first step has no history.
func TestNoFirstStep(t *testing.T) {
	b := planet(t, 2000)
	b.Reservoirs[0].Loss = LossFunc(func(t, _ units.Temperature) units.HeatFlux {
		if t != 2000 {
			return units.HeatFlux(math.NaN())
		}
		return 1
	})
	m, err := New(b, nil)
	require.NoError(t, err)
	h, err := m.Run(0, gyr)
	require.ErrorIs(t, err, ErrRunaway)
	require.Nil(t, h)
}

func TestErrorsNameTheField(t *testing.T) {
	for want, change := range map[string]func(*Body){
		"Body.Reservoirs":            func(b *Body) { b.Reservoirs = nil },
		"Body.Surface":               func(b *Body) { b.Surface = 0 },
		"Reservoirs[0].Mass":         func(b *Body) { b.Reservoirs[0].Mass = -1 },
		"Reservoirs[0].SpecificHeat": func(b *Body) { b.Reservoirs[0].SpecificHeat = 0 },
		"Reservoirs[0].Area":         func(b *Body) { b.Reservoirs[0].Area = units.Area(math.NaN()) },
		"Reservoirs[0].Start":        func(b *Body) { b.Reservoirs[0].Start = 0 },
		"Reservoirs[0].Loss is nil":  func(b *Body) { b.Reservoirs[0].Loss = nil },
		"LossFunc":                   func(b *Body) { b.Reservoirs[0].Loss = LossFunc(nil) },
		"flux at Start": func(b *Body) {
			b.Reservoirs[0].Loss = LossFunc(func(_, _ units.Temperature) units.HeatFlux { return units.HeatFlux(math.NaN()) })
		},
		"Convection.Layer.Material.Density": func(b *Body) { b.Reservoirs[0].Loss = Convection{Law: scaling.HowardCycle(1000, scaling.Free)} },
		"Convection.Viscosity is nil": func(b *Body) {
			b.Reservoirs[0].Loss = Convection{Law: scaling.HowardCycle(1000, scaling.Free), Layer: mantleLayer}
		},
		"Arrhenius.Reference": func(b *Body) {
			b.Reservoirs[0].Loss = Convection{Law: scaling.HowardCycle(1000, scaling.Free), Layer: mantleLayer, Viscosity: scaling.Arrhenius{}}
		},
		"Convection.Law is a law for the Reynolds": func(b *Body) { b.Reservoirs[0].Loss = Convection{Law: scaling.GrossmannLohseReynolds()} },
		"cell width is 0": func(b *Body) {
			b.Reservoirs[0].Loss = Convection{Law: scaling.FreeRolls(scaling.ViscousCore), Layer: mantleLayer, Viscosity: creep(3e5)}
		},
		"StagnantLid.Layer.Depth": func(b *Body) {
			b.Reservoirs[0].Loss = StagnantLid{Law: scaling.DavailleJaupartLid, Layer: boussinesq.Layer{Material: mantleLayer.Material}}
		},
		"LidLaw.Prefactor":      func(b *Body) { b.Reservoirs[0].Loss = StagnantLid{} },
		"StagnantLid.Viscosity": func(b *Body) { b.Reservoirs[0].Loss = StagnantLid{Law: scaling.DavailleJaupartLid, Layer: mantleLayer} },
		"BottomLayer.Critical":  func(b *Body) { b.Reservoirs[0].Loss = BottomLayer{} },
		"BottomLayer.Layer.Gravity": func(b *Body) {
			l := mantleLayer
			l.Gravity = 0
			b.Reservoirs[0].Loss = BottomLayer{Critical: 660, Layer: l}
		},
	} {
		b := planet(t, 2000)
		change(&b)
		_, err := New(b, nil)
		require.ErrorContains(t, err, "history: ")
		require.ErrorContains(t, err, want)
	}
	for want, s := range map[string]Settings{
		"Settings.Tolerance":       {Tolerance: 1},
		"Settings.MaxSteps":        {MaxSteps: -1},
		"Settings.Events[0].Value": {Events: []Event{{}}},
	} {
		_, err := New(planet(t, 2000), &s)
		require.ErrorContains(t, err, want)
	}
	h := run(t, planet(t, 2000), 0, gyr, nil)
	_, err := h.At(-1)
	require.ErrorContains(t, err, "time")
	_, err = h.Temperatures(nil, 2*gyr)
	require.ErrorContains(t, err, "time")
	_, err = h.BudgetBetween(-1, gyr)
	require.ErrorContains(t, err, "from")
	_, err = h.BudgetBetween(0, units.Time(math.NaN()))
	require.ErrorContains(t, err, "to")
}

func TestDefaults(t *testing.T) {
	a := run(t, planet(t, 2000), 0, gyr, nil)
	b := run(t, planet(t, 2000), 0, gyr, &Settings{Tolerance: DefaultTolerance, MaxSteps: DefaultMaxSteps})
	require.Equal(t, temperature(t, a, gyr), temperature(t, b, gyr))
	require.Equal(t, a.Evaluations, b.Evaluations)
}

// A model may run on many goroutines at once, and always gives the same bits.
func TestRunsInParallel(t *testing.T) {
	m, err := New(withCore(t, 1900, 3000), nil)
	require.NoError(t, err)
	want := temperature(t, run(t, withCore(t, 1900, 3000), 0, 4.5*gyr, nil), 3*gyr)
	var wg sync.WaitGroup
	for range 4 {
		wg.Go(func() {
			for range 5 {
				h, err := m.Run(0, 4.5*gyr)
				if err != nil {
					t.Error(err)
					return
				}
				if got := temperature(t, h, 3*gyr); got != want {
					t.Errorf("%v, want %v", got, want)
				}
			}
		})
	}
	wg.Wait()
}

func TestBodyIsACopy(t *testing.T) {
	b := planet(t, 2000)
	m, err := New(b, nil)
	require.NoError(t, err)
	b.Reservoirs[0].Mass = 1
	require.Equal(t, units.Mass(4e24), m.Body().Reservoirs[0].Mass)
	m.Body().Reservoirs[0].Mass = 2
	require.Equal(t, units.Mass(4e24), m.Body().Reservoirs[0].Mass)
}

func BenchmarkRun(b *testing.B) {
	for name, body := range map[string]Body{"mantle": planet(b, 2000), "core+mantle": withCore(b, 1900, 3000)} {
		b.Run("reservoirs="+name, func(b *testing.B) {
			m, err := New(body, nil)
			require.NoError(b, err)
			b.ReportAllocs()
			var h *History
			for b.Loop() {
				if h, err = m.Run(0, 4.5*gyr); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(h.Steps), "steps")
			b.ReportMetric(float64(h.Evaluations), "evaluations")
		})
	}
	b.Run("stiff", func(b *testing.B) {
		body := planet(b, 2600)
		body.Reservoirs[0].Loss = Convection{Layer: mantleLayer, Law: scaling.WholeLayer(1100, 1./3, scaling.AnyWalls), Viscosity: creep(500e3)}
		m, err := New(body, nil)
		require.NoError(b, err)
		var h *History
		for b.Loop() {
			if h, err = m.Run(0, 4.5*gyr); err != nil {
				b.Fatal(err)
			}
		}
		b.ReportMetric(float64(h.Steps), "steps")
	})
}
