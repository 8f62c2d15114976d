package exact_test

import (
	"math"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestBadParametersAreNamed(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	layer := exact.Layer{Thickness: 1, Viscosity: 1}
	box := exact.BoxMode{Viscosity: 1, KX: 1, KZ: 1, Force: 1}
	jump := exact.ColumnJump{Width: 1, Jump: 0.5, Left: 1, Right: 1, KX: 1, KZ: 1, Force: 1}
	exponential := exact.ExponentialViscosity{Height: 1, AtBottom: 1, AtTop: 1, KX: 1, KZ: 1, Force: 1}
	inclusion := exact.Inclusion{Radius: 1, Inside: 1, Outside: 1, Stretch: 1}
	channel := exact.Channel{Height: 1, AtBottom: 1, AtTop: 1, VTop: 1}
	corner := exact.Corner{Viscosity: 1, To: exact.Plate{Angle: 1, VX: 1}}
	relaxation := exact.Relaxation{KX: 1, Layers: []exact.Layer{layer}, Weight: 1, Amplitude: 1}
	taylor := exact.RayleighTaylor{KX: 1, Lower: layer, Upper: layer, Weight: 1, Amplitude: 1}
	made := exact.Manufactured{Width: 1, Height: 1, Viscosity: 1, Contrast: 1, Velocity: 1}
	for _, good := range []exact.Problem{box, jump, exponential, inclusion, channel, corner, relaxation, taylor, made} {
		_, err := good.Solve()
		require.NoError(t, err)
	}
	layers := func(l ...exact.Layer) exact.Layers { return exact.Layers{KX: 1, Layers: l} }
	columns := func(l ...exact.Column) exact.Columns { return exact.Columns{KZ: 1, Columns: l} }
	for _, tt := range []struct {
		problem exact.Problem
		want    string
	}{
		{with(box, func(p *exact.BoxMode) { p.Viscosity = 0 }), "exact: BoxMode.Viscosity is 0, want > 0 and finite"},
		{with(box, func(p *exact.BoxMode) { p.KX = -1 }), "exact: BoxMode.KX is -1, want > 0 and finite"},
		{with(box, func(p *exact.BoxMode) { p.KZ = inf }), "exact: BoxMode.KZ is +Inf, want > 0 and finite"},
		{with(box, func(p *exact.BoxMode) { p.Force = 0 }), "exact: BoxMode.Force is 0, want not 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.Width = nan }), "exact: ColumnJump.Width is NaN, want > 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.Jump = 1 }), "exact: ColumnJump.Jump is 1, want between 0 and Width = 1"},
		{with(jump, func(p *exact.ColumnJump) { p.Jump = 0 }), "exact: ColumnJump.Jump is 0, want between 0 and Width = 1"},
		{with(jump, func(p *exact.ColumnJump) { p.Left = 0 }), "exact: ColumnJump.Left is 0, want > 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.Right = -2 }), "exact: ColumnJump.Right is -2, want > 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.KX = 0 }), "exact: ColumnJump.KX is 0, want > 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.KZ = 0 }), "exact: ColumnJump.KZ is 0, want > 0 and finite"},
		{with(jump, func(p *exact.ColumnJump) { p.Force = nan }), "exact: ColumnJump.Force is NaN, want not 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.Height = 0 }), "exact: ExponentialViscosity.Height is 0, want > 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.AtBottom = 0 }), "exact: ExponentialViscosity.AtBottom is 0, want > 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.AtTop = inf }), "exact: ExponentialViscosity.AtTop is +Inf, want > 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.AtBottom, p.AtTop = 1e200, 1e-200 }),
			"exact: ExponentialViscosity.AtTop is 1e-200, want a number whose ratio to the other viscosity neither overflows nor vanishes"},
		{with(channel, func(p *exact.Channel) { p.AtBottom, p.AtTop = 1e-200, 1e200 }),
			"exact: Channel.AtTop is 1e+200, want a number whose ratio to the other viscosity neither overflows nor vanishes"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.KX = 0 }), "exact: ExponentialViscosity.KX is 0, want > 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.KZ = 0 }), "exact: ExponentialViscosity.KZ is 0, want > 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.Force = 0 }), "exact: ExponentialViscosity.Force is 0, want not 0 and finite"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.BottomWall = exact.Driven }), "exact: ExponentialViscosity.BottomWall is driven, want FreeSlip or NoSlip"},
		{with(exponential, func(p *exact.ExponentialViscosity) { p.TopWall = exact.Periodic }), "exact: ExponentialViscosity.TopWall is periodic, want FreeSlip or NoSlip"},
		{layers(), "exact: Layers.Layers is [], want one layer or more"},
		{exact.Layers{Layers: []exact.Layer{layer}}, "exact: Layers.KX is 0, want > 0 and finite"},
		{exact.Layers{KX: 1, Layers: []exact.Layer{layer}, Top: 9}, "exact: Layers.Top is Wall(9), want FreeSlip or NoSlip"},
		{exact.Layers{KX: 1, Layers: []exact.Layer{layer}, Bottom: exact.Driven}, "exact: Layers.Bottom is driven, want FreeSlip or NoSlip"},
		{layers(layer, exact.Layer{Viscosity: 1}), "exact: Layers.Layers[1].Thickness is 0, want > 0 and finite"},
		{layers(layer, exact.Layer{Thickness: inf, Viscosity: 1}, layer), "exact: Layers.Layers[1].Thickness is +Inf, want > 0 and finite"},
		{layers(exact.Layer{Thickness: math.Inf(-1), Viscosity: 1}), "exact: Layers.Layers[0].Thickness is -Inf, want > 0 and finite"},
		{layers(exact.Layer{Thickness: 1}), "exact: Layers.Layers[0].Viscosity is 0, want > 0 and finite"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Contrast: -1}), "exact: Layers.Layers[0].Contrast is -1, want >= 0 and finite"},
		{layers(exact.Layer{Thickness: inf, Viscosity: 1, Contrast: 2}), "exact: Layers.Layers[0].Contrast is 2, want 1 or 0 in an infinite layer"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Sheet: nan}), "exact: Layers.Layers[0].Sheet is NaN, want a finite number"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Force: exact.Profile{Mean: inf}}), "exact: Layers.Layers[0].Force.Mean is +Inf, want a finite number"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Force: exact.Profile{Sine: inf}}), "exact: Layers.Layers[0].Force.Sine is +Inf, want a finite number"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Force: exact.Profile{Cosine: nan}}), "exact: Layers.Layers[0].Force.Cosine is NaN, want a finite number"},
		{layers(exact.Layer{Thickness: 1, Viscosity: 1, Force: exact.Profile{Wavenumber: -1}}), "exact: Layers.Layers[0].Force.Wavenumber is -1, want >= 0 and finite"},
		{columns(), "exact: Columns.Columns is [], want one column or more"},
		{exact.Columns{Columns: []exact.Column{{Width: 1, Viscosity: 1}}}, "exact: Columns.KZ is 0, want > 0 and finite"},
		{exact.Columns{KZ: 1, Columns: []exact.Column{{Width: 1, Viscosity: 1}}, Left: exact.Driven}, "exact: Columns.Left is driven, want FreeSlip or NoSlip"},
		{exact.Columns{KZ: 1, Columns: []exact.Column{{Width: 1, Viscosity: 1}}, Right: exact.Driven}, "exact: Columns.Right is driven, want FreeSlip or NoSlip"},
		{columns(exact.Column{Viscosity: 1}), "exact: Columns.Columns[0].Width is 0, want > 0 and finite"},
		{columns(exact.Column{Width: 1}), "exact: Columns.Columns[0].Viscosity is 0, want > 0 and finite"},
		{columns(exact.Column{Width: 1, Viscosity: 1, Contrast: nan}), "exact: Columns.Columns[0].Contrast is NaN, want >= 0 and finite"},
		{columns(exact.Column{Width: inf, Viscosity: 1, Contrast: 3}), "exact: Columns.Columns[0].Contrast is 3, want 1 or 0 in an infinite column"},
		{columns(exact.Column{Width: 1, Viscosity: 1, Force: exact.Profile{Mean: nan}}), "exact: Columns.Columns[0].Force.Mean is NaN, want a finite number"},
		{with(inclusion, func(p *exact.Inclusion) { p.Radius = 0 }), "exact: Inclusion.Radius is 0, want > 0 and finite"},
		{with(inclusion, func(p *exact.Inclusion) { p.Inside = inf }), "exact: Inclusion.Inside is +Inf, want > 0 and finite"},
		{with(inclusion, func(p *exact.Inclusion) { p.Outside = 0 }), "exact: Inclusion.Outside is 0, want > 0 and finite"},
		{with(inclusion, func(p *exact.Inclusion) { p.Stretch = nan }), "exact: Inclusion.Stretch is NaN, want a finite number"},
		{with(inclusion, func(p *exact.Inclusion) { p.Shear = inf }), "exact: Inclusion.Shear is +Inf, want a finite number"},
		{with(inclusion, func(p *exact.Inclusion) { p.Stretch = 0 }), "exact: Inclusion.Stretch is 0, want not 0 where Shear is 0"},
		{with(channel, func(p *exact.Channel) { p.Height = 0 }), "exact: Channel.Height is 0, want > 0 and finite"},
		{with(channel, func(p *exact.Channel) { p.AtBottom = 0 }), "exact: Channel.AtBottom is 0, want > 0 and finite"},
		{with(channel, func(p *exact.Channel) { p.AtTop = 0 }), "exact: Channel.AtTop is 0, want > 0 and finite"},
		{with(channel, func(p *exact.Channel) { p.VBottom = nan }), "exact: Channel.VBottom is NaN, want a finite number"},
		{with(channel, func(p *exact.Channel) { p.VTop = nan }), "exact: Channel.VTop is NaN, want a finite number"},
		{with(channel, func(p *exact.Channel) { p.PressureGradient = nan }), "exact: Channel.PressureGradient is NaN, want a finite number"},
		{with(channel, func(p *exact.Channel) { p.Force = nan }), "exact: Channel.Force is NaN, want a finite number"},
		{with(channel, func(p *exact.Channel) { p.FreeTop = true }), "exact: Channel.VTop is 1, want 0 where FreeTop is set"},
		{with(corner, func(p *exact.Corner) { p.Viscosity = 0 }), "exact: Corner.Viscosity is 0, want > 0 and finite"},
		{with(corner, func(p *exact.Corner) { p.From.Angle = nan }), "exact: Corner.From.Angle is NaN, want a finite number"},
		{with(corner, func(p *exact.Corner) { p.From.VX = nan }), "exact: Corner.From.VX is NaN, want a finite number"},
		{with(corner, func(p *exact.Corner) { p.To.VZ = nan }), "exact: Corner.To.VZ is NaN, want a finite number"},
		{with(corner, func(p *exact.Corner) { p.To.Angle = 0 }), "exact: Corner.To.Angle is 0, want more than From.Angle, by 2π at most"},
		{with(corner, func(p *exact.Corner) { p.To.Angle = 7 }), "exact: Corner.To.Angle is 7, want more than From.Angle, by 2π at most"},
		{with(relaxation, func(p *exact.Relaxation) { p.KX = 0 }), "exact: Relaxation.KX is 0, want > 0 and finite"},
		{with(relaxation, func(p *exact.Relaxation) { p.Weight = 0 }), "exact: Relaxation.Weight is 0, want > 0 and finite"},
		{with(relaxation, func(p *exact.Relaxation) { p.Amplitude = 0 }), "exact: Relaxation.Amplitude is 0, want not 0 and finite"},
		{with(relaxation, func(p *exact.Relaxation) { p.Layers = nil }), "exact: Relaxation.Layers is [], want one layer or more"},
		{with(relaxation, func(p *exact.Relaxation) { p.Layers = []exact.Layer{layer, {Thickness: inf, Viscosity: 1}} }),
			"exact: Relaxation.Layers[1].Thickness is +Inf, want > 0 and finite: the surface lies above it"},
		{with(relaxation, func(p *exact.Relaxation) { p.Layers = []exact.Layer{{Thickness: 1, Viscosity: 1, Sheet: 1}} }),
			"exact: Relaxation.Layers[0].Sheet is 1, want 0"},
		{with(relaxation, func(p *exact.Relaxation) {
			p.Layers = []exact.Layer{{Thickness: 1, Viscosity: 1, Force: exact.Profile{Mean: 1}}}
		}), "exact: Relaxation.Layers[0].Force is {1 0 0 0}, want none"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.KX = 0 }), "exact: RayleighTaylor.KX is 0, want > 0 and finite"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Weight = 0 }), "exact: RayleighTaylor.Weight is 0, want not 0 and finite"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Amplitude = nan }), "exact: RayleighTaylor.Amplitude is NaN, want not 0 and finite"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Lower.Viscosity = 0 }), "exact: RayleighTaylor.Lower.Viscosity is 0, want > 0 and finite"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Upper.Thickness = 0 }), "exact: RayleighTaylor.Upper.Thickness is 0, want > 0 and finite"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Upper.Sheet = 1 }), "exact: RayleighTaylor.Upper.Sheet is 1, want 0"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Lower.Force.Mean = 1 }), "exact: RayleighTaylor.Lower.Force is {1 0 0 0}, want none"},
		{with(taylor, func(p *exact.RayleighTaylor) { p.Top = exact.Driven }), "exact: RayleighTaylor.Top is driven, want FreeSlip or NoSlip"},
		{with(made, func(p *exact.Manufactured) { p.Walls = exact.Driven }), "exact: Manufactured.Walls is driven, want FreeSlip, NoSlip or Periodic"},
		{with(made, func(p *exact.Manufactured) { p.Width = 0 }), "exact: Manufactured.Width is 0, want > 0 and finite"},
		{with(made, func(p *exact.Manufactured) { p.Height = 0 }), "exact: Manufactured.Height is 0, want > 0 and finite"},
		{with(made, func(p *exact.Manufactured) { p.Viscosity = 0 }), "exact: Manufactured.Viscosity is 0, want > 0 and finite"},
		{with(made, func(p *exact.Manufactured) { p.Contrast = 0 }), "exact: Manufactured.Contrast is 0, want > 0 and finite"},
		{with(made, func(p *exact.Manufactured) { p.Velocity = 0 }), "exact: Manufactured.Velocity is 0, want not 0 and finite"},
	} {
		s, err := tt.problem.Solve()
		assert.EqualError(t, err, tt.want)
		assert.Nil(t, s)
	}
	_, err := with(relaxation, func(p *exact.Relaxation) { p.Weight = -1 }).Rate()
	assert.EqualError(t, err, "exact: Relaxation.Weight is -1, want > 0 and finite")
	_, err = with(taylor, func(p *exact.RayleighTaylor) { p.Weight = 0 }).Rate()
	assert.EqualError(t, err, "exact: RayleighTaylor.Weight is 0, want not 0 and finite")
}

// with returns a copy that was changed.
func with[P any](p P, change func(*P)) P {
	change(&p)
	return p
}

// Solutions that rounding would spoil are errors, not wrong numbers.
func TestLostToRounding(t *testing.T) {
	for name, p := range map[string]exact.Problem{
		"balanced by pressure alone": exact.Columns{KZ: 1, Columns: []exact.Column{
			{Width: 1, Viscosity: 1, Force: exact.Profile{Mean: 1}}, {Width: 1, Viscosity: 2, Force: exact.Profile{Mean: 1}}}},
		"overflow": exact.ExponentialViscosity{Height: 1, AtBottom: 1e-300, AtTop: 1e-300, KX: 1e-100, KZ: 1, Force: 1e300},
	} {
		s, err := p.Solve()
		assert.ErrorIs(t, err, exact.ErrRounding, name)
		assert.ErrorContains(t, err, "rounding error is about", name)
		assert.Nil(t, s, name)
	}
}

// Layers without loads are at rest.
func TestNoLoadNoFlow(t *testing.T) {
	s, err := exact.Layers{KX: 1, Layers: []exact.Layer{{Thickness: 1, Viscosity: 1}, {Thickness: 20, Viscosity: 3}}}.Solve()
	require.NoError(t, err)
	assert.Equal(t, exact.Fields{}, s.At(0.3, 0.4))
}
