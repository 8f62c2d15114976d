package picture

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// The primaries of sRGB in OKLab (Ottosson 2020, from memory) and white, whose
// coordinates follow from the definition.
func TestOKLabPrimaries(t *testing.T) {
	for _, tt := range []struct {
		lightness, a, b  float64
		red, green, blue float64
	}{
		{1, 0, 0, 1, 1, 1},
		{0.62796, 0.22486, 0.12585, 1, 0, 0},
		{0.86644, -0.23389, 0.17950, 0, 1, 0},
		{0.45201, -0.03246, -0.31153, 0, 0, 1},
	} {
		r, g, b := linearFromOKLab(tt.lightness, tt.a, tt.b)
		assert.InDeltaSlice(t, []float64{tt.red, tt.green, tt.blue}, []float64{r, g, b}, 2e-4)
	}
}

// Values of the transfer function of IEC 61966-2-1, by hand: the linear foot,
// its end, the middle grey of 0.2140 and clipping.
func TestEncode(t *testing.T) {
	for linear, want := range map[float64]uint8{-1: 0, 0: 0, 0.001: 3, 0.0031308: 10, 0.2140: 127, 0.5: 188, 1: 255, 2: 255} {
		assert.Equal(t, want, encode(linear), "%v", linear)
	}
}

func TestFitKeepsShownColoursAndTamesOthers(t *testing.T) {
	grey := fit(0.5, 0, 1)
	assert.Equal(t, grey.R, grey.G)
	assert.Equal(t, grey.G, grey.B)
	modest := fit(0.6, 0.05, 0)
	assert.Greater(t, modest.R, modest.G, "hue 0 is reddish")
	wild := fit(0.6, 5, 0)
	assert.Greater(t, wild.R, modest.R, "as colourful as can be shown")
	assert.Less(t, wild.R, uint8(255))
}
