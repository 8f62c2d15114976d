package scaling

import (
	"fmt"
	"math"

	"example.org/overturn/scaling/internal/channel"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// Body is something heavier or lighter than the fluid around it.
type Body struct {
	DensityContrast units.Density          // of the body less that of the fluid; negative for a body that rises
	Gravity         units.Acceleration     // g
	Viscosity       units.DynamicViscosity // of the fluid

	// Density of the fluid, for the Reynolds number. Zero: inertia is taken to
	// be negligible, unchecked.
	Density units.Density
}

func (b Body) check() error {
	return check.First(
		check.Finite(pkg, "Body.DensityContrast", b.DensityContrast),
		check.Positive(pkg, "Body.Gravity", b.Gravity),
		check.Positive(pkg, "Body.Viscosity", b.Viscosity),
		check.NotNegative(pkg, "Body.Density", b.Density),
	)
}

// weight returns Δρ g/μ.
func (b Body) weight() float64 {
	return float64(b.DensityContrast) * float64(b.Gravity) / float64(b.Viscosity)
}

// Sphere returns the speed at which a rigid sphere of radius a sinks through an
// unbounded fluid, 2Δρ g a²/(9μ) (Stokes 1851). A body that rises has a negative
// speed. Inertia is neglected: [ErrOutOfRange] comes with the value where the
// Reynolds number 2ρUa/μ exceeds one tenth.
func (b Body) Sphere(a units.Length) (units.Velocity, error) {
	return b.sphere(a, 2./9)
}

// Drop returns the speed at which a spherical drop of another viscosity sinks,
//
//	U = (2/3) (Δρ g a²/μ) (μ + μ_i)/(2μ + 3μ_i)
//
// (Hadamard 1911, Rybczynski 1911): 2/9 of Δρ g a²/μ for a stiff drop, 1/3 for an
// inviscid one. Range as in [Body.Sphere].
func (b Body) Drop(a units.Length, inside units.DynamicViscosity) (units.Velocity, error) {
	if err := check.First(b.check(), check.NotNegative(pkg, "viscosity inside", inside)); err != nil {
		return 0, err
	}
	ratio := float64(inside) / float64(b.Viscosity)
	return b.sphere(a, 2./3*(1+ratio)/(2+3*ratio))
}

func (b Body) sphere(a units.Length, factor float64) (units.Velocity, error) {
	err := check.First(b.check(), check.Positive(pkg, "radius", a))
	if err != nil {
		return 0, err
	}
	u, err := check.Result(pkg, "speed", units.Velocity(factor*b.weight()*float64(a)*float64(a)))
	if err != nil {
		return 0, err
	}
	re := 2 * float64(b.Density) * math.Abs(float64(u)) * float64(a) / float64(b.Viscosity)
	if re > maxReynolds {
		return u, fmt.Errorf("scaling: sphere: Reynolds number is %.2g, want <= %g: %w", re, maxReynolds, ErrOutOfRange)
	}
	return u, nil
}

// maxReynolds is where inertia changes the drag of a sphere by about 2%, 3/16 of
// the Reynolds number (Oseen 1910).
const maxReynolds = 0.1

// SphereInTube returns the factor by which the walls of a tube raise the drag of
// a rigid sphere on its axis, a series in ratio = sphere radius/tube radius, up
// to 0.6 (Faxén 1923, Bohlin 1960, from memory):
//
//	1/(1 - 2.10444λ + 2.08877λ³ - 0.94813λ⁵ - 1.372λ⁶ + 3.87λ⁸ - 4.19λ¹⁰)
//
// The speed of [Body.Sphere] is divided by it. Above 0.6 the value comes with
// [ErrOutOfRange].
func SphereInTube(ratio float64) (float64, error) {
	if err := check.NotNegative(pkg, "ratio of radii", ratio); err != nil {
		return 0, err
	}
	l := ratio
	series := 1 - 2.10444*l + 2.08877*l*l*l - 0.94813*math.Pow(l, 5) - 1.372*math.Pow(l, 6) + 3.87*math.Pow(l, 8) - 4.19*math.Pow(l, 10)
	switch {
	case ratio >= 1 || series <= 0:
		return 0, &FieldError{Package: string(pkg), Field: "ratio of radii", Value: formatFloat(ratio), Want: "< 1"}
	case ratio > 0.6:
		return 1 / series, fmt.Errorf("scaling: sphere in a tube: ratio of radii is %g, want <= 0.6: %w", ratio, ErrOutOfRange)
	}
	return 1 / series, nil
}

// CylinderDrag returns F/(μU), the drag per length of a rigid cylinder that
// moves midway between two no-slip walls, over viscosity and speed. The ratio is
// that of its diameter to the distance of the walls, at most 0.9; the fluid is at
// rest far away. The problem is that of Faxén (1946), solved here to eight
// digits or more.
//
// In two dimensions a cylinder without walls has no drag at all (Stokes'
// paradox): a sinking cylinder must state its walls.
func CylinderDrag(ratio float64) (float64, error) {
	f, err := channel.Drag(ratio)
	if err != nil {
		return 0, &FieldError{Package: string(pkg), Field: "ratio of diameter to wall distance", Value: formatFloat(ratio), Want: "> 0 and <= 0.9"}
	}
	return f, nil
}

// FaxenCylinderDrag is [CylinderDrag] by Faxén's series (1946, in Happel &
// Brenner 1983, from memory),
//
//	4π/(-ln k - 0.9157 + 1.7244k² - 1.7302k⁴ + 2.4056k⁶ - 4.5913k⁸),
//
// which is off by 5e-6 at k = 0.05, 1.5e-5 at 0.2, 1.4e-4 at 0.3 and 3.4e-3 at
// 0.4. Above 0.4 the value comes with [ErrOutOfRange].
func FaxenCylinderDrag(ratio float64) (float64, error) {
	if err := check.Positive(pkg, "ratio of diameter to wall distance", ratio); err != nil {
		return 0, err
	}
	k2 := ratio * ratio
	series := -math.Log(ratio) - 0.9157 + k2*(1.7244+k2*(-1.7302+k2*(2.4056-k2*4.5913)))
	switch {
	case series <= 0:
		return 0, &FieldError{Package: string(pkg), Field: "ratio of diameter to wall distance", Value: formatFloat(ratio), Want: "<= 0.4"}
	case ratio > 0.4:
		return 4 * math.Pi / series, fmt.Errorf("scaling: Faxén's series: ratio is %g, want <= 0.4: %w", ratio, ErrOutOfRange)
	}
	return 4 * math.Pi / series, nil
}

// Cylinder returns the speed at which a rigid horizontal cylinder of radius a
// sinks midway between vertical walls at the given distance from one another:
// its weight over [CylinderDrag].
func (b Body) Cylinder(a, walls units.Length) (units.Velocity, error) {
	err := check.First(b.check(), check.Positive(pkg, "radius", a), check.Positive(pkg, "distance of walls", walls))
	if err != nil {
		return 0, err
	}
	drag, err := CylinderDrag(2 * float64(a) / float64(walls))
	if err != nil {
		return 0, err
	}
	return check.Result(pkg, "speed", units.Velocity(math.Pi*float64(a)*float64(a)*b.weight()/drag))
}

// Return says where the fluid goes that a sheet displaces.
type Return int

const (
	// ReturnElsewhere: the fluid beside the sheet is dragged along, linear from
	// the sheet to the wall; it flows back out of the plane.
	ReturnElsewhere Return = iota
	// ReturnBeside: no net flux between the sheet and each wall; the pressure
	// that drives the fluid back adds drag.
	ReturnBeside
)

// String returns the name of the choice.
func (r Return) String() string { return name(int(r), "return elsewhere", "return beside the sheet") }

// Sheet returns the speed at which a thin vertical sheet of the given thickness
// sinks midway between walls, each at the distance given: Δρ g h W/(2μ) for
// [ReturnElsewhere], a quarter of that for [ReturnBeside]. Derived here; the
// pressure on the ends of the sheet is neglected.
func (b Body) Sheet(thickness, distance units.Length, r Return) (units.Velocity, error) {
	err := check.First(b.check(), check.Positive(pkg, "thickness", thickness), check.Positive(pkg, "distance", distance))
	if err != nil {
		return 0, err
	}
	// Wall shear at the sheet: V/W, or 4V/W for u = V(1-x/W)(1-3x/W).
	var shear float64
	switch r {
	case ReturnElsewhere:
		shear = 1
	case ReturnBeside:
		shear = 4
	default:
		return 0, &FieldError{Package: string(pkg), Field: "return", Value: r.String(), Want: "ReturnElsewhere or ReturnBeside"}
	}
	return check.Result(pkg, "speed", units.Velocity(b.weight()*float64(thickness)*float64(distance)/(2*shear)))
}
