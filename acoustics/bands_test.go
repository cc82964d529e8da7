package acoustics

import (
	"math"
	"testing"
)

func TestBandsIEC61260(t *testing.T) {
	// IEC 61260-1:2014, base ten: exact centres and edges by its formula.
	for k, want := range map[int]Band{
		-6: {"16", 15.849, 11.220, 22.387}, -5: {"31.5", 31.623, 22.387, 44.668}, -4: {"63", 63.096, 44.668, 89.125},
		-3: {"125", 125.893, 89.125, 177.828}, -1: {"500", 501.187, 354.813, 707.946}, 0: {"1000", 1000, 707.946, 1412.54},
		2: {"4000", 3981.07, 2818.38, 5623.41}, 3: {"8000", 7943.28, 5623.41, 11220.2},
	} {
		checkBand(t, Octave(k), want)
	}
	thirds := ThirdOctaves(16, 200)
	wanted := []Band{{"16", 15.849, 14.125, 17.783}, {"20", 19.953, 17.783, 22.387}, {"25", 25.119, 22.387, 28.184},
		{"31.5", 31.623, 28.184, 35.481}, {"40", 39.811, 35.481, 44.668}, {"50", 50.119, 44.668, 56.234},
		{"63", 63.096, 56.234, 70.795}, {"80", 79.433, 70.795, 89.125}, {"100", 100, 89.125, 112.202},
		{"125", 125.893, 112.202, 141.254}, {"160", 158.489, 141.254, 177.828}, {"200", 199.526, 177.828, 223.872}}
	if len(thirds) != len(wanted) {
		t.Fatalf("%d bands from 16 to 200 Hz, want %d", len(thirds), len(wanted))
	}
	for i, want := range wanted {
		checkBand(t, thirds[i], want)
		if i > 0 && !near(thirds[i].Lower, thirds[i-1].Upper, 1e-12) {
			t.Errorf("%s does not begin where %s ends", thirds[i].Nominal, thirds[i-1].Nominal)
		}
	}
}

func checkBand(t *testing.T, got, want Band) {
	t.Helper()
	near := func(a, b float64) bool { return math.Abs(a-b) <= 6e-6*b+0.0005 }
	if got.Nominal != want.Nominal || !near(got.Centre, want.Centre) || !near(got.Lower, want.Lower) || !near(got.Upper, want.Upper) {
		t.Errorf("band %+v, want %+v", got, want)
	}
}
