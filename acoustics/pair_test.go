package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"testing"
)

// The lowest peak that one small bottle can give a lossless mode under a source of
// constant volume acceleration, in the room as a whole: tuned to ω_n/√(1+μ/2) with ζ_a
// = √(3μ/8) its response stands √(1+2/μ) over the static one (derived, and confirmed
// numerically within 0.15 % for the pair alone). The mode's own amplitude is looked at,
// as source and bottle drive it. Any other damping or tuning gives a higher one.
func TestLowestPeakInTheRoom(t *testing.T) {
	const withNeighbours = 0.015 // they change the bottle's air a little over the band
	box := Box{5.3, 3.86, 2.58}
	r := Room{box, Air{SpeedOfSound: 343, Density: 1.2}, Walls{flat(1e-6), flat(1e-6), {}, {}, {}, {}}}
	mode := r.Modes(33)[0] // (1,0,0)
	// On the middle of the end wall, where the modes beside it have their nodes.
	patch := Patch{Surface: Back, Centre: [2]float64{box.Width / 2, box.Height / 2}, MouthRadius: 0.05, Mouths: 1}
	source, seat := Source{At: Point{0.01, box.Width / 2, box.Height / 2}, Gain: 1}, Point{1.1, box.Width / 2, box.Height / 2}
	// The air before the bottle is that of all modes but its own, near resonance.
	alone, err := NewField(context.Background(), r, nil, nil, []Unit{{Patch: patch, Natural: 33}}, 60)
	if err != nil {
		t.Fatal(err)
	}
	others := alone.newTransfer()
	others.at(complex(2*math.Pi*mode.Hz, 0), 0)
	load := real(others.unitPair(0, 0))
	area, length := math.Pi*0.05*0.05, 0.2
	mass := 1.2 * (length/area + load)
	// peak returns the mode's highest amplitude over its static one.
	peak := func(volume, tuned, damping float64) float64 {
		w := 2 * math.Pi * mode.Hz * tuned
		stiff := 1.2 * 343 * 343 / volume
		// The mass that gives this volume the tuning.
		extra := stiff/(w*w) - mass
		unit := Unit{Patch: patch, Natural: mode.Hz, Impedance: func(omega complex128) complex128 {
			m := complex(mass+extra-1.2*load, 0)
			return complex(2*damping*w*(mass+extra), 0) + 1i*omega*m + complex(stiff, 0)/(1i*omega)
		}}
		f, err := NewField(context.Background(), r, []Source{source}, []Point{seat}, []Unit{unit}, 60)
		if err != nil {
			t.Fatal(err)
		}
		s := f.newScene()
		k0 := 2 * math.Pi * mode.Hz / 343
		highest := 0.0
		for hz := mode.Hz * 0.8; hz < mode.Hz*1.2; hz += 0.02 {
			omega := complex(2*math.Pi*hz, 0)
			s.at(omega)
			k := omega / 343
			// The mode is driven by the source and by what the bottle moves.
			drive := 1 - 1i*omega*1.2*complex(box.Mean(mode.Mode, patch)/box.Value(mode.Mode, source.At), 0)*s.velocity[0]
			resonance := complex(k0*k0, 0) / (complex(k0*k0, 0) - k*k + 2i*k*complex(mode.Damping.Total()/343, 0))
			highest = math.Max(highest, cmplx.Abs(drive*resonance))
		}
		return highest
	}
	for _, mu := range []float64{0.001, 0.004, 0.01} {
		mean := box.Mean(mode.Mode, patch)
		volume := mu * box.Volume() * mode.Norm / (mean * mean)
		tuned, damping := 1/math.Sqrt(1+mu/2), math.Sqrt(3*mu/8)
		got, want := peak(volume, tuned, damping), math.Sqrt(1+2/mu)
		if math.Abs(got/want-1) > withNeighbours {
			t.Errorf("μ = %v: the peak is %.3f over static, the closed form says %.3f", mu, got, want)
		}
		for _, off := range [][2]float64{{1.02, 1}, {0.98, 1}, {1, 1.6}, {1, 0.6}} {
			if other := peak(volume, tuned*off[0], damping*off[1]); other < got*0.995 {
				t.Errorf("μ = %v: tuning × %v and damping × %v give %.3f, lower than the optimum's %.3f", mu, off[0], off[1], other, got)
			}
		}
	}
}

// A wall covered with tiles of one admittance is the wall with that admittance: the
// axial modes along it are those of the exact separable room, k·tan(kL) = jkβ.
func TestTiledWallAgainstTheSeparableRoom(t *testing.T) {
	const (
		inHz, inT60 = 0.001, 0.01 // what tiles of a tenth of a wave leave
	)
	box := Box{4, 1.3, 1.1}
	r := Room{box, Air{SpeedOfSound: 343, Density: 1.2}, Walls{flat(1e-7), {}, {}, {}, {}, {}}}
	for name, z := range map[string]func(complex128) complex128{
		"spring and loss": func(w complex128) complex128 { return 4 + 3000/(1i*w) },
		"resistance":      func(w complex128) complex128 { return 12 },
		"mass and spring": func(w complex128) complex128 { return 2 + 1i*w/60 + 4000/(1i*w) },
	} {
		const nu, nv = 6, 5
		var units []Unit
		du, dv := box.Width/nu, box.Height/nv
		for i := range nu {
			for j := range nv {
				units = append(units, Unit{Tile: true,
					Patch:     Patch{Surface: Back, Centre: [2]float64{(float64(i) + 0.5) * du, (float64(j) + 0.5) * dv}, Size: [2]float64{du, dv}},
					Impedance: func(w complex128) complex128 { return z(w) * complex(1.2*343/(du*dv), 0) }})
			}
		}
		f := newTestField(t, r, []Source{{At: Point{0.5, 0.6, 0.5}, Gain: 1}}, []Point{{2.2, 0.7, 0.6}}, units, 1)
		poles := polesOf(t, f, 110)
		for i, m := range r.Modes(110) {
			if m.Order[1]+m.Order[2] > 0 || poles.Modes[i] == nil {
				continue
			}
			// Newton's method on the exact equation, from the pole found.
			w := poles.Modes[i].Omega
			exact := func(w complex128) complex128 {
				k := w / 343
				return k*cmplx.Sin(k*complex(box.Length, 0)) - 1i*k/z(w)*cmplx.Cos(k*complex(box.Length, 0))
			}
			for range 30 {
				h := w * 1e-7
				w -= exact(w) * 2 * h / (exact(w+h) - exact(w-h))
			}
			hz, t60 := cmplx.Abs(w)/(2*math.Pi), 3*math.Ln10/imag(w)
			if p := poles.Modes[i]; !near(p.Natural, hz, inHz) || !near(p.T60(), t60, inT60) {
				t.Errorf("%s, %v: %.3f Hz, %.4f s; the exact room has %.3f Hz, %.4f s", name, m.Order, p.Natural, p.T60(), hz, t60)
			}
		}
	}
}
