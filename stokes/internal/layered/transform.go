package layered

import (
	"math"

	"gonum.org/v1/gonum/dsp/fourier"
)

// A transform takes a row of values at corners to amplitudes of modes and
// back, up to a factor. It holds scratch memory and serves one goroutine.
type transform interface {
	forward(amplitudes, values []float64)
	back(values, amplitudes []float64)
}

// sine is for closed sides, where ψ is zero: values are those of the corners
// between.
type sine struct{ dst *fourier.DST }

func newSine(columns int) transform { return sine{fourier.NewDST(columns - 1)} }

func (t sine) forward(amplitudes, values []float64) { t.dst.Transform(amplitudes, values) }
func (t sine) back(values, amplitudes []float64)    { t.dst.Transform(values, amplitudes) }

// sineModes returns κ² of each amplitude and what a transform there and back
// multiplies by.
func sineModes(columns int, width float64) (kappa2 []float64, factor float64) {
	kappa2 = make([]float64, columns-1)
	for m := range kappa2 {
		k := 2 * math.Sin(float64(m+1)*math.Pi/float64(2*columns)) / width
		kappa2[m] = k * k
	}
	return kappa2, float64(2 * columns)
}

// periodic is for sides that repeat. Amplitudes are pairs of real and
// imaginary parts; those of the uniform mode are left out, for it has a flow
// of its own.
type periodic struct {
	fft    *fourier.FFT
	coeffs []complex128
}

func newPeriodic(columns int) transform {
	return periodic{fourier.NewFFT(columns), make([]complex128, columns/2+1)}
}

func (t periodic) forward(amplitudes, values []float64) {
	t.fft.Coefficients(t.coeffs, values)
	for m, c := range t.coeffs[1:] {
		amplitudes[2*m], amplitudes[2*m+1] = real(c), imag(c)
	}
}

func (t periodic) back(values, amplitudes []float64) {
	t.coeffs[0] = 0
	for m := range t.coeffs[1:] {
		t.coeffs[m+1] = complex(amplitudes[2*m], amplitudes[2*m+1])
	}
	t.fft.Sequence(values, t.coeffs)
}

func periodicModes(columns int, width float64) (kappa2 []float64, factor float64) {
	kappa2 = make([]float64, columns/2*2)
	for m := range kappa2 {
		k := 2 * math.Sin(float64(m/2+1)*math.Pi/float64(columns)) / width
		kappa2[m] = k * k
	}
	return kappa2, float64(columns)
}
