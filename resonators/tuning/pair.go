package tuning

import (
	"math"
	"math/cmplx"
	"sort"

	"gonum.org/v1/gonum/mat"

	"stillroom/acoustics"
)

// Pair returns the oscillations of a mode coupled to an absorber, slowest decay
// first: the roots s = jω of
//
//	(s² + 2δ_n s + ω_n²)·(s² + 2δ_a s + ω_a²) + μ·ω_a²·s² = 0
//
// Each has its natural frequency |s|/2π and its decay −Re s. A root pair that no
// longer oscillates is given by its slower half, so that there are always two.
func Pair(mode, absorber acoustics.Oscillator, mu float64) [2]acoustics.Oscillator {
	roots := pairRoots(mode, absorber, mu)
	// Keep one of each conjugate pair; real roots stand for themselves.
	var out []acoustics.Oscillator
	var overdamped []float64
	scale := 2 * math.Pi * mode.Natural
	for _, s := range roots {
		switch {
		case math.Abs(imag(s)) < 1e-9*scale:
			overdamped = append(overdamped, -real(s))
		case imag(s) > 0:
			out = append(out, acoustics.Oscillator{Natural: cmplx.Abs(s) / (2 * math.Pi), Decay: -real(s)})
		}
	}
	sort.Float64s(overdamped)
	for i := 0; i+1 < len(overdamped); i += 2 {
		out = append(out, acoustics.Oscillator{
			Natural: overdamped[i] / (2 * math.Pi),
			Decay:   overdamped[i],
		})
	}
	sort.Slice(out, func(i, j int) bool { return out[i].Decay < out[j].Decay })
	return [2]acoustics.Oscillator{out[0], out[1]}
}

// pairRoots returns the four roots of the pair's polynomial, as eigenvalues of
// the matrix of motion.
func pairRoots(mode, absorber acoustics.Oscillator, mu float64) []complex128 {
	// In units of ω_n, with x'' = −2δ_n x' − ω_n² x − μ'·y', and
	// y'' = −2δ_a y' − ω_a² y + x': eliminating gives the product above with
	// μ' = μ·ω_a².
	var (
		w0 = 2 * math.Pi * mode.Natural
		wa = 2 * math.Pi * absorber.Natural / w0
		dn = mode.Decay / w0
		da = absorber.Decay / w0
		g  = math.Sqrt(mu) * wa
	)
	motion := mat.NewDense(4, 4, []float64{
		0, 1, 0, 0,
		-1, -2 * dn, 0, -g,
		0, 0, 0, 1,
		0, g, -wa * wa, -2 * da,
	})
	var e mat.Eigen
	if !e.Factorize(motion, mat.EigenNone) {
		panic("tuning: the eigenvalues of a pair of oscillators did not converge")
	}
	roots := e.Values(nil)
	for i := range roots {
		roots[i] *= complex(w0, 0)
	}
	return roots
}
