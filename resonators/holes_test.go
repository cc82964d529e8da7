package resonators

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// besselSeries returns J_n(z) for z² by its power series, slow and obvious.
func besselSeries(n int, z complex128) complex128 {
	term := complex(1, 0)
	for i := 1; i <= n; i++ {
		term *= z / 2 / complex(float64(i), 0)
	}
	var sum complex128
	for k := range 200 {
		sum += term
		term *= -z * z / 4 / complex(float64((k+1)*(k+1+n)), 0)
	}
	return sum
}

func TestBesselRatioAgainstSeries(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		// Arguments as a pore has them: y = −jωρa²/η near the negative imaginary axis.
		y := cmplx.Rect(rapid.Float64Range(1e-6, 120).Draw(t, "|y|"), rapid.Float64Range(-2.2, -0.9).Draw(t, "arg y"))
		x := cmplx.Sqrt(y)
		want := besselSeries(2, x) / (y * besselSeries(0, x))
		if got := besselRatio(y); cmplx.Abs(got-want) > 1e-8*cmplx.Abs(want) {
			t.Fatalf("y = %v: %v, the series gives %v", y, got, want)
		}
	})
}

// A round hole: 8η/a² + 4/3·jωρ at low frequency, jωρ + (1+j)√(2ωρη)/a at high
// (Crandall; Stinson, J. Acoust. Soc. Am. 89 (1991) 550).
func TestRoundPoreLimits(t *testing.T) {
	const a = 0.5e-3
	w := omegaOf(0.01)
	want := complex(8*testAir.Viscosity/(a*a), 0) + 1i*w*complex(4./3*testAir.Density, 0)
	if got := roundPore(w, a, testAir); math.Abs(real(got)/real(want)-1) > 1e-6 || math.Abs(imag(got)/imag(want)-1) > 1e-4 {
		t.Errorf("f → 0: %v, want %v", got, want)
	}
	w = omegaOf(1e7)
	loss := math.Sqrt(2*real(w)*testAir.Density*testAir.Viscosity) / a
	want = complex(loss, real(w)*testAir.Density+loss)
	if got := roundPore(w, a, testAir); math.Abs(real(got)/real(want)-1) > 0.01 || math.Abs(imag(got)/imag(want)-1) > 1e-3 {
		t.Errorf("f → ∞: %v, want %v", got, want)
	}
}

// A slit: 12η/b² + 6/5·jωρ at low frequency.
func TestSlitPoreLimits(t *testing.T) {
	const b = 1e-3
	w := omegaOf(0.01)
	want := complex(12*testAir.Viscosity/(b*b), 1.2*real(w)*testAir.Density)
	if got := slitPore(w, b, testAir); math.Abs(real(got)/real(want)-1) > 1e-6 || math.Abs(imag(got)/imag(want)-1) > 1e-4 {
		t.Errorf("f → 0: %v, want %v", got, want)
	}
	// And the exact form by the library's tanh.
	w = omegaOf(300)
	y := cmplx.Sqrt(1i*w*complex(testAir.Density/testAir.Viscosity, 0)) * complex(b/2, 0)
	want = 1i * w * complex(testAir.Density, 0) / (1 - cmplx.Tanh(y)/y)
	if got := slitPore(w, b, testAir); cmplx.Abs(got-want) > 1e-9*cmplx.Abs(want) {
		t.Errorf("300 Hz: %v, want %v", got, want)
	}
}

func TestEndCorrections(t *testing.T) {
	// Rschevkin, The Theory of Sound, 1963: 1 − 1.47√ε + 0.47√ε³, worked out apart.
	for x, want := range map[float64]float64{.1: .8535, .2: .7098, .3: .5717, .5: .3237, .7: .1322} {
		if got := holeEnd(1, x*x) / (8 / (3 * math.Pi)); math.Abs(got-want) > 6e-5 {
			t.Errorf("√ε = %g: interaction %.5f, want %.4f", x, got, want)
		}
	}
	// Smith & Kosten, Acustica 1 (1951) 114: both sides together, in slot widths.
	for eps, want := range map[float64]float64{.01: 2.6443, .05: 1.6203, .1: 1.1810, .2: .7476, .3: .5027} {
		if got := 2 * slotEnd(1, eps); math.Abs(got-want) > 6e-5 {
			t.Errorf("ε = %g: %.5f slot widths, want %.4f", eps, got, want)
		}
	}
	// Ingard, J. Acoust. Soc. Am. 25 (1953) 1037: the inner end in a wide wall is
	// the flanged 0.85a, and less in a narrow box.
	if got := innerEnd(0.05, math.Inf(1)); math.Abs(got-0.85*0.05) > 1e-12 {
		t.Errorf("inner end in a wide wall %v", got)
	}
	if got, want := innerEnd(0.05, 0.25), 0.85*0.05*0.75; math.Abs(got-want) > 1e-12 {
		t.Errorf("inner end in a box %v, want %v", got, want)
	}
	if got := innerEnd(0.05, 0.05); got != 0 {
		t.Errorf("inner end as wide as the box %v, want 0", got)
	}
}

// Wide mouths at strongly damped frequencies reach arguments where the series
// fails: values worked out apart with 40 figures.
func TestBesselRatioOfLargeArguments(t *testing.T) {
	for y, want := range map[complex128]complex128{
		600 - 40i:      -0.00166134681977889 - 0.000307571901361844i,
		81000 - 9000i:  -1.21807720074813e-5 - 1.43976103144533e-6i,
		2000 - 1500i:   -0.000306799320283445 - 0.000248953744582159i,
		-30000 - 100i:  3.29491834933459e-5 - 1.0919282754382e-7i,
		50000 - 1i:     -2.00419071832571e-5 - 8.23628373621127e-10i,
		1000000 - 4e4i: -9.98281840119752e-7 - 4.19300353161135e-8i,
	} {
		if got := besselRatio(y); cmplx.Abs(got-want) > 1e-9*cmplx.Abs(want) {
			t.Errorf("y = %v: %v, want %v", y, got, want)
		}
	}
}
