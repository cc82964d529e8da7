package acoustics

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// The quantities of a damped oscillator against its equation of motion.
func TestOscillatorAgainstItsEquation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		f0 := rapid.Float64Range(10, 300).Draw(t, "f0")
		zeta := rapid.Float64Range(0.001, 1.3).Draw(t, "ζ")
		w0 := 2 * math.Pi * f0
		o := Oscillator{Natural: f0, Decay: zeta * w0}
		if !near(o.DampingRatio(), zeta, 1e-12) || !near(o.Q(), 1/(2*zeta), 1e-12) {
			t.Fatalf("ζ = %v, Q = %v", o.DampingRatio(), o.Q())
		}
		// exp(−δ·T60) is 60 dB down.
		if got := 20 * math.Log10(math.Exp(-o.Decay*o.T60())); math.Abs(got+60) > 1e-9 {
			t.Fatalf("after T60 the level has changed by %v dB", got)
		}
		if !near(o.HalfPowerWidth()*o.T60(), 2.199, 1e-3) {
			t.Fatalf("Δf·T60 = %v", o.HalfPowerWidth()*o.T60())
		}
		// The free motion's frequency is the real part of the roots of
		// s² + 2ζω0·s + ω0².
		root := -complex(zeta*w0, 0) + cmplx.Sqrt(complex(w0*w0*(zeta*zeta-1), 0))
		hz, swings := o.DampedHz()
		if swings != (zeta < 1) || math.Abs(hz-math.Abs(imag(root))/(2*math.Pi)) > 1e-9*f0 {
			t.Fatalf("damped frequency %v, root %v", hz, root)
		}
		gain := func(f float64) float64 {
			w := 2 * math.Pi * f
			return 1 / cmplx.Abs(complex(w0*w0-w*w, 2*zeta*w0*w))
		}
		peak, exists := o.PeakHz()
		if exists != (zeta < 1/math.Sqrt2) {
			t.Fatalf("ζ = %v: a peak is said to exist: %v", zeta, exists)
		}
		if !exists {
			if gain(0.001*f0) < gain(0.1*f0) {
				t.Fatalf("ζ = %v has a peak after all", zeta)
			}
			return
		}
		if h := 0.01 * peak; gain(peak) < gain(peak-h) || gain(peak) < gain(peak+h) {
			t.Fatalf("the greatest amplitude is not at %v Hz", peak)
		}
	})
}

// At exactly ζ = 1/√2 the amplitude is flat at zero frequency: no peak.
func TestNoPeakFromOneOverRootTwo(t *testing.T) {
	w0 := 2 * math.Pi * 50
	for _, c := range []struct {
		zeta float64
		want bool
	}{{0.7071, true}, {math.Nextafter(1/math.Sqrt2, 1), false}, {0.8, false}} {
		if _, exists := (Oscillator{50, c.zeta * w0}).PeakHz(); exists != c.want {
			t.Errorf("ζ = %v: peak %v, want %v", c.zeta, exists, c.want)
		}
	}
}
