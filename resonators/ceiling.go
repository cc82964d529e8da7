package resonators

import "math"

// Place says how many surfaces a small absorber stands against.
type Place int

// The places of a resonator in a room.
const (
	InWall   Place = iota + 1 // one surface
	InEdge                    // two
	InCorner                  // three
)

// PlaneWaveCeiling returns the greatest absorption cross-section of one small
// resonator for a plane wave, m²: λ²/2π in a wall, λ²/π in an edge, 2λ²/π in a
// corner. c is the speed of sound in m/s.
//
// Source: Ingard, JASA 25 (1953) 1037 (wall); edge and corner by images, since
// the radiation resistance doubles with each surface.
func PlaneWaveCeiling(p Place, hz, c float64) float64 {
	if p < InWall || p > InCorner {
		panic("resonators: no such place")
	}
	return sq(c/hz) / (2 * math.Pi) * float64(int(1)<<(p-InWall))
}

// DiffuseCeiling returns the greatest equivalent (Sabine) absorption area of
// one small resonator in a diffuse field, m²: λ²/π in every place. It is
// another quantity than [PlaneWaveCeiling]'s: the field before an edge or a
// corner is stronger by itself.
func DiffuseCeiling(hz, c float64) float64 { return sq(c/hz) / math.Pi }
