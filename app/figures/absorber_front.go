package figures

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// legible says whether the openings can be drawn one by one at this scale.
func (p *cut) legible() bool { return p.pitch() >= 2.5*px }

func (p *cut) pitch() vg.Length { return p.scale * vg.Length(p.b.openings.pitch) }

// centres returns where the middles of the openings lie across, from left to
// right. Only those of a legible pattern may be asked for.
func (p *cut) centres() []vg.Length {
	var (
		o      = p.b.openings
		x0, x1 = p.ends()
		mid    = (x0 + x1) / 2
		pitch  = p.pitch()
		out    []vg.Length
	)
	if !p.broken && !o.slots {
		n := o.count
		if n == 0 {
			n = max(1, int(p.b.width/o.pitch+1e-9))
		}
		pitch = min(pitch, (x1-x0)/vg.Length(n))
		for i := range n {
			out = append(out, mid+pitch*(vg.Length(i)-vg.Length(n-1)/2))
		}
		return out
	}
	phase := 0.5
	if o.middle {
		phase = 0
	}
	reach := math.Ceil(float64((x1 - x0) / 2 / pitch))
	for k := -reach - 1; k <= reach+1; k++ {
		out = append(out, mid+pitch*vg.Length(k+phase))
	}
	return out
}

// opened returns the openings as stretches across, cut at the ends. One too
// narrow for the scale is drawn as a hair line.
func (p *cut) opened() [][2]vg.Length {
	half := max(p.scale*vg.Length(p.b.openings.across), min(0.8*p.s.Hair, p.pitch()/2)) / 2
	x0, x1 := p.ends()
	var out [][2]vg.Length
	for _, c := range p.centres() {
		from, to := max(x0, c-half), min(x1, c+half)
		if from < to {
			out = append(out, [2]vg.Length{from, to})
		}
	}
	return out
}

// front returns where the front sheet begins from behind.
func (p *cut) front() vg.Length { return p.wall - p.edges[len(p.edges)-2] }

// tubes draws the necks that go into the box. One that would reach into the
// wall is broken off before it.
func (p *cut) tubes() {
	if !p.b.box || !p.legible() {
		return
	}
	y0, y1 := p.front(), p.neckEnd()
	if y1 <= y0 {
		return
	}
	wide := max(1.5*p.s.Hair, min(p.scale*3, 3*px)) // the tube's own wall is not in the data
	x0, x1 := p.ends()
	for _, o := range p.opened() {
		l, r := max(x0, o[0]-wide), min(x1, o[1]+wide)
		p.fill(l, y0, r, y1, p.s.Paper)
		p.fill(l, y0, o[0], y1, p.s.Ochre)
		p.fill(o[1], y0, r, y1, p.s.Ochre)
		if p.cutShort() {
			m := (l + r) / 2
			tear := []vg.Point{{X: l - px, Y: y1}, {X: m - 3*px, Y: y1}, {X: m - px, Y: y1 + 2*px}, {X: m + px, Y: y1 - 2*px}, {X: m + 3*px, Y: y1}, {X: r + px, Y: y1}}
			if r-l < 8*px {
				tear = []vg.Point{{X: l - px, Y: y1 - 2*px}, {X: r + px, Y: y1 + 2*px}}
			}
			p.curve(tear, p.s.Hair, p.s.Ink)
		}
	}
}

// cutShort says whether the neck is longer than the box is deep.
func (p *cut) cutShort() bool { return p.b.neck > p.b.depth() }

// neckEnd returns the height of the neck's inner end as drawn.
func (p *cut) neckEnd() vg.Length {
	if p.cutShort() {
		return max(p.face(), p.wall-6*px)
	}
	return p.y(p.b.depth() - p.b.neck)
}

// rims draws the edges of round openings that are seen beyond the section: both
// of a hole in a sheet; of a neck its mouth and its inner end. Behind a neck that
// is shorter than the board is thick the board is cut back at 45°.
func (p *cut) rims(y0, y1 vg.Length) {
	if !p.b.box && y1-y0 < 3*p.s.Hair {
		return
	}
	inner := y1
	x0, x1 := p.ends()
	if p.b.box {
		inner = p.neckEnd()
	}
	for _, o := range p.opened() {
		if back := y1 - inner; p.b.box && back > 0 {
			p.polygon(p.s.Paper, vg.Point{X: o[0], Y: inner}, vg.Point{X: max(x0, o[0]-back), Y: y1},
				vg.Point{X: min(x1, o[1]+back), Y: y1}, vg.Point{X: o[1], Y: inner})
		}
		faint := mix(p.s.Paper, p.s.Ochre, 0.6)
		p.line(o[0], y0+p.s.Hair/2, o[1], y0+p.s.Hair/2, p.s.Hair, faint)
		if !p.b.box || !p.cutShort() {
			y := max(inner, y0+p.s.Hair) - p.s.Hair/2
			p.line(o[0], y, o[1], y, p.s.Hair, faint)
		}
	}
}

// net draws the gauze, dashed: behind a perforated sheet, over a neck's inner end.
func (p *cut) net() {
	if !p.b.gauze {
		return
	}
	dash := []vg.Length{3 * px, 2 * px}
	if !p.b.box {
		x0, x1 := p.ends()
		y := min(p.front()+2.5*px, (p.front()+p.wall)/2)
		p.line(x0, y, x1, y, 1.5*p.s.Hair, p.s.Ink, dash...)
		return
	}
	if !p.legible() {
		return
	}
	y := max(p.neckEnd(), p.face())
	for _, o := range p.opened() {
		p.line(o[0], y, o[1], y, 1.5*p.s.Hair, p.s.Ink, dash...)
	}
}

// partitions draws those across the cavity, between openings. How far apart they
// stand is not in the data: they are drawn at a whole number of pitches, about
// half as far as they are deep.
func (p *cut) partitions() {
	if !p.b.cells {
		return
	}
	var (
		o      = p.b.openings
		x0, x1 = p.ends()
		mid    = (x0 + x1) / 2
		deep   = p.wall - p.front()
		pitch  = p.pitch()
		step   = pitch * vg.Length(max(1, math.Ceil(float64(deep/2/pitch))))
	)
	step = max(step, 8*px)
	if p.legible() {
		if between := p.centres(); p.among(between, mid) {
			mid -= pitch / 2
		}
	} else if o.middle {
		mid -= pitch / 2
	}
	reach := math.Ceil(float64((x1 - x0) / step))
	for k := -reach; k <= reach; k++ {
		if x := mid + step*vg.Length(k); x > x0+2*px && x < x1-2*px {
			p.line(x, p.front(), x, p.wall, 1.6*p.s.Hair, p.s.Ochre)
		}
	}
}

// among says whether a place lies on the middle of an opening.
func (p *cut) among(centres []vg.Length, x vg.Length) bool {
	for _, c := range centres {
		if math.Abs(float64(c-x)) < float64(p.pitch())/4 {
			return true
		}
	}
	return false
}
