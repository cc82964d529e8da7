package acoustics

import (
	"fmt"
	"math"
)

// rounding is what distances may differ by and still count as equal, m or degrees.
const rounding = 1e-9

// StereoCriteria returns the criteria of a pair of loudspeakers and a seat: base,
// angle, distance, how far the loudspeakers stand from the walls, and the early
// reflections.
//
// Source: ITU-R BS.1116-3, from memory.
func (r Room) StereoCriteria(left, right, seat Point) []Criterion {
	var (
		b        = r.Box
		base     = distance(left, right)
		nearer   = math.Min(distance(left, seat), distance(right, seat))
		further  = math.Max(distance(left, seat), distance(right, seat))
		angle    = angleAt(seat, left, right) * 180 / math.Pi
		clear    = math.Min(b.clearance(left), b.clearance(right))
		distance = (nearer + further) / 2
		// A distance typed as the limit is met, whatever binary fractions make of it.
		least = func(v, limit float64) Verdict { return verdict(v >= limit-rounding) }
		most  = func(v, limit float64) Verdict { return verdict(v <= limit+rounding) }
	)
	list := []Criterion{
		{ID: "stereo-base-low", Title: "Base of the loudspeaker pair, at least", Source: bs1116, Figure: base, Limit: 2, Unit: "m",
			Verdict: least(base, 2), Advice: "Move the loudspeakers apart."},
		{ID: "stereo-base-high", Title: "Base of the loudspeaker pair, at most", Source: bs1116, Figure: base, Limit: 3, Unit: "m",
			Verdict: most(base, 3), Advice: "Move the loudspeakers together."},
		{ID: "stereo-angle", Title: "Angle of the pair at the seat, within 5° of", Source: bs1116, Figure: angle, Limit: 60, Unit: "°",
			Verdict: most(math.Abs(angle-60), 5), Advice: "Make seat and pair a triangle of equal sides."},
		{ID: "listening-distance-low", Title: "Listening distance, at least", Source: bs1116, Figure: distance, Limit: 2, Unit: "m",
			Verdict: least(distance, 2), Advice: "Move the seat further from the pair."},
		{ID: "listening-distance-high", Title: "Listening distance, at most 1.7 times the base", Source: bs1116, Figure: distance, Limit: 1.7 * base, Unit: "m",
			Verdict: most(distance, 1.7*base), Advice: "Move the seat nearer to the pair."},
		{ID: "stereo-symmetry", Title: "Difference of the two loudspeakers' distances from the seat", Source: "common practice",
			Figure: further - nearer, Limit: 0.05, Unit: "m", Verdict: most(further-nearer, 0.05), Advice: "Move the seat onto the pair's mid-plane."},
		{ID: "loudspeaker-walls", Title: "Distance of a loudspeaker from the nearest wall, at least", Source: bs1116, Figure: clear, Limit: 1, Unit: "m",
			Verdict: least(clear, 1), Advice: "Move it away from the wall, or allow for it."},
	}
	return append(list, r.earlyCriterion(left, right, seat))
}

// clearance returns the distance of a point from the nearest upright wall, m.
func (b Box) clearance(p Point) float64 {
	return math.Min(math.Min(p[0], b.Length-p[0]), math.Min(p[1], b.Width-p[1]))
}

func distance(a, b Point) float64 {
	return math.Sqrt((a[0]-b[0])*(a[0]-b[0]) + (a[1]-b[1])*(a[1]-b[1]) + (a[2]-b[2])*(a[2]-b[2]))
}

// angleAt returns the angle in rad between two points as seen from a third.
func angleAt(at, a, b Point) float64 {
	var dot float64
	for i := range at {
		dot += (a[i] - at[i]) * (b[i] - at[i])
	}
	return math.Acos(math.Max(-1, math.Min(1, dot/(distance(at, a)*distance(at, b)))))
}

// Reflection is a sound's first reflection off one surface.
type Reflection struct {
	Surface Surface
	At      Point   // where it strikes the surface
	Delay   float64 // s after the direct sound
	LevelDB float64 // re the direct sound
}

// EarlyReflections returns the six first reflections from a source to a seat, in
// the order of Surfaces: their level is that of the longer way and of what the
// surface absorbs,
//
//	20 log10(d/d_i) + 10 log10(1 − α), α the mean at 1, 2 and 4 kHz
//
// for a source that radiates alike in all directions, which a loudspeaker at these
// frequencies does not: it stands for what reaches the seat at most.
func (r Room) EarlyReflections(source, seat Point) []Reflection {
	var (
		direct = distance(source, seat)
		c      = r.Air.SpeedOfSound
		list   []Reflection
	)
	for _, s := range Surfaces() {
		image, axis := source, s.Normal()
		image[axis] = -source[axis]
		wall := 0.0
		if s.Far() {
			wall = r.Box.Dimensions()[axis]
			image[axis] = 2*wall - source[axis]
		}
		way := distance(image, seat)
		at := source
		share := (wall - image[axis]) / (seat[axis] - image[axis])
		for i := range at {
			at[i] = image[i] + share*(seat[i]-image[i])
		}
		var alpha float64
		for _, hz := range []float64{1000, 2000, 4000} {
			alpha += r.Walls[s].Coefficient(hz) / 3
		}
		list = append(list, Reflection{Surface: s, At: at, Delay: (way - direct) / c,
			LevelDB: 20*math.Log10(direct/way) + 10*math.Log10(math.Max(1-alpha, 1e-3))})
	}
	return list
}

// The early reflections that count: within this time of the direct sound, and how
// far below it they are to be.
const (
	earlyWithin = 0.015 // s
	earlyBelow  = -10.0 // dB
)

// earlyCriterion is the strongest early reflection of a pair at a seat.
func (r Room) earlyCriterion(left, right, seat Point) Criterion {
	c := Criterion{ID: "early-reflections", Title: "Strongest reflection of the first 15 ms, 1 to 4 kHz, at most", Source: bs1116,
		Figure: -60, Limit: earlyBelow, Unit: "dB", Verdict: Met, Advice: "Treat the surfaces between loudspeakers and seat."}
	for _, source := range []Point{left, right} {
		for _, e := range r.EarlyReflections(source, seat) {
			if e.Delay <= earlyWithin && e.LevelDB > c.Figure {
				c.Figure = e.LevelDB
				c.Advice = fmt.Sprintf("Absorb, scatter or turn away what the %v reflects, where a mirror on it would show the loudspeaker from the seat.", e.Surface)
			}
		}
	}
	if c.Figure > earlyBelow {
		c.Verdict = NotMet
	}
	return c
}
