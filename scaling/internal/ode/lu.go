package ode

import "math"

// decompose replaces the n×n matrix a by its triangular factors, with the row
// exchanges in perm. Our systems have at most some twenty rows, for which a
// library's blocked factorisation spends its time on allocation.
func decompose(a []float64, perm []int, n int) {
	for k := range n {
		pivot := k
		for i := k + 1; i < n; i++ {
			if math.Abs(a[i*n+k]) > math.Abs(a[pivot*n+k]) {
				pivot = i
			}
		}
		perm[k] = pivot
		if pivot != k {
			for j := range n {
				a[k*n+j], a[pivot*n+j] = a[pivot*n+j], a[k*n+j]
			}
		}
		top := a[k*n : k*n+n]
		inverse := 1 / top[k]
		for i := k + 1; i < n; i++ {
			row := a[i*n : i*n+n]
			row[k] *= inverse
			l := row[k]
			for j := k + 1; j < n; j++ {
				row[j] -= l * top[j]
			}
		}
	}
}

// substitute solves for b in place with the factors of decompose.
func substitute(a []float64, perm []int, b []float64, n int) {
	for k, p := range perm[:n] {
		b[k], b[p] = b[p], b[k]
	}
	for i := range n {
		row := a[i*n : i*n+n]
		sum := b[i]
		for j := range i {
			sum -= row[j] * b[j]
		}
		b[i] = sum
	}
	for i := n - 1; i >= 0; i-- {
		row := a[i*n : i*n+n]
		sum := b[i]
		for j := i + 1; j < n; j++ {
			sum -= row[j] * b[j]
		}
		b[i] = sum / row[i]
	}
}
