package main

import (
	"fmt"
	"image"
	"image/color"
	"image/png"
	"math"
	"os"
	"strconv"
)

// panel is a curve with its band, over equal steps of time.
type panel struct {
	title             string
	end               float64 // of the time axis
	low, median, high []float64
}

func (p *panel) add(low, median, high float64) {
	p.low, p.median, p.high = append(p.low, low), append(p.median, median), append(p.high, high)
}

const (
	width, height             = 820, 300 // of a panel
	left, right, above, below = 90, 20, 34, 34
)

var (
	paper = color.RGBA{255, 255, 255, 255}
	ink   = color.RGBA{40, 40, 40, 255}
	faint = color.RGBA{225, 225, 225, 255}
	band  = color.RGBA{186, 208, 226, 255}
	line  = color.RGBA{18, 78, 128, 255}
)

// drawPNG draws the panels one below the other.
func drawPNG(name string, panels []panel) error {
	img := image.NewRGBA(image.Rect(0, 0, width, height*len(panels)))
	for i := range img.Bounds().Dx() * img.Bounds().Dy() {
		img.Set(i%width, i/width, paper)
	}
	for i, p := range panels {
		p.draw(img, i*height)
	}
	file, err := os.Create(name)
	if err != nil {
		return err
	}
	defer file.Close()
	return png.Encode(file, img)
}

func (p *panel) draw(img *image.RGBA, top int) {
	low, high := math.Inf(1), math.Inf(-1)
	for i := range p.low {
		low, high = math.Min(low, p.low[i]), math.Max(high, p.high[i])
	}
	step := math.Pow(10, math.Floor(math.Log10((high-low)/2)))
	for (high-low)/step > 6 {
		step *= 2
	}
	low, high = step*math.Floor(low/step), step*math.Ceil(high/step)
	y := func(v float64) int {
		return top + height - below - int((v-low)/(high-low)*(height-above-below)+0.5)
	}
	for v := low; v <= high+step/2; v += step {
		fill(img, left, width-right, y(v), y(v)+1, faint)
		text(img, left-12-12*len(fmt.Sprint(v)), y(v)-5, fmt.Sprint(v))
	}
	// between samples, interpolate: one column of pixels at a time
	previous := y(p.median[0])
	for x := left; x < width-right; x++ {
		at := float64(x-left) / (width - right - left) * float64(len(p.low)-1)
		i := min(int(at), len(p.low)-2)
		value := func(s []float64) int { return y(s[i] + (at-float64(i))*(s[i+1]-s[i])) }
		fill(img, x, x+1, value(p.high), value(p.low), band)
		middle := value(p.median)
		fill(img, x, x+1, min(previous, middle)-1, max(previous, middle)+2, line)
		previous = middle
	}
	for t := 0.0; t <= p.end; t++ {
		x := left + int(t/p.end*(width-right-left))
		fill(img, x, x+1, top+height-below, top+height-below+6, ink)
		text(img, x-4, top+height-below+11, fmt.Sprint(t))
	}
	text(img, width-right-36, top+height-below+11, "Gyr")
	fill(img, left, left+1, top+above, top+height-below, ink)
	fill(img, left, width-right, top+height-below, top+height-below+1, ink)
	text(img, left, top+10, p.title)
}

func fill(img *image.RGBA, x0, x1, y0, y1 int, c color.RGBA) {
	for y := y0; y < y1; y++ {
		for x := x0; x < x1; x++ {
			img.SetRGBA(x, y, c)
		}
	}
}

// glyphs are five rows of five dots, a digit of base 32 a row.
var glyphs = map[rune]string{
	'0': "ehhhe", '1': "4c44e", '2': "u1egv", '3': "u1e1u", '4': "iiv22", '5': "vgu1u", '6': "eguhe", '7': "v2488", '8': "ehehe", '9': "ehf1e",
	'.': "00004", '(': "24442", ')': "84448", 'a': "0eiif", 'd': "2eiif", 'e': "ehvge", 'f': "68s88", 'h': "gguhh", 'i': "40444", 'k': "gisih",
	'l': "c444e", 'm': "0qlll", 'o': "0ehhe", 'p': "uhugg", 'r': "0mogg", 't': "8s886", 'u': "0hhjd", 'w': "0hlla", 'y': "hhf1e",
	'G': "fgjhf", 'K': "hisih", 'T': "v4444", 'W': "hhlla",
}

func text(img *image.RGBA, x, y int, s string) {
	const dot = 2
	for _, r := range s {
		for row, digit := range glyphs[r] {
			bits, _ := strconv.ParseInt(string(digit), 32, 0)
			for k := range 5 {
				if bits>>(4-k)&1 == 1 {
					fill(img, x+k*dot, x+k*dot+dot, y+row*dot, y+row*dot+dot, ink)
				}
			}
		}
		x += 6 * dot
	}
}
