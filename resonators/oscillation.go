package resonators

import (
	"math"
	"slices"

	"stillroom/acoustics"
)

// The range in which an absorber's own resonance is looked for, Hz.
const (
	lowestHz  = 5.0
	highestHz = 5000.0
	// scanSteps divides it evenly in log f, 2 % a step: far finer than
	// the distance from a resonance to the antiresonance above it.
	scanSteps = 350
)

// Equivalent is the mass, spring and resistance that an absorber is near its
// resonance: per face area for wide kinds (kg/m², N/m³, Pa·s/m), acoustic for
// necks (kg/m⁴, Pa/m³, Pa·s/m³).
type Equivalent struct {
	Oscillator                  acoustics.Oscillator
	Mass, Stiffness, Resistance float64
}

// resonance returns the lowest frequency between 5 Hz and 5 kHz at which the
// reactance of a face rises through zero, from stiffness to mass, and false
// where there is none. The impedance is the face's own (a neck box with its
// outer end correction). Porous layers have none: their crossings are those of
// a quarter wave.
func resonance(a Absorber, air acoustics.Air) (hz float64, exists bool) {
	if _, broad := a.(Porous); broad {
		return 0, false
	}
	reactance := func(f float64) float64 {
		return imag(a.Specific(complex(2*math.Pi*f, 0), air))
	}
	lo, xlo := lowestHz, reactance(lowestHz)
	for _, hi := range scanned(a, air) {
		xhi := reactance(hi)
		if xlo < 0 && xhi >= 0 {
			return crossing(reactance, lo, hi), true
		}
		lo, xlo = hi, xhi
	}
	return 0, false
}

// scanned lists the frequencies at which the reactance is looked at, rising: a scan
// even in log f, and just below each mode of an empty cavity, where the reactance runs
// to +∞ whatever stands before it, so that the crossing under it, narrow for a stiff or
// a heavy front, is not stepped over.
func scanned(a Absorber, air acoustics.Air) []float64 {
	const below = 1e-9 // relative
	var list []float64
	ratio := math.Pow(highestHz/lowestHz, 1.0/scanSteps)
	for i := 1; i <= scanSteps; i++ {
		list = append(list, lowestHz*math.Pow(ratio, float64(i)))
	}
	if l, ok := a.(layered); ok && l.cavity().empty() && l.cavity().depth() > 0 {
		first := air.SpeedOfSound / (2 * l.cavity().depth())
		for n := 1; float64(n)*first < highestHz; n++ {
			list = append(list, float64(n)*first*(1-below), float64(n)*first*(1+below))
		}
		slices.Sort(list)
	}
	return list
}

// crossing returns the zero of a rising function between lo and hi by bisection
// to the last bit that matters (2^−45 of the interval).
func crossing(f func(float64) float64, lo, hi float64) float64 {
	for range 45 {
		mid := 0.5 * (lo + hi)
		if f(mid) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return 0.5 * (lo + hi)
}

// EquivalentOf returns the oscillator that the absorber's face is at its
// resonance,
//
//	Q = (ω0/2R)·dX/dω,  ζ = 1/(2Q),  δ = ζ·ω0
//	M = ½·dX/dω,  K = ω0²·M
//
// at the frequency where X = 0, and false where it is broadband. size is that
// of one unit, m. A neck box counts with its outer end correction.
func EquivalentOf(a Absorber, air acoustics.Air, size [2]float64) (Equivalent, bool) {
	a = fitted(a, size)
	f0, ok := resonance(a, air)
	if !ok {
		return Equivalent{}, false
	}
	w0 := 2 * math.Pi * f0
	at := func(h float64) float64 { return imag(a.Specific(complex(w0*(1+h), 0), air)) }
	// The step is relative. Beside a mode of the cavity it is taken so small that
	// the reactance is straight over it, to 2 %, and the slope right to the square of that.
	h := 1e-4
	for h > 1e-10 && !(math.Abs(at(h)+at(-h)) < 0.02*(at(h)-at(-h))) {
		h /= 4
	}
	slope := (at(h) - at(-h)) / (2 * h * w0)
	r := real(a.Specific(complex(w0, 0), air))
	// From the specific impedance to that of the face, or of the mouth.
	scale := air.Density * air.SpeedOfSound
	if n, isNeck := a.(Neck); isNeck {
		scale /= n.Front[0] * n.Front[1]
	}
	return Equivalent{
		// ζ = R/(ω0·dX/dω), so δ = R/(dX/dω), without dividing by R.
		Oscillator: acoustics.Oscillator{Natural: f0, Decay: r / slope},
		Mass:       slope / 2 * scale,
		Stiffness:  sq(w0) * slope / 2 * scale,
		Resistance: r * scale,
	}, true
}

// bandOfAction returns the band f0·(√(1+ζ²) ∓ ζ) in Hz: where a simple
// oscillator takes half of its greatest power or more.
func bandOfAction(o acoustics.Oscillator) [2]float64 {
	z := o.DampingRatio()
	s := math.Sqrt(1 + z*z)
	// s − z written as 1/(s + z), which keeps its digits for large ζ.
	return [2]float64{o.Natural / (s + z), o.Natural * (s + z)}
}
