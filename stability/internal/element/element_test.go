package element

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stability/internal/pencil"
)

// assemble returns the dense matrix of an operator at a wavenumber, for part Base.
func assemble(l *Layout, op *Operator, k float64) [][]float64 {
	a := make([][]float64, l.Size())
	for i := range a {
		a[i] = make([]float64, l.Size())
	}
	for _, b := range Assemble(l, op) {
		for i := range b.Rows {
			for j := range b.Cols {
				a[b.Row+i][b.Col+j] += b.Data[i*b.Cols+j] * math.Pow(k, float64(b.Power))
			}
		}
	}
	return a
}

var meshes = map[string][]float64{
	"one element": {0, 1}, "three elements": {0, 0.2, 0.65, 1}, "not from 0 to 1": {-1, 0.5, 3},
}

// field interpolates nothing: it solves for the coefficients of a polynomial by
// least squares in the mean, which is exact for polynomials of the space.
func project(t *testing.T, l *Layout, f func(z float64) float64) []float64 {
	t.Helper()
	op := &Operator{Terms: []Term{{Scale: 1}}, Coefficients: make([]func(float64) float64, 1), Excess: 2}
	load := make([]float64, l.Size())
	l.Load(load, 0, 0, l.Degree+4, f)
	w := pencil.NewWorkspace(pencil.New(l.Size(), Assemble(l, op)))
	x, err := w.SolveLinear(pencil.Point{K: 1}, load)
	require.NoError(t, err)
	return x
}

func TestPolynomialsOfTheDegreeAreExact(t *testing.T) {
	const degree = 7
	f := func(z float64) float64 { return math.Pow(z, degree) - 2*z*z + 1 }
	f1 := func(z float64) float64 { return degree*math.Pow(z, degree-1) - 4*z }
	f2 := func(z float64) float64 { return degree*(degree-1)*math.Pow(z, degree-2) - 4 }
	for name, nodes := range meshes {
		for _, field := range []Field{{Class: C0}, {Class: C1}, {Class: C0, Constant: true}} {
			l := NewLayout(nodes, degree, []Field{field})
			x := project(t, l, f)
			scale := math.Abs(f(nodes[len(nodes)-1])) + 1
			for i := range 31 {
				z := nodes[0] + (nodes[len(nodes)-1]-nodes[0])*float64(i)/30
				assert.InDelta(t, f(z), l.Value(0, 0, x, z), 1e-11*scale, "%s, %v, value at %g", name, field, z)
				assert.InDelta(t, f1(z), l.Value(0, 1, x, z), 1e-9*scale, "%s, %v, slope at %g", name, field, z)
				assert.InDelta(t, f2(z), l.Value(0, 2, x, z), 1e-7*scale, "%s, %v, curvature at %g", name, field, z)
			}
		}
	}
}

// Bubbles are orthonormal, up to the length of the element, in the products
// that they were made for.
func TestBubblesAreOrthonormal(t *testing.T) {
	const degree = 12
	for _, c := range []Class{C0, C1} {
		l := NewLayout([]float64{-1, 1}, degree, []Field{{Class: c, Fixed: [2]int{1 + int(c), 1 + int(c)}}})
		order := 1 + int(c)
		op := &Operator{
			Terms:        []Term{{RowOrder: order, ColOrder: order, Scale: 1}},
			Coefficients: make([]func(float64) float64, 1), Excess: 1,
		}
		for i, row := range assemble(l, op, 1) {
			for j, v := range row {
				want := 0.0
				if i == j {
					want = 1
				}
				assert.InDelta(t, want, v, 1e-13, "class C%d, element %d, %d", c, i, j)
			}
		}
	}
}

func TestFixedEnds(t *testing.T) {
	for _, field := range []Field{
		{Class: C0, Fixed: [2]int{1, 0}}, {Class: C0, Fixed: [2]int{0, 1}}, {Class: C1, Fixed: [2]int{2, 1}},
		{Class: C1, Fixed: [2]int{1, 2}}, {Class: C1, Fixed: [2]int{0, 0}},
	} {
		l := NewLayout([]float64{0, 0.3, 1}, 6, []Field{field})
		x := make([]float64, l.Size())
		for i := range x {
			x[i] = 1 + float64(i)
		}
		for end, z := range []float64{0, 1} {
			for order := range 1 + int(field.Class) {
				v := l.Value(0, order, x, z)
				if order < field.Fixed[end] {
					assert.InDelta(t, 0, v, 1e-12, "%v: derivative %d at %g", field, order, z)
				} else {
					assert.Greater(t, math.Abs(v), 0.1, "%v: derivative %d at %g", field, order, z)
				}
			}
		}
	}
}

// Whatever the coefficients, a field is as smooth at the nodes as its class says.
func TestContinuity(t *testing.T) {
	const h = 1e-9
	for _, c := range []Class{C0, C1} {
		l := NewLayout([]float64{0, 0.3, 1}, 6, []Field{{Class: c}})
		x := make([]float64, l.Size())
		for i := range x {
			x[i] = math.Sin(float64(i + 1))
		}
		for order := range 3 {
			jump := math.Abs(l.Value(0, order, x, 0.3+h) - l.Value(0, order, x, 0.3-h))
			assert.Equal(t, order <= int(c), jump < 1e-6, "class C%d: derivative %d jumps by %g", c, order, jump)
		}
	}
}

func TestEndTerms(t *testing.T) {
	l := NewLayout([]float64{0, 0.4, 1}, 5, []Field{{Class: C1}, {Class: C0, Constant: true}})
	op := &Operator{Coefficients: make([]func(float64) float64, 1), Excess: 1}
	op.Ends = []EndTerm{{Row: 0, Col: 1, RowOrder: 1, End: 1, Scale: 3, Power: 2}, {Row: 1, Col: 1, End: 0, Scale: 5}}
	a := assemble(l, op, 2)
	v, u := make([]float64, l.Size()), make([]float64, l.Size())
	for i := range v {
		v[i], u[i] = math.Cos(float64(i)), math.Sin(float64(3*i+1))
	}
	got := 0.0
	for i := range v {
		for j := range u {
			got += v[i] * a[i][j] * u[j]
		}
	}
	want := 12*l.Value(0, 1, v, 1)*l.Value(1, 0, u, 1) + 5*l.Value(1, 0, v, 0)*l.Value(1, 0, u, 0)
	assert.InDelta(t, want, got, 1e-12)
}

// A weighted constant takes a power of k out of its row and its column.
func TestWeightedConstant(t *testing.T) {
	plain := NewLayout([]float64{0, 0.4, 1}, 5, []Field{{Class: C0, Constant: true}})
	weighted := NewLayout(plain.Nodes, 5, []Field{{Class: C0, Constant: true, Weighted: true}})
	op := &Operator{
		Terms:        []Term{{RowOrder: 1, ColOrder: 1, Scale: 1}, {Power: 2, Scale: 1}},
		Coefficients: make([]func(float64) float64, 1), Excess: 2,
	}
	const k = 0.3
	a, b := assemble(plain, op, k), assemble(weighted, op, k)
	c := plain.Constant(0)
	require.GreaterOrEqual(t, c, 0)
	for i := range a {
		for j := range a[i] {
			weight := 1.0
			if i == c {
				weight /= k
			}
			if j == c {
				weight /= k
			}
			assert.InDelta(t, a[i][j]*weight, b[i][j], 1e-13)
		}
	}
	at0 := assemble(weighted, op, 0)
	assert.InDelta(t, 1, at0[c][c], 1e-14, "regular at k = 0")
	assert.Equal(t, -1, NewLayout(plain.Nodes, 5, []Field{{Class: C0}}).Constant(0))
}

func TestSpansAndNodeValues(t *testing.T) {
	l := NewLayout([]float64{0, 0.4, 1}, 5, []Field{{Class: C1, Fixed: [2]int{2, 1}}, {Class: C0, Fixed: [2]int{1, 1}}})
	flow, heat := l.spans[0], l.spans[1]
	assert.Equal(t, 0, flow.offset)
	assert.Equal(t, flow.count, heat.offset)
	assert.Equal(t, l.Size(), heat.offset+heat.count)
	assert.Equal(t, 3*2-3+2*2, flow.count) // nodes, fixed ends, bubbles
	assert.Equal(t, 3-2+2*4, heat.count)
	x := make([]float64, l.Size())
	x[l.NodeValue(0, 1)] = 2.5
	assert.InDelta(t, 2.5, l.Value(0, 0, x, 0.4), 1e-14)
	assert.Equal(t, -1, l.NodeValue(0, 0))
	assert.Equal(t, -1, l.NodeValue(0, 2))
}

func TestPointsIntegrate(t *testing.T) {
	l := NewLayout([]float64{0, 0.4, 2}, 5, []Field{{}})
	sum, last := 0.0, 0.0
	l.Points(6, func(z, w float64) {
		assert.Greater(t, z, last)
		last = z
		sum += w * math.Pow(z, 9)
	})
	assert.InEpsilon(t, 102.4, sum, 1e-13)
}

// The eigenvalues of -u″ = λu converge with the order 2p of the elements, those
// of a clamped beam with the order 2(p-1).
func TestOrderOfConvergence(t *testing.T) {
	const p = 4
	tests := []struct {
		name  string
		field Field
		order int // of the derivatives
		exact float64
		want  float64
	}{
		{"string", Field{Class: C0, Fixed: [2]int{1, 1}}, 1, math.Pi * math.Pi, 2 * p},
		{"beam", Field{Class: C1, Fixed: [2]int{2, 2}}, 2, math.Pow(4.730040744862704, 4), 2 * (p - 1)},
	}
	for _, tt := range tests {
		last := math.NaN()
		for _, elements := range []int{4, 8, 16} {
			nodes := make([]float64, elements+1)
			for i := range nodes {
				nodes[i] = float64(i) / float64(elements)
			}
			l := NewLayout(nodes, p, []Field{tt.field})
			op := &Operator{
				Terms: []Term{
					{RowOrder: tt.order, ColOrder: tt.order, Scale: 1}, {Part: pencil.Mass, Scale: -1},
				},
				Coefficients: make([]func(float64) float64, 1), Excess: 2,
			}
			w := pencil.NewWorkspace(pencil.New(l.Size(), Assemble(l, op)))
			rates, err := w.GrowthEigenvalues(pencil.Point{K: 1, Sigma: 1})
			require.NoError(t, err)
			e := -real(rates[0]) - tt.exact
			require.Positive(t, e, "%s: a Galerkin eigenvalue is too large", tt.name)
			if order := math.Log2(last / e); !math.IsNaN(last) {
				assert.InDelta(t, tt.want, order, 0.3, "%s with %d elements", tt.name, elements)
			}
			last = e
		}
	}
}

// A coefficient that varies, and one that jumps at a node, are integrated.
func TestCoefficients(t *testing.T) {
	l := NewLayout([]float64{0, 0.5, 1}, 6, []Field{{Class: C0}})
	op := &Operator{
		Terms: []Term{{Coefficient: 1, Scale: 2}, {Coefficient: 2, Scale: 1}},
		Coefficients: []func(float64) float64{nil, func(z float64) float64 { return z * z }, func(z float64) float64 {
			if z < 0.5 {
				return 1
			}
			return 10
		}},
		Excess: 3,
	}
	one := project(t, l, func(float64) float64 { return 1 })
	sum := 0.0
	for i, row := range assemble(l, op, 1) {
		for j, v := range row {
			sum += one[i] * v * one[j]
		}
	}
	assert.InEpsilon(t, 2.0/3+5.5, sum, 1e-12)
}

func TestTailShowsDecay(t *testing.T) {
	l := NewLayout([]float64{0, 0.5, 1}, 14, []Field{{Class: C0}})
	tails := make([]float64, 2)
	l.Tail(tails, project(t, l, math.Exp))
	assert.Less(t, max(tails[0], tails[1]), 1e-12)
	l.Tail(tails, project(t, l, func(z float64) float64 { return 1 / (1.02 - z) }))
	assert.Greater(t, tails[1], 1e-2, "a singularity close to the second element")
	assert.Greater(t, tails[1], 20*tails[0])
	l.Tail(tails, make([]float64, l.Size()))
	assert.Equal(t, []float64{0, 0}, tails)
}

func TestReferencesAreShared(t *testing.T) {
	assert.Same(t, referenceOf(9, 12), referenceOf(9, 12))
	assert.NotSame(t, referenceOf(9, 12), referenceOf(9, 13))
}

func BenchmarkAssemble(b *testing.B) {
	l := NewLayout([]float64{0, 1}, 14, []Field{{Class: C1, Fixed: [2]int{2, 2}}, {Class: C0, Fixed: [2]int{1, 1}}})
	op := &Operator{
		Terms: []Term{
			{RowOrder: 2, ColOrder: 2, Scale: 1}, {Power: 2, RowOrder: 1, ColOrder: 1, Scale: 2}, {Power: 4, Scale: 1},
			{Row: 1, Col: 1, RowOrder: 1, ColOrder: 1, Scale: 1}, {Row: 1, Col: 1, Power: 2, Scale: 1}, {Row: 1, Scale: -1},
		},
		Coefficients: make([]func(float64) float64, 1), Excess: 2,
	}
	b.ReportAllocs()
	for b.Loop() {
		Assemble(l, op)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*l.Size()*l.Size()), "ns/entry")
}
