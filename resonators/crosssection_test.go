package resonators

import (
	"math"
	"testing"
)

// The ceilings of a small resonator for a plane wave: λ²/2π in a wall, λ²/π in an
// edge, 2λ²/π in a corner (Ingard, JASA 25 (1953) 1037, from memory; 1.872 m² at
// 100 Hz and 343 m/s in a wall). A gauze that makes the loss equal to the radiation
// reaches it, a heavier or a lighter one does not.
func TestCrossSectionMeetsItsCeiling(t *testing.T) {
	size := [2]float64{0.4, 0.4}
	box := Neck{Cavity: 0.03, MouthRadius: 0.06, Length: 0.02, Mouths: 1}
	for surfaces, share := range []float64{1, 2, 4} {
		surfaces++
		c, ok := CrossSectionOf(box, testAir, size, Place(surfaces))
		if !ok {
			t.Fatal("no cross-section")
		}
		wave := testAir.SpeedOfSound / c.Hz
		if want := share * sq(wave) / (2 * math.Pi); math.Abs(c.Ceiling/want-1) > 1e-12 {
			t.Errorf("%d surfaces: a ceiling of %v m², want %v m²", surfaces, c.Ceiling, want)
		}
		// Search the gauze for the most: it must be the ceiling, from below.
		best := 0.0
		for r := 0.0; r < 400; r += 0.2 {
			g := box
			g.Gauze = r / 20
			c, _ := CrossSectionOf(g, testAir, size, Place(surfaces))
			if c.Area > c.Ceiling*(1+1e-12) {
				t.Fatalf("%d surfaces: %v m² of at most %v m²", surfaces, c.Area, c.Ceiling)
			}
			best = math.Max(best, c.Area/c.Ceiling)
		}
		if best < 0.9999 {
			t.Errorf("%d surfaces: at best %.5f of the ceiling", surfaces, best)
		}
	}
	if _, ok := CrossSectionOf(Porous{Thickness: 0.1, FlowResistivity: 8000}, testAir, size, InWall); ok {
		t.Error("a porous layer has a resonance")
	}
	if _, ok := CrossSectionOf(Panel{Mass: 3, Cavity: 0.05}, testAir, [2]float64{1.2, 1.2}, InWall); ok {
		t.Error("a front of half a wave counts as small")
	}
}

// The ceilings at 100 Hz and 343 m/s: 1.872 m² in a wall, double in an edge, four
// times in a corner; as a Sabine area 3.745 m² in every place (worked out apart).
func TestCeilings(t *testing.T) {
	for place, want := range map[Place]float64{InWall: 1.872, InEdge: 3.745, InCorner: 7.490} {
		if got := PlaneWaveCeiling(place, 100, 343); math.Abs(got-want) > 1.1e-3 {
			t.Errorf("place %d: %.4f m², want %.3f", place, got, want)
		}
	}
	if got := DiffuseCeiling(100, 343); math.Abs(got-3.745) > 6e-4 {
		t.Errorf("diffuse %.4f m², want 3.745", got)
	}
}
