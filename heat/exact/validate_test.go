package exact

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Each problem names the field that makes no sense; Solve and Validate say the
// same, and the problem without the fault is good.
func TestValidateNamesTheField(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	bad := Material{Conductivity: -1}
	worse := Material{HeatCapacity: nan}
	type problem interface {
		Problem
		Validate() error
	}
	ice := StefanTwoPhase{Melting: 1, Initial: 1}
	for _, tt := range []struct {
		p    problem
		want string
	}{
		{HalfSpace{Material: bad}, "exact: HalfSpace.Conductivity is -1, want finite and >= 0"},
		{HalfSpace{Material: worse}, "exact: HalfSpace.HeatCapacity is NaN, want finite and >= 0"},
		{HalfSpace{Initial: nan}, "exact: HalfSpace.Initial is NaN, want a finite number"},
		{HalfSpace{Surface: inf}, "exact: HalfSpace.Surface is +Inf, want a finite number"},
		{HalfSpaceFlux{Material: bad}, "HalfSpaceFlux.Conductivity"},
		{HalfSpaceFlux{Initial: -inf}, "HalfSpaceFlux.Initial"},
		{HalfSpaceFlux{Flux: nan}, "HalfSpaceFlux.Flux"},
		{HalfSpaceRobin{Material: bad}, "HalfSpaceRobin.Conductivity"},
		{HalfSpaceRobin{Initial: nan}, "HalfSpaceRobin.Initial"},
		{HalfSpaceRobin{Ambient: nan}, "HalfSpaceRobin.Ambient"},
		{HalfSpaceRobin{Coefficient: -1}, "HalfSpaceRobin.Coefficient is -1"},
		{PeriodicSurface{Material: bad}, "PeriodicSurface.Conductivity"},
		{PeriodicSurface{Mean: nan}, "PeriodicSurface.Mean"},
		{PeriodicSurface{Amplitude: nan}, "PeriodicSurface.Amplitude"},
		{PeriodicSurface{Period: -1}, "PeriodicSurface.Period"},
		{Slab{Material: bad}, "Slab.Conductivity"},
		{Slab{Thickness: inf}, "Slab.Thickness is +Inf"},
		{Slab{Initial: nan}, "Slab.Initial"},
		{Slab{Low: nan}, "Slab.Low"},
		{Slab{High: nan}, "Slab.High"},
		{Slab{Source: nan}, "Slab.Source"},
		{SlabInsulated{Material: bad}, "SlabInsulated.Conductivity"},
		{SlabInsulated{Thickness: -1}, "SlabInsulated.Thickness"},
		{SlabInsulated{Initial: nan}, "SlabInsulated.Initial"},
		{SlabInsulated{Low: nan}, "SlabInsulated.Low"},
		{SlabInsulated{Source: nan}, "SlabInsulated.Source"},
		{SlabRobin{Material: bad}, "SlabRobin.Conductivity"},
		{SlabRobin{Thickness: -1}, "SlabRobin.Thickness"},
		{SlabRobin{Initial: nan}, "SlabRobin.Initial"},
		{SlabRobin{Ambient: nan}, "SlabRobin.Ambient"},
		{SlabRobin{Coefficient: -1}, "SlabRobin.Coefficient"},
		{Throughflow{Material: bad}, "Throughflow.Conductivity"},
		{Throughflow{Thickness: -1}, "Throughflow.Thickness"},
		{Throughflow{Velocity: nan}, "Throughflow.Velocity"},
		{Throughflow{Low: nan}, "Throughflow.Low"},
		{Throughflow{High: nan}, "Throughflow.High"},
		{Inflow{Material: bad}, "Inflow.Conductivity"},
		{Inflow{Velocity: nan}, "Inflow.Velocity"},
		{Inflow{Initial: nan}, "Inflow.Initial"},
		{Inflow{Surface: nan}, "Inflow.Surface"},
		{Upflow{Material: bad}, "Upflow.Conductivity"},
		{Upflow{Speed: -1}, "Upflow.Speed"},
		{Upflow{Surface: nan}, "Upflow.Surface"},
		{Upflow{Deep: nan}, "Upflow.Deep"},
		{StagnationFlow{Material: bad}, "StagnationFlow.Conductivity"},
		{StagnationFlow{Rate: -1}, "StagnationFlow.Rate"},
		{StagnationFlow{Surface: nan}, "StagnationFlow.Surface"},
		{StagnationFlow{Far: nan}, "StagnationFlow.Far"},
		{CouetteHeating{Material: bad}, "CouetteHeating.Conductivity"},
		{CouetteHeating{Thickness: -1}, "CouetteHeating.Thickness"},
		{CouetteHeating{Viscosity: -1}, "CouetteHeating.Viscosity"},
		{CouetteHeating{Speed: nan}, "CouetteHeating.Speed"},
		{CouetteHeating{Low: nan}, "CouetteHeating.Low"},
		{CouetteHeating{High: nan}, "CouetteHeating.High"},
		{Leveque{Material: bad}, "Leveque.Conductivity"},
		{Leveque{Shear: -1}, "Leveque.Shear"},
		{Leveque{Wall: nan}, "Leveque.Wall"},
		{Leveque{Far: nan}, "Leveque.Far"},
		{Contact{Lower: bad}, "Contact.Lower.Conductivity"},
		{Contact{Upper: worse}, "Contact.Upper.HeatCapacity"},
		{Contact{LowerInitial: nan}, "Contact.LowerInitial"},
		{Contact{UpperInitial: nan}, "Contact.UpperInitial"},
		{StefanOnePhase{Material: bad, Melting: 1}, "StefanOnePhase.Conductivity"},
		{StefanOnePhase{LatentHeat: -1, Melting: 1}, "StefanOnePhase.LatentHeat"},
		{StefanOnePhase{Surface: nan}, "StefanOnePhase.Surface"},
		{StefanOnePhase{Melting: nan}, "StefanOnePhase.Melting"},
		{StefanOnePhase{Surface: 2, Melting: 2}, "StefanOnePhase.Surface is 2, want other than Melting"},
		{with(ice, func(s *StefanTwoPhase) { s.Solid = bad }), "StefanTwoPhase.Solid.Conductivity"},
		{with(ice, func(s *StefanTwoPhase) { s.Liquid = bad }), "StefanTwoPhase.Liquid.Conductivity"},
		{with(ice, func(s *StefanTwoPhase) { s.LatentHeat = nan }), "StefanTwoPhase.LatentHeat"},
		{with(ice, func(s *StefanTwoPhase) { s.Surface = -inf }), "StefanTwoPhase.Surface"},
		{with(ice, func(s *StefanTwoPhase) { s.Melting = nan }), "StefanTwoPhase.Melting"},
		{with(ice, func(s *StefanTwoPhase) { s.Initial = inf }), "StefanTwoPhase.Initial"},
		{with(ice, func(s *StefanTwoPhase) { s.Surface = 1 }), "StefanTwoPhase.Surface is 1, want below Melting, 1"},
		{with(ice, func(s *StefanTwoPhase) { s.Initial = 0.5 }), "StefanTwoPhase.Initial is 0.5, want at least Melting, 1"},
		{StefanContact{Material: bad, Melting: 1}, "StefanContact.Conductivity"},
		{StefanContact{LatentHeat: -1, Melting: 1}, "StefanContact.LatentHeat"},
		{StefanContact{Rock: nan, Melting: 1}, "StefanContact.Rock"},
		{StefanContact{Melting: inf}, "StefanContact.Melting"},
		{StefanContact{Rock: 1, Melting: 1}, "StefanContact.Rock is 1, want below Melting, 1"},
		{Geotherm{Material: bad}, "Geotherm.Conductivity"},
		{Geotherm{Surface: nan}, "Geotherm.Surface"},
		{Geotherm{HeatFlow: nan}, "Geotherm.HeatFlow"},
		{Geotherm{Source: nan}, "Geotherm.Source"},
		{GeothermExponential{Material: bad}, "GeothermExponential.Conductivity"},
		{GeothermExponential{Surface: nan}, "GeothermExponential.Surface"},
		{GeothermExponential{MantleFlow: nan}, "GeothermExponential.MantleFlow"},
		{GeothermExponential{Source: nan}, "GeothermExponential.Source"},
		{GeothermExponential{Depth: -1}, "GeothermExponential.Depth"},
		{Cylinder{Material: bad}, "Cylinder.Conductivity"},
		{Cylinder{Radius: -1}, "Cylinder.Radius"},
		{Cylinder{Initial: nan}, "Cylinder.Initial"},
		{Cylinder{Surface: nan}, "Cylinder.Surface"},
		{Gaussian{Material: bad}, "Gaussian.Conductivity"},
		{Gaussian{Amplitude: nan}, "Gaussian.Amplitude"},
		{Gaussian{Width: -1}, "Gaussian.Width"},
		{Gaussian{X: nan}, "Gaussian.X"},
		{Gaussian{Z: nan}, "Gaussian.Z"},
		{Gaussian{VX: nan}, "Gaussian.VX"},
		{Gaussian{VZ: nan}, "Gaussian.VZ"},
		{GaussianRotation{Width: -1}, "GaussianRotation.Width"},
		{GaussianRotation{Rate: nan}, "GaussianRotation.Rate"},
		{GaussianShear{Width: -1}, "GaussianShear.Width"},
		{GaussianShear{Rate: nan}, "GaussianShear.Rate"},
		{LineSource{Heat: nan}, "LineSource.Heat"},
		{LineSource{X: nan}, "LineSource.X"},
		{BoxMode{Material: bad}, "BoxMode.Conductivity"},
		{BoxMode{Width: -1}, "BoxMode.Width"},
		{BoxMode{Height: -1}, "BoxMode.Height"},
		{BoxMode{Amplitude: nan}, "BoxMode.Amplitude"},
		{BoxMode{M: -1}, "BoxMode.M and N are -1 and 0, want >= 0"},
		{BoxMode{N: -1}, "BoxMode.M and N are 0 and -1, want >= 0"},
		{HotTop{Material: bad}, "HotTop.Conductivity"},
		{HotTop{Width: -1}, "HotTop.Width"},
		{HotTop{Height: -1}, "HotTop.Height"},
		{HotTop{Top: nan}, "HotTop.Top"},
		{HotTop{Others: nan}, "HotTop.Others"},
		{ConductivityLinear{Material: bad}, "ConductivityLinear.Conductivity"},
		{ConductivityLinear{Thickness: -1}, "ConductivityLinear.Thickness"},
		{ConductivityLinear{Slope: nan}, "ConductivityLinear.Slope"},
		{ConductivityLinear{Low: nan}, "ConductivityLinear.Low"},
		{ConductivityLinear{High: nan}, "ConductivityLinear.High"},
		{ConductivityLinear{Slope: -1, High: 1}, "ConductivityLinear.Slope is -1, want a conductivity > 0 between 0 and 1"},
		{ConductivityLinear{Slope: 1, Low: -1}, "want a conductivity > 0 between -1 and 0"},
		{ConductivityInverse{Material: bad}, "ConductivityInverse.Conductivity"},
		{ConductivityInverse{Thickness: -1}, "ConductivityInverse.Thickness"},
		{ConductivityInverse{Reference: -1}, "ConductivityInverse.Reference"},
		{ConductivityInverse{Low: -1}, "ConductivityInverse.Low"},
		{ConductivityInverse{High: -1}, "ConductivityInverse.High"},
		{ConductivityExponential{Material: bad}, "ConductivityExponential.Conductivity"},
		{ConductivityExponential{Thickness: -1}, "ConductivityExponential.Thickness"},
		{ConductivityExponential{Growth: nan}, "ConductivityExponential.Growth"},
		{ConductivityExponential{Low: nan}, "ConductivityExponential.Low"},
		{ConductivityExponential{High: nan}, "ConductivityExponential.High"},
		{Layers{}, "Layers.Thicknesses has 0 values and Conductivities 0, want as many, and at least one"},
		{Layers{Thicknesses: []float64{1}}, "Layers.Thicknesses has 1 values and Conductivities 0"},
		{Layers{Thicknesses: []float64{1, 0}, Conductivities: []float64{1, 1}}, "Layers.Thicknesses[1] is 0, want finite and > 0"},
		{Layers{Thicknesses: []float64{1, 1}, Conductivities: []float64{-1, 1}}, "Layers.Conductivities[0] is -1"},
		{Layers{Thicknesses: []float64{1}, Conductivities: []float64{1}, Low: nan}, "Layers.Low"},
		{Layers{Thicknesses: []float64{1}, Conductivities: []float64{1}, High: nan}, "Layers.High"},
		{Cell{Sides: Robin}, "Cell.Sides is Robin, want insulating or isothermal"},
		{Cell{Material: bad}, "Cell.Conductivity"},
		{Cell{Width: -1}, "Cell.Width"},
		{Cell{Height: -1}, "Cell.Height"},
		{Cell{Velocity: nan}, "Cell.Velocity"},
		{Cell{Decay: nan}, "Cell.Decay"},
		{Manufactured{Material: bad}, "Manufactured.Conductivity"},
		{Manufactured{Walls: Walls{Top: Periodic}}, "Manufactured.Walls has bottom insulating and top periodic, want only sides periodic"},
		{Manufactured{Width: -1}, "Manufactured.Width"},
		{Manufactured{Height: -1}, "Manufactured.Height"},
		{Manufactured{Contrast: -1}, "Manufactured.Contrast"},
		{Manufactured{Velocity: nan}, "Manufactured.Velocity"},
		{Manufactured{Decay: nan}, "Manufactured.Decay"},
	} {
		s, err := tt.p.Solve()
		assert.ErrorContains(t, err, tt.want)
		assert.Nil(t, s)
		assert.Equal(t, err, tt.p.Validate())
	}
	require.NoError(t, ice.Validate())
	require.NoError(t, Sphere{}.Validate())
	require.NoError(t, Cell{Sides: Isothermal}.Validate())
	for want, s := range map[string]Sphere{
		"Sphere.Conductivity": {Material: bad}, "Sphere.Radius": {Radius: -1}, "Sphere.Initial": {Initial: nan}, "Sphere.Surface": {Surface: nan},
	} {
		assert.ErrorContains(t, s.Validate(), want)
	}
}

// with returns a changed copy of a value.
func with[T any](v T, change func(*T)) T {
	change(&v)
	return v
}
