package figures

import (
	"math"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/project"
)

// cut draws the section through one unit of an absorber: the wall above, the
// room below.
type cut struct {
	pen
	b      build
	size   vg.Length // of lettering
	roomy  bool      // dimensions have their names beside them
	scale  vg.Length // per mm, both ways
	x0, x1 vg.Length // the stretch of the width that is seen
	wall   vg.Length // height of the wall's face
	edges  []vg.Length
	broken bool // both sides are broken off
	used   []frame
}

const (
	masonry  = 12 * px // thickness in which the wall is hinted, not to scale
	overhang = 5 * px  // of a break line, and of what is drawn to be cut by it
	rim      = 4 * px  // from the canvas's edge
	lane     = 9 * px  // from the section to its first dimension line
	below    = 12 * px // from the face to the first dimension line
)

// DrawAbsorber draws the section through one unit of an absorber, to one scale
// both ways, with its dimensions. Where it is much wider than deep it shows a
// stretch of it between break lines. A layer or an opening too thin for the
// scale is drawn as a hair line, and a box over twenty times as deep as wide is
// drawn too wide. An absorber without its block leaves the canvas empty.
func DrawAbsorber(c draw.Canvas, a project.Absorber, us bool, s Style) {
	p := &cut{pen: pen{c, s}}
	p.ground()
	b, ok := builds(a, View{US: us}.system())
	if !ok {
		return
	}
	p.b = b
	p.roomy = p.width() >= 300*px
	p.size = s.Text * 0.85
	if p.roomy {
		p.size = s.Text * 0.95
		p.b.notes = append(p.b.notes, b.assumed...)
	}
	if !p.place() {
		return
	}
	p.masonry()
	p.layers()
	p.partitions()
	p.tubes()
	p.sheets()
	p.net()
	p.bounds()
	p.depths()
	p.chain()
	p.acrosses()
	p.remarks()
}

// place finds the scale and where the section lies, false where there is no
// room for one.
func (p *cut) place() bool {
	var (
		depth = p.b.depth()
		left  = rim + lane + vg.Length(len(p.b.left))*p.lanePitch() - 2*px
		right = rim + lane + 8*px
		top   = rim + masonry
		foot  = p.foot()
	)
	var column vg.Length
	for _, d := range p.b.right {
		column = max(column, p.measure(p.say(d), p.size))
	}
	right += column
	w, h := p.width()-left-right, p.height()-top-foot
	if w < 20*px || h < 20*px {
		return false
	}
	// What has a pattern or an edge to show is seen as far as it needs, what is
	// the same all along as far as it fills the canvas.
	wide := p.b.stretch
	if !p.b.box {
		wide = max(1, min(wide, float64(w/h)))
	}
	shown := max(p.b.least, wide*depth)
	p.broken = p.b.width > 1.1*shown
	if !p.broken {
		shown = p.b.width
	}
	p.scale = min(w/vg.Length(shown), h/vg.Length(depth))
	across := min(w, max(p.scale*vg.Length(shown), h/20))
	p.x0 = left + (w-across)/2
	p.x1 = p.x0 + across
	p.edges = []vg.Length{0}
	var deep vg.Length
	for _, l := range p.b.layers {
		deep += max(p.scale*vg.Length(l.thick), p.s.Hair)
		p.edges = append(p.edges, deep)
	}
	if deep > h { // hair lines have made it deeper than the canvas: give their room back
		for i := range p.edges {
			p.edges[i] *= h / deep
		}
		deep = h
	}
	var upright vg.Length
	for _, d := range p.b.left {
		upright = max(upright, p.measure(d.value, p.size))
	}
	face := foot + (h-deep)/2
	face = max(foot, min(face, p.height()-rim-upright))
	p.wall = face + deep
	return true
}

// face returns the height of the absorber's face.
func (p *cut) face() vg.Length { return p.wall - p.edges[len(p.edges)-1] }

// y returns the height of a depth in mm from the wall.
func (p *cut) y(mm float64) vg.Length {
	for i, l := range p.b.layers {
		if mm <= l.thick || i == len(p.b.layers)-1 {
			share := vg.Length(max(0, min(1, mm/l.thick)))
			return p.wall - p.edges[i] - share*(p.edges[i+1]-p.edges[i])
		}
		mm -= l.thick
	}
	return p.wall
}

// pattern is the unit of size of hatching, wool and break lines.
func (p *cut) pattern() vg.Length {
	if p.roomy {
		return 1.35 * px
	}
	return px
}

// ends returns how far what is to be cut by the break lines is drawn.
func (p *cut) ends() (vg.Length, vg.Length) {
	if p.broken {
		return p.x0 - overhang, p.x1 + overhang
	}
	return p.x0, p.x1
}

// masonry hatches the wall.
func (p *cut) masonry() {
	x0, x1 := p.x0-overhang, p.x1+overhang
	ink := mix(p.s.Paper, p.s.Ink, 0.5)
	step := 5 * p.pattern()
	for x := x0 - masonry; x < x1; x += step {
		from, to := max(x, x0), min(x+masonry, x1)
		p.line(from, p.wall+from-x, to, p.wall+to-x, p.s.Hair, ink)
	}
}

// layers draws the wool, and its edges to the air.
func (p *cut) layers() {
	x0, x1 := p.ends()
	for i, l := range p.b.layers {
		if l.of == boardLayer {
			p.fill(x0, p.wall-p.edges[i+1], x1, p.wall-p.edges[i], p.s.Ochre)
		}
		if l.of != woolLayer {
			continue
		}
		y0, y1 := p.wall-p.edges[i+1], p.wall-p.edges[i]
		p.wool(x0, y0, x1, y1)
		for _, y := range []vg.Length{y0, y1} {
			if y < p.wall {
				p.line(x0, y, x1, y, p.s.Hair, p.s.Ochre)
			}
		}
	}
}

// wool fills a rectangle with staggered rows of short bows.
func (p *cut) wool(x0, y0, x1, y1 vg.Length) {
	p.fill(x0, y0, x1, y1, mix(p.s.Paper, p.s.Ochre, 0.13))
	k := p.pattern()
	half, step, high := 3.2*k, 11*k, 6.5*k
	rows := int((y1 - y0) / high)
	if rows == 0 && y1-y0 > 3*px {
		rows = 1
	}
	p.stroke(p.s.Hair, mix(p.s.Paper, p.s.Ochre, 0.75))
	var path vg.Path
	for i := range rows {
		y := y0 + (y1-y0)*(vg.Length(i)+0.5)/vg.Length(rows)
		shift := vg.Length(i%2) * step / 2
		first := math.Ceil(float64((x1-x0)/2/step)) + 1
		for x := (x0+x1)/2 + shift - step*vg.Length(first); x < x1; x += step {
			if x-half < x0+px || x+half > x1-px {
				continue
			}
			for i := -4; i <= 4; i++ {
				u := vg.Length(i) / 4
				q := p.at(x+half*u, y+0.7*k-2.1*k*u*u)
				if i == -4 {
					path.Move(q)
				} else {
					path.Line(q)
				}
			}
		}
	}
	if len(path) > 0 {
		p.c.Stroke(path)
	}
}

// sheets draws what is solid, left out where it opens.
func (p *cut) sheets() {
	x0, x1 := p.ends()
	for i, l := range p.b.layers {
		if l.of != sheetLayer {
			continue
		}
		y0, y1 := p.wall-p.edges[i+1], p.wall-p.edges[i]
		switch {
		case p.b.openings == nil:
			p.fill(x0, y0, x1, y1, p.s.Ochre)
			continue
		case !p.legible():
			p.fill(x0, y0, x1, y1, mix(p.s.Paper, p.s.Ochre, 0.6))
			continue
		}
		at := x0
		for _, o := range p.opened() {
			if o[0] > at {
				p.fill(at, y0, o[0], y1, p.s.Ochre)
			}
			at = max(at, o[1])
		}
		if at < x1 {
			p.fill(at, y0, x1, y1, p.s.Ochre)
		}
		if !p.b.openings.slots {
			p.rims(y0, y1)
		}
	}
}

// bounds draws the wall's face and the sides, or breaks them off.
func (p *cut) bounds() {
	face := p.face()
	p.line(p.x0-overhang, p.wall, p.x1+overhang, p.wall, 1.6*p.s.Hair, p.s.Ink)
	if !p.broken {
		for _, x := range []vg.Length{p.x0, p.x1} {
			p.line(x, face, x, p.wall, 1.6*p.s.Hair, p.s.Ochre)
		}
		return
	}
	y0, y1 := face-overhang, p.wall+masonry
	k := p.pattern()
	// The line jags in the middle of the thickest layer, clear of where layers meet.
	mid, thick := (face+p.wall)/2, vg.Length(0)
	for i := range p.b.layers {
		if d := p.edges[i+1] - p.edges[i]; d > thick {
			mid, thick = p.wall-p.edges[i]-d/2, d
		}
	}
	for side, x := range []vg.Length{p.x0, p.x1} {
		tear := []vg.Point{{X: x, Y: y1}, {X: x, Y: mid + 6*k}, {X: x - 3*k, Y: mid + 2*k},
			{X: x + 3*k, Y: mid - 2*k}, {X: x, Y: mid - 6*k}, {X: x, Y: y0}}
		out := x + vg.Length(2*side-1)*(overhang+px)
		p.polygon(p.s.Paper, append(tear[:len(tear):len(tear)], vg.Point{X: out, Y: y0}, vg.Point{X: out, Y: y1 + px})...)
		p.curve(tear, p.s.Hair, mix(p.s.Paper, p.s.Ink, 0.75))
	}
}
