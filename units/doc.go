// Package units gives physical quantities a type, and reads and writes them with
// their units.
//
// A quantity is a float64 in SI units whose type says what it measures, as
// [time.Duration] is an int64 in nanoseconds. Constants are units:
//
//	eta := 1e21 * units.PascalSecond             // a DynamicViscosity
//	v, err := units.Parse[units.Velocity]("4.2 cm/yr")
//	v.In(units.MillimetrePerYear)                // 42
//	units.Format(v, "cm/yr", 2)                  // "4.2 cm/yr"
//
// All types have the same methods: In, String, the text methods of package
// encoding (and with them JSON, XML, [flag.TextVar] and most configuration
// formats, both ways), Dimension, and Unit, which makes them values of gonum's
// unit algebra. A type of your own with a Dimension method is a [Quantity], too.
//
// An absolute [Temperature] and a [TemperatureDifference] are two types, as
// [time.Time] and [time.Duration] are: 10 degC is 283.15 K as the one and 10 K
// as the other.
//
// The compiler keeps quantities apart, but does not multiply them:
// Metre*Metre is a Length to it. Formulas convert to float64, the value in SI
// units, and name the type of the result:
//
//	kappa := units.Diffusivity(float64(k) / (float64(rho) * float64(cp)))
//
// # Text
//
// A text is a number and a unit, with or without space between. Numbers are
// 3300, -0.5, 1e21, 1.5×10⁻⁵ or 2 x 10^3; NaN and infinities are refused
// in both directions. In a unit,
//
//	product    kg m-3   Pa s   Pa·s   N*m   N.m
//	quotient   kg/m^3   W/(m K)   W/m/K   1/K   /K
//	power      m3   m^3   m**3   m³   K-1   K^-1   K⁻¹   MPa^-3.5   m^(1/2)
//
// mean what they look like. W/m K means two things to two people, and is an
// error: a slash divides by what directly follows, and after it a product needs
// parentheses. Symbols and the prefixes that each takes are a closed table:
//
//	all SI prefixes  m g s A K mol cd N Pa J W Hz C eV
//	some prefixes    t yr a L l bar P St Gal D cal cal_th cal_IT rad
//	no prefix        kg min h hr d day days year years kelvin darcy atm dyn erg HFU HGU
//	                 degC °C ℃ Celsius degF °F ℉ Fahrenheit degR °R
//	                 ft in lb psi Btu BTU Btu_IT
//	                 % wt% ‰ ppm ppb deg °
//
// The prefix micro is u or either of the two code points of µ. A year (yr, a;
// Myr and Ga likewise) is the Julian year of 31 557 600 s. The calorie (cal, and
// in it the heat-flow unit HFU and the heat-generation unit HGU) is the
// thermochemical one of 4.184 J, the British thermal unit that of the
// international calorie. Constants of physics are those of the SI of 2019 and
// of CODATA 2022.
//
// # Rounding
//
// [Parse] and [Format] compute with whole numbers and powers of ten, and round
// once: "0.07 mm/yr" becomes the float64 nearest to it. String, and Format
// without a number of digits, write as few digits as it takes for Parse to return
// the same bits, for every finite value, negative zero and subnormal numbers
// included (but -0 K is 0 K once it went through °C or °F). Only fractional powers of units that are no powers of ten (yr^0.5)
// have the rounding of [math.Pow], and the degree of arc that of 19 digits of π.
// The operators round as float64s do: 3 * units.Centimetre or v.In(u) may differ
// from the nearest float64 in the last bit.
//
// # Errors
//
// An error of Parse is a [*ParseError] with the text, the place and what was
// expected there, or the two dimensions that clash:
//
//	units: "5 kg": mass (kg), want length (m)
//
// It wraps [ErrSyntax], [ErrUnknownUnit], [ErrDimension] or [ErrRange]. A number
// without a unit is a pure number and nothing else, and in JSON a quantity is a
// string: a bare number says no unit, and is an error.
//
// # Limits
//
// Symbols cannot be added. There are no logarithmic units, no uncertainties, and
// no dimension of angle: a radian is 1, as in the SI. Everything in the package
// is safe for concurrent use.
package units
