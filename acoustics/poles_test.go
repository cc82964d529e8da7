package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"testing"
)

func polesOf(t testing.TB, f *Field, upTo float64) Poles {
	t.Helper()
	p, err := f.Poles(context.Background(), upTo, nil)
	if err != nil {
		t.Fatal(err)
	}
	if p.Found != p.Counted {
		t.Errorf("%d poles found, the argument principle counts %d", p.Found, p.Counted)
	}
	return p
}

// One unit: every pole must be a zero of Z + jωρG with G by the slow twin's sums.
func TestPolesAgainstLiteral(t *testing.T) {
	r := studio(t)
	u := bottleAt(r.Air, Back, 0.3, 0.3, 45)
	f := newTestField(t, r, studioSources(), []Point{{2.9, 1.93, 1.2}}, []Unit{u}, 1)
	l := newLiteral(r, 1500, 900)
	port := u.Patch.spans(r.Box)
	secular := func(w complex128) complex128 {
		return u.Impedance(w) + 1i*w*complex(r.Air.Density, 0)*(l.gamma(port, port, w)+complex(u.Patch.mouthCorrection(), 0))
	}
	poles := polesOf(t, f, 70)
	var all []Oscillator
	for _, p := range poles.Modes {
		all = append(all, p.Oscillator)
	}
	for _, p := range poles.Absorbers {
		all = append(all, p.Oscillator)
	}
	if want := len(r.Modes(70)) + 1; len(all) != want {
		t.Fatalf("%d poles up to 70 Hz, want %d: the modes and the unit", len(all), want)
	}
	for _, p := range all {
		// Newton's method on the twin from the root found.
		w0 := 2 * math.Pi * p.Natural
		root := complex(math.Sqrt(w0*w0-p.Decay*p.Decay), p.Decay)
		for range 4 {
			h := root * 1e-6
			root -= secular(root) * 2 * h / (secular(root+h) - secular(root-h))
		}
		hz, t60 := cmplx.Abs(root)/(2*math.Pi), 3*math.Ln10/imag(root)
		if !near(hz, p.Natural, 2e-5) || !near(t60, p.T60(), 1e-3) {
			t.Errorf("pole at %.5f Hz, T60 %.5f s; the twin's is at %.5f Hz, %.5f s", p.Natural, p.T60(), hz, t60)
		}
	}
}

// A small lossless bottle tuned in its place to a lossless mode splits it by
// ±√μ/2 (Fahy & Schofield, J. Sound Vib. 72 (1980) 365), μ = V_b·û²/(VΛ).
func TestTunedPairSplits(t *testing.T) {
	const tiny = 1e-3 // so weak a loss that only the split is seen
	box := Box{5.3, 3.86, 2.58}
	r := Room{box, Air{SpeedOfSound: 343, Density: 1.2}, Walls{flat(1e-5), flat(1e-5), {}, {}, {}, {}}}
	mode := r.Modes(33)[0] // (1,0,0)
	a, length := 0.03, 0.15
	area := math.Pi * a * a
	patch := Patch{Surface: Back, Centre: [2]float64{1.2, 1.1}, MouthRadius: a, Mouths: 1}
	load := NewAirLoads(box).Of(patch)
	mass := 1.2 * (length/area + load)
	w := 2 * math.Pi * mode.Hz
	volume := 1.2 * 343 * 343 / (mass * w * w)
	u := Unit{Patch: patch, Impedance: bottle(r.Air, area, length, volume, tiny), Natural: mode.Hz}
	poles := polesOf(t, newTestField(t, r, studioSources(), []Point{{2.9, 1.93, 1.2}}, []Unit{u}, 1), 33)
	if len(poles.Modes) != 1 || len(poles.Absorbers) != 1 {
		t.Fatalf("%d mode poles and %d of the bottle, want one each", len(poles.Modes), len(poles.Absorbers))
	}
	mean := box.Mean(mode.Mode, patch)
	mu := volume * mean * mean / (box.Volume() * mode.Norm)
	split := math.Abs(poles.Modes[0].Natural-poles.Absorbers[0].Natural) / mode.Hz
	if !near(split, math.Sqrt(mu), 0.03) {
		t.Errorf("the pair splits by %.5f, √μ is %.5f", split, math.Sqrt(mu))
	}
}

// With ζ_a − ζ_n = √μ both poles meet (physics of a coupled pair): more damping
// parts their decays, less parts their frequencies.
func TestTunedPairMerges(t *testing.T) {
	box := Box{5.3, 3.86, 2.58}
	r := Room{box, Air{SpeedOfSound: 343, Density: 1.2}, Walls{flat(0.01), flat(0.01), {}, {}, {}, {}}}
	mode := r.Modes(33)[0]
	a, length := 0.03, 0.15
	area := math.Pi * a * a
	patch := Patch{Surface: Back, Centre: [2]float64{1.2, 1.1}, MouthRadius: a, Mouths: 1}
	mass := 1.2 * (length/area + NewAirLoads(box).Of(patch))
	w := 2 * math.Pi * mode.Hz
	volume := 1.2 * 343 * 343 / (mass * w * w)
	mean := box.Mean(mode.Mode, patch)
	mu := volume * mean * mean / (box.Volume() * mode.Norm)
	pair := func(share float64) (apart, decays float64) {
		resistance := 2 * (mode.Oscillator().DampingRatio() + share*math.Sqrt(mu)) * w * mass
		u := Unit{Patch: patch, Impedance: bottle(r.Air, area, length, volume, resistance), Natural: mode.Hz}
		p := polesOf(t, newTestField(t, r, studioSources(), []Point{{2.9, 1.93, 1.2}}, []Unit{u}, 1), 33)
		if len(p.Modes) != 1 || p.Modes[0] == nil || len(p.Absorbers) != 1 {
			t.Fatalf("share %v: poles %+v", share, p)
		}
		m, b := p.Modes[0].Oscillator, p.Absorbers[0].Oscillator
		return math.Abs(m.Natural-b.Natural) / mode.Hz / math.Sqrt(mu), math.Abs(m.Decay-b.Decay) / w / math.Sqrt(mu)
	}
	apart, decays := pair(0.5)
	if apart < 0.7 || decays > 0.2 {
		t.Errorf("underdamped: %.2f√μ apart in frequency, %.2f√μ in decay", apart, decays)
	}
	apart, decays = pair(2)
	if apart > 0.2 || decays < 1.4 {
		t.Errorf("overdamped: %.2f√μ apart in frequency, %.2f√μ in decay", apart, decays)
	}
}

// A mode that no unit touches rings on as it did.
func TestUntouchedModesStay(t *testing.T) {
	r := studio(t)
	u := bottleAt(r.Air, Back, r.Box.Width/2, 0.3, 44)
	f := newTestField(t, r, []Source{{Point{1, 0.7, 1}, 1, 0}}, []Point{{2.9, 1.2, 1.1}}, []Unit{u}, 1)
	poles := polesOf(t, f, 120)
	for i, m := range r.Modes(120) {
		odd := m.Order[1]%2 == 1
		p := poles.Modes[i]
		same := near(p.Natural, m.Hz, 1e-12) && near(p.Decay, m.Damping.Total(), 1e-9)
		if same != odd {
			t.Errorf("%v: touched is %v, but the pole is at %v Hz against %v", m, !odd, p.Natural, m.Hz)
		}
		if odd && math.Abs(p.LevelDB[0]-f.ModeLevel(m, 0)) > 0.01 {
			t.Errorf("%v: untouched, yet its level goes from %v to %v dB", m, f.ModeLevel(m, 0), p.LevelDB[0])
		}
	}
}

// Two identical boxes in mirrored corners bring two poles, one even and one odd.
func TestIdenticalUnits(t *testing.T) {
	r := studio(t)
	units := []Unit{bottleAt(r.Air, Back, 0.4, 0.3, 44), bottleAt(r.Air, Back, r.Box.Width-0.4, 0.3, 44)}
	f := newTestField(t, r, []Source{{Point{1.1, 1.93, 1.2}, 1, 0}}, []Point{{2.9, 1.93, 1.2}}, units, 1)
	poles := polesOf(t, f, 100)
	if len(poles.Absorbers) != 2 {
		t.Fatalf("%d poles of the boxes, want 2", len(poles.Absorbers))
	}
	// Source and seat on the mirror plane never hear the odd one.
	silent := 0
	for _, p := range poles.Absorbers {
		if math.IsNaN(p.LevelDB[0]) || p.LevelDB[0] < -100 {
			silent++
		}
	}
	if silent != 1 {
		t.Errorf("%d of the boxes' poles are silent on the mirror plane, want 1", silent)
	}
}

// The treated room's response near the axis is the sum of its poles: a pole far
// enough from the others peaks at the level that it states.
func TestPoleLevelIsItsPeak(t *testing.T) {
	r := studio(t)
	r.Air = Air{SpeedOfSound: 343.9, Density: 1.2} // no loss in air
	for i := range r.Walls {
		r.Walls[i] = flat(2e-4) // so sharp that each pole stands alone
	}
	f := newTestField(t, r, studioSources()[:1], []Point{{2.9, 1.5, 1.1}}, []Unit{bottleAt(r.Air, Back, 0.3, 0.3, 45)}, 1)
	poles := polesOf(t, f, 50)
	for i, p := range poles.Modes {
		hz := math.Sqrt(p.Natural*p.Natural - math.Pow(p.Decay/(2*math.Pi), 2))
		if p.T60() < 5 {
			continue
		}
		got := levelsOf(t, f, []float64{hz}).Treated[0][0]
		if math.Abs(got-p.LevelDB[0]) > 0.3 {
			t.Errorf("pole %d at %.2f Hz, T60 %.1f s: %.2f dB on the curve, its own level %.2f", i, hz, p.T60(), got, p.LevelDB[0])
		}
	}
}

// All units together: nothing is lost, nothing rings longer by much, all decay.
func TestPolesOfManyUnits(t *testing.T) {
	f := studioField(t, eightBottles(studio(t)))
	poles := polesOf(t, f, 150)
	if len(poles.Modes) != len(studio(t).Modes(150)) {
		t.Errorf("%d mode poles, %d modes", len(poles.Modes), len(studio(t).Modes(150)))
	}
	for i, p := range poles.Modes {
		if p != nil && !(p.Decay > 0) {
			t.Errorf("pole %d does not decay: %v", i, p)
		}
	}
	for i := range poles.Absorbers {
		if i > 0 && poles.Absorbers[i].Natural < poles.Absorbers[i-1].Natural {
			t.Error("the units' poles are not in order")
		}
	}
}
