package acoustics

import "math/cmplx"

// luMatrix is a square complex matrix and, once factored, its LU factors with
// partial pivoting.
type luMatrix struct {
	n     int
	a     []complex128 // row by row
	pivot []int
}

func newLU(n int) *luMatrix {
	return &luMatrix{n: n, a: make([]complex128, n*n), pivot: make([]int, n)}
}

// factor replaces the matrix by its factors. A zero pivot, which only an exactly
// singular matrix has, is left and makes solutions infinite.
func (m *luMatrix) factor() {
	n := m.n
	for k := range n {
		p, best := k, cmplx.Abs(m.a[k*n+k])
		for i := k + 1; i < n; i++ {
			if v := cmplx.Abs(m.a[i*n+k]); v > best {
				p, best = i, v
			}
		}
		m.pivot[k] = p
		if p != k {
			for j := range n {
				m.a[k*n+j], m.a[p*n+j] = m.a[p*n+j], m.a[k*n+j]
			}
		}
		inv := 1 / m.a[k*n+k]
		row := m.a[k*n+k+1 : k*n+n]
		for i := k + 1; i < n; i++ {
			l := m.a[i*n+k] * inv
			m.a[i*n+k] = l
			if l == 0 {
				continue
			}
			to := m.a[i*n+k+1 : i*n+n]
			for j, v := range row {
				to[j] -= l * v
			}
		}
	}
}

// solve replaces b by the solution of the factored system.
func (m *luMatrix) solve(b []complex128) {
	n := m.n
	for k := range n {
		if p := m.pivot[k]; p != k {
			b[k], b[p] = b[p], b[k]
		}
	}
	for i := range n {
		v := b[i]
		for j, l := range m.a[i*n : i*n+i] {
			v -= l * b[j]
		}
		b[i] = v
	}
	for i := n - 1; i >= 0; i-- {
		v := b[i]
		for j := i + 1; j < n; j++ {
			v -= m.a[i*n+j] * b[j]
		}
		b[i] = v / m.a[i*n+i]
	}
}

// logDet returns the logarithm of the factored matrix's determinant, its
// imaginary part modulo 2π.
func (m *luMatrix) logDet() complex128 {
	var sum complex128
	for k := range m.n {
		v := m.a[k*m.n+k]
		if m.pivot[k] != k {
			v = -v
		}
		sum += cmplx.Log(v)
	}
	return sum
}
