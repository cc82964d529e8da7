package acoustics

import "math"

// spacingTo is up to where the spacing of modes is judged, Hz: the upper edge of
// the highest third octave that is counted.
func spacingTo() float64 { return ThirdOctave(-7).Upper }

// spacing returns how the modes and the axial modes up to 224 Hz are spaced.
//
// Sources: the axial modes' rule, no two within 5 Hz and none more than 20 Hz apart,
// Handbook for Sound Engineers, section 6.6; the deviation of the spacing as a
// figure of merit, Louden, Acustica 24 (1971) 101 (from memory).
func (r Room) spacing() []Criterion {
	const handbook = "Handbook for Sound Engineers, section 6.6"
	var (
		modes          = r.Modes(spacingTo())
		all, axial     []float64
		overlapping    int
		least, widest  = math.Inf(1), 0.0
		mean, variance float64
	)
	for i, m := range modes {
		all = append(all, m.Hz)
		if m.Kind() == Axial {
			axial = append(axial, m.Hz)
		}
		if i > 0 {
			a := modes[i-1]
			if m.Hz-a.Hz < (a.Oscillator().HalfPowerWidth()+m.Oscillator().HalfPowerWidth())/2 {
				overlapping++
			}
		}
	}
	for i := 1; i < len(axial); i++ {
		least, widest = math.Min(least, axial[i]-axial[i-1]), math.Max(widest, axial[i]-axial[i-1])
	}
	if n := float64(len(all) - 1); n > 0 {
		mean = (all[len(all)-1] - all[0]) / n
		for i := 1; i < len(all); i++ {
			variance += (all[i] - all[i-1] - mean) * (all[i] - all[i-1] - mean) / n
		}
	}
	list := []Criterion{
		{ID: "modes-overlapping", Title: "Neighbours closer than their half-power width, to 224 Hz", Source: "common practice",
			Figure: float64(overlapping), Limit: math.NaN(), Unit: "pairs"},
		{ID: "spacing-mean", Title: "Mean spacing of neighbouring modes, to 224 Hz", Source: "common practice",
			Figure: mean, Limit: math.NaN(), Unit: "Hz"},
		{ID: "spacing-deviation", Title: "Standard deviation of that spacing", Source: "Louden, Acustica 24 (1971) 101" + memory,
			Figure: math.Sqrt(variance), Limit: math.NaN(), Unit: "Hz"},
	}
	if len(axial) < 2 {
		return list
	}
	return append(list,
		Criterion{ID: "axial-spacing-least", Title: "Least spacing of neighbouring axial modes, at least", Source: handbook,
			Figure: least, Limit: 5, Unit: "Hz", Verdict: verdict(least >= 5), Advice: "Change a dimension until no two axial modes lie together."},
		Criterion{ID: "axial-spacing-widest", Title: "Widest spacing of neighbouring axial modes, at most", Source: handbook,
			Figure: widest, Limit: 20, Unit: "Hz", Verdict: verdict(widest <= 20), Advice: "Change a dimension so that an axial mode falls into the gap."})
}
