package acoustics

import (
	"context"
	"errors"
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

func newTestField(t testing.TB, r Room, s []Source, seats []Point, units []Unit, factor float64) *Field {
	t.Helper()
	f, err := newField(context.Background(), r, s, seats, units, 250, factor, nil)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func levelsOf(t testing.TB, f *Field, hz []float64) Levels {
	t.Helper()
	l, err := f.Levels(context.Background(), hz)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// The levels must be those of the slow twin, which shares no static sum, no
// truncation and no solver with the field.
func TestLevelsAgainstLiteral(t *testing.T) {
	r := studio(t)
	units := eightBottles(r)[:3]
	sources := []Source{{Point{1.1, 1.18, 1.2}, 1, 0}, {Point{1.3, 2.68, 1.3}, -0.7, 0.004}}
	seat := Point{2.9, 1.83, 1.25}
	f := newTestField(t, r, sources, []Point{seat}, units, 1)
	l := newLiteral(r, 1800, 900)
	hz := []float64{16, 27.3, 32.4, 44.6, 55.2, 66.6, 83.1, 101, 137, 180, 222, 250}
	levels := levelsOf(t, f, hz)
	for i, x := range hz {
		bare, treated := l.levels(sources, seat, units, x)
		if d := math.Abs(levels.Bare[0][i] - bare); d > 0.02 {
			t.Errorf("bare at %g Hz: %.4f dB, literal %.4f", x, levels.Bare[0][i], bare)
		}
		if d := math.Abs(levels.Treated[0][i] - treated); d > 0.05 {
			t.Errorf("treated at %g Hz: %.4f dB, literal %.4f", x, levels.Treated[0][i], treated)
		}
	}
}

// Between rigid walls in a medium that damps every wave alike the response is
// the sum of image sources: exp(−jkr)/(4πr) over all images. A complex ω below
// the real axis is such a medium.
func TestResponseAgainstImageSources(t *testing.T) {
	box := Box{5.3, 3.86, 2.58}
	r := Room{box, Air{SpeedOfSound: 343, Density: 1.2}, Walls{}}
	s, e := Point{1.1, 1.18, 1.2}, Point{2.9, 1.93, 1.1}
	f := newTestField(t, r, []Source{{s, 1, 0}}, []Point{e}, nil, 1)
	tr := f.newTransfer()
	for _, hz := range []float64{20, 45, 64.7, 100, 173, 250} {
		omega := complex(2*math.Pi*hz, -90)
		tr.at(omega, -1)
		got, want := tr.direct(0, 0), imageSum(box, s, e, omega/343)
		// A thousandth of the direct sound.
		if cmplx.Abs(got-want) > 4e-5 {
			t.Errorf("%g Hz: Γ = %v, images %v", hz, got, want)
		}
	}
}

func imageSum(b Box, s, e Point, k complex128) complex128 {
	var (
		sum   complex128
		reach = -22 / imag(k) // 190 dB down
		d     = b.Dimensions()
		n     [3]int
		at    [3][]float64
	)
	for axis := range n {
		n[axis] = int(reach/(2*d[axis])) + 1
		for m := -n[axis]; m <= n[axis]; m++ {
			at[axis] = append(at[axis], 2*float64(m)*d[axis]+s[axis]-e[axis], 2*float64(m)*d[axis]-s[axis]-e[axis])
		}
	}
	for _, x := range at[0] {
		for _, y := range at[1] {
			for _, z := range at[2] {
				dist := math.Sqrt(x*x + y*y + z*z)
				if dist < reach {
					sum += cmplx.Exp(-1i*k*complex(dist, 0)) / complex(4*math.Pi*dist, 0)
				}
			}
		}
	}
	return sum
}

// Doubling how far modes are summed one by one moves no level by 0.1 dB.
func TestLevelsDoNotShowTruncation(t *testing.T) {
	hz := logSpaced(16, 250, 120)
	for name, box := range map[string]Box{"studio": {5.3, 3.86, 2.58}, "booth": {2, 1.6, 2.2}, "hall": {20, 13, 6}} {
		wall := flat(0.08)
		r := Room{box, testAir(t), Walls{wall, wall, wall, wall, wall, wall}}
		units := []Unit{bottleAt(r.Air, Back, 0.3, 0.3, 40), bottleAt(r.Air, Left, box.Length/3, 0.4, 80)}
		s := []Source{{Point{box.Length * 0.2, box.Width * 0.3, 1.2}, 1, 0}}
		seats := []Point{{box.Length * 0.6, box.Width * 0.55, 1.1}, {box.Length*0.2 + 0.1, box.Width * 0.3, 1.2}}
		once := levelsOf(t, newTestField(t, r, s, seats, units, 1), hz)
		twice := levelsOf(t, newTestField(t, r, s, seats, units, 2), hz)
		worst := 0.0
		for e := range seats {
			for i := range hz {
				worst = math.Max(worst, math.Abs(once.Bare[e][i]-twice.Bare[e][i]))
				worst = math.Max(worst, math.Abs(once.Treated[e][i]-twice.Treated[e][i]))
			}
		}
		if worst > 0.1 {
			t.Errorf("%s: doubling the limit moves a level by %.3f dB", name, worst)
		}
	}
}

// Source and receiver may change places, with absorbers in the room or not.
func TestReciprocity(t *testing.T) {
	r := studio(t)
	units := eightBottles(r)
	hz := logSpaced(16, 250, 40)
	rapid.Check(t, func(t *rapid.T) {
		point := func(name string) Point {
			var p Point
			for i, l := range r.Box.Dimensions() {
				p[i] = rapid.Float64Range(0.05, l-0.05).Draw(t, name)
			}
			return p
		}
		a, b := point("a"), point("b")
		if math.Hypot(math.Hypot(a[0]-b[0], a[1]-b[1]), a[2]-b[2]) < 0.1 {
			t.Skip("nearer than the model's 0.1 m")
		}
		there, err := NewField(context.Background(), r, []Source{{a, 1, 0}}, []Point{b}, units, 250)
		if err != nil {
			t.Fatal(err)
		}
		back, err := there.Rearranged(context.Background(), []Source{{b, 1, 0}}, []Point{a}, units)
		if err != nil {
			t.Fatal(err)
		}
		x, _ := there.Levels(context.Background(), hz)
		y, _ := back.Levels(context.Background(), hz)
		for i := range hz {
			if math.Abs(x.Bare[0][i]-y.Bare[0][i]) > 1e-6 || math.Abs(x.Treated[0][i]-y.Treated[0][i]) > 1e-6 {
				t.Fatalf("%g Hz: %v and %v dB there, %v and %v back", hz[i], x.Bare[0][i], x.Treated[0][i], y.Bare[0][i], y.Treated[0][i])
			}
		}
	})
}

// A room k times as large, with k times as long waves, has the same levels less
// 20 log10 k (the monopole's own at 1 m is the reference).
func TestLevelsScale(t *testing.T) {
	const k = 1.7
	still := Air{SpeedOfSound: 343, Density: 1.2}
	wall := flat(0.06)
	small := Room{Box{5.3, 3.86, 2.58}, still, Walls{wall, wall, wall, wall, wall, wall}}
	large := Room{Box{5.3 * k, 3.86 * k, 2.58 * k}, still, small.Walls}
	s, e := Point{1.1, 1.18, 1.2}, Point{2.9, 1.93, 1.2}
	scaled := func(p Point) Point { return Point{p[0] * k, p[1] * k, p[2] * k} }
	hz := []float64{34, 55, 82, 121}
	var low []float64
	for _, x := range hz {
		low = append(low, x/k)
	}
	a := levelsOf(t, newTestField(t, small, []Source{{s, 1, 0}}, []Point{e}, nil, 1), hz)
	b := levelsOf(t, newTestField(t, large, []Source{{scaled(s), 1, 0}}, []Point{scaled(e)}, nil, 1), low)
	for i := range hz {
		if d := a.Bare[0][i] - b.Bare[0][i] - 20*math.Log10(k); math.Abs(d) > 1e-3 {
			t.Errorf("%g Hz: off by %v dB", hz[i], d)
		}
	}
}

// Gain, polarity and delay: a source of −6 dB lies 6 dB lower; two at one place
// in opposition are silent; a common delay changes nothing.
func TestSourceAmplitudes(t *testing.T) {
	r := studio(t)
	seat := []Point{{2.9, 1.93, 1.2}}
	at := Point{1.1, 1.2, 1.2}
	hz := []float64{30, 61, 130}
	level := func(s ...Source) []float64 { return levelsOf(t, newTestField(t, r, s, seat, nil, 1), hz).Bare[0] }
	one := level(Source{at, 1, 0})
	half := level(Source{at, 0.5, 0})
	late := level(Source{at, 1, 0.02})
	none := level(Source{at, 1, 0}, Source{at, -1, 0})
	for i := range hz {
		if math.Abs(one[i]-half[i]-20*math.Log10(2)) > 1e-9 || math.Abs(one[i]-late[i]) > 1e-9 || none[i] > -200 {
			t.Errorf("%g Hz: %v; halved %v, late %v, opposed %v dB", hz[i], one[i], half[i], late[i], none[i])
		}
	}
}

// Energy: what a loudspeaker puts in goes into units, walls and air. The modes'
// amplitudes follow one by one from the units' velocities, and each loses
// V·Λ·|A|²·δ/ρc².
func TestEnergyBalance(t *testing.T) {
	r := studio(t)
	units := eightBottles(r)
	s := Source{Point{1.1, 1.18, 1.2}, 1, 0}
	f := newTestField(t, r, []Source{s}, []Point{{2.9, 1.93, 1.2}}, units, 1)
	scene := f.newScene()
	c, rho, v := r.Air.SpeedOfSound, r.Air.Density, r.Box.Volume()
	for _, hz := range []float64{25, 32.4, 44.6, 55, 66, 90, 140} {
		omega := 2 * math.Pi * hz
		scene.at(complex(omega, 0))
		// The drive is a unit volume acceleration over 4π; with p = Γ the source's
		// volume velocity is 1/(jωρ).
		q := 1 / complex(0, omega*rho)
		var into, lost, atUnits float64
		for i, u := range units {
			vel := scene.velocity[i]
			atUnits += 0.5 * real(u.Impedance(complex(omega, 0))) * real(vel*cmplx.Conj(vel))
		}
		uniform := DampedMode{r.Box.UniformMode(), ModalDamping(r.Box, r.Box.UniformMode(), r.Walls, r.Air)}
		for _, m := range append([]DampedMode{uniform}, r.Modes(1500)...) {
			kn, k := 2*math.Pi*m.Hz/c, omega/c
			flow := q * complex(r.Box.Value(m.Mode, s.At), 0)
			for i, u := range units {
				flow -= scene.velocity[i] * complex(r.Box.Mean(m.Mode, u.Patch), 0)
			}
			a := complex(0, omega*rho) * flow / (complex(v*m.Norm, 0) * complex(kn*kn-k*k, 2*k*m.Damping.Total()/c))
			lost += v * m.Norm * real(a*cmplx.Conj(a)) * m.Damping.Total() / (rho * c * c)
			into += 0.5 * real(a*cmplx.Conj(q)) * r.Box.Value(m.Mode, s.At)
		}
		if math.Abs(into-lost-atUnits) > 2e-4*into {
			t.Errorf("%g Hz: %.6g W in, %.6g lost in walls and air, %.6g in the units", hz, into, lost, atUnits)
		}
		if !(atUnits > 0) {
			t.Errorf("%g Hz: passive units give %.3g W", hz, atUnits)
		}
	}
}

// A mode's own level is the level of its term alone at its frequency.
func TestModeLevelIsItsTermsPeak(t *testing.T) {
	r := studio(t)
	s := []Source{{Point{1.1, 1.18, 1.2}, 1, 0}, {Point{1.1, 2.6, 1.2}, 0.5, 0.003}}
	seat := Point{2.9, 1.9, 1.2}
	f := newTestField(t, r, s, []Point{seat}, nil, 1)
	c := r.Air.SpeedOfSound
	for _, m := range r.Modes(120) {
		omega := 2 * math.Pi * m.Hz
		var drive complex128
		for _, x := range s {
			drive += complex(x.Gain*r.Box.Value(m.Mode, x.At), 0) * cmplx.Exp(complex(0, -omega*x.Delay))
		}
		k := omega / c
		term := drive * complex(r.Box.Value(m.Mode, seat)/(r.Box.Volume()*m.Norm), 0) / complex(0, 2*k*m.Damping.Total()/c)
		if got, want := f.ModeLevel(m, 0), decibels(term); math.Abs(got-want) > 1e-6 {
			t.Errorf("%v: %v dB, its term alone %v", m, got, want)
		}
	}
	// At a node it is nothing.
	middle := newTestField(t, r, s[:1], []Point{{r.Box.Length / 2, 1, 1}}, nil, 1)
	for _, m := range r.Modes(40) {
		if m.Order == [3]int{1, 0, 0} && !math.IsNaN(middle.ModeLevel(m, 0)) {
			t.Errorf("%v at its node: %v dB, want nothing", m, middle.ModeLevel(m, 0))
		}
	}
}

func TestFieldRefusesAndStops(t *testing.T) {
	for _, upTo := range []float64{0, -1, math.NaN(), math.Inf(1)} {
		if _, err := NewField(context.Background(), studio(t), nil, nil, nil, upTo); err == nil {
			t.Errorf("a field up to %v Hz is made", upTo)
		}
	}
	ended, end := context.WithCancel(context.Background())
	end()
	if _, err := NewField(ended, studio(t), studioSources(), []Point{{1, 1, 1}}, nil, 250); !errors.Is(err, context.Canceled) {
		t.Errorf("an ended context gives %v", err)
	}
	f := studioField(t, eightBottles(studio(t)))
	if _, err := f.Levels(ended, []float64{50}); !errors.Is(err, context.Canceled) {
		t.Errorf("levels of an ended context give %v", err)
	}
	if _, err := f.Poles(ended, 100, nil); !errors.Is(err, context.Canceled) {
		t.Errorf("poles of an ended context give %v", err)
	}
}
