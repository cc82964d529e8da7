package acoustics

import (
	"math"
	"testing"
)

func criterion(t *testing.T, list []Criterion, id string) Criterion {
	t.Helper()
	for _, c := range list {
		if c.ID == id {
			return c
		}
	}
	t.Fatalf("no criterion %q", id)
	return Criterion{}
}

func shell(l, w, h, alpha float64, t testing.TB) Room {
	wall := flat(alpha)
	return Room{Box{l, w, h}, testAir(t), Walls{wall, wall, wall, wall, wall, wall}}
}

// The order and the ids of the criteria are a promise.
func TestCriteriaIDs(t *testing.T) {
	want := []string{"bonello-counts", "bonello-coincident", "modes-overlapping", "spacing-mean", "spacing-deviation", "axial-spacing-least", "axial-spacing-widest", "ratio-low", "ratio-high", "length", "width",
		"integer-ratio", "schroeder", "modal-overlap", "reverberation", "floor-area", "volume"}
	list := shell(6, 4.5, 2.7, 0.1, t).Criteria()
	if len(list) != len(want) {
		t.Fatalf("%d criteria, want %d", len(list), len(want))
	}
	for i, c := range list {
		if c.ID != want[i] || c.Title == "" || c.Source == "" {
			t.Errorf("criterion %d is %+v, want %s", i, c, want[i])
		}
		if (c.Verdict == Information) != math.IsNaN(c.Limit) {
			t.Errorf("%s: verdict %v with limit %v", c.ID, c.Verdict, c.Limit)
		}
		if c.Verdict != Information && c.Advice == "" {
			t.Errorf("%s has no advice", c.ID)
		}
	}
}

// 6 × 4.5 × 2.7 m by hand: 1.833 ≤ 2.222 ≤ 3.5 (EBU Tech 3276, ITU-R BS.1116-3).
func TestProportionsByHand(t *testing.T) {
	list := shell(4.5, 6, 2.7, 0.1, t).Criteria() // the larger floor dimension is the length, whichever axis it lies along
	for id, want := range map[string][2]float64{
		"ratio-low": {6 / 2.7, 1.1 * 4.5 / 2.7}, "ratio-high": {6 / 2.7, 4.5*4.5/2.7 - 4}, "length": {6, 8.1}, "width": {4.5, 8.1},
	} {
		c := criterion(t, list, id)
		if !near(c.Figure, want[0], 1e-12) || !near(c.Limit, want[1], 1e-12) || c.Verdict != Met {
			t.Errorf("%s: %v against %v, %v; want %v", id, c.Figure, c.Limit, c.Verdict, want)
		}
	}
	for _, c := range []struct {
		l, w, h float64
		id      string
		want    Verdict
	}{
		{9, 4, 2.9, "length", NotMet}, {8, 4, 2.9, "length", Met}, {4.1, 4, 2.5, "ratio-low", NotMet},
		{12, 4, 3, "ratio-high", NotMet}, {10, 9, 3, "width", NotMet},
	} {
		if got := criterion(t, shell(c.l, c.w, c.h, 0.1, t).Criteria(), c.id).Verdict; got != c.want {
			t.Errorf("%v × %v × %v: %s is %v, want %v", c.l, c.w, c.h, c.id, got, c.want)
		}
	}
}

// Ratios to the nearest whole number, 1 among them.
func TestIntegerRatio(t *testing.T) {
	for _, c := range []struct {
		l, w, h, want float64
		verdict       Verdict
	}{
		{5, 2.5, 1.9, 0, NotMet},     // 2:1
		{4.1, 4, 2.7, 0.025, NotMet}, // nearly square
		{5.3, 3.86, 2.58, 5.3/2.58/2 - 1, NotMet},
		{6, 4.4, 2.6, 1 - 4.4/2.6/2, Met},
	} {
		got := criterion(t, shell(c.l, c.w, c.h, 0.1, t).Criteria(), "integer-ratio")
		if math.Abs(got.Figure-c.want) > 1e-12 || got.Verdict != c.verdict {
			t.Errorf("%v × %v × %v: %v, %v; want %v, %v", c.l, c.w, c.h, got.Figure, got.Verdict, c.want, c.verdict)
		}
	}
}

// Bonello's counts by the slow way, and coincidence in a cube and a double cube.
func TestBonello(t *testing.T) {
	for _, r := range []Room{shell(5.3, 3.86, 2.58, 0.1, t), shell(8, 3, 2.4, 0.1, t), shell(3, 3, 3, 0.1, t), shell(6, 3, 3, 0.1, t)} {
		falls, before, pairs := 0, 0, 0
		for k := -20; k <= -7; k++ {
			lo, hi := 1000*math.Pow(10, (float64(k)-0.5)/10), 1000*math.Pow(10, (float64(k)+0.5)/10)
			var in []float64
			for _, m := range r.Box.Modes(r.Air.SpeedOfSound, 300) {
				if m.Hz >= lo && m.Hz < hi {
					in = append(in, m.Hz)
				}
			}
			if len(in) < before {
				falls++
			}
			before = len(in)
			for i := range in {
				for j := range i {
					if len(in) < 5 && math.Abs(in[i]/in[j]-1) <= 1e-6 {
						pairs++
					}
				}
			}
		}
		list := r.Criteria()
		if got := criterion(t, list, "bonello-counts"); got.Figure != float64(falls) || (got.Verdict == Met) != (falls == 0) {
			t.Errorf("%v: %v bands fall, by the slow way %d", r.Box, got.Figure, falls)
		}
		if got := criterion(t, list, "bonello-coincident"); got.Figure != float64(pairs) || (got.Verdict == Met) != (pairs == 0) {
			t.Errorf("%v: %v pairs coincide, by the slow way %d", r.Box, got.Figure, pairs)
		}
	}
	if criterion(t, shell(3, 3, 3, 0.1, t).Criteria(), "bonello-coincident").Figure == 0 {
		t.Error("in a cube no modes coincide")
	}
}

// T_m of EBU Tech 3276 and BS.1116-3 by hand: 0.25 s at 100 m³, 0.1842 at 40 m³.
func TestReverberationCriterion(t *testing.T) {
	r := shell(5, 4, 2, 0.2, t)
	c := criterion(t, r.Criteria(), "reverberation")
	if math.Abs(c.Limit-0.1842) > 6e-5 {
		t.Errorf("T_m of 40 m³ is %v, want 0.1842", c.Limit)
	}
	mean := (r.SabineTime(500) + r.SabineTime(1000)) / 2
	if !near(c.Figure, mean, 1e-12) || (c.Verdict == Met) != (math.Abs(mean-c.Limit) <= 0.05) {
		t.Errorf("T = %v, by hand %v, %v", c.Figure, mean, c.Verdict)
	}
	// Δf·dN/df at the Schroeder frequency, Δf = 2.199/T.
	f := r.SchroederHz()
	if got, want := criterion(t, r.Criteria(), "modal-overlap").Figure, 2.1988/mean*r.Box.ModeDensity(r.Air.SpeedOfSound, f); !near(got, want, 1e-4) {
		t.Errorf("overlap %v, by hand %v", got, want)
	}
}

func TestStereoCriteria(t *testing.T) {
	b := shell(6, 5, 2.7, 0.1, t)
	// A triangle of equal sides of 2.4 m.
	left, right := Point{1.2, 1.3, 1.2}, Point{1.2, 3.7, 1.2}
	seat := Point{1.2 + 2.4*math.Sqrt(3)/2, 2.5, 1.2}
	list := b.StereoCriteria(left, right, seat)
	for id, want := range map[string]float64{"stereo-base-low": 2.4, "stereo-base-high": 2.4, "stereo-angle": 60, "listening-distance-low": 2.4, "listening-distance-high": 2.4, "stereo-symmetry": 0, "loudspeaker-walls": 1.2} {
		c := criterion(t, list, id)
		if math.Abs(c.Figure-want) > 1e-9 || c.Verdict != Met {
			t.Errorf("%s: %v, %v; want %v and met", id, c.Figure, c.Verdict, want)
		}
	}
	for id, want := range map[string]Verdict{"stereo-base-low": NotMet, "stereo-base-high": Met, "stereo-angle": NotMet, "listening-distance-low": Met,
		"listening-distance-high": NotMet, "stereo-symmetry": NotMet, "loudspeaker-walls": NotMet} {
		if c := criterion(t, b.StereoCriteria(Point{0.5, 1, 1.2}, Point{0.5, 1.9, 1.2}, Point{5.5, 3, 1.2}), id); c.Verdict != want {
			t.Errorf("%s: %v against %v is %v, want %v", id, c.Figure, c.Limit, c.Verdict, want)
		}
	}
}

// A base typed as exactly 2 m meets the limit of 2 m.
func TestLimitIsMetExactly(t *testing.T) {
	r := shell(6, 5, 2.7, 0.1, t)
	c := criterion(t, r.StereoCriteria(Point{1.3, 1.3, 1.2}, Point{1.3, 3.3, 1.2}, Point{3.6, 2.3, 1.2}), "stereo-base-low")
	if c.Verdict != Met {
		t.Errorf("a base of %v against %v is %v", c.Figure, c.Limit, c.Verdict)
	}
}

// Reflections by hand: source and seat 1 m apart, both 1 m above the floor and
// elsewhere far from everything: the floor's way is √(1 + 4) m.
func TestEarlyReflectionsByHand(t *testing.T) {
	r := shell(40, 40, 20, 0.2, t)
	source, seat := Point{20, 20, 1}, Point{21, 20, 1}
	list := r.EarlyReflections(source, seat)
	e := list[Floor]
	if want := 20*math.Log10(1/math.Sqrt(5)) + 10*math.Log10(0.8); math.Abs(e.LevelDB-want) > 1e-9 {
		t.Errorf("the floor reflects at %.3f dB, by hand %.3f dB", e.LevelDB, want)
	}
	if want := (math.Sqrt(5) - 1) / r.Air.SpeedOfSound; !near(e.Delay, want, 1e-9) {
		t.Errorf("after %v s, by hand %v s", e.Delay, want)
	}
	for i, want := range [3]float64{20.5, 20, 0} {
		if math.Abs(e.At[i]-want) > 1e-9 {
			t.Errorf("it strikes at %v", e.At)
		}
	}
	// Each reflection's angles are alike: the way over the point struck is the
	// image's, in any position.
	source, seat = Point{3, 7, 1.3}, Point{11, 31, 2.2}
	for _, e := range r.EarlyReflections(source, seat) {
		if way := distance(source, e.At) + distance(e.At, seat); !near((way-distance(source, seat))/r.Air.SpeedOfSound, e.Delay, 1e-9) {
			t.Errorf("%v: the way over %v is %v m", e.Surface, e.At, way)
		}
	}
	// Two loudspeakers 0.3 m above a hard floor: it reflects at full strength.
	hard := shell(8, 6, 3, 0.01, t)
	c := criterion(t, hard.StereoCriteria(Point{2, 2, 0.3}, Point{2, 4, 0.3}, Point{4, 3, 0.3}), "early-reflections")
	if c.Verdict != NotMet || c.Figure < -2 {
		t.Errorf("near a hard floor: %v dB, %v", c.Figure, c.Verdict)
	}
}

// A long tube has axial modes along it at even distances: c/2L apart.
func TestSpacingOfATube(t *testing.T) {
	r := shell(20, 0.5, 0.5, 0.1, t)
	step := r.Air.SpeedOfSound / 40
	list := r.Criteria()
	for id, want := range map[string]float64{"spacing-mean": step, "spacing-deviation": 0, "axial-spacing-least": step, "axial-spacing-widest": step} {
		if c := criterion(t, list, id); math.Abs(c.Figure-want) > 1e-9 {
			t.Errorf("%s: %v, want %v", id, c.Figure, want)
		}
	}
	if c := criterion(t, list, "axial-spacing-widest"); c.Verdict != Met {
		t.Errorf("%v Hz apart is %v", c.Figure, c.Verdict)
	}
}
