package acoustics

import (
	"math"
	"testing"
)

func TestNamedLimits(t *testing.T) {
	// Fazenda, Stephenson & Goldberg, J. Acoust. Soc. Am. 137 (2015) 1088, from
	// memory of the abstract.
	for name, corners := range map[string]map[float64]float64{
		"music-2015":      {20: 0.51, 63: 0.51, 250: 0.12, 300: 0.12, math.Sqrt(63 * 250): 0.315},
		"artificial-2015": {20: 0.9, 32: 0.9, 200: 0.17, 80: 0.535},
	} {
		l, ok := Limit(name)
		if !ok || l.Source == "" {
			t.Fatalf("no limit %q with a source", name)
		}
		for hz, want := range corners {
			if got := l.Curve.Seconds(hz); !near(got, want, 1e-9) {
				t.Errorf("%s at %g Hz: %v s, want %v", name, hz, got, want)
			}
		}
	}
	if _, ok := Limit("nobody-1900"); ok {
		t.Error("an unknown limit is found")
	}
}

func TestRateModes(t *testing.T) {
	mode := func(hz, t60 float64) DampedMode {
		return DampedMode{Mode{Hz: hz}, Damping{Air: 3 * math.Ln10 / t60}}
	}
	limit := LimitCurve{{20, 0.5}}
	modes := []DampedMode{mode(30, 1), mode(40, 0.4), mode(50, 2), mode(60, 1), mode(70, 1)}
	levels := [][]float64{{10, -20}, {12, 0}, {1.9, 5}, {2.1, math.NaN()}, {-30, -5.1}}
	ratings := RateModes(modes, levels, limit)
	for i, want := range []bool{
		true,  // over the limit and near the strongest of seat 0 (12 dB)
		false, // under the limit
		true,  // 10.1 dB down at seat 0, but the strongest of seat 1
		true,  // 9.9 dB down at seat 0
		false, // 10.1 dB down at seat 1
	} {
		if ratings[i].Problem != want {
			t.Errorf("mode %d: problem %v, want %v", i, ratings[i].Problem, want)
		}
	}
	// Severity: level + 20 log10(T60/limit).
	if got, want := ratings[0].Severity, 10+20*math.Log10(2); !near(got, want, 1e-12) {
		t.Errorf("severity %v, want %v", got, want)
	}
	if got, want := ratings[2].Severity, 5+20*math.Log10(4); !near(got, want, 1e-12) {
		t.Errorf("severity %v, want %v", got, want)
	}
}
