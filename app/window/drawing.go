package window

import (
	"fmt"
	"math"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/app/units"
)

// unit is one window unit in the figures' measure.
const unit = vg.Inch / 96

// drawing is the plan over the long section, to scale, with everything in them
// to be taken hold of.
type drawing struct {
	widget.BaseWidget
	actions Actions
	state   State

	plan, section *picture
	reading       *canvas.Text
	grab          *grab
	pace          throttle
}

var (
	_ fyne.Draggable     = (*drawing)(nil)
	_ fyne.Focusable     = (*drawing)(nil)
	_ desktop.Mouseable  = (*drawing)(nil)
	_ desktop.Hoverable  = (*drawing)(nil)
	_ desktop.Cursorable = (*drawing)(nil)
)

// thing is what can be taken hold of.
type thing int

const (
	noThing thing = iota
	loudspeaker
	seat
	absorber
	nearWall // front, left: the wall at 0
	farWall  // back, right, ceiling
)

// hold is one thing at a place on one of the two sheets.
type hold struct {
	what  thing
	index int // of a loudspeaker, seat or absorber
	axis  int // of a wall
	sheet int // 0 plan, 1 section
}

// grab is a drag under way.
type grab struct {
	hold
	start, last    project.Project // before the drag, and as it stands
	from           fyne.Position
	planAt, sectAt figures.Placement
	moved          bool
}

func newDrawing(a Actions, e *easel) *drawing {
	d := &drawing{actions: a, plan: newPicture(e), section: newPicture(e), reading: canvas.NewText("", nil), pace: throttle{do: e.do, pace: dragPace}}
	d.reading.TextSize = 10.5
	d.ExtendBaseWidget(d)
	return d
}

// show draws the project as edited last, with the results there are.
func (d *drawing) show(s State) {
	d.state = s
	if s.Result == nil {
		return
	}
	r := *s.Result
	r.Project = s.Project
	r.Room.Box.Length, r.Room.Box.Width, r.Room.Box.Height = s.Project.Room.Length, s.Project.Room.Width, s.Project.Room.Height
	style := look{s.Dark}.style()
	style.Laid = true
	v := s.view()
	if d.grab != nil {
		v.PlanAt, v.SectionAt = &d.grab.planAt, &d.grab.sectAt
	}
	d.plan.show(style.Paper, func(c draw.Canvas) { figures.DrawPlan(c, &r, v, style) })
	d.section.show(style.Paper, func(c draw.Canvas) { figures.DrawSection(c, &r, v, style) })
	d.reading.Color = style.Ink
}

// view returns what the figures are asked to show.
func (s State) view() figures.View {
	return figures.View{FromHz: s.FromHz, ToHz: s.ToHz, Seat: s.ears(), Mode: s.Selection.Mode, Absorber: s.Selection.Absorber,
		Loudspeaker: s.Selection.Loudspeaker, Kept: s.Kept, SelectedSeat: s.Selection.Seat, Surface: s.Selection.Surface, US: s.US}
}

// ears returns the seat whose levels are shown, one that the result has.
func (s State) ears() int {
	if s.Result == nil || s.Ears >= len(s.Result.Levels.Bare) {
		return 0
	}
	return s.Ears
}

func (s State) system() units.System {
	if s.US {
		return units.US
	}
	return units.Metric
}

// placements returns how the two sheets lie, in window units from their own
// lower left corners.
func (d *drawing) placements() (plan, section figures.Placement) {
	if d.grab != nil {
		return d.grab.planAt, d.grab.sectAt
	}
	p, s := d.plan.Size(), d.section.Size()
	return figures.PlanPlacement(d.state.Project, vg.Length(p.Width)*unit, vg.Length(p.Height)*unit),
		figures.SectionPlacement(d.state.Project, vg.Length(s.Width)*unit, vg.Length(s.Height)*unit)
}

// metres returns the sheet under a position and the point on it in metres.
func (d *drawing) metres(pos fyne.Position) (sheet int, x, y float64) {
	plan, section := d.placements()
	at, pic := plan, d.plan
	if pos.Y >= d.section.Position().Y {
		sheet, at, pic = 1, section, d.section
	}
	lx := vg.Length(pos.X-pic.Position().X) * unit
	ly := vg.Length(pic.Size().Height-(pos.Y-pic.Position().Y)) * unit
	x, y = at.From(lx, ly)
	return sheet, x, y
}

// position is the inverse of metres.
func (d *drawing) position(sheet int, x, y float64) fyne.Position {
	plan, section := d.placements()
	at, pic := plan, d.plan
	if sheet == 1 {
		at, pic = section, d.section
	}
	lx, ly := at.To(x, y)
	return fyne.NewPos(pic.Position().X+float32(lx/unit), pic.Position().Y+pic.Size().Height-float32(ly/unit))
}

// dragPace is the least time between two edits of a drag.
const dragPace = 25 * time.Millisecond

// reach is how near the pointer must be to a thing, window units.
const reach = 9

// under finds what lies under a position: points before absorbers before walls.
func (d *drawing) under(pos fyne.Position) hold {
	sheet, x, y := d.metres(pos)
	p := d.state.Project
	up := sheet + 1
	near := func(mx, my float64) bool {
		q := d.position(sheet, mx, my)
		return math.Hypot(float64(q.X-pos.X), float64(q.Y-pos.Y)) <= reach
	}
	for i, s := range p.Seats {
		if near(s.At[0], s.At[up]) {
			return hold{what: seat, index: i, sheet: sheet}
		}
	}
	for i, l := range p.Loudspeakers {
		if near(l.At[0], l.At[up]) {
			return hold{what: loudspeaker, index: i, sheet: sheet}
		}
	}
	plan, section := d.placements()
	scale := plan.Scale
	if sheet == 1 {
		scale = section.Scale
	}
	slack := 4 / float64(scale/unit)
	best, area := -1, math.Inf(1)
	for i, a := range p.Absorbers {
		x0, y0, x1, y1, _ := figures.AbsorberFrame(a, p.Room, up)
		if x < x0-slack || x > x1+slack || y < y0-slack || y > y1+slack {
			continue
		}
		if s := (x1 - x0) * (y1 - y0); s < area {
			best, area = i, s
		}
	}
	if best >= 0 {
		return hold{what: absorber, index: best, sheet: sheet}
	}
	return d.wallUnder(sheet, x, y, slack)
}

func (d *drawing) wallUnder(sheet int, x, y, slack float64) hold {
	p := d.state.Project
	up := sheet + 1
	along, height := p.Room.Length, p.Room.Dimension(up)
	beside := y > -slack && y < height+slack
	within := x > -slack && x < along+slack
	switch {
	case beside && math.Abs(x-along) < 2*slack:
		return hold{what: farWall, axis: 0, sheet: sheet}
	case beside && math.Abs(x) < 2*slack:
		return hold{what: nearWall, axis: 0, sheet: sheet}
	case within && math.Abs(y-height) < 2*slack:
		return hold{what: farWall, axis: up, sheet: sheet}
	case within && math.Abs(y) < 2*slack && sheet == 0:
		return hold{what: nearWall, axis: up, sheet: sheet}
	}
	return hold{}
}

// MouseDown selects what is under the pointer.
func (d *drawing) MouseDown(e *desktop.MouseEvent) {
	if c := fyne.CurrentApp().Driver().CanvasForObject(d); c != nil {
		c.Focus(d)
	}
	if d.state.Result == nil {
		return
	}
	h := d.under(e.Position)
	d.pick(h)
	plan, section := d.placements()
	d.grab = &grab{hold: h, start: d.state.Project, last: d.state.Project, from: e.Position, planAt: plan, sectAt: section}
}

// pick selects a thing; the mode stays selected.
func (d *drawing) pick(h hold) {
	s := Selection{Mode: d.state.Selection.Mode, Absorber: -1, Loudspeaker: -1, Seat: -1, Surface: -1}
	switch h.what {
	case loudspeaker:
		s.Loudspeaker = h.index
	case seat:
		s.Seat = h.index
	case absorber:
		s.Absorber = h.index
	}
	d.actions.Select(s)
}

// MouseUp ends a press that was no drag.
func (d *drawing) MouseUp(*desktop.MouseEvent) {
	if d.grab != nil && !d.grab.moved {
		d.grab = nil
	}
}

// Dragged moves what was taken hold of.
func (d *drawing) Dragged(e *fyne.DragEvent) {
	g := d.grab
	if g == nil || g.what == noThing {
		return
	}
	if !g.moved {
		g.moved = true
		d.actions.Dragging(true)
	}
	at := e.Position
	d.pace.call(func() { d.dragTo(g, at) })
}

// dragTo moves what is held to where the pointer is.
func (d *drawing) dragTo(g *grab, at fyne.Position) {
	scale := g.planAt.Scale
	if g.sheet == 1 {
		scale = g.sectAt.Scale
	}
	perMetre := float64(scale / unit)
	dx := float64(at.X-g.from.X) / perMetre
	dy := -float64(at.Y-g.from.Y) / perMetre
	if p, ok := moved(g.start, g.hold, dx, dy, snap); ok {
		g.last = p
		d.actions.Edit(g.label(), p, g.key(), false)
	}
}

// DragEnd puts the drag down as one step.
func (d *drawing) DragEnd() {
	d.pace.flush()
	g := d.grab
	d.grab = nil
	if g == nil || !g.moved {
		return
	}
	d.actions.Dragging(false)
	d.actions.Edit(g.label(), g.last, g.key(), true)
}

// cancel takes a drag back.
func (d *drawing) cancel() {
	d.pace.held = nil
	g := d.grab
	d.grab = nil
	if g != nil && g.moved {
		d.actions.Dragging(false)
		d.actions.Edit(g.label(), g.start, g.key(), true)
	}
}

func (h hold) key() string { return fmt.Sprintf("drag-%d-%d-%d", h.what, h.index, h.axis) }

func (h hold) label() string {
	switch h.what {
	case loudspeaker:
		return "move loudspeaker"
	case seat:
		return "move seat"
	case absorber:
		return "move absorber"
	}
	return "move wall"
}

// snap is the grid that drags keep to, m.
const snap = 0.01

func snapped(v, grid float64) float64 { return math.Round(math.Round(v/grid)*grid*1e6) / 1e6 }

// moved returns the project with a thing moved by metres along its sheet, and
// false where it cannot be.
func moved(p project.Project, h hold, dx, dy, grid float64) (project.Project, bool) {
	up := h.sheet + 1
	switch h.what {
	case loudspeaker:
		l := p.Loudspeakers[h.index]
		l.At[0], l.At[up] = snapped(l.At[0]+dx, grid), snapped(l.At[up]+dy, grid)
		l.At = p.Room.Inside(l.At)
		return p.WithLoudspeaker(h.index, l), true
	case seat:
		s := p.Seats[h.index]
		s.At[0], s.At[up] = snapped(s.At[0]+dx, grid), snapped(s.At[up]+dy, grid)
		s.At = p.Room.Inside(s.At)
		return p.WithSeat(h.index, s), true
	case absorber:
		return movedAbsorber(p, h.index, up, dx, dy, grid)
	case farWall, nearWall:
		by := dx
		if h.axis != 0 {
			by = dy
		}
		if h.what == nearWall {
			by = -by
		}
		to := snapped(math.Max(0.5, math.Min(100, p.Room.Dimension(h.axis)+by)), grid)
		q := p.WithDimension(h.axis, to, h.what == nearWall)
		return q, len(q.Validate()) == 0
	}
	return p, false
}

// movedAbsorber moves an absorber along its surface, as far as the surface and
// its neighbours let it.
func movedAbsorber(p project.Project, index, up int, dx, dy, grid float64) (project.Project, bool) {
	a := p.Absorbers[index]
	first, second := a.Surface.InPlane()
	for k, axis := range [2]int{first, second} {
		switch axis {
		case 0:
			a.Centre[k] = snapped(a.Centre[k]+dx, grid)
		case up:
			a.Centre[k] = snapped(a.Centre[k]+dy, grid)
		}
	}
	a = p.Room.Onto(a)
	for i, b := range p.Absorbers {
		if i != index && project.Overlap(a, b) {
			return p, false
		}
	}
	return p.WithAbsorber(index, a), true
}

// selectedHold is what the arrow keys move.
func (d *drawing) selectedHold() hold {
	s := d.state.Selection
	switch {
	case s.Loudspeaker >= 0 && s.Loudspeaker < len(d.state.Project.Loudspeakers):
		return hold{what: loudspeaker, index: s.Loudspeaker}
	case s.Seat >= 0 && s.Seat < len(d.state.Project.Seats):
		return hold{what: seat, index: s.Seat}
	case s.Absorber >= 0 && s.Absorber < len(d.state.Project.Absorbers):
		return hold{what: absorber, index: s.Absorber}
	}
	return hold{}
}

// TypedKey nudges what is selected by a centimetre in plan, with Page Up and
// Page Down upwards and downwards; Esc takes a drag back.
func (d *drawing) TypedKey(e *fyne.KeyEvent) {
	if e.Name == fyne.KeyEscape {
		d.cancel()
		return
	}
	h := d.selectedHold()
	if h.what == noThing {
		return
	}
	step := snap
	if drv, ok := fyne.CurrentApp().Driver().(desktop.Driver); ok && drv.CurrentKeyModifiers()&fyne.KeyModifierShift != 0 {
		step = 10 * snap
	}
	var dx, dy float64
	switch e.Name {
	case fyne.KeyLeft:
		dx = -step
	case fyne.KeyRight:
		dx = step
	case fyne.KeyUp:
		dy = step
	case fyne.KeyDown:
		dy = -step
	case fyne.KeyPageUp:
		h.sheet, dy = 1, step
	case fyne.KeyPageDown:
		h.sheet, dy = 1, -step
	default:
		return
	}
	if h.what == absorber && d.state.Project.Absorbers[h.index].Surface.Normal() != 2 && h.sheet == 0 && dx == 0 {
		if a := d.state.Project.Absorbers[h.index]; a.Surface.Normal() == 1 {
			h.sheet = 1 // on a side wall up and down is height
		}
	}
	if p, ok := moved(d.state.Project, h, dx, dy, 1e-4); ok {
		d.actions.Edit(h.label(), p, "nudge-"+h.key(), false)
	}
}

// FocusGained, FocusLost and TypedRune make the drawing take keys.
func (d *drawing) FocusGained() {}

// FocusLost ends a drag that lost the window.
func (d *drawing) FocusLost() {}

// TypedRune takes no letters.
func (d *drawing) TypedRune(rune) {}

// MouseIn, MouseMoved and MouseOut read out the place under the pointer.
func (d *drawing) MouseIn(e *desktop.MouseEvent) { d.MouseMoved(e) }

// MouseMoved shows where the pointer is and how strong the mode is there.
func (d *drawing) MouseMoved(e *desktop.MouseEvent) {
	sheet, x, y := d.metres(e.Position)
	p := d.state.Project
	d.reading.Text = ""
	if d.state.Result != nil && x >= 0 && x <= p.Room.Length && y >= 0 && y <= p.Room.Dimension(sheet+1) {
		sys := d.state.system()
		d.reading.Text = fmt.Sprintf("%s from front, %s from %s", units.Length(x, sys), units.Length(y, sys), [2]string{"left", "floor"}[sheet])
		d.reading.Text += d.soundAt(sheet+1, x, y)
	}
	d.reading.Refresh()
}

// soundAt says how loud it is at a place of a sheet: of the map where it shows, else
// of the selected mode.
func (d *drawing) soundAt(up int, x, y float64) string {
	p, r := d.state.Project, d.state.Result
	level := r.Plan
	if up == 2 {
		level = r.Section
	}
	if level != nil {
		return fmt.Sprintf("; %s at %s here", units.Decibels(level.Level(x, y, p.Room.Length, p.Room.Dimension(up))), units.Hertz(level.Hz))
	}
	if m := d.state.Selection.Mode; m >= 0 && m < len(r.Modes) {
		mode := r.Modes[m]
		return fmt.Sprintf("; mode %s %.0f %% of its greatest pressure here", mode.Mode, 100*figures.PatternAt(mode.Mode.Mode, p, up, x, y, d.state.Ears))
	}
	return ""
}

// MouseOut takes the reading away.
func (d *drawing) MouseOut() {
	d.reading.Text = ""
	d.reading.Refresh()
}

// Cursor says what can be done.
func (d *drawing) Cursor() desktop.Cursor { return desktop.DefaultCursor }

// CreateRenderer lays plan over section, the reading at the foot.
func (d *drawing) CreateRenderer() fyne.WidgetRenderer {
	return &drawingRenderer{d: d, objects: []fyne.CanvasObject{d.plan, d.section, d.reading}}
}

type drawingRenderer struct {
	d       *drawing
	objects []fyne.CanvasObject
}

func (r *drawingRenderer) Layout(size fyne.Size) {
	const foot = 16
	h := size.Height - foot
	p := r.d.state.Project.Room
	share := float32(0.55)
	if p.Width > 0 {
		// The plan gets its share of the height by what it has to show.
		share = float32(math.Max(0.4, math.Min(0.64, (p.Width+0.8)/(p.Width+p.Height+1.6))))
	}
	r.d.plan.Move(fyne.NewPos(0, 0))
	r.d.plan.Resize(fyne.NewSize(size.Width, h*share))
	r.d.section.Move(fyne.NewPos(0, h*share))
	r.d.section.Resize(fyne.NewSize(size.Width, h*(1-share)))
	r.d.reading.Move(fyne.NewPos(8, size.Height-foot))
}

func (r *drawingRenderer) MinSize() fyne.Size           { return fyne.NewSize(220, 240) }
func (r *drawingRenderer) Refresh()                     {}
func (r *drawingRenderer) Objects() []fyne.CanvasObject { return r.objects }
func (r *drawingRenderer) Destroy()                     {}
