package acoustics

import "math"

// Verdict says whether a criterion is met.
type Verdict int

// The verdicts. Information is a figure without a limit.
const (
	Information Verdict = iota
	Met
	NotMet
)

func verdict(met bool) Verdict {
	if met {
		return Met
	}
	return NotMet
}

// String returns "yes" and "no" for met and not met, and "" for information.
func (v Verdict) String() string { return [3]string{"", "yes", "no"}[v] }

// Criterion is one published figure of merit of a room.
type Criterion struct {
	ID, Title, Source string
	Figure            float64
	Limit             float64 // NaN where there is none
	Unit              string  // of both, "" for a pure number
	Verdict           Verdict
	Advice            string // what to do where it is not met, one sentence
}

// Sources of the criteria, their limits from memory.
const (
	memory       = " (from memory)"
	bonello1981  = "Bonello, J. Audio Eng. Soc. 29 (1981) 597" + memory
	proportions  = "EBU Tech 3276; ITU-R BS.1116-3" + memory
	bs1116       = "ITU-R BS.1116-3" + memory
	ebu3276      = "EBU Tech 3276" + memory
	schroeder62  = "Schroeder & Kuttruff, J. Acoust. Soc. Am. 34 (1962) 76" + memory
	coincidence  = 1e-6 // relative distance of frequencies that count as one
	bonelloFew   = 5    // modes in a band from which on coincidence is allowed
	integerNear  = 0.05 // how near a whole ratio is too near
	reverbWithin = 0.05 // s
)

// WhatToDo returns the advice where it is wanted: where the criterion is not met.
func (c Criterion) WhatToDo() string {
	if c.Verdict != NotMet {
		return ""
	}
	return c.Advice
}

// Criteria returns the criteria that shape, surfaces and air decide, in a fixed
// order. L is the larger floor dimension, W the smaller.
//
// Sources: each criterion's own.
func (r Room) Criteria() []Criterion {
	list := r.bonello()
	list = append(list, r.spacing()...)
	list = append(list, r.Box.proportions()...)
	return append(list, r.statistics()...)
}

// bonello returns the two criteria of Bonello 1981 over the third octaves from 10
// to 200 Hz.
func (r Room) bonello() []Criterion {
	var (
		bands         = ThirdOctaves(10, 200)
		modes         = r.Modes(bands[len(bands)-1].Upper)
		before, falls = 0, 0
		pairs         = 0
	)
	for _, b := range bands {
		var in []DampedMode
		for _, m := range modes {
			if m.Hz >= b.Lower && m.Hz < b.Upper {
				in = append(in, m)
			}
		}
		if len(in) < before {
			falls++
		}
		before = len(in)
		if len(in) < bonelloFew {
			pairs += coincidentPairs(in)
		}
	}
	return []Criterion{
		{ID: "bonello-counts", Title: "Third octaves in which the mode count falls, 10 to 200 Hz", Source: bonello1981,
			Figure: float64(falls), Limit: 0, Unit: "bands", Verdict: verdict(falls == 0),
			Advice: "Change a dimension until the count rises from band to band."},
		{ID: "bonello-coincident", Title: "Coincident modes in bands of fewer than five", Source: bonello1981,
			Figure: float64(pairs), Limit: 0, Unit: "pairs", Verdict: verdict(pairs == 0),
			Advice: "Change a dimension by a few centimetres."},
	}
}

// coincidentPairs returns how many pairs of modes have the same frequency.
func coincidentPairs(modes []DampedMode) int {
	n := 0
	for i, a := range modes {
		for _, b := range modes[i+1:] {
			if math.Abs(b.Hz-a.Hz) <= coincidence*a.Hz {
				n++
			}
		}
	}
	return n
}

// proportions returns the criteria of the room's shape,
//
//	1.1·W/H ≤ L/H ≤ 4.5·W/H − 4, L < 3H, W < 3H
//
// and no two dimensions within 5 % of a whole ratio.
func (b Box) proportions() []Criterion {
	var (
		l, w, h  = math.Max(b.Length, b.Width), math.Min(b.Length, b.Width), b.Height
		low, top = 1.1 * w / h, 4.5*w/h - 4
		whole    = b.wholeRatio()
	)
	return []Criterion{
		{ID: "ratio-low", Title: "Length over height, at least 1.1 width over height", Source: proportions,
			Figure: l / h, Limit: low, Verdict: verdict(l/h >= low), Advice: "Make the room longer, or narrower."},
		{ID: "ratio-high", Title: "Length over height, at most 4.5 width over height less 4", Source: proportions,
			Figure: l / h, Limit: top, Verdict: verdict(l/h <= top), Advice: "Make the room shorter, or wider for its height."},
		{ID: "length", Title: "Length below three times the height", Source: proportions,
			Figure: l, Limit: 3 * h, Unit: "m", Verdict: verdict(l < 3*h), Advice: "Divide the length, or raise the ceiling."},
		{ID: "width", Title: "Width below three times the height", Source: proportions,
			Figure: w, Limit: 3 * h, Unit: "m", Verdict: verdict(w < 3*h), Advice: "Divide the width, or raise the ceiling."},
		{ID: "integer-ratio", Title: "Distance of the dimensions' ratios from whole numbers", Source: ebu3276,
			Figure: whole, Limit: integerNear, Verdict: verdict(whole > integerNear),
			Advice: "Change a dimension by a twentieth or more."},
	}
}

// wholeRatio returns the least |r/n − 1| over the three ratios r of a larger to a
// smaller dimension, n the nearest whole number.
func (b Box) wholeRatio() float64 {
	var (
		d     = b.Dimensions()
		least = math.Inf(1)
	)
	for i := range d {
		for j := range i {
			ratio := math.Max(d[i], d[j]) / math.Min(d[i], d[j])
			n := math.Max(1, math.Round(ratio))
			least = math.Min(least, math.Abs(ratio/n-1))
		}
	}
	return least
}

// statistics returns the Schroeder frequency with the modal overlap there, the
// reverberation time against that wanted, 0.25·∛(V/100 m³) s, and the sizes that
// the recommendations name.
func (r Room) statistics() []Criterion {
	var (
		t       = r.midTime()
		f       = r.SchroederHz()
		overlap = 3 * math.Ln10 / math.Pi / t * r.Box.ModeDensity(r.Air.SpeedOfSound, f)
		v       = r.Box.Volume()
		wanted  = 0.25 * math.Cbrt(v/100)
		floor   = r.Box.Area(Floor)
	)
	return []Criterion{
		{ID: "schroeder", Title: "Schroeder frequency", Source: schroeder62, Figure: f, Limit: math.NaN(), Unit: "Hz"},
		{ID: "modal-overlap", Title: "Modal overlap at the Schroeder frequency", Source: schroeder62, Figure: overlap, Limit: math.NaN()},
		// T by Sabine with air, mean of 500 and 1000 Hz.
		{ID: "reverberation", Title: "Reverberation time, within 0.05 s of that for the volume", Source: proportions,
			Figure: t, Limit: wanted, Unit: "s", Verdict: verdict(math.Abs(t-wanted) <= reverbWithin),
			Advice: reverbAdvice(t, wanted)},
		{ID: "floor-area", Title: "Floor area for two-channel listening, at least", Source: bs1116,
			Figure: floor, Limit: 20, Unit: "m²", Verdict: verdict(floor >= 20), Advice: "Treat the modes of a small room one by one."},
		{ID: "volume", Title: "Volume of a reference room, below", Source: ebu3276,
			Figure: v, Limit: 300, Unit: "m³", Verdict: verdict(v < 300), Advice: "A hall has other criteria."},
	}
}

func reverbAdvice(t, wanted float64) string {
	if t > wanted {
		return "Add absorption at middle frequencies."
	}
	return "Take absorption away, or make some of the surfaces hard."
}
