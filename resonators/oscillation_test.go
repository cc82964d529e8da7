package resonators

import (
	"math"
	"strings"
	"testing"
)

// Q = (ω0/2R)·dX/dω: a box that is all lumped has Q = √(L/C)/R by hand.
func TestQualityOfLumpedBox(t *testing.T) {
	const gauze = 30.0
	lossless := testAir
	lossless.Viscosity = 1e-12
	n := Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.1, Mouths: 1, Gauze: gauze, Front: [2]float64{0.6, 0.5}}
	e, ok := EquivalentOf(n, lossless, n.Front)
	if !ok {
		t.Fatal("no resonance")
	}
	var (
		s    = math.Pi * 0.0025
		wall = math.Sqrt(0.3 / math.Pi)
		l    = 0.1 + 0.85*0.05 + 0.85*0.05*(1-1.25*0.05/wall)
		mass = testAir.Density * l / s
		k    = testAir.Density * 343.2 * 343.2 / 0.05
		w0   = math.Sqrt(k / mass)
		q    = w0 * mass / (gauze / s)
	)
	for name, v := range map[string][2]float64{
		"f0": {e.Oscillator.Natural, w0 / (2 * math.Pi)}, "Q": {e.Oscillator.Q(), q},
		"mass": {e.Mass, mass}, "stiffness": {e.Stiffness, k}, "resistance": {e.Resistance, gauze / s},
	} {
		if math.Abs(v[0]/v[1]-1) > 1e-5 {
			t.Errorf("%s = %v, by hand %v", name, v[0], v[1])
		}
	}
	b := bandOfAction(e.Oscillator)
	// The band's ends are where the reactance equals the resistance.
	for _, hz := range b {
		z := n.alone(omegaOf(hz), lossless)
		if math.Abs(math.Abs(imag(z))/real(z)-1) > 1e-4 {
			t.Errorf("at %v Hz, an end of the band, Z = %v", hz, z)
		}
	}
}

// From ζ = 1/√2 on there is no peak, and the report has none to print.
func TestReportOfHeavyDamping(t *testing.T) {
	n := Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.1, Mouths: 1, Gauze: 900, Front: [2]float64{0.6, 0.5}}
	r := Analyse(n, testAir, n.Front)
	if r.Oscillator == nil {
		t.Fatal("no oscillator")
	}
	if z := r.Oscillator.DampingRatio(); z < 1/math.Sqrt2 {
		t.Fatalf("ζ = %v is not heavy", z)
	}
	if hz, ok := r.Oscillator.PeakHz(); ok {
		t.Errorf("a peak at %v Hz", hz)
	}
}

func TestBroadband(t *testing.T) {
	for _, a := range []Absorber{
		Porous{Thickness: 0.05, FlowResistivity: 10000, Gap: 0.1},
		// A sheet so light that it meets no spring between 5 Hz and 5 kHz.
		Microperforated{Sheet: 1e-4, Hole: 5e-5, Pitch: 1e-3, Cavity: 0.001},
	} {
		r := Analyse(a, testAir, unitSize)
		if r.Oscillator != nil || r.Band != [2]float64{} {
			t.Errorf("%s: %+v, %v is not broadband", a.Kind(), r.Oscillator, r.Band)
		}
	}
}

// Each derivative against a fresh look at an absorber a little different.
func TestSensitivitiesAreDerivatives(t *testing.T) {
	box := Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.1, Mouths: 1, Gauze: 20, Front: [2]float64{0.6, 0.5}}
	panel := Panel{Mass: 5, Thickness: 0.006, Youngs: 5e9, Poisson: 0.3, LossFactor: 0.03, Cavity: 0.1}
	size := [2]float64{1.2, 0.6}
	found := map[string]Sensitivity{}
	for _, s := range Sensitivities(box, testAir, box.Front) {
		found["box "+s.Dimension] = s
	}
	for _, s := range Sensitivities(panel, testAir, size) {
		found["panel "+s.Dimension] = s
	}
	const h = 1e-3
	f0 := func(a Absorber, size [2]float64) float64 {
		e, _ := EquivalentOf(a, testAir, size)
		return e.Oscillator.Natural
	}
	for name, c := range map[string]struct {
		value    float64
		up, down Absorber
		size     [2]float64
	}{
		"box Volume":      {0.05, func() Absorber { b := box; b.Cavity *= 1 + h; return b }(), func() Absorber { b := box; b.Cavity *= 1 - h; return b }(), box.Front},
		"box MouthRadius": {0.05, func() Absorber { b := box; b.MouthRadius *= 1 + h; return b }(), func() Absorber { b := box; b.MouthRadius *= 1 - h; return b }(), box.Front},
		"panel Mass":      {5, func() Absorber { p := panel; p.Mass *= 1 + h; return p }(), func() Absorber { p := panel; p.Mass *= 1 - h; return p }(), size},
		"panel Cavity":    {0.1, func() Absorber { p := panel; p.Cavity *= 1 + h; return p }(), func() Absorber { p := panel; p.Cavity *= 1 - h; return p }(), size},
	} {
		s, ok := found[name]
		if !ok {
			t.Errorf("%s is not among the dimensions", name)
			continue
		}
		want := (f0(c.up, c.size) - f0(c.down, c.size)) / (2 * h * c.value)
		if got := s.F0Derivative(); math.Abs(got/want-1) > 1e-3 {
			t.Errorf("%s: ∂f0 = %v, by difference %v", name, got, want)
		}
	}
	// Common practice: f0 moves by half the relative error of mass or depth.
	s := found["panel Mass"]
	limp, _ := EquivalentOf(panel, testAir, size)
	if got := s.F0Derivative() * 5 / limp.Oscillator.Natural; math.Abs(got+0.5) > 0.01 {
		t.Errorf("a relative change of mass moves f0 by %v of it, want −0.5", got)
	}
	if got, want := s.Tolerance(2), math.Abs(2/s.F0Derivative()); got != want {
		t.Errorf("tolerance %v, want %v", got, want)
	}
}

func TestPanelIsWarnedOfItsPlateResonance(t *testing.T) {
	// The air spring's resonance at ρc²/(mD), the plate's by its side length.
	plain := Panel{Mass: 5, Thickness: 0.004, Youngs: 4e9, Poisson: 0.3, LossFactor: 0.03, Cavity: 0.1}
	warned := func(p Panel, side float64) bool {
		w := strings.Join(Analyse(p, testAir, [2]float64{side, side}).Warnings, " ")
		return strings.Contains(w, "plate")
	}
	for side := 0.25; side < 1.5; side *= 1.1 {
		p := plain
		p.Size = [2]float64{side, side}
		ratio := p.PlateHz() / p.AirSpringHz(testAir)
		if want := ratio >= 1.0 && ratio < 1.5; want && !warned(plain, side) {
			t.Errorf("side %.2f m: the plate is at %.2f of the air spring, and nothing is said", side, ratio)
		}
		if ratio < 0.5 && warned(plain, side) {
			t.Errorf("side %.2f m: the plate is at %.2f of the air spring, and it is warned of", side, ratio)
		}
	}
}

// The lowest crossing counts, however narrow: a stiff sheet before a deep empty cavity
// has one just below the cavity's first mode, at every depth alike.
func TestLowestCrossingIsNotSteppedOver(t *testing.T) {
	for depth := 0.9; depth < 1.9; depth += 0.037 {
		p := Panel{Mass: 7.2, Thickness: 0.012, Youngs: 7e9, Poisson: 0.3, LossFactor: 0.03, Cavity: depth}
		e, ok := EquivalentOf(p, testAir, [2]float64{0.3, 0.3})
		first := testAir.SpeedOfSound / (2 * depth)
		if !ok || e.Oscillator.Natural >= first || e.Oscillator.Natural < 0.98*first {
			t.Errorf("%.3f m deep: %.2f Hz, the cavity's first mode is at %.2f Hz", depth, e.Oscillator.Natural, first)
		}
		if e.Mass <= 0 || e.Oscillator.Decay < 0 {
			t.Errorf("%.3f m deep: mass %v, decay %v", depth, e.Mass, e.Oscillator.Decay)
		}
	}
}
