package figures

import (
	"fmt"
	"image/color"
	"math"
	"slices"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/study"
)

// DrawLane draws one lane over the whole canvas.
func DrawLane(c draw.Canvas, lane Lane, r *study.Result, v View, s Style) {
	p := lanePen{pen{c, s}, r, v}
	p.ground()
	p.grid()
	switch lane {
	case ModesLane:
		p.modes()
	case DensityLane:
		p.density()
	case LevelLane:
		p.level()
	case DecayLane:
		p.decay()
	case RingingLane:
		p.ringing()
	case AbsorptionLane:
		p.absorption()
	}
	p.selected()
}

// lanePen draws in a lane's frame.
type lanePen struct {
	pen
	r *study.Result
	v View
}

// field returns the lane's data area.
func (p lanePen) field() (x0, y0, x1, y1 vg.Length) {
	f := LaneFrame()
	y0 = f.Bottom
	if p.v.Ruler {
		y0 += RulerHeight()
	}
	return f.Left, y0, p.width() - f.Right, p.height() - f.Top
}

func (p lanePen) x(hz float64) vg.Length { return p.v.X(hz, p.width()) }

// sees reports whether a frequency is on the stretch of ruler that shows.
func (p lanePen) sees(hz float64) bool { return hz >= p.v.FromHz && hz <= p.v.ToHz }

// rulerMarks are the frequencies that the ruler names.
func rulerMarks() []float64 {
	return []float64{5, 6.3, 8, 10, 12.5, 16, 20, 25, 31.5, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000}
}

// grid draws the frequency lines, and their names where the ruler is wanted.
func (p lanePen) grid() {
	_, y0, _, y1 := p.field()
	last := vg.Length(-1e9)
	for _, hz := range rulerMarks() {
		if !p.sees(hz) {
			continue
		}
		x := p.x(hz)
		p.line(x, y0, x, y1, p.s.Hair, mix(p.s.Paper, p.s.Faint, 0.55))
		if !p.v.Ruler {
			continue
		}
		name := fmt.Sprintf("%g", hz)
		if w := p.measure(name, p.s.Text); x-w/2 > last+6*px && x+w/2 < p.width()-24*px {
			p.line(x, y0, x, y0-3*px, p.s.Hair, p.s.Ink)
			p.text(x, y0-10*px, name, p.s.Text, atMiddle, p.s.Ink)
			last = x + w/2
		}
	}
	if p.v.Ruler {
		p.line(LaneFrame().Left, y0, p.width()-LaneFrame().Right, y0, p.s.Hair, p.s.Ink)
		p.text(p.width()-4*px, y0-10*px, "Hz", p.s.Text, atRight, p.s.Ink)
	}
}

// selected marks the selected mode's frequency.
func (p lanePen) selected() {
	if p.v.Mode < 0 || p.v.Mode >= len(p.r.Modes) {
		return
	}
	hz := p.r.Modes[p.v.Mode].Mode.Hz
	if !p.sees(hz) {
		return
	}
	_, y0, _, y1 := p.field()
	x := p.x(hz)
	p.polygon(p.s.Select, vg.Point{X: x, Y: y1}, vg.Point{X: x - 4*px, Y: y1 + 6*px}, vg.Point{X: x + 4*px, Y: y1 + 6*px})
	p.line(x, y0, x, y1, p.s.Hair, mix(p.s.Paper, p.s.Select, 0.35))
}

// scale is a vertical axis.
type scale struct {
	lo, hi float64
	log    bool
	y0, y1 vg.Length
}

func (a scale) y(v float64) vg.Length {
	share := (v - a.lo) / (a.hi - a.lo)
	if a.log {
		share = math.Log(v/a.lo) / math.Log(a.hi/a.lo)
	}
	return a.y0 + (a.y1-a.y0)*vg.Length(math.Max(-0.02, math.Min(1.02, share)))
}

// marks draws an axis's lines and figures.
func (p lanePen) marks(a scale, values []float64, format string) {
	x0, _, x1, _ := p.field()
	last := vg.Length(-1e9)
	for _, v := range values {
		y := a.y(v)
		if y < a.y0-1 || y > a.y1+1 {
			continue
		}
		p.line(x0, y, x1, y, p.s.Hair, mix(p.s.Paper, p.s.Faint, 0.7))
		if y-last > p.s.Text*1.05 {
			p.text(x0-5*px, y, fmt.Sprintf(format, v), p.s.Text*0.92, atRight, p.s.Ink)
			last = y
		}
	}
}

// level draws the curves at the seat.
func (p lanePen) level() {
	_, y0, _, y1 := p.field()
	l := p.r.Levels
	lo, hi := math.Inf(1), math.Inf(-1)
	for i, hz := range l.Hz {
		if p.sees(hz) {
			for _, v := range []float64{l.Bare[p.v.Seat][i], l.Treated[p.v.Seat][i], l.Lowest[i], l.Highest[i]} {
				lo, hi = math.Min(lo, v), math.Max(hi, v)
			}
		}
	}
	if math.IsInf(lo, 0) || math.IsInf(hi, 0) {
		lo, hi = -20, 20
	}
	hi = math.Ceil(hi/10)*10 + 0.1
	lo = math.Max(math.Floor(lo/10)*10, hi-60)
	many := len(l.Treated) > 1
	if len(p.r.Absorbers) > 0 || many {
		y1 -= legendRoom
	}
	a := scale{lo: lo, hi: hi, y0: y0, y1: y1}
	var marks []float64
	for v := math.Ceil(lo/10) * 10; v <= hi; v += 10 {
		marks = append(marks, v)
	}
	p.marks(a, marks, "%.0f")
	p.spread(a)
	if len(p.r.Absorbers) > 0 {
		p.curve(p.levelPoints(a, l.Bare[p.v.Seat]), 1.2*px, p.s.Slate, 4*px, 2.5*px)
		p.curve(p.levelPoints(a, l.Treated[p.v.Seat]), 1.9*px, p.s.Ochre)
	} else {
		p.curve(p.levelPoints(a, l.Bare[p.v.Seat]), 1.7*px, p.s.Slate)
	}
	var entries []entry
	if len(p.r.Absorbers) > 0 {
		entries = []entry{{"bare", p.s.Slate, []vg.Length{4 * px, 2.5 * px}}, {"treated", p.s.Ochre, nil}}
	}
	if many {
		dots := []vg.Length{1.2 * px, 2.2 * px}
		p.curve(p.levelPoints(a, l.Mean), 1.2*px, p.s.Ink, dots...)
		name := "mean of the seats, range shaded"
		if p.r.Robustness != nil {
			name = "mean of the seats"
		}
		entries = append(entries, entry{name, p.s.Ink, dots})
	}
	if p.r.Robustness != nil {
		entries = append(entries, entry{"tolerances", mix(p.s.Paper, p.s.Ochre, 0.34), nil})
	}
	p.legend(entries)
}

// spread lays a range of the treated levels under the curves: that of building
// tolerances where it is there, else that over all seats.
func (p lanePen) spread(a scale) {
	l := p.r.Levels
	lowest, highest, depth := l.Lowest, l.Highest, 0.16
	switch g := p.r.Robustness; {
	case g != nil:
		lowest, highest, depth = g.Lowest[p.v.Seat], g.Highest[p.v.Seat], 0.34
	case len(l.Treated) < 2:
		return
	}
	outline := p.levelPoints(a, lowest)
	for _, q := range slices.Backward(p.levelPoints(a, highest)) {
		outline = append(outline, q)
	}
	if len(outline) > 2 {
		p.polygon(mix(p.s.Paper, p.s.Ochre, depth), outline...)
	}
}

func (p lanePen) levelPoints(a scale, level []float64) []vg.Point {
	var pts []vg.Point
	for i, hz := range p.r.Levels.Hz {
		if p.sees(hz) {
			pts = append(pts, vg.Point{X: p.x(hz), Y: a.y(level[i])})
		}
	}
	return pts
}

// legendRoom is the strip at the top of a lane that is left to its legend.
const legendRoom = 14 * px

// entry is one line of a legend.
type entry struct {
	name string
	ink  color.Color
	dash []vg.Length
}

// legend names the curves at the top right.
func (p lanePen) legend(entries []entry) {
	_, _, x1, y1 := p.field()
	x, y := x1-4*px, y1-7*px
	for i := len(entries) - 1; i >= 0; i-- {
		e := entries[i]
		w := p.measure(e.name, p.s.Text*0.92)
		p.fill(x-w-30*px, y-6*px, x+2*px, y+6*px, p.s.Paper)
		p.text(x, y, e.name, p.s.Text*0.92, atRight, p.s.Ink)
		p.line(x-w-26*px, y, x-w-5*px, y, 1.6*px, e.ink, e.dash...)
		x -= w + 38*px
	}
}

// density draws mode counts per third octave, the asymptote and the absorbers'
// bands of action over them.
func (p lanePen) density() {
	_, y0, _, y1 := p.field()
	most := 4.0
	for _, b := range p.r.Bands {
		most = math.Max(most, math.Max(float64(b.Count), b.Asymptote))
	}
	a := scale{lo: 0, hi: most * 1.05, y0: y0, y1: y1}
	step := niceStep(most / 3)
	var marks []float64
	for v := 0.0; v <= most; v += step {
		marks = append(marks, v)
	}
	p.marks(a, marks, "%.0f")
	var line []vg.Point
	for _, b := range p.r.Bands {
		lo, hi := math.Max(b.LoHz, p.v.FromHz), math.Min(b.HiHz, p.v.ToHz)
		if lo >= hi {
			continue
		}
		x0, x1 := p.x(lo), p.x(hi)
		p.fill(x0+0.5*px, y0, x1-0.5*px, a.y(float64(b.Count)), mix(p.s.Paper, p.s.Slate, 0.45))
		if p.sees(b.CentreHz) {
			line = append(line, vg.Point{X: p.x(b.CentreHz), Y: a.y(b.Asymptote)})
		}
	}
	p.curve(line, 1.2*px, p.s.Ink, 3*px, 2*px)
	p.bands(y1)
}

// bands draws each absorber's band of action as a span under the top edge. Those
// that are too many to be told apart go without names, but for the selected one.
func (p lanePen) bands(top vg.Length) {
	var (
		row            int
		used           []frame
		_, _, right, _ = p.field()
		size           = p.s.Text * 0.85
	)
	for _, i := range p.absorberOrder() {
		b := p.r.Absorbers[i]
		o := b.Report.Oscillator
		if o == nil || b.Report.Band[1] < p.v.FromHz || b.Report.Band[0] > p.v.ToHz {
			continue
		}
		y := top - vg.Length(4+9*(row%5))*px
		row++
		x0, x1 := p.x(math.Max(b.Report.Band[0], p.v.FromHz)), p.x(math.Min(b.Report.Band[1], p.v.ToHz))
		w := 2.2 * px
		if i == p.v.Absorber {
			w = 4 * px
		}
		p.line(x0, y, x1, y, w, p.s.Ochre)
		p.line(x0, y-3*px, x0, y+3*px, p.s.Hair, p.s.Ochre)
		p.line(x1, y-3*px, x1, y+3*px, p.s.Hair, p.s.Ochre)
		x, align, room := x1+4*px, atLeft, p.measure(b.ID, size)
		at := frame{x, y - size/2, x + room, y + size/2}
		if at.x1 > right {
			x, align = x0-4*px, atRight
			at = frame{x - room, y - size/2, x, y + size/2}
		}
		band := frame{x0, y - 3*px, x1, y + 3*px}
		if !taken(used, at) {
			p.text(x, y, b.ID, size, align, p.s.Ink)
			used = append(used, at)
		}
		used = append(used, band)
	}
}

// absorberOrder lists the absorbers, the selected one first.
func (p lanePen) absorberOrder() []int {
	var order []int
	if i := p.v.Absorber; i >= 0 && i < len(p.r.Absorbers) {
		order = append(order, i)
	}
	for i := range p.r.Absorbers {
		if i != p.v.Absorber {
			order = append(order, i)
		}
	}
	return order
}

func niceStep(v float64) float64 {
	p := math.Pow(10, math.Floor(math.Log10(v)))
	for _, m := range []float64{1, 2, 5, 10} {
		if v <= m*p {
			return math.Max(1, m*p)
		}
	}
	return 10 * p
}

// decay draws T60 of each mode, bare and treated, with the limit.
func (p lanePen) decay() {
	_, y0, _, y1 := p.field()
	hi := 1.0
	for _, m := range p.r.Modes {
		if p.sees(m.Mode.Hz) {
			hi = math.Max(hi, m.Oscillator.T60())
		}
	}
	a := scale{lo: 0.05, hi: math.Min(hi*1.2, 60), log: true, y0: y0, y1: y1 - legendRoom}
	p.marks(a, []float64{0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50}, "%g")
	var limit []vg.Point
	for _, m := range p.r.Modes {
		if p.sees(m.Mode.Hz) {
			limit = append(limit, vg.Point{X: p.x(m.Mode.Hz), Y: a.y(m.LimitS)})
		}
	}
	p.curve(limit, 1.2*px, p.s.Ink, 5*px, 3*px)
	for i, m := range p.r.Modes {
		if !p.sees(m.Mode.Hz) {
			continue
		}
		x, y := p.x(m.Mode.Hz), a.y(m.Oscillator.T60())
		r := 2.6 * px
		if m.Problem {
			r = 3.6 * px
		}
		p.ring(x, y, r, 1.2*px, p.s.Slate)
		p.offBar(i, a)
		for _, t := range m.Poles() {
			if hz := t.Oscillator.Natural; p.sees(hz) {
				p.diamond(p.x(hz), a.y(math.Max(0.05, t.Oscillator.T60())), 3*px)
			}
		}
	}
	p.legendDecay()
}

// offBar draws the range of a mode's longest decay under building tolerances.
func (p lanePen) offBar(mode int, a scale) {
	g := p.r.Robustness
	if g == nil || mode >= len(g.T60) || g.T60[mode][1] == 0 {
		return
	}
	x := p.x(p.r.Modes[mode].Mode.Hz)
	p.line(x, a.y(math.Max(0.05, g.T60[mode][0])), x, a.y(math.Max(0.05, g.T60[mode][1])), 3.5*px, mix(p.s.Paper, p.s.Ochre, 0.35))
}

// diamond is the sign of a treated pole.
func (p lanePen) diamond(x, y, r vg.Length) {
	p.polygon(p.s.Ochre, vg.Point{X: x - r, Y: y}, vg.Point{X: x, Y: y + r}, vg.Point{X: x + r, Y: y}, vg.Point{X: x, Y: y - r})
}

func (p lanePen) legendDecay() {
	_, _, x1, y1 := p.field()
	y, size := y1-7*px, p.s.Text*0.92
	x := x1 - 4*px
	put := func(name string, sign func(x vg.Length)) {
		w := p.measure(name, size)
		p.fill(x-w-24*px, y-6*px, x+2*px, y+6*px, p.s.Paper)
		p.text(x, y, name, size, atRight, p.s.Ink)
		sign(x - w - 12*px)
		x -= w + 32*px
	}
	put("limit", func(x vg.Length) { p.line(x-9*px, y, x+8*px, y, 1.2*px, p.s.Ink, 5*px, 3*px) })
	if len(p.r.Absorbers) > 0 {
		put("treated", func(x vg.Length) { p.diamond(x, y, 3*px) })
	}
	put("bare", func(x vg.Length) { p.ring(x, y, 2.6*px, 1.2*px, p.s.Slate) })
}
