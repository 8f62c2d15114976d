package heat

import "example.org/overturn/heat/internal/rows"

type implicit struct{}

func newImplicit(op *operator, workers int) *implicit { return &implicit{} }
func (im *implicit) forget()                          {}

func (st *Stepper) rosenbrock(t []float64, dt float64, rep *Report) error {
	_ = rows.Weights{}
	return nil
}
