package scaling

import (
	"fmt"
	"math"
	"slices"

	"example.org/overturn/scaling/internal/check"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
)

// design is a linear least-squares problem in logarithms about their mean.
type design struct {
	x        [][]float64 // one column a group, centred
	y        []float64
	weight   []float64 // 1/error
	weighted bool
	centre   []float64
}

func newDesign(runs []Run, groups []Group) (*design, error) {
	d := &design{y: make([]float64, len(runs)), weight: make([]float64, len(runs))}
	given := 0
	for i, r := range runs {
		where := fmt.Sprintf("run %d: ", i)
		err := check.First(check.Positive(pkg, where+"value", r.Value), check.NotNegative(pkg, where+"relative error", r.RelativeError))
		if err != nil {
			return nil, err
		}
		d.y[i], d.weight[i] = math.Log(r.Value), 1
		if r.RelativeError > 0 {
			given++
			d.weight[i] = 1 / r.RelativeError
		}
	}
	if d.weighted = given > 0; d.weighted && given < len(runs) {
		return nil, &FieldError{Package: string(pkg), Field: "runs with a relative error", Value: fmt.Sprint(given), Want: fmt.Sprintf("0 or all %d", len(runs))}
	}
	for _, g := range groups {
		column := make([]float64, len(runs))
		for i, r := range runs {
			if err := check.Positive(pkg, fmt.Sprintf("run %d: %v", i, g), g.Of(r.Groups)); err != nil {
				return nil, err
			}
			column[i] = math.Log(g.Of(r.Groups))
		}
		mean := stat.Mean(column, nil)
		for i := range column {
			column[i] -= mean
		}
		d.x, d.centre = append(d.x, column), append(d.centre, mean)
	}
	return d, nil
}

// regression is the solution of a design: the value at the centre, then the
// slopes.
type regression struct {
	solution   []float64
	covariance *mat.SymDense
	scatter    float64
}

// maxCondition is the condition number of a design above which its groups do
// not vary independently.
const maxCondition = 1e8

func (d *design) solve() (regression, error) {
	rows, cols := len(d.y), len(d.x)+1
	a, b := mat.NewDense(rows, cols, nil), mat.NewVecDense(rows, nil)
	for i, w := range d.weight {
		a.Set(i, 0, w)
		for j, column := range d.x {
			a.Set(i, j+1, w*column[i])
		}
		b.SetVec(i, w*d.y[i])
	}
	var qr mat.QR
	qr.Factorize(a)
	if c := qr.Cond(); !(c < maxCondition) {
		return regression{}, &FieldError{Package: string(pkg), Field: "groups of the runs", Value: fmt.Sprintf("of condition %.1e", c), Want: "groups that vary, and independently"}
	}
	var solution mat.VecDense
	if err := qr.SolveVecTo(&solution, false, b); err != nil {
		return regression{}, fmt.Errorf("scaling: least squares: %w", err)
	}
	var residual mat.VecDense
	residual.MulVec(a, &solution)
	residual.SubVec(b, &residual)
	scatter := mat.Norm(&residual, 2) / math.Sqrt(float64(rows-cols))

	var gram mat.SymDense
	gram.SymOuterK(1, a.T())
	var chol mat.Cholesky
	if !chol.Factorize(&gram) {
		return regression{}, fmt.Errorf("scaling: least squares: the groups of the runs are dependent")
	}
	covariance := mat.NewSymDense(cols, nil)
	if err := chol.InverseTo(covariance); err != nil {
		return regression{}, fmt.Errorf("scaling: least squares: %w", err)
	}
	covariance.ScaleSym(scatter*scatter, covariance)
	return regression{solution.RawVector().Data, covariance, scatter}, nil
}

// roundOff is a change of a logarithm that arithmetic alone may cause.
const roundOff = 1e-11

// curvature tests one added square at a time.
func (d *design) curvature(groups []Group, level float64) []Curvature {
	dof := len(d.y) - len(groups) - 2
	if dof < 1 {
		return nil
	}
	var out []Curvature
	for j, g := range groups {
		square := make([]float64, len(d.y))
		for i, x := range d.x[j] {
			square[i] = x * x
		}
		wider := *d
		wider.x = append(append([][]float64(nil), d.x...), square)
		r, err := wider.solve()
		if err != nil {
			return nil // two values of the group show no curvature
		}
		last := len(groups) + 1
		c := interval(r.solution[last], math.Sqrt(r.covariance.At(last, last)), studentQuantile(level, dof))
		p := 0.0
		if within := slices.Max(square) * math.Abs(c.Value); within < roundOff {
			p = 1 // the last digits of a law that is exact
		} else if c.StandardError > 0 {
			p = 2 * distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(dof)}.Survival(math.Abs(c.Value)/c.StandardError)
		}
		out = append(out, Curvature{Group: g, Coefficient: c, P: p})
	}
	return out
}
