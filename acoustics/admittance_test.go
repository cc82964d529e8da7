package acoustics

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// London, J. Acoust. Soc. Am. 22 (1950) 263, after Paris 1928: the closed forms,
// worked out apart from this code and held against the integral to six figures.
var londonTable = []struct {
	zeta complex128
	want float64
}{
	{0.2, .404711}, {0.5, .716900}, {1, .909645}, {1.5, .950821}, {2, .938884}, {3, .868810},
	{5, .719941}, {10, .489064}, {20, .297267}, {1 + 1i, .781124}, {2 - 1i, .870452},
	{1.5 - 0.5i, .925208}, {0.5 - 3i, .224894}, {5 + 10i, .237335},
}

func TestDiffuseFromImpedanceLondon(t *testing.T) {
	for _, c := range londonTable {
		if got := DiffuseFromComplexImpedance(c.zeta); math.Abs(got-c.want) > 6e-7 {
			t.Errorf("α(%v) = %.7f, want %.6f", c.zeta, got, c.want)
		}
		if imag(c.zeta) == 0 {
			if got := DiffuseFromImpedance(real(c.zeta)); math.Abs(got-c.want) > 6e-7 {
				t.Errorf("α(%v) = %.7f, want %.6f", c.zeta, got, c.want)
			}
		}
	}
	// Kuttruff, Room Acoustics, from memory: the maximum is 0.951 at ζ = 1.567.
	if got := DiffuseFromImpedance(1.567); math.Abs(got-0.951222) > 1e-6 {
		t.Errorf("the maximum is %v, want 0.951222", got)
	}
	for _, d := range []float64{-1e-3, 1e-3} {
		if DiffuseFromImpedance(greatestAtZeta+d) >= greatestDiffuse {
			t.Errorf("α at ζ = %v is above the maximum", greatestAtZeta+d)
		}
	}
}

// The closed form must be Paris's integral of the plane wave's coefficient.
func TestDiffuseFromComplexImpedanceIsParisIntegral(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		zeta := complex(math.Exp(rapid.Float64Range(-3, 4).Draw(t, "log re")), rapid.Float64Range(-30, 30).Draw(t, "im"))
		const n = 4000
		var sum float64
		for i := range n {
			// ∫α sin2θ dθ = ∫α(x) dx with x = sin²θ; midpoints in √ of cos
			// would only speed this up.
			theta := (float64(i) + 0.5) / n * math.Pi / 2
			zc := zeta * complex(math.Cos(theta), 0)
			r := cmplx.Abs((zc - 1) / (zc + 1))
			sum += (1 - r*r) * math.Sin(2*theta) * math.Pi / 2 / n
		}
		if got := DiffuseFromComplexImpedance(zeta); math.Abs(got-sum) > 2e-5 {
			t.Fatalf("α(%v) = %v, the integral is %v", zeta, got, sum)
		}
	})
}

func TestAdmittanceFromDiffuseInverts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		alpha := rapid.Float64Range(1e-9, greatestDiffuse).Draw(t, "alpha")
		beta := AdmittanceFromDiffuse(alpha)
		// Near the maximum α hardly depends on β: half the figures.
		if got := DiffuseFromImpedance(1 / beta); math.Abs(got-alpha) > 1e-10 {
			t.Fatalf("α = %v gives β = %v, which has %v", alpha, beta, got)
		}
		if beta > greatestAtBeta {
			t.Fatalf("β = %v is not on the stiff side", beta)
		}
	})
	if got := AdmittanceFromDiffuse(1e-6); !near(got, 1e-6/8, 1e-4) {
		t.Errorf("β tends to %v for α = 1e-6, not to α/8", got)
	}
	for _, alpha := range []float64{0.952, 1, 1.14} {
		if got := AdmittanceFromDiffuse(alpha); got != greatestAtBeta {
			t.Errorf("α = %v is not clamped: β = %v", alpha, got)
		}
	}
	for _, alpha := range []float64{0, -0.1} {
		if got := AdmittanceFromDiffuse(alpha); got != 0 {
			t.Errorf("α = %v gives β = %v, want a rigid surface", alpha, got)
		}
	}
}

func TestLiningConvertsBeforeAveraging(t *testing.T) {
	soft, hard := flat(0.9)[0].Finish, flat(0.02)[0].Finish
	l := Lining{{soft, 0.25}, {hard, 0.75}}
	want := 0.25*AdmittanceFromDiffuse(0.9) + 0.75*AdmittanceFromDiffuse(0.02)
	if got := l.Admittance(100); !near(got, want, 1e-14) {
		t.Errorf("β = %v, want the mean of the admittances %v", got, want)
	}
	if got := l.Coefficient(100); !near(got, 0.25*0.9+0.75*0.02, 1e-14) {
		t.Errorf("α = %v", got)
	}
}

func TestFinishInterpolatesInLogF(t *testing.T) {
	f := Finish{Absorption: []BandAbsorption{{125, 0.1}, {250, 0.3}, {500, 0.2}}}
	for hz, want := range map[float64]float64{20: 0.1, 125: 0.1, 125 * math.Sqrt2: 0.2, 250: 0.3, 353.5533905932738: 0.25, 500: 0.2, 4000: 0.2} {
		if got := f.Coefficient(hz); math.Abs(got-want) > 1e-12 {
			t.Errorf("α at %g Hz = %v, want %v", hz, got, want)
		}
	}
	if got := (Finish{}).Coefficient(100); got != 0 {
		t.Errorf("a finish without figures absorbs %v", got)
	}
}
