package pencil

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// Parts of a pencil.
const (
	Base       = iota // A
	Mass              // M
	FirstDrive        // B₀; B₁ and so on follow
)

// Drives is the largest number of driving numbers.
const Drives = 3

const parts = FirstDrive + Drives

// A Block is a dense matrix times a power of k, placed at (Row, Col) in one of
// the parts. Blocks of the same part and place add up.
type Block struct {
	Part, Power int
	Row, Rows   int
	Col, Cols   int
	Data        []float64 // row-major
}

// A Pencil is immutable and safe for concurrent use.
type Pencil struct {
	n      int
	blocks []Block
	scale  []float64
}

// New makes a pencil of n unknowns of blocks, which it scales in place so that
// the diagonal of A is 1 at k = 1.
func New(n int, blocks []Block) *Pencil {
	p := &Pencil{n: n, blocks: blocks, scale: make([]float64, n)}
	for i := range blocks {
		b := &blocks[i]
		if b.Part != Base || b.Row != b.Col {
			continue
		}
		for j := range b.Rows {
			p.scale[b.Row+j] += b.Data[j*b.Cols+j]
		}
	}
	for i, d := range p.scale {
		p.scale[i] = 1
		if d != 0 {
			p.scale[i] = 1 / math.Sqrt(math.Abs(d))
		}
	}
	for i := range blocks {
		b := &blocks[i]
		for j := range b.Rows {
			row := b.Data[j*b.Cols : (j+1)*b.Cols]
			floats.Mul(row, p.scale[b.Col:b.Col+b.Cols])
			floats.Scale(p.scale[b.Row+j], row)
		}
	}
	return p
}

// Size returns the number of unknowns.
func (p *Pencil) Size() int { return p.n }

// Unscale multiplies a solution with the scale of its unknowns, in place: the
// result are coefficients of the basis that the blocks were made with.
func (p *Pencil) Unscale(x []float64) { floats.Mul(x, p.scale) }

// A Point is where a pencil is evaluated.
type Point struct {
	K     float64
	Sigma complex128
	Drive [Drives]float64
}

// coefficients returns what multiplies each part.
func (pt *Point) coefficients() [parts]complex128 {
	c := [parts]complex128{Base: 1, Mass: -pt.Sigma}
	for i, r := range pt.Drive {
		c[FirstDrive+i] = complex(r, 0)
	}
	return c
}

// weights writes, for each block, the coefficient of its part times the d-th
// derivative of its power of k.
func (p *Pencil) weights(dst []complex128, c [parts]complex128, k float64, d int) {
	for i := range p.blocks {
		b := &p.blocks[i]
		dst[i] = c[b.Part] * complex(powerDerivative(k, b.Power, d), 0)
	}
}

// powerDerivative returns dᵈ(kᵖ)/dkᵈ.
func powerDerivative(k float64, p, d int) float64 {
	v := 1.0
	for range d {
		v *= float64(p)
		p--
	}
	if v == 0 {
		return 0
	}
	for range p {
		v *= k
	}
	return v
}

// combine adds the weighted blocks to a matrix of the given stride: their real
// parts if imaginary is false, else their imaginary parts times sign.
func (p *Pencil) combine(dst []float64, stride int, weights []float64) {
	for i := range p.blocks {
		w := weights[i]
		if w == 0 {
			continue
		}
		b := &p.blocks[i]
		for r := range b.Rows {
			at := (b.Row+r)*stride + b.Col
			floats.AddScaled(dst[at:at+b.Cols], w, b.Data[r*b.Cols:(r+1)*b.Cols])
		}
	}
}

// apply adds the weighted blocks times x to dst.
func (p *Pencil) apply(dst, x, weights []float64) {
	for i := range p.blocks {
		w := weights[i]
		if w == 0 {
			continue
		}
		b := &p.blocks[i]
		from := x[b.Col : b.Col+b.Cols]
		to := dst[b.Row : b.Row+b.Rows]
		for r := range to {
			to[r] += w * floats.Dot(b.Data[r*b.Cols:(r+1)*b.Cols], from)
		}
	}
}
