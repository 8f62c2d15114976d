package main

import (
	"image"
	"image/color"
	"image/draw"
	"image/png"
	"math"
	"os"
	"strconv"

	"example.org/overturn/stability"
	"example.org/overturn/units"
)

const (
	width, height = 900, 600
	left, right   = 90, 30 // margins
	above, below  = 30, 60
	fine          = 3 // pixels that make one of the picture, each way
)

var (
	ink   = color.RGBA{40, 40, 40, 255}
	faint = color.RGBA{215, 215, 215, 255}
	band  = color.RGBA{236, 236, 236, 255}
	grey  = color.RGBA{110, 110, 110, 255}
	hue   = color.RGBA{20, 90, 170, 255}
	spot  = color.RGBA{200, 60, 30, 255}
)

// A chart maps wavelengths in cm, linearly, and Rayleigh numbers, in decades,
// to a fine canvas.
type chart struct {
	*image.RGBA
	x0, x1, y0, y1 float64
}

func (c *chart) x(v float64) float64 { return left + (width-left-right)*(v-c.x0)/(c.x1-c.x0) }

func (c *chart) y(v float64) float64 {
	return height - below - (height-above-below)*math.Log(v/c.y0)/math.Log(c.y1/c.y0)
}

// box fills a rectangle given in pixels of the picture.
func (c *chart) box(x0, y0, x1, y1 float64, ink color.Color) {
	dot := func(v float64) int { return int(math.Round(fine * v)) }
	r := image.Rect(dot(x0), dot(y0), dot(x1), dot(y1))
	draw.Draw(c, r, image.NewUniform(ink), image.Point{}, draw.Src)
}

// line draws a line of a width of 2 r, with round ends.
func (c *chart) line(xa, ya, xb, yb, r float64, ink color.Color) {
	steps := int(fine*math.Hypot(xb-xa, yb-ya)) + 1
	for i := range steps + 1 {
		x, y := xa+(xb-xa)*float64(i)/float64(steps), ya+(yb-ya)*float64(i)/float64(steps)
		for dx := -r; dx <= r; dx += 1.0 / fine {
			h := math.Sqrt(r*r - dx*dx)
			c.box(x+dx, y-h, x+dx+1.0/fine, y+h+1.0/fine, ink)
		}
	}
}

// digits are 0 to 9 in 3 × 5 dots, row by row from the highest bit.
var digits = [...]uint16{0x7b6f, 0x2c97, 0x73e7, 0x73cf, 0x5bc9, 0x79cf, 0x79ef, 0x7249, 0x7bef, 0x7bcf}

// number writes digits with their right end, or their middle, at x.
func (c *chart) number(n int, x, y float64, centred bool) {
	const dot = 3.0
	text := strconv.Itoa(n)
	x -= 4 * dot * float64(len(text))
	if centred {
		x += 2 * dot * float64(len(text))
	}
	for i, d := range text {
		for bit := range 15 {
			if digits[d-'0']>>(14-bit)&1 == 1 {
				px, py := x+dot*float64(4*i+bit%3), y+dot*float64(bit/3)
				c.box(px, py, px+dot, py+dot, ink)
			}
		}
	}
}

// axes draws a grid with ticks: whole centimetres, and 1, 2, 5 times powers of ten.
func (c *chart) axes() {
	for v := math.Ceil(c.x0); v <= c.x1; v++ {
		if int(v)%2 == 0 {
			c.box(c.x(v)-0.5, above, c.x(v)+0.5, height-below, faint)
			c.number(int(v), c.x(v), height-below+14, true)
		}
	}
	for decade := 1.0; decade <= c.y1; decade *= 10 {
		for _, m := range []float64{1, 2, 5} {
			if v := decade * m; v >= c.y0 && v <= c.y1 {
				c.box(left, c.y(v)-0.5, width-right, c.y(v)+0.5, faint)
				c.number(int(v), left-8, c.y(v)-7, false)
			}
		}
	}
	c.box(left-1, above, left+1, height-below+1, ink)
	c.box(left-1, height-below-1, width-right, height-below+1, ink)
}

func writePicture(name string, curve []stability.Onset, v stability.Verdict, between []float64) error {
	cm := func(o stability.Onset) float64 {
		return (units.Length(o.Wavelength) * tank.Layer.Depth).In(units.Centimetre)
	}
	most := curve[0].Rayleigh
	for _, o := range curve {
		most = max(most, o.Rayleigh)
	}
	c := &chart{
		RGBA: image.NewRGBA(image.Rect(0, 0, fine*width, fine*height)),
		x0:   cm(curve[0]), x1: cm(curve[len(curve)-1]), y0: 0.6 * min(v.Critical, between[0]), y1: max(most, between[1]) * 1.2,
	}
	c.box(0, 0, width, height, color.White)
	c.box(left, c.y(between[1]), width-right, c.y(between[0]), band)
	c.axes()
	c.box(left, c.y(v.Rayleigh)-1, width-right, c.y(v.Rayleigh)+1, grey)
	for i, o := range curve[1:] {
		c.line(c.x(cm(curve[i])), c.y(curve[i].Rayleigh), c.x(cm(o)), c.y(o.Rayleigh), 1.5, hue)
	}
	c.line(c.x(cm(v.Onset)), c.y(v.Critical), c.x(cm(v.Onset)), c.y(v.Critical), 6, spot)
	file, err := os.Create(name)
	if err != nil {
		return err
	}
	defer file.Close()
	if err := png.Encode(file, c.smooth()); err != nil {
		return err
	}
	return file.Close()
}

// smooth averages the fine canvas.
func (c *chart) smooth() image.Image {
	out := image.NewRGBA(image.Rect(0, 0, width, height))
	for i := range out.Pix {
		channel, x, y := i%4, i/4%width, i/4/width
		sum := 0
		for k := range fine * fine {
			sum += int(c.Pix[c.PixOffset(fine*x+k%fine, fine*y+k/fine)+channel])
		}
		out.Pix[i] = uint8(sum / (fine * fine))
	}
	return out
}
