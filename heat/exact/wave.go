package exact

import "math"

// A curve is the value of a function of one variable and its first two
// derivatives.
type curve [3]float64

// line is s itself.
func line(s float64) curve { return curve{s, 1, 0} }

// wave is sin(ks + phase).
func wave(k, phase, s float64) curve {
	sin, cos := math.Sincos(k*s + phase)
	return curve{sin, k * cos, -k * k * sin}
}

// of returns the curve f(g), f being the curve at the value of g.
func (f curve) of(g curve) curve {
	return curve{f[0], f[1] * g[1], f[2]*g[1]*g[1] + f[1]*g[2]}
}

// times returns the product of two functions of the same variable.
func (f curve) times(g curve) curve {
	return curve{f[0] * g[0], f[1]*g[0] + f[0]*g[1], f[2]*g[0] + 2*f[1]*g[1] + f[0]*g[2]}
}

// scaled returns c·f + d.
func (f curve) scaled(c, d float64) curve { return curve{c*f[0] + d, c * f[1], c * f[2]} }

// A surface is the value of a function of x and z with its derivatives.
type surface struct{ value, x, z, xx, zz float64 }

// product returns f(x)·g(z).
func product(f, g curve) surface {
	return surface{f[0] * g[0], f[1] * g[0], f[0] * g[1], f[2] * g[0], f[0] * g[2]}
}

// plus returns s + c·o.
func (s surface) plus(c float64, o surface) surface {
	return surface{s.value + c*o.value, s.x + c*o.x, s.z + c*o.z, s.xx + c*o.xx, s.zz + c*o.zz}
}

// exp returns c·exp(s) with its first derivatives.
func (s surface) exp(c float64) surface {
	e := c * math.Exp(s.value)
	return surface{value: e, x: e * s.x, z: e * s.z}
}
