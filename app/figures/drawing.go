package figures

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/app/study"
	"stillroom/app/units"
)

// sheetPen draws the room to scale, seen from above or from the side.
type sheetPen struct {
	pen
	r    *study.Result
	v    View
	at   Placement
	up   int // the room's axis that runs up the sheet: 1 in plan, 2 in section
	used []frame
}

// frame is a stretch of sheet that lettering has taken.
type frame struct{ x0, y0, x1, y1 vg.Length }

func (f frame) meets(g frame) bool {
	return f.x0 < g.x1 && g.x0 < f.x1 && f.y0 < g.y1 && g.y0 < f.y1
}

// DrawPlan draws the room from above: front wall to the left, left wall below.
func DrawPlan(c draw.Canvas, r *study.Result, v View, s Style) {
	p := &sheetPen{pen: pen{c, s}, r: r, v: v, up: 1}
	p.at = PlanPlacement(r.Project, p.width(), p.height())
	if v.PlanAt != nil {
		p.at = v.PlanAt.holding(r.Project.Room.Length, r.Project.Room.Width)
	}
	p.sheet("Plan", [4]acoustics.Surface{acoustics.Front, acoustics.Back, acoustics.Left, acoustics.Right})
}

// DrawSection draws the long section, seen from the left wall.
func DrawSection(c draw.Canvas, r *study.Result, v View, s Style) {
	p := &sheetPen{pen: pen{c, s}, r: r, v: v, up: 2}
	p.at = SectionPlacement(r.Project, p.width(), p.height())
	if v.SectionAt != nil {
		p.at = v.SectionAt.holding(r.Project.Room.Length, r.Project.Room.Height)
	}
	p.sheet("Long section", [4]acoustics.Surface{acoustics.Front, acoustics.Back, acoustics.Floor, acoustics.Ceiling})
}

// system returns the view's units.
func (v View) system() units.System {
	if v.US {
		return units.US
	}
	return units.Metric
}

// sheet draws everything; round are the surfaces at its left, right, lower and
// upper edge.
func (p *sheetPen) sheet(title string, round [4]acoustics.Surface) {
	p.ground()
	if m := p.levelMap(); m != nil {
		p.loudness(m)
		title = p.mapTitle(title, m)
	} else {
		p.pattern()
	}
	p.walls(round)
	p.keepOuts()
	p.absorbers()
	p.loudspeakers()
	p.seats()
	p.labels()
	p.dimensions()
	p.text(8*px, p.height()-9*px, title, p.s.Text, atLeft, p.s.Ink)
	p.linings(round, 8*px+p.measure(title, p.s.Text))
}

// dims returns the room's dimensions in axis order.
func (p *sheetPen) dims() [3]float64 { return p.r.Room.Box.Dimensions() }

// pattern tints the sheet by the selected mode's pressure and dashes its nodes.
func (p *sheetPen) pattern() {
	if p.v.Mode < 0 || p.v.Mode >= len(p.r.Modes) {
		return
	}
	var (
		m    = p.r.Modes[p.v.Mode].Mode.Mode
		d    = p.dims()
		nx   = min(48, 6+6*m.Order[0])
		ny   = min(36, 4+6*m.Order[p.up])
		rest = p.elsewhere(m)
	)
	for i := range nx {
		for j := range ny {
			x := (float64(i) + 0.5) / float64(nx)
			y := (float64(j) + 0.5) / float64(ny)
			a := math.Abs(rest * math.Cos(float64(m.Order[0])*math.Pi*x) * math.Cos(float64(m.Order[p.up])*math.Pi*y))
			if a < 0.06 {
				continue
			}
			x0, y0 := p.at.To(d[0]*float64(i)/float64(nx), d[p.up]*float64(j)/float64(ny))
			x1, y1 := p.at.To(d[0]*float64(i+1)/float64(nx), d[p.up]*float64(j+1)/float64(ny))
			p.fill(x0-0.2*px, y0-0.2*px, x1+0.2*px, y1+0.2*px, mix(p.s.Paper, p.s.Slate, 0.42*a))
		}
	}
	x0, y0 := p.at.To(0, 0)
	x1, y1 := p.at.To(d[0], d[p.up])
	for k := range m.Order[0] {
		x, _ := p.at.To(d[0]*(2*float64(k)+1)/(2*float64(m.Order[0])), 0)
		p.line(x, y0, x, y1, p.s.Hair, p.s.Slate, 4*px, 3*px)
	}
	for k := range m.Order[p.up] {
		_, y := p.at.To(0, d[p.up]*(2*float64(k)+1)/(2*float64(m.Order[p.up])))
		p.line(x0, y, x1, y, p.s.Hair, p.s.Slate, 4*px, 3*px)
	}
}

// elsewhere is the mode's factor along the axis that the sheet does not show, at
// the seat; at least what keeps the sheet from being empty.
func (p *sheetPen) elsewhere(m acoustics.Mode) float64 {
	return math.Max(0.35, math.Abs(factorAtSeat(m, p.r.Project, 3-p.up, p.v.Seat)))
}

// factorAtSeat returns a mode's factor along one axis at a seat's place on it.
func factorAtSeat(m acoustics.Mode, p project.Project, axis, seat int) float64 {
	if len(p.Seats) == 0 || m.Order[axis] == 0 {
		return 1
	}
	at := p.Seats[min(seat, len(p.Seats)-1)].At[axis]
	return math.Cos(float64(m.Order[axis]) * math.Pi * at / p.Room.Dimension(axis))
}

// PatternAt returns a mode's pressure at a point of a drawing, as a share of its
// greatest: x along the length and y along the axis that runs up the sheet (1
// plan, 2 section), on the third axis at the seat.
func PatternAt(m acoustics.Mode, p project.Project, up int, x, y float64, seat int) float64 {
	return math.Abs(math.Cos(float64(m.Order[0])*math.Pi*x/p.Room.Length) *
		math.Cos(float64(m.Order[up])*math.Pi*y/p.Room.Dimension(up)) * factorAtSeat(m, p, 3-up, seat))
}

// wallThickness is how thick the walls are drawn.
const wallThickness = 5 * px

// walls draws the room's outline with the walls' thickness hinted; a selected one
// stands out.
func (p *sheetPen) walls(round [4]acoustics.Surface) {
	x0, y0 := p.at.To(0, 0)
	x1, y1 := p.at.To(p.at.Width, p.at.Height)
	t := wallThickness
	bands := [4]frame{{x0 - t, y0, x0, y1}, {x1, y0, x1 + t, y1}, {x0 - t, y0 - t, x1 + t, y0}, {x0 - t, y1, x1 + t, y1 + t}}
	for k, b := range bands {
		solid := mix(p.s.Paper, p.s.Ink, 0.28)
		if int(round[k]) == p.v.Surface {
			solid = p.s.Select
		}
		p.fill(b.x0, b.y0, b.x1, b.y1, solid)
	}
	p.outline(x0, y0, x1, y1, 1.4*px, p.s.Ink)
	p.outline(x0-t, y0-t, x1+t, y1+t, p.s.Hair, p.s.Ink)
}

// linings letters each surface with its name and what it carries, as far as there
// is room; taken is the stretch of the top edge that the title needs.
func (p *sheetPen) linings(round [4]acoustics.Surface, taken vg.Length) {
	x0, y0 := p.at.To(0, 0)
	x1, y1 := p.at.To(p.at.Width, p.at.Height)
	faint := mix(p.s.Paper, p.s.Ink, 0.6)
	small := p.s.Text * 0.85
	wide, high := x1-x0, y1-y0
	var words [4]string
	for k, s := range round {
		words[k] = s.String()
		if p.v.PlanAt == nil { // held while something is dragged: names alone are quicker
			words[k] = liningWords(p.r.Project, s)
		}
	}
	p.upright(x0-12*px, (y0+y1)/2, p.fitted(words[0], small, high), small, faint)
	p.upright(x1+11*px, (y0+y1)/2, p.fitted(words[1], small, high), small, faint)
	p.text((x0+x1)/2, y0-11*px, p.fitted(words[2], small, wide), small, atMiddle, faint)
	// The upper edge shares its line with the title where the room fills the sheet.
	name, x := p.fitted(words[3], small, wide), (x0+x1)/2
	if y := y1 + 11*px; y+small/2 > p.height()-16*px {
		name = p.fitted(name, small, x1-max(x0, taken+12*px))
		x = max(x, taken+12*px+p.measure(name, small)/2)
	}
	p.text(x, y1+11*px, name, small, atMiddle, faint)
}

// liningWords says what a surface is called and what it carries.
func liningWords(p project.Project, s acoustics.Surface) string {
	words := s.String() + ": "
	lining := p.Lining(s)
	for i, share := range lining {
		if i > 0 {
			words += ", "
		}
		f, _ := p.FinishByID(share.Finish)
		words += f.Name
		if len(lining) > 1 {
			words += fmt.Sprintf(" %.0f %%", 100*share.Share)
		}
	}
	return words
}

// AbsorberFrame returns the rectangle in metres that an absorber takes on a
// drawing, up the axis that runs up it (1 plan, 2 section), and whether it lies
// in the drawing's plane, to be drawn dashed.
func AbsorberFrame(a project.Absorber, room project.Room, up int) (x0, y0, x1, y1 float64, flat bool) {
	d := [3]float64{room.Length, room.Width, room.Height}
	lo, hi := a.Extent()
	i, j := a.Surface.InPlane()
	n := a.Surface.Normal()
	var from, to [3]float64
	from[i], to[i] = lo[0], hi[0]
	from[j], to[j] = lo[1], hi[1]
	deep := math.Min(study.Depth(a), d[n]/2)
	if a.Surface.Far() {
		from[n], to[n] = d[n]-deep, d[n]
	} else {
		to[n] = deep
	}
	return from[0], from[up], to[0], to[up], n == 3-up
}

// keepOuts crosses out the areas that are kept free, those that a wall's edge shows.
func (p *sheetPen) keepOuts() {
	room := p.r.Project.Room
	for _, k := range p.r.Project.KeepOut {
		a := project.Absorber{Surface: k.Surface, Centre: k.Centre, Size: k.Size, Units: 1}
		mx0, my0, mx1, my1, flat := AbsorberFrame(a, room, p.up)
		x0, y0 := p.at.To(mx0, my0)
		x1, y1 := p.at.To(mx1, my1)
		faint := mix(p.s.Paper, p.s.Ink, 0.5)
		if flat {
			p.outline(x0, y0, x1, y1, p.s.Hair, faint, 2*px, 2*px)
			p.line(x0, y0, x1, y1, p.s.Hair, faint, 2*px, 2*px)
			continue
		}
		// Along the wall, a line beside it with a tick at each end.
		t := 3 * px
		if x1-x0 < y1-y0 {
			x := x0 + t
			if k.Surface.Far() {
				x = x0 - t
			}
			p.line(x, y0, x, y1, 2*px, faint)
		} else {
			y := y0 + t
			if k.Surface.Far() {
				y = y0 - t
			}
			p.line(x0, y, x1, y, 2*px, faint)
		}
	}
}

func (p *sheetPen) absorbers() {
	for i, a := range p.r.Project.Absorbers {
		mx0, my0, mx1, my1, flat := AbsorberFrame(a, p.r.Project.Room, p.up)
		x0, y0 := p.at.To(mx0, my0)
		x1, y1 := p.at.To(mx1, my1)
		w := 1.2 * px
		if i == p.v.Absorber {
			w = 2.6 * px
		}
		if flat {
			p.outline(x0, y0, x1, y1, w, p.s.Ochre, 5*px, 3*px)
		} else {
			p.fill(x0, y0, x1, y1, mix(p.s.Paper, p.s.Ochre, 0.35))
			p.outline(x0, y0, x1, y1, w, p.s.Ochre)
			p.seams(a, x0, y0, x1, y1)
		}
	}
}

// labels letters everything, over all that is drawn: what is selected first, then
// seats and loudspeakers, then absorbers.
func (p *sheetPen) labels() {
	project := p.r.Project
	absorber := func(i int) {
		mx0, my0, mx1, my1, _ := AbsorberFrame(project.Absorbers[i], project.Room, p.up)
		x0, y0 := p.at.To(mx0, my0)
		x1, y1 := p.at.To(mx1, my1)
		p.label(project.Absorbers[i].ID, x0, y0, x1, y1)
	}
	if i := p.v.Absorber; i >= 0 && i < len(project.Absorbers) {
		absorber(i)
	}
	for _, s := range project.Seats {
		x, y := p.at.To(s.At[0], s.At[p.up])
		p.label(s.ID, x-6*px, y-6*px, x+6*px, y+6*px)
	}
	for _, l := range project.Loudspeakers {
		x, y := p.at.To(l.At[0], l.At[p.up])
		p.label(l.ID, x-7*px, y-7*px, x+7*px, y+7*px)
	}
	for i := range project.Absorbers {
		if i != p.v.Absorber {
			absorber(i)
		}
	}
}

// seams draws where one unit ends and the next begins.
func (p *sheetPen) seams(a project.Absorber, x0, y0, x1, y1 vg.Length) {
	i, _ := a.Surface.InPlane()
	for k := 1; k < a.Units && a.Units <= 40; k++ {
		share := vg.Length(k) / vg.Length(a.Units)
		switch i {
		case 0:
			x := x0 + (x1-x0)*share
			p.line(x, y0, x, y1, p.s.Hair, p.s.Ochre)
		case p.up:
			y := y0 + (y1-y0)*share
			p.line(x0, y, x1, y, p.s.Hair, p.s.Ochre)
		}
	}
}

// label letters a thing beside its frame where nothing else is lettered, and
// leaves it out where there is no such place.
func (p *sheetPen) label(s string, x0, y0, x1, y1 vg.Length) {
	size := p.s.Text * 0.9
	w, h := p.measure(s, size), size
	gap := 4 * px
	for _, at := range [][2]vg.Length{
		{x1 + gap + w/2, (y0 + y1) / 2}, {x0 - gap - w/2, (y0 + y1) / 2},
		{(x0 + x1) / 2, y1 + gap + h/2}, {(x0 + x1) / 2, y0 - gap - h/2},
		{x1 + gap + w/2, y1 + gap + h/2}, {x1 + gap + w/2, y0 - gap - h/2},
	} {
		f := frame{at[0] - w/2 - px, at[1] - h/2, at[0] + w/2 + px, at[1] + h/2}
		lx, ly := p.at.To(0, 0)
		hx, hy := p.at.To(p.at.Width, p.at.Height)
		if f.x0 < lx+px || f.x1 > hx-px || f.y0 < ly+px || f.y1 > hy-px || p.taken(f) {
			continue
		}
		p.used = append(p.used, f)
		p.text(at[0], at[1], s, size, atMiddle, p.s.Ink)
		return
	}
}

func (p *sheetPen) taken(f frame) bool { return taken(p.used, f) }

// taken reports whether a frame meets one of those that are taken.
func taken(used []frame, f frame) bool {
	return slices.ContainsFunc(used, f.meets)
}

// loudspeakers are triangles that point to the first seat.
func (p *sheetPen) loudspeakers() {
	for i, l := range p.r.Project.Loudspeakers {
		x, y := p.at.To(l.At[0], l.At[p.up])
		dx, dy := 1.0, 0.0
		if len(p.r.Project.Seats) > 0 {
			s := p.r.Project.Seats[0].At
			dx, dy = s[0]-l.At[0], s[p.up]-l.At[p.up]
			if n := math.Hypot(dx, dy); n > 0 {
				dx, dy = dx/n, dy/n
			} else {
				dx, dy = 1, 0
			}
		}
		r := 7 * px
		tip := func(along, across float64) vg.Point {
			return vg.Point{X: x + r*vg.Length(along*dx-across*dy), Y: y + r*vg.Length(along*dy+across*dx)}
		}
		col := p.s.Ink
		p.polygon(col, tip(1, 0), tip(-0.8, 0.85), tip(-0.8, -0.85))
		if i == p.v.Loudspeaker {
			p.ring(x, y, 11*px, 1.4*px, p.s.Select)
		}
	}
}

// seats are rings with a cross.
func (p *sheetPen) seats() {
	for i, s := range p.r.Project.Seats {
		x, y := p.at.To(s.At[0], s.At[p.up])
		r := 6 * px
		p.disc(x, y, r, p.s.Paper)
		p.ring(x, y, r, 1.4*px, p.s.Ink)
		p.line(x-r, y, x+r, y, p.s.Hair, p.s.Ink)
		p.line(x, y-r, x, y+r, p.s.Hair, p.s.Ink)
		if i == p.v.SelectedSeat {
			p.ring(x, y, 11*px, 1.4*px, p.s.Select)
		}
	}
}

// dimensions draws the dimension lines below and to the left.
func (p *sheetPen) dimensions() {
	x0, y0 := p.at.To(0, 0)
	x1, y1 := p.at.To(p.at.Width, p.at.Height)
	y := y0 - 24*px
	x := x0 - 26*px
	tick := 3 * px
	p.line(x0, y, x1, y, p.s.Hair, p.s.Ink)
	p.line(x, y0, x, y1, p.s.Hair, p.s.Ink)
	for _, e := range []vg.Length{x0, x1} {
		p.line(e-tick, y-tick, e+tick, y+tick, p.s.Hair, p.s.Ink)
		p.line(e, y0-8*px, e, y-4*px, p.s.Hair, p.s.Faint)
	}
	for _, e := range []vg.Length{y0, y1} {
		p.line(x-tick, e-tick, x+tick, e+tick, p.s.Hair, p.s.Ink)
		p.line(x0-8*px, e, x-4*px, e, p.s.Hair, p.s.Faint)
	}
	p.text((x0+x1)/2, y-8*px, units.Length(p.at.Width, p.v.system()), p.s.Text, atMiddle, p.s.Ink)
	p.upright(x-8*px, (y0+y1)/2, units.Length(p.at.Height, p.v.system()), p.s.Text, p.s.Ink)
}
