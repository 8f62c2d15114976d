// Package uncertainty carries distributions of inputs through any calculation:
// quantiles of its results, the probability of a condition, and which input
// matters.
//
// Inputs are independent and have a distribution with a quantile function, such
// as those of gonum's distuv. The calculation is a function from numbers to
// numbers, so that anything will do, a formula, a law, a thermal history:
//
//	inputs := []uncertainty.Input{{"viscosity", uncertainty.LogUniform{Min: 1e20, Max: 1e22}}, ...}
//	e, err := uncertainty.Run(ctx, inputs, []string{"heat flux"}, f, &uncertainty.Settings{Samples: 10000, Seed: 1})
//	q, err := e.Quantile("heat flux", 0.84)
//	s, err := e.FirstOrder("heat flux")
//
// # Method
//
// Inputs are drawn by Latin hypercube sampling (McKay, Beckman & Conover 1979):
// each distribution is cut into as many slices of equal probability as there are
// samples, and each slice is used once. The design follows from the seed alone
// and results go to fixed places, so that an ensemble is the same to the bit
// whatever the number of workers.
//
// First-order sensitivity is the share of the variance of a result that knowing
// one input would remove, Var(E(Y|X))/Var(Y). [Ensemble.FirstOrder] estimates it
// from the ensemble itself by the ranks of the inputs (Gamboa, Gremaud, Klein &
// Lagnoux 2022); [Sobol] runs further samples, which is more accurate and gives
// the total share, interactions included (Saltelli et al. 2010; Jansen 1999).
//
// # Limits
//
// Inputs are independent; let the function combine them where they are not.
// Probabilities of events rarer than about ten in all samples are not resolved:
// their intervals say so.
package uncertainty
