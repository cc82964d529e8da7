package acoustics

import "math"

// LimitPoint is a corner of a limit curve.
type LimitPoint struct {
	Hz      float64
	Seconds float64 // longest T60 of a mode
}

// LimitCurve is the longest T60 of a mode that goes unheard, by frequency,
// its corners rising in frequency.
type LimitCurve []LimitPoint

// Seconds returns the limit at a frequency in Hz: linear in T over log f
// between the corners, the ends held. The interpolation is this program's own;
// the published figures are the corners. It panics on an empty curve.
func (c LimitCurve) Seconds(hz float64) float64 {
	if len(c) == 0 {
		panic("acoustics: a limit curve has no corner")
	}
	if hz <= c[0].Hz {
		return c[0].Seconds
	}
	for i := 1; i < len(c); i++ {
		a, b := c[i-1], c[i]
		if hz <= b.Hz {
			return a.Seconds + (b.Seconds-a.Seconds)*math.Log(hz/a.Hz)/math.Log(b.Hz/a.Hz)
		}
	}
	return c[len(c)-1].Seconds
}

// NamedLimit is a published limit curve.
type NamedLimit struct {
	Name, Title, Source string
	Curve               LimitCurve
}

// NamedLimits returns the published curves: what listeners could just hear of
// a mode's decay in music, and with artificial signals.
//
// Source: Fazenda, Stephenson & Goldberg, J. Acoust. Soc. Am. 137 (2015) 1088;
// the corners from memory of the abstract.
func NamedLimits() []NamedLimit {
	const source = "Fazenda, Stephenson & Goldberg, J. Acoust. Soc. Am. 137 (2015) 1088 (corners from memory of the abstract; linear in T over log f between them: our interpolation)"
	return []NamedLimit{
		{"music-2015", "Modal decay heard in music", source, LimitCurve{{63, 0.51}, {250, 0.12}}},
		{"artificial-2015", "Modal decay heard with artificial signals", source, LimitCurve{{32, 0.9}, {200, 0.17}}},
	}
}

// Limit returns the published curve of that name.
func Limit(name string) (NamedLimit, bool) {
	for _, l := range NamedLimits() {
		if l.Name == name {
			return l, true
		}
	}
	return NamedLimit{}, false
}

// audibleWithin is how far in dB below the strongest mode at a seat a mode may
// lie and still count as heard there.
const audibleWithin = 10.0

// Rating says whether a mode is a problem and how bad.
type Rating struct {
	Problem bool
	// Severity is level + 20 log10(T60/limit) in dB, the greatest over the
	// seats at which the mode is a problem.
	Severity float64
}

// RateModes says which modes are problems: T60 over the limit at its frequency,
// and its own peak at some seat within 10 dB of the strongest there. levels is
// indexed [mode][seat], NaN where a mode is nothing at a seat.
func RateModes(modes []DampedMode, levels [][]float64, limit LimitCurve) []Rating {
	ratings := make([]Rating, len(modes))
	if len(modes) == 0 {
		return ratings
	}
	for seat := range levels[0] {
		strongest := math.Inf(-1)
		for i := range modes {
			if l := levels[i][seat]; l > strongest {
				strongest = l
			}
		}
		for i, m := range modes {
			l, over := levels[i][seat], m.Oscillator().T60()/limit.Seconds(m.Hz)
			if !(over > 1) || !(l >= strongest-audibleWithin) {
				continue
			}
			severity := l + 20*math.Log10(over)
			if !ratings[i].Problem || severity > ratings[i].Severity {
				ratings[i] = Rating{Problem: true, Severity: severity}
			}
		}
	}
	return ratings
}
