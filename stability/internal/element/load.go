package element

// Points calls f with every Gauss point of the mesh, at least so many to an
// element, and its weight, from left to right: Σ w g(z) is the integral of g.
func (l *Layout) Points(perElement int, f func(z, w float64)) {
	ref := referenceOf(l.Degree, perElement)
	for e := range len(l.Nodes) - 1 {
		a, h := l.Nodes[e], (l.Nodes[e+1]-l.Nodes[e])/2
		for q, x := range ref.x {
			f(a+h*(1+x), h*ref.w[q])
		}
	}
}

// Load adds ∫ f Dᵒʳᵈᵉʳ(v) dz, for every test function v of a field, to dst.
func (l *Layout) Load(dst []float64, field, order, perElement int, f func(z float64) float64) {
	ref := referenceOf(l.Degree, perElement)
	s, c := &l.spans[field], l.Fields[field].Class
	values := ref.value[c][order]
	for e := range len(l.Nodes) - 1 {
		a, h := l.Nodes[e], (l.Nodes[e+1]-l.Nodes[e])/2
		for q, x := range ref.x {
			g := f(a+h*(1+x)) * ref.w[q] * h
			for range order {
				g /= h
			}
			for i, unknown := range s.index[e*s.local : (e+1)*s.local] {
				if unknown >= 0 {
					dst[unknown] += g * values[i*len(ref.x)+q] * localScale(c, i, h)
				}
			}
		}
	}
}
