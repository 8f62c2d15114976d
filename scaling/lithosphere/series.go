package lithosphere

import (
	"fmt"
	"math"
)

// series is the plate in dimensionless numbers: temperature 0 to 1 over depth 0
// to 1, at time tau = κt/a².
//
// Term n decays as exp(-λ_n), with λ = n²π²τ. With conduction along the plate,
// x/a = 2 Pe τ after that time and λ = (√(Pe² + n²π²) - Pe) x/a.
type series struct {
	tau    float64
	peclet float64 // ua/(2κ); +Inf for none along the plate
}

const (
	negligible = 41  // e^-41 is below round-off
	maxTerms   = 1e5 // that a ridge may take
)

func (s series) alongPlate() bool { return !math.IsInf(s.peclet, 1) }

// decay returns λ_n without cancellation at large Péclet numbers.
func (s series) decay(n float64) float64 {
	n2 := n * n * math.Pi * math.Pi
	if !s.alongPlate() {
		return n2 * s.tau
	}
	return n2 / (math.Hypot(s.peclet, n*math.Pi) + s.peclet) * 2 * s.peclet * s.tau
}

// check refuses points so near the ridge that the series takes too many terms:
// conduction along the plate leaves no images to turn to.
func (s series) check() error {
	if s.alongPlate() && s.tau < s.youngest() {
		return &FieldError{
			Package: string(pkg), Field: "distance from the ridge", Value: fmt.Sprintf("%.2g plate thicknesses", 2*s.peclet*s.tau),
			Want: fmt.Sprintf(">= %.2g", 2*s.peclet*s.youngest()),
		}
	}
	return nil
}

// youngest returns the smallest time for which maxTerms do.
func (s series) youngest() float64 {
	unit := series{1, s.peclet}
	return negligible / unit.decay(maxTerms)
}

// oldest returns a time at which nothing of the start is left.
func (s series) oldest() float64 {
	unit := series{1, s.peclet}
	return negligible / unit.decay(1)
}

// early reports whether images converge faster than the series.
func (s series) early() bool { return s.tau < 0.1 && !s.alongPlate() }

// images is the number of images on either side that matter when early.
const images = 4

func (s series) temperature(z float64) float64 {
	if z == 0 {
		return 0
	}
	if z == 1 {
		return 1
	}
	if s.early() {
		root := 2 * math.Sqrt(s.tau)
		sum := math.Erf(z / root)
		for m := 1.0; m <= images; m++ {
			sum -= math.Erfc((2*m+z)/root) - math.Erfc((2*m-z)/root)
		}
		return sum
	}
	sum := z
	for n := 1.0; ; n++ {
		decay := s.decay(n)
		if decay > negligible {
			return sum
		}
		sum += 2 / (n * math.Pi) * math.Sin(n*math.Pi*z) * math.Exp(-decay)
	}
}

// flux returns ∂T/∂z at z = 0.
func (s series) flux() float64 {
	sum := 1.0
	if s.early() {
		for m := 1.0; m <= images; m++ {
			sum += 2 * math.Exp(-m*m/s.tau)
		}
		return sum / math.Sqrt(math.Pi*s.tau)
	}
	for n := 1.0; ; n++ {
		decay := s.decay(n)
		if decay > negligible {
			return sum
		}
		sum += 2 * math.Exp(-decay)
	}
}

// contraction returns ∫ (1-T) dz: 1/2 in the end.
func (s series) contraction() float64 {
	if s.early() {
		// 2√τ [1/√π + 2 Σ (-1)^m ierfc(m/(2√τ))], the integral of the images
		root := math.Sqrt(s.tau)
		sum := 1 / math.Sqrt(math.Pi)
		for m := 1.0; m <= 2*images; m++ {
			x := m / (2 * root)
			ierfc := math.Exp(-x*x)/math.Sqrt(math.Pi) - x*math.Erfc(x)
			if math.Mod(m, 2) == 1 {
				ierfc = -ierfc
			}
			sum += 2 * ierfc
		}
		return 2 * root * sum
	}
	sum := 0.0
	for n := 1.0; ; n += 2 {
		decay := s.decay(n)
		sum += math.Exp(-decay) / (n * n)
		if decay > negligible {
			return 0.5 - 4/(math.Pi*math.Pi)*sum
		}
	}
}
