package picture

import (
	"image/color"
	"math"
)

// Scale is a sequence of colours from the low to the high end of a range.
type Scale []color.RGBA

// scaleSize is the number of colours in a scale: one a step of 8-bit grey.
const scaleSize = 256

// Ember returns the default scale: deep blue, violet, red and amber to pale
// yellow, with lightness growing evenly from end to end.
func Ember() Scale {
	s := make(Scale, scaleSize)
	for i := range s {
		t := float64(i) / (scaleSize - 1)
		lightness := 0.24 + 0.72*t
		// The hue turns from blue (265°) through red (390°) to yellow (462°).
		hue := (265 + 197*t) * math.Pi / 180
		// Colourful in the middle, where lightness leaves room for it.
		chroma := 0.06 + 0.15*math.Sin(math.Pi*math.Pow(t, 0.8))
		s[i] = fit(lightness, chroma, hue)
	}
	return s
}

// At returns the colour at t from 0 to 1; outside it, that of the nearer end.
func (s Scale) At(t float64) color.RGBA {
	i := int(math.Round(t * float64(len(s)-1)))
	return s[max(0, min(i, len(s)-1))]
}

// fit lowers the chroma until the colour can be shown.
func fit(lightness, chroma, hue float64) color.RGBA {
	for {
		r, g, b := linearFromOKLab(lightness, chroma*math.Cos(hue), chroma*math.Sin(hue))
		if chroma < 1e-3 || (min(r, g, b) >= 0 && max(r, g, b) <= 1) {
			return color.RGBA{R: encode(r), G: encode(g), B: encode(b), A: 255}
		}
		chroma *= 0.97
	}
}

// linearFromOKLab converts to linear sRGB (Ottosson 2020, from memory).
func linearFromOKLab(lightness, a, b float64) (red, green, blue float64) {
	cube := func(v float64) float64 { return v * v * v }
	l := cube(lightness + 0.3963377774*a + 0.2158037573*b)
	m := cube(lightness - 0.1055613458*a - 0.0638541728*b)
	s := cube(lightness - 0.0894841775*a - 1.2914855480*b)
	return 4.0767416621*l - 3.3077115913*m + 0.2309699292*s,
		-1.2684380046*l + 2.6097574011*m - 0.3413193965*s,
		-0.0041960863*l - 0.7034186147*m + 1.7076147010*s
}

// encode applies the transfer function of sRGB (IEC 61966-2-1).
func encode(v float64) uint8 {
	v = max(0, min(v, 1))
	if v <= 0.0031308 {
		v *= 12.92
	} else {
		v = 1.055*math.Pow(v, 1/2.4) - 0.055
	}
	return uint8(math.Round(255 * v))
}
