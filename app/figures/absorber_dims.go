package figures

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// sharp moves a place to the middle of a window unit, where a hair line is sharp.
func (p *cut) sharp(x vg.Length) vg.Length {
	return (vg.Length(math.Floor(float64(x/px))) + 0.5) * px
}

// say returns a dimension's text: with its name where there is room for it.
func (p *cut) say(d dim) string {
	if p.roomy {
		return d.named()
	}
	return d.value
}

// lanePitch is from one dimension line of depth to the next.
func (p *cut) lanePitch() vg.Length { return p.size + 6.5*px }

// rowPitch is from one dimension line across to the next.
func (p *cut) rowPitch() vg.Length { return 1.1*p.size + 8*px }

// foot is the room that is needed below the face.
func (p *cut) foot() vg.Length {
	h := 2*rim + overhang
	if o := p.b.openings; o != nil {
		rows := 1
		if o.step.value != "" && !o.slots {
			rows = 2
		}
		h = max(below+vg.Length(rows)*p.rowPitch(), below+2.2*p.size) + rim
	}
	return h + vg.Length(len(p.b.notes))*p.notePitch()
}

// put writes a text and takes its place.
func (p *cut) put(x, y vg.Length, s string, align float64) {
	p.used = append(p.used, p.lettered(x, y, s, align))
	p.text(x, y, s, p.size, align, p.s.Ink)
}

// lettered returns the place of a text.
func (p *cut) lettered(x, y vg.Length, s string, align float64) frame {
	w := p.measure(s, p.size)
	x -= w * vg.Length(align)
	return frame{x - px, y - 0.6*p.size, x + w + px, y + 0.5*p.size}
}

// fits says whether a place is on the canvas and free.
func (p *cut) fits(f frame) bool {
	return f.x0 >= px && f.x1 <= p.width()-px && f.y0 >= 0 && f.y1 <= p.height() && !taken(p.used, f)
}

// ticked draws a dimension line along y from x0 to x1, or up x where up is set,
// with a tick across each end. One too short for its ticks is drawn on beyond them.
func (p *cut) ticked(along, from, to vg.Length, up bool) {
	from, to = min(from, to), max(from, to)
	tick, beyond := 2.2*px, vg.Length(0)
	if to-from < 7*px {
		tick, beyond = 2*px, 4*px
	}
	line := func(a0, b0, a1, b1 vg.Length) {
		if up {
			a0, b0, a1, b1 = b0, a0, b1, a1
		}
		p.line(a0, b0, a1, b1, p.s.Hair, p.s.Ink)
	}
	line(from-beyond, along, to+beyond, along)
	for _, e := range []vg.Length{from, to} {
		line(e-tick, along-tick, e+tick, along+tick)
	}
}

// depths draws the dimensions on the left, each on its own line, upright.
func (p *cut) depths() {
	for i, d := range p.b.left {
		x := p.sharp(p.x0 - lane - vg.Length(len(p.b.left)-1-i)*p.lanePitch())
		y0, y1 := p.y(d.to), p.y(d.from)
		near := p.x0 - overhang - px
		if d.name == neckName {
			y1 = p.neckEnd()
			if p.legible() {
				near = p.opened()[0][0] - 3*px
			}
		}
		for _, y := range []vg.Length{y0, y1} {
			p.line(x-3*px, y, near, y, p.s.Hair, p.s.Faint)
		}
		p.ticked(x, y0, y1, true)
		text := p.say(d)
		if p.measure(text, p.size) > y1-y0 {
			text = d.value
		}
		half := p.measure(text, p.size) / 2
		y := max((y0+y1)/2, p.face()-overhang+half)
		y = min(y, p.height()-2*px-half)
		y = p.sharp(y-half) + 0.5*px + half
		at := p.sharp(x-5*px) + 0.5*px - 0.36*p.size // the letters stand on a whole unit, where they are sharpest
		p.upright(at, y, text, p.size, p.s.Ink)
		p.used = append(p.used, frame{at - 0.6*p.size, y - half - px, at + 0.5*p.size, y + half + px})
	}
}

// chain draws the dimensions on the right, one above another, and their texts
// beside them, moved apart where they would meet.
func (p *cut) chain() {
	if len(p.b.right) == 0 {
		return
	}
	x := p.sharp(p.x1 + lane)
	for _, d := range p.b.right {
		for _, y := range []vg.Length{p.y(d.from), p.y(d.to)} {
			p.line(p.x1+overhang+px, y, x+3*px, y, p.s.Hair, p.s.Faint)
		}
		p.ticked(x, p.y(d.to), p.y(d.from), true)
	}
	at := p.apart()
	for i, d := range p.b.right {
		mid := (p.y(d.from) + p.y(d.to)) / 2
		from := x + px
		if math.Abs(float64(at[i]-mid)) > float64(px) {
			p.line(from, mid, x+7*px, at[i], p.s.Hair, mix(p.s.Paper, p.s.Ink, 0.5))
		}
		p.put(x+8*px, at[i], p.say(d), atLeft)
	}
}

// apart returns the heights of the texts on the right, in the order of their
// dimensions from the wall: each as near to its dimension as the others and the
// canvas allow.
func (p *cut) apart() []vg.Length {
	gap := 1.25 * p.size
	high, low := p.height()-0.6*p.size-px, p.face()
	at := make([]vg.Length, len(p.b.right))
	for i, d := range p.b.right {
		at[i] = min(high, (p.y(d.from)+p.y(d.to))/2)
		if i > 0 {
			at[i] = min(at[i], at[i-1]-gap)
		}
	}
	for i := len(at) - 1; i >= 0; i-- {
		at[i] = max(at[i], low)
		low = at[i] + gap
	}
	return at
}

// acrosses draws the dimensions across, below the face.
func (p *cut) acrosses() {
	o := p.b.openings
	if o == nil {
		return
	}
	y := p.sharp(p.face() - below)
	one, ok := p.measured()
	if !ok {
		p.pointed()
		return
	}
	var (
		mid   = (one[0] + one[1]) / 2
		step  = across{p.sharp(y - p.rowPitch()), mid, mid + p.pitch(), p.say(o.step), atMiddle}
		size  = across{y, one[0], one[1], p.say(o.size), atRight}
		lines = []across{size, step}
	)
	switch {
	case o.slots:
		lines = []across{{y, one[1] - p.pitch(), one[0], step.text, atRight}, {y, one[0], one[1], size.text, atLeft}}
	case o.step.value == "":
		size.align = atMiddle
		lines = []across{size}
	}
	for _, l := range lines {
		p.lined(l)
	}
	for _, l := range lines {
		p.texted(l)
	}
}

// across is a dimension across at a height. Its text stands under the line where
// it is shorter, else beside it: before it (atRight), after it (atLeft), or under
// it all the same (atMiddle).
type across struct {
	y, x0, x1 vg.Length
	text      string
	align     float64
}

// measured returns the opening that is measured: one that is seen whole, with the
// next to its right or the slat to its left; false where there is none, or where
// they are too near each other for dimension lines.
func (p *cut) measured() (one [2]vg.Length, ok bool) {
	o := p.b.openings
	if !p.legible() || o.step.value != "" && p.pitch() < 8*px {
		return one, false
	}
	half := p.scale * vg.Length(o.across) / 2
	near := math.Inf(1)
	for _, c := range p.centres() {
		from, to, middle := c-half, c+half, c
		switch {
		case o.slots:
			from = to - p.pitch()
		case o.step.value != "":
			to = from + p.pitch() + 2*half
			middle = c + p.pitch()/2
		}
		off := math.Abs(float64(middle - (p.x0+p.x1)/2))
		if from >= p.x0-0.01*px && to <= p.x1+0.01*px && off < near-0.01 {
			one, ok, near = [2]vg.Length{c - half, c + half}, true, off
		}
	}
	return one, ok
}

// lined draws the line of a dimension across.
func (p *cut) lined(l across) {
	for _, x := range []vg.Length{l.x0, l.x1} {
		p.line(x, p.face()-2*px, x, l.y-3*px, p.s.Hair, p.s.Faint)
	}
	p.ticked(l.y, l.x0, l.x1, false)
	p.used = append(p.used, frame{l.x0 - 6*px, l.y - 2.5*px, l.x1 + 6*px, l.y + 2.5*px})
}

// texted writes the text of a dimension across where it has room.
func (p *cut) texted(l across) {
	var (
		w      = p.measure(l.text, p.size)
		under  = l.y - 0.6*p.size - 2*px
		middle = p.within((l.x0+l.x1)/2, l.text)
		places = [][3]vg.Length{{l.x0 - 8*px, l.y, atRight}, {middle, under, atMiddle}}
	)
	switch {
	case l.align == atMiddle || w+2*px <= l.x1-l.x0:
		places = places[1:]
	case l.align == atLeft:
		places[0] = [3]vg.Length{l.x1 + 8*px, l.y, atLeft}
	}
	for _, at := range places {
		if p.fits(p.lettered(at[0], at[1], l.text, float64(at[2]))) {
			p.put(at[0], at[1], l.text, float64(at[2]))
			return
		}
	}
}

// pointed says the openings in words, with a line to where they are.
func (p *cut) pointed() {
	o := p.b.openings
	x, y := (p.x0+p.x1)/2, p.face()-below
	p.line(x, p.face()+px, x, y+2*px, p.s.Hair, mix(p.s.Paper, p.s.Ink, 0.5))
	p.disc(x, p.face()+px, 1.5*px, p.s.Ink)
	row := y - 0.5*p.size
	for _, d := range []dim{o.size, o.step} {
		if d.value != "" {
			p.put(p.within(x, d.named()), row, d.named(), atMiddle)
			row -= 1.15 * p.size
		}
	}
}

// within moves the middle of a text to where all of it is on the canvas.
func (p *cut) within(x vg.Length, s string) vg.Length {
	half := p.measure(s, p.size) / 2
	return max(rim+half, min(x, p.width()-rim-half))
}

// remarks writes what else is to be said, below the dimensions.
func (p *cut) remarks() {
	y := p.face() - p.foot() + vg.Length(len(p.b.notes))*p.notePitch() + rim - 0.5*p.size
	for _, s := range p.b.notes {
		p.put(p.within((p.x0+p.x1)/2, s), y, s, atMiddle)
		y -= p.notePitch()
	}
}

// notePitch is from one remark to the next.
func (p *cut) notePitch() vg.Length { return 1.3 * p.size }
