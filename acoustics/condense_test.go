package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"testing"
)

// tiled returns n × n tiles of one impedance per area on the ceiling.
func tiled(n int, specific func(omega complex128) complex128, natural float64, air Air, tile bool) []Unit {
	const side = 0.22
	var units []Unit
	area := complex(side*side, 0)
	for i := range n {
		for j := range n {
			units = append(units, Unit{
				Patch:     Patch{Surface: Ceiling, Centre: [2]float64{0.3 + (float64(i)+0.5)*side, 0.4 + (float64(j)+0.5)*side}, Size: [2]float64{side, side}},
				Impedance: func(w complex128) complex128 { return specific(w) * complex(air.Density*air.SpeedOfSound, 0) / area },
				Natural:   natural, Tile: tile,
			})
		}
	}
	return units
}

// woolly is a layer that is all spring and loss, ringing a surface that resonates.
func woolly(w complex128) complex128 { return 1.5 + 900/(1i*w) }

func ringing(hz, q float64) func(complex128) complex128 {
	w0 := 2 * math.Pi * hz
	return func(w complex128) complex128 {
		return complex(3/q, 0) + 3*1i*w/complex(w0, 0) + complex(3*w0, 0)/(1i*w)
	}
}

// A surface by its patterns is what it is by its tiles one by one: levels to 0.1
// dB, frequencies to 0.2 % and decays to 5 %, as a tiled surface is promised; and
// every tile brings a pole.
func TestPatternsAgainstTiles(t *testing.T) {
	r := studio(t)
	for name, c := range map[string]struct {
		n        int
		specific func(complex128) complex128
		natural  float64
	}{"wool": {7, woolly, 0}, "resonant": {7, ringing(58, 12), 58}, "a little wool": {3, woolly, 0}, "a small resonant": {3, ringing(58, 12), 58}} {
		whole := studioField(t, tiled(c.n, c.specific, c.natural, r.Air, false))
		short := studioField(t, tiled(c.n, c.specific, c.natural, r.Air, true))
		if len(whole.units) != c.n*c.n || len(short.units) > len(whole.units) || c.n > 5 && 2*len(short.units) > len(whole.units) {
			t.Errorf("%s: %d tiles, %d patterns", name, len(whole.units), len(short.units))
		}
		hz := logSpaced(20, 250, 90)
		a, err := whole.Levels(context.Background(), hz)
		if err != nil {
			t.Fatal(err)
		}
		b, err := short.Levels(context.Background(), hz)
		if err != nil {
			t.Fatal(err)
		}
		var rms float64
		for i := range hz {
			rms += math.Pow(a.Treated[0][i]-b.Treated[0][i], 2) / float64(len(hz))
		}
		if rms = math.Sqrt(rms); rms > 0.1 {
			t.Errorf("%s: levels differ by %.3f dB", name, rms)
		}
		p, q := polesOf(t, whole, 72), polesOf(t, short, 72)
		worst := [2]float64{}
		for i := range p.Modes {
			if p.Modes[i] == nil || q.Modes[i] == nil {
				if p.Modes[i] != q.Modes[i] {
					t.Errorf("%s: mode %d is listed by one of both", name, i)
				}
				continue
			}
			// The nearest of the other: labels may change places in a cluster.
			best := math.Inf(1)
			var near Pole
			for _, o := range append(q.Absorbers, modePoles(q)...) {
				if d := cmplx.Abs(o.Omega - p.Modes[i].Omega); d < best {
					best, near = d, o.Pole
				}
			}
			worst[0] = math.Max(worst[0], math.Abs(near.Natural/p.Modes[i].Natural-1))
			worst[1] = math.Max(worst[1], math.Abs(near.T60()/p.Modes[i].T60()-1))
		}
		if worst[0] > 0.002 || worst[1] > 0.05 {
			t.Errorf("%s: frequencies differ by %.4f %%, decays by %.2f %%", name, 100*worst[0], 100*worst[1])
		}
		if len(p.Absorbers) != len(q.Absorbers) {
			t.Errorf("%s: %d poles of tiles, by patterns %d", name, len(p.Absorbers), len(q.Absorbers))
		}
		t.Logf("%s: %d patterns of %d tiles, levels %.4f dB, frequencies %.5f %%, decays %.4f %%", name, len(short.units), len(whole.units), rms, 100*worst[0], 100*worst[1])
	}
}

func modePoles(p Poles) (list []AbsorberPole) {
	for _, m := range p.Modes {
		if m != nil {
			list = append(list, AbsorberPole{Pole: *m})
		}
	}
	return list
}

// A front of several absorbers in their own order keeps every seat's and source's
// response: with tiles between other units the indices still meet.
func TestPatternsBesideOtherUnits(t *testing.T) {
	r := studio(t)
	mixed := func(tile bool) *Field {
		units := []Unit{bottleAt(r.Air, Back, 0.3, 0.3, 45)}
		for _, u := range tiled(6, woolly, 0, r.Air, tile) {
			u.Owner = 1
			units = append(units, u)
		}
		last := bottleAt(r.Air, Front, 0.3, 0.3, 55)
		last.Owner = 2
		return newTestField(t, r, studioSources(), []Point{{2.9, 1.93, 1.2}, {4, 1, 1}}, append(units, last), 1)
	}
	whole, short := mixed(false), mixed(true)
	if len(short.units) >= len(whole.units) {
		t.Fatalf("%d patterns of %d units", len(short.units), len(whole.units))
	}
	hz := logSpaced(25, 120, 40)
	a, _ := whole.Levels(context.Background(), hz)
	b, _ := short.Levels(context.Background(), hz)
	for e := range a.Treated {
		for i := range hz {
			if d := math.Abs(a.Treated[e][i] - b.Treated[e][i]); d > 0.1 {
				t.Errorf("seat %d, %.1f Hz: %.3f dB apart", e, hz[i], d)
			}
		}
	}
	// Taken over from a former field, the sums are the same.
	again, err := short.Rearranged(context.Background(), short.sources, short.seats, short.raw.units)
	if err != nil {
		t.Fatal(err)
	}
	c, _ := again.Levels(context.Background(), hz)
	for i := range hz {
		if b.Treated[0][i] != c.Treated[0][i] {
			t.Fatalf("%.1f Hz: %v dB, rearranged %v dB", hz[i], b.Treated[0][i], c.Treated[0][i])
		}
	}
}
