package dissect

import "gonum.org/v1/gonum/blas"

// Short names for the options of the dense kernels.
const (
	left         = blas.Left
	right        = blas.Right
	noTrans      = blas.NoTrans
	upperHalf    = blas.Upper
	lowerHalf    = blas.Lower
	unitDiagonal = blas.Unit
	anyDiagonal  = blas.NonUnit
)
