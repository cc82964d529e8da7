package resonators

import (
	"math"
	"math/cmplx"

	"stillroom/acoustics"
)

// roundPore returns the impedance of a round hole per length, Pa·s/m²,
//
//	Z_pore = jωρ/[1 − (2/(s√−j))·J1(s√−j)/J0(s√−j)],  s = a·√(ωρ/η)
//
// with the radius a in m: pressure gradient over mean velocity.
//
// Limits: 8η/a² + jωρ·4/3 for s → 0, jωρ + (1+j)·√(2ωρη)/a for s → ∞.
//
// Source: Zwikker & Kosten, Sound Absorbing Materials, 1949; Stinson, JASA 89
// (1991) 550.
func roundPore(omega complex128, radius float64, air acoustics.Air) complex128 {
	// With x² = −jωρa²/η the bracket is −x²·J2/(x²J0)(x²), and x² cancels.
	y := complex(0, -1) * omega * complex(air.Density*sq(radius)/air.Viscosity, 0)
	return complex(air.Viscosity/sq(radius), 0) / besselRatio(y)
}

// slitPore returns the impedance of a slit per length, Pa·s/m²,
//
//	Z_pore = jωρ/[1 − tanh(s√j)/(s√j)],  s = (b/2)·√(ωρ/η)
//
// with the width b in m.
//
// Limits: 12η/b² + jωρ·6/5 for s → 0.
//
// Source: Allard & Atalla 2009, section 4.4.
func slitPore(omega complex128, width float64, air acoustics.Air) complex128 {
	y2 := complex(0, 1) * omega * complex(air.Density*sq(width/2)/air.Viscosity, 0)
	return complex(0, air.Density) * omega / slitBracket(y2)
}

// slitBracket returns 1 − tanh(y)/y for y².
func slitBracket(y2 complex128) complex128 {
	if cmplx.Abs(y2) > 100 {
		y := cmplx.Sqrt(y2)
		e := cmplx.Exp(-2 * y)
		return 1 - (1-e)/(1+e)/y
	}
	// tanh(y)/y = 1/(1 + y²/(3 + y²/(5 + …))) (Lambert), without cancellation.
	var tail complex128
	for n := 45; n >= 3; n -= 2 {
		tail = y2 / (complex(float64(n), 0) + tail)
	}
	return tail / (1 + tail)
}

// surfaceResistance returns the viscous resistance of a plane wall,
// R_s = ½·√(2ηρω), Pa·s/m.
func surfaceResistance(omega complex128, air acoustics.Air) complex128 {
	return 0.5 * cmplx.Sqrt(omega*complex(2*air.Viscosity*air.Density, 0))
}

// edgeResistance returns the resistance of the edges of both ends of a hole in
// a thick sheet, r = 4·R_s, Pa·s/m.
//
// Source: Ingard, JASA 25 (1953) 1037.
func edgeResistance(omega complex128, air acoustics.Air) complex128 {
	return 4 * surfaceResistance(omega, air)
}

// flangedEnd is the end correction of a round opening in a wide wall over its
// radius: 8/(3π) = 0.849, written 0.85 in the trade.
const flangedEnd = 0.85

// holeEnd returns the end correction of one side of a round hole of radius a
// (m) among others that together open the share eps of the sheet, m,
//
//	δ = (8a/3π)·(1 − 1.47·√ε + 0.47·√ε³)
//
// Source: Rschevkin, The Theory of Sound, 1963.
func holeEnd(radius, eps float64) float64 {
	x := math.Sqrt(eps)
	return 8 * radius / (3 * math.Pi) * (1 - 1.47*x + 0.47*x*x*x)
}

// slotEnd returns the end correction of one side of a slot of width b (m) among
// slats, m,
//
//	δ = −(b/π)·ln sin(πε/2)
//
// Source: Smith & Kosten, Acustica 1 (1951) 114.
func slotEnd(width, eps float64) float64 {
	return -width / math.Pi * math.Log(math.Sin(math.Pi*eps/2))
}

// innerEnd returns the end correction of a mouth of radius a inside a box whose
// wall has the equivalent radius R per mouth, m,
//
//	δ = 0.85·a·(1 − 1.25·a/R)
//
// and 0 where that is negative (a > 0.8 R). Valid for a < 0.4 R.
//
// Source: Ingard, JASA 25 (1953) 1037.
func innerEnd(radius, wall float64) float64 {
	if wall <= 0 {
		return flangedEnd * radius
	}
	return flangedEnd * radius * math.Max(0, 1-1.25*radius/wall)
}
