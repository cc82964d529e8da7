package acoustics

import "math"

// AirLoads gives the static air mass that a room puts before a unit at any
// place: S_1 of the unit with itself, in 1/m; times ρ it is an acoustic mass in
// kg/m⁴. What it has worked out it keeps. It is not safe for concurrent use.
type AirLoads struct {
	box   Box
	last  *statics
	known map[Patch]float64
}

// NewAirLoads returns the air loads of a room of the given shape.
func NewAirLoads(b Box) *AirLoads { return &AirLoads{box: b, known: map[Patch]float64{}} }

// Of returns the air load at a place, 1/m.
func (a *AirLoads) Of(p Patch) float64 {
	if load, ok := a.known[p]; ok {
		return load
	}
	spans := p.spans(a.box)
	a.last = newStatics(a.box, [][3]span{spans}, a.last)
	w := a.last.weights(spans)
	load := a.last.pair(spans, spans, w, w)[0] + p.mouthCorrection()
	a.known[p] = load
	return load
}

// Reactance returns the imaginary part in Pa·s/m³ of a unit's impedance at a
// frequency in Hz with an air load (1/m) before it, Im Z + ωρ·S_1: below zero
// the unit is stiff there, above it is massive.
func (u Unit) Reactance(hz, load, density float64) float64 {
	omega := 2 * math.Pi * hz
	return imag(u.Impedance(complex(omega, 0))) + omega*density*load
}

// resonance returns the frequency in Hz at which a unit's reactance with its air
// load changes from stiffness to mass, sought within a factor of two of its own
// reckoning.
func (u Unit) resonance(load, density float64) (hz float64, exists bool) {
	if u.Natural <= 0 {
		return 0, false
	}
	lo, hi := u.Natural/2, u.Natural*2
	if u.Reactance(lo, load, density) >= 0 || u.Reactance(hi, load, density) <= 0 {
		return 0, false
	}
	for range 50 {
		mid := (lo + hi) / 2
		if u.Reactance(mid, load, density) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2, true
}

// UnitResonance returns the natural frequency in Hz of a unit of the field in
// its place, with the static air mass that the room puts before it and
// everything else of the room left out; false where it is broadband.
func (f *Field) UnitResonance(unit int) (hz float64, exists bool) {
	return f.raw.units[unit].resonance(f.rawSum(unit, unit)[0], f.room.Air.Density)
}
