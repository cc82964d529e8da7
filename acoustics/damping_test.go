package acoustics

import (
	"math"
	"testing"
)

// With all walls alike, weakly absorbing and no loss in the air, an oblique
// mode's decay tends to Sabine's; at α = 0.05 it is 6 % shorter, since 8β > α.
func TestObliqueDecayTendsToSabine(t *testing.T) {
	box := Box{5.3, 3.86, 2.58}
	still := Air{SpeedOfSound: 343.2, Density: 1.2041}
	for alpha, want := range map[float64]float64{1e-6: 1, 1e-3: 0.9988, 0.05: 0.94} {
		l := flat(alpha)
		r := Room{box, still, Walls{l, l, l, l, l, l}}
		sabine := r.SabineTime(100)
		for _, m := range r.Modes(200) {
			ratio := m.Oscillator().T60() / sabine
			switch m.Kind() {
			case Oblique:
				if math.Abs(ratio-want) > 0.005 {
					t.Fatalf("α = %g: %v decays in %.4f of Sabine's time, want %.3f", alpha, m, ratio, want)
				}
			default:
				// Grazing waves meet a wall with half the strength.
				if ratio <= want {
					t.Fatalf("α = %g: %v decays as fast as an oblique mode", alpha, m)
				}
			}
		}
	}
}

// Each wall's part by hand: factor 2 for an order across the wall, 1 along it.
func TestModalDampingByHand(t *testing.T) {
	r := studio(t)
	c, v := r.Air.SpeedOfSound, r.Box.Volume()
	for _, m := range r.Modes(120) {
		var want float64
		for s, l := range r.Walls {
			factor := 1.0
			if m.Order[Surface(s).Normal()] != 0 {
				factor = 2
			}
			d := c / (2 * v) * factor * l.Admittance(m.Hz) * r.Box.Area(Surface(s))
			if !near(m.Damping.Wall[s], d, 1e-12) {
				t.Fatalf("%v, %v: δ = %v, by hand %v", m, Surface(s), m.Damping.Wall[s], d)
			}
			want += d
		}
		want += r.Air.EnergyAttenuation(m.Hz) * c / 2
		if !near(m.Damping.Total(), want, 1e-12) {
			t.Fatalf("%v: δ = %v, by hand %v", m, m.Damping.Total(), want)
		}
		if again := ModalDamping(r.Box, m.Mode, r.Walls, r.Air); !near(again.Total(), m.Damping.Total(), 1e-12) {
			t.Fatalf("%v: alone δ = %v, in the list %v", m, again.Total(), m.Damping.Total())
		}
	}
}
