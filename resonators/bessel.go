package resonators

import (
	"math"
	"math/cmplx"
)

// Bessel functions enter a round hole only through one ratio, an even
// function of the argument, so that it needs x² alone and has no branch.

const (
	// hankelFrom is the |x| from which Hankel's asymptotic series is used;
	// its smallest term there is below 1e-16.
	hankelFrom = 25
	// hankelDepth is the |Im x| that makes the neglected wave, relatively
	// exp(−2|Im x|), vanish in double precision.
	hankelDepth = 17
)

// besselRatio returns
//
//	J2(x)/(x²·J0(x)) = −[1 − 2J1(x)/(x·J0(x))]/x²
//
// for y = x². It is 1/8 at y = 0 and has its poles at the zeros of J0, on the
// positive real axis of y.
//
// The ratios of neighbouring orders come from the continued fraction
// J_n/J_{n−1} = 1/(2n/x − J_{n+1}/J_n), evaluated backwards, and far out from
// Hankel's asymptotic series.
//
// Source: Olver et al., NIST Handbook of Mathematical Functions, 2010,
// eqs 10.10.1 and 10.17.5.
func besselRatio(y complex128) complex128 {
	r := math.Sqrt(cmplx.Abs(y))
	if r > hankelFrom {
		x := cmplx.Sqrt(y)
		if imag(x) > 0 {
			x = -x
		}
		if imag(x) < -hankelDepth {
			return (2*hankelQuotient(x)/x - 1) / y
		}
	}
	// q_n = J_n/(x·J_{n−1}) = 1/(2n − y·q_{n+1}), carried as q = a/b; the tail
	// left out dies as (r/2n)^2n. Only the quotient counts, so that both are
	// scaled down before they overflow.
	var a, b complex128 = 0, 1
	for n := 20 + int(1.2*r); n > 1; n-- {
		a, b = b, complex(float64(2*n), 0)*b-y*a
		if math.Abs(real(b)) > 1e100 || math.Abs(imag(b)) > 1e100 {
			a, b = a*1e-100, b*1e-100
		}
	}
	// q_2 = a/b and q_1 = b/(2b − y·a), so their product is:
	return a / (2*b - y*a)
}

// hankelQuotient returns J1(x)/J0(x) for large |x| deep in the lower half
// plane, where J is half the Hankel function of the first kind:
//
//	H_ν(x) ~ √(2/πx)·exp(j(x − νπ/2 − π/4))·Σ j^k·a_k(ν)/x^k
//	a_k(ν) = (4ν²−1²)(4ν²−3²)…(4ν²−(2k−1)²)/(k!·8^k)
func hankelQuotient(x complex128) complex128 {
	sum := func(nu2 float64) complex128 {
		s, term := complex128(1), complex128(1)
		for k := 1.0; k < 30; k++ {
			term *= complex(0, (nu2-sq(2*k-1))/(8*k)) / x
			s += term
			if cmplx.Abs(term) < 1e-17 {
				break
			}
		}
		return s
	}
	return -1i * sum(4) / sum(0)
}
