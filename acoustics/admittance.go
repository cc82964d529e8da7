package acoustics

import (
	"math"
	"math/cmplx"
)

// The greatest random-incidence coefficient that a real, locally reacting
// impedance can have, and the impedance that has it: where dα/dζ = 0.
// Kuttruff, Room Acoustics, gives 0.951 at 1.567.
const (
	greatestDiffuse  = 0.951222013844418
	greatestAtZeta   = 1.566924169034845
	greatestAtBeta   = 1 / greatestAtZeta
	curvatureAtGreat = 1.03162006 // |d²α/dβ²| there, for a starting value
)

// DiffuseFromImpedance returns the random-incidence absorption coefficient of
// a locally reacting surface of real specific impedance ζ = Z/ρc ≥ 0,
//
//	α = (8/ζ)·[1 + 1/(1+ζ) − (2/ζ)·ln(1+ζ)]
//
// It is 0 for ζ = 0 and ζ = ∞ and has its maximum 0.951 at ζ = 1.567.
//
// Source: London, J. Acoust. Soc. Am. 22 (1950) 263; Kuttruff, Room Acoustics.
func DiffuseFromImpedance(zeta float64) float64 {
	switch {
	case zeta == 0 || math.IsInf(zeta, 1):
		return 0
	case zeta < 0.05:
		return softDiffuse(zeta)
	}
	return 8 / zeta * (1 + 1/(1+zeta) - 2/zeta*math.Log1p(zeta))
}

// softDiffuse is the power series of the same law, for small ζ, where the
// closed form loses its figures by cancellation:
//
//	α = 8·Σ_{k≥2} (−1)^k·ζ^(k−1)·(k−1)/(k+1)
func softDiffuse(zeta float64) float64 {
	var sum float64
	power := zeta // (−1)^k ζ^(k−1)
	for k := 2; k <= 16; k++ {
		sum += power * float64(k-1) / float64(k+1)
		power *= -zeta
	}
	return 8 * sum
}

// DiffuseFromComplexImpedance returns the random-incidence absorption
// coefficient of a locally reacting surface of complex specific impedance
// ζ = |ζ|·e^{jμ}, Re ζ ≥ 0,
//
//	α = (8·cos μ/|ζ|)·{1 + (cos 2μ/sin μ)/|ζ| · atan[|ζ| sin μ/(1 + |ζ| cos μ)]
//	    − (cos μ/|ζ|)·ln(1 + 2|ζ| cos μ + |ζ|²)}
//
// Below |ζ| of about 0.001 cancellation leaves some nine figures.
//
// Source: Kuttruff, Room Acoustics, on random incidence; London 1950.
func DiffuseFromComplexImpedance(zeta complex128) float64 {
	r, x := real(zeta), imag(zeta)
	z := cmplx.Abs(zeta)
	if math.Abs(x) < 1e-9*z {
		return DiffuseFromImpedance(r)
	}
	var (
		cosMu, sinMu = r / z, x / z
		cos2Mu       = cosMu*cosMu - sinMu*sinMu
		angle        = math.Atan2(x, 1+r)
	)
	return 8 * cosMu / z * (1 + cos2Mu/sinMu/z*angle - cosMu/z*math.Log1p(2*r+z*z))
}

// AdmittanceFromDiffuse returns the real specific admittance β = 1/ζ of the
// locally reacting surface whose random-incidence coefficient is α, on the
// stiff side ζ ≥ 1.567 of [DiffuseFromImpedance].
//
// For α → 0 it tends to α/8. No real impedance absorbs more than 0.951: α above
// that is taken as that. α ≤ 0 is a rigid surface.
func AdmittanceFromDiffuse(alpha float64) float64 {
	if alpha <= 0 {
		return 0
	}
	if alpha >= greatestDiffuse {
		return greatestAtBeta
	}
	// α(β) = 8β·[1 + β/(1+β) − 2β·ln(1 + 1/β)] rises and is concave up to its
	// maximum and lies below 8β, so Newton's steps from α/8 go up to the root
	// and never past it. Near the maximum the root is nearly double: there they
	// start from the parabola that touches the top.
	beta := alpha / 8
	if alpha > 0.8 {
		beta = max(beta, greatestAtBeta-math.Sqrt(2*(greatestDiffuse-alpha)/curvatureAtGreat))
	}
	for range 40 {
		var (
			u     = 1 + beta
			l     = 2 * math.Log1p(1/beta)
			value = 8 * beta * (1 + beta/u - beta*l)
			slope = 8 * (1 + beta*(2+beta)/(u*u) - 2*beta*l + 2*beta/u)
		)
		if slope <= 0 {
			return min(beta, greatestAtBeta)
		}
		step := (alpha - value) / slope
		beta = min(beta+step, greatestAtBeta)
		// Where α is steep a step squares the error.
		if off := math.Abs(step); off <= 1e-14*beta || off <= 1e-8*beta && slope > 1 {
			break
		}
	}
	return beta
}
