package figures

import (
	"fmt"
	"math"
	"strings"

	"gonum.org/v1/plot/vg"

	"stillroom/acoustics"
	"stillroom/app/study"
	"stillroom/app/units"
)

// staff returns the stretch of a stave: axial on top, then tangential, oblique.
func staff(kind acoustics.Kind, y0, y1 vg.Length) (lo, hi vg.Length) {
	h := (y1 - y0) / 3
	hi = y1 - h*vg.Length(kind-acoustics.Axial)
	return hi - h, hi
}

// loudest returns the level of the strongest mode at a seat.
func loudest(r *study.Result, seat int) float64 {
	top := math.Inf(-1)
	for _, m := range r.Modes {
		if l := m.LevelDB[seat]; l > top {
			top = l
		}
	}
	return top
}

// ink returns how dark a mode is drawn: by its level below the strongest, 40 dB
// down being the palest.
func ink(level, top float64) float64 {
	if math.IsNaN(level) {
		return 0.1
	}
	return math.Max(0.1, 1+(level-top)/40)
}

// modes draws the three staves.
func (p lanePen) modes() {
	x0, y0, x1, y1 := p.field()
	names := [3]string{"axial", "tang.", "obl."}
	for i, k := range []acoustics.Kind{acoustics.Axial, acoustics.Tangential, acoustics.Oblique} {
		lo, hi := staff(k, y0, y1)
		p.line(x0, lo, x1, lo, p.s.Hair, p.s.Faint)
		p.text(x0-5*px, (lo+hi)/2, names[i], p.s.Text*0.92, atRight, p.s.Ink)
	}
	top := loudest(p.r, p.v.Seat)
	for i, m := range p.r.Modes {
		if !p.sees(m.Mode.Hz) {
			continue
		}
		lo, hi := staff(m.Mode.Kind(), y0, y1)
		middle := lo + (hi-lo)*0.45
		p.bar(m.Oscillator, middle, hi-3*px, mix(p.s.Paper, p.s.Slate, ink(m.LevelDB[p.v.Seat], top)))
		for _, t := range m.Poles() {
			p.bar(t.Oscillator, lo+2*px, middle-1*px, mix(p.s.Paper, p.s.Ochre, ink(t.LevelDB[p.v.Seat], top)))
		}
		if m.Problem {
			p.mark(m, i == p.v.Mode, hi)
		}
	}
}

// bar draws one oscillation as wide as its half-power width.
func (p lanePen) bar(o acoustics.Oscillator, lo, hi vg.Length, col interface {
	RGBA() (r, g, b, a uint32)
}) {
	half := o.HalfPowerWidth() / 2
	if !p.sees(o.Natural) {
		return
	}
	x0, x1 := p.x(math.Max(o.Natural-half, p.v.FromHz)), p.x(math.Min(o.Natural+half, p.v.ToHz))
	if x1-x0 < 1.5*px {
		x := p.x(o.Natural)
		x0, x1 = x-0.75*px, x+0.75*px
	}
	p.fill(x0, lo, x1, hi, col)
}

// mark puts a problem's rank beside its bar, the first five only.
func (p lanePen) mark(m study.ModeRow, selected bool, hi vg.Length) {
	if m.Rank > 5 && !selected {
		return
	}
	p.text(p.x(m.Mode.Hz)+3.5*px, hi-8*px, fmt.Sprint(m.Rank), p.s.Text*0.85, atLeft, p.s.Warning)
}

// ModeHit is where a mode's bar stands in the modes lane, for pointing at it.
type ModeHit struct {
	Mode   int
	X      vg.Length
	Y0, Y1 vg.Length // from the lane's bottom
}

// ModeHits returns the bars of the modes lane of the given size.
func ModeHits(r *study.Result, v View, width, height vg.Length) []ModeHit {
	f := LaneFrame()
	y0 := f.Bottom
	if v.Ruler {
		y0 += RulerHeight()
	}
	var out []ModeHit
	for i, m := range r.Modes {
		if m.Mode.Hz < v.FromHz || m.Mode.Hz > v.ToHz {
			continue
		}
		lo, hi := staff(m.Mode.Kind(), y0, height-f.Top)
		out = append(out, ModeHit{i, v.X(m.Mode.Hz, width), lo, hi})
	}
	return out
}

// LaneReading says in words what a lane shows at a frequency.
func LaneReading(lane Lane, r *study.Result, v View, hz float64) string {
	switch lane {
	case ModesLane:
		if i := NearestMode(r, hz); i >= 0 {
			m := r.Modes[i]
			return fmt.Sprintf("%s %s  %s  T60 %s  level %s", m.Mode, m.Mode.Kind(), units.Hertz(m.Mode.Hz), units.Seconds(m.Oscillator.T60()), units.Decibels(m.LevelDB[v.Seat]))
		}
	case DensityLane:
		for _, b := range r.Bands {
			if hz >= b.LoHz && hz < b.HiHz {
				return fmt.Sprintf("%s Hz band: %d modes, asymptote %.1f", b.Nominal, b.Count, b.Asymptote)
			}
		}
	case LevelLane:
		if i := nearest(r.Levels.Hz, hz); i >= 0 {
			s := fmt.Sprintf("%s  bare %s", units.Hertz(hz), units.Decibels(r.Levels.Bare[v.Seat][i]))
			if len(r.Absorbers) > 0 {
				s += "  treated " + units.Decibels(r.Levels.Treated[v.Seat][i])
			}
			if g := r.Robustness; g != nil {
				s += fmt.Sprintf(" (%s to %s)", strings.TrimSuffix(units.Decibels(g.Lowest[v.Seat][i]), " dB"), strings.TrimSuffix(units.Decibels(g.Highest[v.Seat][i]), " dB"))
			}
			if len(r.Levels.Treated) > 1 {
				s += fmt.Sprintf("  all seats mean %s, %s to %s", units.Decibels(r.Levels.Mean[i]), strings.TrimSuffix(units.Decibels(r.Levels.Lowest[i]), " dB"), units.Decibels(r.Levels.Highest[i]))
			}
			return s
		}
	case DecayLane:
		if i := NearestMode(r, hz); i >= 0 {
			m := r.Modes[i]
			s := fmt.Sprintf("%s  bare %s", m.Mode, units.Seconds(m.Oscillator.T60()))
			if t := m.LongestTreated(); t > 0 {
				s += "  treated " + units.Seconds(t)
			}
			if g := r.Robustness; g != nil && i < len(g.T60) && g.T60[i][1] > 0 {
				s += fmt.Sprintf(" (%.2f to %.2f s by tolerances)", g.T60[i][0], g.T60[i][1])
			}
			return s + "  limit " + units.Seconds(m.LimitS)
		}
	case RingingLane:
		return ringingReading(r, v, hz)
	case AbsorptionLane:
		if v.Absorber >= 0 && v.Absorber < len(r.Absorbers) {
			a := r.Absorbers[v.Absorber]
			for _, t := range a.Report.ThirdOctaves {
				if math.Abs(math.Log10(hz/t.Hz)) <= 0.05 {
					return fmt.Sprintf("%s  %s Hz band: α %.2f diffuse, %.2f normal", a.ID, t.Nominal, t.Diffuse, t.Normal)
				}
			}
		}
	}
	return units.Hertz(hz)
}

// NearestMode returns the index of the mode nearest to a frequency, −1 where
// there is none.
func NearestMode(r *study.Result, hz float64) int {
	best, at := math.Inf(1), -1
	for i, m := range r.Modes {
		if d := math.Abs(m.Mode.Hz - hz); d < best {
			best, at = d, i
		}
	}
	return at
}

func nearest(list []float64, v float64) int {
	best, at := math.Inf(1), -1
	for i, x := range list {
		if d := math.Abs(math.Log(x / v)); d < best {
			best, at = d, i
		}
	}
	return at
}
