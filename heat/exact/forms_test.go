package exact

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

// The formulas of the doc comments, written down plainly, in layers and boxes
// that are not of size 1.
func TestPlainFormulas(t *testing.T) {
	pi, exp, sin, cos := math.Pi, math.Exp, math.Sin, math.Cos
	m := Material{2, 5} // κ = 0.4
	for _, tt := range []struct {
		name string
		s    Solution
		want func(x, z, t float64) float64
	}{
		{"box mode", BoxMode{Material: m, Width: 2, Height: 0.5, M: 3, N: 2, Amplitude: 4}, func(x, z, t float64) float64 {
			return 4 * sin(3*pi*x/2) * sin(2*pi*z/0.5) * exp(-0.4*pi*pi*(9.0/4+4/0.25)*t)
		}},
		{"throughflow", Throughflow{Material: m, Thickness: 2, Velocity: 0.6, Low: 1, High: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*(exp(0.6*z/0.4)-1)/(exp(3)-1)
		}},
		{"throughflow down", Throughflow{Material: m, Thickness: 2, Velocity: -0.6, Low: 1, High: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*(exp(-0.6*z/0.4)-1)/(exp(-3)-1)
		}},
		{"upflow", Upflow{Material: m, Speed: 0.6, Surface: 1, Deep: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*(1-exp(-0.6*z/0.4))
		}},
		{"stagnation flow", StagnationFlow{Material: m, Rate: 0.6, Surface: 1, Far: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*math.Erf(z*math.Sqrt(0.6/0.8))
		}},
		{"couette heating", CouetteHeating{Material: m, Thickness: 2, Viscosity: 3, Speed: 4, Low: 1, High: 5}, func(_, z, _ float64) float64 {
			return 1 + 4*z/2 + 3.0*16/4*(z/2)*(1-z/2)
		}},
		{"conductivity linear", ConductivityLinear{Material: m, Thickness: 2, Slope: 0.5, Low: 1, High: 4}, func(_, z, _ float64) float64 {
			// T + ¼T² from 1.25 to 8.
			return 2 * (math.Sqrt(1+1.25+6.75*z/2) - 1)
		}},
		{"conductivity inverse", ConductivityInverse{Material: m, Thickness: 2, Reference: 7, Low: 2, High: 8}, func(_, z, _ float64) float64 {
			return 2 * math.Pow(4, z/2)
		}},
		{"conductivity exponential", ConductivityExponential{Material: m, Thickness: 2, Growth: 3, Low: 1, High: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*(1-exp(-3*z/2))/(1-exp(-3))
		}},
		{"conductivity exponential down", ConductivityExponential{Material: m, Thickness: 2, Growth: -3, Low: 1, High: 4}, func(_, z, _ float64) float64 {
			return 1 + 3*(1-exp(3*z/2))/(1-exp(3))
		}},
		{"geotherm", Geotherm{Material: m, Surface: 3, HeatFlow: 6, Source: 2}, func(_, z, _ float64) float64 {
			return 3 + 6*z/2 - 2*z*z/4
		}},
		{"geotherm exponential", GeothermExponential{Material: m, Surface: 3, MantleFlow: 6, Source: 2, Depth: 0.5}, func(_, z, _ float64) float64 {
			return 3 + 6*z/2 + 2*0.25/2*(1-exp(-z/0.5))
		}},
		{"periodic surface", PeriodicSurface{Material: m, Mean: 3, Amplitude: 2, Period: 4}, func(_, z, t float64) float64 {
			delta := math.Sqrt(2 * 0.4 / (pi / 2))
			return 3 + 2*exp(-z/delta)*cos(pi/2*t-z/delta)
		}},
		{"slab", Slab{Material: m, Thickness: 0.5, Initial: 3, Low: 1, High: 4, Source: 8}, func(_, z, t float64) float64 {
			sum := 1 + 3*z/0.5 + 8.0/4*z*(0.5-z)
			for n := 1.0; n < 60; n++ {
				k, sign := n*pi/0.5, math.Pow(-1, n)
				a := 2/(n*pi)*(2+sign) - 2/(n*pi)*(1-sign)*8/2/(k*k)
				sum += a * sin(k*z) * exp(-k*k*0.4*t)
			}
			return sum
		}},
		{"cell", Cell{Material: m, Width: 2, Height: 0.5, Decay: 3}, func(x, z, t float64) float64 {
			return exp(-3*t)*cos(pi*x/2)*sin(pi*z/0.5) + 1 - z/0.5
		}},
		{"cell, isothermal", Cell{Material: m, Width: 2, Height: 0.5, Sides: Isothermal}, func(x, z, t float64) float64 {
			return exp(-t) * sin(pi*x/2) * sin(pi*z/0.5)
		}},
		{"manufactured, isothermal", Manufactured{Walls: Walls{Isothermal, Robin, Flux, Isothermal}, Width: 2, Height: 0.5, Decay: 3}, func(x, z, t float64) float64 {
			b := math.Pow(sin(pi*x/2)*sin(pi*z/0.5), 2)
			return 1 + 0.8*sin(2.3*x/2+0.4)*cos(1.7*z/0.5+0.3) + 0.3*exp(-3*t)*b
		}},
		{"manufactured, insulating", Manufactured{Walls: Walls{Left: Isothermal}, Width: 2, Height: 0.5, Decay: 3}, func(x, z, t float64) float64 {
			b := math.Pow(sin(pi*x/2)*sin(pi*z/0.5), 2)
			px, pz := 2*sin(pi*x/4), 0.25*(1-cos(pi*z/0.5))
			return 1 + 0.8*sin(2.3*px/2+0.4)*cos(1.7*pz/0.5+0.3) + 0.3*exp(-3*t)*b
		}},
		{"manufactured, insulating on the left", Manufactured{Walls: Walls{Right: Isothermal, Top: Isothermal}, Width: 2, Height: 0.5}, func(x, z, _ float64) float64 {
			b := math.Pow(sin(pi*x/2)*sin(pi*z/0.5), 2)
			px, pz := 2*(1-cos(pi*x/4)), 0.5*(1-cos(pi*z/1))
			return 1 + 0.8*sin(2.3*px/2+0.4)*cos(1.7*pz/0.5+0.3) + 0.3*b
		}},
		{"manufactured, periodic", Manufactured{Walls: Walls{Periodic, Periodic, Robin, Robin}, Width: 2, Height: 0.5, Decay: 3}, func(x, z, t float64) float64 {
			b := (1 + 0.5*sin(pi*x)) * math.Pow(sin(pi*z/0.5), 2)
			return 1 + 0.8*sin(pi*x+0.4)*cos(1.7*z/0.5+0.3) + 0.3*exp(-3*t)*b
		}},
	} {
		for _, at := range [][3]float64{{0.3, 0.1, 0.02}, {1.1, 0.4, 0.05}, {1.9, 0.27, 0.3}} {
			near(t, tt.want(at[0], at[1], at[2]), tt.s.At(at[0], at[1], at[2]).Temperature, 1e-12, tt.name)
		}
	}
}

// The coefficients of the equation, likewise.
func TestPlainCoefficients(t *testing.T) {
	const x, z, time = 0.3, 0.1, 0.02
	m := Material{2, 5}
	for _, tt := range []struct{ got, want Medium }{
		{HalfSpace{Material: m}.Medium(x, z, time), Medium{2, 5, 0, 0, 0}},
		{Slab{Material: m, Source: 3}.Medium(x, z, time), Medium{2, 5, 3, 0, 0}},
		{SlabInsulated{Material: m, Source: 3}.Medium(x, z, time), Medium{2, 5, 3, 0, 0}},
		{Throughflow{Material: m, Velocity: -3}.Medium(x, z, time), Medium{2, 5, 0, 0, -3}},
		{Inflow{Material: m, Velocity: 3}.Medium(x, z, time), Medium{2, 5, 0, 0, 3}},
		{Upflow{Material: m, Speed: 3}.Medium(x, z, time), Medium{2, 5, 0, 0, -3}},
		{StagnationFlow{Material: m, Rate: 3}.Medium(x, z, time), Medium{2, 5, 0, 3 * x, -3 * z}},
		{CouetteHeating{Material: m, Thickness: 2, Viscosity: 7, Speed: 4}.Medium(x, 1.5, time), Medium{2, 5, 28, 3, 0}},
		{Leveque{Material: m, Shear: 3}.Medium(x, z, time), Medium{2, 5, 0, 3 * z, 0}},
		{Gaussian{Material: m, VX: 3, VZ: 4}.Medium(x, z, time), Medium{2, 5, 0, 3, 4}},
		{GaussianRotation{Material: m, Rate: 3}.Medium(x, z, time), Medium{2, 5, 0, -3 * z, 3 * x}},
		{GaussianShear{Material: m, Rate: 3}.Medium(x, z, time), Medium{2, 5, 0, 3 * z, 0}},
		{Contact{Lower: m}.Medium(x, -z, time), Medium{2, 5, 0, 0, 0}},
		{Contact{Lower: m}.Medium(x, 0, time), Medium{1, 1, 0, 0, 0}},
		{StefanTwoPhase{Solid: m, Melting: 1, Initial: 2}.Medium(x, 1e-6, time), Medium{2, 5, 0, 0, 0}},
		{StefanTwoPhase{Solid: m, Melting: 1, Initial: 2}.Medium(x, 3, time), Medium{1, 1, 0, 0, 0}},
		{Geotherm{Material: m, Source: 3}.Medium(x, z, time), Medium{2, 5, 3, 0, 0}},
		{GeothermExponential{Material: m, Source: 3, Depth: 0.5}.Medium(x, z, time), Medium{2, 5, 3 * math.Exp(-z/0.5), 0, 0}},
		{ConductivityInverse{Material: m, Reference: 6, Low: 3, High: 3}.Medium(x, z, time), Medium{4, 5, 0, 0, 0}},
		{ConductivityLinear{Material: m, Slope: 0.5, Low: 3, High: 3}.Medium(x, z, time), Medium{5, 5, 0, 0, 0}},
		{ConductivityExponential{Material: m, Thickness: 2, Growth: 3}.Medium(x, z, time), Medium{2 * math.Exp(0.3*0.5), 5, 0, 0, 0}},
	} {
		assert.InDelta(t, tt.want.Conductivity, tt.got.Conductivity, 1e-14)
		assert.InDelta(t, tt.want.HeatCapacity, tt.got.HeatCapacity, 1e-14)
		assert.InDelta(t, tt.want.Source, tt.got.Source, 1e-14)
		assert.InDelta(t, tt.want.VX, tt.got.VX, 1e-14)
		assert.InDelta(t, tt.want.VZ, tt.got.VZ, 1e-14)
	}
	varying := Manufactured{Material: m, Walls: Walls{Left: Isothermal}, Width: 2, Height: 0.5, Contrast: 9, Velocity: 3}
	got := varying.Medium(x, z, time)
	near(t, 2*math.Pow(3, math.Sin(math.Pi*x+0.7)*math.Cos(1.9*z/0.5+0.3)), got.Conductivity, 1e-14, "conductivity")
	near(t, 5*math.Pow(3, math.Sin(math.Pi*x+2)*math.Cos(1.3*z/0.5+1)), got.HeatCapacity, 1e-14, "capacity")
	across := math.Sin(math.Pi*z/0.5) * (1 + 0.5*math.Sin(math.Pi*x+1))
	near(t, 3*0.5/math.Pi*math.Sin(math.Pi*x/2)*across, varying.Stream(x, z), 1e-14, "stream function")
	varying.Walls = Walls{Periodic, Periodic, Isothermal, Isothermal}
	near(t, 3*0.5/math.Pi*across, varying.Stream(x, z), 1e-14, "stream function of periodic sides")
}
