package resonators

import (
	"math"
	"testing"
)

// The band means of fronts over empty open cavities against the obvious computation,
// the coefficient of each angle and frequency added up, and against themselves with
// twice the points everywhere.
func TestOpenBandAgainstSums(t *testing.T) {
	const promise = 0.0005 // a quarter of what a third octave may be off by
	for name, a := range map[string]layered{
		"perforated":      Perforated{Sheet: 0.006, Hole: 0.006, Pitch: 0.025, Cavity: 0.1},
		"perforated, low": Perforated{Sheet: 0.012, Hole: 0.006, Pitch: 0.1, Cavity: 0.288},
		"gauze":           Perforated{Sheet: 0.006, Hole: 0.01, Pitch: 0.02, Cavity: 0.2, Gauze: 80},
		"deep":            Perforated{Sheet: 0.006, Hole: 0.006, Pitch: 0.02, Cavity: 1},
		"slotted":         Slotted{Slat: 0.04, Slot: 0.005, Sheet: 0.02, Cavity: 0.4},
		"micro":           Microperforated{Sheet: 0.0008, Hole: 0.0005, Pitch: 0.004, Cavity: 0.5},
	} {
		for _, limit := range []float64{FullField, FieldIncidence} {
			for k := -17; k <= 7; k++ {
				lo, hi := 1000*math.Pow(10, (float64(k)-0.5)/10), 1000*math.Pow(10, (float64(k)+0.5)/10)
				got := newOpenBand(a, testAir, limit, lo, hi, 1).mean()
				finer := newOpenBand(a, testAir, limit, lo, hi, 2).mean()
				if math.Abs(got-finer) > promise {
					t.Errorf("%s, %.0f°, %.0f Hz: %.5f, with twice the points %.5f", name, limit*180/math.Pi, lo, got, finer)
				}
			}
		}
		// The slow way, at a few bands: a sum over 200 frequencies of the mean over angles.
		for _, k := range []int{-12, -6, 0, 4} {
			lo, hi := 1000*math.Pow(10, (float64(k)-0.5)/10), 1000*math.Pow(10, (float64(k)+0.5)/10)
			var sum float64
			const n = 400
			for i := range n {
				hz := lo * math.Pow(hi/lo, (float64(i)+0.5)/n)
				sum += extendedDiffuse(a, complex(2*math.Pi*hz, 0), FullField, 1e-5, testAir) / n
			}
			if got := newOpenBand(a, testAir, FullField, lo, hi, 1).mean(); math.Abs(got-sum) > promise {
				t.Errorf("%s, band at %.0f Hz: %.5f, by sums %.5f", name, lo, got, sum)
			}
		}
	}
}
