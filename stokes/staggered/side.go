package staggered

import "fmt"

// A Side is one of the four walls of the box.
type Side int

// The four sides.
const (
	Left Side = iota
	Right
	Bottom
	Top
)

// Sides lists the four sides in the order Left, Right, Bottom, Top.
func Sides() [4]Side { return [4]Side{Left, Right, Bottom, Top} }

// String returns the name of the side in lower case.
func (s Side) String() string {
	switch s {
	case Left:
		return "left"
	case Right:
		return "right"
	case Bottom:
		return "bottom"
	case Top:
		return "top"
	}
	return fmt.Sprintf("Side(%d)", int(s))
}

// Horizontal reports whether the wall runs along x, as Bottom and Top do.
func (s Side) Horizontal() bool { return s == Bottom || s == Top }
