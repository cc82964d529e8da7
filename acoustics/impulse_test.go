package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"testing"
)

func treatedStudio(t testing.TB) (*Field, Poles) {
	t.Helper()
	f := studioField(t, eightBottles(studio(t)))
	p, err := f.Poles(context.Background(), 200, nil)
	if err != nil {
		t.Fatal(err)
	}
	return f, p
}

// The decay of a band that holds one pole is that pole's: T60 by Schroeder's
// integration and a straight line through it is 3·ln10/Im ω. The line crosses
// the ripple that the oscillation itself leaves on its energy, of a share δ/ω:
// 1 % covers it.
func TestDecayOfOnePole(t *testing.T) {
	const ripple = 0.01
	_, poles := treatedStudio(t)
	for _, q := range poles.Modes {
		if q == nil || q.Residues[0] == 0 {
			continue
		}
		one := Partials{{q.Omega, q.Residues[0]}}
		d, ok := one.Backward(ThirdOctave(int(math.Round(10 * math.Log10(q.Natural/1000)))))
		if !ok {
			t.Fatalf("%.1f Hz: nothing in its own band", q.Natural)
		}
		for _, stretch := range [][2]float64{{0, -10}, {-5, -25}, {-5, -35}} {
			if got := d.Time(stretch[0], stretch[1]); !near(got, q.T60(), ripple) {
				t.Errorf("%.2f Hz: T60 from the decay %v: %.4f s, the pole's %.4f s", q.Natural, stretch, got, q.T60())
			}
		}
	}
}

// Late in the decay of a whole room only the slowest pole of a band is left, and
// the slope is its.
func TestDecayEndsAtTheSlowestPole(t *testing.T) {
	_, poles := treatedStudio(t)
	all := poles.Partials(0)
	band := ThirdOctave(-12) // 63 Hz
	d, _ := all.Backward(band)
	slowest := math.Inf(1)
	for _, q := range all {
		if band.response(real(q.Omega)/(2*math.Pi)) > faint {
			slowest = math.Min(slowest, imag(q.Omega))
		}
	}
	t60 := 3 * math.Ln10 / slowest
	got := -60 / ((d.LevelDB(9*t60) - d.LevelDB(8*t60)) / t60)
	if !near(got, t60, 0.02) {
		t.Errorf("the end of the decay has T60 = %.3f s, the slowest pole %.3f s", got, t60)
	}
}

// The closed form against the obvious computation: the response sampled in
// steps, squared and added up from the end.
func TestBackwardAgainstSamples(t *testing.T) {
	_, poles := treatedStudio(t)
	all := poles.Partials(0)
	band := ThirdOctave(-13)
	d, _ := all.Backward(band)
	var filtered Partials
	for _, q := range all {
		g := band.response(real(q.Omega) / (2 * math.Pi))
		filtered = append(filtered, Partial{q.Omega, q.Residue * complex(g, 0)})
	}
	const step = 2e-5 // s, a thousandth of a period
	rest := make([]float64, 300_000)
	var sum float64
	for i := len(rest) - 1; i >= 0; i-- {
		h := filtered.Impulse((float64(i) + 0.5) * step)
		sum += h * h * step
		rest[i] = sum
	}
	for _, at := range []float64{0, 0.05, 0.2, 0.5, 1} {
		want := 10 * math.Log10(rest[int(math.Round(at/step))]/rest[0])
		// What the filter leaves below 60 dB down is missing from the closed form.
		if got := d.LevelDB(at); math.Abs(got-want) > 0.02 {
			t.Errorf("at %.2f s %.3f dB, by samples %.3f dB", at, got, want)
		}
	}
}

// The impulse response belongs to the level: what its Fourier transform leaves of
// the pressure at the seat, the uniform mode and the far ones, runs smoothly
// through every resonance, in magnitude and phase. Over a half-power width, or 2 % of the frequency where that is less, it
// bends by less than 2 % of the resonance's own peak; a residue that is off by
// more would leave more of the peak behind.
func TestPartialsAreThePressuresPoles(t *testing.T) {
	const bend = 0.02
	f, poles := treatedStudio(t)
	s := f.newScene()
	for name, list := range map[string]Partials{"bare": f.BarePartials(240, 0), "treated": poles.Partials(0)} {
		rest := func(omega float64) complex128 {
			s.at(complex(omega, 0))
			v := s.treated[0]
			if name == "bare" {
				v = s.bare[0]
			}
			for _, q := range list {
				a, r := 1i*q.Residue, 1i*q.Omega
				v -= a/(complex(0, omega)-r) + cmplx.Conj(a)/(complex(0, omega)-cmplx.Conj(r))
			}
			return v
		}
		seen := 0
		for _, q := range list {
			hz := real(q.Omega) / (2 * math.Pi)
			if hz < 25 || hz > 120 || q.Residue == 0 {
				continue
			}
			seen++
			half := math.Min(imag(q.Omega), 0.02*real(q.Omega))
			lo, mid, hi := rest(real(q.Omega)-half), rest(real(q.Omega)), rest(real(q.Omega)+half)
			if got, peak := cmplx.Abs(mid-(lo+hi)/2), cmplx.Abs(q.Residue)/imag(q.Omega); got > bend*peak {
				t.Errorf("%s, %.1f Hz: the rest bends by %.3g at a peak of %.3g", name, hz, got, peak)
			}
		}
		if seen < 10 {
			t.Errorf("%s: only %d resonances seen", name, seen)
		}
	}
}

// The bare partials are those that the pole search finds without units, residues
// and all, whatever the loudspeakers' delays.
func TestBarePartialsAreTheUntouchedPoles(t *testing.T) {
	sources := studioSources()
	sources[0].Delay, sources[1].Delay = 0.004, 0.021
	f := newTestField(t, studio(t), sources, []Point{{2.9, 1.93, 1.2}}, nil, 1)
	p, err := f.Poles(context.Background(), 120, nil)
	if err != nil {
		t.Fatal(err)
	}
	bare, found := f.BarePartials(120, 0), p.Partials(0)
	i := 0
	for _, q := range bare {
		if cmplx.Abs(q.Residue) == 0 || i < len(found) && q.Omega != found[i].Omega {
			continue
		}
		if cmplx.Abs(q.Residue-found[i].Residue) > 1e-9*cmplx.Abs(q.Residue) {
			t.Errorf("%.2f Hz: residue %v, the search's %v", real(q.Omega)/(2*math.Pi), q.Residue, found[i].Residue)
		}
		i++
	}
	if i != len(found) || i < 10 {
		t.Errorf("%d of %d poles compared", i, len(found))
	}
}

// Under Ringing every partial alone falls by 60 dB in its T60, at each frequency.
func TestRingingFallsByT60(t *testing.T) {
	q := Partial{complex(2*math.Pi*50, 6.9), complex(3, -2)}
	t60 := 3 * math.Ln10 / 6.9
	// Whole periods apart, so that partial and twin have the same phases.
	period := 1.0 / 50
	later := math.Round(t60/period) * period
	l := Partials{q}.Ringing([]float64{20, 50, 90}, []float64{0, later})
	for i := range l[0] {
		if fall := l[0][i] - l[1][i]; math.Abs(fall-60*later/t60) > 1e-6 {
			t.Errorf("it falls by %.6f dB in %.3f s", fall, later)
		}
	}
}

func BenchmarkRinging(b *testing.B) {
	_, poles := treatedStudio(b)
	list := poles.Partials(0)
	hz, times := logSpaced(16, 250, 120), make([]float64, 40)
	for i := range times {
		times[i] = float64(i) * 0.025
	}
	for b.Loop() {
		list.Ringing(hz, times)
	}
}

func BenchmarkBackward(b *testing.B) {
	_, poles := treatedStudio(b)
	list := poles.Partials(0)
	for b.Loop() {
		for k := -17; k <= -7; k++ {
			if d, ok := list.Backward(ThirdOctave(k)); ok {
				d.Time(-5, -25)
			}
		}
	}
}
