package pencil

// A Direction is a variable of the function g.
type Direction int

// The variables of g.
const (
	AlongK Direction = iota
	AlongSigma
	AlongDrive
	directions = 3
)

// A Jet holds g and its derivatives at a point.
type Jet struct {
	G      complex128
	First  [directions]complex128
	Second [directions][directions]complex128
}

// jet evaluates g and its first derivatives at a point and, with curved set,
// its second ones. The drive is the index of the driving number that varies.
func (w *Workspace) jet(pt *Point, drive int, curved bool) *Jet {
	j := &w.derivative
	*j = Jet{}
	w.factor(pt)
	j.G = w.null()
	for a := range Direction(directions) {
		c, d := w.along(pt, drive, a)
		w.apply(w.dx[a], w.x, c, pt.K, d)
		j.First[a] = -w.product(w.dx[a])
	}
	if curved {
		w.curvature(pt, drive, j)
	}
	return j
}

// along returns the coefficients and the derivative in k that make ∂J in a
// direction.
func (w *Workspace) along(pt *Point, drive int, a Direction) (c [parts]complex128, d int) {
	switch a {
	case AlongK:
		return pt.coefficients(), 1
	case AlongSigma:
		c[Mass] = -1
	default:
		c[FirstDrive+drive] = 1
	}
	return c, 0
}

// curvature adds the second derivatives. On entry dx holds ∂J x.
func (w *Workspace) curvature(pt *Point, drive int, j *Jet) {
	for a := range w.dx { // ∂x solves J ∂x + b ∂g = -∂J x, cᵀ∂x = 0
		v := w.dx[a]
		for i := range v {
			v[i] = -v[i]
		}
		v[w.n-1] = 0
		if w.complex {
			v[2*w.n-1] = 0
		}
		w.solve(v)
	}
	for a := range Direction(directions) {
		ca, da := w.along(pt, drive, a)
		for b := range Direction(directions) {
			w.apply(w.work, w.dx[b], ca, pt.K, da)
			s := w.product(w.work)
			j.Second[a][b] -= s
			j.Second[b][a] -= s
		}
		if a == AlongK { // J has no second derivatives but with one in k
			w.apply(w.work, w.x, pt.coefficients(), pt.K, 2)
			j.Second[a][a] -= w.product(w.work)
			continue
		}
		w.apply(w.work, w.x, ca, pt.K, 1)
		s := w.product(w.work)
		j.Second[a][AlongK] -= s
		j.Second[AlongK][a] -= s
	}
}
