package exact

import "math"

// A spot has a Gaussian temperature whose integral over the plane is 2π·heat.
type spot struct {
	material Material
	heat     float64
	x, z     float64
	spread   moments
}

// moments are the second moments of a spot about its centre.
type moments struct{ xx, xz, zz float64 }

func isotropic(width, kt float64) moments {
	v := width*width + 2*kt
	return moments{xx: v, zz: v}
}

func (s spot) at(x, z float64) State {
	dx, dz := x-s.x, z-s.z
	determinant := s.spread.xx*s.spread.zz - s.spread.xz*s.spread.xz
	// Components of −∇T/T: the inverse of the moments times the distance.
	gx := (s.spread.zz*dx - s.spread.xz*dz) / determinant
	gz := (s.spread.xx*dz - s.spread.xz*dx) / determinant
	temperature := s.heat / math.Sqrt(determinant) * math.Exp(-(gx*dx+gz*dz)/2)
	k := s.material.conductivity()
	return State{Temperature: temperature, FluxX: k * gx * temperature, FluxZ: k * gz * temperature}
}

func checkSpot(of string, m Material, strength, width, x, z float64) error {
	name := ".Amplitude"
	if of == "LineSource" {
		name = ".Heat"
	}
	return first(
		m.check(of),
		anyFinite(of+name, strength),
		notNegative(of+".Width", width),
		anyFinite(of+".X", x),
		anyFinite(of+".Z", z),
	)
}
