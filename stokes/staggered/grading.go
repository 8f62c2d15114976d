package staggered

import (
	"fmt"
	"math"
)

// A Grading says how much finer the cells are at each wall than in the
// interior: 4 means a quarter of the width that they would have with no
// refinement near by. Zero and 1 both mean no refinement. Refining one wall
// leaves the others as they are, apart from the common factor that makes the
// cells fill the box.
type Grading struct {
	Left, Right, Bottom, Top float64
}

// MaxGrading is the largest refinement that [Graded] accepts. Beyond it the
// cells of a wall are so flat that a boundary-layer grid of one's own, given
// to [NewGrid], is the better choice.
const MaxGrading = 1000.0

// Graded returns a grid of nx by nz cells over the box 0 ≤ x ≤ width,
// 0 ≤ z ≤ height, refined towards the walls that gr names. The spacing is a
// smooth function of the cell number, a cubic at each wall, so that
// second-order schemes stay second order when nx and nz grow under one grading.
func Graded(nx, nz int, width, height float64, gr Grading) (*Grid, error) {
	if err := checkBox(nx, nz, width, height); err != nil {
		return nil, err
	}
	for _, r := range []struct {
		side  Side
		value *float64
	}{{Left, &gr.Left}, {Right, &gr.Right}, {Bottom, &gr.Bottom}, {Top, &gr.Top}} {
		if *r.value == 0 {
			*r.value = 1
		}
		if !(*r.value >= 1 && *r.value <= MaxGrading) {
			return nil, fmt.Errorf("staggered: grading of the %v wall is %v, want 0 or 1 to %v", r.side, *r.value, MaxGrading)
		}
	}
	return NewGrid(gradedNodes(nx, width, gr.Left, gr.Right), gradedNodes(nz, height, gr.Bottom, gr.Top))
}

// gradedNodes integrates the spacing
//
//	h(s) = 1 − (1−1/first)(1−s)³ − (1−1/last)s³,  0 ≤ s ≤ 1,
//
// which is positive since (1−s)³ + s³ ≤ 1, and scales it to the length.
func gradedNodes(n int, length, first, last float64) []float64 {
	if first == 1 && last == 1 {
		return equalNodes(n, length)
	}
	a, b := 1-1/first, 1-1/last
	position := func(s float64) float64 {
		return s - a*(1-math.Pow(1-s, 4))/4 - b*math.Pow(s, 4)/4
	}
	nodes := make([]float64, n+1)
	for i := range nodes {
		nodes[i] = length * position(float64(i)/float64(n)) / position(1)
	}
	nodes[n] = length
	return nodes
}
