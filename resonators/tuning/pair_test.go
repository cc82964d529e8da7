package tuning

import (
	"math"
	"math/cmplx"
	"testing"

	"stillroom/acoustics"

	"pgregory.net/rapid"
)

func oscillator(hz, zeta float64) acoustics.Oscillator {
	return acoustics.Oscillator{Natural: hz, Decay: zeta * 2 * math.Pi * hz}
}

// Split of a tuned pair without damping: ω0(1 ± √μ/2) to first order (Fahy &
// Schofield, J. Sound Vib. 72 (1980) 365).
func TestSplit(t *testing.T) {
	for _, mu := range []float64{1e-4, 1e-3, 0.01} {
		low, high := Split(mu)
		if math.Abs(low-(1-math.Sqrt(mu)/2)) > mu || math.Abs(high-(1+math.Sqrt(mu)/2)) > mu {
			t.Errorf("μ = %g: %v and %v", mu, low, high)
		}
		pair := Pair(oscillator(50, 1e-9), oscillator(50, 1e-9), mu)
		lo, hi := min(pair[0].Natural, pair[1].Natural)/50, max(pair[0].Natural, pair[1].Natural)/50
		if math.Abs(lo-low) > 1e-9 || math.Abs(hi-high) > 1e-9 {
			t.Errorf("μ = %g: the pair's roots are at %v and %v, the closed form says %v and %v", mu, lo, hi, low, high)
		}
	}
	// 50 l at an antinode in 59.74 m³: √μ = .0409 axial, .0579 tangential, .0818
	// oblique, worked out apart.
	for norm, want := range map[float64]float64{0.5: .0409, 0.25: .0579, 0.125: .0818} {
		if got := math.Sqrt(BoxCoupling(0.05, 1, norm, 59.74)); math.Abs(got-want) > 6e-5 {
			t.Errorf("Λ = %g: √μ = %.5f, want %.4f", norm, got, want)
		}
	}
}

// The roots of a pair must satisfy its equation.
func TestPairSatisfiesItsEquation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		mode := oscillator(rapid.Float64Range(20, 200).Draw(t, "f_n"), rapid.Float64Range(1e-4, 0.05).Draw(t, "ζ_n"))
		absorber := oscillator(mode.Natural*rapid.Float64Range(0.8, 1.25).Draw(t, "tuning"), rapid.Float64Range(1e-3, 0.5).Draw(t, "ζ_a"))
		mu := rapid.Float64Range(1e-5, 0.1).Draw(t, "μ")
		wn, wa := 2*math.Pi*mode.Natural, 2*math.Pi*absorber.Natural
		for _, o := range Pair(mode, absorber, mu) {
			w0 := 2 * math.Pi * o.Natural
			s := complex(-o.Decay, 0) + cmplx.Sqrt(complex(o.Decay*o.Decay-w0*w0, 0))
			v := (s*s+complex(2*mode.Decay, 0)*s+complex(wn*wn, 0))*(s*s+complex(2*absorber.Decay, 0)*s+complex(wa*wa, 0)) + complex(mu*wa*wa, 0)*s*s
			if cmplx.Abs(v) > 1e-8*math.Pow(wn, 4) {
				t.Fatalf("root %v leaves %v", s, v)
			}
		}
	})
}

// Fastest decay: at ζ_a = ζ_n + √μ both poles meet at (ζ_a + ζ_n)/2, and any
// other damping lets one of them ring longer.
func TestFastestDecay(t *testing.T) {
	for _, mu := range []float64{1e-3, 0.01, 0.05} {
		const zn = 0.004
		za := FastestDamping(zn, mu)
		mode := oscillator(60, zn)
		slowest := func(z float64) float64 { return Pair(mode, oscillator(60, z), mu)[0].DampingRatio() }
		// The meeting is a double root: half the figures.
		if got, want := slowest(za), MergedDamping(zn, mu); math.Abs(got-want) > 1e-2*want {
			t.Errorf("μ = %g: the slower pole has ζ = %v, want %v", mu, got, want)
		}
		for _, off := range []float64{0.7, 1.4} {
			if slowest(za*off) >= slowest(za) {
				t.Errorf("μ = %g: %g of the damping decays faster", mu, off)
			}
		}
		if got := NeededCoupling(zn, MergedDamping(zn, mu)); math.Abs(got-mu) > 1e-12 {
			t.Errorf("μ needed for that decay %v, want %v", got, mu)
		}
	}
	if got := NeededCoupling(0.02, 0.01); got != 0 {
		t.Errorf("a mode that decays fast enough needs μ = %v", got)
	}
}

// Lowest peak: the pair (ω_n²−ω²)(ω_a²−ω²+2jζ_aω_aω) = μω²ω_a², response of the
// mode to a source of constant volume acceleration. A search over tuning and
// damping finds the closed form's peak to 0.2 %: its own limit is 0.15 % at μ = 0.1 for the best
// tuning of all, and its tuning is the best to first order.
func TestLowestPeak(t *testing.T) {
	for _, mu := range []float64{0.001, 0.005, 0.01, 0.05, 0.1} {
		peak := func(tuning, zeta float64) float64 {
			var most float64
			for w := 0.7; w < 1.3; w += 1e-5 {
				a := complex(tuning*tuning-w*w, 2*zeta*tuning*w)
				most = math.Max(most, cmplx.Abs(a/(complex(1-w*w, 0)*a-complex(mu*w*w*tuning*tuning, 0))))
			}
			return most
		}
		tuning, zeta, want := LowestPeak(mu)
		got := peak(tuning, zeta)
		if math.Abs(got/want-1) > 0.002 {
			t.Errorf("μ = %g: the peak is %.4f, the closed form says %.4f", mu, got, want)
		}
		// Another tuning, or another damping, is worse, Den Hartog's 1/(1+μ) too.
		for _, other := range [][2]float64{{tuning * 1.005, zeta}, {tuning * 0.995, zeta}, {tuning, zeta * 1.15}, {tuning, zeta * 0.87}, {1 / (1 + mu), zeta}} {
			if p := peak(other[0], other[1]); p < got*(1-1e-4) {
				t.Errorf("μ = %g: tuning %.4f and ζ %.4f peak at %.4f, lower than %.4f", mu, other[0], other[1], p, got)
			}
		}
	}
}

func TestCouplingOfBoxAndPanel(t *testing.T) {
	air := acoustics.Air{SpeedOfSound: 343.2, Density: 1.2041}
	// A lumped box: μ by mass and frequency is μ by volume.
	const volume, box, norm, squared = 60.0, 0.08, 0.5, 0.7
	mass := 30.0
	hz := math.Sqrt(air.Density*343.2*343.2/(box*mass)) / (2 * math.Pi)
	if a, b := Coupling(squared, norm, volume, mass, hz, air), BoxCoupling(box, squared, norm, volume); math.Abs(a/b-1) > 1e-12 {
		t.Errorf("μ = %v by mass, %v by volume", a, b)
	}
	if got := BoxCoupling(BoxVolume(0.01, squared, norm, volume), squared, norm, volume); math.Abs(got-0.01) > 1e-12 {
		t.Errorf("the volume for μ = 0.01 gives %v", got)
	}
	area := PanelArea(0.01, squared, norm, volume, 5, 60, air)
	if got := Coupling(squared, norm, volume, 5/area, 60, air); math.Abs(got-0.01) > 1e-12 {
		t.Errorf("the area for μ = 0.01 gives %v", got)
	}
}
