package figures

import (
	"fmt"
	"image/color"
	"math"

	"gonum.org/v1/plot/vg"

	"stillroom/app/study"
	"stillroom/app/units"
)

// Steps of the picture of the decay: ten tones of 6 dB, to 60 dB below the
// loudest at the start.
const (
	toneDB = 6
	tones  = 10
)

// ringing draws what still sounds after each time as depth of ink, time running
// down, with the decay limit over it.
func (p lanePen) ringing() {
	x0, y0, x1, y1 := p.field()
	g := p.r.Ringing
	if g == nil {
		p.text((x0+x1)/2, (y0+y1)/2, "Calculated with the treated room", p.s.Text, atMiddle, mix(p.s.Paper, p.s.Ink, 0.6))
		return
	}
	ink, levels := p.s.Slate, g.Bare[p.v.Seat]
	if len(p.r.Absorbers) > 0 {
		ink, levels = p.s.Ochre, g.Treated[p.v.Seat]
	}
	top := y1 - legendRoom
	last := len(g.Times) - 1
	// Time runs down: the axis is turned over.
	a := scale{lo: g.Times[last], hi: 0, y0: y0, y1: top}
	loudest := loudestAtStart(g, p.v.Seat)
	for k, row := range levels {
		half := g.Times[last] / float64(last) / 2
		p.tones(row, loudest, a.y(math.Min(g.Times[k]+half, g.Times[last])), a.y(math.Max(g.Times[k]-half, 0)), ink)
	}
	step := niceTime(g.Times[last] / 3)
	var marks []float64
	for n := int(g.Times[last]/step + 1e-9); n >= 0; n-- {
		marks = append(marks, float64(n)*step)
	}
	p.marks(a, marks, "%.3g")
	p.limit(a)
	p.legendRinging(ink)
}

// loudestAtStart returns the highest level at the start at a seat, bare, so that
// bare and treated rooms are inked alike.
func loudestAtStart(g *study.Ringing, seat int) float64 {
	loudest := math.Inf(-1)
	for _, v := range g.Bare[seat][0] {
		loudest = math.Max(loudest, v)
	}
	return loudest
}

// tones fills one time's row, stretches of one tone at a time.
func (p lanePen) tones(row []float64, loudest float64, lo, hi vg.Length, ink color.Color) {
	g := p.r.Ringing
	tone := func(i int) int { return int(math.Ceil(tones - (loudest-row[i])/toneDB)) }
	edge := func(i int) vg.Length {
		switch {
		case i == 0:
			return p.x(math.Max(g.Hz[0], p.v.FromHz))
		case i == len(g.Hz):
			return p.x(math.Min(g.Hz[i-1], p.v.ToHz))
		}
		return p.x(math.Max(p.v.FromHz, math.Min(p.v.ToHz, math.Sqrt(g.Hz[i-1]*g.Hz[i]))))
	}
	for i := 0; i < len(row); {
		j, t := i+1, min(tone(i), tones)
		for j < len(row) && min(tone(j), tones) == t {
			j++
		}
		if x0, x1 := edge(i), edge(j); t > 0 && x1 > x0 {
			p.fill(x0, lo-0.2*px, x1+0.2*px, hi, mix(p.s.Paper, ink, 0.9*float64(t)/tones))
		}
		i = j
	}
}

// limit draws the decay limit over an axis of times.
func (p lanePen) limit(a scale) {
	var pts []vg.Point
	for _, m := range p.r.Modes {
		if p.sees(m.Mode.Hz) {
			pts = append(pts, vg.Point{X: p.x(m.Mode.Hz), Y: a.y(m.LimitS)})
		}
	}
	p.curve(pts, 1.4*px, p.s.Ink, 5*px, 3*px)
}

// niceTime returns a round step near a time in s.
func niceTime(v float64) float64 {
	p := math.Pow(10, math.Floor(math.Log10(v)))
	for _, m := range []float64{1, 2, 5} {
		if v <= m*p*1.01 {
			return m * p
		}
	}
	return 10 * p
}

// legendRinging says what the tones are.
func (p lanePen) legendRinging(ink color.Color) {
	_, _, x1, y1 := p.field()
	y, size := y1-7*px, p.s.Text*0.92
	x := x1 - 4*px
	name := "limit for 60 dB"
	p.text(x, y, name, size, atRight, p.s.Ink)
	x -= p.measure(name, size) + 5*px
	p.line(x-20*px, y, x, y, 1.3*px, p.s.Ink, 5*px, 3*px)
	x -= 30 * px
	p.text(x, y, "−60 dB", size, atRight, p.s.Ink)
	x -= p.measure("−60 dB", size) + 5*px
	for t := 1; t <= tones; t++ {
		p.fill(x-7*px, y-4*px, x+0.2*px, y+4*px, mix(p.s.Paper, ink, 0.9*float64(t)/tones))
		x -= 7 * px
	}
	p.text(x-5*px, y, "0", size, atRight, p.s.Ink)
}

// ringingReading says how the third octave at a frequency decays.
func ringingReading(r *study.Result, v View, hz float64) string {
	if r.Ringing == nil {
		return units.Hertz(hz)
	}
	for _, b := range r.Ringing.Bands {
		if math.Abs(math.Log10(hz/b.Hz)) > 0.05 {
			continue
		}
		s := fmt.Sprintf("%s Hz band: bare %s", b.Nominal, timesText(b.Bare[v.Seat]))
		if len(r.Absorbers) > 0 {
			s += "; treated " + timesText(b.Treated[v.Seat])
		}
		return s
	}
	return units.Hertz(hz)
}

// timesText writes the times of a decay.
func timesText(d study.DecayTimes) string {
	if d.T20 == 0 {
		return "nothing"
	}
	return fmt.Sprintf("early %s, T20 %s", units.Seconds(d.Early), units.Seconds(d.T20))
}
