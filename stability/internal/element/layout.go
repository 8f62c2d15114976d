package element

import "sort"

// A Field is one unknown function.
type Field struct {
	Class Class

	// Fixed counts the conditions imposed at the left and at the right end:
	// 0 none, 1 the value is zero, 2 the slope is zero too (C1 only).
	Fixed [2]int

	// Constant makes the constant function one of the basis: the choice for
	// a C0 field without fixed values, whose constant part is (nearly) in the
	// null space of its operator and would be lost among differences.
	Constant bool

	// Weighted multiplies the constant with 1/k. An operator that is singular
	// at k = 0 then keeps a regular matrix in the limit k → 0.
	Weighted bool
}

// A Layout numbers the unknowns of several fields on a mesh. It is immutable
// and safe for concurrent use.
type Layout struct {
	Nodes  []float64 // increasing, at least two
	Degree int       // of the polynomials, at least 4
	Fields []Field
	spans  []span
	size   int
}

// A span is the place of one field among the unknowns.
type span struct {
	offset, count int
	local         int   // functions of an element
	index         []int // [element*local+function], -1 for one left out
	constant      int   // unknown that is the constant, -1 for none
}

// NewLayout numbers the unknowns.
func NewLayout(nodes []float64, degree int, fields []Field) *Layout {
	l := &Layout{Nodes: nodes, Degree: degree, Fields: fields, spans: make([]span, len(fields))}
	for i, f := range fields {
		l.spans[i] = newSpan(f, len(nodes)-1, degree, l.size)
		l.size += l.spans[i].count
	}
	return l
}

// Size returns the number of unknowns.
func (l *Layout) Size() int { return l.size }

func newSpan(f Field, elements, p, offset int) span {
	s := span{offset: offset, local: localCount(f.Class, p), constant: -1}
	s.index = make([]int, elements*s.local)
	for i := range s.index {
		s.index[i] = -1
	}
	if f.Constant {
		s.constant = s.next()
		for e := range elements {
			s.index[e*s.local+p+1] = s.constant
		}
	}
	perNode := 1 + int(f.Class)
	for node := range elements + 1 {
		for d := range perNode {
			if s.leftOut(f, node, elements, d) {
				continue
			}
			unknown := s.next()
			if node > 0 {
				s.index[(node-1)*s.local+perNode+d] = unknown
			}
			if node < elements {
				s.index[node*s.local+d] = unknown
			}
		}
	}
	for e := range elements {
		for n := 2 * perNode; n <= p; n++ {
			s.index[e*s.local+n] = s.next()
		}
	}
	return s
}

func (s *span) next() int {
	s.count++
	return s.offset + s.count - 1
}

// leftOut reports whether the d-th function of a node is fixed at zero. The
// constant takes the place of the first node's value.
func (s *span) leftOut(f Field, node, last, d int) bool {
	switch node {
	case 0:
		return d < f.Fixed[0] || f.Constant
	case last:
		return d < f.Fixed[1]
	}
	return false
}

// Constant returns the unknown that multiplies the constant function of a
// field, -1 for none.
func (l *Layout) Constant(field int) int { return l.spans[field].constant }

// localScale is what a local function is multiplied with on an element of
// half length h: slopes are slopes in z.
func localScale(c Class, function int, h float64) float64 {
	if c == C1 && (function == 1 || function == 3) {
		return h
	}
	return 1
}

// Find returns the element that holds z, the nearest one for z outside.
func (l *Layout) Find(z float64) int {
	inner := l.Nodes[1 : len(l.Nodes)-1]
	return sort.SearchFloat64s(inner, z)
}

// Value returns the derivative of the given order, 0 to 2, of a field at z.
// The coefficients are those of all fields.
func (l *Layout) Value(field, order int, coefficients []float64, z float64) float64 {
	var functions [64]float64
	var legendre [64]float64
	p, s, c := l.Degree, &l.spans[field], l.Fields[field].Class
	e := l.Find(z)
	a, h := l.Nodes[e], (l.Nodes[e+1]-l.Nodes[e])/2
	x := (z-a)/h - 1
	localFunctions(functions[:], legendre[:p+1], c, order, p, x)
	sum := 0.0
	for i, unknown := range s.index[e*s.local : (e+1)*s.local] {
		if unknown >= 0 {
			sum += coefficients[unknown] * functions[i] * localScale(c, i, h)
		}
	}
	for range order {
		sum /= h
	}
	return sum
}

// NodeValue returns the unknown that is the value of a field at a node, -1 if
// it is fixed.
func (l *Layout) NodeValue(field, node int) int {
	s := &l.spans[field]
	if node < len(l.Nodes)-1 {
		return s.index[node*s.local]
	}
	return s.index[(node-1)*s.local+1+int(l.Fields[field].Class)]
}

// significant is the size, relative to the largest field, below which the
// coefficients of a field are not judged by themselves: they may be round-off.
const significant = 1e-4

// Tail measures on each element how far the coefficients have decayed: the
// largest of the last two bubbles of any field, relative to the largest
// coefficient of that field anywhere. It writes into dst, one number an element.
// The coefficients should be scaled so that those of all fields are comparable.
func (l *Layout) Tail(dst, coefficients []float64) {
	clear(dst)
	overall := largest(coefficients[:l.size])
	if overall == 0 {
		return
	}
	for f := range l.Fields {
		s := &l.spans[f]
		size := max(largest(coefficients[s.offset:s.offset+s.count]), significant*overall)
		for e := range dst {
			for n := l.Degree - 1; n <= l.Degree; n++ {
				v := coefficients[s.index[e*s.local+n]]
				dst[e] = max(dst[e], v/size, -v/size)
			}
		}
	}
}

func largest(v []float64) float64 {
	m := 0.0
	for _, x := range v {
		m = max(m, x, -x)
	}
	return m
}
