package resonators

import (
	"math"

	"stillroom/acoustics"
)

// Report is all that is said of one absorber on its own.
type Report struct {
	// Oscillator is nil where the absorber is broadband.
	Oscillator *acoustics.Oscillator
	Band       [2]float64 // band of action f0(√(1+ζ²) ∓ ζ), Hz; zero where broadband
	// The equivalent oscillator, per face area for wide kinds (kg/m², N/m³,
	// Pa·s/m), acoustic for necks (kg/m⁴, Pa/m³, Pa·s/m³); zero where broadband.
	Mass, Stiffness, Resistance float64
	ThirdOctaves                []ThirdOctave // nominal 20 Hz … 5 kHz
	Practical                   []OctaveValue // ISO 11654 practical coefficients 125 … 4000 Hz (from the diffuse values)
	AlphaW                      float64
	AlphaWShape                 string        // "", "L", "M", "LM", …
	Impedance                   []ImpedanceAt // at the third-octave centres: specific; for necks acoustic with the outer end correction
	Warnings                    []string      // plain sentences: Miki out of range, sheet resonance near, …
}

// ImpedanceAt is an impedance at a frequency.
type ImpedanceAt struct {
	Hz float64
	Z  complex128
}

// Analyse returns the report of an absorber whose unit has the given size (m),
// with a full diffuse field.
func Analyse(a Absorber, air acoustics.Air, size [2]float64) Report {
	return AnalyseWithin(a, air, size, FullField)
}

// AnalyseWithin returns the report with a diffuse field up to the angle limit
// (rad): [FullField], [FieldIncidence] or less.
func AnalyseWithin(a Absorber, air acoustics.Air, size [2]float64, limit float64) Report {
	if !(limit > 0 && limit <= FullField) {
		panic("resonators: the angle limit of a diffuse field is above 0 and at most a right angle")
	}
	a = fitted(a, size)
	var r Report
	if e, ok := EquivalentOf(a, air, size); ok {
		o := e.Oscillator
		r.Oscillator = &o
		r.Band = bandOfAction(o)
		r.Mass, r.Stiffness, r.Resistance = e.Mass, e.Stiffness, e.Resistance
	}
	r.ThirdOctaves = thirdOctaves(a, air, limit)
	r.Practical, r.AlphaW, r.AlphaWShape = rate(r.ThirdOctaves)
	for _, b := range r.ThirdOctaves {
		r.Impedance = append(r.Impedance, ImpedanceAt{Hz: b.Hz, Z: printed(a, b.Hz, air)})
	}
	r.Warnings = warnings(a, air, size, r.Oscillator)
	return r
}

// printed returns the impedance that is shown: specific, or a neck's acoustic
// one with its outer end correction.
func printed(a Absorber, hz float64, air acoustics.Air) complex128 {
	omega := complex(2*math.Pi*hz, 0)
	if n, ok := a.(Neck); ok {
		return n.alone(omega, air)
	}
	return a.Specific(omega, air)
}
