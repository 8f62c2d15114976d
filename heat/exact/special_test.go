package exact

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

// The numbers were computed with 40-digit arithmetic from the definitions.

func TestScaledErfc(t *testing.T) {
	for x, want := range map[float64]float64{
		0: 1, 0.3: 0.73459933456765514992, 1: 0.42758357615580700441, 3: 0.17900115118138995042,
		5.5: 0.10096221839949908823, 12: 0.04685422101489376262, 25.9: 0.021767181150738212562,
		26: 0.021683584850562906616, 26.5: 0.021275046685371105955, 40: 0.014100335983377813625,
		1000: 0.0005641893014533876542, 1e8: 5.6418958354775625874e-9,
	} {
		near(t, want, scaledErfc(x), 6e-16, "scaled erfc")
	}
	near(t, scaledErfc(math.Nextafter(26, 0)), scaledErfc(26), 1e-15, "where the methods meet")
	near(t, math.Erfc(0.5)*math.Exp(0.25-0.09), erfcTimesExp(0.5, 0.3), 1e-15, "with another exponent")
	near(t, math.Erfc(-0.5)*math.Exp(0.25-0.09), erfcTimesExp(-0.5, 0.3), 1e-15, "of a negative argument")
	near(t, scaledErfc(30), erfcTimesExp(30, 0), 1e-15, "of a large argument")
}

func TestIntegralsOfErfc(t *testing.T) {
	for _, want := range [][4]float64{
		{0, 0.564189583547756287, 0.25, 0.0940315972579593812},
		{0.5, 0.199641228374245666, 0.0699647234531769491, 0.0216127508201781195},
		{2, 0.000978022714951495253, 0.000191411030310321207, 0.0000353964322850350709},
		{5, 1.48134293368493403e-13, 1.40292151857752046e-14, 1.30702358512355953e-15},
		{31, 0, 0, 0},
	} {
		once, twice, thrice := integrals(want[0])
		assert.InDelta(t, want[1], once, 1e-16)
		assert.InDelta(t, want[2], twice, 1e-16)
		assert.InDelta(t, want[3], thrice, 1e-16)
	}
	near(t, 1.48134293368493403e-13, first3(integrals(5)), 1e-12, "a small integral")
}

func first3(a, _, _ float64) float64 { return a }

func TestGaussLosesNoDigits(t *testing.T) {
	// exp(−x²) with 40 digits.
	near(t, 9.8999751521682561629e-293, gauss(25.93), 3e-15, "exp(−25.93²)")
	near(t, math.Exp(-0.25), gauss(-0.5), 0, "exp(−¼)")
	assert.Zero(t, gauss(50))
	assert.Zero(t, kernel(math.Inf(1), 0))
	assert.Equal(t, math.Inf(1), kernel(0, 0))
	assert.Zero(t, similarity(0, 0))
	assert.Equal(t, math.Inf(1), similarity(1, 0))
}

func TestBesselZeros(t *testing.T) {
	for n, want := range map[int]float64{
		1: 2.4048255576957727686, 2: 5.5200781102863106496, 3: 8.653727912911012217,
		10: 30.634606468431975118, 100: 313.37426607752784472,
	} {
		near(t, want, besselZero(n), 3e-16, "zero of J₀")
	}
}

// The harmonics of the cylinder suffice at the earliest time that needs them.
func TestCylinderHasEnoughHarmonics(t *testing.T) {
	all := cylinderHarmonics()
	assert.Greater(t, all[len(all)-1].zero*all[len(all)-1].zero*earlyCylinder, 42.0)
}

// Each root lies in its interval and satisfies β sin β = Bi cos β to rounding.
func TestBiotRoots(t *testing.T) {
	for bi := 1e-14; bi < 1e15; bi *= 10 {
		for _, n := range []int{0, 1, 2, 7, 30} {
			beta := biotRoot(n, bi)
			low := float64(n) * math.Pi
			if beta < low || beta > low+math.Pi/2 {
				t.Errorf("root %d for Bi = %g is %g, outside its interval", n, bi, beta)
			}
			if off := beta*math.Sin(beta) - bi*math.Cos(beta); math.Abs(off) > 4e-16*(1+beta)*(bi+beta) {
				t.Errorf("root %d for Bi = %g is %g: off by %g", n, bi, beta, off)
			}
		}
	}
	near(t, 1e-6*(1-1e-12/6), biotRoot(0, 1e-12), 1e-15, "the root for little Bi")
	assert.Equal(t, 3.2, math.Round(SlabRobin{Coefficient: 2, Thickness: 4, Material: Material{Conductivity: 2.5}}.Biot()*1e9)/1e9)
}

// The zero of a function whose slope at the start leads Newton's method out of
// the bracket.
func TestRoot(t *testing.T) {
	calls := 0
	got := root(0, 50, func(x float64) (float64, float64) {
		calls++
		return 1 - math.Atan(x)/math.Atan(0.7), -1 / (1 + x*x) / math.Atan(0.7)
	})
	near(t, 0.7, got, 3e-16, "root")
	assert.Less(t, calls, 30)
	calls = 0
	got = root(0, math.Sqrt(0.5), func(l float64) (float64, float64) { // Stefan number 1
		calls++
		erf := math.Erf(l)
		return -math.Log(sqrtPi*l*erf) - l*l, -1/l - 2*gauss(l)/(sqrtPi*erf) - 2*l
	})
	near(t, 0.6200626333136, got, 1e-13, "λ")
	assert.Less(t, calls, 8, "rounding at the root must not send the search away")
	assert.Equal(t, 2.0, root(0, 2, func(x float64) (float64, float64) { return 2 - x, -1 }), "the end of the bracket")
	got = root(0, 3, func(x float64) (float64, float64) { return 1 - x*x*x, 0 }) // no slope: bisection
	near(t, 1, got, 5e-16, "root by bisection")
}
