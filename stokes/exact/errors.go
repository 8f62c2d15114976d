package exact

import "errors"

// ErrRounding says that a solution exists but cannot be computed to nine
// digits, because contributions to it cancel or overflow. Parameters nearer to
// one another help, or other units after an overflow. Where the pressure alone
// balances the forces, as it does a force that is the same in all columns, there
// is no flow but only rounding errors, and this error.
var ErrRounding = errors.New("lost to rounding")
