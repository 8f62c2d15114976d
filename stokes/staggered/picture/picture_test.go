package picture_test

import (
	"image/color"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/staggered/picture"
)

func field(t *testing.T, f func(x, z float64) float64) *staggered.Scalar {
	t.Helper()
	g, err := staggered.Uniform(40, 20, 2, 1)
	require.NoError(t, err)
	s := staggered.NewScalar(g)
	s.Fill(f)
	return s
}

// luma is the brightness of a colour on a grey screen (Rec. 709 weights).
func luma(c color.Color) float64 {
	r, g, b, _ := c.RGBA()
	return (0.2126*float64(r) + 0.7152*float64(g) + 0.0722*float64(b)) / 0xffff
}

func TestScaleGrowsLighter(t *testing.T) {
	s := picture.Ember()
	for i := 1; i < len(s); i++ {
		assert.GreaterOrEqual(t, luma(s[i]), luma(s[i-1])-2e-3, "colour %d", i)
	}
	assert.Less(t, luma(s[0]), 0.2)
	assert.Greater(t, luma(s[len(s)-1]), 0.85)
	assert.Equal(t, s[0], s.At(-1))
	assert.Equal(t, s[len(s)-1], s.At(3))
	assert.Equal(t, s[128], s.At(128.0/255))
}

func TestPictureKeepsProportionsAndPointsUp(t *testing.T) {
	img, err := picture.Draw(field(t, func(_, z float64) float64 { return z }), &picture.Settings{Width: 100})
	require.NoError(t, err)
	assert.Equal(t, 100, img.Bounds().Dx())
	assert.Equal(t, 50, img.Bounds().Dy())
	assert.Greater(t, luma(img.At(50, 0)), luma(img.At(50, 49)), "large values at the top of the box")
	img, err = picture.Draw(field(t, func(x, _ float64) float64 { return x }), nil)
	require.NoError(t, err)
	assert.Equal(t, picture.DefaultWidth, img.Bounds().Dx())
	assert.Greater(t, luma(img.At(959, 240)), luma(img.At(0, 240)))
}

func TestColoursFollowTheRange(t *testing.T) {
	s := field(t, func(_, _ float64) float64 { return 0.25 })
	img, err := picture.Draw(s, &picture.Settings{Width: 10, Low: 0, High: 1})
	require.NoError(t, err)
	assert.Equal(t, picture.Ember().At(0.25), img.At(3, 3))
	img, err = picture.Draw(s, &picture.Settings{Width: 10})
	require.NoError(t, err)
	assert.Equal(t, picture.Ember().At(0.5), img.At(3, 3), "a constant field is drawn in the middle of the scale")
}

// ψ = x has vertical streamlines at the middles of equal parts.
func TestStreamlinesLieWhereTheyShould(t *testing.T) {
	s := field(t, func(_, _ float64) float64 { return 0 })
	psi := staggered.NewNodal(s.Grid)
	psi.Fill(func(x, _ float64) float64 { return x })
	img, err := picture.Draw(s, &picture.Settings{Width: 400, Stream: psi, Lines: 4})
	require.NoError(t, err)
	base := picture.Ember().At(0.5)
	for _, x := range []int{50, 150, 250, 350} {
		assert.Greater(t, luma(img.At(x, 100)), luma(base)+0.1, "line at %d", x)
	}
	for _, x := range []int{5, 100, 200, 300, 395} {
		assert.Equal(t, base, img.At(x, 100), "no line at %d", x)
	}
}

func TestBadPicturesAreErrors(t *testing.T) {
	nan := math.NaN()
	flat := field(t, func(_, _ float64) float64 { return 0 })
	broken := field(t, func(_, _ float64) float64 { return nan })
	psi := staggered.NewNodal(flat.Grid)
	psi.SetAll(math.Inf(1))
	wide, err := staggered.Uniform(40, 20, 3, 1)
	require.NoError(t, err)
	for _, tt := range []struct {
		field    *staggered.Scalar
		settings *picture.Settings
		want     string
	}{
		{broken, nil, "field is NaN at x = 0.025, z = 0.025"},
		{broken, &picture.Settings{High: 1}, "field is NaN"},
		{nil, nil, "field has no grid"},
		{&staggered.Scalar{}, nil, "field has no grid"},
		{&staggered.Scalar{Grid: flat.Grid, Values: psi.Values}, nil, "field holds 861 values, want 800"},
		{flat, &picture.Settings{Stream: &staggered.Nodal{}}, "stream function has no grid"},
		{flat, &picture.Settings{Stream: &staggered.Nodal{Grid: flat.Grid, Values: flat.Values}}, "stream function holds 800 values, want 861"},
		{flat, &picture.Settings{Stream: staggered.NewNodal(wide)}, "stream function lives on a box of 3x1, want 2x1"},
		{flat, &picture.Settings{Low: 2, High: 1}, "colours run from 2 to 1"},
		{flat, &picture.Settings{Low: nan, High: 1}, "colours run from NaN"},
		{flat, &picture.Settings{Width: -1}, "width -1"},
		{flat, &picture.Settings{Width: 1 << 20}, "at most"},
		{flat, &picture.Settings{Lines: -2}, "lines -2"},
		{flat, &picture.Settings{Stream: psi}, "stream function runs from"},
	} {
		img, err := picture.Draw(tt.field, tt.settings)
		assert.True(t, img == nil, "no picture") // Nil would print its pixels
		assert.ErrorContains(t, err, tt.want)
	}
}
