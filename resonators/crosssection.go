package resonators

import (
	"math"

	"stillroom/acoustics"
)

// CrossSection is what one unit, small beside the wave, takes in at its resonance.
type CrossSection struct {
	Hz      float64
	Area    float64 // of a plane wave, m²
	Ceiling float64 // the most that any unit there could take in, m²
	Diffuse float64 // the most that it is worth as a Sabine area in a diffuse field, m²
}

// CrossSectionOf returns the absorption cross-section of one unit of the given
// size (m) at its resonance in a place where n surfaces meet,
//
//	s = 4^{n−1}·4ρc·R/(R + R_r)², R_r = 2^{n−1}·ρck²/2π
//
// with the ceiling of [PlaneWaveCeiling], reached where R = R_r; R is the unit's acoustic resistance; false where it has no resonance or its front
// is larger than a quarter of the wave.
//
// Source: Ingard, JASA 25 (1953) 1037 (wall); edge and corner by images.
func CrossSectionOf(a Absorber, air acoustics.Air, size [2]float64, place Place) (CrossSection, bool) {
	a = fitted(a, size)
	hz, ok := resonance(a, air)
	if !ok {
		return CrossSection{}, false
	}
	var (
		c         = air.SpeedOfSound
		wave      = c / hz
		twice     = math.Exp2(float64(place - InWall))
		k         = 2 * math.Pi / wave
		radiation = twice * air.Density * c * k * k / (2 * math.Pi)
		loss      = real(a.InRoom(complex(2*math.Pi*hz, 0), size[0]*size[1], air))
	)
	if max(size[0], size[1]) > wave/4 {
		return CrossSection{}, false
	}
	return CrossSection{Hz: hz, Area: sq(twice) * 4 * air.Density * c * loss / sq(loss+radiation),
		Ceiling: PlaneWaveCeiling(place, hz, c), Diffuse: DiffuseCeiling(hz, c)}, true
}
