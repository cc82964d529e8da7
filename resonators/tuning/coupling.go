package tuning

import (
	"math"

	"stillroom/acoustics"
)

// Coupling returns the coupling ratio of a mode and an absorber unit,
//
//	μ = ρc²·û²/(VΛ·M_a·ω_a²)
//
// with û² the square of the mode's mean over the unit (summed over the units of
// one spot), Λ the mode's norm, V the room's volume (m³), M_a the acoustic mass
// of one unit (kg/m⁴: a neck's, or m/S of a panel) and hz the absorber's
// natural frequency.
//
// Source: Fahy & Schofield, J. Sound Vib. 72 (1980) 365.
func Coupling(squared, norm, volume, mass, hz float64, air acoustics.Air) float64 {
	w := 2 * math.Pi * hz
	return air.Density * sq(air.SpeedOfSound) * squared / (volume * norm * mass * w * w)
}

// BoxCoupling returns the coupling ratio of a neck box of unfilled volume box
// (m³): μ = V_box·û²/(VΛ).
func BoxCoupling(box, squared, norm, volume float64) float64 {
	return box * squared / (volume * norm)
}

// BoxVolume returns the volume of box, m³, that gives the coupling ratio mu,
// all boxes of a spot together: V_box = μ·VΛ/û².
func BoxVolume(mu, squared, norm, volume float64) float64 {
	return mu * volume * norm / squared
}

// PanelArea returns the area of panel, m², that gives the coupling ratio mu,
//
//	S = μ·VΛ·m·ω_a²/(ρc²·û²)
//
// with its mass m per area (kg/m²) and natural frequency hz.
func PanelArea(mu, squared, norm, volume, mass, hz float64, air acoustics.Air) float64 {
	return mu / Coupling(squared, norm, volume, mass, hz, air)
}

// Split returns the two frequencies of a tuned pair without damping, in
// units of the common natural frequency,
//
//	√(1 + μ/4) ∓ √μ/2 ≈ 1 ∓ √μ/2
func Split(mu float64) (low, high float64) {
	r, h := math.Sqrt(1+mu/4), math.Sqrt(mu)/2
	return 1 / (r + h), r + h
}

// FastestDamping returns the absorber's damping ratio that makes a tuned pair
// decay fastest, ζ_a = ζ_n + √μ: both poles meet at ζ = (ζ_a + ζ_n)/2.
func FastestDamping(mode, mu float64) float64 { return mode + math.Sqrt(mu) }

// MergedDamping returns the damping ratio of both poles of a tuned pair with
// ζ_a = ζ_n + √μ: ζ_n + √μ/2.
func MergedDamping(mode, mu float64) float64 { return mode + math.Sqrt(mu)/2 }

// NeededCoupling returns the least coupling ratio with which a mode of damping
// ratio mode can be brought to the damping ratio target,
//
//	μ ≥ (2·(ζ_target − ζ_n))²
//
// and 0 where the mode decays fast enough by itself.
func NeededCoupling(mode, target float64) float64 {
	return sq(2 * math.Max(0, target-mode))
}

// DampingFor returns the damping ratio of an oscillator of natural frequency hz
// that falls by 60 dB in t60 seconds: ζ = 3 ln 10/(T60·2πf).
func DampingFor(hz, t60 float64) float64 {
	return 3 * math.Ln10 / (t60 * 2 * math.Pi * hz)
}

// LowestPeak returns the tuning ω_a/ω_n and the damping ratio ζ_a of the
// absorber for the lowest response of a lossless mode to a source of constant
// volume acceleration, and that peak over the static response,
//
//	ω_a/ω_n = 1/√(1 + μ/2),  ζ_a = √(3μ/8),  peak = √(1 + 2/μ)
//
// to first order in μ (the peak within 0.15 % for μ up to 0.1). A tuned-mass
// damper's optimum has another tuning: it is not this system.
func LowestPeak(mu float64) (tuning, damping, peak float64) {
	return 1 / math.Sqrt(1+mu/2), math.Sqrt(3 * mu / 8), math.Sqrt(1 + 2/mu)
}

func sq(x float64) float64 { return x * x }
