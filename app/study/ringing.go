package study

import (
	"math"

	"stillroom/acoustics"
)

// Ringing is the decay in time at each seat, by the impulse response that the
// room's oscillations up to Options.ModesToHz make, without those that last less
// than 0.02 s.
type Ringing struct {
	Hz, Times []float64 // Hz, s
	// Bare and Treated are what still sounds after each time, dB, indexed
	// [seat][time][frequency]. Treated is Bare where there is no absorber.
	Bare, Treated [][][]float64
	Bands         []BandDecay // third octaves wholly within the range
}

// BandDecay is the energy decay of a third octave at each seat, by Schroeder's
// backward integration.
type BandDecay struct {
	Nominal       string
	Hz            float64
	Bare, Treated []DecayTimes // per seat
}

// DecayTimes are read off a decay by straight lines; 0 where nothing decays.
type DecayTimes struct {
	Early float64 // s, from 0 to −10 dB
	T20   float64 // s, from −5 to −25 dB
}

// How fine the picture of the decay is.
const (
	ringingPoints = 240
	ringingTimes  = 48
)

// ringingPart is the decay in time with what it was made from.
type ringingPart struct {
	field   *fieldPart
	poles   *polesPart
	ringing *Ringing
}

func ringingStage(o Options, field *fieldPart, poles *polesPart, past *ringingPart) *ringingPart {
	if past != nil && past.field == field && past.poles == poles {
		return past
	}
	treated := len(field.kit.units) > 0
	g := &Ringing{Hz: Frequencies(o.FromHz, math.Min(o.ToHz, o.ModesToHz), ringingPoints), Times: make([]float64, ringingTimes)}
	horizon := horizonOf(field.shell.modes)
	for i := range g.Times {
		g.Times[i] = horizon * float64(i) / (ringingTimes - 1)
	}
	for _, b := range acoustics.ThirdOctaves(o.FromHz, o.ModesToHz) {
		if b.Lower >= o.FromHz && b.Upper <= o.ModesToHz {
			g.Bands = append(g.Bands, BandDecay{Nominal: b.Nominal, Hz: b.Centre})
		}
	}
	for seat := range field.seats {
		bare := field.field.BarePartials(o.ModesToHz, seat)
		g.Bare = append(g.Bare, bare.Ringing(g.Hz, g.Times))
		after := bare
		if treated {
			after = poles.poles.Partials(seat)
			g.Treated = append(g.Treated, after.Ringing(g.Hz, g.Times))
		} else {
			g.Treated = append(g.Treated, g.Bare[seat])
		}
		for i := range g.Bands {
			b := &g.Bands[i]
			b.Bare = append(b.Bare, decayTimes(bare, b.Hz))
			if treated {
				b.Treated = append(b.Treated, decayTimes(after, b.Hz))
			} else {
				b.Treated = append(b.Treated, b.Bare[seat])
			}
		}
	}
	return &ringingPart{field: field, poles: poles, ringing: g}
}

// decayTimes reads a third octave's decay.
func decayTimes(p acoustics.Partials, hz float64) DecayTimes {
	d, ok := p.Backward(acoustics.ThirdOctave(int(math.Round(10 * math.Log10(hz/1000)))))
	if !ok {
		return DecayTimes{}
	}
	return DecayTimes{Early: d.Time(0, -10), T20: d.Time(-5, -25)}
}

// horizonOf returns how long a decay is shown, s: until the longest-lasting mode
// is 45 dB down, within what is worth looking at.
func horizonOf(modes []acoustics.DampedMode) float64 {
	var longest float64
	for _, m := range modes {
		longest = math.Max(longest, m.Oscillator().T60())
	}
	t := math.Max(0.4, math.Min(4, 0.75*longest))
	return math.Ceil(t*5) / 5
}
