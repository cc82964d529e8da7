package resonators

import (
	"math"
	"math/cmplx"
	"testing"

	"stillroom/acoustics"

	"pgregory.net/rapid"
)

func resonanceOf(t *testing.T, a Absorber) float64 {
	t.Helper()
	e, ok := EquivalentOf(a, testAir, unitSize)
	if !ok {
		t.Fatalf("%s: no resonance", a.Kind())
	}
	return e.Oscillator.Natural
}

// Limp sheets over an empty cavity: the exact root of ωm/ρc = cot(ωD/c), worked
// out apart; the masses are the trade's (common practice).
func TestPanelCotangent(t *testing.T) {
	for _, c := range []struct{ mass, depth, want float64 }{
		{1.9, .0318, 243.0}, {1.9, .0572, 180.7}, {2.86, .0508, 156.7}, {3.6, .05, 140.9}, {3.6, .1, 99.3},
		{5.4, .1, 81.3}, {9, .05, 89.3}, {9, .1, 63.0}, {13.5, .1, 51.5}, {7.8, .1, 67.7},
	} {
		if got := resonanceOf(t, Panel{Mass: c.mass, Cavity: c.depth}); math.Abs(got-c.want) > 0.11 {
			t.Errorf("%g kg/m², %g m: f0 = %.2f Hz, want %.1f", c.mass, c.depth, got, c.want)
		}
	}
	// A handbook's 60/√(m·D) (common practice): 59.94 with the exact air spring.
	if got := (Panel{Mass: 10, Cavity: 0.1}).AirSpringHz(testAir); math.Abs(got-59.94) > 0.02 {
		t.Errorf("60/√(mD) comes out as %v", got)
	}
}

// The sheet's own stiffness: the simply supported square's λ = 19.7392 (Leissa,
// NASA SP-160), and its share in the panel's spring.
func TestPanelStiffness(t *testing.T) {
	p := Panel{Mass: 5, Thickness: 0.006, Youngs: 5e9, Poisson: 0.3, Cavity: 0.1, Size: [2]float64{0.5, 0.5}}
	d := 5e9 * math.Pow(0.006, 3) / (12 * (1 - 0.09))
	if want := 19.7392 / (0.25 * 2 * math.Pi) * math.Sqrt(d/5); math.Abs(p.PlateHz()/want-1) > 1e-5 {
		t.Errorf("the plate resonates at %v Hz, want %v", p.PlateHz(), want)
	}
	limp := p
	limp.Youngs = 0
	shallow := func(p Panel) float64 { p.Cavity = 0.002; p.Mass = 500; return resonanceOf(t, p) }
	p.Size = [2]float64{0.3, 0.3}
	k := p.bendingStiffness()
	spring := testAir.Density * testAir.SpeedOfSound * testAir.SpeedOfSound / 0.002
	e, _ := EquivalentOf(Panel{Mass: 500, Thickness: 0.006, Youngs: 5e9, Poisson: 0.3, Cavity: 0.002}, testAir, [2]float64{0.3, 0.3})
	if want := math.Sqrt((k+spring)/500) / (2 * math.Pi); math.Abs(e.Oscillator.Natural/want-1) > 1e-4 {
		t.Errorf("both springs give %v Hz, want %v", e.Oscillator.Natural, want)
	}
	if want := math.Sqrt(spring/500) / (2 * math.Pi); math.Abs(shallow(limp)/want-1) > 1e-4 {
		t.Errorf("the air spring alone gives %v Hz, want %v", shallow(limp), want)
	}
}

// For kD < 0.1 the three resonators are lumped: (c/2π)√(S/(V·l')),
// (c/2π)√(ε/(t'·D)), (1/2π)√(ρc²/(m·D)).
func TestLumpedLimits(t *testing.T) {
	const c = 343.2
	lossless := testAir
	lossless.Viscosity = 1e-12
	lumped := func(a Absorber, want, depth float64) {
		t.Helper()
		e, ok := EquivalentOf(a, lossless, unitSize)
		if !ok {
			t.Fatalf("%s: no resonance", a.Kind())
		}
		kd := 2 * math.Pi * e.Oscillator.Natural / c * depth
		if depth > 0 && kd > 0.1 {
			t.Fatalf("%s: kD = %v is no limit", a.Kind(), kd)
		}
		// The cotangent's next term is (kD)²/3 of the spring's, half in f0.
		if got := e.Oscillator.Natural; math.Abs(got/want-1) > 1e-4+kd*kd/5 {
			t.Errorf("%s: f0 = %v Hz, lumped %v", a.Kind(), got, want)
		}
	}
	n := Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.018, Mouths: 1, Front: [2]float64{0.6, 0.5}}
	wall := math.Sqrt(0.6 * 0.5 / math.Pi)
	whole := 0.018 + 0.85*0.05 + 0.85*0.05*(1-1.25*0.05/wall)
	lumped(n, c/(2*math.Pi)*math.Sqrt(math.Pi*0.0025/(0.05*whole)), 0)

	p := Perforated{Sheet: 0.02, Hole: 0.004, Pitch: 0.05, Cavity: 0.02}
	eps := p.OpenShare()
	lumped(p, c/(2*math.Pi)*math.Sqrt(eps/((0.02+2*holeEnd(0.002, eps))*0.02)), 0.02)

	s := Slotted{Slat: 0.2, Slot: 0.002, Sheet: 0.05, Cavity: 0.02}
	eps = s.OpenShare()
	lumped(s, c/(2*math.Pi)*math.Sqrt(eps/((0.05+2*slotEnd(0.002, eps))*0.02)), 0.02)

	lumped(Panel{Mass: 30, Cavity: 0.02}, 1/(2*math.Pi)*math.Sqrt(1.2041*c*c/(30*0.02)), 0.02)
}

// The perforated plate of 6 mm, holes 5 mm on 25 mm, cavity 100 mm: the
// cotangent's root with Rschevkin's ends is 302.80 Hz, worked out apart.
func TestPerforatedCotangent(t *testing.T) {
	lossless := testAir
	lossless.Viscosity = 1e-12
	e, _ := EquivalentOf(Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.1}, lossless, unitSize)
	if math.Abs(e.Oscillator.Natural-302.80) > 0.1 {
		t.Errorf("f0 = %.2f Hz, want 302.80", e.Oscillator.Natural)
	}
}

// Boxes of 50 l, 20 l and 1 l with both ends 0.85a, worked out apart: a front so
// wide that the inner end is that of a wide wall.
func TestNeckBoxes(t *testing.T) {
	for _, c := range []struct{ diameter, length, volume, want float64 }{
		{.1, .018, .05, 67.45}, {.05, .1, .02, 45.34}, {.04, .05, .001, 211.27},
	} {
		n := Neck{Cavity: c.volume, MouthRadius: c.diameter / 2, Length: c.length, Mouths: 1, Front: [2]float64{1e4, 1e4}}
		lossless := testAir
		lossless.Viscosity = 1e-12
		e, _ := EquivalentOf(n, lossless, n.Front)
		if math.Abs(e.Oscillator.Natural-c.want) > 0.006 {
			t.Errorf("%g mm neck on %g l: %.3f Hz, want %.2f", 1000*c.diameter, 1000*c.volume, e.Oscillator.Natural, c.want)
		}
	}
}

// Maa, J. Acoust. Soc. Am. 104 (1998) 2861: exact Bessel form, end resistance
// ½√(2ηρω), 0.85d; worked out apart from this code.
func TestMicroperforatedMaa(t *testing.T) {
	for _, c := range []struct {
		d, t, eps, depth float64
		peakHz, peak     float64
		at               [4]float64 // α at 125, 250, 500, 1000 Hz
		front            complex128 // of the panel alone at 500 Hz
	}{
		{.3e-3, .3e-3, .01, .1, 547.1, .9030, [4]float64{.1013, .3824, .8899, .4942}, .5215 + .5982i},
		{.8e-3, 1e-3, .01, .05, 542.2, .7918, [4]float64{.0146, .0884, .7493, .2096}, .3633 + 1.7460i},
		{.2e-3, .2e-3, .01, .06, 877.3, .9830, [4]float64{.0538, .2064, .6539, .9590}, .7494 + .3995i},
	} {
		m := Microperforated{Sheet: c.t, Hole: c.d, Pitch: c.d * math.Sqrt(math.Pi/4/c.eps), Cavity: c.depth}
		for i, hz := range []float64{125, 250, 500, 1000} {
			if got := NormalAbsorption(m, hz, testAir); math.Abs(got-c.at[i]) > 2e-4 {
				t.Errorf("%g mm at %g Hz: α = %.4f, want %.4f", 1000*c.d, hz, got, c.at[i])
			}
		}
		if got := m.front(omegaOf(500), testAir) / complex(testAir.Density*testAir.SpeedOfSound, 0); cmplx.Abs(got-c.front) > 3e-4 {
			t.Errorf("%g mm: z = %.4f, want %.4f", 1000*c.d, got, c.front)
		}
		best, at := 0.0, 0.0
		for hz := 400.0; hz < 1000; hz += 0.1 {
			if a := NormalAbsorption(m, hz, testAir); a > best {
				best, at = a, hz
			}
		}
		if math.Abs(at-c.peakHz) > 0.5 || math.Abs(best-c.peak) > 2e-4 {
			t.Errorf("%g mm: peak %.4f at %.1f Hz, want %.4f at %.1f", 1000*c.d, best, at, c.peak, c.peakHz)
		}
	}
}

// Every kind is passive on the real axis, and its impedance is analytic near it
// and real where it should be: z(−ω*) = z(ω)*.
func TestKindsArePassiveAndAnalytic(t *testing.T) {
	all := specimens()
	rapid.Check(t, func(t *rapid.T) {
		s := all[rapid.IntRange(0, len(all)-1).Draw(t, "specimen")]
		a := fitted(s.absorber, unitSize)
		hz := rapid.Float64Range(16, 5000).Draw(t, "hz")
		if z := a.Specific(omegaOf(hz), testAir); real(z) < 0 || cmplx.IsNaN(z) {
			t.Fatalf("%s at %g Hz: z = %v", s.name, hz, z)
		}
		if y := 1 / a.InRoom(omegaOf(hz), 0.1, testAir); real(y) < 0 {
			t.Fatalf("%s at %g Hz: Re Y = %v", s.name, hz, real(y))
		}
		for _, v := range []float64{NormalAbsorption(a, hz, testAir), DiffuseAbsorption(a, hz, FullField, testAir)} {
			if !(v >= 0 && v <= 1+1e-9) {
				t.Fatalf("%s at %g Hz: α = %v", s.name, hz, v)
			}
		}
		// Cauchy-Riemann at a complex frequency.
		w := omegaOf(rapid.Float64Range(16, 250).Draw(t, "low hz")) + complex(0, rapid.Float64Range(1, 300).Draw(t, "δ"))
		h := cmplx.Abs(w) * 1e-4
		along := (a.InRoom(w+complex(h, 0), 0.1, testAir) - a.InRoom(w-complex(h, 0), 0.1, testAir)) / complex(2*h, 0)
		across := (a.InRoom(w+complex(0, h), 0.1, testAir) - a.InRoom(w-complex(0, h), 0.1, testAir)) / complex(0, 2*h)
		if cmplx.Abs(along-across) > 1e-3*cmplx.Abs(along) {
			t.Fatalf("%s at ω = %v: not analytic, dZ/dω = %v along, %v across", s.name, w, along, across)
		}
	})
}

// A unit's impedance belongs to its area: two halves side by side are the whole.
func TestInRoomByArea(t *testing.T) {
	for _, s := range specimens() {
		a := fitted(s.absorber, unitSize)
		if _, isNeck := a.(Neck); isNeck {
			continue
		}
		w := omegaOf(90)
		whole, half := a.InRoom(w, 0.3, testAir), a.InRoom(w, 0.15, testAir)
		if cmplx.Abs(half-2*whole) > 1e-12*cmplx.Abs(half) {
			t.Errorf("%s: half the area has %v, the whole %v", s.name, half, whole)
		}
		// z·ρc/S: what the room sees is the face.
		want := a.Specific(w, testAir) * complex(testAir.Density*testAir.SpeedOfSound/0.3, 0)
		if cmplx.Abs(whole-want) > 1e-9*cmplx.Abs(want) {
			t.Errorf("%s: Z = %v, the face has %v", s.name, whole, want)
		}
	}
}

// The room supplies a mouth's outer end: in the room Z lacks jωρ·0.85a/S.
func TestNeckOuterEnd(t *testing.T) {
	n := Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.018, Mouths: 2, Front: unitSize}
	w := omegaOf(60)
	alone := n.Specific(w, testAir) * complex(testAir.Density*testAir.SpeedOfSound/(unitSize[0]*unitSize[1]), 0)
	want := 1i * w * complex(testAir.Density*0.85*0.05/(2*math.Pi*0.0025), 0)
	if got := alone - n.InRoom(w, 0, testAir); cmplx.Abs(got-want) > 1e-9*cmplx.Abs(want) {
		t.Errorf("the outer end is %v, want %v", got, want)
	}
}

func TestPlaceUnits(t *testing.T) {
	at := Placement{Surface: acoustics.Left, Centre: [2]float64{1, 0.8}, Size: [2]float64{1.2, 0.6}, Units: 2}
	for _, c := range []struct {
		absorber Absorber
		units    int
		area     float64
	}{
		// 343/250/6 m = 0.2287 m: 1.2 m is cut into 6, 0.6 m into 3.
		{Porous{Thickness: .05, FlowResistivity: 1e4}, 2 * 6 * 3, 1.44},
		{Panel{Mass: 5, Cavity: .1}, 2, 1.44},
		{Neck{Cavity: .05, MouthRadius: .05, Length: .02, Mouths: 3}, 2, 2 * 3 * math.Pi * .0025},
	} {
		units := PlaceUnits(c.absorber, testAir, at, 7)
		var area float64
		lo, hi := math.Inf(1), math.Inf(-1)
		for _, u := range units {
			area += u.Patch.Area()
			lo, hi = min(lo, u.Patch.Centre[0]-u.Patch.Size[0]/2), max(hi, u.Patch.Centre[0]+u.Patch.Size[0]/2)
			if u.Owner != 7 || u.Patch.Surface != acoustics.Left {
				t.Errorf("%s: unit %+v", c.absorber.Kind(), u)
			}
		}
		if len(units) != c.units || math.Abs(area-c.area) > 1e-9 {
			t.Errorf("%s: %d units of %v m², want %d of %v", c.absorber.Kind(), len(units), area, c.units, c.area)
		}
		if math.Abs(lo-0.4) > 1e-9 || math.Abs(hi-2.8) > 1e-9 {
			t.Errorf("%s: the units reach from %v to %v m, want 0.4 to 2.8", c.absorber.Kind(), lo, hi)
		}
	}
}
