package resonators

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

func omegaOf(hz float64) complex128 { return complex(2*math.Pi*hz, 0) }

// Nominal octave frequencies of the tables.
var tableHz = []float64{63, 125, 250, 500, 1000, 2000, 4000}

// Miki 1990 with the printed X = 1000f/σ coefficients; absorption at normal
// incidence over a rigid wall, worked out apart from this code.
func TestPorousMiki(t *testing.T) {
	for _, c := range []struct {
		name  string
		layer Porous
		want  []float64
	}{
		{"5000, 50 mm", Porous{Thickness: .05, FlowResistivity: 5000}, []float64{.0213, .0582, .1474, .3523, .7216, .9362, .9042}},
		{"10000, 50 mm", Porous{Thickness: .05, FlowResistivity: 10000}, []float64{.0199, .0642, .1900, .4835, .8824, .9815, .9709}},
		{"10000, 100 mm", Porous{Thickness: .1, FlowResistivity: 10000}, []float64{.0848, .2604, .6198, .9367, .9474, .9820, .9906}},
		{"10000, 50 mm + 50 mm air", Porous{Thickness: .05, FlowResistivity: 10000, Gap: .05}, []float64{.0518, .1734, .4928, .9080, .9655, .8858, .9977}},
	} {
		for i, hz := range tableHz {
			if got := NormalAbsorption(c.layer, hz, testAir); math.Abs(got-c.want[i]) > 6e-5 {
				t.Errorf("%s at %g Hz: α = %.5f, want %.4f", c.name, hz, got, c.want[i])
			}
		}
	}
	layer := Porous{Thickness: .05, FlowResistivity: 10000}
	for hz, want := range map[float64]complex128{125: .7485 - 6.6012i, 500: .5924 - 1.5380i, 1000: .6552 - .4800i} {
		if got := layer.Specific(omegaOf(hz), testAir); cmplx.Abs(got-want) > 1e-4 {
			t.Errorf("z at %g Hz = %.5f, want %.4f", hz, got, want)
		}
	}
}

// Miki's fluid knows only f/σ, and lengths only by the wave: α(σ, d, f) is
// α(2σ, d/2, 2f).
func TestMikiScales(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		sigma := rapid.Float64Range(1000, 50000).Draw(t, "σ")
		d := rapid.Float64Range(0.01, 0.3).Draw(t, "d")
		hz := rapid.Float64Range(50, 2000).Draw(t, "f")
		one := NormalAbsorption(Porous{Thickness: d, FlowResistivity: sigma}, hz, testAir)
		two := NormalAbsorption(Porous{Thickness: d / 2, FlowResistivity: 2 * sigma}, 2*hz, testAir)
		if math.Abs(one-two) > 1e-9 {
			t.Fatalf("α = %v and %v", one, two)
		}
	})
}

// Johnson-Champoux-Allard: isothermal at low and adiabatic at high frequency;
// the density of τρ/φ at high, the flow resistivity at low (Allard & Atalla 2009).
func TestJCALimits(t *testing.T) {
	j := JCA{Porosity: 0.96, Tortuosity: 1.3, ViscousLength: 80e-6, ThermalLength: 160e-6}
	const sigma = 15000
	low, high := omegaOf(1e-3), omegaOf(1e11)
	slow, fast := jcaFluid(low, sigma, j, testAir), jcaFluid(high, sigma, j, testAir)
	if k := slow.bulkModulus(low) * complex(j.Porosity, 0); cmplx.Abs(k-complex(testAir.Pressure, 0)) > 1e-3*testAir.Pressure {
		t.Errorf("K·φ tends to %v for f → 0, not to P0", k)
	}
	if k := fast.bulkModulus(high) * complex(j.Porosity, 0); cmplx.Abs(k-complex(1.4*testAir.Pressure, 0)) > 1e-3*testAir.Pressure {
		t.Errorf("K·φ tends to %v for f → ∞, not to γP0", k)
	}
	if r := slow.density(low) * 1i * low; math.Abs(real(r)-sigma) > 1e-3*sigma {
		t.Errorf("the resistance tends to %v for f → 0, not to σ", r)
	}
	if d := fast.density(high); math.Abs(real(d)-j.Tortuosity*testAir.Density/j.Porosity) > 1e-3 {
		t.Errorf("ρ tends to %v for f → ∞, not to τρ/φ", d)
	}
}

// Miki's fluid is not passive below f/σ of about 0.0007: the resistance is held
// at 0 on the real axis, and the report says so.
func TestMikiHeldPassive(t *testing.T) {
	dense := Porous{Thickness: 0.1, FlowResistivity: 900000}
	for hz := 5.0; hz < 5000; hz *= 1.1 {
		if z := dense.Specific(omegaOf(hz), testAir); real(z) < 0 {
			t.Errorf("%g Hz: Re z = %v", hz, real(z))
		}
	}
	if w := Analyse(dense, testAir, unitSize).Warnings; len(w) == 0 {
		t.Error("no warning of a fill outside Miki's range")
	}
}

// Filling a cavity lowers an air spring's resonance to 1/√1.4 of it at most.
func TestIsothermalFill(t *testing.T) {
	j := &JCA{Porosity: 1, Tortuosity: 1, ViscousLength: 1e-3, ThermalLength: 1e-5}
	empty := Panel{Mass: 40, Cavity: 0.05}
	filled := empty
	filled.Fill = &Fill{Thickness: 0.05, FlowResistivity: 300, JCA: j}
	a, _ := EquivalentOf(empty, testAir, unitSize)
	b, ok := EquivalentOf(filled, testAir, unitSize)
	if !ok {
		t.Fatal("no resonance")
	}
	// γP0 and ρc² of the test air differ by 2e-4.
	if ratio := b.Oscillator.Natural / a.Oscillator.Natural; math.Abs(ratio-1/math.Sqrt(1.4)) > 0.003 {
		t.Errorf("the fill lowers f0 to %.4f of it, isothermal air to 0.8452", ratio)
	}
}
