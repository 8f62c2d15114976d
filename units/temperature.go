package units

import "gonum.org/v1/gonum/unit"

// Temperature is an absolute temperature: a point, where [TemperatureDifference]
// is a distance between two, as [time.Time] and [time.Duration] are. Its value is
// in kelvins (K): Temperature(300) is 300 K, and Celsius(26.85) the same. "10 degC"
// parses to 283.15 K.
type Temperature float64

// Celsius returns the temperature t °C.
func Celsius(t float64) Temperature { return Temperature(t) + ZeroCelsius }

// Fahrenheit returns the temperature t °F.
func Fahrenheit(t float64) Temperature { return Temperature((t + 459.67) / 1.8) }

// Celsius returns the reading of the temperature in °C.
func (q Temperature) Celsius() float64 { return float64(q - ZeroCelsius) }

// Fahrenheit returns the reading of the temperature in °F.
func (q Temperature) Fahrenheit() float64 { return float64(q*1.8) - 459.67 }

// Sub returns how much hotter q is than t.
func (q Temperature) Sub(t Temperature) TemperatureDifference { return TemperatureDifference(q - t) }

// Add returns the temperature d above q.
func (q Temperature) Add(d TemperatureDifference) Temperature { return q + Temperature(d) }

// In returns the height above absolute zero as a multiple of u: t.In(Kelvin).
func (q Temperature) In(u TemperatureDifference) float64 { return float64(q) / float64(u) }

// String returns the temperature in K.
func (q Temperature) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Temperature) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Temperature) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Temperature) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Temperature) Dimension() Dimension { return Dimension{Temperature: 1} }

// Unit implements gonum's unit.Uniter.
func (q Temperature) Unit() *unit.Unit { return gonum(q) }

// TemperatureDifference is how much hotter one place is than another. Its value is in
// kelvins (K). A difference of 1 °C is 1 K: "10 degC" parses to 10 K.
type TemperatureDifference float64

// Units of difference.
const (
	Kelvin      TemperatureDifference = 1
	Millikelvin TemperatureDifference = 1e-3
)

// In returns the difference as a multiple of u.
func (q TemperatureDifference) In(u TemperatureDifference) float64 { return float64(q / u) }

// String returns the difference in its SI unit.
func (q TemperatureDifference) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q TemperatureDifference) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q TemperatureDifference) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *TemperatureDifference) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (TemperatureDifference) Dimension() Dimension { return Dimension{Temperature: 1} }

// Unit implements gonum's unit.Uniter.
func (q TemperatureDifference) Unit() *unit.Unit { return gonum(q) }
