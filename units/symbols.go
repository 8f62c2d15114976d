package units

import (
	"fmt"
	"strings"
	"sync"
	"unicode/utf8"
)

// siPrefixes, for the prefixes of a symbol, allows all of the SI.
const siPrefixes = "SI"

// prefixes gives the power of ten of each prefix of the SI, the four of 2022
// included.
var prefixes = map[string]int{
	"Q": 30, "R": 27, "Y": 24, "Z": 21, "E": 18, "P": 15, "T": 12, "G": 9, "M": 6, "k": 3, "h": 2, "da": 1,
	"d": -1, "c": -2, "m": -3, "µ": -6, "n": -9, "p": -12, "f": -15, "a": -18, "z": -21, "y": -24, "r": -27, "q": -30,
}

// definitions is the closed table of symbols: the symbol and its other
// spellings, what one of it is in symbols above it or in base units, and the
// prefixes it takes. The base units come first, except the kilogram, which is
// what a gram is defined by.
//
// Sources: SI brochure (9th edition, 2019); UCUM 2.2 (2024) for poise, stokes,
// gal, bar, erg, dyne and the calories; international yard and pound
// agreement (1959) for foot, inch and pound, from memory; the heat-generation
// unit from memory.
var definitions = []struct{ symbols, is, prefixes string }{
	{"g", "1e-3 kg", siPrefixes},
	{"t", "1e3 kg", "kMG"},
	{"N", "kg m/s^2", siPrefixes},
	{"Pa", "N/m^2", siPrefixes},
	{"J", "N m", siPrefixes},
	{"W", "J/s", siPrefixes},
	{"Hz", "1/s", siPrefixes},
	{"C", "A s", siPrefixes},

	// Time. A year is the Julian year of the IAU, 365.25 days. "a" takes only
	// the prefixes of ages, since Pa and ha mean other things.
	{"min", "60 s", ""},
	{"h hr", "3600 s", ""},
	{"d day days", "86400 s", ""},
	{"yr a", "31557600 s", "kMG"},
	{"year years", "yr", ""},

	// Temperature. These are intervals; zeros has the points.
	{"degC °C ℃ Celsius", "K", ""},
	{"degF °F ℉ Fahrenheit", "5 K/9", ""},
	{"degR °R", "5 K/9", ""},
	{"kelvin", "K", ""},

	// Length, area, volume.
	{"L l", "1e-3 m^3", "µmcdhk"},
	{"ft", "0.3048 m", ""},
	{"in", "0.0254 m", ""},
	{"D", "1e-7 m^2/101325", "mµn"},
	{"darcy", "D", ""},

	// Pressure, force and mass.
	{"bar", "1e5 Pa", "µmkM"},
	{"atm", "101325 Pa", ""},
	{"dyn", "1e-5 N", ""},
	{"lb", "0.45359237 kg", ""},
	{"psi", "0.45359237 kg 9.80665 m/(s^2 0.0254 m 0.0254 m)", ""},

	// Viscosity and gravity.
	{"P", "0.1 Pa s", "µmcdkM"},
	{"St", "1e-4 m^2/s", "µmcd"},
	{"Gal", "1e-2 m/s^2", "mµ"},

	// Energy and heat.
	{"erg", "1e-7 J", ""},
	{"cal cal_th", "4.184 J", "µmk"},
	{"cal_IT", "4.1868 J", "µmk"},
	{"Btu BTU Btu_IT", "5 lb cal_IT/(9 g)", ""},
	{"eV", "1.602176634e-19 J", siPrefixes},
	{"HFU", "1e-6 cal_th/(cm^2 s)", ""},
	{"HGU", "1e-13 cal_th/(cm^3 s)", ""},

	// Numbers. The radian is one, as in the SI.
	{"% wt%", "1e-2", ""},
	{"‰", "1e-3", ""},
	{"ppm", "1e-6", ""},
	{"ppb", "1e-9", ""},
	{"rad", "1", "mµ"},
	{"deg °", "3.141592653589793238 rad/180", ""},
}

// zeros gives the reading of absolute zero, sign reversed, in hundredths, of the
// scales whose zero is elsewhere.
var zeros = map[string]int{
	"degC": 27315, "°C": 27315, "℃": 27315, "Celsius": 27315,
	"degF": 45967, "°F": 45967, "℉": 45967, "Fahrenheit": 45967,
}

// A symbol is one row of the table, read.
type symbol struct {
	is       monomial
	prefixes string
	zero     int // hundredths of a degree, of scales of temperature
}

// symbolTable holds the symbols without prefixes.
type symbolTable map[string]symbol

// table returns the table of symbols, read once.
var table = sync.OnceValue(func() symbolTable {
	t := symbolTable{}
	for i, s := range baseUnits {
		var m monomial
		m[i] = exponentGrain
		t[s] = symbol{is: m, prefixes: siPrefixes}
		if s == "kg" {
			t[s] = symbol{is: m}
		}
	}
	for _, d := range definitions {
		p := unitParser{scanner: scanner{text: d.is}, symbols: t, numbers: true}
		u, err := p.unit()
		if err != nil {
			panic(fmt.Sprintf("units: table, %s: %v", d.symbols, err)) // a test reads the table
		}
		for s := range strings.FieldsSeq(d.symbols) {
			t[s] = symbol{is: u.monomial, prefixes: d.prefixes, zero: zeros[s]}
		}
	}
	return t
})

// lookup finds a symbol with or without a prefix. Without one goes first, so
// that min is a minute and Pa a pascal.
func (t symbolTable) lookup(s string) (symbol, bool) {
	if sym, ok := t[s]; ok {
		return sym, true
	}
	first, size := utf8.DecodeRuneInString(s)
	prefix, rest := s[:size], s[size:]
	if first == 'u' || first == 'μ' { // Greek mu, where the prefix is the micro sign
		prefix = "µ"
	}
	if sym, ok := t.prefixed(prefix, rest); ok {
		return sym, true
	}
	if rest, ok := strings.CutPrefix(s, "da"); ok {
		return t.prefixed("da", rest)
	}
	return symbol{}, false
}

func (t symbolTable) prefixed(prefix, rest string) (symbol, bool) {
	sym, known := t[rest]
	exp, isPrefix := prefixes[prefix]
	if !known || !isPrefix || sym.prefixes != siPrefixes && !strings.Contains(sym.prefixes, prefix) {
		return symbol{}, false
	}
	sym.is[ten] += int32(exp) * exponentGrain
	return sym, true
}

// split finds two symbols that were written without a space between them, the
// first as long as possible.
func (t symbolTable) split(s string) (first, second string, ok bool) {
	for i := len(s) - 1; i > 0; i-- {
		_, okFirst := t.lookup(s[:i])
		_, okSecond := t.lookup(s[i:])
		if okFirst && okSecond {
			return s[:i], s[i:], true
		}
	}
	return "", "", false
}
