package acoustics

import "math"

// Oscillator is a damped harmonic oscillator, the common description of a
// mode of the room, a resonance of an absorber and a pole of the treated room.
// Its free motion is exp(−Decay·t)·cos(ω_d t + φ).
type Oscillator struct {
	Natural float64 // natural frequency f0 = |s|/2π, Hz, > 0
	Decay   float64 // decay constant δ, 1/s, ≥ 0
}

// DampingRatio returns ζ = δ/ω0.
func (o Oscillator) DampingRatio() float64 { return o.Decay / (2 * math.Pi * o.Natural) }

// T60 returns the time in seconds in which the oscillation falls by 60 dB,
//
//	T60 = 3 ln 10 / δ = 6.908/δ
//
// and +Inf where there is no damping.
func (o Oscillator) T60() float64 { return 3 * math.Ln10 / o.Decay }

// HalfPowerWidth returns the width in Hz of the resonance at half power,
// Δf = δ/π = 2.199/T60.
func (o Oscillator) HalfPowerWidth() float64 { return o.Decay / math.Pi }

// Q returns the quality factor 1/(2ζ).
func (o Oscillator) Q() float64 { return 1 / (2 * o.DampingRatio()) }

// DampedHz returns the frequency of the free oscillation,
//
//	f_d = f0·√(1 − ζ²),
//
// and false where ζ ≥ 1 and nothing oscillates.
func (o Oscillator) DampedHz() (hz float64, oscillates bool) {
	z := o.DampingRatio()
	if z >= 1 {
		return 0, false
	}
	return o.Natural * math.Sqrt(1-z*z), true
}

// PeakHz returns the frequency of greatest forced amplitude,
//
//	f_r = f0·√(1 − 2ζ²),
//
// and false where ζ ≥ 1/√2: the amplitude then falls from zero frequency on
// and there is no resonance peak.
func (o Oscillator) PeakHz() (hz float64, exists bool) {
	z := o.DampingRatio()
	if 2*z*z >= 1 {
		return 0, false
	}
	return o.Natural * math.Sqrt(1-2*z*z), true
}
