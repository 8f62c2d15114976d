package element

import (
	"fmt"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"

	"example.org/overturn/stability/internal/pencil"
)

// A Term is the integral Scale k^Power ∫ c(z) D^RowOrder(v) D^ColOrder(u) dz
// with v a test function of field Row and u the field Col.
type Term struct {
	Part               int // of the pencil
	Power              int
	Row, Col           int
	RowOrder, ColOrder int
	Coefficient        int // index into the coefficients; 0 means c = 1
	Scale              float64
}

// An EndTerm is the product Scale k^Power D^RowOrder(v) D^ColOrder(u) at an end.
type EndTerm struct {
	Part               int
	Power              int
	Row, Col           int
	RowOrder, ColOrder int
	End                int // 0 left, 1 right
	Scale              float64
}

// An Operator is a sum of terms.
type Operator struct {
	Terms []Term
	Ends  []EndTerm

	// Coefficients are the functions that terms name; element 0 is unused.
	Coefficients []func(z float64) float64

	// Excess is the number of Gauss points beyond the degree; the integrals
	// of a coefficient of degree 2 Excess - 2 are exact.
	Excess int
}

// Assemble returns the blocks of the operator on a layout.
func Assemble(l *Layout, op *Operator) []pencil.Block {
	a := newAssembler(l, op)
	for e := range len(l.Nodes) - 1 {
		a.start(e)
		for i := range op.Terms {
			a.term(e, &op.Terms[i])
		}
	}
	for i := range op.Ends {
		a.end(&op.Ends[i])
	}
	return a.blocks
}

type blockKey struct{ part, power, row, col int }

type assembler struct {
	layout  *Layout
	op      *Operator
	ref     *reference
	half    float64     // half the length of the element at hand
	values  [][]float64 // of the coefficients at its points
	product []float64   // local matrix
	left    []float64   // test functions times weights
	blocks  []pencil.Block
	found   map[blockKey]int
}

func newAssembler(l *Layout, op *Operator) *assembler {
	ref := referenceOf(l.Degree, l.Degree+op.Excess)
	points, n := len(ref.x), l.Degree+2
	a := &assembler{
		layout: l, op: op, ref: ref,
		values:  make([][]float64, len(op.Coefficients)),
		product: make([]float64, n*n),
		left:    make([]float64, n*points),
		found:   make(map[blockKey]int),
	}
	for i := range a.values {
		a.values[i] = make([]float64, points)
	}
	return a
}

// start evaluates the coefficients on element e.
func (a *assembler) start(e int) {
	left, right := a.layout.Nodes[e], a.layout.Nodes[e+1]
	a.half = (right - left) / 2
	for i, c := range a.op.Coefficients {
		if i == 0 {
			continue
		}
		for q, x := range a.ref.x {
			a.values[i][q] = c(left + a.half*(1+x))
		}
	}
}

// term adds the part of one term that comes from element e.
func (a *assembler) term(e int, t *Term) {
	fields := a.layout.Fields
	rows, cols := &a.layout.spans[t.Row], &a.layout.spans[t.Col]
	points := len(a.ref.x)
	test := a.ref.value[fields[t.Row].Class][t.RowOrder]
	trial := a.ref.value[fields[t.Col].Class][t.ColOrder]
	scale := t.Scale * a.half
	for range t.RowOrder + t.ColOrder {
		scale /= a.half
	}
	for i := range rows.local {
		to, from := a.left[i*points:(i+1)*points], test[i*points:(i+1)*points]
		for q, w := range a.ref.w {
			to[q] = from[q] * w * scale
		}
		if t.Coefficient == 0 {
			continue
		}
		for q, c := range a.values[t.Coefficient] {
			to[q] *= c
		}
	}
	product := blas64.General{Rows: rows.local, Cols: cols.local, Stride: cols.local, Data: a.product}
	blas64.Gemm(blas.NoTrans, blas.Trans, 1,
		blas64.General{Rows: rows.local, Cols: points, Stride: points, Data: a.left},
		blas64.General{Rows: cols.local, Cols: points, Stride: points, Data: trial}, 0, product)
	a.scatter(e, t, rows, cols)
}

// scatter adds the local matrix to the blocks that hold its unknowns.
func (a *assembler) scatter(e int, t *Term, rows, cols *span) {
	rowClass, colClass := a.layout.Fields[t.Row].Class, a.layout.Fields[t.Col].Class
	place := newPlace(t.Part, t.Power, t.Row, t.Col)
	for i, row := range rows.index[e*rows.local : (e+1)*rows.local] {
		if row < 0 {
			continue
		}
		scale := localScale(rowClass, i, a.half)
		for j, col := range cols.index[e*cols.local : (e+1)*cols.local] {
			if col < 0 {
				continue
			}
			v := a.product[i*cols.local+j] * scale * localScale(colClass, j, a.half)
			a.add(&place, row, col, v)
		}
	}
}

// end adds a term at an end: only the functions of the node there count.
func (a *assembler) end(t *EndTerm) {
	row, rowConstant := a.endUnknown(t.Row, t.RowOrder, t.End)
	col, colConstant := a.endUnknown(t.Col, t.ColOrder, t.End)
	place := newPlace(t.Part, t.Power, t.Row, t.Col)
	for _, r := range []int{row, rowConstant} {
		for _, c := range []int{col, colConstant} {
			if r >= 0 && c >= 0 {
				a.add(&place, r, c, t.Scale)
			}
		}
	}
}

// endUnknown returns the unknown that is the value (order 0) or slope (order
// 1, C1 only) of a field at an end, and the constant where that has a value.
func (a *assembler) endUnknown(field, order, end int) (node, constant int) {
	s, c := &a.layout.spans[field], a.layout.Fields[field].Class
	if order > int(c) {
		panic(fmt.Sprintf("element: derivative %d of a field of class C%d at an end", order, int(c)))
	}
	perNode := 1 + int(c)
	node = s.index[order]
	if end == 1 {
		node = s.index[len(s.index)-s.local+perNode+order]
	}
	if order > 0 {
		return node, -1
	}
	return node, s.constant
}

// A place remembers which blocks the numbers of a term go to: the weighted
// constants of its row and column field lower the power of k by one each.
type place struct {
	part, power, row, col int
	block                 [3]int // by the number of weighted constants, -1 for not yet known
}

func newPlace(part, power, row, col int) place {
	return place{part, power, row, col, [3]int{-1, -1, -1}}
}

// add puts one number into its block. What is zero by construction, and may
// have a negative power of k, is left out.
func (a *assembler) add(at *place, row, col int, v float64) {
	if v == 0 {
		return
	}
	constants := 0
	if row == a.layout.spans[at.row].constant && a.layout.Fields[at.row].Weighted {
		constants++
	}
	if col == a.layout.spans[at.col].constant && a.layout.Fields[at.col].Weighted {
		constants++
	}
	i := at.block[constants]
	if i < 0 {
		i = a.find(at, at.power-constants)
		at.block[constants] = i
	}
	b := &a.blocks[i]
	b.Data[(row-b.Row)*b.Cols+col-b.Col] += v
}

// find returns the block of a power of k, and makes it if there is none.
func (a *assembler) find(at *place, power int) int {
	if power < 0 {
		panic(fmt.Sprintf("element: k^%d in the coupling of fields %d and %d", power, at.row, at.col))
	}
	key := blockKey{at.part, power, at.row, at.col}
	if i, ok := a.found[key]; ok {
		return i
	}
	rows, cols := &a.layout.spans[at.row], &a.layout.spans[at.col]
	a.found[key] = len(a.blocks)
	a.blocks = append(a.blocks, pencil.Block{
		Part: at.part, Power: power,
		Row: rows.offset, Rows: rows.count, Col: cols.offset, Cols: cols.count,
		Data: make([]float64, rows.count*cols.count),
	})
	return len(a.blocks) - 1
}
