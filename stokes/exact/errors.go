package exact

import "errors"

// ErrRounding says that a solution exists but cannot be computed to nine
// digits, because contributions to it cancel or overflow. Parameters nearer to
// one another, or other units after an overflow, help.
var ErrRounding = errors.New("lost to rounding")
