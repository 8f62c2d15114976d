package picture

import (
	"errors"
	"fmt"
	"image"
	"image/color"
	"math"

	"example.org/overturn/stokes/staggered"
)

// Defaults of [Settings].
const (
	DefaultWidth = 960
	DefaultLines = 12
)

// MaxPixels bounds the size of a picture.
const MaxPixels = 1 << 26

// Settings tunes [Draw]. A nil *Settings, or a zero field, means the default.
type Settings struct {
	// Width of the picture in pixels; the height follows from the box.
	// Default 960.
	Width int

	// Low and High are the field values at the ends of the colour scale.
	// Default, when both are zero: the extrema of the field.
	Low, High float64

	// Scale holds the colours from Low to High. Default [Ember].
	Scale Scale

	// Stream, if not nil, is drawn as isolines over the field: the stream
	// function of the flow, whose isolines are its streamlines.
	Stream *staggered.Nodal

	// Lines is the number of isolines of Stream. Default 12.
	Lines int
}

// Draw returns a picture of the field, interpolated between cell centres. It
// fails on a field with a NaN, on a range Low to High that is not finite or runs
// backwards, on a stream function in another box, and on a picture of more than
// [MaxPixels] pixels or so flat that its height is less than one.
func Draw(s *staggered.Scalar, settings *Settings) (image.Image, error) {
	d, err := newDrawing(s, settings)
	if err != nil {
		return nil, err
	}
	img := image.NewRGBA(image.Rect(0, 0, d.width, d.height))
	for py := range d.height {
		for px := range d.width {
			img.SetRGBA(px, py, d.pixel(px, py))
		}
	}
	return img, nil
}

// A drawing holds Settings with its defaults filled in.
type drawing struct {
	Settings
	field         *staggered.Scalar
	width, height int
	// The isolines of Stream lie at its lowest value plus odd multiples of
	// half a step.
	lowest, step float64
}

func newDrawing(s *staggered.Scalar, settings *Settings) (*drawing, error) {
	d := &drawing{field: s}
	if settings != nil {
		d.Settings = *settings
	}
	if d.Width == 0 {
		d.Width = DefaultWidth
	}
	if d.Lines == 0 {
		d.Lines = DefaultLines
	}
	if len(d.Scale) == 0 {
		d.Scale = Ember()
	}
	if d.Width < 1 || d.Lines < 1 {
		return nil, fmt.Errorf("picture: width %d and lines %d, want both > 0", d.Width, d.Lines)
	}
	if err := checkFields(s, d.Stream); err != nil {
		return nil, err
	}
	d.width = d.Width
	height := math.Round(float64(d.width) * s.Grid.Height() / s.Grid.Width())
	if !(height >= 1 && height*float64(d.width) <= MaxPixels) {
		return nil, fmt.Errorf("picture: size %dx%.0f pixels, want a height of at least 1 and at most %d pixels", d.width, height, MaxPixels)
	}
	d.height = int(height)
	return d, errors.Join(d.setRange(), d.setLines())
}

// checkFields looks that the fields are whole and lie in one box.
func checkFields(s *staggered.Scalar, stream *staggered.Nodal) error {
	if s == nil || s.Grid == nil {
		return errors.New("picture: field has no grid")
	}
	nx, nz := s.Grid.Cells()
	if len(s.Values) != nx*nz {
		return fmt.Errorf("picture: field holds %d values, want %d", len(s.Values), nx*nz)
	}
	if stream == nil {
		return nil
	}
	if stream.Grid == nil {
		return errors.New("picture: stream function has no grid")
	}
	g, h := stream.Grid, s.Grid
	nx, nz = g.Cells()
	if len(stream.Values) != (nx+1)*(nz+1) {
		return fmt.Errorf("picture: stream function holds %d values, want %d", len(stream.Values), (nx+1)*(nz+1))
	}
	if g.Width() != h.Width() || g.Height() != h.Height() {
		return fmt.Errorf("picture: stream function lives on a box of %vx%v, want %vx%v", g.Width(), g.Height(), h.Width(), h.Height())
	}
	return nil
}

func (d *drawing) setRange() error {
	lowest, highest := d.field.Extrema()
	if math.IsNaN(lowest.Value) {
		return fmt.Errorf("picture: field is NaN at x = %v, z = %v", lowest.X, lowest.Z)
	}
	if d.Low == 0 && d.High == 0 {
		d.Low, d.High = lowest.Value, highest.Value
	}
	if math.IsNaN(d.High-d.Low) || math.IsInf(d.High-d.Low, 0) || d.High < d.Low {
		return fmt.Errorf("picture: colours run from %v to %v, want finite numbers that grow", d.Low, d.High)
	}
	return nil
}

func (d *drawing) setLines() error {
	if d.Stream == nil {
		return nil
	}
	lowest, highest := d.Stream.Extrema()
	d.lowest, d.step = lowest.Value, (highest.Value-lowest.Value)/float64(d.Lines)
	if math.IsNaN(d.step) || math.IsInf(d.step, 0) {
		return fmt.Errorf("picture: stream function runs from %v to %v, want finite numbers", lowest.Value, highest.Value)
	}
	return nil
}

// place returns the point of the box under a position in pixels.
func (d *drawing) place(px, py float64) (x, z float64) {
	g := d.field.Grid
	return g.XNodes()[0] + px/float64(d.width)*g.Width(),
		g.ZNodes()[g.NZ()] - py/float64(d.height)*g.Height()
}

func (d *drawing) pixel(px, py int) color.RGBA {
	x, z := d.place(float64(px)+0.5, float64(py)+0.5)
	t := 0.5
	if d.High > d.Low {
		t = (d.field.ValueAt(x, z) - d.Low) / (d.High - d.Low)
	}
	c := d.Scale.At(t)
	if d.Stream == nil || d.step == 0 {
		return c
	}
	return blend(c, d.lineCover(px, py))
}

// lineCover returns how much of a pixel the nearest isoline covers, from its
// distance in pixels, estimated by the slope of the stream function.
func (d *drawing) lineCover(px, py int) float64 {
	at := func(px, py float64) float64 {
		x, z := d.place(px, py)
		return (d.Stream.ValueAt(x, z)-d.lowest)/d.step - 0.5
	}
	cx, cy := float64(px)+0.5, float64(py)+0.5
	level := at(cx, cy)
	slope := math.Hypot(at(cx+0.5, cy)-at(cx-0.5, cy), at(cx, cy+0.5)-at(cx, cy-0.5))
	distance := math.Abs(level-math.Round(level)) / max(slope, 1e-9)
	return max(0, min(1, 1.1-distance))
}

// blend lays translucent white over a colour.
func blend(c color.RGBA, cover float64) color.RGBA {
	const opacity = 0.55
	mix := func(v uint8) uint8 { return uint8(math.Round(float64(v) + opacity*cover*(255-float64(v)))) }
	return color.RGBA{R: mix(c.R), G: mix(c.G), B: mix(c.B), A: 255}
}
