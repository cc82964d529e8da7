package acoustics

import "math"

// UnitResonance returns the natural frequency in Hz of a unit in its place,
// with the static air mass that the room puts before it and everything else of
// the room left out,
//
//	Im(Z(ω) + jωρ·S_1) = 0, from stiffness to mass,
//
// sought within a factor of two of the unit's own reckoning. False where the
// unit is broadband or no such frequency is found.
func (r Room) UnitResonance(u Unit) (hz float64, exists bool) {
	if u.Natural <= 0 {
		return 0, false
	}
	spans := u.Patch.spans(r.Box)
	s := newStatics(r.Box, [][3]span{spans}, nil)
	w := s.weights(spans)
	mass := r.Air.Density * (s.pair(spans, spans, w, w)[0] + u.Patch.mouthCorrection())
	reactance := func(hz float64) float64 {
		omega := 2 * math.Pi * hz
		return imag(u.Impedance(complex(omega, 0))) + omega*mass
	}
	lo, hi := u.Natural/2, u.Natural*2
	if reactance(lo) >= 0 || reactance(hi) <= 0 {
		return 0, false
	}
	for range 60 {
		mid := (lo + hi) / 2
		if reactance(mid) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2, true
}
