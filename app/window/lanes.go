package window

import (
	"math"
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/figures"
)

// The ruler's limits and where it starts from, Hz.
const (
	rulerLow, rulerHigh   = 10.0, 250.0
	rulerFrom, rulerTo    = 16.0, 250.0
	narrowestRuler        = 1.15 // least ratio of its ends
	laneHead              = 18   // height of a lane's heading
	clickReach, zoomNotch = 12, 1.15
)

// lane is one lane: its heading, its reading and its picture.
type lane struct {
	name    figures.Lane
	title   *canvas.Text
	reading *canvas.Text
	pic     *picture
	folded  bool // as the state said last
	weight  float32
}

// lanes are the plots on one frequency ruler with one cursor.
type lanes struct {
	widget.BaseWidget
	actions Actions
	state   State
	list    []*lane
	cursor  *canvas.Line
	dragged bool
}

var (
	_ fyne.Draggable      = (*lanes)(nil)
	_ fyne.Scrollable     = (*lanes)(nil)
	_ fyne.Focusable      = (*lanes)(nil)
	_ fyne.DoubleTappable = (*lanes)(nil)
	_ desktop.Mouseable   = (*lanes)(nil)
	_ desktop.Hoverable   = (*lanes)(nil)
)

func newLanes(a Actions, e *easel) *lanes {
	l := &lanes{actions: a, cursor: canvas.NewLine(nil)}
	l.cursor.Hide()
	weights := map[figures.Lane]float32{figures.ModesLane: 1.25, figures.LevelLane: 1.2}
	for _, name := range figures.Lanes() {
		w := weights[name]
		if w == 0 {
			w = 0.8
		}
		one := &lane{name: name, title: canvas.NewText("", nil), reading: canvas.NewText("", nil), pic: newPicture(e), weight: w}
		one.title.TextSize, one.reading.TextSize = 11, 10.5
		one.reading.Alignment = fyne.TextAlignTrailing
		l.list = append(l.list, one)
	}
	l.ExtendBaseWidget(l)
	return l
}

// show draws all lanes that are not folded.
func (l *lanes) show(s State) {
	l.state = s
	style := look{s.Dark}.style()
	style.Laid = true
	l.cursor.StrokeColor = style.Ink
	l.cursor.StrokeWidth = 1
	for _, one := range l.list {
		one.folded = slices.Contains(s.Folded, string(one.name))
	}
	for _, one := range l.list {
		sign := "▾ "
		if one.folded {
			sign = "▸ "
		}
		one.title.Text, one.title.Color = sign+one.name.Title(), style.Ink
		one.reading.Color = style.Ink
		one.title.Refresh()
		if s.Result == nil || one.folded {
			continue
		}
		r, v, name := s.Result, s.view(), one.name
		v.Ruler = one == l.lowest()
		one.pic.show(style.Paper, func(c draw.Canvas) { figures.DrawLane(c, name, r, v, style) })
	}
	l.read()
}

// lowest returns the last lane that is not folded: the ruler stands under it.
func (l *lanes) lowest() *lane {
	var last *lane
	for _, one := range l.list {
		if !one.folded {
			last = one
		}
	}
	return last
}

// read moves the cursor and writes the readings.
func (l *lanes) read() {
	hz := l.state.CursorHz
	for _, one := range l.list {
		one.reading.Text = ""
		if l.state.Result != nil && hz > 0 {
			room := l.Size().Width - one.title.MinSize().Width - 30
			one.reading.Text = fitted(figures.LaneReading(one.name, l.state.Result, l.state.view(), hz), room, one.reading.TextSize, one.reading.TextStyle)
		}
		one.reading.Refresh()
	}
	if hz < l.state.FromHz || hz > l.state.ToHz {
		l.cursor.Hide()
		return
	}
	x := float32(l.state.view().X(hz, vg.Length(l.Size().Width)*unit) / unit)
	l.cursor.Position1 = fyne.NewPos(x, laneHead)
	l.cursor.Position2 = fyne.NewPos(x, l.Size().Height)
	l.cursor.Show()
	l.cursor.Refresh()
}

// hzAt returns the frequency at a position.
func (l *lanes) hzAt(pos fyne.Position) float64 {
	return l.state.view().HzAt(vg.Length(pos.X)*unit, vg.Length(l.Size().Width)*unit)
}

// MouseIn, MouseMoved and MouseOut move the common cursor.
func (l *lanes) MouseIn(e *desktop.MouseEvent) { l.MouseMoved(e) }

// MouseMoved moves the cursor to the pointer.
func (l *lanes) MouseMoved(e *desktop.MouseEvent) { l.actions.Cursor(l.hzAt(e.Position)) }

// MouseOut takes the cursor away.
func (l *lanes) MouseOut() { l.actions.Cursor(0) }

// MouseDown selects the nearest mode, or folds the lane whose heading it hits.
func (l *lanes) MouseDown(e *desktop.MouseEvent) {
	if c := fyne.CurrentApp().Driver().CanvasForObject(l); c != nil {
		c.Focus(l)
	}
	for _, one := range l.list {
		top := one.title.Position().Y
		if e.Position.Y >= top && e.Position.Y < top+laneHead {
			l.actions.Fold(string(one.name))
			l.Refresh()
			return
		}
	}
}

// MouseUp selects what a click without a drag was on.
func (l *lanes) MouseUp(e *desktop.MouseEvent) {
	if l.dragged || l.state.Result == nil {
		return
	}
	if m := l.modeAt(e.Position); m >= 0 {
		s := l.state.Selection
		s.Mode = m
		l.actions.Select(s)
	}
}

// modeAt returns the mode that a click at a position means: of the stave it is
// on in the modes lane, else the nearest.
func (l *lanes) modeAt(pos fyne.Position) int {
	width := vg.Length(l.Size().Width) * unit
	best, at := float64(clickReach), -1
	for _, one := range l.list {
		if one.folded || pos.Y < one.pic.Position().Y || pos.Y > one.pic.Position().Y+one.pic.Size().Height {
			continue
		}
		v := l.state.view()
		v.Ruler = one == l.lowest()
		height := vg.Length(one.pic.Size().Height) * unit
		y := vg.Length(one.pic.Size().Height-(pos.Y-one.pic.Position().Y)) * unit
		for _, h := range figures.ModeHits(l.state.Result, v, width, height) {
			if one.name == figures.ModesLane && (y < h.Y0 || y > h.Y1) {
				continue
			}
			if d := math.Abs(float64(h.X/unit) - float64(pos.X)); d < best {
				best, at = d, h.Mode
			}
		}
	}
	return at
}

// Dragged pans the ruler.
func (l *lanes) Dragged(e *fyne.DragEvent) {
	l.dragged = true
	f := figures.LaneFrame()
	across := float64(l.Size().Width) - float64((f.Left+f.Right)/unit)
	l.setRuler(pan(l.state.FromHz, l.state.ToHz, -float64(e.Dragged.DX)/across))
}

// DragEnd ends a pan.
func (l *lanes) DragEnd() { l.dragged = false }

// Scrolled zooms about the pointer; sideways it pans.
func (l *lanes) Scrolled(e *fyne.ScrollEvent) {
	if e.Scrolled.DX != 0 {
		l.setRuler(pan(l.state.FromHz, l.state.ToHz, -float64(e.Scrolled.DX)/400))
		return
	}
	factor := math.Pow(zoomNotch, -float64(e.Scrolled.DY)/25)
	l.setRuler(zoom(l.state.FromHz, l.state.ToHz, l.hzAt(e.Position), factor))
}

// DoubleTapped shows the whole ruler again.
func (l *lanes) DoubleTapped(*fyne.PointEvent) { l.setRuler(rulerFrom, rulerTo) }

func (l *lanes) setRuler(from, to float64) { l.actions.Ruler(from, to) }

// zoom scales a stretch of ruler about a frequency, which keeps its place.
func zoom(from, to, about, factor float64) (float64, float64) {
	span := math.Log(to / from)
	share := math.Log(about/from) / span
	span = math.Max(math.Log(narrowestRuler), math.Min(math.Log(rulerHigh/rulerLow), span*factor))
	from = about * math.Exp(-share*span)
	return within(from, from*math.Exp(span))
}

// pan moves a stretch of ruler by a share of its length.
func pan(from, to, share float64) (float64, float64) {
	shift := math.Pow(to/from, share)
	return within(from*shift, to*shift)
}

// within moves a stretch of ruler inside the limits without stretching it.
func within(from, to float64) (float64, float64) {
	if from < rulerLow {
		from, to = rulerLow, to*rulerLow/from
	}
	if to > rulerHigh {
		from, to = from*rulerHigh/to, rulerHigh
	}
	return math.Max(from, rulerLow), to
}

// TypedKey steps through the modes and zooms.
func (l *lanes) TypedKey(e *fyne.KeyEvent) {
	if l.state.Result == nil || len(l.state.Result.Modes) == 0 {
		return
	}
	s := l.state.Selection
	middle := math.Sqrt(l.state.FromHz * l.state.ToHz)
	switch e.Name {
	case fyne.KeyLeft:
		s.Mode = max(0, s.Mode-1)
	case fyne.KeyRight:
		s.Mode = min(len(l.state.Result.Modes)-1, s.Mode+1)
	case fyne.KeyHome:
		l.setRuler(rulerFrom, rulerTo)
		return
	case fyne.KeyPlus, fyne.KeyEqual:
		l.setRuler(zoom(l.state.FromHz, l.state.ToHz, middle, 1/zoomNotch))
		return
	case fyne.KeyMinus:
		l.setRuler(zoom(l.state.FromHz, l.state.ToHz, middle, zoomNotch))
		return
	default:
		return
	}
	l.actions.Select(s)
}

// FocusGained, FocusLost and TypedRune make the lanes take keys.
func (l *lanes) FocusGained() {}

// FocusLost changes nothing.
func (l *lanes) FocusLost() {}

// TypedRune takes no letters.
func (l *lanes) TypedRune(rune) {}

// CreateRenderer stacks the lanes.
func (l *lanes) CreateRenderer() fyne.WidgetRenderer {
	r := &lanesRenderer{l: l}
	for _, one := range l.list {
		r.objects = append(r.objects, one.pic, one.title, one.reading)
	}
	r.objects = append(r.objects, l.cursor)
	return r
}

type lanesRenderer struct {
	l       *lanes
	objects []fyne.CanvasObject
}

func (r *lanesRenderer) Layout(size fyne.Size) {
	var weights, heads float32
	for _, one := range r.l.list {
		heads += laneHead
		if !one.folded {
			weights += one.weight
		}
	}
	rest := size.Height - heads
	if weights > 0 {
		rest -= float32(figures.RulerHeight() / unit)
	}
	y := float32(0)
	for _, one := range r.l.list {
		one.title.Move(fyne.NewPos(8, y+2))
		one.reading.Move(fyne.NewPos(0, y+2))
		one.reading.Resize(fyne.NewSize(size.Width-14, 14))
		y += laneHead
		if one.folded {
			one.pic.Hide()
			continue
		}
		h := rest * one.weight / weights
		if one == r.l.lowest() {
			h += float32(figures.RulerHeight() / unit)
		}
		one.pic.Show()
		one.pic.Move(fyne.NewPos(0, y))
		one.pic.Resize(fyne.NewSize(size.Width, h))
		y += h
	}
}

func (r *lanesRenderer) MinSize() fyne.Size { return fyne.NewSize(300, 300) }

func (r *lanesRenderer) Refresh() {
	r.Layout(r.l.Size())
	canvas.Refresh(r.l)
}

func (r *lanesRenderer) Objects() []fyne.CanvasObject { return r.objects }
func (r *lanesRenderer) Destroy()                     {}
