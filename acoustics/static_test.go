package acoustics

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// pairStatic returns S_1…S_3 of two ports of a box.
func pairStatic(b Box, p, q [3]span) staticSums {
	s := newStatics(b, [][3]span{p, q}, nil)
	return s.pair(p, q, s.weights(p), s.weights(q))
}

// The heat kernel by images and by its cosine series must be one.
func TestHeatKernelImagesAreSeries(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := rapid.Float64Range(1, 20).Draw(t, "l")
		width := rapid.Float64Range(0, 0.5)
		port := func(name string) span {
			w := width.Draw(t, name+" width") * l
			if w < 1e-3*l {
				w = 0
			}
			return span{rapid.Float64Range(w/2, l-w/2).Draw(t, name), w}
		}
		a, b := port("a"), port("b")
		time := math.Pow(rapid.Float64Range(0.12, 0.5).Draw(t, "√t/l")*l, 2)
		images := heatImages(l, time, a.centre-b.centre, a.width, b.width) + heatImages(l, time, a.centre+b.centre, a.width, b.width)
		if series := heatSeries(l, time, a, b); math.Abs(images-series) > 1e-10/l {
			t.Fatalf("images %v, series %v", images, series)
		}
	})
}

// The three static sums against the slow twin's: S(κ²) = S_1 − κ²S_2 + κ⁴S_3 − … + 1/(Vκ²).
func TestStaticSumsAgainstLiteral(t *testing.T) {
	r := Room{Box{5.3, 3.86, 2.58}, Air{SpeedOfSound: 343}, Walls{}}
	l := newLiteral(r, 1, 1200)
	panel := Patch{Surface: Back, Centre: [2]float64{0.9, 1.1}, Size: [2]float64{1.2, 0.6}}.spans(r.Box)
	beside := Patch{Surface: Back, Centre: [2]float64{2.1, 1.1}, Size: [2]float64{1.2, 0.6}}.spans(r.Box)
	corner := Patch{Surface: Front, Centre: [2]float64{0.1, 0.1}, Size: [2]float64{0.2, 0.2}}.spans(r.Box)
	seat, speaker := Point{2.9, 1.93, 1.2}.spans(), Point{1.1, 1.18, 1.2}.spans()
	for _, c := range []struct {
		name string
		a, b [3]span
	}{{"panel with itself", panel, panel}, {"panel with its neighbour", panel, beside}, {"corner tile with itself", corner, corner},
		{"opposite walls", panel, corner}, {"seat and loudspeaker", seat, speaker}, {"panel and seat", panel, seat}} {
		s := pairStatic(r.Box, c.a, c.b)
		// A fit through small κ² takes the series apart.
		const h = 0.02
		v := r.Box.Volume()
		f := func(k2 float64) float64 { return l.static(c.a, c.b, k2) - 1/(v*k2) }
		f1, f2, f3, f4 := f(h), f(2*h), f(3*h), f(4*h)
		s1 := 4*f1 - 6*f2 + 4*f3 - f4
		slope := (-26*f1/3 + 19*f2 - 14*f3 + 11*f4/3) / (2 * h)
		if math.Abs(s[0]-s1) > 2e-4*(math.Abs(s1)+0.03) {
			t.Errorf("%s: S_1 = %v, literal %v", c.name, s[0], s1)
		}
		if math.Abs(s[1]+slope) > 2e-2*math.Abs(slope) {
			t.Errorf("%s: S_2 = %v, literal %v", c.name, s[1], -slope)
		}
	}
}

// Far from all edges a unit's static self term is that of a rigid half-space:
// the rectangle as a piston, and for round mouths 8/(3π²a).
func TestStaticSelfTermOfHalfSpace(t *testing.T) {
	hall := Box{60, 60, 60}
	for _, size := range [][2]float64{{0.2, 0.2}, {0.4, 0.1}} {
		p := Patch{Surface: Floor, Centre: [2]float64{30, 30}, Size: size}.spans(hall)
		got := pairStatic(hall, p, p)[0]
		want := rectangleSelfTerm(size[0], size[1])
		// What is left is the room itself, of the order of 1/60 m.
		if math.Abs(got-want) > 0.02 {
			t.Errorf("%v m: %v 1/m, half-space %v", size, got, want)
		}
	}
	// A square piston's end correction is 0.4732 of its side (worked out apart).
	if got := rectangleSelfTerm(0.3, 0.3) * 0.09; math.Abs(got-0.4732*0.3) > 2e-5 {
		t.Errorf("end correction of a square %v m, want %v", got, 0.4732*0.3)
	}
	load := NewAirLoads(hall)
	for _, n := range []int{1, 3} {
		mouth := Patch{Surface: Floor, Centre: [2]float64{30, 30}, MouthRadius: 0.05, Mouths: n}
		if got, want := load.Of(mouth), 8/(3*math.Pi*math.Pi*0.05)/float64(n); math.Abs(got-want) > 0.02 {
			t.Errorf("%d mouths: %v 1/m, half-space %v", n, got, want)
		}
	}
}

// The static self term rises towards an edge and a corner, where images crowd.
func TestStaticSelfTermRisesTowardsCorners(t *testing.T) {
	b := Box{6, 5, 3}
	of := func(x, y float64) float64 {
		return NewAirLoads(b).Of(Patch{Surface: Floor, Centre: [2]float64{x, y}, Size: [2]float64{0.2, 0.2}})
	}
	middle, edge, corner := of(3, 2.5), of(0.1, 2.5), of(0.1, 0.1)
	if !(middle < edge && edge < corner) {
		t.Errorf("middle %v, edge %v, corner %v 1/m", middle, edge, corner)
	}
}

// A former table must change nothing.
func TestStaticsTakeOverTables(t *testing.T) {
	b := Box{6, 5, 3}
	p := Patch{Surface: Floor, Centre: [2]float64{1, 2}, Size: [2]float64{0.2, 0.3}}.spans(b)
	q := Point{3, 2, 1.2}.spans()
	former := newStatics(b, [][3]span{p}, nil)
	s := newStatics(b, [][3]span{p, q}, former)
	if got, want := s.pair(p, q, s.weights(p), s.weights(q)), pairStatic(b, p, q); got != want {
		t.Errorf("with a former table %v, fresh %v", got, want)
	}
}
