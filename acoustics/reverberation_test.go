package acoustics

import (
	"math"
	"testing"
)

// Everest, The Master Handbook of Acoustics, p. 163: a room of 3728 ft³ with
// concrete, gypsum board and tile; T by 0.049·V/A.
func TestSabineEverest(t *testing.T) {
	const foot = 0.3048
	bands := []float64{125, 250, 500, 1000, 2000, 4000}
	materials := []struct {
		area  float64 // ft²
		alpha []float64
	}{
		{373, []float64{.01, .01, .015, .02, .02, .02}},
		{1159, []float64{.29, .10, .05, .04, .07, .09}},
		{340, []float64{.09, .28, .78, .84, .73, .64}},
	}
	printed := []float64{0.49, 0.85, 0.56, 0.54, 0.54, 0.55}
	// The room as a box: floor and the rest follow from the areas by shares on
	// all six surfaces alike, scaled so that the whole area is his.
	var whole float64
	for _, m := range materials {
		whole += m.area
	}
	var l Lining
	for _, m := range materials {
		f := Finish{}
		for i, a := range m.alpha {
			f.Absorption = append(f.Absorption, BandAbsorption{bands[i], a})
		}
		l = append(l, FinishShare{f, m.area / whole})
	}
	box := boxOf(3728*foot*foot*foot, whole*foot*foot)
	r := Room{box, Air{SpeedOfSound: 343}, Walls{l, l, l, l, l, l}}
	for i, hz := range bands {
		if got := r.SabineTime(hz); math.Abs(got-printed[i]) > 0.0065 {
			t.Errorf("%g Hz: T = %.3f s, the book prints %.2f", hz, got, printed[i])
		}
	}
}

// boxOf returns a box with square floor of a volume and a surface, the flat one.
func boxOf(volume, surface float64) Box {
	lo, hi := math.Cbrt(volume), 100.0
	for range 200 {
		side := (lo + hi) / 2
		h := volume / (side * side)
		if 2*side*side+4*side*h < surface {
			lo = side
		} else {
			hi = side
		}
	}
	return Box{lo, lo, volume / (lo * lo)}
}

func TestReverberationLimits(t *testing.T) {
	still := Air{SpeedOfSound: 343.2, Density: 1.2041}
	box := Box{6, 4.5, 2.7}
	l := flat(0.2)
	even := Room{box, still, Walls{l, l, l, l, l, l}}
	// Where all surfaces are alike, the formulas for uneven rooms are Eyring's.
	for name, got := range map[string]float64{"Fitzroy": even.FitzroyTime(500), "Arau-Puchades": even.ArauPuchadesTime(500)} {
		if !near(got, even.EyringTime(500), 1e-12) {
			t.Errorf("%s: %v s in an even room, Eyring %v", name, got, even.EyringTime(500))
		}
	}
	// Eyring tends to Sabine as α → 0.
	l = flat(1e-5)
	dull := Room{box, still, Walls{l, l, l, l, l, l}}
	if !near(dull.EyringTime(500), dull.SabineTime(500), 1e-5) {
		t.Errorf("α → 0: Eyring %v s, Sabine %v s", dull.EyringTime(500), dull.SabineTime(500))
	}
	// Uneven: absorption on the ceiling alone rings longest by Fitzroy.
	uneven := Room{box, still, Walls{flat(0.02), flat(0.02), flat(0.02), flat(0.02), flat(0.02), flat(0.9)}}
	if e, a, f := uneven.EyringTime(500), uneven.ArauPuchadesTime(500), uneven.FitzroyTime(500); !(e < a && a < f) {
		t.Errorf("uneven room: Eyring %.2f, Arau-Puchades %.2f, Fitzroy %.2f s are not in that order", e, a, f)
	}
	// Air alone: T = 24·ln10/(4mc).
	bare := Room{box, testAir(t), Walls{}}
	if want := 24 * math.Ln10 / (4 * bare.Air.EnergyAttenuation(4000) * bare.Air.SpeedOfSound); !near(bare.SabineTime(4000), want, 1e-12) {
		t.Errorf("air alone: %v s, want %v", bare.SabineTime(4000), want)
	}
}

func TestSchroederFrequency(t *testing.T) {
	// Schroeder & Kuttruff 1962: 2000·√(T/V); T of 500 and 1000 Hz by hand.
	r := studio(t)
	mean := (r.SabineTime(500) + r.SabineTime(1000)) / 2
	if want := 2000 * math.Sqrt(mean/(5.3*3.86*2.58)); !near(r.SchroederHz(), want, 1e-12) {
		t.Errorf("%v Hz, by hand %v", r.SchroederHz(), want)
	}
}
