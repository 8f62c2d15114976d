package exact

import (
	"fmt"
	"math"
)

// A check keeps the first parameter of a problem that makes no sense.
type check struct {
	problem string
	err     error
}

func (c *check) require(ok bool, name string, value any, want string) {
	if !ok && c.err == nil {
		c.err = fmt.Errorf("exact: %s.%s is %v, want %s", c.problem, name, value, want)
	}
}

func (c *check) finite(name string, v float64) {
	c.require(isFinite(v), name, v, "a finite number")
}

func (c *check) positive(name string, v float64) {
	c.require(isFinite(v) && v > 0, name, v, "> 0 and finite")
}

func (c *check) notNegative(name string, v float64) {
	c.require(isFinite(v) && v >= 0, name, v, ">= 0 and finite")
}

func (c *check) notZero(name string, v float64) {
	c.require(isFinite(v) && v != 0, name, v, "not 0 and finite")
}

// ratio checks two positive numbers whose ratio must be one too.
func (c *check) ratio(name string, v, base float64) {
	c.positive(name, v)
	q := v / base
	c.require(isFinite(q) && q > 0, name, v, "a number whose ratio to the other viscosity neither overflows nor vanishes")
}

// wall checks one that must be free slip or no slip.
func (c *check) wall(name string, w Wall) {
	c.require(w == FreeSlip || w == NoSlip, name, w, "FreeSlip or NoSlip")
}

func isFinite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
