package units_test

import (
	"fmt"
	"math"
	"math/big"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// rationalUnits are units with their exact sizes, by other arithmetic than the
// package's.
var rationalUnits = []struct{ unit, size string }{
	{"m", "1"}, {"km", "1000"}, {"qm", "1e-30"}, {"Qm", "1e30"}, {"cm", "1/100"}, {"µm", "1e-6"},
	{"ft", "3048/10000"}, {"in", "254/10000"}, {"m yr/s", "31557600"}, {"m yr^2/s^2", "995882117760000"},
	{"m s/yr", "1/31557600"}, {"cm s/yr", "1/3155760000"}, {"km s/Myr", "1/31557600000"},
	{"m min/h", "1/60"}, {"m degF/K", "5/9"}, {"m K/degF", "9/5"}, {"m eV/J", "1602176634e-28"}, {"m J/eV", "1e28/1602176634"},
	{"m cal/cal_IT", "41840/41868"}, {"m Btu/J", "105505585262/100000000"}, {"m atm/Pa", "101325"}, {"m psi/Pa", "8896443230521/1290320000"},
	{"m lb^3/kg^3", "93324833049966713325053/1000000000000000000000000"},
	{"m yr^5 eV^5/(s^5 J^5)", ""}, // filled in below
}

func rationalSize(t *testing.T, unit, size string) *big.Rat {
	t.Helper()
	if unit == "m yr^5 eV^5/(s^5 J^5)" {
		year, eV := big.NewRat(31557600, 1), rat(t, "1602176634e-28")
		r := big.NewRat(1, 1)
		for range 5 {
			r.Mul(r, year).Mul(r, eV)
		}
		return r
	}
	over, under, quotient := strings.Cut(size, "/")
	r := rat(t, over)
	if quotient {
		r.Quo(r, rat(t, under))
	}
	return r
}

func rat(t *testing.T, s string) *big.Rat {
	t.Helper()
	r, ok := new(big.Rat).SetString(s)
	require.True(t, ok, s)
	return r
}

// samples returns how many random cases to try: a tenth of n in short tests.
func samples(n int) int {
	if testing.Short() {
		return n / 10
	}
	return n
}

// randomNumber writes a number of up to 25 digits.
func randomNumber(rnd *rand.Rand) string {
	var b strings.Builder
	if rnd.IntN(2) == 0 {
		b.WriteByte('-')
	}
	b.WriteByte(byte('1' + rnd.IntN(9)))
	for i, n := 0, rnd.IntN(25); i < n; i++ {
		if i == n/3 {
			b.WriteByte('.')
		}
		b.WriteByte(byte('0' + rnd.IntN(10)))
	}
	if rnd.IntN(2) == 0 {
		fmt.Fprintf(&b, "e%d", rnd.IntN(180)-90)
	}
	return b.String()
}

// Parse returns the float64 nearest to the text.
func TestParseRoundsOnce(t *testing.T) {
	rnd := rand.New(rand.NewPCG(11, 12))
	for _, u := range rationalUnits {
		size := rationalSize(t, u.unit, u.size)
		for range samples(300) {
			number := randomNumber(rnd)
			q, err := units.Parse[units.Length](number + " " + u.unit)
			require.NoError(t, err)
			want, _ := new(big.Rat).Mul(rat(t, number), size).Float64()
			require.Equal(t, want, float64(q), "%s %s", number, u.unit)
		}
		scale, err := units.ParseUnit(u.unit)
		require.NoError(t, err)
		want, _ := size.Float64()
		assert.Equal(t, want, scale.Scale, u.unit)
	}
}

// A power of ten times a literal loses a last bit for every eighth i; a division
// does not.
func TestCentimetresRoundOnce(t *testing.T) {
	for i := range 1000 {
		q, err := units.Parse[units.Length](strconv.Itoa(i) + " cm")
		require.NoError(t, err)
		assert.Equal(t, float64(i)/100, float64(q))
	}
}

func TestTemperaturesRoundOnce(t *testing.T) {
	rnd := rand.New(rand.NewPCG(13, 14))
	ninths := big.NewRat(5, 9)
	for range samples(1000) {
		number := randomNumber(rnd)
		celsius, err := units.Parse[units.Temperature](number + " degC")
		require.NoError(t, err)
		want, _ := new(big.Rat).Add(rat(t, number), rat(t, "273.15")).Float64()
		require.Equal(t, want, float64(celsius), "%s degC", number)
		fahrenheit, err := units.Parse[units.Temperature](number + " degF")
		require.NoError(t, err)
		sum := new(big.Rat).Add(rat(t, number), rat(t, "459.67"))
		want, _ = sum.Mul(sum, ninths).Float64()
		require.Equal(t, want, float64(fahrenheit), "%s degF", number)
	}
}

// randomFloat draws from all finite bit patterns, or from the magnitudes of
// everyday.
func randomFloat(rnd *rand.Rand) float64 {
	if rnd.IntN(3) == 0 {
		return float64(rnd.IntN(2e6)-1e6) / 1000
	}
	for {
		if x := math.Float64frombits(rnd.Uint64()); !math.IsNaN(x) && !math.IsInf(x, 0) {
			return x
		}
	}
}

// roundTripIn writes q with as few digits as it takes and reads it back.
func roundTripIn[Q units.Quantity](t *testing.T, q Q, unit string) string {
	t.Helper()
	text, err := units.Format(q, unit, 0)
	require.NoError(t, err)
	back, err := units.Parse[Q](text)
	require.NoError(t, err)
	require.Equal(t, math.Float64bits(float64(q)), math.Float64bits(float64(back)), "%g as %s", float64(q), text)
	return text
}

func TestRoundTripInAnyUnit(t *testing.T) {
	rnd := rand.New(rand.NewPCG(15, 16))
	numbers := append([]float64{}, awkward...)
	for range samples(300) {
		numbers = append(numbers, randomFloat(rnd))
	}
	for _, x := range numbers {
		for _, u := range rationalUnits {
			roundTripIn(t, units.Length(x), u.unit)
		}
		for _, unit := range []string{"K", "mK", "degR"} {
			roundTripIn(t, units.Temperature(x), unit)
		}
		for _, unit := range []string{"deg", "%", "ppm", "1", "", "yr^0.5/s^0.5"} {
			roundTripIn(t, units.Dimensionless(x), unit)
		}
	}
}

// Scales with a zero of their own keep all temperatures apart, but for the sign
// of zero.
func TestRoundTripOfTemperatures(t *testing.T) {
	rnd := rand.New(rand.NewPCG(17, 18))
	numbers := []float64{0, 1, 273.15, 273.16, 1623.15, math.Nextafter(273.15, 0), 1e-3, 1e-10, 0x1p-60, -300, 1e17, 1e300, math.MaxFloat64}
	for range samples(100) {
		numbers = append(numbers, rnd.Float64()*2000, 273.15+rnd.NormFloat64(), rnd.Float64()*1e-6)
	}
	if !testing.Short() {
		numbers = append(numbers, 5e-324, 0x1p-1022, 1e-300, -5e-324)
	}
	for _, x := range numbers {
		roundTripIn(t, units.Temperature(x), "degC")
		roundTripIn(t, units.Temperature(x), "°F")
	}
	assert.Equal(t, "1350 degC", roundTripIn(t, units.Celsius(1350), "degC"))
	assert.Equal(t, "0.01 degC", roundTripIn(t, units.Temperature(273.16), "degC"))
	assert.Equal(t, "-0.001 degC", roundTripIn(t, units.Temperature(273.149), "degC"))
	assert.Equal(t, "98.6 °F", roundTripIn(t, units.Temperature(310.15), "°F"))
	assert.Equal(t, "-273.15 degC", roundTripIn(t, units.Temperature(0), "degC"))
}

// What has up to 15 digits comes back as it was written.
func TestFewDigitsComeBack(t *testing.T) {
	rnd := rand.New(rand.NewPCG(19, 20))
	for range samples(300) {
		number := strconv.FormatFloat(float64(rnd.IntN(1e9))/1000, 'f', -1, 64)
		for _, u := range rationalUnits {
			q, err := units.Parse[units.Length](number + " " + u.unit)
			require.NoError(t, err)
			text, err := units.Format(q, u.unit, -1)
			require.NoError(t, err)
			want, err := units.Parse[units.Dimensionless](number)
			require.NoError(t, err)
			assert.Equal(t, want.String()+" "+u.unit, text)
		}
	}
}

// Format rounds the exact quotient, half to even where the quotient is a tie.
func TestFormatRoundsOnce(t *testing.T) {
	rnd := rand.New(rand.NewPCG(21, 22))
	for _, u := range rationalUnits {
		size := rationalSize(t, u.unit, u.size)
		for range samples(200) {
			x := randomFloat(rnd)
			digits := 1 + rnd.IntN(20)
			text, err := units.Format(units.Length(x), u.unit, digits)
			require.NoError(t, err)
			number, _, _ := strings.Cut(text, " ")

			exact := new(big.Rat).Quo(new(big.Rat).SetFloat64(x), size)
			want := new(big.Float).SetPrec(400).SetRat(exact).Text('e', digits-1)
			require.Zero(t, rat(t, want).Cmp(rat(t, number)), "%g in %s to %d digits is %s, want %s", x, u.unit, digits, number, want)
			mantissa, _, _ := strings.Cut(strings.TrimLeft(number, "-0."), "e")
			require.GreaterOrEqual(t, len(strings.ReplaceAll(mantissa, ".", "")), min(digits, 1))
		}
	}
}

func TestFormatTemperaturesRoundsOnce(t *testing.T) {
	rnd := rand.New(rand.NewPCG(23, 24))
	for range samples(1000) {
		x := rnd.Float64() * 600
		digits := 1 + rnd.IntN(17)
		text, err := units.Format(units.Temperature(x), "degC", digits)
		require.NoError(t, err)
		number, _, _ := strings.Cut(text, " ")
		exact := new(big.Rat).Sub(new(big.Rat).SetFloat64(x), rat(t, "273.15"))
		want := new(big.Float).SetPrec(400).SetRat(exact).Text('e', digits-1)
		require.Zero(t, rat(t, want).Cmp(rat(t, number)), "%g K to %d digits is %s, want %s", x, digits, number, want)
	}
}
