package stability

import (
	"errors"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestLayersThatCannotBe(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	tests := []struct {
		layer Layer
		want  string
	}{
		{Layer{Prandtl: -1}, "stability: Prandtl number is -1, want > 0, or 0 for infinity"},
		{Layer{Prandtl: nan}, "stability: Prandtl number is NaN, want > 0, or 0 for infinity"},
		{Layer{Bottom: Rigid.Robin(-0.1)}, "stability: bottom Biot number is -0.1, want ≥ 0"},
		{Layer{Top: Free.Robin(nan)}, "stability: top Biot number is NaN, want ≥ 0"},
		{Layer{Taylor: -5}, "stability: Taylor number is -5, want finite and ≥ 0"},
		{Layer{Taylor: inf}, "stability: Taylor number is +Inf, want finite and ≥ 0"},
		{Layer{Magnetic: Magnetic{Chandrasekhar: -1}}, "stability: Chandrasekhar number is -1, want finite and ≥ 0"},
		{Layer{Magnetic: Magnetic{Diffusivity: -1}}, "stability: magnetic diffusivity is -1, want > 0, or 0 for infinity"},
		{Layer{Magnetic: Magnetic{Top: 7}}, "stability: electrical condition at the top is 7, want one of the declared ones"},
		{Layer{Solute: Solute{Diffusivity: -1}}, "stability: solute diffusivity is -1, want finite and > 0, or 0 for no solute"},
		{Layer{Solute: Solute{Rayleigh: 1}}, "stability: solute diffusivity is 0, want > 0, since the solute has a Rayleigh number"},
		{Layer{Solute: Solute{Rayleigh: nan, Diffusivity: 1}}, "stability: solute Rayleigh number is NaN, want finite"},
		{Layer{Solute: Solute{Diffusivity: 1, Bottom: 3}}, "stability: condition on the solute at the bottom is 3, want one of the declared ones"},
		{Layer{Marangoni: inf, Top: Free.Robin(1)}, "stability: Marangoni number is +Inf, want finite"},
		{Layer{Marangoni: 10, Top: Rigid}, "stability: Marangoni number below a rigid top is 10, want 0, or a free top"},
		{Layer{Porous: Darcy, Taylor: 10}, "stability: Taylor number of a porous layer is 10, want 0"},
		{Layer{Porous: Darcy, Marangoni: 10}, "stability: Marangoni number of a porous layer is 10, want 0"},
		{Layer{Porous: 2}, "stability: porosity is 2, want Fluid or Darcy"},
		{Layer{Porous: Darcy, Bottom: Rigid}, "stability: bottom of a porous layer is Rigid, want Impermeable or Permeable"},
		{Layer{Top: Permeable}, "stability: top of a fluid layer is permeable, want Free or Rigid"},
		{Layer{Top: Wall(9)}, "stability: top is Wall(9), want one of the declared walls"},
		{
			Layer{Viscosity: ViscosityLaw(func(z, _ float64) float64 { return 0.5 - z })},
			"stability: viscosity at z = 0.5 is 0, want finite and > 0",
		},
		{
			Layer{Viscosity: ViscosityLaw(func(_, _ float64) float64 { return nan })},
			"stability: viscosity at z = 0 is NaN, want finite and > 0",
		},
		{
			Layer{Viscosity: Layered([]float64{0.5}, []float64{1})},
			"stability: viscosity at z = 0 is NaN, want finite and > 0",
		},
		{
			Layer{Viscosity: Arrhenius(3, 0, 1)},
			"stability: viscosity at z = 1 is NaN, want finite and > 0",
		},
		{
			Layer{Base: Gradient(func(z float64) float64 { return 1 / (z - 1) * 0 / (1 - z) })},
			"stability: base temperature gradient at z = 1 is NaN, want finite",
		},
		{
			Layer{Base: Temperature(func(z float64) float64 { return math.Log(z) })},
			"stability: base temperature at z = 0 is -Inf, want finite",
		},
		{
			Layer{Base: CoolingFromAbove(-1)},
			"stability: base temperature gradient at z = 0 is NaN, want finite",
		},
	}
	for _, tt := range tests {
		_, err := NewSolver(tt.layer, nil)
		if assert.Error(t, err, tt.want) {
			assert.Equal(t, tt.want, err.Error())
		}
		_, err = tt.layer.Critical()
		assert.Error(t, err)
		_, err = tt.layer.Growth(1, 1)
		assert.Error(t, err)
		_, err = tt.layer.Fastest(1)
		assert.Error(t, err)
		_, err = tt.layer.Neutral(1)
		assert.Error(t, err)
		_, _, err = tt.layer.InBox(Box{Aspect: 1})
		assert.Error(t, err)
	}
}

// A viscosity that dips below zero between coarse samples is found.
func TestNarrowDipOfViscosity(t *testing.T) {
	dip := func(z, _ float64) float64 { return 1 - 1.1*math.Exp(-math.Pow((z-0.5037)/0.004, 2)) }
	_, err := NewSolver(Layer{Viscosity: ViscosityLaw(dip)}, nil)
	var input *InputError
	require.ErrorAs(t, err, &input)
	assert.Less(t, input.Value, 0.0)
}

func TestQuestionsThatCannotBe(t *testing.T) {
	s, err := NewSolver(Layer{Bottom: Rigid}, nil)
	require.NoError(t, err)
	nan := math.NaN()
	for _, k := range []float64{-1, 0, nan, math.Inf(1)} {
		var input *InputError
		_, err := s.Neutral(Search{}, k)
		require.ErrorAs(t, err, &input)
		assert.Equal(t, "wavenumber", input.Name)
		_, err = s.Growth(1, k)
		assert.ErrorAs(t, err, &input)
		_, err = s.Spectrum(1, k, 1)
		assert.ErrorAs(t, err, &input)
		_, err = s.Curve(Search{}, []float64{1, k})
		assert.ErrorAs(t, err, &input)
		_, err = CoolingHalfSpace{}.Neutral(k)
		assert.ErrorAs(t, err, &input)
		_, err = Stack{Gravity: 1, Layers: []Stratum{{1, 1, 1, 0}, {1, 2, 1, 0}}}.Growth(k)
		assert.ErrorAs(t, err, &input)
	}
	var input *InputError
	_, err = s.Growth(nan, 1)
	assert.ErrorAs(t, err, &input)
	_, err = s.Fastest(math.Inf(1))
	assert.ErrorAs(t, err, &input)
	_, err = s.Spectrum(1, 1, 0)
	assert.ErrorAs(t, err, &input)
	for _, search := range []Search{
		{Number: -1}, {Number: 3}, {Branch: 3}, {Branch: -1}, {Order: -1}, {Rayleigh: nan}, {Number: SoluteRayleigh},
	} {
		_, err := s.Find(search)
		assert.ErrorAs(t, err, &input, "%+v", search)
	}
	rigid, err := NewSolver(Layer{Top: Rigid}, nil)
	require.NoError(t, err)
	_, err = rigid.Find(Search{Number: MarangoniNumber})
	assert.EqualError(t, err, "stability: top is rigid, isothermal, want a free top of a fluid to look for a Marangoni number")
	for _, box := range []Box{{}, {Aspect: -1}, {Aspect: nan}, {Aspect: 1, Sides: 2}} {
		_, _, err := s.InBox(Search{}, box)
		assert.ErrorAs(t, err, &input, "%+v", box)
	}
}

func TestSettings(t *testing.T) {
	for _, bad := range []Settings{{Tolerance: -1}, {Tolerance: math.NaN()}, {MaxUnknowns: -1}} {
		_, err := NewSolver(Layer{}, &bad)
		var input *InputError
		assert.ErrorAs(t, err, &input, "%+v", bad)
	}
	written, err := NewSolver(Layer{Bottom: Rigid}, &Settings{Tolerance: DefaultTolerance, MaxUnknowns: DefaultMaxUnknowns})
	require.NoError(t, err)
	byDefault, err := NewSolver(Layer{Bottom: Rigid}, nil)
	require.NoError(t, err)
	zero, err := NewSolver(Layer{Bottom: Rigid}, &Settings{})
	require.NoError(t, err)
	a, err := written.Critical()
	require.NoError(t, err)
	b, err := byDefault.Critical()
	require.NoError(t, err)
	c, err := zero.Critical()
	require.NoError(t, err)
	assert.Equal(t, a.Rayleigh, b.Rayleigh)
	assert.Equal(t, a.Rayleigh, c.Rayleigh)
}

// Without enough unknowns the best answer comes with its error, and the truth
// is within.
func TestNotConverged(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Rigid, Taylor: 1e6}
	s, err := NewSolver(l, &Settings{MaxUnknowns: 130})
	require.NoError(t, err)
	o, err := s.Critical()
	require.ErrorIs(t, err, ErrNotConverged)
	fine := critical(t, l)
	assert.Greater(t, o.Error.Value, 1e-9*o.Rayleigh)
	assert.InDelta(t, fine.Rayleigh, o.Rayleigh, o.Error.Value)
	assert.NotNil(t, o.Mode)
	s, err = NewSolver(l, &Settings{MaxUnknowns: 10})
	require.NoError(t, err)
	o, err = s.Critical()
	require.ErrorIs(t, err, ErrNotConverged)
	assert.True(t, math.IsInf(o.Error.Value, 1), "one resolution tells nothing of its error")
	// A tolerance that asks for less is met.
	s, err = NewSolver(l, &Settings{Tolerance: 1e-3})
	require.NoError(t, err)
	o, err = s.Critical()
	require.NoError(t, err)
	assert.InEpsilon(t, fine.Rayleigh, o.Rayleigh, 1e-3)
}

func TestNoOnset(t *testing.T) {
	for _, l := range []Layer{
		{Base: Gradient(func(float64) float64 { return -1 })},
		{Base: Gradient(func(z float64) float64 { return -1 - z }), Prandtl: 1},
		{Porous: Darcy, Base: Gradient(func(z float64) float64 { return z - 1 })},
		{Base: Gradient(func(float64) float64 { return 0 })},
	} {
		_, err := l.Critical()
		var missing *NoOnsetError
		require.ErrorAs(t, err, &missing, "%v", l)
		assert.ErrorIs(t, err, ErrNoOnset)
		assert.Less(t, missing.Wavenumber[0], 0.01)
		assert.Greater(t, missing.Wavenumber[1], 100.0)
		_, err = l.Neutral(2)
		assert.ErrorIs(t, err, ErrNoOnset)
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		curve, err := s.Curve(Search{}, []float64{1, 2})
		require.NoError(t, err)
		assert.True(t, math.IsInf(curve[1].Value, 1))
		_, err = l.Fastest(1e5)
		assert.ErrorIs(t, err, ErrStable)
		_, _, err = l.InBox(Box{Aspect: 2})
		assert.ErrorIs(t, err, ErrNoOnset)
	}
	_, err := Layer{}.Find(Search{Branch: OscillatoryOnset})
	assert.ErrorIs(t, err, ErrNoOnset, "the exchange of stabilities holds")
	_, err = Layer{Bottom: Rigid}.Fastest(1000)
	assert.ErrorIs(t, err, ErrStable)
	_, err = Layer{}.Fastest(-1e5)
	assert.ErrorIs(t, err, ErrStable)
	_, err = Layer{Top: Free.Isothermal()}.Find(Search{Number: MarangoniNumber})
	assert.ErrorIs(t, err, ErrNoOnset, "an isothermal surface has no stress")
}

func TestShellsAndStacksThatCannotBe(t *testing.T) {
	var input *InputError
	for _, s := range []Shell{
		{RadiusRatio: -0.1}, {RadiusRatio: 1}, {RadiusRatio: math.NaN()}, {Prandtl: -1}, {Outer: Rigid.Robin(-1)},
		{RadiusRatio: 0.5, Viscosity: func(r float64) float64 { return 1.5 - r }},
		{RadiusRatio: 0.5, Gravity: func(float64) float64 { return math.NaN() }},
	} {
		_, err := s.Critical()
		assert.ErrorAs(t, err, &input, "%+v", s)
		_, err = s.Neutral(2)
		assert.ErrorAs(t, err, &input)
		_, err = s.Growth(1, 2)
		assert.ErrorAs(t, err, &input)
	}
	_, err := Shell{Outer: Permeable}.Critical()
	assert.Error(t, err)
	_, err = Shell{}.Neutral(0)
	assert.ErrorAs(t, err, &input)
	_, err = Shell{}.Growth(1, 0)
	assert.ErrorAs(t, err, &input)
	_, err = Shell{}.Growth(math.NaN(), 1)
	assert.ErrorAs(t, err, &input)
	_, err = Shell{RadiusRatio: 0.5, Gradient: func(float64) float64 { return -1 }}.Critical()
	assert.ErrorIs(t, err, ErrNoOnset)

	good := []Stratum{{1, 1, 1, 0}, {1, 2, 1, 0}}
	for _, s := range []Stack{
		{Layers: good}, {Layers: good, Gravity: -1}, {Gravity: 1}, {Gravity: 1, Layers: good[:1]},
		{Gravity: 1, Layers: []Stratum{{0, 1, 1, 0}, {1, 2, 1, 0}}},
		{Gravity: 1, Layers: []Stratum{{1, -1, 1, 0}, {1, 2, 1, 0}}},
		{Gravity: 1, Layers: []Stratum{{1, 1, 0, 0}, {1, 2, 1, 0}}},
		{Gravity: 1, Layers: []Stratum{{1, 1, 1, -1}, {1, 2, 1, 0}}},
		{Gravity: 1, Layers: good, Top: Permeable},
		{Gravity: 1, Layers: good, Bottom: Impermeable},
	} {
		_, err := s.Growth(1)
		assert.Error(t, err, "%+v", s)
		_, err = s.Fastest()
		assert.Error(t, err, "%+v", s)
	}
	_, err = Stack{Gravity: 1, Layers: []Stratum{{1, 2, 1, 0}, {1, 1, 1, 0}}}.Fastest()
	assert.ErrorIs(t, err, ErrStable)

	for _, h := range []CoolingHalfSpace{
		{Porous: 3}, {Top: Permeable, Porous: Darcy}, {Top: Rigid, Porous: Darcy}, {Top: Permeable}, {Measure: 5},
		{Exponent: -0.5}, {Exponent: math.NaN()},
	} {
		_, err := h.Critical()
		assert.Error(t, err, "%+v", h)
	}
	_, err = CoolingHalfSpace{Measure: FrozenBase}.Critical()
	assert.ErrorIs(t, err, ErrNoOnset)
}

func TestErrorsCanBeToldApart(t *testing.T) {
	_, err := Layer{Taylor: -1}.Critical()
	input, ok := errors.AsType[*InputError](err)
	require.True(t, ok)
	assert.Equal(t, "Taylor number", input.Name)
	assert.Equal(t, -1.0, input.Value)
	assert.NotErrorIs(t, err, ErrNoOnset)
}

func TestNames(t *testing.T) {
	assert.Equal(t, "rigid, Biot number 2.5", Rigid.Robin(2.5).String())
	assert.Equal(t, "free, fixed flux", Free.FixedFlux().String())
	assert.Equal(t, "permeable, isothermal", Permeable.Isothermal().String())
	assert.Equal(t, "impermeable", Impermeable.String())
	assert.Equal(t, "Wall(-1)", Wall(-1).String())
	assert.Equal(t, "solute Rayleigh", SoluteRayleigh.String())
	assert.Equal(t, "Number(9)", Number(9).String())
	assert.Equal(t, "oscillatory", OscillatoryOnset.String())
	assert.Equal(t, "Branch(-2)", Branch(-2).String())
	assert.Equal(t, "fluid layer, bottom free, isothermal, top rigid, Biot number 3, heated from below, uniform viscosity, Pr = 7",
		Layer{Top: Rigid.Robin(3), Prandtl: 7}.String())
	assert.Contains(t, Layer{Porous: Darcy}.String(), "porous layer")
	for _, b := range []Base{
		InternalHeating(), InternalHeatingBetween(), MixedHeating(2), MixedFlux(0.5), CoolingFromAbove(0.01),
		Gradient(math.Sin), Temperature(math.Sin),
	} {
		assert.NotEqual(t, Base{}.String(), b.String())
	}
	for _, v := range []Viscosity{Exponential(1, 0.5), Arrhenius(1, 1, 0), Layered([]float64{0.5}, []float64{1, 2})} {
		assert.NotEqual(t, Viscosity{}.String(), v.String())
	}
	o := critical(t, Layer{})
	assert.Regexp(t, `^Rayleigh number 657\.5114 ± [0-9e.-]+, wavenumber 2\.221441 ± [0-9e.-]+$`, o.String())
	flux := critical(t, Layer{Bottom: Rigid.FixedFlux(), Top: Rigid.FixedFlux()})
	assert.Regexp(t, `^Rayleigh number 720 ± [0-9e.-]+, at zero wavenumber$`, flux.String())
	oscillating := critical(t, Layer{Prandtl: 10, Solute: Solute{Rayleigh: 1000, Diffusivity: 0.1}})
	assert.Contains(t, oscillating.String(), "frequency 16.44797")
}
